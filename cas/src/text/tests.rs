//! What is written, in both notations.

use super::{Arrangement, latex, latex_lines, latex_name, plain};
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
            "3/(2*(l + x))",
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
