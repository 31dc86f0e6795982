//! Motions as pictures: one panel for each coordinate over a common time axis, as SVG.
//!
//! The picture is embedded as an image and cannot know the theme around it, so its greys and hues
//! are chosen to be read on white and on near-black alike; each curve is named in words beside it.

use plotters::coord::Shift;
use plotters::prelude::{
    ChartBuilder, Color, DrawingArea, IntoDrawingArea, IntoFont, LineSeries, RGBColor, SVGBackend, Text,
    TextStyle,
};

use crate::reference::Curve;

/// Drawn at twice the size at which it is usually seen, because coordinates are whole pixels.
const WIDTH: u32 = 1472;
const PANEL_HEIGHT: u32 = 380;
const FOOT_HEIGHT: u32 = 52;
/// No number of a motion comes near, and the axes stay far from overflow.
const LARGEST: f64 = 1e100;

const MOST_CURVES: usize = 64;

const FONT: &str = "system-ui, sans-serif";

/// Contrast above 4 : 1 on white and on #111.
const GREY: RGBColor = RGBColor(120, 120, 120);
const HUES: [RGBColor; 4] = [
    RGBColor(45, 125, 190),
    RGBColor(196, 98, 38),
    RGBColor(46, 139, 100),
    RGBColor(150, 98, 186),
];

type Area<'a> = DrawingArea<SVGBackend<'a>, Shift>;

/// The curves over these times; empty where there is nothing to draw.
pub(super) fn motion(times: &[f64], curves: &[Curve]) -> String {
    let mut svg = String::new();
    let count = u32::try_from(curves.len()).unwrap_or(0);
    let (Some(first), Some(last)) = (times.first(), times.last()) else {
        return svg;
    };
    if times.len() < 2 || count == 0 || !can_be_drawn(times, curves) {
        return svg;
    }
    let drawn = {
        let size = (WIDTH, count * PANEL_HEIGHT + FOOT_HEIGHT);
        let root = SVGBackend::with_string(&mut svg, size).into_drawing_area();
        let (panels, foot) = root.split_vertically(count * PANEL_HEIGHT);
        let panels = panels.split_evenly((curves.len(), 1));
        panels
            .iter()
            .zip(curves)
            .enumerate()
            .try_for_each(|(place, (area, curve))| {
                panel(area, times, *first..*last, curve, HUES[place % HUES.len()])
            })
            .and_then(|()| {
                let middle = i32::try_from(WIDTH / 2).unwrap_or(0);
                foot.draw(&Text::new("time t in s", (middle - 70, 4), style(36.0, GREY)))
            })
            .and_then(|()| root.present())
    };
    // Drawing into a string fails only where formatting does, and then there is no picture.
    if drawn.is_err() { String::new() } else { svg }
}

/// Whether the numbers are such as a run gives: they may come from a record that was changed by hand.
fn can_be_drawn(times: &[f64], curves: &[Curve]) -> bool {
    let modest = |value: &f64| value.abs() <= LARGEST;
    let rising = times.windows(2).all(|pair| pair[0] < pair[1]);
    let fits = |curve: &Curve| curve.values.len() == times.len() && curve.values.iter().all(modest);
    rising && times.iter().all(modest) && curves.len() <= MOST_CURVES && curves.iter().all(fits)
}

fn style(size: f64, color: RGBColor) -> TextStyle<'static> {
    (FONT, size).into_font().color(&color)
}

type Drawn = Result<(), plotters::drawing::DrawingAreaErrorKind<std::io::Error>>;

fn panel(area: &Area<'_>, times: &[f64], span: std::ops::Range<f64>, curve: &Curve, hue: RGBColor) -> Drawn {
    let (least, most) = range(&curve.values);
    let mut chart = ChartBuilder::on(area)
        .margin_top(70)
        .margin_right(40)
        .margin_bottom(4)
        .x_label_area_size(50)
        .y_label_area_size(130)
        .build_cartesian_2d(span, least..most)?;
    chart
        .configure_mesh()
        .disable_x_mesh()
        .bold_line_style(GREY.mix(0.28))
        .light_line_style(GREY.mix(0.0))
        .axis_style(GREY.mix(0.7))
        .x_labels(9)
        .y_labels(5)
        .x_label_formatter(&|value| number(*value))
        .y_label_formatter(&|value| number(*value))
        .label_style(style(34.0, GREY))
        .draw()?;
    let points = times.iter().copied().zip(curve.values.iter().copied());
    chart.draw_series(LineSeries::new(points, hue.stroke_width(4)))?;
    let unit = if curve.unit == "1" {
        String::new()
    } else {
        format!(" in {}", curve.unit)
    };
    let label = format!("{}{unit} \u{2014} {}", letters(&curve.coordinate), curve.meaning);
    area.draw(&Text::new(label, (18, 16), style(40.0, hue)))
}

