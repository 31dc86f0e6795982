//! Operators, and the one reason why a decimal number is refused at compile time.

use std::iter::{Product, Sum};
use std::ops::{Add, AddAssign, Div, Mul, MulAssign, Neg, Sub, SubAssign};

use super::node::Expr;
use super::symbol::Symbol;
use crate::number::{NumberError, Rational};

/// What may stand where an expression is expected: an expression, a symbol, an integer.
#[diagnostic::on_unimplemented(
    message = "`{Self}` cannot stand in an exact expression",
    label = "an expression or an integer is expected here",
    note = "write a decimal number as text, so that it is exact: exact(\"9.81\")"
)]
pub trait IntoExpr {
    /// The expression.
    fn into_expr(self) -> Expr;
}

impl IntoExpr for Expr {
    fn into_expr(self) -> Expr {
        self
    }
}

impl IntoExpr for Symbol {
    fn into_expr(self) -> Expr {
        self.into()
    }
}

impl IntoExpr for Rational {
    fn into_expr(self) -> Expr {
        self.into()
    }
}

impl IntoExpr for i64 {
    fn into_expr(self) -> Expr {
        self.into()
    }
}

impl IntoExpr for i32 {
    fn into_expr(self) -> Expr {
        i64::from(self).into()
    }
}

/// Reads a number exactly: an integer, a decimal or a quotient.
///
/// ```
/// use cas::{Expr, exact};
/// let g = exact("9.81")?;
/// assert_eq!(g * 100, Expr::from(981));
/// # Ok::<(), cas::NumberError>(())
/// ```
///
/// # Errors
/// A text that is no number, a zero denominator, too many digits.
pub fn exact(text: &str) -> Result<Expr, NumberError> {
    text.parse().map(Expr::number)
}

macro_rules! operator {
    ($operator:ident $method:ident, $left:ident $right:ident => $result:expr) => {
        impl $operator for Expr {
            type Output = Expr;
            fn $method(self, other: Expr) -> Expr {
                let ($left, $right) = (self, other);
                $result
            }
        }
        impl $operator<i64> for Expr {
            type Output = Expr;
            fn $method(self, other: i64) -> Expr {
                $operator::$method(self, Expr::from(other))
            }
        }
        impl $operator<Expr> for i64 {
            type Output = Expr;
            fn $method(self, other: Expr) -> Expr {
                $operator::$method(Expr::from(self), other)
            }
        }
        // Never usable: the bound makes the compiler say why, in our words. `for<'never>` keeps the
        // compiler from refusing the impl itself. `#[inline]` because no code is made for them, and
        // a dynamic library would list them among the functions that it has.
        impl $operator<f64> for Expr
        where
            for<'never> DecimalNumber: Exact,
        {
            type Output = Expr;
            #[inline]
            fn $method(self, _: f64) -> Expr {
                self
            }
        }
        impl $operator<Expr> for f64
        where
            for<'never> DecimalNumber: Exact,
        {
            type Output = Expr;
            #[inline]
            fn $method(self, other: Expr) -> Expr {
                other
            }
        }
    };
}

operator!(Add add, a b => Expr::sum_of([a, b]));
operator!(Sub sub, a b => Expr::sum_of([a, -b]));
operator!(Mul mul, a b => Expr::product_of([a, b]));
operator!(Div div, a b => Expr::product_of([a, b.power(-1)]));

/// Stands for `f64` in the message about decimal numbers.
pub struct DecimalNumber;

/// Held by no type: floating-point numbers never enter an expression.
///
/// ```compile_fail,E0277
/// let x = cas::Expr::symbol("x").expect("a valid name");
/// let half = 0.5 * x;
/// ```
#[diagnostic::on_unimplemented(
    message = "a decimal number is not exact",
    label = "write the number as text, as in exact(\"0.5\")",
    note = "for example exact(\"9.81\") * m, or a quotient of integers: m / 2"
)]
pub trait Exact {}

impl Neg for Expr {
    type Output = Expr;
    fn neg(self) -> Expr {
        // A minus sign goes into a sum: -(a - b) is b - a, so that differences cancel as on paper.
        match self.kind() {
            super::Kind::Sum(terms) => {
                Expr::sum_of(terms.iter().map(|term| Expr::product_of([Expr::from(-1), *term])))
            }
            _ => Expr::product_of([Expr::from(-1), self]),
        }
    }
}

impl AddAssign for Expr {
    fn add_assign(&mut self, other: Expr) {
        *self = *self + other;
    }
}

impl SubAssign for Expr {
    fn sub_assign(&mut self, other: Expr) {
        *self = *self - other;
    }
}

impl MulAssign for Expr {
    fn mul_assign(&mut self, other: Expr) {
        *self = *self * other;
    }
}

impl Sum for Expr {
    fn sum<I: Iterator<Item = Expr>>(terms: I) -> Expr {
        Expr::sum_of(terms)
    }
}

impl Product for Expr {
    fn product<I: Iterator<Item = Expr>>(factors: I) -> Expr {
        Expr::product_of(factors)
    }
}
