//! What every expression must satisfy before it enters the model.

use std::collections::BTreeSet;

use cas::{Expr, Kind, Name, Symbol, postorder};

use super::Model;
use super::body::ParticleChoice;
use super::declared::Role;
use super::error::ModelError;
use super::vector::Vector;
use crate::quantity::{Dimension, Measured, dimension_of, nearest_of};

/// What an expression may depend on at its place.
#[derive(Clone, Copy)]
pub(super) struct Allowed {
    time: bool,
    coordinates: bool,
    velocities: bool,
}

impl Allowed {
    /// Constants alone.
    pub(super) const CONSTANT: Self = Self {
        time: false,
        coordinates: false,
        velocities: false,
    };
    /// Constants, time and prescribed inputs.
    pub(super) const PRESCRIBED: Self = Self {
        time: true,
        ..Self::CONSTANT
    };
    /// What a position map may depend on: coordinates and time.
    pub(super) const POSITION: Self = Self {
        coordinates: true,
        ..Self::PRESCRIBED
    };
    /// What a force may depend on: velocities too.
    pub(super) const FORCE: Self = Self {
        velocities: true,
        ..Self::POSITION
    };

    /// What to use instead of a coordinate or velocity that is not allowed.
    fn remedy(self) -> &'static str {
        match self {
            Self {
                coordinates: true, ..
            } => "use coordinates, inputs, constants and time alone",
            Self { time: true, .. } => {
                "use inputs, constants and time alone; a point that moves with a coordinate is a particle, and a \
                 force that depends on the motion is stated with sheet.force(name, particle, vector(x, y, z))"
            }
            Self { .. } => "use constants alone",
        }
    }
}

impl Measured for Model {
    fn of_symbol(&self, symbol: Symbol) -> Option<Dimension> {
        let declared = self.quantity(symbol.name())?;
        let primes = cas::Rational::from(i64::from(symbol.primes()));
        Some(declared.unit.dimension().over(&Dimension::TIME.power(&primes)))
    }

    fn of_function(&self, name: Name) -> Option<Dimension> {
        Some(self.quantity(name)?.unit.dimension().clone())
    }
}

impl Model {
    /// The dimension of any expression in the declared symbols; `None` where it is zero.
    ///
    /// # Errors
    /// Unlike terms, a function of something that is no number, an undeclared symbol.
    pub fn dimension(&self, expr: Expr) -> Result<Option<Dimension>, ModelError> {
        let place = "the expression";
        self.check(expr, place, Allowed::FORCE, None)?;
        dimension_of(expr, self).map_err(|source| ModelError::Dimension {
            place: place.to_owned(),
            source,
        })
    }

    /// Refuses an expression that its place cannot hold.
    pub(super) fn check(
        &self,
        expr: Expr,
        place: &str,
        allowed: Allowed,
        expected: Option<&Dimension>,
    ) -> Result<(), ModelError> {
        for part in postorder(&[expr]) {
            if part.is_undefined() {
                let place = place.to_owned();
                return Err(ModelError::Undefined { place, part });
            }
            match part.kind() {
                Kind::Symbol(symbol) => self.check_symbol(*symbol, place, allowed)?,
                Kind::Unknown(application) => self.check_application(part, application, place, allowed)?,
                _ => {}
            }
        }
        let found = dimension_of(expr, self).map_err(|source| ModelError::Dimension {
            place: place.to_owned(),
            source,
        })?;
        match (found, expected) {
            (Some(found), Some(expected)) if found != *expected => Err(ModelError::WrongDimension {
                place: place.to_owned(),
                expr,
                found: Box::new(found),
                expected: Box::new(expected.clone()),
            }),
            _ => Ok(()),
        }
    }

    pub(super) fn check_vector(
        &self,
        vector: Vector,
        place: &str,
        allowed: Allowed,
        expected: &Dimension,
    ) -> Result<(), ModelError> {
        let components = vector.components().into_iter().zip(["x", "y", "z"]);
        components.into_iter().try_for_each(|(component, axis)| {
            self.check(
                component,
                &format!("component {axis} of {place}"),
                allowed,
                Some(expected),
            )
        })
    }

