//! The reference against equations by hand, right ones and ones with planted errors.

mod published;

use cas::{Expr, Name, Symbol, cos, sin};

use super::settings::Settings;
use super::*;
use crate::model::vector;

/// A sheet with its handles.
struct Crane {
    model: Model,
    masses: [Expr; 2],
    length: Expr,
    gravity: Expr,
    coordinates: [Expr; 2],
    drive: Expr,
}

/// Trolley on a rail and container on a rope: Landau & Lifshitz, Mechanics (3rd ed. 1976), section
/// 5, problem 2, with a drive force and with the reactions of rail and rope.
fn crane() -> Crane {
    let mut model = Model::titled("Crane").expect("a title");
    let m1 = model
        .positive_constant("m_1", "kg", "mass of the trolley")
        .expect("new");
    let m2 = model
        .positive_constant("m_2", "kg", "mass of the container")
        .expect("new");
    let l = model
        .positive_constant("l", "m", "length of the rope")
        .expect("new");
    let g = model
        .positive_constant("g", "m/s2", "acceleration of free fall")
        .expect("new");
    let x = model
        .coordinate("x", "m", "position of the trolley")
        .expect("new");
    let phi = model.coordinate("phi", "rad", "angle of the rope").expect("new");
    let drive = model.input("F", "N", "drive force").expect("new");
    let trolley = model.particle("trolley", m1, vector(x, 0, 0)).expect("new");
    let container = model
        .particle("container", m2, vector(x + l * sin(phi), 0, -l * cos(phi)))
        .expect("new");
    model.gravity(g, vector(0, 0, -1)).expect("new");
    model.force("drive", trolley, vector(drive, 0, 0)).expect("new");
    model.normal("rail", trolley, vector(0, 0, 1)).expect("new");
    model.link("rope", trolley, container).expect("new");
    Crane {
        model,
        masses: [m1, m2],
        length: l,
        gravity: g,
        coordinates: [x, phi],
        drive,
    }
}

fn rate(coordinate: Expr) -> Expr {
    coordinate.as_symbol().expect("a symbol").primed().into()
}

impl Crane {
    /// The equations by hand, with the sign of the term in the square of the angular velocity.
    fn equations(&self, sign: i64) -> DerivedMotion {
        let ([m1, m2], l, g, [_, phi]) = (self.masses, self.length, self.gravity, self.coordinates);
        DerivedMotion {
            mass_matrix: vec![
                vec![m1 + m2, m2 * l * cos(phi)],
                vec![m2 * l * cos(phi), m2 * l.squared()],
            ],
            bias: vec![
                sign * m2 * l * sin(phi) * rate(phi).squared() - self.drive,
                m2 * g * l * sin(phi),
            ],
        }
    }

    fn settings(&self, values: [&str; 4]) -> Settings {
        let mut settings = Settings::default();
        let constants = [self.masses[0], self.masses[1], self.length, self.gravity];
        for (constant, value) in constants.into_iter().zip(values) {
            settings
                .set(&self.model, constant, value.into())
                .expect("a constant");
        }
        settings
    }
}

#[test]
fn right_equations_agree_with_everything_drawn() {
    let crane = crane();
    let report = Reference::new(&crane.model, crane.equations(-1))
        .report(&Effort::default())
        .expect("runs");
    assert_eq!(report.agreement, Agreement::Agrees, "{report:#?}");
    assert_eq!(report.accelerations.largest, "below 1e-11");
    assert!(report.constants.iter().all(|row| row.drawn));
    assert_eq!(
        report.motion.order.as_deref().map(|order| &order[..2]),
        Some("4."),
        "{:?}",
        report.motion.order
    );
    let again = Reference::new(&crane.model, crane.equations(-1))
        .report(&Effort::default())
        .expect("runs");
    assert_eq!(report, again);
}

#[test]
fn a_planted_sign_error_is_caught_by_states_motion_and_energy() {
    let crane = crane();
    let report = Reference::new(&crane.model, crane.equations(1))
        .report(&Effort::default())
        .expect("runs");
    assert_eq!(report.agreement, Agreement::Disagrees);
    assert_eq!(report.accelerations.agreement, Agreement::Disagrees);
    assert_eq!(report.motion.deviation.agreement, Agreement::Disagrees);
    assert_eq!(report.motion.energy.agreement, Agreement::Disagrees);
}

