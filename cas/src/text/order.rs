//! The order in which terms and factors are written.

use super::arrangement::Arrangement;
use crate::expr::{Expr, Function, Kind, Symbol};

/// What a factor is, in the order in which factors stand.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
enum Rank {
    Number,
    Constant,
    Coordinate,
    Bracket,
    Function,
    Unknown,
    Rate,
}

/// The key by which factors are sorted.
type FactorKey = (Rank, u8, (usize, &'static str), u8);

/// A factor without its exponent.
fn base(factor: Expr) -> Expr {
    match factor.kind() {
        Kind::Power(base, _) => *base,
        _ => factor,
    }
}

fn factor_key(factor: Expr, arrangement: &Arrangement) -> FactorKey {
    let base = base(factor);
    let symbol_key = |symbol: Symbol| {
        let rank = match (symbol.primes(), arrangement.coordinate(symbol.name())) {
            (0, None) => Rank::Constant,
            (0, Some(_)) => Rank::Coordinate,
            _ => Rank::Rate,
        };
        // Accelerations stand last, after velocities.
        (rank, symbol.primes(), arrangement.place(symbol.name()), 0)
    };
    match base.kind() {
        Kind::Number(_) | Kind::Pi => (Rank::Number, 0, (0, ""), 0),
        Kind::Symbol(symbol) => symbol_key(*symbol),
        Kind::Elementary(function, argument) => {
            let kind = match function {
                Function::Cosine => 0,
                Function::Sine => 1,
                _ => 2,
            };
            let first = argument
                .symbols()
                .into_iter()
                .map(|symbol| arrangement.place(symbol.name()))
                .min();
            (Rank::Function, 0, first.unwrap_or((usize::MAX, "")), kind)
        }
        Kind::Unknown(application) => (Rank::Unknown, 0, arrangement.place(application.name()), 0),
        _ => (Rank::Bracket, 0, (0, ""), 0),
    }
}

/// Factors in the order in which they are written.
pub(super) fn factors(mut factors: Vec<Expr>, arrangement: &Arrangement) -> Vec<Expr> {
    factors.sort_by_cached_key(|factor| (factor_key(*factor, arrangement), *factor));
    factors
}

/// The key by which terms are sorted: accelerations, then products of velocities, then single
/// velocities, then the rest; within these by coordinates, by the number of factors, by names.
type TermKey = (u8, Vec<(usize, &'static str)>, usize, Vec<FactorKey>);

fn term_key(term: Expr, arrangement: &Arrangement) -> TermKey {
    let (_, rest) = term.coefficient_and_rest();
    let (mut rates, mut most_primes) = (Vec::new(), 0);
    let all = factors(rest.factors(), arrangement);
    for factor in &all {
        let Some(symbol) = base(*factor).as_symbol().filter(|symbol| symbol.primes() > 0) else {
            continue;
        };
        let times = match factor.kind() {
            Kind::Power(_, exponent) => exponent
                .as_integer()
                .and_then(|n| usize::try_from(n).ok())
                .unwrap_or(1),
            _ => 1,
        };
        most_primes = most_primes.max(symbol.primes());
        // Two are enough to tell products of velocities from single ones.
        rates.extend(std::iter::repeat_n(
            arrangement.place(symbol.name()),
            times.min(2),
        ));
    }
    let class = match (most_primes, rates.len()) {
        (2.., _) => 0,
        (1, 2..) => 1,
        (1, _) => 2,
        _ => 3,
    };
    rates.sort_unstable();
    let keys = all
        .iter()
        .map(|factor| factor_key(*factor, arrangement))
        .collect();
    (
        class,
        rates,
        if rest.is_one() { usize::MAX } else { all.len() },
        keys,
    )
}

/// Terms in the order in which they are written.
pub(super) fn terms(mut terms: Vec<Expr>, arrangement: &Arrangement) -> Vec<Expr> {
    terms.sort_by_cached_key(|term| (term_key(*term, arrangement), *term));
    // A sum that can begin without a minus sign does.
    let negative = |term: &Expr| term.coefficient_and_rest().0.is_negative();
    if terms.first().is_some_and(negative)
        && let Some(place) = terms.iter().position(|term| !negative(term))
    {
        let same = term_key(terms[0], arrangement).0 == term_key(terms[place], arrangement).0;
        if same {
            terms[..=place].rotate_right(1);
        }
    }
    terms
}
