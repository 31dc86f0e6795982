//! Fractions of polynomials: a numerator over a product of powers of factors.
//!
//! The denominator is kept in factors, as it was met, and common factors are taken out where that is
//! seen. There are no lowest terms to be reached: in a ring with `s^2 + c^2 = 1` factors are not
//! unique. What is certain: a fraction is zero exactly when its numerator is, because no factor of
//! the denominator is the zero polynomial.

use crate::effort::Limit;
use crate::number::Rational;
use crate::ring::{Polynomial, Ring};

/// A numerator over factors with positive exponents.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Fraction {
    pub(crate) numerator: Polynomial,
    /// In increasing order; none is a constant, and of each the first coefficient is one.
    pub(crate) denominator: Denominator,
}

/// Factors with positive exponents.
pub(crate) type Denominator = Vec<(Polynomial, u32)>;

impl Fraction {
    /// A polynomial.
    pub(crate) fn whole(numerator: Polynomial) -> Self {
        Self {
            numerator,
            denominator: Denominator::new(),
        }
    }

    pub(crate) fn is_zero(&self) -> bool {
        self.numerator.is_zero()
    }

    /// The polynomial, where there is no denominator.
    pub(crate) fn as_polynomial(&self) -> Option<&Polynomial> {
        self.denominator.is_empty().then_some(&self.numerator)
    }
}

/// The sum of several fractions.
pub(crate) fn sum(ring: &Ring, parts: &[&Fraction]) -> Result<Fraction, Limit> {
    // Fractions over the same denominator are added first: they are the common case.
    let mut groups: Vec<(&Denominator, Vec<&Polynomial>)> = Vec::new();
    for part in parts.iter().filter(|part| !part.is_zero()) {
        match groups.iter_mut().find(|(known, _)| **known == part.denominator) {
            Some((_, numerators)) => numerators.push(&part.numerator),
            None => groups.push((&part.denominator, vec![&part.numerator])),
        }
    }
    let mut common = Denominator::new();
    for (denominator, _) in &groups {
        for (factor, exponent) in *denominator {
            raise(&mut common, factor, |known| known.max(*exponent));
        }
    }
    let mut numerators = Vec::new();
    for (denominator, parts) in groups {
        let mut numerator = ring.sum(&parts)?;
        for (factor, exponent) in &common {
            let present = denominator.iter().find(|(known, _)| known == factor);
            let missing = exponent - present.map_or(0, |(_, present)| *present);
            for _ in 0..missing {
                numerator = ring.product(&numerator, factor)?;
            }
        }
        numerators.push(numerator);
    }
    let numerator = ring.sum(&numerators.iter().collect::<Vec<_>>())?;
    cancelled(ring, numerator, common)
}

/// The product of two fractions.
pub(crate) fn product(ring: &Ring, left: &Fraction, right: &Fraction) -> Result<Fraction, Limit> {
    let numerator = ring.product(&left.numerator, &right.numerator)?;
    let mut denominator = left.denominator.clone();
    for (factor, exponent) in &right.denominator {
        raise(&mut denominator, factor, |known| known + exponent);
    }
    cancelled(ring, numerator, denominator)
}

/// The power with a natural exponent.
pub(crate) fn power(ring: &Ring, base: &Fraction, exponent: u32) -> Result<Fraction, Limit> {
    let denominator = base
        .denominator
        .iter()
        .map(|(factor, own)| {
            own.checked_mul(exponent)
                .map(|exponent| (factor.clone(), exponent))
                .ok_or(Limit::Operations(ring.meter.effort().operations))
        })
        .filter(|_| exponent > 0)
        .collect::<Result<_, _>>()?;
    Ok(Fraction {
        numerator: ring.power(&base.numerator, exponent)?,
        denominator,
    })
}

/// One over a fraction, `None` for zero.
///
/// The factors found in the numerator are the new denominator; what each stands for must not be zero.
pub(crate) fn inverse(ring: &Ring, fraction: &Fraction, variables: usize) -> Result<Option<Fraction>, Limit> {
    let Some((scale, factors)) = factors(ring, &fraction.numerator, variables)? else {
        return Ok(None);
    };
    let mut numerator = ring.constant(
        scale
            .reciprocal()
            .expect("invariant: a leading coefficient is not zero"),
    );
    for (factor, exponent) in &fraction.denominator {
        for _ in 0..*exponent {
            numerator = ring.product(&numerator, factor)?;
        }
    }
    cancelled(ring, numerator, factors).map(Some)
}

/// A number, and the powers of variables and the rest of which a polynomial is the product; `None`
/// for zero.
pub(crate) fn factors(
    ring: &Ring,
    polynomial: &Polynomial,
    variables: usize,
) -> Result<Option<(Rational, Denominator)>, Limit> {
    if polynomial.is_zero() {
        return Ok(None);
    }
    let (mut factors, mut rest) = (Denominator::new(), polynomial.clone());
    for place in 0..variables {
        let common = ring.common_exponent(&rest, place);
        if common > 0 {
            rest = ring.lowered(rest, place, common);
            raise(&mut factors, &ring.variable(place), |_| common);
        }
    }
    let scale = rest.coefficients()[0].clone();
    let monic = scale.reciprocal().expect("invariant: no coefficient is zero");
    let rest = ring.scaled(&rest, &monic)?;
    if rest.as_constant().is_none() {
        raise(&mut factors, &rest, |known| known + 1);
    }
    Ok(Some((scale, factors)))
}

/// Sets the exponent of a factor from the one it has, keeping factors in order.
fn raise(denominator: &mut Denominator, factor: &Polynomial, exponent: impl Fn(u32) -> u32) {
    match denominator.binary_search_by(|(known, _)| known.cmp(factor)) {
        Ok(place) => denominator[place].1 = exponent(denominator[place].1),
        Err(place) => denominator.insert(place, (factor.clone(), exponent(0))),
    }
}

/// The fraction with those factors taken out that divide the numerator.
fn cancelled(ring: &Ring, mut numerator: Polynomial, denominator: Denominator) -> Result<Fraction, Limit> {
    if numerator.is_zero() {
        return Ok(Fraction::whole(numerator));
    }
    let mut kept = Denominator::new();
    for (factor, mut exponent) in denominator {
        while exponent > 0 {
            match ring.exact_quotient(&numerator, &factor)? {
                Some(quotient) => numerator = quotient,
                None => break,
            }
            exponent -= 1;
        }
        if exponent > 0 {
            kept.push((factor, exponent));
        }
    }
    Ok(Fraction {
        numerator,
        denominator: kept,
    })
}
