//! Sparse polynomials over Q in a fixed list of variables, some of which obey a relation.
//!
//! | variable | relation |
//! |---|---|
//! | sine of a base angle | `s^2 = 1 - c^2` with the cosine `c` of the same angle |
//! | root of degree `q` of a polynomial | `r^q = P` |
//! | anything else | none |
//!
//! Every polynomial is reduced: no sine and no root stands at an exponent at which its relation
//! applies, no coefficient is zero, and no monomial stands twice. So a polynomial in sines, cosines
//! and free variables is zero exactly when it has no terms.
//!
//! Exponents are packed eight to a word, the first variable in the highest byte, so that words
//! compare as the lexicographic order does and a product of monomials is a sum of words. The highest
//! bit of each byte stays free to notice an exponent that does not fit.

use std::cmp::Ordering;

mod accumulator;
mod polynomial;
#[cfg(test)]
mod tests;

pub(crate) use polynomial::Polynomial;

use accumulator::Accumulator;

use crate::effort::{Limit, Meter};
use crate::number::Rational;

/// The largest exponent that fits.
const MOST_EXPONENT: u32 = 127;

/// The bits that must stay free.
const GUARD: u64 = 0x8080_8080_8080_8080;

/// The relation of a variable.
#[derive(Clone, Debug)]
enum Relation {
    Free,
    /// The sine of the angle whose cosine is the variable of this place.
    Sine(usize),
    /// A root of this degree, and the polynomial under it.
    Root(u32, Polynomial),
}

/// The variables of a ring with their relations, and the work that may be done in it.
#[derive(Debug)]
pub(crate) struct Ring<'a> {
    relations: Vec<Relation>,
    /// A byte of zeros for each variable without relation, elsewhere all bits of exponents above one.
    watched: Vec<u64>,
    words: usize,
    pub(crate) meter: &'a Meter<'a>,
}

impl<'a> Ring<'a> {
    /// The ring of this many variables without relations.
    pub(crate) fn new(variables: usize, meter: &'a Meter<'a>) -> Self {
        let words = variables.div_ceil(8).max(1);
        Self {
            relations: vec![Relation::Free; variables],
            watched: vec![0; words],
            words,
            meter,
        }
    }

    /// Makes one variable the sine of the angle whose cosine another is.
    pub(crate) fn relate_sine(&mut self, sine: usize, cosine: usize) {
        self.relations[sine] = Relation::Sine(cosine);
        self.watched[sine / 8] |= 0xfe << shift(sine);
    }

    /// Makes a variable the root of this degree of a polynomial in variables related before it.
    pub(crate) fn relate_root(&mut self, root: usize, degree: u32, radicand: Polynomial) {
        self.relations[root] = Relation::Root(degree, radicand);
        self.watched[root / 8] |= 0xfe << shift(root);
    }

    /// A constant.
    pub(crate) fn constant(&self, value: Rational) -> Polynomial {
        if value.is_zero() {
            return Polynomial::default();
        }
        Polynomial {
            exponents: vec![0; self.words],
            coefficients: vec![value],
        }
    }

    /// A variable.
    pub(crate) fn variable(&self, place: usize) -> Polynomial {
        let mut exponents = vec![0; self.words];
        exponents[place / 8] = 1 << shift(place);
        Polynomial {
            exponents,
            coefficients: vec![Rational::ONE],
        }
    }

    /// The sum of several polynomials.
    pub(crate) fn sum(&self, parts: &[&Polynomial]) -> Result<Polynomial, Limit> {
        match parts {
            [] => return Ok(Polynomial::default()),
            [only] => return Ok((*only).clone()),
            _ => {}
        }
        // Neighbours first, then sums of neighbours: every term is looked at a few times only.
        let mut level = self.paired(parts)?;
        while level.len() > 1 {
            level = self.paired(&level.iter().collect::<Vec<_>>())?;
        }
        self.allowed(level.pop().unwrap_or_default())
    }

    /// The sums of neighbours; the last has none where their number is odd.
    fn paired(&self, parts: &[&Polynomial]) -> Result<Vec<Polynomial>, Limit> {
        self.meter
            .spend(parts.iter().map(|part| part.len() as u64).sum())?;
        let pairs = parts.chunks(2).map(|pair| match pair {
            [left, right] => self.merged(left, right),
            _ => pair[0].clone(),
        });
        Ok(pairs.collect())
    }

