//! The model: quantities, particles with position maps, forces, ideal reactions and assumptions.
//!
//! A [`Model`] holds what was stated and nothing that was derived. Every statement is checked when
//! it is made: names, units and dimensions, undeclared symbols, expressions without a value. What
//! was stated stays in the order in which it was stated.
//!
//! Refused alternative: handles that are indexes into the model. A particle's handle is its own
//! content, so a handle from another sheet is noticed instead of naming something else.

mod along;
mod assumption;
mod body;
mod check;
mod declare;
mod declared;
mod error;
mod force;
mod forces;
mod held;
mod length;
mod reactions;
mod vector;

pub use assumption::{Assumption, Origin};
pub use body::{End, EndChoice, Particle, ParticleChoice};
pub use cas::Condition;
pub use declared::{Declared, Role};
pub use error::ModelError;
pub use force::{Force, ForceKind, Load, Reaction, ReactionKind};
pub use vector::{Vector, vector};

use std::collections::BTreeSet;

use cas::calculus::Rates;
use cas::text::Arrangement;
use cas::{Expr, Name, Symbol};

/// Everything that was stated on a sheet.
#[derive(Clone, Debug)]
pub struct Model {
    title: String,
    quantities: Vec<Declared>,
    particles: Vec<Particle>,
    forces: Vec<Force>,
    reactions: Vec<Reaction>,
    assumptions: Vec<Assumption>,
}

impl Model {
    /// The title.
    #[must_use]
    pub fn title(&self) -> &str {
        &self.title
    }

    /// Every declared quantity, time first, then in order of declaration.
    #[must_use]
    pub fn quantities(&self) -> &[Declared] {
        &self.quantities
    }

    /// The quantity of this name.
    #[must_use]
    pub fn quantity(&self, name: Name) -> Option<&Declared> {
        self.quantities.iter().find(|declared| declared.name == name)
    }

    /// The symbol of time.
    #[must_use]
    pub fn time(&self) -> Symbol {
        Symbol::from(self.quantities[0].name)
    }

    /// The coordinates in order of declaration.
    #[must_use]
    pub fn coordinates(&self) -> Vec<Symbol> {
        self.quantities
            .iter()
            .filter(|declared| declared.role == Role::Coordinate)
            .map(|declared| Symbol::from(declared.name))
            .collect()
    }

    /// The particles in order of declaration.
    #[must_use]
    pub fn particles(&self) -> &[Particle] {
        &self.particles
    }

    /// The applied forces in order of declaration.
    #[must_use]
    pub fn forces(&self) -> &[Force] {
        &self.forces
    }

    /// The reactions in order of declaration.
    #[must_use]
    pub fn reactions(&self) -> &[Reaction] {
        &self.reactions
    }

    /// The assumptions in order of their numbers.
    #[must_use]
    pub fn assumptions(&self) -> &[Assumption] {
        &self.assumptions
    }

    /// The position components of all particles one after another: x, y, z of the first, and so on.
    #[must_use]
    pub fn position_components(&self) -> Vec<Expr> {
        self.particles
            .iter()
            .flat_map(|particle| particle.position.components())
            .collect()
    }

    /// The rate of change of every symbol that changes with time: 1 for time itself, the velocity
    /// for a coordinate, the acceleration for a velocity.
    #[must_use]
    pub fn rates(&self) -> Rates {
        Rates::primed(&self.coordinates(), 2).with(self.time(), 1)
    }

    /// How the expressions of the sheet are written: names in order of declaration, dots for rates.
    #[must_use]
    pub fn arrangement(&self) -> Arrangement {
        Arrangement::of_names(self.quantities.iter().map(Declared::name))
            .with_coordinates(&self.coordinates())
            .with_dots(self.time())
    }

    /// Refuses a model from which nothing can be derived.
    ///
    /// # Errors
    /// No particles, no coordinates, more coordinates than components of position, a coordinate
    /// that no position depends on.
    pub fn require_complete(&self) -> Result<(), ModelError> {
        let coordinates = self.coordinates();
        if self.particles.is_empty() {
            return Err(ModelError::NoParticles);
        }
        if coordinates.is_empty() {
            return Err(ModelError::NoCoordinates);
        }
        let components = 3 * self.particles.len();
        if coordinates.len() > components {
            return Err(ModelError::TooManyCoordinates {
                coordinates: coordinates.len(),
                particles: self.particles.len(),
                components,
            });
        }
        let moved: BTreeSet<Symbol> = self
            .position_components()
            .into_iter()
            .flat_map(Expr::symbols)
            .collect();
        match coordinates.iter().find(|coordinate| !moved.contains(coordinate)) {
            Some(idle) => Err(ModelError::IdleCoordinate { name: idle.name() }),
            None => Ok(()),
        }
    }
}

#[cfg(test)]
mod tests;
