//! What is written, in both notations.

use super::{Arrangement, ReadFault, Scope, latex, latex_lines, latex_name, plain, read};
use crate::expr::{Expr, Name, Symbol, cos, exp, sin, sqrt, tan};
use crate::number::Rational;

fn names<const N: usize>(names: [&str; N]) -> [Expr; N] {
    names.map(|name| Expr::symbol(name).expect("a valid name"))
}

fn rate(expr: Expr, primes: u8) -> Expr {
    expr.as_symbol().expect("a symbol").with_primes(primes).into()
}

/// The crane: constants, coordinates x and phi, time t.
fn arrangement() -> Arrangement {
    let order = ["t", "m_t", "m_c", "l", "g", "x", "phi", "F"];
    let [x, phi, t] = ["x", "phi", "t"].map(|name| Symbol::new(name).expect("a valid name"));
    Arrangement::of_names(order.map(|name| Name::new(name).expect("a valid name")))
        .with_coordinates(&[x, phi])
        .with_dots(t)
}

#[test]
fn accelerations_come_first_then_velocities() {
    let [m_t, m_c, l, x, phi, t] = names(["m_t", "m_c", "l", "x", "phi", "t"]);
    let force = Expr::unknown(Name::new("F").expect("a valid name"), &[t]);
    let equation = (m_t + m_c) * rate(x, 2) + m_c * l * cos(phi) * rate(phi, 2)
        - m_c * l * sin(phi) * rate(phi, 1).squared()
        - force;
    assert_eq!(
        plain(equation, &arrangement()),
        "(m_t + m_c)*x'' + m_c*l*cos(phi)*phi'' - m_c*l*sin(phi)*phi'^2 - F(t)"
    );
    assert_eq!(
        latex(equation, &arrangement()),
        "\\left(m_{t} + m_{c}\\right) \\ddot{x} + m_{c} l \\cos\\varphi\\, \\ddot{\\varphi} - m_{c} l \\sin\\varphi\\, \
         \\dot{\\varphi}^{2} - F\\left(t\\right)"
    );
}

#[test]
fn both_notations() {
    let [l, x, phi, t] = names(["l", "x", "phi", "t"]);
    let two_thirds = Rational::new(2, 3).expect("not zero below");
    let name = Name::new("F").expect("a valid name");
    let cases = [
        (x + l * sin(phi), "x + l*sin(phi)", "x + l \\sin\\varphi"),
        (-l * cos(phi), "-l*cos(phi)", "-l \\cos\\varphi"),
        (
            x / (l * l) - 1 / x,
            "x/l^2 - 1/x",
            "\\frac{x}{l^{2}} - \\frac{1}{x}",
        ),
        (
            3 / (2 * (x + l)),
            "3/((2*(l + x)))",
            "\\frac{3}{2 \\left(l + x\\right)}",
        ),
        (l * x.squared() / 2, "l*x^2/2", "\\frac{1}{2} l x^{2}"),
        (
            sqrt(x) * sin(phi).squared(),
            "sqrt(x)*sin(phi)^2",
            "\\sqrt{x} \\sin^{2}\\varphi",
        ),
        (
            exp(-x) * tan(2 * phi),
            "exp(-x)*tan(2*phi)",
            "\\mathrm{e}^{-x}\\, \\tan\\left(2 \\varphi\\right)",
        ),
        ((-x).power(2), "(-x)^2", "\\left(-x\\right)^{2}"),
        (x.power(two_thirds), "x^(2/3)", "x^{2/3}"),
        (x.power(-1).power(-1), "1/(1/x)", "\\frac{1}{\\frac{1}{x}}"),
        (Expr::zero() * (1 / x), "0/x", "\\frac{0}{x}"),
        (Expr::from(-3) / 4, "-3/4", "-\\frac{3}{4}"),
        (x * (l - x), "x*(l - x)", "x \\left(l - x\\right)"),
        (
            Expr::unknown_derivative(name, &[2], &[t]),
            "F''(t)",
            "\\ddot{F}\\left(t\\right)",
        ),
        (
            Expr::unknown_derivative(name, &[1], &[x]),
            "F'(x)",
            "F'\\left(x\\right)",
        ),
        (
            Expr::unknown_derivative(name, &[1, 0], &[x, l]),
            "F[1,0](x, l)",
            "F^{\\left(1,0\\right)}\\left(x, l\\right)",
        ),
    ];
    for (expr, in_plain, in_latex) in cases {
        assert_eq!(latex(expr, &arrangement()), in_latex);
        assert_eq!(plain(expr, &arrangement()), in_plain);
    }
}

