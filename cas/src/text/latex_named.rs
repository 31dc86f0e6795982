//! Names in LaTeX: letters that run together, words, names under dots and in braces.

use super::fault::{ReadError, ReadFault};
use super::latex_command::advice;
use super::latex_names::Spelling;
use super::latex_read::Reader;
use super::latex_token::Mark;
use crate::expr::{Expr, Function, Name, NameError};

/// A slip adds no more letters than these to a name.
const LETTERS_TOO_MANY: usize = 3;

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
                if self.names.is_open() && matches!(Name::new(word), Err(NameError::Reserved { .. })) {
                    let fault = ReadFault::Command {
                        command: word.clone(),
                        instead: advice(word),
                    };
                    return Err(self.error(fault));
                }
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
        let most = self.names.longest() + LETTERS_TOO_MANY;
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
}
