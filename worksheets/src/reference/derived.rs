//! The derived equations of motion as numbers: what the reference judges.

use std::collections::BTreeMap;

use cas::{Expr, Symbol};
use nalgebra::{DMatrix, DVector};

use super::ReferenceError;
use super::evaluation::Evaluation;
use super::newton::State;
use super::stand_in::StandIns;
use crate::model::Model;

/// Derived equations of motion in the form `mass_matrix q'' + bias = 0`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct DerivedMotion {
    /// The rows of the mass matrix.
    pub mass_matrix: Vec<Vec<Expr>>,
    /// Everything else, brought to the same side.
    pub bias: Vec<Expr>,
}

/// The derived equations ready for numbers.
pub(super) struct DerivedNumbers {
    entries: Evaluation,
    coordinates: usize,
    reactions: usize,
}

impl DerivedMotion {
    /// Prepares the equations; reactions that are left in them are taken from the reference.
    pub(super) fn prepared(
        &self,
        model: &Model,
        constants: &BTreeMap<Symbol, f64>,
        stand_ins: &StandIns,
    ) -> Result<DerivedNumbers, ReferenceError> {
        let coordinates = model.coordinates();
        let n = coordinates.len();
        if self.mass_matrix.len() != n
            || self.bias.len() != n
            || self.mass_matrix.iter().any(|row| row.len() != n)
        {
            return Err(ReferenceError::Shape {
                given: self.bias.len(),
                coordinates: n,
            });
        }
        let mut variables = coordinates.clone();
        variables.extend(coordinates.iter().map(|symbol| symbol.primed()));
        variables.push(model.time());
        variables.extend(model.reactions().iter().map(|reaction| reaction.magnitude()));
        let entries: Vec<Expr> = self
            .mass_matrix
            .iter()
            .flatten()
            .chain(&self.bias)
            .map(|entry| stand_ins.resolved(*entry))
            .collect::<Result<_, _>>()?;
        Ok(DerivedNumbers {
            entries: Evaluation::new(&entries, &variables, constants)?,
            coordinates: n,
            reactions: model.reactions().len(),
        })
    }
}

impl DerivedNumbers {
    /// The accelerations of the coordinates; `None` where the mass matrix is singular or a value is
    /// no number.
    pub(super) fn accelerations(&self, state: &State<'_>, reactions: &[Option<f64>]) -> Option<Vec<f64>> {
        let mut numbers = state.numbers();
        // A reaction that cannot be told is no number, and spoils only equations that hold it.
        numbers.extend(reactions.iter().map(|magnitude| magnitude.unwrap_or(f64::NAN)));
        debug_assert_eq!(reactions.len(), self.reactions);
        let (n, values) = (self.coordinates, self.entries.at::<f64>(&numbers));
        let mass_matrix = DMatrix::from_fn(n, n, |row, column| values[row * n + column]);
        let right = DVector::from_fn(n, |row, _| -values[n * n + row]);
        let solution = mass_matrix.lu().solve(&right)?;
        solution
            .iter()
            .all(|value| value.is_finite())
            .then(|| solution.iter().copied().collect())
    }
}
