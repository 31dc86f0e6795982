//! Walking an expression: every node once, parts before wholes, without recursion.

use std::collections::{BTreeSet, HashMap, HashSet};

use super::node::{Expr, Kind};
use super::symbol::Symbol;

/// Every node reachable from `roots` once, parts before the wholes that use them.
#[must_use]
pub fn postorder(roots: &[Expr]) -> Vec<Expr> {
    postorder_within(roots, |_| true)
}

/// The same without what lies below the nodes that are not to be opened.
pub(crate) fn postorder_within(roots: &[Expr], opened: impl Fn(Expr) -> bool) -> Vec<Expr> {
    let (mut order, mut seen) = (Vec::new(), HashSet::new());
    let mut stack: Vec<(Expr, bool)> = roots.iter().rev().map(|root| (*root, false)).collect();
    while let Some((expr, parts_done)) = stack.pop() {
        if parts_done {
            order.push(expr);
        } else if seen.insert(expr) {
            stack.push((expr, true));
            if opened(expr) {
                stack.extend(expr.children().iter().rev().map(|part| (*part, false)));
            }
        }
    }
    order
}

/// Expressions to be put in place of others.
///
/// ```
/// use cas::{Expr, Substitution, sin};
/// let (x, y) = (Expr::symbol("x")?, Expr::symbol("y")?);
/// let swapped = Substitution::new([(x, y), (y, x)]);
/// assert_eq!((x - sin(y)).substituted(&swapped), y - sin(x));
/// # Ok::<(), cas::NameError>(())
/// ```
#[derive(Clone, Debug, Default)]
pub struct Substitution(HashMap<Expr, Expr>);

impl Substitution {
    /// The pairs of what is replaced and by what; all are replaced at once.
    #[must_use]
    pub fn new(pairs: impl IntoIterator<Item = (Expr, Expr)>) -> Self {
        Self(pairs.into_iter().collect())
    }

    /// What stands for `expr`, where it is replaced.
    #[must_use]
    pub fn of(&self, expr: Expr) -> Option<Expr> {
        self.0.get(&expr).copied()
    }
}

impl Expr {
    /// Every variable that occurs, in order of names.
    #[must_use]
    pub fn symbols(self) -> BTreeSet<Symbol> {
        postorder(&[self])
            .into_iter()
            .filter_map(Expr::as_symbol)
            .collect()
    }

    /// Whether `part` occurs in the expression, or is it.
    #[must_use]
    pub fn contains(self, part: Expr) -> bool {
        postorder(&[self]).contains(&part)
    }

    /// How many different nodes the expression has.
    #[must_use]
    pub fn node_count(self) -> usize {
        postorder(&[self]).len()
    }

    /// The expression with each part replaced for which the substitution names another.
    ///
    /// A replaced part is not searched further. Parts are compared by structure: in `a + b + c` the
    /// sum `a + b` is not found.
    #[must_use]
    pub fn substituted(self, substitution: &Substitution) -> Expr {
        self.rebuilt(|expr| substitution.of(expr))
    }

    /// The expression rebuilt from its parts, with `replacement` asked first for every node.
    pub(crate) fn rebuilt(self, replacement: impl Fn(Expr) -> Option<Expr>) -> Expr {
        let mut done: HashMap<Expr, Expr> = HashMap::new();
        for node in postorder(&[self]) {
            let new = replacement(node).unwrap_or_else(|| {
                let parts: Vec<Expr> = node.children().iter().map(|part| done[part]).collect();
                if parts == node.children() {
                    node
                } else {
                    node.with_children(&parts)
                }
            });
            done.insert(node, new);
        }
        done[&self]
    }

    /// The terms of a sum, or the expression itself.
    #[must_use]
    pub fn terms(self) -> Vec<Expr> {
        match self.kind() {
            Kind::Sum(terms) => terms.to_vec(),
            _ => vec![self],
        }
    }

    /// The factors of a product, or the expression itself.
    #[must_use]
    pub fn factors(self) -> Vec<Expr> {
        match self.kind() {
            Kind::Product(factors) => factors.to_vec(),
            _ => vec![self],
        }
    }
}
