//! Expressions: small, immortal, immutable values that read in Rust as they do on paper.
//!
//! An [`Expr`] is a pointer to a node that is never freed, so it is `Copy` and a formula needs no
//! references: `m * l * cos(phi)`. Building never expands; it only flattens sums and products,
//! adds up numeric coefficients and merges powers where no condition is lost by it.
//!
//! Invariants:
//! - Nodes of one interning table are equal exactly when their pointers are. Two tables may exist
//!   (a separately compiled cell brings its own), so equality goes on to content where pointers differ.
//! - Order and hash come from content alone, never from addresses or the time of creation.
//! - Nothing here recurses on the depth of an expression.
//! - Undefined operations such as `x / 0` stay visible as nodes, see [`Expr::is_undefined`].
//!
//! Refused alternative: indexes into a global table, which silently name something else as soon as
//! a second copy of the table exists.

mod build;
mod node;
mod operators;
mod symbol;
mod walk;

pub use build::{cos, exp, ln, pi, sin, sqrt, tan};
pub use node::{Application, Expr, Function, Kind};
pub use operators::{IntoExpr, exact};
pub use symbol::{Name, NameError, Symbol};
pub(crate) use walk::postorder_within;
pub use walk::{Substitution, postorder};
