//! Velocities by the chain rule.

use cas::calculus::derivative;
use cas::{Effort, Expr};

use super::kinematics::Kinematics;
use super::stage::Stage;
use super::{DeriveError, Derived};
use crate::model::Model;
use crate::record::{Formal, Ground, Rule, Side, Statement};

/// The velocity of every particle: `r' = sum over j of dr/dq_j q_j' + dr/dt`.
///
/// # Errors
/// A model that is not complete, a position that cannot be differentiated.
pub fn velocities(model: &Model, effort: &Effort) -> Result<Derived, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    let mut stage = Stage::titled(model, effort, "velocities", "Velocities");
    let leads = kinematics.leads();
    let mut at_rest = Vec::new();
    for component in &kinematics.components {
        if component.velocity.is_zero() {
            at_rest.push(format!("{} of {}", component.axis.letter(), component.particle));
            continue;
        }
        let name = Formal::velocity(component.particle, component.axis);
        let parts = kinematics.coordinates.iter().zip(&component.row);
        let parts = parts.map(|(coordinate, partial)| *partial * Expr::from(coordinate.primed()));
        let explicit = derivative(component.position, kinematics.time)?;
        let chain = Expr::sum_of(parts.chain([explicit]));
        let shown = stage.collected(component.velocity, &leads);
        stage.equal(
            &component.key(),
            Side::named(name.clone(), component.velocity),
            Side::of(chain),
            Rule::ChainRule,
            [Ground::stated(component.particle)],
        );
        stage.show(Statement::defined(name, shown));
    }
    if !at_rest.is_empty() {
        stage.note(format!("Zero velocity: {}.", super::stage::listed(at_rest)));
    }
    Ok(Derived::new(model, stage.derivation))
}
