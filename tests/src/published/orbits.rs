//! A particle in a central field, on a cone and on a cycloid.

use worksheets::prelude::*;

use super::{Printed, Probe, Published, half, rate, second_rate};

pub(super) fn all() -> Vec<Published> {
    vec![central_field(), on_a_cone(), on_a_cycloid()]
}

fn central_field() -> Published {
    let mut sheet =
        Sheet::titled("Particle attracted to a fixed centre by the inverse square of the distance");
    let m = sheet.positive_constant("m", "kg", "mass of the particle");
    let mu = sheet.positive_constant("mu", "m3/s2", "strength of the centre");
    let r = sheet.coordinate("r", "m", "distance from the centre");
    let phi = sheet.coordinate("phi", "rad", "polar angle");
    let outward = vector(cos(phi), sin(phi), 0);
    let body = sheet.particle("body", m, outward.map(|component| r * component));
    sheet.force(
        "attraction",
        body,
        outward.map(|component| -m * mu / r.squared() * component),
    );
    let (v, w) = (rate(r), rate(phi));
    let lagrangian = half() * m * (v.squared() + r.squared() * w.squared()) + m * mu / r;
    Published {
        source: "motion in a central field, Landau and Lifshitz, Mechanics, 3rd ed. 1976, sections 14 and 15 (from memory)",
        sheet,
        printed: vec![
            Printed::Lagrangian(lagrangian),
            Printed::Accelerations(vec![r * w.squared() - mu / r.squared(), -2 * v * w / r]),
        ],
        probes: vec![],
    }
}

fn on_a_cone() -> Published {
    let mut sheet = Sheet::titled("Particle on the inside of a cone");
    let m = sheet.positive_constant("m", "kg", "mass of the particle");
    let alpha = sheet.constant("alpha", "rad", "half the angle of the cone");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let r = sheet.coordinate("r", "m", "distance from the apex");
    let phi = sheet.coordinate("phi", "rad", "azimuth");
    let along = vector(sin(alpha) * cos(phi), sin(alpha) * sin(phi), cos(alpha));
    let body = sheet.particle("body", m, along.map(|component| r * component));
    sheet.gravity(g, vector(0, 0, -1));
    let inward = vector(-cos(alpha) * cos(phi), -cos(alpha) * sin(phi), sin(alpha));
    sheet.normal("wall", body, inward);
    let (v, w) = (rate(r), rate(phi));
    let lagrangian = half() * m * (v.squared() + r.squared() * sin(alpha).squared() * w.squared())
        - m * g * r * cos(alpha);
    Published {
        source: "Landau and Lifshitz, Mechanics, 3rd ed. 1976, section 14, problem 2 (from memory)",
        sheet,
        printed: vec![Printed::Lagrangian(lagrangian)],
        probes: vec![Probe {
            state: vec![
                (m, "1"),
                (alpha, "0.5"),
                (g, "9.80665"),
                (r, "1.2"),
                (phi, "0.9"),
                (v, "0.4"),
                (w, "2"),
            ],
            accelerations: vec![-7.502_870_564_645_758, -4.0 / 3.0],
            reactions: vec![("wall", 6.721_088_821_691_858)],
        }],
    }
}

/// With u = cos(theta/2) the motion is u'' = -g/(4 a) u, whatever the amplitude.
fn on_a_cycloid() -> Published {
    let mut sheet = Sheet::titled("Particle on a cycloid");
    let m = sheet.positive_constant("m", "kg", "mass of the particle");
    let a = sheet.positive_constant("a", "m", "radius of the rolling circle");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let theta = sheet.coordinate("theta", "rad", "angle by which the circle has rolled");
    sheet.particle(
        "body",
        m,
        vector(a * (theta - sin(theta)), 0, a * (1 + cos(theta))),
    );
    sheet.gravity(g, vector(0, 0, -1));
    let (s, c) = (sin(theta / 2), cos(theta / 2));
    let u = c;
    let u_second_rate = -half() * s * second_rate(theta) - half() * half() * c * rate(theta).squared();
    // The generalized force belongs to theta, of which u has the derivative -sin(theta/2)/2.
    let equation = -8 * m * a.squared() * s * (u_second_rate + g / (4 * a) * u);
    Published {
        source: "Huygens, Horologium oscillatorium, 1673: the cycloid is isochronous, T = 4 pi sqrt(a/g) (from memory)",
        sheet,
        printed: vec![Printed::Equations(vec![equation])],
        probes: vec![],
    }
}
