//! Declaring quantities, particles and assumptions.

use cas::calculus::total_derivative;
use cas::{Expr, IntoExpr, Name, Symbol};

use super::assumption::{Assumption, Origin};
use super::body::Particle;
use super::check::Allowed;
use super::declared::{Declared, Role};
use super::error::ModelError;
use super::vector::Vector;
use super::{Force, Model};
use crate::quantity::{Dimension, Unit};

/// The longest title, meaning or assumption.
const MOST_CHARACTERS: usize = 1_000;

impl Model {
    /// A model without anything but its title and the time `t`.
    ///
    /// # Errors
    /// An empty or overlong title.
    pub fn titled(title: &str) -> Result<Self, ModelError> {
        let title = text("title", title)?.ok_or(ModelError::EmptyTitle)?;
        let name = Name::new("t")?;
        let time = Declared {
            name,
            value: Symbol::from(name).into(),
            unit: Unit::second(),
            meaning: "time".to_owned(),
            role: Role::Time,
        };
        Ok(Self {
            title,
            quantities: vec![time],
            particles: Vec::new(),
            forces: Vec::new(),
            reactions: Vec::new(),
            assumptions: Vec::new(),
        })
    }

    /// A constant of either sign.
    ///
    /// # Errors
    /// A name that is taken or no name, a unit that is none, an empty meaning.
    pub fn constant(&mut self, name: &str, unit: &str, meaning: &str) -> Result<Expr, ModelError> {
        self.declare_symbol(name, unit, meaning, Role::Constant)
    }

    /// A constant above zero, such as a mass or a length.
    ///
    /// # Errors
    /// As [`Model::constant`].
    pub fn positive_constant(&mut self, name: &str, unit: &str, meaning: &str) -> Result<Expr, ModelError> {
        self.declare_symbol(name, unit, meaning, Role::PositiveConstant)
    }

    /// A generalized coordinate.
    ///
    /// # Errors
    /// As [`Model::constant`].
    pub fn coordinate(&mut self, name: &str, unit: &str, meaning: &str) -> Result<Expr, ModelError> {
        self.declare_symbol(name, unit, meaning, Role::Coordinate)
    }

    /// A prescribed function of time.
    ///
    /// # Errors
    /// As [`Model::constant`].
    pub fn input(&mut self, name: &str, unit: &str, meaning: &str) -> Result<Expr, ModelError> {
        let name = self.free_name(name)?;
        let value = Expr::unknown(name, &[self.time().into()]);
        self.declare(name, value, unit, meaning, Role::Input)
    }

    /// An undetermined function of the given arguments, such as a potential `U(x)`.
    ///
    /// # Errors
    /// As [`Model::constant`]; arguments that are not declared symbols without primes.
    pub fn function(
        &mut self,
        name: &str,
        unit: &str,
        arguments: &[Expr],
        meaning: &str,
    ) -> Result<Expr, ModelError> {
        let name = self.free_name(name)?;
        let place = format!("the argument of `{name}`");
        for argument in arguments {
            self.check(*argument, &place, Allowed::POSITION, None)?;
            if argument.as_symbol().is_none() {
                return Err(ModelError::NotAllowed {
                    place,
                    what: "more than a symbol, namely",
                    part: *argument,
                    remedy: "declare the function of symbols, such as coordinates",
                });
            }
        }
        let value = Expr::unknown(name, arguments);
        self.declare(name, value, unit, meaning, Role::Function)
    }

    /// A particle of this mass at this position, a function of coordinates and time.
    ///
    /// # Errors
    /// A name that is taken, a mass that is not a constant mass above zero, a position that is no
    /// length or depends on velocities.
    pub fn particle(
        &mut self,
        name: &str,
        mass: impl IntoExpr,
        position: Vector,
    ) -> Result<Particle, ModelError> {
        let (name, mass) = (self.free_name(name)?, mass.into_expr());
        if mass.as_number().is_some_and(|value| !value.is_positive()) {
            return Err(ModelError::MassNotPositive { name, mass });
        }
        let place = format!("the mass of `{name}`");
        self.check(mass, &place, Allowed::CONSTANT, Some(&Dimension::MASS))?;
        let place = format!("the position of `{name}`");
        self.check_vector(position, &place, Allowed::POSITION, &Dimension::LENGTH)?;
        let particle = Particle { name, mass, position };
        self.particles.push(particle);
        self.extend_gravity();
        Ok(particle)
    }