#[test]
fn values_that_are_given_are_used_and_shown() {
    let crane = crane();
    let mut reference = Reference::new(&crane.model, crane.equations(-1));
    reference.set(crane.masses[0], "1200").expect("a constant");
    reference
        .start(crane.coordinates[1], "0.3")
        .expect("a coordinate");
    reference.start(rate(crane.coordinates[1]), "0").expect("a rate");
    reference.duration("20 s").expect("a duration");
    let report = reference.report(&Effort::default()).expect("runs");
    assert_eq!(
        (report.constants[0].value.as_str(), report.constants[0].drawn),
        ("1200", false)
    );
    assert_eq!(report.motion.duration, "20");
    assert!((report.motion.curves[1].values[0] - 0.3).abs() < 1e-12);
}

/// A bead on a rod that turns at a constant rate in a horizontal plane, with the side reaction of
/// the rod: r'' = Omega^2 r and N = 2 m Omega r' [Whittaker1937].
fn rotating_rod() -> (Model, [Expr; 2], Expr) {
    let mut model = Model::titled("Bead on a rotating rod").expect("a title");
    let m = model
        .positive_constant("m", "kg", "mass of the bead")
        .expect("new");
    let omega = model.constant("Omega", "rad/s", "rate of turn").expect("new");
    let r = model.coordinate("r", "m", "distance from the axis").expect("new");
    let angle = omega * Expr::from(model.time());
    let bead = model
        .particle("bead", m, vector(r * cos(angle), r * sin(angle), 0))
        .expect("new");
    model
        .normal("side", bead, vector(-sin(angle), cos(angle), 0))
        .expect("new");
    (model, [m, omega], r)
}

#[test]
fn energy_balances_on_a_driven_system() {
    let (model, [m, omega], r) = rotating_rod();
    let derived = DerivedMotion {
        mass_matrix: vec![vec![m]],
        bias: vec![-m * omega.squared() * r],
    };
    let report = Reference::new(&model, derived)
        .report(&Effort::default())
        .expect("runs");
    assert_eq!(report.agreement, Agreement::Agrees, "{report:#?}");
}

#[test]
fn wrong_settings_are_named() {
    let crane = crane();
    let mut reference = Reference::new(&crane.model, crane.equations(-1));
    let stranger = Expr::from(Symbol::new("zeta").expect("a valid name"));
    for (error, part) in [
        (reference.set(stranger, "1"), "`zeta`"),
        (reference.set(crane.coordinates[0], "1"), "`x`"),
        (reference.set(crane.length, "long"), "long"),
        (reference.set(crane.length, -2), "-2"),
        (reference.set(crane.length, "1/0"), "1/0"),
        (reference.start(crane.length, "1"), "`l`"),
        (reference.duration("tomorrow"), "\"tomorrow\""),
        (reference.duration("-3 s"), "\"-3 s\""),
        (reference.with(crane.length, 1), "`l`"),
    ] {
        let error = error.expect_err("refused");
        assert!(error.to_string().contains(part), "{error}");
        assert!(!error.hint().is_empty());
    }
}

#[test]
fn equations_of_another_shape_are_refused() {
    let crane = crane();
    let mut equations = crane.equations(-1);
    equations.bias.pop();
    let error = Reference::new(&crane.model, equations)
        .report(&Effort::default())
        .expect_err("refused");
    assert!(matches!(
        error,
        ReferenceError::Shape {
            given: 1,
            coordinates: 2
        }
    ));
}

#[test]
fn a_motion_is_compared_only_while_its_conditions_hold() {
    // A mass on a spring whose length is taken as s: the model no longer holds once s passes zero.
    let mut model = Model::titled("Mass on a spring").expect("a title");
    let m = model.positive_constant("m", "kg", "mass").expect("new");
    let k = model.positive_constant("k", "N/m", "stiffness").expect("new");
    let l0 = model
        .positive_constant("l_0", "m", "length without load")
        .expect("new");
    let s = model.coordinate("s", "m", "length").expect("new");
    let block = model.particle("block", m, vector(s, 0, 0)).expect("new");
    model
        .spring("spring", block, vector(0, 0, 0), k, l0)
        .expect("new");
    let derived = DerivedMotion {
        mass_matrix: vec![vec![m]],
        bias: vec![k * (s - l0)],
    };
    let mut reference = Reference::new(&model, derived);
    for (constant, value) in [(m, 1), (k, 1), (l0, 1)] {
        reference.set(constant, value).expect("a constant");
    }
    reference.start(s, "1.5").expect("a coordinate");
    reference.start(rate(s), -2).expect("a rate");
    let report = reference.report(&Effort::default()).expect("runs");
    assert_eq!(report.agreement, Agreement::Agrees, "{report:#?}");
    assert_eq!(
        report.motion.cut_short.as_deref(),
        Some("after that a stated condition no longer holds")
    );
    assert!(report.motion.curves[0].values.iter().all(|length| *length > 0.0));
}

