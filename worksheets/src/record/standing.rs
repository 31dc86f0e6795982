//! How a step stands: stated, or with the verdict that was reached on it.

use cas::Verdict;
use cas::decide::Witness;
use serde::{Deserialize, Serialize};

use super::written::text_of;
use crate::model::Condition;

/// How a step stands.
///
/// A definition or a law of mechanics is `Stated`: there is nothing to prove. Every other step has
/// one of the four verdicts of the algebra, put into words that a record can keep.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(tag = "kind", deny_unknown_fields)]
pub enum Standing {
    /// A definition or a law.
    Stated,
    /// The statement holds wherever the conditions of the step do.
    Proved {
        /// How the proof was reached, in words.
        method: String,
    },
    /// The statement does not hold.
    Refuted {
        /// The values at which the two sides differ; empty where they were stated to differ and do not.
        at: Vec<Assignment>,
        /// The left side there.
        left: String,
        /// The right side there.
        right: String,
    },
    /// Evidence, but no proof.
    Supported {
        /// The evidence, with a bound on the chance of error.
        evidence: String,
    },
    /// Nothing is known.
    Undecided {
        /// Why not.
        reason: String,
    },
}

/// An exact value of a part of an expression.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Assignment {
    /// What has the value, in plain notation.
    pub of: String,
    /// The value, in plain notation.
    pub is: String,
}

impl Standing {
    /// How a stated equality stands after its two sides were compared, and where that holds.
    #[must_use]
    pub fn of(verdict: &Verdict) -> (Self, Vec<Condition>) {
        match verdict {
            Verdict::Proved(proof) => {
                let method = proof.method.to_string();
                (Self::Proved { method }, proof.conditions.clone())
            }
            Verdict::Refuted(witness) => (Self::refuted_at(witness), Vec::new()),
            Verdict::Supported(evidence) => {
                let evidence = evidence.to_string();
                (Self::Supported { evidence }, Vec::new())
            }
            Verdict::Undecided(reason) => (Self::undecided(reason), Vec::new()),
        }
    }

    /// How a stated difference stands after its two sides were compared, and where that holds.
    ///
    /// A witness proves it; a proof of equality refutes it; evidence for equality leaves it open.
    #[must_use]
    pub fn of_difference(verdict: &Verdict) -> (Self, Vec<Condition>) {
        match verdict {
            Verdict::Proved(proof) => {
                let refuted = Self::Refuted {
                    at: Vec::new(),
                    left: "equal to the right side".to_owned(),
                    right: "equal to the left side".to_owned(),
                };
                (refuted, proof.conditions.clone())
            }
            Verdict::Refuted(witness) => {
                let at = assignments(witness)
                    .iter()
                    .map(|value| format!("{} = {}", value.of, value.is))
                    .collect::<Vec<_>>()
                    .join(", ");
                let (left, right) = (&witness.left, &witness.right);
                let place = if at.is_empty() {
                    String::new()
                } else {
                    format!(" at {at}")
                };
                let method = format!("the sides are {left} and {right}{place}");
                (Self::Proved { method }, Vec::new())
            }
            Verdict::Supported(evidence) => {
                let reason = format!("it seems that both sides are equal: {evidence}");
                (Self::Undecided { reason }, Vec::new())
            }
            Verdict::Undecided(reason) => (Self::undecided(reason), Vec::new()),
        }
    }

    fn refuted_at(witness: &Witness) -> Self {
        Self::Refuted {
            at: assignments(witness),
            left: witness.left.to_string(),
            right: witness.right.to_string(),
        }
    }

    fn undecided(reason: &cas::decide::Reason) -> Self {
        Self::Undecided {
            reason: reason.to_string(),
        }
    }

    /// The standing in one word.
    #[must_use]
    pub fn word(&self) -> &'static str {
        match self {
            Self::Stated => "stated",
            Self::Proved { .. } => "proved",
            Self::Refuted { .. } => "refuted",
            Self::Supported { .. } => "supported",
            Self::Undecided { .. } => "undecided",
        }
    }

    /// Whether the step can be built upon: it is stated or proved.
    #[must_use]
    pub fn is_settled(&self) -> bool {
        matches!(self, Self::Stated | Self::Proved { .. })
    }
}

fn assignments(witness: &Witness) -> Vec<Assignment> {
    let values = witness.values.iter();
    values
        .map(|(part, value)| Assignment {
            of: text_of(*part),
            is: value.to_string(),
        })
        .collect()
}
