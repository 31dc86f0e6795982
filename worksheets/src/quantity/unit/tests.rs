//! Units read against ISO dimensions, exact factors, and texts that are no units.

use cas::exact;
use proptest::prelude::*;

use super::*;

fn dimension(code: &str) -> Dimension {
    Unit::read(code).expect(code).dimension
}

/// Dimensions of ISO 80000-4:2019 quantities (mass and density seen in a listing, the others
/// from memory) against the units that ISO names for them.
#[test]
fn dimensions_of_mechanics() {
    for (code, mass, length, time) in [
        ("kg", 1, 0, 0),
        ("kg/m3", 1, -3, 0),
        ("kg.m/s", 1, 1, -1),
        ("kg.m2", 1, 2, 0),
        ("kg.m2/s", 1, 2, -1),
        ("N", 1, 1, -2),
        ("N.m", 1, 2, -2),
        ("J", 1, 2, -2),
        ("W", 1, 2, -3),
        ("Pa", 1, -1, -2),
        ("N/m", 1, 0, -2),
        ("N.m/rad", 1, 2, -2),
        ("N.s/m", 1, 0, -1),
        ("J.s", 1, 2, -1),
        ("Hz", 0, 0, -1),
        ("rad/s", 0, 0, -1),
        ("m/s2", 0, 1, -2),
        ("/s", 0, 0, -1),
        ("1", 0, 0, 0),
        ("m.s-2", 0, 1, -2),
        ("kg.(m/s)2", 1, 2, -2),
    ] {
        if code == "kg.(m/s)2" {
            // UCUM raises simple units alone to powers, never parentheses.
            assert!(matches!(Unit::read(code), Err(UnitError::Unexpected { .. })));
            continue;
        }
        assert_eq!(dimension(code), Dimension::new(mass, length, time), "{code}");
    }
    assert_eq!(dimension("N/(kg.m)"), Dimension::new(0, 0, -2));
}

#[test]
fn factors_are_exact() {
    for (code, factor) in [
        ("g", exact("1e-3").expect("a number")),
        ("t", Expr::from(1000)),
        ("mm", exact("0.001").expect("a number")),
        ("km/h", exact("10/36").expect("a number")),
        ("deg", pi() / 180),
        ("{turn}/min", exact("1/60").expect("a number")),
        ("kg{empty}", Expr::one()),
        ("10*3.N", Expr::from(1000)),
        ("MN/m2", Expr::from(1_000_000)),
        ("[g]", exact("9.80665").expect("a number")),
        ("[in_i]", exact("0.0254").expect("a number")),
        ("[lbf_av]", exact("4.4482216152605").expect("a number")),
        ("100.m", Expr::from(100)),
    ] {
        assert_eq!(Unit::read(code).expect(code).factor, factor, "{code}");
    }
}

#[test]
fn what_is_no_unit_is_named() {
    for (code, suggestion) in [
        ("kgg", "kg"),
        ("kg m", "kg.m"),
        ("m/s^2", "m/s2"),
        ("m/s²", "m/s2"),
        ("N*m", "N.m"),
        ("N·m", "N.m"),
        ("sec", "s"),
        ("Kg", "kg"),
        ("newton", "N"),
        ("°", "deg"),
        ("degree", "deg"),
        ("rpm", "{turn}/min"),
    ] {
        let error = Unit::read(code).expect_err(code);
        assert!(error.to_string().contains(code), "{error}");
        assert!(
            error.hint().contains(&format!("\"{suggestion}\"")),
            "{code}: {}",
            error.hint()
        );
    }
    for code in [
        "",
        " ",
        "kg/",
        "/",
        "m..s",
        "(m",
        "m)",
        "kg{a",
        "0.m",
        "m1000",
        "m-",
        "xyzzy",
        "[g",
        "m//s",
        "<b>",
        "10*s",
        "99999999999999999999.m",
    ] {
        assert!(Unit::read(code).is_err(), "{code:?} was read");
    }
    for code in ["K", "mA", "N/K"] {
        assert!(matches!(
            Unit::read(code),
            Err(UnitError::OutsideMechanics { .. })
        ));
    }
    assert!(matches!(
        Unit::read(&format!("{}m{}", "(".repeat(17), ")".repeat(17))),
        Err(UnitError::TooDeep { .. })
    ));
    assert!(matches!(
        Unit::read(&"m.".repeat(60)),
        Err(UnitError::TooLong { .. })
    ));
}

proptest! {
    #[test]
    fn no_text_makes_the_reader_panic(text in ".{0,40}", pieces in "[kgmsNd0-9./(){}*^ -]{0,20}") {
        for code in [text, pieces] {
            if let Err(error) = Unit::read(&code) {
                prop_assert!(!error.hint().is_empty());
            }
        }
    }

    #[test]
    fn products_and_quotients_follow_their_parts(
        a in prop::sample::select(vec!["kg", "m2", "N", "s-1", "deg", "km/h"]),
        b in prop::sample::select(vec!["g", "kN", "min", "rad", "[in_i]"]),
    ) {
        let [of_a, of_b] = [a, b].map(|code| Unit::read(code).expect("a unit"));
        let product = Unit::read(&format!("{a}.{b}")).expect("a unit");
        let quotient = Unit::read(&format!("({a})/({b})")).expect("a unit");
        prop_assert_eq!(product.dimension(), &of_a.dimension().times(of_b.dimension()));
        prop_assert_eq!(product.factor(), of_a.factor() * of_b.factor());
        prop_assert_eq!(quotient.dimension(), &of_a.dimension().over(of_b.dimension()));
    }
}
