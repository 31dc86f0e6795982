//! Reading plain notation: by descent, with a bound on nesting, and errors that point at the place.

use super::fault::{DEEPEST, MOST_BYTES, ReadError, ReadFault};
use super::scope::Scope;
use crate::expr::{Expr, Function, Name, Symbol, pi, sqrt};
use crate::number::Rational;

/// Reads an expression in plain notation.
///
/// What [`plain`](super::plain) writes is read as the same expression, as long as it is not nested
/// too deeply.
///
/// ```
/// use cas::{Expr, cos, text::{Scope, read}};
/// let phi = Expr::symbol("phi")?;
/// assert_eq!(read("2*cos(phi) + 9.81/3", &Scope::open())?, 2 * cos(phi) + cas::exact("3.27")?);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
///
/// # Errors
/// A text that is no expression, an undeclared name, too deep brackets, too long a text.
pub fn read(source: &str, scope: &Scope) -> Result<Expr, ReadError> {
    let mut reader = Reader {
        source,
        at: 0,
        depth: 0,
        scope,
    };
    if source.len() > MOST_BYTES {
        return Err(reader.error(ReadFault::TooLong));
    }
    let expr = reader.sum()?;
    reader.skip_space();
    match reader.peek() {
        None => Ok(expr),
        Some(found) => Err(reader.error(ReadFault::Unexpected {
            expected: "an operator or the end",
            found,
        })),
    }
}

struct Reader<'a> {
    source: &'a str,
    at: usize,
    depth: usize,
    scope: &'a Scope,
}

/// A factor as it was read: a bracket around a bare product is kept apart, so that dividing by it
/// divides by each factor, as it is written.
enum Factor {
    One(Expr),
    Bracket(Vec<Expr>),
}

impl Factor {
    fn whole(self) -> Expr {
        match self {
            Self::One(expr) => expr,
            Self::Bracket(factors) => Expr::product_of(factors),
        }
    }

    fn below(self) -> Vec<Expr> {
        match self {
            Self::One(expr) => vec![expr.power(-1)],
            Self::Bracket(factors) => factors.into_iter().map(|factor| factor.power(-1)).collect(),
        }
    }
}

