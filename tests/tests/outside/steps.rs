//! Every step of every stage of every published system stands, and is proved again from its record.

use anyhow::{Context, Result, ensure};
use cas::Effort;
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