    /// The sum of two polynomials: both are in order, so one walk along them suffices.
    fn merged(&self, left: &Polynomial, right: &Polynomial) -> Polynomial {
        let mut sum = Polynomial::with_capacity(left.len() + right.len(), self.words);
        let (mut ours, mut theirs) = (
            left.terms(self.words).peekable(),
            right.terms(self.words).peekable(),
        );
        loop {
            let order = match (ours.peek(), theirs.peek()) {
                (Some((a, _)), Some((b, _))) => b.cmp(a),
                (Some(_), None) => Ordering::Less,
                (None, Some(_)) => Ordering::Greater,
                (None, None) => return sum,
            };
            let own = if order.is_le() { ours.next() } else { None };
            let other = if order.is_ge() { theirs.next() } else { None };
            match (own, other) {
                (Some((monomial, a)), Some((_, b))) => sum.push(monomial, a + b),
                (Some((monomial, value)), None) | (None, Some((monomial, value))) => {
                    sum.push(monomial, value.clone());
                }
                (None, None) => return sum,
            }
        }
    }

    fn allowed(&self, polynomial: Polynomial) -> Result<Polynomial, Limit> {
        self.meter.allow_terms(polynomial.len())?;
        for coefficient in &polynomial.coefficients {
            self.meter.allow_bits(coefficient.bits())?;
        }
        Ok(polynomial)
    }

    /// The product, reduced.
    pub(crate) fn product(&self, left: &Polynomial, right: &Polynomial) -> Result<Polynomial, Limit> {
        if let Some(value) = right.as_constant() {
            return self.scaled(left, &value);
        }
        if let Some(value) = left.as_constant() {
            return self.scaled(right, &value);
        }
        let (short, long) = if left.len() < right.len() {
            (left, right)
        } else {
            (right, left)
        };
        if let Some(product) = self.by_one_term(long, short)? {
            return Ok(product);
        }
        let mut result = Accumulator::new(self.words);
        let mut monomial = vec![0; self.words];
        for (a, x) in left.terms(self.words) {
            self.meter.spend(right.len() as u64)?;
            for (b, y) in right.terms(self.words) {
                for (sum, (p, q)) in monomial.iter_mut().zip(a.iter().zip(b)) {
                    *sum = p + q;
                }
                self.add_reduced(&mut result, &monomial, x * y)?;
            }
            self.meter.allow_terms(result.len())?;
        }
        self.finished(result)
    }

    /// The product with a polynomial of one term, where no relation applies: the order stays.
    fn by_one_term(&self, polynomial: &Polynomial, single: &Polynomial) -> Result<Option<Polynomial>, Limit> {
        let mut terms = single.terms(self.words);
        let (Some((factor, scale)), None) = (terms.next(), terms.next()) else {
            return Ok(None);
        };
        self.meter.spend(polynomial.len() as u64)?;
        let mut product = Polynomial::with_capacity(polynomial.len(), self.words);
        let mut sum = vec![0; self.words];
        for (monomial, coefficient) in polynomial.terms(self.words) {
            for (sum, (p, q)) in sum.iter_mut().zip(monomial.iter().zip(factor)) {
                *sum = p + q;
            }
            if sum.iter().any(|word| word & GUARD != 0) {
                return Err(Limit::Exponent(MOST_EXPONENT));
            }
            if self.reducible(&sum).is_some() {
                return Ok(None);
            }
            product.push(&sum, coefficient * scale);
        }
        self.allowed(product).map(Some)
    }

    /// The polynomial times a number.
    pub(crate) fn scaled(&self, polynomial: &Polynomial, factor: &Rational) -> Result<Polynomial, Limit> {
        if factor.is_zero() {
            return Ok(Polynomial::default());
        }
        if factor.is_one() {
            return Ok(polynomial.clone());
        }
        self.meter.spend(polynomial.len() as u64)?;
        let mut result = polynomial.clone();
        for coefficient in &mut result.coefficients {
            *coefficient = &*coefficient * factor;
            self.meter.allow_bits(coefficient.bits())?;
        }
        Ok(result)
    }

