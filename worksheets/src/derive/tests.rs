//! Derivations of small machines, stage by stage.

use cas::decide::compare;
use cas::{Effort, Expr, Symbol, sqrt};

use super::*;
use crate::prelude::*;
use crate::record::{Relation, Standing};
use crate::reference::Agreement;

fn effort() -> Effort {
    Effort::default()
}

fn rate(coordinate: Expr, primes: u8) -> Expr {
    let symbol = coordinate.as_symbol().expect("a coordinate is a symbol");
    Expr::from(symbol.with_primes(primes))
}

#[track_caller]
fn equal(left: Expr, right: Expr) {
    let verdict = compare(left, right, &effort());
    assert!(verdict.is_proved(), "{left} against {right}: {verdict:?}");
}

/// Every step of every stage stands, and nothing is left undecided.
#[track_caller]
fn all_settled(sheet: &Sheet) {
    let motion = sheet.equations();
    for derived in [
        &sheet.velocities(),
        &sheet.identities(),
        &sheet.jacobian(),
        &sheet.newton(),
        &sheet.projection(),
        &sheet.virtual_work(),
        &sheet.reduction(),
        &sheet.generalized_forces(),
        &sheet.potential(),
        &sheet.lagrangian(),
        &*motion,
        &sheet.mass_matrix(),
    ] {
        for step in &derived.derivation().steps {
            assert!(step.standing.is_settled(), "{step:?}");
        }
    }
}

struct Crane {
    sheet: Sheet,
    symbols: [Expr; 7],
}

fn crane() -> Crane {
    let mut sheet = Sheet::titled("Portal crane");
    let m_t = sheet.positive_constant("m_t", "kg", "mass of the trolley");
    let m_c = sheet.positive_constant("m_c", "kg", "mass of the container");
    let l = sheet.positive_constant("l", "m", "rope length");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let x = sheet.coordinate("x", "m", "trolley position");
    let phi = sheet.coordinate("phi", "rad", "sway");
    let drive = sheet.input("F", "N", "drive force");
    let trolley = sheet.particle("trolley", m_t, vector(x, 0, 0));
    let container = sheet.particle("container", m_c, vector(x + l * sin(phi), 0, -l * cos(phi)));
    sheet.gravity(g, vector(0, 0, -1));
    sheet.force("drive", trolley, vector(drive, 0, 0));
    sheet.link("rope", trolley, container);
    sheet.normal("girder", trolley, vector(0, 0, 1));
    sheet.assume("The rope is taut.", ["rope"]);
    Crane {
        sheet,
        symbols: [m_t, m_c, l, g, x, phi, drive],
    }
}

#[test]
fn the_crane_has_the_equations_that_engineers_know() {
    let Crane { sheet, symbols } = crane();
    let [m_t, m_c, l, g, x, phi, drive] = symbols;
    all_settled(&sheet);
    let motion = sheet.equations();
    let expected = [
        (m_t + m_c) * rate(x, 2) + m_c * l * cos(phi) * rate(phi, 2)
            - m_c * l * sin(phi) * rate(phi, 1).squared()
            - drive,
        m_c * l * cos(phi) * rate(x, 2) + m_c * l.squared() * rate(phi, 2) + m_c * g * l * sin(phi),
    ];
    assert_eq!(motion.equations(), expected, "{:?}", motion.equations());
    let matrix = motion.for_reference().mass_matrix;
    assert_eq!(
        matrix,
        [
            [m_t + m_c, m_c * l * cos(phi)],
            [m_c * l * cos(phi), m_c * l.squared()]
        ]
    );
    let lagrangian = sheet.lagrangian();
    let expected = (m_t + m_c) * rate(x, 1).squared() / 2
        + m_c * l * cos(phi) * rate(x, 1) * rate(phi, 1)
        + m_c * l.squared() * rate(phi, 1).squared() / 2
        + m_c * g * l * cos(phi);
    equal(lagrangian.expression(), expected);
    let words = format!("{:?}", lagrangian.derivation().headline);
    assert!(words.contains("drive has no potential"), "{words}");
}

#[test]
fn steps_rest_on_assumptions() {
    let Crane { sheet, .. } = crane();
    let work = sheet.virtual_work();
    let step = work.derivation().step("virtual_work.rope.phi").expect("a step");
    assert!(
        step.rests_on.contains(&crate::record::Ground::Assumption(1)),
        "{step:?}"
    );
}

#[test]
fn the_reference_agrees_and_catches_a_wrong_sign() {
    let Crane { sheet, .. } = crane();
    let mut check = sheet.reference();
    check.run("2 s");
    assert_eq!(check.report().agreement, Agreement::Agrees);
    let mut wrong = sheet.equations().for_reference();
    let last = wrong.bias[1];
    wrong.bias[1] = -last;
    let mut check = crate::reference::Check::new(crate::reference::Reference::new(sheet.model(), wrong));
    check.run("2 s");
    assert_eq!(check.report().agreement, Agreement::Disagrees);
}

