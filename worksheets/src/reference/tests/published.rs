//! Newton's equations on dual numbers against published accelerations and reactions.
//!
//! Each case names its source; its digits were recomputed by two independent routes.

use cas::{Expr, cos, sin};

use super::super::newton::{Dynamics, State};
use super::super::settings::Settings;
use super::super::stated::Stated;
use super::{Crane, crane, rotating_rod};
use crate::model::{Model, Role, vector};

fn stated(model: &Model, settings: &Settings) -> Stated {
    let setup = settings.complete(model).expect("complete");
    Stated::of(model, &setup.constants, &setup.stand_ins).expect("evaluates")
}

/// The same model without its drive force.
fn without_drive(crane: &Crane) -> Model {
    let mut model = Model::titled("Suspended pendulum").expect("a title");
    for declared in crane.model.quantities().iter().skip(1) {
        let (name, unit, meaning) = (
            declared.name().as_str(),
            declared.unit().code(),
            declared.meaning(),
        );
        if declared.role() == Role::PositiveConstant {
            model.positive_constant(name, unit, meaning).expect("new");
        }
        if declared.role() == Role::Coordinate {
            model.coordinate(name, unit, meaning).expect("new");
        }
    }
    let particles = crane.model.particles();
    let trolley = model
        .particle("trolley", particles[0].mass(), particles[0].position())
        .expect("new");
    let container = model
        .particle("container", particles[1].mass(), particles[1].position())
        .expect("new");
    model.gravity(crane.gravity, vector(0, 0, -1)).expect("new");
    model.normal("rail", trolley, vector(0, 0, 1)).expect("new");
    model.link("rod", trolley, container).expect("new");
    model
}

#[test]
fn published_accelerations_and_reactions_of_the_suspended_pendulum() {
    // Landau & Lifshitz, section 5, problem 2; digits recomputed by two independent routes.
    let mut crane = crane();
    crane.model = without_drive(&crane);
    let settings = crane.settings(["1.3", "0.7", "0.8", "9.80665"]);
    let at = State {
        time: 0.0,
        coordinates: &[0.2, 0.6],
        velocities: &[0.5, -1.2],
    };
    let found = stated(&crane.model, &settings).dynamics(&at).expect("regular");
    let expected = [2.399_193_520_096_966, -9.396_738_713_644_96];
    for (value, expected) in found.accelerations.iter().zip(expected) {
        assert!((value - expected).abs() < 1e-12, "{value}");
    }
    let reactions: Vec<f64> = found.reactions.iter().map(|r| r.expect("determined")).collect();
    assert!(
        (reactions[0] - 17.307_603_877_956_314).abs() < 1e-12,
        "rail {reactions:?}"
    );
    assert!(
        (reactions[1] - 5.523_763_661_229_172).abs() < 1e-12,
        "rod {reactions:?}"
    );
}

#[test]
fn the_side_reaction_of_a_rotating_rod() {
    let (model, [m, omega], _) = rotating_rod();
    let mut settings = Settings::default();
    settings.set(&model, m, 1.into()).expect("a constant");
    settings.set(&model, omega, 6.into()).expect("a constant");
    // Published with r = 0.3 m and r' = 0.7 m/s: r'' = 10.8 m/s2, N = 8.4 N.
    let at = State {
        time: 0.4,
        coordinates: &[0.3],
        velocities: &[0.7],
    };
    let found = stated(&model, &settings).dynamics(&at).expect("regular");
    assert!((found.accelerations[0] - 10.8).abs() < 1e-12);
    assert!((found.reactions[0].expect("determined") - 8.4).abs() < 1e-12);
    // The reaction does work on a driven system, and the reference counts it.
    assert!((found.power - 8.4 * 6.0 * 0.3).abs() < 1e-12);
}

