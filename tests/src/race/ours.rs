//! Our side of the race: the equations of motion in canonical form, and the proof that two routes agree.

use std::fmt;
use std::str::FromStr;
use std::time::Instant;

use anyhow::{Error, Result, bail};
use cas::decide::compare;
use cas::effort::Meter;
use cas::form::Forms;
use cas::{Effort, Expr};

use super::case::Case;
use super::process::Measurement;
use super::workload::Workload;

/// What follows the case where the agreement of both routes is asked for.
const AGREEMENT: &str = ", both routes agree";

/// What is measured of a case.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Task {
    /// The equations of motion, by the energy route and in canonical form.
    Equations(Case),
    /// The exact proof that the projection route and the energy route give the same equations.
    Agreement(Case),
}

impl fmt::Display for Task {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Equations(case) => write!(f, "{case}"),
            Self::Agreement(case) => write!(f, "{case}{AGREEMENT}"),
        }
    }
}

impl FromStr for Task {
    type Err = Error;

    fn from_str(text: &str) -> Result<Self, Error> {
        Ok(match text.strip_suffix(AGREEMENT) {
            Some(case) => Self::Agreement(case.parse()?),
            None => Self::Equations(text.parse()?),
        })
    }
}

/// Measures a task in this process.
///
/// # Errors
/// The equations cannot be derived, or the routes are not proved to agree.
pub fn measure(task: Task) -> Result<Measurement> {
    let effort = Effort::default();
    match task {
        Task::Equations(case) => Measurement::best(|| {
            let start = Instant::now();
            let terms = terms_of_equations(&Workload::of(case)?, &effort)?;
            Ok((start.elapsed(), Some(terms)))
        }),
        Task::Agreement(case) => Measurement::best(|| {
            let workload = Workload::of(case)?;
            let (energy, projection) = (workload.by_energy()?, workload.by_projection()?);
            let start = Instant::now();
            prove_equal(&energy, &projection, &effort)?;
            Ok((start.elapsed(), None))
        }),
    }
}

/// The number of terms of all equations of motion in canonical form.
fn terms_of_equations(workload: &Workload, effort: &Effort) -> Result<u64> {
    let (kinetic, potential) = (workload.kinetic_energy(), workload.potential_energy());
    let coordinates = workload.coordinates.iter();
    let rates = coordinates.flat_map(|coordinate| [1, 2].map(|primes| coordinate.with_primes(primes).into()));
    let parts: Vec<Expr> = rates.chain([kinetic, potential]).collect();
    let meter = Meter::new(effort);
    let mut forms = Forms::new(&parts, &workload.positions(), &meter)?;
    let kinetic = forms.form(kinetic)?;
    let potential = forms.form(potential)?;
    let lagrangian = forms.difference(&kinetic, &potential)?;
    // All equations are kept until the last is there, as whoever derives them would keep them.
    let mut equations = Vec::new();
    for coordinate in &workload.coordinates {
        let momentum = forms.derivative(&kinetic, coordinate.primed())?;
        let rate = forms.total_derivative(&momentum, &workload.rates)?;
        let slope = forms.derivative(&lagrangian, *coordinate)?;
        equations.push(forms.difference(&rate, &slope)?);
    }
    Ok(equations
        .iter()
        .map(|equation| forms.terms(equation) as u64)
        .sum())
}

/// Proves each pair of equations equal.
fn prove_equal(left: &[Expr], right: &[Expr], effort: &Effort) -> Result<()> {
    for (place, (left, right)) in (1..).zip(left.iter().zip(right)) {
        let verdict = compare(*left, *right, effort);
        if !verdict.is_proved() {
            bail!("equation {place} is not proved to be the same by both routes: {verdict:?}");
        }
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn tasks_are_read_as_they_are_written() -> Result<()> {
        for case in Case::all() {
            for task in [Task::Equations(case), Task::Agreement(case)] {
                assert_eq!(task.to_string().parse::<Task>()?, task);
            }
        }
        Ok(())
    }

    #[test]
    fn equations_that_differ_are_not_proved_equal() -> Result<()> {
        let workload = Workload::of("rel 2".parse()?)?;
        let (energy, mut projection) = (workload.by_energy()?, workload.by_projection()?);
        prove_equal(&energy, &projection, &Effort::default())?;
        projection[1] += Expr::symbol("m1")?;
        let error = prove_equal(&energy, &projection, &Effort::default()).expect_err("they differ");
        assert!(error.to_string().contains("equation 2"), "{error}");
        Ok(())
    }
}
