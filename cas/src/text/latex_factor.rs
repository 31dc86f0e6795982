//! Factors in LaTeX: numbers, brackets, fractions and roots, with their powers.

use super::fault::{ReadError, ReadFault};
use super::latex_product::{Factors, Read};
use super::latex_read::Reader;
use super::latex_token::Mark;
use crate::expr::{Expr, pi};
use crate::number::Rational;

impl Reader<'_> {
    /// A factor with its power.
    pub(super) fn factor(&mut self) -> Result<Read, ReadError> {
        let value = match self.peek() {
            Some(Mark::Letter(_) | Mark::Word(_) | Mark::Greek(_) | Mark::Dots(_)) => {
                let named = self.named()?;
                return Ok(Read {
                    value: Factors::One(named.value),
                    is_name: named.is_bare,
                    is_number: false,
                });
            }
            Some(Mark::Digit(_) | Mark::Point) => {
                let number = self.number()?;
                let is_number = self.peek() != Some(&Mark::Above);
                return Ok(Read {
                    value: self.raised(Factors::One(number))?,
                    is_name: false,
                    is_number,
                });
            }
            Some(Mark::OpenGroup) => {
                if let Some(named) = self.braced_name()? {
                    return Ok(Read {
                        value: Factors::One(named.value),
                        is_name: named.is_bare,
                        is_number: false,
                    });
                }
                let range = self.argument("an opening brace")?;
                self.within(range)?
            }
            Some(Mark::Pi) => {
                self.advance();
                Factors::One(pi())
            }
            Some(Mark::Open(_)) => self.bracket()?,
            Some(Mark::Fraction) => Factors::One(self.fraction()?),
            Some(Mark::Root) => Factors::One(self.root()?),
            Some(Mark::Function(called)) => {
                let called = *called;
                return Ok(Read {
                    value: Factors::One(self.function(called)?),
                    is_name: false,
                    is_number: false,
                });
            }
            Some(Mark::Partial) => return Err(self.error(ReadFault::Derivative)),
            Some(Mark::Bar) => {
                return Err(self.unclear(
                    "the absolute value and the value at a point are not known",
                    "write `\\sqrt{x^2}` for the absolute value, or state each sign as a case of its own",
                ));
            }
            _ => return Err(self.expected("a number, a name or a bracket")),
        };
        Ok(Read {
            value: self.raised(value)?,
            is_name: false,
            is_number: false,
        })
    }

    /// A factor that is no name, with the power above it.
    fn raised(&mut self, base: Factors) -> Result<Factors, ReadError> {
        if !self.take(&Mark::Above) {
            return match self.peek() {
                Some(Mark::Prime) => Err(self.error(ReadFault::Derivative)),
                _ => Ok(base),
            };
        }
        let range = self.argument("a power")?;
        match self.tokens[range.0].mark {
            Mark::Prime => return Err(self.error_at(range.0, ReadFault::Derivative)),
            Mark::Open(_) if self.orders(range).is_some() => {
                let fault = ReadFault::Unclear {
                    what: "a number in brackets above means derivatives, and only of names",
                    instead: "write the power without brackets: `x^{2}`",
                };
                return Err(self.error_at(range.0, fault));
            }
            _ => {}
        }
        let exponent = self.exponent(range)?;
        self.no_second_power()?;
        Ok(Factors::One(base.whole().power(exponent)))
    }

    pub(super) fn no_second_power(&self) -> Result<(), ReadError> {
        match self.peek() {
            Some(Mark::Above | Mark::Prime) => Err(self.unclear(
                "two powers stand above the same factor",
                "put braces or brackets around the factor with its first power",
            )),
            _ => Ok(()),
        }
    }

    pub(super) fn number(&mut self) -> Result<Expr, ReadError> {
        let from = self.at;
        let mut text = String::new();
        while let Some(token) = self.token() {
            let c = match token.mark {
                Mark::Digit(c) => c,
                Mark::Point => '.',
                _ => break,
            };
            if token.spaced && self.at > from {
                break;
            }
            text.push(c);
            self.advance();
        }
        match text.parse() {
            Ok(value) => Ok(Expr::number(value)),
            Err(_) => Err(self.error_at(from, ReadFault::Number { text })),
        }
    }

    /// A bracket; each kind is closed by its own partner.
    pub(super) fn bracket(&mut self) -> Result<Factors, ReadError> {
        let (close, expected) = match self.peek() {
            Some(Mark::Open('[')) => (']', "a closing bracket `]`"),
            Some(Mark::Open('{')) => ('}', "a closing bracket `\\}`"),
            _ => (')', "a closing bracket `)`"),
        };
        self.advance();
        let inner = self.terms()?;
        if self.peek() == Some(&Mark::Comma) {
            return Err(self.unclear(
                "a comma separates arguments, but no function is declared here",
                "declare the function with its arguments; write decimals with a point",
            ));
        }
        if self.take(&Mark::Close(close)) {
            Ok(inner)
        } else {
            Err(self.expected(expected))
        }
    }

    pub(super) fn fraction(&mut self) -> Result<Expr, ReadError> {
        let from = self.at;
        self.advance();
        let above = self.argument("what stands above the line")?;
        let below = self.argument("what stands below the line")?;
        if let Some(rate) = self.rate(from, above, below)? {
            return Ok(rate);
        }
        let mut factors = self.within(above)?.each();
        factors.extend(self.within(below)?.below());
        Ok(Expr::product_of(factors))
    }

    pub(super) fn root(&mut self) -> Result<Expr, ReadError> {
        self.advance();
        let mut degree = Rational::from(2);
        if self.peek() == Some(&Mark::Open('[')) {
            let from = self.at;
            degree = self
                .bracket()?
                .whole()
                .as_number()
                .cloned()
                .unwrap_or(Rational::ZERO);
            if !degree.is_integer() || !degree.is_positive() {
                let fault = ReadFault::Latex {
                    expected: "a whole number as the degree of the root",
                    found: Some("[".to_owned()),
                };
                return Err(self.error_at(from, fault));
            }
        }
        let range = self.argument("what stands below the root")?;
        if self.is_lone_digit(range) {
            let fault = ReadFault::Unclear {
                what: "it is not clear which digits belong to the root",
                instead: "put them in braces: `\\sqrt{12}`",
            };
            return Err(self.error_at(range.0, fault));
        }
        let exponent = Rational::ONE.divided_by(&degree);
        let exponent = exponent.expect("invariant: the degree is positive");
        Ok(self.within(range)?.whole().power(exponent))
    }
}
