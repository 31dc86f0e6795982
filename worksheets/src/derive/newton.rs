//! Newton's equations for every particle, and their projection on the columns of the Jacobian.

use cas::{Effort, Expr, Name};

use super::kinematics::{Component, Kinematics, along};
use super::stage::{Stage, listed};
use super::{DeriveError, Derived};
use crate::model::Model;
use crate::record::{Formal, Ground, Rule, Shown, Side, Statement};

/// What acts on one component of one particle: the sum, its name, and what it rests on.
struct Acting {
    sum: Expr,
    name: Formal,
    grounds: Vec<Ground>,
}

/// Mass times acceleration is the sum of applied forces and reactions, for every component.
///
/// # Errors
/// A model that is not complete, a position that cannot be differentiated.
pub fn newton(model: &Model, effort: &Effort) -> Result<Derived, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    let mut stage = Stage::titled(model, effort, "newton", "Newton's equations");
    let (leads, mut held) = (kinematics.leads(), Vec::new());
    for component in &kinematics.components {
        let acting = acting(model, component);
        let inertia = component.mass * component.acceleration;
        if inertia.is_zero() && acting.sum.is_zero() {
            held.push(format!("{} of {}", component.axis.letter(), component.particle));
            continue;
        }
        let name = Formal::mass_times_acceleration(component.particle, component.axis);
        let shown = stage.collected(inertia, &leads);
        let law = Statement::law(Side::named(name, shown), Side::named(acting.name, acting.sum));
        let grounds = acting
            .grounds
            .into_iter()
            .chain([Ground::stated(component.particle)]);
        stage.stated(&component.key(), law.clone(), Rule::NewtonsLaw, grounds);
        stage.show(law);
    }
    if !held.is_empty() {
        stage.note(format!("Nothing accelerates or acts along {}.", listed(held)));
    }
    Ok(Derived::new(model, stage.derivation))
}

fn acting(model: &Model, component: &Component) -> Acting {
    let (mut sum, mut names, mut grounds) = (Vec::new(), Vec::new(), Vec::new());
    let mut act = |value: Expr, name: Formal, stated: Name| {
        if !value.is_zero() {
            sum.push(value);
            names.push(name);
            grounds.push(Ground::stated(stated));
        }
    };
    let Component {
        particle,
        place,
        axis,
        ..
    } = *component;
    for force in model.forces() {
        let name = Formal::force(force.name(), particle, axis);
        act(along(force.on(place), axis), name, force.name());
    }
    for reaction in model.reactions() {
        let name = Formal::reaction(reaction.name(), particle, axis);
        act(along(reaction.on(place), axis), name, reaction.name());
    }
    Acting {
        sum: Expr::sum_of(sum),
        name: if names.is_empty() {
            Formal::Zero
        } else {
            Formal::sum(names)
        },
        grounds,
    }
}

/// Newton's equations multiplied by the columns of the Jacobian and added up: one for each coordinate.
///
/// # Errors
/// A model that is not complete, a position that cannot be differentiated.
pub fn projection(model: &Model, effort: &Effort) -> Result<Derived, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    let mut stage = Stage::titled(
        model,
        effort,
        "projection",
        "Projection on the columns of the Jacobian",
    );
    let leads = kinematics.leads();
    for (place, coordinate) in kinematics.coordinates.iter().enumerate() {
        let inertia = projected_inertia(&kinematics, place);
        let forces = kinematics.projected(place, |component| {
            Expr::sum_of(
                model
                    .forces()
                    .iter()
                    .map(|force| along(force.on(component.place), component.axis)),
            )
        });
        let reactions = kinematics.projected(place, |component| {
            let acting = model.reactions().iter();
            Expr::sum_of(acting.map(|reaction| along(reaction.on(component.place), component.axis)))
        });
        let column = || Formal::running_position(0).partial(*coordinate);
        let accelerated = Formal::product([Formal::Mass { particle: None }, Formal::running_position(2)]);
        let left = accelerated.dot(column()).over_particles();
        let force = Formal::Force {
            force: None,
            particle: None,
            axis: None,
        };
        let reaction = Formal::Reaction {
            reaction: None,
            particle: None,
            axis: None,
        };
        let right = Formal::sum([force, reaction]).dot(column()).over_particles();
        let law = Statement::law(
            Side::named(left.clone(), inertia),
            Side::named(right, forces + reactions),
        );
        let grounds = model
            .particles()
            .iter()
            .map(|particle| Ground::stated(particle.name()));
        stage.stated(&coordinate.to_string(), law, Rule::ProjectionOnColumn, grounds);
        let shown = stage.collected(inertia, &leads);
        stage.equal(
            &format!("{coordinate}.inertia"),
            Side::named(left, inertia),
            Side::of(shown),
            Rule::CollectedForm,
            [Ground::step(format!("projection.{coordinate}"))],
        );
        let applied = stage.collected(forces, &leads);
        // The reactions are kept as they are here: that they drop out is for the virtual work to show.
        stage.show(Statement::law(Side::of(shown), Side::of(applied + reactions)));
    }
    if !model.reactions().is_empty() {
        let shown = stage.derivation.headline.iter().any(|shown| match shown {
            Shown::Statement { statement } => holds_reaction(model, statement.right.value),
            Shown::Matrix { .. } | Shown::Words { .. } => false,
        });
        let names = listed(model.reactions().iter().map(|reaction| reaction.name()));
        stage.note(if shown {
            format!("The reactions {names} are projected like the applied forces; those that are left stand above.")
        } else {
            format!("The reactions {names} are projected like the applied forces; their terms cancel.")
        });
    }
    Ok(Derived::new(model, stage.derivation))
}

/// `sum m r'' . dr/dq`.
pub(super) fn projected_inertia(kinematics: &Kinematics, coordinate: usize) -> Expr {
    kinematics.projected(coordinate, |component| component.mass * component.acceleration)
}

/// Whether the magnitude of a reaction occurs.
fn holds_reaction(model: &Model, expr: Expr) -> bool {
    let symbols = expr.symbols();
    model
        .reactions()
        .iter()
        .any(|reaction| symbols.contains(&reaction.magnitude()))
}
