//! Beads and governors on things that turn at a prescribed speed.

use cas::Expr;
use worksheets::prelude::*;

use super::{Printed, Probe, Published, half, rate, second_rate};

pub(super) fn all() -> Vec<Published> {
    vec![on_a_rod(), on_a_hoop(), on_a_parabola(), governor()]
}

/// A sheet with the mass of a bead and the speed of what it sits on, and the angle turned so far.
fn turning(title: &str) -> (Sheet, Expr, Expr, Expr) {
    let mut sheet = Sheet::titled(title);
    let m = sheet.positive_constant("m", "kg", "mass of the bead");
    let omega = sheet.constant("Omega", "rad/s", "prescribed angular velocity");
    let turned = omega * sheet.time();
    (sheet, m, omega, turned)
}

fn on_a_rod() -> Published {
    let (mut sheet, m, omega, turned) = turning("Bead on a rod that turns in a horizontal plane");
    let r = sheet.coordinate("r", "m", "distance of the bead from the axis");
    let bead = sheet.particle("bead", m, vector(r * cos(turned), r * sin(turned), 0));
    sheet.normal("side", bead, vector(-sin(turned), cos(turned), 0));
    let t = sheet.time();
    Published {
        source: "the bead on a rotating rod of many textbooks: r'' = Omega^2 r, N = 2 m Omega r' (common practice)",
        sheet,
        printed: vec![
            Printed::Lagrangian(half() * m * (rate(r).squared() + omega.squared() * r.squared())),
            Printed::Accelerations(vec![omega.squared() * r]),
        ],
        probes: vec![Probe {
            state: vec![(m, "1"), (omega, "6"), (t, "0.35"), (r, "0.3"), (rate(r), "0.7")],
            accelerations: vec![10.8],
            reactions: vec![("side", 8.4)],
        }],
    }
}

fn on_a_hoop() -> Published {
    let (mut sheet, m, omega, turned) = turning("Bead on a hoop that turns about its vertical diameter");
    let radius = sheet.positive_constant("R", "m", "radius of the hoop");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let theta = sheet.coordinate("theta", "rad", "angle of the bead from the lowest point");
    let outward = vector(sin(theta) * cos(turned), sin(theta) * sin(turned), -cos(theta));
    let bead = sheet.particle("bead", m, outward.map(|component| radius * component));
    sheet.gravity(g, vector(0, 0, -1));
    sheet.normal("radial", bead, outward.map(|component| -component));
    sheet.normal("transverse", bead, vector(-sin(turned), cos(turned), 0));
    let t = sheet.time();
    let acceleration = sin(theta) * (omega.squared() * cos(theta) - g / radius);
    Published {
        source: "the bead on a rotating hoop of many textbooks; its Lagrangian was seen in Marlow, The flyball governor, 1997",
        sheet,
        printed: vec![
            Printed::Lagrangian(
                half()
                    * m
                    * radius.squared()
                    * (rate(theta).squared() + omega.squared() * sin(theta).squared())
                    + m * g * radius * cos(theta),
            ),
            Printed::Accelerations(vec![acceleration]),
        ],
        probes: vec![Probe {
            state: vec![
                (m, "1"),
                (omega, "6"),
                (radius, "0.5"),
                (g, "9.80665"),
                (t, "0.2"),
                (theta, "1.1"),
                (rate(theta), "0.7"),
            ],
            accelerations: vec![-2.926_582_046_340_325],
            reactions: vec![
                ("radial", 18.989_768_459_476_252),
                ("transverse", 1.905_103_709_987_425_7),
            ],
        }],
    }
}

fn on_a_parabola() -> Published {
    let (mut sheet, m, omega, turned) = turning("Bead on a parabola that turns about its axis");
    let b = sheet.positive_constant("b", "1/m", "height of the parabola by the square of the radius");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let r = sheet.coordinate("r", "m", "distance of the bead from the axis");
    sheet.particle(
        "bead",
        m,
        vector(r * cos(turned), r * sin(turned), b * r.squared()),
    );
    sheet.gravity(g, vector(0, 0, -1));
    let t = sheet.time();
    let equation = (1 + 4 * b.squared() * r.squared()) * second_rate(r)
        + 4 * b.squared() * r * rate(r).squared()
        + (2 * g * b - omega.squared()) * r;
    Published {
        source: "the bead on a rotating parabola of many textbooks (common practice)",
        sheet,
        printed: vec![Printed::Equations(vec![m * equation])],
        probes: vec![Probe {
            state: vec![
                (m, "1"),
                (omega, "6"),
                (b, "1.5"),
                (g, "9.80665"),
                (t, "0.1"),
                (r, "0.3"),
                (rate(r), "0.7"),
            ],
            accelerations: vec![0.359_676_795_580_110_1],
            reactions: vec![],
        }],
    }
}

fn governor() -> Published {
    let mut sheet = Sheet::titled("Centrifugal governor");
    let m_1 = sheet.positive_constant("m_1", "kg", "mass of each ball");
    let m_2 = sheet.positive_constant("m_2", "kg", "mass of the sleeve");
    let a = sheet.positive_constant("a", "m", "length of each arm");
    let omega = sheet.constant("Omega", "rad/s", "prescribed angular velocity");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let theta = sheet.coordinate("theta", "rad", "angle of the arms from the vertical");
    let t = sheet.time();
    let turned = omega * t;
    let (radius, depth) = (a * sin(theta), a * cos(theta));
    let left = sheet.particle(
        "left",
        m_1,
        vector(radius * cos(turned), radius * sin(turned), -depth),
    );
    let right = sheet.particle(
        "right",
        m_1,
        vector(-radius * cos(turned), -radius * sin(turned), -depth),
    );
    let sleeve = sheet.particle("sleeve", m_2, vector(0, 0, -2 * depth));
    sheet.gravity(g, vector(0, 0, -1));
    sheet.normal("side_left", left, vector(-sin(turned), cos(turned), 0));
    sheet.normal("side_right", right, vector(-sin(turned), cos(turned), 0));
    for (name, ball) in [("left", left), ("right", right)] {
        sheet.link(&format!("upper_{name}"), ball, vector(0, 0, 0));
        sheet.link(&format!("lower_{name}"), ball, sleeve);
    }
    sheet.normal("spindle_x", sleeve, vector(1, 0, 0));
    sheet.normal("spindle_y", sleeve, vector(0, 1, 0));
    let (v, s) = (rate(theta), sin(theta));
    let lagrangian = m_1 * a.squared() * (v.squared() + omega.squared() * s.squared())
        + 2 * m_2 * a.squared() * v.squared() * s.squared()
        + 2 * (m_1 + m_2) * g * a * cos(theta);
    Published {
        source: "Landau and Lifshitz, Mechanics, 3rd ed. 1976, section 5, problem 4 (from memory)",
        sheet,
        printed: vec![Printed::Lagrangian(lagrangian)],
        probes: vec![Probe {
            state: vec![
                (m_1, "0.6"),
                (m_2, "1.1"),
                (a, "0.5"),
                (omega, "5"),
                (g, "9.80665"),
                (t, "0.25"),
                (theta, "0.7"),
                (v, "0.9"),
            ],
            accelerations: vec![-9.892_071_584_873_367],
            reactions: vec![
                ("side_left", 2.065_073_905_668_118),
                ("side_right", -2.065_073_905_668_118),
            ],
        }],
    }
}
