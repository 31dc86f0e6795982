//! Why something could not be derived.

use cas::Limit;
use cas::calculus::CalculusError;
use cas::matrix::MatrixError;

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
        "the coordinates are not independent: the Jacobian of the positions has a rank below {coordinates} at every \
         state"
    )]
    DependentCoordinates {
        /// The number of coordinates.
        coordinates: usize,
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
            Self::DependentCoordinates { .. } => {
                "look for two coordinates that move the particles in the same way, and leave one of them out"
                    .to_owned()
            }
            Self::TooLarge(limit) => limit.hint().to_owned(),
        }
    }
}
