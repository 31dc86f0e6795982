//! Analytical mechanics for notebook cells.
#![forbid(unsafe_code)]

pub mod model;
pub mod quantity;
