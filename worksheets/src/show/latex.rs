//! A page as LaTeX, for exports that make a document of it.

use super::escape;
use super::page::{Block, Formula, Item, Page, Piece};

/// The page as LaTeX.
pub(super) fn page(page: &Page) -> String {
    let mut out = String::new();
    if !page.title.is_empty() {
        out.push_str(&format!("\\textbf{{{}}}", escape::tex(&page.title)));
        if !page.verdict.is_empty() {
            out.push_str(&format!("\\quad {}", line(&page.verdict)));
        }
        out.push_str("\n\n");
    }
    blocks(&page.blocks, &mut out);
    out
}

fn line(pieces: &[Piece]) -> String {
    pieces
        .iter()
        .map(|piece| match piece {
            Piece::Words(text) | Piece::Quiet(text) => escape::tex(text),
            Piece::Strong(text) => format!("\\textbf{{{}}}", escape::tex(text)),
            Piece::Math(formula) => format!("${}$", formula.tex),
            Piece::Verdict(mark, words) => escape::tex(&format!("{} {words}", mark.sign())),
        })
        .collect()
}

fn display(formula: &Formula, out: &mut String) {
    out.push_str(&format!("$$\n{}\n$$\n\n", formula.tex));
}

fn blocks(blocks: &[Block], out: &mut String) {
    for block in blocks {
        match block {
            Block::Result(formula) | Block::Display(formula) => display(formula, out),
            Block::Sentence(pieces) => out.push_str(&format!("{}\n\n", line(pieces))),
            Block::Table { head, rows } => table(head, rows, out),
            Block::Steps(items) => steps(items, out),
            Block::Folded {
                summary,
                blocks: inner,
            } => {
                out.push_str(&format!("\\textbf{{{}}}\n\n", line(summary)));
                self::blocks(inner, out);
            }
            // A vector picture has no standard place in LaTeX text; its numbers stand beside it.
            Block::Picture { description, .. } => {
                out.push_str(&format!("({})\n\n", escape::tex(description)))
            }
        }
    }
}

fn table(head: &[Vec<Piece>], rows: &[Vec<Vec<Piece>>], out: &mut String) {
    let columns = head.len().max(rows.iter().map(Vec::len).max().unwrap_or(0));
    if columns == 0 {
        return;
    }
    let cells = |row: &[Vec<Piece>]| row.iter().map(|cell| line(cell)).collect::<Vec<_>>().join(" & ");
    out.push_str(&format!("\\begin{{tabular}}{{{}}}\n", "l".repeat(columns)));
    if !head.is_empty() {
        out.push_str(&format!("{} \\\\ \\hline\n", cells(head)));
    }
    for row in rows {
        out.push_str(&format!("{} \\\\\n", cells(row)));
    }
    out.push_str("\\end{tabular}\n\n");
}

fn steps(items: &[Item], out: &mut String) {
    for (place, item) in items.iter().enumerate() {
        out.push_str(&format!(
            "{}. {} ({})\n\n",
            place + 1,
            line(&item.head),
            line(&item.verdict)
        ));
        blocks(&item.blocks, out);
        for foot in &item.foot {
            out.push_str(&format!("{}\n\n", line(foot)));
        }
    }
}
