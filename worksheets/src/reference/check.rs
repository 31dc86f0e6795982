//! The numerical reference as cells see it: plain values, and a clear message that stops the cell.

use cas::{Effort, Expr, IntoExpr};

use super::{Given, Reference, Report};
use crate::record::Record;
use crate::show::{Bundle, Bundled};
use crate::stop::unless;

/// A run of the numerical reference that a cell sets up, runs and shows.
///
/// # Panics
/// Every method stops the cell where the method of [`Reference`] of the same name returns an error.
#[derive(Clone, Debug)]
pub struct Check {
    reference: Reference,
    report: Option<Report>,
}

#[allow(
    clippy::missing_panics_doc,
    reason = "every method stops the cell on an error, which the type says once"
)]
impl Check {
    /// A run with nothing set yet.
    #[must_use]
    pub fn new(reference: Reference) -> Self {
        Self {
            reference,
            report: None,
        }
    }

    /// See [`Reference::set`].
    pub fn set(&mut self, constant: Expr, value: impl Into<Given>) {
        self.report = None;
        unless(self.reference.set(constant, value));
    }

    /// See [`Reference::start`].
    pub fn start(&mut self, coordinate: Expr, value: impl Into<Given>) {
        self.report = None;
        unless(self.reference.start(coordinate, value));
    }

    /// See [`Reference::with`].
    pub fn with(&mut self, function: Expr, expression: impl IntoExpr) {
        self.report = None;
        unless(self.reference.with(function, expression));
    }

    /// Follows the motion for this long, for example `"20 s"`, and keeps the result.
    pub fn run(&mut self, duration: &str) {
        unless(self.reference.duration(duration));
        self.report = Some(self.report());
    }

    /// The result; runs with what is set so far where it was not run yet.
    #[must_use]
    pub fn report(&self) -> Report {
        match &self.report {
            Some(report) => report.clone(),
            None => unless(self.reference.report(&Effort::default())),
        }
    }
}

impl Bundled for Check {
    fn bundle(&self) -> Bundle {
        Bundle::of_record(&Record::of_reference(&self.reference.model, &self.report()))
    }
}
