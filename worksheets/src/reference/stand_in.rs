//! Numbers for what a model leaves open: stand-ins for prescribed inputs and undetermined functions.

use std::collections::BTreeMap;

use cas::calculus::derivative;
use cas::{Expr, Kind, Name, Substitution, Symbol, postorder};

use super::ReferenceError;

/// A derivative of higher order than this does not occur in mechanics and would only cost time.
const MOST_DERIVATIVES: u32 = 8;

/// An expression that stands for an undetermined function.
#[derive(Clone, Debug)]
pub(super) struct StandIn {
    /// The symbols that the expression is written in, one for each argument.
    pub(super) arguments: Vec<Symbol>,
    /// The expression.
    pub(super) body: Expr,
}

/// Stand-ins by the name of the function.
#[derive(Clone, Debug, Default)]
pub(super) struct StandIns(pub(super) BTreeMap<Name, StandIn>);

impl StandIns {
    /// The expression with every undetermined function, and every derivative of one, replaced.
    ///
    /// Only derivatives that an expression itself asks for, such as `F'(t)`, are taken by formula;
    /// the reference differentiates its position maps, stand-ins included, on dual numbers.
    pub(super) fn resolved(&self, expression: Expr) -> Result<Expr, ReferenceError> {
        let mut pairs: Vec<(Expr, Expr)> = Vec::new();
        for node in postorder(&[expression]) {
            let Kind::Unknown(application) = node.kind() else {
                continue;
            };
            let name = application.name();
            let stand_in = self.0.get(&name).ok_or(ReferenceError::NoStandIn { name })?;
            if stand_in.arguments.len() != application.arguments().len() {
                return Err(ReferenceError::NoStandIn { name });
            }
            if application.orders().iter().any(|order| *order > MOST_DERIVATIVES) {
                return Err(ReferenceError::TooManyDerivatives { name });
            }
            let mut body = stand_in.body;
            for (argument, order) in stand_in.arguments.iter().zip(application.orders()) {
                for _ in 0..*order {
                    body = derivative(body, *argument)?;
                }
            }
            // Arguments may hold undetermined functions themselves; those came earlier in the walk.
            let inner = Substitution::new(pairs.iter().copied());
            let arguments = stand_in
                .arguments
                .iter()
                .zip(application.arguments())
                .map(|(symbol, argument)| (Expr::from(*symbol), argument.substituted(&inner)));
            pairs.push((node, body.substituted(&Substitution::new(arguments))));
        }
        Ok(expression.substituted(&Substitution::new(pairs)))
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use cas::{cos, sin};

    #[test]
    fn functions_and_their_derivatives_are_replaced() {
        let [f, u] = ["F", "U"].map(|name| Name::new(name).expect("a valid name"));
        let [t, x] = ["t", "x"].map(|name| Symbol::new(name).expect("a valid name"));
        let stand_ins = StandIns(BTreeMap::from([
            (
                f,
                StandIn {
                    arguments: vec![t],
                    body: 3 * sin(2 * Expr::from(t)),
                },
            ),
            (
                u,
                StandIn {
                    arguments: vec![x],
                    body: Expr::from(x).squared(),
                },
            ),
        ]));
        let drive = Expr::unknown(f, &[t.into()]);
        let rate = Expr::unknown_derivative(f, &[1], &[t.into()]);
        assert_eq!(
            stand_ins.resolved(drive + rate).expect("both are known"),
            3 * sin(2 * Expr::from(t)) + 6 * cos(2 * Expr::from(t))
        );
        let nested = Expr::unknown_derivative(u, &[1], &[drive]);
        assert_eq!(
            stand_ins.resolved(nested).expect("both are known"),
            6 * sin(2 * Expr::from(t))
        );
        let stranger = Expr::unknown(Name::new("W").expect("a valid name"), &[t.into()]);
        assert!(matches!(
            stand_ins.resolved(stranger),
            Err(ReferenceError::NoStandIn { .. })
        ));
    }
}
