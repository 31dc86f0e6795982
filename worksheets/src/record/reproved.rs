//! Proving recorded steps again, from what the record holds and nothing else.

use cas::decide::compare;
use cas::{Effort, Expr};

use super::entry::RoleEntry;
use super::given::is_implied;
use super::standing::Standing;
use super::statement::{Relation, Step};
use super::store::Record;
use super::written::condition_text;
use crate::model::Condition;

/// A step that stands otherwise than its record says.
#[derive(Clone, Debug, PartialEq)]
pub struct Divergence {
    /// The key of the step.
    pub key: String,
    /// How it stands by the record.
    pub recorded: Standing,
    /// How it stands when its two sides are compared again.
    pub found: Standing,
}

impl Step {
    /// How the step stands when its two sides are compared again, trusting none of what is recorded
    /// of its verdict.
    ///
    /// A definition of one expression by itself and a law need no proof. A proof that needs a
    /// condition which the step does not state proves less than the step says.
    #[must_use]
    pub fn reproved(&self, effort: &Effort) -> Standing {
        self.reproved_given(&[], effort)
    }

    /// As [`reproved`](Self::reproved), where these conditions hold besides those of the step.
    #[must_use]
    pub fn reproved_given(&self, given: &[Condition], effort: &Effort) -> Standing {
        let [left, right]: [Expr; 2] = [self.statement.left.value, self.statement.right.value];
        let (standing, needed) = match self.statement.relation {
            Relation::Law => return Standing::Stated,
            Relation::Defined if left == right => return Standing::Stated,
            Relation::Defined | Relation::Equal => Standing::of(&compare(left, right, effort)),
            Relation::Differs => Standing::of_difference(&compare(left, right, effort)),
        };
        let known: Vec<Condition> = given.iter().chain(&self.conditions).copied().collect();
        let missing: Vec<String> = needed
            .into_iter()
            .filter(|condition| !is_implied(*condition, &known))
            .map(condition_text)
            .collect();
        if missing.is_empty() || !matches!(standing, Standing::Proved { .. }) {
            return standing;
        }
        Standing::Undecided {
            reason: format!(
                "it is proved only where {}, which the step does not state",
                missing.join(", ")
            ),
        }
    }
}

impl Record {
    /// What the record declares about signs: its positive constants.
    #[must_use]
    pub fn given(&self) -> Vec<Condition> {
        self.quantities
            .iter()
            .filter(|entry| entry.role == RoleEntry::PositiveConstant)
            .map(|entry| Condition::Positive(entry.value))
            .collect()
    }

    /// The steps that stand otherwise than recorded when they are proved again.
    ///
    /// A method, witness or reason may differ where another way was taken; the kind of standing may not.
    #[must_use]
    pub fn divergences(&self, effort: &Effort) -> Vec<Divergence> {
        let given = self.given();
        self.steps
            .iter()
            .map(|step| Divergence {
                key: step.key.clone(),
                recorded: step.standing.clone(),
                found: step.reproved_given(&given, effort),
            })
            .filter(|divergence| divergence.found.word() != divergence.recorded.word())
            .collect()
    }
}
