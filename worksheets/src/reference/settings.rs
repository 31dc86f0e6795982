//! What a run is told: values of constants, the start, stand-ins for functions, the duration.

use std::collections::BTreeMap;

use cas::{Expr, Kind, Name, Rational, Substitution, Symbol, postorder};

use super::ReferenceError;
use super::draw::Draw;
use super::evaluation::Evaluation;
use super::report::{StandInRow, ValueRow};
use super::stand_in::{StandIn, StandIns};
use crate::model::{Declared, Model, Role};

/// Without other word a motion lasts this many seconds.
const USUAL_DURATION: i64 = 10;

/// Constants that are not set are drawn from this range, in hundredths of their unit.
const DRAWN_CONSTANTS: (i64, i64) = (50, 200);

/// Coordinates and their rates that are not set start in this range, in hundredths of their unit.
const DRAWN_STARTS: (i64, i64) = (20, 80);

/// A number given for a run: a text such as `"0.3"` or `"2/7"`, an integer, an expression without
/// symbols such as `pi() / 6`.
#[derive(Clone, Debug, PartialEq)]
pub struct Given(Result<Expr, String>);

impl From<&str> for Given {
    fn from(text: &str) -> Self {
        Self(cas::exact(text.trim()).map_err(|error| error.to_string()))
    }
}

impl From<i64> for Given {
    fn from(number: i64) -> Self {
        Self(Ok(number.into()))
    }
}

impl From<Expr> for Given {
    fn from(expr: Expr) -> Self {
        Self(Ok(expr))
    }
}

impl Given {
    /// The number, which must have a finite value.
    fn number(self, name: &str) -> Result<Expr, ReferenceError> {
        let refused = |reason| ReferenceError::Value {
            name: name.to_owned(),
            reason,
        };
        let value = self.0.map_err(refused)?;
        match as_float(value) {
            Ok(float) if float.is_finite() => Ok(value),
            Ok(_) => Err(refused(format!("`{}` has no finite value", spelled(value)))),
            Err(error) => Err(refused(error.to_string())),
        }
    }
}

/// What was given for a run; everything else is drawn.
#[derive(Clone, Debug, Default)]
pub(super) struct Settings {
    constants: BTreeMap<Symbol, Expr>,
    starts: BTreeMap<Symbol, Expr>,
    stand_ins: BTreeMap<Name, Expr>,
    duration: Option<Expr>,
}

/// Everything as numbers in coherent SI units, with the rows that say so.
#[derive(Clone, Debug)]
pub(super) struct Setup {
    pub(super) constants: BTreeMap<Symbol, f64>,
    pub(super) stand_ins: StandIns,
    /// Coordinates, then velocities.
    pub(super) start: Vec<f64>,
    pub(super) duration: f64,
    pub(super) duration_text: String,
    pub(super) constant_rows: Vec<ValueRow>,
    pub(super) stand_in_rows: Vec<StandInRow>,
    pub(super) start_rows: Vec<ValueRow>,
}

impl Settings {
    /// Sets a constant to a number in its declared unit.
    pub(super) fn set(&mut self, model: &Model, constant: Expr, given: Given) -> Result<(), ReferenceError> {
        let wanted = "a constant";
        let declared = declared(model, constant, wanted, |role| {
            matches!(role, Role::Constant | Role::PositiveConstant)
        })?;
        let value = given.number(declared.name().as_str())?;
        let positive = declared.role() == Role::PositiveConstant;
        if positive && as_float(value)? <= 0.0 {
            return Err(ReferenceError::NotPositive {
                name: declared.name(),
                value: spelled(value),
            });
        }
        self.constants.insert(declared.name().into(), value);
        Ok(())
    }

