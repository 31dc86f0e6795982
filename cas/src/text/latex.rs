//! LaTeX that KaTeX and MathJax both accept: nothing but known commands, letters and digits.

use num_traits::One;

use super::arrangement::Arrangement;
use super::order;
use super::pieces::{Hold, MOST_BYTES, Piece, Quotient, hold as plain_hold, sum, text, written};
use crate::expr::{Application, Expr, Function, Kind, Symbol};
use crate::number::Rational;

/// The expression in LaTeX, on one line.
///
/// ```
/// use cas::{Expr, cos, text::{Arrangement, latex}};
/// let [m, phi] = ["m_t", "phi"].map(|name| Expr::symbol(name).expect("a valid name"));
/// assert_eq!(latex(m * cos(phi), &Arrangement::default()), "m_{t} \\cos\\varphi");
/// ```
#[must_use]
pub fn latex(expr: Expr, arrangement: &Arrangement) -> String {
    latex_of(vec![Piece::Whole(expr, Hold::Sum)], arrangement)
}

/// Pieces in LaTeX.
pub(super) fn latex_of(pieces: Vec<Piece>, arrangement: &Arrangement) -> String {
    let parts = |expr, signed| parts(expr, signed, arrangement);
    written(pieces, MOST_BYTES, ["\\left(", "\\right)"], hold, parts)
}

/// Every negative power stands below the fraction bar.
pub(super) fn goes_below(_: Expr, exponent: &Rational) -> bool {
    exponent.is_negative()
}

/// A fraction bar holds its parts together; an exponential is a power.
fn hold(expr: Expr) -> Hold {
    match expr.kind() {
        Kind::Elementary(Function::Exponential, _) => Hold::Power,
        Kind::Elementary(..) => Hold::Product,
        // The order of a derivative stands where a power would.
        Kind::Symbol(symbol) if symbol.primes() > 2 => Hold::Power,
        Kind::Power(_, exponent) if exponent.is_negative() => Hold::Product,
        _ => plain_hold(expr),
    }
}

/// Whether a factor would run into a number before it.
fn begins_with_digit(factor: Expr) -> bool {
    let half = |exponent: &Rational| exponent.as_small() == Some((1, 2));
    match factor.kind() {
        Kind::Power(base, exponent) if !exponent.is_negative() && !half(exponent) => {
            let number = base.as_number();
            number.is_some_and(|number| number.is_integer() && !number.is_negative())
        }
        _ => false,
    }
}

/// What stands between a number and the factors after it.
pub(super) fn behind_number(factors: &[Expr]) -> &'static str {
    match factors.first() {
        Some(first) if begins_with_digit(*first) => " \\cdot ",
        _ => " ",
    }
}

/// The factors of a product, with thin spaces where a function would run into what follows.
pub(super) fn factors(factors: &[Expr]) -> Vec<Piece> {
    let mut pieces = Vec::new();
    let mut after_function = false;
    for (place, factor) in factors.iter().enumerate() {
        if place > 0 {
            pieces.push(text(match (begins_with_digit(*factor), after_function) {
                (true, _) => " \\cdot ",
                (false, true) => "\\, ",
                (false, false) => " ",
            }));
        }
        let base = match factor.kind() {
            Kind::Power(base, _) => *base,
            _ => *factor,
        };
        after_function = matches!(base.kind(), Kind::Elementary(..) | Kind::Unknown(_));
        // A sine among factors needs no brackets around itself.
        let asked = if matches!(factor.kind(), Kind::Elementary(..)) {
            Hold::Product
        } else {
            Hold::Power
        };
        pieces.push(Piece::Whole(*factor, asked));
    }
    pieces
}

fn parts(expr: Expr, signed: bool, arrangement: &Arrangement) -> Vec<Piece> {
    match expr.kind() {
        Kind::Pi => vec![text("\\pi")],
        Kind::Symbol(symbol) => vec![text(symbol_latex(*symbol))],
        Kind::Sum(terms) => sum(terms, arrangement, ["-", " + ", " - "]),
        Kind::Elementary(function, argument) => elementary(*function, *argument, None),
        Kind::Unknown(application) => unknown(application, arrangement),
        Kind::Power(base, exponent) if !exponent.is_negative() => power(*base, exponent),
        Kind::Number(_) | Kind::Product(_) | Kind::Power(..) => quotient(expr, signed, arrangement),
    }
}

fn group(expr: Expr) -> [Piece; 3] {
    [text("{"), Piece::Whole(expr, Hold::Sum), text("}")]
}

