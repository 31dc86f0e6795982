//! A page as HTML that reads in a trusted and an untrusted front end, and in a static export.
//!
//! Style is inline and uses only what an untrusted front end keeps; colours are those of the page
//! around, so that light and dark themes both fit. A formula stands as TeX between dollar signs,
//! followed by its MathML in an inert script; one small script at the end replaces the TeX where
//! that is better.

use base64::Engine;
use base64::engine::general_purpose::STANDARD;

use super::escape;
use super::page::{Block, Formula, Item, Mark, Page, Piece};
use super::typeset;

/// Replaces TeX by typeset formulas in a front end that runs scripts.
const SCRIPT: &str = include_str!("script.js");

const FRAME: &str = "border-top:2px solid;border-bottom:1px solid;padding:0.3em 0 0.5em 0;\
    margin:0.3em 0 0.6em 0;max-width:60em;line-height:1.45";
const BARE: &str = "max-width:60em;line-height:1.45";
const TITLE_ROW: &str = "display:flex;flex-wrap:wrap;justify-content:space-between;column-gap:1.5em;\
    padding-bottom:0.25em;margin-bottom:0.5em;border-bottom:1px solid rgba(128,128,128,0.45)";
const TITLE: &str = "font-weight:600;font-size:1.05em";
const RESULT: &str = "font-size:1.2em;overflow-x:auto;overflow-y:hidden;padding:0.25em 0;margin:0.2em 0";
const DISPLAY: &str = "overflow-x:auto;overflow-y:hidden;padding:0.1em 0;margin:0.1em 0";
const SENTENCE: &str = "margin:0.35em 0";
const QUIET: &str = "opacity:0.72";
const FOLDED: &str = "margin:0.5em 0 0 0";
const SUMMARY: &str = "cursor:pointer;opacity:0.85";
const STEP: &str =
    "margin:0.6em 0 0.2em 0;padding:0 0 0.3em 0.9em;border-left:2px solid rgba(128,128,128,0.35)";
const STEP_HEAD: &str =
    "display:flex;flex-wrap:wrap;justify-content:space-between;column-gap:1.5em;font-size:0.95em";
const STEP_FOOT: &str = "font-size:0.88em;opacity:0.72;margin:0.1em 0";
const TABLE: &str = "border-collapse:collapse;margin:0.4em 0;font-size:1em;border:none";
const HEAD_CELL: &str = "text-align:left;font-weight:600;padding:0.15em 1.4em 0.15em 0;\
    border:none;border-bottom:1px solid rgba(128,128,128,0.6);background:none";
const CELL: &str = "text-align:left;padding:0.15em 1.4em 0.15em 0;vertical-align:baseline;\
    border:none;border-bottom:1px solid rgba(128,128,128,0.2)";
const PICTURE: &str = "width:100%;max-width:46em;height:auto;margin:0.4em 0";

/// The page as HTML.
pub(super) fn page(page: &Page) -> String {
    let mut html = Html::default();
    html.open("div", if page.title.is_empty() { BARE } else { FRAME });
    if !page.title.is_empty() {
        html.open("div", TITLE_ROW);
        html.wrapped(TITLE, &page.title);
        html.element("span", "white-space:nowrap", &page.verdict);
        html.close("div");
    }
    html.blocks(&page.blocks);
    html.close("div");
    if html.formulas {
        html.out.push_str("<script>");
        html.out.push_str(SCRIPT.trim_end());
        html.out.push_str("</script>");
    }
    html.out
}

/// TeX in one page beyond this many bytes is left as TeX, so that a long derivation is shown without
/// a wait; the first formulas of a page are the result.
const MOST_TYPESET: usize = 30_000;

#[derive(Default)]
struct Html {
    out: String,
    formulas: bool,
    typeset: usize,
}

impl Html {
    fn open(&mut self, tag: &str, style: &str) {
        self.out.push_str(&format!("<{tag} style=\"{style}\">"));
    }

    fn close(&mut self, tag: &str) {
        self.out.push_str(&format!("</{tag}>"));
    }

    fn text(&mut self, text: &str) {
        self.out.push_str(&escape::html(text));
    }

    fn element(&mut self, tag: &str, style: &str, line: &[Piece]) {
        self.open(tag, style);
        self.line(line);
        self.close(tag);
    }

    fn line(&mut self, line: &[Piece]) {
        for piece in line {
            match piece {
                Piece::Words(text) => self.text(text),
                Piece::Strong(text) => self.wrapped("font-weight:600", text),
                Piece::Quiet(text) => self.wrapped(QUIET, text),
                Piece::Math(formula) => self.formula(formula, "span", "white-space:nowrap"),
                Piece::Verdict(mark, words) => self.verdict(*mark, words),
            }
        }
    }

    fn wrapped(&mut self, style: &str, text: &str) {
        self.open("span", style);
        self.text(text);
        self.close("span");
    }

