//! The rules on smallest input, and the edges of what can be differentiated.

use super::*;
use crate::effort::Effort;
use crate::expr::{Name, cos, exp, ln, pi, sin, sqrt, tan};

fn xyz() -> [Expr; 3] {
    ["x", "y", "z"].map(|name| Expr::symbol(name).expect("a valid name"))
}

fn by(expr: Expr, variable: Expr) -> Expr {
    derivative(expr, variable).expect("it can be differentiated")
}

/// NIST Digital Library of Mathematical Functions, equations 4.20.1 to 4.20.3 (sine, cosine,
/// tangent), 4.7.3 (exponential), 4.7.1 (logarithm), 4.7.10 (power); the numbers are from memory.
#[test]
fn elementary_functions() {
    let [x, ..] = xyz();
    assert_eq!(by(sin(x), x), cos(x));
    assert_eq!(by(cos(x), x), -sin(x));
    assert_eq!(by(tan(x), x), 1 + tan(x).squared());
    assert_eq!(by(exp(x), x), exp(x));
    assert_eq!(by(ln(x), x), 1 / x);
    assert_eq!(by(x.power(5), x), 5 * x.power(4));
    assert_eq!(by(x.power(-2), x), -2 * x.power(-3));
    assert_eq!(by(sqrt(x), x), half_over_root(x));
    assert_eq!(by(pi(), x), Expr::zero());
}

fn half_over_root(x: Expr) -> Expr {
    let minus_half = crate::Rational::new(-1, 2).expect("two is not zero");
    x.power(minus_half) / 2
}

#[test]
fn zero_terms_are_left_out() {
    let [x, y, z] = xyz();
    assert_eq!(by(3 * ln(x), x), 3 / x);
    assert_eq!(by(y * ln(x) + z / y, x), y / x);
    assert_eq!(by(ln(y) * sqrt(z), x), Expr::zero());
    assert_eq!(by((1 / x).power(0), x), Expr::zero());
}

#[test]
fn undetermined_functions_follow_the_chain_rule() {
    let [x, y, z] = xyz();
    let name = Name::new("U").expect("a valid name");
    let u = Expr::unknown(name, &[x * y, sin(x)]);
    let [u1, u2] = [[1, 0], [0, 1]].map(|orders| Expr::unknown_derivative(name, &orders, &[x * y, sin(x)]));
    assert_eq!(by(u, x), y * u1 + cos(x) * u2);
    assert_eq!(by(u, z), Expr::zero());
    let second = |orders: [u32; 2]| Expr::unknown_derivative(name, &orders, &[x * y, sin(x)]);
    assert_eq!(
        by(by(u, y), x),
        u1 + x * (y * second([2, 0]) + cos(x) * second([1, 1]))
    );
    let most = Expr::unknown_derivative(name, &[u32::MAX], &[x]);
    assert_eq!(derivative(most, x), Err(CalculusError::Order { function: name }));
}

#[test]
fn what_cannot_be_differentiated_is_named() {
    let [x, y, _] = xyz();
    assert_eq!(derivative(x, x + y), Err(CalculusError::NotASymbol { by: x + y }));
    assert_eq!(
        derivative(x, 2),
        Err(CalculusError::NotASymbol { by: Expr::from(2) })
    );
    let nowhere = Expr::one() / 0;
    for expr in [nowhere, x + nowhere, x * sin(nowhere), (x + nowhere).power(2)] {
        assert_eq!(
            derivative(expr, x),
            Err(CalculusError::Undefined { part: nowhere })
        );
    }
}

#[test]
fn rates_refuse_what_is_missing() {
    let [x, y, _] = xyz();
    let symbol = Symbol::new("x").expect("a valid name");
    let rates = Rates::primed(&[symbol], 2);
    let [x1, x2, x3] = [1, 2, 3].map(|primes| Expr::from(symbol.with_primes(primes)));
    let rate = |expr| total_derivative(expr, &rates);
    assert_eq!(rate(y * x.squared()), Ok(2 * y * x * x1));
    assert_eq!(rate(x * x1), Ok(x1.squared() + x * x2));
    let symbol = symbol.with_primes(2);
    assert_eq!(rate(x2), Err(CalculusError::MissingRate { symbol }));
    assert_eq!(total_derivative(x2, &rates.clone().with(symbol, x3)), Ok(x3));
    assert_eq!(total_derivative(x, &Rates::none()), Ok(Expr::zero()));
    let last = symbol.with_primes(u8::MAX);
    assert_eq!(Rates::primed(&[last], 2), Rates::none());
}

