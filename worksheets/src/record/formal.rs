//! Names in the symbols of the trade, such as the time derivative of dT/dq', as structure and never as TeX.
//!
//! A record that held TeX could carry anything into a page. A [`Formal`] is made of checked names
//! and a closed set of signs, so what is shown of it is always ours.

use cas::{Name, Symbol};
use serde::{Deserialize, Serialize};

use super::written;

/// An axis of the inertial frame.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Axis {
    /// The first.
    X,
    /// The second.
    Y,
    /// The third.
    Z,
}

impl Axis {
    /// The three axes in order.
    pub const ALL: [Self; 3] = [Self::X, Self::Y, Self::Z];

    /// Its letter.
    #[must_use]
    pub fn letter(self) -> &'static str {
        match self {
            Self::X => "x",
            Self::Y => "y",
            Self::Z => "z",
        }
    }
}

/// A name in the symbols of the trade.
///
/// Where a particle is `None`, the running particle `i` of a sum over all particles is meant; where an
/// axis is `None`, the whole vector.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(tag = "kind", rename_all = "snake_case", deny_unknown_fields)]
pub enum Formal {
    /// Zero.
    Zero,
    /// A whole number.
    Number {
        /// The number.
        value: i32,
    },
    /// A symbol of the sheet, with its primes.
    Symbol {
        /// The symbol.
        #[serde(with = "written::symbol")]
        symbol: Symbol,
    },
    /// The column of all coordinates, or of their rates.
    Coordinates {
        /// How often they are differentiated by time.
        primes: u8,
    },
    /// The position of a particle, or its rates.
    Position {
        /// The particle.
        #[serde(with = "written::optional_name")]
        particle: Option<Name>,
        /// The component.
        axis: Option<Axis>,
        /// How often it is differentiated by time.
        primes: u8,
    },
    /// The mass of a particle.
    Mass {
        /// The particle.
        #[serde(with = "written::optional_name")]
        particle: Option<Name>,
    },
    /// An applied force on a particle.
    Force {
        /// The force; `None` for the sum of all applied forces.
        #[serde(with = "written::optional_name")]
        force: Option<Name>,
        /// The particle.
        #[serde(with = "written::optional_name")]
        particle: Option<Name>,
        /// The component.
        axis: Option<Axis>,
    },
    /// A reaction on a particle.
    Reaction {
        /// The reaction; `None` for the sum of all reactions.
        #[serde(with = "written::optional_name")]
        reaction: Option<Name>,
        /// The particle.
        #[serde(with = "written::optional_name")]
        particle: Option<Name>,
        /// The component.
        axis: Option<Axis>,
    },
    /// The kinetic energy of a particle; `None` for that of all particles.
    KineticEnergy {
        /// The particle.
        #[serde(with = "written::optional_name")]
        particle: Option<Name>,
    },
    /// The potential of a force; `None` for that of all forces that have one.
    Potential {
        /// The force.
        #[serde(with = "written::optional_name")]
        force: Option<Name>,
    },
    /// The Lagrangian T - V.
    Lagrangian,
    /// The generalized force of a coordinate.
    GeneralizedForce {
        /// The coordinate.
        #[serde(with = "written::name")]
        coordinate: Name,
        /// The part of this force; `None` for the total of all applied forces.
        #[serde(with = "written::optional_name")]
        force: Option<Name>,
    },
    /// The virtual work of a reaction for a unit virtual displacement of a coordinate.
    VirtualWork {
        /// The reaction.
        #[serde(with = "written::name")]
        reaction: Name,
        /// The coordinate.
        #[serde(with = "written::name")]
        coordinate: Name,
    },
    /// The mass matrix.
    MassMatrix,
    /// An entry of the mass matrix.
    MassMatrixEntry {
        /// The coordinate of its row.
        #[serde(with = "written::name")]
        row: Name,
        /// The coordinate of its column.
        #[serde(with = "written::name")]
        column: Name,
    },
    /// What the equations hold besides mass matrix times accelerations.
    Bias {
        /// The coordinate of the entry; `None` for the whole column.
        #[serde(with = "written::optional_name")]
        coordinate: Option<Name>,
    },
    /// The Jacobian of the positions by the coordinates.
    Jacobian,
    /// The determinant of the transposed Jacobian times the Jacobian.
    GramDeterminant,
    /// The left side of the equation of motion of a coordinate, whose right side is zero.
    EquationOfMotion {
        /// The coordinate.
        #[serde(with = "written::name")]
        coordinate: Name,
    },
    /// A partial derivative.
    Partial {
        /// Of what.
        of: Box<Formal>,
        /// By which coordinate, rate of a coordinate, or time.
        #[serde(with = "written::symbol")]
        by: Symbol,
    },
    /// A derivative by time along the motion.
    Rate {
        /// Of what.
        of: Box<Formal>,
    },
    /// A sum over all particles `i`.
    OverParticles {
        /// The summand.
        of: Box<Formal>,
    },
    /// A sum.
    Sum {
        /// Its terms.
        terms: Vec<Formal>,
    },
    /// A difference.
    Difference {
        /// From what.
        left: Box<Formal>,
        /// What is taken away.
        right: Box<Formal>,
    },
    /// A product of numbers and matrices.
    Product {
        /// Its factors.
        factors: Vec<Formal>,
    },
    /// The scalar product of two vectors.
    Dot {
        /// One vector.
        left: Box<Formal>,
        /// The other.
        right: Box<Formal>,
    },
    /// The opposite.
    Negative {
        /// Of what.
        of: Box<Formal>,
    },
}

