//! Published systems: stated as a user states them, beside what the source prints about them.
//!
//! Lagrangians and equations are as printed in the source that each system names; where a section
//! number was quoted from memory the source says so. The accelerations and reactions at probe states
//! were recomputed by two independent routes that agree to 4e-15; none of them uses this program.

mod falling;
mod moving_supports;
mod orbits;
mod pendulums;
mod rotating;

use cas::{Expr, Symbol};
use worksheets::prelude::Sheet;

/// What a source prints about the motion.
#[derive(Clone, Debug)]
pub enum Printed {
    /// A Lagrangian; a total time derivative may have been dropped from it, so that only its equations count.
    Lagrangian(Expr),
    /// For each coordinate the left side of an equation `... = 0`.
    Equations(Vec<Expr>),
    /// The acceleration of each coordinate.
    Accelerations(Vec<Expr>),
}

/// A state with what holds in it.
#[derive(Clone, Debug)]
pub struct Probe {
    /// Values of constants, time, coordinates and velocities, as exact decimals.
    pub state: Vec<(Expr, &'static str)>,
    /// The acceleration of each coordinate.
    pub accelerations: Vec<f64>,
    /// The magnitudes of reactions, by name.
    pub reactions: Vec<(&'static str, f64)>,
}

/// A published system.
#[derive(Clone, Debug)]
pub struct Published {
    /// Author, work, place; and whether the place was quoted from memory.
    pub source: &'static str,
    /// The system as a user states it.
    pub sheet: Sheet,
    /// What the source prints.
    pub printed: Vec<Printed>,
    /// What holds at probe states.
    pub probes: Vec<Probe>,
}

/// Every published system.
#[must_use]
pub fn all() -> Vec<Published> {
    let groups = [
        pendulums::all(),
        moving_supports::all(),
        rotating::all(),
        falling::all(),
        orbits::all(),
    ];
    groups.into_iter().flatten().collect()
}

/// The velocity of a coordinate.
fn rate(coordinate: Expr) -> Expr {
    Expr::from(symbol(coordinate).primed())
}

/// The acceleration of a coordinate.
fn second_rate(coordinate: Expr) -> Expr {
    Expr::from(symbol(coordinate).primed().primed())
}

fn symbol(coordinate: Expr) -> Symbol {
    coordinate
        .as_symbol()
        .expect("invariant: a coordinate is a symbol")
}

fn half() -> Expr {
    Expr::from(1) / 2
}