    /// Sets where a coordinate or its rate starts, a number in the declared unit (per second).
    pub(super) fn start(
        &mut self,
        model: &Model,
        coordinate: Expr,
        given: Given,
    ) -> Result<(), ReferenceError> {
        let wanted = "a coordinate or its rate";
        let symbol = coordinate.as_symbol().filter(|symbol| symbol.primes() <= 1);
        let base = symbol.map_or(coordinate, |symbol| symbol.with_primes(0).into());
        let declared = declared(model, base, wanted, |role| role == Role::Coordinate)?;
        let symbol = symbol.unwrap_or_else(|| declared.name().into());
        let value = given.number(&symbol.to_string())?;
        self.starts.insert(symbol, value);
        Ok(())
    }

    /// Lets an expression of the function's own arguments stand for it, in the declared units.
    pub(super) fn stand_in(
        &mut self,
        model: &Model,
        function: Expr,
        body: Expr,
    ) -> Result<(), ReferenceError> {
        let wanted = "a prescribed input or undetermined function";
        let declared = declared(model, function, wanted, |role| {
            matches!(role, Role::Input | Role::Function)
        })?;
        let refused = |reason: String| ReferenceError::StandIn {
            name: declared.name(),
            body,
            reason,
        };
        let arguments = arguments(declared);
        for node in postorder(&[body]) {
            if let Kind::Unknown(application) = node.kind() {
                return Err(refused(format!(
                    "`{}` is undetermined itself",
                    application.name()
                )));
            }
            if let Some(stranger) = node.as_symbol().filter(|symbol| !arguments.contains(symbol)) {
                return Err(refused(format!("`{stranger}` is not an argument of it")));
            }
        }
        self.stand_ins.insert(declared.name(), body);
        Ok(())
    }

    /// Sets how long the motion is followed: a number of seconds, with or without the unit.
    pub(super) fn duration(&mut self, text: &str) -> Result<(), ReferenceError> {
        let refused = || ReferenceError::Duration {
            text: text.to_owned(),
        };
        let bare = text.trim();
        let bare = bare.strip_suffix('s').unwrap_or(bare).trim_end();
        let value = cas::exact(bare).map_err(|_| refused())?;
        let seconds = as_float(value).map_err(|_| refused())?;
        if !(seconds > 0.0 && seconds <= 1e6) {
            return Err(refused());
        }
        self.duration = Some(value);
        Ok(())
    }

    /// Everything as numbers: what was given, and the rest drawn from the content of the model.
    pub(super) fn complete(&self, model: &Model) -> Result<Setup, ReferenceError> {
        let mut draw = Draw::of(model);
        let mut setup = Setup {
            constants: BTreeMap::new(),
            stand_ins: StandIns::default(),
            start: Vec::new(),
            duration: 0.0,
            duration_text: String::new(),
            constant_rows: Vec::new(),
            stand_in_rows: Vec::new(),
            start_rows: Vec::new(),
        };
        for declared in model.quantities() {
            match declared.role() {
                Role::Constant | Role::PositiveConstant => {
                    let drawn = hundredths(draw.hundredths(DRAWN_CONSTANTS.0, DRAWN_CONSTANTS.1));
                    let symbol = Symbol::from(declared.name());
                    let (value, row) = row(symbol, declared, "", self.constants.get(&symbol), drawn)?;
                    setup.constants.insert(symbol, value);
                    setup.constant_rows.push(row);
                }
                Role::Input | Role::Function => self.add_stand_in(model, &mut setup, declared, &mut draw),
                _ => {}
            }
        }
        // Numbers are drawn in a fixed order, whatever else is set, so that setting one value moves no other.
        for primes in 0..=1 {
            let per = if primes == 0 { "" } else { "/s" };
            for coordinate in model.coordinates() {
                let declared = model
                    .quantity(coordinate.name())
                    .expect("invariant: coordinates are declared");
                let drawn = hundredths(draw.hundredths(DRAWN_STARTS.0, DRAWN_STARTS.1));
                let symbol = coordinate.with_primes(primes);
                let (value, row) = row(symbol, declared, per, self.starts.get(&symbol), drawn)?;
                setup.start.push(value);
                setup.start_rows.push(row);
            }
        }
        let duration = self.duration.unwrap_or_else(|| USUAL_DURATION.into());
        setup.duration = as_float(duration)?;
        setup.duration_text = spelled(duration);
        Ok(setup)
    }

