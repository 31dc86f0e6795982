//! The search for values at which two expressions differ.

use std::collections::{BTreeMap, BTreeSet};

use super::interval::Interval;
use super::real::evaluated;
use crate::basis::Basis;
use crate::decide::{Value, Witness};
use crate::draw::Draw;
use crate::evaluate::values;
use crate::expr::{Application, Expr, Kind, Substitution, Symbol, postorder};
use crate::fingerprint::circle_point;
use crate::number::Rational;

/// How many points are tried.
const ATTEMPTS: u32 = 40;

/// How many points intervals are compared at.
const INTERVAL_POINTS: u32 = 8;

/// The parameters of one point: values of free variables, and one parameter for each base angle.
#[derive(Clone)]
struct Point {
    free: BTreeMap<usize, Rational>,
    turns: Vec<Option<Rational>>,
}

/// An exact point at which both sides have values, and different ones.
pub(crate) fn exact_witness(basis: &Basis, left: Expr, right: Expr) -> Option<Witness> {
    let mut draw = Draw::seeded(left.content_hash() ^ right.content_hash().rotate_left(7));
    let angular = angular_symbols(basis);
    let mut found = None;
    for attempt in 0..ATTEMPTS {
        let point = drawn(basis, attempt, &mut draw);
        if differs(basis, left, right, &point) {
            found = Some(point);
            break;
        }
    }
    let mut point = found?;
    // Small values read best, so each is tried at zero and at one.
    for place in point.free.keys().copied().collect::<Vec<_>>() {
        for small in [Rational::ZERO, Rational::ONE] {
            if small.is_zero() && angular.contains(&basis.variables[place]) {
                continue;
            }
            let mut smaller = point.clone();
            smaller.free.insert(place, small);
            if differs(basis, left, right, &smaller) {
                point = smaller;
                break;
            }
        }
    }
    for place in 0..point.turns.len() {
        let mut smaller = point.clone();
        smaller.turns[place] = smaller.turns[place].as_ref().map(|_| Rational::ZERO);
        if differs(basis, left, right, &smaller) {
            point = smaller;
        }
    }
    let variables = variables(basis, &point)?;
    let sides = values(basis, &[left, right], &variables)?;
    let named = basis.variables.iter().zip(&variables);
    Some(Witness {
        values: named
            .filter_map(|(name, value)| Some((*name, value.clone()?)))
            .collect(),
        left: Value::Exact(sides[0].clone()),
        right: Value::Exact(sides[1].clone()),
    })
}

fn differs(basis: &Basis, left: Expr, right: Expr, point: &Point) -> bool {
    variables(basis, point)
        .and_then(|variables| values(basis, &[left, right], &variables))
        .is_some_and(|sides| sides[0] != sides[1])
}

/// The symbols in base angles; at zero they would keep an angle from turning.
fn angular_symbols(basis: &Basis) -> BTreeSet<Expr> {
    let directions = basis.angles.iter().flat_map(|angle| angle.direction.symbols());
    directions.map(Expr::from).collect()
}

fn drawn(basis: &Basis, attempt: u32, draw: &mut Draw) -> Point {
    let mut value = |first: Rational| {
        if attempt == 0 {
            return first;
        }
        // Positive values first: most symbols of mechanics stand for lengths and masses.
        let bound = 3 + u64::from(attempt);
        let numerator = i64::try_from(1 + draw.below(bound)).unwrap_or(1);
        let denominator = if attempt > 4 {
            i64::try_from(1 + draw.below(3)).unwrap_or(1)
        } else {
            1
        };
        let sign = if attempt > 8 && draw.below(2) == 1 { -1 } else { 1 };
        Rational::new(sign * numerator, denominator).unwrap_or(Rational::ONE)
    };
    let exact = |expr: &Expr| matches!(expr.kind(), Kind::Symbol(_) | Kind::Unknown(_));
    let free = basis
        .variables
        .iter()
        .enumerate()
        .filter(|(_, variable)| exact(variable));
    let free = free.map(|(place, _)| (place, value(Rational::ONE))).collect();
    let half = Rational::new(1, 2).expect("invariant: two is not zero");
    let turns = (0..basis.angles.len())
        .map(|place| turns_freely(basis, place).then(|| value(half.clone())))
        .collect();
    Point { free, turns }
}