#[test]
fn names_become_letters_and_indices() {
    for (name, expected) in [
        ("x", "x"),
        ("m_t", "m_{t}"),
        ("phi1", "\\varphi_{1}"),
        ("omega_max", "\\omega_{\\mathrm{max}}"),
        ("N_rail_2", "N_{\\mathrm{rail},2}"),
        ("speed", "\\mathrm{speed}"),
        ("Ω", "\\text{Ω}"),
        ("x_", "x"),
    ] {
        assert_eq!(latex_name(name), expected);
    }
}

#[test]
fn long_sums_are_broken_at_signs() {
    let [x, phi] = names(["x", "phi"]);
    let sum: Expr = (1..30).map(|i| sin(i * phi) * rate(x, 2) * i).sum();
    let lines = latex_lines(sum, 40, &arrangement());
    assert!(lines.len() > 4);
    assert!(lines[1..].iter().all(|line| line.starts_with("+ ")), "{lines:?}");
    let bracket = latex_lines(x * sum, 40, &arrangement());
    assert!(
        bracket[0].starts_with("x \\bigl(") && bracket.last().is_some_and(|line| line.contains("\\bigr)"))
    );
    assert_eq!(latex_lines(x + phi, 40, &arrangement()).len(), 1);
}

#[test]
fn deep_and_shared_expressions_are_written_without_overflow() {
    let [x] = names(["x"]);
    let tower = (0..100_000).fold(x, |inner, _| sin(inner));
    assert_eq!(plain(tower, &arrangement()).matches("sin").count(), 100_000);
    assert!(latex(tower, &arrangement()).len() > 100_000);
    assert!(format!("{tower:?}").len() < 3_000, "messages are cut short");
    // Written out, this graph of fifty nodes has 2^50 letters; the text stops instead.
    let shared = (0..50).fold(x, |part, _| sin(part) * cos(part));
    assert!(plain(shared, &arrangement()).ends_with("..."));
}

#[test]
fn the_order_does_not_depend_on_how_a_sum_was_built() {
    let [a, b, c] = names(["a", "b", "c"]);
    let first = plain(a * b + c - a * c + b.squared(), &Arrangement::default());
    let second = plain(b.squared() - a * c + c + b * a, &Arrangement::default());
    assert_eq!(first, second);
}

/// Every expression here has a spelling that a reader could take for another one.
#[test]
fn what_is_written_is_read_as_the_same() {
    let [x, y, t] = names(["x", "y_1", "t"]);
    let half = Rational::new(-1, 2).expect("not zero below");
    let f = Name::new("F").expect("a valid name");
    let long: Expr = (1..400).map(|i| sin(i * x)).sum();
    let cases = [
        x / x,
        Expr::zero() * (1 / x),
        x / 0,
        Expr::from(3) / 2 * (x / 0),
        (2 * x).power(-1),
        x.power(-1) / 2,
        (2 * x).power(-1) * y,
        (2 * x).power(-1) / y,
        (2 * x).power(-2) / 3,
        y / (2 * x),
        x.power(-1).power(-1),
        (x / y).power(-2),
        x.power(half),
        1 / sqrt(x),
        sqrt(x).squared(),
        sqrt(x) * sqrt(x),
        -(x + y),
        -2 * (x + y) * (x - y),
        Expr::product_of([Expr::from(-1), x + y]),
        (-x).squared(),
        Expr::from(2).power(Rational::new(1, 3).expect("not zero below")),
        Expr::from(2).power(i32::MAX),
        Expr::from(-7) / 3,
        exp(-x) * tan(x / 2) + crate::expr::ln(x + 1) - crate::expr::pi() / 6,
        rate(x, 2) * rate(y, 1).power(3),
        Expr::unknown_derivative(f, &[0], &[t]),
        Expr::unknown_derivative(f, &[2], &[x + t]),
        Expr::unknown_derivative(f, &[5], &[t]),
        Expr::unknown_derivative(f, &[0, 2], &[x, y / 2]),
        Expr::unknown(f, &[]),
        long,
        long + x,
        long * long - (x - long),
        (1 / x).power(0),
    ];
    for expr in cases {
        let written = plain(expr, &arrangement());
        let again = read(&written, &Scope::open()).unwrap_or_else(|error| panic!("{error}"));
        assert_eq!(again, expr, "{written} was read as {again}");
    }
}

#[test]
fn decimals_are_read_exactly_and_signs_where_they_may_stand() {
    let [x, m] = names(["x", "m"]);
    for (text, expected) in [
        ("9.81*m", Expr::from(981) / 100 * m),
        ("-x^2", -x.squared()),
        ("x^-1", 1 / x),
        ("x^(-3)", x.power(-3)),
        ("m/(2*x)", m / 2 / x),
        ("x - -0", x),
        ("  x +\tm ", x + m),
    ] {
        let found = read(text, &Scope::open());
        if text.contains("- -") {
            assert!(found.is_err(), "a second sign needs brackets");
        } else {
            assert_eq!(found.expect("reads"), expected, "{text}");
        }
    }
}

