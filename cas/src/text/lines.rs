//! Long sums broken into lines at their signs, for a given width.

use super::arrangement::Arrangement;
use super::latex::{coefficient, factors, goes_below, latex, latex_of, signed_terms};
use super::pieces::{Piece, Quotient, text};
use super::plain::plain;
use super::width::width;
use crate::expr::{Expr, Kind};

/// How far continued lines are set in.
const INDENT: &str = "\\quad{} ";

/// The expression in LaTeX as lines not much wider than `em` (widths are estimated), broken at the signs of its
/// outermost sum or of the bracket that makes it long.
#[must_use]
pub fn latex_lines(expr: Expr, em: usize, arrangement: &Arrangement) -> Vec<String> {
    let whole = latex(expr, arrangement);
    if width(&whole) <= em * 100 {
        return vec![whole];
    }
    match expr.kind() {
        Kind::Sum(terms) => filled(signed_terms(terms, arrangement), em),
        Kind::Product(_) => bracket_lines(expr, em, arrangement).unwrap_or_else(|| vec![whole]),
        _ => vec![whole],
    }
}

/// Terms filled into lines.
fn filled(terms: Vec<(bool, String)>, em: usize) -> Vec<String> {
    let (mut lines, mut line, mut used) = (Vec::new(), String::new(), 0);
    for (place, (negative, term)) in terms.into_iter().enumerate() {
        let size = width(&term) + 120;
        if used > 0 && used + size > em * 100 {
            lines.push(std::mem::take(&mut line));
            used = 0;
        }
        let sign = match (place, negative) {
            (0, false) => "",
            (0, true) => "-",
            (_, false) => " + ",
            (_, true) => " - ",
        };
        line.push_str(if used == 0 { sign.trim_start() } else { sign });
        line.push_str(&term);
        used += size;
    }
    lines.push(line);
    lines
}

/// A product with one long bracket: the lines break within the bracket.
fn bracket_lines(expr: Expr, em: usize, arrangement: &Arrangement) -> Option<Vec<String>> {
    let quotient = Quotient::of(expr, goes_below, arrangement);
    let place = quotient
        .above
        .iter()
        .position(|factor| matches!(factor.kind(), Kind::Sum(_)))?;
    let Kind::Sum(terms) = quotient.above[place].kind() else {
        return None;
    };
    if !quotient.below.is_empty() {
        return None;
    }
    let mut before = vec![
        text(if quotient.negative { "-" } else { "" }),
        text(coefficient(&quotient)),
        text(" "),
    ];
    before.extend(factors(&quotient.above[..place]));
    let after = factors(&quotient.above[place + 1..]);
    let of = |pieces: Vec<Piece>| latex_of(pieces, arrangement);
    let mut lines = filled(signed_terms(terms, arrangement), em);
    let first = lines.first_mut()?;
    *first = format!("{} \\bigl({first}", of(before).trim());
    let last = lines.last_mut()?;
    last.push_str(&format!("\\bigr) {}", of(after)));
    Some(lines.into_iter().map(|line| line.trim().to_owned()).collect())
}

/// An equation in LaTeX: `left` is LaTeX already, the right side is broken into lines where it is long.
#[must_use]
pub fn latex_equation(
    left: &str,
    relation: &str,
    right: Expr,
    em: usize,
    arrangement: &Arrangement,
) -> String {
    let lines = latex_lines(right, em, arrangement);
    match lines.as_slice() {
        [] | [_] => format!("{left} {relation} {}", lines.concat()),
        [first, rest @ ..] => {
            let rest: Vec<String> = rest.iter().map(|line| format!("&{INDENT}{line}")).collect();
            format!(
                "\\begin{{aligned}} {left} {relation} {{}}& {first} \\\\ {} \\end{{aligned}}",
                rest.join(" \\\\ ")
            )
        }
    }
}

/// An equation in plain notation; each side stays on one line, so that it can be read back.
#[must_use]
pub fn plain_equation(left: &str, relation: &str, right: Expr, arrangement: &Arrangement) -> String {
    format!("{left} {relation} {}", plain(right, arrangement))
}
