//! Generalized forces: applied forces projected on the columns of the Jacobian.

use cas::{Effort, Expr};

use super::kinematics::{Kinematics, along};
use super::stage::Stage;
use super::{DeriveError, Derived};
use crate::model::{Force, Model};
use crate::record::{Formal, Ground, Rule, Side, Statement};

/// `Q_q = sum F . dr/dq`, for every applied force and in total.
///
/// # Errors
/// A model that is not complete, a position that cannot be differentiated.
pub fn generalized_forces(model: &Model, effort: &Effort) -> Result<Derived, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    let mut stage = Stage::titled(model, effort, "generalized_forces", "Generalized forces");
    let leads = kinematics.leads();
    for (place, coordinate) in kinematics.coordinates.iter().enumerate() {
        let (mut parts, mut grounds) = (Vec::new(), Vec::new());
        for force in model.forces() {
            let value = generalized(&kinematics, force, place);
            let shown = stage.collected(value, &leads);
            parts.push(value);
            if shown.is_zero() {
                continue;
            }
            let key = format!("{coordinate}.{}", force.name());
            let name = Formal::GeneralizedForce {
                coordinate: coordinate.name(),
                force: Some(force.name()),
            };
            stage.equal(
                &key,
                Side::named(name, value),
                Side::of(shown),
                Rule::DefinitionOfGeneralizedForce,
                [Ground::stated(force.name())],
            );
            grounds.push(Ground::step(format!("generalized_forces.{key}")));
        }
        let total = Expr::sum_of(parts);
        let shown = stage.collected(total, &leads);
        let name = Formal::generalized_force(coordinate.name());
        stage.equal(
            &coordinate.to_string(),
            Side::named(name.clone(), total),
            Side::of(shown),
            Rule::DefinitionOfGeneralizedForce,
            grounds,
        );
        stage.show(Statement::defined(name, shown));
    }
    if model.forces().is_empty() {
        stage.note("No applied forces are stated on this sheet.");
    }
    Ok(Derived::new(model, stage.derivation))
}

/// The part of a generalized force that one applied force has.
pub(super) fn generalized(kinematics: &Kinematics, force: &Force, coordinate: usize) -> Expr {
    kinematics.projected(coordinate, |component| {
        along(force.on(component.place), component.axis)
    })
}
