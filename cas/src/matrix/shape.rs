//! The matrix type: a rectangle of expressions, its parts, sums and products.

use std::ops::Index;

use crate::effort::Limit;
use crate::expr::Expr;

/// A rectangular matrix of expressions; either side may have length zero.
///
/// ```
/// use cas::{Expr, matrix::Matrix};
/// let (a, b) = (Expr::symbol("a")?, Expr::symbol("b")?);
/// let m = Matrix::from_rows(vec![vec![a, b], vec![b, a]])?;
/// assert_eq!(m.product(&m)?[(0, 1)], a * b + b * a);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Matrix {
    rows: usize,
    columns: usize,
    // Row by row, `rows * columns` of them.
    entries: Vec<Expr>,
}

/// Why a matrix operation has no result.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum MatrixError {
    /// The rows given have different lengths.
    #[error("row {row} has {found} entries where the first row has {expected}")]
    Ragged {
        /// The row, counted from one.
        row: usize,
        /// Entries of the first row.
        expected: usize,
        /// Entries of this row.
        found: usize,
    },
    /// The shapes do not fit the operation.
    #[error(
        "the {operation} of a {left_rows} x {left_columns} and a {right_rows} x {right_columns} matrix does not exist"
    )]
    Shapes {
        /// The operation.
        operation: &'static str,
        /// Rows of the left matrix.
        left_rows: usize,
        /// Columns of the left matrix.
        left_columns: usize,
        /// Rows of the right matrix.
        right_rows: usize,
        /// Columns of the right matrix.
        right_columns: usize,
    },
    /// Only a square matrix has this.
    #[error("a {rows} x {columns} matrix has no {quantity}, because it is not square")]
    NotSquare {
        /// What was asked for.
        quantity: &'static str,
        /// Rows of the matrix.
        rows: usize,
        /// Columns of the matrix.
        columns: usize,
    },
    /// A part of an entry has no value anywhere.
    #[error("`{part}` has no value")]
    Undefined {
        /// The smallest such part.
        part: Expr,
    },
    /// The computation grew beyond what was allowed.
    #[error(transparent)]
    TooLarge(#[from] Limit),
}

impl MatrixError {
    /// What to do instead.
    #[must_use]
    pub fn hint(&self) -> &'static str {
        match self {
            Self::Ragged { .. } => "give every row the same number of entries",
            Self::Shapes { .. } => "look at rows and columns; `transposed` exchanges them",
            Self::Undefined { .. } => {
                "look for a division by zero, a root of a negative number or a logarithm of zero"
            }
            Self::TooLarge(limit) => limit.hint(),
            Self::NotSquare { .. } => "give as many rows as columns, or ask for the rank",
        }
    }
}

impl Matrix {
    /// The matrix with these rows; no row at all makes the 0 x 0 matrix.
    ///
    /// # Errors
    /// [`MatrixError::Ragged`].
    pub fn from_rows(rows: Vec<Vec<Expr>>) -> Result<Self, MatrixError> {
        let columns = rows.first().map_or(0, Vec::len);
        if let Some((place, row)) = rows.iter().enumerate().find(|(_, row)| row.len() != columns) {
            return Err(MatrixError::Ragged {
                row: place + 1,
                expected: columns,
                found: row.len(),
            });
        }
        Ok(Self {
            rows: rows.len(),
            columns,
            entries: rows.into_iter().flatten().collect(),
        })
    }

    /// The matrix whose entries a function of row and column gives, both counted from zero.
    #[must_use]
    pub fn from_fn(rows: usize, columns: usize, entry: impl Fn(usize, usize) -> Expr) -> Self {
        let entry = &entry;
        Self {
            rows,
            columns,
            entries: (0..rows)
                .flat_map(|row| (0..columns).map(move |column| entry(row, column)))
                .collect(),
        }
    }

    /// The matrix of one column.
    #[must_use]
    pub fn column_of(entries: &[Expr]) -> Self {
        Self::from_fn(entries.len(), 1, |row, _| entries[row])
    }

