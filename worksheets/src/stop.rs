//! Stopping a cell with a message written for the person at the worksheet.
//!
//! A cell has no way to return an error that keeps its statements free of `?`, so the sheet ends
//! the cell by a panic whose text is the message and, on a line of its own, what to do. The kernel
//! shows that text alone; the variables of earlier cells survive.

use std::fmt::Display;

/// Ends the running cell with a message and what to do about it.
///
/// # Panics
/// Always: that is how a cell is stopped.
pub fn cell(message: impl Display, hint: impl Display) -> ! {
    panic!("{message}\nwhat to do: {hint}")
}

/// An error with advice, which can stop a cell.
pub trait Advised: Display {
    /// What to do next.
    fn advice(&self) -> String;
}

/// Implements [`Advised`] for errors that have a `hint` of their own.
macro_rules! advised {
    ($($error:ty),* $(,)?) => {
        $(impl Advised for $error {
            fn advice(&self) -> String {
                self.hint().into()
            }
        })*
    };
}

advised!(
    crate::derive::DeriveError,
    crate::model::ModelError,
    crate::quantity::UnitError,
    crate::record::RecordError,
    crate::reference::ReferenceError,
    cas::NumberError,
    cas::NameError,
    cas::Limit,
    cas::calculus::CalculusError,
);

/// The value, or the end of the cell.
///
/// # Panics
/// On an error, to stop the cell.
pub fn unless<T, E: Advised>(result: Result<T, E>) -> T {
    result.unwrap_or_else(|error| cell(&error, error.advice()))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::model::ModelError;

    #[test]
    fn the_message_and_the_advice_are_the_payload() {
        let stopped = std::panic::catch_unwind(|| unless::<(), _>(Err(ModelError::EmptyTitle)));
        let payload = stopped.expect_err("an error stops the cell");
        let text = payload.downcast_ref::<String>().expect("a text");
        assert_eq!(
            text,
            "the title of the sheet is empty\nwhat to do: say what the sheet models: Sheet::titled(\"Portal crane\")"
        );
    }
}
