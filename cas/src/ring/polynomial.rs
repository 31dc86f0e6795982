//! A polynomial: packed monomials in decreasing order, each with a coefficient.

use crate::number::Rational;

/// A reduced polynomial of some ring; without terms it is zero.
///
/// It does not know its ring: whoever holds it does.
#[derive(Clone, Debug, Default, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) struct Polynomial {
    /// Monomial after monomial, strictly decreasing.
    pub(super) exponents: Vec<u64>,
    /// One for each monomial, none of them zero.
    pub(super) coefficients: Vec<Rational>,
}

impl Polynomial {
    /// Room for this many terms.
    pub(super) fn with_capacity(terms: usize, words: usize) -> Self {
        Self {
            exponents: Vec::with_capacity(terms * words),
            coefficients: Vec::with_capacity(terms),
        }
    }

    /// Puts a term behind those there are, unless it is zero; its monomial has to be below theirs.
    pub(super) fn push(&mut self, monomial: &[u64], coefficient: Rational) {
        if !coefficient.is_zero() {
            self.exponents.extend_from_slice(monomial);
            self.coefficients.push(coefficient);
        }
    }

    /// How many terms there are.
    pub(crate) fn len(&self) -> usize {
        self.coefficients.len()
    }

    /// Whether it is zero.
    pub(crate) fn is_zero(&self) -> bool {
        self.coefficients.is_empty()
    }

    /// The number that it is, where it has no variable.
    pub(crate) fn as_constant(&self) -> Option<Rational> {
        match self.coefficients.as_slice() {
            [] => Some(Rational::ZERO),
            [only] if self.exponents.iter().all(|word| *word == 0) => Some(only.clone()),
            _ => None,
        }
    }

    /// The coefficients in order.
    pub(crate) fn coefficients(&self) -> &[Rational] {
        &self.coefficients
    }

    /// Monomials and coefficients in decreasing order.
    pub(super) fn terms(&self, words: usize) -> impl Iterator<Item = (&[u64], &Rational)> {
        self.exponents.chunks_exact(words).zip(&self.coefficients)
    }
}
