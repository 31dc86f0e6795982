//! Evaluation of an expression on any kind of real numbers: floats, dual numbers, intervals.

use std::collections::HashMap;

use num_rational::BigRational;
use num_traits::ToPrimitive;

use crate::expr::{Expr, Function, Kind, postorder};
use crate::number::Rational;

/// What evaluation needs of numbers; `None` where there is no value.
pub trait Real: Copy {
    /// The number nearest to a rational one, or one that contains it.
    fn rational(value: &Rational) -> Option<Self>;
    /// The ratio of a circle's circumference to its diameter.
    fn pi() -> Self;
    /// The sum.
    fn sum(self, other: Self) -> Option<Self>;
    /// The product.
    fn product(self, other: Self) -> Option<Self>;
    /// One over the value.
    fn inverse(self) -> Option<Self>;
    /// The root that is not negative.
    fn root(self, degree: u32) -> Option<Self>;
    /// An elementary function.
    fn elementary(self, function: Function) -> Option<Self>;
}

/// The value of an expression, given those of its symbols and undetermined functions.
///
/// `None` where it has no value there.
///
/// ```
/// use cas::{Expr, sample::evaluated, sqrt};
/// let x = Expr::symbol("x")?;
/// assert_eq!(evaluated(sqrt(x), |_| Some(2.25)), Some(1.5));
/// assert_eq!(evaluated(1 / x, |_| Some(0.0)), None);
/// # Ok::<(), cas::NameError>(())
/// ```
pub fn evaluated<R: Real>(expr: Expr, given: impl Fn(Expr) -> Option<R>) -> Option<R> {
    let mut done: HashMap<Expr, R> = HashMap::new();
    for node in postorder(&[expr]) {
        let value = match node.kind() {
            Kind::Number(value) => R::rational(value)?,
            Kind::Pi => R::pi(),
            Kind::Symbol(_) | Kind::Unknown(_) => given(node)?,
            Kind::Sum(terms) => {
                let mut sum = done[&terms[0]];
                for term in &terms[1..] {
                    sum = sum.sum(done[term])?;
                }
                sum
            }
            Kind::Product(factors) => {
                let mut product = done[&factors[0]];
                for factor in &factors[1..] {
                    product = product.product(done[factor])?;
                }
                product
            }
            Kind::Power(base, exponent) => power(done[base], exponent)?,
            Kind::Elementary(function, argument) => done[argument].elementary(*function)?,
        };
        done.insert(node, value);
    }
    Some(done[&expr])
}

fn power<R: Real>(base: R, exponent: &Rational) -> Option<R> {
    let (numerator, denominator) = exponent.as_small()?;
    let base = match u32::try_from(denominator).ok()? {
        1 => base,
        degree => base.root(degree)?,
    };
    let mut square = if numerator < 0 { base.inverse()? } else { base };
    let (mut result, mut rest) = (R::rational(&Rational::ONE)?, numerator.unsigned_abs());
    while rest > 0 {
        if rest & 1 == 1 {
            result = result.product(square)?;
        }
        rest >>= 1;
        if rest > 0 {
            square = square.product(square)?;
        }
    }
    Some(result)
}

impl Real for f64 {
    fn rational(value: &Rational) -> Option<Self> {
        BigRational::new(value.numerator(), value.denominator())
            .to_f64()
            .and_then(finite)
    }

    fn pi() -> Self {
        std::f64::consts::PI
    }

    fn sum(self, other: Self) -> Option<Self> {
        finite(self + other)
    }

    fn product(self, other: Self) -> Option<Self> {
        finite(self * other)
    }

    fn inverse(self) -> Option<Self> {
        finite(1.0 / self)
    }

    fn root(self, degree: u32) -> Option<Self> {
        match degree {
            2 => finite(self.sqrt()),
            _ if self < 0.0 => None,
            _ => finite(self.powf(1.0 / f64::from(degree))),
        }
    }

    fn elementary(self, function: Function) -> Option<Self> {
        finite(match function {
            Function::Sine => self.sin(),
            Function::Cosine => self.cos(),
            Function::Tangent => self.tan(),
            Function::Exponential => self.exp(),
            Function::Logarithm => self.ln(),
        })
    }
}

fn finite(value: f64) -> Option<f64> {
    value.is_finite().then_some(value)
}

/// A dual number: a value and its rate along one direction.
///
/// ```
/// use cas::{Expr, sample::{Dual, evaluated}, sin};
/// let x = Expr::symbol("x")?;
/// let found = evaluated(x * sin(x), |_| Some(Dual { value: 2.0, rate: 1.0 })).expect("a value");
/// assert!((found.rate - (2_f64.sin() + 2.0 * 2_f64.cos())).abs() < 1e-15);
/// # Ok::<(), cas::NameError>(())
/// ```
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Dual {
    /// The value.
    pub value: f64,
    /// Its rate.
    pub rate: f64,
}

impl Dual {
    fn of(value: Option<f64>, rate: f64) -> Option<Self> {
        Some(Self {
            value: value?,
            rate: finite(rate)?,
        })
    }
}

impl Real for Dual {
    fn rational(value: &Rational) -> Option<Self> {
        Self::of(f64::rational(value), 0.0)
    }

    fn pi() -> Self {
        Self {
            value: std::f64::consts::PI,
            rate: 0.0,
        }
    }

    fn sum(self, other: Self) -> Option<Self> {
        Self::of(self.value.sum(other.value), self.rate + other.rate)
    }

    fn product(self, other: Self) -> Option<Self> {
        let rate = self.rate * other.value + self.value * other.rate;
        Self::of(self.value.product(other.value), rate)
    }

    fn inverse(self) -> Option<Self> {
        Self::of(self.value.inverse(), -self.rate / (self.value * self.value))
    }

    fn root(self, degree: u32) -> Option<Self> {
        let root = self.value.root(degree)?;
        Self::of(Some(root), self.rate * root / (f64::from(degree) * self.value))
    }

    fn elementary(self, function: Function) -> Option<Self> {
        let value = self.value.elementary(function)?;
        let slope = match function {
            Function::Sine => self.value.cos(),
            Function::Cosine => -self.value.sin(),
            Function::Tangent => 1.0 + value * value,
            Function::Exponential => value,
            Function::Logarithm => 1.0 / self.value,
        };
        Self::of(Some(value), self.rate * slope)
    }
}
