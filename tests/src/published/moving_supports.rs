//! Pendulums whose support moves in a prescribed way.

use cas::Expr;
use worksheets::prelude::*;

use super::{Printed, Probe, Published, half, rate};

/// The quantities that the three pendulums share.
struct Pendulum {
    sheet: Sheet,
    m: Expr,
    l: Expr,
    a: Expr,
    gamma: Expr,
    g: Expr,
    phi: Expr,
    t: Expr,
}

pub(super) fn all() -> Vec<Published> {
    vec![on_a_circle(), along_a_horizontal(), along_a_vertical()]
}

impl Pendulum {
    fn titled(title: &str) -> Self {
        let mut sheet = Sheet::titled(title);
        Self {
            m: sheet.positive_constant("m", "kg", "mass of the bob"),
            l: sheet.positive_constant("l", "m", "length of the rod"),
            a: sheet.positive_constant("a", "m", "amplitude of the support"),
            gamma: sheet.positive_constant("gamma", "rad/s", "angular frequency of the support"),
            g: sheet.positive_constant("g", "m/s2", "acceleration of free fall"),
            phi: sheet.coordinate("phi", "rad", "angle of the rod from the vertical"),
            t: sheet.time(),
            sheet,
        }
    }

    /// Hangs the bob on the support and compares with the printed Lagrangian, in which the source
    /// leaves out total time derivatives.
    fn published(
        mut self,
        source: &'static str,
        support: [Expr; 2],
        printed: Expr,
        acceleration: f64,
        tension: f64,
    ) -> Published {
        let [x, z] = support;
        let (l, phi) = (self.l, self.phi);
        let bob = self
            .sheet
            .particle("bob", self.m, vector(x + l * sin(phi), 0, z - l * cos(phi)));
        self.sheet.gravity(self.g, vector(0, 0, -1));
        self.sheet.link("rod", bob, vector(x, 0, z));
        let pendulum = half() * self.m * l.squared() * rate(phi).squared() + self.m * self.g * l * cos(phi);
        Published {
            source,
            sheet: self.sheet,
            printed: vec![Printed::Lagrangian(pendulum + printed)],
            probes: vec![Probe {
                state: vec![
                    (self.m, "1"),
                    (l, "0.8"),
                    (self.a, "0.15"),
                    (self.gamma, "7"),
                    (self.g, "9.80665"),
                    (self.t, "0.3"),
                    (phi, "0.5"),
                    (rate(phi), "-0.4"),
                ],
                accelerations: vec![acceleration],
                reactions: vec![("rod", tension)],
            }],
        }
    }
}

/// The source counts heights downward and moves the support by (a cos, -a sin): with heights counted
/// upward that is counter-clockwise. The other sense gives another motion.
fn on_a_circle() -> Published {
    let p = Pendulum::titled("Pendulum whose support runs on a circle");
    let turned = p.gamma * p.t;
    let support = [p.a * cos(turned), p.a * sin(turned)];
    let printed = p.m * p.l * p.a * p.gamma.squared() * sin(p.phi - turned);
    p.published(
        "Landau and Lifshitz, Mechanics, 3rd ed. 1976, section 5, problem 3a (from memory)",
        support,
        printed,
        -6.145_218_683_834_225,
        1.387_279_048_207_159_7,
    )
}

fn along_a_horizontal() -> Published {
    let p = Pendulum::titled("Pendulum whose support oscillates horizontally");
    let turned = p.gamma * p.t;
    let support = [p.a * cos(turned), Expr::from(0)];
    let printed = p.m * p.l * p.a * p.gamma.squared() * cos(turned) * sin(p.phi);
    p.published(
        "Landau and Lifshitz, Mechanics, 3rd ed. 1976, section 5, problem 3b (the result was seen in a worked note)",
        support,
        printed,
        -9.947_416_089_051_279,
        6.955_179_580_828_572,
    )
}

/// The source counts the vertical support a cos(gamma t) downward.
fn along_a_vertical() -> Published {
    let p = Pendulum::titled("Pendulum whose support oscillates vertically");
    let turned = p.gamma * p.t;
    let support = [Expr::from(0), -p.a * cos(turned)];
    let printed = p.m * p.l * p.a * p.gamma.squared() * cos(turned) * cos(p.phi);
    p.published(
        "Landau and Lifshitz, Mechanics, 3rd ed. 1976, section 5, problem 3c (from memory)",
        support,
        printed,
        -3.653_241_260_524_07,
        5.477_770_617_474_106,
    )
}
