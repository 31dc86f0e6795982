//! Units in the case-sensitive codes of UCUM, with the exact factor to the coherent SI unit.
//!
//! Refused alternative: a general UCUM library. Those that exist carry all of medicine and compute
//! factors in floating point; here a factor is an exact expression, so that a degree is pi/180.

use std::fmt;

use cas::{Expr, Rational, pi};

use super::dimension::Dimension;
use super::symbols;
use super::unit_error::UnitError;

/// The longest unit code that is read.
const MOST_CHARACTERS: usize = 100;
/// The deepest nesting of parentheses.
const DEEPEST: usize = 16;
/// The largest exponent.
const LARGEST_EXPONENT: i64 = 99;

/// A unit of measurement: its code, its dimension and its factor.
///
/// # Source
/// \[UCUM\] The Unified Code for Units of Measure, case-sensitive codes; of its tables those units
/// that mechanics uses.
///
/// ```
/// use worksheets::quantity::{Dimension, Unit};
/// let unit = Unit::read("kN/m2")?;
/// assert_eq!(unit.dimension(), &Dimension::new(1, -1, -2));
/// assert_eq!(unit.factor(), cas::Expr::from(1000));
/// # Ok::<(), worksheets::quantity::UnitError>(())
/// ```
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Unit {
    code: String,
    dimension: Dimension,
    factor: Expr,
}

impl Unit {
    /// The unit with this code.
    ///
    /// # Errors
    /// A text that is no code of a mechanical unit; the error names the place and, where one is
    /// near, the code that was probably meant.
    pub fn read(code: &str) -> Result<Self, UnitError> {
        let length = code.chars().count();
        if length > MOST_CHARACTERS {
            return Err(UnitError::TooLong {
                length,
                limit: MOST_CHARACTERS,
            });
        }
        if code.trim().is_empty() {
            return Err(UnitError::Empty);
        }
        if let Some(suggestion) = symbols::respelled(code).filter(|respelled| read(respelled).is_ok()) {
            return Err(UnitError::Spelling {
                code: code.to_owned(),
                suggestion,
            });
        }
        let (dimension, factor) = read(code)?;
        Ok(Self {
            code: code.to_owned(),
            dimension,
            factor,
        })
    }

    /// The unit one.
    #[must_use]
    pub fn one() -> Self {
        Self {
            code: "1".to_owned(),
            dimension: Dimension::ONE,
            factor: Expr::one(),
        }
    }

    /// The second.
    #[must_use]
    pub(crate) fn second() -> Self {
        Self {
            code: "s".to_owned(),
            dimension: Dimension::TIME,
            factor: Expr::one(),
        }
    }

    /// The code as it was given.
    #[must_use]
    pub fn code(&self) -> &str {
        &self.code
    }

    /// The dimension.
    #[must_use]
    pub fn dimension(&self) -> &Dimension {
        &self.dimension
    }

    /// What a number in this unit is multiplied by to be in coherent SI units.
    #[must_use]
    pub fn factor(&self) -> Expr {
        self.factor
    }
}

impl fmt::Display for Unit {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.code)
    }
}

/// Dimension and factor of a code that is spelled as UCUM spells it.
fn read(code: &str) -> Result<(Dimension, Expr), UnitError> {
    let mut reader = Reader {
        code,
        rest: code,
        depth: 0,
    };
    let value = reader.term()?;
    match reader.rest.chars().next() {
        None => Ok(value),
        Some(character) => Err(reader.unexpected(character)),
    }
}

struct Reader<'a> {
    code: &'a str,
    rest: &'a str,
    depth: usize,
}

impl<'a> Reader<'a> {
    fn taken(&mut self, character: char) -> bool {
        let stripped = self.rest.strip_prefix(character);
        self.rest = stripped.unwrap_or(self.rest);
        stripped.is_some()
    }

