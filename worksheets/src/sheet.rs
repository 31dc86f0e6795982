//! The sheet as cells see it: plain values, and a clear message that stops the cell on an error.
//!
//! Each method does what the method of the same name of [`Model`] does; see there for what it
//! means and what it refuses. Every one of them panics, to stop the cell, where `Model` returns
//! an error.

use cas::{Effort, Expr, IntoExpr};

use crate::derive::{self, Derived, Motion};
use crate::model::{EndChoice, Model, Particle, ParticleChoice, Vector};
use crate::reference::{Check, Reference};
use crate::stop::unless;

/// The model and the record of everything derived from it.
#[derive(Clone, Debug)]
pub struct Sheet {
    model: Model,
}

#[allow(
    clippy::missing_panics_doc,
    reason = "every method stops the cell on an error, which the module says once"
)]
impl Sheet {
    /// An empty sheet.
    #[must_use]
    pub fn titled(title: &str) -> Self {
        Self {
            model: unless(Model::titled(title)),
        }
    }

    /// What was stated.
    #[must_use]
    pub fn model(&self) -> &Model {
        &self.model
    }

    /// See [`Model::constant`].
    pub fn constant(&mut self, name: &str, unit: &str, meaning: &str) -> Expr {
        unless(self.model.constant(name, unit, meaning))
    }

    /// See [`Model::positive_constant`].
    pub fn positive_constant(&mut self, name: &str, unit: &str, meaning: &str) -> Expr {
        unless(self.model.positive_constant(name, unit, meaning))
    }

    /// See [`Model::coordinate`].
    pub fn coordinate(&mut self, name: &str, unit: &str, meaning: &str) -> Expr {
        unless(self.model.coordinate(name, unit, meaning))
    }

    /// See [`Model::input`].
    pub fn input(&mut self, name: &str, unit: &str, meaning: &str) -> Expr {
        unless(self.model.input(name, unit, meaning))
    }

    /// See [`Model::function`].
    pub fn function<const N: usize>(
        &mut self,
        name: &str,
        unit: &str,
        arguments: [Expr; N],
        meaning: &str,
    ) -> Expr {
        unless(self.model.function(name, unit, &arguments, meaning))
    }

    /// The time, in seconds.
    #[must_use]
    pub fn time(&self) -> Expr {
        self.model.time().into()
    }

    /// See [`Model::rate`].
    #[must_use]
    pub fn rate(&self, of: Expr) -> Expr {
        unless(self.model.rate(of))
    }

    /// See [`Model::particle`].
    pub fn particle(&mut self, name: &str, mass: impl IntoExpr, position: Vector) -> Particle {
        unless(self.model.particle(name, mass, position))
    }

    /// See [`Model::gravity`].
    pub fn gravity(&mut self, acceleration: impl IntoExpr, direction: Vector) {
        unless(self.model.gravity(acceleration, direction));
    }

    /// See [`Model::force`].
    pub fn force(&mut self, name: &str, particle: impl Into<ParticleChoice>, vector: Vector) {
        unless(self.model.force(name, particle, vector));
    }

    /// See [`Model::spring`].
    pub fn spring(
        &mut self,
        name: &str,
        a: impl Into<EndChoice>,
        b: impl Into<EndChoice>,
        stiffness: impl IntoExpr,
        rest_length: impl IntoExpr,
    ) {
        unless(self.model.spring(name, a, b, stiffness, rest_length));
    }

    /// See [`Model::damper`].
    pub fn damper(
        &mut self,
        name: &str,
        a: impl Into<EndChoice>,
        b: impl Into<EndChoice>,
        coefficient: impl IntoExpr,
    ) {
        unless(self.model.damper(name, a, b, coefficient));
    }

    /// See [`Model::normal`].
    pub fn normal(&mut self, name: &str, particle: impl Into<ParticleChoice>, direction: Vector) -> Expr {
        unless(self.model.normal(name, particle, direction))
    }

    /// See [`Model::link`].
    pub fn link(&mut self, name: &str, a: impl Into<EndChoice>, b: impl Into<EndChoice>) -> Expr {
        unless(self.model.link(name, a, b))
    }

    /// See [`Model::assume`].
    pub fn assume<const N: usize>(&mut self, text: &str, affects: [&str; N]) {
        unless(self.model.assume(text, &affects));
    }

    /// See [`derive::velocities`].
    #[must_use]
    pub fn velocities(&self) -> Derived {
        unless(derive::velocities(&self.model, &Effort::default()))
    }

    /// See [`derive::identities`].
    #[must_use]
    pub fn identities(&self) -> Derived {
        unless(derive::identities(&self.model, &Effort::default()))
    }

    /// See [`derive::jacobian`].
    #[must_use]
    pub fn jacobian(&self) -> Derived {
        unless(derive::jacobian(&self.model, &Effort::default()))
    }

    /// See [`derive::newton`].
    #[must_use]
    pub fn newton(&self) -> Derived {
        unless(derive::newton(&self.model, &Effort::default()))
    }

    /// See [`derive::projection`].
    #[must_use]
    pub fn projection(&self) -> Derived {
        unless(derive::projection(&self.model, &Effort::default()))
    }

    /// See [`derive::virtual_work`].
    #[must_use]
    pub fn virtual_work(&self) -> Derived {
        unless(derive::virtual_work(&self.model, &Effort::default()))
    }

    /// See [`derive::reduction`].
    #[must_use]
    pub fn reduction(&self) -> Derived {
        unless(derive::reduction(&self.model, &Effort::default()))
    }

    /// See [`derive::generalized_forces`].
    #[must_use]
    pub fn generalized_forces(&self) -> Derived {
        unless(derive::generalized_forces(&self.model, &Effort::default()))
    }

    /// See [`derive::potential`].
    #[must_use]
    pub fn potential(&self) -> Derived {
        unless(derive::potential(&self.model, &Effort::default()))
    }

    /// See [`derive::lagrangian`].
    #[must_use]
    pub fn lagrangian(&self) -> Derived {
        unless(derive::lagrangian(&self.model, &Effort::default()))
    }

    /// See [`derive::equations`].
    #[must_use]
    pub fn equations(&self) -> Motion {
        unless(derive::equations(&self.model, &Effort::default()))
    }

    /// See [`derive::mass_matrix`].
    #[must_use]
    pub fn mass_matrix(&self) -> Derived {
        let motion = self.equations();
        unless(derive::mass_matrix(&self.model, &motion, &Effort::default()))
    }

    /// The numerical reference for the equations of motion: see [`Check`].
    #[must_use]
    pub fn reference(&self) -> Check {
        Check::new(Reference::new(&self.model, self.equations().for_reference()))
    }
}
