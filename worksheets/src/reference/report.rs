//! The result of a run in words and rounded numbers, ready to be recorded and shown.

use serde::{Deserialize, Serialize};

/// Whether two things that were computed in different ways agree.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Agreement {
    /// They agree within the tolerance.
    Agrees,
    /// They differ by more than the tolerance.
    Disagrees,
    /// The numbers cannot tell.
    NotConclusive,
}

impl Agreement {
    /// The agreement in words.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::Agrees => "agrees",
            Self::Disagrees => "disagrees",
            Self::NotConclusive => "not conclusive",
        }
    }

    /// What two findings say together: a disagreement outweighs everything else.
    #[must_use]
    pub fn and(self, other: Self) -> Self {
        match (self, other) {
            (Self::Disagrees, _) | (_, Self::Disagrees) => Self::Disagrees,
            (Self::NotConclusive, _) | (_, Self::NotConclusive) => Self::NotConclusive,
            (Self::Agrees, Self::Agrees) => Self::Agrees,
        }
    }
}

/// A value that the run used.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize)]
pub struct ValueRow {
    /// The symbol in plain notation, with primes for rates.
    pub symbol: String,
    /// The number as given, or the drawn one.
    pub value: String,
    /// Its unit.
    pub unit: String,
    /// Whether it was drawn because none was given.
    pub drawn: bool,
}

/// An expression that stood for an undetermined function.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize)]
pub struct StandInRow {
    /// The function at its arguments in plain notation.
    pub function: String,
    /// What stood for it, in declared units.
    pub expression: String,
    /// Its unit.
    pub unit: String,
    /// Whether it was drawn because none was given.
    pub drawn: bool,
}

/// A largest deviation and what it is held against.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize)]
pub struct Deviation {
    /// The largest deviation: a bound by a power of ten, or two digits where it is too large.
    pub largest: String,
    /// The tolerance.
    pub tolerance: String,
    /// What follows.
    pub agreement: Agreement,
}

impl Deviation {
    /// A deviation held against a tolerance.
    ///
    /// Below a hundredth of the tolerance only that bound is given: digits there are rounding noise
    /// and differ between machines.
    pub(super) fn new(largest: f64, tolerance: f64) -> Self {
        let floor = tolerance / 100.0;
        let agrees = largest <= tolerance;
        let text = if !largest.is_finite() {
            "no number".to_owned()
        } else if agrees {
            format!("below {}", power_of_ten(largest.max(floor)))
        } else {
            format!("{largest:.1e}")
        };
        Self {
            largest: text,
            tolerance: format!("{tolerance:e}"),
            agreement: if agrees {
                Agreement::Agrees
            } else {
                Agreement::Disagrees
            },
        }
    }
}

/// The smallest power of ten that is not below a number, as text.
fn power_of_ten(number: f64) -> String {
    // A little slack, so that a tolerance such as 1e-11 is its own power of ten.
    format!("1e{}", (number.log10() - 1e-9).ceil())
}

/// A coordinate over time.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Curve {
    /// The coordinate in plain notation.
    pub coordinate: String,
    /// Its unit.
    pub unit: String,
    /// Its meaning.
    pub meaning: String,
    /// Its values at the times of the motion, rounded to five digits.
    pub values: Vec<f64>,
}

/// The comparison of one motion, integrated from the reference and from the derived equations.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct MotionReport {
    /// How long the motion was to be followed, in seconds.
    pub duration: String,
    /// Up to when the two were compared, in seconds; less than the duration where the motion is too
    /// sensitive to be followed longer, or ends.
    pub compared_until: String,
    /// Why it was not compared to the end.
    pub cut_short: Option<String>,
    /// The largest deviation of coordinates and rates, relative to their largest values.
    pub deviation: Deviation,
    /// The largest difference of the kinetic energy gained and the work done, relative to their size.
    pub energy: Deviation,
    /// The observed order of a fourth-order method, where it could be measured.
    pub order: Option<String>,
    /// The times, in seconds.
    pub times: Vec<f64>,
    /// The coordinates of the reference motion.
    pub curves: Vec<Curve>,
}

/// The result of a run.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Report {
    /// What it says as a whole.
    pub agreement: Agreement,
    /// The constants.
    pub constants: Vec<ValueRow>,
    /// What stood for undetermined functions.
    pub stand_ins: Vec<StandInRow>,
    /// Where the motion started.
    pub start: Vec<ValueRow>,
    /// At how many random states accelerations were compared.
    pub states: usize,
    /// The largest deviation of accelerations, relative to the largest of each coordinate.
    pub accelerations: Deviation,
    /// The coordinate of the largest deviation.
    pub worst_coordinate: String,
    /// The motion.
    pub motion: MotionReport,
}

/// A number rounded to this many digits.
pub(super) fn rounded(value: f64, digits: usize) -> f64 {
    let text = format!("{:.*e}", digits.saturating_sub(1), value);
    // Adding zero turns a negative zero into a plain one.
    text.parse().unwrap_or(value) + 0.0
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn noise_is_not_shown() {
        assert_eq!(Deviation::new(3e-16, 1e-9), Deviation::new(7e-13, 1e-9));
        assert_eq!(Deviation::new(3e-16, 1e-9).largest, "below 1e-11");
        assert_eq!(Deviation::new(3e-10, 1e-9).largest, "below 1e-9");
        let wrong = Deviation::new(0.25, 1e-9);
        assert_eq!(
            (wrong.largest.as_str(), wrong.agreement),
            ("2.5e-1", Agreement::Disagrees)
        );
        assert_eq!(Deviation::new(f64::NAN, 1e-9).agreement, Agreement::Disagrees);
    }

    #[test]
    fn rounding_has_no_negative_zero() {
        assert_eq!(rounded(-0.0, 5).to_string(), "0");
        assert_eq!(rounded(1.234_567_8, 5).to_string(), "1.2346");
    }
}