    /// A mark with its words: the words say it all, the mark and its weight only help the eye.
    fn verdict(&mut self, mark: Mark, words: &str) {
        let style = match mark {
            Mark::Bad => "font-weight:700;color:#d0453a",
            Mark::Partial | Mark::Open => "font-weight:600",
            Mark::Good => "font-weight:400",
            Mark::Stated => QUIET,
        };
        self.wrapped(style, &format!("{} {words}", mark.sign()));
    }

    fn formula(&mut self, formula: &Formula, tag: &str, style: &str) {
        self.formulas = true;
        let display = tag == "div";
        self.open(tag, style);
        // A dollar sign cannot occur in our TeX: names hold letters, digits and underscores only.
        let dollars = if display { "$$" } else { "$" };
        self.out.push_str(dollars);
        let tex = formula
            .tex
            .replace('&', "&amp;")
            .replace('<', "&lt;")
            .replace('>', "&gt;");
        self.out.push_str(&tex);
        self.out.push_str(dollars);
        self.close(tag);
        self.typeset += formula.tex.len();
        if self.typeset > MOST_TYPESET {
            return;
        }
        if let Some(mathml) = typeset::mathml(&formula.tex, display) {
            self.out
                .push_str("<script type=\"application/mathml+xml\" class=\"gudgeon-mathml\">");
            self.out.push_str(&mathml);
            self.out.push_str("</script>");
        }
    }

    fn blocks(&mut self, blocks: &[Block]) {
        for block in blocks {
            match block {
                Block::Result(formula) => self.formula(formula, "div", RESULT),
                Block::Display(formula) => self.formula(formula, "div", DISPLAY),
                Block::Sentence(line) => self.element("div", SENTENCE, line),
                Block::Table { head, rows } => self.table(head, rows),
                Block::Steps(items) => self.steps(items),
                Block::Folded { summary, blocks } => {
                    self.open("details", FOLDED);
                    self.element("summary", SUMMARY, summary);
                    self.blocks(blocks);
                    self.close("details");
                }
                Block::Picture { svg, description } => {
                    let alternative = escape::html(description);
                    let data = STANDARD.encode(svg);
                    self.out.push_str(&format!(
                        "<img style=\"{PICTURE}\" alt=\"{alternative}\" src=\"data:image/svg+xml;base64,{data}\">"
                    ));
                }
            }
        }
    }

    fn table(&mut self, head: &[Vec<Piece>], rows: &[Vec<Vec<Piece>>]) {
        self.open("div", "overflow-x:auto");
        self.open("table", TABLE);
        if !head.is_empty() {
            self.out.push_str("<thead><tr>");
            head.iter().for_each(|cell| self.element("th", HEAD_CELL, cell));
            self.out.push_str("</tr></thead>");
        }
        self.out.push_str("<tbody>");
        for row in rows {
            self.open("tr", "background:none");
            row.iter().for_each(|cell| self.element("td", CELL, cell));
            self.close("tr");
        }
        self.out.push_str("</tbody>");
        self.close("table");
        self.close("div");
    }

    fn steps(&mut self, items: &[Item]) {
        for (place, item) in items.iter().enumerate() {
            self.open("div", STEP);
            self.open("div", STEP_HEAD);
            self.out.push_str("<span>");
            self.wrapped(QUIET, &format!("{} ", place + 1));
            self.line(&item.head);
            self.close("span");
            self.out.push_str("<span>");
            self.line(&item.verdict);
            self.close("span");
            self.close("div");
            self.blocks(&item.blocks);
            item.foot
                .iter()
                .for_each(|line| self.element("div", STEP_FOOT, line));
            self.close("div");
        }
    }
}

#[cfg(test)]
mod tests {
    use super::super::page::words;
    use super::*;

    fn sample() -> Page {
        Page {
            title: "Crane <b>".to_owned(),
            verdict: vec![Piece::Verdict(Mark::Good, "proved".to_owned())],
            blocks: vec![
                Block::Result(Formula::new("a<b", "a < b")),
                Block::Folded {
                    summary: words("Steps"),
                    blocks: vec![Block::Sentence(words("\"quoted\" & <i>"))],
                },
            ],
        }
    }

    #[test]
    fn text_is_escaped_and_formulas_carry_mathml() {
        let made = page(&sample());
        assert!(made.contains("Crane &lt;b&gt;") && made.contains("&quot;quoted&quot; &amp; &lt;i&gt;"));
        assert!(made.contains("$$a&lt;b$$") && made.contains("<math"));
        assert!(made.contains("\u{2713} proved"));
        assert_eq!(made.matches("<script>").count(), 1);
    }

    #[test]
    fn a_page_without_formulas_carries_no_script() {
        let mut plain = sample();
        plain.blocks.remove(0);
        assert!(!page(&plain).contains("<script"));
    }

    #[test]
    fn oversized_formulas_stay_tex() {
        let mut large = sample();
        large.blocks = vec![Block::Result(Formula::new("x+".repeat(4_000), "x + ..."))];
        let made = page(&large);
        assert!(made.contains("$$x+x+") && !made.contains("<math"));
    }
}
