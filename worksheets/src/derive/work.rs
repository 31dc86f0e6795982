//! The virtual work of each reaction: zero, or a term that stays in the equations.

use cas::{Effort, Expr, Verdict};

use super::kinematics::{Kinematics, along};
use super::stage::{Stage, listed};
use super::{DeriveError, Derived};
use crate::model::{Model, Reaction};
use crate::record::{Formal, Ground, Rule, Side, Statement};

/// The virtual work of every reaction for a unit virtual displacement of every coordinate, compared
/// with zero.
///
/// Time is held: what a moving support does is no virtual work.
///
/// # Errors
/// A model that is not complete, a position that cannot be differentiated.
pub fn virtual_work(model: &Model, effort: &Effort) -> Result<Derived, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    let mut stage = Stage::titled(model, effort, "virtual_work", "Virtual work of the reactions");
    let (mut ideal, mut working, mut open) = (Vec::new(), Vec::new(), Vec::new());
    for reaction in model.reactions() {
        let (mut works, mut is_open) = (false, false);
        for (place, coordinate) in kinematics.coordinates.iter().enumerate() {
            let work = work_of(&kinematics, reaction, place);
            let name = Formal::VirtualWork {
                reaction: reaction.name(),
                coordinate: coordinate.name(),
            };
            let key = format!("{}.{coordinate}", reaction.name());
            let left = Side::named(name.clone(), work);
            if let Verdict::Refuted(_) = cas::decide::is_zero(work, effort) {
                works = true;
                stage.differ(&key, left, Side::of(Expr::zero()), Rule::VirtualWork);
                let shown = stage.collected(work, &kinematics.leads());
                stage.show(Statement::defined(name, shown));
            } else {
                let grounds = [Ground::stated(reaction.name())];
                let step = stage.equal(&key, left, Side::of(Expr::zero()), Rule::VirtualWork, grounds);
                is_open |= !step.standing.is_settled();
            }
        }
        match (works, is_open) {
            (true, _) => working.push(reaction.name()),
            (false, true) => open.push(reaction.name()),
            (false, false) => ideal.push(reaction.name()),
        }
    }
    if !ideal.is_empty() {
        stage.say(format!(
            "Virtual work zero in every coordinate, proved: {}. {} out of the projected equations.",
            listed(&ideal),
            if ideal.len() == 1 { "It drops" } else { "They drop" },
        ));
    }
    let stays = |names: &[cas::Name]| if names.len() == 1 { "It stays" } else { "They stay" };
    if !working.is_empty() {
        stage.say(format!(
            "Virtual work not zero, shown by values at which it differs: {}. {} in the equations of motion.",
            listed(&working),
            stays(&working),
        ));
    }
    if !open.is_empty() {
        stage.say(format!(
            "Virtual work neither proved zero nor shown to differ from it: {}. {} in the equations of motion.",
            listed(&open),
            stays(&open),
        ));
    }
    if model.reactions().is_empty() {
        stage.say("No reactions are stated on this sheet.");
    }
    if let Some(text) = taken_for_ideal(model) {
        stage.say(text);
    }
    Ok(Derived::new(model, stage.derivation))
}

/// That reactions without a name drop out is assumed, where there are such besides held components.
pub(super) fn taken_for_ideal(model: &Model) -> Option<String> {
    let further = model.unnamed_reactions().further();
    (further > 0).then(|| {
        format!(
            "Position maps exclude {further} {} that no stated reaction covers: that reactions there do no virtual \
             work is an assumption of the register, not proved.",
            if further == 1 { "direction" } else { "directions" },
        )
    })
}

/// The virtual work of a reaction for a unit virtual displacement of a coordinate.
fn work_of(kinematics: &Kinematics, reaction: &Reaction, coordinate: usize) -> Expr {
    kinematics.projected(coordinate, |component| {
        along(reaction.on(component.place), component.axis)
    })
}

/// The virtual work that stays in the equation of a coordinate: that of the reactions for which it
/// is not proved zero.
pub(super) fn remaining_work(
    model: &Model,
    kinematics: &Kinematics,
    coordinate: usize,
    effort: &Effort,
) -> Expr {
    let works = model
        .reactions()
        .iter()
        .map(|reaction| work_of(kinematics, reaction, coordinate));
    Expr::sum_of(works.filter(|work| !cas::decide::is_zero(*work, effort).is_proved()))
}
