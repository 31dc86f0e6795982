//! The page of a derivation: the verdict, the result, where it holds, and the steps folded under it.
//!
//! It is made from the record alone, so a stored record yields the page that was shown.

use std::collections::BTreeSet;

use cas::decide::tidied;

use super::formula::Notation;
use super::of_report;
use super::of_step::{self, Grounds};
use super::page::{Block, Line, Mark, Page, Piece, words};
use super::statement::{matrix, statement};
use crate::model::{Condition, Model};
use crate::record::{AssumptionEntry, Derivation, Ground, Record, Shown, Standing, Tally, is_implied};

/// The page of a derivation from a model.
#[must_use]
pub fn derivation(model: &Model, derivation: &Derivation) -> Page {
    record(&Record::of(model, derivation))
}

/// The page that a record yields: that of its derivation, then that of its reference run.
#[must_use]
pub fn record(record: &Record) -> Page {
    let reference = record.reference.as_ref();
    let compared = reference.map(|reference| of_report::report(&reference.report));
    match (record.derivation(), compared) {
        (Some(derivation), compared) => {
            let mut page = derived(record, &derivation);
            page.blocks
                .extend(compared.into_iter().flat_map(|page| page.blocks));
            page
        }
        (None, Some(page)) => page,
        (None, None) => Page {
            title: record.title.clone(),
            verdict: Line::new(),
            blocks: vec![Block::Sentence(words(
                "The record holds no derivation and no reference run.",
            ))],
        },
    }
}

fn derived(record: &Record, derivation: &Derivation) -> Page {
    let notation = Notation::of_record(record);
    let mut blocks = headline(&notation, derivation);
    blocks.extend(refutations(derivation));
    blocks.extend(derivation.notes.iter().map(|note| Block::Sentence(words(note))));
    let conditions = conditions(record, derivation);
    if !conditions.is_empty() {
        blocks.push(Block::Sentence(notation.where_holds(&conditions)));
    }
    let used = assumptions(record, derivation);
    blocks.extend(numbered(&used).map(Block::Sentence));
    if !derivation.steps.is_empty() {
        let grounds = Grounds::of(record);
        let items = derivation
            .steps
            .iter()
            .map(|step| of_step::item(&notation, &grounds, step));
        let mut folded = vec![Block::Steps(items.collect())];
        if !used.is_empty() {
            let texts = used
                .iter()
                .map(|entry| format!("({}) {}", entry.number, entry.text));
            folded.push(Block::Sentence(vec![
                Piece::quiet("Assumptions: "),
                Piece::words(texts.collect::<Vec<_>>().join(" ")),
            ]));
        }
        blocks.push(Block::Folded {
            summary: words(counted(derivation.steps.len(), "step")),
            blocks: folded,
        });
    }
    blocks.extend(
        derivation
            .checked
            .iter()
            .map(|check| Block::Sentence(words(check))),
    );
    Page {
        title: derivation.title.clone(),
        verdict: verdict(derivation.tally()),
        blocks,
    }
}

fn headline(notation: &Notation, derivation: &Derivation) -> Vec<Block> {
    derivation
        .headline
        .iter()
        .flat_map(|shown| match shown {
            Shown::Statement { statement: stated } => statement(notation, stated, Block::Result),
            Shown::Matrix { label, rows } => matrix(notation, label, rows, Block::Result),
            Shown::Words { text } => vec![Block::Sentence(words(text))],
        })
        .collect()
}

/// The verdict of the whole: the worst standing first, and its mark.
fn verdict(tally: Tally) -> Line {
    let counts = [
        (tally.refuted, Mark::Bad, "refuted"),
        (tally.undecided, Mark::Open, "undecided"),
        (tally.supported, Mark::Partial, "supported"),
        (tally.proved, Mark::Good, "proved"),
    ];
    let mut found = counts.into_iter().filter(|(count, ..)| *count > 0);
    let Some((count, mark, word)) = found.next() else {
        return if tally.stated > 0 {
            vec![Piece::Verdict(
                Mark::Stated,
                format!("{} stated", counted(tally.stated, "step")),
            )]
        } else {
            Line::new()
        };
    };
    let mut text = format!("{} {word}", counted(count, "step"));
    for (count, _, word) in found {
        text.push_str(&format!(", {count} {word}"));
    }
    vec![Piece::Verdict(mark, text)]
}

/// What is wrong must not wait until somebody unfolds it.
fn refutations(derivation: &Derivation) -> impl Iterator<Item = Block> {
    let refuted = derivation
        .steps
        .iter()
        .filter(|step| matches!(step.standing, Standing::Refuted { .. }));
    refuted.map(|step| {
        let mut line = vec![Piece::Strong(format!("{}: ", step.key))];
        line.extend(of_step::detail(&step.standing));
        Block::Sentence(line)
    })
}

/// Where the steps hold, without what the declared signs of constants imply.
fn conditions(record: &Record, derivation: &Derivation) -> Vec<Condition> {
    let given = record.given();
    let all = derivation
        .steps
        .iter()
        .flat_map(|step| step.conditions.iter().copied());
    let all = tidied(all.collect());
    all.into_iter()
        .filter(|condition| !is_implied(*condition, &given))
        .collect()
}

/// The assumptions that the steps rest on.
fn assumptions<'a>(record: &'a Record, derivation: &Derivation) -> Vec<&'a AssumptionEntry> {
    let grounds = derivation.steps.iter().flat_map(|step| &step.rests_on);
    let numbers: BTreeSet<usize> = grounds
        .filter_map(|ground| match ground {
            Ground::Assumption(number) => Some(*number),
            Ground::Step(_) | Ground::Stated(_) => None,
        })
        .collect();
    let entries = record.assumptions.iter();
    entries.filter(|entry| numbers.contains(&entry.number)).collect()
}

/// Their numbers in the register; the texts stand there and under the fold, not under every result.
fn numbered(used: &[&AssumptionEntry]) -> Option<Line> {
    let numbers: Vec<String> = used.iter().map(|entry| entry.number.to_string()).collect();
    let word = if numbers.len() == 1 {
        "assumption"
    } else {
        "assumptions"
    };
    (!numbers.is_empty()).then(|| {
        vec![Piece::quiet(format!(
            "Rests on {word} {} of the register.",
            numbers.join(", ")
        ))]
    })
}

/// A number of things in words.
fn counted(count: usize, thing: &str) -> String {
    format!("{count} {thing}{}", if count == 1 { "" } else { "s" })
}
