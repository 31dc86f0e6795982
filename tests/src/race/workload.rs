//! The mechanical systems of the race as expressions: names, position maps, energies.
//!
//! The peers build the same systems from `tests/peers/workload.py` and `tests/peers/workload.hpp`.

use std::array::from_fn;

use anyhow::Result;
use cas::calculus::{Rates, derivative, total_derivative};
use cas::{Expr, Symbol, cos, sin};

use super::case::{Case, Family};

/// A vector by its components.
type Vector = [Expr; 3];

/// A matrix by its rows.
type Matrix = [Vector; 3];

/// A rigid body, or a point mass where the inertia is zero.
struct Body {
    mass: Expr,
    /// Of its mass centre, in the ground's frame.
    position: Vector,
    /// The time derivative of the position.
    velocity: Vector,
    /// The angular velocity in the body's own frame.
    spin: Vector,
    /// The inertia matrix about the mass centre, in the body's own frame.
    inertia: Matrix,
}

/// A mechanical system.
pub struct Workload {
    /// The generalized coordinates; one prime is a rate, two are an acceleration.
    pub coordinates: Vec<Symbol>,
    /// The rates of coordinates and of their rates.
    pub rates: Rates,
    bodies: Vec<Body>,
    gravity: Expr,
    /// Which component of a position is the height.
    height: usize,
}

impl Workload {
    /// The system of a case.
    ///
    /// # Errors
    /// A name that is not one, or a derivative that does not exist: neither occurs in a case.
    pub fn of(case: Case) -> Result<Self> {
        let coordinates = (1..=case.links)
            .map(|link| Symbol::new(&format!("q{link}")))
            .collect::<Result<Vec<_>, _>>()?;
        let mut workload = Self {
            rates: Rates::primed(&coordinates, 2),
            coordinates,
            bodies: Vec::new(),
            gravity: Expr::symbol("g")?,
            height: if case.family.axes().is_empty() { 1 } else { 2 },
        };
        match case.family {
            Family::AbsoluteChain | Family::RelativeChain => {
                workload.hang_chain(case.family == Family::RelativeChain)?;
            }
            Family::Arm | Family::GeneralArm => workload.mount_arm(case)?,
        }
        Ok(workload)
    }

    /// A planar chain of point masses on massless rods, hanging from the ground.
    fn hang_chain(&mut self, relative: bool) -> Result<()> {
        let zeros = [Expr::zero(); 3];
        let [mut across, mut height, mut angle] = zeros;
        for (link, coordinate) in (1..).zip(self.coordinates.clone()) {
            angle = if relative {
                angle + Expr::from(coordinate)
            } else {
                coordinate.into()
            };
            let length = constant("l", link)?;
            across += length * sin(angle);
            height -= length * cos(angle);
            let position = [across, height, Expr::zero()];
            self.add_body(constant("m", link)?, position, zeros, [zeros; 3])?;
        }
        Ok(())
    }

    /// A serial arm of rigid links, each with any mass centre and any inertia matrix.
    fn mount_arm(&mut self, case: Case) -> Result<()> {
        let mut orientation: Matrix = from_fn(|i| from_fn(|j| Expr::from(i64::from(i == j))));
        let mut spin = [Expr::zero(); 3];
        let mut joint = [Expr::zero(); 3];
        for (link, (letter, coordinate)) in
            (1..).zip(case.family.axes().chars().zip(self.coordinates.clone()))
        {
            let axis = "xyz".find(letter).expect("invariant: axes are named x, y and z");
            let turn = rotation(axis, coordinate.into());
            orientation = orientation.map(|row| from_fn(|j| dot(row, column(turn, j))));
            spin = from_fn(|j| dot(column(turn, j), spin));
            spin[axis] += Expr::from(coordinate.primed());

            let centre = [
                constant("cx", link)?,
                constant("cy", link)?,
                constant("cz", link)?,
            ];
            let [xx, yy, zz] = [
                constant("Ixx", link)?,
                constant("Iyy", link)?,
                constant("Izz", link)?,
            ];
            let [xy, xz, yz] = [
                constant("Ixy", link)?,
                constant("Ixz", link)?,
                constant("Iyz", link)?,
            ];
            let inertia = [[xx, xy, xz], [xy, yy, yz], [xz, yz, zz]];
            let position = from_fn(|i| joint[i] + dot(orientation[i], centre));
            self.add_body(constant("m", link)?, position, spin, inertia)?;
            let offset = offset(case.family, link)?;
            joint = from_fn(|i| joint[i] + dot(orientation[i], offset));
        }
        Ok(())
    }

    fn add_body(&mut self, mass: Expr, position: Vector, spin: Vector, inertia: Matrix) -> Result<()> {
        let velocity = self.rate(position)?;
        self.bodies.push(Body {
            mass,
            position,
            velocity,
            spin,
            inertia,
        });
        Ok(())
    }

    /// The time derivative of a vector.
    fn rate(&self, vector: Vector) -> Result<Vector> {
        let [x, y, z] = vector.map(|component| total_derivative(component, &self.rates));
        Ok([x?, y?, z?])
    }

    /// The components of all positions, from which the basis of angles can be chosen.
    #[must_use]
    pub fn positions(&self) -> Vec<Expr> {
        self.bodies.iter().flat_map(|body| body.position).collect()
    }

