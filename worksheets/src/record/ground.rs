//! What a step rests on: other steps, what was stated on the sheet, assumptions.

use std::fmt;

use serde::de::Error;
use serde::{Deserialize, Deserializer, Serialize, Serializer};

/// Something that a step uses.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Ground {
    /// Another step, by its key.
    Step(String),
    /// Something stated on the sheet, by its name: a particle, a force, a reaction, a quantity.
    Stated(String),
    /// An assumption, by its number in the register.
    Assumption(usize),
}

impl Ground {
    /// The step of this key.
    pub fn step(key: impl Into<String>) -> Self {
        Self::Step(key.into())
    }

    /// What was stated under this name.
    pub fn stated(name: impl ToString) -> Self {
        Self::Stated(name.to_string())
    }

    /// The ground that [`Display`](fmt::Display) wrote.
    #[must_use]
    pub fn read(text: &str) -> Option<Self> {
        match text.split_once(' ')? {
            ("step", key) => Some(Self::step(key)),
            ("statement", name) => Some(Self::stated(name)),
            ("assumption", number) => number.parse().ok().map(Self::Assumption),
            _ => None,
        }
    }
}

impl fmt::Display for Ground {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Step(key) => write!(f, "step {key}"),
            Self::Stated(name) => write!(f, "statement {name}"),
            Self::Assumption(number) => write!(f, "assumption {number}"),
        }
    }
}

impl Serialize for Ground {
    fn serialize<S: Serializer>(&self, to: S) -> Result<S::Ok, S::Error> {
        to.collect_str(self)
    }
}

impl<'de> Deserialize<'de> for Ground {
    fn deserialize<D: Deserializer<'de>>(from: D) -> Result<Self, D::Error> {
        let text = String::deserialize(from)?;
        Self::read(&text).ok_or_else(|| {
            D::Error::custom(format!(
                "`{text}` is no ground; write `step KEY`, `statement NAME` or `assumption NUMBER`"
            ))
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn grounds_are_read_as_written() {
        for ground in [
            Ground::step("equations.phi"),
            Ground::stated("rope"),
            Ground::Assumption(3),
        ] {
            assert_eq!(Ground::read(&ground.to_string()), Some(ground));
        }
        assert_eq!(Ground::read("assumption x"), None);
        assert_eq!(Ground::read("hearsay rope"), None);
    }
}
