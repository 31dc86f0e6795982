//! The rules of differentiation, applied to a shared graph once, parts before wholes.

use std::collections::HashMap;

use super::CalculusError;
use crate::expr::{Application, Expr, Function, Kind, Symbol, postorder};
use crate::number::Rational;

/// Products above this many factors are differentiated pairwise instead of factor by factor, which
/// keeps the result from growing with the square of the number of factors.
const MOST_FACTORS: usize = 64;

/// The derivatives of all roots, given those of the symbols.
pub(super) fn differentiated(
    roots: &[Expr],
    of_symbol: impl Fn(Symbol) -> Result<Expr, CalculusError>,
) -> Result<Vec<Expr>, CalculusError> {
    // Only what is not zero is kept: most parts do not depend on the variable.
    let mut changing = Changing::default();
    for node in postorder(roots) {
        // Parts come first, so the first undefined node is a smallest one.
        if node.is_undefined() {
            return Err(CalculusError::Undefined { part: node });
        }
        let result = match node.kind() {
            Kind::Number(_) | Kind::Pi => continue,
            Kind::Symbol(symbol) => of_symbol(*symbol)?,
            Kind::Sum(terms) => Expr::sum_of(terms.iter().filter_map(|term| changing.of(*term))),
            Kind::Product(factors) => of_product(factors, &changing),
            Kind::Power(base, exponent) => match changing.of(*base) {
                // A base without a value everywhere keeps the exponent zero; the power is one where it has a value.
                Some(inner) if !exponent.is_zero() => of_power(*base, exponent, inner),
                _ => continue,
            },
            Kind::Elementary(function, argument) => match changing.of(*argument) {
                Some(inner) => of_elementary(node, *function, *argument, inner),
                None => continue,
            },
            Kind::Unknown(application) => of_unknown(application, &changing)?,
        };
        if !result.is_zero() {
            changing.0.insert(node, result);
        }
    }
    Ok(roots
        .iter()
        .map(|root| changing.of(*root).unwrap_or_else(Expr::zero))
        .collect())
}

/// The nodes whose derivative is not the number zero, with it.
#[derive(Default)]
struct Changing(HashMap<Expr, Expr>);

impl Changing {
    fn of(&self, expr: Expr) -> Option<Expr> {
        self.0.get(&expr).copied()
    }
}

/// `(f g)' = f' g + f g'` for any number of factors.
fn of_product(factors: &[Expr], changing: &Changing) -> Expr {
    if factors.len() > MOST_FACTORS {
        return of_long_product(factors, changing);
    }
    Expr::sum_of(factors.iter().enumerate().filter_map(|(place, factor)| {
        let inner = changing.of(*factor)?;
        let others = factors
            .iter()
            .enumerate()
            .filter(|(other, _)| *other != place)
            .map(|(_, factor)| *factor);
        Some(Expr::product_of(std::iter::once(inner).chain(others)))
    }))
}

/// The same by pairs of neighbours, then pairs of pairs.
fn of_long_product(factors: &[Expr], changing: &Changing) -> Expr {
    let mut level: Vec<(Expr, Option<Expr>)> = factors
        .iter()
        .map(|factor| (*factor, changing.of(*factor)))
        .collect();
    while level.len() > 1 {
        level = level
            .chunks(2)
            .map(|pair| match pair {
                [(f, f_rate), (g, g_rate)] => {
                    let terms = [f_rate.map(|rate| rate * *g), g_rate.map(|rate| *f * rate)];
                    let rate = terms.into_iter().flatten().reduce(|a, b| a + b);
                    (*f * *g, rate)
                }
                _ => pair[0],
            })
            .collect();
    }
    level[0].1.unwrap_or_else(Expr::zero)
}

/// `(b^e)' = e b^(e-1) b'` for a constant rational exponent other than zero.
fn of_power(base: Expr, exponent: &Rational, inner: Expr) -> Expr {
    let lowered = base.power(exponent - &Rational::ONE);
    Expr::product_of([exponent.clone().into(), lowered, inner])
}

/// The derivative of each elementary function times that of its argument.
fn of_elementary(node: Expr, function: Function, argument: Expr, inner: Expr) -> Expr {
    match function {
        Function::Sine => Expr::elementary(Function::Cosine, argument) * inner,
        Function::Cosine => {
            Expr::product_of([Expr::from(-1), Expr::elementary(Function::Sine, argument), inner])
        }
        // Not 1 / cos^2: the tangent is at hand, and both have a value at the same points.
        Function::Tangent => (1 + node.squared()) * inner,
        Function::Exponential => node * inner,
        Function::Logarithm => inner / argument,
    }
}

/// The chain rule for an undetermined function: its partial derivative by each argument times the
/// derivative of that argument.
fn of_unknown(application: &Application, changing: &Changing) -> Result<Expr, CalculusError> {
    let mut terms = Vec::new();
    for (place, argument) in application.arguments().iter().enumerate() {
        if let Some(inner) = changing.of(*argument) {
            if application.orders()[place] == u32::MAX {
                return Err(CalculusError::Order {
                    function: application.name(),
                });
            }
            terms.push(application.differentiated(place) * inner);
        }
    }
    Ok(Expr::sum_of(terms))
}
