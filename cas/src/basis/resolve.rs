//! Finds out, for every node that is no field operation, what stands for it in the basis.

use std::collections::{BTreeMap, HashMap};

use num_integer::Integer;

use super::{Basis, Failure};
use crate::canonical::Canonical;
use crate::decide::Condition;
use crate::effort::{Limit, Meter};
use crate::expr::{Expr, Function, Kind, pi, postorder};
use crate::number::Rational;

/// Functions in arguments of functions deeper than this are refused.
const MOST_NESTING: u32 = 48;

/// Roots of higher degree become variables without relation.
const MOST_DEGREE: i64 = 64;

/// What stands for a node, before variables have places.
#[derive(Clone, Debug)]
pub(super) enum Found {
    /// A number.
    Number(Rational),
    /// A variable; opaque where it is a known function of others.
    Variable { key: Expr, opaque: bool },
    /// A sine, cosine or tangent of a linear form, quarter turns apart.
    Turn {
        function: Function,
        parts: BTreeMap<Expr, Rational>,
        quarters: u8,
        opaque: bool,
    },
    /// A power of a root of a radicand in canonical form.
    Root {
        key: Expr,
        degree: u32,
        power: i64,
        radicand: Expr,
        /// Whether the relation can be stated with polynomials.
        relation: bool,
    },
}

/// What was found so far.
pub(super) struct Resolver<'m> {
    pub(super) found: HashMap<Expr, Found>,
    pub(super) conditions: Vec<Condition>,
    meter: &'m Meter<'m>,
}

impl<'m> Resolver<'m> {
    pub(super) fn new(meter: &'m Meter<'m>) -> Self {
        Self {
            found: HashMap::new(),
            conditions: Vec::new(),
            meter,
        }
    }

    /// Resolves every node reachable from the roots.
    pub(super) fn resolve(&mut self, roots: &[Expr]) -> Result<(), Failure> {
        let nodes = postorder(roots);
        self.meter.spend(nodes.len() as u64)?;
        let mut nesting: HashMap<Expr, u32> = HashMap::new();
        for node in nodes {
            // Parts come first, so the first undefined node is a smallest one.
            if node.is_undefined() {
                return Err(Failure::Undefined(node));
            }
            let inner = node.children().iter().map(|part| nesting[part]).max();
            let depth = inner.unwrap_or(0) + u32::from(!is_field_operation(node));
            if depth > MOST_NESTING {
                return Err(Limit::Nesting(MOST_NESTING).into());
            }
            nesting.insert(node, depth);
            if !is_field_operation(node) && !self.found.contains_key(&node) {
                let found = self.found_for(node)?;
                self.found.insert(node, found);
            }
        }
        Ok(())
    }

    fn found_for(&mut self, node: Expr) -> Result<Found, Failure> {
        let variable = |key: Expr, opaque| match key.as_number() {
            Some(value) => Found::Number(value.clone()),
            None => Found::Variable { key, opaque },
        };
        Ok(match node.kind() {
            Kind::Unknown(application) => {
                let arguments = application.arguments().iter();
                let arguments = arguments
                    .map(|argument| self.normal(*argument))
                    .collect::<Result<Vec<_>, _>>()?;
                let key = Expr::unknown_derivative(application.name(), application.orders(), &arguments);
                variable(key, false)
            }
            Kind::Elementary(Function::Exponential, argument) => variable(
                Expr::elementary(Function::Exponential, self.normal(*argument)?),
                true,
            ),
            Kind::Elementary(Function::Logarithm, argument) => {
                let argument = self.normal(*argument)?;
                self.require(Condition::Positive(argument));
                let key = Expr::elementary(Function::Logarithm, argument);
                if key.is_undefined() {
                    return Err(Failure::Undefined(key));
                }
                variable(key, true)
            }
            Kind::Elementary(function, argument) => self.turn(*function, *argument)?,
            Kind::Power(base, exponent) => self.root(*base, exponent)?,
            Kind::Number(_) | Kind::Symbol(_) | Kind::Pi | Kind::Sum(_) | Kind::Product(_) => {
                variable(node, false)
            }
        })
    }

    fn require(&mut self, condition: Condition) {
        if condition.expr().as_number().is_none() && !self.conditions.contains(&condition) {
            self.conditions.push(condition);
        }
    }