#[test]
fn a_rheonomic_carriage_on_a_turntable() {
    let mut sheet = Sheet::titled("Turntable carriage");
    let m = sheet.positive_constant("m", "kg", "mass");
    let k = sheet.positive_constant("k", "N/m", "stiffness");
    let l_0 = sheet.positive_constant("l_0", "m", "length without load");
    let d = sheet.positive_constant("d", "N.s/m", "damping");
    let omega = sheet.constant("Omega", "rad/s", "speed of the table");
    let s = sheet.coordinate("s", "m", "distance from the axis");
    let turned = omega * sheet.time();
    let carriage = sheet.particle("carriage", m, vector(s * cos(turned), s * sin(turned), 0));
    sheet.spring("spring", carriage, vector(0, 0, 0), k, l_0);
    sheet.damper("damper", carriage, vector(0, 0, 0), d);
    sheet.normal("rail", carriage, vector(-sin(turned), cos(turned), 0));
    sheet.normal("deck", carriage, vector(0, 0, 1));
    all_settled(&sheet);
    let motion = sheet.equations();
    let expected = m * rate(s, 2) + d * rate(s, 1) + (k - m * omega.squared()) * s - k * l_0;
    equal(motion.equations()[0], expected);
    let conditions = &motion.derivation().steps.last().expect("steps").conditions;
    assert_eq!(conditions[..], [cas::Condition::Positive(s)]);
    let lagrangian = sheet.lagrangian();
    let definition = lagrangian
        .derivation()
        .step("lagrangian.definition")
        .expect("a step");
    assert_eq!(definition.conditions[..], [cas::Condition::Positive(s)]);
    let potential = sheet.potential();
    assert!(
        potential
            .derivation()
            .notes
            .iter()
            .any(|note| note.contains("damper") && note.contains("velocities"))
    );
}

#[test]
fn springs_with_roots_in_their_length_are_decided() {
    let mut sheet = Sheet::titled("Buoy on two springs");
    let m = sheet.positive_constant("m", "kg", "mass");
    let k = sheet.positive_constant("k", "N/m", "stiffness");
    let a = sheet.positive_constant("a", "m", "half distance of the anchors");
    let l_0 = sheet.positive_constant("l_0", "m", "length without load");
    let x = sheet.coordinate("x", "m", "position");
    let y = sheet.coordinate("y", "m", "height");
    let buoy = sheet.particle("buoy", m, vector(x, y, 0));
    sheet.spring("left", buoy, vector(-a, 0, 0), k, l_0);
    sheet.spring("right", buoy, vector(a, 0, 0), k, l_0);
    all_settled(&sheet);
    let length = |from: Expr| sqrt((x - from).squared() + y.squared());
    let expected = k * ((length(-a) - l_0).squared() + (length(a) - l_0).squared()) / 2;
    equal(sheet.potential().expression(), expected);
}

#[test]
fn polynomial_forces_have_a_potential_and_a_whirl_has_none() {
    let mut sheet = Sheet::titled("Table with magnets");
    let m = sheet.positive_constant("m", "kg", "mass");
    let c = sheet.positive_constant("c", "N/m3", "stiffness of the magnets");
    let w = sheet.positive_constant("w", "N/m", "strength of the whirl");
    let x = sheet.coordinate("x", "m", "position");
    let y = sheet.coordinate("y", "m", "position");
    let puck = sheet.particle("puck", m, vector(x, y, 0));
    sheet.force("magnets", puck, vector(-c * x.power(3), -c * y.power(3), 0));
    sheet.force("whirl", puck, vector(-w * y, w * x, 0));
    all_settled(&sheet);
    let potential = sheet.potential();
    equal(potential.expression(), c * (x.power(4) + y.power(4)) / 4);
    let step = potential
        .derivation()
        .step("potential.whirl.closedness")
        .expect("a step");
    assert!(matches!(step.standing, Standing::Proved { .. }), "{step:?}");
    let words = format!("{:?}", sheet.lagrangian().derivation().headline);
    assert!(words.contains("whirl has no potential"), "{words}");
}

#[test]
fn attraction_by_a_centre_has_a_potential() {
    let mut sheet = Sheet::titled("Probe near a centre");
    let m = sheet.positive_constant("m", "kg", "mass");
    let mu = sheet.positive_constant("mu", "m3/s2", "strength");
    let r = sheet.coordinate("r", "m", "distance");
    let phi = sheet.coordinate("phi", "rad", "angle");
    let probe = sheet.particle("probe", m, vector(r * cos(phi), r * sin(phi), 0));
    let pull = -m * mu / r.squared();
    sheet.force("centre", probe, vector(pull * cos(phi), pull * sin(phi), 0));
    all_settled(&sheet);
    equal(sheet.potential().expression(), -m * mu / r);
}

