//! Planted identities and near misses: no verdict is ever wrong.

use std::collections::HashMap;

use proptest::prelude::*;

use super::*;
use crate::draw::Draw;
use crate::expr::{Function, Kind, cos, postorder, sin, tan};

/// Expressions of the class that is decided completely.
fn expression() -> impl Strategy<Value = Expr> {
    let leaf = prop_oneof![
        (-4_i64..5).prop_map(Expr::from),
        prop::sample::select(vec!["x", "y", "z"]).prop_map(|name| Expr::symbol(name).expect("a valid name")),
    ];
    leaf.prop_recursive(4, 24, 3, |inner| {
        prop_oneof![
            (inner.clone(), inner.clone()).prop_map(|(a, b)| a + b),
            (inner.clone(), inner.clone()).prop_map(|(a, b)| a * b),
            (inner.clone(), inner.clone()).prop_map(|(a, b)| a / (b.squared() + 1)),
            (inner.clone(), 1_i64..4).prop_map(|(a, n)| a.power(n)),
            (-2_i64..3, -2_i64..3, 1_i64..3, any::<bool>()).prop_map(|(i, j, d, sine)| {
                let [x, y] = ["x", "y"].map(|name| Expr::symbol(name).expect("a valid name"));
                let angle = (i * x + j * y) / d;
                if sine { sin(angle) } else { cos(angle) }
            }),
        ]
    })
}

/// The same function, written in another way.
fn rewritten(expr: Expr, seed: u64) -> Expr {
    let mut draw = Draw::seeded(seed);
    let mut done = HashMap::new();
    for node in postorder(&[expr]) {
        let parts: Vec<Expr> = node.children().iter().map(|part| done[part]).collect();
        done.insert(node, respelled(node, &parts, draw.below(4)));
    }
    done[&expr]
}

fn respelled(node: Expr, parts: &[Expr], way: u64) -> Expr {
    match (way, node.kind()) {
        (0, Kind::Product(_)) => {
            let Some((first, rest)) = parts.split_first() else {
                return node.with_children(parts);
            };
            let rest = Expr::product_of(rest.iter().copied());
            Expr::sum_of(first.terms().into_iter().map(|term| term * rest))
        }
        (1, Kind::Elementary(Function::Sine, _)) => {
            let half = parts[0] / 2;
            2 * sin(half) * cos(half)
        }
        (1, Kind::Elementary(Function::Cosine, _)) => 1 - 2 * sin(parts[0] / 2).squared(),
        (2, Kind::Elementary(Function::Sine, _)) => tan(parts[0] / 2) * (1 + cos(parts[0])),
        _ => node.with_children(parts),
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 96, ..ProptestConfig::default() })]

    #[test]
    fn rewritten_expressions_are_proved_equal(expr in expression(), seed in any::<u64>()) {
        let other = rewritten(expr, seed);
        let found = compare(expr, other, &Effort::default());
        prop_assert!(found.is_proved(), "{} against {}: {:?}", expr, other, found);
    }

    #[test]
    fn near_misses_are_refuted(expr in expression(), seed in any::<u64>(), planted in expression()) {
        // The planted difference is zero or not; exact evaluation decides which verdict is right.
        let other = rewritten(expr, seed) + planted / 7;
        match compare(expr, other, &Effort::default()) {
            Verdict::Proved(_) => prop_assert!(is_zero(planted, &Effort::default()).is_proved()),
            Verdict::Refuted(witness) => {
                prop_assert!(witness.left != witness.right);
                prop_assert!(!is_zero(planted, &Effort::default()).is_proved());
            }
            other => prop_assert!(false, "in the class that is decided: {:?}", other),
        }
    }
}
