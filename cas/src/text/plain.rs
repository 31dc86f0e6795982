//! Plain notation: `2*m*l*cos(phi) + x''`, one line, nothing left out.

use std::fmt;

use num_traits::One;

use super::arrangement::Arrangement;
use super::pieces::{Hold, MOST_BYTES, Piece, Quotient, divides, hold, sum, text, written};
use crate::expr::{Application, Expr, Kind};
use crate::number::Rational;

/// Debug output and error messages are cut at about this length.
const MOST_BYTES_OF_DEBUG: usize = 2_000;

/// The expression in plain notation, with names in the order of the arrangement.
///
/// ```
/// use cas::{Expr, cos, text::{Arrangement, plain}};
/// let [m, phi] = ["m", "phi"].map(|name| Expr::symbol(name).expect("a valid name"));
/// assert_eq!(plain(2 * m * cos(phi) - m / 2, &Arrangement::default()), "2*m*cos(phi) - m/2");
/// ```
#[must_use]
pub fn plain(expr: Expr, arrangement: &Arrangement) -> String {
    at_most(expr, MOST_BYTES, arrangement)
}

fn at_most(expr: Expr, most: usize, arrangement: &Arrangement) -> String {
    let parts = |expr, signed| parts(expr, signed, arrangement);
    written(vec![Piece::Whole(expr, Hold::Sum)], most, ["(", ")"], hold, parts)
}

fn parts(expr: Expr, signed: bool, arrangement: &Arrangement) -> Vec<Piece> {
    match expr.kind() {
        Kind::Pi => vec![text("pi")],
        Kind::Symbol(symbol) => vec![text(symbol.to_string())],
        Kind::Sum(terms) => sum(terms, arrangement, ["-", " + ", " - "]),
        Kind::Elementary(function, argument) => call(function.name().to_owned(), &[*argument]),
        Kind::Unknown(application) => unknown(application),
        Kind::Power(base, exponent) if !divides(*base, exponent) => power(*base, exponent),
        Kind::Number(_) | Kind::Product(_) | Kind::Power(..) => quotient(expr, signed, arrangement),
    }
}

fn call(name: String, arguments: &[Expr]) -> Vec<Piece> {
    let mut pieces = vec![text(name), text("(")];
    for (place, argument) in arguments.iter().enumerate() {
        if place > 0 {
            pieces.push(text(", "));
        }
        pieces.push(Piece::Whole(*argument, Hold::Sum));
    }
    pieces.push(text(")"));
    pieces
}

fn unknown(application: &Application) -> Vec<Piece> {
    let (name, orders) = (application.name().as_str(), application.orders());
    let marked = match orders {
        [order] if *order <= 3 => format!("{name}{}", "'".repeat(usize::try_from(*order).unwrap_or(0))),
        _ if orders.iter().all(|order| *order == 0) => name.to_owned(),
        _ => {
            let listed: Vec<String> = orders.iter().map(u32::to_string).collect();
            format!("{name}[{}]", listed.join(","))
        }
    };
    call(marked, application.arguments())
}

fn power(base: Expr, exponent: &Rational) -> Vec<Piece> {
    if exponent.as_small() == Some((1, 2)) {
        return call("sqrt".to_owned(), &[base]);
    }
    let bare = exponent.is_integer() && !exponent.is_negative();
    let exponent = if bare {
        exponent.to_string()
    } else {
        format!("({exponent})")
    };
    vec![Piece::Whole(base, Hold::Atom), text(format!("^{exponent}"))]
}

fn quotient(expr: Expr, signed: bool, arrangement: &Arrangement) -> Vec<Piece> {
    let quotient = Quotient::of(expr, divides, arrangement);
    let mut pieces = Vec::new();
    if signed && quotient.negative {
        pieces.push(text("-"));
    }
    if quotient.written_above() == 0 {
        pieces.push(text("1"));
    } else if !quotient.numerator.is_one() {
        pieces.push(text(quotient.numerator.to_string()));
    }
    let mut first = quotient.numerator.is_one();
    for factor in &quotient.above {
        if !first {
            pieces.push(text("*"));
        }
        first = false;
        pieces.push(Piece::Whole(*factor, Hold::Power));
    }
    if !quotient.has_line() {
        return pieces;
    }
    let count = quotient.below.len() + usize::from(!quotient.denominator.is_one());
    // Dividing by `(a*b)` divides by each factor; a product that is one factor has brackets of its own.
    let product = matches!(quotient.below.as_slice(), [only] if matches!(only.kind(), Kind::Product(_)));
    let bracket = count > 1 || product;
    pieces.push(text(if bracket { "/(" } else { "/" }));
    if !quotient.denominator.is_one() {
        pieces.push(text(quotient.denominator.to_string()));
    }
    for (place, factor) in quotient.below.iter().enumerate() {
        if place > 0 || !quotient.denominator.is_one() {
            pieces.push(text("*"));
        }
        pieces.push(Piece::Whole(*factor, Hold::Power));
    }
    if bracket {
        pieces.push(text(")"));
    }
    pieces
}

/// Plain notation, cut short where it would flood a message.
impl fmt::Debug for Expr {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&at_most(*self, MOST_BYTES_OF_DEBUG, &Arrangement::default()))
    }
}

impl fmt::Display for Expr {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&plain(*self, &Arrangement::default()))
    }
}
