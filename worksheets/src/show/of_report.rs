//! The page of a numerical reference run.

use super::formula;
use super::page::{Block, Formula, Line, Mark, Page, Piece, words};
use super::plot;
use crate::reference::{Agreement, Deviation, Report, StandInRow, ValueRow};

/// The page of a report.
#[must_use]
pub fn report(report: &Report) -> Page {
    let mut blocks = vec![
        Block::Sentence(words(
            "The derived equations against Newton's equations with reactions, solved on dual numbers \
             from the position maps and forces as stated.",
        )),
        Block::Table {
            head: ["check", "largest deviation", "tolerance", "finding"]
                .map(words)
                .into(),
            rows: checks(report),
        },
    ];
    if let Some(reason) = &report.motion.cut_short {
        blocks.push(Block::Sentence(words(format!(
            "The motion was compared up to t = {} s; {reason}.",
            report.motion.compared_until
        ))));
    }
    let svg = plot::motion(&report.motion.times, &report.motion.curves);
    if !svg.is_empty() {
        blocks.push(Block::Picture {
            svg,
            description: description(report),
        });
    }
    blocks.push(Block::Folded {
        summary: words(format!("Values of this run{}", drawn_words(report))),
        blocks: values(report),
    });
    Page {
        title: "Numerical reference".to_owned(),
        verdict: verdict(report.agreement),
        blocks,
    }
}

fn verdict(agreement: Agreement) -> Line {
    let mark = match agreement {
        Agreement::Agrees => Mark::Good,
        Agreement::Disagrees => Mark::Bad,
        Agreement::NotConclusive => Mark::Open,
    };
    vec![Piece::Verdict(mark, agreement.words().to_owned())]
}

fn checks(report: &Report) -> Vec<Vec<Line>> {
    let motion = &report.motion;
    let mut rows = vec![
        check(
            format!("accelerations at {} random states", report.states),
            &report.accelerations,
        ),
        check(
            format!("motion over {} s", motion.compared_until),
            &motion.deviation,
        ),
        check("energy gained against work done".to_owned(), &motion.energy),
    ];
    if report.accelerations.agreement == Agreement::Disagrees {
        let name = formula::stated(&report.worst_coordinate);
        rows[0][0].extend([Piece::words(", worst for "), name]);
    }
    if let Some(order) = &motion.order {
        rows.push(vec![
            words("order of convergence of a fourth-order method"),
            words(order.clone()),
            Line::new(),
            words("observed"),
        ]);
    }
    rows
}

fn check(what: String, deviation: &Deviation) -> Vec<Line> {
    vec![
        words(what),
        size(&deviation.largest),
        size(&deviation.tolerance),
        verdict(deviation.agreement),
    ]
}

/// A size such as `below 1e-11` with its power of ten set as one.
fn size(text: &str) -> Line {
    let (before, number) = text
        .rsplit_once(' ')
        .map_or(("", text), |(before, number)| (before, number));
    let mut line = Line::new();
    if !before.is_empty() {
        line.push(Piece::words(format!("{before} ")));
    }
    match number.split_once('e') {
        // The text may come from a record that was changed by hand: nothing but digits becomes TeX.
        Some((mantissa, exponent)) if is_decimal(mantissa) && exponent.parse::<i32>().is_ok() => {
            let factor = if mantissa == "1" {
                String::new()
            } else {
                format!("{mantissa}\\cdot ")
            };
            line.push(Piece::Math(Formula::new(
                format!("{factor}10^{{{exponent}}}"),
                number,
            )));
        }
        _ => line.push(Piece::words(number)),
    }
    line
}

fn is_decimal(text: &str) -> bool {
    !text.is_empty() && text.bytes().all(|byte| byte.is_ascii_digit() || byte == b'.')
}

fn description(report: &Report) -> String {
    let names: Vec<&str> = report
        .motion
        .curves
        .iter()
        .map(|curve| curve.coordinate.as_str())
        .collect();
    format!(
        "{} over time, from 0 to {} s, as the reference computes it",
        names.join(", "),
        report.motion.compared_until
    )
}

fn drawn_words(report: &Report) -> &'static str {
    let rows = report.constants.iter().chain(&report.start).map(|row| row.drawn);
    let drawn: Vec<bool> = rows.chain(report.stand_ins.iter().map(|row| row.drawn)).collect();
    match (drawn.iter().any(|drawn| *drawn), drawn.iter().all(|drawn| *drawn)) {
        (false, _) => ", all given",
        (true, true) => ", all drawn",
        (true, false) => ", partly drawn",
    }
}

