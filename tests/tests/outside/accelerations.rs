//! Accelerations and reactions at probe states are the published ones.

use std::collections::HashMap;

use anyhow::{Context, Result, ensure};
use cas::sample::evaluated;
use cas::{Effort, Expr, Substitution};
use tests::motion::accelerations;
use tests::published::{Probe, Published, all};

/// How far a number may be off, relative to the larger of one and itself.
const TOLERANCE: f64 = 1e-11;

/// The solution of linear equations by elimination with the largest pivot.
fn solved(mut rows: Vec<Vec<f64>>) -> Option<Vec<f64>> {
    let size = rows.len();
    for column in 0..size {
        let pivot =
            (column..size).max_by(|a, b| rows[*a][column].abs().total_cmp(&rows[*b][column].abs()))?;
        rows.swap(column, pivot);
        let leading = rows[column].clone();
        if leading[column] == 0.0 {
            return None;
        }
        for (place, row) in rows.iter_mut().enumerate() {
            if place != column {
                let factor = row[column] / leading[column];
                row.iter_mut()
                    .zip(&leading)
                    .for_each(|(entry, above)| *entry -= factor * above);
            }
        }
    }
    Some((0..size).map(|row| rows[row][size] / rows[row][row]).collect())
}

fn values(probe: &Probe) -> Result<HashMap<Expr, f64>> {
    let pairs = probe.state.iter();
    pairs.map(|(symbol, text)| Ok((*symbol, text.parse()?))).collect()
}

fn found_accelerations(system: &Published, given: &HashMap<Expr, f64>) -> Result<Vec<f64>> {
    let motion = worksheets::derive::equations(system.sheet.model(), &Effort::default())?.for_reference();
    let value = |expr: Expr| {
        evaluated(expr, |part| given.get(&part).copied())
            .with_context(|| format!("{}: {expr}", system.source))
    };
    let mut rows = Vec::new();
    for (row, bias) in motion.mass_matrix.iter().zip(&motion.bias) {
        let mut numbers = row
            .iter()
            .map(|entry| value(*entry))
            .collect::<Result<Vec<_>>>()?;
        numbers.push(-value(*bias)?);
        rows.push(numbers);
    }
    solved(rows).with_context(|| format!("{}: a singular mass matrix", system.source))
}

#[track_caller]
fn close(found: f64, expected: f64, what: &str, source: &str) -> Result<()> {
    let allowed = TOLERANCE * expected.abs().max(1.0);
    ensure!(
        (found - expected).abs() <= allowed,
        "{source}: {what} is {found}, published {expected}"
    );
    Ok(())
}

#[test]
fn accelerations_at_probe_states_are_the_published_ones() -> Result<()> {
    let mut compared = 0;
    for system in all() {
        for probe in &system.probes {
            let found = found_accelerations(&system, &values(probe)?)?;
            for (found, expected) in found.iter().zip(&probe.accelerations) {
                close(*found, *expected, "an acceleration", system.source)?;
                compared += 1;
            }
        }
    }
    ensure!(compared > 20, "only {compared} accelerations");
    Ok(())
}

/// The reactions that Newton's equations need, at the accelerations found, by least squares.
#[test]
fn reactions_at_probe_states_are_the_published_ones() -> Result<()> {
    let mut compared = 0;
    for system in all() {
        let model = system.sheet.model();
        let newton = worksheets::derive::newton(model, &Effort::default())?;
        for probe in system.probes.iter().filter(|probe| !probe.reactions.is_empty()) {
            let mut given = values(probe)?;
            let found = found_accelerations(&system, &given)?;
            given.extend(accelerations(model).into_iter().map(Expr::from).zip(found));
            let unknowns: Vec<Expr> = model
                .reactions()
                .iter()
                .map(|reaction| reaction.magnitude().into())
                .collect();
            // Rows of `directions . magnitudes = inertia - applied`, then the normal equations of them.
            let mut rows = Vec::new();
            for step in &newton.derivation().steps {
                let difference = step.statement.left.value - step.statement.right.value;
                let at_zero = Substitution::new(unknowns.iter().map(|unknown| (*unknown, Expr::zero())));
                let value = |expr: Expr| {
                    evaluated(expr, |part| given.get(&part).copied())
                        .with_context(|| format!("{}: {expr}", system.source))
                };
                let mut row = Vec::new();
                for unknown in &unknowns {
                    row.push(-value(cas::calculus::derivative(difference, *unknown)?)?);
                }
                row.push(value(difference.substituted(&at_zero))?);
                rows.push(row);
            }
            let size = unknowns.len();
            let normal = (0..size).map(|i| {
                (0..=size)
                    .map(|j| rows.iter().map(|row| row[i] * row[j]).sum())
                    .collect()
            });
            let magnitudes =
                solved(normal.collect()).with_context(|| format!("{}: reactions", system.source))?;
            for (name, expected) in &probe.reactions {
                let place = model
                    .reactions()
                    .iter()
                    .position(|reaction| reaction.name().as_str() == *name);
                let place = place.with_context(|| format!("{}: no reaction {name}", system.source))?;
                close(magnitudes[place], *expected, name, system.source)?;
                compared += 1;
            }
        }
    }
    ensure!(compared > 8, "only {compared} reactions");
    Ok(())
}
