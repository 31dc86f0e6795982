//! Checks across crates and against published results; this library holds what several of them need.
#![forbid(unsafe_code)]

pub mod identities;
pub mod motion;
pub mod program;
pub mod published;
pub mod race;
pub mod repository;
