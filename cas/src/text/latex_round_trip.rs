//! What the writer prints is read back, and no text makes the reader panic.

use proptest::prelude::*;

use super::{Arrangement, Scope, latex, read_latex, read_latex_equations};
use crate::expr::{Expr, Function, Kind, Name, Symbol};
use crate::number::Rational;

const SYMBOLS: [&str; 10] = [
    "x",
    "m_t",
    "phi",
    "e",
    "rope",
    "phi1",
    "q_1_2",
    "delta1_2",
    "exp_1",
    "omega_max",
];

fn scope() -> Scope {
    let name = |text: &str| Name::new(text).expect("a valid name");
    Scope::of(SYMBOLS.map(name), [(name("F"), 2), (name("U"), 1)])
}

fn arrangement() -> Arrangement {
    Arrangement::default().with_dots(Symbol::new("x").expect("a valid name"))
}

fn leaf() -> impl Strategy<Value = Expr> {
    prop_oneof![
        4 => (0..SYMBOLS.len(), 0..5u8).prop_map(|(place, primes)| {
            let symbol = Symbol::new(SYMBOLS[place]).expect("a valid name");
            symbol.with_primes(primes.saturating_sub(1)).into()
        }),
        2 => (-3..4i64, 1..4i64).prop_map(|(n, d)| Expr::from(n) / d),
        1 => Just(crate::expr::pi()),
    ]
}

fn of_powers(power: impl Fn(Expr, Rational) -> Expr + Copy + 'static) -> impl Strategy<Value = Expr> {
    leaf().prop_recursive(5, 40, 4, move |inner| {
        let unknown = |text: &str| Name::new(text).expect("a valid name");
        prop_oneof![
            prop::collection::vec(inner.clone(), 2..4).prop_map(Expr::sum_of),
            prop::collection::vec(inner.clone(), 2..4).prop_map(Expr::product_of),
            (inner.clone(), -3..4i64, 1..4i64)
                .prop_map(move |(base, n, d)| power(base, Rational::new(n, d).expect("not zero below"))),
            (inner.clone(), 0..5usize)
                .prop_map(|(argument, place)| Expr::elementary(Function::ALL[place], argument)),
            (inner.clone(), inner.clone(), 0..3u32, 0..2u32)
                .prop_map(move |(a, b, i, j)| Expr::unknown_derivative(unknown("F"), &[i, j], &[a, b])),
            (inner, 0..5u32).prop_map(move |(a, i)| Expr::unknown_derivative(unknown("U"), &[i], &[a])),
        ]
    })
}

/// Powers that look like no other power: a fraction bar does not show whether a product below it was
/// inverted as a whole, nor in which order a root was taken and inverted.
fn distinct(base: Expr, exponent: Rational) -> Expr {
    let below = exponent.is_negative();
    match base.kind() {
        Kind::Product(factors) if below => {
            Expr::product_of(factors.iter().map(|factor| distinct(*factor, exponent.clone())))
        }
        Kind::Power(..) if below => base,
        Kind::Number(value) if value.is_zero() => base,
        _ => base.power(exponent),
    }
}

/// As [`distinct`], but only where a number would stand below the line: it is read as a number itself.
fn inverted(base: Expr, exponent: Rational) -> Expr {
    match base.kind() {
        Kind::Number(_) => distinct(base, exponent),
        Kind::Product(factors) if factors[0].as_number().is_some() => distinct(base, exponent),
        _ => base.power(exponent),
    }
}

