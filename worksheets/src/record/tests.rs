//! Records of a real sheet: stored, read back, proved again, and changed by hand.

use cas::decide::compare;
use cas::{Effort, Expr, Name, Symbol, cos, sin};
use serde_json::{Value, json};

use super::schema_check::fits;
use super::*;
use crate::model::{Condition, Model, vector};
use crate::reference::{DerivedMotion, Reference};

fn name(text: &str) -> Name {
    Name::new(text).expect("a valid name")
}

/// A pendulum with every kind of statement on it, and its motion.
pub(crate) fn pendulum() -> (Model, Derivation, DerivedMotion) {
    let mut model = Model::titled("Pendulum of the <test> rig & \"bench\"").expect("a title");
    let m = model
        .positive_constant("m", "kg", "mass of the bob")
        .expect("new");
    let l = model
        .positive_constant("l", "m", "length of the rod")
        .expect("new");
    let g = model
        .constant("g", "m/s2", "acceleration of free fall")
        .expect("new");
    let phi = model
        .coordinate("phi", "rad", "angle from the vertical")
        .expect("new");
    let bob = model
        .particle("bob", m, vector(l * sin(phi), 0, -l * cos(phi)))
        .expect("new");
    model.gravity(g, vector(0, 0, -1)).expect("new");
    model.link("rod", bob, vector(0, 0, 0)).expect("new");
    model.assume("The rod is massless.", &["rod"]).expect("new");

    let q = phi.as_symbol().expect("a symbol");
    let [rate, acceleration] = [1, 2].map(|primes| Expr::from(q.with_primes(primes)));
    let effort = Effort::default();
    let speed = l * cos(phi) * rate;
    let mut derivation = Derivation::titled("equations", "Equation of motion");
    derivation.steps.push(
        Step::stated(
            "equations.velocity",
            Statement::defined(Formal::velocity(name("bob"), Axis::X), speed),
            Rule::ChainRule,
        )
        .resting_on([Ground::stated("bob")]),
    );
    let (left, right) = (
        l * rate.squared() / l,
        rate.squared() * (sin(phi).squared() + cos(phi).squared()),
    );
    derivation.steps.push(
        Step::judged(
            "equations.collected",
            Statement::equal(
                Side::named(Formal::kinetic_energy().lagrange_expression(q), left),
                Side::of(right),
            ),
            Rule::CollectedForm,
            &compare(left, right, &effort),
        )
        .resting_on([Ground::step("equations.velocity"), Ground::Assumption(1)]),
    );
    let equation = m * l.squared() * acceleration + m * g * l * sin(phi);
    let law = Statement::law(
        Side::named(Formal::EquationOfMotion { coordinate: q.name() }, equation),
        Side::named(Formal::Zero, Expr::from(0)),
    );
    derivation.steps.push(Step::stated(
        "equations.phi",
        law.clone(),
        Rule::LagrangesEquations,
    ));
    derivation.steps.push(Step::judged(
        "equations.differs",
        Statement::differs(Side::of(sin(phi)), Side::of(cos(phi))),
        Rule::Closedness,
        &compare(sin(phi), cos(phi), &effort),
    ));
    derivation.headline = vec![
        law.into(),
        Shown::Matrix {
            label: Formal::MassMatrix,
            rows: vec![vec![m * l.squared()]],
        },
        Shown::Words {
            text: "One equation.".to_owned(),
        },
    ];
    derivation.notes.push("No damping is stated.".to_owned());
    derivation.checked.push("Checked by hand.".to_owned());
    let motion = DerivedMotion {
        mass_matrix: vec![vec![m * l.squared()]],
        bias: vec![m * g * l * sin(phi)],
    };
    (model, derivation, motion)
}

#[test]
fn a_reference_run_carries_its_record() {
    use crate::reference::Check;
    use crate::show::{Bundle, Bundled};
    let (model, _, motion) = pendulum();
    let mut check = Check::new(Reference::new(&model, motion));
    check.run("1 s");
    let bundle = check.bundle();
    let record = Record::from_json(bundle.record.as_deref().expect("a record")).expect("can be read");
    let reference = record.reference.as_ref().expect("a reference");
    assert!(reference.agrees);
    assert_eq!(reference.report, check.report());
    assert_eq!(Bundle::of_record(&record), bundle);
}

fn stored() -> Record {
    let (model, derivation, motion) = pendulum();
    let mut reference = Reference::new(&model, motion);
    reference.duration("1 s").expect("a duration");
    let report = reference.report(&Effort::default()).expect("runs");
    Record {
        reference: Record::of_reference(&model, &report).reference,
        ..Record::of(&model, &derivation)
    }
}

