//! Everything that can be wrong with a model, each named with the offending thing and the next step.

use cas::calculus::CalculusError;
use cas::{Expr, Name, NameError};

use crate::quantity::{Dimension, DimensionError, UnitError};

/// Why a statement cannot enter the model.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum ModelError {
    /// The sheet has no title.
    #[error("the title of the sheet is empty")]
    EmptyTitle,
    /// A quantity has no meaning.
    #[error("the meaning of `{name}` is empty")]
    EmptyMeaning {
        /// The quantity.
        name: Name,
    },
    /// An assumption has no text.
    #[error("the text of an assumption is empty")]
    EmptyAssumption,
    /// A text is too long.
    #[error("the {what} has {length} characters, at most {limit} are allowed")]
    TooLong {
        /// Which text.
        what: String,
        /// Its length.
        length: usize,
        /// The limit.
        limit: usize,
    },
    /// A text has a character that cannot be printed, such as a line end.
    #[error("the {what} has the character {character:?} at place {place}")]
    Unprintable {
        /// Which text.
        what: String,
        /// The character.
        character: char,
        /// Its place, counted from one.
        place: usize,
    },
    /// A text cannot be a name.
    #[error(transparent)]
    Name(#[from] NameError),
    /// The name belongs to something else on the sheet.
    #[error("the name `{name}` is taken: it is a {holder} already")]
    Taken {
        /// The name.
        name: Name,
        /// What has it.
        holder: &'static str,
    },
    /// The name has a fixed meaning on every sheet.
    #[error("the name `{name}` is reserved for {meaning}")]
    Reserved {
        /// The name.
        name: Name,
        /// What it stands for.
        meaning: &'static str,
    },
    /// The unit of a quantity is no unit.
    #[error("the unit of `{name}`: {source}")]
    Unit {
        /// The quantity.
        name: Name,
        /// Why it is no unit.
        source: UnitError,
    },
    /// A position map without exactly three components.
    #[error("{place} has {count} components")]
    Components {
        /// Where the vector stands.
        place: String,
        /// How many components were given.
        count: usize,
    },
    /// A symbol that is not declared.
    #[error("`{symbol}` in {place} is not declared")]
    Undeclared {
        /// The symbol.
        symbol: String,
        /// Where it was met.
        place: String,
        /// The nearest declared name.
        nearest: Option<String>,
        /// Every declared name.
        declared: Vec<Name>,
    },
    /// An undetermined function with arguments other than declared.
    #[error("{place} has `{given:?}`, but the function is declared as `{declared:?}`")]
    OtherArguments {
        /// Where it was met.
        place: String,
        /// The function as met.
        given: Expr,
        /// The function as declared.
        declared: Expr,
    },
    /// An expression without a value.
    #[error("{place} has no value: `{part:?}` in it is undefined")]
    Undefined {
        /// Where it stands.
        place: String,
        /// The smallest part without a value.
        part: Expr,
    },
    /// Dimensions do not fit inside an expression.
    #[error("{place}: {source}")]
    Dimension {
        /// Where it stands.
        place: String,
        /// What does not fit.
        source: DimensionError,
    },
    /// An expression has another dimension than its place asks for.
    #[error(
        "{place} must be in {} and `{expr:?}` is in {}",
        expected.coherent_unit(),
        found.coherent_unit()
    )]
    WrongDimension {
        /// Where it stands.
        place: String,
        /// The expression.
        expr: Expr,
        /// Its dimension.
        found: Box<Dimension>,
        /// The dimension asked for.
        expected: Box<Dimension>,
    },
    /// An expression depends on something that its place does not allow.
    #[error("{place} depends on {what} `{part:?}`")]
    NotAllowed {
        /// Where it stands.
        place: String,
        /// What kind of thing is not allowed there.
        what: &'static str,
        /// The thing.
        part: Expr,
        /// What to do instead.
        remedy: &'static str,
    },
    /// An expression has no derivative.
    #[error("{place}: {source}")]
    Derivative {
        /// Where it stands.
        place: String,
        /// Why not.
        source: CalculusError,
    },
    /// A mass that is zero or below.
    #[error("the mass of the particle `{name}` is {mass:?}, which is not above zero")]
    MassNotPositive {
        /// The particle.
        name: Name,
        /// The mass.
        mass: Expr,
    },
    /// No particle has this name.
    #[error("there is no particle `{name}` on this sheet")]
    UnknownParticle {
        /// The name as given.
        name: String,
        /// The nearest particle.
        nearest: Option<String>,
    },
    /// A handle to a particle of another sheet.
    #[error(
        "the particle `{name}` belongs to another sheet: here a particle of this name has another mass or position"
    )]
    ForeignParticle {
        /// The particle.
        name: Name,
    },
    /// An assumption affects something that is not on the sheet.
    #[error("the assumption \"{text}\" affects `{name}`, which is not on this sheet")]
    UnknownName {
        /// The assumption.
        text: String,
        /// The name as given.
        name: String,
        /// The nearest known name.
        nearest: Option<String>,
    },
    /// A spring, damper or link joins a thing with itself.
    #[error("both ends of `{name}` are at the same place")]
    SameEnds {
        /// The spring, damper or link.
        name: Name,
    },
    /// A spring, damper or link without a particle.
    #[error("no end of `{name}` is a particle")]
    NoParticleAtEnds {
        /// The spring, damper or link.
        name: Name,
    },
    /// A direction that is the zero vector.
    #[error("the direction of `{name}` is the zero vector")]
    ZeroDirection {
        /// The reaction or force.
        name: Name,
    },
    /// A derivation was asked for without particles.
    #[error("the sheet has no particles")]
    NoParticles,
    /// A derivation was asked for without coordinates.
    #[error("the sheet has no coordinates")]
    NoCoordinates,
    /// More coordinates than the particles have components.
    #[error(
        "{coordinates} coordinates were declared, but {particles} particles have only {components} components of position"
    )]
    TooManyCoordinates {
        /// Number of coordinates.
        coordinates: usize,
        /// Number of particles.
        particles: usize,
        /// Three times the particles.
        components: usize,
    },
    /// A coordinate in which no particle moves.
    #[error("no particle moves with the coordinate `{name}`")]
    IdleCoordinate {
        /// The coordinate.
        name: Name,
    },
}

