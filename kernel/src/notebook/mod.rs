//! Notebooks: read, filled with the outputs of a run, and written without touching anything else.
//!
//! Only `outputs` and `execution_count` of code cells change.
//! Unknown keys, the order of keys and the indentation stay as they were found.

mod document;
mod file;
mod output;

pub use document::Notebook;
pub use file::{Destination, absolute};
pub use output::{display, error, stream};
