//! Which conditions hold already because others do: positive constants make their products positive.

use cas::{Expr, Function, Kind};

use crate::model::{Condition, Model, Role};

/// More parts than this are not looked at; a condition then counts as not implied.
const MOST_PARTS: usize = 10_000;

/// Deeper nesting than this is not looked at either; the descent uses the stack.
const DEEPEST: usize = 100;

/// What a model declares about signs: its positive constants.
#[must_use]
pub fn given(model: &Model) -> Vec<Condition> {
    let positive = model
        .quantities()
        .iter()
        .filter(|declared| declared.role() == Role::PositiveConstant);
    positive
        .map(|declared| Condition::Positive(declared.value()))
        .collect()
}

/// Whether a condition follows from those that are known, by the signs of its parts.
///
/// `false` means only that it was not seen.
#[must_use]
pub fn is_implied(condition: Condition, known: &[Condition]) -> bool {
    if known.contains(&condition) {
        return true;
    }
    let mut parts = MOST_PARTS;
    let sign = sign(condition.expr(), known, DEEPEST, &mut parts);
    match condition {
        Condition::NotZero(_) => matches!(sign, Sign::Positive | Sign::NotZero),
        Condition::NotNegative(_) => matches!(sign, Sign::Positive | Sign::NotNegative),
        Condition::Positive(_) => sign == Sign::Positive,
    }
}

/// What is known of a value, wherever it has one.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Sign {
    Positive,
    NotNegative,
    NotZero,
    Unknown,
}

fn sign(expr: Expr, known: &[Condition], depth: usize, parts: &mut usize) -> Sign {
    if known.contains(&Condition::Positive(expr)) {
        return Sign::Positive;
    }
    let stated = match (
        known.contains(&Condition::NotZero(expr)),
        known.contains(&Condition::NotNegative(expr)),
    ) {
        (true, true) => return Sign::Positive,
        (true, false) => Sign::NotZero,
        (false, true) => Sign::NotNegative,
        (false, false) => Sign::Unknown,
    };
    if depth == 0 || *parts == 0 {
        return stated;
    }
    *parts -= 1;
    let mut of = |part: Expr| sign(part, known, depth - 1, parts);
    let found = match expr.kind() {
        Kind::Number(number) if number.is_positive() => Sign::Positive,
        Kind::Number(number) if number.is_zero() => Sign::NotNegative,
        Kind::Number(_) => Sign::NotZero,
        Kind::Pi | Kind::Elementary(Function::Exponential, _) => Sign::Positive,
        Kind::Product(factors) => {
            factors
                .iter()
                .fold(Sign::Positive, |sign, factor| match (sign, of(*factor)) {
                    (Sign::Positive, other) | (other, Sign::Positive) => other,
                    (Sign::NotZero, Sign::NotZero) => Sign::NotZero,
                    (Sign::NotNegative, Sign::NotNegative) => Sign::NotNegative,
                    _ => Sign::Unknown,
                })
        }
        Kind::Sum(terms) => terms
            .iter()
            .map(|term| of(*term))
            .reduce(|sum, term| match (sum, term) {
                (Sign::Positive, Sign::Positive | Sign::NotNegative)
                | (Sign::NotNegative, Sign::Positive) => Sign::Positive,
                (Sign::NotNegative, Sign::NotNegative) => Sign::NotNegative,
                _ => Sign::Unknown,
            })
            .unwrap_or(Sign::Unknown),
        Kind::Power(base, exponent) => {
            let root = !exponent.is_integer();
            let even = exponent
                .as_small()
                .is_some_and(|(above, below)| below == 1 && above % 2 == 0);
            match of(*base) {
                Sign::Positive => Sign::Positive,
                // A power of negative exponent has a value only where its base is not zero.
                Sign::NotZero if even || root => Sign::Positive,
                Sign::NotZero => Sign::NotZero,
                Sign::NotNegative => Sign::NotNegative,
                Sign::Unknown if even || root => Sign::NotNegative,
                Sign::Unknown => Sign::Unknown,
            }
        }
        _ => Sign::Unknown,
    };
    match (stated, found) {
        (known, Sign::Unknown) | (Sign::Unknown, known) => known,
        (Sign::NotZero, Sign::NotNegative) | (Sign::NotNegative, Sign::NotZero) => Sign::Positive,
        (_, Sign::Positive) => Sign::Positive,
        (known, _) => known,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use cas::{cos, sqrt};

    #[test]
    fn signs_follow_from_signs() {
        let [m, l, x] = ["m", "l", "x"].map(|name| Expr::symbol(name).expect("a valid name"));
        let known = [Condition::Positive(m), Condition::Positive(l)];
        for implied in [
            Condition::Positive(2 * m * l.power(2)),
            Condition::NotZero(m / l),
            Condition::NotZero(-m),
            Condition::Positive(m + l * x.power(2)),
            Condition::NotNegative(x.power(2) * m),
            Condition::NotNegative(sqrt(x)),
            Condition::NotZero(m),
        ] {
            assert!(is_implied(implied, &known), "{implied:?}");
        }
        for open in [
            Condition::Positive(-m),
            Condition::NotZero(x),
            Condition::NotZero(x.power(2)),
            Condition::Positive(m - l),
            Condition::NotZero(cos(x)),
            Condition::NotZero(m * x),
            Condition::NotNegative(x.power(3)),
            Condition::Positive(x.power(2)),
            Condition::NotZero(Expr::from(0)),
            Condition::NotZero(m - m),
        ] {
            assert!(!is_implied(open, &known), "{open:?}");
        }
        let with_x = [Condition::NotZero(x)];
        assert!(is_implied(Condition::Positive(x.power(2)), &with_x));
        assert!(is_implied(Condition::NotZero(x.power(3)), &with_x));
        assert!(!is_implied(Condition::Positive(x), &with_x));
    }
}
