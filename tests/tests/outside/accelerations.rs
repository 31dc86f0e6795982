//! Accelerations and reactions at probe states are the published ones.

use std::collections::HashMap;

use anyhow::{Context, Result, ensure};
use cas::calculus::derivative;
use cas::sample::evaluated;
use cas::{Effort, Expr, Substitution};
use tests::motion::accelerations;
use tests::published::{Probe, Published, all};

/// How far an acceleration may be off, relative to itself.
const OF_ACCELERATIONS: f64 = 1e-12;

/// How far a reaction may be off, relative to itself.
const OF_REACTIONS: f64 = 1e-11;

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

fn close(found: f64, expected: f64, tolerance: f64, what: &str, source: &str) -> Result<()> {
    ensure!(
        (found - expected).abs() <= tolerance * expected.abs(),
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
                close(
                    *found,
                    *expected,
                    OF_ACCELERATIONS,
                    "an acceleration",
                    system.source,
                )?;
                compared += 1;
            }
        }
    }
    ensure!(compared > 20, "only {compared} accelerations");
    Ok(())
}

/// Newton's equations as rows `directions . magnitudes = inertia - applied`, at the published accelerations.
fn rows_for_reactions(system: &Published, probe: &Probe, unknowns: &[Expr]) -> Result<Vec<Vec<f64>>> {
    let model = system.sheet.model();
    let mut given = values(probe)?;
    let published = probe.accelerations.iter().copied();
    given.extend(accelerations(model).into_iter().map(Expr::from).zip(published));
    let value = |expr: Expr| {
        evaluated(expr, |part| given.get(&part).copied())
            .with_context(|| format!("{}: {expr}", system.source))
    };
    let at_zero = Substitution::new(unknowns.iter().map(|unknown| (*unknown, Expr::zero())));
    let newton = worksheets::derive::newton(model, &Effort::default())?;
    let steps = newton.derivation().steps.iter();
    steps
        .map(|step| {
            let difference = step.statement.left.value - step.statement.right.value;
            let mut row = Vec::new();
            for unknown in unknowns {
                row.push(-value(derivative(difference, *unknown)?)?);
            }
            row.push(value(difference.substituted(&at_zero))?);
            Ok(row)
        })
        .collect()
}

/// The magnitudes by least squares: a row may hold reactions that nobody stated.
fn magnitudes(rows: &[Vec<f64>], unknowns: usize) -> Option<Vec<f64>> {
    let normal = (0..unknowns).map(|i| {
        (0..=unknowns)
            .map(|j| rows.iter().map(|row| row[i] * row[j]).sum())
            .collect()
    });
    solved(normal.collect())
}

/// The largest amount by which a row is not satisfied, relative to the largest number in it.
fn residual(rows: &[Vec<f64>], magnitudes: &[f64]) -> f64 {
    let misses = rows.iter().map(|row| {
        let products: Vec<f64> = row.iter().zip(magnitudes).map(|(a, b)| a * b).collect();
        let right = row[magnitudes.len()];
        let largest = products
            .iter()
            .fold(right.abs(), |most, part| most.max(part.abs()));
        let miss = (products.iter().sum::<f64>() - right).abs();
        if miss > 0.0 { miss / largest.max(1.0) } else { miss }
    });
    misses.fold(0.0, f64::max)
}

#[test]
fn reactions_at_probe_states_are_the_published_ones() -> Result<()> {
    let (mut compared, mut complete) = (0, 0);
    for system in all() {
        let model = system.sheet.model();
        let reactions = model.reactions();
        let unknowns: Vec<Expr> = reactions
            .iter()
            .map(|reaction| reaction.magnitude().into())
            .collect();
        for probe in system.probes.iter().filter(|probe| !probe.reactions.is_empty()) {
            let rows = rows_for_reactions(&system, probe, &unknowns)?;
            let found =
                magnitudes(&rows, unknowns.len()).with_context(|| format!("{}: reactions", system.source))?;
            for (name, expected) in &probe.reactions {
                let place = reactions
                    .iter()
                    .position(|reaction| reaction.name().as_str() == *name);
                let place = place.with_context(|| format!("{}: no reaction {name}", system.source))?;
                close(found[place], *expected, OF_REACTIONS, name, system.source)?;
                compared += 1;
            }
            // Where every reaction is stated, each of Newton's equations holds, not only their best fit.
            if rows.len() == unknowns.len() + model.coordinates().len() {
                let miss = residual(&rows, &found);
                ensure!(
                    miss <= OF_REACTIONS,
                    "{}: Newton's equations miss by {miss}",
                    system.source
                );
                complete += 1;
            }
        }
    }
    ensure!(compared > 15, "only {compared} reactions");
    ensure!(complete > 8, "only {complete} systems with every reaction");
    Ok(())
}
