//! The Jacobian of the positions, its rank, and where the coordinates become singular.

use cas::decide::is_zero;
use cas::matrix::Matrix;
use cas::{Condition, Effort, Expr, Kind};

use super::kinematics::Kinematics;
use super::stage::Stage;
use super::{DeriveError, Derived};
use crate::model::Model;
use crate::record::{Formal, Ground, Rule, Shown, Side, Statement, Step, given, is_implied};

/// The matrix of `dr/dq` with one row for each position component, and the determinant of its
/// transpose times itself.
///
/// # Conditions
/// By the theorem of Cauchy and Binet that determinant is the sum of the squares of all minors of full
/// size, so the rank is the number of coordinates exactly where it is not zero.
///
/// # Errors
/// A model that is not complete, coordinates that are dependent at every state, a determinant beyond
/// the work allowed.
pub fn jacobian(model: &Model, effort: &Effort) -> Result<Derived, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    let mut stage = Stage::titled(model, effort, "jacobian", "Jacobian of the positions");
    let columns = kinematics.coordinates.len();
    let rows: Vec<Vec<Expr>> = kinematics
        .components
        .iter()
        .map(|component| {
            component
                .row
                .iter()
                .map(|entry| stage.collected(*entry, &[]))
                .collect()
        })
        .collect();
    for (component, row) in kinematics.components.iter().zip(&rows) {
        for ((coordinate, entry), shown) in kinematics.coordinates.iter().zip(&component.row).zip(row) {
            if entry.is_zero() {
                continue;
            }
            let name = Formal::position(component.particle, component.axis).partial(*coordinate);
            stage.equal(
                &format!("{}.{coordinate}", component.key()),
                Side::named(name, *entry),
                Side::of(*shown),
                Rule::JacobianEntry,
                [Ground::stated(component.particle)],
            );
        }
    }
    stage.derivation.headline.push(Shown::Matrix {
        label: Formal::Jacobian,
        rows,
    });
    let gram = Matrix::from_fn(columns, columns, |i, j| {
        kinematics.projected(i, |component| component.row[j])
    });
    let (determinant, conditions) = gram.determinant(effort)?;
    if is_zero(determinant, effort).is_proved() {
        return Err(DeriveError::DependentCoordinates { coordinates: columns });
    }
    let shown = stage.collected(determinant, &[]);
    let known = given(model);
    let singular: Vec<Condition> = divisors(shown)
        .into_iter()
        .map(Condition::NotZero)
        .filter(|condition| !is_implied(*condition, &known))
        .collect();
    let verdict = cas::decide::compare(determinant, shown, effort);
    let statement = Statement::equal(Side::named(Formal::GramDeterminant, determinant), Side::of(shown));
    stage.pushed(
        Step::judged("jacobian.rank", statement, Rule::Rank, &verdict)
            .under(conditions)
            .under(singular.iter().copied()),
    );
    stage.show(Statement::defined(Formal::GramDeterminant, shown));
    stage.say(if singular.is_empty() {
        format!("The rank is {columns} at every state: the coordinates are regular everywhere.")
    } else {
        let vanishing = singular
            .iter()
            .map(|condition| format!("{} = 0", stage.plain(condition.expr())));
        format!(
            "The rank is {columns} except where {}: there the coordinates are singular.",
            vanishing.collect::<Vec<_>>().join(" or ")
        )
    });
    Ok(Derived::new(model, stage.derivation))
}

/// The factors of an expression without their exponents and without numbers.
pub(super) fn divisors(expr: Expr) -> Vec<Expr> {
    let factors = expr
        .factors()
        .into_iter()
        .filter(|factor| factor.as_number().is_none());
    let bases = factors.map(|factor| match factor.kind() {
        Kind::Power(base, exponent) if exponent.is_positive() => *base,
        _ => factor,
    });
    let mut found: Vec<Expr> = Vec::new();
    for base in bases {
        if !found.contains(&base) {
            found.push(base);
        }
    }
    found
}
