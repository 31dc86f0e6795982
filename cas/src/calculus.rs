//! Derivatives of expressions: partial, total along given rates, Jacobian matrices, Taylor polynomials.
//!
//! Every function here differentiates a shared graph once, parts before wholes, so the cost is that
//! of the graph and not of the formula written out; nothing recurses on depth.
//!
//! What a derivative promises: wherever the expression has a value in a neighbourhood, the result is
//! the derivative there. The condition of a part that does not depend on the variable falls away with
//! that part, as on paper: the derivative of `x + 1/a` by `x` is one. An expression with a part that
//! has no value anywhere, such as `1/0`, has no derivative and is refused.

mod rates;
mod rules;
mod taylor;

pub use rates::Rates;
pub use taylor::taylor;

use rules::differentiated;

use crate::effort::Limit;
use crate::expr::{Expr, IntoExpr, Name, Symbol};
use crate::matrix::Matrix;

/// Why an expression could not be differentiated.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum CalculusError {
    /// The variable is no symbol.
    #[error("a derivative is taken by a symbol, not by `{by:?}`")]
    NotASymbol {
        /// What was given instead.
        by: Expr,
    },
    /// A part of the expression has no real value anywhere.
    #[error("`{part:?}` has no value, so there is no derivative")]
    Undefined {
        /// The smallest such part.
        part: Expr,
    },
    /// A primed symbol has no rate although others of its name have one.
    #[error("the rate of `{symbol}` is not given, but those of others of that name are")]
    MissingRate {
        /// The symbol without rate.
        symbol: Symbol,
    },
    /// An undetermined function was differentiated more often than can be counted.
    #[error("the function `{function}` is differentiated more than {} times", u32::MAX)]
    Order {
        /// The function's name.
        function: Name,
    },
    /// The computation grew beyond what was allowed.
    #[error(transparent)]
    TooLarge(#[from] Limit),
}

impl CalculusError {
    /// What to do instead.
    #[must_use]
    pub fn hint(&self) -> &'static str {
        match self {
            Self::NotASymbol { .. } => {
                "put a symbol in place of the expression, differentiate by it, and substitute back"
            }
            Self::Undefined { .. } => {
                "look for a division by zero, a root of a negative number or a logarithm of zero"
            }
            Self::MissingRate { .. } => "add the rate of this symbol to the table of rates",
            Self::Order { .. } => "lower the order of the derivative",
            Self::TooLarge(limit) => limit.hint(),
        }
    }
}

/// The partial derivative of `expr` by a symbol; every other symbol is held fixed.
///
/// Undetermined functions follow the chain rule: `U(x, y)` gives its partial derivatives by each
/// argument times the derivative of that argument.
///
/// # Errors
/// [`CalculusError::NotASymbol`], [`CalculusError::Undefined`], [`CalculusError::Order`].
///
/// # Example
/// ```
/// use cas::{Expr, calculus::derivative, cos, sin};
/// let (x, y) = (Expr::symbol("x")?, Expr::symbol("y")?);
/// assert_eq!(derivative(y * sin(x.squared()), x)?, 2 * x * y * cos(x.squared()));
/// assert!(derivative(x * y, x + y).is_err());
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn derivative(expr: Expr, by: impl IntoExpr) -> Result<Expr, CalculusError> {
    let by = by.into_expr();
    let by = by.as_symbol().ok_or(CalculusError::NotASymbol { by })?;
    Ok(partial_derivatives(&[expr], by)?.remove(0))
}

/// The derivative of `expr` along given rates: the sum over all symbols of the partial derivative by
/// the symbol times its rate.
///
/// A symbol without rate is a constant.
///
/// # Errors
/// [`CalculusError::MissingRate`] for a primed symbol beyond those in the table, so that `x''` is
/// never taken for a constant by oversight; [`CalculusError::Undefined`], [`CalculusError::Order`].
///
/// # Example
/// ```
/// use cas::{Expr, Symbol, calculus::{Rates, total_derivative}, cos, sin};
/// let (phi, t, w) = (Symbol::new("phi")?, Symbol::new("t")?, Expr::symbol("w")?);
/// let rates = Rates::primed(&[phi], 2).with(t, 1);
/// let rate = total_derivative(sin(phi) + w * Expr::from(t), &rates)?;
/// assert_eq!(rate, cos(phi) * Expr::from(phi.primed()) + w);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn total_derivative(expr: Expr, rates: &Rates) -> Result<Expr, CalculusError> {
    Ok(differentiated(&[expr], |symbol| rates.checked(symbol))?.remove(0))
}

/// The matrix of partial derivatives: one row for each expression, one column for each symbol.
///
/// # Shape
/// `expressions.len()` rows and `by.len()` columns; either may be zero.
///
/// # Errors
/// [`CalculusError::Undefined`], [`CalculusError::Order`].
///
/// # Example
/// ```
/// use cas::{Expr, Symbol, calculus::jacobian, cos, sin};
/// let (r, phi) = (Symbol::new("r")?, Symbol::new("phi")?);
/// let place = [Expr::from(r) * cos(phi), Expr::from(r) * sin(phi)];
/// let j = jacobian(&place, &[r, phi])?;
/// assert_eq!((j.rows(), j.columns()), (2, 2));
/// assert_eq!(j[(1, 1)], Expr::from(r) * cos(phi));
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn jacobian(expressions: &[Expr], by: &[Symbol]) -> Result<Matrix, CalculusError> {
    let columns = by
        .iter()
        .map(|symbol| partial_derivatives(expressions, *symbol))
        .collect::<Result<Vec<_>, _>>()?;
    Ok(Matrix::from_fn(expressions.len(), by.len(), |row, column| {
        columns[column][row]
    }))
}

fn partial_derivatives(expressions: &[Expr], by: Symbol) -> Result<Vec<Expr>, CalculusError> {
    differentiated(expressions, |symbol| {
        Ok(if symbol == by { Expr::one() } else { Expr::zero() })
    })
}

#[cfg(test)]
mod tests;