    fn taken_while(&mut self, belongs: impl Fn(char) -> bool) -> &'a str {
        let end = self.rest.find(|c| !belongs(c)).unwrap_or(self.rest.len());
        let (taken, rest) = self.rest.split_at(end);
        self.rest = rest;
        taken
    }

    fn unexpected(&self, character: char) -> UnitError {
        let before = &self.code[..self.code.len() - self.rest.len()];
        UnitError::Unexpected {
            code: self.code.to_owned(),
            character,
            place: before.chars().count() + 1,
        }
    }

    fn incomplete(&self) -> UnitError {
        UnitError::Incomplete {
            code: self.code.to_owned(),
        }
    }

    /// Components joined by `.` and `/`, worked off from left to right.
    fn term(&mut self) -> Result<(Dimension, Expr), UnitError> {
        let mut value = (Dimension::ONE, Expr::one());
        let mut inverted = self.taken('/');
        loop {
            let (dimension, factor) = self.component()?;
            value = if inverted {
                (value.0.over(&dimension), value.1 / factor)
            } else {
                (value.0.times(&dimension), value.1 * factor)
            };
            if self.taken('.') {
                inverted = false;
            } else if self.taken('/') {
                inverted = true;
            } else {
                return Ok(value);
            }
        }
    }

    fn component(&mut self) -> Result<(Dimension, Expr), UnitError> {
        let first = self.rest.chars().next().ok_or_else(|| self.incomplete())?;
        let value = match first {
            '(' => {
                self.rest = &self.rest[1..];
                self.depth += 1;
                if self.depth > DEEPEST {
                    return Err(UnitError::TooDeep { limit: DEEPEST });
                }
                let inner = self.term()?;
                self.depth -= 1;
                if !self.taken(')') {
                    return Err(match self.rest.chars().next() {
                        Some(character) => self.unexpected(character),
                        None => self.incomplete(),
                    });
                }
                inner
            }
            '{' => (Dimension::ONE, Expr::one()),
            '0'..='9' if !self.rest.starts_with("10*") && !self.rest.starts_with("10^") => self.number()?,
            _ => self.annotatable()?,
        };
        self.annotation()?;
        Ok(value)
    }

    /// An annotation in braces means nothing to the value.
    fn annotation(&mut self) -> Result<(), UnitError> {
        if self.taken('{') {
            self.taken_while(|c| c.is_ascii_graphic() && c != '{' && c != '}');
            if !self.taken('}') {
                return Err(match self.rest.chars().next() {
                    Some(character) => self.unexpected(character),
                    None => self.incomplete(),
                });
            }
        }
        Ok(())
    }

    fn number(&mut self) -> Result<(Dimension, Expr), UnitError> {
        let digits = self.taken_while(|c| c.is_ascii_digit());
        let value: i64 = digits
            .parse()
            .ok()
            .filter(|value| *value > 0)
            .ok_or_else(|| UnitError::Number {
                code: self.code.to_owned(),
                digits: digits.to_owned(),
            })?;
        Ok((Dimension::ONE, Expr::from(value)))
    }

    fn annotatable(&mut self) -> Result<(Dimension, Expr), UnitError> {
        let text = self.symbol()?;
        let (dimension, factor) = symbols::unit(text).ok_or_else(|| self.unknown(text))?;
        let exponent = self.exponent()?;
        Ok((dimension.power(&exponent), factor.power(exponent)))
    }

    fn unknown(&self, part: &str) -> UnitError {
        let (code, part) = (self.code.to_owned(), part.to_owned());
        let suggestion = symbols::nearest(&part);
        if symbols::is_outside_mechanics(&part) {
            UnitError::OutsideMechanics { code, part }
        } else {
            UnitError::Unknown {
                code,
                part,
                suggestion,
            }
        }
    }

    /// A unit's symbol: letters, a bracketed name, `10*`, `%`, or primes for minutes and seconds of arc.
    fn symbol(&mut self) -> Result<&'a str, UnitError> {
        let start = self.rest;
        if start.starts_with("10*") || start.starts_with("10^") {
            self.rest = &start[3..];
            return Ok(&start[..3]);
        }
        self.taken_while(|c| c.is_alphabetic() || matches!(c, '%' | '\''));
        if self.taken('[') {
            self.taken_while(|c| c.is_ascii_alphanumeric() || c == '_');
            if !self.taken(']') {
                return Err(self.incomplete());
            }
        }
        let symbol = &start[..start.len() - self.rest.len()];
        match start.chars().next() {
            Some(character) if symbol.is_empty() => Err(self.unexpected(character)),
            _ => Ok(symbol),
        }
    }

    fn exponent(&mut self) -> Result<Rational, UnitError> {
        let start = self.rest;
        let negative = self.taken('-');
        let signed = negative || self.taken('+');
        let digits = self.taken_while(|c| c.is_ascii_digit());
        if digits.is_empty() {
            if signed {
                self.rest = start;
                return Err(self.unexpected(if negative { '-' } else { '+' }));
            }
            return Ok(Rational::ONE);
        }
        let size: i64 = digits
            .parse()
            .ok()
            .filter(|size| *size <= LARGEST_EXPONENT)
            .ok_or_else(|| UnitError::Exponent {
                code: self.code.to_owned(),
                digits: digits.to_owned(),
                limit: LARGEST_EXPONENT,
            })?;
        Ok(Rational::from(if negative { -size } else { size }))
    }
}

/// A half turn over 180: the factor of a degree.
pub(super) fn degree() -> Expr {
    pi() / 180
}

#[cfg(test)]
mod tests;
