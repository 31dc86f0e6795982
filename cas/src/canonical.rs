//! The canonical form: fractions of polynomials over a basis, made from expressions and written back.

use std::collections::HashMap;

use crate::basis::{Basis, Failure, Leaf};
use crate::decide::Condition;
use crate::effort::{Limit, Meter};
use crate::expr::{Expr, Function, Kind};
use crate::fraction::{self, Fraction};
use crate::number::Rational;
use crate::ring::{Polynomial, Ring};

/// Several expressions as fractions over one basis.
pub(crate) struct Canonical<'m> {
    pub(crate) basis: Basis,
    pub(crate) ring: Ring<'m>,
    /// One for each expression.
    pub(crate) fractions: Vec<Fraction>,
    /// What was divided by, in factors.
    divisors: Vec<Polynomial>,
}

impl<'m> Canonical<'m> {
    /// The canonical form of these expressions.
    pub(crate) fn of(roots: &[Expr], meter: &'m Meter<'m>) -> Result<Self, Failure> {
        Self::in_basis(Basis::of(roots, meter)?, roots, meter)
    }

    /// The canonical form in a basis in which all of them can be expressed.
    pub(crate) fn in_basis(basis: Basis, roots: &[Expr], meter: &'m Meter<'m>) -> Result<Self, Failure> {
        let mut ring = Ring::new(basis.variables.len(), meter);
        for angle in &basis.angles {
            ring.relate_sine(angle.cosine + 1, angle.cosine);
        }
        let mut form = Self {
            basis,
            ring,
            fractions: Vec::new(),
            divisors: Vec::new(),
        };
        for root in form.basis.roots.clone() {
            let radicand = form.converted(&[root.radicand])?.swap_remove(0);
            form.ring.relate_root(root.place, root.degree, radicand.numerator);
        }
        form.fractions = form.converted(roots)?;
        Ok(form)
    }

    /// The expressions as fractions; what they divide by is noted.
    pub(crate) fn converted(&mut self, roots: &[Expr]) -> Result<Vec<Fraction>, Failure> {
        let mut done: HashMap<Expr, Fraction> = HashMap::new();
        let mut powers = HashMap::new();
        for node in self.basis.nodes(roots) {
            self.ring.meter.spend(1)?;
            let value = match self.basis.leaf(node).cloned() {
                Some(leaf) => self.leaf(node, &leaf, &mut powers)?,
                None => self.operation(node, &done)?,
            };
            done.insert(node, value);
        }
        Ok(roots.iter().map(|root| done[root].clone()).collect())
    }

    fn operation(&mut self, node: Expr, done: &HashMap<Expr, Fraction>) -> Result<Fraction, Failure> {
        let ring = &self.ring;
        match node.kind() {
            Kind::Sum(terms) => {
                let terms: Vec<&Fraction> = terms.iter().map(|term| &done[term]).collect();
                Ok(fraction::sum(ring, &terms)?)
            }
            Kind::Product(factors) => {
                let mut product = Fraction::whole(ring.constant(Rational::ONE));
                // Single terms first: multiplying by one of them keeps a polynomial in order.
                let single = |factor: &&Expr| done[*factor].numerator.len() == 1;
                let (first, then): (Vec<&Expr>, Vec<&Expr>) = factors.iter().partition(single);
                for factor in first.into_iter().chain(then) {
                    product = fraction::product(ring, &product, &done[factor])?;
                }
                Ok(product)
            }
            Kind::Power(base, exponent) => {
                let too_large = Limit::Exponent(u32::MAX);
                let exponent = exponent.as_integer().ok_or(too_large)?;
                let size = u32::try_from(exponent.unsigned_abs()).map_err(|_| too_large)?;
                let power = fraction::power(ring, &done[base], size)?;
                if exponent < 0 {
                    self.inverse(node, &power)
                } else {
                    Ok(power)
                }
            }
            Kind::Number(value) => Ok(Fraction::whole(ring.constant(value.clone()))),
            _ => Err(Failure::Undefined(node)),
        }
    }

    /// One over a fraction that stands for what `node` divides by.
    fn inverse(&mut self, node: Expr, value: &Fraction) -> Result<Fraction, Failure> {
        let variables = self.basis.variables.len();
        let Some((_, factors)) = fraction::factors(&self.ring, &value.numerator, variables)? else {
            return Err(Failure::Undefined(node));
        };
        for (factor, _) in factors {
            if !self.divisors.contains(&factor) {
                self.divisors.push(factor);
            }
        }
        let inverse = fraction::inverse(&self.ring, value, variables)?;
        inverse.ok_or(Failure::Undefined(node))
    }

