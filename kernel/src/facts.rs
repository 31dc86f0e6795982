//! What the records in the outputs of a worksheet say: steps by verdict, side conditions, reference run.

use serde_json::Value;
use std::collections::{BTreeMap, BTreeSet};

/// The MIME type of a record.
const RECORD: &str = "application/vnd.gudgeon.record+json";

/// What the records of one worksheet say together.
#[derive(Debug, Default, Clone, PartialEq)]
pub struct Facts {
    /// The verdict of each step, by its key: several cells may show the same step.
    verdicts: BTreeMap<String, String>,
    conditions: BTreeSet<String>,
    references: Vec<Reference>,
}

/// One comparison with the numerical reference.
#[derive(Debug, Clone, PartialEq)]
pub struct Reference {
    /// The largest deviation, as it was printed.
    pub largest_deviation: String,
    /// What was allowed.
    pub tolerance: String,
    /// What follows.
    pub finding: Finding,
}

/// What a comparison with the numerical reference found, the better first.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Finding {
    /// Everything is within the tolerance.
    Agrees,
    /// The numbers cannot tell.
    NotConclusive,
    /// Something differs by more than the tolerance.
    Disagrees,
}

impl Finding {
    /// The finding in words.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::Agrees => "agrees",
            Self::NotConclusive => "is not conclusive",
            Self::Disagrees => "does not agree",
        }
    }
}

/// The kind of a step that is a definition or a law and needs no verdict.
const STATED: &str = "Stated";

impl Facts {
    /// Adds what one output says, if it holds a record.
    pub fn add_output(&mut self, output: &Value) {
        let record = &output["data"][RECORD];
        for step in record["steps"].as_array().into_iter().flatten() {
            let kind = step["verdict"]["kind"].as_str().unwrap_or("Undecided");
            let key = match &step["key"] {
                Value::String(key) => key.clone(),
                // A step without a key is known by all that it says.
                Value::Null => step.to_string(),
                other => other.to_string(),
            };
            self.verdicts.insert(key, kind.to_owned());
            for condition in step["conditions"].as_array().into_iter().flatten() {
                self.conditions.insert(match condition {
                    Value::String(text) => text.clone(),
                    other => other.to_string(),
                });
            }
        }
        let reference = &record["reference"];
        if let Some(agrees) = reference["agrees"].as_bool() {
            let text = |name: &str| match &reference[name] {
                Value::String(text) => text.clone(),
                other => other.to_string(),
            };
            let found = Reference {
                largest_deviation: text("largest_deviation"),
                tolerance: text("tolerance"),
                finding: match (agrees, &reference["report"]["agreement"]) {
                    (true, _) => Finding::Agrees,
                    (false, Value::String(word)) if word == "not_conclusive" => Finding::NotConclusive,
                    (false, _) => Finding::Disagrees,
                },
            };
            if !self.references.contains(&found) {
                self.references.push(found);
            }
        }
    }

    /// How many steps have a verdict of this kind.
    #[must_use]
    pub fn steps_with(&self, kind: &str) -> usize {
        self.verdicts.values().filter(|verdict| *verdict == kind).count()
    }

    /// How many steps have a verdict.
    #[must_use]
    pub fn steps(&self) -> usize {
        self.verdicts.len() - self.stated()
    }

    /// How many definitions and laws are stated, which need no verdict.
    #[must_use]
    pub fn stated(&self) -> usize {
        self.steps_with(STATED)
    }

    /// The distinct side conditions, in order of their text, without those that another implies.
    #[must_use]
    pub fn conditions(&self) -> Vec<&str> {
        let implied = |condition: &str| {
            let weaker = [" != 0", " >= 0"].into_iter();
            weaker
                .filter_map(|end| condition.strip_suffix(end))
                .any(|expression| self.conditions.contains(&format!("{expression} > 0")))
        };
        let texts = self.conditions.iter().map(String::as_str);
        texts.filter(|condition| !implied(condition)).collect()
    }