    /// As [`Model::particle`], from a slice of components.
    ///
    /// # Errors
    /// Also a number of components other than three.
    pub fn particle_from(
        &mut self,
        name: &str,
        mass: impl IntoExpr,
        components: &[Expr],
    ) -> Result<Particle, ModelError> {
        let position = <[Expr; 3]>::try_from(components).map_err(|_| ModelError::Components {
            place: format!("the position of `{name}`"),
            count: components.len(),
        })?;
        self.particle(name, mass, Vector::new(position))
    }

    /// The rate of change of an expression: `x'` of a coordinate `x`.
    ///
    /// # Errors
    /// As for an expression in a force: undeclared symbols, accelerations, no value.
    pub fn rate(&self, of: Expr) -> Result<Expr, ModelError> {
        let place = "the expression whose rate is asked for";
        self.check(of, place, Allowed::FORCE, None)?;
        total_derivative(of, &self.rates()).map_err(|source| ModelError::Derivative {
            place: place.to_owned(),
            source,
        })
    }

    /// An assumption in words and the names that it affects.
    ///
    /// # Errors
    /// An empty text, a name that is not on the sheet.
    pub fn assume(&mut self, words: &str, affects: &[&str]) -> Result<&Assumption, ModelError> {
        let words = text("assumption", words)?.ok_or(ModelError::EmptyAssumption)?;
        for name in affects {
            if self.holder(name).is_none() {
                return Err(ModelError::UnknownName {
                    text: words,
                    name: (*name).to_owned(),
                    nearest: self.nearest_name(name),
                });
            }
        }
        let affects = affects.iter().map(|name| (*name).to_owned()).collect();
        Ok(self.register(words, affects, Origin::Stated))
    }

    pub(super) fn register(&mut self, text: String, affects: Vec<String>, origin: Origin) -> &Assumption {
        let number = self.assumptions.len() + 1;
        self.assumptions.push(Assumption {
            number,
            text,
            affects,
            origin,
        });
        &self.assumptions[number - 1]
    }

    fn declare_symbol(
        &mut self,
        name: &str,
        unit: &str,
        meaning: &str,
        role: Role,
    ) -> Result<Expr, ModelError> {
        let name = self.free_name(name)?;
        self.declare(name, Symbol::from(name).into(), unit, meaning, role)
    }

    pub(super) fn declare(
        &mut self,
        name: Name,
        value: Expr,
        unit: &str,
        meaning: &str,
        role: Role,
    ) -> Result<Expr, ModelError> {
        let unit = Unit::read(unit).map_err(|source| ModelError::Unit { name, source })?;
        let meaning = text("meaning", meaning)?.ok_or(ModelError::EmptyMeaning { name })?;
        self.quantities.push(Declared {
            name,
            value,
            unit,
            meaning,
            role,
        });
        Ok(value)
    }

    /// The name, where nothing on the sheet has it yet.
    pub(super) fn free_name(&self, name: &str) -> Result<Name, ModelError> {
        let name = Name::new(name)?;
        match self.holder(name.as_str()) {
            Some(Role::TIME_WORDS) => Err(ModelError::Reserved {
                name,
                meaning: Role::TIME_WORDS,
            }),
            Some(holder) => Err(ModelError::Taken { name, holder }),
            None => Ok(name),
        }
    }

    /// What has the name, in words.
    pub(super) fn holder(&self, name: &str) -> Option<&'static str> {
        let quantity = self.quantities.iter().find(|d| d.name.as_str() == name);
        let particle = || self.particles.iter().any(|p| p.name.as_str() == name);
        let force = || self.forces.iter().find(|f| f.name.as_str() == name);
        let reaction = || self.reactions.iter().find(|r| r.name.as_str() == name);
        quantity
            .map(|d| d.role.words())
            .or_else(|| particle().then_some("particle"))
            .or_else(|| force().map(|f: &Force| f.kind.words()))
            .or_else(|| reaction().map(|r| r.kind.words()))
    }
}

/// The text without surrounding blanks, `None` where nothing is left.
///
/// Control characters are refused because standard output is a protocol of lines.
fn text(what: &str, given: &str) -> Result<Option<String>, ModelError> {
    let trimmed = given.trim();
    let length = trimmed.chars().count();
    if length > MOST_CHARACTERS {
        return Err(ModelError::TooLong {
            what: what.to_owned(),
            length,
            limit: MOST_CHARACTERS,
        });
    }
    if let Some((place, character)) = trimmed.chars().enumerate().find(|(_, c)| c.is_control()) {
        return Err(ModelError::Unprintable {
            what: what.to_owned(),
            character,
            place: place + 1,
        });
    }
    Ok((!trimmed.is_empty()).then(|| trimmed.to_owned()))
}