impl Formal {
    /// A component of the position of a particle.
    #[must_use]
    pub fn position(particle: Name, axis: Axis) -> Self {
        Self::component(particle, axis, 0)
    }

    /// A component of the velocity of a particle.
    #[must_use]
    pub fn velocity(particle: Name, axis: Axis) -> Self {
        Self::component(particle, axis, 1)
    }

    /// A component of the acceleration of a particle.
    #[must_use]
    pub fn acceleration(particle: Name, axis: Axis) -> Self {
        Self::component(particle, axis, 2)
    }

    fn component(particle: Name, axis: Axis, primes: u8) -> Self {
        Self::Position {
            particle: Some(particle),
            axis: Some(axis),
            primes,
        }
    }

    /// The position vector of the running particle, differentiated this often by time.
    #[must_use]
    pub fn running_position(primes: u8) -> Self {
        Self::Position {
            particle: None,
            axis: None,
            primes,
        }
    }

    /// The mass of a particle times a component of its acceleration.
    #[must_use]
    pub fn mass_times_acceleration(particle: Name, axis: Axis) -> Self {
        Self::product([
            Self::Mass {
                particle: Some(particle),
            },
            Self::acceleration(particle, axis),
        ])
    }

    /// A component of a named applied force on a particle.
    #[must_use]
    pub fn force(force: Name, particle: Name, axis: Axis) -> Self {
        Self::Force {
            force: Some(force),
            particle: Some(particle),
            axis: Some(axis),
        }
    }

    /// A component of a named reaction on a particle.
    #[must_use]
    pub fn reaction(reaction: Name, particle: Name, axis: Axis) -> Self {
        Self::Reaction {
            reaction: Some(reaction),
            particle: Some(particle),
            axis: Some(axis),
        }
    }

    /// The kinetic energy of all particles.
    #[must_use]
    pub fn kinetic_energy() -> Self {
        Self::KineticEnergy { particle: None }
    }

    /// The potential of all forces that have one.
    #[must_use]
    pub fn potential() -> Self {
        Self::Potential { force: None }
    }

    /// The generalized force of a coordinate, from all applied forces.
    #[must_use]
    pub fn generalized_force(coordinate: Name) -> Self {
        Self::GeneralizedForce {
            coordinate,
            force: None,
        }
    }

    /// A symbol of the sheet.
    #[must_use]
    pub fn symbol(symbol: Symbol) -> Self {
        Self::Symbol { symbol }
    }

    /// The partial derivative by a coordinate, a rate of one, or time.
    #[must_use]
    pub fn partial(self, by: Symbol) -> Self {
        let of = Box::new(self);
        Self::Partial { of, by }
    }

    /// The derivative by time along the motion.
    #[must_use]
    pub fn rate(self) -> Self {
        Self::Rate { of: Box::new(self) }
    }

    /// The sum of this over all particles.
    #[must_use]
    pub fn over_particles(self) -> Self {
        Self::OverParticles { of: Box::new(self) }
    }

    /// This less something else.
    #[must_use]
    pub fn minus(self, right: Self) -> Self {
        Self::Difference {
            left: Box::new(self),
            right: Box::new(right),
        }
    }

    /// The scalar product with another vector.
    #[must_use]
    pub fn dot(self, right: Self) -> Self {
        Self::Dot {
            left: Box::new(self),
            right: Box::new(right),
        }
    }

    /// The opposite.
    #[must_use]
    pub fn negative(self) -> Self {
        Self::Negative { of: Box::new(self) }
    }

    /// A sum.
    #[must_use]
    pub fn sum(terms: impl IntoIterator<Item = Self>) -> Self {
        Self::Sum {
            terms: terms.into_iter().collect(),
        }
    }

    /// A product.
    #[must_use]
    pub fn product(factors: impl IntoIterator<Item = Self>) -> Self {
        Self::Product {
            factors: factors.into_iter().collect(),
        }
    }

    /// The left side of Lagrange's equation of a coordinate: `d/dt(dF/dq') - dF/dq` with this as `F`.
    #[must_use]
    pub fn lagrange_expression(self, coordinate: Symbol) -> Self {
        let momentum = self.clone().partial(coordinate.primed());
        momentum.rate().minus(self.partial(coordinate))
    }
}
