//! Pages of derivations: what stands unfolded, what is folded, and what a changed record cannot bring in.

use cas::{Expr, cos};

use super::Bundle;
use super::of_derivation::{derivation, record};
use super::page::{Block, Mark, Page, Piece};
use crate::model::Model;
use crate::record::tests::pendulum;
use crate::record::{
    Assignment, Axis, Derivation, Formal, Record, Rule, Shown, Side, Standing, Statement, Step,
};

fn page_of(model: &Model, made: &Derivation) -> Page {
    derivation(model, made)
}

/// The blocks that are read without unfolding anything.
fn unfolded(page: &Page) -> Page {
    let open = page.blocks.iter().map(|block| match block {
        Block::Folded { summary, .. } => Block::Folded {
            summary: summary.clone(),
            blocks: Vec::new(),
        },
        other => other.clone(),
    });
    Page {
        blocks: open.collect(),
        ..page.clone()
    }
}

#[test]
fn the_unfolded_lines_carry_the_argument() {
    let (model, made, _) = pendulum();
    let page = page_of(&model, &made);
    let plain = Bundle::of(&unfolded(&page)).plain;
    for part in [
        "Equation of motion  [\u{2713} 2 steps proved]",
        "(equation of phi) = 0",
        "m*l^2*phi'' + m*l*g*sin(phi) = 0",
        "M =",
        "[ m*l^2 ]",
        "One equation.",
        "No damping is stated.",
        "Rests on assumption 1 of the register",
        "4 steps",
        "Checked by hand.",
    ] {
        assert!(plain.contains(part), "{part} is missing in\n{plain}");
    }
    // `l` is declared positive: where it is not zero need not be said again.
    assert!(!plain.contains("Holds where"), "{plain}");
    assert!(!plain.contains("Chain rule"), "{plain}");
}

#[test]
fn the_folded_steps_say_rule_verdict_grounds_and_conditions() {
    let (model, made, _) = pendulum();
    let bundle = Bundle::of(&page_of(&model, &made));
    for part in [
        "x_bob' = l*cos(phi)*phi'",
        "Rests on step 1, assumption 1.",
        "Rests on bob.",
        "Holds where l != 0.",
        "Proof: the difference reduces to zero",
        "Lagrange's equations of the second kind. [\u{2022} stated]",
        "sin(phi) != cos(phi)",
        "quoted from memory",
        "Key equations.phi",
    ] {
        assert!(
            bundle.plain.contains(part),
            "{part} is missing in\n{}",
            bundle.plain
        );
    }
    assert!(bundle.html.contains("\\begin{pmatrix} ") && bundle.html.contains("<details"));
    assert!(
        bundle
            .html
            .contains("\\frac{\\partial T}{\\partial \\dot{\\varphi}}")
    );
}

#[test]
fn a_stored_record_yields_the_page_that_was_shown() {
    let (model, made, _) = pendulum();
    let stored = Record::of(&model, &made);
    let json = stored.to_json().expect("can be written");
    let read = Record::from_json(&json).expect("can be read");
    assert_eq!(record(&read), page_of(&model, &made));
    let bundle = Bundle::of_record(&stored);
    assert_eq!(bundle.record.as_ref(), Some(&json));
}

#[test]
fn the_worst_standing_comes_first() {
    let (model, mut made, _) = pendulum();
    let x = Expr::symbol("x").expect("a valid name");
    let step = |key: &str, standing: Standing| Step {
        standing,
        ..Step::stated(
            key,
            Statement::equal(Side::of(x), Side::of(cos(x))),
            Rule::CollectedForm,
        )
    };
    let verdict = |made: &Derivation| page_of(&model, made).verdict;
    made.steps.push(step(
        "equations.maybe",
        Standing::Supported {
            evidence: "residues".to_owned(),
        },
    ));
    assert_eq!(
        verdict(&made),
        [Piece::Verdict(
            Mark::Partial,
            "1 step supported, 2 proved".to_owned()
        )]
    );
    made.steps.push(step(
        "equations.open",
        Standing::Undecided {
            reason: "too large".to_owned(),
        },
    ));
    let refuted = Standing::Refuted {
        at: vec![Assignment {
            of: "x".to_owned(),
            is: "1/2".to_owned(),
        }],
        left: "1/2".to_owned(),
        right: "about 8.775826e-1".to_owned(),
    };
    made.steps.push(step("equations.wrong", refuted));
    assert_eq!(
        verdict(&made),
        [Piece::Verdict(
            Mark::Bad,
            "1 step refuted, 1 undecided, 1 supported, 2 proved".to_owned()
        )]
    );
    let plain = Bundle::of(&unfolded(&page_of(&model, &made))).plain;
    assert!(
        plain.contains("equations.wrong: The left side is 1/2, the right side about 8.775826e-1, at x = 1/2"),
        "{plain}"
    );
}

