//! Errors as they happen on paper, planted in the derived equations: each is refuted with a witness, and
//! the numerical reference catches it.

use anyhow::{Context, Result, bail, ensure};
use cas::decide::{Value, Witness, compare};
use cas::{Effort, Expr, Verdict};
use tests::motion::accelerations;
use tests::published::all;
use worksheets::derive;
use worksheets::model::Model;
use worksheets::reference::{Agreement, DerivedMotion, Reference};

/// A motion with an error in one of its equations.
struct Planted {
    error: &'static str,
    term: Expr,
    row: usize,
    motion: DerivedMotion,
}

/// What happens to a term, and how many times it has to be added for that.
const ERRORS: [(&str, i64); 3] = [
    ("a sign turned", -2),
    ("a coefficient doubled", 1),
    ("a term left out", -1),
];

/// Every error in every entry of the mass matrix and in every term of the bias.
fn planted(motion: &DerivedMotion) -> Vec<Planted> {
    let mut all = Vec::new();
    for row in 0..motion.bias.len() {
        let entries = motion.mass_matrix[row].iter().copied().enumerate();
        let entries = entries.map(|(column, entry)| (Some(column), entry));
        let terms = motion.bias[row].terms().into_iter().map(|term| (None, term));
        for (column, term) in entries.chain(terms).filter(|(_, term)| !term.is_zero()) {
            for (error, times) in ERRORS {
                let mut motion = motion.clone();
                match column {
                    Some(column) => motion.mass_matrix[row][column] += times * term,
                    None => motion.bias[row] += times * term,
                }
                all.push(Planted {
                    error,
                    term,
                    row,
                    motion,
                });
            }
        }
    }
    all
}

/// The left side of an equation of a motion.
fn equation(motion: &DerivedMotion, row: usize, model: &Model) -> Expr {
    let symbols = accelerations(model).into_iter().map(Expr::from);
    let products = motion.mass_matrix[row].iter().zip(symbols);
    products
        .map(|(entry, acceleration)| *entry * acceleration)
        .sum::<Expr>()
        + motion.bias[row]
}

/// Whether the values at a witness are different numbers.
fn shows_a_difference(witness: &Witness) -> bool {
    match (&witness.left, &witness.right) {
        (Value::Exact(left), Value::Exact(right)) => left != right,
        (Value::Within(left), Value::Within(right)) => left.is_apart_from(*right),
        (Value::Exact(_), Value::Within(_)) | (Value::Within(_), Value::Exact(_)) => false,
    }
}

#[test]
fn planted_errors_are_refuted_with_a_witness() -> Result<()> {
    let effort = Effort::default();
    let mut refuted = 0;
    for system in all() {
        let model = system.sheet.model();
        let derived = derive::equations(model, &effort).with_context(|| system.source)?;
        for wrong in planted(&derived.for_reference()) {
            let claimed = equation(&wrong.motion, wrong.row, model);
            let verdict = compare(derived.equations()[wrong.row], claimed, &effort);
            let Verdict::Refuted(witness) = &verdict else {
                bail!(
                    "{}: {}, {}, was not refuted: {verdict:?}",
                    system.source,
                    wrong.error,
                    wrong.term
                );
            };
            ensure!(
                shows_a_difference(witness),
                "{}: {}, {}: {witness:?}",
                system.source,
                wrong.error,
                wrong.term
            );
            refuted += 1;
        }
    }
    ensure!(refuted > 200, "only {refuted} planted errors");
    Ok(())
}

/// A run is dear, so each error is tried once in a system: in the first equation's mass matrix, in the
/// middle of the motion, and in the last term of the last bias.
#[test]
fn the_reference_catches_planted_errors() -> Result<()> {
    let effort = Effort::default();
    let mut caught = 0;
    for system in all() {
        let model = system.sheet.model();
        let motion = derive::equations(model, &effort)?.for_reference();
        for (place, (error, _)) in ERRORS.into_iter().enumerate() {
            let mut wrong = planted(&motion);
            wrong.retain(|wrong| wrong.error == error);
            let chosen = wrong.swap_remove(place * (wrong.len() - 1) / (ERRORS.len() - 1));
            let mut reference = Reference::new(model, chosen.motion);
            reference.duration("0.1 s")?;
            let found = reference
                .report(&effort)
                .with_context(|| system.source)?
                .agreement;
            ensure!(
                found == Agreement::Disagrees,
                "{}: {error}, {}: {found:?}",
                system.source,
                chosen.term
            );
            caught += 1;
        }
    }
    ensure!(caught >= 54, "only {caught} planted errors");
    Ok(())
}
