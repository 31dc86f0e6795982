//! Exact rational numbers: two machine words while they fit, `num-rational` beyond.
//!
//! Invariant: lowest terms, positive denominator, and the inline form whenever both parts fit in
//! an `i64`. Every value goes through one of the two private constructors `fitted` and `reduced`,
//! so equality and hashing may compare representations.

use std::cmp::Ordering;
use std::fmt;
use std::ops::{Add, Div, Mul, Neg, Sub};
use std::str::FromStr;

use num_bigint::BigInt;
use num_integer::Integer;
use num_rational::BigRational;
use num_traits::{One, Signed, ToPrimitive, Zero};

/// An exact rational number in lowest terms.
///
/// ```
/// use cas::Rational;
/// let mass: Rational = "9.81".parse()?;
/// assert_eq!(mass, Rational::new(981, 100).expect("denominator is not zero"));
/// assert_eq!((&mass + &mass).to_string(), "981/50");
/// # Ok::<(), cas::NumberError>(())
/// ```
#[derive(Clone, PartialEq, Eq, Hash)]
pub struct Rational(Repr);

#[derive(Clone, PartialEq, Eq, Hash)]
enum Repr {
    Small(i64, i64),
    Big(Box<BigRational>),
}

/// Why a text is not a number that can be read exactly.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum NumberError {
    /// The text is neither an integer, a decimal, nor a quotient of integers.
    #[error("`{text}` is not a number that can be read exactly")]
    NotANumber {
        /// The text as given.
        text: String,
    },
    /// The denominator of a quotient is zero.
    #[error("`{text}` divides by zero")]
    ZeroDenominator {
        /// The text as given.
        text: String,
    },
    /// The text has more digits than are accepted.
    #[error("a number of {digits} digits was given, at most {limit} are read")]
    TooLong {
        /// Length of the text.
        digits: usize,
        /// The limit.
        limit: usize,
    },
}

impl NumberError {
    /// What to write instead.
    #[must_use]
    pub fn hint(&self) -> &'static str {
        match self {
            Self::NotANumber { .. } => {
                "write an integer, a decimal or a quotient: \"9.81\", \"-3\", \"1/3\", \"2.5e-3\""
            }
            Self::ZeroDenominator { .. } => "write a quotient with a denominator other than zero",
            Self::TooLong { .. } => "shorten the number",
        }
    }
}

const MOST_DIGITS: usize = 4_000;

impl Rational {
    /// Zero.
    pub const ZERO: Self = Self(Repr::Small(0, 1));
    /// One.
    pub const ONE: Self = Self(Repr::Small(1, 1));

    /// The quotient of two integers, `None` where the denominator is zero.
    #[must_use]
    pub fn new(numerator: i64, denominator: i64) -> Option<Self> {
        (denominator != 0).then(|| Self::fitted(i128::from(numerator), i128::from(denominator)))
    }

    /// The quotient of two integers of any size, `None` where the denominator is zero.
    #[must_use]
    pub fn quotient(numerator: BigInt, denominator: BigInt) -> Option<Self> {
        (!denominator.is_zero()).then(|| Self::reduced(BigRational::new(numerator, denominator)))
    }

    fn fitted(numerator: i128, denominator: i128) -> Self {
        if denominator == 1
            && let Ok(n) = i64::try_from(numerator)
        {
            return Self(Repr::Small(n, 1));
        }
        let divisor = gcd(numerator.unsigned_abs(), denominator.unsigned_abs()).cast_signed();
        let sign = if denominator < 0 { -1 } else { 1 };
        let (n, d) = (numerator / divisor * sign, denominator / divisor * sign);
        match (i64::try_from(n), i64::try_from(d)) {
            (Ok(n), Ok(d)) => Self(Repr::Small(n, d)),
            _ => Self(Repr::Big(Box::new(BigRational::new_raw(n.into(), d.into())))),
        }
    }

