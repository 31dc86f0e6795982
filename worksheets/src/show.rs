//! Showing: pages of formulas, tables and steps as HTML, LaTeX and plain text; the only code that prints.
//!
//! Everything goes through a [`Page`](page::Page): what is shown is put together once, as raw text
//! and formulas, and each writer escapes for its own format.

mod bundle;
mod escape;
mod html;
mod latex;
pub mod page;
mod plain;
mod typeset;

pub use bundle::{Bundle, RECORD_TYPE};
