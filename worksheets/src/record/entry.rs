//! What was stated on a sheet, as a record keeps it.

use cas::{Expr, Name, Symbol};
use serde::{Deserialize, Serialize};

use super::written;
use crate::model::{Assumption, Condition, Declared, Force, Load, Model, Origin, Particle, Reaction, Role};

/// A quantity.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct QuantityEntry {
    /// Its name.
    #[serde(with = "written::name")]
    pub name: Name,
    /// What stands for it in formulas: its symbol, or the function at its arguments.
    #[serde(with = "written::expr")]
    pub value: Expr,
    /// Its unit as a UCUM code.
    pub unit: String,
    /// Its meaning.
    pub meaning: String,
    /// Its part in the model.
    pub role: RoleEntry,
}

/// The part of a quantity in the model; see [`Role`].
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
#[expect(
    missing_docs,
    reason = "the names are those of `Role`, which says what they mean"
)]
pub enum RoleEntry {
    Time,
    Constant,
    PositiveConstant,
    Coordinate,
    Input,
    Function,
    Reaction,
}

/// A particle.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct ParticleEntry {
    /// Its name.
    #[serde(with = "written::name")]
    pub name: Name,
    /// Its mass.
    #[serde(with = "written::expr")]
    pub mass: Expr,
    /// Its position as a function of coordinates and time.
    #[serde(with = "written::components")]
    pub position: [Expr; 3],
}

/// A vector on a particle.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct LoadEntry {
    /// The particle.
    #[serde(with = "written::name")]
    pub particle: Name,
    /// The vector.
    #[serde(with = "written::components")]
    pub vector: [Expr; 3],
}

/// An applied force.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct ForceEntry {
    /// Its name.
    #[serde(with = "written::name")]
    pub name: Name,
    /// Its kind in words.
    pub kind: String,
    /// What it exerts on each particle.
    pub loads: Vec<LoadEntry>,
    /// What must hold for it to be as stated.
    #[serde(with = "written::conditions")]
    pub conditions: Vec<Condition>,
}

/// An ideal reaction.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct ReactionEntry {
    /// Its name.
    #[serde(with = "written::name")]
    pub name: Name,
    /// Its kind in words.
    pub kind: String,
    /// The symbol of its magnitude.
    #[serde(with = "written::symbol")]
    pub magnitude: Symbol,
    /// Its direction on each particle, by which the magnitude is multiplied.
    pub directions: Vec<LoadEntry>,
    /// What must hold for the directions to exist.
    #[serde(with = "written::conditions")]
    pub conditions: Vec<Condition>,
}

/// An assumption.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct AssumptionEntry {
    /// Its number in the register.
    pub number: usize,
    /// The assumption in words.
    pub text: String,
    /// The names of what it affects.
    pub affects: Vec<String>,
    /// Whether it follows from how the model is set up, instead of being stated.
    pub implied: bool,
}

impl From<Role> for RoleEntry {
    fn from(role: Role) -> Self {
        match role {
            Role::Time => Self::Time,
            Role::Constant => Self::Constant,
            Role::PositiveConstant => Self::PositiveConstant,
            Role::Coordinate => Self::Coordinate,
            Role::Input => Self::Input,
            Role::Function => Self::Function,
            Role::Reaction => Self::Reaction,
        }
    }
}

impl From<&Declared> for QuantityEntry {
    fn from(declared: &Declared) -> Self {
        Self {
            name: declared.name(),
            value: declared.value(),
            unit: declared.unit().code().to_owned(),
            meaning: declared.meaning().to_owned(),
            role: declared.role().into(),
        }
    }
}

impl From<&Particle> for ParticleEntry {
    fn from(particle: &Particle) -> Self {
        Self {
            name: particle.name(),
            mass: particle.mass(),
            position: particle.position().components(),
        }
    }
}

impl From<&Assumption> for AssumptionEntry {
    fn from(assumption: &Assumption) -> Self {
        Self {
            number: assumption.number(),
            text: assumption.text().to_owned(),
            affects: assumption.affects().to_vec(),
            implied: assumption.origin() == Origin::Implied,
        }
    }
}

impl ForceEntry {
    pub(super) fn of(model: &Model, force: &Force) -> Self {
        Self {
            name: force.name(),
            kind: force.kind().words().to_owned(),
            loads: loads(model, force.loads()),
            conditions: force.conditions().to_vec(),
        }
    }
}

impl ReactionEntry {
    pub(super) fn of(model: &Model, reaction: &Reaction) -> Self {
        Self {
            name: reaction.name(),
            kind: reaction.kind().words().to_owned(),
            magnitude: reaction.magnitude(),
            directions: loads(model, reaction.directions()),
            conditions: reaction.conditions().to_vec(),
        }
    }
}

fn loads(model: &Model, loads: &[Load]) -> Vec<LoadEntry> {
    loads
        .iter()
        .map(|load| LoadEntry {
            particle: model.particles()[load.particle].name(),
            vector: load.vector.components(),
        })
        .collect()
}
