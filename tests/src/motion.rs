//! Printed statements brought to the form `mass matrix times accelerations plus bias = 0`.
//!
//! Only derivatives are taken here, with the operator of Lagrange's equations of the second kind as it
//! is printed everywhere; nothing of the derivation that is under test is used.

use anyhow::{Context, Result};
use cas::calculus::{Rates, derivative, total_derivative};
use cas::{Expr, Substitution, Symbol};
use worksheets::model::Model;
use worksheets::reference::DerivedMotion;

use crate::published::Printed;

/// The rates of time, of the coordinates and of their velocities.
#[must_use]
pub fn rates(model: &Model) -> Rates {
    Rates::primed(&model.coordinates(), 2).with(model.time(), 1)
}

/// The accelerations of the coordinates.
#[must_use]
pub fn accelerations(model: &Model) -> Vec<Symbol> {
    let coordinates = model.coordinates().into_iter();
    coordinates.map(|coordinate| coordinate.with_primes(2)).collect()
}

/// The left sides of the equations of motion that a statement stands for, one for each coordinate.
///
/// # Errors
/// An expression that cannot be differentiated.
pub fn equations(printed: &Printed, model: &Model) -> Result<Vec<Expr>> {
    match printed {
        Printed::Equations(equations) => Ok(equations.clone()),
        Printed::Accelerations(values) => Ok(accelerations(model)
            .into_iter()
            .zip(values)
            .map(|(acceleration, value)| Expr::from(acceleration) - *value)
            .collect()),
        Printed::Lagrangian(lagrangian) => model
            .coordinates()
            .into_iter()
            .map(|coordinate| {
                let momentum = derivative(*lagrangian, Expr::from(coordinate.primed()))?;
                let changes = total_derivative(momentum, &rates(model))?;
                Ok(changes - derivative(*lagrangian, Expr::from(coordinate))?)
            })
            .collect(),
    }
}

/// The coefficients of the accelerations, and the rest, of equations that are linear in them.
///
/// # Errors
/// An expression that cannot be differentiated.
pub fn linear_in_accelerations(equations: &[Expr], model: &Model) -> Result<DerivedMotion> {
    let accelerations = accelerations(model);
    let at_rest = Substitution::new(
        accelerations
            .iter()
            .map(|symbol| (Expr::from(*symbol), Expr::from(0))),
    );
    let mut mass_matrix = Vec::new();
    for equation in equations {
        let row = accelerations
            .iter()
            .map(|symbol| derivative(*equation, Expr::from(*symbol)).context("a coefficient"))
            .collect::<Result<_>>()?;
        mass_matrix.push(row);
    }
    let bias = equations
        .iter()
        .map(|equation| equation.substituted(&at_rest))
        .collect();
    Ok(DerivedMotion { mass_matrix, bias })
}

/// The same motion with the sign of the last term of its first equation turned, as happens on paper.
#[must_use]
pub fn with_a_planted_error(motion: &DerivedMotion) -> DerivedMotion {
    let mut wrong = motion.clone();
    if let Some(first) = wrong.bias.first_mut() {
        let last = first.terms().last().copied().unwrap_or(*first);
        *first -= 2 * last;
    }
    wrong
}
