//! Exact algebra of rational functions and trigonometric polynomials, with honest verdicts.
//!
//! The crate knows no time and no physics, reads and writes nothing, and holds no floating-point
//! number outside one module.
#![forbid(unsafe_code)]

mod basis;
pub mod calculus;
mod canonical;
pub mod decide;
mod draw;
pub mod effort;
mod evaluate;
pub mod expr;
mod fingerprint;
pub mod form;
mod fraction;
pub mod matrix;
pub mod number;
pub mod present;
mod ring;
pub mod sample;
pub mod text;

pub use decide::{Condition, Verdict};
pub use effort::{Effort, Limit};
pub use expr::{
    Application, Expr, Function, IntoExpr, Kind, Name, NameError, Substitution, Symbol, cos, exact, exp, ln,
    pi, postorder, sin, sqrt, tan,
};
pub use number::{NumberError, Rational};
