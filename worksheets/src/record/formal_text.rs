//! Names in the symbols of the trade as text: how tightly each holds together, and its plain notation.

use cas::Name;

use super::formal::{Axis, Formal};

/// How tightly the parts of a written name hold together.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(crate) enum Bond {
    /// A sum or difference.
    Sum,
    /// A product, or a sign before something.
    Product,
    /// A derivative.
    Derivative,
    /// A letter with its indexes.
    Letter,
}

impl Formal {
    /// How tightly its parts hold together.
    pub(crate) fn bond(&self) -> Bond {
        match self {
            Self::Sum { terms } if terms.len() == 1 => terms[0].bond(),
            Self::Product { factors } if factors.len() == 1 => factors[0].bond(),
            Self::Sum { terms } if terms.is_empty() => Bond::Letter,
            Self::Product { factors } if factors.is_empty() => Bond::Letter,
            Self::Number { value } if *value < 0 => Bond::Sum,
            Self::Sum { .. } | Self::Difference { .. } | Self::Negative { .. } => Bond::Sum,
            Self::Product { .. } | Self::Dot { .. } | Self::OverParticles { .. } => Bond::Product,
            Self::Partial { .. } | Self::Rate { .. } | Self::VirtualWork { .. } => Bond::Derivative,
            _ => Bond::Letter,
        }
    }

    /// The name in plain notation, such as `d/dt(∂T/∂phi') - ∂T/∂phi`.
    #[must_use]
    pub fn plain(&self) -> String {
        match self {
            Self::Zero => "0".to_owned(),
            Self::Number { value } => value.to_string(),
            Self::Symbol { symbol } => symbol.to_string(),
            Self::Coordinates { primes } => format!("q{}", marks(*primes)),
            Self::Position {
                particle,
                axis,
                primes,
            } => {
                let letter = axis.map_or("r", Axis::letter);
                format!("{letter}_{}{}", owner(*particle), marks(*primes))
            }
            Self::Mass { particle } => format!("m_{}", owner(*particle)),
            Self::Force {
                force: source,
                particle,
                axis,
            } => loaded("F", *source, *particle, *axis),
            Self::Reaction {
                reaction: source,
                particle,
                axis,
            } => loaded("R", *source, *particle, *axis),
            Self::KineticEnergy { particle } => indexed("T", *particle),
            Self::Potential { force } => indexed("V", *force),
            Self::Lagrangian => "L".to_owned(),
            Self::GeneralizedForce { coordinate, force } => format!("Q{}_{coordinate}", source(*force)),
            Self::VirtualWork { reaction, coordinate } => format!("δW[{reaction}]/δ{coordinate}"),
            Self::MassMatrix => "M".to_owned(),
            Self::MassMatrixEntry { row, column } => format!("M_{row},{column}"),
            Self::Bias { coordinate } => indexed("h", *coordinate),
            Self::Jacobian => "J".to_owned(),
            Self::GramDeterminant => "det(J^T J)".to_owned(),
            Self::EquationOfMotion { coordinate } => format!("(equation of {coordinate})"),
            Self::Partial { of, by } => format!("∂{}/∂{by}", of.within(Bond::Letter)),
            Self::Rate { of } => format!("d/dt({})", of.plain()),
            Self::OverParticles { of } => format!("Σ_i {}", of.within(Bond::Product)),
            Self::Sum { terms } if terms.is_empty() => "0".to_owned(),
            Self::Sum { terms } => sum(terms),
            Self::Difference { left, right } => format!("{} - {}", left.plain(), right.within(Bond::Product)),
            Self::Product { factors } if factors.is_empty() => "1".to_owned(),
            Self::Product { factors } => joined(factors, "*"),
            Self::Dot { left, right } => {
                format!(
                    "{}·{}",
                    left.within(Bond::Derivative),
                    right.within(Bond::Derivative)
                )
            }
            Self::Negative { of } => format!("-{}", of.within(Bond::Product)),
        }
    }

    /// The name in plain notation, in brackets where it holds less tightly than asked.
    fn within(&self, asked: Bond) -> String {
        if self.bond() < asked {
            format!("({})", self.plain())
        } else {
            self.plain()
        }
    }
}

fn marks(primes: u8) -> String {
    "'".repeat(primes.into())
}

/// The index of a particle; `i` for the running one.
fn owner(particle: Option<Name>) -> &'static str {
    particle.map_or("i", Name::as_str)
}

fn indexed(letter: &str, index: Option<Name>) -> String {
    match index {
        Some(index) => format!("{letter}_{index}"),
        None => letter.to_owned(),
    }
}

fn source(name: Option<Name>) -> String {
    name.map_or_else(String::new, |name| format!("[{name}]"))
}

fn loaded(letter: &str, name: Option<Name>, particle: Option<Name>, axis: Option<Axis>) -> String {
    let component = axis.map_or_else(String::new, |axis| format!(",{}", axis.letter()));
    format!("{letter}{}_{}{component}", source(name), owner(particle))
}

