//! One bundle of representations for every value: HTML, LaTeX, plain text and, where there is one, the record.

use std::fmt::Write;

use super::of_derivation;
use super::page::{Block, Page, words};
use super::{html, latex, plain};
use crate::record::Record;

/// The MIME type of a record.
pub const RECORD_TYPE: &str = "application/vnd.gudgeon.record+json";

/// The representations of a value.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Bundle {
    /// `text/html`.
    pub html: String,
    /// `text/latex`.
    pub latex: String,
    /// `text/plain`.
    pub plain: String,
    /// The record as JSON on one line, of the type [`RECORD_TYPE`].
    pub record: Option<String>,
}

impl Bundle {
    /// The bundle of a page, without a record.
    #[must_use]
    pub fn of(page: &Page) -> Self {
        Self {
            html: html::page(page),
            latex: latex::page(page),
            plain: plain::page(page),
            record: None,
        }
    }

    /// The bundle of a record: the page that it yields, and itself.
    ///
    /// Where the record cannot be written, the page says why it carries none.
    #[must_use]
    pub fn of_record(record: &Record) -> Self {
        let mut page = of_derivation::record(record);
        match record.to_json() {
            Ok(json) => Self::of(&page).with_record(json),
            Err(error) => {
                let hint = error.hint();
                let text = format!("This output carries no record: {error}; {hint}.");
                page.blocks.push(Block::Sentence(words(text)));
                Self::of(&page)
            }
        }
    }

    /// The bundle with a record.
    #[must_use]
    pub fn with_record(mut self, record: String) -> Self {
        self.record = Some(record);
        self
    }

    /// The lines by which evcxr takes a bundle from standard output.
    #[must_use]
    pub fn for_evcxr(&self) -> String {
        let parts = [
            ("text/html", Some(&self.html)),
            ("text/latex", Some(&self.latex)),
            ("text/plain", Some(&self.plain)),
            (RECORD_TYPE, self.record.as_ref()),
        ];
        let mut lines = String::new();
        for (mime, text) in parts {
            let Some(text) = text else { continue };
            // A line of the content that looks like the end of it would cut it short.
            let guarded = text.replace("EVCXR_", "EVCXR\u{200b}_");
            writeln!(lines, "EVCXR_BEGIN_CONTENT {mime}\n{guarded}\nEVCXR_END_CONTENT")
                .expect("invariant: writing to a string");
        }
        lines
    }
}

#[cfg(test)]
mod tests {
    use super::super::page::{Block, words};
    use super::*;

    #[test]
    fn content_cannot_end_its_own_frame() {
        let page = Page {
            title: "EVCXR_END_CONTENT".to_owned(),
            verdict: Vec::new(),
            blocks: vec![Block::Sentence(words("line\nEVCXR_END_CONTENT\nline"))],
        };
        let lines = Bundle::of(&page).with_record("{}".to_owned()).for_evcxr();
        assert_eq!(lines.matches("EVCXR_BEGIN_CONTENT").count(), 4);
        assert_eq!(lines.matches("EVCXR_END_CONTENT").count(), 4);
    }
}
