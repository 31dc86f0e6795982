//! Stating forces and reactions: the vectors that follow from what was said.

use cas::{Expr, IntoExpr, Name, Symbol, sqrt};

use super::Model;
use super::body::{End, Particle};
use super::check::Allowed;
use super::condition::Condition;
use super::declared::Role;
use super::error::ModelError;
use super::force::{Force, ForceKind, Load, Reaction, ReactionKind};
use super::vector::Vector;
use crate::quantity::Dimension;

const GRAVITY: &str = "gravity";

impl Model {
    /// Uniform gravity on every particle, declared before or after.
    ///
    /// # Errors
    /// Gravity stated twice, an acceleration of another dimension, a zero direction.
    pub fn gravity(&mut self, acceleration: impl IntoExpr, direction: Vector) -> Result<(), ModelError> {
        let (name, acceleration) = (self.free_name(GRAVITY)?, acceleration.into_expr());
        let place = "the acceleration of gravity";
        self.check(
            acceleration,
            place,
            Allowed::PRESCRIBED,
            Some(&Dimension::new(0, 1, -2)),
        )?;
        let place = "the direction of gravity";
        self.check_vector(direction, place, Allowed::PRESCRIBED, &Dimension::ONE)?;
        let (direction, _, conditions) = unit_along(name, direction)?;
        self.forces.push(Force {
            name,
            kind: ForceKind::Gravity {
                acceleration,
                direction,
            },
            loads: Vec::new(),
            conditions,
        });
        self.extend_gravity();
        Ok(())
    }

    /// Lets gravity act on the particles that it does not act on yet.
    pub(super) fn extend_gravity(&mut self) {
        for force in &mut self.forces {
            if let ForceKind::Gravity {
                acceleration,
                direction,
            } = force.kind
            {
                for (place, particle) in self.particles.iter().enumerate().skip(force.loads.len()) {
                    force.loads.push(Load {
                        particle: place,
                        vector: (particle.mass * acceleration) * direction,
                    });
                }
            }
        }
    }

    /// A force on a particle, stated by its components.
    ///
    /// # Errors
    /// A name that is taken, an unknown particle, a vector that is no force.
    pub fn force(&mut self, name: &str, particle: Particle, vector: Vector) -> Result<(), ModelError> {
        let name = self.free_name(name)?;
        let particle = self.place_of(particle)?;
        let place = format!("the force `{name}`");
        self.check_vector(vector, &place, Allowed::FORCE, &Dimension::new(1, 1, -2))?;
        self.forces.push(Force {
            name,
            kind: ForceKind::Applied,
            loads: vec![Load { particle, vector }],
            conditions: Vec::new(),
        });
        Ok(())
    }

    /// The push of a surface or rail on a particle along a direction.
    ///
    /// Returns the symbol of the magnitude.
    ///
    /// # Errors
    /// A name that is taken, an unknown particle, a direction that is zero or has a dimension.
    pub fn normal(&mut self, name: &str, particle: Particle, direction: Vector) -> Result<Expr, ModelError> {
        let name = self.free_name(name)?;
        let particle = self.place_of(particle)?;
        let place = format!("the direction of `{name}`");
        self.check_vector(direction, &place, Allowed::POSITION, &Dimension::ONE)?;
        let (direction, _, conditions) = unit_along(name, direction)?;
        let directions = vec![Load {
            particle,
            vector: direction,
        }];
        let meaning = format!("normal reaction `{name}` on {}", self.particles[particle].name);
        self.react(name, ReactionKind::Normal, &meaning, directions, conditions)
    }

    /// The pull of an inextensible massless link between two ends; tension is positive.
    ///
    /// Returns the symbol of the tension.
    ///
    /// # Errors
    /// A name that is taken, an unknown particle, ends at one place, no end that is a particle, a
    /// point that moves otherwise than prescribed.
    pub fn link(&mut self, name: &str, a: impl Into<End>, b: impl Into<End>) -> Result<Expr, ModelError> {
        let name = self.free_name(name)?;
        let (a, b) = (a.into(), b.into());
        let (from_a_to_b, _, conditions) = self.between(name, a, b)?;
        let directions = self.pair(a, b, from_a_to_b)?;
        let meaning = format!("tension of the link `{name}`");
        self.react(name, ReactionKind::Link, &meaning, directions, conditions)
    }