/// The published pendulum through the whole run: problem A01 of the multibody benchmark collection
/// of the Universidade da Coruna (2005), l = 1 m, released at rest from the horizontal.
#[test]
fn the_published_pendulum_is_followed() {
    let mut model = Model::titled("Simple pendulum").expect("a title");
    let m = model.positive_constant("m", "kg", "mass").expect("new");
    let l = model.positive_constant("l", "m", "length").expect("new");
    let g = model
        .positive_constant("g", "m/s2", "acceleration of free fall")
        .expect("new");
    let theta = model
        .coordinate("theta", "rad", "angle from the vertical")
        .expect("new");
    let bob = model
        .particle("bob", m, vector(l * sin(theta), -l * cos(theta), 0))
        .expect("new");
    model.gravity(g, vector(0, -1, 0)).expect("new");
    model.link("rod", bob, vector(0, 0, 0)).expect("new");
    let derived = DerivedMotion {
        mass_matrix: vec![vec![m * l.squared()]],
        bias: vec![m * g * l * sin(theta)],
    };
    let mut reference = Reference::new(&model, derived);
    reference.set(m, 1).expect("a constant");
    reference.set(l, 1).expect("a constant");
    reference.set(g, "9.81").expect("a constant");
    reference.start(theta, cas::pi() / 2).expect("a coordinate");
    reference.start(rate(theta), 0).expect("a rate");
    reference.duration("10 s").expect("a duration");
    let report = reference.report(&Effort::default()).expect("runs");
    assert_eq!(report.agreement, Agreement::Agrees, "{report:#?}");
    let last = report.motion.curves[0]
        .values
        .last()
        .expect("the motion has an end");
    // Published x = sin(theta) at t = 10 s; the curve is rounded to five digits.
    assert!((last.sin() - 0.275_087_462_576_116_9).abs() < 1e-5, "{last}");
}

#[test]
fn prescribed_paths_are_differentiated_by_the_reference_itself() {
    // A bead on a rod turned by a prescribed angle psi(t): r'' = r psi'^2, with psi' in the derived
    // equation taken by formula and in the reference by dual numbers.
    let mut model = Model::titled("Bead on a driven rod").expect("a title");
    let m = model.positive_constant("m", "kg", "mass").expect("new");
    let r = model.coordinate("r", "m", "distance from the axis").expect("new");
    let psi = model.input("psi", "rad", "angle of the rod").expect("new");
    model
        .particle("bead", m, vector(r * cos(psi), r * sin(psi), 0))
        .expect("new");
    let t = Expr::from(model.time());
    let turning = Expr::unknown_derivative(Name::new("psi").expect("a name"), &[1], &[t]);
    let equations = |factor: i64| DerivedMotion {
        mass_matrix: vec![vec![m]],
        bias: vec![-factor * m * r * turning.squared()],
    };
    for (factor, agreement) in [(1, Agreement::Agrees), (2, Agreement::Disagrees)] {
        let mut reference = Reference::new(&model, equations(factor));
        reference
            .with(psi, t.squared() / 4 - sin(2 * t))
            .expect("a function of time");
        reference.duration("3").expect("a duration");
        let report = reference.report(&Effort::default()).expect("runs");
        assert_eq!(report.agreement, agreement, "{report:#?}");
        assert!(!report.stand_ins[0].drawn);
    }
    let mut reference = Reference::new(&model, equations(1));
    assert!(matches!(
        reference.with(psi, r),
        Err(ReferenceError::StandIn { .. })
    ));
    assert!(matches!(
        reference.with(psi, psi),
        Err(ReferenceError::StandIn { .. })
    ));
}