/// Factors; one alone stands without brackets.
fn joined(factors: &[Formal], between: &str) -> String {
    match factors {
        [alone] => alone.plain(),
        _ => factors
            .iter()
            .map(|factor| factor.within(Bond::Derivative))
            .collect::<Vec<_>>()
            .join(between),
    }
}

fn sum(terms: &[Formal]) -> String {
    let mut text = String::new();
    for (place, term) in terms.iter().enumerate() {
        match (place, term) {
            (0, _) => text.push_str(&term.plain()),
            (_, Formal::Negative { of }) => text.push_str(&format!(" - {}", of.within(Bond::Product))),
            _ => text.push_str(&format!(" + {}", term.within(Bond::Product))),
        }
    }
    text
}

#[cfg(test)]
pub(crate) mod tests {
    use cas::Symbol;

    use super::*;

    fn name(text: &str) -> Name {
        Name::new(text).expect("a valid name")
    }

    /// One name of every kind, with its plain notation.
    pub(crate) fn samples() -> Vec<(Formal, &'static str)> {
        let [bob, rope, drive, phi, x] = ["bob", "rope", "drive", "phi", "x"].map(name);
        let symbol = Symbol::from(phi);
        let weight = Formal::Mass { particle: None };
        let projected = Formal::running_position(2).dot(Formal::running_position(0).partial(symbol));
        vec![
            (Formal::Zero, "0"),
            (Formal::Number { value: -2 }, "-2"),
            (Formal::symbol(symbol.primed()), "phi'"),
            (Formal::Coordinates { primes: 2 }, "q''"),
            (Formal::position(bob, Axis::Z), "z_bob"),
            (Formal::velocity(bob, Axis::X), "x_bob'"),
            (Formal::acceleration(bob, Axis::Y), "y_bob''"),
            (Formal::mass_times_acceleration(bob, Axis::Y), "m_bob*y_bob''"),
            (Formal::force(drive, bob, Axis::X), "F[drive]_bob,x"),
            (
                Formal::Force {
                    force: None,
                    particle: None,
                    axis: None,
                },
                "F_i",
            ),
            (Formal::reaction(rope, bob, Axis::Z), "R[rope]_bob,z"),
            (Formal::KineticEnergy { particle: Some(bob) }, "T_bob"),
            (Formal::Potential { force: Some(drive) }, "V_drive"),
            (Formal::Lagrangian, "L"),
            (Formal::generalized_force(phi), "Q_phi"),
            (
                Formal::GeneralizedForce {
                    coordinate: phi,
                    force: Some(drive),
                },
                "Q[drive]_phi",
            ),
            (
                Formal::VirtualWork {
                    reaction: rope,
                    coordinate: phi,
                },
                "δW[rope]/δphi",
            ),
            (
                Formal::product([Formal::MassMatrix, Formal::Coordinates { primes: 2 }])
                    .minus(Formal::Bias { coordinate: None }.negative()),
                "M*q'' - (-h)",
            ),
            (Formal::MassMatrixEntry { row: x, column: phi }, "M_x,phi"),
            (Formal::Jacobian, "J"),
            (Formal::GramDeterminant, "det(J^T J)"),
            (Formal::EquationOfMotion { coordinate: phi }, "(equation of phi)"),
            (
                Formal::kinetic_energy().lagrange_expression(symbol),
                "d/dt(∂T/∂phi') - ∂T/∂phi",
            ),
            (
                Formal::product([weight, projected]).over_particles(),
                "Σ_i m_i*(r_i''·∂r_i/∂phi)",
            ),
            (
                Formal::sum([
                    Formal::kinetic_energy(),
                    Formal::potential().negative(),
                    Formal::Lagrangian,
                ]),
                "T - V + L",
            ),
            (
                Formal::kinetic_energy()
                    .minus(Formal::potential())
                    .partial(Symbol::from(x)),
                "∂(T - V)/∂x",
            ),
        ]
    }

    #[test]
    fn names_are_written_as_the_trade_writes_them() {
        for (formal, plain) in samples() {
            assert_eq!(formal.plain(), plain);
        }
    }

    #[test]
    fn names_are_stored_without_loss() {
        for (formal, plain) in samples() {
            let stored = serde_json::to_string(&formal).expect("serializes");
            let read: Formal =
                serde_json::from_str(&stored).unwrap_or_else(|error| panic!("{plain}: {error}"));
            assert_eq!(read, formal, "{stored}");
        }
    }

    #[test]
    fn nothing_but_checked_names_is_read() {
        for wicked in ["<b>", "\\input{x}", "a$", ""] {
            let stored = serde_json::json!({"kind": "mass", "particle": wicked}).to_string();
            assert!(
                serde_json::from_str::<Formal>(&stored).is_err(),
                "{wicked} was read"
            );
            let stored = serde_json::json!({"kind": "symbol", "symbol": wicked}).to_string();
            assert!(
                serde_json::from_str::<Formal>(&stored).is_err(),
                "{wicked} was read"
            );
        }
    }
}
