//! How a value at the end of a cell shows itself.

use std::any::Any;
use std::fmt::Debug;

use cas::Expr;

use super::bundle::Bundle;
use super::formula::Notation;
use super::of_report;
use super::page::{Block, Line, Page, Piece};
use crate::reference::Report;

/// A value that has a bundle of representations.
pub trait Bundled {
    /// The representations.
    fn bundle(&self) -> Bundle;
}

impl Bundled for Report {
    fn bundle(&self) -> Bundle {
        Bundle::of(&of_report::report(self))
    }
}

impl Bundled for Expr {
    fn bundle(&self) -> Bundle {
        bare(vec![Block::Result(Notation::default().result(*self))])
    }
}

impl Bundled for [Expr] {
    fn bundle(&self) -> Bundle {
        bare(
            self.iter()
                .map(|expr| Block::Result(Notation::default().result(*expr)))
                .collect(),
        )
    }
}

/// A page without title.
fn bare(blocks: Vec<Block>) -> Bundle {
    Bundle::of(&Page {
        title: String::new(),
        verdict: Line::new(),
        blocks,
    })
}

/// Hands a bundle to the notebook.
pub fn print(bundle: &Bundle) {
    // Standard output is the channel on which the kernel takes bundles; nothing else prints here.
    print!("{}", bundle.for_evcxr());
}

/// Lets every value at the end of a cell show itself.
///
/// Values of this crate have a method of their own, which comes first. This trait covers the
/// expressions of `cas`, which cannot have one here, and lets every other value fall back to its
/// debug form; without it, evcxr would compile such a cell twice.
pub trait ShowsItself {
    /// Hands the value to the notebook.
    fn evcxr_display(&self);
}

impl<T: Debug + 'static> ShowsItself for T {
    fn evcxr_display(&self) {
        match known(self) {
            Some(bundle) => print(&bundle),
            None => print(&bare(vec![Block::Sentence(vec![Piece::Words(format!(
                "{self:?}"
            ))])])),
        }
    }
}

/// The bundle of a value made of expressions.
fn known(value: &dyn Any) -> Option<Bundle> {
    let expressions: &[Expr] = if let Some(one) = value.downcast_ref::<Expr>() {
        std::slice::from_ref(one)
    } else if let Some(many) = value.downcast_ref::<Vec<Expr>>() {
        many
    } else if let Some(pair) = value.downcast_ref::<[Expr; 2]>() {
        pair
    } else if let Some(three) = value.downcast_ref::<[Expr; 3]>() {
        three
    } else {
        value.downcast_ref::<Option<Expr>>()?.as_slice()
    };
    Some(expressions.bundle())
}

#[cfg(test)]
mod tests {
    use super::*;
    use cas::cos;

    #[test]
    fn expressions_are_known_among_all_values() {
        let x = Expr::symbol("x").expect("a valid name");
        let one = known(&(x * cos(x))).expect("an expression");
        assert_eq!(one.plain.trim(), "x*cos(x)");
        assert!(one.html.contains("$$x \\cos x$$"));
        let many = [known(&vec![x, x]), known(&[x, x]), known(&Some(x))];
        assert!(many.iter().all(Option::is_some));
        assert!(known(&1.5f64).is_none() && known(&"text").is_none());
    }
}
