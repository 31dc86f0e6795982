//! Which applied forces have a potential, and what it is.

use cas::calculus::derivative;
use cas::decide::{compare, is_zero};
use cas::present::collected;
use cas::{Effort, Expr, Function, Kind, Rational, Symbol, Verdict, postorder};

use super::DeriveError;
use super::forces::generalized;
use super::kinematics::Kinematics;
use crate::model::{Force, ForceKind, Model, Role};
use crate::record::Ground;

/// What was found about the potential of one force.
pub(super) enum Finding {
    /// It moves no coordinate.
    Idle,
    /// It has this potential: its generalized forces are the negative derivatives.
    Potential(Expr),
    /// It has none, or none was found; why.
    Without(Reason),
}

/// Why a force is without potential.
pub(super) enum Reason {
    /// Its generalized forces depend on velocities.
    Velocities,
    /// It is a prescribed input, whose power comes from outside.
    Input(String),
    /// The mixed derivatives by these two coordinates differ.
    NotClosed(usize, usize),
    /// It may have one, but none was found in closed form.
    NotFound,
}

/// One applied force with its generalized forces and what was found.
pub(super) struct Examined<'a> {
    pub(super) force: &'a Force,
    pub(super) generalized: Vec<Expr>,
    pub(super) finding: Finding,
}

/// Every applied force, examined.
pub(super) fn examined<'a>(
    model: &'a Model,
    kinematics: &Kinematics,
    effort: &Effort,
) -> Result<Vec<Examined<'a>>, DeriveError> {
    model
        .forces()
        .iter()
        .map(|force| {
            let places = 0..kinematics.coordinates.len();
            let generalized: Vec<Expr> = places
                .map(|place| generalized(kinematics, force, place))
                .collect();
            let finding = finding(model, kinematics, force, &generalized, effort)?;
            Ok(Examined {
                force,
                generalized,
                finding,
            })
        })
        .collect()
}

fn finding(
    model: &Model,
    kinematics: &Kinematics,
    force: &Force,
    generalized: &[Expr],
    effort: &Effort,
) -> Result<Finding, DeriveError> {
    if generalized.iter().all(|part| is_zero(*part, effort).is_proved()) {
        return Ok(Finding::Idle);
    }
    let candidate = match force.kind() {
        ForceKind::Gravity {
            acceleration,
            direction,
        } => Some(Expr::sum_of(model.particles().iter().map(|particle| {
            -(particle.mass() * acceleration * direction.dot(particle.position()))
        }))),
        ForceKind::Spring {
            stiffness,
            rest_length,
            length,
            ..
        } => Some(stiffness * (length - rest_length).squared() / 2),
        _ => None,
    };
    if candidate.is_none() {
        if let Some(input) = input_in(model, generalized) {
            return Ok(Finding::Without(Reason::Input(input)));
        }
        let velocities: Vec<Symbol> = kinematics.coordinates.iter().map(|q| q.primed()).collect();
        let depends = |part: &Expr| part.symbols().iter().any(|symbol| velocities.contains(symbol));
        if generalized.iter().any(depends) {
            return Ok(Finding::Without(Reason::Velocities));
        }
    }
    let candidates = candidate
        .into_iter()
        .chain(constant(model, force))
        .chain(integrated(kinematics, generalized, effort)?);
    for potential in candidates {
        if is_potential(kinematics, potential, generalized, effort)? {
            return Ok(Finding::Potential(potential));
        }
    }
    for (i, first) in kinematics.coordinates.iter().enumerate() {
        for (j, second) in kinematics.coordinates.iter().enumerate().skip(i + 1) {
            let mixed = [
                derivative(generalized[i], *second)?,
                derivative(generalized[j], *first)?,
            ];
            if let Verdict::Refuted(_) = compare(mixed[0], mixed[1], effort) {
                return Ok(Finding::Without(Reason::NotClosed(i, j)));
            }
        }
    }
    Ok(Finding::Without(Reason::NotFound))
}

/// The name of a prescribed input in one of the expressions.
fn input_in(model: &Model, expressions: &[Expr]) -> Option<String> {
    let nodes = postorder(expressions);
    let mut inputs = model
        .quantities()
        .iter()
        .filter(|declared| declared.role() == Role::Input);
    inputs
        .find(|input| {
            nodes.iter().any(|node| match node.kind() {
                Kind::Unknown(application) => application.name() == input.name(),
                _ => false,
            })
        })
        .map(|input| input.name().to_string())
}

