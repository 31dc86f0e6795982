//! The pieces of writing: text, and expressions that are still to be written.

use num_bigint::BigInt;
use num_traits::One;

use super::arrangement::Arrangement;
use super::order;
use crate::expr::{Expr, Kind};
use crate::number::Rational;

/// How tightly an expression holds together where it is written.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Hold {
    /// Anything may stand here.
    Sum,
    /// A sum or a minus sign needs brackets here.
    Product,
    /// So does a product or quotient.
    Power,
    /// So does a power.
    Atom,
}

/// A piece of writing.
#[derive(Clone, Debug)]
pub(super) enum Piece {
    /// Text, written as it is.
    Text(String),
    /// An expression, in brackets unless it holds together as tightly as is asked.
    Whole(Expr, Hold),
    /// An expression without its minus sign.
    Magnitude(Expr),
}

/// A product or single factor, taken apart as it is written: sign, numbers, factors above and below
/// the line.
#[derive(Clone, Debug)]
pub(super) struct Quotient {
    pub(super) negative: bool,
    pub(super) numerator: BigInt,
    pub(super) denominator: BigInt,
    pub(super) above: Vec<Expr>,
    pub(super) below: Vec<Expr>,
}

impl Quotient {
    /// Takes an expression apart; `goes_below` says which powers stand below the line.
    pub(super) fn of(
        expr: Expr,
        goes_below: impl Fn(Expr, &Rational) -> bool,
        arrangement: &Arrangement,
    ) -> Self {
        let (coefficient, rest) = expr.coefficient_and_rest();
        let size = coefficient.absolute();
        let (mut above, mut below) = (Vec::new(), Vec::new());
        for factor in rest.factors() {
            match factor.kind() {
                Kind::Power(base, exponent) if goes_below(*base, exponent) => {
                    below.push(base.power(-exponent.clone()))
                }
                _ if factor.is_one() => {}
                _ => above.push(factor),
            }
        }
        Self {
            negative: coefficient.is_negative(),
            numerator: size.numerator(),
            denominator: size.denominator(),
            above: order::factors(above, arrangement),
            below: order::factors(below, arrangement),
        }
    }

    /// Whether something stands below the line.
    pub(super) fn has_line(&self) -> bool {
        !self.below.is_empty() || !self.denominator.is_one()
    }

    /// The number of factors that are written above the line.
    pub(super) fn written_above(&self) -> usize {
        self.above.len() + usize::from(!self.numerator.is_one())
    }
}

/// Whether a power is written as a division in plain notation: only where the division is read back
/// as the same power, and not as another spelling of the same function.
pub(super) fn divides(base: Expr, exponent: &Rational) -> bool {
    exponent.is_negative() && {
        let below = base.power(-exponent.clone());
        below.power(-1) == base.power(exponent.clone())
    }
}

/// How tightly an expression holds together, in a notation where quotients are products.
pub(super) fn hold(expr: Expr) -> Hold {
    match expr.kind() {
        Kind::Sum(_) => Hold::Sum,
        Kind::Number(value) if value.is_negative() => Hold::Sum,
        Kind::Number(value) if !value.is_integer() => Hold::Product,
        Kind::Product(factors) if factors[0].as_number().is_some_and(|n| n.is_negative()) => Hold::Sum,
        Kind::Product(_) => Hold::Product,
        Kind::Power(base, exponent) if divides(*base, exponent) => Hold::Product,
        Kind::Power(..) => Hold::Power,
        _ => Hold::Atom,
    }
}

/// The longest text of one expression; a shared graph can be exponentially longer when written out.
pub(super) const MOST_BYTES: usize = 2 << 20;

/// Writes pieces, first to last, by taking each expression apart until only text is left; stops with
/// three dots when the text is longer than `most` bytes.
pub(super) fn written(
    pieces: Vec<Piece>,
    most: usize,
    brackets: [&str; 2],
    hold: impl Fn(Expr) -> Hold,
    parts: impl Fn(Expr, bool) -> Vec<Piece>,
) -> String {
    let mut out = String::new();
    let mut waiting: Vec<Piece> = pieces.into_iter().rev().collect();
    while let Some(piece) = waiting.pop() {
        if out.len() > most {
            out.push_str("...");
            break;
        }
        match piece {
            Piece::Text(text) => out.push_str(&text),
            Piece::Whole(expr, asked) if hold(expr) < asked => {
                waiting.push(Piece::Text(brackets[1].to_owned()));
                waiting.push(Piece::Whole(expr, Hold::Sum));
                waiting.push(Piece::Text(brackets[0].to_owned()));
            }
            Piece::Whole(expr, _) => waiting.extend(parts(expr, true).into_iter().rev()),
            Piece::Magnitude(expr) => waiting.extend(parts(expr, false).into_iter().rev()),
        }
    }
    out
}

/// Text.
pub(super) fn text(text: impl Into<String>) -> Piece {
    Piece::Text(text.into())
}

/// A sum: its terms with their signs.
pub(super) fn sum(terms: &[Expr], arrangement: &Arrangement, signs: [&str; 3]) -> Vec<Piece> {
    let [leading_minus, plus, minus] = signs;
    let mut pieces = Vec::new();
    for (place, term) in order::terms(terms.to_vec(), arrangement).into_iter().enumerate() {
        let negative = term.coefficient_and_rest().0.is_negative();
        let sign = match (place, negative) {
            (0, false) => "",
            (0, true) => leading_minus,
            (_, false) => plus,
            (_, true) => minus,
        };
        pieces.push(text(sign));
        // A sum within a sum was kept apart when it was built, and stays so.
        pieces.push(match term.kind() {
            Kind::Sum(_) => Piece::Whole(term, Hold::Product),
            _ => Piece::Magnitude(term),
        });
    }
    pieces
}
