//! Exactly what a cell imports.
//!
//! ```
//! use worksheets::prelude::*;
//! let mut sheet = Sheet::titled("Pendulum");
//! let m = sheet.positive_constant("m", "kg", "mass of the bob");
//! let l = sheet.positive_constant("l", "m", "length of the rod");
//! let phi = sheet.coordinate("phi", "rad", "angle from the vertical");
//! let bob = sheet.particle("bob", m, vector(l * sin(phi), 0, -l * cos(phi)));
//! sheet.link("rod", bob, vector(0, 0, 0));
//! assert_eq!(sheet.model().particles(), [bob]);
//! ```

pub use crate::model::{Particle, Vector, vector};
pub use crate::sheet::Sheet;
pub use crate::show::ShowsItself;
pub use cas::{Expr, Symbol, cos, exp, ln, pi, sin, sqrt, tan};

/// The number written in `text`, exactly: an integer, a decimal or a quotient.
///
/// # Panics
/// On a text that is no such number, to stop the cell.
///
/// # Example
/// ```
/// use worksheets::prelude::*;
/// assert_eq!(exact("0.25") * 4, Expr::from(1));
/// ```
#[must_use]
pub fn exact(text: &str) -> Expr {
    crate::stop::unless(cas::exact(text))
}
