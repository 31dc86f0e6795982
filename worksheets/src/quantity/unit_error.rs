//! Why a text is no unit, and what to write instead.

/// Why a text is not the UCUM code of a mechanical unit.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum UnitError {
    /// Nothing was given.
    #[error("a unit is empty")]
    Empty,
    /// The text is longer than a unit may be.
    #[error("a unit of {length} characters was given, at most {limit} are read")]
    TooLong {
        /// Number of characters.
        length: usize,
        /// The limit.
        limit: usize,
    },
    /// Parentheses are nested too deeply.
    #[error("a unit has more than {limit} parentheses inside one another")]
    TooDeep {
        /// The limit.
        limit: usize,
    },
    /// The text means a unit, but UCUM spells it otherwise.
    #[error("`{code}` is no unit in the codes of UCUM")]
    Spelling {
        /// The text as given.
        code: String,
        /// The code that UCUM has for it.
        suggestion: String,
    },
    /// A part of the text is no unit.
    #[error("{} is not a known unit", place_of(part, code))]
    Unknown {
        /// The text as given.
        code: String,
        /// The part that is not known.
        part: String,
        /// The known code nearest to it.
        suggestion: Option<String>,
    },
    /// A unit of electricity, heat, light or chemistry.
    #[error("`{code}` is no unit of mechanics: `{part}` is not made up of mass, length and time")]
    OutsideMechanics {
        /// The text as given.
        code: String,
        /// The part that is of another trade.
        part: String,
    },
    /// A character stands where none like it may stand.
    #[error("`{code}` is no unit: the character `{character}` at place {place} does not belong there")]
    Unexpected {
        /// The text as given.
        code: String,
        /// The character.
        character: char,
        /// Its place, counted from one.
        place: usize,
    },
    /// The text ends where a unit or a closing bracket is expected.
    #[error("`{code}` is no unit: it ends too early")]
    Incomplete {
        /// The text as given.
        code: String,
    },
    /// A number in the text is zero or too large.
    #[error("`{code}` is no unit: the number {digits} is zero or too large")]
    Number {
        /// The text as given.
        code: String,
        /// The digits.
        digits: String,
    },
    /// An exponent is too large.
    #[error("`{code}` is no unit: the exponent {digits} is above {limit}")]
    Exponent {
        /// The text as given.
        code: String,
        /// The digits.
        digits: String,
        /// The limit.
        limit: i64,
    },
}

/// The part, and the text that it stands in where that is more.
fn place_of(part: &str, code: &str) -> String {
    if part == code {
        format!("`{part}`")
    } else {
        format!("`{part}` in `{code}`")
    }
}

impl UnitError {
    /// What to write instead.
    #[must_use]
    pub fn hint(&self) -> String {
        const FORM: &str = "write UCUM codes joined by `.` and `/`, with exponents behind: \"kg\", \"m/s2\", \"N.m\", \"rad\"";
        match self {
            Self::Empty => format!("{FORM}; a number has the unit \"1\""),
            Self::Spelling { suggestion, .. }
            | Self::Unknown {
                suggestion: Some(suggestion),
                ..
            } => format!("write \"{suggestion}\""),
            Self::OutsideMechanics { .. } => {
                "state the mechanical quantity that it acts by, such as a force in \"N\" or a torque in \"N.m\""
                    .to_owned()
            }
            Self::TooLong { .. } | Self::TooDeep { .. } => "shorten the unit".to_owned(),
            Self::Exponent { .. } | Self::Number { .. } => "write a smaller number, and no zero".to_owned(),
            Self::Unknown { .. } | Self::Unexpected { .. } | Self::Incomplete { .. } => FORM.to_owned(),
        }
    }
}