#[test]
fn springs_are_worked_out_from_their_ends() {
    // Elastic pendulum, m = 1, k = 40, l0 = 0.6: Goldstein, Classical Mechanics; digits recomputed.
    let mut model = Model::titled("Elastic pendulum").expect("a title");
    let m = model.positive_constant("m", "kg", "mass").expect("new");
    let k = model.positive_constant("k", "N/m", "stiffness").expect("new");
    let l0 = model
        .positive_constant("l_0", "m", "length without load")
        .expect("new");
    let g = model
        .positive_constant("g", "m/s2", "acceleration of free fall")
        .expect("new");
    let r = model.coordinate("r", "m", "length").expect("new");
    let theta = model.coordinate("theta", "rad", "angle").expect("new");
    let bob = model
        .particle("bob", m, vector(r * sin(theta), 0, -r * cos(theta)))
        .expect("new");
    model.gravity(g, vector(0, 0, -1)).expect("new");
    model.spring("spring", vector(0, 0, 0), bob, k, l0).expect("new");
    let mut settings = Settings::default();
    for (constant, value) in [(m, "1"), (k, "40"), (l0, "0.6"), (g, "9.80665")] {
        settings.set(&model, constant, value.into()).expect("a constant");
    }
    let at = State {
        time: 0.0,
        coordinates: &[0.9, 0.5],
        velocities: &[0.3, -1.1],
    };
    let found = stated(&model, &settings).dynamics(&at).expect("regular");
    let expected = [-2.304_854_969_437_778_7, -4.490_620_509_058_785];
    for (value, expected) in found.accelerations.iter().zip(expected) {
        assert!((value - expected).abs() < 1e-12, "{value}");
    }
}

#[test]
fn undeclared_reactions_are_completed() {
    // Spherical pendulum without a declared rod: Landau & Lifshitz, section 14, problem 1.
    let mut model = Model::titled("Spherical pendulum").expect("a title");
    let m = model.positive_constant("m", "kg", "mass").expect("new");
    let l = model.positive_constant("l", "m", "length").expect("new");
    let g = model
        .positive_constant("g", "m/s2", "acceleration of free fall")
        .expect("new");
    let theta = model
        .coordinate("theta", "rad", "angle from the vertical")
        .expect("new");
    let phi = model.coordinate("phi", "rad", "azimuth").expect("new");
    let position = vector(
        l * sin(theta) * cos(phi),
        l * sin(theta) * sin(phi),
        -l * cos(theta),
    );
    model.particle("bob", m, position).expect("new");
    model.gravity(g, vector(0, 0, -1)).expect("new");
    let mut settings = Settings::default();
    for (constant, value) in [(m, "1"), (l, "0.8"), (g, "9.80665")] {
        settings.set(&model, constant, value.into()).expect("a constant");
    }
    let stated = stated(&model, &settings);
    let at = |angle: f64| {
        stated.dynamics(&State {
            time: 0.0,
            coordinates: &[angle, 0.3],
            velocities: &[0.4, 2.0],
        })
    };
    let found = at(1.0).expect("regular");
    let expected = [-8.496_419_437_806_583, -1.027_348_185_494_929_3];
    for (value, expected) in found.accelerations.iter().zip(expected) {
        assert!((value - expected).abs() < 1e-11, "{value}");
    }
    assert!(at(0.0).is_none(), "the coordinates are singular on the axis");
}

/// What holds at a state, with these values for the constants.
fn at(model: &Model, values: &[(Expr, &str)], time: f64, q: &[f64], v: &[f64]) -> Dynamics {
    let mut settings = Settings::default();
    for (constant, value) in values {
        settings
            .set(model, *constant, (*value).into())
            .expect("a constant");
    }
    let state = State {
        time,
        coordinates: q,
        velocities: v,
    };
    stated(model, &settings).dynamics(&state).expect("regular")
}

fn close(found: &[f64], expected: &[f64], tolerance: f64) {
    assert_eq!(found.len(), expected.len());
    for (found, expected) in found.iter().zip(expected) {
        assert!(
            (found - expected).abs() < tolerance,
            "{found} instead of {expected}"
        );
    }
}

