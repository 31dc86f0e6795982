//! Side conditions: what must hold for a statement to be valid.

use crate::expr::Expr;

/// Something that must hold for a statement to be valid.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Condition {
    /// The expression is not zero.
    NotZero(Expr),
    /// The expression is zero or above.
    NotNegative(Expr),
    /// The expression is above zero.
    Positive(Expr),
}

impl Condition {
    /// The expression that the condition is about.
    #[must_use]
    pub fn expr(self) -> Expr {
        match self {
            Self::NotZero(expr) | Self::NotNegative(expr) | Self::Positive(expr) => expr,
        }
    }

    /// What is left of the condition where the sign does not matter.
    #[must_use]
    pub fn without_sign(self) -> Self {
        match self {
            Self::Positive(expr) => Self::NotZero(expr),
            other => other,
        }
    }
}
