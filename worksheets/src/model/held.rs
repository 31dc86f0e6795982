//! Directions in which particles are held by reactions that nobody named.

use cas::calculus::derivative;

use super::Model;
use super::assumption::{Assumption, Origin};

impl Model {
    /// The register of assumptions with those that follow from how the model is set up.
    ///
    /// A position component that no coordinate moves, and in which no declared reaction acts, is held
    /// by reactions without a name. They do no virtual work, because the component does not move in
    /// any virtual displacement; but that something holds it there is an assumption.
    #[must_use]
    pub fn register_of_assumptions(&self) -> Vec<Assumption> {
        let mut register = self.assumptions.clone();
        for (place, particle) in self.particles.iter().enumerate() {
            let held: Vec<&str> = ["x", "y", "z"]
                .into_iter()
                .zip(particle.position.components())
                .enumerate()
                .filter(|(axis, (_, position))| {
                    let moved = self.coordinates().into_iter().any(|coordinate| {
                        derivative(*position, coordinate).map_or(true, |slope| !slope.is_zero())
                    });
                    let carried = self
                        .reactions
                        .iter()
                        .any(|reaction| !reaction.direction_on(place).components()[*axis].is_zero());
                    !moved && !carried
                })
                .map(|(_, (letter, _))| letter)
                .collect();
            if !held.is_empty() {
                register.push(Assumption {
                    number: register.len() + 1,
                    text: format!(
                        "The {} is held in {} by ideal reactions that have no name on this sheet.",
                        particle.name,
                        held.join(" and ")
                    ),
                    affects: vec![particle.name.to_string()],
                    origin: Origin::Implied,
                });
            }
        }
        register
    }
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
}