    fn reduced(value: BigRational) -> Self {
        match (value.numer().to_i64(), value.denom().to_i64()) {
            (Some(n), Some(d)) => Self(Repr::Small(n, d)),
            _ => Self(Repr::Big(Box::new(value))),
        }
    }

    fn big(&self) -> BigRational {
        match &self.0 {
            Repr::Small(n, d) => BigRational::new_raw((*n).into(), (*d).into()),
            Repr::Big(b) => (**b).clone(),
        }
    }

    /// The numerator in lowest terms; it carries the sign.
    #[must_use]
    pub fn numerator(&self) -> BigInt {
        match &self.0 {
            Repr::Small(n, _) => (*n).into(),
            Repr::Big(b) => b.numer().clone(),
        }
    }

    /// The denominator in lowest terms; it is positive.
    #[must_use]
    pub fn denominator(&self) -> BigInt {
        match &self.0 {
            Repr::Small(_, d) => (*d).into(),
            Repr::Big(b) => b.denom().clone(),
        }
    }

    /// Numerator and denominator where both fit in an `i64`.
    #[must_use]
    pub fn as_small(&self) -> Option<(i64, i64)> {
        match &self.0 {
            Repr::Small(n, d) => Some((*n, *d)),
            Repr::Big(_) => None,
        }
    }

    /// The value where it is an integer that fits in an `i64`.
    #[must_use]
    pub fn as_integer(&self) -> Option<i64> {
        match &self.0 {
            Repr::Small(n, 1) => Some(*n),
            _ => None,
        }
    }

    /// Whether the denominator is one.
    #[must_use]
    pub fn is_integer(&self) -> bool {
        match &self.0 {
            Repr::Small(_, d) => *d == 1,
            Repr::Big(b) => b.denom().is_one(),
        }
    }

    /// Whether the value is zero.
    #[must_use]
    pub fn is_zero(&self) -> bool {
        matches!(self.0, Repr::Small(0, _))
    }

    /// Whether the value is one.
    #[must_use]
    pub fn is_one(&self) -> bool {
        matches!(self.0, Repr::Small(1, 1))
    }

    /// Whether the value is below zero.
    #[must_use]
    pub fn is_negative(&self) -> bool {
        match &self.0 {
            Repr::Small(n, _) => *n < 0,
            Repr::Big(b) => b.is_negative(),
        }
    }

    /// Whether the value is above zero.
    #[must_use]
    pub fn is_positive(&self) -> bool {
        !self.is_negative() && !self.is_zero()
    }

    /// The absolute value.
    #[must_use]
    pub fn absolute(&self) -> Self {
        if self.is_negative() { -self } else { self.clone() }
    }

    /// One over the value, `None` for zero.
    #[must_use]
    pub fn reciprocal(&self) -> Option<Self> {
        match &self.0 {
            Repr::Small(0, _) => None,
            Repr::Small(n, d) => Some(Self::fitted(i128::from(*d), i128::from(*n))),
            Repr::Big(b) => Some(Self::reduced(b.recip())),
        }
    }

    /// The quotient, `None` where the divisor is zero.
    #[must_use]
    pub fn divided_by(&self, divisor: &Self) -> Option<Self> {
        divisor.reciprocal().map(|r| self * &r)
    }

    /// The integer power, `None` for zero to a negative exponent.
    ///
    /// The caller bounds the exponent: the result has about `|exponent|` times as many digits.
    #[must_use]
    pub fn power(&self, exponent: i32) -> Option<Self> {
        if exponent < 0 {
            return self.reciprocal().and_then(|r| r.power(exponent.checked_neg()?));
        }
        let (mut result, mut square, mut rest) = (Self::ONE, self.clone(), exponent.unsigned_abs());
        while rest > 0 {
            if rest & 1 == 1 {
                result = &result * &square;
            }
            rest >>= 1;
            if rest > 0 {
                square = &square * &square;
            }
        }
        Some(result)
    }