fn as_value(record: &Record) -> Value {
    serde_json::from_str(&record.to_json().expect("can be written")).expect("is JSON")
}

#[test]
fn a_record_reads_back_as_it_was_written() {
    let record = stored();
    let json = record.to_json().expect("can be written");
    assert!(!json.contains('\n'));
    let read = Record::from_json(&json).expect("can be read");
    assert_eq!(read, record);
    assert_eq!(read.to_json().expect("can be written"), json);
    assert_eq!(stored().to_json().expect("can be written"), json);
    let (_, derivation, _) = pendulum();
    assert_eq!(read.derivation(), Some(derivation));
}

#[test]
fn a_record_fits_the_published_schema() {
    let schema: Value = serde_json::from_str(SCHEMA).expect("the schema is JSON");
    let value = as_value(&stored());
    assert_eq!(fits(&schema, &value), Ok(()));
    let mut strange = value.clone();
    strange["steps"][0]["verdict"]["certainty"] = json!(1);
    assert!(fits(&schema, &strange).is_err());
    let words: Vec<Value> = Rule::ALL
        .iter()
        .map(|rule| serde_json::to_value(rule).expect("serializes"))
        .collect();
    assert_eq!(
        schema["$defs"]["step"]["properties"]["rule"]["enum"],
        Value::from(words)
    );
    let names = schema.pointer("/$defs/formal").expect("names have a schema");
    let samples = formal_samples();
    let mut root = schema.clone();
    for keyword in [
        "type",
        "properties",
        "required",
        "additionalProperties",
        "description",
    ] {
        root.as_object_mut().expect("an object").remove(keyword);
    }
    root["oneOf"] = names["oneOf"].clone();
    for (formal, plain) in samples {
        let value = serde_json::to_value(&formal).expect("serializes");
        assert_eq!(fits(&root, &value), Ok(()), "{plain}");
    }
}

#[test]
fn the_keys_that_the_kernel_counts_are_there() {
    let value = as_value(&stored());
    let kinds: Vec<&str> = value["steps"]
        .as_array()
        .expect("steps")
        .iter()
        .map(|step| step["verdict"]["kind"].as_str().expect("a kind"))
        .collect();
    assert_eq!(kinds, ["Stated", "Proved", "Stated", "Proved"]);
    assert_eq!(value["steps"][1]["key"], "equations.collected");
    assert_eq!(value["steps"][1]["conditions"], json!(["l != 0"]));
    assert_eq!(value["reference"]["agrees"], true);
    assert!(
        value["reference"]["largest_deviation"].is_string() && value["reference"]["tolerance"].is_string()
    );
}

#[test]
fn an_honest_record_proves_again_and_a_changed_one_does_not() {
    let effort = Effort::default();
    let record = stored();
    assert_eq!(record.divergences(&effort), []);

    let reread = |change: &dyn Fn(&mut Value)| {
        let mut value = as_value(&record);
        change(&mut value);
        let changed = Record::from_json(&value.to_string()).expect("still a record");
        changed.divergences(&effort)
    };
    let wrong = reread(&|value| value["steps"][1]["statement"]["right"]["value"] = json!("2*phi'^2"));
    assert!(
        matches!(wrong.as_slice(), [one] if matches!(one.found, Standing::Refuted { .. })),
        "{wrong:?}"
    );
    let renamed = reread(&|value| value["steps"][0]["statement"]["left"]["value"] = json!("l*phi'"));
    assert!(
        matches!(renamed.as_slice(), [one] if matches!(one.found, Standing::Refuted { .. })),
        "{renamed:?}"
    );
    let same = reread(&|value| value["steps"][3]["statement"]["right"]["value"] = json!("sin(phi)"));
    assert!(
        matches!(same.as_slice(), [one] if matches!(one.found, Standing::Refuted { .. })),
        "{same:?}"
    );
    let claimed =
        reread(&|value| value["steps"][2]["verdict"] = json!({"kind": "Proved", "method": "trust me"}));
    assert!(
        matches!(claimed.as_slice(), [one] if one.found == Standing::Stated),
        "{claimed:?}"
    );
    // `l` is declared positive, so the condition that it is not zero may be left out; where it is a
    // constant of either sign, it may not.
    let implied = reread(&|value| value["steps"][1]["conditions"] = json!([]));
    assert_eq!(implied, []);
    let silent = reread(&|value| {
        value["steps"][1]["conditions"] = json!([]);
        value["quantities"][2]["role"] = json!("constant");
    });
    assert!(
        matches!(silent.as_slice(), [one] if matches!(&one.found, Standing::Undecided { reason } if reason.contains("l != 0"))),
        "{silent:?}"
    );
}

