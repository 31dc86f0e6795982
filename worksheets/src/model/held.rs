//! What holds the particles on their position maps besides the reactions that were stated.
//!
//! A particle that may move in three directions and has fewer coordinates is held in the others, by
//! reactions that do no virtual work. Those that were stated have names; whatever else is needed is
//! an assumption, which the register says and which Newton's equations must leave room for.

use cas::calculus::derivative;
use cas::decide::is_zero;
use cas::matrix::Matrix;
use cas::{Effort, Expr};

use super::Model;
use super::assumption::{Assumption, Origin};

const AXES: [&str; 3] = ["x", "y", "z"];

/// The directions in which particles are held by reactions without a name.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Unnamed {
    /// For each position component whether it is held as such: no coordinate moves it and no stated
    /// reaction acts in it.
    held: Vec<bool>,
    /// How many directions are held besides those components and the stated reactions.
    further: usize,
    /// Whether a stated reaction or a component as such is held at all.
    others: bool,
}

impl Model {
    /// The register of assumptions with those that follow from how the model is set up.
    ///
    /// A position component that no coordinate moves, and in which no declared reaction acts, is held
    /// by reactions without a name; so is every other direction that position maps exclude and no
    /// stated reaction covers. That these do no virtual work is an assumption.
    #[must_use]
    pub fn register_of_assumptions(&self) -> Vec<Assumption> {
        let (mut register, unnamed) = (self.assumptions.clone(), self.unnamed_reactions());
        let mut imply = |text: String, affects: Vec<String>| {
            register.push(Assumption {
                number: register.len() + 1,
                text,
                affects,
                origin: Origin::Implied,
            });
        };
        for (particle, held) in self.particles.iter().zip(unnamed.held.chunks(3)) {
            let letters = AXES.into_iter().zip(held).filter(|(_, held)| **held);
            let letters: Vec<&str> = letters.map(|(letter, _)| letter).collect();
            if !letters.is_empty() {
                imply(
                    format!(
                        "The {} is held in {} by ideal reactions that have no name on this sheet.",
                        particle.name,
                        letters.join(" and ")
                    ),
                    vec![particle.name.to_string()],
                );
            }
        }
        if unnamed.further > 0 {
            let names = self.particles.iter().map(|particle| particle.name.to_string());
            imply(unnamed.words(), names.collect());
        }
        register
    }

    /// What holds the particles besides the stated reactions.
    ///
    /// Position maps of `n` independent coordinates hold `N` particles in `3 N - n` directions. Stated
    /// reactions cover as many of them as they have independent directions without virtual work.
    pub(crate) fn unnamed_reactions(&self) -> Unnamed {
        let columns = self.columns();
        let reactions = self.reaction_columns();
        let moved_or_carried = |component: usize| {
            columns
                .iter()
                .chain(&reactions)
                .any(|column| !column[component].is_zero())
        };
        let held: Vec<bool> = (0..3 * self.particles.len())
            .map(|component| !moved_or_carried(component))
            .collect();
        let components = held.iter().filter(|held| **held).count();
        let covered = independent(&self.ideal(reactions, &columns));
        let excluded = held.len().saturating_sub(columns.len());
        let further = match self.require_complete() {
            Ok(()) => excluded.saturating_sub(components + covered),
            Err(_) => 0,
        };
        Unnamed {
            held,
            further,
            others: components + covered > 0,
        }
    }

    /// The position components in which a reaction without a name may act.
    ///
    /// Where stated reactions and held components leave directions open, that is every component
    /// whose unit vector is not a combination of the columns of the Jacobian.
    pub(crate) fn components_of_unnamed_reactions(&self) -> Vec<bool> {
        let Unnamed { held, further, .. } = self.unnamed_reactions();
        if further == 0 {
            return held;
        }
        let columns = self.columns();
        let open = |component: usize| {
            let mut unit = vec![Expr::zero(); held.len()];
            unit[component] = Expr::one();
            let mut extended = columns.clone();
            extended.push(unit);
            gram_determinant(&extended).is_none_or(|value| !is_zero(value, &Effort::default()).is_proved())
        };
        (0..held.len()).map(open).collect()
    }

