//! What the model holds, and that every bad statement is refused with its name and the next step.

use cas::{Expr, Name, cos, exact, sin, sqrt};

use super::*;

fn symbol(name: &str) -> Expr {
    Expr::symbol(name).expect("a valid name")
}

/// A mass on a rail with position `x`, and the model's symbols.
fn cart() -> (Model, Particle, Expr) {
    let mut model = Model::titled("Cart").expect("a title");
    let m = model.positive_constant("m", "kg", "mass").expect("valid");
    let x = model.coordinate("x", "m", "position").expect("valid");
    let cart = model.particle("cart", m, vector(x, 0, 0)).expect("valid");
    (model, cart, x)
}

/// The error, whose message must name `named` and whose hint must say `advice`.
fn refused<T: std::fmt::Debug>(result: Result<T, ModelError>, named: &str, advice: &str) -> ModelError {
    let error = result.expect_err("a bad statement");
    assert!(error.to_string().contains(named), "{error}");
    assert!(error.hint().contains(advice), "{}", error.hint());
    error
}

#[test]
fn what_was_stated_is_held_in_order() {
    let (mut model, cart, x) = cart();
    let l = model.positive_constant("l", "m", "rope").expect("valid");
    let phi = model.coordinate("phi", "rad", "sway").expect("valid");
    let force = model.input("F", "N", "drive").expect("valid");
    let g = model.constant("g", "m/s2", "free fall").expect("valid");
    let load = model
        .particle(
            "load",
            2 * symbol("m"),
            vector(x + l * sin(phi), 0, -l * cos(phi)),
        )
        .expect("valid");
    model.gravity(g, vector(0, 0, -1)).expect("valid");
    model.force("drive", "cart", vector(force, 0, 0)).expect("valid");
    let tension = model.link("rope", cart, load).expect("valid");
    model.assume("the rope is taut", &["rope"]).expect("valid");
    let names: Vec<&str> = model.quantities().iter().map(|d| d.name().as_str()).collect();
    assert_eq!(names, ["t", "m", "x", "l", "phi", "F", "g", "S_rope"]);
    assert_eq!(tension, symbol("S_rope"));
    assert_eq!(
        model.coordinates(),
        [x, phi].map(|q| q.as_symbol().expect("a symbol"))
    );
    assert_eq!(model.position_components().len(), 6);
    assert_eq!(model.forces()[1].on(0), vector(force, 0, 0));
    assert_eq!(model.forces()[1].on(1), Vector::zero());
    assert_eq!(model.forces()[0].on(1), vector(0, 0, -2 * symbol("m") * g));
    assert_eq!(model.assumptions()[0].number(), 1);
    assert_eq!(model.require_complete(), Ok(()));
    assert_eq!(model.rate(force).expect("valid"), {
        let name = Name::new("F").expect("valid");
        Expr::unknown_derivative(name, &[1], &[model.time().into()])
    });
}

#[test]
fn gravity_acts_on_particles_declared_later() {
    let mut model = Model::titled("Late").expect("a title");
    let g = model.constant("g", "m/s2", "free fall").expect("valid");
    let m = model.constant("m", "kg", "mass").expect("valid");
    model.gravity(g, vector(0, 0, -3)).expect("valid");
    let z = model.coordinate("z", "m", "height").expect("valid");
    model.particle("stone", m, vector(0, 0, z)).expect("valid");
    assert_eq!(model.forces()[0].on(0), vector(0, 0, -m * g));
    refused(model.gravity(g, vector(0, 0, -1)), "`gravity`", "another name");
}

#[test]
fn a_spring_pulls_its_ends_together() {
    let (mut model, cart, x) = cart();
    let k = model.constant("k", "N/m", "stiffness").expect("valid");
    let l = model.positive_constant("l", "m", "rest length").expect("valid");
    model.spring("soft", cart, vector(0, 0, 0), k, l).expect("valid");
    let spring = &model.forces()[0];
    assert_eq!(spring.conditions(), [Condition::Positive(x)]);
    assert!(matches!(spring.kind(), ForceKind::Spring { length, .. } if length == x));
    // At x = 3, l = 1 the spring is longer than at rest and pulls the cart back.
    let at = cas::Substitution::new([(x, 3.into()), (l, 1.into())]);
    assert_eq!(spring.on(0).map(|c| c.substituted(&at)), vector(-2 * k, 0, 0));
}