#[test]
fn one_step_proves_again_by_itself() {
    let x = Expr::symbol("x").expect("a valid name");
    let (a, b) = ((x.squared() - 1) / (x - 1), x + 1);
    let statement = Statement::equal(Side::of(a), Side::of(b));
    let step = Step::stated("alone", statement, Rule::CollectedForm);
    assert_eq!(step.reproved(&Effort::default()).word(), "undecided");
    let under = step.under([Condition::NotZero(x - 1)]);
    assert_eq!(under.reproved(&Effort::default()).word(), "proved");
    let idle = Effort {
        operations: 0,
        ..Effort::default()
    };
    assert!(!under.reproved(&idle).is_settled());
}

#[test]
fn errors_name_the_field() {
    let value = as_value(&stored());
    let error = |change: &dyn Fn(&mut Value)| {
        let mut changed = value.clone();
        change(&mut changed);
        let error = Record::from_json(&changed.to_string()).expect_err("is refused");
        assert!(!error.hint().is_empty());
        error.to_string()
    };
    for (message, part) in [
        (
            error(&|value| value["steps"][1]["statement"]["left"]["value"] = json!("2*")),
            "steps[1].statement.left.value",
        ),
        (
            error(&|value| value["particles"][0]["position"] = json!(["x", "y"])),
            "particles[0].position",
        ),
        (
            error(&|value| value["quantities"][1]["name"] = json!("<b>")),
            "quantities[1].name",
        ),
        (
            error(&|value| value["steps"][1]["conditions"][0] = json!("l")),
            "steps[1].conditions[0]",
        ),
        (
            error(&|value| value["steps"][1]["rests_on"][0] = json!("hearsay")),
            "steps[1].rests_on[0]",
        ),
        (
            error(&|value| value["steps"][1]["rule"] = json!("magic")),
            "steps[1].rule",
        ),
        (
            error(&|value| value["steps"][1]["verdict"] = json!({"kind": "Certain"})),
            "steps[1].verdict",
        ),
        (
            error(&|value| value["steps"][1]["rests_on"] = json!(["assumption 7"])),
            "no assumption 7",
        ),
        (
            error(&|value| value["steps"][0]["rests_on"] = json!(["step equations.phi"])),
            "steps[0].rests_on[0]",
        ),
        (
            error(&|value| value["steps"][0]["key"] = json!("equations.phi")),
            "both have the key",
        ),
        (error(&|value| value["format"] = json!(2)), "the format 2"),
        (error(&|value| value["extra"] = json!(1)), "extra"),
        (error(&|value| *value = json!([])), "the format none"),
    ] {
        assert!(message.contains(part), "{part} is not in: {message}");
    }
    let error = Record::from_json("{\"format\": 1,").expect_err("is refused");
    assert!(error.to_string().contains("line 1"), "{error}");
    let deep = format!("{}1{}", "[".repeat(100_000), "]".repeat(100_000));
    assert!(matches!(
        Record::from_json(&deep),
        Err(RecordError::NotJson { .. })
    ));
}

#[test]
fn what_cannot_be_read_back_is_not_written() {
    let (model, mut derivation, _) = pendulum();
    let deep = (0..300).fold(Expr::symbol("x").expect("a valid name"), |inner, _| cos(inner));
    let key = derivation.steps[0].key.clone();
    derivation.steps[0] = Step::stated(
        key,
        Statement::defined(Formal::Lagrangian, deep),
        Rule::Definition,
    );
    let error = Record::of(&model, &derivation).to_json().expect_err("too deep");
    assert!(
        error.to_string().contains("steps[0].statement.left.value"),
        "{error}"
    );
    let bundle = crate::show::Bundle::of_record(&Record::of(&model, &derivation));
    assert!(bundle.record.is_none() && bundle.plain.contains("carries no record"));
}

#[test]
fn a_difference_is_proved_by_a_witness_and_refuted_by_a_proof() {
    let x = Expr::from(Symbol::from(name("x")));
    let effort = Effort::default();
    let (standing, _) = Standing::of_difference(&compare(x, 2 * x, &effort));
    assert!(
        matches!(&standing, Standing::Proved { method } if method.contains("at x = ")),
        "{standing:?}"
    );
    let (standing, _) = Standing::of_difference(&compare(x, x, &effort));
    assert!(matches!(standing, Standing::Refuted { .. }));
    let (standing, _) = Standing::of(&compare(x, 2 * x, &effort));
    assert!(
        matches!(&standing, Standing::Refuted { at, .. } if at[0].of == "x"),
        "{standing:?}"
    );
}
