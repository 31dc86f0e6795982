//! Motions: integration of equations of motion over time with an eighth-order method, and the
//! observed order of a fourth-order one.

use std::cell::Cell;

use cas::Effort;
use differential_equations::methods::ExplicitRungeKutta;
use differential_equations::ode::ODE;
use differential_equations::prelude::IVP;

use super::ReferenceError;

/// Right-hand side: time, state, rates to be filled in.
pub(super) type Rates<'a> = dyn Fn(f64, &[f64], &mut [f64]) + 'a;

/// Evaluations of a right-hand side that one motion may cost: about ten seconds at most.
const MOST_EVALUATIONS: u64 = 400_000;

struct Counted<'a> {
    rates: &'a Rates<'a>,
    evaluations: &'a Cell<u64>,
}

impl ODE<f64, Vec<f64>> for Counted<'_> {
    fn diff(&self, time: f64, state: &Vec<f64>, rates: &mut Vec<f64>) {
        self.evaluations.set(self.evaluations.get() + 1);
        if self.evaluations.get() > MOST_EVALUATIONS {
            // No number ends the integration: its step size control refuses every step.
            rates.fill(f64::NAN);
        } else {
            (self.rates)(time, state, rates);
        }
    }
}

/// States at given times; fewer than asked for where the integration could not go on.
#[derive(Clone, Debug)]
pub(super) struct Motion {
    pub(super) states: Vec<Vec<f64>>,
    pub(super) evaluations: u64,
}

/// Integrates over the times, the first of which is the start, with DOP853 [Hairer1993, II.5].
///
/// Every output time is the end of a step: interpolated output is not what a reference should rest on.
pub(super) fn integrated(
    rates: &Rates<'_>,
    start: &[f64],
    times: &[f64],
    tolerance: f64,
    effort: &Effort,
) -> Result<Motion, ReferenceError> {
    let evaluations = Cell::new(0);
    let counted = Counted {
        rates,
        evaluations: &evaluations,
    };
    let mut states = vec![start.to_vec()];
    for span in times.windows(2) {
        cas::effort::Meter::new(effort).spend(1)?;
        let from = states.last().expect("invariant: the start is in it").clone();
        let method = ExplicitRungeKutta::dop853()
            .rtol(tolerance)
            .atol(tolerance)
            .max_steps(5_000);
        let solved = IVP::ode(&counted, span[0], span[1], from).method(method).solve();
        let reached = solved.ok().and_then(|solution| {
            let end = solution.t.last().is_some_and(|time| *time >= span[1]);
            solution.y.last().filter(|_| end).cloned()
        });
        match reached {
            Some(state) if state.iter().all(|value| value.is_finite()) => states.push(state),
            _ => break,
        }
    }
    Ok(Motion {
        states,
        evaluations: evaluations.get(),
    })
}

/// The end state after this many steps of the classical fourth-order Runge-Kutta method.
fn with_fixed_steps(rates: &Rates<'_>, start: &[f64], from: f64, to: f64, steps: u32) -> Option<Vec<f64>> {
    let evaluations = Cell::new(0);
    let counted = Counted {
        rates,
        evaluations: &evaluations,
    };
    let method = ExplicitRungeKutta::rk4((to - from) / f64::from(steps));
    let solution = IVP::ode(&counted, from, to, start.to_vec())
        .method(method)
        .solve()
        .ok()?;
    solution.y.last().cloned()
}

/// The order at which the classical fourth-order method approaches an accurate end state when its
/// step is halved; `None` where the errors are too small or too large to tell.
pub(super) fn observed_order(
    rates: &Rates<'_>,
    start: &[f64],
    from: f64,
    to: f64,
    steps: u32,
    accurate: &[f64],
) -> Option<f64> {
    let error = |steps| {
        let end = with_fixed_steps(rates, start, from, to, steps)?;
        Some(largest_difference(&end, accurate))
    };
    let (coarse, fine) = (error(steps)?, error(2 * steps)?);
    (fine > 1e-11 && coarse < 1e-1).then(|| (coarse / fine).log2())
}

/// The largest difference of two states, each component on the scale of one or of its own size.
pub(super) fn largest_difference(a: &[f64], b: &[f64]) -> f64 {
    a.iter()
        .zip(b)
        .map(|(x, y)| (x - y).abs() / x.abs().max(y.abs()).max(1.0))
        .fold(0.0, f64::max)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Simple pendulum, l = 1 m, g = 9.81 m/s2, released at rest from the horizontal: problem A01 of
    /// the multibody benchmark collection of the Universidade da Coruna (2005); digits recomputed
    /// with Jacobi's elliptic functions.
    const PUBLISHED: [(f64, f64, f64); 4] = [
        (1.0, -0.986_291_751_131_875_3, -0.165_010_853_125_541_2),
        (2.0, 0.793_566_195_343_321_8, -0.608_483_930_443_791_5),
        (5.0, 0.942_305_435_043_757_3, -0.334_754_338_414_000_6),
        (10.0, 0.275_087_462_576_116_9, -0.961_419_205_099_125_1),
    ];

    fn pendulum(_: f64, state: &[f64], rates: &mut [f64]) {
        rates[0] = state[1];
        rates[1] = -9.81 * state[0].sin();
    }

    #[test]
    fn the_published_pendulum_is_reached() {
        let times: Vec<f64> = std::iter::once(0.0).chain(PUBLISHED.map(|(t, ..)| t)).collect();
        let start = [std::f64::consts::FRAC_PI_2, 0.0];
        let motion = integrated(&pendulum, &start, &times, 1e-12, &Effort::default()).expect("not stopped");
        assert_eq!(motion.states.len(), times.len());
        for (state, (_, x, y)) in motion.states.iter().skip(1).zip(PUBLISHED) {
            assert!((state[0].sin() - x).abs() < 1e-9, "{state:?}");
            assert!((-state[0].cos() - y).abs() < 1e-9, "{state:?}");
        }
    }

    #[test]
    fn the_order_is_four() {
        let start = [std::f64::consts::FRAC_PI_2, 0.0];
        let motion =
            integrated(&pendulum, &start, &[0.0, 2.0], 1e-13, &Effort::default()).expect("not stopped");
        let order = observed_order(&pendulum, &start, 0.0, 2.0, 100, &motion.states[1]).expect("measurable");
        assert!((order - 4.0).abs() < 0.3, "{order}");
    }

    #[test]
    fn a_motion_that_ends_in_a_singularity_stops_there() {
        // y' = y^2 from y = 1 has no value at t = 1.
        let explosive = |_: f64, state: &[f64], rates: &mut [f64]| rates[0] = state[0] * state[0];
        let times = [0.0, 0.5, 0.9, 1.5];
        let motion = integrated(&explosive, &[1.0], &times, 1e-10, &Effort::default()).expect("not stopped");
        assert_eq!(motion.states.len(), 3);
        assert!((motion.states[1][0] - 2.0).abs() < 1e-8);
    }
}