    fn leaf(
        &mut self,
        node: Expr,
        leaf: &Leaf,
        powers: &mut HashMap<(usize, i64), [Polynomial; 2]>,
    ) -> Result<Fraction, Failure> {
        match leaf {
            Leaf::Number(value) => Ok(Fraction::whole(self.ring.constant(value.clone()))),
            Leaf::Variable(place) => Ok(Fraction::whole(self.ring.variable(*place))),
            Leaf::Root { place, power } => {
                let too_large = Limit::Exponent(u32::MAX);
                let size = u32::try_from(power.unsigned_abs()).map_err(|_| too_large)?;
                let value = Fraction::whole(self.ring.power(&self.ring.variable(*place), size)?);
                if *power < 0 {
                    self.inverse(node, &value)
                } else {
                    Ok(value)
                }
            }
            Leaf::Turn {
                function,
                angles,
                quarters,
            } => {
                let one = self.ring.constant(Rational::ONE);
                let mut turned = [one, Polynomial::default()];
                for (angle, count) in angles {
                    let multiple = self.multiple(*angle, *count, powers)?;
                    turned = turn(&self.ring, &turned, &multiple)?;
                }
                for _ in 0..*quarters {
                    let [cosine, sine] = turned;
                    turned = [self.ring.scaled(&sine, &(-1).into())?, cosine];
                }
                let [cosine, sine] = turned.map(Fraction::whole);
                match function {
                    Function::Cosine => Ok(cosine),
                    Function::Sine => Ok(sine),
                    _ => {
                        let inverse = self.inverse(node, &cosine)?;
                        Ok(fraction::product(&self.ring, &sine, &inverse)?)
                    }
                }
            }
        }
    }

    /// Cosine and sine of a multiple of a base angle.
    fn multiple(
        &self,
        angle: usize,
        count: i64,
        powers: &mut HashMap<(usize, i64), [Polynomial; 2]>,
    ) -> Result<[Polynomial; 2], Limit> {
        if let Some(known) = powers.get(&(angle, count)) {
            return Ok(known.clone());
        }
        let cosine = self.basis.angles[angle].cosine;
        let sign = Rational::from(count.signum());
        let unit = [
            self.ring.variable(cosine),
            self.ring.scaled(&self.ring.variable(cosine + 1), &sign)?,
        ];
        let mut result = [self.ring.constant(Rational::ONE), Polynomial::default()];
        for _ in 0..count.unsigned_abs() {
            result = turn(&self.ring, &result, &unit)?;
        }
        powers.insert((angle, count), result.clone());
        Ok(result)
    }

    /// What must hold for the expressions to have values.
    pub(crate) fn conditions(&self) -> Vec<Condition> {
        let mut conditions = self.basis.conditions.clone();
        for divisor in &self.divisors {
            let mut expr = self.polynomial(divisor);
            if let Some(root) = self
                .basis
                .roots
                .iter()
                .find(|root| self.basis.variables[root.place] == expr)
            {
                expr = root.radicand;
            }
            let condition = Condition::NotZero(expr);
            if expr.as_number().is_none() && !conditions.contains(&condition) {
                conditions.push(condition);
            }
        }
        conditions
    }

    /// The monomials of a fraction with their coefficients, where it has no denominator but monomials.
    pub(crate) fn monomials(&self, fraction: &Fraction) -> Option<Vec<(Expr, Rational)>> {
        let mut below = Vec::new();
        for (factor, exponent) in &fraction.denominator {
            if factor.len() != 1 {
                return None;
            }
            below.push(self.polynomial(factor).power(-i64::from(*exponent)));
        }
        let terms = self
            .ring
            .terms(&fraction.numerator)
            .map(|(exponents, coefficient)| {
                let above = self.monomial(&exponents);
                (
                    Expr::product_of(below.iter().copied().chain([above])),
                    coefficient.clone(),
                )
            });
        Some(terms.collect())
    }

    /// The monomial with these exponents as an expression.
    pub(crate) fn monomial(&self, exponents: &[u32]) -> Expr {
        let present = exponents
            .iter()
            .zip(&self.basis.variables)
            .filter(|(exponent, _)| **exponent > 0);
        Expr::product_of(present.map(|(exponent, variable)| variable.power(i64::from(*exponent))))
    }

    /// A polynomial as an expression.
    pub(crate) fn polynomial(&self, polynomial: &Polynomial) -> Expr {
        let terms = self.ring.terms(polynomial);
        Expr::sum_of(terms.map(|(exponents, coefficient)| {
            Expr::product_of([Expr::number(coefficient.clone()), self.monomial(&exponents)])
        }))
    }

    /// A fraction as an expression.
    pub(crate) fn expr(&self, fraction: &Fraction) -> Expr {
        let below = fraction
            .denominator
            .iter()
            .map(|(factor, exponent)| self.polynomial(factor).power(-i64::from(*exponent)));
        Expr::product_of([self.polynomial(&fraction.numerator)].into_iter().chain(below))
    }
}

/// Cosine and sine of the sum of two angles.
fn turn(ring: &Ring, a: &[Polynomial; 2], b: &[Polynomial; 2]) -> Result<[Polynomial; 2], Limit> {
    let [cc, ss, sc, cs] = [(0, 0), (1, 1), (1, 0), (0, 1)].map(|(i, j)| ring.product(&a[i], &b[j]));
    let minus = ring.scaled(&ss?, &(-1).into())?;
    Ok([ring.sum(&[&cc?, &minus])?, ring.sum(&[&sc?, &cs?])?])
}
