//! Pendulums on fixed supports: plane, spherical, elastic, double and in a chain.

use cas::Expr;
use worksheets::prelude::*;

use super::{Printed, Probe, Published, half, rate};

pub(super) fn all() -> Vec<Published> {
    vec![double(), on_a_trolley(), spherical(), elastic(), chain_of_three()]
}

fn double() -> Published {
    let mut sheet = Sheet::titled("Coplanar double pendulum");
    let m_1 = sheet.positive_constant("m_1", "kg", "mass of the upper bob");
    let m_2 = sheet.positive_constant("m_2", "kg", "mass of the lower bob");
    let l_1 = sheet.positive_constant("l_1", "m", "length of the upper rod");
    let l_2 = sheet.positive_constant("l_2", "m", "length of the lower rod");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let phi_1 = sheet.coordinate("phi_1", "rad", "angle of the upper rod from the vertical");
    let phi_2 = sheet.coordinate("phi_2", "rad", "angle of the lower rod from the vertical");
    let (x, z) = (l_1 * sin(phi_1), -l_1 * cos(phi_1));
    let upper = sheet.particle("upper", m_1, vector(x, 0, z));
    let lower = sheet.particle(
        "lower",
        m_2,
        vector(x + l_2 * sin(phi_2), 0, z - l_2 * cos(phi_2)),
    );
    sheet.gravity(g, vector(0, 0, -1));
    sheet.link("upper_rod", upper, vector(0, 0, 0));
    sheet.link("lower_rod", upper, lower);

    let (v_1, v_2) = (rate(phi_1), rate(phi_2));
    let lagrangian = half() * (m_1 + m_2) * l_1.squared() * v_1.squared()
        + half() * m_2 * l_2.squared() * v_2.squared()
        + m_2 * l_1 * l_2 * v_1 * v_2 * cos(phi_1 - phi_2)
        + (m_1 + m_2) * g * l_1 * cos(phi_1)
        + m_2 * g * l_2 * cos(phi_2);
    Published {
        source: "Landau and Lifshitz, Mechanics, 3rd ed. 1976, section 5, problem 1 (from memory)",
        sheet,
        printed: vec![Printed::Lagrangian(lagrangian)],
        probes: vec![Probe {
            state: vec![
                (m_1, "1.3"),
                (m_2, "0.7"),
                (l_1, "0.9"),
                (l_2, "1.1"),
                (g, "9.80665"),
                (phi_1, "0.4"),
                (phi_2, "-1.1"),
                (v_1, "0.3"),
                (v_2, "-0.8"),
            ],
            accelerations: vec![-4.767_295_306_870_156, 8.294_598_516_399_832],
            reactions: vec![
                ("upper_rod", 11.891_063_150_936_887),
                ("lower_rod", 0.614_719_186_252_923_7),
            ],
        }],
    }
}

fn on_a_trolley() -> Published {
    let mut sheet = Sheet::titled("Pendulum on a mass that moves along a rail");
    let m_1 = sheet.positive_constant("m_1", "kg", "mass on the rail");
    let m_2 = sheet.positive_constant("m_2", "kg", "mass of the bob");
    let l = sheet.positive_constant("l", "m", "length of the rod");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let x = sheet.coordinate("x", "m", "position along the rail");
    let phi = sheet.coordinate("phi", "rad", "angle of the rod from the vertical");
    let slider = sheet.particle("slider", m_1, vector(x, 0, 0));
    let bob = sheet.particle("bob", m_2, vector(x + l * sin(phi), 0, -l * cos(phi)));
    sheet.gravity(g, vector(0, 0, -1));
    sheet.normal("rail", slider, vector(0, 0, 1));
    sheet.link("rod", slider, bob);

    let (v, w) = (rate(x), rate(phi));
    let lagrangian = half() * (m_1 + m_2) * v.squared()
        + half() * m_2 * (l.squared() * w.squared() + 2 * l * v * w * cos(phi))
        + m_2 * g * l * cos(phi);
    Published {
        source: "Landau and Lifshitz, Mechanics, 3rd ed. 1976, section 5, problem 2 (the Lagrangian was seen)",
        sheet,
        printed: vec![Printed::Lagrangian(lagrangian)],
        probes: vec![Probe {
            state: vec![
                (m_1, "1.3"),
                (m_2, "0.7"),
                (l, "0.8"),
                (g, "9.80665"),
                (x, "0.2"),
                (phi, "0.6"),
                (v, "0.5"),
                (w, "-1.2"),
            ],
            accelerations: vec![2.399_193_520_096_966, -9.396_738_713_644_96],
            reactions: vec![("rail", 17.307_603_877_956_314), ("rod", 5.523_763_661_229_172)],
        }],
    }
}

