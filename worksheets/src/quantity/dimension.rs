//! Dimensions of mechanical quantities: rational powers of mass, length and time.

use std::fmt;

use cas::Rational;

/// The dimension of a quantity, `M^a L^b T^c`; angles are dimensionless.
///
/// The order M, L, T and the dimensionless angle are those of ISO 80000-4 and ISO 80000-3.
///
/// ```
/// use worksheets::quantity::Dimension;
/// let force = Dimension::new(1, 1, -2);
/// assert_eq!(force.to_string(), "M L T^-2");
/// assert_eq!(force.times(&Dimension::LENGTH), Dimension::new(1, 2, -2));
/// ```
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Dimension {
    mass: Rational,
    length: Rational,
    time: Rational,
}

impl Dimension {
    /// A number.
    pub const ONE: Self = Self {
        mass: Rational::ZERO,
        length: Rational::ZERO,
        time: Rational::ZERO,
    };
    /// A length.
    pub const LENGTH: Self = Self {
        mass: Rational::ZERO,
        length: Rational::ONE,
        time: Rational::ZERO,
    };
    /// A mass.
    pub const MASS: Self = Self {
        mass: Rational::ONE,
        length: Rational::ZERO,
        time: Rational::ZERO,
    };
    /// A time.
    pub const TIME: Self = Self {
        mass: Rational::ZERO,
        length: Rational::ZERO,
        time: Rational::ONE,
    };

    /// The dimension with these powers of mass, length and time.
    #[must_use]
    pub fn new(mass: i64, length: i64, time: i64) -> Self {
        Self {
            mass: mass.into(),
            length: length.into(),
            time: time.into(),
        }
    }

    /// The dimension of a product.
    #[must_use]
    pub fn times(&self, other: &Self) -> Self {
        Self {
            mass: &self.mass + &other.mass,
            length: &self.length + &other.length,
            time: &self.time + &other.time,
        }
    }

    /// The dimension of a power.
    #[must_use]
    pub fn power(&self, exponent: &Rational) -> Self {
        Self {
            mass: &self.mass * exponent,
            length: &self.length * exponent,
            time: &self.time * exponent,
        }
    }

    /// The dimension of a quotient.
    #[must_use]
    pub fn over(&self, other: &Self) -> Self {
        self.times(&other.power(&Rational::from(-1)))
    }

    /// Whether it is the dimension of a number.
    #[must_use]
    pub fn is_one(&self) -> bool {
        *self == Self::ONE
    }

    /// The coherent unit of this dimension, as an engineer writes it: `N` for a force, `m/s` for a
    /// speed.
    #[must_use]
    pub fn coherent_unit(&self) -> String {
        if *self == Self::new(1, 1, -2) {
            return "N".to_owned();
        }
        let (mut above, mut below) = (Vec::new(), Vec::new());
        for (base, power) in [("kg", &self.mass), ("m", &self.length), ("s", &self.time)] {
            let size = power.absolute();
            let part = if size.is_one() {
                base.to_owned()
            } else if size.is_integer() {
                format!("{base}{size}")
            } else {
                format!("{base}({size})")
            };
            if power.is_positive() {
                above.push(part);
            } else if power.is_negative() {
                below.push(part);
            }
        }
        let above = if above.is_empty() {
            "1".to_owned()
        } else {
            above.join(".")
        };
        std::iter::once(above).chain(below).collect::<Vec<_>>().join("/")
    }
}

impl fmt::Display for Dimension {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        if self.is_one() {
            return f.write_str("1");
        }
        let mut first = true;
        for (base, power) in [("M", &self.mass), ("L", &self.length), ("T", &self.time)] {
            if power.is_zero() {
                continue;
            }
            if !first {
                f.write_str(" ")?;
            }
            first = false;
            f.write_str(base)?;
            if !power.is_one() {
                write!(f, "^{power}")?;
            }
        }
        Ok(())
    }
}