impl ModelError {
    /// What to do next.
    #[must_use]
    pub fn hint(&self) -> String {
        let meant = |nearest: &Option<String>, otherwise: &str| match nearest {
            Some(name) => format!("did you mean `{name}`? {otherwise}"),
            None => otherwise.to_owned(),
        };
        match self {
            Self::EmptyTitle => "say what the sheet models: Sheet::titled(\"Portal crane\")".into(),
            Self::EmptyMeaning { name } => {
                format!("say in words what `{name}` is, for example \"mass of the trolley\"")
            }
            Self::EmptyAssumption => "say in words what is assumed".into(),
            Self::TooLong { .. } => "shorten it; longer explanations belong into a text cell".into(),
            Self::Unprintable { .. } => "write it on one line, in letters, digits and signs".into(),
            Self::Name(error) => error.hint().into(),
            Self::Taken { name, .. } => {
                format!(
                    "choose another name, for example `{name}_1`; to state it anew, run the sheet from its first cell"
                )
            }
            Self::Reserved { name, .. } => format!("choose another name, for example `{name}_1`"),
            Self::Unit { source, .. } => source.hint(),
            Self::Components { .. } => "give exactly three components: vector(x, y, z)".into(),
            Self::Undeclared {
                nearest, declared, ..
            } => meant(
                nearest,
                &format!(
                    "declare it before it is used, as in sheet.coordinate(name, unit, meaning); declared so far: {}",
                    listed(declared)
                ),
            ),
            Self::OtherArguments { .. } => "use the value that the declaration returned".into(),
            Self::Undefined { .. } => {
                "change that part: nothing can be divided by zero, and a negative number has no root or logarithm"
                    .into()
            }
            Self::Dimension { source, .. } => source.hint().into(),
            Self::WrongDimension { expected, .. } => format!(
                "check the units of its parts: a factor in {} is expected as the whole; give a bare number its unit by declaring it as a constant",
                expected.coherent_unit()
            ),
            Self::NotAllowed { remedy, .. } => (*remedy).into(),
            Self::Derivative { source, .. } => source.hint().into(),
            Self::MassNotPositive { .. } => {
                "a particle needs a mass above zero; a massless part is a link or a spring".into()
            }
            Self::UnknownParticle { nearest, .. } => meant(
                nearest,
                "declare it with sheet.particle(name, mass, position) first",
            ),
            Self::ForeignParticle { .. } => {
                "use the value that this sheet's sheet.particle(...) returned".into()
            }
            Self::UnknownName { nearest, .. } => meant(
                nearest,
                "name a particle, force, reaction or quantity of this sheet, declared before the assumption",
            ),
            Self::SameEnds { .. } => "join two different particles, or a particle and a point".into(),
            Self::NoParticleAtEnds { .. } => {
                "join at least one particle; a point is given as vector(x, y, z)".into()
            }
            Self::ZeroDirection { .. } => "give a direction such as vector(0, 0, 1)".into(),
            Self::NoParticles => "write sheet.particle(name, mass, vector(x, y, z)) before deriving".into(),
            Self::NoCoordinates => {
                "write let x = sheet.coordinate(\"x\", \"m\", \"what it measures\") and use it in a position"
                    .into()
            }
            Self::TooManyCoordinates { .. } => {
                "describe the positions with fewer coordinates, or add the missing particles".into()
            }
            Self::IdleCoordinate { name } => {
                format!("use `{name}` in a position, or declare it as an input if it is prescribed")
            }
        }
    }
}

/// The first dozen names, separated by commas.
fn listed(names: &[Name]) -> String {
    const MOST: usize = 12;
    let shown: Vec<&str> = names.iter().take(MOST).map(|name| name.as_str()).collect();
    let rest = if names.len() > MOST { ", ..." } else { "" };
    format!("{}{rest}", shown.join(", "))
}
