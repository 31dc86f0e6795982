//! Applied forces and ideal reactions, each as the vector it exerts on each particle.

use cas::{Expr, Name, Symbol};

use super::body::End;
use super::vector::Vector;
use cas::Condition;

/// A vector acting on one particle.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Load {
    /// The particle's place among the particles of the model.
    pub particle: usize,
    /// The force on it.
    pub vector: Vector,
}

/// What kind of applied force it is, with the quantities that define it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub enum ForceKind {
    /// A force stated by its components.
    Applied,
    /// Uniform gravity: mass times `acceleration` along the unit vector `direction`.
    Gravity {
        /// The acceleration of free fall.
        acceleration: Expr,
        /// The unit vector along which it acts.
        direction: Vector,
    },
    /// A linear spring: `stiffness (length - rest_length)`, pulling its ends together.
    Spring {
        /// What it joins.
        ends: [End; 2],
        /// The stiffness.
        stiffness: Expr,
        /// The length without load.
        rest_length: Expr,
        /// The distance of the ends.
        length: Expr,
    },
    /// A linear damper: `coefficient` times the rate of its length, resisting it.
    Damper {
        /// What it joins.
        ends: [End; 2],
        /// The damping coefficient.
        coefficient: Expr,
    },
}

impl ForceKind {
    /// The kind in words.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::Applied => "applied force",
            Self::Gravity { .. } => "gravity",
            Self::Spring { .. } => "spring",
            Self::Damper { .. } => "damper",
        }
    }
}

/// An applied force.
#[derive(Clone, Debug, PartialEq)]
pub struct Force {
    pub(super) name: Name,
    pub(super) kind: ForceKind,
    pub(super) loads: Vec<Load>,
    pub(super) conditions: Vec<Condition>,
}

impl Force {
    /// The name.
    #[must_use]
    pub fn name(&self) -> Name {
        self.name
    }

    /// The kind.
    #[must_use]
    pub fn kind(&self) -> ForceKind {
        self.kind
    }

    /// The vectors that it exerts, in order of particles.
    #[must_use]
    pub fn loads(&self) -> &[Load] {
        &self.loads
    }

    /// The vector on the particle of this place.
    #[must_use]
    pub fn on(&self, particle: usize) -> Vector {
        total(&self.loads, particle)
    }

    /// What must hold for the force to be as stated, such as a length above zero.
    #[must_use]
    pub fn conditions(&self) -> &[Condition] {
        &self.conditions
    }
}

/// What kind of reaction it is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub enum ReactionKind {
    /// The push of a surface or rail along its normal.
    Normal,
    /// The pull of an inextensible massless link along itself; tension is positive.
    Link,
}

impl ReactionKind {
    /// The kind in words.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::Normal => "normal reaction",
            Self::Link => "link",
        }
    }
}

/// A reaction: an unknown magnitude times a declared direction on each particle.
#[derive(Clone, Debug, PartialEq)]
pub struct Reaction {
    pub(super) name: Name,
    pub(super) kind: ReactionKind,
    pub(super) magnitude: Symbol,
    pub(super) directions: Vec<Load>,
    pub(super) conditions: Vec<Condition>,
}

impl Reaction {
    /// The name.
    #[must_use]
    pub fn name(&self) -> Name {
        self.name
    }

    /// The kind.
    #[must_use]
    pub fn kind(&self) -> ReactionKind {
        self.kind
    }

    /// The symbol of its magnitude.
    #[must_use]
    pub fn magnitude(&self) -> Symbol {
        self.magnitude
    }

    /// The directions on the particles: what the magnitude is multiplied by.
    #[must_use]
    pub fn directions(&self) -> &[Load] {
        &self.directions
    }

    /// The direction on the particle of this place, zero where the reaction does not act on it.
    #[must_use]
    pub fn direction_on(&self, particle: usize) -> Vector {
        total(&self.directions, particle)
    }

    /// The vector on the particle of this place: magnitude times direction.
    #[must_use]
    pub fn on(&self, particle: usize) -> Vector {
        Expr::from(self.magnitude) * self.direction_on(particle)
    }

    /// What must hold for the directions to exist.
    #[must_use]
    pub fn conditions(&self) -> &[Condition] {
        &self.conditions
    }
}

fn total(loads: &[Load], particle: usize) -> Vector {
    loads
        .iter()
        .filter(|load| load.particle == particle)
        .fold(Vector::zero(), |sum, load| sum + load.vector)
}