/// The range of values with a little air; a constant gets a range about it.
fn range(values: &[f64]) -> (f64, f64) {
    let least = values.iter().copied().fold(f64::INFINITY, f64::min);
    let most = values.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    let air = if most - least > 1e-9 {
        0.06 * (most - least)
    } else {
        0.1 * most.abs().max(1.0)
    };
    (least - air, most + air)
}

/// An axis number without trailing noise.
fn number(value: f64) -> String {
    let text = format!("{value:.6}");
    let short = text.trim_end_matches('0').trim_end_matches('.');
    let short = if short.is_empty() || short == "-0" {
        "0"
    } else {
        short
    };
    if value != 0.0 && short == "0" {
        format!("{value:.1e}")
    } else {
        short.replace('-', "\u{2212}")
    }
}

/// A plain name as it is written by hand: Greek letters, digits set low.
fn letters(name: &str) -> String {
    let (stem, index) = name.split_once('_').unwrap_or((name, ""));
    let stem = GREEK
        .iter()
        .find(|(latin, _)| *latin == stem)
        .map_or(stem, |(_, greek)| greek);
    let digits = !index.is_empty() && index.chars().all(|c| c.is_ascii_digit());
    if digits {
        let low = index
            .chars()
            .filter_map(|c| c.to_digit(10))
            .filter_map(|d| char::from_u32(0x2080 + d));
        return stem.chars().chain(low).collect();
    }
    if index.is_empty() {
        stem.to_owned()
    } else {
        format!("{stem}_{index}")
    }
}

const GREEK: [(&str, &str); 22] = [
    ("alpha", "\u{3b1}"),
    ("beta", "\u{3b2}"),
    ("gamma", "\u{3b3}"),
    ("delta", "\u{3b4}"),
    ("epsilon", "\u{3b5}"),
    ("zeta", "\u{3b6}"),
    ("eta", "\u{3b7}"),
    ("theta", "\u{3b8}"),
    ("kappa", "\u{3ba}"),
    ("lambda", "\u{3bb}"),
    ("mu", "\u{3bc}"),
    ("nu", "\u{3bd}"),
    ("xi", "\u{3be}"),
    ("rho", "\u{3c1}"),
    ("sigma", "\u{3c3}"),
    ("tau", "\u{3c4}"),
    ("phi", "\u{3c6}"),
    ("chi", "\u{3c7}"),
    ("psi", "\u{3c8}"),
    ("omega", "\u{3c9}"),
    ("Phi", "\u{3a6}"),
    ("Theta", "\u{398}"),
];

#[cfg(test)]
mod tests {
    use super::*;

    fn curve(name: &str, values: &[f64]) -> Curve {
        Curve {
            coordinate: name.to_owned(),
            unit: "m".to_owned(),
            meaning: "position <of> the \"trolley\"".to_owned(),
            values: values.to_vec(),
        }
    }

    #[test]
    fn a_panel_for_each_coordinate_with_its_unit() {
        let curves = [curve("x", &[0.0, 1.0, 0.5]), curve("phi_1", &[0.2, 0.2, 0.2])];
        let svg = motion(&[0.0, 1.0, 2.0], &curves);
        assert!(svg.starts_with("<svg") && svg.contains("x in m") && svg.contains("\u{3c6}\u{2081} in m"));
        assert!(svg.contains("time t in s"));
        assert!(!svg.contains("<of>"), "text is escaped");
        assert_eq!(svg, motion(&[0.0, 1.0, 2.0], &curves));
    }

    #[test]
    fn nothing_to_draw_gives_no_picture() {
        assert_eq!(motion(&[], &[]), "");
        assert_eq!(motion(&[0.0], &[curve("x", &[0.0])]), "");
    }

    #[test]
    fn axis_numbers_are_short() {
        let shown: Vec<String> = [0.0, 0.300_000_000_000_000_04, -2.5, 1e-9].map(number).into();
        assert_eq!(shown, ["0", "0.3", "\u{2212}2.5", "1.0e-9"]);
    }
}
