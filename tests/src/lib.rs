//! Checks across crates and against published results.
