//! Names and symbols: what an expression may call its variables.

use std::collections::BTreeSet;
use std::fmt;
use std::sync::Mutex;

/// A checked name, kept for ever so that it can be copied like a number.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Name(&'static str);

/// Why a text cannot name a symbol.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum NameError {
    /// The text is empty.
    #[error("a name is empty")]
    Empty,
    /// A character that no name may have.
    #[error("the name `{name}` has the character `{character}` at place {place}")]
    Character {
        /// The text as given.
        name: String,
        /// The first character that is refused.
        character: char,
        /// Its place, counted from one.
        place: usize,
    },
    /// The name means a function or a constant already.
    #[error("the name `{name}` means a function or a constant already")]
    Reserved {
        /// The text as given.
        name: String,
    },
    /// The text is longer than a name may be.
    #[error("a name of {length} characters was given, at most {limit} are allowed")]
    TooLong {
        /// Number of characters.
        length: usize,
        /// The limit.
        limit: usize,
    },
}

impl NameError {
    /// What to write instead.
    #[must_use]
    pub fn hint(&self) -> &'static str {
        match self {
            Self::Empty | Self::Character { .. } => {
                "begin with a letter and go on with letters, digits and `_`, for example `m_t` or `phi`"
            }
            Self::Reserved { .. } => "choose another name, for example with an index: `exp_1`",
            Self::TooLong { .. } => "shorten the name; the meaning belongs into the description",
        }
    }
}

/// Names that the notation itself uses.
const RESERVED: [&str; 20] = [
    "sin", "cos", "tan", "exp", "ln", "sqrt", "pi", "abs", "sign", "sinh", "cosh", "tanh", "asin", "acos",
    "atan", "asinh", "acosh", "atanh", "log", "cot",
];

const MOST_CHARACTERS: usize = 64;

impl Name {
    /// The name with this text.
    ///
    /// # Errors
    /// An empty text, a character that is neither letter, digit nor `_`, a first character that is
    /// no letter, a name that means a function or a constant, more than 64 characters.
    pub fn new(text: &str) -> Result<Self, NameError> {
        let length = text.chars().count();
        if length == 0 {
            return Err(NameError::Empty);
        }
        if length > MOST_CHARACTERS {
            return Err(NameError::TooLong {
                length,
                limit: MOST_CHARACTERS,
            });
        }
        for (place, character) in text.chars().enumerate() {
            let allowed =
                character.is_alphabetic() || (place > 0 && (character.is_numeric() || character == '_'));
            if !allowed {
                return Err(NameError::Character {
                    name: text.to_owned(),
                    character,
                    place: place + 1,
                });
            }
        }
        if RESERVED.contains(&text) {
            return Err(NameError::Reserved {
                name: text.to_owned(),
            });
        }
        Ok(Self(kept(text)))
    }

    /// The text of the name.
    #[must_use]
    pub fn as_str(self) -> &'static str {
        self.0
    }
}

/// One immortal copy of each text.
fn kept(text: &str) -> &'static str {
    static NAMES: Mutex<BTreeSet<&'static str>> = Mutex::new(BTreeSet::new());
    let mut names = NAMES.lock().unwrap_or_else(std::sync::PoisonError::into_inner);
    if let Some(known) = names.get(text) {
        return known;
    }
    let fresh: &'static str = Box::leak(text.into());
    names.insert(fresh);
    fresh
}

impl fmt::Display for Name {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.0)
    }
}

impl fmt::Debug for Name {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.0)
    }
}

/// A variable: a name with a number of primes.
///
/// The primes tell `x`, `x'` and `x''` apart. This crate knows no time; whoever uses the primes as
/// rates says so in a table of rates.
///
/// ```
/// use cas::Symbol;
/// let x = Symbol::new("x")?;
/// assert_eq!(x.primed().to_string(), "x'");
/// assert!(Symbol::new("2x").is_err());
/// # Ok::<(), cas::NameError>(())
/// ```
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Symbol {
    name: Name,
    primes: u8,
}

impl Symbol {
    /// The symbol of this name without primes.
    ///
    /// # Errors
    /// As [`Name::new`].
    pub fn new(name: &str) -> Result<Self, NameError> {
        Ok(Self::from(Name::new(name)?))
    }

    /// The name without primes.
    #[must_use]
    pub fn name(self) -> Name {
        self.name
    }

    /// The number of primes.
    #[must_use]
    pub fn primes(self) -> u8 {
        self.primes
    }

    /// The same name with one prime more.
    #[must_use]
    pub fn primed(self) -> Self {
        Self {
            name: self.name,
            primes: self.primes.saturating_add(1),
        }
    }

    /// The same name with this number of primes.
    #[must_use]
    pub fn with_primes(self, primes: u8) -> Self {
        Self {
            name: self.name,
            primes,
        }
    }
}

impl From<Name> for Symbol {
    fn from(name: Name) -> Self {
        Self { name, primes: 0 }
    }
}

impl fmt::Display for Symbol {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.name.0)?;
        (0..self.primes).try_for_each(|_| f.write_str("'"))
    }
}

impl fmt::Debug for Symbol {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{self}")
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_are_checked() {
        for good in ["x", "m_t", "phi1", "Ωmax", "x_"] {
            assert_eq!(
                Name::new(good).map(|n| n.as_str().to_owned()).as_deref(),
                Ok(good)
            );
        }
        assert_eq!(Name::new(""), Err(NameError::Empty));
        for bad in ["1x", "_x", "a b", "a$", "<b>", "x'", "a\\b"] {
            assert!(
                matches!(Name::new(bad), Err(NameError::Character { .. })),
                "{bad} was accepted"
            );
        }
        assert!(matches!(Name::new("sin"), Err(NameError::Reserved { .. })));
        assert!(matches!(
            Name::new(&"x".repeat(65)),
            Err(NameError::TooLong { .. })
        ));
    }

    #[test]
    fn one_copy_of_each_name() {
        let (a, b) = (Name::new("rope"), Name::new("rope"));
        assert!(std::ptr::eq(
            a.expect("valid").as_str(),
            b.expect("valid").as_str()
        ));
    }
}