    fn check_symbol(&self, symbol: Symbol, place: &str, allowed: Allowed) -> Result<(), ModelError> {
        let part = Expr::from(symbol);
        let refused = |what, remedy| {
            Err(ModelError::NotAllowed {
                place: place.to_owned(),
                what,
                part,
                remedy,
            })
        };
        let Some(declared) = self.quantity(symbol.name()) else {
            return Err(self.undeclared(&symbol.to_string(), symbol.name(), place));
        };
        match (declared.role, symbol.primes()) {
            (Role::Input | Role::Function, _) => Err(ModelError::OtherArguments {
                place: place.to_owned(),
                given: part,
                declared: declared.value,
            }),
            (Role::Reaction, _) => refused(
                "the reaction",
                "a reaction is an unknown; state the force by coordinates, velocities and time",
            ),
            (Role::Time, 0) if !allowed.time => refused("time", "use constants alone"),
            (Role::Coordinate, 0) if !allowed.coordinates => refused("the coordinate", allowed.remedy()),
            (Role::Coordinate, 1) if !allowed.velocities => refused("the velocity", allowed.remedy()),
            (Role::Coordinate, primes) if primes > 1 => refused(
                "the acceleration",
                "state the force by coordinates, velocities and time; inertia comes from the masses",
            ),
            (Role::Time | Role::Constant | Role::PositiveConstant, 1..) => {
                refused("a rate", "constants and time have no rate of their own")
            }
            _ => Ok(()),
        }
    }

    fn check_application(
        &self,
        part: Expr,
        application: &cas::Application,
        place: &str,
        allowed: Allowed,
    ) -> Result<(), ModelError> {
        let name = application.name();
        let Some(declared) = self.quantity(name) else {
            return Err(self.undeclared(name.as_str(), name, place));
        };
        match declared.value.kind() {
            Kind::Unknown(known) if known.arguments() == application.arguments() => {}
            _ => {
                return Err(ModelError::OtherArguments {
                    place: place.to_owned(),
                    given: part,
                    declared: declared.value,
                });
            }
        }
        if !allowed.time {
            return Err(ModelError::NotAllowed {
                place: place.to_owned(),
                what: "the function",
                part,
                remedy: "use constants alone",
            });
        }
        Ok(())
    }

    fn undeclared(&self, symbol: &str, name: Name, place: &str) -> ModelError {
        let known = self.quantities.iter().map(|d| d.name.as_str().to_owned());
        ModelError::Undeclared {
            symbol: symbol.to_owned(),
            place: place.to_owned(),
            nearest: nearest_of(name.as_str(), known),
            declared: self.quantities.iter().map(|d| d.name).collect(),
        }
    }

    /// The place of a chosen particle, which must be as this sheet has it.
    pub(super) fn place_of(&self, choice: &ParticleChoice) -> Result<usize, ModelError> {
        let name = match choice {
            ParticleChoice::Handle(particle) => particle.name.as_str(),
            ParticleChoice::Named(name) => name,
        };
        let known = self.particles.iter().map(|known| known.name.as_str());
        let place = known.clone().position(|known| known == name);
        match (place, choice) {
            (Some(place), ParticleChoice::Handle(particle)) if self.particles[place] != *particle => {
                Err(ModelError::ForeignParticle { name: particle.name })
            }
            (Some(place), _) => Ok(place),
            (None, _) => Err(ModelError::UnknownParticle {
                name: name.to_owned(),
                nearest: nearest_of(name, known.map(str::to_owned)),
            }),
        }
    }

    pub(super) fn nearest_name(&self, name: &str) -> Option<String> {
        let known: BTreeSet<&str> = (self.quantities.iter().map(|d| d.name))
            .chain(self.particles.iter().map(|p| p.name))
            .chain(self.forces.iter().map(|f| f.name))
            .chain(self.reactions.iter().map(|r| r.name))
            .map(Name::as_str)
            .collect();
        nearest_of(name, known.into_iter().map(str::to_owned))
    }
}
