//! What is set around a name in LaTeX: primes, indices, orders of derivation, powers, arguments.

use super::fault::{ReadError, ReadFault};
use super::latex_named::Named;
use super::latex_names::Meaning;
use super::latex_read::{Range, Reader};
use super::latex_token::Mark;
use crate::expr::{Expr, Name, Symbol};

/// What is set behind a name.
#[derive(Default)]
pub(super) struct Around {
    pub(super) index: Vec<String>,
    primes: u32,
    orders: Option<Vec<u32>>,
    power: Option<Range>,
    /// Where it ends.
    end: usize,
}

impl Reader<'_> {
    /// What is set behind a name: index, primes, orders, power, in any order.
    pub(super) fn around(&mut self, has_index: bool) -> Result<Around, ReadError> {
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
    pub(super) fn index(&self, (from, to): Range) -> Result<Vec<String>, ReadError> {
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
    pub(super) fn with_around(
        &mut self,
        from: usize,
        stem: &[String],
        dots: u32,
    ) -> Result<Named, ReadError> {
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
}
