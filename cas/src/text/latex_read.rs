//! Reading LaTeX: by descent over tokens, with a bound on nesting, and errors that point at the place.

use super::fault::{DEEPEST, MOST_BYTES, ReadError, ReadFault};
use super::latex_layout::without_layout;
use super::latex_lexer::tokens;
use super::latex_names::Names;
use super::latex_product::Factors;
use super::latex_token::{Mark, Token};
use super::plain::plain;
use super::scope::Scope;
use crate::expr::Expr;
use crate::number::Rational;

/// More tokens than these are not looked through for an argument without braces.
const MOST_WITHOUT_BRACES: usize = 1_000;

/// Reads an expression in LaTeX, as it stands in a paper or report.
///
/// What [`latex`](super::latex()) writes is read as an expression that is written the same.
///
/// # Names
/// A letter with its index is a name: `m_1` is `m_1`, `F_{\mathrm{max}}` is `F_max`, `q_{1,2}` is
/// `q_1_2`, `\varphi` and `\phi` are `phi`. Where names are declared, letters that run together are the
/// longest declared name; with an open scope each letter is one, and upright letters are one name.
/// Dots and primes are the primes of the symbol: `\ddot{x}` and `x''` are `x''`, and so is
/// `\frac{d^2 x}{dt^2}`; `x^{(3)}` is `x'''`. `e^{...}` is the exponential function unless `e` is declared.
/// A declared function takes the bracket behind it as its arguments; behind any other name a bracket
/// is a factor.
///
/// # Functions without brackets
/// `\sin`, `\ln` and the others take the product of the simple factors that follow: numbers, names,
/// and at the beginning a fraction or root. The product ends before a function, a sign, a spacing
/// command such as `\,`, a multiplication sign, and before a factor with dots or primes that follows a
/// name: `\sin\omega t\cos\theta\,\dot\theta` and `\cos\theta\dot\theta` have the rate outside.
/// Brackets and braces hold the whole argument. Hyperbolic functions, cotangent, secant and cosecant are
/// written out with exponentials, sines and cosines.
///
/// What people read in two ways is refused: `\sin\omega(t)`, `\sin\theta^2`, `\sin(x)^2`,
/// `\sin^{-1}x`, `a/bc`, `x(t)` where `x` is no function, a `\quad` between two factors.
///
/// ```
/// use cas::text::{Scope, read, read_latex};
/// let pendulum = r"\frac{1}{2} m l^2 \dot{\theta}^2 - m g l \left(1 - \cos\theta\right)";
/// assert_eq!(
///     read_latex(pendulum, &Scope::open())?,
///     read("1/2*m*l^2*theta'^2 - m*g*l*(1 - cos(theta))", &Scope::open())?
/// );
/// let error = read_latex(r"m l \sin^{-1} x", &Scope::open()).expect_err("two meanings");
/// assert_eq!(error.place, 11);
/// # Ok::<(), cas::text::ReadError>(())
/// ```
///
/// # Errors
/// A text that is no expression or can be read in two ways, a command that is not known, an undeclared
/// name, too deep brackets, too long a text.
pub fn read_latex(source: &str, scope: &Scope) -> Result<Expr, ReadError> {
    let mut reader = Reader::new(source, scope)?;
    let expr = reader.sum()?;
    match reader.peek() {
        None => Ok(expr),
        Some(Mark::Equals | Mark::Break) => Err(reader.unclear(
            "an equation was given where one expression is read",
            "give one side of the equation",
        )),
        Some(_) => Err(reader.expected("an operator or the end")),
    }
}

/// A range of tokens.
pub(super) type Range = (usize, usize);

pub(super) struct Reader<'a> {
    source: &'a str,
    pub(super) tokens: Vec<Token>,
    pub(super) at: usize,
    /// Tokens from here on belong to a part around the one that is read.
    pub(super) end: usize,
    depth: usize,
    pub(super) names: Names<'a>,
}

impl<'a> Reader<'a> {
    pub(super) fn new(source: &'a str, scope: &'a Scope) -> Result<Self, ReadError> {
        let error = |(what, place)| ReadError {
            what,
            place,
            source_line: source.to_owned(),
        };
        if source.len() > MOST_BYTES {
            return Err(error((ReadFault::TooLong, 1)));
        }
        let after = source.chars().count() + 1;
        let tokens = tokens(source)
            .and_then(|tokens| without_layout(tokens, after))
            .map_err(error)?;
        Ok(Self {
            source,
            at: 0,
            end: tokens.len(),
            tokens,
            depth: 0,
            names: Names::of(scope),
        })
    }

    pub(super) fn error(&self, what: ReadFault) -> ReadError {
        self.error_at(self.at, what)
    }

    pub(super) fn error_at(&self, at: usize, what: ReadFault) -> ReadError {
        let place = match self.tokens.get(at) {
            Some(token) => token.place,
            None => self.source.chars().count() + 1,
        };
        ReadError {
            what,
            place,
            source_line: self.source.to_owned(),
        }
    }

