//! Why something could not be derived.

use cas::calculus::CalculusError;
use cas::matrix::MatrixError;
use cas::{Limit, Name};

use crate::model::ModelError;

/// Why something could not be derived.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum DeriveError {
    /// The model is not complete.
    #[error(transparent)]
    Model(#[from] ModelError),
    /// An expression could not be differentiated.
    #[error(transparent)]
    Calculus(#[from] CalculusError),
    /// A determinant could not be computed.
    #[error(transparent)]
    Matrix(#[from] MatrixError),
    /// The columns of the Jacobian are linearly dependent at every state.
    #[error(
        "the coordinates are not independent: `{coordinate}` adds no motion of the particles to that of the \
         coordinates before it, and the Jacobian of the positions has a rank below {coordinates} at every state"
    )]
    DependentCoordinates {
        /// The first coordinate that is not independent of those before it.
        coordinate: Name,
        /// The number of coordinates.
        coordinates: usize,
    },
    /// A stage has no single expression as its result.
    #[error("\"{title}\" has no expression as its result")]
    NoExpression {
        /// The title of the stage.
        title: String,
    },
    /// There is no equation of this number.
    #[error("there is no equation {place}: the sheet has {count}")]
    NoEquation {
        /// The number asked for.
        place: usize,
        /// How many there are.
        count: usize,
    },
    /// The computation grew beyond what was allowed.
    #[error(transparent)]
    TooLarge(#[from] Limit),
}

impl DeriveError {
    /// What to do next.
    #[must_use]
    pub fn hint(&self) -> String {
        match self {
            Self::Model(error) => error.hint(),
            Self::Calculus(error) => error.hint().to_owned(),
            Self::Matrix(error) => error.hint().to_owned(),
            Self::DependentCoordinates { coordinate, .. } => format!(
                "leave `{coordinate}` out, or declare it with sheet.input(...) if its motion is prescribed"
            ),
            Self::NoExpression { .. } => {
                "ask for it on sheet.potential() or sheet.lagrangian(), where a potential was found"
                    .to_owned()
            }
            Self::NoEquation { count, .. } => format!(
                "equations are counted from zero in the order of the coordinates: 0 to {}",
                count.saturating_sub(1)
            ),
            Self::TooLarge(limit) => limit.hint().to_owned(),
        }
    }
}
