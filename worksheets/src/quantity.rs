//! Quantities: units in UCUM codes, dimensions, and the dimension check of any expression.
//!
//! Angles are dimensionless, as in ISO 80000-3, so `rad` and `1` have one dimension.

mod check;
mod dimension;
mod nearest;
mod symbols;
mod unit;
mod unit_error;

pub use check::{DimensionError, Measured, dimension_of};
pub use dimension::Dimension;
pub(crate) use nearest::nearest_of;
pub use unit::Unit;
pub use unit_error::UnitError;
