//! Exact algebra: expressions, canonical forms, verdicts.
