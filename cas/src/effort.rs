//! One value that bounds how much work a computation may do, and the error that names the limit reached.
//!
//! Limits count work, not seconds, so that the same question gets the same answer on every machine;
//! a stop flag lets a person end a computation early.

use std::cell::Cell;
use std::sync::atomic::{AtomicBool, Ordering};

/// How much work a computation may do.
///
/// ```
/// use cas::Effort;
/// let patient = Effort { terms: 10_000_000, ..Effort::default() };
/// assert!(patient.terms > Effort::default().terms);
/// ```
#[derive(Clone, Copy, Debug)]
pub struct Effort {
    /// The most terms that one polynomial may have.
    pub terms: usize,
    /// The most term products and other elementary operations in one computation.
    pub operations: u64,
    /// The most bits of one coefficient.
    pub bits: u64,
    /// A flag that ends the computation once it is set.
    pub stop: Option<&'static AtomicBool>,
}

impl Default for Effort {
    fn default() -> Self {
        Self {
            terms: 2_000_000,
            operations: 2_000_000_000,
            bits: 100_000,
            stop: None,
        }
    }
}

/// The limit that ended a computation.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum Limit {
    /// A polynomial would have more terms than allowed.
    #[error("the limit of {0} terms was reached")]
    Terms(usize),
    /// More operations than allowed were needed.
    #[error("the limit of {0} operations was reached")]
    Operations(u64),
    /// A coefficient would have more bits than allowed.
    #[error("the limit of {0} bits in one number was reached")]
    Bits(u64),
    /// An exponent is larger than polynomials can hold.
    #[error("an exponent above {0} occurred")]
    Exponent(u32),
    /// Functions stand in the arguments of functions deeper than allowed.
    #[error("functions nested more than {0} deep occurred")]
    Nesting(u32),
    /// The stop flag was set.
    #[error("stopped on request")]
    Stopped,
}

impl Limit {
    /// How to go on.
    #[must_use]
    pub fn hint(&self) -> &'static str {
        match self {
            Self::Terms(_) => {
                "raise `Effort::terms`, or name parts of the expression and treat them separately"
            }
            Self::Operations(_) => {
                "raise `Effort::operations`, or name parts of the expression and treat them separately"
            }
            Self::Bits(_) => "raise `Effort::bits`, or give the constants fewer digits",
            Self::Exponent(_) => "lower the exponent",
            Self::Nesting(_) => "name the inner functions and treat them separately",
            Self::Stopped => "run it again when there is time",
        }
    }
}

/// The work done so far under one [`Effort`].
#[derive(Debug)]
pub struct Meter<'a> {
    effort: &'a Effort,
    spent: Cell<u64>,
    next_look: Cell<u64>,
}

/// Operations between two looks at the stop flag: well below a millisecond.
const BETWEEN_LOOKS: u64 = 1 << 12;

impl<'a> Meter<'a> {
    /// Nothing spent yet.
    #[must_use]
    pub fn new(effort: &'a Effort) -> Self {
        Self {
            effort,
            spent: Cell::new(0),
            next_look: Cell::new(0),
        }
    }

    /// The limits that this meter watches.
    #[must_use]
    pub fn effort(&self) -> &'a Effort {
        self.effort
    }

    /// Counts `operations` more.
    ///
    /// # Errors
    /// The limit of operations, or the stop flag.
    pub fn spend(&self, operations: u64) -> Result<(), Limit> {
        let spent = self.spent.get().saturating_add(operations);
        self.spent.set(spent);
        if spent > self.effort.operations {
            return Err(Limit::Operations(self.effort.operations));
        }
        if spent >= self.next_look.get() {
            self.next_look.set(spent + BETWEEN_LOOKS);
            if self.effort.stop.is_some_and(|flag| flag.load(Ordering::Relaxed)) {
                return Err(Limit::Stopped);
            }
        }
        Ok(())
    }

    /// Refuses a polynomial of more terms than allowed.
    ///
    /// # Errors
    /// The limit of terms.
    pub fn allow_terms(&self, terms: usize) -> Result<(), Limit> {
        if terms > self.effort.terms {
            Err(Limit::Terms(self.effort.terms))
        } else {
            Ok(())
        }
    }

    /// Refuses a number of more bits than allowed.
    ///
    /// # Errors
    /// The limit of bits.
    pub fn allow_bits(&self, bits: u64) -> Result<(), Limit> {
        if bits > self.effort.bits {
            Err(Limit::Bits(self.effort.bits))
        } else {
            Ok(())
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn each_limit_is_named() {
        let effort = Effort {
            terms: 2,
            operations: 10,
            bits: 64,
            stop: None,
        };
        let meter = Meter::new(&effort);
        assert_eq!(meter.allow_terms(3), Err(Limit::Terms(2)));
        assert_eq!(meter.allow_bits(65), Err(Limit::Bits(64)));
        assert_eq!(meter.spend(10), Ok(()));
        assert_eq!(meter.spend(1), Err(Limit::Operations(10)));
    }

    #[test]
    fn the_stop_flag_ends_the_work() {
        static FLAG: AtomicBool = AtomicBool::new(false);
        let effort = Effort {
            stop: Some(&FLAG),
            ..Effort::default()
        };
        let meter = Meter::new(&effort);
        assert_eq!(meter.spend(1), Ok(()));
        FLAG.store(true, Ordering::Relaxed);
        assert_eq!(meter.spend(BETWEEN_LOOKS), Err(Limit::Stopped));
    }
}
