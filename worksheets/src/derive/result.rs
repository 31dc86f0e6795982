//! What a stage returns: its derivation with the model from which it was derived.

use cas::Expr;

use super::DeriveError;
use crate::model::Model;
use crate::record::Derivation;

/// A derivation and the model as it was stated then.
///
/// At the end of a cell it shows itself, with its record.
#[derive(Clone, Debug)]
pub struct Derived {
    pub(super) model: Model,
    pub(super) derivation: Derivation,
    pub(super) expression: Option<Expr>,
}

impl Derived {
    pub(super) fn new(model: &Model, derivation: Derivation) -> Self {
        Self {
            model: model.clone(),
            derivation,
            expression: None,
        }
    }

    pub(super) fn with_expression(mut self, expression: Expr) -> Self {
        self.expression = Some(expression);
        self
    }

    /// The model from which this was derived.
    #[must_use]
    pub fn model(&self) -> &Model {
        &self.model
    }

    /// The recorded steps.
    #[must_use]
    pub fn derivation(&self) -> &Derivation {
        &self.derivation
    }

    /// The expression that the stage found: the potential, the Lagrangian.
    ///
    /// # Panics
    /// Where the stage found none, to stop the cell.
    #[must_use]
    pub fn expression(&self) -> Expr {
        crate::stop::unless(self.expression.ok_or_else(|| DeriveError::NoExpression {
            title: self.derivation.title.clone(),
        }))
    }

    /// The right side of the step of this key, such as `velocities.trolley.x`.
    #[must_use]
    pub fn value(&self, key: &str) -> Option<Expr> {
        self.derivation.step(key).map(|step| step.statement.right.value)
    }
}