    /// The exact root of a nonnegative value where it is rational.
    #[must_use]
    pub fn exact_root(&self, degree: u32) -> Option<Self> {
        if self.is_negative() || degree == 0 {
            return None;
        }
        let root = |n: &BigInt| {
            let r = n.nth_root(degree);
            (num_traits::pow(r.clone(), degree as usize) == *n).then_some(r)
        };
        Self::quotient(root(&self.numerator())?, root(&self.denominator())?)
    }

    /// How many bits numerator and denominator have together: the measure that limits speak of.
    #[must_use]
    pub fn bits(&self) -> u64 {
        match &self.0 {
            Repr::Small(n, d) => {
                u64::from(128 - n.unsigned_abs().leading_zeros() - d.unsigned_abs().leading_zeros())
            }
            Repr::Big(b) => b.numer().bits() + b.denom().bits(),
        }
    }

    /// The value modulo a prime, `None` where the prime divides the denominator.
    #[must_use]
    pub fn modulo(&self, prime: u64) -> Option<u64> {
        let residue = |n: &BigInt| {
            n.mod_floor(&prime.into())
                .to_u64()
                .expect("invariant: a residue is below its modulus")
        };
        let (n, d) = match &self.0 {
            Repr::Small(n, d) => {
                let p = i128::from(prime);
                let small = |v: i64| {
                    u64::try_from(i128::from(v).rem_euclid(p))
                        .expect("invariant: a residue is below its modulus")
                };
                (small(*n), small(*d))
            }
            Repr::Big(b) => (residue(b.numer()), residue(b.denom())),
        };
        if d == 1 {
            return Some(n);
        }
        inverse_modulo(d, prime).map(|i| multiplied_modulo(n, i, prime))
    }
}

/// `a b` modulo `prime`.
pub(crate) fn multiplied_modulo(a: u64, b: u64, prime: u64) -> u64 {
    let product = u128::from(a) * u128::from(b) % u128::from(prime);
    u64::try_from(product).expect("invariant: a residue is below its modulus")
}

/// The inverse of `a` modulo `prime`, `None` for a multiple of the prime.
pub(crate) fn inverse_modulo(a: u64, prime: u64) -> Option<u64> {
    if a.is_multiple_of(prime) {
        return None;
    }
    // Fermat: a^(p-2) is the inverse for a prime p.
    let (mut result, mut square, mut rest) = (1, a % prime, prime - 2);
    while rest > 0 {
        if rest & 1 == 1 {
            result = multiplied_modulo(result, square, prime);
        }
        square = multiplied_modulo(square, square, prime);
        rest >>= 1;
    }
    Some(result)
}

fn gcd(mut a: u128, mut b: u128) -> u128 {
    // Machine words are the common case, and a 128-bit remainder costs ten times a 64-bit one.
    while b != 0 {
        if let (Ok(x), Ok(y)) = (u64::try_from(a), u64::try_from(b)) {
            return u128::from(x.gcd(&y));
        }
        (a, b) = (b, a % b);
    }
    a
}

impl From<i64> for Rational {
    fn from(value: i64) -> Self {
        Self(Repr::Small(value, 1))
    }
}

impl From<i32> for Rational {
    fn from(value: i32) -> Self {
        Self(Repr::Small(value.into(), 1))
    }
}

impl From<BigInt> for Rational {
    fn from(value: BigInt) -> Self {
        Self::reduced(BigRational::from_integer(value))
    }
}

impl Ord for Rational {
    fn cmp(&self, other: &Self) -> Ordering {
        match (&self.0, &other.0) {
            (Repr::Small(a, b), Repr::Small(c, d)) => {
                (i128::from(*a) * i128::from(*d)).cmp(&(i128::from(*c) * i128::from(*b)))
            }
            _ => self.big().cmp(&other.big()),
        }
    }
}

impl PartialOrd for Rational {
    fn partial_cmp(&self, other: &Self) -> Option<Ordering> {
        Some(self.cmp(other))
    }
}

