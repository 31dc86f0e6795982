//! From canonical form back to what an engineer would write.
//!
//! A result is a sum over products of the symbols that it is collected by, such as accelerations and
//! products of velocities; each has one coefficient with common factors taken out. Sines and cosines
//! are written in the shortest of three ways: as products, with squares of sines in place of squares
//! of cosines, or as sines and cosines of sums and differences of angles.

mod coefficient;
#[cfg(test)]
mod tests;
mod trigonometric;

use std::collections::BTreeMap;

use crate::canonical::Canonical;
use crate::effort::{Effort, Meter};
use crate::expr::{Expr, Kind, Symbol};
use coefficient::Term;

/// Longer expressions are given back as they are: nobody reads them, and arranging them costs more
/// than it shows.
const MOST_TERMS: usize = 20_000;

/// The expression expanded, recombined and collected by products of these symbols.
///
/// The result equals the expression wherever that has a value. Where the work allowed does not
/// suffice, or a part has no value, the expression is given back as it is.
///
/// # Example
/// ```
/// use cas::{Effort, Expr, cos, present::collected, sin};
/// let [a, b, x, y] = ["a", "b", "x", "y"].map(|name| Expr::symbol(name).expect("a valid name"));
/// let by = [x.as_symbol().expect("a symbol")];
/// let found = collected(a * x + b * x + cos(a) * cos(y) + sin(a) * sin(y), &by, &Effort::default());
/// assert_eq!(found, (a + b) * x + cos(a - y));
/// ```
#[must_use]
pub fn collected(expr: Expr, by: &[Symbol], effort: &Effort) -> Expr {
    let meter = Meter::new(effort);
    let Ok(form) = Canonical::of(&[expr], &meter) else {
        return expr;
    };
    let fraction = &form.fractions[0];
    if fraction.numerator.len() > MOST_TERMS {
        return expr;
    }
    // Powers of single variables are divided by term by term; longer divisors stay under the whole.
    let (mut single, mut below) = (vec![0_i64; form.basis.variables.len()], Vec::new());
    for (factor, exponent) in &fraction.denominator {
        let exponent = i64::from(*exponent);
        let (exponents, _) = form
            .ring
            .terms(factor)
            .next()
            .expect("invariant: no factor is zero");
        if factor.len() == 1 {
            for (place, power) in exponents.iter().enumerate() {
                single[place] += i64::from(*power) * exponent;
            }
        } else {
            let terms = terms_of(&form, factor, &vec![0; single.len()]);
            below.push(arranged(&form, terms, &[]).power(-exponent));
        }
    }
    let terms = terms_of(&form, &fraction.numerator, &single);
    let above = arranged(&form, terms, by);
    Expr::product_of([above].into_iter().chain(below))
}

/// The terms of a polynomial, each over the same powers of variables.
fn terms_of(form: &Canonical, polynomial: &crate::ring::Polynomial, below: &[i64]) -> Vec<Term> {
    let terms = form.ring.terms(polynomial).map(|(exponents, coefficient)| Term {
        exponents: exponents
            .iter()
            .zip(below)
            .map(|(above, below)| i64::from(*above) - below)
            .collect(),
        coefficient: coefficient.clone(),
    });
    terms.collect()
}

/// Terms collected by products of symbols, as an expression.
fn arranged(form: &Canonical, terms: Vec<Term>, by: &[Symbol]) -> Expr {
    let variables = &form.basis.variables;
    let leads: Vec<usize> = (0..variables.len())
        .filter(|place| {
            variables[*place]
                .as_symbol()
                .is_some_and(|symbol| by.contains(&symbol))
        })
        .collect();
    let mut groups: BTreeMap<Vec<i64>, Vec<Term>> = BTreeMap::new();
    for mut term in terms {
        let key = leads
            .iter()
            .map(|place| std::mem::take(&mut term.exponents[*place]))
            .collect();
        groups.entry(key).or_default().push(term);
    }
    Expr::sum_of(groups.into_iter().map(|(key, terms)| {
        let lead = leads
            .iter()
            .zip(key)
            .map(|(place, exponent)| variables[*place].power(exponent));
        let lead = Expr::product_of(lead);
        let coefficient = coefficient::written(form, terms);
        // A number in front of a sum goes into it where nothing else stands beside the sum.
        match coefficient.kind() {
            Kind::Sum(_) if lead.is_one() => coefficient,
            _ => Expr::product_of([coefficient, lead]),
        }
    }))
}
