//! Lengths without roots: squares of vectors reduced by Pythagoras, and their roots where they are monomials.

use cas::{Expr, Function, Kind, Rational};

use super::vector::Vector;

/// A number times integer powers of bases.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct Powers {
    pub(super) coefficient: Rational,
    pub(super) powers: Vec<(Expr, i64)>,
}

impl Powers {
    /// The product as an expression.
    pub(super) fn product(&self) -> Expr {
        let powers = self.powers.iter().map(|(base, exponent)| base.power(*exponent));
        Expr::product_of(std::iter::once(Expr::number(self.coefficient.clone())).chain(powers))
    }
}

/// The square of a vector's length, with `A sin^2 + A cos^2` written as `A` wherever it occurs.
///
/// The identity holds at every angle, so no condition comes with it.
pub(super) fn squared_length(vector: Vector) -> Expr {
    let mut terms = vector.dot(vector).terms();
    // Each round has one term less, so the loop ends.
    while let Some((sine, cosine, rest)) = pythagorean_pair(&terms) {
        let kept = terms.iter().enumerate();
        let kept = kept.filter(|(place, _)| *place != sine && *place != cosine);
        let others = kept.map(|(_, term)| *term);
        terms = Expr::sum_of(others.chain([rest])).terms();
    }
    Expr::sum_of(terms)
}

/// The places of a term with a squared sine and of the same term with the squared cosine, and what
/// both are multiplied by.
fn pythagorean_pair(terms: &[Expr]) -> Option<(usize, usize, Expr)> {
    terms.iter().enumerate().find_map(|(place, term)| {
        term.factors().iter().find_map(|factor| {
            let angle = squared(*factor, Function::Sine)?;
            let others = term.factors().into_iter().filter(|other| other != factor);
            let rest = Expr::product_of(others);
            let partner = rest * Expr::elementary(Function::Cosine, angle).squared();
            let partner = terms.iter().position(|other| *other == partner)?;
            Some((place, partner, rest))
        })
    })
}

/// The argument, where the factor is the square of this function.
fn squared(factor: Expr, function: Function) -> Option<Expr> {
    match factor.kind() {
        Kind::Power(base, exponent) if *exponent == Rational::from(2) => match base.kind() {
            Kind::Elementary(found, argument) if *found == function => Some(*argument),
            _ => None,
        },
        _ => None,
    }
}

/// The root of a square number times even powers: half the exponents.
pub(super) fn even_powers(square: Expr) -> Option<Powers> {
    let (coefficient, rest) = square.coefficient_and_rest();
    let mut powers = Vec::new();
    for factor in rest.factors().into_iter().filter(|factor| !factor.is_one()) {
        let Kind::Power(base, exponent) = factor.kind() else {
            return None;
        };
        let exponent = exponent.as_integer().filter(|exponent| exponent % 2 == 0)?;
        powers.push((*base, exponent / 2));
    }
    Some(Powers {
        coefficient: coefficient.exact_root(2)?,
        powers,
    })
}

/// The quotient, cancelled in those terms that have every power of the divisor.
///
/// The caller states that the divisor is not zero.
pub(super) fn divided(dividend: Expr, divisor: &Powers) -> Expr {
    let quotients = dividend
        .terms()
        .into_iter()
        .map(|term| cancelled(term, divisor).unwrap_or_else(|| term / divisor.product()));
    Expr::sum_of(quotients)
}

fn cancelled(term: Expr, divisor: &Powers) -> Option<Expr> {
    if term.is_zero() {
        return Some(term);
    }
    let (coefficient, rest) = term.coefficient_and_rest();
    let mut factors = rest.factors();
    for (base, exponent) in &divisor.powers {
        let place = factors.iter().position(|factor| {
            let found = match factor.kind() {
                Kind::Power(inner, power) if inner == base => power.as_integer(),
                _ => (factor == base).then_some(1),
            };
            found.is_some_and(|found| *exponent > 0 && found >= *exponent)
        })?;
        let factor = factors.swap_remove(place);
        let found = match factor.kind() {
            Kind::Power(inner, power) if inner == base => power.as_integer()?,
            _ => 1,
        };
        factors.push(base.power(found - exponent));
    }
    let coefficient = coefficient.divided_by(&divisor.coefficient)?;
    Some(Expr::product_of(
        std::iter::once(Expr::number(coefficient)).chain(factors),
    ))
}

#[cfg(test)]
mod tests {
    use cas::{cos, exact, sin};

    use super::*;
    use crate::model::vector;

    fn symbols() -> [Expr; 4] {
        ["l", "s", "a", "b"].map(|name| Expr::symbol(name).expect("a valid name"))
    }

    #[test]
    fn squares_are_reduced_in_the_plane_and_in_space() {
        let [l, s, a, b] = symbols();
        assert_eq!(squared_length(vector(s * cos(a), s * sin(a), 0)), s * s);
        assert_eq!(squared_length(vector(-sin(a), cos(a), 0)), Expr::one());
        let on_sphere = vector(l * sin(a) * cos(b), l * sin(a) * sin(b), -l * cos(a));
        assert_eq!(squared_length(on_sphere), l * l);
        assert_eq!(squared_length(vector(s * cos(a), s * sin(b), 0)).terms().len(), 2);
        assert_eq!(squared_length(vector(2 * cos(a), sin(a), 0)).terms().len(), 2);
        assert_eq!(squared_length(vector(s * cos(a), s * sin(a), l)), s * s + l * l);
    }

    #[test]
    fn roots_of_even_powers() {
        let [l, s, ..] = symbols();
        let root = even_powers(4 * l * l * s.power(4)).expect("a square");
        assert_eq!(root.product(), 2 * l * s * s);
        assert_eq!(even_powers(2 * l * l), None);
        assert_eq!(even_powers(l * l + s * s), None);
        assert_eq!(even_powers(l), None);
        assert_eq!(even_powers(-l * l), None);
        let quarter = even_powers(exact("0.25").expect("a number")).expect("a square");
        assert_eq!(quarter.product(), exact("0.5").expect("a number"));
    }

    #[test]
    fn quotients_cancel_term_by_term() {
        let [l, s, a, _] = symbols();
        let divisor = even_powers(4 * l * l).expect("a square");
        assert_eq!(divided(2 * l * sin(a), &divisor), sin(a));
        assert_eq!(divided(l * l, &divisor), l / 2);
        assert_eq!(divided(2 * l + s, &divisor), 1 + s / (2 * l));
        assert_eq!(divided(Expr::zero(), &divisor), Expr::zero());
    }
}
