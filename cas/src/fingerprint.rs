//! Fingerprints: evaluation modulo a prime at random points, circle points parametrised rationally.
//!
//! A difference that is a nonzero rational function of degree `d` in the parameters vanishes at a
//! random point modulo a prime `p` with a chance of at most `d / p` (the lemma of DeMillo, Lipton,
//! Schwartz and Zippel). What does not vanish once is not zero as a function of independent variables.

use std::collections::HashMap;

use crate::basis::{Basis, Leaf};
use crate::draw::Draw;
use crate::evaluate::{Field, values};
use crate::expr::{Expr, Kind};
use crate::number::{Rational, inverse_modulo, multiplied_modulo};

/// The prime `2^61 - 1`.
const PRIME: u64 = (1 << 61) - 1;
const PRIME_BITS: u32 = 60;

/// How many points are tried.
const POINTS: u32 = 4;

/// A number modulo [`PRIME`].
#[derive(Clone, Debug, PartialEq)]
struct Residue(u64);

impl Field for Residue {
    fn of(value: &Rational) -> Option<Self> {
        value.modulo(PRIME).map(Self)
    }

    fn sum(&self, other: &Self) -> Self {
        Self((self.0 + other.0) % PRIME)
    }

    fn product(&self, other: &Self) -> Option<Self> {
        Some(Self(multiplied_modulo(self.0, other.0, PRIME)))
    }

    fn inverse(&self) -> Option<Self> {
        inverse_modulo(self.0, PRIME).map(Self)
    }
}

/// What the fingerprints of a difference say.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Fingerprint {
    /// It vanishes at every point.
    Vanishes {
        points: u32,
        /// The chance of a nonzero difference to do so is at most two to minus this power.
        chance_exponent: u32,
    },
    /// It does not vanish at some point.
    Differs,
    /// It could not be evaluated.
    Unknown,
}

/// The fingerprint of the difference of two expressions.
pub(crate) fn of_difference(basis: &Basis, left: Expr, right: Expr) -> Fingerprint {
    let mut draw = Draw::seeded(left.content_hash() ^ right.content_hash().rotate_left(1));
    let mut points = 0;
    for _ in 0..POINTS {
        let Some(found) = values(basis, &[left, right], &point(basis, &mut draw)) else {
            continue;
        };
        if found[0] != found[1] {
            return Fingerprint::Differs;
        }
        points += 1;
    }
    let bits = PRIME_BITS.saturating_sub(degree_bits(basis, &[left, right]));
    if points == 0 || bits == 0 {
        return Fingerprint::Unknown;
    }
    Fingerprint::Vanishes {
        points,
        chance_exponent: points * bits,
    }
}

/// Random values for all variables but roots; those of an angle lie on the circle.
fn point(basis: &Basis, draw: &mut Draw) -> Vec<Option<Residue>> {
    let mut variables: Vec<Option<Residue>> = basis
        .variables
        .iter()
        .map(|_| Some(Residue(draw.below(PRIME))))
        .collect();
    for angle in &basis.angles {
        let [cosine, sine] =
            circle_point(&Residue(draw.below(PRIME))).map_or([None, None], |pair| pair.map(Some));
        variables[angle.cosine] = cosine;
        variables[angle.cosine + 1] = sine;
    }
    // Their relations would not hold at random values; without them a difference seems to be one.
    for root in &basis.roots {
        variables[root.place] = None;
    }
    variables
}

/// The point `((1 - t^2) / (1 + t^2), 2 t / (1 + t^2))` of the unit circle.
pub(crate) fn circle_point<F: Field>(t: &F) -> Option<[F; 2]> {
    let (one, minus) = (F::of(&Rational::ONE)?, F::of(&(-1).into())?);
    let square = t.product(t)?;
    let below = one.sum(&square).inverse()?;
    Some([
        one.sum(&square.product(&minus)?).product(&below)?,
        t.sum(t).product(&below)?,
    ])
}

/// The bits of a bound on the degree of the difference as a rational function of the parameters.
fn degree_bits(basis: &Basis, roots: &[Expr]) -> u32 {
    let mut degrees: HashMap<Expr, u64> = HashMap::new();
    for node in basis.nodes(roots) {
        let degree = match basis.leaf(node) {
            Some(Leaf::Number(_)) => 0,
            Some(Leaf::Turn { angles, .. }) => angles.iter().fold(0, |sum: u64, (_, count)| {
                sum.saturating_add(count.unsigned_abs().saturating_mul(4))
            }),
            Some(Leaf::Root { power, .. }) => power.unsigned_abs(),
            Some(Leaf::Variable(_)) => 1,
            None => {
                let parts = node.children().iter();
                let sum = parts.fold(0, |sum: u64, part| sum.saturating_add(degrees[part]));
                match node.kind() {
                    Kind::Power(_, exponent) => {
                        sum.saturating_mul(exponent.as_integer().map_or(u64::MAX, i64::unsigned_abs))
                    }
                    _ => sum,
                }
            }
        };
        degrees.insert(node, degree);
    }
    let degree = roots
        .iter()
        .fold(0, |sum: u64, root| sum.saturating_add(degrees[root]));
    u64::BITS - degree.leading_zeros()
}
