//! Names in LaTeX with what is set around them: dots, primes, indices, powers, arguments.

use super::latex_names::{Meaning, Spelling};
use super::latex_read::Reader;
use super::latex_token::Mark;
use super::read::{ReadError, ReadFault};
use crate::expr::{Expr, Function, Name, Symbol};
use crate::number::Rational;

/// Names have no more characters than this.
const MOST_LETTERS: usize = 64;

/// A range of tokens.
type Range = (usize, usize);

/// A name with its power or arguments, as a factor.
pub(super) struct Named {
    pub(super) value: Expr,
    /// Whether nothing but dots, primes and an index is set around it.
    pub(super) is_bare: bool,
    /// Whether it has dots or primes.
    pub(super) is_rate: bool,
    /// Whether it has a power.
    pub(super) is_raised: bool,
}

/// What is set behind a name.
#[derive(Default)]
struct Around {
    index: Vec<String>,
    primes: u32,
    orders: Option<Vec<u32>>,
    power: Option<Range>,
    /// Where it ends.
    end: usize,
}

impl Reader<'_> {
    /// A name and all that is set around it.
    pub(super) fn named(&mut self) -> Result<Named, ReadError> {
        let from = self.at;
        if let Some(Mark::Dots(_)) = self.peek() {
            let (spelling, dots) = self.dotted()?;
            return self.with_around(from, &spelling, dots);
        }
        if let Some(value) = self.exponential()? {
            return Ok(Named {
                value,
                is_bare: false,
                is_rate: false,
                is_raised: true,
            });
        }
        match self.peek() {
            Some(Mark::Greek(name)) => {
                let spelling = vec![(*name).to_owned()];
                self.advance();
                self.with_around(from, &spelling, 0)
            }
            Some(Mark::Word(word)) => {
                let spelling = vec![word.clone()];
                if word == "d" && !self.names.has_symbol("d") {
                    return Err(self.error(ReadFault::Derivative));
                }
                self.advance();
                self.with_around(from, &spelling, 0)
            }
            _ => self.letters(),
        }
    }

    /// Letters that run together: the longest declared name, or one letter.
    fn letters(&mut self) -> Result<Named, ReadError> {
        let from = self.at;
        let run = self.run(self.end);
        let most = if self.names.is_open() {
            1
        } else {
            run.chars().count().min(self.names.longest())
        };
        let mut unknown = None;
        let mut ends = run.char_indices().map(|(at, _)| at).skip(1).collect::<Vec<_>>();
        ends.push(run.len());
        for length in (1..=most).rev() {
            let spelling = vec![run[..ends[length - 1]].to_owned()];
            self.at = from + length;
            // Only behind the last letter stands what is set around the name.
            let around = self.around(false)?;
            let mut whole = spelling.clone();
            whole.extend(around.index.iter().cloned());
            let found = self.names.find(&whole).ok().flatten();
            // Digits belong to a name only where it is spelled so: `x2` may mean a power.
            let spelled = |name: Name| name.as_str() == whole.join("_");
            let digits = spelling[0].contains(|c: char| c.is_ascii_digit());
            if found.is_some_and(|name| !digits || spelled(name)) {
                return self.with_around(from, &spelling, 0);
            }
            if length == run.chars().count() {
                unknown = Some(whole.clone());
            }
            if length == 1 {
                // A slip in a word is told apart from letters that are factors.
                let in_word = unknown.map(|word| self.names.undeclared(&word));
                let slip =
                    in_word.filter(|fault| matches!(fault, ReadFault::Undeclared { nearest: Some(_), .. }));
                let fault = slip.unwrap_or_else(|| self.names.undeclared(&whole));
                return Err(self.error_at(from, fault));
            }
        }
        Err(self.expected("a name"))
    }

    /// The letters and digits from here on that stand side by side.
    fn run(&self, end: usize) -> String {
        let mut run = String::new();
        // A longer run cannot be one name.
        let most = MOST_LETTERS + 1;
        for (place, token) in self.tokens[self.at..end].iter().take(most).enumerate() {
            match token.mark {
                Mark::Letter(c) | Mark::Digit(c) if place == 0 || !token.spaced => run.push(c),
                _ => break,
            }
        }
        run
    }

    /// `e` with a power is the exponential function, unless `e` is declared.
    fn exponential(&mut self) -> Result<Option<Expr>, ReadError> {
        let from = self.at;
        let upright = match self.peek() {
            Some(Mark::Letter('e')) if !self.names.has_symbol("e") => false,
            Some(Mark::Word(word)) if word == "e" => true,
            _ => return Ok(None),
        };
        self.advance();
        if self.take(&Mark::Above) {
            let range = self.argument("a power")?;
            if self.tokens[range.0].mark != Mark::Prime {
                if self.is_lone_digit(range) {
                    let fault = ReadFault::Unclear {
                        what: "it is not clear which digits belong to the power",
                        instead: "put the power in braces: `e^{12}`",
                    };
                    return Err(self.error_at(range.0, fault));
                }
                let exponent = self.within(range)?.whole();
                self.no_second_power()?;
                return Ok(Some(Expr::elementary(Function::Exponential, exponent)));
            }
        } else if upright && self.peek() != Some(&Mark::Below) {
            return Ok(Some(Expr::elementary(Function::Exponential, Expr::one())));
        }
        self.at = from;
        Ok(None)
    }

    /// A name under dots.
    fn dotted(&mut self) -> Result<(Spelling, u32), ReadError> {
        let mut dots = 0_u32;
        let outer = (self.at, self.end);
        let mut after = None;
        while let Some(Mark::Dots(more)) = self.peek() {
            dots += u32::from(*more);
            self.advance();
            let range = self.argument("a name under the dots")?;
            // What stands under dots within dots must fill the outer ones.
            if after.is_some() && self.at != self.end {
                return Err(self.one_name());
            }
            after.get_or_insert(self.at);
            (self.at, self.end) = range;
        }
        let spelling = self.whole_name()?.ok_or_else(|| self.one_name())?;
        self.at = after.unwrap_or(outer.0);
        self.end = outer.1;
        Ok((spelling, dots))
    }

    fn one_name(&self) -> ReadError {
        self.unclear(
            "dots are read over one name only",
            "set them over each name, or write the derivative out",
        )
    }

    /// The spelling of the one name, with its index, that fills the tokens up to the end.
    fn whole_name(&mut self) -> Result<Option<Spelling>, ReadError> {
        let mut spelling = match self.peek() {
            Some(Mark::Greek(name)) => vec![(*name).to_owned()],
            Some(Mark::Word(word)) => vec![word.clone()],
            Some(Mark::Letter(_)) => vec![self.run(self.end)],
            _ => return Ok(None),
        };
        let letters = spelling[0].chars().count();
        let is_run = matches!(self.peek(), Some(Mark::Letter(_)));
        if is_run && letters > 1 && self.names.is_open() {
            return Ok(None);
        }
        self.at += if is_run { letters } else { 1 };
        if self.take(&Mark::Below) {
            let range = self.argument("an index")?;
            spelling.extend(self.index(range)?);
        }
        let fills = self.at == self.end;
        let declared = !is_run || letters == 1 || self.names.find(&spelling).is_ok_and(|name| name.is_some());
        Ok((fills && declared).then_some(spelling))
    }

    /// A name in braces, as it stands before an order of derivation; `None` where the braces hold more.
    pub(super) fn braced_name(&mut self) -> Result<Option<Named>, ReadError> {
        let (from, end) = (self.at, self.end);
        (self.at, self.end) = (from + 1, self.tokens[from].partner);
        let upright_e = matches!(self.peek(), Some(Mark::Word(word)) if word == "e");
        let found = match self.peek() {
            _ if upright_e => None,
            Some(Mark::Dots(_)) => Some(self.dotted()?).filter(|_| self.at == self.end),
            _ => self.whole_name()?.map(|spelling| (spelling, 0)),
        };
        let after = self.end + 1;
        self.end = end;
        match found {
            Some((spelling, dots)) => {
                self.at = after;
                self.with_around(from, &spelling, dots).map(Some)
            }
            None => {
                self.at = from;
                Ok(None)
            }
        }
    }

    /// What is set behind a name: index, primes, orders, power, in any order.
    fn around(&mut self, has_index: bool) -> Result<Around, ReadError> {
        let start = self.at;
        let mut around = Around::default();
        let mut has_index = has_index;
        loop {
            let at = self.at;
            match self.peek() {
                Some(Mark::Prime) => {
                    self.advance();
                    around.primes += 1;
                }
                Some(Mark::Below) if around.index.is_empty() && !has_index => {
                    self.advance();
                    let range = self.argument("an index")?;
                    around.index = self.index(range)?;
                }
                // A second index goes on with the first.
                Some(Mark::Below) if around.power.is_none() => {
                    self.advance();
                    let range = self.argument("an index")?;
                    let more = self.index(range)?;
                    around.index.extend(more);
                    has_index = false;
                }
                Some(Mark::Above) => {
                    self.advance();
                    let range = self.argument("a power")?;
                    let primes = self.tokens[range.0..range.1]
                        .iter()
                        .filter(|t| t.mark == Mark::Prime);
                    let primes = u32::try_from(primes.count()).unwrap_or(u32::MAX);
                    if primes > 0 && usize::try_from(primes).is_ok_and(|primes| primes == range.1 - range.0) {
                        around.primes = around.primes.saturating_add(primes);
                    } else if let Some(orders) = self.orders(range) {
                        if around.orders.replace(orders).is_some() {
                            self.at = at;
                            self.no_second_power()?;
                        }
                    } else if around.power.replace(range).is_some() {
                        self.at = at;
                        self.no_second_power()?;
                    }
                }
                _ => break,
            }
        }
        around.end = std::mem::replace(&mut self.at, start);
        Ok(around)
    }

    /// Whole numbers in brackets above a name count derivatives.
    pub(super) fn orders(&self, (from, to): Range) -> Option<Vec<u32>> {
        let tokens = &self.tokens[from..to];
        let [first, inner @ .., last] = tokens else {
            return None;
        };
        if first.mark != Mark::Open('(') || last.mark != Mark::Close(')') {
            return None;
        }
        inner
            .split(|token| token.mark == Mark::Comma)
            .map(|part| {
                let digits: Option<String> = part
                    .iter()
                    .map(|token| match token.mark {
                        Mark::Digit(c) => Some(c),
                        _ => None,
                    })
                    .collect();
                digits?.parse().ok()
            })
            .collect()
    }

    /// The parts of an index: words, letters that run together, numbers.
    fn index(&self, (from, to): Range) -> Result<Vec<String>, ReadError> {
        let range = (from, to);
        if self.is_lone_digit(range) {
            return Err(self.error_at(
                from,
                ReadFault::Unclear {
                    what: "it is not clear which digits belong to the index",
                    instead: "put the index in braces: `x_{12}`",
                },
            ));
        }
        let mut parts = vec![String::new()];
        for at in from..to {
            let part = parts.last_mut().expect("invariant: there is always a last part");
            match &self.tokens[at].mark {
                Mark::Letter(c) | Mark::Digit(c) => part.push(*c),
                Mark::Word(word) => part.push_str(word.trim()),
                Mark::Greek(name) => part.push_str(name),
                Mark::Pi => part.push_str("pi"),
                Mark::Comma | Mark::Below => parts.push(String::new()),
                Mark::OpenGroup | Mark::CloseGroup => {}
                _ => {
                    return Err(self.error_at(
                        at,
                        ReadFault::Unclear {
                            what: "an index is made of letters and digits only",
                            instead: "write `x_{1}`, `x_{1,2}` or `x_{\\mathrm{max}}`",
                        },
                    ));
                }
            }
        }
        parts.retain(|part| !part.is_empty());
        if parts.is_empty() {
            return Err(self.error_at(
                from,
                ReadFault::Latex {
                    expected: "an index of letters or digits",
                    found: Some("}".to_owned()),
                },
            ));
        }
        Ok(parts)
    }

    /// The factor of a name whose stem was read, with what is set around it.
    fn with_around(&mut self, from: usize, stem: &[String], dots: u32) -> Result<Named, ReadError> {
        let around = self.around(stem.len() > 1)?;
        let mut spelling = stem.to_vec();
        spelling.extend(around.index);
        let found = self
            .names
            .find(&spelling)
            .map_err(|fault| self.error_at(from, fault))?;
        let Some(name) = found else {
            return Err(self.error_at(from, self.names.undeclared(&spelling)));
        };
        self.at = around.end;
        let primes = dots.saturating_add(around.primes);
        let bracket = self.peek() == Some(&Mark::Open('('));
        let meaning = self.names.meaning(name, bracket);
        let meaning = meaning.map_err(|fault| self.error(fault))?;
        if let Meaning::Function(arguments) = meaning {
            if around.power.is_some() {
                return Err(self.error_at(
                    from,
                    ReadFault::Unclear {
                        what: "a power stands between a function and its arguments",
                        instead: "put the power behind the arguments: `F\\left(x\\right)^{2}`",
                    },
                ));
            }
            if !bracket {
                let fault = ReadFault::Arguments {
                    name: name.to_string(),
                    declared: arguments,
                    given: 0,
                };
                return Err(self.error_at(from, fault));
            }
            return self.call(from, name, primes, around.orders);
        }
        let order = match around.orders.as_deref() {
            None => 0,
            Some([order]) => *order,
            Some(_) => {
                return Err(self.error_at(
                    from,
                    ReadFault::Unclear {
                        what: "several orders of derivation stand above a name that is no function",
                        instead: "declare the function with its arguments",
                    },
                ));
            }
        };
        let primes = u8::try_from(primes.saturating_add(order)).map_err(|_| self.too_many_primes(from))?;
        let symbol = Expr::from(Symbol::from(name).with_primes(primes));
        let value = match around.power {
            Some(range) => symbol.power(self.exponent(range)?),
            None => symbol,
        };
        Ok(Named {
            value,
            is_bare: around.power.is_none(),
            is_rate: primes > 0,
            is_raised: around.power.is_some(),
        })
    }

    pub(super) fn too_many_primes(&self, from: usize) -> ReadError {
        self.error_at(
            from,
            ReadFault::Unclear {
                what: "a derivative of an order above 255 is not read",
                instead: "give the derivative a name",
            },
        )
    }

    /// An undetermined function at its arguments, with its power.
    fn call(
        &mut self,
        from: usize,
        name: Name,
        primes: u32,
        orders: Option<Vec<u32>>,
    ) -> Result<Named, ReadError> {
        self.advance();
        let mut arguments = Vec::new();
        if !self.take(&Mark::Close(')')) {
            loop {
                arguments.push(self.sum()?);
                if !self.take(&Mark::Comma) {
                    break;
                }
            }
            if !self.take(&Mark::Close(')')) {
                return Err(self.expected("a comma or a closing bracket `)`"));
            }
        }
        if let Some(fault) = self.names.refuses_arguments(name, arguments.len()) {
            return Err(self.error_at(from, fault));
        }
        let mut orders = orders.unwrap_or_else(|| vec![0; arguments.len()]);
        let counts = orders.len() == arguments.len() && (primes == 0 || orders.len() == 1);
        if !counts {
            return Err(self.error_at(
                from,
                ReadFault::Unclear {
                    what: "it is not clear by which argument the function is differentiated",
                    instead: "write one order for each argument: `F^{\\left(1,0\\right)}\\left(x,y\\right)`",
                },
            ));
        }
        if let Some(first) = orders.first_mut() {
            *first = first.saturating_add(primes);
        }
        let mut value = Expr::unknown_derivative(name, &orders, &arguments);
        let is_raised = self.take(&Mark::Above);
        if is_raised {
            let range = self.argument("a power")?;
            value = value.power(self.exponent(range)?);
            self.no_second_power()?;
        }
        Ok(Named {
            value,
            is_bare: false,
            is_rate: false,
            is_raised,
        })
    }

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