    /// The columns of the Jacobian; a component that cannot be differentiated counts as moved.
    fn columns(&self) -> Vec<Vec<Expr>> {
        let components = self.position_components();
        let slopes = |coordinate| {
            let slope = |component: &Expr| derivative(*component, coordinate).unwrap_or(Expr::one());
            components.iter().map(slope).map(cleared).collect()
        };
        self.coordinates().into_iter().map(slopes).collect()
    }

    fn reaction_columns(&self) -> Vec<Vec<Expr>> {
        let places = 0..self.particles.len();
        let column = |reaction: &super::Reaction| {
            let directions = places
                .clone()
                .map(|place| reaction.direction_on(place).components());
            directions.flatten().map(cleared).collect()
        };
        self.reactions.iter().map(column).collect()
    }

    /// The reactions whose virtual work is proved zero.
    fn ideal(&self, reactions: Vec<Vec<Expr>>, columns: &[Vec<Expr>]) -> Vec<Vec<Expr>> {
        let workless = |reaction: &Vec<Expr>| {
            columns
                .iter()
                .all(|column| is_zero(product(reaction, column), &Effort::default()).is_proved())
        };
        reactions.into_iter().filter(workless).collect()
    }
}

impl Unnamed {
    /// How many directions are held besides stated reactions and held components.
    pub(crate) fn further(&self) -> usize {
        self.further
    }

    fn words(&self) -> String {
        format!(
            "The particles are held on their position maps in {} {}{} by ideal reactions that have no name on \
             this sheet.",
            self.further,
            if self.others { "further " } else { "" },
            if self.further == 1 {
                "direction"
            } else {
                "directions"
            },
        )
    }
}

/// Zero in place of another spelling of it, such as zero times the inverse of a length.
fn cleared(expr: Expr) -> Expr {
    if is_zero(expr, &Effort::default()).is_proved() {
        Expr::zero()
    } else {
        expr
    }
}

fn product(left: &[Expr], right: &[Expr]) -> Expr {
    let pairs = left
        .iter()
        .zip(right)
        .filter(|(a, b)| !a.is_zero() && !b.is_zero());
    Expr::sum_of(pairs.map(|(a, b)| *a * *b))
}

/// The determinant of all scalar products of columns: not zero exactly where they are independent.
fn gram_determinant(columns: &[Vec<Expr>]) -> Option<Expr> {
    let size = columns.len();
    let gram = Matrix::from_fn(size, size, |row, column| product(&columns[row], &columns[column]));
    gram.determinant(&Effort::default()).ok().map(|(value, _)| value)
}

