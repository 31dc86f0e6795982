//! Analytical mechanics for notebook cells.
