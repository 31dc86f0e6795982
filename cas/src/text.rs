//! Expressions as text: plain notation and LaTeX, written and read.
//!
//! Writing never recurses on the depth of an expression: a stack of pieces that are still to be
//! written takes its place.

mod arrangement;
mod fault;
mod latex;
mod latex_around;
mod latex_command;
mod latex_equations;
#[cfg(test)]
mod latex_examples;
mod latex_factor;
mod latex_function;
mod latex_layout;
mod latex_lexer;
mod latex_named;
mod latex_names;
mod latex_product;
mod latex_rate;
mod latex_read;
#[cfg(test)]
mod latex_refusals;
#[cfg(test)]
mod latex_round_trip;
mod latex_token;
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
pub use fault::{ReadError, ReadFault};
pub use latex::{latex, latex_name};
pub use latex_equations::{LatexLine, read_latex_equations};
pub use latex_read::read_latex;
pub use lines::{latex_equation, latex_lines, plain_equation};
pub use plain::plain;
pub use read::read;
pub use scope::Scope;
