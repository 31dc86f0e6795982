//! Intervals with outward rounding.

use std::fmt;

use super::real::Real;
use crate::expr::Function;
use crate::number::Rational;

/// All numbers from a lower to an upper bound.
///
/// Every operation rounds outward, so that the true value stays inside. Sine, cosine, exponential and
/// logarithm are taken from the platform, whose error is assumed below eight units in the last
/// place; that is far above what is known of current platforms (common practice: below one unit).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Interval {
    low: f64,
    high: f64,
}

/// Units in the last place by which values of the platform's functions are widened.
const SLACK: u32 = 8;

/// Arguments of sine and cosine beyond this give the interval from minus one to one.
const MOST_ANGLE: f64 = 1e6;

impl Interval {
    /// The lower bound.
    #[must_use]
    pub fn low(self) -> f64 {
        self.low
    }

    /// The upper bound.
    #[must_use]
    pub fn high(self) -> f64 {
        self.high
    }

    /// Whether the two have no number in common.
    #[must_use]
    pub fn is_apart_from(self, other: Self) -> bool {
        self.high < other.low || other.high < self.low
    }

    /// The interval around bounds that were rounded to nearest; `None` where they are no numbers.
    fn widened(low: f64, high: f64, units: u32) -> Option<Self> {
        let (mut low, mut high) = (low, high);
        for _ in 0..units {
            (low, high) = (low.next_down(), high.next_up());
        }
        (low.is_finite() && high.is_finite()).then_some(Self { low, high })
    }

    fn contains_zero(self) -> bool {
        self.low <= 0.0 && self.high >= 0.0
    }

    /// The image under a function that grows.
    fn growing(self, function: impl Fn(f64) -> f64) -> Option<Self> {
        Self::widened(function(self.low), function(self.high), SLACK)
    }

    /// The cosine, shifted by a number of quarter turns.
    fn cosine_less(self, quarters: f64) -> Option<Self> {
        if self.low.abs() > MOST_ANGLE || self.high.abs() > MOST_ANGLE || self.high - self.low > 3.0 {
            return Self::widened(-1.0, 1.0, 0);
        }
        let function: fn(f64) -> f64 = if quarters == 0.0 { f64::cos } else { f64::sin };
        let (a, b) = (function(self.low), function(self.high));
        let bounds = Self::widened(a.min(b), a.max(b), SLACK)?;
        // The function turns at half turns of the shifted angle; near one of them both bounds are opened.
        let half_turns = |angle: f64| (angle - quarters * std::f64::consts::FRAC_PI_2) / std::f64::consts::PI;
        let (from, to) = (half_turns(self.low) - 1e-9, half_turns(self.high) + 1e-9);
        let (mut low, mut high) = (bounds.low.max(-1.0), bounds.high.min(1.0));
        let mut turning = from.ceil();
        while turning <= to {
            if turning.rem_euclid(2.0) == 0.0 {
                high = 1.0;
            } else {
                low = -1.0;
            }
            turning += 1.0;
        }
        Self::widened(low, high, 0)
    }
}

impl Real for Interval {
    fn rational(value: &Rational) -> Option<Self> {
        let near = f64::rational(value)?;
        Self::widened(near, near, 2)
    }

    fn pi() -> Self {
        Self {
            low: std::f64::consts::PI.next_down(),
            high: std::f64::consts::PI.next_up(),
        }
    }

    fn sum(self, other: Self) -> Option<Self> {
        Self::widened(self.low + other.low, self.high + other.high, 1)
    }

    fn product(self, other: Self) -> Option<Self> {
        let products = [
            self.low * other.low,
            self.low * other.high,
            self.high * other.low,
            self.high * other.high,
        ];
        let low = products.into_iter().fold(f64::INFINITY, f64::min);
        let high = products.into_iter().fold(f64::NEG_INFINITY, f64::max);
        Self::widened(low, high, 1)
    }

    fn inverse(self) -> Option<Self> {
        if self.contains_zero() {
            return None;
        }
        Self::widened(1.0 / self.high, 1.0 / self.low, 1)
    }

    fn root(self, degree: u32) -> Option<Self> {
        if self.low < 0.0 {
            return None;
        }
        let exponent = 1.0 / f64::from(degree);
        let root = |value: f64| {
            if degree == 2 {
                value.sqrt()
            } else {
                value.powf(exponent)
            }
        };
        let bounds = self.growing(root)?;
        Self::widened(bounds.low.max(0.0), bounds.high, 0)
    }

    fn elementary(self, function: Function) -> Option<Self> {
        match function {
            Function::Sine => self.cosine_less(1.0),
            Function::Cosine => self.cosine_less(0.0),
            Function::Tangent => {
                let below = self.cosine_less(0.0)?.inverse()?;
                self.cosine_less(1.0)?.product(below)
            }
            Function::Exponential => self.growing(f64::exp),
            Function::Logarithm if self.low > 0.0 => self.growing(f64::ln),
            Function::Logarithm => None,
        }
    }
}

impl fmt::Display for Interval {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        // Seven digits: enough to see a difference, few enough to be the same on every machine.
        write!(f, "about {:.6e}", f64::midpoint(self.low, self.high))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn at(value: f64) -> Interval {
        Interval::widened(value, value, 1).expect("a number")
    }

    fn between(low: f64, high: f64) -> Interval {
        Interval { low, high }
    }

    #[test]
    fn values_stay_inside() {
        for step in -400..400_i32 {
            let x = f64::from(step) * 0.05;
            let wide = between(x - 0.3, x + 0.7);
            for part in 0..=10_i32 {
                let y = (x - 0.3 + f64::from(part) * 0.1).clamp(wide.low, wide.high);
                for (function, value) in [(Function::Sine, y.sin()), (Function::Cosine, y.cos())] {
                    let image = wide.elementary(function).expect("bounded");
                    assert!(
                        image.low <= value && value <= image.high,
                        "{function:?} of {y} in {image:?}"
                    );
                }
            }
        }
    }

    #[test]
    fn turning_points_are_reached() {
        let around = between(-0.1, 0.1).elementary(Function::Cosine).expect("bounded");
        assert_eq!(around.high, 1.0);
        let around = between(1.5, 1.6).elementary(Function::Sine).expect("bounded");
        assert_eq!(around.high, 1.0);
        let around = between(3.0, 3.2).elementary(Function::Cosine).expect("bounded");
        assert_eq!(around.low, -1.0);
    }

    #[test]
    fn what_has_no_value_has_no_interval() {
        assert!(between(-1.0, 1.0).inverse().is_none());
        assert!(between(-1.0, 1.0).root(2).is_none());
        assert!(between(0.0, 1.0).elementary(Function::Logarithm).is_none());
        assert!(at(1e308).product(at(1e308)).is_none());
        assert!(at(1.0).is_apart_from(at(1.1)) && !at(1.0).is_apart_from(at(1.0)));
    }
}
