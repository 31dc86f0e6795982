//! The derived equations are the published ones.

use anyhow::{Context, Result, ensure};
use cas::decide::compare;
use cas::{Effort, Expr, Substitution};
use tests::motion::{accelerations, equations};
use tests::published::{Printed, all};

#[test]
fn derived_equations_are_the_printed_ones() -> Result<()> {
    let effort = Effort::default();
    for system in all() {
        let model = system.sheet.model();
        let motion = worksheets::derive::equations(model, &effort).with_context(|| system.source)?;
        for printed in &system.printed {
            for (derived, expected) in sides(printed, motion.equations(), model)? {
                let verdict = compare(derived, expected, &effort);
                ensure!(
                    verdict.is_proved(),
                    "{}\n  derived  {derived}\n  printed  {expected}\n  {verdict:?}",
                    system.source
                );
            }
        }
    }
    Ok(())
}

/// Pairs that have to be equal for the printed statement to be the derived one.
fn sides(printed: &Printed, derived: &[Expr], model: &worksheets::model::Model) -> Result<Vec<(Expr, Expr)>> {
    Ok(match printed {
        Printed::Lagrangian(_) => derived.iter().copied().zip(equations(printed, model)?).collect(),
        // Printed accelerations have to satisfy the derived equations.
        Printed::Accelerations(values) => {
            let solved = accelerations(model)
                .into_iter()
                .map(Expr::from)
                .zip(values.iter().copied());
            let solved = Substitution::new(solved);
            let zero = |equation: &Expr| (equation.substituted(&solved), Expr::zero());
            derived.iter().map(zero).collect()
        }
        // A printed equation may have been divided by a common factor: it is the derived one times what
        // the coefficients of an acceleration in both are to each other.
        Printed::Equations(printed) => {
            let mut pairs = Vec::new();
            for (equation, expected) in derived.iter().zip(printed) {
                let mut leading = None;
                for acceleration in accelerations(model) {
                    let ours = cas::calculus::derivative(*equation, acceleration)?;
                    let theirs = cas::calculus::derivative(*expected, acceleration)?;
                    if leading.is_none() && !compare(theirs, Expr::zero(), &Effort::default()).is_proved() {
                        leading = Some((ours, theirs));
                    }
                }
                let (ours, theirs) = leading.context("a printed equation without acceleration")?;
                pairs.push((*equation * theirs, *expected * ours));
            }
            pairs
        }
    })
}