    /// The comparison with the largest deviation.
    #[must_use]
    pub fn worst_reference(&self) -> Option<&Reference> {
        let size = |reference: &Reference| {
            reference
                .largest_deviation
                // `below 1e-11` bounds the deviation.
                .rsplit(' ')
                .next()
                // What is no number deviates beyond all bounds.
                .and_then(|number| number.parse::<f64>().ok())
                .filter(|size| !size.is_nan())
                .unwrap_or(f64::INFINITY)
        };
        self.references.iter().max_by(|left, right| {
            let worse = left.finding.cmp(&right.finding);
            worse.then(size(left).total_cmp(&size(right)))
        })
    }

    /// Whether no step is refuted and no reference run disagrees.
    #[must_use]
    pub fn hold(&self) -> bool {
        let disagrees = |reference: &Reference| reference.finding == Finding::Disagrees;
        self.steps_with("Refuted") == 0 && !self.references.iter().any(disagrees)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use serde_json::json;

    fn output(record: Value) -> Value {
        json!({"data": {RECORD: record}, "output_type": "execute_result"})
    }

    #[test]
    fn a_step_shown_twice_counts_once() {
        let step = |key: &str, kind: &str| json!({"key": key, "verdict": {"kind": kind}, "conditions": ["m is not 0"]});
        let mut facts = Facts::default();
        facts.add_output(&output(
            json!({"steps": [step("a", "Proved"), step("b", "Supported")]}),
        ));
        facts.add_output(&output(
            json!({"steps": [step("a", "Proved"), step("c", "Undecided")]}),
        ));
        assert_eq!(facts.steps(), 3);
        assert_eq!(facts.steps_with("Proved"), 1);
        assert_eq!(facts.conditions(), ["m is not 0"]);
        assert!(facts.hold());
        facts.add_output(&output(json!({"steps": [step("d", "Refuted")]})));
        assert!(!facts.hold());
    }

    #[test]
    fn definitions_and_laws_count_apart() {
        let mut facts = Facts::default();
        facts.add_output(&output(json!({"steps": [
            {"key": "a", "verdict": {"kind": "Stated"}},
            {"key": "b", "verdict": {"kind": "Proved"}}]})));
        assert_eq!((facts.steps(), facts.stated()), (1, 1));
        assert!(facts.hold());
    }

    #[test]
    fn a_reference_that_disagrees_is_the_worst() {
        let reference = |deviation: &str, agrees: bool| {
            output(json!({"reference": {
                "largest_deviation": deviation, "tolerance": "1e-9", "agrees": agrees}}))
        };
        let mut facts = Facts::default();
        facts.add_output(&reference("1.2e-12", true));
        facts.add_output(&reference("3e-10", true));
        assert_eq!(facts.worst_reference().unwrap().largest_deviation, "3e-10");
        assert!(facts.hold());
        facts.add_output(&reference("below 1e-9", true));
        assert_eq!(facts.worst_reference().unwrap().largest_deviation, "below 1e-9");
        let mut open = reference("1e-12", false);
        open["data"][RECORD]["reference"]["report"] = json!({"agreement": "not_conclusive"});
        facts.add_output(&open);
        assert_eq!(facts.worst_reference().unwrap().finding, Finding::NotConclusive);
        assert!(facts.hold());
        facts.add_output(&reference("1e-11", false));
        assert_eq!(facts.worst_reference().unwrap().largest_deviation, "1e-11");
        assert!(!facts.hold());
    }

    #[test]
    fn a_condition_that_another_implies_is_left_out() {
        let mut facts = Facts::default();
        let conditions = ["s != 0", "s > 0", "r != 0", "s >= 0"];
        facts.add_output(&output(json!({"steps": [
            {"key": "a", "verdict": {"kind": "Proved"}, "conditions": conditions}]})));
        assert_eq!(facts.conditions(), ["r != 0", "s > 0"]);
    }

    #[test]
    fn other_outputs_say_nothing() {
        let mut facts = Facts::default();
        facts.add_output(&json!({"output_type": "stream", "text": ["x"]}));
        facts.add_output(&output(json!("not a record")));
        assert_eq!(facts, Facts::default());
    }
}
