//! Weights on ropes over pulleys without mass, and a body on a wedge.

use worksheets::prelude::*;

use super::{Printed, Probe, Published};

pub(super) fn all() -> Vec<Published> {
    vec![two_weights(), three_weights(), on_a_wedge()]
}

fn two_weights() -> Published {
    let mut sheet = Sheet::titled("Two weights on a rope over a pulley");
    let m_1 = sheet.positive_constant("m_1", "kg", "mass of the first weight");
    let m_2 = sheet.positive_constant("m_2", "kg", "mass of the second weight");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let x = sheet.coordinate("x", "m", "depth of the first weight");
    sheet.particle("first", m_1, vector(0, 0, -x));
    sheet.particle("second", m_2, vector(0, 0, x));
    sheet.gravity(g, vector(0, 0, -1));
    Published {
        source: "Atwood's machine: a = g (m_1 - m_2) / (m_1 + m_2) (common practice)",
        sheet,
        printed: vec![Printed::Accelerations(vec![g * (m_1 - m_2) / (m_1 + m_2)])],
        probes: vec![],
    }
}

fn three_weights() -> Published {
    let mut sheet = Sheet::titled("A weight against two weights on a hanging pulley");
    let m_1 = sheet.positive_constant("m_1", "kg", "mass of the single weight");
    let m_2 = sheet.positive_constant("m_2", "kg", "mass of the second weight");
    let m_3 = sheet.positive_constant("m_3", "kg", "mass of the third weight");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let x = sheet.coordinate("x", "m", "depth of the single weight");
    let y = sheet.coordinate("y", "m", "depth of the second weight below the hanging pulley");
    sheet.particle("single", m_1, vector(0, 0, -x));
    sheet.particle("second", m_2, vector(0, 0, x - y));
    sheet.particle("third", m_3, vector(0, 0, x + y));
    sheet.gravity(g, vector(0, 0, -1));
    let below = m_1 * (m_2 + m_3) + 4 * m_2 * m_3;
    let single = g * (m_1 * (m_2 + m_3) - 4 * m_2 * m_3) / below;
    // Each of the two hangs on half the tension 8 m_1 m_2 m_3 g / below, and they move apart at 2 y''.
    let apart = 2 * m_1 * (m_2 - m_3) * g / below;
    Published {
        source: "the compound Atwood machine: acceleration of the single weight and tension (from memory)",
        sheet,
        printed: vec![Printed::Accelerations(vec![single, apart])],
        probes: vec![Probe {
            state: vec![
                (m_1, "2"),
                (m_2, "1.1"),
                (m_3, "0.6"),
                (g, "9.80665"),
                (x, "0.4"),
                (y, "-0.3"),
            ],
            // Of the weights, counted downward: 1.233949337748344, 2.0132857615894033, -4.4811844370860925.
            accelerations: vec![
                1.233_949_337_748_344,
                f64::midpoint(2.013_285_761_589_403_3, 4.481_184_437_086_092_5),
            ],
            reactions: vec![],
        }],
    }
}

fn on_a_wedge() -> Published {
    let mut sheet = Sheet::titled("Body that slides down a free wedge");
    let m_w = sheet.positive_constant("m_w", "kg", "mass of the wedge");
    let m = sheet.positive_constant("m", "kg", "mass of the body");
    let alpha = sheet.constant("alpha", "rad", "slope of the wedge");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let x = sheet.coordinate("x", "m", "position of the wedge on the floor");
    let s = sheet.coordinate("s", "m", "way of the body down the slope");
    sheet.particle("wedge", m_w, vector(x, 0, 0));
    sheet.particle("body", m, vector(x + s * cos(alpha), 0, -s * sin(alpha)));
    sheet.gravity(g, vector(0, 0, -1));
    let below = m_w + m * sin(alpha).squared();
    Published {
        source: "the smooth wedge of many textbooks: s'' = (M + m) g sin(alpha) / (M + m sin(alpha)^2) (from memory)",
        sheet,
        printed: vec![Printed::Accelerations(vec![
            -m * g * sin(alpha) * cos(alpha) / below,
            (m_w + m) * g * sin(alpha) / below,
        ])],
        probes: vec![],
    }
}
