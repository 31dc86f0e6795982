//! Formulas of expressions in the notation of a sheet.

use cas::text::{Arrangement, Scope, latex, latex_equation, latex_lines, plain, plain_equation, read};
use cas::{Expr, Symbol};

use super::page::{Formula, Line, Piece};
use crate::model::{Condition, Model, Vector};
use crate::record::{Record, RoleEntry};

/// Display formulas are broken into lines not much wider than this, in em.
const LINE: usize = 44;

/// A chain of equalities stands on one line up to this many characters of plain notation.
const ONE_LINE: usize = 76;

/// What is longer than this begins a line of its own, and what follows is set in.
const SHORT: usize = 30;

/// How the expressions of a sheet are written: names in order of declaration, dots for rates.
#[derive(Clone, Debug, Default)]
pub(super) struct Notation(Arrangement);

impl Notation {
    /// The notation of a model.
    pub(super) fn of(model: &Model) -> Self {
        Self(model.arrangement())
    }

    /// The notation of the model that a record states.
    pub(super) fn of_record(record: &Record) -> Self {
        let symbols = |role: RoleEntry| {
            let entries = record.quantities.iter().filter(move |entry| entry.role == role);
            entries.map(|entry| Symbol::from(entry.name))
        };
        let coordinates: Vec<Symbol> = symbols(RoleEntry::Coordinate).collect();
        let names = record.quantities.iter().map(|entry| entry.name);
        let arrangement = Arrangement::of_names(names).with_coordinates(&coordinates);
        Self(match symbols(RoleEntry::Time).next() {
            Some(time) => arrangement.with_dots(time),
            None => arrangement,
        })
    }

    /// An expression in plain notation alone.
    pub(super) fn plain(&self, expr: Expr) -> String {
        plain(expr, &self.0)
    }

    /// An expression on one line.
    pub(super) fn formula(&self, expr: Expr) -> Formula {
        Formula::new(latex(expr, &self.0), plain(expr, &self.0))
    }

    /// An equation, its right side broken into lines where it is long.
    pub(super) fn equation(&self, left: &Formula, relation: &Relation, right: Expr) -> Formula {
        Formula::new(
            latex_equation(&left.tex, relation.tex, right, LINE, &self.0),
            plain_equation(&left.plain, relation.plain, right, &self.0),
        )
    }

    /// An expression as a result, broken into lines where it is long.
    pub(super) fn result(&self, expr: Expr) -> Formula {
        let nothing = Formula::new("", "");
        let blank = Relation { tex: "", plain: "" };
        let broken = self.equation(&nothing, &blank, expr);
        Formula::new(broken.tex.trim(), broken.plain.trim())
    }

    /// What is equal to one expression after the other: on one line where it fits, else each
    /// expression on lines of its own.
    pub(super) fn chain(&self, head: Head<'_>, members: &[(&Relation, Expr)]) -> Formula {
        let first = match head {
            Head::Name(name) => name.clone(),
            Head::Expr(expr) => self.formula(expr),
        };
        let lines: Vec<Vec<String>> = members
            .iter()
            .map(|(_, expr)| latex_lines(*expr, LINE, &self.0))
            .collect();
        let plains: Vec<String> = members
            .iter()
            .map(|(relation, expr)| format!("{} {}", relation.plain, self.plain(*expr)))
            .collect();
        let size = |text: &str| text.chars().count();
        let beside = size(&first.plain) <= SHORT;
        let short = size(&first.plain) + plains.iter().map(|text| size(text) + 1).sum::<usize>() <= ONE_LINE;
        let alone = beside && members.len() == 1;
        let mut plain = first.plain.clone();
        for (place, text) in plains.iter().enumerate() {
            let on_this_line = short || (beside && place == 0);
            plain.push_str(if on_this_line { " " } else { "\n  " });
            plain.push_str(text);
        }

        if lines.iter().all(|lines| lines.len() == 1) && (short || alone) {
            let tex = members
                .iter()
                .zip(&lines)
                .map(|((relation, _), lines)| format!(" {} {}", relation.tex, lines.concat()));
            return Formula::new(first.tex + &tex.collect::<String>(), plain);
        }
        let mut rows: Vec<String> = Vec::new();
        match head {
            _ if beside => rows.push(format!("{} {{}}&", first.tex)),
            Head::Name(name) => rows.push(format!("& {}", name.tex)),
            Head::Expr(expr) => rows.extend(set_in(&latex_lines(expr, LINE, &self.0), "&", "&\\qquad{}")),
        }
        for (place, ((relation, _), lines)) in members.iter().zip(&lines).enumerate() {
            let sign = relation.tex;
            let start = match (beside, place) {
                (true, 0) => format!("{} {sign}", rows.pop().unwrap_or_default()),
                (true, _) => format!("& {sign}"),
                (false, _) => format!("&\\quad{{}} {sign}"),
            };
            rows.extend(set_in(lines, &start, "&\\qquad{}"));
        }
        let tex = format!("\\begin{{aligned}} {} \\end{{aligned}}", rows.join(" \\\\ "));
        Formula::new(tex, plain)
    }

    /// The components of a vector in a row.
    pub(super) fn components(&self, vector: Vector) -> Formula {
        let parts = vector.components().map(|component| self.formula(component));
        let tex = parts.clone().map(|part| part.tex).join(",\\; ");
        let plain = parts.map(|part| part.plain).join(", ");
        Formula::new(format!("\\left({tex}\\right)"), format!("({plain})"))
    }

    /// A condition.
    pub(super) fn condition(&self, condition: &Condition) -> Formula {
        let (expr, relation) = match condition {
            Condition::NotZero(expr) => (
                *expr,
                Relation {
                    tex: "\\neq",
                    plain: "!=",
                },
            ),
            Condition::NotNegative(expr) => (
                *expr,
                Relation {
                    tex: "\\geq",
                    plain: ">=",
                },
            ),
            Condition::Positive(expr) => (*expr, Relation { tex: ">", plain: ">" }),
        };
        let shown = self.formula(expr);
        Formula::new(
            format!("{} {} 0", shown.tex, relation.tex),
            format!("{} {} 0", shown.plain, relation.plain),
        )
    }

    /// "Holds where" the conditions do.
    pub(super) fn where_holds(&self, conditions: &[Condition]) -> Line {
        let mut line = vec![Piece::quiet("Holds where ")];
        for (place, condition) in conditions.iter().enumerate() {
            if place > 0 {
                line.push(Piece::words(", "));
            }
            line.push(Piece::Math(self.condition(condition)));
        }
        line.push(Piece::words("."));
        line
    }
}

/// Rows of an alignment: the first line after its start, the others set in.
fn set_in(lines: &[String], start: &str, inset: &str) -> Vec<String> {
    let rows = lines.iter().enumerate();
    rows.map(|(place, line)| format!("{} {line}", if place == 0 { start } else { inset }))
        .collect()
}

/// What a chain of equalities begins with.
pub(super) enum Head<'a> {
    /// A name.
    Name(&'a Formula),
    /// An expression.
    Expr(Expr),
}

/// A sign between two sides.
pub(super) struct Relation {
    pub(super) tex: &'static str,
    pub(super) plain: &'static str,
}

/// A formula given in plain notation, as a record holds it.
///
/// What cannot be read comes from a record that was changed by hand; it is shown as the text it is.
pub(super) fn stated(text: &str) -> Piece {
    match read(text, &Scope::open()) {
        Ok(expr) => Piece::Math(Notation::default().formula(expr)),
        Err(_) => Piece::words(text),
    }
}
