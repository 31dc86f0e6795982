//! Derivatives by time that are written as fractions of differentials.

use super::fault::{ReadError, ReadFault};
use super::latex_read::{Range, Reader};
use super::latex_token::Mark;
use crate::expr::Expr;
use crate::number::Rational;

impl Reader<'_> {
    /// The derivative by time that a fraction of differentials is, such as `\frac{d^2 x}{dt^2}`.
    pub(super) fn rate(
        &mut self,
        from: usize,
        above: Range,
        below: Range,
    ) -> Result<Option<Expr>, ReadError> {
        let partial = |range: Range| self.tokens[range.0].mark == Mark::Partial;
        if partial(above) || partial(below) {
            return Err(self.error_at(from, ReadFault::Derivative));
        }
        let Some((order, upright)) = self.by_time(below) else {
            return Ok(None);
        };
        if !self.is_differential(above.0) {
            // `\frac{m\,dv}{dt}` is no quotient of products, `\frac{F}{dt}` is one.
            let inside = (above.0..above.1).any(|at| self.is_differential(at));
            return if inside && !self.names.has_symbol("d") {
                Err(self.error_at(from, ReadFault::Derivative))
            } else {
                Ok(None)
            };
        }
        if !upright && self.names.has_symbol("d") {
            return Err(self.error_at(
                from,
                ReadFault::Unclear {
                    what: "it is not clear whether this is a derivative or a quotient, because `d` is declared",
                    instead: "write rates with dots or primes, and a quotient without the common factor `d`",
                },
            ));
        }
        let outer = (self.at, self.end);
        (self.at, self.end) = (above.0 + 1, above.1);
        let mut above_order = Rational::ONE;
        if self.take(&Mark::Above) {
            let range = self.argument("an order")?;
            above_order = self.exponent(range)?;
        }
        // A derivative of more than a name must be written out.
        let begins = matches!(
            self.peek(),
            Some(Mark::Letter(_) | Mark::Word(_) | Mark::Greek(_) | Mark::Dots(_))
        );
        let named = if begins { Some(self.named()?) } else { None };
        let fills = self.at == self.end;
        (self.at, self.end) = outer;
        let symbol = named
            .filter(|_| fills && order.is_some())
            .and_then(|named| named.value.as_symbol());
        let (Some(symbol), Some(order)) = (
            symbol,
            order.filter(|order| Rational::from(i64::from(*order)) == above_order),
        ) else {
            return Err(self.error_at(from, ReadFault::Derivative));
        };
        let primes = symbol
            .primes()
            .checked_add(order)
            .ok_or_else(|| self.too_many_primes(from))?;
        Ok(Some(symbol.with_primes(primes).into()))
    }

    /// Whether the letter `d` of differentials stands here.
    fn is_differential(&self, at: usize) -> bool {
        let is_d = match &self.tokens[at].mark {
            Mark::Letter(c) => *c == 'd',
            Mark::Word(word) => word == "d",
            _ => false,
        };
        let next = self.tokens.get(at + 1).map(|token| &token.mark);
        is_d && !matches!(next, Some(Mark::Below))
    }

    /// Whether a range is a differential with one letter, as below a derivative: its order where the
    /// letter is the time, and whether the `d` is upright.
    fn by_time(&self, (from, to): Range) -> Option<(Option<u8>, bool)> {
        if !self.is_differential(from) {
            return None;
        }
        let upright = matches!(self.tokens[from].mark, Mark::Word(_));
        let rest = &self.tokens[from + 1..to];
        let (letter, order) = match rest {
            [letter] => (letter, Some(1)),
            [letter, above, digit] if above.mark == Mark::Above => match digit.mark {
                Mark::Digit(c) => (letter, c.to_digit(10).and_then(|order| u8::try_from(order).ok())),
                _ => (letter, None),
            },
            [letter, above, open, digit, _] if above.mark == Mark::Above && open.mark == Mark::OpenGroup => {
                match digit.mark {
                    Mark::Digit(c) => (letter, c.to_digit(10).and_then(|order| u8::try_from(order).ok())),
                    _ => (letter, None),
                }
            }
            _ => return None,
        };
        match letter.mark {
            Mark::Letter('t') => Some((order, upright)),
            Mark::Letter(_) | Mark::Greek(_) => Some((None, upright)),
            _ => None,
        }
    }
}
