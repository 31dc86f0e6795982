//! The ladder of verdicts: whether two expressions are equal, proved, refuted or left open.

mod condition;
mod verdict;

pub use condition::Condition;
pub use verdict::{Evidence, Method, Proof, Reason, Value, Verdict, Witness};

use crate::effort::Effort;
use crate::expr::Expr;

/// Whether two expressions are equal.
pub fn compare(left: Expr, right: Expr, _effort: &Effort) -> Verdict {
    if left == right {
        return Verdict::Proved(Proof {
            method: Method::Structure,
            conditions: Vec::new(),
        });
    }
    Verdict::Undecided(Reason::NoPoint)
}

/// Whether an expression is zero.
pub fn is_zero(expr: Expr, effort: &Effort) -> Verdict {
    compare(expr, Expr::zero(), effort)
}
