//! Particles and the points that forces act between.

use cas::{Expr, Name};

use super::vector::Vector;

/// A particle: its name, mass and position map r(q, t).
///
/// It is both the entry in the sheet and the handle that a cell keeps; being plain content it
/// cannot point at something else than it names.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Particle {
    pub(super) name: Name,
    pub(super) mass: Expr,
    pub(super) position: Vector,
}

impl Particle {
    /// The name.
    #[must_use]
    pub fn name(self) -> Name {
        self.name
    }

    /// The mass.
    #[must_use]
    pub fn mass(self) -> Expr {
        self.mass
    }

    /// The position map, a function of the coordinates and of time.
    #[must_use]
    pub fn position(self) -> Vector {
        self.position
    }
}

/// An end of a spring, damper or link.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum End {
    /// A particle.
    Particle(Particle),
    /// A point fixed in the inertial frame or moved in a prescribed way.
    Point(Vector),
}

impl End {
    /// Where the end is.
    #[must_use]
    pub fn position(self) -> Vector {
        match self {
            Self::Particle(particle) => particle.position,
            Self::Point(position) => position,
        }
    }
}

/// A particle as a statement chooses it: by its handle or by its name.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum ParticleChoice {
    /// The value that the declaration returned.
    Handle(Particle),
    /// The name.
    Named(String),
}

impl From<Particle> for ParticleChoice {
    fn from(particle: Particle) -> Self {
        Self::Handle(particle)
    }
}

impl From<&str> for ParticleChoice {
    fn from(name: &str) -> Self {
        Self::Named(name.to_owned())
    }
}

/// An end as a statement chooses it: a particle or a point.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum EndChoice {
    /// A particle.
    Particle(ParticleChoice),
    /// A point fixed in the inertial frame or moved in a prescribed way.
    Point(Vector),
}

impl From<Particle> for EndChoice {
    fn from(particle: Particle) -> Self {
        Self::Particle(particle.into())
    }
}

impl From<&str> for EndChoice {
    fn from(name: &str) -> Self {
        Self::Particle(name.into())
    }
}

impl From<Vector> for EndChoice {
    fn from(position: Vector) -> Self {
        Self::Point(position)
    }
}
