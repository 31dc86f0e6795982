//! Expressions and the form in which an engineer reads them.

use super::*;
use crate::decide::compare;
use crate::expr::{cos, pi, sin, sqrt, tan};

fn symbols<const N: usize>(names: [&str; N]) -> [Expr; N] {
    names.map(|name| Expr::symbol(name).expect("a valid name"))
}

#[track_caller]
fn becomes(expr: Expr, by: &[Expr], expected: Expr) {
    let by: Vec<Symbol> = by
        .iter()
        .map(|expr| expr.as_symbol().expect("a symbol"))
        .collect();
    let effort = Effort::default();
    let found = collected(expr, &by, &effort);
    assert!(compare(found, expr, &effort).is_proved(), "{expr} became {found}");
    assert_eq!(found, expected, "{found} instead of {expected}");
}

#[test]
fn coefficients_have_their_common_factors_in_front() {
    let [m, n, l, x, y] = symbols(["m", "n", "l", "x", "y"]);
    becomes(m * x + n * x + m * l * y, &[x, y], (m + n) * x + m * l * y);
    becomes(m * l * x / 2 + n * l * x / 2, &[x], (m + n) * l * x / 2);
    becomes(-m * x - n * x, &[x], -1 * (m + n) * x);
    becomes(m * l - n * l, &[], l * (m - n));
}

#[test]
fn sines_and_cosines_are_written_in_their_shortest_way() {
    let [m, l, a, b, x] = symbols(["m", "l", "a", "b", "x"]);
    becomes(
        m * l * x * (cos(a) * cos(b) + sin(a) * sin(b)),
        &[x],
        m * l * x * cos(a - b),
    );
    becomes(x * (1 - cos(a).squared()), &[x], x * sin(a).squared());
    becomes(x * sin(a) * cos(a), &[x], x * sin(a) * cos(a));
    becomes(
        cos(a).power(4) + sin(a).power(4) + 2 * (sin(a) * cos(a)).squared(),
        &[],
        Expr::one(),
    );
    becomes(m * cos(a + b), &[], m * cos(a + b));
}

#[test]
fn single_divisors_stay_with_their_terms() {
    let [k, m, r, x, y] = symbols(["k", "m", "r", "x", "y"]);
    becomes(m * x + k * y / r, &[x], m * x + k * y / r);
    let root = sqrt(x.squared() + y.squared());
    becomes(m * x - k * x / root, &[], x * (m - k / root));
    becomes(x / (m + k) + y / (m + k), &[], (x + y) / (m + k));
}

#[test]
fn what_cannot_be_arranged_stays_as_it_is() {
    let [x, y] = symbols(["x", "y"]);
    let nothing = tan(pi() / 2) * x + y;
    assert_eq!(collected(nothing, &[], &Effort::default()), nothing);
    let large = (x + y + 1).power(40);
    let small = Effort {
        terms: 10,
        ..Effort::default()
    };
    assert_eq!(collected(large, &[], &small), large);
}
