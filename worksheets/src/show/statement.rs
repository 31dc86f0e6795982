//! Statements and matrices as blocks, with long ones folded or summarised.

use std::collections::HashMap;

use cas::{Expr, Kind, postorder};

use super::formal;
use super::formula::{Head, Notation, Relation};
use super::page::{Block, Formula, Piece, words};
use crate::record::{Formal, Relation as Stated, Side, Statement};

/// A formula of more terms than this is folded.
const MOST_SHOWN: usize = 200;

/// A formula of more terms than this is given in plain notation only: typesetting it takes seconds.
const MOST_TYPESET: usize = 1_000;

const EQUAL: Relation = Relation { tex: "=", plain: "=" };
const DIFFERS: Relation = Relation {
    tex: "\\neq",
    plain: "!=",
};

/// A statement as blocks of the given kind.
pub(super) fn statement(notation: &Notation, stated: &Statement, show: fn(Formula) -> Block) -> Vec<Block> {
    let relation = match stated.relation {
        Stated::Defined | Stated::Equal | Stated::Law => &EQUAL,
        Stated::Differs => &DIFFERS,
    };
    let (left, right) = (&stated.left, &stated.right);
    let total = terms(left.value).max(terms(right.value));
    if total > MOST_TYPESET {
        return summary(stated, total);
    }
    let formulas = formulas(notation, left, relation, right);
    if total > MOST_SHOWN {
        let summary = named(stated, &format!("{total} terms"));
        let blocks = formulas.into_iter().map(Block::Display).collect();
        return vec![Block::Folded { summary, blocks }];
    }
    formulas.into_iter().map(show).collect()
}

/// What is equal to what: in the symbols of the trade first, then as expressions where these say more.
fn formulas(notation: &Notation, left: &Side, relation: &Relation, right: &Side) -> Vec<Formula> {
    let name = |side: &Side| side.formal.as_ref().map(formal::formula);
    let (first, second) = (left.value, right.value);
    let same = first == second;
    let values = || notation.chain(Head::Expr(first), &[(relation, second)]);
    match (name(left), name(right)) {
        (None, None) => vec![values()],
        (Some(name), None) if same => vec![notation.chain(Head::Name(&name), &[(relation, second)])],
        (Some(name), None) => vec![notation.chain(Head::Name(&name), &[(&EQUAL, first), (relation, second)])],
        (None, Some(name)) if same => vec![notation.chain(Head::Name(&name), &[(relation, first)])],
        (None, Some(name)) => vec![values(), notation.chain(Head::Name(&name), &[(&EQUAL, second)])],
        (Some(one), Some(other)) => {
            let names = Formula::new(
                format!("{} {} {}", one.tex, relation.tex, other.tex),
                format!("{} {} {}", one.plain, relation.plain, other.plain),
            );
            if same {
                vec![notation.chain(Head::Name(&names), &[(&EQUAL, second)])]
            } else {
                vec![names, values()]
            }
        }
    }
}

/// A statement by its name and size, with its plain notation folded.
fn summary(stated: &Statement, total: usize) -> Vec<Block> {
    let plain = Notation::default();
    let sides = [&stated.left, &stated.right];
    let texts = sides.map(|side| Block::Sentence(words(plain.plain(side.value))));
    let sign = if stated.relation == Stated::Differs {
        "!="
    } else {
        "="
    };
    let [left, right] = texts;
    let blocks = if stated.left.value == stated.right.value {
        vec![right]
    } else {
        vec![left, Block::Sentence(words(sign)), right]
    };
    vec![Block::Folded {
        summary: named(stated, &format!("{total} terms, in plain notation")),
        blocks,
    }]
}

/// The names of both sides, and what is to be said of the size.
fn named(stated: &Statement, size: &str) -> Vec<Piece> {
    let names = [&stated.left, &stated.right].map(|side| side.formal.as_ref().map(formal::formula));
    let mut line = Vec::new();
    for name in names.into_iter().flatten() {
        if !line.is_empty() {
            line.push(Piece::words(" and "));
        }
        line.push(Piece::Math(name));
    }
    if line.is_empty() {
        line.push(Piece::words("a formula"));
    }
    line.push(Piece::words(format!(" of {size}")));
    line
}

/// A matrix with its name as a block of the given kind.
pub(super) fn matrix(
    notation: &Notation,
    label: &Formal,
    rows: &[Vec<Expr>],
    show: fn(Formula) -> Block,
) -> Vec<Block> {
    let label = formal::formula(label);
    let total = rows
        .iter()
        .flatten()
        .fold(0, |sum: usize, entry| sum.saturating_add(terms(*entry)));
    let written = |entry: &Expr| notation.formula(*entry);
    if total > MOST_TYPESET {
        let lines = rows.iter().enumerate().flat_map(|(row, entries)| {
            entries.iter().enumerate().map(move |(column, entry)| {
                let text = Notation::default().plain(*entry);
                Block::Sentence(words(format!("row {}, column {}: {text}", row + 1, column + 1)))
            })
        });
        let size = format!(" of {total} terms, in plain notation");
        return vec![Block::Folded {
            summary: vec![Piece::Math(label), Piece::words(size)],
            blocks: lines.collect(),
        }];
    }
    let cells: Vec<Vec<Formula>> = rows.iter().map(|row| row.iter().map(written).collect()).collect();
    let tex = cells.iter().map(|row| {
        row.iter()
            .map(|cell| cell.tex.as_str())
            .collect::<Vec<_>>()
            .join(" & ")
    });
    let plain = aligned(&cells);
    let made = Formula::new(
        format!(
            "{} = \\begin{{pmatrix}} {} \\end{{pmatrix}}",
            label.tex,
            tex.collect::<Vec<_>>().join(" \\\\ ")
        ),
        format!("{} =\n{plain}", label.plain),
    );
    if total > MOST_SHOWN {
        return vec![Block::Folded {
            summary: vec![Piece::Math(label), Piece::words(format!(" of {total} terms"))],
            blocks: vec![Block::Display(made)],
        }];
    }
    vec![show(made)]
}

/// Rows in brackets, their columns aligned.
fn aligned(cells: &[Vec<Formula>]) -> String {
    let columns = cells.iter().map(Vec::len).max().unwrap_or(0);
    let width = |column: usize| {
        let texts = cells.iter().filter_map(|row| row.get(column));
        texts.map(|cell| cell.plain.chars().count()).max().unwrap_or(0)
    };
    let widths: Vec<usize> = (0..columns).map(width).collect();
    let line = |row: &Vec<Formula>| {
        let padded = row
            .iter()
            .zip(&widths)
            .map(|(cell, width)| format!("{:width$}", cell.plain));
        format!("  [ {} ]", padded.collect::<Vec<_>>().join("   "))
    };
    cells.iter().map(line).collect::<Vec<_>>().join("\n")
}

/// How many terms an expression shows when it is written out, those in brackets counted too.
fn terms(expr: Expr) -> usize {
    // Only looked up by key: the order of the map reaches no output.
    let mut counts: HashMap<Expr, usize> = HashMap::new();
    for part in postorder(&[expr]) {
        let of = |child: &Expr| counts.get(child).copied().unwrap_or(1);
        let children = part.children().iter();
        let count = match part.kind() {
            Kind::Sum(_) => children.fold(0, |sum: usize, child| sum.saturating_add(of(child))),
            _ => children
                .map(of)
                .filter(|count| *count > 1)
                .fold(0, usize::saturating_add)
                .max(1),
        };
        counts.insert(part, count);
    }
    counts.get(&expr).copied().unwrap_or(1)
}
