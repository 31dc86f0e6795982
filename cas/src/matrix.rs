//! Exact matrices of expressions: shape, products, and what can be said of their rank.

mod determinant;
mod shape;

pub use shape::{Matrix, MatrixError};
