//! Records that were made to hurt: they are refused or read, and never hang or end the program.

use std::time::Instant;

use cas::Effort;
use serde_json::json;

use super::tests::pendulum;
use super::*;
use crate::show::Bundle;

#[test]
fn expensive_expressions_are_refused_or_read_in_good_time() {
    let (model, made, _) = pendulum();
    let honest = Record::of(&model, &made).to_json().expect("can be written");
    let value: serde_json::Value = serde_json::from_str(&honest).expect("is JSON");
    for text in [
        "9^(999999999)".to_owned(),
        "9^(99999999999999999999)".to_owned(),
        "(1/3)^(-2000000000)".to_owned(),
        "2^(1/999999999)".to_owned(),
        "9".repeat(100_000),
        format!("0.{}", "3".repeat(100_000)),
        "9^9^9^9^9".to_owned(),
        "((((9^(99999))^(99999))^(99999))^(99999))".to_owned(),
        format!("(x + y)^({})", "9".repeat(50)),
        "(x+y+z+w)^(500)".to_owned(),
        "sin(999999999999*x)".to_owned(),
        "1/0".to_owned(),
        "x".to_owned() + &"'".repeat(300),
        "(".repeat(100_000),
        "-".repeat(100_000),
    ] {
        let started = Instant::now();
        let mut changed = value.clone();
        changed["steps"][1]["statement"]["left"]["value"] = json!(text);
        let effort = Effort {
            operations: 1_000_000,
            ..Effort::default()
        };
        if let Ok(record) = Record::from_json(&changed.to_string()) {
            assert!(!record.divergences(&effort).is_empty(), "{text:.40} is proved");
            assert!(!Bundle::of_record(&record).html.is_empty());
        }
        let seconds = started.elapsed().as_secs_f64();
        assert!(seconds < 30.0, "{text:.40} took {seconds} s");
    }
}
