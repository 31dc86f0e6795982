//! Verdicts: what was found about an equality, and what that promises.

use std::fmt;

use super::condition::Condition;
use crate::effort::Limit;
use crate::expr::Expr;
use crate::number::Rational;
use crate::sample::Interval;

/// What was found about the equality of two expressions.
///
/// It is deliberately no `bool`: `Supported` and `Undecided` count neither as equal nor as unequal.
#[derive(Clone, Debug, PartialEq)]
#[must_use]
pub enum Verdict {
    /// Both sides are equal wherever the conditions hold.
    Proved(Proof),
    /// The sides differ, at the witness.
    Refuted(Witness),
    /// There is evidence for equality, but no proof.
    Supported(Evidence),
    /// Nothing is known.
    Undecided(Reason),
}

/// A proof of equality.
#[derive(Clone, Debug, PartialEq)]
pub struct Proof {
    /// How it was reached.
    pub method: Method,
    /// Where it holds: each condition once.
    pub conditions: Vec<Condition>,
}

/// How a proof was reached.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub enum Method {
    /// Both sides are the same expression.
    Structure,
    /// The difference reduces to zero in canonical form.
    CanonicalForm {
        /// The angles whose sines and cosines the form is written in.
        angles: Vec<Expr>,
    },
}

/// Exact values at which two sides differ.
#[derive(Clone, Debug, PartialEq)]
pub struct Witness {
    /// What has a value, and the value.
    pub values: Vec<(Expr, Rational)>,
    /// The left side there.
    pub left: Value,
    /// The right side there.
    pub right: Value,
}

/// The value of a side at a witness.
#[derive(Clone, Debug, PartialEq)]
pub enum Value {
    /// An exact number.
    Exact(Rational),
    /// A number in this interval.
    Within(Interval),
}

/// Evidence for an equality.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub enum Evidence {
    /// Evaluations modulo random primes all gave zero.
    Residues {
        /// How many evaluations there were.
        evaluations: u32,
        /// The chance that unequal sides pass them is at most two to minus this power.
        chance_exponent: u32,
        /// The limit that kept the canonical form from being reached.
        limit: Limit,
    },
    /// Intervals of both sides overlapped at every point.
    Intervals {
        /// How many points there were.
        points: u32,
    },
}

/// Why nothing is known.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub enum Reason {
    /// A part has no value anywhere.
    Undefined(Expr),
    /// The work allowed ran out.
    Limit(Limit),
    /// No point was found at which both sides have a value.
    NoPoint,
    /// The canonical form of the difference is not zero, but no point was found at which it shows.
    NoWitness,
}

impl Verdict {
    /// Whether equality is proved.
    #[must_use]
    pub fn is_proved(&self) -> bool {
        matches!(self, Self::Proved(_))
    }

    /// Whether inequality is proved.
    #[must_use]
    pub fn is_refuted(&self) -> bool {
        matches!(self, Self::Refuted(_))
    }

    /// The verdict in one word.
    #[must_use]
    pub fn word(&self) -> &'static str {
        match self {
            Self::Proved(_) => "proved",
            Self::Refuted(_) => "refuted",
            Self::Supported(_) => "supported",
            Self::Undecided(_) => "undecided",
        }
    }
}

impl fmt::Display for Method {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Structure => f.write_str("both sides are the same expression"),
            Self::CanonicalForm { angles } if angles.is_empty() => {
                f.write_str("the difference reduces to zero as a rational function")
            }
            Self::CanonicalForm { angles } => {
                f.write_str("the difference reduces to zero in sines and cosines of ")?;
                for (place, angle) in angles.iter().enumerate() {
                    let comma = if place == 0 { "" } else { ", " };
                    write!(f, "{comma}{angle}")?;
                }
                Ok(())
            }
        }
    }
}

impl fmt::Display for Value {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Exact(value) => write!(f, "{value}"),
            Self::Within(interval) => write!(f, "{interval}"),
        }
    }
}

impl fmt::Display for Evidence {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Residues {
                evaluations,
                chance_exponent,
                limit,
            } => write!(
                f,
                "{evaluations} evaluations modulo primes gave zero, which unequal sides do with a chance \
                 below 2^-{chance_exponent}; no proof, because {limit}"
            ),
            Self::Intervals { points } => write!(
                f,
                "the intervals of both sides overlap at {points} points; no proof, because roots, exponentials, \
                 logarithms or special angles occur"
            ),
        }
    }
}

impl fmt::Display for Reason {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Undefined(part) => write!(f, "`{part}` has no value anywhere"),
            Self::Limit(limit) => write!(f, "{limit}"),
            Self::NoPoint => f.write_str("no point was found at which both sides have a value"),
            Self::NoWitness => f.write_str(
                "the difference has terms that do not cancel, but no values were found that show it",
            ),
        }
    }
}

impl Reason {
    /// How to go on.
    #[must_use]
    pub fn hint(&self) -> &'static str {
        match self {
            Self::Undefined(_) => {
                "look for a division by zero, a root of a negative number or a logarithm of zero"
            }
            Self::Limit(limit) => limit.hint(),
            Self::NoWitness => "substitute values for some of the symbols and compare again",
            Self::NoPoint => "look for a root or a logarithm whose argument is never positive",
        }
    }
}
