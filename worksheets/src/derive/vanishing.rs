//! Which factors of a determinant may be zero somewhere, as far as signs and bounds of waves tell.

use cas::present::collected;
use cas::{Condition, Effort, Expr, Function, Kind};

use crate::record::is_implied;

/// The factors of an expression of which it is not known that they are never zero, each once.
///
/// A factor is known not to vanish where its sign follows from declared constants, or where it keeps
/// its sign even if every sine and cosine in it takes its worst value.
pub(super) fn factors_that_may_vanish(expr: Expr, known: &[Condition], effort: &Effort) -> Vec<Expr> {
    let mut found: Vec<Expr> = Vec::new();
    for factor in expr.factors() {
        let base = match factor.kind() {
            // The inverse of what has a value is never zero.
            Kind::Power(_, exponent) if exponent.is_negative() => continue,
            Kind::Power(base, _) => *base,
            _ => factor,
        };
        let never = is_implied(Condition::NotZero(base), known)
            || keeps_above_zero(base, known, effort)
            || keeps_above_zero(-base, known, effort);
        if !never && !found.contains(&base) {
            found.push(base);
        }
    }
    found
}

fn keeps_above_zero(expr: Expr, known: &[Condition], effort: &Effort) -> bool {
    let lowest = expr.terms().into_iter().map(|term| lowest(term, known));
    let Some(bound) = lowest.collect::<Option<Vec<Expr>>>().map(Expr::sum_of) else {
        return false;
    };
    is_implied(Condition::Positive(collected(bound, &[], effort)), known)
}

/// A lower bound of a product of waves and an amplitude that is no wave, where the amplitude's sign is known.
fn lowest(term: Expr, known: &[Condition]) -> Option<Expr> {
    let (waves, others): (Vec<Expr>, Vec<Expr>) = term.factors().into_iter().partition(|f| is_wave(*f));
    if waves.is_empty() {
        return Some(term);
    }
    let amplitude = Expr::product_of(others);
    let is_not_negative = |expr: Expr| is_implied(Condition::NotNegative(expr), known);
    let never_negative = waves.iter().all(|wave| match wave.kind() {
        Kind::Power(_, exponent) => exponent.as_integer().is_some_and(|whole| whole % 2 == 0),
        _ => false,
    });
    if is_not_negative(amplitude) {
        Some(if never_negative { Expr::zero() } else { -amplitude })
    } else if is_not_negative(-amplitude) {
        Some(amplitude)
    } else {
        None
    }
}

/// Whether it is a sine or cosine, or a positive whole power of one: between minus one and one.
fn is_wave(factor: Expr) -> bool {
    let is_function = |expr: Expr| {
        matches!(
            expr.kind(),
            Kind::Elementary(Function::Sine | Function::Cosine, _)
        )
    };
    match factor.kind() {
        Kind::Power(base, exponent) => exponent.is_integer() && exponent.is_positive() && is_function(*base),
        _ => is_function(factor),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use cas::{cos, sin};

    fn vanishing(expr: Expr, positive: &[Expr]) -> Vec<Expr> {
        let known: Vec<Condition> = positive.iter().copied().map(Condition::Positive).collect();
        factors_that_may_vanish(expr, &known, &Effort::default())
    }

    #[test]
    fn bounded_waves_cannot_bring_a_sum_to_zero() {
        let [m, n, a, b] = ["m", "n", "a", "b"].map(|name| Expr::symbol(name).expect("a valid name"));
        let positive = [m, n];
        for never in [
            3 - cos(2 * a),
            5 - 2 * cos(a) - cos(b),
            m + n * sin(a).squared(),
            2 * m + n - n * cos(a - b),
            cos(a) - 2,
            m * n / a.squared(),
            m + n - n * sin(a).power(3) * cos(b),
        ] {
            assert_eq!(vanishing(never, &positive), [], "{never}");
        }
        for may in [
            1 - cos(a),
            m - n * cos(a),
            2 + a * cos(b),
            m + sin(a),
            3 - cos(a) - 2 * cos(b),
            m + n - n * cos(a) * b,
            3 - cos(a).power(-2),
        ] {
            assert_eq!(vanishing(may, &positive), [may], "{may}");
        }
        assert_eq!(vanishing(m * sin(a).squared() * b, &positive).len(), 2);
    }
}
