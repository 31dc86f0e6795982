//! A run: the derived equations against Newton's equations at random states and along one motion.

use cas::Effort;

use super::ReferenceError;
use super::derived::{DerivedMotion, DerivedNumbers};
use super::draw::Draw;
use super::motion::{Motion, integrated, observed_order};
use super::newton::State;
use super::report::{Agreement, Curve, Deviation, MotionReport, Report, rounded};
use super::settings::{Settings, Setup};
use super::stated::Stated;
use crate::model::Model;

/// At how many random states accelerations are compared.
const STATES: usize = 20;

/// How many states are tried for one that is admissible.
const TRIES: usize = 2_000;

/// The tolerance for accelerations: rounding errors of small linear systems stay far below.
const ACCELERATION_TOLERANCE: f64 = 1e-9;

/// The tolerance for motions and their energy: the integrators' own errors stay far below.
const MOTION_TOLERANCE: f64 = 1e-6;

/// The tolerance of the integrations that are compared, and of the one that measures sensitivity.
const FINE: f64 = 1e-11;
const COARSE: f64 = 1e-9;

/// In how many pieces the motion is divided for output.
const PIECES: u32 = 200;

/// Both sides with numbers for everything.
struct Run<'a> {
    model: &'a Model,
    stated: Stated,
    derived: DerivedNumbers,
    setup: Setup,
    effort: &'a Effort,
}

/// Compares derived equations of motion with the numerical reference.
pub(super) fn run(
    model: &Model,
    derived: &DerivedMotion,
    settings: &Settings,
    effort: &Effort,
) -> Result<Report, ReferenceError> {
    let setup = settings.complete(model)?;
    let run = Run {
        model,
        stated: Stated::of(model, &setup.constants, &setup.stand_ins)?,
        derived: derived.prepared(model, &setup.constants, &setup.stand_ins)?,
        setup,
        effort,
    };
    let (accelerations, worst_coordinate) = run.compare_states()?;
    let motion = run.compare_motions()?;
    // A motion too sensitive to be followed to its end does not weaken what its first part has shown.
    let along = if motion.times.len() > 1 {
        motion.deviation.agreement.and(motion.energy.agreement)
    } else {
        Agreement::NotConclusive
    };
    Ok(Report {
        agreement: accelerations.agreement.and(along),
        constants: run.setup.constant_rows.clone(),
        stand_ins: run.setup.stand_in_rows.clone(),
        start: run.setup.start_rows.clone(),
        states: STATES,
        accelerations,
        worst_coordinate,
        motion,
    })
}