fn spherical() -> Published {
    let mut sheet = Sheet::titled("Spherical pendulum");
    let m = sheet.positive_constant("m", "kg", "mass of the bob");
    let l = sheet.positive_constant("l", "m", "length of the rod");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let theta = sheet.coordinate("theta", "rad", "angle of the rod from the downward vertical");
    let phi = sheet.coordinate("phi", "rad", "azimuth of the rod");
    let bob = sheet.particle(
        "bob",
        m,
        vector(
            l * sin(theta) * cos(phi),
            l * sin(theta) * sin(phi),
            -l * cos(theta),
        ),
    );
    sheet.gravity(g, vector(0, 0, -1));
    sheet.link("rod", bob, vector(0, 0, 0));

    let (v, w) = (rate(theta), rate(phi));
    let lagrangian = half() * m * l.squared() * (v.squared() + sin(theta).squared() * w.squared())
        + m * g * l * cos(theta);
    let polar = sin(theta) * cos(theta) * w.squared() - g / l * sin(theta);
    // The azimuth from the conservation of m l^2 sin(theta)^2 phi'.
    let azimuth = -2 * cos(theta) / sin(theta) * v * w;
    Published {
        source: "Landau and Lifshitz, Mechanics, 3rd ed. 1976, section 14, problem 1 (from memory)",
        sheet,
        printed: vec![
            Printed::Lagrangian(lagrangian),
            Printed::Accelerations(vec![polar, azimuth]),
        ],
        probes: vec![Probe {
            state: vec![
                (m, "1"),
                (l, "0.8"),
                (g, "9.80665"),
                (theta, "1"),
                (phi, "0.3"),
                (v, "0.4"),
                (w, "2"),
            ],
            accelerations: vec![-8.496_419_437_806_583, -1.027_348_185_494_929_3],
            reactions: vec![("rod", 7.692_390_546_317_219)],
        }],
    }
}

fn elastic() -> Published {
    let mut sheet = Sheet::titled("Elastic pendulum");
    let m = sheet.positive_constant("m", "kg", "mass of the bob");
    let k = sheet.positive_constant("k", "N/m", "stiffness of the spring");
    let l_0 = sheet.positive_constant("l_0", "m", "length of the relaxed spring");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let r = sheet.coordinate("r", "m", "length of the spring");
    let theta = sheet.coordinate("theta", "rad", "angle of the spring from the vertical");
    let bob = sheet.particle("bob", m, vector(r * sin(theta), 0, -r * cos(theta)));
    sheet.gravity(g, vector(0, 0, -1));
    sheet.spring("spring", bob, vector(0, 0, 0), k, l_0);

    let (v, w) = (rate(r), rate(theta));
    let lagrangian = half() * m * (v.squared() + r.squared() * w.squared()) + m * g * r * cos(theta)
        - half() * k * (r - l_0).squared();
    Published {
        source: "the elastic pendulum of many textbooks, in polar coordinates (common practice)",
        sheet,
        printed: vec![Printed::Lagrangian(lagrangian)],
        probes: vec![Probe {
            state: vec![
                (m, "1"),
                (k, "40"),
                (l_0, "0.6"),
                (g, "9.80665"),
                (r, "0.9"),
                (theta, "0.5"),
                (v, "0.3"),
                (w, "-1.1"),
            ],
            accelerations: vec![-2.304_854_969_437_778_7, -4.490_620_509_058_785],
            reactions: vec![],
        }],
    }
}

fn chain_of_three() -> Published {
    let mut sheet = Sheet::titled("Chain of three equal pendulums");
    let m = sheet.positive_constant("m", "kg", "mass of each bob");
    let l = sheet.positive_constant("l", "m", "length of each rod");
    let g = sheet.positive_constant("g", "m/s2", "acceleration of free fall");
    let names = ["q_1", "q_2", "q_3"];
    let angles = names.map(|name| sheet.coordinate(name, "rad", "angle of a rod from the vertical"));
    let (mut x, mut z) = (Expr::from(0), Expr::from(0));
    let mut bobs = Vec::new();
    for (name, angle) in ["first", "second", "third"].into_iter().zip(angles) {
        x += l * sin(angle);
        z -= l * cos(angle);
        bobs.push(sheet.particle(name, m, vector(x, 0, z)));
    }
    sheet.gravity(g, vector(0, 0, -1));
    sheet.link("rod_1", bobs[0], vector(0, 0, 0));
    sheet.link("rod_2", bobs[0], bobs[1]);
    sheet.link("rod_3", bobs[1], bobs[2]);

    // Bob i carries the rods up to i, so that the pair (i, j) of rods is carried by N - max(i, j) bobs.
    let rates = angles.map(rate);
    let mut lagrangian = Expr::from(0);
    for (i, (angle, velocity)) in angles.into_iter().zip(rates).enumerate() {
        for (j, (other, other_velocity)) in angles.into_iter().zip(rates).enumerate() {
            let carried = i64::try_from(3 - i.max(j)).expect("invariant: at most three");
            lagrangian += half() * carried * m * l.squared() * velocity * other_velocity * cos(angle - other);
        }
        let carried = i64::try_from(3 - i).expect("invariant: at most three");
        lagrangian += carried * m * g * l * cos(angle);
    }
    Published {
        source: "N equal pendulums in a chain: mass matrix N - max(i, j), stiffness N - i (from memory)",
        sheet,
        printed: vec![Printed::Lagrangian(lagrangian)],
        probes: vec![Probe {
            state: vec![
                (m, "1"),
                (l, "1"),
                (g, "9.80665"),
                (angles[0], "0.3"),
                (angles[1], "-0.7"),
                (angles[2], "1.2"),
                (rates[0], "0.5"),
                (rates[1], "-0.2"),
                (rates[2], "0.9"),
            ],
            accelerations: vec![
                -5.492_911_899_720_019,
                9.407_372_250_801_851,
                -2.918_110_741_330_879_8,
            ],
            reactions: vec![
                ("rod_1", 11.284_783_748_388_653),
                ("rod_2", 3.083_705_453_797_654_3),
                ("rod_3", -0.093_464_900_246_643_07),
            ],
        }],
    }
}
