//! The two identities that carry the passage to generalized coordinates.

use cas::calculus::{derivative, total_derivative};
use cas::{Effort, Expr};

use super::kinematics::Kinematics;
use super::stage::Stage;
use super::{DeriveError, Derived};
use crate::model::Model;
use crate::record::{Formal, Ground, Rule, Side};

/// `d(r')/d(q') = dr/dq` and `d/dt(dr/dq) = d(r')/dq`, for every component and coordinate for which
/// the sides are not both visibly zero.
///
/// # Errors
/// A model that is not complete, a position that cannot be differentiated.
pub fn identities(model: &Model, effort: &Effort) -> Result<Derived, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    let mut stage = Stage::titled(
        model,
        effort,
        "identities",
        "The two identities of the position maps",
    );
    for component in &kinematics.components {
        let position = Formal::position(component.particle, component.axis);
        let velocity = Formal::velocity(component.particle, component.axis);
        let ground = Ground::stated(component.particle);
        for (coordinate, partial) in kinematics.coordinates.iter().zip(&component.row) {
            let by_rate = derivative(component.velocity, Expr::from(coordinate.primed()))?;
            let name = format!("{}.{coordinate}", component.key());
            if !(by_rate.is_zero() && partial.is_zero()) {
                stage.equal(
                    &format!("first.{name}"),
                    Side::named(velocity.clone().partial(coordinate.primed()), by_rate),
                    Side::named(position.clone().partial(*coordinate), *partial),
                    Rule::CancellationOfDots,
                    [ground.clone()],
                );
            }
            let rate = total_derivative(*partial, &kinematics.rates)?;
            let by_coordinate = derivative(component.velocity, *coordinate)?;
            if !(rate.is_zero() && by_coordinate.is_zero()) {
                stage.equal(
                    &format!("second.{name}"),
                    Side::named(position.clone().partial(*coordinate).rate(), rate),
                    Side::named(velocity.clone().partial(*coordinate), by_coordinate),
                    Rule::ExchangeOfDerivatives,
                    [ground.clone()],
                );
            }
        }
    }
    let tally = stage.derivation.tally();
    let judged = stage.derivation.steps.len();
    stage.say(format!(
        "d(r')/d(q') = dr/dq and d/dt(dr/dq) = d(r')/dq: proved for {} of {judged} pairs of a position component and \
         a coordinate; for all other pairs both sides are zero.",
        tally.proved
    ));
    Ok(Derived::new(model, stage.derivation))
}
