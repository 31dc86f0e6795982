//! A page as plain text, for terminals, logs and reviews of differences.

use super::page::{Block, Formula, Item, Page, Piece};

/// Text is broken at words beyond this many characters; formulas keep the lines that they come in.
const WIDTH: usize = 100;

/// The page as plain text.
pub(super) fn page(page: &Page) -> String {
    let mut out = String::new();
    if !page.title.is_empty() {
        let verdict = line(&page.verdict);
        out.push_str(&page.title);
        if !verdict.is_empty() {
            out.push_str(&format!("  [{verdict}]"));
        }
        out.push('\n');
    }
    blocks(&page.blocks, 0, &mut out);
    while out.ends_with('\n') {
        out.pop();
    }
    out
}

fn line(pieces: &[Piece]) -> String {
    pieces
        .iter()
        .map(|piece| match piece {
            Piece::Words(text) | Piece::Quiet(text) | Piece::Strong(text) => text.clone(),
            Piece::Math(formula) => formula.plain.clone(),
            Piece::Verdict(mark, words) => format!("{} {words}", mark.sign()),
        })
        .collect()
}

fn formula(formula: &Formula, indent: usize, out: &mut String) {
    for text in formula.plain.lines() {
        out.push_str(&format!("{:indent$}{text}\n", "", indent = indent + 2));
    }
}

/// Words from the left, broken where they reach the width.
fn paragraph(text: &str, indent: usize, out: &mut String) {
    let mut column = 0;
    for word in text.split_whitespace() {
        let length = word.chars().count();
        if column > 0 && column + 1 + length > WIDTH.saturating_sub(indent) {
            out.push('\n');
            column = 0;
        }
        if column == 0 {
            out.push_str(&" ".repeat(indent));
        } else {
            out.push(' ');
            column += 1;
        }
        out.push_str(word);
        column += length;
    }
    out.push('\n');
}

fn blocks(blocks: &[Block], indent: usize, out: &mut String) {
    for block in blocks {
        match block {
            Block::Result(shown) | Block::Display(shown) => formula(shown, indent, out),
            Block::Sentence(pieces) => paragraph(&line(pieces), indent, out),
            Block::Table { head, rows } => table(head, rows, indent, out),
            Block::Steps(items) => steps(items, indent, out),
            Block::Folded {
                summary,
                blocks: inner,
            } => {
                paragraph(&line(summary), indent, out);
                self::blocks(inner, indent + 2, out);
            }
            Block::Picture { description, .. } => paragraph(&format!("({description})"), indent, out),
        }
    }
}

fn table(head: &[Vec<Piece>], rows: &[Vec<Vec<Piece>>], indent: usize, out: &mut String) {
    let texts: Vec<Vec<String>> = std::iter::once(head)
        .filter(|head| !head.is_empty())
        .chain(rows.iter().map(Vec::as_slice))
        .map(|row| row.iter().map(|cell| line(cell)).collect())
        .collect();
    let columns = texts.iter().map(Vec::len).max().unwrap_or(0);
    let widths: Vec<usize> = (0..columns)
        .map(|column| {
            let cells = texts.iter().filter_map(|row| row.get(column));
            cells.map(|cell| cell.chars().count()).max().unwrap_or(0)
        })
        .collect();
    for row in &texts {
        let cells: Vec<String> = row
            .iter()
            .zip(&widths)
            .map(|(cell, width)| format!("{cell:width$}"))
            .collect();
        out.push_str(&format!("{:indent$}  {}\n", "", cells.join("  ").trim_end()));
    }
}

fn steps(items: &[Item], indent: usize, out: &mut String) {
    for (place, item) in items.iter().enumerate() {
        paragraph(
            &format!("{}. {}  [{}]", place + 1, line(&item.head), line(&item.verdict)),
            indent,
            out,
        );
        blocks(&item.blocks, indent + 2, out);
        for foot in &item.foot {
            paragraph(&line(foot), indent + 4, out);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::super::page::words;
    use super::*;

    #[test]
    fn tables_are_aligned_and_long_sentences_broken() {
        let made = page(&Page {
            title: "Quantities".to_owned(),
            verdict: Vec::new(),
            blocks: vec![
                Block::Table {
                    head: vec![words("symbol"), words("unit")],
                    rows: vec![
                        vec![words("m_t"), words("kg")],
                        vec![words("long_name"), words("m")],
                    ],
                },
                Block::Sentence(words("word ".repeat(60))),
            ],
        });
        assert!(
            made.contains("\n  symbol     unit\n  m_t        kg\n  long_name  m\n"),
            "{made}"
        );
        assert!(made.lines().all(|line| line.chars().count() <= WIDTH));
    }
}
