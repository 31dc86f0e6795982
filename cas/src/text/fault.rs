//! Why a text in plain notation or LaTeX cannot be read, where, and what to write instead.

use crate::expr::NameError;

/// Longer texts are refused.
pub(super) const MOST_BYTES: usize = 1 << 20;

/// Deeper brackets are refused; descent uses the stack.
pub(super) const DEEPEST: usize = 200;

/// Why a text is no expression.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[error("{what} at place {place}:\n{}", pointed(source_line, *place))]
pub struct ReadError {
    /// What is wrong.
    pub what: ReadFault,
    /// The character where it is, counted from one.
    pub place: usize,
    /// The text as it was given.
    pub source_line: String,
}

/// What is wrong with a text.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum ReadFault {
    /// Something else was expected.
    #[error("{expected} is expected, but `{found}` was found")]
    Unexpected {
        /// What may stand there.
        expected: &'static str,
        /// What stands there.
        found: char,
    },
    /// The text ends too early.
    #[error("{expected} is expected, but the text ends")]
    Ends {
        /// What may stand there.
        expected: &'static str,
    },
    /// A name that cannot be one.
    #[error(transparent)]
    Name(#[from] NameError),
    /// A name that is not declared.
    #[error("`{name}` is not declared")]
    Undeclared {
        /// The name.
        name: String,
        /// The nearest declared one.
        nearest: Option<String>,
    },
    /// A function with another number of arguments than declared.
    #[error("`{name}` takes {declared} arguments, not {given}")]
    Arguments {
        /// The function.
        name: String,
        /// How many it takes.
        declared: usize,
        /// How many were given.
        given: usize,
    },
    /// A number that cannot be read.
    #[error("`{text}` is no number that can be read")]
    Number {
        /// The text of it.
        text: String,
    },
    /// The brackets are nested too deeply.
    #[error("the brackets are nested more than {DEEPEST} deep")]
    TooDeep,
    /// The text is too long.
    #[error("the text has more than {MOST_BYTES} bytes")]
    TooLong,
    /// Something else was expected in LaTeX.
    #[error("{expected} is expected, but {}", found_words(found.as_deref()))]
    Latex {
        /// What may stand there.
        expected: &'static str,
        /// What stands there, or nothing at the end.
        found: Option<String>,
    },
    /// A character that no formula in LaTeX has.
    #[error("the character `{found}` is not read")]
    Sign {
        /// The character.
        found: char,
    },
    /// A LaTeX command that is not read.
    #[error("the command `\\{command}` is not read")]
    Command {
        /// The command without its backslash.
        command: String,
        /// What to write instead.
        instead: &'static str,
    },
    /// A LaTeX environment that is not read.
    #[error("the environment `{name}` is not read")]
    Environment {
        /// The name of the environment.
        name: String,
    },
    /// A LaTeX command without its braces, or with a brace that is not closed.
    #[error("`\\{command}` needs a pair of braces after it")]
    Braces {
        /// The command without its backslash.
        command: String,
    },
    /// LaTeX that can be read in more than one way.
    #[error("{what}")]
    Unclear {
        /// What is not clear.
        what: &'static str,
        /// How it is written clearly.
        instead: &'static str,
    },
    /// A derivative of something else than a coordinate by time.
    #[error("this derivative cannot be read: only derivatives of a name by time can")]
    Derivative,
    /// An exponent that is no number.
    #[error("the exponent `{exponent}` is not a number")]
    Exponent {
        /// The exponent in plain notation.
        exponent: String,
    },
}

fn found_words(found: Option<&str>) -> String {
    found.map_or_else(
        || "the text ends".to_owned(),
        |found| format!("`{found}` was found"),
    )
}

impl ReadError {
    /// What to write instead.
    #[must_use]
    pub fn hint(&self) -> String {
        match &self.what {
            ReadFault::Undeclared {
                nearest: Some(nearest),
                ..
            } => format!("did you mean `{nearest}`?"),
            ReadFault::Undeclared { nearest: None, .. } => "declare it first".to_owned(),
            ReadFault::Name(error) => error.hint().to_owned(),
            ReadFault::Arguments { name, declared, .. } => {
                let arguments: Vec<String> = (1..=*declared).map(|place| format!("x_{place}")).collect();
                format!("write `{name}({})` with its arguments", arguments.join(", "))
            }
            ReadFault::Number { .. } => "write digits with one decimal point, for example 9.81".to_owned(),
            ReadFault::TooDeep | ReadFault::TooLong => {
                "name parts of the expression and write them one by one".to_owned()
            }
            ReadFault::Latex { .. } | ReadFault::Sign { .. } => {
                "write one formula like `m l^2 \\ddot{\\theta} + m g l \\sin\\theta`, without words around it".to_owned()
            }
            ReadFault::Command { instead, .. } | ReadFault::Unclear { instead, .. } => (*instead).to_owned(),
            ReadFault::Environment { .. } => {
                "take the equations out of it: matrices and cases are read entry by entry".to_owned()
            }
            ReadFault::Braces { command } => format!("write `\\{command}{{...}}`"),
            ReadFault::Derivative => {
                "write the derivative out, or give it a name; rates are read as `\\dot{q}`, `\\ddot{q}` or `q'`".to_owned()
            }
            ReadFault::Exponent { .. } => {
                "powers have whole numbers or fractions above; for others write `\\exp(a \\ln b)`".to_owned()
            }
            _ => "write products with `*` and powers with `^`, for example 2*m*l*cos(phi) + x^2".to_owned(),
        }
    }
}

/// The line with a caret under the place.
fn pointed(line: &str, place: usize) -> String {
    // A window around the place keeps a long text readable.
    let from = place.saturating_sub(40);
    let window: String = line
        .chars()
        .skip(from)
        .take(80)
        .map(|c| if c.is_control() { ' ' } else { c })
        .collect();
    format!("{window}\n{}^", " ".repeat(place.saturating_sub(from + 1)))
}
