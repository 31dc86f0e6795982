//! The equations of motion by two routes, proved equal and brought into a form to be read.

use std::ops::Deref;

use cas::{Effort, Expr, Kind};

use super::energy::{Examined, examined, total_potential, without_potential};
use super::jacobian::require_independent;
use super::kinematics::Kinematics;
use super::mass_matrix::{LinearForm, linear_form};
use super::newton::projected_inertia;
use super::stage::Stage;
use super::work::remaining_work;
use super::{DeriveError, Derived};
use crate::model::{Model, Role};
use crate::record::{Formal, Ground, Rule, Side, Statement};
use crate::reference::DerivedMotion;

/// The equations of motion.
#[derive(Clone, Debug)]
pub struct Motion {
    derived: Derived,
    equations: Vec<Expr>,
    linear: LinearForm,
}

impl Motion {
    /// The left sides of the equations `... = 0`, in order of the coordinates, in collected form.
    #[must_use]
    pub fn equations(&self) -> &[Expr] {
        &self.equations
    }

    /// The left side of one equation `... = 0`, in collected form; counted from zero in order of the
    /// coordinates.
    ///
    /// # Panics
    /// Beyond the last equation, to stop the cell.
    #[must_use]
    pub fn equation(&self, place: usize) -> Expr {
        let count = self.equations.len();
        let found = self.equations.get(place).copied();
        crate::stop::unless(found.ok_or(DeriveError::NoEquation { place, count }))
    }

    /// The rows of the mass matrix `M` of `M q'' + h = 0`.
    #[must_use]
    pub fn mass_matrix(&self) -> &[Vec<Expr>] {
        &self.linear.mass_matrix
    }

    /// The bias `h` of `M q'' + h = 0`.
    #[must_use]
    pub fn bias(&self) -> &[Expr] {
        &self.linear.bias
    }

    /// Mass matrix and bias: `M q'' + h = 0`.
    #[must_use]
    pub fn for_reference(&self) -> DerivedMotion {
        DerivedMotion {
            mass_matrix: self.linear.mass_matrix.clone(),
            bias: self.linear.bias.clone(),
        }
    }

    pub(super) fn linear(&self) -> &LinearForm {
        &self.linear
    }
}

impl Deref for Motion {
    type Target = Derived;

    fn deref(&self) -> &Derived {
        &self.derived
    }
}

/// The equations of motion, by projection of Newton's equations and from the energies.
///
/// # Errors
/// A model that is not complete, dependent coordinates, a position that cannot be differentiated.
pub fn equations(model: &Model, effort: &Effort) -> Result<Motion, DeriveError> {
    let kinematics = Kinematics::of(model)?;
    require_independent(&kinematics, effort)?;
    let forces = examined(model, &kinematics, effort)?;
    let mut stage = Stage::titled(model, effort, "equations", "Equations of motion");
    let mut equations = Vec::new();
    for place in 0..kinematics.coordinates.len() {
        let collected = equation(&mut stage, &kinematics, &forces, place)?;
        let (left, right) = sides(model, collected);
        stage.show(Statement::law(Side::of(left), Side::of(right)));
        equations.push(collected);
    }
    let linear = linear_form(&kinematics, &equations, effort)?;
    let proved = stage
        .derivation
        .steps
        .iter()
        .all(|step| step.standing.is_settled());
    stage.derivation.checked.push(if proved {
        "Two routes agree, proved: the projection of Newton's equations on the Jacobian, and the energies."
            .to_owned()
    } else {
        "The two routes were not proved equal everywhere: see the steps.".to_owned()
    });
    Ok(Motion {
        derived: Derived::new(model, stage.derivation),
        equations,
        linear,
    })
}

