//! The page of a sheet: what was stated, in tables.

use super::formula::Notation;
use super::page::{Block, Line, Page, Piece, words};
use crate::model::{Assumption, Condition, Force, ForceKind, Model, Origin, Reaction, Role, Vector};

/// The page of everything that a model states.
#[must_use]
pub fn model(model: &Model) -> Page {
    let notation = Notation::of(model);
    let mut blocks = vec![quantities(model)];
    if !model.particles().is_empty() {
        blocks.push(heading("Particles"));
        blocks.push(particles(model, &notation));
    }
    if !model.forces().is_empty() {
        blocks.push(heading("Applied forces"));
        blocks.push(forces(model, &notation));
    }
    if !model.reactions().is_empty() {
        blocks.push(heading("Ideal reactions"));
        blocks.push(reactions(model, &notation));
    }
    if let Some(line) = conditions(model, &notation) {
        blocks.push(Block::Sentence(line));
    }
    let assumptions = model.register_of_assumptions();
    if !assumptions.is_empty() {
        blocks.push(heading("Assumptions"));
        blocks.push(register(&assumptions));
    }
    Page {
        title: model.title().to_owned(),
        verdict: Line::new(),
        blocks,
    }
}

/// The page of the quantities alone.
#[must_use]
pub fn quantities_page(model: &Model) -> Page {
    Page {
        title: "Quantities".to_owned(),
        verdict: Line::new(),
        blocks: vec![quantities(model)],
    }
}

/// The page of the assumption register.
#[must_use]
pub fn assumptions_page(model: &Model) -> Page {
    let entries = model.register_of_assumptions();
    let blocks = if entries.is_empty() {
        vec![Block::Sentence(words("No assumptions are stated on this sheet."))]
    } else {
        vec![register(&entries)]
    };
    Page {
        title: "Assumption register".to_owned(),
        verdict: Line::new(),
        blocks,
    }
}

fn heading(text: &str) -> Block {
    Block::Sentence(vec![Piece::Strong(text.to_owned())])
}

fn quantities(model: &Model) -> Block {
    let notation = Notation::of(model);
    let stated = model
        .quantities()
        .iter()
        .filter(|declared| declared.role() != Role::Time);
    Block::Table {
        head: ["symbol", "meaning", "unit", "part"].map(words).into(),
        rows: stated
            .map(|declared| {
                vec![
                    vec![Piece::Math(notation.formula(declared.value()))],
                    words(declared.meaning()),
                    words(declared.unit().code()),
                    vec![Piece::quiet(declared.role().words())],
                ]
            })
            .collect(),
    }
}

fn particles(model: &Model, notation: &Notation) -> Block {
    Block::Table {
        head: ["particle", "mass", "position (x, y, z)"].map(words).into(),
        rows: model
            .particles()
            .iter()
            .map(|particle| {
                vec![
                    words(particle.name().as_str()),
                    vec![Piece::Math(notation.formula(particle.mass()))],
                    vec![Piece::Math(notation.components(particle.position()))],
                ]
            })
            .collect(),
    }
}

/// A vector on a particle, as `on the trolley: (F, 0, 0)`.
fn load(model: &Model, notation: &Notation, particle: usize, vector: Vector) -> Line {
    let name = model
        .particles()
        .get(particle)
        .map_or("", |particle| particle.name().as_str());
    vec![
        Piece::quiet(format!("on {name}: ")),
        Piece::Math(notation.components(vector)),
    ]
}

fn forces(model: &Model, notation: &Notation) -> Block {
    let law = |force: &Force| -> Vec<Line> {
        match force.kind() {
            ForceKind::Gravity {
                acceleration,
                direction,
            } => vec![vec![
                Piece::quiet("on every particle: mass times "),
                Piece::Math(notation.formula(acceleration)),
                Piece::quiet(" along "),
                Piece::Math(notation.components(direction)),
            ]],
            ForceKind::Spring {
                stiffness,
                rest_length,
                length,
                ..
            } => vec![vec![
                Piece::quiet("stiffness "),
                Piece::Math(notation.formula(stiffness)),
                Piece::quiet(", length without load "),
                Piece::Math(notation.formula(rest_length)),
                Piece::quiet(", length "),
                Piece::Math(notation.formula(length)),
            ]],
            ForceKind::Damper { coefficient, .. } => vec![vec![
                Piece::quiet("damping coefficient "),
                Piece::Math(notation.formula(coefficient)),
            ]],
            _ => force
                .loads()
                .iter()
                .map(|stated| load(model, notation, stated.particle, stated.vector))
                .collect(),
        }
    };
    let rows = model.forces().iter().flat_map(|force| {
        law(force).into_iter().enumerate().map(|(place, line)| {
            let named = |text: &str| if place == 0 { words(text) } else { Line::new() };
            let kind = force.kind().words();
            let kind = if kind == force.name().as_str() { "" } else { kind };
            vec![named(force.name().as_str()), named(kind), line]
        })
    });
    Block::Table {
        head: ["force", "kind", "acts"].map(words).into(),
        rows: rows.collect(),
    }
}

fn reactions(model: &Model, notation: &Notation) -> Block {
    let rows = model.reactions().iter().flat_map(|reaction: &Reaction| {
        reaction.directions().iter().enumerate().map(|(place, stated)| {
            let first = |line: Line| if place == 0 { line } else { Line::new() };
            vec![
                first(words(reaction.name().as_str())),
                first(words(reaction.kind().words())),
                first(vec![Piece::Math(notation.formula(reaction.magnitude().into()))]),
                load(model, notation, stated.particle, stated.vector),
            ]
        })
    });
    Block::Table {
        head: ["reaction", "kind", "magnitude", "direction"].map(words).into(),
        rows: rows.collect(),
    }
}

/// What must hold for forces and reactions to be as stated.
fn conditions(model: &Model, notation: &Notation) -> Option<Line> {
    let of_forces = model.forces().iter().flat_map(Force::conditions);
    let of_reactions = model.reactions().iter().flat_map(Reaction::conditions);
    let mut all: Vec<Condition> = Vec::new();
    for condition in of_forces.chain(of_reactions) {
        if !all.contains(condition) {
            all.push(*condition);
        }
    }
    (!all.is_empty()).then(|| notation.where_holds(&all))
}

fn register(assumptions: &[Assumption]) -> Block {
    Block::Table {
        head: ["no.", "assumption", "affects", "origin"].map(words).into(),
        rows: assumptions
            .iter()
            .map(|assumption| {
                vec![
                    words(assumption.number().to_string()),
                    words(assumption.text()),
                    words(assumption.affects().join(", ")),
                    vec![Piece::quiet(match assumption.origin() {
                        Origin::Stated => "stated",
                        Origin::Implied => "follows from the model",
                    })],
                ]
            })
            .collect(),
    }
}