impl Run<'_> {
    fn coordinates(&self) -> usize {
        self.setup.start.len() / 2
    }

    /// Accelerations at random admissible states about the start.
    fn compare_states(&self) -> Result<(Deviation, String), ReferenceError> {
        let mut draw = Draw::of(self.model);
        let n = self.coordinates();
        let (mut differences, mut sizes) = (vec![0.0_f64; n], vec![0.0_f64; n]);
        let (mut found, mut tries) = (0, 0);
        while found < STATES {
            if tries == TRIES {
                return Err(ReferenceError::NoState {
                    tries,
                    reason: "the coordinates are singular there, or a stated condition does not hold",
                });
            }
            tries += 1;
            let mut near = |start: &f64| start + draw.between(-1.0, 1.0) * start.abs().max(1.0);
            let values: Vec<f64> = self.setup.start.iter().map(&mut near).collect();
            let state = State {
                time: draw.between(0.0, self.setup.duration.min(10.0)),
                coordinates: &values[..n],
                velocities: &values[n..],
            };
            if !self.stated.admits(&state.numbers()) {
                continue;
            }
            let Some(reference) = self.stated.dynamics(&state) else {
                continue;
            };
            found += 1;
            let derived = self.derived.accelerations(&state, &reference.reactions);
            for place in 0..n {
                let expected = reference.accelerations[place];
                let difference = derived
                    .as_ref()
                    .map_or(f64::NAN, |values| (values[place] - expected).abs());
                // A value that is no number must not vanish in a maximum.
                differences[place] = if difference.is_nan() {
                    f64::INFINITY
                } else {
                    differences[place].max(difference)
                };
                sizes[place] = sizes[place].max(expected.abs());
            }
        }
        let deviations = differences
            .iter()
            .zip(&sizes)
            .map(|(difference, size)| relative(*difference, *size));
        let (worst, largest) = deviations
            .enumerate()
            .reduce(|best, next| if next.1 > best.1 { next } else { best })
            .unwrap_or((0, 0.0));
        let name = self.model.coordinates()[worst].to_string();
        Ok((Deviation::new(largest, ACCELERATION_TOLERANCE), name))
    }

    /// The motion of the reference: rates of coordinates and velocities from Newton's equations.
    fn reference_rates(&self, time: f64, state: &[f64], rates: &mut [f64]) {
        let n = self.coordinates();
        let at = State {
            time,
            coordinates: &state[..n],
            velocities: &state[n..2 * n],
        };
        match self.stated.dynamics(&at) {
            Some(dynamics) => {
                rates[..n].copy_from_slice(&state[n..2 * n]);
                rates[n..2 * n].copy_from_slice(&dynamics.accelerations);
            }
            None => rates.fill(f64::NAN),
        }
    }

    /// The derived motion, with the work of all forces and reactions as one state more.
    fn derived_rates(&self, time: f64, state: &[f64], rates: &mut [f64]) {
        let n = self.coordinates();
        let at = State {
            time,
            coordinates: &state[..n],
            velocities: &state[n..2 * n],
        };
        let both = self.stated.dynamics(&at).and_then(|dynamics| {
            let accelerations = self.derived.accelerations(&at, &dynamics.reactions)?;
            Some((dynamics.power, accelerations))
        });
        match both {
            Some((power, accelerations)) => {
                rates[..n].copy_from_slice(&state[n..2 * n]);
                rates[n..2 * n].copy_from_slice(&accelerations);
                rates[2 * n] = power;
            }
            None => rates.fill(f64::NAN),
        }
    }

    /// Whether every stated condition holds at a state of coordinates and velocities.
    fn admits(&self, time: f64, state: &[f64]) -> bool {
        let numbers: Vec<f64> = state.iter().copied().chain([time]).collect();
        self.stated.admits(&numbers)
    }

    fn compare_motions(&self) -> Result<MotionReport, ReferenceError> {
        let n = self.coordinates();
        let times: Vec<f64> = (0..=PIECES)
            .map(|piece| self.setup.duration * f64::from(piece) / f64::from(PIECES))
            .collect();
        let start = State {
            time: 0.0,
            coordinates: &self.setup.start[..n],
            velocities: &self.setup.start[n..],
        };
        if !self.stated.admits(&start.numbers()) || self.stated.dynamics(&start).is_none() {
            return Err(ReferenceError::Start {
                reason: "the coordinates are singular there, or a stated condition does not hold",
            });
        }
        let reference_rates =
            |time: f64, state: &[f64], rates: &mut [f64]| self.reference_rates(time, state, rates);
        let derived_rates =
            |time: f64, state: &[f64], rates: &mut [f64]| self.derived_rates(time, state, rates);
        let reference = integrated(&reference_rates, &self.setup.start, &times, FINE, self.effort)?;
        let coarse = integrated(&reference_rates, &self.setup.start, &times, COARSE, self.effort)?;
        let mut with_work = self.setup.start.clone();
        with_work.push(0.0);
        let derived = integrated(&derived_rates, &with_work, &times, FINE, self.effort)?;

        let sizes: Vec<f64> = (0..2 * n)
            .map(|place| {
                reference
                    .states
                    .iter()
                    .map(|state| state[place].abs())
                    .fold(0.0, f64::max)
            })
            .collect();
        let differ = |a: &[f64], b: &[f64]| {
            (0..2 * n)
                .map(|place| relative((a[place] - b[place]).abs(), sizes[place]))
                .fold(0.0, f64::max)
        };
        let calm = reference
            .states
            .iter()
            .zip(&coarse.states)
            .take_while(|(fine, coarse)| differ(fine, coarse) <= MOTION_TOLERANCE)
            .count();
        let admitted = (0..calm)
            .take_while(|place| self.admits(times[*place], &reference.states[*place]))
            .count();
        let reached = admitted.min(derived.states.len());
        let mut largest = (0..reached)
            .map(|place| differ(&reference.states[place], &derived.states[place]))
            .fold(0.0, f64::max);
        if reached < admitted {
            // The derived motion ends where the reference goes on.
            largest = f64::INFINITY;
        }
        let cut_short = (admitted < times.len()).then(|| {
            let reason = if admitted < calm {
                "after that a stated condition no longer holds"
            } else if calm < reference.states.len() {
                "after that the motion is too sensitive to errors to be followed"
            } else {
                "after that the integration ends: the coordinates become singular, the motion grows too fast, or \
                 it needs too many steps"
            };
            reason.to_owned()
        });
        Ok(MotionReport {
            duration: self.setup.duration_text.clone(),
            compared_until: rounded(times[admitted.saturating_sub(1)], 3).to_string(),
            cut_short,
            deviation: Deviation::new(largest, MOTION_TOLERANCE),
            energy: Deviation::new(self.imbalance(&derived, &times, reached), MOTION_TOLERANCE),
            order: self.order(&derived_rates, &with_work, &derived),
            times: times[..admitted].iter().map(|time| rounded(*time, 5)).collect(),
            curves: self.curves(&reference, admitted),
        })
    }

    /// The largest difference of kinetic energy gained and work done, relative to the larger of the
    /// largest kinetic energy and the largest work.
    fn imbalance(&self, derived: &Motion, times: &[f64], reached: usize) -> f64 {
        let n = self.coordinates();
        let energies: Vec<(f64, f64)> = derived.states[..reached]
            .iter()
            .zip(times)
            .map(|(state, time)| {
                let at = State {
                    time: *time,
                    coordinates: &state[..n],
                    velocities: &state[n..2 * n],
                };
                (self.stated.kinetic_energy(&at), state[2 * n])
            })
            .collect();
        let Some((first, _)) = energies.first() else {
            return f64::NAN;
        };
        let size = energies
            .iter()
            .map(|(kinetic, work)| kinetic.abs().max(work.abs()))
            .fold(0.0, f64::max);
        let largest = energies
            .iter()
            .map(|(kinetic, work)| (kinetic - first - work).abs())
            .fold(0.0, f64::max);
        relative(largest, size)
    }

    /// The observed order over the first stretch of the motion, with steps fitted to the accurate one's.
    fn order(&self, rates: &super::motion::Rates<'_>, start: &[f64], derived: &Motion) -> Option<String> {
        if derived.states.len() < 2 {
            return None;
        }
        let mean_step = self.setup.duration * 12.0 / derived.evaluations.max(1) as f64;
        let end = 16.0 * mean_step;
        let accurate = integrated(rates, start, &[0.0, end], 1e-13, self.effort).ok()?;
        let accurate = accurate.states.get(1)?;
        [8, 16, 32, 64]
            .into_iter()
            .filter_map(|steps| observed_order(rates, start, 0.0, end, steps, accurate))
            .last()
            .map(|order| format!("{order:.1}"))
    }

    fn curves(&self, reference: &Motion, trusted: usize) -> Vec<Curve> {
        let coordinates = self.model.coordinates();
        coordinates
            .iter()
            .enumerate()
            .map(|(place, coordinate)| {
                let declared = self
                    .model
                    .quantity(coordinate.name())
                    .expect("invariant: coordinates are declared");
                let factor = super::settings::as_float(declared.unit().factor()).unwrap_or(1.0);
                Curve {
                    coordinate: coordinate.to_string(),
                    unit: declared.unit().code().to_owned(),
                    meaning: declared.meaning().to_owned(),
                    values: reference.states[..trusted]
                        .iter()
                        .map(|state| rounded(state[place] / factor, 5))
                        .collect(),
                }
            })
            .collect()
    }
}

/// A difference on a scale; on the scale of one where everything is nearly zero.
fn relative(difference: f64, size: f64) -> f64 {
    if size > 1e-6 {
        difference / size
    } else {
        difference
    }
}
