//! Exact algebra of rational functions and trigonometric polynomials, with honest verdicts.
//!
//! The crate knows no time and no physics, reads and writes nothing, and holds no floating-point
//! number outside one module.
#![forbid(unsafe_code)]

pub mod calculus;
pub mod decide;
pub mod effort;
pub mod expr;
pub mod matrix;
pub mod number;
pub mod present;
pub mod text;

pub use decide::{Condition, Verdict};
pub use effort::{Effort, Limit};
pub use expr::{
    Application, Expr, Function, IntoExpr, Kind, Name, NameError, Substitution, Symbol, cos, exact, exp, ln,
    pi, postorder, sin, sqrt, tan,
};
pub use number::{NumberError, Rational};
