//! The values of cells that show themselves, and the tables of a sheet.

use super::bundle::Bundle;
use super::display::{Bundled, print};
use super::formula::Notation;
use super::of_model;
use super::page::{Block, Line, Page, Piece};
use crate::derive::{Derived, Motion};
use crate::model::{Model, Particle, Vector};
use crate::record::Record;
use crate::reference::{Check, Report};
use crate::sheet::Sheet;

impl Bundled for Page {
    fn bundle(&self) -> Bundle {
        Bundle::of(self)
    }
}

impl Bundled for Model {
    fn bundle(&self) -> Bundle {
        of_model::model(self).bundle()
    }
}

impl Bundled for Sheet {
    fn bundle(&self) -> Bundle {
        self.model().bundle()
    }
}

impl Bundled for Derived {
    fn bundle(&self) -> Bundle {
        Bundle::of_record(&Record::of(self.model(), self.derivation()))
    }
}

impl Bundled for Motion {
    fn bundle(&self) -> Bundle {
        (**self).bundle()
    }
}

impl Bundled for Vector {
    fn bundle(&self) -> Bundle {
        bare(Block::Result(Notation::default().components(*self)))
    }
}

impl Bundled for Particle {
    fn bundle(&self) -> Bundle {
        let notation = Notation::default();
        bare(Block::Sentence(vec![
            Piece::words(format!("particle {}, mass ", self.name())),
            Piece::Math(notation.formula(self.mass())),
            Piece::words(", position "),
            Piece::Math(notation.components(self.position())),
        ]))
    }
}

fn bare(block: Block) -> Bundle {
    Bundle::of(&Page {
        title: String::new(),
        verdict: Line::new(),
        blocks: vec![block],
    })
}

/// Lets values at the end of a cell show themselves; evcxr calls the method by this name.
macro_rules! shows_itself {
    ($($value:ty),* $(,)?) => {
        $(impl $value {
            /// Hands the value to the notebook.
            pub fn evcxr_display(&self) {
                print(&self.bundle());
            }
        })*
    };
}

shows_itself!(
    Page, Model, Sheet, Derived, Motion, Vector, Particle, Report, Check
);

impl Sheet {
    /// The table of quantities: symbols, meanings, units, parts in the model.
    #[must_use]
    pub fn quantities(&self) -> Page {
        of_model::quantities_page(self.model())
    }

    /// The register of assumptions, with what each affects.
    #[must_use]
    pub fn assumptions(&self) -> Page {
        of_model::assumptions_page(self.model())
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::prelude::*;

    fn crane() -> Sheet {
        let mut sheet = Sheet::titled("Crane <1>");
        let m = sheet.positive_constant("m_t", "kg", "mass of the \"trolley\" & wheels");
        let x = sheet.coordinate("x", "m", "position");
        let trolley = sheet.particle("trolley", m, vector(x, 0, 0));
        sheet.normal("rail", trolley, vector(0, 0, 1));
        sheet.assume("The girder is level.", ["trolley"]);
        sheet
    }

    #[test]
    fn a_sheet_shows_everything_that_was_stated() {
        let bundle = crane().bundle();
        for part in [
            "m_t",
            "mass of the \"trolley\" & wheels",
            "(x, 0, 0)",
            "N_rail",
            "level",
        ] {
            assert!(
                bundle.plain.contains(part),
                "{part} is missing in\n{}",
                bundle.plain
            );
        }
        assert!(bundle.html.contains("Crane &lt;1&gt;") && bundle.html.contains("&quot;trolley&quot; &amp;"));
        assert!(bundle.latex.contains("$m_{t}$"));
        assert_eq!(bundle, crane().bundle());
    }

    #[test]
    fn tables_and_small_values_have_pages_too() {
        let sheet = crane();
        assert!(sheet.quantities().bundle().plain.contains("kg"));
        assert!(
            sheet
                .assumptions()
                .bundle()
                .plain
                .contains("The girder is level.")
        );
        let [trolley] = sheet.model().particles() else {
            panic!("one particle was stated")
        };
        assert_eq!(
            trolley.bundle().plain,
            "particle trolley, mass m_t, position (x, 0, 0)"
        );
        assert_eq!(trolley.position().bundle().plain.trim(), "(x, 0, 0)");
    }

    #[test]
    fn an_empty_register_says_so() {
        let bundle = Sheet::titled("Empty").assumptions().bundle();
        assert!(bundle.plain.contains("No assumptions"));
    }
}
