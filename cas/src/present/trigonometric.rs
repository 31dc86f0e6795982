//! Trigonometric parts of a coefficient in the shortest of three ways of writing.

use std::collections::BTreeMap;

use super::coefficient::Term;
use crate::basis::{Angle, Basis};
use crate::expr::{Expr, cos, sin};
use crate::number::Rational;

/// Polynomials in sines and cosines with more terms, or of higher degree, stay as they are.
const MOST_TERMS: usize = 64;
const MOST_DEGREE: i64 = 12;

/// A product of powers of sines and cosines, or the sine or cosine of a sum of angles.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Wave {
    /// Exponents of cosine and sine for each base angle.
    Product(Vec<[i64; 2]>),
    /// The cosine of a combination of base angles; the first count that is not zero is positive.
    Cosine(Vec<i64>),
    /// The sine of such a combination.
    Sine(Vec<i64>),
}

/// The trigonometric polynomial of these terms in its shortest form.
pub(super) fn shortest(angles: &[Angle], terms: Vec<Term>) -> Vec<(Wave, Rational)> {
    let products: Vec<(Vec<[i64; 2]>, Rational)> = terms
        .into_iter()
        .map(|term| {
            let powers = angles
                .iter()
                .map(|angle| [term.exponents[angle.cosine], term.exponents[angle.cosine + 1]]);
            (powers.collect(), term.coefficient)
        })
        .collect();
    let small = products.len() <= MOST_TERMS
        && products.iter().all(|(powers, _)| {
            let within = |exponent: &i64| (0..=MOST_DEGREE).contains(exponent);
            powers.iter().flatten().all(within) && powers.iter().flatten().sum::<i64>() <= MOST_DEGREE
        });
    let as_waves = |products: Vec<(Vec<[i64; 2]>, Rational)>| {
        products
            .into_iter()
            .map(|(powers, coefficient)| (Wave::Product(powers), coefficient))
            .collect()
    };
    if !small {
        return as_waves(products);
    }
    let mut best = products;
    for place in 0..angles.len() {
        let other = with_squared_sines(&best, place);
        if reading_cost(&other) < reading_cost(&best) {
            best = other;
        }
    }
    let sums = as_sums(&best);
    if reading_cost(&sums) < reading_cost(&best) {
        sums
    } else {
        as_waves(best)
    }
}

/// Fewer terms first, then fewer minus signs.
fn reading_cost<T>(terms: &[(T, Rational)]) -> (usize, usize) {
    let negative = terms.iter().filter(|(_, coefficient)| coefficient.is_negative());
    (terms.len(), negative.count())
}

/// The same with `c^2 = 1 - s^2` applied to one angle as often as it can be.
fn with_squared_sines(
    products: &[(Vec<[i64; 2]>, Rational)],
    place: usize,
) -> Vec<(Vec<[i64; 2]>, Rational)> {
    let mut result: BTreeMap<Vec<[i64; 2]>, Rational> = BTreeMap::new();
    for (powers, coefficient) in products {
        // (1 - s^2)^n by the binomial theorem.
        let n = powers[place][0] / 2;
        let mut binomial = Rational::ONE;
        for k in 0..=n {
            let mut powers = powers.clone();
            powers[place][0] %= 2;
            powers[place][1] += 2 * k;
            let value = result.entry(powers).or_insert(Rational::ZERO);
            *value = &*value + &(coefficient * &binomial);
            let ratio = Rational::new(k - n, k + 1).expect("invariant: a count is above zero");
            binomial = &binomial * &ratio;
        }
    }
    result
        .into_iter()
        .filter(|(_, coefficient)| !coefficient.is_zero())
        .collect()
}

/// The same as sines and cosines of combinations of angles.
fn as_sums(products: &[(Vec<[i64; 2]>, Rational)]) -> Vec<(Wave, Rational)> {
    let half = Rational::new(1, 2).expect("invariant: two is not zero");
    let mut sums: BTreeMap<Wave, Rational> = BTreeMap::new();
    for (powers, coefficient) in products {
        let mut waves = vec![(Wave::Cosine(vec![0; powers.len()]), coefficient.clone())];
        for (place, [cosines, sines]) in powers.iter().enumerate() {
            for by_sine in (0..*cosines).map(|_| false).chain((0..*sines).map(|_| true)) {
                waves = waves
                    .into_iter()
                    .flat_map(|(wave, value)| times(wave, &(&value * &half), place, by_sine))
                    .collect();
            }
        }
        for (wave, value) in waves {
            let sum = sums.entry(wave).or_insert(Rational::ZERO);
            *sum = &*sum + &value;
        }
    }
    sums.into_iter()
        .filter(|(_, coefficient)| !coefficient.is_zero())
        .collect()
}

/// Twice a wave times the cosine or sine of one base angle: two waves.
fn times(wave: Wave, value: &Rational, place: usize, by_sine: bool) -> Vec<(Wave, Rational)> {
    let shifted = |counts: &[i64], by: i64| {
        let mut counts = counts.to_vec();
        counts[place] += by;
        counts
    };
    match (wave, by_sine) {
        (Wave::Cosine(a), false) => vec![
            cosine(shifted(&a, 1), value.clone()),
            cosine(shifted(&a, -1), value.clone()),
        ],
        (Wave::Sine(a), false) => sines([(shifted(&a, 1), value.clone()), (shifted(&a, -1), value.clone())]),
        (Wave::Cosine(a), true) => sines([(shifted(&a, 1), value.clone()), (shifted(&a, -1), -value)]),
        (Wave::Sine(a), true) => vec![
            cosine(shifted(&a, -1), value.clone()),
            cosine(shifted(&a, 1), -value),
        ],
        (product @ Wave::Product(_), _) => vec![(product, value.clone())],
    }
}

/// Whether the first count that is not zero is negative.
fn is_turned(counts: &[i64]) -> bool {
    counts
        .iter()
        .find(|count| **count != 0)
        .is_some_and(|count| *count < 0)
}

fn cosine(mut counts: Vec<i64>, value: Rational) -> (Wave, Rational) {
    if is_turned(&counts) {
        counts.iter_mut().for_each(|count| *count = -*count);
    }
    (Wave::Cosine(counts), value)
}

fn sines(waves: [(Vec<i64>, Rational); 2]) -> Vec<(Wave, Rational)> {
    let waves = waves
        .into_iter()
        .filter(|(counts, _)| counts.iter().any(|count| *count != 0));
    waves
        .map(|(mut counts, value)| {
            if is_turned(&counts) {
                counts.iter_mut().for_each(|count| *count = -*count);
                return (Wave::Sine(counts), -value);
            }
            (Wave::Sine(counts), value)
        })
        .collect()
}

/// A wave as an expression.
pub(super) fn expr(basis: &Basis, wave: &Wave) -> Expr {
    let combined = |counts: &[i64]| {
        let terms = counts.iter().zip(&basis.angles);
        Expr::sum_of(terms.map(|(count, angle)| *count * angle.value))
    };
    match wave {
        Wave::Product(powers) => {
            Expr::product_of(powers.iter().zip(&basis.angles).flat_map(|([c, s], angle)| {
                let cosine = basis.variables[angle.cosine];
                let sine = basis.variables[angle.cosine + 1];
                [cosine.power(*c), sine.power(*s)]
            }))
        }
        Wave::Cosine(counts) => cos(combined(counts)),
        Wave::Sine(counts) => sin(combined(counts)),
    }
}
