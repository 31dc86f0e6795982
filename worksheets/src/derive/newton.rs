//! Newton's equations for every particle, and their projection on the columns of the Jacobian.

use cas::decide::is_zero;
use cas::{Effort, Expr, Name, Symbol};

use super::kinematics::{Component, Kinematics, along};
use super::stage::{Stage, listed};
use super::{DeriveError, Derived};
use crate::model::Model;
use crate::record::{Formal, Ground, Rule, Shown, Side, Statement};

/// What acts on one component of one particle: the sum, its name, and what it rests on.
struct Acting {
    /// The applied forces and the stated reactions.
    sum: Expr,
    /// The applied forces alone.
    applied: Expr,
    name: Formal,
    grounds: Vec<Ground>,
}

/// Mass times acceleration is the sum of applied forces and reactions, for every component.
///
/// Where a reaction without a name may act besides the stated ones, the law would not hold with the
/// stated ones alone; there it gives the sum of all reactions that the motion asks for.
///
/// # Errors
/// A model that is not complete, a position that cannot be differentiated.
pub fn newton(model: &Model, effort: &Effort) -> Result<Derived, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    let mut stage = Stage::titled(model, effort, "newton", "Newton's equations");
    let leads = kinematics.leads();
    let (mut held, mut unnamed) = (Vec::new(), Vec::new());
    let open = model.components_of_unnamed_reactions();
    for (component, open) in kinematics.components.iter().zip(open) {
        let acting = acting(model, component, effort);
        let inertia = component.mass * component.acceleration;
        let place = format!("{} of {}", component.axis.letter(), component.particle);
        if inertia.is_zero() && acting.sum.is_zero() {
            held.push(place);
            continue;
        }
        if open {
            unnamed.push(place);
            needed_reaction(&mut stage, &leads, component, inertia, &acting);
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
    if !unnamed.is_empty() {
        stage.note(format!(
            "Along {} reactions without a name may act: there the line gives the sum of all reactions on the \
             particle that the motion asks for.",
            listed(unnamed)
        ));
    }
    Ok(Derived::new(model, stage.derivation))
}

/// The law solved for the sum of all reactions on a component, named and unnamed.
fn needed_reaction(
    stage: &mut Stage<'_>,
    leads: &[Symbol],
    component: &Component,
    inertia: Expr,
    acting: &Acting,
) {
    let name = Formal::Reaction {
        reaction: None,
        particle: Some(component.particle),
        axis: Some(component.axis),
    };
    let value = stage.collected(inertia - acting.applied, leads);
    let statement = Statement::defined(name, value);
    let grounds = acting.grounds.iter().cloned();
    let grounds = grounds.chain([Ground::stated(component.particle)]);
    stage.stated(&component.key(), statement.clone(), Rule::NewtonsLaw, grounds);
    stage.show(statement);
}

fn acting(model: &Model, component: &Component, effort: &Effort) -> Acting {
    let (mut sum, mut names, mut grounds) = (Vec::new(), Vec::new(), Vec::new());
    let mut act = |value: Expr, name: Formal, stated: Name| {
        // A direction over a length has zero components that are not spelled zero.
        if !is_zero(value, effort).is_proved() {
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
    let applied = model.forces().iter();
    let applied = Expr::sum_of(applied.map(|force| along(force.on(place), axis)));
    for reaction in model.reactions() {
        let name = Formal::reaction(reaction.name(), particle, axis);
        act(along(reaction.on(place), axis), name, reaction.name());
    }
    Acting {
        sum: Expr::sum_of(sum),
        applied,
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
        let grounds = super::equations::stated(model);
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
    if let Some(text) = super::work::taken_for_ideal(model) {
        stage.note(text);
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
