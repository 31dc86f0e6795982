//! The arrangement of a sheet: in which order its names stand, and which of them is the argument of dots.

use std::collections::HashMap;

use crate::expr::{Name, Symbol};

/// How the names of a sheet are arranged in writing.
///
/// Names stand in order of declaration, others after them in alphabetical order. Primes of symbols
/// are written as dots in LaTeX; so are derivatives of undetermined functions by the symbol of
/// [`with_dots`](Self::with_dots).
#[derive(Clone, Debug, Default)]
pub struct Arrangement {
    ranks: HashMap<Name, usize>,
    coordinates: HashMap<Name, usize>,
    dots: Option<Symbol>,
}

impl Arrangement {
    /// The arrangement with names in this order.
    #[must_use]
    pub fn of_names(names: impl IntoIterator<Item = Name>) -> Self {
        let ranks = names
            .into_iter()
            .enumerate()
            .map(|(rank, name)| (name, rank))
            .collect();
        Self {
            ranks,
            ..Self::default()
        }
    }

    /// The arrangement with these symbols as coordinates, which stand after constants.
    #[must_use]
    pub fn with_coordinates(mut self, coordinates: &[Symbol]) -> Self {
        let ranked = coordinates.iter().enumerate();
        self.coordinates = ranked.map(|(rank, symbol)| (symbol.name(), rank)).collect();
        self
    }

    /// The arrangement in which a derivative of an undetermined function by this symbol, where that
    /// is its only argument, is written with dots.
    #[must_use]
    pub fn with_dots(mut self, symbol: Symbol) -> Self {
        self.dots = Some(symbol);
        self
    }

    /// The place of a name: its rank where it is declared, then its text.
    pub(super) fn place(&self, name: Name) -> (usize, &'static str) {
        (
            self.ranks.get(&name).copied().unwrap_or(usize::MAX),
            name.as_str(),
        )
    }

    /// The place of a coordinate among the coordinates.
    pub(super) fn coordinate(&self, name: Name) -> Option<usize> {
        self.coordinates.get(&name).copied()
    }

    /// Whether derivatives by this symbol are written with dots.
    pub(super) fn has_dots(&self, symbol: Symbol) -> bool {
        self.dots == Some(symbol)
    }
}