/// How many of the columns are independent, as far as that is proved.
fn independent(columns: &[Vec<Expr>]) -> usize {
    let are_independent = |columns: &[Vec<Expr>]| {
        gram_determinant(columns).is_some_and(|value| is_zero(value, &Effort::default()).is_refuted())
    };
    if are_independent(columns) {
        return columns.len();
    }
    let mut kept: Vec<Vec<Expr>> = Vec::new();
    for column in columns {
        kept.push(column.clone());
        if !are_independent(&kept) {
            kept.pop();
        }
    }
    kept.len()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::prelude::*;

    #[test]
    fn what_no_coordinate_moves_and_no_reaction_carries_is_entered() {
        let mut sheet = Sheet::titled("Trolley on a girder");
        let m = sheet.positive_constant("m", "kg", "mass of the trolley");
        let x = sheet.coordinate("x", "m", "position");
        let trolley = sheet.particle("trolley", m, vector(x, 0, 0));
        sheet.normal("girder", trolley, vector(0, 0, 1));
        sheet.assume("The girder is level.", ["girder"]);
        let register = sheet.model().register_of_assumptions();
        assert_eq!(register.len(), 2);
        assert_eq!(register[1].origin(), Origin::Implied);
        assert_eq!(
            (register[1].number(), register[1].affects()),
            (2, &["trolley".to_owned()][..])
        );
        assert!(
            register[1].text().contains("held in y by"),
            "{}",
            register[1].text()
        );
    }

    #[test]
    fn a_full_set_of_reactions_leaves_nothing_to_enter() {
        let mut sheet = Sheet::titled("Carriage on a table");
        let m = sheet.positive_constant("m", "kg", "mass");
        let s = sheet.coordinate("s", "m", "distance");
        let turned = sheet.time() / 2;
        let turned = sheet.constant("Omega", "rad/s", "speed") * turned;
        let carriage = sheet.particle("carriage", m, vector(s * cos(turned), s * sin(turned), 0));
        sheet.normal("rail", carriage, vector(-sin(turned), cos(turned), 0));
        sheet.normal("deck", carriage, vector(0, 0, 1));
        assert!(sheet.model().register_of_assumptions().is_empty());
    }

    fn bead_on_a_wire() -> Sheet {
        let mut sheet = Sheet::titled("Bead on a bent wire");
        let m = sheet.positive_constant("m", "kg", "mass of the bead");
        let b = sheet.positive_constant("b", "1/m", "bend of the wire");
        let x = sheet.coordinate("x", "m", "position");
        sheet.particle("bead", m, vector(x, 0, b * x.squared()));
        sheet
    }

    #[test]
    fn an_oblique_direction_without_a_stated_reaction_is_entered() {
        let mut sheet = bead_on_a_wire();
        let register = sheet.model().register_of_assumptions();
        assert_eq!(register.len(), 2);
        assert!(
            register[1].text().contains("in 1 further direction by"),
            "{}",
            register[1].text()
        );
        let open = sheet.model().components_of_unnamed_reactions();
        assert_eq!(open, [true, true, true]);
        let slope = 2 * Expr::symbol("b").expect("valid") * Expr::symbol("x").expect("valid");
        sheet.normal("wire", "bead", vector(-slope, 0, 1));
        assert_eq!(sheet.model().register_of_assumptions().len(), 1);
        let open = sheet.model().components_of_unnamed_reactions();
        assert_eq!(open, [false, true, false]);
    }

    #[test]
    fn one_direction_stated_twice_covers_one() {
        let mut sheet = bead_on_a_wire();
        sheet.normal("left", "bead", vector(0, 1, 0));
        sheet.normal("right", "bead", vector(0, -1, 0));
        let register = sheet.model().register_of_assumptions();
        assert_eq!(register.len(), 1);
        assert!(
            register[0].text().contains("1 further direction"),
            "{}",
            register[0].text()
        );
    }

    #[test]
    fn a_reaction_that_does_work_covers_nothing() {
        let mut sheet = bead_on_a_wire();
        sheet.normal("post", "bead", vector(0, 0, 1));
        let register = sheet.model().register_of_assumptions();
        assert!(
            register[1].text().contains("1 further direction"),
            "{}",
            register[1].text()
        );
    }

    #[test]
    fn a_free_particle_is_held_nowhere() {
        let mut sheet = Sheet::titled("Probe");
        let m = sheet.positive_constant("m", "kg", "mass");
        let [x, y, z] = ["x", "y", "z"].map(|name| sheet.coordinate(name, "m", "position"));
        sheet.particle("probe", m, vector(x, y, z));
        assert!(sheet.model().register_of_assumptions().is_empty());
        assert_eq!(sheet.model().components_of_unnamed_reactions(), [false; 3]);
    }

    #[test]
    fn a_sheet_that_is_not_complete_says_nothing_of_further_directions() {
        let mut sheet = Sheet::titled("Begun");
        let m = sheet.positive_constant("m", "kg", "mass");
        sheet.particle("probe", m, vector(0, 0, 0));
        let register = sheet.model().register_of_assumptions();
        assert_eq!(register.len(), 1);
        assert!(register[0].text().contains("held in x and y and z"));
    }
}