fn values(report: &Report) -> Vec<Block> {
    let rows = report.constants.iter().chain(&report.start).map(value);
    let functions = report.stand_ins.iter().map(stand_in);
    let mut blocks = vec![Block::Table {
        head: ["quantity", "value", "unit", "origin"].map(words).into(),
        rows: rows.chain(functions).collect(),
    }];
    if !drawn_words(report).ends_with("given") {
        blocks.push(Block::Sentence(vec![Piece::quiet(
            "Drawn values follow from the sheet's content by a fixed rule: constants between 0.5 and 2, the \
             start between 0.2 and 0.8, prescribed functions as sines.",
        )]));
    }
    blocks
}

fn origin(drawn: bool) -> Line {
    words(if drawn { "drawn" } else { "given" })
}

fn value(row: &ValueRow) -> Vec<Line> {
    vec![
        vec![formula::stated(&row.symbol)],
        words(row.value.clone()),
        words(row.unit.clone()),
        origin(row.drawn),
    ]
}

fn stand_in(row: &StandInRow) -> Vec<Line> {
    vec![
        vec![formula::stated(&row.function)],
        vec![formula::stated(&row.expression)],
        words(row.unit.clone()),
        origin(row.drawn),
    ]
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::reference::{Curve, MotionReport};
    use crate::show::{Bundle, Bundled};

    fn deviation(agreement: Agreement) -> Deviation {
        Deviation {
            largest: "below 1e-11".to_owned(),
            tolerance: "1e-9".to_owned(),
            agreement,
        }
    }

    fn sample(agreement: Agreement) -> Report {
        Report {
            agreement,
            constants: vec![ValueRow {
                symbol: "m_t".to_owned(),
                value: "1200".to_owned(),
                unit: "kg".to_owned(),
                drawn: false,
            }],
            stand_ins: Vec::new(),
            start: Vec::new(),
            states: 20,
            accelerations: deviation(agreement),
            worst_coordinate: "phi".to_owned(),
            motion: MotionReport {
                duration: "20".to_owned(),
                compared_until: "7.3".to_owned(),
                cut_short: Some("after that <it> ends".to_owned()),
                deviation: deviation(Agreement::Agrees),
                energy: deviation(Agreement::Agrees),
                order: Some("4.0".to_owned()),
                times: vec![0.0, 1.0],
                curves: vec![Curve {
                    coordinate: "phi".to_owned(),
                    unit: "rad".to_owned(),
                    meaning: "sway".to_owned(),
                    values: vec![0.1, 0.2],
                }],
            },
        }
    }

    #[test]
    fn the_page_says_what_was_compared_and_what_was_found() {
        let Bundle { html, plain, .. } = sample(Agreement::Agrees).bundle();
        for part in [
            "agrees",
            "20 random states",
            "below 1e-11",
            "7.3 s",
            "m_t",
            "all given",
        ] {
            assert!(plain.contains(part), "{part} is missing in\n{plain}");
        }
        assert!(
            html.contains("10^{-11}")
                && html.contains("&lt;it&gt;")
                && html.contains("data:image/svg+xml;base64,")
        );
    }

    #[test]
    fn a_disagreement_names_the_coordinate() {
        let plain = sample(Agreement::Disagrees).bundle().plain;
        assert!(
            plain.contains("disagrees") && plain.contains("worst for phi"),
            "{plain}"
        );
    }

    #[test]
    fn a_changed_report_brings_no_tex_and_no_tags_into_the_page() {
        let mut report = sample(Agreement::Agrees);
        let wicked = "\\href{https://example.invalid}{<script>alert(1)</script>}e-5";
        report.accelerations.largest = wicked.to_owned();
        report.motion.energy.tolerance = wicked.to_owned();
        report.constants[0].symbol = wicked.to_owned();
        report.constants[0].unit = wicked.to_owned();
        report.worst_coordinate = wicked.to_owned();
        report.agreement = Agreement::Disagrees;
        report.accelerations.agreement = Agreement::Disagrees;
        let Bundle { html, latex, .. } = report.bundle();
        assert!(!html.contains("<script>alert") && html.contains("&lt;script&gt;alert"));
        assert!(!latex.contains("\\href") && latex.contains("textbackslash{}href"));
    }

    #[test]
    fn numbers_that_cannot_be_drawn_leave_the_picture_out() {
        let mut report = sample(Agreement::Agrees);
        for values in [vec![-1e308, 1e308], vec![0.1], vec![f64::NAN, 0.0]] {
            report.motion.curves[0].values = values;
            assert!(!report.bundle().html.contains("data:image"));
        }
        report.motion.curves[0].values = vec![0.1, 0.2];
        report.motion.times = vec![1.0, 1.0];
        assert!(!report.bundle().html.contains("data:image"));
    }

    #[test]
    fn a_report_is_shown_alike_after_it_was_stored() {
        let report = sample(Agreement::Agrees);
        let stored = serde_json::to_string(&report).expect("serializes");
        let read: Report = serde_json::from_str(&stored).expect("reads");
        assert_eq!(read.bundle(), report.bundle());
    }
}