    /// The power with a natural exponent.
    pub(crate) fn power(&self, base: &Polynomial, exponent: u32) -> Result<Polynomial, Limit> {
        if let Some(value) = base.as_constant()
            && (value.is_zero() || value.absolute().is_one())
        {
            let odd = exponent % 2 == 1;
            let result = if odd { value } else { value.absolute() };
            return Ok(self.constant(if exponent == 0 { Rational::ONE } else { result }));
        }
        if let Some(value) = base.as_constant() {
            // A lower bound, so that a power far beyond the limit is not approached one by one.
            let least = value.bits().saturating_sub(2).max(1);
            self.meter.allow_bits(least.saturating_mul(exponent.into()))?;
            let power = i32::try_from(exponent)
                .ok()
                .and_then(|exponent| value.power(exponent));
            return power
                .map(|power| self.constant(power))
                .ok_or(Limit::Bits(self.meter.effort().bits));
        }
        // Multiplying one by one keeps sparse powers cheaper than squaring does; every base but numbers
        // runs into a limit on exponents, terms or bits.
        let mut result = self.constant(Rational::ONE);
        for _ in 0..exponent {
            result = self.product(&result, base)?;
        }
        Ok(result)
    }

    /// The partial derivative by a variable: the order of those terms that have it stays.
    pub(crate) fn slope(&self, polynomial: &Polynomial, place: usize) -> Result<Polynomial, Limit> {
        self.meter.spend(polynomial.len() as u64)?;
        let mut slope = Polynomial::default();
        let mut lowered = vec![0; self.words];
        for (monomial, coefficient) in polynomial.terms(self.words) {
            let power = exponent(monomial, place);
            if power > 0 {
                lowered.copy_from_slice(monomial);
                lowered[place / 8] -= 1 << shift(place);
                slope.push(&lowered, coefficient * &Rational::from(i64::from(power)));
            }
        }
        self.allowed(slope)
    }

    /// The sum of the partial derivatives by some variables, each times a polynomial.
    pub(crate) fn derived<'p>(
        &self,
        polynomial: &Polynomial,
        rates: impl Iterator<Item = (usize, &'p Polynomial)>,
    ) -> Result<Polynomial, Limit> {
        let mut result = Accumulator::new(self.words);
        let mut product = vec![0; self.words];
        for (place, rate) in rates {
            self.meter.spend(polynomial.len() as u64)?;
            for (monomial, coefficient) in polynomial.terms(self.words) {
                let power = exponent(monomial, place);
                if power == 0 {
                    continue;
                }
                self.meter.spend(rate.len() as u64)?;
                let scaled = coefficient * &Rational::from(i64::from(power));
                for (other, factor) in rate.terms(self.words) {
                    for (sum, (p, q)) in product.iter_mut().zip(monomial.iter().zip(other)) {
                        *sum = p + q;
                    }
                    product[place / 8] -= 1 << shift(place);
                    self.add_reduced(&mut result, &product, &scaled * factor)?;
                }
            }
            self.meter.allow_terms(result.len())?;
        }
        self.finished(result)
    }

    /// Adds a term whose monomial may need its relations applied.
    fn add_reduced(
        &self,
        result: &mut Accumulator,
        monomial: &[u64],
        coefficient: Rational,
    ) -> Result<(), Limit> {
        if monomial.iter().any(|word| word & GUARD != 0) {
            return Err(Limit::Exponent(MOST_EXPONENT));
        }
        let Some((place, times)) = self.reducible(monomial) else {
            result.add(monomial, coefficient);
            return Ok(());
        };
        let mut rest = monomial.to_vec();
        match &self.relations[place] {
            Relation::Free => result.add(monomial, coefficient),
            Relation::Sine(cosine) => {
                rest[place / 8] -= 2 << shift(place);
                self.meter.spend(2)?;
                self.add_reduced(result, &rest, coefficient.clone())?;
                rest[cosine / 8] += 2 << shift(*cosine);
                self.add_reduced(result, &rest, -coefficient)?;
            }
            Relation::Root(degree, radicand) => {
                rest[place / 8] -= u64::from(*degree) << shift(place);
                self.meter.spend(radicand.len() as u64 * u64::from(times))?;
                let mut monomial = vec![0; self.words];
                for (exponents, factor) in radicand.terms(self.words) {
                    for (sum, (p, q)) in monomial.iter_mut().zip(rest.iter().zip(exponents)) {
                        *sum = p + q;
                    }
                    self.add_reduced(result, &monomial, factor * &coefficient)?;
                }
            }
        }
        Ok(())
    }

