//! The Lagrangian, where there is one, and the reason where there is none.

use cas::Effort;

use super::energy::{examined, grounds_of_potential, names_without_potential, total_potential};
use super::kinematics::Kinematics;
use super::stage::{Stage, listed};
use super::work::remaining_work;
use super::{DeriveError, Derived};
use crate::model::Model;
use crate::record::{Formal, Ground, Rule, Side, Statement};

/// `L = T - V` with the potential of all forces that have one.
///
/// It is a Lagrangian of the whole system exactly where no other applied force and no reaction does
/// virtual work; otherwise the page says which ones stay beside it.
///
/// # Errors
/// A model that is not complete, a position that cannot be differentiated.
pub fn lagrangian(model: &Model, effort: &Effort) -> Result<Derived, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    let forces = examined(model, &kinematics, effort)?;
    let mut stage = Stage::titled(model, effort, "lagrangian", "Lagrangian");
    let difference = kinematics.kinetic_energy() - total_potential(&forces);
    let shown = stage.collected(difference, &kinematics.leads());
    let particles = model.particles().iter();
    let particles = particles.map(|particle| Ground::stated(particle.name()));
    let name = Formal::kinetic_energy().minus(Formal::potential());
    stage.stated(
        "definition",
        Statement::defined(Formal::Lagrangian, shown),
        Rule::DefinitionOfLagrangian,
        particles.chain(grounds_of_potential(&forces)),
    );
    stage.equal(
        "collected",
        Side::named(name, difference),
        Side::named(Formal::Lagrangian, shown),
        Rule::CollectedForm,
        [Ground::step("lagrangian.definition")],
    );
    stage.show(Statement::defined(Formal::Lagrangian, shown));
    let beside = names_without_potential(&forces);
    let places = 0..kinematics.coordinates.len();
    let works = places
        .map(|place| remaining_work(model, &kinematics, place, effort))
        .any(|work| !work.is_zero());
    if beside.is_empty() && !works {
        stage.say("Every applied force that does work has a potential: this is a Lagrangian of the system.");
    }
    if !beside.is_empty() {
        stage.say(format!(
            "This is the Lagrangian of the conservative part. The system has none of the form T - V, because {} {} no \
             potential; what {} in the equations is a generalized force on the right of d/dt(dL/dq') - dL/dq.",
            listed(&beside),
            if beside.len() == 1 { "has" } else { "have" },
            if beside.len() == 1 { "it does" } else { "they do" },
        ));
    }
    if works {
        stage.say("A reaction does virtual work and stays in the equations beside it.");
    }
    Ok(Derived::new(model, stage.derivation).with_expression(shown))
}
