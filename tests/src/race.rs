//! The race: our equations of motion against those of general-purpose libraries, in one run.
//!
//! Every contestant builds the same mechanical systems and brings the equations of motion, by the
//! energy route, into canonical form: expanded, with the squares of sines replaced. The number of
//! terms shows that all did the same work. Each runs in a process of its own, so that the memory is
//! its own.

mod case;
mod ours;
mod peer;
mod process;
mod table;
mod workload;

pub use case::{Case, Family};
pub use ours::{Task, measure};
pub use peer::Peer;
pub use process::{Measurement, Run};
pub use table::{Row, growth};
pub use workload::Workload;