    /// The canonical form of an argument; what must hold for it is noted.
    fn canonical(&mut self, argument: Expr) -> Result<Canonical<'m>, Failure> {
        let basis = Basis::from_found(&[argument], self);
        let canonical = Canonical::in_basis(basis, &[argument], self.meter)?;
        for condition in canonical.conditions() {
            self.require(condition);
        }
        Ok(canonical)
    }

    /// An argument written in canonical form.
    fn normal(&mut self, argument: Expr) -> Result<Expr, Failure> {
        if argument.children().is_empty() {
            return Ok(argument);
        }
        let canonical = self.canonical(argument)?;
        Ok(canonical.expr(&canonical.fractions[0]))
    }

    /// A sine, cosine or tangent.
    fn turn(&mut self, function: Function, argument: Expr) -> Result<Found, Failure> {
        let mut parts: BTreeMap<Expr, Rational> = BTreeMap::new();
        let mut opaque = false;
        if argument.as_symbol().is_some() || argument == pi() {
            parts.insert(argument, Rational::ONE);
        } else {
            let canonical = self.canonical(argument)?;
            let value = &canonical.fractions[0];
            match canonical.monomials(value) {
                Some(monomials) => parts = monomials.into_iter().collect(),
                None => {
                    opaque = true;
                    let (coefficient, rest) = canonical.expr(value).coefficient_and_rest();
                    parts.insert(rest, coefficient);
                }
            }
            // Functions within the argument may relate this angle to others.
            opaque |= !canonical.basis.angles.is_empty() || !canonical.basis.complete;
        }
        let quarters = parts.remove(&pi()).map_or(0, |coefficient| {
            let (quarters, rest) = quarter_turns(&coefficient);
            if !rest.is_zero() {
                parts.insert(pi(), rest);
            }
            quarters
        });
        Ok(Found::Turn {
            function,
            parts,
            quarters,
            opaque,
        })
    }

    /// A power with an exponent that is no integer.
    fn root(&mut self, base: Expr, exponent: &Rational) -> Result<Found, Failure> {
        let radicand = self.normal(base)?;
        let (power, degree) = exponent.as_small().unwrap_or((1, i64::MAX));
        self.require(if exponent.is_negative() {
            Condition::Positive(radicand)
        } else {
            Condition::NotNegative(radicand)
        });
        if degree > MOST_DEGREE {
            let key = radicand.power(exponent.clone());
            return if key.is_undefined() {
                Err(Failure::Undefined(key))
            } else {
                Ok(Found::Variable { key, opaque: true })
            };
        }
        let degree = u32::try_from(degree).expect("invariant: checked in the line above");
        let reciprocal = Rational::new(1, i64::from(degree)).expect("invariant: a degree is above zero");
        let key = radicand.power(reciprocal);
        if key.is_undefined() {
            return Err(Failure::Undefined(key));
        }
        if let Some(value) = key.as_number() {
            let exponent = i32::try_from(power).map_err(|_| Limit::Exponent(i32::MAX.unsigned_abs()))?;
            let value = value.power(exponent).ok_or(Failure::Undefined(key.power(-1)))?;
            return Ok(Found::Number(value));
        }
        // What lies under the root is written in canonical form and may hold nodes not met before.
        self.resolve(&[radicand])?;
        let relation = self.canonical(radicand)?.fractions[0].as_polynomial().is_some();
        Ok(Found::Root {
            key,
            degree,
            power,
            radicand,
            relation,
        })
    }
}

/// Whether a node is a sum, a product or an integer power.
fn is_field_operation(node: Expr) -> bool {
    match node.kind() {
        Kind::Sum(_) | Kind::Product(_) => true,
        Kind::Power(_, exponent) => exponent.is_integer(),
        _ => false,
    }
}

/// A multiple of pi as a number of quarter turns from 0 to 3 and a rest from zero to below one half.
fn quarter_turns(coefficient: &Rational) -> (u8, Rational) {
    let doubled = coefficient * &Rational::from(2);
    let whole = doubled.numerator().div_floor(&doubled.denominator());
    let quarters = u8::try_from(whole.mod_floor(&4.into()));
    let quarters = quarters.expect("invariant: a remainder by four is below four");
    let whole = Rational::quotient(whole, 1.into()).expect("invariant: one is not zero");
    let rest = (&doubled - &whole).divided_by(&Rational::from(2));
    (quarters, rest.expect("invariant: two is not zero"))
}
