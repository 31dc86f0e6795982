//! Constructors: the rules by which nodes are put together, none of which loses a condition.

use std::collections::HashMap;

use super::node::{Application, Expr, Function, Kind};
use super::operators::IntoExpr;
use super::symbol::{Name, NameError, Symbol};
use crate::number::Rational;

/// Sums and products above this many parts are kept nested, so that adding one term at a time to a
/// long sum stays linear.
const MOST_FLAT: usize = 256;

/// Numeric powers above this many bits stay unevaluated.
const MOST_POWER_BITS: u64 = 65_536;

/// The ratio of a circle's circumference to its diameter.
#[must_use]
pub fn pi() -> Expr {
    Expr::interned(Kind::Pi)
}

/// The sine of an angle in radians.
pub fn sin(angle: impl IntoExpr) -> Expr {
    Expr::elementary(Function::Sine, angle.into_expr())
}

/// The cosine of an angle in radians.
pub fn cos(angle: impl IntoExpr) -> Expr {
    Expr::elementary(Function::Cosine, angle.into_expr())
}

/// The tangent of an angle in radians.
pub fn tan(angle: impl IntoExpr) -> Expr {
    Expr::elementary(Function::Tangent, angle.into_expr())
}

/// The exponential function.
pub fn exp(exponent: impl IntoExpr) -> Expr {
    Expr::elementary(Function::Exponential, exponent.into_expr())
}

/// The natural logarithm.
pub fn ln(value: impl IntoExpr) -> Expr {
    Expr::elementary(Function::Logarithm, value.into_expr())
}

/// The square root, the power one half.
pub fn sqrt(value: impl IntoExpr) -> Expr {
    value
        .into_expr()
        .power(Rational::new(1, 2).expect("invariant: two is not zero"))
}

impl Expr {
    /// Zero.
    #[must_use]
    pub fn zero() -> Self {
        Self::number(Rational::ZERO)
    }

    /// One.
    #[must_use]
    pub fn one() -> Self {
        Self::number(Rational::ONE)
    }

    /// An exact number.
    #[must_use]
    pub fn number(value: Rational) -> Self {
        Self::interned(Kind::Number(value))
    }

    /// The variable of this name.
    ///
    /// # Errors
    /// As [`Name::new`].
    pub fn symbol(name: &str) -> Result<Self, NameError> {
        Symbol::new(name).map(Self::from)
    }

    /// An undetermined function of this name at these arguments.
    ///
    /// ```
    /// use cas::{Expr, Name};
    /// let x = Expr::symbol("x")?;
    /// let potential = Expr::unknown(Name::new("U")?, &[x]);
    /// assert!(!potential.is_undefined());
    /// # Ok::<(), cas::NameError>(())
    /// ```
    #[must_use]
    pub fn unknown(name: Name, arguments: &[Self]) -> Self {
        Self::unknown_derivative(name, &vec![0; arguments.len()], arguments)
    }

    /// The partial derivative of an undetermined function, `orders[i]` times by argument `i`.
    ///
    /// A missing order counts as zero, and orders beyond the arguments are ignored.
    #[must_use]
    pub fn unknown_derivative(name: Name, orders: &[u32], arguments: &[Self]) -> Self {
        let orders = (0..arguments.len())
            .map(|i| orders.get(i).copied().unwrap_or(0))
            .collect();
        Self::interned(Kind::Unknown(Application {
            name,
            orders,
            arguments: arguments.into(),
        }))
    }

