//! Determinants in canonical form.

use std::collections::BTreeMap;

use super::shape::{Matrix, MatrixError};
use crate::basis::Failure;
use crate::canonical::Canonical;
use crate::decide::Condition;
use crate::effort::{Effort, Limit, Meter};
use crate::expr::Expr;
use crate::fraction::{self, Fraction};
use crate::number::Rational;

impl Matrix {
    /// The determinant in canonical form, and where the entries have values.
    ///
    /// It is expanded by minors of the first rows, each computed once, in the ring of the entries; so
    /// it is the number zero exactly where it vanishes as a function of the class that is decided
    /// completely. The cost grows as `n 2^n` products.
    ///
    /// # Errors
    /// [`MatrixError::NotSquare`], [`MatrixError::Undefined`] for an entry that has no value anywhere,
    /// [`MatrixError::TooLarge`] where the work allowed does not suffice.
    ///
    /// # Example
    /// ```
    /// use cas::{Effort, Expr, cos, matrix::Matrix, sin};
    /// let (r, phi) = (Expr::symbol("r")?, Expr::symbol("phi")?);
    /// let polar = Matrix::from_rows(vec![
    ///     vec![cos(phi), -r * sin(phi)],
    ///     vec![sin(phi), r * cos(phi)],
    /// ])?;
    /// assert_eq!(polar.determinant(&Effort::default())?.0, r);
    /// # Ok::<(), Box<dyn std::error::Error>>(())
    /// ```
    pub fn determinant(&self, effort: &Effort) -> Result<(Expr, Vec<Condition>), MatrixError> {
        let size = self.rows();
        if size != self.columns() {
            return Err(MatrixError::NotSquare {
                quantity: "determinant",
                rows: size,
                columns: self.columns(),
            });
        }
        let meter = Meter::new(effort);
        let form = Canonical::of(self.entries(), &meter)?;
        let determinant = by_minors(&form, size)?;
        Ok((form.expr(&determinant), form.conditions()))
    }
}

impl From<Failure> for MatrixError {
    fn from(failure: Failure) -> Self {
        match failure {
            Failure::Undefined(part) => Self::Undefined { part },
            Failure::Limit(limit) => Self::TooLarge(limit),
        }
    }
}

/// Expansion by minors: after row `k` there is one minor for each choice of `k` columns.
fn by_minors(form: &Canonical, size: usize) -> Result<Fraction, Limit> {
    let ring = &form.ring;
    let mut minors = BTreeMap::from([(Vec::new(), Fraction::whole(ring.constant(Rational::ONE)))]);
    for row in 0..size {
        let mut sums: BTreeMap<Vec<usize>, Vec<Fraction>> = BTreeMap::new();
        for (columns, minor) in &minors {
            for column in (0..size).filter(|column| !columns.contains(column)) {
                let entry = &form.fractions[row * size + column];
                if entry.is_zero() || minor.is_zero() {
                    continue;
                }
                let place = columns.partition_point(|known| *known < column);
                let mut chosen = columns.clone();
                chosen.insert(place, column);
                // The sign of moving the new column behind those that are chosen already.
                let sign = if (columns.len() - place).is_multiple_of(2) {
                    1
                } else {
                    -1
                };
                let sign = Fraction::whole(ring.constant(Rational::from(sign)));
                let product = fraction::product(ring, minor, entry)?;
                sums.entry(chosen)
                    .or_default()
                    .push(fraction::product(ring, &product, &sign)?);
            }
        }
        minors = sums
            .into_iter()
            .map(|(columns, parts)| {
                let sum = fraction::sum(ring, &parts.iter().collect::<Vec<_>>())?;
                Ok((columns, sum))
            })
            .collect::<Result<_, Limit>>()?;
    }
    let whole = minors.into_values().next();
    Ok(whole.unwrap_or_else(|| Fraction::whole(ring.constant(Rational::ZERO))))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::expr::{cos, sin};

    fn numbers(rows: &[&[i64]]) -> Matrix {
        let rows = rows
            .iter()
            .map(|row| row.iter().map(|value| Expr::from(*value)).collect());
        Matrix::from_rows(rows.collect()).expect("a rectangle")
    }

    fn determinant(matrix: &Matrix) -> Expr {
        matrix.determinant(&Effort::default()).expect("a determinant").0
    }

    #[test]
    fn numbers_and_empty_matrices() {
        assert_eq!(determinant(&numbers(&[&[2, 1], &[7, 4]])), Expr::one());
        assert_eq!(determinant(&numbers(&[&[0, 1], &[1, 0]])), Expr::from(-1));
        assert_eq!(
            determinant(&numbers(&[&[1, 2, 3], &[4, 5, 6], &[7, 8, 10]])),
            Expr::from(-3)
        );
        assert_eq!(determinant(&numbers(&[&[0, 0], &[1, 5]])), Expr::zero());
        assert_eq!(determinant(&Matrix::identity(0)), Expr::one());
        assert!(numbers(&[&[1, 2]]).determinant(&Effort::default()).is_err());
    }

    #[test]
    fn a_product_has_the_product_of_determinants() {
        let [a, b] = ["a", "b"].map(|name| Expr::symbol(name).expect("a valid name"));
        let left = Matrix::from_fn(
            3,
            3,
            |row, column| if row > column { sin(a) } else { cos(b) + row as i64 },
        );
        let right = Matrix::from_fn(3, 3, |row, column| a.power((row * column) as i64));
        let both = left.product(&right).expect("fits");
        let difference = determinant(&both) - determinant(&left) * determinant(&right);
        assert!(crate::decide::is_zero(difference, &Effort::default()).is_proved());
    }

    #[test]
    fn the_work_is_bounded() {
        let x = Expr::symbol("x").expect("a valid name");
        let large = Matrix::from_fn(9, 9, |row, column| (x + row as i64).power(1 + column as i64));
        let small = Effort {
            operations: 2_000,
            ..Effort::default()
        };
        assert!(matches!(
            large.determinant(&small),
            Err(MatrixError::TooLarge(Limit::Operations(_)))
        ));
    }
}