#[test]
fn long_formulas_are_folded_and_very_long_ones_summarised() {
    let (model, mut made, _) = pendulum();
    let long = |terms: i64| -> Expr {
        let x = Expr::symbol("x").expect("a valid name");
        (1..=terms).map(|power| x.power(power)).sum()
    };
    let headline = |value: Expr| -> Vec<Shown> {
        vec![
            Statement::defined(Formal::Lagrangian, value).into(),
            Shown::Matrix {
                label: Formal::MassMatrix,
                rows: vec![vec![value]],
            },
        ]
    };
    let blocks = |made: &Derivation| {
        page_of(&model, made)
            .blocks
            .into_iter()
            .take(2)
            .collect::<Vec<_>>()
    };
    made.headline = headline(long(150));
    assert!(
        blocks(&made)
            .iter()
            .all(|block| matches!(block, Block::Result(_)))
    );
    made.headline = headline(long(201));
    for block in blocks(&made) {
        let Block::Folded { summary, blocks } = block else {
            panic!("201 terms are folded")
        };
        assert!(summary.contains(&Piece::words(" of 201 terms")), "{summary:?}");
        assert!(matches!(blocks.as_slice(), [Block::Display(_)]));
    }
    made.headline = headline(long(1_001));
    for block in blocks(&made) {
        let Block::Folded { summary, blocks } = block else {
            panic!("1001 terms are folded")
        };
        assert!(
            summary.contains(&Piece::words(" of 1001 terms, in plain notation")),
            "{summary:?}"
        );
        assert!(matches!(blocks.as_slice(), [Block::Sentence(_)]));
    }
}

#[test]
fn a_changed_record_brings_no_tags_and_no_tex_into_the_page() {
    let (model, mut made, _) = pendulum();
    let wicked = "<script>alert(1)</script><img src=x onerror=alert(2)> $\\href{javascript:0}{x}$ \\(y\\)";
    let text = || wicked.to_owned();
    made.title = text();
    made.notes = vec![text()];
    made.checked = vec![text()];
    made.headline.push(Shown::Words { text: text() });
    let x = Expr::symbol("x").expect("a valid name");
    let standings = [
        Standing::Proved { method: text() },
        Standing::Supported { evidence: text() },
        Standing::Undecided { reason: text() },
        Standing::Refuted {
            at: vec![Assignment {
                of: text(),
                is: text(),
            }],
            left: text(),
            right: text(),
        },
    ];
    for (place, standing) in standings.into_iter().enumerate() {
        let statement = Statement::equal(Side::named(Formal::position(x_name(), Axis::X), x), Side::of(x));
        made.steps.push(Step {
            key: format!("{wicked}{place}"),
            rests_on: vec![
                crate::record::Ground::stated(wicked),
                crate::record::Ground::step(wicked),
            ],
            standing,
            ..Step::stated("", statement, Rule::Definition)
        });
    }
    let mut stored = Record::of(&model, &made);
    stored.title = text();
    stored.assumptions[0].text = text();
    let json = stored.to_json().expect("can be written");
    let bundle = Bundle::of_record(&Record::from_json(&json).expect("can be read"));
    assert!(bundle.html.contains("&lt;script&gt;alert(1)"));
    for tag in ["<script>alert", "<img src=x", "\\(y", "$\\href"] {
        assert!(!bundle.html.contains(tag), "{tag} stands in the page");
    }
    assert!(!bundle.latex.contains("\\href") && bundle.latex.contains("textbackslash{}href"));
}

fn x_name() -> cas::Name {
    cas::Name::new("x_1").expect("a valid name")
}

#[test]
fn chains_of_equalities_break_where_they_are_long() {
    let (model, mut made, _) = pendulum();
    let names = ["a", "b", "c", "d"].map(|name| Expr::symbol(name).expect("a valid name"));
    let long: Expr = (1..=40).map(|power| names[0] * cos(names[1]).power(power)).sum();
    let short = names[2] + names[3];
    let named = |value: Expr| Side::named(Formal::Lagrangian, value);
    let wide = Formal::sum(vec![Formal::kinetic_energy(); 20]);
    let statements = [
        Statement::equal(Side::of(long), Side::of(short)),
        Statement::equal(Side::of(short), Side::of(long)),
        Statement::equal(Side::of(long), Side::of(long + 1)),
        Statement::equal(named(long), Side::of(short)),
        Statement::equal(named(short), Side::of(long)),
        Statement::equal(Side::of(short), named(long)),
        Statement::equal(Side::named(wide.clone(), long), Side::of(long + 1)),
        Statement::equal(named(long), Side::named(wide.clone(), long)),
        Statement::equal(named(long), Side::named(wide, short)),
        Statement::differs(named(short), Side::of(names[0])),
        Statement::defined(Formal::Lagrangian, short),
    ];
    for statement in statements {
        made.headline = vec![statement.clone().into()];
        let page = page_of(&model, &made);
        let mut formulas = page.blocks.iter().filter_map(|block| match block {
            Block::Result(formula) => Some(formula),
            _ => None,
        });
        let shown: Vec<_> = formulas.by_ref().collect();
        assert!(!shown.is_empty());
        for formula in &shown {
            assert!(
                super::typeset::mathml(&formula.tex, true).is_some(),
                "{}",
                formula.tex
            );
        }
        let plain = shown
            .iter()
            .map(|formula| formula.plain.as_str())
            .collect::<Vec<_>>()
            .join("\n");
        for side in [&statement.left, &statement.right] {
            let value = cas::text::plain(side.value, &model.arrangement());
            assert!(plain.contains(&value), "{value} is missing in {plain}");
        }
    }
}
