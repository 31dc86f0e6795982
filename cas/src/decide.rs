//! The ladder of verdicts: whether two expressions are equal - proved, refuted, supported or left open.
//!
//! | rung | reached by | promises |
//! |---|---|---|
//! | `Proved` by structure | both sides are one node | equality wherever both have values |
//! | `Refuted` | exact values, or intervals that do not overlap | the sides differ at the witness |
//! | `Proved` by canonical form | the difference reduces to zero | equality where the conditions hold |
//! | `Supported` | residues that vanish, or intervals that overlap | evidence, no proof |
//! | `Undecided` | effort exhausted, or no point found | nothing |
//!
//! The class decided completely: rational functions over Q of symbols, undetermined functions, and
//! sines, cosines and tangents of rational linear combinations of monomials and of quarter turns.
//! With roots, exponentials, logarithms and other multiples of pi a zero difference in canonical form
//! is still a proof; a difference that is not zero proves nothing there, and intervals are asked.

mod condition;
#[cfg(test)]
mod properties;
#[cfg(test)]
mod tests;
mod tidy;
mod verdict;

pub use condition::Condition;
pub use tidy::tidied;
pub use verdict::{Evidence, Method, Proof, Reason, Value, Verdict, Witness};

use crate::basis::{Basis, Failure};
use crate::canonical::Canonical;
use crate::effort::{Effort, Limit, Meter};
use crate::expr::Expr;
use crate::fingerprint::{self, Fingerprint};
use crate::fraction;
use crate::number::Rational;
use crate::sample::{ByIntervals, by_intervals, exact_witness};

/// Whether two expressions are equal.
///
/// # Conditions
/// `Proved` holds wherever the conditions of the proof do; they name every divisor, every argument of
/// a logarithm and every radicand that may lack a value.
///
/// # Example
/// ```
/// use cas::{Effort, Expr, Verdict, cos, decide::compare, sin};
/// let x = Expr::symbol("x")?;
/// let circle = sin(x).squared() + cos(x).squared();
/// assert!(compare(circle, Expr::from(1), &Effort::default()).is_proved());
/// let Verdict::Refuted(witness) = compare(sin(2 * x), 2 * sin(x), &Effort::default()) else {
///     panic!("the sides differ");
/// };
/// assert_ne!(witness.left, witness.right);
/// # Ok::<(), cas::NameError>(())
/// ```
pub fn compare(left: Expr, right: Expr, effort: &Effort) -> Verdict {
    let meter = Meter::new(effort);
    if left == right {
        return same(left, &meter);
    }
    let basis = match Basis::of(&[left, right], &meter) {
        Ok(basis) => basis,
        Err(failure) => return without_basis(left, right, failure),
    };
    let fingerprint = fingerprint::of_difference(&basis, left, right);
    if fingerprint == Fingerprint::Differs
        && let Some(witness) = exact_witness(&basis, left, right)
    {
        return Verdict::Refuted(witness);
    }
    match canonical_difference(basis.clone(), left, right, &meter) {
        Ok(Difference::None(proof)) => Verdict::Proved(proof),
        Ok(Difference::Some) => unequal_in_form(&basis, left, right),
        Err(Failure::Undefined(part)) => Verdict::Undecided(Reason::Undefined(part)),
        Err(Failure::Limit(limit)) => beyond(limit, fingerprint, left, right),
    }
}

/// Whether an expression is zero wherever it has a value.
///
/// # Example
/// ```
/// use cas::{Effort, Expr, decide::is_zero};
/// let x = Expr::symbol("x")?;
/// let difference = (x.squared() - 1) / (x - 1) - (x + 1);
/// assert!(is_zero(difference, &Effort::default()).is_proved());
/// # Ok::<(), cas::NameError>(())
/// ```
pub fn is_zero(expr: Expr, effort: &Effort) -> Verdict {
    compare(expr, Expr::zero(), effort)
}

/// What must hold for expressions to have values, each condition once and none that another implies.
///
/// # Errors
/// [`Reason::Undefined`] where a part has no value anywhere, [`Reason::Limit`].
pub fn conditions(of: &[Expr], effort: &Effort) -> Result<Vec<Condition>, Reason> {
    if of.iter().all(|expr| expr.is_total()) {
        return Ok(Vec::new());
    }
    let meter = Meter::new(effort);
    match Canonical::of(of, &meter) {
        Ok(form) => Ok(tidied(form.conditions())),
        Err(Failure::Undefined(part)) => Err(Reason::Undefined(part)),
        Err(Failure::Limit(limit)) => Err(Reason::Limit(limit)),
    }
}

/// One expression on both sides: equal wherever it has a value.
fn same(expr: Expr, meter: &Meter) -> Verdict {
    match conditions(&[expr], meter.effort()) {
        Ok(conditions) => Verdict::Proved(Proof {
            method: Method::Structure,
            conditions,
        }),
        Err(reason) => Verdict::Undecided(reason),
    }
}

/// The difference in canonical form.
enum Difference {
    None(Proof),
    Some,
}

fn canonical_difference(basis: Basis, left: Expr, right: Expr, meter: &Meter) -> Result<Difference, Failure> {
    let form = Canonical::in_basis(basis, &[left, right], meter)?;
    let [a, b] = [&form.fractions[0], &form.fractions[1]];
    let minus = fraction::product(
        &form.ring,
        b,
        &fraction::Fraction::whole(form.ring.constant(Rational::from(-1))),
    )?;
    if !fraction::sum(&form.ring, &[a, &minus])?.is_zero() {
        return Ok(Difference::Some);
    }
    Ok(Difference::None(Proof {
        method: Method::CanonicalForm {
            angles: form.basis.angles.iter().map(|angle| angle.value).collect(),
        },
        conditions: tidied(form.conditions()),
    }))
}

/// The canonical forms differ: a proof of inequality in the class decided completely, and a question
/// to intervals elsewhere.
fn unequal_in_form(basis: &Basis, left: Expr, right: Expr) -> Verdict {
    if let Some(witness) = exact_witness(basis, left, right) {
        return Verdict::Refuted(witness);
    }
    match by_intervals(left, right) {
        ByIntervals::Differ(witness) => Verdict::Refuted(witness),
        ByIntervals::Overlap(0) => Verdict::Undecided(Reason::NoPoint),
        ByIntervals::Overlap(_) if basis.complete => Verdict::Undecided(Reason::NoWitness),
        ByIntervals::Overlap(points) => Verdict::Supported(Evidence::Intervals { points }),
    }
}

/// The canonical form was not reached.
fn beyond(limit: Limit, fingerprint: Fingerprint, left: Expr, right: Expr) -> Verdict {
    if limit == Limit::Stopped {
        return Verdict::Undecided(Reason::Limit(limit));
    }
    match fingerprint {
        Fingerprint::Vanishes {
            points,
            chance_exponent,
        } => Verdict::Supported(Evidence::Residues {
            evaluations: points,
            chance_exponent,
            limit,
        }),
        _ => match by_intervals(left, right) {
            ByIntervals::Differ(witness) => Verdict::Refuted(witness),
            ByIntervals::Overlap(_) => Verdict::Undecided(Reason::Limit(limit)),
        },
    }
}

/// Not even a basis was found.
fn without_basis(left: Expr, right: Expr, failure: Failure) -> Verdict {
    match failure {
        Failure::Undefined(part) => Verdict::Undecided(Reason::Undefined(part)),
        Failure::Limit(limit) => beyond(limit, Fingerprint::Unknown, left, right),
    }
}
