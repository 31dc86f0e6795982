//! Which names a text may use.

use std::collections::{BTreeMap, BTreeSet};

use super::fault::ReadFault;
use crate::expr::Name;

/// The names that a text may use.
#[derive(Clone, Debug, Default)]
pub struct Scope {
    declared: Option<Declared>,
}

#[derive(Clone, Debug, Default)]
struct Declared {
    symbols: BTreeSet<Name>,
    functions: BTreeMap<Name, usize>,
}

impl Scope {
    /// Every valid name may be used: as a symbol, or with arguments as an undetermined function.
    #[must_use]
    pub fn open() -> Self {
        Self::default()
    }

    /// Only these symbols, with any number of primes, and these undetermined functions with their
    /// number of arguments.
    #[must_use]
    pub fn of(
        symbols: impl IntoIterator<Item = Name>,
        functions: impl IntoIterator<Item = (Name, usize)>,
    ) -> Self {
        Self {
            declared: Some(Declared {
                symbols: symbols.into_iter().collect(),
                functions: functions.into_iter().collect(),
            }),
        }
    }

    /// The declared symbols and functions; nothing where every name may be used.
    pub(super) fn declared(&self) -> Option<(&BTreeSet<Name>, &BTreeMap<Name, usize>)> {
        let declared = self.declared.as_ref()?;
        Some((&declared.symbols, &declared.functions))
    }

    pub(super) fn refuses_symbol(&self, name: Name) -> Option<ReadFault> {
        let declared = self.declared.as_ref()?;
        (!declared.symbols.contains(&name)).then(|| undeclared(name, declared.symbols.iter()))
    }

    pub(super) fn refuses_function(&self, name: Name) -> Option<ReadFault> {
        let declared = self.declared.as_ref()?;
        (!declared.functions.contains_key(&name)).then(|| undeclared(name, declared.functions.keys()))
    }

    pub(super) fn refuses_arguments(&self, name: Name, given: usize) -> Option<ReadFault> {
        let declared = *self.declared.as_ref()?.functions.get(&name)?;
        (declared != given).then(|| ReadFault::Arguments {
            name: name.to_string(),
            declared,
            given,
        })
    }
}

fn undeclared<'a>(name: Name, known: impl Iterator<Item = &'a Name>) -> ReadFault {
    undeclared_text(name.as_str(), known)
}

/// The fault of a text that names nothing, with the nearest name that is known.
pub(super) fn undeclared_text<'a>(text: &str, known: impl Iterator<Item = &'a Name>) -> ReadFault {
    let nearest = known
        .map(|known| (distance(text, known.as_str()), known.as_str()))
        .filter(|(distance, known)| *distance <= 2 && *distance < known.chars().count())
        .min();
    ReadFault::Undeclared {
        name: text.to_owned(),
        nearest: nearest.map(|(_, known)| known.to_owned()),
    }
}

/// The number of letters to change, add or leave out [Levenshtein1966].
fn distance(a: &str, b: &str) -> usize {
    let b: Vec<char> = b.chars().collect();
    let mut row: Vec<usize> = (0..=b.len()).collect();
    for (i, x) in a.chars().enumerate() {
        let mut diagonal = std::mem::replace(&mut row[0], i + 1);
        for (j, y) in b.iter().enumerate() {
            let changed = diagonal + usize::from(x != *y);
            diagonal = row[j + 1];
            row[j + 1] = changed.min(row[j] + 1).min(diagonal + 1);
        }
    }
    row[b.len()]
}
