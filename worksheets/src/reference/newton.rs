//! Newton's equations with reactions at one state, solved as a linear system on numbers.
//!
//! Unknown are the accelerations of the coordinates and the magnitudes of the reactions. Directions
//! that the position maps hold but no reaction is declared for are completed: they are those normal
//! to the columns of the Jacobian and to the declared reactions.

use nalgebra::{DMatrix, DVector};
use num_dual::{Dual2_64, Dual64};

use super::evaluation::Evaluation;
use super::stated::{Stated, StatedForce};

/// Columns whose part normal to the earlier ones is shorter than this, relative to themselves,
/// count as dependent; a state where that happens to the Jacobian is not admissible.
const DEPENDENT: f64 = 1e-6;

/// What Newton's equations give at one state.
#[derive(Clone, Debug)]
pub(super) struct Dynamics {
    /// The accelerations of the coordinates.
    pub(super) accelerations: Vec<f64>,
    /// The magnitudes of the declared reactions; none where they depend on each other.
    pub(super) reactions: Vec<Option<f64>>,
    /// The rate at which all forces and reactions do work.
    pub(super) power: f64,
}

/// A state of the system.
#[derive(Clone, Copy, Debug)]
pub(super) struct State<'a> {
    pub(super) time: f64,
    pub(super) coordinates: &'a [f64],
    pub(super) velocities: &'a [f64],
}

impl State<'_> {
    /// Coordinates and time as dual numbers in time, the second derivatives being zero.
    fn moving(&self) -> Vec<Dual2_64> {
        let pairs = self.coordinates.iter().zip(self.velocities);
        pairs
            .map(|(q, v)| Dual2_64::new(*q, *v, 0.0))
            .chain([Dual2_64::new(self.time, 1.0, 0.0)])
            .collect()
    }

    /// Coordinates and time with a first derivative by the coordinate of this place.
    fn varied(&self, by: usize) -> Vec<Dual64> {
        let mut values: Vec<Dual64> = self.coordinates.iter().map(|q| Dual64::from(*q)).collect();
        values[by].eps = 1.0;
        values.push(Dual64::from(self.time));
        values
    }

    /// Coordinates, velocities and time as plain numbers.
    pub(super) fn numbers(&self) -> Vec<f64> {
        let all = self.coordinates.iter().chain(self.velocities).copied();
        all.chain([self.time]).collect()
    }
}

impl Stated {
    /// The kinetic energy, from the velocities that the position maps have.
    pub(super) fn kinetic_energy(&self, state: &State<'_>) -> f64 {
        let squares = self.positions.at(&state.moving());
        let masses = self.masses.at(&state.numbers());
        squares
            .chunks(3)
            .zip(masses)
            .map(|(r, mass)| 0.5 * mass * r.iter().map(|c| c.v1 * c.v1).sum::<f64>())
            .sum()
    }

    /// Solves Newton's equations; `None` where the coordinates are singular or a value is no number.
    pub(super) fn dynamics(&self, state: &State<'_>) -> Option<Dynamics> {
        let (n, numbers, moving) = (state.coordinates.len(), state.numbers(), state.moving());
        let motion = self.positions.at(&moving);
        let rows = motion.len();
        let masses = self.masses.at(&numbers);
        let forces = self.forces(state, &numbers);
        let mut jacobian = DMatrix::zeros(rows, n);
        for column in 0..n {
            for (row, value) in self.positions.at(&state.varied(column)).iter().enumerate() {
                jacobian[(row, column)] = value.eps;
            }
        }
        let declared = self.reaction_columns(&numbers, rows);

        let mut directions = Directions::new(rows);
        for column in jacobian.column_iter() {
            directions.add(&column.into_owned()).then_some(())?;
        }
        let independent: Vec<bool> = declared.iter().map(|column| directions.add(column)).collect();
        let kept = declared.iter().zip(&independent).filter(|(_, keep)| **keep);
        let held: Vec<DVector<f64>> = kept
            .map(|(column, _)| column.clone())
            .chain(directions.completion())
            .collect();

        let mut system = DMatrix::zeros(rows, rows);
        for row in 0..rows {
            for column in 0..n {
                system[(row, column)] = masses[row / 3] * jacobian[(row, column)];
            }
            for (place, direction) in held.iter().enumerate() {
                system[(row, n + place)] = -direction[row];
            }
        }
        let right = DVector::from_fn(rows, |row, _| forces[row] - masses[row / 3] * motion[row].v2);
        let solution = system.lu().solve(&right)?;
        if !solution.iter().all(|value| value.is_finite()) {
            return None;
        }
        let reaction_force = held
            .iter()
            .enumerate()
            .fold(DVector::zeros(rows), |sum: DVector<f64>, (place, direction)| {
                sum + direction * solution[n + place]
            });
        let power = (0..rows)
            .map(|row| (forces[row] + reaction_force[row]) * motion[row].v1)
            .sum();
        let mut magnitudes = solution.iter().skip(n);
        let reactions = independent
            .iter()
            .map(|keep| keep.then(|| magnitudes.next().copied()).flatten())
            .collect();
        Some(Dynamics {
            accelerations: solution.iter().take(n).copied().collect(),
            reactions,
            power,
        })
    }

