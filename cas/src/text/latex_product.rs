//! Products in LaTeX: factors side by side, with signs between them, and quotients on one line.

use super::fault::ReadError;
use super::latex_read::Reader;
use super::latex_token::Mark;
use crate::expr::{Expr, Kind};

/// A factor as it was read: what is kept apart lets a division by it divide by each factor.
pub(super) enum Factors {
    One(Expr),
    Several(Vec<Expr>),
}

impl Factors {
    pub(super) fn whole(self) -> Expr {
        match self {
            Self::One(expr) => expr,
            Self::Several(factors) => Expr::product_of(factors),
        }
    }

    pub(super) fn each(self) -> Vec<Expr> {
        match self {
            Self::One(expr) => vec![expr],
            Self::Several(factors) => factors,
        }
    }

    pub(super) fn below(self) -> Vec<Expr> {
        match self {
            Self::One(expr) => vec![inverse(expr)],
            Self::Several(factors) => factors.into_iter().map(inverse).collect(),
        }
    }
}

/// One over an expression; a root below the line is a negative power.
fn inverse(expr: Expr) -> Expr {
    match expr.kind() {
        Kind::Power(base, exponent) if !exponent.is_integer() && exponent.is_positive() => {
            base.power(-exponent.clone())
        }
        _ => expr.power(-1),
    }
}

/// A factor with what is to be known of it where factors follow one another.
pub(super) struct Read {
    pub(super) value: Factors,
    /// Whether it is a bare name, behind which a bracket may look like arguments.
    pub(super) is_name: bool,
    /// Whether it is a number.
    pub(super) is_number: bool,
}

/// Whether a bracket holds but a name or number, as the arguments of functions do.
fn is_lone(read: &Read) -> bool {
    match &read.value {
        Factors::One(value) => value.as_symbol().is_some() || value.as_number().is_some(),
        Factors::Several(_) => false,
    }
}

/// Whether a factor may begin with this, so that it may follow another one without a sign.
pub(super) fn begins_factor(mark: &Mark) -> bool {
    matches!(
        mark,
        Mark::Letter(_)
            | Mark::Digit(_)
            | Mark::Point
            | Mark::Greek(_)
            | Mark::Word(_)
            | Mark::Pi
            | Mark::Function(_)
            | Mark::Fraction
            | Mark::Root
            | Mark::Dots(_)
            | Mark::Partial
            | Mark::Open(_)
            | Mark::OpenGroup
            | Mark::Bar
    )
}

impl Reader<'_> {
    /// Factors up to a sign or the end.
    pub(super) fn product(&mut self) -> Result<Factors, ReadError> {
        let first = self.factor()?;
        let mut is_number = first.is_number;
        let mut after_name = first.is_name;
        let mut factors = vec![first.value.whole()];
        let mut bare = true;
        while let Some(mark) = self.peek() {
            let (behind_name, from) = (after_name, self.at);
            let next = match mark {
                Mark::Times => {
                    self.advance();
                    self.factor()?
                }
                Mark::Slash => {
                    self.advance();
                    bare = false;
                    let below = self.factor()?;
                    // Half of a product is written as `1/2 m v^2`.
                    let plain_fraction = is_number && below.is_number;
                    factors.extend(below.value.below());
                    (after_name, is_number) = (false, false);
                    if !plain_fraction && self.peek().is_some_and(begins_factor) {
                        return Err(self.unclear(
                            "it is not clear whether this factor stands below the line",
                            "write the quotient as `\\frac{a}{b}`, or put brackets around the part below",
                        ));
                    }
                    continue;
                }
                Mark::Digit(_) | Mark::Point => {
                    return Err(self.unclear(
                        "a number stands directly behind a factor",
                        "write it in front, with `\\cdot` before it, as an index `_{2}` or as a power `^{2}`",
                    ));
                }
                mark if begins_factor(mark) => {
                    if self.token().is_some_and(|token| token.far) {
                        return Err(self.unclear(
                            "a wide space stands between two factors, as between formulas",
                            "write each formula on a line of its own, and `\\,` or `\\cdot` within a product",
                        ));
                    }
                    let opens = matches!(mark, Mark::Open(_));
                    let next = self.factor()?;
                    if behind_name && opens && is_lone(&next) {
                        self.at = from;
                        return Err(self.unclear(
                            "it is not clear whether this is a product or a value of a function",
                            "leave out `(t)` behind coordinates; write `\\cdot` for a product, or declare the function",
                        ));
                    }
                    next
                }
                _ => break,
            };
            (after_name, is_number) = (next.is_name, false);
            factors.push(next.value.whole());
        }
        Ok(if bare && factors.len() > 1 {
            Factors::Several(factors)
        } else {
            Factors::One(Expr::product_of(factors))
        })
    }
}
