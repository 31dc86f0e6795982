//! The rules by which one line of a derivation follows from others.

use serde::{Deserialize, Serialize};

/// Why a step holds.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
#[non_exhaustive]
pub enum Rule {
    /// It was stated on the sheet.
    StatedOnTheSheet,
    /// A name for what follows it.
    Definition,
    /// The rate of a function of coordinates and time by the chain rule.
    ChainRule,
    /// d(r')/d(q') = dr/dq.
    CancellationOfDots,
    /// d/dt(dr/dq) = d(r')/dq.
    ExchangeOfDerivatives,
    /// An entry of the Jacobian.
    JacobianEntry,
    /// Mass times acceleration is the sum of forces and reactions.
    NewtonsLaw,
    /// Newton's equations times a column of the Jacobian, added up.
    ProjectionOnColumn,
    /// The virtual work of a reaction.
    VirtualWork,
    /// The product rule of differentiation.
    ProductRule,
    /// The kinetic energy of particles.
    DefinitionOfKineticEnergy,
    /// Derivatives of the kinetic energy of particles.
    DerivativeOfKineticEnergy,
    /// Generalized forces as projected applied forces.
    DefinitionOfGeneralizedForce,
    /// Lagrange's equations of the second kind.
    LagrangesEquations,
    /// The generalized forces are the negative gradient of the potential.
    Potential,
    /// Mixed derivatives of generalized forces are equal.
    Closedness,
    /// The Lagrangian as kinetic energy less potential.
    DefinitionOfLagrangian,
    /// The rank of the Jacobian.
    Rank,
    /// A coefficient of an acceleration in the equations of motion.
    CoefficientOfAcceleration,
    /// The mass matrix equals its transpose.
    SymmetryOfMassMatrix,
    /// The projection of Newton's equations and the energy route give the same.
    AgreementOfRoutes,
    /// The same function with its terms collected.
    CollectedForm,
}

/// A published source.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Source {
    /// The key by which it is cited, with the place.
    pub key: &'static str,
    /// What the key stands for.
    pub full: &'static str,
    /// Whether it is quoted from memory, without having been looked up.
    pub from_memory: bool,
}

/// Quoted from memory.
const WHITTAKER: Source = Source {
    key: "Whittaker1937, chapter II",
    full: "E. T. Whittaker, A Treatise on the Analytical Dynamics of Particles and Rigid Bodies, \
           4th edition, Cambridge University Press, 1937",
    from_memory: true,
};

impl Rule {
    /// Every rule.
    pub const ALL: [Self; 22] = [
        Self::StatedOnTheSheet,
        Self::Definition,
        Self::ChainRule,
        Self::CancellationOfDots,
        Self::ExchangeOfDerivatives,
        Self::JacobianEntry,
        Self::NewtonsLaw,
        Self::ProjectionOnColumn,
        Self::VirtualWork,
        Self::ProductRule,
        Self::DefinitionOfKineticEnergy,
        Self::DerivativeOfKineticEnergy,
        Self::DefinitionOfGeneralizedForce,
        Self::LagrangesEquations,
        Self::Potential,
        Self::Closedness,
        Self::DefinitionOfLagrangian,
        Self::Rank,
        Self::CoefficientOfAcceleration,
        Self::SymmetryOfMassMatrix,
        Self::AgreementOfRoutes,
        Self::CollectedForm,
    ];

    /// The rule in a sentence.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::StatedOnTheSheet => "As stated on the sheet.",
            Self::Definition => "By definition.",
            Self::ChainRule => {
                "Chain rule: the position depends on time through the coordinates and directly."
            }
            Self::CancellationOfDots => {
                "The velocity is linear in the rates of the coordinates, and its coefficients are the \
                 derivatives of the position."
            }
            Self::ExchangeOfDerivatives => {
                "Derivatives by time and by a coordinate may be taken in either order."
            }
            Self::JacobianEntry => "Derivative of a position component by a coordinate.",
            Self::NewtonsLaw => {
                "Newton's second law: mass times acceleration is the sum of applied forces and reactions."
            }
            Self::ProjectionOnColumn => {
                "Newton's equations are multiplied by a column of the Jacobian and added up."
            }
            Self::VirtualWork => {
                "Virtual work: the reaction times the virtual displacement of its particles."
            }
            Self::ProductRule => "Product rule of differentiation.",
            Self::DefinitionOfKineticEnergy => {
                "Kinetic energy of particles: half the mass times the square of the velocity, added up."
            }
            Self::DerivativeOfKineticEnergy => {
                "Derivative of the kinetic energy: momentum times the derivative of the velocity, added up."
            }
            Self::DefinitionOfGeneralizedForce => {
                "Generalized force: the applied forces times a column of the Jacobian, added up."
            }
            Self::LagrangesEquations => "Lagrange's equations of the second kind.",
            Self::Potential => "The generalized forces are the negative derivatives of the potential.",
            Self::Closedness => {
                "Generalized forces have a potential only where their mixed derivatives are equal."
            }
            Self::DefinitionOfLagrangian => "The Lagrangian is the kinetic energy less the potential.",
            Self::Rank => {
                "The coordinates are regular where the determinant of the transposed Jacobian times the \
                 Jacobian does not vanish."
            }
            Self::CoefficientOfAcceleration => "Coefficient of an acceleration in the equations of motion.",
            Self::SymmetryOfMassMatrix => "The mass matrix is symmetric.",
            Self::AgreementOfRoutes => {
                "The projection of Newton's equations and the energy route give the same equation."
            }
            Self::CollectedForm => "The same function, with its terms collected.",
        }
    }

    /// Where the rule is published.
    #[must_use]
    pub fn source(self) -> Option<Source> {
        match self {
            Self::CancellationOfDots
            | Self::ExchangeOfDerivatives
            | Self::ProjectionOnColumn
            | Self::VirtualWork
            | Self::DerivativeOfKineticEnergy
            | Self::DefinitionOfGeneralizedForce
            | Self::LagrangesEquations
            | Self::Potential
            | Self::DefinitionOfLagrangian => Some(WHITTAKER),
            _ => None,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::collections::BTreeSet;

    #[test]
    fn every_rule_has_a_sentence_and_a_word_of_its_own() {
        let sentences: BTreeSet<&str> = Rule::ALL.iter().map(|rule| rule.words()).collect();
        assert_eq!(sentences.len(), Rule::ALL.len());
        assert!(sentences.iter().all(|sentence| sentence.ends_with('.')));
        for rule in Rule::ALL {
            let word = serde_json::to_string(&rule).expect("serializes");
            assert_eq!(serde_json::from_str::<Rule>(&word).expect("reads"), rule);
        }
    }
}