    fn add_stand_in(&self, model: &Model, setup: &mut Setup, declared: &Declared, draw: &mut Draw) {
        let arguments = arguments(declared);
        let mut drawn = || hundredths(draw.hundredths(DRAWN_CONSTANTS.0, DRAWN_CONSTANTS.1));
        let amplitude = drawn();
        let phase = arguments
            .iter()
            .fold(drawn(), |sum, argument| sum + drawn() * Expr::from(*argument));
        let given = self.stand_ins.get(&declared.name());
        let body = given.copied().unwrap_or_else(|| amplitude * cas::sin(phase));
        setup.stand_in_rows.push(StandInRow {
            function: spelled(declared.value()),
            expression: spelled(body),
            unit: declared.unit().code().to_owned(),
            drawn: given.is_none(),
        });
        // The expression is written in declared units, the run is in coherent ones.
        let scaled = Substitution::new(arguments.iter().map(|symbol| {
            let known = model.quantity(symbol.name());
            let factor = known.map_or_else(Expr::one, |known| known.unit().factor());
            (Expr::from(*symbol), Expr::from(*symbol) / factor)
        }));
        setup.stand_ins.0.insert(
            declared.name(),
            StandIn {
                arguments,
                body: declared.unit().factor() * body.substituted(&scaled),
            },
        );
    }
}

/// One value: what was given or drawn, as a coherent number and as a row.
fn row(
    symbol: Symbol,
    declared: &Declared,
    per: &str,
    given: Option<&Expr>,
    drawn: Expr,
) -> Result<(f64, ValueRow), ReferenceError> {
    let value = given.copied().unwrap_or(drawn);
    let unit = match (declared.unit().code(), per) {
        ("1", "/s") => "/s".to_owned(),
        (code, per) => format!("{code}{per}"),
    };
    let row = ValueRow {
        symbol: symbol.to_string(),
        value: spelled(value),
        unit,
        drawn: given.is_none(),
    };
    Ok((as_float(value * declared.unit().factor())?, row))
}

/// The declared quantity that a value of the sheet stands for.
fn declared<'a>(
    model: &'a Model,
    value: Expr,
    wanted: &'static str,
    fits: impl Fn(Role) -> bool,
) -> Result<&'a Declared, ReferenceError> {
    model
        .quantities()
        .iter()
        .find(|declared| declared.value() == value && fits(declared.role()))
        .ok_or_else(|| ReferenceError::NotDeclared {
            given: spelled(value),
            wanted,
        })
}

/// The symbols that a declared function is written in.
fn arguments(declared: &Declared) -> Vec<Symbol> {
    match declared.value().kind() {
        Kind::Unknown(application) => application
            .arguments()
            .iter()
            .filter_map(|a| a.as_symbol())
            .collect(),
        _ => Vec::new(),
    }
}

fn hundredths(count: i64) -> Expr {
    Expr::number(Rational::new(count, 100).expect("invariant: a hundred is not zero"))
}

/// An expression in plain notation, a number with few digits as a decimal.
fn spelled(expr: Expr) -> String {
    expr.as_number()
        .and_then(decimal)
        .unwrap_or_else(|| expr.to_string())
}

/// A number as a decimal, where it has few digits.
fn decimal(number: &Rational) -> Option<String> {
    (0..=9).find_map(|digits| {
        let scale = Rational::from(10).power(digits)?;
        let scaled = (number * &scale).as_integer()?;
        let count = usize::try_from(digits).ok()?;
        let sign = if scaled < 0 { "-" } else { "" };
        let figures = format!("{:0>width$}", scaled.unsigned_abs(), width = count + 1);
        let (whole, part) = figures.split_at(figures.len() - count);
        Some(if part.is_empty() {
            format!("{sign}{whole}")
        } else {
            format!("{sign}{whole}.{part}")
        })
    })
}

pub(super) fn as_float(value: Expr) -> Result<f64, ReferenceError> {
    Ok(Evaluation::new(&[value], &[], &BTreeMap::new())?.at::<f64>(&[])[0])
}
