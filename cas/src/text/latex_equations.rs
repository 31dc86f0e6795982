//! Equations in LaTeX: lines with their sides.

use super::fault::{ReadError, ReadFault};
use super::latex_read::Reader;
use super::latex_token::Mark;
use super::scope::Scope;
use crate::expr::Expr;

/// A line of equations.
#[derive(Clone, Debug, PartialEq)]
pub struct LatexLine {
    /// The sides, from left to right: an equation has two, a bare expression one.
    pub sides: Vec<Expr>,
    /// Whether the line begins with `=`, so that its first side equals the last one of the line before.
    pub continued: bool,
    /// The character where the line begins, counted from one.
    pub place: usize,
}

/// Reads equations in LaTeX, as they stand in a paper: lines end at `\\`, sides stand between `=`.
///
/// The notation is that of [`read_latex`](super::read_latex). The signs of alignment `&`, tags and
/// labels are left out. A line without `=` that begins with a sign goes on with the line before, and so
/// does one that begins with `+` or a multiplication sign.
///
/// ```
/// use cas::text::{Scope, read, read_latex_equations};
/// let lines = read_latex_equations(
///     r"\begin{aligned} m\ddot{x} &= -kx \\ &\quad - c\dot{x}, \\ E &= \tfrac12 kx^2 \end{aligned}",
///     &Scope::open(),
/// )?;
/// assert_eq!(lines.len(), 2);
/// assert_eq!(lines[0].sides[0], read("m*x''", &Scope::open())?);
/// assert_eq!(lines[0].sides[1], read("-k*x - c*x'", &Scope::open())?);
/// # Ok::<(), cas::text::ReadError>(())
/// ```
///
/// # Errors
/// As [`read_latex`](super::read_latex); a first line that begins with `=`.
pub fn read_latex_equations(source: &str, scope: &Scope) -> Result<Vec<LatexLine>, ReadError> {
    let mut reader = Reader::new(source, scope)?;
    let mut lines = Vec::new();
    loop {
        let place = reader.place();
        let continued = reader.peek() == Some(&Mark::Equals);
        if continued {
            if lines.is_empty() {
                return Err(reader.error(ReadFault::Latex {
                    expected: "the left side of the equation",
                    found: Some("=".to_owned()),
                }));
            }
            reader.advance();
        }
        let mut sides = vec![reader.sum()?];
        while reader.peek() == Some(&Mark::Equals) {
            reader.advance();
            sides.push(reader.sum()?);
        }
        lines.push(LatexLine {
            sides,
            continued,
            place,
        });
        match reader.peek() {
            None => return Ok(lines),
            Some(Mark::Break) => reader.advance(),
            Some(_) => return Err(reader.expected("an operator, `=` or the end of the line")),
        }
    }
}
