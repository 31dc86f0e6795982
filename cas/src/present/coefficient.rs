//! One coefficient: trigonometric parts with their factors, common factors in front.

use std::collections::BTreeMap;

use num_integer::Integer;

use super::trigonometric::{self, Wave};
use crate::canonical::Canonical;
use crate::expr::Expr;
use crate::number::Rational;

/// A term of a polynomial in which variables may stand at negative exponents.
#[derive(Clone, Debug)]
pub(super) struct Term {
    pub(super) exponents: Vec<i64>,
    pub(super) coefficient: Rational,
}

/// Terms as an expression: the common factor, times a sum over trigonometric parts.
pub(super) fn written(form: &Canonical, terms: Vec<Term>) -> Expr {
    let first_circle = form.basis.angles.iter().map(|angle| angle.cosine).min();
    let circle = first_circle.unwrap_or(usize::MAX);
    let is_circular = |place: usize| place >= circle && place < circle + 2 * form.basis.angles.len();

    // By what stands beside sines and cosines.
    let mut beside: BTreeMap<Vec<i64>, Vec<Term>> = BTreeMap::new();
    for mut term in terms {
        let mut key = term.exponents.clone();
        for (place, exponent) in term.exponents.iter_mut().enumerate() {
            if is_circular(place) {
                key[place] = 0;
            } else {
                *exponent = 0;
            }
        }
        beside.entry(key).or_default().push(term);
    }
    // By sines and cosines, each written in its shortest way.
    let mut waves: BTreeMap<Wave, Vec<Term>> = BTreeMap::new();
    for (key, terms) in beside {
        for (wave, coefficient) in trigonometric::shortest(&form.basis.angles, terms) {
            waves.entry(wave).or_default().push(Term {
                exponents: key.clone(),
                coefficient,
            });
        }
    }
    let all: Vec<Term> = waves.values().flatten().cloned().collect();
    let (common, factor) = common_factor(form, &all);
    let parts = waves.into_iter().map(|(wave, terms)| {
        let terms: Vec<Term> = terms.iter().map(|term| term.without(&common)).collect();
        let (inner, inner_factor) = common_factor(form, &terms);
        let sum = Expr::sum_of(terms.iter().map(|term| term.without(&inner).expr(form)));
        Expr::product_of([inner_factor, sum, trigonometric::expr(&form.basis, &wave)])
    });
    Expr::product_of([factor, Expr::sum_of(parts)])
}

impl Term {
    fn without(&self, common: &Term) -> Term {
        let exponents = self.exponents.iter().zip(&common.exponents);
        Term {
            exponents: exponents.map(|(own, common)| own - common).collect(),
            coefficient: self
                .coefficient
                .divided_by(&common.coefficient)
                .expect("invariant: a common factor is not zero"),
        }
    }

    fn expr(&self, form: &Canonical) -> Expr {
        let powers = self.exponents.iter().zip(&form.basis.variables);
        let powers = powers.filter(|(exponent, _)| **exponent != 0);
        let powers = powers.map(|(exponent, variable)| variable.power(*exponent));
        Expr::product_of([Expr::number(self.coefficient.clone())].into_iter().chain(powers))
    }
}

/// The power that two powers of one variable share; one above and one below the line share none.
fn shared(a: i64, b: i64) -> i64 {
    if a.signum() == b.signum() {
        a.signum() * a.abs().min(b.abs())
    } else {
        0
    }
}

/// The greatest common factor of terms, as a term and as an expression.
fn common_factor(form: &Canonical, terms: &[Term]) -> (Term, Expr) {
    let mut common = Term {
        exponents: vec![0; form.basis.variables.len()],
        coefficient: Rational::ONE,
    };
    if let [first, rest @ ..] = terms {
        common.exponents.clone_from(&first.exponents);
        let mut numerator = first.coefficient.numerator();
        let mut denominator = first.coefficient.denominator();
        for term in rest {
            for (common, own) in common.exponents.iter_mut().zip(&term.exponents) {
                *common = shared(*common, *own);
            }
            numerator = numerator.gcd(&term.coefficient.numerator());
            denominator = denominator.lcm(&term.coefficient.denominator());
        }
        common.coefficient = Rational::quotient(numerator, denominator)
            .expect("invariant: a denominator is not zero")
            .absolute();
        if terms.iter().all(|term| term.coefficient.is_negative()) {
            common.coefficient = -common.coefficient;
        }
    }
    let expr = common.expr(form);
    (common, expr)
}
