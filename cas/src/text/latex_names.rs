//! Which name a spelling in LaTeX means: letters that run together, and indices below.

use std::collections::BTreeMap;

use super::fault::ReadFault;
use super::scope::{Scope, undeclared_text};
use crate::expr::{Name, NameError};

/// A name as it is spelled in LaTeX: the stem first, then the parts of its index.
pub(super) type Spelling = Vec<String>;

/// What a declared name is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Meaning {
    /// A symbol.
    Symbol,
    /// An undetermined function with this number of arguments.
    Function(usize),
}

/// The names of a scope by their spelling in LaTeX.
pub(super) struct Names<'a> {
    scope: &'a Scope,
    /// The parts of each name, with digits apart from the letters before them: `phi1` and `phi_1`
    /// look the same in LaTeX.
    spelled: BTreeMap<Spelling, Vec<Name>>,
    longest: usize,
}

impl<'a> Names<'a> {
    pub(super) fn of(scope: &'a Scope) -> Self {
        let mut spelled: BTreeMap<Spelling, Vec<Name>> = BTreeMap::new();
        let mut longest = 1;
        if let Some((symbols, functions)) = scope.declared() {
            for name in symbols.iter().chain(functions.keys()) {
                let known = spelled.entry(parts(&[name.as_str().to_owned()])).or_default();
                if !known.contains(name) {
                    known.push(*name);
                }
                longest = longest.max(name.as_str().chars().count());
            }
        }
        Self {
            scope,
            spelled,
            longest,
        }
    }

    /// Whether every name may be used, so that each letter is one.
    pub(super) fn is_open(&self) -> bool {
        self.scope.declared().is_none()
    }

    /// The length of the longest declared name.
    pub(super) fn longest(&self) -> usize {
        self.longest
    }

    /// Whether this symbol is declared.
    pub(super) fn has_symbol(&self, text: &str) -> bool {
        let declared = self.scope.declared();
        declared.is_some_and(|(symbols, _)| symbols.iter().any(|name| name.as_str() == text))
    }

    /// The declared name of this spelling, if there is one; with open scope, the name itself.
    pub(super) fn find(&self, spelling: &[String]) -> Result<Option<Name>, ReadFault> {
        let text = joined(spelling);
        if self.is_open() {
            return Ok(Some(Name::new(&text)?));
        }
        let Some(known) = self.spelled.get(&parts(spelling)) else {
            return Ok(None);
        };
        match (known.as_slice(), known.iter().find(|name| name.as_str() == text)) {
            (_, Some(name)) | ([name], None) => Ok(Some(*name)),
            _ => Err(ReadFault::Unclear {
                what: "two declared names look like this in LaTeX",
                instead: "rename one of them, so that they differ in more than `_`",
            }),
        }
    }

    /// What a name means where it stands with or without arguments behind it.
    pub(super) fn meaning(&self, name: Name, bracket_follows: bool) -> Result<Meaning, ReadFault> {
        let Some((symbols, functions)) = self.scope.declared() else {
            return Ok(Meaning::Symbol);
        };
        match (symbols.contains(&name), functions.get(&name)) {
            (true, Some(_)) if bracket_follows => Err(ReadFault::Unclear {
                what: "this name is declared as a symbol and as a function",
                instead: "write `\\cdot` before the bracket for a product, or rename one of the two",
            }),
            (false, Some(arguments)) => Ok(Meaning::Function(*arguments)),
            _ => Ok(Meaning::Symbol),
        }
    }

    /// The fault of a spelling that is not declared.
    pub(super) fn undeclared(&self, spelling: &[String]) -> ReadFault {
        let text = joined(spelling);
        // A text that could never be declared says so.
        match Name::new(&text) {
            Err(error @ (NameError::Reserved { .. } | NameError::Character { .. })) => error.into(),
            _ => match self.scope.declared() {
                Some((symbols, functions)) => undeclared_text(&text, symbols.iter().chain(functions.keys())),
                None => undeclared_text(&text, std::iter::empty()),
            },
        }
    }

    /// The fault of arguments that are too many or too few.
    pub(super) fn refuses_arguments(&self, name: Name, given: usize) -> Option<ReadFault> {
        self.scope.refuses_arguments(name, given)
    }
}

/// The name of a spelling, with its index behind an underscore.
fn joined(spelling: &[String]) -> String {
    spelling.join("_")
}

/// The parts that a spelling shows, with digits apart from the letters before them.
fn parts(spelling: &[String]) -> Spelling {
    let mut parts = Vec::new();
    for word in spelling.iter().flat_map(|part| part.split('_')) {
        let digits_from = word.find(|c: char| c.is_ascii_digit()).unwrap_or(word.len());
        let (stem, digits) = word.split_at(digits_from);
        if digits.bytes().all(|byte| byte.is_ascii_digit()) {
            parts.extend([stem, digits].map(str::to_owned));
        } else {
            parts.push(word.to_owned());
        }
    }
    parts.retain(|part| !part.is_empty());
    parts
}
