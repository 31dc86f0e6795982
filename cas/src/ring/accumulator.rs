//! Collects terms in any order and adds up the coefficients of equal monomials.

use super::polynomial::Polynomial;
use crate::number::Rational;

/// No place.
const EMPTY: u32 = u32::MAX;

/// Terms found so far, with a table by which a monomial finds its place.
pub(super) struct Accumulator {
    words: usize,
    exponents: Vec<u64>,
    coefficients: Vec<Rational>,
    // Open addressing; the length is a power of two at least twice the number of terms.
    table: Vec<u32>,
}

impl Accumulator {
    pub(super) fn new(words: usize) -> Self {
        Self {
            words,
            exponents: Vec::new(),
            coefficients: Vec::new(),
            table: vec![EMPTY; 32],
        }
    }

    pub(super) fn len(&self) -> usize {
        self.coefficients.len()
    }

    /// Adds a term.
    pub(super) fn add(&mut self, monomial: &[u64], coefficient: Rational) {
        let slot = self.slot(monomial);
        if self.table[slot] != EMPTY {
            let sum = &mut self.coefficients[self.table[slot] as usize];
            *sum = &*sum + &coefficient;
            return;
        }
        self.table[slot] = u32::try_from(self.len()).expect("invariant: terms are limited below this");
        self.exponents.extend_from_slice(monomial);
        self.coefficients.push(coefficient);
        if 2 * self.len() > self.table.len() {
            self.grow();
        }
    }

    fn slot(&self, monomial: &[u64]) -> usize {
        let mask = self.table.len() - 1;
        let mut slot = hash(monomial) & mask;
        while self.table[slot] != EMPTY {
            let place = self.table[slot] as usize;
            if self.exponents[place * self.words..(place + 1) * self.words] == *monomial {
                break;
            }
            slot = (slot + 1) & mask;
        }
        slot
    }

    fn grow(&mut self) {
        self.table = vec![EMPTY; 2 * self.table.len()];
        let mask = self.table.len() - 1;
        for (place, monomial) in (0_u32..).zip(self.exponents.chunks_exact(self.words)) {
            let mut slot = hash(monomial) & mask;
            while self.table[slot] != EMPTY {
                slot = (slot + 1) & mask;
            }
            self.table[slot] = place;
        }
    }

    /// The polynomial of the terms.
    pub(super) fn sorted(self) -> Polynomial {
        let words = self.words;
        let monomial = |place: usize| &self.exponents[place * words..(place + 1) * words];
        let mut places: Vec<usize> = (0..self.coefficients.len())
            .filter(|place| !self.coefficients[*place].is_zero())
            .collect();
        places.sort_unstable_by(|a, b| monomial(*b).cmp(monomial(*a)));
        let exponents = places
            .iter()
            .flat_map(|place| monomial(*place))
            .copied()
            .collect();
        let mut coefficients = self.coefficients;
        let coefficients = places
            .iter()
            .map(|place| std::mem::replace(&mut coefficients[*place], Rational::ZERO))
            .collect();
        Polynomial {
            exponents,
            coefficients,
        }
    }
}

/// A hash of a monomial; its quality only changes speed.
fn hash(monomial: &[u64]) -> usize {
    let mixed = monomial.iter().fold(0x9e37_79b9_7f4a_7c15_u64, |hash, word| {
        (hash.rotate_left(29) ^ word).wrapping_mul(0xbf58_476d_1ce4_e5b9)
    });
    usize::try_from(mixed >> 32).expect("invariant: half a word fits")
}
