//! The system as stated: position maps, forces and reaction directions, ready for numbers.

use std::collections::BTreeMap;

use cas::{Expr, Symbol};

use super::ReferenceError;
use super::evaluation::Evaluation;
use super::stand_in::StandIns;
use crate::model::{Condition, End, Force, ForceKind, Load, Model, Vector};

/// How far inside its range a condition must hold for a state to be admissible.
const MARGIN: f64 = 1e-3;

/// A model with every constant a number and every undetermined function stood in for.
#[derive(Clone, Debug)]
pub(super) struct Stated {
    pub(super) particles: usize,
    pub(super) masses: Evaluation,
    pub(super) positions: Evaluation,
    pub(super) forces: Vec<StatedForce>,
    /// For each reaction its direction on each particle.
    pub(super) reactions: Vec<Vec<(usize, Evaluation)>>,
    conditions: Evaluation,
    condition_kinds: Vec<Condition>,
}

/// An applied force.
#[derive(Clone, Debug)]
pub(super) enum StatedForce {
    /// Components on one particle.
    Components { particle: usize, vector: Evaluation },
    /// A spring or damper between two points, from which its force is worked out on numbers.
    Between {
        ends: Evaluation,
        on: Vec<(usize, f64)>,
        law: Law,
    },
}

/// The law of a spring or damper.
#[derive(Clone, Debug)]
pub(super) struct Law {
    kind: LawKind,
    pub(super) values: Evaluation,
}

#[derive(Clone, Copy, Debug)]
enum LawKind {
    /// Stiffness and rest length.
    Spring,
    /// Damping coefficient.
    Damper,
}

impl Law {
    /// The tension at this length and rate of length.
    pub(super) fn tension(&self, values: &[f64], length: f64, stretching: f64) -> f64 {
        match self.kind {
            LawKind::Spring => values[0] * (length - values[1]),
            LawKind::Damper => values[0] * stretching,
        }
    }
}

/// Prepares expressions over the same variables and constants.
struct Preparation<'a> {
    constants: &'a BTreeMap<Symbol, f64>,
    stand_ins: &'a StandIns,
    /// Coordinates and time.
    places: Vec<Symbol>,
    /// Coordinates, velocities and time.
    states: Vec<Symbol>,
}

impl Preparation<'_> {
    fn over(&self, expressions: &[Expr], variables: &[Symbol]) -> Result<Evaluation, ReferenceError> {
        let resolved: Vec<Expr> = expressions
            .iter()
            .map(|expression| self.stand_ins.resolved(*expression))
            .collect::<Result<_, _>>()?;
        Evaluation::new(&resolved, variables, self.constants)
    }

    fn of_place(&self, expressions: &[Expr]) -> Result<Evaluation, ReferenceError> {
        self.over(expressions, &self.places)
    }

    fn of_state(&self, expressions: &[Expr]) -> Result<Evaluation, ReferenceError> {
        self.over(expressions, &self.states)
    }

    fn force(&self, model: &Model, force: &Force) -> Result<Vec<StatedForce>, ReferenceError> {
        match force.kind() {
            ForceKind::Spring {
                ends,
                stiffness,
                rest_length,
                ..
            } => self.between(model, ends, LawKind::Spring, &[stiffness, rest_length]),
            ForceKind::Damper { ends, coefficient } => {
                self.between(model, ends, LawKind::Damper, &[coefficient])
            }
            _ => force
                .loads()
                .iter()
                .map(|load| {
                    Ok(StatedForce::Components {
                        particle: load.particle,
                        vector: self.of_state(&load.vector.components())?,
                    })
                })
                .collect(),
        }
    }

    fn between(
        &self,
        model: &Model,
        ends: [End; 2],
        kind: LawKind,
        values: &[Expr],
    ) -> Result<Vec<StatedForce>, ReferenceError> {
        let points: Vec<Expr> = ends.iter().flat_map(|end| end.position().components()).collect();
        let on = ends
            .iter()
            .zip([1.0, -1.0])
            .filter_map(|(end, sign)| match end {
                End::Particle(particle) => {
                    let place = model.particles().iter().position(|known| known == particle)?;
                    Some((place, sign))
                }
                End::Point(_) => None,
            })
            .collect();
        Ok(vec![StatedForce::Between {
            ends: self.of_place(&points)?,
            on,
            law: Law {
                kind,
                values: self.of_state(values)?,
            },
        }])
    }
}

impl Stated {
    /// Takes what a model states, with values for its constants and functions.
    pub(super) fn of(
        model: &Model,
        constants: &BTreeMap<Symbol, f64>,
        stand_ins: &StandIns,
    ) -> Result<Self, ReferenceError> {
        let coordinates = model.coordinates();
        let velocities = coordinates.iter().map(|symbol| symbol.primed());
        let preparation = Preparation {
            constants,
            stand_ins,
            places: coordinates.iter().copied().chain([model.time()]).collect(),
            states: coordinates
                .iter()
                .copied()
                .chain(velocities)
                .chain([model.time()])
                .collect(),
        };
        let masses: Vec<Expr> = model.particles().iter().map(|particle| particle.mass()).collect();
        let mut forces = Vec::new();
        for force in model.forces() {
            forces.extend(preparation.force(model, force)?);
        }
        let mut reactions = Vec::new();
        for reaction in model.reactions() {
            let direction = |load: &Load| {
                let vector: Vector = load.vector;
                Ok::<_, ReferenceError>((load.particle, preparation.of_state(&vector.components())?))
            };
            reactions.push(
                reaction
                    .directions()
                    .iter()
                    .map(direction)
                    .collect::<Result<_, _>>()?,
            );
        }
        let of_forces = model.forces().iter().flat_map(|force| force.conditions());
        let of_reactions = model
            .reactions()
            .iter()
            .flat_map(|reaction| reaction.conditions());
        let condition_kinds: Vec<Condition> = of_forces.chain(of_reactions).copied().collect();
        let conditions: Vec<Expr> = condition_kinds
            .iter()
            .map(|condition| match condition {
                Condition::NotZero(e) | Condition::NotNegative(e) | Condition::Positive(e) => *e,
            })
            .collect();
        Ok(Self {
            particles: masses.len(),
            masses: preparation.of_state(&masses)?,
            positions: preparation.of_place(&model.position_components())?,
            forces,
            reactions,
            conditions: preparation.of_state(&conditions)?,
            condition_kinds,
        })
    }

    /// Whether everything that the model states as a condition holds at these values of
    /// coordinates, velocities and time.
    pub(super) fn admits(&self, numbers: &[f64]) -> bool {
        let values = self.conditions.at(numbers);
        self.condition_kinds
            .iter()
            .zip(values)
            .all(|(condition, value)| match condition {
                Condition::NotZero(_) => value.abs() > MARGIN * MARGIN,
                Condition::NotNegative(_) | Condition::Positive(_) => value > MARGIN,
            })
    }
}