#[test]
fn faults_are_pointed_at() {
    for (text, place) in [
        ("", 1),
        ("2*", 3),
        ("2 x", 3),
        ("(x + 1", 7),
        ("x + $", 5),
        ("x^y", 3),
        ("1.2.3", 1),
        ("sin x", 1),
        ("x^(1/0)", 7),
        ("F[1,](x)", 5),
        ("a ++ b", 4),
    ] {
        let error = read(text, &Scope::open()).expect_err(text);
        assert_eq!(error.place, place, "{error}");
        assert!(!error.hint().is_empty());
    }
    let shown = read("x + $", &Scope::open())
        .expect_err("no expression")
        .to_string();
    assert!(shown.ends_with("x + $\n    ^"), "{shown}");
}

#[test]
fn undeclared_names_suggest_the_nearest() {
    let known = ["phi", "m_t"].map(|name| Name::new(name).expect("a valid name"));
    let function = Name::new("F").expect("a valid name");
    let scope = Scope::of(known, [(function, 1)]);
    assert!(read("m_t*phi'' + F(phi)", &scope).is_ok());
    let error = read("m_t*phj", &scope).expect_err("undeclared");
    assert_eq!(error.hint(), "did you mean `phi`?");
    assert!(matches!(
        read("G(phi)", &scope).expect_err("undeclared").what,
        ReadFault::Undeclared { .. }
    ));
    assert!(matches!(
        read("F(phi, m_t)", &scope).expect_err("one argument").what,
        ReadFault::Arguments {
            declared: 1,
            given: 2,
            ..
        }
    ));
}

#[test]
fn deep_and_long_texts_are_refused_without_overflow() {
    let deep = format!("{}x{}", "(".repeat(100_000), ")".repeat(100_000));
    assert_eq!(
        read(&deep, &Scope::open()).expect_err("too deep").what,
        ReadFault::TooDeep
    );
    let long = "x+".repeat(1 << 20);
    assert_eq!(
        read(&long, &Scope::open()).expect_err("too long").what,
        ReadFault::TooLong
    );
    let powers = "x^".repeat(1_000);
    assert!(read(&powers, &Scope::open()).is_err());
}

mod round_trip {
    use proptest::prelude::*;

    use super::super::{Arrangement, Scope, plain, read};
    use crate::expr::{Expr, Function, Name};
    use crate::number::Rational;

    fn leaf() -> impl Strategy<Value = Expr> {
        prop_oneof![
            (0..3usize, 0..3u8).prop_map(|(place, primes)| {
                let symbol = Expr::symbol(["x", "m_t", "phi"][place]).expect("a valid name");
                symbol.as_symbol().expect("a symbol").with_primes(primes).into()
            }),
            (-3..4i64, 1..4i64).prop_map(|(n, d)| Expr::from(n) / d),
            Just(crate::expr::pi()),
        ]
    }

    fn expression() -> impl Strategy<Value = Expr> {
        leaf().prop_recursive(5, 40, 4, |inner| {
            prop_oneof![
                prop::collection::vec(inner.clone(), 2..4).prop_map(Expr::sum_of),
                prop::collection::vec(inner.clone(), 2..4).prop_map(Expr::product_of),
                (inner.clone(), -3..4i64, 1..4i64)
                    .prop_map(|(base, n, d)| base.power(Rational::new(n, d).expect("not zero below"))),
                (inner.clone(), 0..5usize)
                    .prop_map(|(argument, place)| Expr::elementary(Function::ALL[place], argument)),
                (inner.clone(), inner, 0..3u32, 0..2u32).prop_map(|(a, b, i, j)| {
                    let name = Name::new("F").expect("a valid name");
                    Expr::unknown_derivative(name, &[i, j], &[a, b])
                }),
            ]
        })
    }

    proptest! {
        #[test]
        fn of_random_expressions(expr in expression()) {
            let written = plain(expr, &Arrangement::default());
            let again = read(&written, &Scope::open()).map_err(|error| TestCaseError::fail(error.to_string()))?;
            prop_assert_eq!(again, expr, "written as {}", written);
        }

        #[test]
        fn no_text_makes_the_reader_panic(text in "[-+*/^()\\[\\], .'a-c0-9πφ]{0,30}") {
            if let Ok(expr) = read(&text, &Scope::open()) {
                prop_assert!(!plain(expr, &Arrangement::default()).is_empty());
            }
        }
    }
}
