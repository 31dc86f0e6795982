//! The dimension check of any expression: sums of like terms, numbers inside functions.

use std::collections::HashMap;

use cas::{Expr, Kind, Rational, Symbol, postorder};

use super::dimension::Dimension;

/// Where the dimensions of symbols come from.
pub trait Measured {
    /// The dimension of a symbol with its primes, `None` where it is not declared.
    fn of_symbol(&self, symbol: Symbol) -> Option<Dimension>;
    /// The dimension of an undetermined function's value before any differentiation.
    fn of_function(&self, name: cas::Name) -> Option<Dimension>;
}

/// Why an expression has no dimension.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum DimensionError {
    /// Two terms of a sum have different dimensions.
    #[error(
        "in the sum `{sum:?}` the term `{first:?}` is in {} and the term `{second:?}` in {}",
        first_dimension.coherent_unit(),
        second_dimension.coherent_unit()
    )]
    UnlikeTerms {
        /// The sum.
        sum: Expr,
        /// A term.
        first: Expr,
        /// Its dimension.
        first_dimension: Box<Dimension>,
        /// The first term of another dimension.
        second: Expr,
        /// Its dimension.
        second_dimension: Box<Dimension>,
    },
    /// The argument of a function is not a number.
    #[error("the argument of `{function:?}` is in {} and must be a number", dimension.coherent_unit())]
    ArgumentNotANumber {
        /// The function at its argument.
        function: Expr,
        /// The dimension of the argument.
        dimension: Box<Dimension>,
    },
    /// A symbol or function that is not declared.
    #[error("`{part:?}` is not declared")]
    Undeclared {
        /// The symbol or the function at its arguments.
        part: Expr,
    },
}

impl DimensionError {
    /// What to look at.
    #[must_use]
    pub fn hint(&self) -> &'static str {
        match self {
            Self::UnlikeTerms { .. } => {
                "a factor is missing, or a unit was declared wrongly; give a bare number its unit by declaring it as a constant"
            }
            Self::ArgumentNotANumber { .. } => {
                "divide the argument by a quantity of the same unit, as in sin(x / r) or exp(-t / tau)"
            }
            Self::Undeclared { .. } => "declare it first",
        }
    }
}

/// The dimension of an expression; `None` where it is zero, which is of every dimension.
///
/// # Errors
/// Unlike terms in a sum, a function of something that is no number, an undeclared symbol.
pub fn dimension_of(expr: Expr, measured: &impl Measured) -> Result<Option<Dimension>, DimensionError> {
    let mut known: HashMap<Expr, Option<Dimension>> = HashMap::new();
    for node in postorder(&[expr]) {
        let dimension = match node.kind() {
            Kind::Number(value) if value.is_zero() => None,
            Kind::Number(_) | Kind::Pi => Some(Dimension::ONE),
            Kind::Symbol(symbol) => Some(
                measured
                    .of_symbol(*symbol)
                    .ok_or(DimensionError::Undeclared { part: node })?,
            ),
            Kind::Sum(terms) => of_sum(node, terms, &known)?,
            Kind::Product(factors) => factors.iter().try_fold(Dimension::ONE, |product, factor| {
                known[factor].as_ref().map(|dimension| product.times(dimension))
            }),
            Kind::Power(base, exponent) => known[base].as_ref().map(|dimension| dimension.power(exponent)),
            Kind::Elementary(_, argument) => match &known[argument] {
                Some(dimension) if !dimension.is_one() => {
                    return Err(DimensionError::ArgumentNotANumber {
                        function: node,
                        dimension: Box::new(dimension.clone()),
                    });
                }
                _ => Some(Dimension::ONE),
            },
            Kind::Unknown(application) => {
                let mut value = measured
                    .of_function(application.name())
                    .ok_or(DimensionError::Undeclared { part: node })?;
                for (argument, order) in application.arguments().iter().zip(application.orders()) {
                    if let Some(dimension) = &known[argument] {
                        value = value.over(&dimension.power(&Rational::from(i64::from(*order))));
                    }
                }
                Some(value)
            }
            _ => return Err(DimensionError::Undeclared { part: node }),
        };
        known.insert(node, dimension);
    }
    Ok(known.remove(&expr).expect("invariant: the root is walked last"))
}