#[test]
fn a_spring_of_no_rest_length_needs_no_condition() {
    let (mut model, cart, x) = cart();
    let k = model.constant("k", "N/m", "stiffness").expect("valid");
    model.spring("soft", cart, vector(0, 0, 0), k, 0).expect("valid");
    assert_eq!(model.forces()[0].on(0), vector(-k * x, 0, 0));
    assert!(model.forces()[0].conditions().is_empty());
}

#[test]
fn a_damper_resists_its_rate() {
    let (mut model, cart, x) = cart();
    let c = model.constant("c", "N.s/m", "damping").expect("valid");
    model.damper("pot", vector(0, 0, 0), cart, c).expect("valid");
    let velocity = Expr::from(x.as_symbol().expect("a symbol").primed());
    let at = cas::Substitution::new([(x, 2.into()), (velocity, 5.into())]);
    let on_cart = model.forces()[0]
        .on(0)
        .map(|component| component.substituted(&at));
    assert_eq!(on_cart, vector(-5 * c, 0, 0));
}

/// A carriage at distance `s` from the origin on a rail that turns by `Omega t`.
#[test]
fn on_a_turning_rail_lengths_and_directions_have_no_roots() {
    let mut model = Model::titled("Rail").expect("a title");
    let [m, l] = ["m", "l"].map(|name| {
        let unit = if name == "m" { "kg" } else { "m" };
        model.positive_constant(name, unit, "constant").expect("valid")
    });
    let k = model.constant("k", "N/m", "stiffness").expect("valid");
    let c = model.constant("c", "N.s/m", "damping").expect("valid");
    let omega = model.constant("Omega", "rad/s", "speed").expect("valid");
    let s = model.coordinate("s", "m", "distance").expect("valid");
    let angle = omega * Expr::from(model.time());
    let carriage = model
        .particle("carriage", m, vector(s * cos(angle), s * sin(angle), 0))
        .expect("valid");
    let axis = Vector::zero();
    model.spring("spring", carriage, axis, k, l).expect("valid");
    model.damper("damper", carriage, axis, c).expect("valid");
    model
        .normal("rail", carriage, vector(-sin(angle), cos(angle), 0))
        .expect("valid");
    let outward = vector(cos(angle), sin(angle), 0);
    let [spring, damper] = model.forces() else {
        panic!("two forces")
    };
    assert_eq!(spring.on(0), (k * (s - l)) * -outward);
    assert_eq!(spring.conditions(), [Condition::Positive(s)]);
    let velocity = Expr::from(s.as_symbol().expect("a symbol").primed());
    assert_eq!(damper.on(0), (c * velocity) * -outward);
    assert_eq!(damper.conditions(), [Condition::NotZero(s)]);
    let rail = &model.reactions()[0];
    assert_eq!(rail.direction_on(0), vector(-sin(angle), cos(angle), 0));
    assert!(rail.conditions().is_empty());
}

#[test]
fn a_damper_between_bodies_without_monomial_length_has_no_root() {
    let mut model = Model::titled("Two").expect("a title");
    let m = model.constant("m", "kg", "mass").expect("valid");
    let c = model.constant("c", "N.s/m", "damping").expect("valid");
    let [x, y] = ["x", "y"].map(|name| model.coordinate(name, "m", "position").expect("valid"));
    let a = model.particle("a", m, vector(x, 0, 0)).expect("valid");
    let b = model.particle("b", m, vector(0, y, 0)).expect("valid");
    model.damper("pot", a, b, c).expect("valid");
    let force = &model.forces()[0];
    assert_eq!(force.conditions(), [Condition::NotZero(x * x + y * y)]);
    let [u, v] = [x, y].map(|q| Expr::from(q.as_symbol().expect("a symbol").primed()));
    // At (3, 4) with velocities (5, 0) the damper lengthens at 3: its pull 3 c acts along (-3, 4)/5.
    let at = cas::Substitution::new([(x, 3.into()), (y, 4.into()), (u, 5.into()), (v, 0.into())]);
    let on = |place: usize| force.on(place).map(|component| component.substituted(&at));
    assert_eq!(on(0), (3 * c) * vector(-3, 4, 0) / 5);
    assert_eq!(on(1), -on(0));
}