    /// The number that the expression is, where it is one.
    #[must_use]
    pub fn as_number(self) -> Option<&'static Rational> {
        match self.kind() {
            Kind::Number(value) => Some(value),
            _ => None,
        }
    }

    /// The variable that the expression is, where it is one.
    #[must_use]
    pub fn as_symbol(self) -> Option<Symbol> {
        match self.kind() {
            Kind::Symbol(symbol) => Some(*symbol),
            _ => None,
        }
    }

    /// Whether the expression is the number zero; other spellings of zero are not looked for.
    #[must_use]
    pub fn is_zero(self) -> bool {
        self.as_number().is_some_and(Rational::is_zero)
    }

    /// Whether the expression is the number one; other spellings of one are not looked for.
    #[must_use]
    pub fn is_one(self) -> bool {
        self.as_number().is_some_and(Rational::is_one)
    }

    /// The numeric factor in front, and what it multiplies.
    #[must_use]
    pub fn coefficient_and_rest(self) -> (Rational, Self) {
        match self.kind() {
            Kind::Number(value) => (value.clone(), Self::one()),
            Kind::Product(factors) => match factors[0].as_number() {
                Some(value) if factors.len() == 2 => (value.clone(), factors[1]),
                Some(value) => (value.clone(), Self::interned(Kind::Product(factors[1..].into()))),
                None => (Rational::ONE, self),
            },
            _ => (Rational::ONE, self),
        }
    }

    /// The sum of all terms.
    ///
    /// Nested sums are flattened and equal terms counted: `x + x` is `2 x`. A term that may lack a
    /// value somewhere is kept with the coefficient zero instead of vanishing.
    pub fn sum_of(terms: impl IntoIterator<Item = Self>) -> Self {
        let mut flat = Vec::new();
        for term in terms {
            match term.kind() {
                Kind::Sum(inner) if inner.len() <= MOST_FLAT => flat.extend_from_slice(inner),
                _ => flat.push(term),
            }
        }
        let (mut constant, mut places, mut collected) =
            (Rational::ZERO, HashMap::new(), Vec::<(Self, Rational)>::new());
        for term in flat {
            let (coefficient, rest) = term.coefficient_and_rest();
            if rest.is_one() {
                constant = &constant + &coefficient;
                continue;
            }
            let place = *places.entry(rest).or_insert(collected.len());
            match collected.get_mut(place) {
                Some((_, sum)) => *sum = &*sum + &coefficient,
                None => collected.push((rest, coefficient)),
            }
        }
        let mut terms: Vec<Self> = collected
            .into_iter()
            .filter(|(rest, coefficient)| !(coefficient.is_zero() && rest.is_total()))
            .map(|(rest, coefficient)| rest.scaled(coefficient))
            .collect();
        if !constant.is_zero() {
            terms.push(Self::number(constant));
        }
        match terms.as_slice() {
            [] => Self::zero(),
            [only] => *only,
            _ => {
                terms.sort_unstable();
                Self::interned(Kind::Sum(terms.into()))
            }
        }
    }

    /// A number times an expression without numeric factor of its own.
    fn scaled(self, coefficient: Rational) -> Self {
        if coefficient.is_one() {
            return self;
        }
        let number = Self::number(coefficient);
        if self.is_one() {
            return number;
        }
        let rest = match self.kind() {
            Kind::Product(factors) => factors,
            _ => std::slice::from_ref(&self),
        };
        Self::interned(Kind::Product(
            std::iter::once(number).chain(rest.iter().copied()).collect(),
        ))
    }

    /// The product of all factors.
    ///
    /// Nested products are flattened, numbers multiplied, and powers of one base merged where both
    /// exponents are positive integers or both negative integers: `x / x` stays, because it has no
    /// value at zero.
    pub fn product_of(factors: impl IntoIterator<Item = Self>) -> Self {
        let mut flat = Vec::new();
        for factor in factors {
            match factor.kind() {
                Kind::Product(inner) if inner.len() <= MOST_FLAT => flat.extend_from_slice(inner),
                _ => flat.push(factor),
            }
        }
        let (mut coefficient, mut places, mut powers) =
            (Rational::ONE, HashMap::new(), Vec::<(Self, Rational)>::new());
        for factor in flat {
            if let Some(value) = factor.as_number() {
                coefficient = &coefficient * value;
                continue;
            }
            let (base, exponent) = match factor.kind() {
                Kind::Power(base, exponent) if exponent.is_integer() => (*base, exponent.clone()),
                _ => (factor, Rational::ONE),
            };
            let place = *places
                .entry((base, exponent.is_negative()))
                .or_insert(powers.len());
            match powers.get_mut(place) {
                // A root times itself is less defined than its radicand, so roots are not merged.
                Some((known, sum)) if merges(*known) => *sum = &*sum + &exponent,
                _ => powers.push((base, exponent)),
            }
        }
        let mut factors: Vec<Self> = powers
            .into_iter()
            .map(|(base, exponent)| base.power(exponent))
            .collect();
        if factors.iter().any(|f| f.as_number().is_some()) {
            for value in factors.iter().filter_map(|f| f.as_number()) {
                coefficient = &coefficient * value;
            }
            factors.retain(|f| f.as_number().is_none());
        }
        if coefficient.is_zero() && factors.iter().all(|f| f.is_total()) {
            return Self::zero();
        }
        match factors.as_slice() {
            [] => return Self::number(coefficient),
            [only] => return only.without_product(coefficient),
            _ => factors.sort_unstable(),
        }
        if !coefficient.is_one() {
            factors.insert(0, Self::number(coefficient));
        }
        Self::interned(Kind::Product(factors.into()))
    }

    /// A number times one factor, which a large product may be.
    fn without_product(self, coefficient: Rational) -> Self {
        let (own, rest) = self.coefficient_and_rest();
        rest.scaled(&own * &coefficient)
    }

    /// The power with a rational exponent.
    ///
    /// For a fraction `p/q` in lowest terms this is the nonnegative real root of degree `q`, to the
    /// power `p`; it has a value only where the base is not negative (and not zero for negative
    /// exponents).
    #[must_use]
    pub fn power(self, exponent: impl Into<Rational>) -> Self {
        let exponent = exponent.into();
        if exponent.is_one() {
            return self;
        }
        if exponent.is_zero() && self.is_total() {
            return Self::one();
        }
        if let Some(value) = self.as_number().and_then(|n| numeric_power(n, &exponent)) {
            return Self::number(value);
        }
        if let Kind::Power(base, inner) = self.kind() {
            let merged = inner * &exponent;
            // Two negative exponents would make `1/(1/x)` defined at zero.
            let loses_nothing = inner.is_integer()
                && exponent.is_integer()
                && (inner.is_positive() || exponent.is_positive());
            if loses_nothing {
                return base.power(merged);
            }
        }
        Self::interned(Kind::Power(self, exponent))
    }

    /// The square.
    #[must_use]
    pub fn squared(self) -> Self {
        self.power(2)
    }

    /// An elementary function of an argument; values at zero and one, and the sign of a numeric
    /// factor in sine, cosine and tangent, are resolved.
    #[must_use]
    pub fn elementary(function: Function, argument: Self) -> Self {
        let (coefficient, rest) = argument.coefficient_and_rest();
        let opposite = coefficient.is_negative();
        match function {
            Function::Sine | Function::Tangent if argument.is_zero() => Self::zero(),
            Function::Cosine | Function::Exponential if argument.is_zero() => Self::one(),
            Function::Logarithm if argument.is_one() => Self::zero(),
            Function::Cosine if opposite => {
                Self::interned(Kind::Elementary(function, rest.without_product(-coefficient)))
            }
            Function::Sine | Function::Tangent if opposite => {
                -Self::interned(Kind::Elementary(function, rest.without_product(-coefficient)))
            }
            _ => Self::interned(Kind::Elementary(function, argument)),
        }
    }

    /// The same operation on other parts, as many as [`children`](Self::children) has.
    #[must_use]
    pub fn with_children(self, parts: &[Self]) -> Self {
        match self.kind() {
            Kind::Number(_) | Kind::Pi | Kind::Symbol(_) => self,
            Kind::Sum(_) => Self::sum_of(parts.iter().copied()),
            Kind::Product(_) => Self::product_of(parts.iter().copied()),
            Kind::Power(_, exponent) => parts[0].power(exponent.clone()),
            Kind::Elementary(function, _) => Self::elementary(*function, parts[0]),
            Kind::Unknown(a) => Self::unknown_derivative(a.name, &a.orders, parts),
        }
    }
}

