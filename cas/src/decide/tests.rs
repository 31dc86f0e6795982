//! What is decided, and how, on identities and non-identities chosen by hand.

use super::*;
use crate::expr::{Name, cos, exact, exp, ln, pi, sin, sqrt, tan};

fn symbols() -> [Expr; 4] {
    ["x", "y", "a", "b"].map(|name| Expr::symbol(name).expect("a valid name"))
}

fn verdict(left: Expr, right: Expr) -> Verdict {
    compare(left, right, &Effort::default())
}

#[track_caller]
fn proved(left: Expr, right: Expr) -> Vec<Condition> {
    match verdict(left, right) {
        Verdict::Proved(proof) => proof.conditions,
        other => panic!("{left} = {right}: {other:?}"),
    }
}

#[track_caller]
fn refuted(left: Expr, right: Expr) -> Witness {
    match verdict(left, right) {
        Verdict::Refuted(witness) => witness,
        other => panic!("{left} = {right}: {other:?}"),
    }
}

#[test]
fn trigonometric_identities_are_proved() {
    let [x, y, a, b] = symbols();
    for (left, right) in [
        (sin(x).squared() + cos(x).squared(), Expr::one()),
        (sin(2 * x), 2 * sin(x) * cos(x)),
        (cos(x + y), cos(x) * cos(y) - sin(x) * sin(y)),
        (sin(x / 2).squared(), (1 - cos(x)) / 2),
        (cos(3 * x), 4 * cos(x).power(3) - 3 * cos(x)),
        (sin(x + pi() / 2), cos(x)),
        (sin(x - pi()), -sin(x)),
        (cos(a * x + b), cos(b) * cos(a * x) - sin(b) * sin(a * x)),
        (sin(-x), -sin(x)),
        ((x + y) * (x - y), x.squared() - y.squared()),
    ] {
        assert_eq!(proved(left, right), [], "{left} = {right}");
    }
}

#[test]
fn divisors_are_conditions() {
    let [x, y, ..] = symbols();
    assert_eq!(proved(x / x, Expr::one()), [Condition::NotZero(x)]);
    assert_eq!(proved(tan(x), sin(x) / cos(x)), [Condition::NotZero(cos(x))]);
    let quotient = (x.squared() - y.squared()) / (x - y);
    assert_eq!(proved(quotient, x + y).len(), 1);
    assert_eq!(proved(1 / x, 1 / x), [Condition::NotZero(x)]);
    assert_eq!(proved(sin(1 / x), sin(x / x.squared())), [Condition::NotZero(x)]);
    assert_eq!(proved(1 / (1 / x), x), [Condition::NotZero(x)]);
}

#[test]
fn differences_are_refuted_with_exact_values() {
    let [x, y, ..] = symbols();
    for (left, right) in [
        (sin(2 * x), 2 * sin(x)),
        ((x + y).squared(), x.squared() + y.squared()),
        (sin(x) * cos(y), cos(x) * sin(y)),
        (x / y, y / x),
        (cos(x), Expr::one()),
    ] {
        let witness = refuted(left, right);
        assert!(
            matches!((&witness.left, &witness.right), (Value::Exact(a), Value::Exact(b)) if a != b),
            "{witness:?}"
        );
        assert!(!witness.values.is_empty());
    }
}

#[test]
fn angles_that_occur_outside_are_refuted_by_intervals() {
    let [x, ..] = symbols();
    assert!(matches!(refuted(sin(x), x).left, Value::Within(_)));
    assert!(matches!(refuted(x * cos(x), x).left, Value::Within(_)));
    assert!(matches!(
        refuted(pi(), exact("3.14159265358").unwrap()).left,
        Value::Within(_)
    ));
}

#[test]
fn undetermined_functions_are_independent() {
    let [x, y, ..] = symbols();
    let potential = |argument: Expr| Expr::unknown(Name::new("U").unwrap(), &[argument]);
    assert_eq!(
        proved(potential((x + 1).squared()), potential(x.squared() + 2 * x + 1)),
        []
    );
    let witness = refuted(potential(x), potential(y));
    let at = |name: Expr| &witness.values.iter().find(|(known, _)| *known == name).unwrap().1;
    assert_ne!(at(potential(x)), at(potential(y)));
    assert!(!verdict(potential(x) - potential(-x), Expr::zero()).is_proved());
}

