//! Canonical forms as the race asks for them: made once, differentiated, their terms counted.
//!
//! Here a form is the shared graph, and its terms are those of the printed form.

use anyhow::Result;
use cas::calculus::{Rates, derivative, total_derivative};
use cas::present::collected;
use cas::{Effort, Expr, Kind, Symbol};

/// What forms are made in.
pub(super) struct Forms<'a> {
    effort: &'a Effort,
}

/// An expression in canonical form.
pub(super) struct Form(Expr);

impl<'a> Forms<'a> {
    /// Forms in a basis in which these expressions are short.
    pub(super) fn new(_short: &[Expr], effort: &'a Effort) -> Result<Self> {
        Ok(Self { effort })
    }

    /// The form of an expression.
    pub(super) fn form(&self, expr: Expr) -> Result<Form> {
        Ok(Form(expr))
    }

    /// The difference of two forms.
    pub(super) fn difference(&self, left: &Form, right: &Form) -> Result<Form> {
        Ok(Form(left.0 - right.0))
    }

    /// The partial derivative by a symbol.
    pub(super) fn derivative(&self, form: &Form, by: Symbol) -> Result<Form> {
        Ok(Form(derivative(form.0, by)?))
    }

    /// The derivative along given rates.
    pub(super) fn total_derivative(&self, form: &Form, rates: &Rates) -> Result<Form> {
        Ok(Form(total_derivative(form.0, rates)?))
    }

    /// The number of terms.
    pub(super) fn terms(&self, form: &Form) -> u64 {
        let angles = |symbol: &Symbol| symbol.primes() == 0 && symbol.name().as_str().starts_with('q');
        let others: Vec<Symbol> = form
            .0
            .symbols()
            .into_iter()
            .filter(|symbol| !angles(symbol))
            .collect();
        monomials(collected(form.0, &others, self.effort))
    }
}

/// The number of terms once all products are multiplied out.
fn monomials(expr: Expr) -> u64 {
    match expr.kind() {
        Kind::Sum(terms) => terms.iter().map(|term| monomials(*term)).sum(),
        Kind::Product(factors) => factors.iter().map(|factor| monomials(*factor)).product(),
        _ => 1,
    }
}
