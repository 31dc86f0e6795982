//! The tokens of LaTeX formulas, with the places where they stand.

use super::fault::ReadFault;
use super::latex_command::Called;

/// What a token is.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) enum Mark {
    /// A letter in italics.
    Letter(char),
    /// A digit.
    Digit(char),
    /// A full stop: the decimal point, or the end of a sentence.
    Point,
    /// A comma or semicolon.
    Comma,
    /// A Greek letter by its name.
    Greek(&'static str),
    /// A word in upright letters.
    Word(String),
    /// The number pi.
    Pi,
    /// A function with a command of its own.
    Function(Called),
    /// A fraction bar.
    Fraction,
    /// The sign of a root.
    Root,
    /// Dots over what follows.
    Dots(u8),
    /// The sign of partial derivatives.
    Partial,
    /// A prime.
    Prime,
    /// An opening bracket.
    Open(char),
    /// A closing bracket.
    Close(char),
    /// An opening brace, which is not printed.
    OpenGroup,
    /// A closing brace, which is not printed.
    CloseGroup,
    /// What follows is an index.
    Below,
    /// What follows is a power.
    Above,
    Plus,
    Minus,
    Times,
    Slash,
    Equals,
    /// A vertical line.
    Bar,
    /// The sign at which columns are aligned.
    Column,
    /// The end of a line.
    Break,
    /// The beginning of a formula or environment, with the text that ends it.
    Begin(String),
    /// The end of a formula or environment.
    End(String),
}

/// A token and where it stands.
#[derive(Clone, Debug)]
pub(super) struct Token {
    pub(super) mark: Mark,
    /// Its first character, counted from one.
    pub(super) place: usize,
    /// How many characters it has.
    pub(super) length: usize,
    /// Whether white space or a spacing command stands before it.
    pub(super) spaced: bool,
    /// Whether a spacing command stands before it.
    pub(super) apart: bool,
    /// Whether a wide space stands before it, as between formulas.
    pub(super) far: bool,
    /// For a brace, the index of its partner.
    pub(super) partner: usize,
}

/// A fault and the place where it is.
pub(super) type Placed = (ReadFault, usize);