/// The steps of one equation; returns its left side in collected form.
fn equation(
    stage: &mut Stage<'_>,
    kinematics: &Kinematics,
    forces: &[Examined<'_>],
    place: usize,
) -> Result<Expr, DeriveError> {
    let coordinate = kinematics.coordinates[place];
    let work = remaining_work(stage.model, kinematics, place, stage.effort);
    let generalized: Expr = forces.iter().map(|force| force.generalized[place]).sum();
    let projected = projected_inertia(kinematics, place) - generalized - work;
    let energy = kinematics.kinetic_energy();
    let by_energy = kinematics.lagrange_expression(energy, coordinate)? - generalized - work;

    let column = Formal::running_position(0).partial(coordinate);
    let inertia = Formal::product([Formal::Mass { particle: None }, Formal::running_position(2)]);
    let force = || Formal::generalized_force(coordinate.name());
    let name = Formal::EquationOfMotion {
        coordinate: coordinate.name(),
    };
    stage.equal(
        &format!("{coordinate}.routes"),
        Side::named(inertia.dot(column).over_particles().minus(force()), projected),
        Side::named(
            Formal::kinetic_energy()
                .lagrange_expression(coordinate)
                .minus(force()),
            by_energy,
        ),
        Rule::AgreementOfRoutes,
        [
            Ground::step(format!("projection.{coordinate}")),
            Ground::step(format!("reduction.{coordinate}.kinetic_energy")),
            Ground::step(format!("generalized_forces.{coordinate}")),
        ],
    );
    let potential = total_potential(forces);
    if !potential.is_zero() {
        let rest = without_potential(forces, place) + work;
        let by_lagrangian = kinematics.lagrange_expression(energy - potential, coordinate)? - rest;
        let lagrangian = Formal::Lagrangian.lagrange_expression(coordinate);
        let lagrangian = if rest.is_zero() {
            lagrangian
        } else {
            lagrangian.minus(force())
        };
        let mut grounds = vec![Ground::step("lagrangian.definition")];
        for examined in forces {
            grounds.push(Ground::stated(examined.force.name()));
        }
        stage.equal(
            &format!("{coordinate}.lagrangian"),
            Side::named(lagrangian, by_lagrangian),
            Side::named(name.clone(), projected),
            Rule::LagrangesEquations,
            grounds,
        );
    }
    let collected = stage.collected(by_energy, &kinematics.leads());
    stage.equal(
        &coordinate.to_string(),
        Side::named(name, by_energy),
        Side::of(collected),
        Rule::CollectedForm,
        [Ground::step(format!("equations.{coordinate}.routes"))]
            .into_iter()
            .chain(stated(stage.model)),
    );
    Ok(collected)
}

/// Everything that an equation of motion rests on: particles, applied forces, and the reactions whose
/// virtual work was taken for what it is.
pub(super) fn stated(model: &Model) -> impl Iterator<Item = Ground> {
    let particles = model.particles().iter().map(|particle| particle.name());
    let forces = model.forces().iter().map(|force| force.name());
    let reactions = model.reactions().iter().map(|reaction| reaction.name());
    particles.chain(forces).chain(reactions).map(Ground::stated)
}

/// The equation as it is read: prescribed inputs that stand without coordinates on the right.
fn sides(model: &Model, equation: Expr) -> (Expr, Expr) {
    let inputs: Vec<_> = model
        .quantities()
        .iter()
        .filter(|declared| declared.role() == Role::Input)
        .map(|declared| declared.name())
        .collect();
    let coordinates = model.coordinates();
    let driven = |term: &Expr| {
        let nodes = cas::postorder(&[*term]);
        let input = nodes.iter().any(|node| match node.kind() {
            Kind::Unknown(application) => inputs.contains(&application.name()),
            _ => false,
        });
        let moves = term
            .symbols()
            .iter()
            .any(|symbol| coordinates.contains(&symbol.with_primes(0)));
        input && !moves
    };
    let (right, left): (Vec<Expr>, Vec<Expr>) = equation.terms().into_iter().partition(driven);
    if left.is_empty() {
        return (equation, Expr::zero());
    }
    (Expr::sum_of(left), -Expr::sum_of(right))
}
