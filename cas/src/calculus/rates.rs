//! The table of rates along which a total derivative is taken.

use std::collections::BTreeMap;

use super::CalculusError;
use crate::expr::{Expr, IntoExpr, Symbol};

/// How fast each symbol changes; a symbol that is not in the table does not change.
///
/// ```
/// use cas::{Expr, Symbol, calculus::Rates};
/// let (x, t) = (Symbol::new("x")?, Symbol::new("t")?);
/// let rates = Rates::primed(&[x], 2).with(t, 1);
/// assert_eq!(rates.of(x), Some(x.primed().into()));
/// assert_eq!(rates.of(x.primed()), Some(x.with_primes(2).into()));
/// assert_eq!(rates.of(t), Some(Expr::one()));
/// # Ok::<(), cas::NameError>(())
/// ```
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Rates(BTreeMap<Symbol, Expr>);

impl Rates {
    /// The empty table: nothing changes.
    #[must_use]
    pub fn none() -> Self {
        Self::default()
    }

    /// The table in which each symbol changes at the rate written with one prime more, for this many
    /// levels: with two levels `x` at `x'` and `x'` at `x''`.
    #[must_use]
    pub fn primed(symbols: &[Symbol], levels: u8) -> Self {
        let mut table = BTreeMap::new();
        for symbol in symbols {
            // Primes are counted in a byte; where they end the table ends, and `checked` refuses what lies beyond.
            let last = symbol.primes().saturating_add(levels);
            for primes in symbol.primes()..last {
                let slower = symbol.with_primes(primes);
                table.insert(slower, slower.primed().into());
            }
        }
        Self(table)
    }

    /// The table with the rate of one symbol added, in place of a former one.
    #[must_use]
    pub fn with(mut self, symbol: Symbol, rate: impl IntoExpr) -> Self {
        self.0.insert(symbol, rate.into_expr());
        self
    }

    /// The rate of a symbol, where the table has one.
    #[must_use]
    pub fn of(&self, symbol: Symbol) -> Option<Expr> {
        self.0.get(&symbol).copied()
    }

    /// The symbols that have a rate, with it, in order of names.
    pub fn iter(&self) -> impl Iterator<Item = (Symbol, Expr)> {
        self.0.iter().map(|(symbol, rate)| (*symbol, *rate))
    }

    /// The rate of a symbol; zero for a constant, refused for a rate of something in the table whose
    /// own rate is not in it.
    pub(super) fn checked(&self, symbol: Symbol) -> Result<Expr, CalculusError> {
        if let Some(rate) = self.of(symbol) {
            return Ok(rate);
        }
        let fewer_primes = symbol.with_primes(0)..symbol;
        if self.0.range(fewer_primes).next().is_some() {
            Err(CalculusError::MissingRate { symbol })
        } else {
            Ok(Expr::zero())
        }
    }
}