impl Add for &Rational {
    type Output = Rational;
    fn add(self, other: Self) -> Rational {
        match (&self.0, &other.0) {
            (Repr::Small(a, 1), Repr::Small(c, 1)) => Rational::fitted(i128::from(*a) + i128::from(*c), 1),
            // Each product is below 2^126, so neither the sum nor the denominator overflows.
            (Repr::Small(a, b), Repr::Small(c, d)) => Rational::fitted(
                i128::from(*a) * i128::from(*d) + i128::from(*c) * i128::from(*b),
                i128::from(*b) * i128::from(*d),
            ),
            _ => Rational::reduced(self.big() + other.big()),
        }
    }
}

impl Mul for &Rational {
    type Output = Rational;
    fn mul(self, other: Self) -> Rational {
        match (&self.0, &other.0) {
            (Repr::Small(a, b), Repr::Small(c, d)) => {
                Rational::fitted(i128::from(*a) * i128::from(*c), i128::from(*b) * i128::from(*d))
            }
            _ => Rational::reduced(self.big() * other.big()),
        }
    }
}

impl Neg for &Rational {
    type Output = Rational;
    fn neg(self) -> Rational {
        match &self.0 {
            Repr::Small(n, d) => Rational::fitted(-i128::from(*n), i128::from(*d)),
            Repr::Big(b) => Rational::reduced(-(**b).clone()),
        }
    }
}

impl Sub for &Rational {
    type Output = Rational;
    fn sub(self, other: Self) -> Rational {
        self + &-other
    }
}

macro_rules! owned_operators {
    ($($operator:ident $method:ident),*) => {$(
        impl $operator for Rational {
            type Output = Rational;
            fn $method(self, other: Self) -> Rational {
                $operator::$method(&self, &other)
            }
        }
    )*};
}
owned_operators!(Add add, Sub sub, Mul mul);

impl Neg for Rational {
    type Output = Rational;
    fn neg(self) -> Rational {
        -&self
    }
}

impl Div for Rational {
    type Output = Option<Rational>;
    fn div(self, other: Self) -> Option<Rational> {
        self.divided_by(&other)
    }
}

impl fmt::Display for Rational {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match &self.0 {
            Repr::Small(n, 1) => write!(f, "{n}"),
            Repr::Small(n, d) => write!(f, "{n}/{d}"),
            Repr::Big(b) => write!(f, "{b}"),
        }
    }
}

impl fmt::Debug for Rational {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{self}")
    }
}

impl FromStr for Rational {
    type Err = NumberError;