fn token() -> impl Strategy<Value = &'static str> {
    const TOKENS: [&str; 64] = [
        "x",
        "y ",
        "m_t",
        "\\varphi ",
        "\\theta ",
        "e",
        "d",
        "t",
        "\\mathrm{d}",
        "\\mathrm{e}",
        "\\mathrm{ml}",
        "F",
        "F(x,y)",
        "U",
        "\\dot",
        "\\ddot",
        "\\frac",
        "\\tfrac12",
        "\\sqrt",
        "\\sqrt[3]",
        "{",
        "}",
        "{x}",
        "(",
        ")",
        "\\left(",
        "\\right)",
        "[",
        "]",
        "\\{",
        "\\}",
        "^",
        "^2",
        "^{2}",
        "^{-1}",
        "^{\\left(3\\right)}",
        "_",
        "_1",
        "_{a,b}",
        "'",
        "^{\\prime}",
        "\\sin",
        "\\cos ",
        "\\sinh",
        "\\exp",
        "\\ln",
        "\\,",
        "+",
        "-",
        "=",
        "\\cdot ",
        "/",
        "&",
        "\\\\",
        "\\begin{align}",
        "\\end{align}",
        "$",
        "\\[",
        "\\]",
        "\\partial ",
        "|",
        "9.81",
        ",",
        ".",
    ];
    (0..TOKENS.len()).prop_map(|place| TOKENS[place])
}

/// Neither reader panics, whatever they are given, and a fault names a place in the text.
fn survives(text: &str) -> Result<(), TestCaseError> {
    for scope in [Scope::open(), scope()] {
        let read = read_latex(text, &scope).map(drop);
        for result in [read, read_latex_equations(text, &scope).map(drop)] {
            if let Err(error) = result {
                prop_assert!(
                    (1..=text.chars().count() + 1).contains(&error.place),
                    "{:?}",
                    error
                );
                prop_assert!(!error.hint().is_empty() && !error.to_string().is_empty());
            }
        }
    }
    Ok(())
}

proptest! {
    #[test]
    fn the_same_expression_is_read_back(expr in of_powers(distinct)) {
        let written = latex(expr, &arrangement());
        let again = read_latex(&written, &scope())
            .map_err(|error| TestCaseError::fail(format!("{error} in {written}")))?;
        prop_assert_eq!(again, expr, "written as {}", written);
    }

    #[test]
    fn any_expression_is_read_as_one_that_is_written_the_same(expr in of_powers(inverted)) {
        let written = latex(expr, &arrangement());
        let again = read_latex(&written, &scope())
            .map_err(|error| TestCaseError::fail(format!("{error} in {written}")))?;
        prop_assert_eq!(latex(again, &arrangement()), written);
    }

    #[test]
    fn no_text_makes_the_reader_panic(text in "\\PC{0,40}") {
        survives(&text)?;
    }

    #[test]
    fn no_formula_makes_the_reader_panic(text in "[-+*/^_(){}\\[\\]&$|=, .'~%\\\\a-e0-9π]{0,40}") {
        survives(&text)?;
    }

    #[test]
    fn no_tokens_make_the_reader_panic(parts in prop::collection::vec(token(), 0..25)) {
        survives(&parts.concat())?;
    }
}

#[test]
fn deep_and_long_texts_are_refused_without_overflow() {
    let nested = [
        ("(", "x", ")"),
        ("{", "x", "}"),
        ("\\frac{1}{", "x", "}"),
        ("\\sqrt{", "x", "}"),
        ("\\sin\\left(", "x", "\\right)"),
        ("x^{", "2", "}"),
        ("\\dot{", "x", "}"),
        ("\\dot", "x", ""),
        ("\\frac", "1", "2"),
        ("\\sin ", "x", ""),
        ("-", "x", ""),
        ("x_{", "1", "}"),
        ("\\begin{align}", "x", "\\end{align}"),
        ("e^{", "x", "}"),
        ("x^", "2", ""),
        ("x", "", ""),
        ("x'", "", ""),
        ("x\\\\", "", "="),
    ];
    for (open, middle, close) in nested {
        let deep = format!("{}{middle}{}", open.repeat(20_000), close.repeat(20_000));
        for scope in [Scope::open(), scope()] {
            // Neither hangs nor overflows; some are correct.
            let _ = read_latex(&deep, &scope);
            let _ = read_latex_equations(&deep, &scope);
        }
    }
    let long = "x+".repeat(1 << 20);
    let error = read_latex(&long, &Scope::open()).expect_err("too long");
    assert_eq!(error.what, super::ReadFault::TooLong);
    let deep = format!("{}x{}", "(".repeat(1_000), ")".repeat(1_000));
    let error = read_latex(&deep, &Scope::open()).expect_err("too deep");
    assert_eq!((error.what, error.place), (super::ReadFault::TooDeep, 201));
}