#[test]
fn jacobians_have_the_shape_asked_for() {
    let [x, y, _] = xyz();
    let symbols = ["x", "y"].map(|name| Symbol::new(name).expect("a valid name"));
    let j = jacobian(&[x * y, x, sin(y)], &symbols).expect("differentiable");
    assert_eq!(
        j.entries(),
        [y, x, Expr::one(), Expr::zero(), Expr::zero(), cos(y)]
    );
    let none = jacobian(&[], &symbols).expect("differentiable");
    assert_eq!((none.rows(), none.columns()), (0, 2));
    let narrow = jacobian(&[x, y], &[]).expect("differentiable");
    assert_eq!((narrow.rows(), narrow.columns()), (2, 0));
}

#[test]
fn taylor_polynomials() {
    let [x, y, _] = xyz();
    let [sx, sy] = ["x", "y"].map(|name| Symbol::new(name).expect("a valid name"));
    let effort = Effort::default();
    let about_zero = |expr, order| taylor(expr, &[(sx, Expr::zero())], order, &effort);
    // NIST DLMF 4.19.2 and 4.2.19 (from memory).
    assert_eq!(about_zero(cos(x), 4), Ok(1 - x.squared() / 2 + x.power(4) / 24));
    assert_eq!(
        about_zero(exp(x), 3),
        Ok(1 + x + x.squared() / 2 + x.power(3) / 6)
    );
    assert_eq!(about_zero(x.power(3), 2), Ok(Expr::zero()));
    assert_eq!(
        taylor(sin(x) * cos(y), &[(sx, Expr::zero()), (sy, pi())], 0, &effort),
        Ok(Expr::zero())
    );
    let both = [(sx, Expr::one()), (sy, Expr::zero())];
    assert_eq!(
        taylor(y * x.squared(), &both, 2, &effort),
        Ok(y + 2 * (x - 1) * y),
        "the term of third degree is left out"
    );
    assert!(matches!(
        about_zero(ln(x), 1),
        Err(CalculusError::Undefined { .. })
    ));
    assert!(matches!(
        about_zero(sqrt(x.squared()), 1),
        Err(CalculusError::Undefined { .. })
    ));
    let little = Effort {
        operations: 1_000,
        ..effort
    };
    let growing = taylor(tan(x + tan(x)), &[(sx, y)], 40, &little);
    assert_eq!(growing, Err(CalculusError::TooLarge(Limit::Operations(1_000))));
}

#[test]
fn long_and_deep_expressions_are_cheap() {
    let [x, y, _] = xyz();
    let sum: Expr = (1..10_000).map(|i| i * sin(i * x)).sum();
    let rate = by(sum, x);
    assert_eq!(rate.terms().len(), 9_999);
    let product: Expr = (1..2_000).map(|i| sin(i * x) + i * y).product();
    assert!(by(product, x).node_count() < 50_000);
    let mut tower = x;
    for _ in 0..100_000 {
        tower = exp(tower + y);
    }
    assert!(by(tower, x).contains(tower));
}

#[test]
fn long_products_obey_the_same_rule_as_short_ones() {
    let symbols: Vec<Symbol> = (0..80)
        .map(|i| Symbol::new(&format!("a{i}")).expect("a valid name"))
        .collect();
    let product: Expr = symbols.iter().map(|symbol| Expr::from(*symbol)).product();
    for omitted in [0, 1, 40, 79] {
        let others = symbols.iter().enumerate().filter(|(i, _)| *i != omitted);
        let expected: Expr = others.map(|(_, symbol)| Expr::from(*symbol)).product();
        assert_eq!(derivative(product, symbols[omitted]), Ok(expected));
    }
}