#[test]
fn directions_are_made_unit_vectors() {
    let (mut model, cart, _) = cart();
    model.normal("rail", cart, vector(0, 3, 4)).expect("valid");
    let direction = model.reactions()[0].direction_on(0);
    assert_eq!(
        direction,
        vector(0, exact("0.6").expect("valid"), exact("0.8").expect("valid"))
    );
    model.normal("wall", cart, vector(1, 1, 0)).expect("valid");
    assert_eq!(model.reactions()[1].direction_on(0), vector(1, 1, 0) / sqrt(2));
    assert!(model.reactions()[1].conditions().is_empty());
}

#[test]
fn names_are_unique_and_units_are_units() {
    let (mut model, cart, x) = cart();
    refused(model.constant("x", "m", "again"), "`x`", "another name");
    refused(model.constant("cart", "m", "again"), "a particle", "another name");
    refused(
        model.coordinate("t", "s", "again"),
        "`t` is reserved",
        "another name",
    );
    refused(model.constant("sin", "1", "sine"), "`sin`", "another name");
    refused(model.constant("2x", "1", "bad"), "`2x`", "begin with a letter");
    refused(model.constant("<b>", "1", "bad"), "`<`", "begin with a letter");
    refused(model.constant("k", "N/metre", "bad"), "`N/metre`", "\"m\"");
    refused(model.constant("k", "kg m", "bad"), "`k`", "\"kg.m\"");
    refused(model.constant("k", "N/m", " "), "`k`", "in words");
    refused(model.constant("k", "N/m", "stiff\nness"), "meaning", "one line");
    refused(Model::titled("  "), "title", "Sheet::titled");
    refused(model.constant("k", "N/m", &"x".repeat(1001)), "1001", "shorten");
    model.normal("rail", cart, vector(0, 0, 1)).expect("valid");
    refused(
        model.constant("N_rail", "N", "mine"),
        "a reaction",
        "another name",
    );
    refused(
        model.force("rail", cart, vector(0, 0, 0)),
        "a normal reaction",
        "another name",
    );
    assert!(model.quantity(x.as_symbol().expect("a symbol").name()).is_some());
    assert_eq!(
        model.quantities().len(),
        4,
        "a refused statement leaves nothing behind"
    );
}

#[test]
fn positions_are_checked() {
    let (mut model, _, x) = cart();
    let m = symbol("m");
    let velocity = Expr::from(x.as_symbol().expect("a symbol").primed());
    refused(
        model.particle("b", m, vector(symbol("y"), 0, 0)),
        "`y`",
        "declared so far: t, m, x",
    );
    refused(
        model.particle("b", m, vector(symbol("theta"), 0, 0)),
        "`theta`",
        "sheet.coordinate",
    );
    refused(
        model.particle("b", m, vector(0, x / 0, 0)),
        "component y",
        "divided by zero",
    );
    refused(
        model.particle("b", m, vector(0, x + m, 0)),
        "the sum",
        "factor is missing",
    );
    refused(
        model.particle("b", m, vector(0, sin(x), 0)),
        "the argument of",
        "divide",
    );
    refused(
        model.particle("b", m, vector(0, 0, x * x)),
        "must be in m",
        "units",
    );
    refused(
        model.particle("b", m, vector(velocity * 1, 0, 0)),
        "the velocity",
        "coordinates",
    );
    refused(
        model.particle("b", x, vector(x, 0, 0)),
        "the coordinate",
        "constants",
    );
    refused(
        model.particle("b", 0, vector(x, 0, 0)),
        "not above zero",
        "massless",
    );
    refused(
        model.particle("b", -2, vector(x, 0, 0)),
        "the mass of the particle `b`",
        "massless",
    );
    refused(
        model.particle("b", 2, vector(x, 0, 0)),
        "must be in kg",
        "declaring it as a constant",
    );
    refused(
        model.particle_from("b", m, &[x, x]),
        "2 components",
        "vector(x, y, z)",
    );
    refused(
        model.particle_from("b", m, &[x; 4]),
        "4 components",
        "vector(x, y, z)",
    );
    assert_eq!(model.particles().len(), 1);
}