    /// The square matrix with these on its diagonal and zero elsewhere.
    #[must_use]
    pub fn diagonal(entries: &[Expr]) -> Self {
        Self::from_fn(entries.len(), entries.len(), |row, column| {
            if row == column { entries[row] } else { Expr::zero() }
        })
    }

    /// The unit matrix.
    #[must_use]
    pub fn identity(size: usize) -> Self {
        Self::diagonal(&vec![Expr::one(); size])
    }

    /// The number of rows.
    #[must_use]
    pub fn rows(&self) -> usize {
        self.rows
    }

    /// The number of columns.
    #[must_use]
    pub fn columns(&self) -> usize {
        self.columns
    }

    /// One row.
    ///
    /// # Panics
    /// Beyond the last row, as a slice does.
    #[must_use]
    pub fn row(&self, row: usize) -> &[Expr] {
        assert!(row < self.rows, "row {row} of a matrix of {} rows", self.rows);
        &self.entries[row * self.columns..(row + 1) * self.columns]
    }

    /// One column.
    ///
    /// # Panics
    /// Beyond the last column, as a slice does.
    #[must_use]
    pub fn column(&self, column: usize) -> Vec<Expr> {
        (0..self.rows).map(|row| self[(row, column)]).collect()
    }

    /// All entries, row by row.
    #[must_use]
    pub fn entries(&self) -> &[Expr] {
        &self.entries
    }

    /// Rows and columns exchanged.
    #[must_use]
    pub fn transposed(&self) -> Self {
        Self::from_fn(self.columns, self.rows, |row, column| self[(column, row)])
    }

    /// The matrix with each entry replaced.
    #[must_use]
    pub fn mapped(&self, change: impl FnMut(Expr) -> Expr) -> Self {
        Self {
            rows: self.rows,
            columns: self.columns,
            entries: self.entries.iter().copied().map(change).collect(),
        }
    }

    /// The part of the matrix in these rows and columns, in this order.
    ///
    /// # Panics
    /// Beyond the last row or column, as a slice does.
    #[must_use]
    pub fn part(&self, rows: &[usize], columns: &[usize]) -> Self {
        Self::from_fn(rows.len(), columns.len(), |row, column| {
            self[(rows[row], columns[column])]
        })
    }

    /// The sum with a matrix of the same shape.
    ///
    /// # Errors
    /// [`MatrixError::Shapes`].
    pub fn sum(&self, other: &Self) -> Result<Self, MatrixError> {
        if (self.rows, self.columns) != (other.rows, other.columns) {
            return Err(self.misfit("sum", other));
        }
        Ok(Self::from_fn(self.rows, self.columns, |row, column| {
            self[(row, column)] + other[(row, column)]
        }))
    }

    /// The matrix product.
    ///
    /// # Errors
    /// [`MatrixError::Shapes`] unless the left one has as many columns as the right one has rows.
    pub fn product(&self, other: &Self) -> Result<Self, MatrixError> {
        if self.columns != other.rows {
            return Err(self.misfit("product", other));
        }
        Ok(Self::from_fn(self.rows, other.columns, |row, column| {
            Expr::sum_of((0..self.columns).map(|k| self[(row, k)] * other[(k, column)]))
        }))
    }

    fn misfit(&self, operation: &'static str, other: &Self) -> MatrixError {
        MatrixError::Shapes {
            operation,
            left_rows: self.rows,
            left_columns: self.columns,
            right_rows: other.rows,
            right_columns: other.columns,
        }
    }
}

impl Index<(usize, usize)> for Matrix {
    type Output = Expr;

    /// The entry in a row and a column, both counted from zero.
    fn index(&self, (row, column): (usize, usize)) -> &Expr {
        assert!(
            column < self.columns,
            "column {column} of a matrix of {} columns",
            self.columns
        );
        &self.row(row)[column]
    }
}