/// Whether a base angle takes every value while all else is held: its direction is a product of
/// powers of symbols, and one of them, to the power one, occurs nowhere else.
fn turns_freely(basis: &Basis, place: usize) -> bool {
    let direction = basis.angles[place].direction;
    let symbols: Option<Vec<Symbol>> = direction
        .factors()
        .into_iter()
        .map(|factor| match factor.kind() {
            Kind::Power(base, exponent) if exponent.is_integer() => base.as_symbol(),
            _ => factor.as_symbol(),
        })
        .collect();
    let others = basis
        .angles
        .iter()
        .enumerate()
        .filter(|(other, _)| *other != place);
    let others: BTreeSet<Symbol> = others.flat_map(|(_, angle)| angle.direction.symbols()).collect();
    symbols.is_some_and(|symbols| {
        symbols.into_iter().any(|symbol| {
            let alone = Expr::from(symbol);
            direction.factors().contains(&alone)
                && !others.contains(&symbol)
                && !basis.variables.contains(&alone)
        })
    })
}

/// The values of all variables at a point; what has none that is exact stays open.
///
/// `None` where two undetermined functions of one name would have to take two values at one place.
fn variables(basis: &Basis, point: &Point) -> Option<Vec<Option<Rational>>> {
    let mut variables: Vec<Option<Rational>> = vec![None; basis.variables.len()];
    for (place, value) in &point.free {
        variables[*place] = Some(value.clone());
    }
    for (angle, turn) in basis.angles.iter().zip(&point.turns) {
        if let Some([cosine, sine]) = turn.as_ref().and_then(circle_point) {
            variables[angle.cosine] = Some(cosine);
            variables[angle.cosine + 1] = Some(sine);
        }
    }
    let numbers = basis.variables.iter().zip(&variables);
    let numbers = numbers.filter(|(name, _)| name.as_symbol().is_some());
    let numbers =
        Substitution::new(numbers.filter_map(|(name, value)| Some((*name, Expr::number(value.clone()?)))));
    are_functions(&basis.variables, &|argument| {
        argument.substituted(&numbers).as_number().cloned()
    })
    .then_some(variables)
}

/// Whether no two undetermined functions of one name and orders stand at arguments that may be equal.
fn are_functions<T: PartialEq>(variables: &[Expr], value: &dyn Fn(Expr) -> Option<T>) -> bool {
    let applications: Vec<&Application> = variables
        .iter()
        .filter_map(|variable| match variable.kind() {
            Kind::Unknown(application) => Some(application),
            _ => None,
        })
        .collect();
    applications.iter().enumerate().all(|(place, one)| {
        applications[place + 1..].iter().all(|other| {
            let same = one.name() == other.name() && one.arguments().len() == other.arguments().len();
            // Derivatives of different orders at one place may take any values.
            !same
                || one.arguments() == other.arguments()
                || one
                    .arguments()
                    .iter()
                    .zip(other.arguments())
                    .any(|(a, b)| matches!((value(*a), value(*b)), (Some(a), Some(b)) if a != b))
        })
    })
}

/// What comparing intervals says of two expressions.
pub(crate) enum ByIntervals {
    /// They differ here.
    Differ(Witness),
    /// They may be equal at this many points.
    Overlap(u32),
}

/// Compares two expressions by intervals at rational points.
pub(crate) fn by_intervals(left: Expr, right: Expr) -> ByIntervals {
    let mut draw = Draw::seeded(left.content_hash().rotate_left(13) ^ right.content_hash());
    let nodes = postorder(&[left, right]);
    let mut open: Vec<Expr> = nodes
        .into_iter()
        .filter(|node| matches!(node.kind(), Kind::Symbol(_) | Kind::Unknown(_)))
        .collect();
    open.sort_by_key(|expr| (expr.as_symbol().is_none(), expr.as_symbol(), *expr));
    let mut overlaps = 0;
    for attempt in 0..ATTEMPTS {
        if overlaps == INTERVAL_POINTS {
            break;
        }
        let point: BTreeMap<Expr, Rational> = open
            .iter()
            .map(|expr| {
                let numerator = i64::try_from(1 + draw.below(16)).unwrap_or(1);
                let sign = if attempt > 8 && draw.below(3) == 0 { -1 } else { 1 };
                (*expr, Rational::new(sign * numerator, 8).unwrap_or(Rational::ONE))
            })
            .collect();
        let given = |expr: Expr| point.get(&expr).and_then(<Interval as super::Real>::rational);
        let apart = are_functions(&open, &|argument| {
            let numbers = Substitution::new(
                point
                    .iter()
                    .map(|(name, value)| (*name, Expr::number(value.clone()))),
            );
            argument.substituted(&numbers).as_number().cloned()
        });
        let (Some(a), Some(b), true) = (evaluated(left, given), evaluated(right, given), apart) else {
            continue;
        };
        if Interval::is_apart_from(a, b) {
            return ByIntervals::Differ(Witness {
                values: open.iter().map(|expr| (*expr, point[expr].clone())).collect(),
                left: Value::Within(a),
                right: Value::Within(b),
            });
        }
        overlaps += 1;
    }
    ByIntervals::Overlap(overlaps)
}