/// `-F . r` for a force whose components change with nothing.
fn constant(model: &Model, force: &Force) -> Option<Expr> {
    let varies = |symbol: &Symbol| *symbol == model.time() || model.coordinates().contains(symbol);
    let work = force.loads().iter().map(|load| {
        let fixed = load
            .vector
            .components()
            .iter()
            .all(|part| !part.symbols().iter().any(varies));
        fixed.then(|| load.vector.dot(model.particles()[load.particle].position()))
    });
    Some(-work.collect::<Option<Vec<_>>>()?.into_iter().sum::<Expr>())
}

/// The potential found by integrating one generalized force after the other by its own coordinate,
/// each less what the earlier ones account for.
///
/// Only antiderivatives of powers, sines and cosines are known here; whether the result is a potential
/// is for the caller to prove.
fn integrated(
    kinematics: &Kinematics,
    generalized: &[Expr],
    effort: &Effort,
) -> Result<Option<Expr>, DeriveError> {
    let mut potential = Expr::zero();
    for (coordinate, part) in kinematics.coordinates.iter().zip(generalized) {
        let rest = collected(
            *part + derivative(potential, *coordinate)?,
            &kinematics.coordinates,
            effort,
        );
        for term in rest.terms() {
            let Some(integral) = antiderivative(term, *coordinate) else {
                return Ok(None);
            };
            potential -= integral;
        }
    }
    Ok(Some(potential))
}

/// The antiderivative of a product of which at most one factor depends on the symbol.
fn antiderivative(term: Expr, by: Symbol) -> Option<Expr> {
    let depends = |factor: &Expr| factor.symbols().contains(&by);
    let (varying, fixed): (Vec<Expr>, Vec<Expr>) = term.factors().into_iter().partition(depends);
    let variable = Expr::from(by);
    let integral = match varying[..] {
        [] => variable,
        [only] => match only.kind() {
            Kind::Symbol(_) => variable.squared() / 2,
            Kind::Power(base, exponent) if *base == variable && *exponent != Rational::from(-1) => {
                let raised = exponent + &Rational::ONE;
                variable.power(raised.clone()) / Expr::number(raised)
            }
            Kind::Elementary(function, argument) => {
                // Of a linear argument, whose slope the result is divided by.
                let slope = derivative(*argument, by).ok().filter(|slope| !depends(slope))?;
                match function {
                    Function::Sine => -cas::cos(*argument) / slope,
                    Function::Cosine => cas::sin(*argument) / slope,
                    _ => return None,
                }
            }
            _ => return None,
        },
        _ => return None,
    };
    Some(Expr::product_of(fixed.into_iter().chain([integral])))
}

fn is_potential(
    kinematics: &Kinematics,
    potential: Expr,
    generalized: &[Expr],
    effort: &Effort,
) -> Result<bool, DeriveError> {
    for (coordinate, part) in kinematics.coordinates.iter().zip(generalized) {
        if !compare(*part, -derivative(potential, *coordinate)?, effort).is_proved() {
            return Ok(false);
        }
    }
    Ok(true)
}

/// The sum of all potentials that were found.
pub(super) fn total_potential(examined: &[Examined<'_>]) -> Expr {
    Expr::sum_of(examined.iter().filter_map(|examined| match &examined.finding {
        Finding::Potential(potential) => Some(*potential),
        Finding::Idle | Finding::Without(_) => None,
    }))
}

/// What the total potential rests on: the forces that have one.
pub(super) fn grounds_of_potential(examined: &[Examined<'_>]) -> Vec<Ground> {
    let found = examined
        .iter()
        .filter(|examined| matches!(examined.finding, Finding::Potential(_)));
    found
        .map(|examined| Ground::stated(examined.force.name()))
        .collect()
}

/// The generalized force of those forces that have no potential.
pub(super) fn without_potential(examined: &[Examined<'_>], coordinate: usize) -> Expr {
    let rest = examined
        .iter()
        .filter(|examined| matches!(examined.finding, Finding::Without(_)));
    Expr::sum_of(rest.map(|examined| examined.generalized[coordinate]))
}

/// The names of those forces.
pub(super) fn names_without_potential(examined: &[Examined<'_>]) -> Vec<cas::Name> {
    let rest = examined
        .iter()
        .filter(|examined| matches!(examined.finding, Finding::Without(_)));
    rest.map(|examined| examined.force.name()).collect()
}