fn tensions(dynamics: &Dynamics) -> Vec<f64> {
    dynamics
        .reactions
        .iter()
        .map(|tension| tension.expect("determined"))
        .collect()
}

#[test]
fn double_pendulum() {
    // Landau & Lifshitz, Mechanics (3rd ed. 1976), section 5, problem 1.
    let mut model = Model::titled("Double pendulum").expect("a title");
    let [m1, m2] = ["m_1", "m_2"].map(|name| model.positive_constant(name, "kg", "mass").expect("new"));
    let [l1, l2] = ["l_1", "l_2"].map(|name| model.positive_constant(name, "m", "length").expect("new"));
    let g = model
        .positive_constant("g", "m/s2", "acceleration of free fall")
        .expect("new");
    let [p1, p2] = ["phi_1", "phi_2"].map(|name| model.coordinate(name, "rad", "angle").expect("new"));
    let upper = vector(l1 * sin(p1), -l1 * cos(p1), 0);
    let first = model.particle("first", m1, upper).expect("new");
    let second = model
        .particle("second", m2, upper + vector(l2 * sin(p2), -l2 * cos(p2), 0))
        .expect("new");
    model.gravity(g, vector(0, -1, 0)).expect("new");
    model.link("rod_1", first, vector(0, 0, 0)).expect("new");
    model.link("rod_2", second, first).expect("new");
    let values = [(m1, "1.3"), (m2, "0.7"), (l1, "0.9"), (l2, "1.1"), (g, "9.80665")];
    let found = at(&model, &values, 0.0, &[0.4, -1.1], &[0.3, -0.8]);
    close(
        &found.accelerations,
        &[-4.767_295_306_870_156, 8.294_598_516_399_832],
        1e-12,
    );
    close(
        &tensions(&found),
        &[11.891_063_150_936_887, 0.614_719_186_252_923_7],
        1e-12,
    );
}

#[test]
fn pendulums_with_a_driven_support() {
    // Landau & Lifshitz, Mechanics (3rd ed. 1976), section 5, problem 3: the support runs round a
    // circle, swings sideways, swings up and down.
    let mut model = Model::titled("Driven pendulum").expect("a title");
    let m = model.positive_constant("m", "kg", "mass").expect("new");
    let l = model.positive_constant("l", "m", "length").expect("new");
    let a = model
        .positive_constant("a", "m", "amplitude of the support")
        .expect("new");
    let gamma = model
        .positive_constant("gamma", "rad/s", "frequency of the support")
        .expect("new");
    let g = model
        .positive_constant("g", "m/s2", "acceleration of free fall")
        .expect("new");
    let phi = model.coordinate("phi", "rad", "angle").expect("new");
    let angle = gamma * Expr::from(model.time());
    let values = [(m, "1"), (l, "0.8"), (a, "0.15"), (gamma, "7"), (g, "9.80665")];
    let cases = [
        (
            vector(a * cos(angle), a * sin(angle), 0),
            -6.145_218_683_834_225,
            1.387_279_048_207_159_7,
        ),
        (
            vector(a * cos(angle), 0, 0),
            -9.947_416_089_051_279,
            6.955_179_580_828_572,
        ),
        (
            vector(0, -a * cos(angle), 0),
            -3.653_241_260_524_07,
            5.477_770_617_474_106,
        ),
    ];
    for (support, acceleration, tension) in cases {
        let mut model = model.clone();
        let bob = model
            .particle("bob", m, support + vector(l * sin(phi), -l * cos(phi), 0))
            .expect("new");
        model.gravity(g, vector(0, -1, 0)).expect("new");
        model.link("rod", bob, support).expect("new");
        let found = at(&model, &values, 0.3, &[0.5], &[-0.4]);
        close(&found.accelerations, &[acceleration], 1e-11);
        close(&tensions(&found), &[tension], 1e-11);
    }
}