#[test]
fn forces_find_their_particles() {
    let (mut model, cart, x) = cart();
    let (mut other, stranger, _) = self::cart();
    let force = model.input("F", "N", "drive").expect("valid");
    let b = other.constant("b", "m", "offset").expect("valid");
    let away = other
        .particle("far", symbol("m"), vector(b, 0, 0))
        .expect("valid");
    model
        .force("same", stranger, vector(force, 0, 0))
        .expect("a particle equal in name and content");
    refused(
        model.force("f", away, vector(force, 0, 0)),
        "`far`",
        "sheet.particle",
    );
    refused(model.force("f", "crt", vector(force, 0, 0)), "`crt`", "`cart`");
    let changed = Particle {
        mass: 3 * symbol("m"),
        ..cart
    };
    refused(
        model.force("f", changed, vector(force, 0, 0)),
        "another sheet",
        "this sheet's",
    );
    refused(model.force("f", cart, vector(x, 0, 0)), "must be in N", "units");
    let acceleration = Expr::from(x.as_symbol().expect("a symbol").with_primes(2));
    refused(
        model.force("f", cart, vector(symbol("m") * acceleration, 0, 0)),
        "the acceleration",
        "inertia",
    );
    let push = model.normal("rail", cart, vector(0, 0, 1)).expect("valid");
    refused(
        model.force("f", cart, vector(-push / 5, 0, 0)),
        "the reaction",
        "unknown",
    );
    refused(
        model.force("f", cart, vector(symbol("F"), 0, 0)),
        "the function is declared as",
        "declaration returned",
    );
}

#[test]
fn ends_are_checked() {
    let (mut model, cart, x) = cart();
    refused(model.link("rod", cart, cart), "same place", "two different");
    refused(
        model.link("rod", cart, vector(x, 0, 0)),
        "the coordinate",
        "moves with a coordinate is a particle",
    );
    refused(
        model.link("rod", vector(0, 0, 0), vector(0, 0, 0)),
        "no end",
        "at least one",
    );
    refused(
        model.normal("rail", cart, vector(0, 0, 0)),
        "zero vector",
        "vector(0, 0, 1)",
    );
    refused(
        model.spring("s", cart, vector(0, 0, 0), x, 0),
        "the coordinate",
        "stated with sheet.force",
    );
    assert!(model.forces().is_empty() && model.reactions().is_empty());
}

#[test]
fn assumptions_affect_what_exists() {
    let (mut model, ..) = cart();
    refused(model.assume("rigid", &["crat"]), "`crat`", "`cart`");
    refused(model.assume("", &["cart"]), "empty", "in words");
    let register = model.assume("rigid", &["cart", "m"]).expect("valid").clone();
    assert_eq!((register.number(), register.affects().len()), (1, 2));
}

#[test]
fn incomplete_models_say_what_is_missing() {
    let mut model = Model::titled("Empty").expect("a title");
    refused(model.require_complete(), "no particles", "sheet.particle");
    let m = model.constant("m", "kg", "mass").expect("valid");
    model.particle("fixed", m, Vector::zero()).expect("valid");
    refused(model.require_complete(), "no coordinates", "sheet.coordinate");
    let q = ["q1", "q2", "q3", "q4"].map(|name| model.coordinate(name, "m", "position").expect("valid"));
    refused(model.require_complete(), "4 coordinates", "fewer coordinates");
    model
        .particle("moved", m, vector(q[0], q[1], q[2]))
        .expect("valid");
    refused(model.require_complete(), "`q4`", "use `q4`");
}

#[test]
fn functions_of_coordinates_have_units_for_their_derivatives() {
    let (mut model, cart, x) = cart();
    let potential = model
        .function("U", "J", &[x], "potential of the field")
        .expect("valid");
    let slope = cas::calculus::derivative(potential, x).expect("valid");
    model
        .force("field", cart, vector(-slope, 0, 0))
        .expect("J/m is N");
    refused(
        model.force("f", cart, vector(potential, 0, 0)),
        "must be in N",
        "units",
    );
    let elsewhere = Expr::unknown(Name::new("U").expect("valid"), &[2 * x]);
    refused(model.dimension(elsewhere), "declared as", "returned");
    refused(
        model.function("V", "J", &[2 * x], "no"),
        "more than a symbol",
        "symbols",
    );
}

#[test]
fn endless_towers_are_checked_without_recursion() {
    let (mut model, _, x) = cart();
    let l = model.constant("l", "m", "length").expect("valid");
    let tower = (0..100_000).fold(x / l, |inner, _| sin(inner));
    model
        .particle("deep", symbol("m"), vector(l * tower, 0, 0))
        .expect("valid");
}
