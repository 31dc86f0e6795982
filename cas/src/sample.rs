//! Points at which expressions have values: exact witnesses, and intervals where exact values do not reach.
//!
//! This is the only module with floating-point numbers. They never enter an expression, and nothing
//! is proved equal by them; two intervals that do not overlap do prove that two values differ.

mod interval;
mod real;
mod witness;

pub use interval::Interval;
pub use real::{Dual, Real, evaluated};
pub(crate) use witness::{ByIntervals, by_intervals, exact_witness};
