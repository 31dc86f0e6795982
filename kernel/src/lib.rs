//! The Gudgeon kernel.