    /// The first variable to which its relation applies, and how often it does.
    fn reducible(&self, monomial: &[u64]) -> Option<(usize, u32)> {
        let suspicious = monomial
            .iter()
            .zip(&self.watched)
            .any(|(word, watched)| word & watched != 0);
        if !suspicious {
            return None;
        }
        self.relations.iter().enumerate().find_map(|(place, relation)| {
            let degree = match relation {
                Relation::Free => return None,
                Relation::Sine(_) => 2,
                Relation::Root(degree, _) => *degree,
            };
            let times = exponent(monomial, place) / degree;
            (times > 0).then_some((place, times))
        })
    }

    fn finished(&self, result: Accumulator) -> Result<Polynomial, Limit> {
        self.meter.allow_terms(result.len())?;
        self.allowed(result.sorted())
    }

    /// The quotient where the division leaves nothing.
    ///
    /// Only quotients that need no relation are found, so `None` does not say that there is none.
    pub(crate) fn exact_quotient(
        &self,
        dividend: &Polynomial,
        divisor: &Polynomial,
    ) -> Result<Option<Polynomial>, Limit> {
        let Some((leading, scale)) = divisor.terms(self.words).next() else {
            return Ok(None);
        };
        let scale = scale.reciprocal().expect("invariant: no coefficient is zero");
        let (mut rest, mut quotient) = (dividend.clone(), Accumulator::new(self.words));
        loop {
            let Some((first, coefficient)) = rest.terms(self.words).next() else {
                break;
            };
            let Some(step) = divided(first, leading) else {
                return Ok(None);
            };
            let factor = coefficient * &scale;
            let negated = Polynomial {
                exponents: step.clone(),
                coefficients: vec![-&factor],
            };
            let lowered = self.product(divisor, &negated)?;
            // A relation that applied has changed the leading term: the division would not end.
            if lowered.terms(self.words).next().map(|(monomial, _)| monomial) != Some(first) {
                return Ok(None);
            }
            quotient.add(&step, factor);
            let lower = self.sum(&[&rest, &lowered])?;
            rest = lower;
        }
        self.finished(quotient).map(Some)
    }

    /// The exponent of a variable that every term has.
    pub(crate) fn common_exponent(&self, polynomial: &Polynomial, place: usize) -> u32 {
        let exponents = polynomial
            .terms(self.words)
            .map(|(monomial, _)| exponent(monomial, place));
        exponents.min().unwrap_or(0)
    }

    /// The polynomial divided by a power of a variable that every term has.
    pub(crate) fn lowered(&self, mut polynomial: Polynomial, place: usize, by: u32) -> Polynomial {
        for monomial in polynomial.exponents.chunks_exact_mut(self.words) {
            monomial[place / 8] -= u64::from(by) << shift(place);
        }
        polynomial
    }

    /// Which variables occur, by their places.
    pub(crate) fn present(&self, polynomial: &Polynomial) -> Vec<bool> {
        let mut bits = vec![0; self.words];
        for (monomial, _) in polynomial.terms(self.words) {
            for (all, word) in bits.iter_mut().zip(monomial) {
                *all |= word;
            }
        }
        (0..self.relations.len())
            .map(|place| exponent(&bits, place) > 0)
            .collect()
    }

    /// The terms: exponents of all variables, and the coefficient.
    pub(crate) fn terms<'p>(
        &self,
        polynomial: &'p Polynomial,
    ) -> impl Iterator<Item = (Vec<u32>, &'p Rational)> + use<'p> {
        let variables = self.relations.len();
        polynomial.terms(self.words).map(move |(monomial, coefficient)| {
            let exponents = (0..variables).map(|place| exponent(monomial, place));
            (exponents.collect(), coefficient)
        })
    }
}

/// Where the byte of a variable lies in its word.
fn shift(place: usize) -> usize {
    56 - 8 * (place % 8)
}

fn exponent(monomial: &[u64], place: usize) -> u32 {
    let byte = (monomial[place / 8] >> shift(place)) & 0xff;
    u32::try_from(byte).expect("invariant: a byte fits")
}

/// The quotient of two monomials, where each exponent of the divisor fits.
fn divided(dividend: &[u64], divisor: &[u64]) -> Option<Vec<u64>> {
    let mut quotient = Vec::with_capacity(dividend.len());
    for (a, b) in dividend.iter().zip(divisor) {
        // With the guard bits set no byte borrows from its neighbour; one that used its own is too small.
        let difference = (a | GUARD) - b;
        if difference & GUARD != GUARD {
            return None;
        }
        quotient.push(difference & !GUARD);
    }
    Some(quotient)
}