#[test]
fn roots_and_constants_are_never_wrong() {
    let [x, y, ..] = symbols();
    assert_eq!(proved(sqrt(x).squared(), x), [Condition::NotNegative(x)]);
    assert_eq!(proved(1 / sqrt(x), sqrt(x) / x), [Condition::Positive(x)]);
    assert_eq!(proved(exp(x + y) - exp(y + x), Expr::zero()), []);
    assert_eq!(proved(ln(x + y), ln(y + x)), [Condition::Positive(x + y)]);
    // True, but beyond what is proved today: never refuted.
    for (left, right) in [
        (sqrt(8), 2 * sqrt(2)),
        (sin(pi() / 6), Expr::from(1) / 2),
        (exp(x) * exp(y), exp(x + y)),
        (ln(x.squared() + 1) * 2, ln((x.squared() + 1).squared())),
        (sqrt(2 - 2 * cos(x)).squared(), 4 * sin(x / 2).squared()),
    ] {
        assert!(!verdict(left, right).is_refuted(), "{left} = {right}");
    }
    // False: never proved.
    for (left, right) in [
        (sqrt(x.squared()), x),
        (sqrt(2) * sqrt(3), sqrt(5)),
        (exp(x), 1 + x),
        (sin(pi() / 5), Expr::from(1) / 2),
        (sqrt(x + y), sqrt(x) + sqrt(y)),
    ] {
        assert!(!verdict(left, right).is_proved(), "{left} = {right}");
    }
}

#[test]
fn what_has_no_value_is_undecided() {
    let [x, ..] = symbols();
    let nothing = 1 / (sin(x).squared() + cos(x).squared() - 1);
    assert!(matches!(
        verdict(nothing, x),
        Verdict::Undecided(Reason::Undefined(_))
    ));
    assert!(matches!(
        verdict(x / 0, x / 0),
        Verdict::Undecided(Reason::Undefined(_))
    ));
    assert!(matches!(
        verdict(tan(pi() / 2), x),
        Verdict::Undecided(Reason::Undefined(_))
    ));
}

#[test]
fn an_exhausted_effort_is_named() {
    let [x, y, a, b] = symbols();
    let small = Effort {
        terms: 20,
        ..Effort::default()
    };
    let (left, right) = ((x + y + a + b).power(12), (b + a + y + x).power(6).power(2));
    let expanded = (x + y + a + b) * (x + y + a + b).power(11) + Expr::zero();
    assert!(compare(left, right, &small).is_proved(), "the same node");
    let sum = (x + y + a).power(12) + b;
    let shifted = (x + y + a).power(6) * (a + y + x + 0).power(6) + b;
    assert!(compare(sum, shifted, &small).is_proved(), "powers merge");
    let other = ((x + y).squared() + 2 * a * (x + y) + a.squared()).power(6) + b;
    let found = compare(sum, other, &small);
    assert!(
        matches!(
            found,
            Verdict::Supported(Evidence::Residues {
                limit: Limit::Terms(20),
                ..
            })
        ),
        "{found:?} {expanded}"
    );
    assert!(compare(sum, other, &Effort::default()).is_proved());
    assert!(compare(sum, other + 1, &small).is_refuted());
}

#[test]
fn verdicts_are_the_same_every_time() {
    let [x, y, ..] = symbols();
    let (left, right) = (sin(x + y), sin(x) + sin(y));
    assert_eq!(verdict(left, right), verdict(left, right));
}

#[test]
fn enormous_powers_are_given_up_instead_of_computed() {
    let [x, ..] = symbols();
    let nine = Expr::from(9).power(999_999_999);
    let expected = Verdict::Undecided(Reason::Limit(Limit::Bits(Effort::default().bits)));
    assert_eq!(verdict(nine, 10 * nine), expected);
    assert_eq!(verdict(1 / nine, nine), expected);
    // Refuted or left open, but soon and never proved.
    for large in [
        x.power(999_999_999),
        x.power(-99_999_999),
        sin(999_999_999 * x) + sin(x),
    ] {
        assert!(!verdict(large, x.squared()).is_proved(), "{large}");
    }
    // Powers below the limits are computed as before.
    let small = Expr::from(3).power(20_000);
    proved(
        (x + small).squared(),
        x.squared() + 2 * small * x + small.squared(),
    );
}