    pub(super) fn unclear(&self, what: &'static str, instead: &'static str) -> ReadError {
        self.error(ReadFault::Unclear { what, instead })
    }

    /// The place of the next token.
    pub(super) fn place(&self) -> usize {
        self.tokens
            .get(self.at)
            .map_or_else(|| self.source.chars().count() + 1, |token| token.place)
    }

    pub(super) fn expected(&self, expected: &'static str) -> ReadError {
        let found = self.tokens.get(self.at).map(|token| {
            let characters = self.source.chars().skip(token.place - 1);
            characters.take(token.length).collect()
        });
        self.error(ReadFault::Latex { expected, found })
    }

    pub(super) fn peek(&self) -> Option<&Mark> {
        self.token().map(|token| &token.mark)
    }

    pub(super) fn token(&self) -> Option<&Token> {
        self.tokens[..self.end].get(self.at)
    }

    pub(super) fn advance(&mut self) {
        self.at += 1;
    }

    pub(super) fn take(&mut self, wanted: &Mark) -> bool {
        let found = self.peek() == Some(wanted);
        self.at += usize::from(found);
        found
    }

    pub(super) fn sum(&mut self) -> Result<Expr, ReadError> {
        Ok(self.terms()?.whole())
    }

    /// A sum; a single product without sign is handed on as its factors.
    pub(super) fn terms(&mut self) -> Result<Factors, ReadError> {
        self.depth += 1;
        if self.depth > DEEPEST {
            return Err(self.error(ReadFault::TooDeep));
        }
        let mut terms = Vec::new();
        let mut negative = self.take(&Mark::Minus);
        loop {
            let product = self.product()?;
            let alone = terms.is_empty() && !negative;
            if alone && !matches!(self.peek(), Some(Mark::Plus | Mark::Minus)) {
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
                Some(Mark::Plus) => false,
                Some(Mark::Minus) => true,
                _ => break,
            };
            self.advance();
        }
        self.depth -= 1;
        Ok(Factors::One(Expr::sum_of(terms)))
    }

    /// A sum within a range of tokens, which it must fill.
    pub(super) fn within(&mut self, range: Range) -> Result<Factors, ReadError> {
        let outer = (self.at, self.end);
        (self.at, self.end) = range;
        let inner = self.terms()?;
        if self.at < self.end {
            return Err(self.expected("an operator or the end of the part"));
        }
        (self.at, self.end) = outer;
        Ok(inner)
    }

    /// The range of tokens that a command, power or index takes: a group, or one token.
    pub(super) fn argument(&mut self, expected: &'static str) -> Result<Range, ReadError> {
        let from = self.at;
        // A fraction takes two more, and may itself follow a sign such as `^`.
        let mut needed = 1_usize;
        while needed > 0 {
            if self.at - from > MOST_WITHOUT_BRACES && self.tokens[from].mark != Mark::OpenGroup {
                return Err(self.error(ReadFault::TooDeep));
            }
            match self.peek() {
                Some(Mark::OpenGroup) => self.at = self.tokens[self.at].partner,
                Some(Mark::Fraction) => needed += 2,
                Some(Mark::Dots(_)) => needed += 1,
                Some(
                    Mark::Letter(_)
                    | Mark::Digit(_)
                    | Mark::Greek(_)
                    | Mark::Word(_)
                    | Mark::Pi
                    | Mark::Prime,
                ) => {}
                _ => return Err(self.expected(expected)),
            }
            self.advance();
            needed -= 1;
        }
        Ok(match self.tokens[from].mark {
            Mark::OpenGroup if self.tokens[from].partner + 1 == self.at => (from + 1, self.at - 1),
            _ => (from, self.at),
        })
    }

    /// The number in a range above a factor.
    pub(super) fn exponent(&mut self, range: Range) -> Result<Rational, ReadError> {
        let from = range.0;
        if self.is_lone_digit(range) {
            let fault = ReadFault::Unclear {
                what: "it is not clear which digits belong to the power",
                instead: "put the power in braces: `x^{12}`",
            };
            return Err(self.error_at(from, fault));
        }
        if let Mark::Word(_) = self.tokens[from].mark {
            let fault = ReadFault::Unclear {
                what: "a word stands where a power would",
                instead: "move the word into the index: `Q_{x,\\mathrm{drive}}`",
            };
            return Err(self.error_at(from, fault));
        }
        let value = self.within(range)?.whole();
        value.as_number().cloned().ok_or_else(|| {
            let exponent = plain(value, &super::Arrangement::default());
            self.error_at(from, ReadFault::Exponent { exponent })
        })
    }

    /// Whether the range is one digit without braces, and more follow directly behind it.
    pub(super) fn is_lone_digit(&self, (from, to): Range) -> bool {
        let digit = |at: usize| matches!(self.tokens[..self.end].get(at), Some(token) if matches!(token.mark, Mark::Digit(_)));
        to == from + 1 && digit(from) && digit(to) && !self.tokens[to].spaced
    }
}
