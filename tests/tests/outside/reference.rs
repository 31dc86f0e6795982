//! The numerical reference run judges what the sources print: it agrees, and it catches a wrong sign.

use anyhow::{Context, Result};
use cas::Effort;
use tests::motion::{equations, linear_in_accelerations, with_a_planted_error};
use tests::published::all;
use worksheets::model::Model;
use worksheets::reference::{Agreement, DerivedMotion, Reference};

fn agreement(model: &Model, motion: DerivedMotion) -> Result<Agreement> {
    let mut reference = Reference::new(model, motion);
    reference.duration("1 s")?;
    Ok(reference.report(&Effort::default())?.agreement)
}

#[test]
fn the_reference_agrees_with_every_printed_motion() -> Result<()> {
    for system in all() {
        let model = system.sheet.model();
        for printed in &system.printed {
            let motion = linear_in_accelerations(&equations(printed, model)?, model)?;
            let found = agreement(model, motion).with_context(|| system.source)?;
            assert_eq!(found, Agreement::Agrees, "{}", system.source);
        }
    }
    Ok(())
}

#[test]
fn the_reference_catches_a_wrong_sign_in_every_printed_motion() -> Result<()> {
    for system in all() {
        let model = system.sheet.model();
        for printed in &system.printed {
            let motion = linear_in_accelerations(&equations(printed, model)?, model)?;
            let wrong = with_a_planted_error(&motion);
            assert_ne!(wrong, motion, "{}: nothing was planted", system.source);
            let found = agreement(model, wrong).with_context(|| system.source)?;
            assert_eq!(found, Agreement::Disagrees, "{}", system.source);
        }
    }
    Ok(())
}
