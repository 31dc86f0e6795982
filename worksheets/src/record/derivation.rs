//! Derivations: steps in order under a title, with the result in front.

use cas::Expr;
use serde::{Deserialize, Serialize};

use super::formal::Formal;
use super::standing::Standing;
use super::statement::{Statement, Step};
use super::written;

/// A part of the result, shown large.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(tag = "kind", rename_all = "snake_case", deny_unknown_fields)]
pub enum Shown {
    /// A statement.
    Statement {
        /// What is stated.
        statement: Statement,
    },
    /// A matrix or a column with its name.
    Matrix {
        /// Its name.
        label: Formal,
        /// Its rows.
        #[serde(with = "written::rows")]
        rows: Vec<Vec<Expr>>,
    },
    /// A sentence.
    Words {
        /// The sentence.
        text: String,
    },
}

impl From<Statement> for Shown {
    fn from(statement: Statement) -> Self {
        Self::Statement { statement }
    }
}

/// A result with the steps that lead to it.
#[derive(Clone, Debug, PartialEq)]
pub struct Derivation {
    /// The stage, in one plain word that begins the keys of its steps.
    pub stage: String,
    /// The title.
    pub title: String,
    /// The result.
    pub headline: Vec<Shown>,
    /// The steps, each after those that it rests on.
    pub steps: Vec<Step>,
    /// Remarks: what is left out, what stays in the equations and why.
    pub notes: Vec<String>,
    /// What the result was checked against, in sentences.
    pub checked: Vec<String>,
}

/// How many steps stand in which way.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Tally {
    /// Definitions and laws.
    pub stated: usize,
    /// Proved steps.
    pub proved: usize,
    /// Refuted steps.
    pub refuted: usize,
    /// Steps with evidence.
    pub supported: usize,
    /// Steps about which nothing is known.
    pub undecided: usize,
}

impl Derivation {
    /// A derivation without steps.
    #[must_use]
    pub fn titled(stage: &str, title: &str) -> Self {
        Self {
            stage: stage.to_owned(),
            title: title.to_owned(),
            headline: Vec::new(),
            steps: Vec::new(),
            notes: Vec::new(),
            checked: Vec::new(),
        }
    }

    /// The step of this key.
    #[must_use]
    pub fn step(&self, key: &str) -> Option<&Step> {
        self.steps.iter().find(|step| step.key == key)
    }

    /// How many steps stand in which way.
    #[must_use]
    pub fn tally(&self) -> Tally {
        let mut tally = Tally::default();
        for step in &self.steps {
            *match step.standing {
                Standing::Stated => &mut tally.stated,
                Standing::Proved { .. } => &mut tally.proved,
                Standing::Refuted { .. } => &mut tally.refuted,
                Standing::Supported { .. } => &mut tally.supported,
                Standing::Undecided { .. } => &mut tally.undecided,
            } += 1;
        }
        tally
    }
}
