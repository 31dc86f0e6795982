//! The table of units and prefixes of UCUM that mechanics uses, and the spellings often met instead.

use cas::{Expr, exact};

use super::dimension::Dimension;
use super::nearest::nearest_of;
use super::unit::degree;

/// A row of the table: symbol, whether it takes prefixes, powers of M, L, T, and the factor.
type Row = (&'static str, bool, [i64; 3], fn() -> Expr);

fn decimal(text: &str) -> Expr {
    exact(text).expect("invariant: the table holds numbers")
}

/// [UCUM, tables 1 to 5]; the international inch and avoirdupois pound are exact by definition.
const UNITS: &[Row] = &[
    ("m", true, [0, 1, 0], Expr::one),
    ("s", true, [0, 0, 1], Expr::one),
    ("g", true, [1, 0, 0], || decimal("1e-3")),
    ("rad", true, [0, 0, 0], Expr::one),
    ("sr", true, [0, 0, 0], Expr::one),
    ("N", true, [1, 1, -2], Expr::one),
    ("J", true, [1, 2, -2], Expr::one),
    ("W", true, [1, 2, -3], Expr::one),
    ("Pa", true, [1, -1, -2], Expr::one),
    ("Hz", true, [0, 0, -1], Expr::one),
    ("bar", true, [1, -1, -2], || decimal("100000")),
    ("t", true, [1, 0, 0], || decimal("1000")),
    ("l", true, [0, 3, 0], || decimal("1e-3")),
    ("L", true, [0, 3, 0], || decimal("1e-3")),
    ("min", false, [0, 0, 1], || decimal("60")),
    ("h", false, [0, 0, 1], || decimal("3600")),
    ("d", false, [0, 0, 1], || decimal("86400")),
    ("deg", false, [0, 0, 0], degree),
    ("'", false, [0, 0, 0], || degree() / 60),
    ("''", false, [0, 0, 0], || degree() / 3600),
    ("%", false, [0, 0, 0], || decimal("1/100")),
    ("10*", false, [0, 0, 0], || decimal("10")),
    ("10^", false, [0, 0, 0], || decimal("10")),
    ("[pi]", false, [0, 0, 0], cas::pi),
    ("[g]", true, [0, 1, -2], || decimal("9.80665")),
    ("[in_i]", false, [0, 1, 0], || decimal("0.0254")),
    ("[ft_i]", false, [0, 1, 0], || decimal("0.3048")),
    ("[yd_i]", false, [0, 1, 0], || decimal("0.9144")),
    ("[mi_i]", false, [0, 1, 0], || decimal("1609.344")),
    ("[lb_av]", false, [1, 0, 0], || decimal("0.45359237")),
    ("[lbf_av]", false, [1, 1, -2], || decimal("4.4482216152605")),
];

/// [UCUM, table of prefixes].
const PREFIXES: &[(&str, &str)] = &[
    ("da", "1e1"),
    ("Y", "1e24"),
    ("Z", "1e21"),
    ("E", "1e18"),
    ("P", "1e15"),
    ("T", "1e12"),
    ("G", "1e9"),
    ("M", "1e6"),
    ("k", "1e3"),
    ("h", "1e2"),
    ("d", "1e-1"),
    ("c", "1e-2"),
    ("m", "1e-3"),
    ("u", "1e-6"),
    ("n", "1e-9"),
    ("p", "1e-12"),
    ("f", "1e-15"),
    ("a", "1e-18"),
    ("z", "1e-21"),
    ("y", "1e-24"),
];

/// Units that UCUM has and that mass, length and time do not make up.
const OUTSIDE_MECHANICS: &[&str] = &[
    "K", "Cel", "A", "V", "C", "Ohm", "S", "F", "Wb", "T", "H", "mol", "cd", "lm", "lx", "B", "kat", "[degF]",
];

/// Words and abbreviations often written, and the code meant.
const HABITS: &[(&str, &str)] = &[
    ("sec", "s"),
    ("second", "s"),
    ("seconds", "s"),
    ("meter", "m"),
    ("metre", "m"),
    ("meters", "m"),
    ("metres", "m"),
    ("kilogram", "kg"),
    ("kilograms", "kg"),
    ("KG", "kg"),
    ("Kg", "kg"),
    ("gram", "g"),
    ("newton", "N"),
    ("Newton", "N"),
    ("joule", "J"),
    ("Joule", "J"),
    ("watt", "W"),
    ("Watt", "W"),
    ("pascal", "Pa"),
    ("hertz", "Hz"),
    ("radian", "rad"),
    ("radians", "rad"),
    ("degree", "deg"),
    ("degrees", "deg"),
    ("°", "deg"),
    ("hour", "h"),
    ("hr", "h"),
    ("minute", "min"),
    ("ton", "t"),
    ("tonne", "t"),
    ("rpm", "{turn}/min"),
    ("rev", "{turn}"),
    ("inch", "[in_i]"),
    ("in", "[in_i]"),
    ("ft", "[ft_i]"),
    ("lb", "[lb_av]"),
    ("lbf", "[lbf_av]"),
    ("-", "1"),
];

/// Dimension and factor of one symbol, with or without a prefix.
pub(super) fn unit(symbol: &str) -> Option<(Dimension, Expr)> {
    let row = |name: &str| UNITS.iter().find(|(known, ..)| *known == name);
    let value = |(_, _, [m, l, t], factor): &Row| (Dimension::new(*m, *l, *t), factor());
    if let Some(row) = row(symbol) {
        return Some(value(row));
    }
    PREFIXES.iter().find_map(|(prefix, power)| {
        let row = row(symbol.strip_prefix(prefix)?).filter(|(_, metric, ..)| *metric)?;
        let (dimension, factor) = value(row);
        Some((dimension, decimal(power) * factor))
    })
}

/// Whether the symbol is a unit of UCUM, with or without a prefix, that mechanics has no use for.
pub(super) fn is_outside_mechanics(symbol: &str) -> bool {
    OUTSIDE_MECHANICS.contains(&symbol)
        || PREFIXES.iter().any(|(prefix, _)| {
            symbol
                .strip_prefix(prefix)
                .is_some_and(|rest| OUTSIDE_MECHANICS.contains(&rest))
        })
}

/// The code that this symbol was probably meant to be.
pub(super) fn nearest(symbol: &str) -> Option<String> {
    if let Some((_, code)) = HABITS.iter().find(|(habit, _)| *habit == symbol) {
        return Some((*code).to_owned());
    }
    let plain = UNITS.iter().map(|(name, ..)| (*name).to_owned());
    let usual = [
        "kg", "mm", "cm", "km", "ms", "kN", "MN", "kJ", "kW", "MPa", "kPa", "GPa", "mrad",
    ];
    nearest_of(symbol, usual.iter().map(|code| (*code).to_owned()).chain(plain))
}

/// The text in UCUM's way of writing products and exponents, where it is written another way.
pub(super) fn respelled(code: &str) -> Option<String> {
    let mut result = String::with_capacity(code.len());
    let mut rest = code.trim().chars().peekable();
    while let Some(character) = rest.next() {
        match character {
            '*' if !result.ends_with("10") && rest.peek() == Some(&'*') => {
                rest.next();
            }
            '*' if !result.ends_with("10") => result.push('.'),
            '^' if !result.ends_with("10") => {}
            '·' | '⋅' | '×' => result.push('.'),
            '÷' => result.push('/'),
            '−' => result.push('-'),
            '²' => result.push('2'),
            '³' => result.push('3'),
            'µ' | 'μ' => result.push('u'),
            '°' => result.push_str("deg"),
            ' ' => {
                let joins = |c: char| matches!(c, '.' | '/' | '(' | '*' | '·');
                let joined =
                    result.ends_with(joins) || rest.peek().is_none_or(|next| joins(*next) || *next == ' ');
                if !joined {
                    result.push('.');
                }
            }
            other => result.push(other),
        }
    }
    (result != code).then_some(result)
}
