//! Analytical mechanics for notebook cells.
#![forbid(unsafe_code)]

pub mod derive;
pub mod model;
pub mod prelude;
pub mod quantity;
pub mod record;
pub mod reference;
pub mod sheet;
pub mod show;
pub mod stop;
