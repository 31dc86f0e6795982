//! The derived equations are the published ones.

use anyhow::{Context, Result, ensure};
use cas::decide::compare;
use cas::matrix::Matrix;
use cas::{Effort, Expr, Substitution};
use tests::motion::{accelerations, equations, linear_in_accelerations};
use tests::published::{Printed, all};
use worksheets::derive;
use worksheets::model::Model;
use worksheets::reference::DerivedMotion;

#[track_caller]
fn proved_equal(derived: Expr, printed: Expr, effort: &Effort) -> Result<()> {
    let verdict = compare(derived, printed, effort);
    ensure!(
        verdict.is_proved(),
        "\n  derived  {derived}\n  printed  {printed}\n  {verdict:?}"
    );
    Ok(())
}

/// A determinant that is refuted to be zero: otherwise the equations say less than one motion.
fn determinant(rows: Vec<Vec<Expr>>, effort: &Effort) -> Result<Expr> {
    let (determinant, _) = Matrix::from_rows(rows)?.determinant(effort)?;
    let verdict = compare(determinant, Expr::zero(), effort);
    ensure!(verdict.is_refuted(), "a determinant may be zero: {determinant}");
    Ok(determinant)
}

/// The accelerations of printed equations `M q'' + h = 0`, by Cramer's rule.
fn solved(printed: &DerivedMotion, effort: &Effort) -> Result<Vec<Expr>> {
    let whole = determinant(printed.mass_matrix.clone(), effort)?;
    let columns = 0..printed.bias.len();
    let replaced = columns.map(|column| {
        let mut rows = printed.mass_matrix.clone();
        for (row, bias) in rows.iter_mut().zip(&printed.bias) {
            row[column] = -*bias;
        }
        Ok(Matrix::from_rows(rows)?.determinant(effort)?.0 / whole)
    });
    replaced.collect()
}

/// That these accelerations satisfy the derived equations, and that no others do.
fn only_solution(motion: &derive::Motion, values: &[Expr], model: &Model, effort: &Effort) -> Result<()> {
    ensure!(
        values.len() == model.coordinates().len(),
        "as many as coordinates"
    );
    let linear = motion.for_reference();
    determinant(linear.mass_matrix.clone(), effort).context("the derived mass matrix")?;
    let symbols = accelerations(model).into_iter().map(Expr::from);
    let values_in = Substitution::new(symbols.zip(values.iter().copied()));
    for (place, equation) in motion.equations().iter().enumerate() {
        proved_equal(equation.substituted(&values_in), Expr::zero(), effort)?;
        let products = linear.mass_matrix[place].iter().zip(values);
        let sum = products.map(|(entry, value)| *entry * *value).sum::<Expr>() + linear.bias[place];
        proved_equal(sum, Expr::zero(), effort)?;
    }
    Ok(())
}

fn judge(printed: &Printed, motion: &derive::Motion, model: &Model, effort: &Effort) -> Result<()> {
    match printed {
        // Total time derivatives may have been dropped from it, so that only its equations count.
        Printed::Lagrangian(_) => {
            let expected = equations(printed, model)?;
            ensure!(
                motion.equations().len() == expected.len(),
                "one for each coordinate"
            );
            for (derived, expected) in motion.equations().iter().zip(expected) {
                proved_equal(*derived, expected, effort)?;
            }
            Ok(())
        }
        // Printed equations may have been divided by a factor or combined.
        Printed::Equations(printed) => {
            let linear = linear_in_accelerations(printed, model)?;
            only_solution(motion, &solved(&linear, effort)?, model, effort)
        }
        Printed::Accelerations(values) => only_solution(motion, values, model, effort),
    }
}

#[test]
fn derived_equations_are_the_printed_ones() -> Result<()> {
    let effort = Effort::default();
    for system in all() {
        ensure!(!system.printed.is_empty(), "{}: nothing printed", system.source);
        let model = system.sheet.model();
        let motion = derive::equations(model, &effort).with_context(|| system.source)?;
        for printed in &system.printed {
            judge(printed, &motion, model, &effort).with_context(|| system.source)?;
        }
    }
    Ok(())
}

#[test]
fn derived_lagrangians_have_the_equations_of_the_printed_ones() -> Result<()> {
    let effort = Effort::default();
    let mut compared = 0;
    for system in all() {
        let model = system.sheet.model();
        for printed in &system.printed {
            let Printed::Lagrangian(expected) = printed else {
                continue;
            };
            let derived = derive::lagrangian(model, &effort)?.expression();
            let difference = Printed::Lagrangian(derived - *expected);
            for left in equations(&difference, model)? {
                proved_equal(left, Expr::zero(), &effort).with_context(|| system.source)?;
            }
            compared += 1;
        }
    }
    ensure!(compared > 10, "only {compared} Lagrangians");
    Ok(())
}