impl Reader<'_> {
    fn error(&self, what: ReadFault) -> ReadError {
        ReadError {
            what,
            place: self.source[..self.at.min(self.source.len())].chars().count() + 1,
            source_line: self.source.to_owned(),
        }
    }

    fn expected(&self, expected: &'static str) -> ReadError {
        self.error(match self.peek() {
            Some(found) => ReadFault::Unexpected { expected, found },
            None => ReadFault::Ends { expected },
        })
    }

    fn peek(&self) -> Option<char> {
        self.source[self.at..].chars().next()
    }

    fn skip_space(&mut self) {
        while let Some(c) = self.peek().filter(|c| c.is_whitespace()) {
            self.at += c.len_utf8();
        }
    }

    fn take(&mut self, wanted: char) -> bool {
        self.skip_space();
        let found = self.peek() == Some(wanted);
        if found {
            self.at += wanted.len_utf8();
        }
        found
    }

    fn need(&mut self, wanted: char, expected: &'static str) -> Result<(), ReadError> {
        if self.take(wanted) {
            Ok(())
        } else {
            Err(self.expected(expected))
        }
    }

    fn while_matching(&mut self, matches: impl Fn(char) -> bool) -> &str {
        let from = self.at;
        while let Some(c) = self.peek().filter(|c| matches(*c)) {
            self.at += c.len_utf8();
        }
        &self.source[from..self.at]
    }

    fn sum(&mut self) -> Result<Expr, ReadError> {
        Ok(self.terms()?.whole())
    }

    /// A sum; a single product without sign is handed on as its factors.
    fn terms(&mut self) -> Result<Factor, ReadError> {
        self.depth += 1;
        if self.depth > DEEPEST {
            return Err(self.error(ReadFault::TooDeep));
        }
        let mut terms = Vec::new();
        let mut negative = self.take('-');
        loop {
            let product = self.product()?;
            let alone = terms.is_empty() && !negative;
            self.skip_space();
            if alone && !matches!(self.peek(), Some('+' | '-')) {
                self.depth -= 1;
                return Ok(product);
            }
            let product = product.whole();
            terms.push(if negative {
                Expr::product_of([Expr::from(-1), product])
            } else {
                product
            });
            negative = match self.peek() {
                Some('+') => false,
                Some('-') => true,
                _ => break,
            };
            self.at += 1;
        }
        self.depth -= 1;
        Ok(Factor::One(Expr::sum_of(terms)))
    }

    fn product(&mut self) -> Result<Factor, ReadError> {
        // A bracket within a bracket is one factor: `((a*b))` is not the bracket `a*b`.
        let mut factors = vec![self.power()?.whole()];
        let mut bare = true;
        loop {
            if self.take('*') {
                factors.push(self.power()?.whole());
            } else if self.take('/') {
                bare = false;
                factors.extend(self.power()?.below());
            } else {
                break;
            }
        }
        Ok(if bare && factors.len() > 1 {
            Factor::Bracket(factors)
        } else {
            Factor::One(Expr::product_of(factors))
        })
    }

    fn power(&mut self) -> Result<Factor, ReadError> {
        let base = self.atom()?;
        if !self.take('^') {
            return Ok(base);
        }
        let exponent = self.exponent()?;
        Ok(Factor::One(base.whole().power(exponent)))
    }

    fn exponent(&mut self) -> Result<Rational, ReadError> {
        let expected = "a whole number or a fraction in brackets";
        if self.take('(') {
            let negative = self.take('-');
            let mut value = self.integer(expected)?;
            if self.take('/') {
                let below = self.integer(expected)?;
                value = value.divided_by(&below).ok_or_else(|| {
                    self.error(ReadFault::Number {
                        text: "1/0".to_owned(),
                    })
                })?;
            }
            self.need(')', "a closing bracket")?;
            return Ok(if negative { -value } else { value });
        }
        let negative = self.take('-');
        let value = self.integer(expected)?;
        Ok(if negative { -value } else { value })
    }

    fn integer(&mut self, expected: &'static str) -> Result<Rational, ReadError> {
        self.skip_space();
        let from = self.at;
        let text = self.while_matching(|c| c.is_ascii_digit()).to_owned();
        if text.is_empty() {
            return Err(self.expected(expected));
        }
        text.parse().map_err(|_| {
            self.at = from;
            self.error(ReadFault::Number { text })
        })
    }

    fn atom(&mut self) -> Result<Factor, ReadError> {
        self.skip_space();
        match self.peek() {
            Some('(') => {
                self.at += 1;
                let inner = self.terms()?;
                self.need(')', "a closing bracket")?;
                Ok(inner)
            }
            Some(c) if c.is_ascii_digit() => self.number().map(Factor::One),
            Some(c) if c.is_alphabetic() => self.named().map(Factor::One),
            _ => Err(self.expected("a number, a name or a bracket")),
        }
    }

    fn number(&mut self) -> Result<Expr, ReadError> {
        let from = self.at;
        let text = self.while_matching(|c| c.is_ascii_digit() || c == '.').to_owned();
        text.parse().map(Expr::number).map_err(|_| {
            self.at = from;
            self.error(ReadFault::Number { text })
        })
    }

    fn named(&mut self) -> Result<Expr, ReadError> {
        let from = self.at;
        let text = self
            .while_matching(|c| c.is_alphanumeric() || c == '_')
            .to_owned();
        let primes = self.while_matching(|c| c == '\'').len();
        let marked = self.peek() == Some('[');
        let called = marked || self.peek() == Some('(');
        if !called && primes == 0 && text == "pi" {
            return Ok(pi());
        }
        let function = Function::ALL.into_iter().find(|function| function.name() == text);
        if called && !marked && primes == 0 && (function.is_some() || text == "sqrt") {
            self.at += 1;
            let argument = self.sum()?;
            self.need(')', "a closing bracket")?;
            return Ok(
                function.map_or_else(|| sqrt(argument), |function| Expr::elementary(function, argument))
            );
        }
        let named = Name::new(&text).map_err(|error| {
            self.at = from;
            self.error(error.into())
        })?;
        let fault = if called {
            self.scope.refuses_function(named)
        } else {
            self.scope.refuses_symbol(named)
        };
        if let Some(fault) = fault {
            self.at = from;
            return Err(self.error(fault));
        }
        if called {
            return self.unknown(named, primes);
        }
        match u8::try_from(primes) {
            Ok(primes) => Ok(Symbol::from(named).with_primes(primes).into()),
            Err(_) => Err(self.expected("fewer primes")),
        }
    }

    /// An undetermined function from its orders or its opening bracket on.
    fn unknown(&mut self, name: Name, primes: usize) -> Result<Expr, ReadError> {
        let mut orders = vec![u32::try_from(primes).unwrap_or(u32::MAX)];
        if self.take('[') {
            orders.clear();
            loop {
                let order = self.integer("the order of a derivative")?.as_integer();
                orders.push(
                    order
                        .and_then(|order| u32::try_from(order).ok())
                        .unwrap_or(u32::MAX),
                );
                if !self.take(',') {
                    break;
                }
            }
            self.need(']', "a closing bracket `]`")?;
        }
        self.need('(', "the arguments in brackets")?;
        let mut arguments = Vec::new();
        if !self.take(')') {
            loop {
                arguments.push(self.sum()?);
                if !self.take(',') {
                    break;
                }
            }
            self.need(')', "a comma or a closing bracket")?;
        }
        if let Some(fault) = self.scope.refuses_arguments(name, arguments.len()) {
            return Err(self.error(fault));
        }
        Ok(Expr::unknown_derivative(name, &orders, &arguments))
    }
}
