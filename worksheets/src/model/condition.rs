//! Side conditions that a model states about its quantities.

use cas::Expr;

/// Something that must hold for a statement to be valid.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
#[non_exhaustive]
pub enum Condition {
    /// The expression is not zero.
    NotZero(Expr),
    /// The expression is zero or above.
    NotNegative(Expr),
    /// The expression is above zero.
    Positive(Expr),
}

impl Condition {
    /// What is left of the condition where the sign does not matter.
    pub(super) fn without_sign(self) -> Self {
        match self {
            Self::Positive(expr) => Self::NotZero(expr),
            other => other,
        }
    }
}
