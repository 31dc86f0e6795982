//! Stating applied forces: components, gravity, springs and dampers.

use cas::IntoExpr;

use super::Model;
use super::body::{EndChoice, ParticleChoice};
use super::check::Allowed;
use super::error::ModelError;
use super::force::{Force, ForceKind, Load};
use super::length::squared_length;
use super::vector::Vector;
use crate::quantity::Dimension;
use cas::Condition;

/// The name under which gravity is listed.
const GRAVITY: &str = "gravity";

impl Model {
    /// A force on a particle, stated by its components.
    ///
    /// # Errors
    /// A name that is taken, an unknown particle, a vector that is no force.
    pub fn force(
        &mut self,
        name: &str,
        particle: impl Into<ParticleChoice>,
        vector: Vector,
    ) -> Result<(), ModelError> {
        let name = self.free_name(name)?;
        let particle = self.place_of(&particle.into())?;
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

    /// Uniform gravity on every particle, declared before or after.
    ///
    /// # Errors
    /// Gravity stated twice, an acceleration of another dimension, a zero direction.
    pub fn gravity(&mut self, acceleration: impl IntoExpr, direction: Vector) -> Result<(), ModelError> {
        let (name, acceleration) = (self.free_name(GRAVITY)?, acceleration.into_expr());
        let place = "the acceleration of gravity";
        let expected = Dimension::new(0, 1, -2);
        self.check(acceleration, place, Allowed::PRESCRIBED, Some(&expected))?;
        let place = "the direction of gravity";
        self.check_vector(direction, place, Allowed::PRESCRIBED, &Dimension::ONE)?;
        let along = self.along(name, direction)?;
        self.forces.push(Force {
            name,
            kind: ForceKind::Gravity {
                acceleration,
                direction: along.unit,
            },
            loads: Vec::new(),
            conditions: along.conditions,
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

    /// A linear spring between two ends.
    ///
    /// The force on `a` is `stiffness (length - rest_length)` along the unit vector to `b`.
    ///
    /// # Errors
    /// A name that is taken, an unknown particle, ends at one place, no end that is a particle, a
    /// point that moves otherwise than prescribed, a stiffness or rest length of another dimension.
    pub fn spring(
        &mut self,
        name: &str,
        a: impl Into<EndChoice>,
        b: impl Into<EndChoice>,
        stiffness: impl IntoExpr,
        rest_length: impl IntoExpr,
    ) -> Result<(), ModelError> {
        let name = self.free_name(name)?;
        let ends = self.ends(name, [a.into(), b.into()])?;
        let (stiffness, rest_length) = (stiffness.into_expr(), rest_length.into_expr());
        let place = format!("the stiffness of `{name}`");
        let expected = Dimension::new(1, 0, -2);
        self.check(stiffness, &place, Allowed::PRESCRIBED, Some(&expected))?;
        let place = format!("the rest length of `{name}`");
        self.check(rest_length, &place, Allowed::PRESCRIBED, Some(&Dimension::LENGTH))?;
        let difference = ends[1].position() - ends[0].position();
        let along = self.along(name, difference)?;
        let (length, tension) = (along.length, stiffness * (along.length - rest_length));
        let (vector, conditions) = if rest_length.is_zero() {
            // The length cancels, so the force has a value at length zero too.
            (stiffness * difference, Vec::new())
        } else {
            (tension * along.unit, along.conditions)
        };
        self.forces.push(Force {
            name,
            kind: ForceKind::Spring {
                ends,
                stiffness,
                rest_length,
                length,
            },
            loads: self.opposite_loads(ends, vector),
            conditions,
        });
        Ok(())
    }

    /// A linear damper between two ends.
    ///
    /// With `d` from `a` to `b` the force on `a` is `coefficient (d.d')/(d.d) d`: the coefficient
    /// times the rate of the length, along the damper. No root occurs; where the length is a
    /// monomial, the same is written as its rate along the unit vector.
    ///
    /// # Errors
    /// As [`Model::spring`].
    pub fn damper(
        &mut self,
        name: &str,
        a: impl Into<EndChoice>,
        b: impl Into<EndChoice>,
        coefficient: impl IntoExpr,
    ) -> Result<(), ModelError> {
        let name = self.free_name(name)?;
        let ends = self.ends(name, [a.into(), b.into()])?;
        let coefficient = coefficient.into_expr();
        let place = format!("the coefficient of `{name}`");
        let expected = Dimension::new(1, 0, -1);
        self.check(coefficient, &place, Allowed::PRESCRIBED, Some(&expected))?;
        let difference = ends[1].position() - ends[0].position();
        let along = self.along(name, difference)?;
        let (vector, conditions) = if along.monomial {
            // The sign of the length cancels, so it need only not be zero.
            let conditions = along.conditions.into_iter().map(Condition::without_sign);
            let tension = coefficient * self.rate(along.length)?;
            (tension * along.unit, conditions.collect())
        } else {
            let [x, y, z] = difference.components().map(|component| self.rate(component));
            let stretching = difference.dot(Vector::new([x?, y?, z?]));
            let tension_over_length = coefficient * stretching / squared_length(difference);
            (tension_over_length * difference, along.conditions)
        };
        self.forces.push(Force {
            name,
            kind: ForceKind::Damper { ends, coefficient },
            loads: self.opposite_loads(ends, vector),
            conditions,
        });
        Ok(())
    }
}
