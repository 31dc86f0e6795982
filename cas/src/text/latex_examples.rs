//! Placeholder until tests come.