    /// Reads an integer, a decimal with optional power of ten, or a quotient of two integers.
    fn from_str(text: &str) -> Result<Self, NumberError> {
        if text.len() > MOST_DIGITS {
            return Err(NumberError::TooLong {
                digits: text.len(),
                limit: MOST_DIGITS,
            });
        }
        let refuse = || NumberError::NotANumber {
            text: text.to_owned(),
        };
        let integer = |t: &str| -> Result<BigInt, NumberError> {
            let digits = t.strip_prefix(['+', '-']).unwrap_or(t);
            if digits.is_empty() || !digits.bytes().all(|b| b.is_ascii_digit()) {
                return Err(refuse());
            }
            t.parse().map_err(|_| refuse())
        };
        let trimmed = text.trim();
        if let Some((n, d)) = trimmed.split_once('/') {
            return Self::quotient(integer(n.trim_end())?, integer(d.trim_start())?).ok_or_else(|| {
                NumberError::ZeroDenominator {
                    text: text.to_owned(),
                }
            });
        }
        let (mantissa, exponent) = match trimmed.split_once(['e', 'E']) {
            Some((m, e)) => (m, e.parse::<i32>().map_err(|_| refuse())?),
            None => (trimmed, 0),
        };
        let (whole, decimals) = mantissa.split_once('.').unwrap_or((mantissa, ""));
        let sign_only = whole.is_empty() || whole == "-" || whole == "+";
        if (sign_only && decimals.is_empty()) || !decimals.bytes().all(|b| b.is_ascii_digit()) {
            return Err(refuse());
        }
        let shift = i64::from(exponent) - i64::try_from(decimals.len()).map_err(|_| refuse())?;
        if shift.unsigned_abs() > MOST_DIGITS as u64 {
            return Err(NumberError::TooLong {
                digits: usize::try_from(shift.unsigned_abs()).unwrap_or(usize::MAX),
                limit: MOST_DIGITS,
            });
        }
        let digits = integer(&if sign_only {
            format!("{whole}0{decimals}")
        } else {
            format!("{whole}{decimals}")
        })?;
        let scale = num_traits::pow(
            BigInt::from(10),
            usize::try_from(shift.unsigned_abs()).unwrap_or(MOST_DIGITS),
        );
        if shift < 0 {
            Self::quotient(digits, scale).ok_or_else(refuse)
        } else {
            Ok(Self::from(digits * scale))
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    fn rational() -> impl Strategy<Value = Rational> {
        let edge = prop_oneof![
            Just(0),
            Just(1),
            Just(-1),
            Just(i64::MAX),
            Just(i64::MIN),
            any::<i64>(),
            -9..9_i64
        ];
        (edge.clone(), edge).prop_filter_map("zero denominator", |(n, d)| Rational::new(n, d))
    }

    proptest! {
        #[test]
        fn agrees_with_num_rational(a in rational(), b in rational()) {
            prop_assert_eq!((&a + &b).big(), a.big() + b.big());
            prop_assert_eq!((&a - &b).big(), a.big() - b.big());
            prop_assert_eq!((&a * &b).big(), a.big() * b.big());
            prop_assert_eq!(a.cmp(&b), a.big().cmp(&b.big()));
            if !b.is_zero() {
                prop_assert_eq!(a.divided_by(&b).expect("nonzero").big(), a.big() / b.big());
            }
        }

        #[test]
        fn is_canonical(a in rational(), b in rational()) {
            let c = &(&a * &b) + &a;
            prop_assert!(c.denominator().is_positive());
            prop_assert!(c.numerator().gcd(&c.denominator()).is_one());
            prop_assert_eq!(c.as_small().is_some(), c.numerator().to_i64().is_some() && c.denominator().to_i64().is_some());
        }

        #[test]
        fn reads_what_it_writes(a in rational()) {
            prop_assert_eq!(a.to_string().parse::<Rational>(), Ok(a));
        }

        #[test]
        fn modulo_is_a_ring_map(a in rational(), b in rational()) {
            let p = 2_305_843_009_213_693_951;
            if let (Some(x), Some(y)) = (a.modulo(p), b.modulo(p)) {
                prop_assert_eq!((&a * &b).modulo(p), Some(multiplied_modulo(x, y, p)));
                prop_assert_eq!((&a + &b).modulo(p), Some((x + y) % p));
            }
        }
    }

    #[test]
    fn decimals_are_exact() {
        let read = |t: &str| t.parse::<Rational>().map(|r| r.to_string());
        assert_eq!(read("9.81").as_deref(), Ok("981/100"));
        assert_eq!(read("-.5").as_deref(), Ok("-1/2"));
        assert_eq!(read("2.50e-3").as_deref(), Ok("1/400"));
        assert_eq!(read("1e3").as_deref(), Ok("1000"));
        for bad in [
            "", ".", "-", "1.2.3", "0x10", "1/ 2/3", "NaN", "1e", "--1", "1_000",
        ] {
            assert!(read(bad).is_err(), "{bad} was read");
        }
        assert!(matches!(read("1/0"), Err(NumberError::ZeroDenominator { .. })));
        assert!(matches!(read("1e999999999"), Err(NumberError::TooLong { .. })));
    }

    #[test]
    fn roots_are_exact_or_refused() {
        assert_eq!(
            Rational::new(9, 4).and_then(|r| r.exact_root(2)),
            Rational::new(3, 2)
        );
        assert_eq!(Rational::from(2).exact_root(2), None);
        assert_eq!(Rational::from(-4).exact_root(2), None);
    }
}
