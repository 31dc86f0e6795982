//! The numerical reference: Newton's equations with reactions, solved on dual numbers.
//!
//! It sees only the position maps, forces and reaction directions as stated. It differentiates
//! nothing by formula, knows no canonical form and no energy route, and holds none of the code that
//! derives equations; so an agreement means something.
//!
//! Numbers are rounded to what the tolerances support, so that a report does not depend on the machine.
//!
//! # Sources
//!
//! Quoted from memory, not looked up:
//!
//! - \[Giraud2005\] L. Giraud, J. Langou, M. Rozloznik, J. van den Eshof, "Rounding error analysis of the
//!   classical Gram-Schmidt orthogonalization process", Numerische Mathematik 101 (2005).
//! - \[Hairer1993\] E. Hairer, S. P. Norsett, G. Wanner, "Solving Ordinary Differential Equations I",
//!   2nd edition, Springer, 1993.
//! - \[Steele2014\] G. L. Steele, D. Lea, C. H. Flood, "Fast splittable pseudorandom number generators",
//!   OOPSLA 2014.
//! - \[Whittaker1937\] E. T. Whittaker, "A Treatise on the Analytical Dynamics of Particles and Rigid
//!   Bodies", 4th edition, Cambridge University Press, 1937.

mod check;
mod derived;
mod draw;
mod error;
mod evaluation;
mod motion;
mod newton;
mod report;
mod run;
mod settings;
mod stand_in;
mod stated;
#[cfg(test)]
mod tests;

pub use check::Check;
pub use derived::DerivedMotion;
pub use error::ReferenceError;
pub use report::{Agreement, Curve, Deviation, MotionReport, Report, StandInRow, ValueRow};
pub use settings::Given;

use cas::{Effort, Expr, IntoExpr};

use crate::model::Model;

/// A run that is being set up: what it compares, and values for what the model leaves open.
///
/// Everything that is not set is drawn by a fixed rule from the content of the model, and the report
/// says what was drawn.
#[derive(Clone, Debug)]
pub struct Reference {
    model: Model,
    derived: DerivedMotion,
    settings: settings::Settings,
}

impl Reference {
    /// A run of these derived equations of a model, with nothing set yet.
    #[must_use]
    pub fn new(model: &Model, derived: DerivedMotion) -> Self {
        Self {
            model: model.clone(),
            derived,
            settings: settings::Settings::default(),
        }
    }

    /// Sets a constant to a number in its declared unit.
    ///
    /// # Errors
    /// Something that is no constant of the sheet, a value that is no number, a positive constant
    /// that would not be.
    pub fn set(&mut self, constant: Expr, value: impl Into<Given>) -> Result<(), ReferenceError> {
        self.settings.set(&self.model, constant, value.into())
    }

    /// Sets where a coordinate starts, in its declared unit, or its rate, in that unit per second.
    ///
    /// # Errors
    /// Something that is no coordinate of the sheet, a value that is no number.
    pub fn start(&mut self, coordinate: Expr, value: impl Into<Given>) -> Result<(), ReferenceError> {
        self.settings.start(&self.model, coordinate, value.into())
    }

    /// Lets an expression stand for a prescribed input or undetermined function.
    ///
    /// # Errors
    /// Something that is no function of the sheet, an expression that depends on more than the
    /// function's arguments.
    pub fn with(&mut self, function: Expr, expression: impl IntoExpr) -> Result<(), ReferenceError> {
        self.settings
            .stand_in(&self.model, function, expression.into_expr())
    }

    /// Sets how long the motion is followed, for example `"20 s"`.
    ///
    /// # Errors
    /// A text that is no number of seconds above zero and up to a million.
    pub fn duration(&mut self, duration: &str) -> Result<(), ReferenceError> {
        self.settings.duration(duration)
    }

    /// Runs the comparison.
    ///
    /// # Errors
    /// Something without value, no admissible state, a start that is singular, a stop on request.
    pub fn report(&self, effort: &Effort) -> Result<Report, ReferenceError> {
        run::run(&self.model, &self.derived, &self.settings, effort)
    }
}
