//! Names in the symbols of the trade as formulas.

use cas::text::{Arrangement, latex, latex_name};
use cas::{Expr, Name, Symbol};

use super::page::Formula;
use crate::record::{Axis, Bond, Formal};

/// The formula of a name.
pub(super) fn formula(formal: &Formal) -> Formula {
    Formula::new(tex(formal), formal.plain())
}

fn tex(formal: &Formal) -> String {
    match formal {
        Formal::Zero => "0".to_owned(),
        Formal::Number { value } => value.to_string(),
        Formal::Symbol { symbol } => symbol_tex(*symbol),
        Formal::Coordinates { primes } => dotted("q", *primes),
        Formal::Position {
            particle,
            axis,
            primes,
        } => {
            let letter = axis.map_or("\\boldsymbol{r}", Axis::letter);
            format!("{}_{{{}}}", dotted(letter, *primes), owner(*particle))
        }
        Formal::Mass { particle } => format!("m_{{{}}}", owner(*particle)),
        Formal::Force {
            force: source,
            particle,
            axis,
        } => loaded("F", *source, *particle, *axis),
        Formal::Reaction {
            reaction: source,
            particle,
            axis,
        } => loaded("R", *source, *particle, *axis),
        Formal::KineticEnergy { particle } => indexed("T", particle.map(upright)),
        Formal::Potential { force } => indexed("V", force.map(upright)),
        Formal::Lagrangian => "L".to_owned(),
        Formal::GeneralizedForce { coordinate, force } => {
            format!("Q_{{{}}}{}", latex_name(coordinate.as_str()), raised(*force))
        }
        Formal::VirtualWork { reaction, coordinate } => format!(
            "\\frac{{\\delta W_{{{}}}}}{{\\delta {}}}",
            upright(*reaction),
            latex_name(coordinate.as_str())
        ),
        Formal::MassMatrix => "M".to_owned(),
        Formal::MassMatrixEntry { row, column } => {
            format!(
                "M_{{{},{}}}",
                latex_name(row.as_str()),
                latex_name(column.as_str())
            )
        }
        Formal::Bias { coordinate } => indexed("h", coordinate.map(|name| latex_name(name.as_str()))),
        Formal::Jacobian => "J".to_owned(),
        Formal::GramDeterminant => "\\det\\left(J^{\\mathsf{T}} J\\right)".to_owned(),
        Formal::EquationOfMotion { coordinate } => {
            format!("\\text{{equation of }} {}", latex_name(coordinate.as_str()))
        }
        Formal::Partial { of, by } => partial(of, *by),
        Formal::Rate { of } => format!(
            "\\frac{{\\mathrm{{d}}}}{{\\mathrm{{d}}t}} {}",
            within(of, Bond::Derivative)
        ),
        Formal::OverParticles { of } => format!("\\sum_{{i}} {}", within(of, Bond::Product)),
        Formal::Sum { terms } if terms.is_empty() => "0".to_owned(),
        Formal::Sum { terms } => sum(terms),
        Formal::Difference { left, right } => format!("{} - {}", tex(left), within(right, Bond::Product)),
        Formal::Product { factors } if factors.is_empty() => "1".to_owned(),
        Formal::Product { factors } => product(factors),
        Formal::Dot { left, right } => {
            format!(
                "{} \\cdot {}",
                within(left, Bond::Derivative),
                within(right, Bond::Derivative)
            )
        }
        Formal::Negative { of } => format!("-{}", within(of, Bond::Product)),
    }
}

/// In brackets where it holds less tightly than asked.
fn within(formal: &Formal, asked: Bond) -> String {
    if formal.bond() < asked {
        format!("\\left({}\\right)", tex(formal))
    } else {
        tex(formal)
    }
}

fn symbol_tex(symbol: Symbol) -> String {
    latex(Expr::from(symbol), &Arrangement::default())
}

/// A letter under its dots; a rate beyond the third stands as a number in brackets.
fn dotted(letter: &str, primes: u8) -> String {
    match primes {
        0 => letter.to_owned(),
        1 => format!("\\dot{{{letter}}}"),
        2 => format!("\\ddot{{{letter}}}"),
        3 => format!("\\dddot{{{letter}}}"),
        more => format!("{letter}^{{({more})}}"),
    }
}

/// The name of a particle, force or reaction: a word, in upright letters.
fn upright(name: Name) -> String {
    let words: Vec<&str> = name.as_str().split('_').filter(|word| !word.is_empty()).collect();
    format!("\\mathrm{{{}}}", words.join("\\,"))
}

/// The index of a particle; `i` for the running one.
fn owner(particle: Option<Name>) -> String {
    particle.map_or_else(|| "i".to_owned(), upright)
}

fn indexed(letter: &str, index: Option<String>) -> String {
    match index {
        Some(index) => format!("{letter}_{{{index}}}"),
        None => letter.to_owned(),
    }
}

/// The name of a force above the index.
fn raised(name: Option<Name>) -> String {
    name.map_or_else(String::new, |name| format!("^{{{}}}", upright(name)))
}

fn loaded(letter: &str, name: Option<Name>, particle: Option<Name>, axis: Option<Axis>) -> String {
    match axis {
        Some(axis) => format!(
            "{letter}_{{{},{}}}{}",
            owner(particle),
            axis.letter(),
            raised(name)
        ),
        None => format!("\\boldsymbol{{{letter}}}_{{{}}}{}", owner(particle), raised(name)),
    }
}

fn partial(of: &Formal, by: Symbol) -> String {
    let by = symbol_tex(by);
    if of.bond() == Bond::Letter {
        format!("\\frac{{\\partial {}}}{{\\partial {by}}}", tex(of))
    } else {
        format!(
            "\\frac{{\\partial}}{{\\partial {by}}} {}",
            within(of, Bond::Derivative)
        )
    }
}

fn product(factors: &[Formal]) -> String {
    match factors {
        [alone] => tex(alone),
        _ => factors
            .iter()
            .map(|factor| within(factor, Bond::Derivative))
            .collect::<Vec<_>>()
            .join("\\, "),
    }
}

fn sum(terms: &[Formal]) -> String {
    let mut text = String::new();
    for (place, term) in terms.iter().enumerate() {
        match (place, term) {
            (0, _) => text.push_str(&tex(term)),
            (_, Formal::Negative { of }) => text.push_str(&format!(" - {}", within(of, Bond::Product))),
            _ => text.push_str(&format!(" + {}", within(term, Bond::Product))),
        }
    }
    text
}

#[cfg(test)]
mod tests {
    use super::super::typeset::mathml;
    use super::*;
    use crate::record::formal_samples;

    #[test]
    fn every_name_is_accepted_by_the_typesetter() {
        for (formal, plain) in formal_samples() {
            let made = formula(&formal).tex;
            assert!(mathml(&made, true).is_some(), "{plain}: {made}");
        }
    }

    #[test]
    fn derivatives_stand_as_fractions() {
        let phi = Symbol::new("phi").expect("a valid name");
        assert_eq!(
            formula(&Formal::kinetic_energy().lagrange_expression(phi)).tex,
            "\\frac{\\mathrm{d}}{\\mathrm{d}t} \\frac{\\partial T}{\\partial \\dot{\\varphi}} - \
             \\frac{\\partial T}{\\partial \\varphi}"
        );
    }
}
