//! Assumptions in words, numbered, and what hangs on them.

/// An entry of the assumption register.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Assumption {
    pub(super) number: usize,
    pub(super) text: String,
    pub(super) affects: Vec<String>,
    pub(super) origin: Origin,
}

/// Who made an assumption.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Origin {
    /// It was stated on the sheet.
    Stated,
    /// It follows from how the model is set up, and is entered so that it is never silent.
    Implied,
}

impl Assumption {
    /// The number in the register, counted from one.
    #[must_use]
    pub fn number(&self) -> usize {
        self.number
    }

    /// The assumption in words.
    #[must_use]
    pub fn text(&self) -> &str {
        &self.text
    }

    /// The names of particles, forces, reactions and quantities that it affects.
    #[must_use]
    pub fn affects(&self) -> &[String] {
        &self.affects
    }

    /// Who made it.
    #[must_use]
    pub fn origin(&self) -> Origin {
        self.origin
    }
}
