//! The reduction of the projected inertia to `d/dt(dT/dq') - dT/dq`, line by line.

use cas::calculus::{derivative, total_derivative};
use cas::{Effort, Expr};

use super::kinematics::Kinematics;
use super::newton::projected_inertia;
use super::stage::Stage;
use super::{DeriveError, Derived};
use crate::model::Model;
use crate::record::{Formal, Ground, Rule, Side, Statement};

/// For every coordinate the lines
///
/// ```text
/// sum m r'' . dr/dq = d/dt(sum m r' . dr/dq) - sum m r' . d/dt(dr/dq)      product rule
///                   = d/dt(sum m r' . dr'/dq') - sum m r' . dr'/dq         the two identities
///                   = d/dt(dT/dq') - dT/dq                                 T = sum m r' . r' / 2
/// ```
///
/// # Errors
/// A model that is not complete, a position that cannot be differentiated.
pub fn reduction(model: &Model, effort: &Effort) -> Result<Derived, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    let mut stage = Stage::titled(model, effort, "reduction", "Reduction to the kinetic energy");
    let energy = kinematics.kinetic_energy();
    let leads = kinematics.leads();
    let shown = stage.collected(energy, &leads);
    stage.equal(
        "kinetic_energy",
        Side::named(Formal::kinetic_energy(), energy),
        Side::of(shown),
        Rule::DefinitionOfKineticEnergy,
        model
            .particles()
            .iter()
            .map(|particle| Ground::stated(particle.name())),
    );
    stage.show(Statement::defined(Formal::kinetic_energy(), shown));

    let mass = || Formal::Mass { particle: None };
    let (position, velocity) = (Formal::running_position(0), Formal::running_position(1));
    let momentum = || Formal::product([mass(), Formal::running_position(1)]);
    let inertia = || Formal::product([mass(), Formal::running_position(2)]);
    for (place, coordinate) in kinematics.coordinates.iter().enumerate() {
        let rate = coordinate.primed();
        let by_coordinate = || position.clone().partial(*coordinate);
        let (mut inner, mut outer) = (Vec::new(), Vec::new());
        let (mut by_rates, mut by_coordinates) = (Vec::new(), Vec::new());
        for component in &kinematics.components {
            let momentum = component.mass * component.velocity;
            inner.push(momentum * component.row[place]);
            outer.push(momentum * total_derivative(component.row[place], &kinematics.rates)?);
            by_rates.push(momentum * derivative(component.velocity, Expr::from(rate))?);
            by_coordinates.push(momentum * derivative(component.velocity, *coordinate)?);
        }
        let difference = |inner: Vec<Expr>, outer: Vec<Expr>| {
            Ok::<_, DeriveError>(
                total_derivative(Expr::sum_of(inner), &kinematics.rates)? - Expr::sum_of(outer),
            )
        };
        let by_product_rule = difference(inner, outer)?;
        let by_identities = difference(by_rates, by_coordinates)?;
        let by_energy = kinematics.lagrange_expression(energy, *coordinate)?;

        let lines = [
            inertia().dot(by_coordinate()).over_particles(),
            momentum()
                .dot(by_coordinate())
                .over_particles()
                .rate()
                .minus(momentum().dot(by_coordinate().rate()).over_particles()),
            momentum()
                .dot(velocity.clone().partial(rate))
                .over_particles()
                .rate()
                .minus(
                    momentum()
                        .dot(velocity.clone().partial(*coordinate))
                        .over_particles(),
                ),
            Formal::kinetic_energy().lagrange_expression(*coordinate),
        ];
        let values = [
            projected_inertia(&kinematics, place),
            by_product_rule,
            by_identities,
            by_energy,
        ];
        let rules = [
            ("product_rule", Rule::ProductRule),
            ("identities", Rule::ExchangeOfDerivatives),
            ("kinetic_energy", Rule::DerivativeOfKineticEnergy),
        ];
        let mut before = None;
        for (line, (key, rule)) in rules.into_iter().enumerate() {
            let key = format!("{coordinate}.{key}");
            stage.equal(
                &key,
                Side::named(lines[line].clone(), values[line]),
                Side::named(lines[line + 1].clone(), values[line + 1]),
                rule,
                before.replace(Ground::step(format!("reduction.{key}"))),
            );
        }
        let result = stage.collected(by_energy, &leads);
        stage.show(Statement::defined(lines[3].clone(), result));
    }
    Ok(Derived::new(model, stage.derivation))
}
