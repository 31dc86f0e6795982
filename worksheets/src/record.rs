//! The record: what was derived, step by step, in a form that can be stored, shown and checked again.
//!
//! A [`Step`] is one recorded equality with its rule, what it rests on, its conditions and how it
//! stands; a [`Derivation`] is an ordered list of steps under a title with a headline; a [`Record`]
//! joins it with what was stated on the sheet. Everything that is shown of a derivation follows from
//! the record alone, so whoever reads a stored record can make the same pictures and prove the same
//! steps without running the worksheet.
//!
//! Refused alternative: storing typeset text. It cannot be proved again, and two spellings of one
//! formula could not be told from two formulas.

mod derivation;
mod entry;
mod error;
mod formal;
mod formal_text;
mod given;
mod ground;
#[cfg(test)]
mod hostile_tests;
mod reproved;
mod rule;
#[cfg(test)]
mod schema_check;
mod standing;
mod statement;
mod store;
#[cfg(test)]
pub(crate) mod tests;
mod written;

pub use derivation::{Derivation, Shown, Tally};
pub use entry::{
    AssumptionEntry, ForceEntry, LoadEntry, ParticleEntry, QuantityEntry, ReactionEntry, RoleEntry,
};
pub use error::RecordError;
pub use formal::{Axis, Formal};
pub(crate) use formal_text::Bond;
#[cfg(test)]
pub(crate) use formal_text::tests::samples as formal_samples;
pub use given::{given, is_implied};
pub use ground::Ground;
pub use reproved::Divergence;
pub use rule::{Rule, Source};
pub use standing::{Assignment, Standing};
pub use statement::{Relation, Side, Statement, Step};
pub use store::{DerivationEntry, FORMAT, Record, ReferenceEntry, SCHEMA};