#[test]
fn a_reaction_that_does_work_stays_in_the_equations() {
    let mut sheet = Sheet::titled("Sledge with a skew push");
    let m = sheet.positive_constant("m", "kg", "mass");
    let x = sheet.coordinate("x", "m", "position");
    let sledge = sheet.particle("sledge", m, vector(x, 0, 0));
    let push = sheet.normal("skew", sledge, vector(3, 0, 4));
    let work = sheet.virtual_work();
    let step = work.derivation().step("virtual_work.skew.x").expect("a step");
    assert!(
        matches!(step.standing, Standing::Proved { .. }),
        "that it differs from zero is proved"
    );
    let words = format!("{:?}", work.derivation().headline);
    assert!(
        words.contains("not zero, shown by values at which it differs: skew"),
        "{words}"
    );
    equal(sheet.equations().equations()[0], m * rate(x, 2) - 3 * push / 5);
}

#[test]
fn singular_and_dependent_coordinates_are_named() {
    let mut sheet = Sheet::titled("Antenna boom");
    let m = sheet.positive_constant("m", "kg", "mass");
    let l = sheet.positive_constant("l", "m", "length");
    let theta = sheet.coordinate("theta", "rad", "tilt");
    let phi = sheet.coordinate("phi", "rad", "azimuth");
    sheet.particle(
        "tip",
        m,
        vector(
            l * sin(theta) * cos(phi),
            l * sin(theta) * sin(phi),
            -l * cos(theta),
        ),
    );
    let words = format!("{:?}", sheet.jacobian().derivation().headline);
    assert!(words.contains("rank is 2 except where sin(theta) = 0"), "{words}");

    let mut model = Sheet::titled("Twice the same").model().clone();
    let m = model.positive_constant("m", "kg", "mass").expect("valid");
    let a = model.coordinate("a", "m", "one").expect("valid");
    let b = model.coordinate("b", "m", "other").expect("valid");
    model
        .particle("p", m, vector(a + b, 0, 2 * (a + b)))
        .expect("valid");
    let error = jacobian(&model, &effort()).expect_err("dependent");
    assert!(matches!(
        error,
        DeriveError::DependentCoordinates { coordinate, coordinates: 2 } if coordinate.as_str() == "b"
    ));
    assert!(error.hint().contains("leave `b` out"));
    assert_eq!(equations(&model, &effort()).expect_err("dependent"), error);
}

#[test]
fn an_empty_sheet_says_what_is_missing() {
    let sheet = Sheet::titled("Empty");
    let error = equations(sheet.model(), &effort()).expect_err("nothing to derive");
    assert!(matches!(error, DeriveError::Model(_)), "{error}");
    assert!(!error.hint().is_empty());
}

#[test]
fn undetermined_functions_can_be_derived_with() {
    let mut sheet = Sheet::titled("Carriage with an unknown drag");
    let m = sheet.positive_constant("m", "kg", "mass");
    let x = sheet.coordinate("x", "m", "position");
    let law = sheet.function("P", "N", [x], "force of the track");
    let carriage = sheet.particle("carriage", m, vector(x, 0, 0));
    sheet.force("track", carriage, vector(law, 0, 0));
    equal(sheet.equations().equations()[0], m * rate(x, 2) - law);
    let symbol: Symbol = x.as_symbol().expect("a symbol");
    assert!(law.contains(Expr::from(symbol)));
}

#[test]
fn newtons_equations_leave_room_for_reactions_without_a_name() {
    let mut sheet = Sheet::titled("Bead on a bent wire");
    let m = sheet.positive_constant("m", "kg", "mass of the bead");
    let b = sheet.positive_constant("b", "1/m", "bend of the wire");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let x = sheet.coordinate("x", "m", "position");
    sheet.particle("bead", m, vector(x, 0, b * x.squared()));
    sheet.gravity(g, vector(0, 0, -1));
    all_settled(&sheet);
    let newton = sheet.newton();
    let relations = newton.derivation().steps.iter();
    let relations: Vec<Relation> = relations.map(|step| step.statement.relation).collect();
    assert_eq!(relations, [Relation::Defined, Relation::Defined]);
    let needed = newton.value("newton.bead.z").expect("a step");
    let expected = 2 * m * b * (x * rate(x, 2) + rate(x, 1).squared()) + m * g;
    equal(needed, expected);
    let words = format!("{:?}", sheet.virtual_work().derivation().headline);
    assert!(
        words.contains("1 direction that no stated reaction covers"),
        "{words}"
    );

    sheet.normal("wire", "bead", vector(-2 * b * x, 0, 1));
    let newton = sheet.newton();
    let relations = newton.derivation().steps.iter();
    let relations: Vec<Relation> = relations.map(|step| step.statement.relation).collect();
    assert_eq!(relations, [Relation::Law, Relation::Law]);
    assert!(newton.derivation().notes.is_empty() || !newton.derivation().notes[0].contains("without a name"));
}

