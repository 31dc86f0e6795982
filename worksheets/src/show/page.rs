//! What is to be shown, as a small document: the one form from which HTML, LaTeX and plain text come.
//!
//! A page holds raw text only; every writer escapes for its own format, so nothing has to be
//! trusted on the way here.

/// A formula in both notations.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Formula {
    /// TeX that KaTeX and MathJax both accept, without delimiters.
    pub tex: String,
    /// Plain notation.
    pub plain: String,
}

/// How something stands, for its mark and word.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Mark {
    /// Nothing to prove.
    Stated,
    /// Proved, or agreeing.
    Good,
    /// Refuted, or disagreeing.
    Bad,
    /// Evidence only.
    Partial,
    /// Not known.
    Open,
}

impl Mark {
    /// The sign that stands before the word.
    #[must_use]
    pub fn sign(self) -> &'static str {
        match self {
            Self::Stated => "\u{2022}",
            Self::Good => "\u{2713}",
            Self::Bad => "\u{2717}",
            Self::Partial => "\u{2248}",
            Self::Open => "?",
        }
    }
}

/// A piece of a line.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Piece {
    /// Text.
    Words(String),
    /// Text that carries the line.
    Strong(String),
    /// Text of lesser weight.
    Quiet(String),
    /// A formula within the line.
    Math(Formula),
    /// A mark with its words.
    Verdict(Mark, String),
}

/// A line of pieces.
pub type Line = Vec<Piece>;

/// A part of a page.
#[derive(Clone, Debug, PartialEq)]
pub enum Block {
    /// The result, large.
    Result(Formula),
    /// A formula on its own line.
    Display(Formula),
    /// A sentence or two.
    Sentence(Line),
    /// A table; the head may be empty.
    Table {
        /// The heads of the columns.
        head: Vec<Line>,
        /// The rows.
        rows: Vec<Vec<Line>>,
    },
    /// Numbered steps.
    Steps(Vec<Item>),
    /// Something that is folded until it is opened.
    Folded {
        /// What stands there while it is folded.
        summary: Line,
        /// What is in it.
        blocks: Vec<Block>,
    },
    /// A picture.
    Picture {
        /// The picture as SVG.
        svg: String,
        /// What it shows, for those who cannot see it.
        description: String,
    },
}

/// A numbered step.
#[derive(Clone, Debug, PartialEq)]
pub struct Item {
    /// What is done.
    pub head: Line,
    /// How it stands.
    pub verdict: Line,
    /// What it says.
    pub blocks: Vec<Block>,
    /// What it rests on and where it holds.
    pub foot: Vec<Line>,
}

/// A page.
#[derive(Clone, Debug, PartialEq)]
pub struct Page {
    /// The title; empty for a page that is only a formula or two.
    pub title: String,
    /// How the whole stands.
    pub verdict: Line,
    /// The parts in order.
    pub blocks: Vec<Block>,
}

impl Formula {
    /// A formula of these two spellings.
    pub fn new(tex: impl Into<String>, plain: impl Into<String>) -> Self {
        Self {
            tex: tex.into(),
            plain: plain.into(),
        }
    }
}

impl Piece {
    /// Text.
    pub fn words(text: impl Into<String>) -> Self {
        Self::Words(text.into())
    }

    /// Text of lesser weight.
    pub fn quiet(text: impl Into<String>) -> Self {
        Self::Quiet(text.into())
    }
}

/// A line of text alone.
#[must_use]
pub fn words(text: impl Into<String>) -> Line {
    vec![Piece::words(text)]
}
