//! Why a record cannot be stored or read, with the place of what is wrong.

use super::store::FORMAT;

/// Why a record cannot be stored or read.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum RecordError {
    /// Something cannot be stored.
    #[error("`{path}` of the record cannot be written: {reason}")]
    NotWritten {
        /// The field.
        path: String,
        /// Why not.
        reason: String,
    },
    /// The text is longer than a record may be.
    #[error("the record has {bytes} bytes, at most {limit} are allowed")]
    TooLong {
        /// Its length.
        bytes: usize,
        /// The limit.
        limit: usize,
    },
    /// The text is no JSON.
    #[error("the record is no JSON at line {line}, column {column}: {reason}")]
    NotJson {
        /// The line, counted from one.
        line: usize,
        /// The column, counted from one.
        column: usize,
        /// What is wrong there.
        reason: String,
    },
    /// The record has another format.
    #[error("the record has the format {found}, this program reads format {FORMAT}")]
    Format {
        /// What stands in its place.
        found: String,
    },
    /// A field is missing, unknown or wrong.
    #[error("`{path}` of the record: {reason}")]
    Field {
        /// The field, such as `steps[3].statement.left.value`.
        path: String,
        /// What is wrong with it.
        reason: String,
    },
    /// Two steps have one key.
    #[error("`steps[{}]` and `steps[{}]` of the record both have the key `{key}`", places[0], places[1])]
    SameKey {
        /// The key.
        key: String,
        /// The places of the steps.
        places: [usize; 2],
    },
    /// A step rests on itself or on a later one.
    #[error("`{path}` of the record: the step rests on `{key}`, which does not stand before it")]
    Circle {
        /// The field.
        path: String,
        /// The key of the other step.
        key: String,
    },
    /// A step rests on an assumption that is not in the register.
    #[error("`{path}` of the record: there is no assumption {number}")]
    NoAssumption {
        /// The field.
        path: String,
        /// The number.
        number: usize,
    },
}

impl RecordError {
    /// How to go on.
    #[must_use]
    pub fn hint(&self) -> &'static str {
        match self {
            Self::NotWritten { .. } | Self::TooLong { .. } => {
                "name parts of the long expression and derive with the names"
            }
            Self::Format { .. } => "run the worksheet again, or read it with the program that wrote it",
            _ => "the record was changed after it was written; run the worksheet again",
        }
    }
}
