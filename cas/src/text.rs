//! Expressions as text: plain notation and LaTeX.
//!
//! Writing never recurses on the depth of an expression: a stack of pieces that are still to be
//! written takes its place.

mod arrangement;
mod latex;
mod lines;
mod order;
mod pieces;
mod plain;
mod read;
mod scope;
#[cfg(test)]
mod tests;
mod width;

pub use arrangement::Arrangement;
pub use latex::{latex, latex_name};
pub use lines::{latex_equation, latex_lines, plain_equation};
pub use plain::plain;
pub use read::{ReadError, ReadFault, read};
pub use scope::Scope;
