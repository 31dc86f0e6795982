//! The potential of the applied forces, where there is one.

use cas::Effort;
use cas::calculus::derivative;

use super::energy::{Examined, Finding, Reason, examined, grounds_of_potential, total_potential};
use super::kinematics::Kinematics;
use super::stage::Stage;
use super::{DeriveError, Derived};
use crate::model::Model;
use crate::record::{Formal, Ground, Rule, Side, Statement};

/// The potential `V` with `Q_q = -dV/dq`, for every applied force that has one; the others with the
/// reason why they have none.
///
/// A prescribed input has none here: its power comes from outside the system.
///
/// # Errors
/// A model that is not complete, a position that cannot be differentiated.
pub fn potential(model: &Model, effort: &Effort) -> Result<Derived, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    let forces = examined(model, &kinematics, effort)?;
    let mut stage = Stage::titled(model, effort, "potential", "Potential of the applied forces");
    let mut found = 0;
    for force in &forces {
        match &force.finding {
            Finding::Idle => stage.note(format!(
                "{}: it does no work on any coordinate.",
                force.force.name()
            )),
            Finding::Potential(value) => {
                found += 1;
                gradient(&mut stage, &kinematics, force, *value)?;
            }
            Finding::Without(reason) => without(&mut stage, &kinematics, force, reason)?,
        }
    }
    let total = total_potential(&forces);
    let shown = stage.collected(total, &[]);
    if found == 0 {
        stage.say(if forces.is_empty() {
            "No applied forces are stated on this sheet."
        } else {
            "No applied force has a potential."
        });
        return Ok(Derived::new(model, stage.derivation));
    }
    stage.equal(
        "total",
        Side::named(Formal::potential(), total),
        Side::of(shown),
        Rule::CollectedForm,
        grounds_of_potential(&forces),
    );
    stage.show(Statement::defined(Formal::potential(), shown));
    Ok(Derived::new(model, stage.derivation).with_expression(shown))
}

/// The steps that prove a potential: the generalized forces are its negative derivatives.
fn gradient(
    stage: &mut Stage<'_>,
    kinematics: &Kinematics,
    force: &Examined<'_>,
    potential: cas::Expr,
) -> Result<(), DeriveError> {
    let name = force.force.name();
    let formal = Formal::Potential { force: Some(name) };
    let shown = stage.collected(potential, &[]);
    let statement = Statement::defined(formal.clone(), shown);
    let grounds = [Ground::stated(name)];
    stage.stated(&format!("{name}.value"), statement, Rule::Definition, grounds);
    for (coordinate, part) in kinematics.coordinates.iter().zip(&force.generalized) {
        let slope = -derivative(shown, *coordinate)?;
        if part.is_zero() && slope.is_zero() {
            continue;
        }
        let left = Formal::GeneralizedForce {
            coordinate: coordinate.name(),
            force: Some(name),
        };
        stage.equal(
            &format!("{name}.{coordinate}"),
            Side::named(left, *part),
            Side::named(formal.clone().partial(*coordinate).negative(), slope),
            Rule::Potential,
            [Ground::step(format!("potential.{name}.value"))],
        );
    }
    Ok(())
}

/// Says why a force has no potential, with the step that shows it where one does.
fn without(
    stage: &mut Stage<'_>,
    kinematics: &Kinematics,
    force: &Examined<'_>,
    reason: &Reason,
) -> Result<(), DeriveError> {
    let name = force.force.name();
    match reason {
        Reason::Velocities => stage.note(format!(
            "{name}: no potential, because its generalized forces depend on velocities."
        )),
        Reason::Input(input) => stage.note(format!(
            "{name}: no potential, because it is driven by the prescribed input {input}; its power comes from outside."
        )),
        Reason::NotFound => stage.note(format!(
            "{name}: no potential was found in closed form, although its mixed derivatives were not shown to differ; \
             it stays a generalized force."
        )),
        Reason::NotClosed(i, j) => {
            let [first, second] = [kinematics.coordinates[*i], kinematics.coordinates[*j]];
            let generalized = |coordinate: cas::Symbol| Formal::GeneralizedForce {
                coordinate: coordinate.name(),
                force: Some(name),
            };
            let left = derivative(force.generalized[*i], second)?;
            let right = derivative(force.generalized[*j], first)?;
            stage.differ(
                &format!("{name}.closedness"),
                Side::named(generalized(first).partial(second), left),
                Side::named(generalized(second).partial(first), right),
                Rule::Closedness,
            );
            stage.note(format!(
                "{name}: no potential, because the mixed derivatives of its generalized forces by {first} and \
                 {second} differ."
            ));
        }
    }
    Ok(())
}
