//! Every step of every stage of every published system stands, and is proved again from its record,
//! which it is no longer once the record was changed.

use anyhow::{Context, Result, ensure};
use cas::Effort;
use serde_json::Value;
use tests::published::all;
use worksheets::derive::{self, Derived};
use worksheets::model::Model;
use worksheets::record::Record;

fn stages(model: &Model, effort: &Effort) -> Result<Vec<Derived>> {
    let motion = derive::equations(model, effort)?;
    Ok(vec![
        derive::velocities(model, effort)?,
        derive::identities(model, effort)?,
        derive::jacobian(model, effort)?,
        derive::newton(model, effort)?,
        derive::projection(model, effort)?,
        derive::virtual_work(model, effort)?,
        derive::reduction(model, effort)?,
        derive::generalized_forces(model, effort)?,
        derive::potential(model, effort)?,
        derive::lagrangian(model, effort)?,
        derive::mass_matrix(model, &motion, effort)?,
        (*motion).clone(),
    ])
}

#[test]
fn every_step_stands_and_is_proved_again_from_its_record() -> Result<()> {
    let effort = Effort::default();
    let mut proved = 0;
    for system in all() {
        for stage in stages(system.sheet.model(), &effort).with_context(|| system.source)? {
            let derivation = stage.derivation();
            let tally = derivation.tally();
            let open = tally.refuted + tally.supported + tally.undecided;
            ensure!(open == 0, "{}, {}: {tally:?}", system.source, derivation.title);
            proved += tally.proved;
            let json = Record::of(stage.model(), derivation).to_json()?;
            let read = Record::from_json(&json)?;
            ensure!(
                read.steps.len() == derivation.steps.len(),
                "{}: the record lacks steps",
                system.source
            );
            ensure!(
                read.to_json()? == json,
                "{}: read and written again",
                system.source
            );
            let divergences = read.divergences(&effort);
            ensure!(divergences.is_empty(), "{}: {divergences:?}", system.source);
        }
    }
    ensure!(proved > 500, "only {proved} steps were proved");
    Ok(())
}

/// The record with one more on the right of every step that is called proved, and how many those are.
fn tampered(json: &str) -> Result<(Record, usize)> {
    let mut record: Value = serde_json::from_str(json)?;
    let steps = record["steps"].as_array_mut().context("the steps of a record")?;
    let mut changed = 0;
    for step in steps.iter_mut() {
        if step["verdict"]["kind"] == "Proved" {
            let right = step["statement"]["right"]["value"].as_str().context("a value")?;
            step["statement"]["right"]["value"] = format!("1 + ({right})").into();
            changed += 1;
        }
    }
    Ok((Record::from_json(&record.to_string())?, changed))
}

#[test]
fn no_step_of_a_changed_record_is_proved_again() -> Result<()> {
    let effort = Effort::default();
    let mut refused = 0;
    for system in all() {
        for stage in stages(system.sheet.model(), &effort).with_context(|| system.source)? {
            let derivation = stage.derivation();
            let (record, changed) = tampered(&Record::of(stage.model(), derivation).to_json()?)?;
            let found = record.divergences(&effort);
            ensure!(
                changed == derivation.tally().proved && found.len() == changed,
                "{}, {}: {changed} steps changed, {} proved once, {} refused",
                system.source,
                derivation.title,
                derivation.tally().proved,
                found.len()
            );
            for divergence in found {
                ensure!(
                    divergence.found.word() == "refuted",
                    "{}: {divergence:?}",
                    system.source
                );
                refused += 1;
            }
        }
    }
    ensure!(refused > 500, "only {refused} steps were refused");
    Ok(())
}
