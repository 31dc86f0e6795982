//! Exact evaluation: expressions over a basis at values of its variables, in any field.

use std::collections::HashMap;

use crate::basis::{Basis, Leaf};
use crate::expr::{Expr, Function, Kind};
use crate::number::Rational;

/// What exact evaluation needs of numbers.
pub(crate) trait Field: Clone + Sized {
    /// The value of a rational number, where it has one.
    fn of(value: &Rational) -> Option<Self>;
    fn sum(&self, other: &Self) -> Self;
    /// The product, `None` where it is larger than is worth its time.
    fn product(&self, other: &Self) -> Option<Self>;
    /// One over the value, `None` for zero.
    fn inverse(&self) -> Option<Self>;
}

/// Exact values above this many bits are given up: a witness of that size tells nobody anything, and
/// a power such as `x^999999999` would take for ever.
const MOST_BITS: u64 = 65_536;

impl Field for Rational {
    fn of(value: &Rational) -> Option<Self> {
        Some(value.clone())
    }

    fn sum(&self, other: &Self) -> Self {
        self + other
    }

    fn product(&self, other: &Self) -> Option<Self> {
        (self.bits() + other.bits() <= MOST_BITS).then(|| self * other)
    }

    fn inverse(&self) -> Option<Self> {
        self.reciprocal()
    }
}

/// The values of expressions where the variables of the basis have these values.
///
/// `None` where one of them has no value there, or none that the numbers can express.
pub(crate) fn values<F: Field>(basis: &Basis, roots: &[Expr], variables: &[Option<F>]) -> Option<Vec<F>> {
    let mut done: HashMap<Expr, F> = HashMap::new();
    let one = F::of(&Rational::ONE)?;
    for node in basis.nodes(roots) {
        let value = match basis.leaf(node) {
            Some(leaf) => leaf_value(basis, leaf, variables)?,
            None => match node.kind() {
                Kind::Sum(terms) => terms
                    .iter()
                    .skip(1)
                    .fold(done[&terms[0]].clone(), |sum, term| sum.sum(&done[term])),
                Kind::Product(factors) => factors
                    .iter()
                    .try_fold(one.clone(), |product, factor| product.product(&done[factor]))?,
                Kind::Power(base, exponent) => power(&done[base], exponent.as_integer()?)?,
                Kind::Number(value) => F::of(value)?,
                _ => return None,
            },
        };
        done.insert(node, value);
    }
    Some(roots.iter().map(|root| done[root].clone()).collect())
}

fn leaf_value<F: Field>(basis: &Basis, leaf: &Leaf, variables: &[Option<F>]) -> Option<F> {
    match leaf {
        Leaf::Number(value) => F::of(value),
        Leaf::Variable(place) => variables[*place].clone(),
        Leaf::Root {
            place,
            power: exponent,
        } => power(&variables[*place].clone()?, *exponent),
        Leaf::Turn {
            function,
            angles,
            quarters,
        } => {
            let (one, minus) = (F::of(&Rational::ONE)?, F::of(&(-1).into())?);
            let zero = one.sum(&minus);
            let mut turned = [one.clone(), zero.clone()];
            for (angle, count) in angles {
                let cosine = basis.angles[*angle].cosine;
                let (c, s) = (variables[cosine].clone()?, variables[cosine + 1].clone()?);
                let mut square = if *count < 0 {
                    [c, s.product(&minus)?]
                } else {
                    [c, s]
                };
                let mut rest = count.unsigned_abs();
                while rest > 0 {
                    if rest & 1 == 1 {
                        turned = turn(&turned, &square, &minus)?;
                    }
                    rest >>= 1;
                    if rest > 0 {
                        square = turn(&square, &square, &minus)?;
                    }
                }
            }
            for _ in 0..*quarters {
                turned = turn(&turned, &[zero.clone(), one.clone()], &minus)?;
            }
            let [cosine, sine] = turned;
            match function {
                Function::Cosine => Some(cosine),
                Function::Sine => Some(sine),
                Function::Tangent => sine.product(&cosine.inverse()?),
                _ => None,
            }
        }
    }
}

fn turn<F: Field>([c, s]: &[F; 2], [d, t]: &[F; 2], minus: &F) -> Option<[F; 2]> {
    Some([
        c.product(d)?.sum(&s.product(t)?.product(minus)?),
        s.product(d)?.sum(&c.product(t)?),
    ])
}

fn power<F: Field>(base: &F, exponent: i64) -> Option<F> {
    let mut square = if exponent < 0 {
        base.inverse()?
    } else {
        base.clone()
    };
    let (mut result, mut rest) = (F::of(&Rational::ONE)?, exponent.unsigned_abs());
    while rest > 0 {
        if rest & 1 == 1 {
            result = result.product(&square)?;
        }
        rest >>= 1;
        if rest > 0 {
            square = square.product(&square)?;
        }
    }
    Some(result)
}