fn elementary(function: Function, argument: Expr, exponent: Option<i64>) -> Vec<Piece> {
    if function == Function::Exponential {
        let mut pieces = vec![text("\\mathrm{e}^")];
        pieces.extend(group(argument));
        return pieces;
    }
    let raised = exponent.map_or(String::new(), |exponent| format!("^{{{exponent}}}"));
    let mut pieces = vec![text(format!("\\{}{raised}", function.name()))];
    let bare = argument.as_symbol().is_some_and(|symbol| symbol.primes() == 0)
        || matches!(argument.kind(), Kind::Pi);
    if bare {
        // A command name ends where its argument begins with a backslash; a letter needs a space.
        let name = match argument.as_symbol() {
            Some(symbol) => symbol_latex(symbol),
            None => "\\pi".to_owned(),
        };
        let space = if raised.is_empty() && !name.starts_with('\\') {
            " "
        } else {
            ""
        };
        pieces.push(text(format!("{space}{name}")));
    } else {
        pieces.extend([
            text("\\left("),
            Piece::Whole(argument, Hold::Sum),
            text("\\right)"),
        ]);
    }
    pieces
}

fn power(base: Expr, exponent: &Rational) -> Vec<Piece> {
    if exponent.as_small() == Some((1, 2)) {
        let mut pieces = vec![text("\\sqrt")];
        pieces.extend(group(base));
        return pieces;
    }
    if let (Kind::Elementary(function, argument), Some(exponent @ 2..)) = (base.kind(), exponent.as_integer())
        && matches!(function, Function::Sine | Function::Cosine | Function::Tangent)
    {
        return elementary(*function, *argument, Some(exponent));
    }
    vec![Piece::Whole(base, Hold::Atom), text(format!("^{{{exponent}}}"))]
}

fn quotient(expr: Expr, signed: bool, arrangement: &Arrangement) -> Vec<Piece> {
    let quotient = Quotient::of(expr, goes_below, arrangement);
    let mut pieces = Vec::new();
    if signed && quotient.negative {
        pieces.push(text("-"));
    }
    if quotient.below.is_empty() {
        let number = coefficient(&quotient);
        if !number.is_empty() || quotient.above.is_empty() {
            pieces.push(text(if number.is_empty() { "1".to_owned() } else { number }));
            if !quotient.above.is_empty() {
                pieces.push(text(behind_number(&quotient.above)));
            }
        }
        pieces.extend(factors(&quotient.above));
        return pieces;
    }
    pieces.push(text("\\frac{"));
    pieces.extend(line(
        &quotient.numerator.to_string(),
        quotient.numerator.is_one(),
        &quotient.above,
    ));
    pieces.push(text("}{"));
    pieces.extend(line(
        &quotient.denominator.to_string(),
        quotient.denominator.is_one(),
        &quotient.below,
    ));
    pieces.push(text("}"));
    pieces
}

/// The number in front of a product without its sign; empty for one.
pub(super) fn coefficient(quotient: &Quotient) -> String {
    match (quotient.numerator.is_one(), quotient.denominator.is_one()) {
        (true, true) => String::new(),
        (_, true) => quotient.numerator.to_string(),
        _ => format!("\\frac{{{}}}{{{}}}", quotient.numerator, quotient.denominator),
    }
}

/// What stands above or below a fraction bar; a single factor needs no brackets there.
fn line(number: &str, is_one: bool, parts: &[Expr]) -> Vec<Piece> {
    match parts {
        [] => vec![text(number)],
        [only] if is_one => vec![Piece::Whole(*only, Hold::Sum)],
        _ if is_one => factors(parts),
        _ => {
            let mut pieces = vec![text(format!("{number}{}", behind_number(parts)))];
            pieces.extend(factors(parts));
            pieces
        }
    }
}

fn unknown(application: &Application, arrangement: &Arrangement) -> Vec<Piece> {
    let (orders, arguments) = (application.orders(), application.arguments());
    let name = latex_name(application.name().as_str());
    let marked = match (orders, arguments) {
        ([order], [argument]) => {
            let dotted = argument
                .as_symbol()
                .is_some_and(|symbol| arrangement.has_dots(symbol));
            if dotted {
                dots(&name, *order)
            } else {
                primes(&name, *order)
            }
        }
        _ if orders.iter().all(|order| *order == 0) => name,
        // The orders of differentiation by each argument, as for derivatives in general.
        _ => {
            let listed: Vec<String> = orders.iter().map(u32::to_string).collect();
            format!("{name}^{{\\left({}\\right)}}", listed.join(","))
        }
    };
    let mut pieces = vec![text(marked), text("\\left(")];
    for (place, argument) in arguments.iter().enumerate() {
        if place > 0 {
            pieces.push(text(", "));
        }
        pieces.push(Piece::Whole(*argument, Hold::Sum));
    }
    pieces.push(text("\\right)"));
    pieces
}