    /// The kinetic energy.
    #[must_use]
    pub fn kinetic_energy(&self) -> Expr {
        let twice = self.bodies.iter().map(|body| {
            let turning = dot(body.spin, body.inertia.map(|row| dot(row, body.spin)));
            body.mass * Expr::sum_of(body.velocity.map(Expr::squared)) + turning
        });
        Expr::sum_of(twice) / 2
    }

    /// The potential energy.
    #[must_use]
    pub fn potential_energy(&self) -> Expr {
        let weighted = self
            .bodies
            .iter()
            .map(|body| body.mass * body.position[self.height]);
        self.gravity * Expr::sum_of(weighted)
    }

    /// Lagrange's equations as expressions, one for each coordinate, by the energy route.
    ///
    /// # Errors
    /// A derivative that does not exist.
    pub fn by_energy(&self) -> Result<Vec<Expr>> {
        let kinetic = self.kinetic_energy();
        let lagrangian = kinetic - self.potential_energy();
        let equation = |coordinate: &Symbol| {
            let momentum = derivative(kinetic, coordinate.primed())?;
            Ok(total_derivative(momentum, &self.rates)? - derivative(lagrangian, *coordinate)?)
        };
        self.coordinates.iter().map(equation).collect()
    }

    /// The same equations by the projection of Newton's and Euler's equations.
    ///
    /// # Errors
    /// A derivative that does not exist.
    pub fn by_projection(&self) -> Result<Vec<Expr>> {
        let mut equations = vec![Vec::new(); self.coordinates.len()];
        for body in &self.bodies {
            let mut acceleration = self.rate(body.velocity)?;
            acceleration[self.height] += self.gravity;
            let momentum = body.inertia.map(|row| dot(row, body.spin));
            let angular = self.rate(momentum)?;
            let gyration = cross(body.spin, momentum);
            for (coordinate, terms) in self.coordinates.iter().zip(&mut equations) {
                for axis in 0..3 {
                    let along = derivative(body.position[axis], *coordinate)?;
                    let around = derivative(body.spin[axis], coordinate.primed())?;
                    terms.push(body.mass * acceleration[axis] * along);
                    terms.push((angular[axis] + gyration[axis]) * around);
                }
            }
        }
        Ok(equations.into_iter().map(Expr::sum_of).collect())
    }
}

/// A constant that belongs to a link.
fn constant(name: &str, link: usize) -> Result<Expr> {
    Ok(Expr::symbol(&format!("{name}{link}"))?)
}

/// The vector from the joint of a link to the next one, in the link's own frame.
fn offset(family: Family, link: usize) -> Result<Vector> {
    if family == Family::GeneralArm {
        return Ok([
            constant("bx", link + 1)?,
            constant("by", link + 1)?,
            constant("bz", link + 1)?,
        ]);
    }
    let zero = Expr::zero();
    Ok(match link {
        1 => [zero, zero, Expr::symbol("d1")?],
        2 => [Expr::symbol("a2")?, Expr::symbol("d2")?, zero],
        3 => [Expr::symbol("a3")?, zero, zero],
        _ => [zero; 3],
    })
}

/// The matrix of a rotation about a coordinate axis.
fn rotation(axis: usize, angle: Expr) -> Matrix {
    let (second, third) = ((axis + 1) % 3, (axis + 2) % 3);
    let mut matrix = [[Expr::zero(); 3]; 3];
    matrix[axis][axis] = Expr::one();
    matrix[second][second] = cos(angle);
    matrix[third][third] = cos(angle);
    matrix[third][second] = sin(angle);
    matrix[second][third] = -sin(angle);
    matrix
}

fn column(matrix: Matrix, place: usize) -> Vector {
    matrix.map(|row| row[place])
}

fn dot(a: Vector, b: Vector) -> Expr {
    Expr::sum_of(from_fn::<_, 3, _>(|i| a[i] * b[i]))
}

fn cross(a: Vector, b: Vector) -> Vector {
    from_fn(|i| {
        let (second, third) = ((i + 1) % 3, (i + 2) % 3);
        a[second] * b[third] - a[third] * b[second]
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use cas::{Effort, decide::compare};

    #[test]
    fn both_routes_give_the_same_equations() -> Result<()> {
        for case in ["abs 2", "rel 3", "arm 2", "arm 2, every offset nonzero"] {
            let workload = Workload::of(case.parse()?)?;
            let (energy, projection) = (workload.by_energy()?, workload.by_projection()?);
            assert_eq!(energy.len(), workload.coordinates.len());
            for (left, right) in energy.into_iter().zip(projection) {
                assert!(compare(left, right, &Effort::default()).is_proved(), "{case}");
            }
        }
        Ok(())
    }

    /// The pendulum, `m l^2 q'' + m g l sin q = 0`, is the chain of one link.
    #[test]
    fn one_link_is_the_pendulum() -> Result<()> {
        let workload = Workload::of("rel 1".parse()?)?;
        let [m, l, g] = [constant("m", 1)?, constant("l", 1)?, Expr::symbol("g")?];
        let q = workload.coordinates[0];
        let known = m * l * l * Expr::from(q.with_primes(2)) + m * g * l * sin(Expr::from(q));
        assert!(compare(workload.by_energy()?[0], known, &Effort::default()).is_proved());
        Ok(())
    }
}
