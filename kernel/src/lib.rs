//! The Gudgeon kernel: worksheets executed on an embedded evcxr, and the command line around it.
//!
//! | room | holds |
//! |---|---|
//! | [`command`] | one file for each command of `gudgeon` |
//! | [`notebook`] | `.ipynb` in and out, byte for byte stable |
//! | [`session`] | cells evaluated by evcxr, and how each one ended |
//! | [`library`] | the helper library that cells use, built once and kept ready |
//! | [`kernelspec`] | how Jupyter finds the kernel and typesets its formulas |
//! | [`facts`] | what the records in a worksheet say |

pub mod command;
pub mod error;
pub mod facts;
pub mod kernelspec;
pub mod library;
pub mod notebook;
pub mod progress;
pub mod session;

pub use error::Error;
