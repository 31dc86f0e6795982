//! The Jacobian of the positions, its rank, and where the coordinates become singular.

use cas::decide::is_zero;
use cas::matrix::{Matrix, MatrixError};
use cas::{Condition, Effort, Expr, Limit};

use super::kinematics::Kinematics;
use super::stage::Stage;
use super::vanishing::factors_that_may_vanish;
use super::{DeriveError, Derived};
use crate::model::Model;
use crate::record::{Formal, Ground, Rule, Shown, Side, Statement, Step, given};

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
    let (determinant, conditions) = gram_determinant(&kinematics, columns, effort)?;
    if is_zero(determinant, effort).is_proved() {
        return Err(dependent(&kinematics, effort)?);
    }
    let shown = stage.collected(determinant, &[]);
    let vanishing = factors_that_may_vanish(shown, &given(model), effort);
    let verdict = cas::decide::compare(determinant, shown, effort);
    let statement = Statement::equal(Side::named(Formal::GramDeterminant, determinant), Side::of(shown));
    stage.pushed(
        Step::judged("jacobian.rank", statement, Rule::Rank, &verdict)
            .under(conditions)
            .under(vanishing.iter().copied().map(Condition::NotZero)),
    );
    stage.show(Statement::defined(Formal::GramDeterminant, shown));
    stage.say(match unless(&stage, &vanishing) {
        None => format!("The rank is {columns} at every state: the coordinates are regular everywhere."),
        Some(Exception::At(places)) => {
            format!("The rank is {columns} except where {places}: there the coordinates are singular.")
        }
        Some(Exception::Unless(factors)) => format!("The rank is {columns} wherever {factors}."),
    });
    Ok(Derived::new(model, stage.derivation))
}

/// Where something does not hold.
pub(super) enum Exception {
    /// At these places, which are told by a symbol or function that is zero there.
    At(String),
    /// Nothing more is known than that it holds where these factors are not zero; they need not have
    /// a zero at all.
    Unless(String),
}

/// What to say of factors that may vanish; `None` where there are none.
pub(super) fn unless(stage: &Stage<'_>, vanishing: &[Expr]) -> Option<Exception> {
    let row = |sign: &str, between: &str| {
        let texts = vanishing
            .iter()
            .map(|factor| format!("{} {sign} 0", stage.plain(*factor)));
        texts.collect::<Vec<_>>().join(between)
    };
    if vanishing.is_empty() {
        None
    } else if vanishing.iter().any(|factor| factor.terms().len() > 1) {
        Some(Exception::Unless(row("!=", " and ")))
    } else {
        Some(Exception::At(row("=", " or ")))
    }
}

/// The determinant of `J^T J` for the first coordinates, this many of them, with where it is valid.
pub(super) fn gram_determinant(
    kinematics: &Kinematics,
    coordinates: usize,
    effort: &Effort,
) -> Result<(Expr, Vec<Condition>), MatrixError> {
    let gram = Matrix::from_fn(coordinates, coordinates, |i, j| {
        kinematics.projected(i, |component| component.row[j])
    });
    gram.determinant(effort)
}

/// Refuses coordinates that are dependent at every state.
///
/// Where the determinant is beyond the work allowed nothing is refused: what was derived holds all the
/// same, and the Jacobian's own page says that the rank is not known.
pub(super) fn require_independent(kinematics: &Kinematics, effort: &Effort) -> Result<(), DeriveError> {
    match gram_determinant(kinematics, kinematics.coordinates.len(), effort) {
        Ok((value, _)) if is_zero(value, effort).is_proved() => Err(dependent(kinematics, effort)?),
        Ok(_) => Ok(()),
        Err(MatrixError::TooLarge(limit)) if limit != Limit::Stopped => Ok(()),
        Err(error) => Err(error.into()),
    }
}

/// The error that names the first coordinate which moves nothing in a way of its own.
fn dependent(kinematics: &Kinematics, effort: &Effort) -> Result<DeriveError, MatrixError> {
    let (mut first, coordinates) = (0, kinematics.coordinates.len());
    // All of them are known to be dependent, so the last is asked no more.
    while first + 1 < coordinates {
        let (value, _) = gram_determinant(kinematics, first + 1, effort)?;
        if is_zero(value, effort).is_proved() {
            break;
        }
        first += 1;
    }
    Ok(DeriveError::DependentCoordinates {
        coordinate: kinematics.coordinates[first].name(),
        coordinates,
    })
}