    /// A linear spring between two ends.
    ///
    /// The force on `a` is `stiffness (length - rest_length)` along the unit vector to `b`.
    ///
    /// # Errors
    /// As [`Model::link`]; a stiffness or rest length of another dimension or not constant.
    pub fn spring(
        &mut self,
        name: &str,
        a: impl Into<End>,
        b: impl Into<End>,
        stiffness: impl IntoExpr,
        rest_length: impl IntoExpr,
    ) -> Result<(), ModelError> {
        let name = self.free_name(name)?;
        let (a, b) = (a.into(), b.into());
        let (stiffness, rest_length) = (stiffness.into_expr(), rest_length.into_expr());
        let place = format!("the stiffness of `{name}`");
        self.check(
            stiffness,
            &place,
            Allowed::PRESCRIBED,
            Some(&Dimension::new(1, 0, -2)),
        )?;
        let place = format!("the rest length of `{name}`");
        self.check(rest_length, &place, Allowed::PRESCRIBED, Some(&Dimension::LENGTH))?;
        let (from_a_to_b, length, conditions) = self.between(name, a, b)?;
        let pull = stiffness * (length - rest_length);
        self.forces.push(Force {
            name,
            kind: ForceKind::Spring {
                ends: [a, b],
                stiffness,
                rest_length,
                length,
            },
            loads: self.pair(a, b, pull * from_a_to_b)?,
            conditions,
        });
        Ok(())
    }

    /// The unit vector from `a` to `b`, their distance, and what must hold for both.
    fn between(&self, name: Name, a: End, b: End) -> Result<(Vector, Expr, Vec<Condition>), ModelError> {
        let mut particles = 0;
        for end in [a, b] {
            match end {
                End::Particle(particle) => {
                    self.place_of(particle)?;
                    particles += 1;
                }
                End::Point(point) => {
                    let place = format!("the end point of `{name}`");
                    self.check_vector(point, &place, Allowed::PRESCRIBED, &Dimension::LENGTH)?;
                }
            }
        }
        if particles == 0 {
            return Err(ModelError::NoParticleAtEnds { name });
        }
        let difference = b.position() - a.position();
        if difference.is_zero() {
            return Err(ModelError::SameEnds { name });
        }
        unit_along(name, difference)
    }

    /// `vector` on the particle at `a` and its opposite on the particle at `b`.
    fn pair(&self, a: End, b: End, vector: Vector) -> Result<Vec<Load>, ModelError> {
        let mut loads = Vec::new();
        for (end, vector) in [(a, vector), (b, -vector)] {
            if let End::Particle(particle) = end {
                let particle = self.place_of(particle)?;
                loads.push(Load { particle, vector });
            }
        }
        loads.sort_by_key(|load| load.particle);
        Ok(loads)
    }

    fn react(
        &mut self,
        name: Name,
        kind: ReactionKind,
        meaning: &str,
        directions: Vec<Load>,
        conditions: Vec<Condition>,
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
            conditions,
        });
        Ok(value)
    }
}

/// The unit vector along a vector, the vector's length, and what must hold for both.
fn unit_along(name: Name, vector: Vector) -> Result<(Vector, Expr, Vec<Condition>), ModelError> {
    let squared = vector.dot(vector);
    if squared.is_zero() {
        return Err(ModelError::ZeroDirection { name });
    }
    if squared.is_one() {
        return Ok((vector, Expr::one(), Vec::new()));
    }
    let length = sqrt(squared);
    let conditions = if length.as_number().is_some() {
        Vec::new()
    } else {
        vec![Condition::NotZero(squared)]
    };
    Ok((vector / length, length, conditions))
}
