//! A recorded step as an item of a page: its rule, how it stands, what it says and what it rests on.

use std::collections::BTreeMap;

use super::formula::{Notation, stated};
use super::page::{Block, Item, Line, Mark, Piece, words};
use super::statement::statement;
use crate::record::{Ground, Record, Standing, Step};

/// The places of the steps of a page, by which they name each other.
pub(super) struct Grounds<'a> {
    places: BTreeMap<&'a str, usize>,
}

impl<'a> Grounds<'a> {
    /// The places of the steps of a record.
    pub(super) fn of(record: &'a Record) -> Self {
        let steps = record.steps.iter().enumerate();
        Self {
            places: steps
                .map(|(place, step)| (step.key.as_str(), place + 1))
                .collect(),
        }
    }

    fn words(&self, ground: &Ground) -> String {
        match ground {
            Ground::Step(key) => match self.places.get(key.as_str()) {
                Some(place) => format!("step {place}"),
                None => format!("step {key}"),
            },
            Ground::Stated(name) => name.clone(),
            Ground::Assumption(number) => format!("assumption {number}"),
        }
    }
}

/// A step as an item.
pub(super) fn item(notation: &Notation, grounds: &Grounds<'_>, step: &Step) -> Item {
    let mut foot = Vec::new();
    let mut reasons = detail(&step.standing);
    if !reasons.is_empty() {
        reasons.push(Piece::words("."));
        foot.push(reasons);
    }
    if !step.conditions.is_empty() {
        foot.push(notation.where_holds(&step.conditions));
    }
    if !step.rests_on.is_empty() {
        let named: Vec<String> = step.rests_on.iter().map(|ground| grounds.words(ground)).collect();
        foot.push(words(format!("Rests on {}.", named.join(", "))));
    }
    let mut last = format!("Key {}", step.key);
    if let Some(source) = step.rule.source() {
        let memory = if source.from_memory {
            ", quoted from memory"
        } else {
            ""
        };
        last.push_str(&format!("; source {}{memory}", source.key));
    }
    foot.push(vec![Piece::quiet(format!("{last}."))]);
    Item {
        head: words(step.rule.words()),
        verdict: vec![Piece::Verdict(
            mark(&step.standing),
            step.standing.word().to_owned(),
        )],
        blocks: statement(notation, &step.statement, Block::Display),
        foot,
    }
}

fn mark(standing: &Standing) -> Mark {
    match standing {
        Standing::Stated => Mark::Stated,
        Standing::Proved { .. } => Mark::Good,
        Standing::Refuted { .. } => Mark::Bad,
        Standing::Supported { .. } => Mark::Partial,
        Standing::Undecided { .. } => Mark::Open,
    }
}

/// Why a step stands as it does, without a full stop.
pub(super) fn detail(standing: &Standing) -> Line {
    match standing {
        Standing::Stated => Line::new(),
        Standing::Proved { method } => words(format!("Proof: {method}")),
        Standing::Refuted { at, left, right } => {
            let mut line = words(format!("The left side is {left}, the right side {right}"));
            for (place, value) in at.iter().enumerate() {
                line.push(Piece::words(if place == 0 { ", at " } else { ", " }));
                line.push(stated(&value.of));
                line.push(Piece::words(format!(" = {}", value.is)));
            }
            line
        }
        Standing::Supported { evidence } => words(format!("Evidence: {evidence}")),
        Standing::Undecided { reason } => words(format!("Not decided: {reason}")),
    }
}
