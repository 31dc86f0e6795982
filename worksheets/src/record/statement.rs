//! Statements and the steps that record them.

use cas::{Expr, Verdict};
use serde::{Deserialize, Serialize};

use super::formal::Formal;
use super::ground::Ground;
use super::rule::Rule;
use super::standing::Standing;
use super::written;
use crate::model::Condition;

/// One side of a statement: what it is called, and the expression that it is.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Side {
    /// The side in the symbols of the trade, such as the time derivative of dT/dq'.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub formal: Option<Formal>,
    /// The expression.
    #[serde(with = "written::expr")]
    pub value: Expr,
}

/// How the two sides of a statement belong together.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Relation {
    /// The left side is a name for the right one.
    Defined,
    /// Both sides are the same function of coordinates, velocities, accelerations and time.
    Equal,
    /// Both sides are equal in every motion, by a law of mechanics; they are different functions.
    Law,
    /// The two sides are not the same function.
    Differs,
}

/// Two sides and their relation.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Statement {
    /// The left side.
    pub left: Side,
    /// How it belongs to the right side.
    pub relation: Relation,
    /// The right side.
    pub right: Side,
}

/// One recorded statement with its rule, grounds, conditions and standing.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Step {
    /// A name for the step that stays the same as long as the sheet does, such as `equations.phi`.
    pub key: String,
    /// What is stated.
    pub statement: Statement,
    /// By which rule.
    pub rule: Rule,
    /// What it uses.
    pub rests_on: Vec<Ground>,
    /// Where it holds.
    #[serde(with = "written::conditions")]
    pub conditions: Vec<Condition>,
    /// How it stands.
    #[serde(rename = "verdict")]
    pub standing: Standing,
}

impl Side {
    /// An expression without a name.
    #[must_use]
    pub fn of(value: Expr) -> Self {
        Self { formal: None, value }
    }

    /// An expression with the name that the trade has for it.
    #[must_use]
    pub fn named(formal: Formal, value: Expr) -> Self {
        Self {
            formal: Some(formal),
            value,
        }
    }
}

impl Statement {
    /// A name for an expression.
    #[must_use]
    pub fn defined(formal: Formal, value: Expr) -> Self {
        Self {
            left: Side::named(formal, value),
            relation: Relation::Defined,
            right: Side::of(value),
        }
    }

    /// Two spellings of one function.
    #[must_use]
    pub fn equal(left: Side, right: Side) -> Self {
        let relation = Relation::Equal;
        Self {
            left,
            relation,
            right,
        }
    }

    /// Two functions that are equal in every motion.
    #[must_use]
    pub fn law(left: Side, right: Side) -> Self {
        let relation = Relation::Law;
        Self {
            left,
            relation,
            right,
        }
    }

    /// Two different functions.
    #[must_use]
    pub fn differs(left: Side, right: Side) -> Self {
        let relation = Relation::Differs;
        Self {
            left,
            relation,
            right,
        }
    }
}

impl Step {
    /// A definition or a law, which stands without proof.
    #[must_use]
    pub fn stated(key: impl Into<String>, statement: Statement, rule: Rule) -> Self {
        Self {
            key: key.into(),
            statement,
            rule,
            rests_on: Vec::new(),
            conditions: Vec::new(),
            standing: Standing::Stated,
        }
    }

    /// A statement with what the comparison of its two sides found, and the conditions of that.
    #[must_use]
    pub fn judged(key: impl Into<String>, statement: Statement, rule: Rule, verdict: &Verdict) -> Self {
        let (standing, conditions) = match statement.relation {
            Relation::Differs => Standing::of_difference(verdict),
            Relation::Defined | Relation::Law | Relation::Equal => Standing::of(verdict),
        };
        Self {
            key: key.into(),
            statement,
            rule,
            rests_on: Vec::new(),
            conditions,
            standing,
        }
    }

    /// The step with these grounds besides those that it has, each once.
    #[must_use]
    pub fn resting_on(mut self, grounds: impl IntoIterator<Item = Ground>) -> Self {
        for ground in grounds {
            if !self.rests_on.contains(&ground) {
                self.rests_on.push(ground);
            }
        }
        self
    }

    /// The step under these conditions besides those that it has, each once.
    #[must_use]
    pub fn under(mut self, conditions: impl IntoIterator<Item = Condition>) -> Self {
        for condition in conditions {
            if !self.conditions.contains(&condition) {
                self.conditions.push(condition);
            }
        }
        self
    }
}
