//! What every stage does with its steps.

use cas::decide::{compare, tidied};
use cas::present::collected;
use cas::text::plain;
use cas::{Effort, Expr, Symbol};

use crate::model::{Assumption, Force, Model, Reaction};
use crate::record::{Derivation, Ground, Rule, Shown, Side, Statement, Step};

/// A stage at work: the derivation that grows, and the work that one comparison may take.
pub(super) struct Stage<'a> {
    pub(super) model: &'a Model,
    pub(super) effort: &'a Effort,
    pub(super) derivation: Derivation,
    register: Vec<Assumption>,
}

impl<'a> Stage<'a> {
    pub(super) fn titled(model: &'a Model, effort: &'a Effort, stage: &str, title: &str) -> Self {
        Self {
            model,
            effort,
            derivation: Derivation::titled(stage, title),
            register: model.register_of_assumptions(),
        }
    }

    /// Records an equality with the verdict on it.
    pub(super) fn equal(
        &mut self,
        key: &str,
        left: Side,
        right: Side,
        rule: Rule,
        grounds: impl IntoIterator<Item = Ground>,
    ) -> &Step {
        let verdict = compare(left.value, right.value, self.effort);
        let key = format!("{}.{key}", self.derivation.stage);
        let step = Step::judged(key, Statement::equal(left, right), rule, &verdict).resting_on(grounds);
        self.pushed(step)
    }

    /// Records that two sides differ, with the verdict on that.
    pub(super) fn differ(&mut self, key: &str, left: Side, right: Side, rule: Rule) -> &Step {
        let verdict = compare(left.value, right.value, self.effort);
        let key = format!("{}.{key}", self.derivation.stage);
        self.pushed(Step::judged(key, Statement::differs(left, right), rule, &verdict))
    }

    /// Records a definition or a law.
    pub(super) fn stated(
        &mut self,
        key: &str,
        statement: Statement,
        rule: Rule,
        grounds: impl IntoIterator<Item = Ground>,
    ) -> &Step {
        let key = format!("{}.{key}", self.derivation.stage);
        self.pushed(Step::stated(key, statement, rule).resting_on(grounds))
    }

    /// Adds a step with the assumptions on which its grounds depend, and with the conditions under
    /// which the forces and reactions among them are as stated.
    pub(super) fn pushed(&mut self, step: Step) -> &Step {
        let names: Vec<String> = step
            .rests_on
            .iter()
            .filter_map(|ground| match ground {
                Ground::Stated(name) => Some(name.clone()),
                Ground::Step(_) | Ground::Assumption(_) => None,
            })
            .collect();
        let named = |name: cas::Name| names.iter().any(|known| known == name.as_str());
        let assumptions = self
            .register
            .iter()
            .filter(|assumption| names.iter().any(|name| assumption.affects().contains(name)))
            .map(|assumption| Ground::Assumption(assumption.number()));
        let forces = self.model.forces().iter().filter(|force| named(force.name()));
        let reactions = self
            .model
            .reactions()
            .iter()
            .filter(|reaction| named(reaction.name()));
        let conditions = forces
            .flat_map(Force::conditions)
            .chain(reactions.flat_map(Reaction::conditions))
            .copied();
        let mut step = step.resting_on(assumptions).under(conditions);
        step.conditions = tidied(step.conditions);
        self.derivation.steps.push(step);
        self.derivation
            .steps
            .last()
            .expect("invariant: it was pushed in the line above")
    }

    /// Shows a statement large.
    pub(super) fn show(&mut self, statement: Statement) {
        self.derivation.headline.push(Shown::from(statement));
    }

    /// Shows a sentence large.
    pub(super) fn say(&mut self, text: impl Into<String>) {
        self.derivation.headline.push(Shown::Words { text: text.into() });
    }

    /// Adds a remark.
    pub(super) fn note(&mut self, text: impl Into<String>) {
        self.derivation.notes.push(text.into());
    }

    /// The expression as an engineer would write it, where that is proved to be the same function.
    pub(super) fn collected(&self, expr: Expr, by: &[Symbol]) -> Expr {
        let written = collected(expr, by, self.effort);
        if compare(expr, written, self.effort).is_proved() {
            written
        } else {
            expr
        }
    }

    /// The expression in plain notation, for sentences.
    pub(super) fn plain(&self, expr: Expr) -> String {
        plain(expr, &self.model.arrangement())
    }
}

/// Names in a row: `a`, `a and b`, `a, b and c`.
pub(super) fn listed<T: std::fmt::Display>(names: impl IntoIterator<Item = T>) -> String {
    let names: Vec<String> = names.into_iter().map(|name| name.to_string()).collect();
    match names.as_slice() {
        [] => String::new(),
        [only] => only.clone(),
        [first @ .., last] => format!("{} and {last}", first.join(", ")),
    }
}
