//! Unit vectors and distances between the ends of springs, dampers and links.

use cas::{Expr, Name, sqrt};

use super::Model;
use super::body::{End, EndChoice};
use super::check::Allowed;
use super::declared::Role;
use super::error::ModelError;
use super::force::Load;
use super::length::{Powers, divided, even_powers, squared_length};
use super::vector::Vector;
use crate::quantity::Dimension;
use cas::Condition;

/// A unit vector, the length of the vector that it was made from, and what must hold for both.
pub(super) struct Along {
    pub(super) unit: Vector,
    pub(super) length: Expr,
    /// Whether the length is a product of powers and no root.
    pub(super) monomial: bool,
    pub(super) conditions: Vec<Condition>,
}

impl Model {
    /// The unit vector along `vector`.
    ///
    /// Where the square of the length is the square of a monomial, as `r^2` or `4 l^2 s^2`, the
    /// length is that monomial under the condition that it is above zero; otherwise it is a root.
    pub(super) fn along(&self, name: Name, vector: Vector) -> Result<Along, ModelError> {
        let squared = squared_length(vector);
        if squared.is_zero() {
            return Err(ModelError::ZeroDirection { name });
        }
        let Some(factors) = even_powers(squared) else {
            let conditions = match squared.as_number() {
                Some(_) => Vec::new(),
                None => vec![Condition::NotZero(squared)],
            };
            let length = sqrt(squared);
            return Ok(Along {
                unit: vector / length,
                length,
                monomial: false,
                conditions,
            });
        };
        Ok(Along {
            unit: vector.map(|component| divided(component, &factors)),
            length: factors.product(),
            monomial: true,
            conditions: self.above_zero(&factors),
        })
    }

    /// The conditions under which a product of powers is above zero.
    fn above_zero(&self, factors: &Powers) -> Vec<Condition> {
        let (mut signed, mut conditions) = (Expr::one(), Vec::new());
        for (base, exponent) in &factors.powers {
            if self.is_positive_constant(*base) {
                continue;
            }
            if exponent % 2 == 0 {
                conditions.push(Condition::NotZero(*base));
            } else {
                signed *= *base;
            }
        }
        if !signed.is_one() {
            conditions.insert(0, Condition::Positive(signed));
        }
        conditions
    }

    fn is_positive_constant(&self, expr: Expr) -> bool {
        expr.as_symbol()
            .filter(|symbol| symbol.primes() == 0)
            .and_then(|symbol| self.quantity(symbol.name()))
            .is_some_and(|declared| declared.role == Role::PositiveConstant)
    }

    /// The two ends that the statement of `name` chose.
    pub(super) fn ends(&self, name: Name, chosen: [EndChoice; 2]) -> Result<[End; 2], ModelError> {
        let [a, b] = chosen;
        let ends = [self.end(name, a)?, self.end(name, b)?];
        if ends.iter().all(|end| matches!(end, End::Point(_))) {
            return Err(ModelError::NoParticleAtEnds { name });
        }
        if ends[0].position() == ends[1].position() {
            return Err(ModelError::SameEnds { name });
        }
        Ok(ends)
    }

    fn end(&self, name: Name, choice: EndChoice) -> Result<End, ModelError> {
        match choice {
            EndChoice::Particle(particle) => Ok(End::Particle(self.particles[self.place_of(&particle)?])),
            EndChoice::Point(point) => {
                // A point that moved with the coordinates would pass its force on to nothing.
                let place = format!("the end point of `{name}`");
                self.check_vector(point, &place, Allowed::PRESCRIBED, &Dimension::LENGTH)?;
                Ok(End::Point(point))
            }
        }
    }

    /// `vector` on the particle at the first end and its opposite on that at the second.
    pub(super) fn opposite_loads(&self, ends: [End; 2], vector: Vector) -> Vec<Load> {
        let mut loads = Vec::new();
        for (end, vector) in ends.into_iter().zip([vector, -vector]) {
            let place = self
                .particles
                .iter()
                .position(|known| matches!(end, End::Particle(particle) if *known == particle));
            loads.extend(place.map(|particle| Load { particle, vector }));
        }
        loads.sort_by_key(|load| load.particle);
        loads
    }
}
