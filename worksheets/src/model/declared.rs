//! Declared quantities: what every symbol of a sheet means.

use cas::{Expr, Name};

use crate::quantity::Unit;

/// A symbol or undetermined function with its unit, meaning and part in the model.
#[derive(Clone, Debug, PartialEq)]
pub struct Declared {
    pub(super) name: Name,
    pub(super) value: Expr,
    pub(super) unit: Unit,
    pub(super) meaning: String,
    pub(super) role: Role,
}

/// The part that a quantity plays in the model.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub enum Role {
    /// The time, declared on every sheet.
    Time,
    /// A constant of either sign.
    Constant,
    /// A constant above zero.
    PositiveConstant,
    /// A generalized coordinate: a function of time that the equations of motion determine.
    Coordinate,
    /// A prescribed function of time, such as a drive force or the angle of a driven table.
    Input,
    /// An undetermined function of coordinates, constants and time.
    Function,
    /// The magnitude of a reaction.
    Reaction,
}

impl Role {
    /// The words for time, by which a reserved name is told from a taken one.
    pub(super) const TIME_WORDS: &'static str = "time";

    /// The role in words.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::Time => Self::TIME_WORDS,
            Self::Constant => "constant",
            Self::PositiveConstant => "positive constant",
            Self::Coordinate => "coordinate",
            Self::Input => "prescribed input",
            Self::Function => "undetermined function",
            Self::Reaction => "reaction",
        }
    }
}

impl Declared {
    /// The name.
    #[must_use]
    pub fn name(&self) -> Name {
        self.name
    }

    /// What stands for the quantity in formulas: its symbol, or the function at its arguments.
    #[must_use]
    pub fn value(&self) -> Expr {
        self.value
    }

    /// The unit.
    #[must_use]
    pub fn unit(&self) -> &Unit {
        &self.unit
    }

    /// The meaning in words.
    #[must_use]
    pub fn meaning(&self) -> &str {
        &self.meaning
    }

    /// The part it plays in the model.
    #[must_use]
    pub fn role(&self) -> Role {
        self.role
    }
}
