//! Positions, velocities and accelerations of all particles, and the Jacobian: what every stage begins with.

use cas::calculus::{Rates, derivative, total_derivative};
use cas::{Expr, Name, Symbol};

use super::DeriveError;
use crate::model::Model;
use crate::record::Axis;

/// One component of the position of one particle, with all that follows from it by differentiation.
pub(super) struct Component {
    pub(super) particle: Name,
    /// The place of the particle in the model.
    pub(super) place: usize,
    pub(super) axis: Axis,
    pub(super) mass: Expr,
    pub(super) position: Expr,
    pub(super) velocity: Expr,
    pub(super) acceleration: Expr,
    /// The derivatives of the position by the coordinates: a row of the Jacobian.
    pub(super) row: Vec<Expr>,
}

impl Component {
    /// The start of the keys of steps about this component.
    pub(super) fn key(&self) -> String {
        format!("{}.{}", self.particle, self.axis.letter())
    }
}

/// The kinematics of a model.
pub(super) struct Kinematics {
    pub(super) coordinates: Vec<Symbol>,
    pub(super) time: Symbol,
    pub(super) rates: Rates,
    /// Three for each particle, in order of particles.
    pub(super) components: Vec<Component>,
}

impl Kinematics {
    /// The kinematics of a complete model.
    pub(super) fn of(model: &Model) -> Result<Self, DeriveError> {
        model.require_complete()?;
        let (coordinates, rates) = (model.coordinates(), model.rates());
        let mut components = Vec::new();
        for (place, particle) in model.particles().iter().enumerate() {
            for (axis, position) in Axis::ALL.into_iter().zip(particle.position().components()) {
                let velocity = total_derivative(position, &rates)?;
                let row = coordinates
                    .iter()
                    .map(|coordinate| derivative(position, *coordinate));
                components.push(Component {
                    particle: particle.name(),
                    place,
                    axis,
                    mass: particle.mass(),
                    position,
                    velocity,
                    acceleration: total_derivative(velocity, &rates)?,
                    row: row.collect::<Result<_, _>>()?,
                });
            }
        }
        Ok(Self {
            coordinates,
            time: model.time(),
            rates,
            components,
        })
    }

    /// The symbols by which results are collected: accelerations and velocities of the coordinates.
    pub(super) fn leads(&self) -> Vec<Symbol> {
        let twice = |primes| {
            self.coordinates
                .iter()
                .map(move |symbol| symbol.with_primes(primes))
        };
        twice(2).chain(twice(1)).collect()
    }

    /// The kinetic energy of all particles.
    pub(super) fn kinetic_energy(&self) -> Expr {
        let squares = self.components.iter();
        Expr::sum_of(squares.map(|component| component.mass * component.velocity.squared() / 2))
    }

    /// The sum over all components of a product with the column of one coordinate.
    pub(super) fn projected(&self, coordinate: usize, factor: impl Fn(&Component) -> Expr) -> Expr {
        // Zero times an inverse would stay as it is; where the position has a value is said elsewhere.
        let products = self.components.iter().filter_map(|component| {
            let (factor, slope) = (factor(component), component.row[coordinate]);
            (!factor.is_zero() && !slope.is_zero()).then(|| factor * slope)
        });
        Expr::sum_of(products)
    }

    /// `d/dt(dF/dq') - dF/dq` of a function of coordinates, velocities and time.
    pub(super) fn lagrange_expression(&self, of: Expr, coordinate: Symbol) -> Result<Expr, DeriveError> {
        let momentum = derivative(of, Expr::from(coordinate.primed()))?;
        Ok(total_derivative(momentum, &self.rates)? - derivative(of, coordinate)?)
    }
}

/// The component of a vector along an axis.
pub(super) fn along(vector: crate::model::Vector, axis: Axis) -> Expr {
    let [x, y, z] = vector.components();
    match axis {
        Axis::X => x,
        Axis::Y => y,
        Axis::Z => z,
    }
}
