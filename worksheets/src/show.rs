//! Showing: pages of formulas, tables and steps as HTML, LaTeX and plain text; the only code that prints.
//!
//! Everything goes through a [`Page`](page::Page): what is shown is put together once, as raw text
//! and formulas, and each writer escapes for its own format.

mod bundle;
mod cells;
#[cfg(test)]
mod derivation_tests;
mod display;
mod escape;
mod formal;
mod formula;
mod html;
mod latex;
mod of_derivation;
mod of_model;
mod of_report;
mod of_step;
pub mod page;
mod plain;
mod plot;
mod statement;
mod typeset;

pub use bundle::{Bundle, RECORD_TYPE};
pub use display::{Bundled, ShowsItself, print};
pub use of_derivation::{derivation, record};
pub use of_model::{assumptions_page, model, quantities_page};
pub use of_report::report;
