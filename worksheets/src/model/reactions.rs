//! Stating ideal reactions: an unknown magnitude along a declared direction.

use cas::{Expr, Name, Symbol};

use super::Model;
use super::along::Along;
use super::body::{EndChoice, ParticleChoice};
use super::check::Allowed;
use super::declared::Role;
use super::error::ModelError;
use super::force::{Load, Reaction, ReactionKind};
use super::vector::Vector;
use crate::quantity::Dimension;

impl Model {
    /// The push of a surface or rail on a particle along a direction.
    ///
    /// Returns the symbol of the magnitude, `N_` with the name.
    ///
    /// # Errors
    /// A name that is taken, an unknown particle, a direction that is zero or has a dimension.
    pub fn normal(
        &mut self,
        name: &str,
        particle: impl Into<ParticleChoice>,
        direction: Vector,
    ) -> Result<Expr, ModelError> {
        let name = self.free_name(name)?;
        let particle = self.place_of(&particle.into())?;
        let place = format!("the direction of `{name}`");
        self.check_vector(direction, &place, Allowed::POSITION, &Dimension::ONE)?;
        let meaning = format!("normal reaction {name} on {}", self.particles[particle].name);
        let along = self.along(name, direction)?;
        let directions = vec![Load {
            particle,
            vector: along.unit,
        }];
        self.react(name, ReactionKind::Normal, &meaning, along, directions)
    }

    /// The pull of an inextensible massless link between two ends; tension is positive.
    ///
    /// Returns the symbol of the tension, `S_` with the name.
    ///
    /// # Errors
    /// A name that is taken, an unknown particle, ends at one place, no end that is a particle, a
    /// point that moves otherwise than prescribed.
    pub fn link(
        &mut self,
        name: &str,
        a: impl Into<EndChoice>,
        b: impl Into<EndChoice>,
    ) -> Result<Expr, ModelError> {
        let name = self.free_name(name)?;
        let ends = self.ends(name, [a.into(), b.into()])?;
        let along = self.along(name, ends[1].position() - ends[0].position())?;
        let directions = self.opposite_loads(ends, along.unit);
        let meaning = format!("tension of the link {name}");
        self.react(name, ReactionKind::Link, &meaning, along, directions)
    }

    fn react(
        &mut self,
        name: Name,
        kind: ReactionKind,
        meaning: &str,
        along: Along,
        directions: Vec<Load>,
    ) -> Result<Expr, ModelError> {
        let letter = match kind {
            ReactionKind::Normal => 'N',
            ReactionKind::Link => 'S',
        };
        let symbol = self.free_name(&format!("{letter}_{name}"))?;
        let magnitude = Symbol::from(symbol);
        let value = self.declare(symbol, magnitude.into(), "N", meaning, Role::Reaction)?;
        self.reactions.push(Reaction {
            name,
            kind,
            magnitude,
            directions,
            conditions: along.conditions,
        });
        Ok(value)
    }
}