    /// The applied forces on all particles, component by component.
    fn forces(&self, state: &State<'_>, numbers: &[f64]) -> Vec<f64> {
        let moving: Vec<Dual64> = state
            .coordinates
            .iter()
            .zip(state.velocities)
            .map(|(q, v)| Dual64::new(*q, *v))
            .chain([Dual64::new(state.time, 1.0)])
            .collect();
        let mut sum = vec![0.0; self.particles * 3];
        let mut add = |particle: usize, force: [f64; 3]| {
            for (axis, value) in force.into_iter().enumerate() {
                sum[3 * particle + axis] += value;
            }
        };
        for force in &self.forces {
            match force {
                StatedForce::Components { particle, vector } => add(*particle, three(&vector.at(numbers))),
                StatedForce::Between { ends, on, law } => {
                    let gap = Gap::between(ends, &moving);
                    let law_values = law.values.at(numbers);
                    let pull = gap.pull(law, &law_values);
                    for (particle, sign) in on {
                        add(*particle, pull.map(|component| sign * component));
                    }
                }
            }
        }
        sum
    }

    fn reaction_columns(&self, numbers: &[f64], rows: usize) -> Vec<DVector<f64>> {
        self.reactions
            .iter()
            .map(|loads| {
                let mut column = DVector::zeros(rows);
                for (particle, vector) in loads {
                    for (axis, value) in vector.at(numbers).into_iter().enumerate() {
                        column[3 * particle + axis] += value;
                    }
                }
                column
            })
            .collect()
    }
}

/// The vector from the first end of a spring or damper to the second, and its rate.
struct Gap {
    vector: [f64; 3],
    rate: [f64; 3],
}

impl Gap {
    fn between(ends: &Evaluation, moving: &[Dual64]) -> Self {
        let ends = ends.at(moving);
        let gap: [Dual64; 3] = std::array::from_fn(|axis| ends[3 + axis] - ends[axis]);
        Self {
            vector: gap.map(|component| component.re),
            rate: gap.map(|component| component.eps),
        }
    }

    /// The force on the first end: along the line to the second, by the law.
    fn pull(&self, law: &super::stated::Law, values: &[f64]) -> [f64; 3] {
        let squared: f64 = self.vector.iter().map(|c| c * c).sum();
        let length = squared.sqrt();
        let stretching: f64 = self.vector.iter().zip(self.rate).map(|(c, r)| c * r).sum::<f64>() / length;
        let tension = law.tension(values, length, stretching);
        self.vector.map(|component| tension * component / length)
    }
}

fn three(values: &[f64]) -> [f64; 3] {
    std::array::from_fn(|axis| values[axis])
}

/// Orthonormal directions collected one after another.
///
/// Gram-Schmidt, run twice for each column: twice is enough [Giraud2005].
struct Directions {
    rows: usize,
    basis: Vec<DVector<f64>>,
}

impl Directions {
    fn new(rows: usize) -> Self {
        Self {
            rows,
            basis: Vec::new(),
        }
    }

    fn normal_part(&self, column: &DVector<f64>) -> DVector<f64> {
        let mut rest = column.clone();
        for _ in 0..2 {
            for direction in &self.basis {
                let along = direction.dot(&rest);
                rest -= direction * along;
            }
        }
        rest
    }

    /// Adds the direction of a column; `false`, with nothing added, where it depends on the earlier ones.
    fn add(&mut self, column: &DVector<f64>) -> bool {
        let rest = self.normal_part(column);
        let (length, whole) = (rest.norm(), column.norm());
        let independent = length > DEPENDENT * whole && length.is_finite();
        if independent {
            self.basis.push(rest / length);
        }
        independent
    }

    /// The directions still missing, each the normal part of the unit vector farthest from the rest.
    fn completion(mut self) -> Vec<DVector<f64>> {
        let mut added = Vec::new();
        while self.basis.len() < self.rows {
            let candidates = (0..self.rows).map(|row| {
                let mut unit = DVector::zeros(self.rows);
                unit[row] = 1.0;
                self.normal_part(&unit)
            });
            let farthest =
                candidates.reduce(|best, next| if next.norm() > best.norm() { next } else { best });
            let Some(direction) = farthest.map(|rest| rest.normalize()) else {
                break;
            };
            self.basis.push(direction.clone());
            added.push(direction);
        }
        added
    }
}
