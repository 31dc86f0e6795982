//! Vectors: three Cartesian components of exact expressions.

use std::ops::{Add, Div, Mul, Neg, Sub};

use cas::{Expr, IntoExpr};

/// Three Cartesian components in the inertial frame.
///
/// ```
/// use worksheets::model::vector;
/// let a = vector(1, 0, 0) + 2 * vector(0, 3, 0);
/// assert_eq!(a, vector(1, 6, 0));
/// assert_eq!(a.dot(vector(2, 1, 5)), cas::Expr::from(8));
/// ```
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Vector([Expr; 3]);

/// The vector of three components: expressions or integers.
pub fn vector(x: impl IntoExpr, y: impl IntoExpr, z: impl IntoExpr) -> Vector {
    Vector([x.into_expr(), y.into_expr(), z.into_expr()])
}

impl Vector {
    /// The vector of these components.
    #[must_use]
    pub fn new(components: [Expr; 3]) -> Self {
        Self(components)
    }

    /// The zero vector.
    #[must_use]
    pub fn zero() -> Self {
        vector(0, 0, 0)
    }

    /// The components in the order x, y, z.
    #[must_use]
    pub fn components(self) -> [Expr; 3] {
        self.0
    }

    /// The scalar product.
    #[must_use]
    pub fn dot(self, other: Self) -> Expr {
        self.0.into_iter().zip(other.0).map(|(a, b)| a * b).sum()
    }

    /// The vector product.
    #[must_use]
    pub fn cross(self, other: Self) -> Self {
        let ([a, b, c], [x, y, z]) = (self.0, other.0);
        Self([b * z - c * y, c * x - a * z, a * y - b * x])
    }

    /// Every component replaced by what `change` makes of it.
    #[must_use]
    pub fn map(self, change: impl FnMut(Expr) -> Expr) -> Self {
        Self(self.0.map(change))
    }

    /// Whether every component is the number zero; other spellings of zero are not looked for.
    #[must_use]
    pub fn is_zero(self) -> bool {
        self.0.into_iter().all(Expr::is_zero)
    }
}

impl Add for Vector {
    type Output = Vector;
    fn add(self, other: Vector) -> Vector {
        let ([a, b, c], [x, y, z]) = (self.0, other.0);
        Vector([a + x, b + y, c + z])
    }
}

impl Sub for Vector {
    type Output = Vector;
    fn sub(self, other: Vector) -> Vector {
        let ([a, b, c], [x, y, z]) = (self.0, other.0);
        Vector([a - x, b - y, c - z])
    }
}

impl Neg for Vector {
    type Output = Vector;
    fn neg(self) -> Vector {
        self.map(|component| -component)
    }
}

// Concrete types instead of one generic implementation, so that a cell's variables have types that
// can be inferred.
impl Mul<Vector> for Expr {
    type Output = Vector;
    fn mul(self, vector: Vector) -> Vector {
        vector.map(|component| self * component)
    }
}

impl Mul<Vector> for i64 {
    type Output = Vector;
    fn mul(self, vector: Vector) -> Vector {
        Expr::from(self) * vector
    }
}

impl Mul<Expr> for Vector {
    type Output = Vector;
    fn mul(self, factor: Expr) -> Vector {
        factor * self
    }
}

impl Mul<i64> for Vector {
    type Output = Vector;
    fn mul(self, factor: i64) -> Vector {
        Expr::from(factor) * self
    }
}

impl Div<Expr> for Vector {
    type Output = Vector;
    fn div(self, divisor: Expr) -> Vector {
        self.map(|component| component / divisor)
    }
}

impl Div<i64> for Vector {
    type Output = Vector;
    fn div(self, divisor: i64) -> Vector {
        self / Expr::from(divisor)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn products_of_vectors() {
        let (a, b) = (vector(1, 2, 3), vector(4, 5, 6));
        assert_eq!(a.dot(b), Expr::from(32));
        assert_eq!(a.cross(b), vector(-3, 6, -3));
        assert_eq!(a.cross(a), Vector::zero());
        assert_eq!((a - b) / 3, vector(-1, -1, -1));
        assert_eq!(-(a * 2), -2 * a);
    }
}