fn primes(name: &str, order: u32) -> String {
    match order {
        0 => name.to_owned(),
        1..=3 => format!("{name}{}", "'".repeat(usize::try_from(order).unwrap_or(0))),
        _ => format!("{name}^{{\\left({order}\\right)}}"),
    }
}

fn dots(name: &str, order: u32) -> String {
    match order {
        0 => name.to_owned(),
        1 => format!("\\dot{{{name}}}"),
        2 => format!("\\ddot{{{name}}}"),
        _ => format!("{{{name}}}^{{\\left({order}\\right)}}"),
    }
}

fn symbol_latex(symbol: Symbol) -> String {
    // Dots stand over the letter, the index beside it.
    let name = symbol.name().as_str();
    let (stem, index) = name
        .split_once('_')
        .map_or((name, None), |(stem, index)| (stem, Some(index)));
    let dotted = dots(&letters(stem), symbol.primes().into());
    match index.map(index_latex).filter(|index| !index.is_empty()) {
        Some(index) if symbol.primes() == 0 => indexed(stem, &index),
        Some(index) => format!("{dotted}_{{{index}}}"),
        None => dotted,
    }
}

/// A name in LaTeX: Greek letters, an index after the first underscore.
#[must_use]
pub fn latex_name(name: &str) -> String {
    let (stem, index) = name.split_once('_').unwrap_or((name, ""));
    match index_latex(index) {
        index if index.is_empty() => letters(stem),
        index => indexed(stem, &index),
    }
}

/// A stem with its index; a stem that has an index of its own is held together.
fn indexed(stem: &str, index: &str) -> String {
    let letters = letters(stem);
    if letters.contains("_{") {
        format!("{{{letters}}}_{{{index}}}")
    } else {
        format!("{letters}_{{{index}}}")
    }
}

fn index_latex(index: &str) -> String {
    let parts: Vec<String> = index
        .split('_')
        .filter(|part| !part.is_empty())
        .map(letters)
        .collect();
    parts.join(",")
}

/// Names of Greek letters that have a command of their own; `phi`, `epsilon` as the trade writes them.
pub(super) const GREEK: [&str; 33] = [
    "alpha", "beta", "gamma", "delta", "zeta", "eta", "theta", "iota", "kappa", "lambda", "mu", "nu", "xi",
    "rho", "sigma", "tau", "upsilon", "chi", "psi", "omega", "Gamma", "Delta", "Theta", "Lambda", "Xi", "Pi",
    "Sigma", "Upsilon", "Phi", "Psi", "Omega", "phi", "epsilon",
];

/// A stem or index: a Greek letter, one letter, digits, or a word in upright letters.
fn letters(word: &str) -> String {
    // `phi1` is an index written without its underscore.
    let digits_from = word.find(|c: char| c.is_ascii_digit()).unwrap_or(word.len());
    let (stem, digits) = word.split_at(digits_from);
    let pure = digits.chars().all(|c| c.is_ascii_digit());
    if !stem.is_empty() && !digits.is_empty() && pure {
        return format!("{}_{{{digits}}}", letters(stem));
    }
    match word {
        "phi" => "\\varphi".to_owned(),
        "epsilon" => "\\varepsilon".to_owned(),
        _ if GREEK.contains(&word) => format!("\\{word}"),
        _ if word.is_ascii() && (word.len() == 1 || word.bytes().all(|b| b.is_ascii_digit())) => {
            word.to_owned()
        }
        _ if word.is_ascii() => format!("\\mathrm{{{word}}}"),
        // Letters beyond ASCII are text to both typesetters.
        _ => format!("\\text{{{word}}}"),
    }
}

/// Terms of a sum in LaTeX, each with its sign, in the order in which they are written.
pub(super) fn signed_terms(terms: &[Expr], arrangement: &Arrangement) -> Vec<(bool, String)> {
    order::terms(terms.to_vec(), arrangement)
        .into_iter()
        .map(|term| {
            let negative = term.coefficient_and_rest().0.is_negative();
            let piece = match term.kind() {
                Kind::Sum(_) => Piece::Whole(term, Hold::Product),
                _ => Piece::Magnitude(term),
            };
            (negative, latex_of(vec![piece], arrangement))
        })
        .collect()
}
