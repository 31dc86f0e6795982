//! The cases of the race: which mechanical system, and how large.

use std::fmt;
use std::str::FromStr;

use anyhow::{Context, Error, bail};

/// The most links of an arm: beyond six there are no axes and offsets to take.
const MOST_LINKS_OF_AN_ARM: usize = 6;

/// A family of mechanical systems of any size.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Family {
    /// A planar chain of point masses in angles from the vertical.
    AbsoluteChain,
    /// The same chain in angles from one link to the next.
    RelativeChain,
    /// A serial arm of rigid links with three parallel pairs of axes and four lengths.
    Arm,
    /// A serial arm with no two neighbouring axes parallel and every offset between joints nonzero.
    GeneralArm,
}

/// A system of a family: the family and the number of links.
///
/// It is written and read as the peers take it: `rel 10`.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Case {
    /// The family.
    pub family: Family,
    /// The number of links, which is that of the coordinates.
    pub links: usize,
}

impl Case {
    /// The cases of one race: the chains in growing sizes, then arms.
    #[must_use]
    pub fn all() -> Vec<Self> {
        let chains = [Family::AbsoluteChain, Family::RelativeChain]
            .into_iter()
            .flat_map(|family| [5, 10, 15, 20].map(|links| Self { family, links }));
        let arms = [(Family::Arm, 4), (Family::Arm, 6), (Family::GeneralArm, 6)]
            .map(|(family, links)| Self { family, links });
        chains.chain(arms).collect()
    }
}

impl Family {
    /// The axes of the joints, one letter each; empty for a chain.
    #[must_use]
    pub fn axes(self) -> &'static str {
        match self {
            Self::AbsoluteChain | Self::RelativeChain => "",
            Self::Arm => "zyyxyx",
            Self::GeneralArm => "zyxzyx",
        }
    }

    /// The word in front of the number of links, and what follows it.
    fn words(self) -> (&'static str, &'static str) {
        match self {
            Self::AbsoluteChain => ("abs", ""),
            Self::RelativeChain => ("rel", ""),
            Self::Arm => ("arm", ""),
            Self::GeneralArm => ("arm", ", every offset nonzero"),
        }
    }
}

impl fmt::Display for Case {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let (word, rest) = self.family.words();
        write!(f, "{word} {}{rest}", self.links)
    }
}

impl FromStr for Case {
    type Err = Error;

    fn from_str(text: &str) -> Result<Self, Error> {
        use Family::{AbsoluteChain, Arm, GeneralArm, RelativeChain};
        let known = [AbsoluteChain, RelativeChain, GeneralArm, Arm];
        let found = known.into_iter().find_map(|family| {
            let (word, rest) = family.words();
            let number = text.strip_prefix(word)?.strip_suffix(rest)?.strip_prefix(' ')?;
            Some((family, number.parse::<usize>().ok()?))
        });
        let (family, links) = found.with_context(|| {
            format!(
                "`{text}` is no case; cases are `abs 10`, `rel 10`, `arm 6` and `arm 6, every offset nonzero`"
            )
        })?;
        let most = if family.axes().is_empty() {
            usize::MAX
        } else {
            MOST_LINKS_OF_AN_ARM
        };
        if links == 0 || links > most {
            bail!(
                "`{text}` has {links} links; it takes at least one, and an arm at most {MOST_LINKS_OF_AN_ARM}"
            );
        }
        Ok(Self { family, links })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn cases_are_read_as_they_are_written() -> Result<(), Error> {
        for case in Case::all() {
            assert_eq!(case.to_string().parse::<Case>()?, case);
        }
        Ok(())
    }

    #[test]
    fn what_is_no_case_is_named() {
        for wrong in [
            "",
            "abs",
            "abs x",
            "arm 7",
            "rel 0",
            "arm 7, every offset nonzero",
            "abs 5, every offset nonzero",
        ] {
            let error = wrong.parse::<Case>().expect_err(wrong).to_string();
            assert!(error.contains(&format!("`{wrong}`")), "{error}");
        }
    }
}
