//! Errors as they happen on paper, planted in the derived equations: each is refuted with a witness.

use anyhow::{Context, Result, ensure};
use cas::decide::compare;
use cas::{Effort, Expr, Verdict};
use tests::published::all;

/// The equation with its last term turned in sign, doubled, and left out.
fn planted(equation: Expr) -> Option<[Expr; 3]> {
    let terms = equation.terms();
    let last = *terms.last()?;
    (terms.len() > 1).then(|| [equation - 2 * last, equation + last, equation - last])
}

#[test]
fn planted_errors_are_refuted_with_a_witness() -> Result<()> {
    let effort = Effort::default();
    let mut refuted = 0;
    for system in all() {
        let motion =
            worksheets::derive::equations(system.sheet.model(), &effort).with_context(|| system.source)?;
        for equation in motion.equations() {
            for wrong in planted(*equation).into_iter().flatten() {
                let verdict = compare(*equation, wrong, &effort);
                let Verdict::Refuted(witness) = &verdict else {
                    anyhow::bail!("{}: {wrong} was not refuted: {verdict:?}", system.source);
                };
                ensure!(witness.left != witness.right, "{}: {witness:?}", system.source);
                refuted += 1;
            }
        }
    }
    ensure!(refuted > 60, "only {refuted} planted errors");
    Ok(())
}
