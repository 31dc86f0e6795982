//! Functions in LaTeX, with their powers and their arguments with and without brackets.

use super::fault::{ReadError, ReadFault};
use super::latex_command::Called;
use super::latex_product::Factors;
use super::latex_read::Reader;
use super::latex_token::Mark;
use crate::expr::{Expr, pi};

const CLEAR_ARGUMENT: &str =
    "put the argument in brackets, as in `\\sin\\left(\\omega t\\right)`, or end it with `\\,`";

impl Reader<'_> {
    /// A function with its power and argument.
    pub(super) fn function(&mut self, called: Called) -> Result<Expr, ReadError> {
        self.advance();
        let mut power = None;
        if self.peek() == Some(&Mark::Above) {
            self.advance();
            let range = self.argument("a power")?;
            if self.tokens[range.0].mark == Mark::Prime {
                return Err(self.error_at(range.0, ReadFault::Derivative));
            }
            let exponent = self.exponent(range)?;
            if !exponent.is_positive() {
                let fault = ReadFault::Unclear {
                    what: "a negative power of a function may mean its inverse or one over it",
                    instead: "write `\\frac{1}{\\sin x}`; for an inverse, name the angle and state its sine",
                };
                return Err(self.error_at(range.0, fault));
            }
            power = Some(exponent);
        }
        let argument = match self.peek() {
            Some(Mark::Open(_)) => self.enclosed(|reader| reader.bracket())?,
            Some(Mark::OpenGroup) if !self.is_indexed_group() => self.enclosed(|reader| {
                let range = reader.argument("an opening brace")?;
                reader.within(range)
            })?,
            _ => self.simple_factors()?,
        };
        let value = called.of(argument);
        Ok(power.map_or(value, |power| value.power(power)))
    }

    /// Whether an index stands behind the braces that begin here, so that they hold a stem.
    fn is_indexed_group(&self) -> bool {
        let behind = self.tokens.get(self.tokens[self.at].partner + 1);
        behind.is_some_and(|token| token.mark == Mark::Below)
    }

    /// An argument in brackets, which must not have a power.
    fn enclosed(
        &mut self,
        read: impl FnOnce(&mut Self) -> Result<Factors, ReadError>,
    ) -> Result<Expr, ReadError> {
        let argument = read(self)?.whole();
        match self.peek() {
            Some(Mark::Above | Mark::Prime) => Err(self.unclear(
                "it is not clear whether the power belongs to the function or to its argument",
                "write `\\sin^{2}\\left(x\\right)` or `\\sin\\left(x^{2}\\right)`",
            )),
            _ => Ok(argument),
        }
    }

    /// The argument of a function without brackets.
    fn simple_factors(&mut self) -> Result<Expr, ReadError> {
        let mut factors = Vec::new();
        let mut has_name = false;
        while let Some(token) = self.token() {
            if !factors.is_empty() && token.apart {
                break;
            }
            match token.mark {
                Mark::Digit(_) | Mark::Point if factors.is_empty() => factors.push(self.number()?),
                Mark::Pi => {
                    self.advance();
                    factors.push(pi());
                }
                Mark::Letter(_) | Mark::Word(_) | Mark::Greek(_) | Mark::Dots(_) | Mark::OpenGroup
                    if token.mark != Mark::OpenGroup || (factors.is_empty() && self.is_indexed_group()) =>
                {
                    let from = self.at;
                    let named = match self.peek() {
                        Some(Mark::OpenGroup) => self.braced_name()?,
                        _ => Some(self.named()?),
                    };
                    let Some(named) = named else { break };
                    if named.is_rate && has_name {
                        self.at = from;
                        break;
                    }
                    if named.is_raised {
                        self.at = from;
                        return Err(self.unclear(
                            "it is not clear whether the power belongs to the function or to its argument",
                            "write `\\sin^{2} x` or `\\sin\\left(x^{2}\\right)`",
                        ));
                    }
                    has_name = true;
                    factors.push(named.value);
                }
                Mark::Fraction | Mark::Root if !has_name => {
                    let factor = if token.mark == Mark::Root {
                        self.root()?
                    } else {
                        self.fraction()?
                    };
                    factors.push(factor);
                }
                Mark::Fraction | Mark::Root | Mark::Open(_) | Mark::OpenGroup | Mark::Slash
                    if !factors.is_empty() =>
                {
                    return Err(self.unclear(
                        "it is not clear where the argument of the function ends",
                        CLEAR_ARGUMENT,
                    ));
                }
                Mark::Function(_) if factors.is_empty() => {
                    return Err(self.unclear("a function stands directly behind a function", CLEAR_ARGUMENT));
                }
                Mark::Above | Mark::Prime if !factors.is_empty() => {
                    return Err(self.unclear(
                        "it is not clear whether the power belongs to the function or to its argument",
                        "write `\\sin^{2} x` or `\\sin\\left(x^{2}\\right)`",
                    ));
                }
                _ => break,
            }
        }
        if factors.is_empty() {
            return Err(self.expected("the argument of the function"));
        }
        Ok(Expr::product_of(factors))
    }
}
