//! Why a numerical reference could not be set up or run.

use cas::calculus::CalculusError;
use cas::{Expr, Limit, Name, Symbol};

/// Why a numerical reference could not be set up or run.
#[derive(Clone, Debug, thiserror::Error)]
#[non_exhaustive]
pub enum ReferenceError {
    /// A value was given for something that is not declared, or not what takes a value.
    #[error("`{given}` is not {wanted} of this sheet")]
    NotDeclared {
        /// What was given.
        given: String,
        /// What is wanted in words, such as "a constant".
        wanted: &'static str,
    },
    /// A value that is no number.
    #[error("the value given for `{name}` is no number: {reason}")]
    Value {
        /// What the value is for.
        name: String,
        /// What is wrong with it.
        reason: String,
    },
    /// A positive constant was given a value that is not.
    #[error("`{name}` is a positive constant, but the value given is {value}")]
    NotPositive {
        /// The constant.
        name: Name,
        /// The value as given.
        value: String,
    },
    /// A duration that is none.
    #[error("\"{text}\" is not a duration")]
    Duration {
        /// The text as given.
        text: String,
    },
    /// A stand-in that uses what it may not.
    #[error("`{body}` cannot stand for `{name}`: {reason}")]
    StandIn {
        /// The function.
        name: Name,
        /// The expression as given.
        body: Expr,
        /// What is wrong with it.
        reason: String,
    },
    /// A symbol without value.
    #[error("`{symbol}` has no value")]
    NoValue {
        /// The symbol.
        symbol: Symbol,
    },
    /// An undetermined function that nothing stands for.
    #[error("nothing stands for the function `{name}`")]
    NoStandIn {
        /// The function.
        name: Name,
    },
    /// An undetermined function is differentiated too often to be stood in for.
    #[error("the function `{name}` is differentiated too often for a numerical run")]
    TooManyDerivatives {
        /// The function.
        name: Name,
    },
    /// A kind of expression that cannot be evaluated.
    #[error("an expression of the kind {kind} cannot be evaluated on numbers")]
    NotEvaluated {
        /// The kind.
        kind: String,
    },
    /// No admissible state was found.
    #[error("no admissible state was found in {tries} tries near the start: {reason}")]
    NoState {
        /// How many states were tried.
        tries: usize,
        /// What stood in the way.
        reason: &'static str,
    },
    /// The start state is not admissible.
    #[error("the motion cannot start where it was told to: {reason}")]
    Start {
        /// What stands in the way.
        reason: &'static str,
    },
    /// The derived mass matrix is not square or does not fit the coordinates.
    #[error("{given} derived equations do not fit {coordinates} coordinates")]
    Shape {
        /// How many equations were given.
        given: usize,
        /// How many coordinates there are.
        coordinates: usize,
    },
    /// The derived equations hold something that has no value.
    #[error("the derived expression `{expression}` cannot be evaluated: {reason}")]
    Derived {
        /// The expression.
        expression: Expr,
        /// What is missing.
        reason: String,
    },
    /// A derivative of a stand-in failed.
    #[error(transparent)]
    Calculus(#[from] CalculusError),
    /// The run was stopped or grew too large.
    #[error(transparent)]
    Limit(#[from] Limit),
}

impl ReferenceError {
    /// What to do next.
    #[must_use]
    pub fn hint(&self) -> String {
        let hint = match self {
            Self::NotDeclared { wanted, .. } => {
                return format!("pass the value that the sheet returned when {wanted} was declared");
            }
            Self::Value { .. } => {
                "write a number in the declared unit, for example 1200, \"0.3\" or pi() / 6"
            }
            Self::NotPositive { .. } => "give a value above zero, or declare it with `constant`",
            Self::Duration { .. } => "write a number of seconds above zero, for example \"20 s\"",
            Self::StandIn { .. } => {
                "write an expression of the function's own arguments and numbers, for example 10 * sin(2 * t)"
            }
            Self::NoValue { .. } => "declare it on the sheet, or set its value before the run",
            Self::NoStandIn { .. } => "give an expression for it with `with` before the run",
            Self::TooManyDerivatives { .. } => "state the derivative as an input of its own",
            Self::NotEvaluated { .. } => "write it with powers and elementary functions",
            Self::NoState { .. } => {
                "set values for the constants and a start for the coordinates at which the model makes sense"
            }
            Self::Start { .. } => "give another start for the coordinates",
            Self::Shape { .. } => "derive the equations from the same sheet",
            Self::Derived { .. } => {
                "check the derivation: an expression of it has no value at an ordinary state"
            }
            Self::Calculus(error) => error.hint(),
            Self::Limit(limit) => limit.hint(),
        };
        hint.to_owned()
    }
}
