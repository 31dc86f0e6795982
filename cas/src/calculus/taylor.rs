//! Taylor polynomials in one or several symbols about a point.

use std::collections::{BTreeMap, HashSet};

use super::{CalculusError, derivative};
use crate::effort::{Effort, Meter};
use crate::expr::{Expr, Substitution, Symbol, postorder};
use crate::number::Rational;

/// The Taylor polynomial of `expr` about a point, with all terms up to total degree `order`.
///
/// The point names each symbol in which the polynomial is wanted and its value there; other symbols
/// are parameters. With `h = x - a` the sum is over all `k` with `k_1 + ... + k_n <= order` of
/// `h_1^k_1 ... h_n^k_n / (k_1! ... k_n!)` times the partial derivative of those orders at `a`.
///
/// # Conditions
/// The expression has to have all these derivatives at the point. A coefficient that visibly has
/// no value there is an error; a coefficient such as `1/m` keeps its own condition `m != 0`.
///
/// # Errors
/// [`CalculusError::Undefined`] where the expression or a derivative has no value at the point;
/// [`CalculusError::TooLarge`] where the derivatives grow beyond the effort allowed.
///
/// # Example
/// ```
/// use cas::{Effort, Expr, Symbol, calculus::taylor, sin};
/// let x = Symbol::new("x")?;
/// let cubic = taylor(sin(x), &[(x, Expr::zero())], 3, &Effort::default())?;
/// assert_eq!(cubic, Expr::from(x) - Expr::from(x).power(3) / 6);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn taylor(
    expr: Expr,
    point: &[(Symbol, Expr)],
    order: u32,
    effort: &Effort,
) -> Result<Expr, CalculusError> {
    let meter = Meter::new(effort);
    let at_point = Substitution::new(point.iter().map(|(symbol, value)| (Expr::from(*symbol), *value)));
    let offsets: Vec<Expr> = point
        .iter()
        .map(|(symbol, value)| Expr::from(*symbol) - *value)
        .collect();
    let mut terms = Vec::new();
    // One level holds the derivatives of one total degree, by their orders in each symbol.
    let mut level = BTreeMap::from([(vec![0_u32; point.len()], expr)]);
    for degree in 0..=order {
        let mut next = BTreeMap::new();
        let mut counted = HashSet::new();
        for (orders, partial) in &level {
            let fresh = postorder(&[*partial])
                .into_iter()
                .filter(|node| counted.insert(*node));
            meter.spend(fresh.count() as u64)?;
            let value = partial.substituted(&at_point);
            if let Some(part) = postorder(&[value]).into_iter().find(|node| node.is_undefined()) {
                return Err(CalculusError::Undefined { part });
            }
            if !value.is_zero() {
                terms.push(monomial(value, orders, &offsets));
                meter.allow_terms(terms.len())?;
            }
            if degree < order {
                for (place, (symbol, _)) in point.iter().enumerate() {
                    let mut raised = orders.clone();
                    raised[place] += 1;
                    if let std::collections::btree_map::Entry::Vacant(entry) = next.entry(raised) {
                        let higher = derivative(*partial, *symbol)?;
                        if !higher.is_zero() {
                            entry.insert(higher);
                        }
                    }
                }
            }
        }
        if next.is_empty() {
            break;
        }
        level = next;
    }
    Ok(Expr::sum_of(terms))
}

/// `value h_1^k_1 ... h_n^k_n / (k_1! ... k_n!)`.
fn monomial(value: Expr, orders: &[u32], offsets: &[Expr]) -> Expr {
    let mut factorials = Rational::ONE;
    for order in orders {
        for factor in 1..=i64::from(*order) {
            factorials = &factorials * &Rational::from(factor);
        }
    }
    let scale = factorials
        .reciprocal()
        .expect("invariant: a factorial is not zero");
    let powers = offsets
        .iter()
        .zip(orders)
        .map(|(offset, order)| offset.power(i64::from(*order)));
    Expr::product_of([Expr::number(scale), value].into_iter().chain(powers))
}