fn merges(base: Expr) -> bool {
    !matches!(base.kind(), Kind::Power(_, exponent) if !exponent.is_integer())
}

fn numeric_power(base: &Rational, exponent: &Rational) -> Option<Rational> {
    let (p, q) = exponent.as_small()?;
    let (p, q) = (i32::try_from(p).ok()?, u32::try_from(q).ok()?);
    let root = if q == 1 { base.clone() } else { base.exact_root(q)? };
    let bits = root.bits().checked_mul(u64::from(p.unsigned_abs()))?;
    (bits <= MOST_POWER_BITS || root.absolute().is_one())
        .then(|| root.power(p))
        .flatten()
}

impl From<Symbol> for Expr {
    fn from(symbol: Symbol) -> Self {
        Self::interned(Kind::Symbol(symbol))
    }
}

impl From<Rational> for Expr {
    fn from(value: Rational) -> Self {
        Self::number(value)
    }
}

impl From<i64> for Expr {
    fn from(value: i64) -> Self {
        Self::number(value.into())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn xyz() -> [Expr; 3] {
        ["x", "y", "z"].map(|name| Expr::symbol(name).expect("a valid name"))
    }

    #[test]
    fn sums_and_products_do_not_depend_on_order() {
        let [x, y, z] = xyz();
        assert_eq!(x + y + z, z + (y + x));
        assert_eq!(x * y * z, z * (y * x));
        assert_eq!(x + x, 2 * x);
        assert_eq!(x * x, x.squared());
        assert_eq!(x - x, Expr::zero());
        assert_eq!(-(x - y), y - x);
        assert_ne!(x + y, x * y);
    }

    #[test]
    fn nothing_loses_a_condition() {
        let [x, y, _] = xyz();
        assert_ne!(x / x, Expr::one());
        assert!(!(Expr::zero() * (y / x)).is_zero());
        assert!(!(y / x - y / x).is_zero());
        assert_ne!(sqrt(x) * sqrt(x), x);
        assert_ne!((1 / x).power(-1), x);
        assert_eq!(1 / (x * x), (1 / x).squared());
        assert!((Expr::zero() * x).is_zero());
    }

    #[test]
    fn undefined_operations_stay_visible() {
        let [x, y, _] = xyz();
        assert!((x / 0).is_undefined());
        assert!((y + sin(x / (x - x))).is_undefined());
        assert!(sqrt(-2).is_undefined());
        assert!(ln(0).is_undefined());
        assert!(!sqrt(2).is_undefined());
        assert!(!(x / y).is_undefined());
    }

    #[test]
    fn numbers_are_computed() {
        assert_eq!(sqrt(Expr::from(9) / 4), Expr::from(3) / 2);
        assert_eq!(Expr::from(2).power(10), Expr::from(1024));
        assert!(
            Expr::from(2).power(i32::MAX).as_number().is_none(),
            "a huge power stays unevaluated"
        );
        assert_eq!(cos(0), Expr::one());
        let [x, ..] = xyz();
        assert_eq!(sin(-2 * x), -sin(2 * x));
        assert_eq!(cos(-x), cos(x));
        let half = Expr::from(1) / 2;
        assert_eq!(sin(-half), -sin(half));
    }

    #[test]
    fn long_sums_and_deep_towers_are_cheap() {
        let [x, ..] = xyz();
        let mut sum = Expr::zero();
        for i in 1..20_000 {
            sum += sin(i * x);
        }
        assert!(sum.node_count() > 20_000);
        let tower = (0..100_000).fold(x, |inner, _| sin(inner));
        assert_eq!(tower.symbols().len(), 1);
    }
}
