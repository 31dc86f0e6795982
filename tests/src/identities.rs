//! Identities and near misses from published tables, as `data/identities.tsv` lists them.

use std::fmt;

use anyhow::{Context, Result, bail, ensure};
use cas::text::{Scope, read};
use cas::{Effort, Expr, Substitution, Symbol, Verdict, decide};

/// The columns of the file, in order.
const COLUMNS: &str = "name\tidentity\tnumber\tpositive\tleft\tright";

/// Two sides from a published table, and whether they are equal.
#[derive(Clone, Debug)]
pub struct Entry {
    /// The source with its equation number.
    pub name: &'static str,
    /// Whether both sides are equal wherever both have a value.
    pub identity: bool,
    /// The symbols that are positive.
    pub positive: Vec<&'static str>,
    /// The left side in plain notation.
    pub left: &'static str,
    /// The right side in plain notation.
    pub right: &'static str,
}

/// What the library finds about an entry.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Finding {
    /// Both sides are equal.
    Proved,
    /// The sides differ.
    Refuted,
    /// There is evidence, but no proof.
    Supported,
    /// Nothing is known.
    Undecided,
    /// A side has a function that the plain notation does not know yet.
    NotRead,
}

impl fmt::Display for Finding {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(match self {
            Self::Proved => "proved",
            Self::Refuted => "refuted",
            Self::Supported => "supported",
            Self::Undecided => "undecided",
            Self::NotRead => "not read",
        })
    }
}

/// Every entry, in the order of the file.
///
/// # Errors
/// A row with other columns, a word that is neither `true` nor `false`, a name that occurs twice.
pub fn all() -> Result<Vec<Entry>> {
    let mut lines = include_str!("../data/identities.tsv")
        .lines()
        .filter(|line| !line.starts_with('#'));
    ensure!(lines.next() == Some(COLUMNS), "the columns are not `{COLUMNS}`");
    let entries = lines
        .map(|line| entry(line).with_context(|| line.to_owned()))
        .collect::<Result<Vec<_>>>()?;
    let mut names: Vec<&str> = entries.iter().map(|entry| entry.name).collect();
    names.sort_unstable();
    if let Some(twice) = names.windows(2).find(|pair| pair[0] == pair[1]) {
        bail!("`{}` occurs twice", twice[0]);
    }
    Ok(entries)
}

fn entry(line: &'static str) -> Result<Entry> {
    let cells: Vec<&str> = line.split('\t').collect();
    let [name, identity, _number, positive, left, right] = cells[..] else {
        bail!("{} cells instead of six", cells.len());
    };
    Ok(Entry {
        name,
        identity: identity.parse().context("neither `true` nor `false`")?,
        positive: positive.split(',').filter(|name| *name != "-").collect(),
        left,
        right,
    })
}

impl Entry {
    /// What the library finds.
    ///
    /// The library knows no signs of symbols. A positive symbol is therefore replaced by a square,
    /// which takes every positive value; a square also takes the value zero, so that a witness with
    /// a zero there refutes nothing.
    ///
    /// # Errors
    /// A side that cannot be read although it has only functions of the plain notation.
    pub fn finding(&self, effort: &Effort) -> Result<Finding> {
        let (Some(left), Some(right)) = (side(self.left)?, side(self.right)?) else {
            return Ok(Finding::NotRead);
        };
        let positive = self
            .positive
            .iter()
            .map(|name| Ok(Expr::from(Symbol::new(name)?)))
            .collect::<Result<Vec<_>>>()?;
        let squares = Substitution::new(positive.iter().map(|symbol| (*symbol, symbol.squared())));
        let verdict = decide::compare(left.substituted(&squares), right.substituted(&squares), effort);
        Ok(match verdict {
            Verdict::Proved(_) => Finding::Proved,
            Verdict::Refuted(witness) => {
                let outside = witness
                    .values
                    .iter()
                    .any(|(part, value)| value.is_zero() && positive.contains(part));
                if outside {
                    Finding::Undecided
                } else {
                    Finding::Refuted
                }
            }
            Verdict::Supported(_) => Finding::Supported,
            Verdict::Undecided(_) => Finding::Undecided,
        })
    }
}

/// A side as it is read, or nothing where it has a function that is not known yet.
fn side(text: &str) -> Result<Option<Expr>> {
    let unknown = ["sinh", "cosh", "tanh", "asin", "acos", "atan", "abs", "sign"]
        .into_iter()
        .find(|name| read(&format!("{name}(x)"), &Scope::open()).is_err() && calls(text, name));
    if unknown.is_some() {
        return Ok(None);
    }
    Ok(Some(read(text, &Scope::open()).with_context(|| text.to_owned())?))
}

/// Whether a function of this name is called, not one whose name ends like it.
fn calls(text: &str, name: &str) -> bool {
    text.match_indices(&format!("{name}("))
        .any(|(at, _)| !text[..at].ends_with(|before: char| before.is_alphanumeric()))
}