/// Gravity acts on a trolley whose girder nobody stated: its push is not taken for zero.
#[test]
fn a_held_component_carries_what_acts_on_it() {
    let mut sheet = Sheet::titled("Trolley");
    let m = sheet.positive_constant("m", "kg", "mass");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let x = sheet.coordinate("x", "m", "position");
    sheet.particle("trolley", m, vector(x, 0, 0));
    sheet.gravity(g, vector(0, 0, -1));
    let newton = sheet.newton();
    let step = newton.derivation().step("newton.trolley.z").expect("a step");
    assert_eq!(step.statement.relation, Relation::Defined);
    equal(step.statement.right.value, m * g);
    let step = newton.derivation().step("newton.trolley.x").expect("a step");
    assert_eq!(step.statement.relation, Relation::Law);
}

fn double_pendulum() -> Sheet {
    let mut sheet = Sheet::titled("Hook and load");
    let [m_1, m_2] = ["m_1", "m_2"].map(|name| sheet.positive_constant(name, "kg", "mass"));
    let [l_1, l_2] = ["l_1", "l_2"].map(|name| sheet.positive_constant(name, "m", "length"));
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let [a, b] = ["a", "b"].map(|name| sheet.coordinate(name, "rad", "angle"));
    let upper = vector(l_1 * sin(a), 0, -l_1 * cos(a));
    let hook = sheet.particle("hook", m_1, upper);
    let load = sheet.particle("load", m_2, upper + vector(l_2 * sin(b), 0, -l_2 * cos(b)));
    sheet.gravity(g, vector(0, 0, -1));
    sheet.link("hoist", hook, vector(0, 0, 0));
    sheet.link("sling", hook, load);
    sheet
}

/// No state at which a double pendulum is singular is made up from a factor that has no zero.
#[test]
fn a_double_pendulum_is_regular_everywhere() {
    let sheet = double_pendulum();
    all_settled(&sheet);
    let words = format!("{:?}", sheet.jacobian().derivation().headline);
    assert!(words.contains("rank is 2 at every state"), "{words}");
    let notes = sheet.mass_matrix().derivation().notes.join(" ");
    assert!(notes.contains("not zero at any state"), "{notes}");
}

#[test]
fn singular_places_are_told_without_masses() {
    let mut sheet = Sheet::titled("Two weights on an antenna boom");
    let [m_1, m_2] = ["m_1", "m_2"].map(|name| sheet.positive_constant(name, "kg", "mass"));
    let l = sheet.positive_constant("l", "m", "length");
    let [theta, phi] = ["theta", "phi"].map(|name| sheet.coordinate(name, "rad", "angle"));
    let along = vector(sin(theta) * cos(phi), sin(theta) * sin(phi), -cos(theta));
    sheet.particle("tip", m_1, l * along);
    sheet.particle("middle", m_2, l / 2 * along);
    let notes = sheet.mass_matrix().derivation().notes.join(" ");
    assert!(
        notes.contains("determined except where sin(theta) = 0"),
        "{notes}"
    );
}

#[test]
fn inverses_are_never_singular() {
    let mut sheet = Sheet::titled("Mirror point");
    let m = sheet.positive_constant("m", "kg", "mass");
    let c = sheet.positive_constant("c", "m2", "power of the mirror");
    let u = sheet.coordinate("u", "m", "distance");
    sheet.particle("image", m, vector(c / u, 0, 0));
    let jacobian = sheet.jacobian();
    let words = format!("{:?}", jacobian.derivation().headline);
    assert!(words.contains("rank is 1 at every state"), "{words}");
    let conditions = &jacobian.derivation().steps.last().expect("steps").conditions;
    assert_eq!(conditions[..], [cas::Condition::NotZero(u)]);
}

#[test]
fn cells_go_on_with_expressions() {
    let Crane { sheet, symbols } = crane();
    let motion = sheet.equations();
    assert_eq!(motion.equation(1), motion.equations()[1]);
    assert_eq!(motion.mass_matrix()[0][0], symbols[0] + symbols[1]);
    assert_eq!(motion.bias().len(), 2);
    let stopped = |act: &dyn Fn() -> Expr| {
        let act = std::panic::AssertUnwindSafe(act);
        let payload = std::panic::catch_unwind(act).expect_err("the cell is stopped");
        payload.downcast_ref::<String>().expect("a text").clone()
    };
    assert!(stopped(&|| motion.equation(2)).contains("there is no equation 2"));
    assert!(stopped(&|| sheet.velocities().expression()).contains("\"Velocities\" has no expression"));
}
