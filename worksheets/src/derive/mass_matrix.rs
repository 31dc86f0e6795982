//! Mass matrix and bias: the equations of motion as linear equations for the accelerations.

use cas::calculus::derivative;
use cas::matrix::Matrix;
use cas::present::collected;
use cas::{Effort, Expr, Substitution};

use super::equations::Motion;
use super::jacobian::{Exception, gram_determinant, unless};
use super::kinematics::Kinematics;
use super::stage::Stage;
use super::vanishing::factors_that_may_vanish;
use super::{DeriveError, Derived};
use crate::model::{Condition, Model};
use crate::record::{Formal, Ground, Rule, Shown, Side, Statement, given, is_implied};

/// `M q'' + h = 0`.
#[derive(Clone, Debug)]
pub(super) struct LinearForm {
    pub(super) mass_matrix: Vec<Vec<Expr>>,
    pub(super) bias: Vec<Expr>,
}

/// Coefficients of the accelerations, and the rest.
pub(super) fn linear_form(
    kinematics: &Kinematics,
    equations: &[Expr],
    effort: &Effort,
) -> Result<LinearForm, DeriveError> {
    let accelerations = || {
        kinematics
            .coordinates
            .iter()
            .map(|q| Expr::from(q.with_primes(2)))
    };
    let at_rest = Substitution::new(accelerations().map(|acceleration| (acceleration, Expr::zero())));
    let velocities: Vec<_> = kinematics.coordinates.iter().map(|q| q.primed()).collect();
    let mut mass_matrix = Vec::new();
    for equation in equations {
        let row = accelerations().map(|acceleration| {
            let entry = derivative(*equation, acceleration)?;
            Ok(collected(entry, &[], effort))
        });
        mass_matrix.push(row.collect::<Result<_, DeriveError>>()?);
    }
    let bias = equations
        .iter()
        .map(|equation| collected(equation.substituted(&at_rest), &velocities, effort));
    Ok(LinearForm {
        mass_matrix,
        bias: bias.collect(),
    })
}

/// The mass matrix `M` and the bias `h` of `M q'' + h = 0`: that the equations are linear in the
/// accelerations, that `M` is symmetric, and where it can be inverted.
///
/// # Errors
/// As [`equations`](super::equations()), and a determinant beyond the work allowed.
pub fn mass_matrix(model: &Model, motion: &Motion, effort: &Effort) -> Result<Derived, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    let mut stage = Stage::titled(model, effort, "mass_matrix", "Mass matrix and bias");
    let LinearForm { mass_matrix, bias } = motion.linear();
    let names: Vec<_> = kinematics.coordinates.iter().map(|q| q.name()).collect();
    for (row, coordinate) in kinematics.coordinates.iter().enumerate() {
        let products = kinematics.coordinates.iter().zip(&mass_matrix[row]);
        let products = products.map(|(other, entry)| *entry * Expr::from(other.with_primes(2)));
        let name = Formal::EquationOfMotion {
            coordinate: names[row],
        };
        stage.equal(
            &format!("{coordinate}.linear"),
            Side::named(name, motion.equations()[row]),
            Side::of(Expr::sum_of(products.chain([bias[row]]))),
            Rule::CoefficientOfAcceleration,
            [Ground::step(format!("equations.{coordinate}"))],
        );
    }
    for row in 0..names.len() {
        for column in row + 1..names.len() {
            let entry = |row: usize, column: usize| {
                let name = Formal::MassMatrixEntry {
                    row: names[row],
                    column: names[column],
                };
                Side::named(name, mass_matrix[row][column])
            };
            stage.equal(
                &format!("{}.{}.symmetry", names[row], names[column]),
                entry(row, column),
                entry(column, row),
                Rule::SymmetryOfMassMatrix,
                [],
            );
        }
    }
    stage.derivation.headline.push(Shown::Matrix {
        label: Formal::MassMatrix,
        rows: mass_matrix.clone(),
    });
    stage.derivation.headline.push(Shown::Matrix {
        label: Formal::Bias { coordinate: None },
        rows: bias.iter().map(|entry| vec![*entry]).collect(),
    });
    let equation = Formal::sum([
        Formal::product([Formal::MassMatrix, Formal::Coordinates { primes: 2 }]),
        Formal::Bias { coordinate: None },
    ]);
    stage.show(Statement::law(
        Side::named(equation, Expr::zero()),
        Side::of(Expr::zero()),
    ));
    invertible(&mut stage, &kinematics, mass_matrix)?;
    Ok(Derived::new(model, stage.derivation))
}

/// Says where the accelerations are determined.
///
/// The mass matrix is `J^T m J` with the masses on a diagonal. Where all of them are above zero it is
/// positive definite exactly where the Jacobian has full rank, so that the places are told without masses.
fn invertible(stage: &mut Stage<'_>, kinematics: &Kinematics, rows: &[Vec<Expr>]) -> Result<(), DeriveError> {
    let matrix = Matrix::from_rows(rows.to_vec())?;
    let (determinant, _) = matrix.determinant(stage.effort)?;
    let shown = stage.collected(determinant, &[]);
    if shown.is_zero() {
        stage.note("det M = 0: the accelerations are not determined by these equations.");
        return Ok(());
    }
    let known = given(stage.model);
    let mut vanishing = factors_that_may_vanish(shown, &known, stage.effort);
    let mut masses = stage.model.particles().iter().map(|particle| particle.mass());
    if !vanishing.is_empty() && masses.all(|mass| is_implied(Condition::Positive(mass), &known)) {
        let (gram, _) = gram_determinant(kinematics, kinematics.coordinates.len(), stage.effort)?;
        vanishing = factors_that_may_vanish(stage.collected(gram, &[]), &known, stage.effort);
    }
    let text = format!("det M = {}", stage.plain(shown));
    let note = match unless(stage, &vanishing) {
        None => {
            format!("{text}, which is not zero at any state: the accelerations are determined everywhere.")
        }
        Some(Exception::At(places)) => {
            format!("{text}: the accelerations are determined except where {places}.")
        }
        Some(Exception::Unless(factors)) => {
            format!("{text}: the accelerations are determined wherever {factors}.")
        }
    };
    stage.note(note);
    Ok(())
}
