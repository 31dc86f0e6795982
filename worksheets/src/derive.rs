//! The derivation, stage by stage: each is a function of the model alone and returns its recorded steps.
//!
//! ```text
//! position maps -> velocities -> Jacobian -> Newton's equations -> projection on the Jacobian
//!                                                   |-> virtual work of reactions
//!                                                   |-> reduction to d/dt(dT/dq') - dT/dq
//! applied forces -> generalized forces -> potential -> Lagrangian -> equations of motion -> mass matrix
//! ```
//!
//! Every equality in a step is put before [`cas::decide::compare`]; nothing is called proved because
//! of the way in which it was made. Projection and energy route are always both computed.
//!
//! # Sources
//!
//! - \[Whittaker1937\] E. T. Whittaker, "A Treatise on the Analytical Dynamics of Particles and Rigid
//!   Bodies", 4th edition, Cambridge University Press, 1937, chapter II (quoted from memory).

mod energy;
mod equations;
mod error;
mod forces;
mod identities;
mod jacobian;
mod kinematics;
mod lagrangian;
mod mass_matrix;
mod newton;
mod potential;
mod reduction;
mod result;
mod stage;
#[cfg(test)]
mod tests;
mod vanishing;
mod velocities;
mod work;

pub use equations::{Motion, equations};
pub use error::DeriveError;
pub use forces::generalized_forces;
pub use identities::identities;
pub use jacobian::jacobian;
pub use lagrangian::lagrangian;
pub use mass_matrix::mass_matrix;
pub use newton::{newton, projection};
pub use potential::potential;
pub use reduction::reduction;
pub use result::Derived;
pub use velocities::velocities;
pub use work::virtual_work;