fn of_sum(
    sum: Expr,
    terms: &[Expr],
    known: &HashMap<Expr, Option<Dimension>>,
) -> Result<Option<Dimension>, DimensionError> {
    let mut measured = terms
        .iter()
        .filter_map(|term| known[term].as_ref().map(|dimension| (*term, dimension)));
    let Some((first, first_dimension)) = measured.next() else {
        return Ok(None);
    };
    match measured.find(|(_, dimension)| *dimension != first_dimension) {
        None => Ok(Some(first_dimension.clone())),
        Some((second, second_dimension)) => Err(DimensionError::UnlikeTerms {
            sum,
            first,
            first_dimension: Box::new(first_dimension.clone()),
            second,
            second_dimension: Box::new(second_dimension.clone()),
        }),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use cas::{Name, exp, sin, sqrt};

    /// x and y lengths, m a mass, phi a number, F a force over time.
    struct Table;

    impl Measured for Table {
        fn of_symbol(&self, symbol: Symbol) -> Option<Dimension> {
            let plain = match symbol.name().as_str() {
                "x" | "y" => Dimension::LENGTH,
                "m" => Dimension::MASS,
                "phi" => Dimension::ONE,
                "t" => Dimension::TIME,
                _ => return None,
            };
            let primes = i64::from(symbol.primes());
            Some(plain.over(&Dimension::TIME.power(&primes.into())))
        }

        fn of_function(&self, name: Name) -> Option<Dimension> {
            (name.as_str() == "F").then(|| Dimension::new(1, 1, -2))
        }
    }

    fn symbol(name: &str) -> Expr {
        Expr::symbol(name).expect("a valid name")
    }

    #[test]
    fn dimensions_of_expressions() {
        let [x, y, m, phi, t] = ["x", "y", "m", "phi", "t"].map(symbol);
        let speed = Expr::from(Symbol::new("x").expect("a valid name").primed());
        let force = Name::new("F").expect("a valid name");
        let of = |expr| dimension_of(expr, &Table).expect("dimensions agree");
        assert_eq!(of(m * speed.squared() / 2), Some(Dimension::new(1, 2, -2)));
        assert_eq!(of(sqrt(x * x + y * y) * sin(phi)), Some(Dimension::LENGTH));
        assert_eq!(
            of(Expr::unknown_derivative(force, &[1], &[t])),
            Some(Dimension::new(1, 1, -3))
        );
        assert_eq!(of(Expr::zero()), None);
        assert_eq!(of(x + Expr::zero() * (1 / x)), Some(Dimension::LENGTH));
        let tower = (0..100_000).fold(phi, |inner, _| sin(inner));
        assert_eq!(of(tower), Some(Dimension::ONE));
    }

    #[test]
    fn unlike_terms_and_arguments_are_named() {
        let [x, m, t, a] = ["x", "m", "t", "a"].map(symbol);
        assert!(matches!(
            dimension_of(m * (x + t), &Table),
            Err(DimensionError::UnlikeTerms { sum, .. }) if sum == x + t
        ));
        assert!(matches!(
            dimension_of(x + 5, &Table),
            Err(DimensionError::UnlikeTerms { .. })
        ));
        assert!(matches!(
            dimension_of(exp(-t), &Table),
            Err(DimensionError::ArgumentNotANumber { dimension, .. }) if *dimension == Dimension::TIME
        ));
        assert_eq!(
            dimension_of(a + x, &Table),
            Err(DimensionError::Undeclared { part: a })
        );
    }
}
