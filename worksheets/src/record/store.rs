//! The stored record: what was stated, the steps and a reference run, as JSON on one line.

use std::collections::BTreeMap;

use serde::{Deserialize, Serialize};

use super::derivation::{Derivation, Shown};
use super::entry::{AssumptionEntry, ForceEntry, ParticleEntry, QuantityEntry, ReactionEntry};
use super::error::RecordError;
use super::ground::Ground;
use super::statement::Step;
use super::written;
use crate::model::Model;
use crate::reference::{Agreement, Deviation, Report};

/// The version of the format, which is raised whenever a reader of the former version would err.
pub const FORMAT: u32 = 1;

/// The JSON schema of the format.
pub const SCHEMA: &str = include_str!("schema.json");

/// A longer text is no record that we wrote.
const MOST_BYTES: usize = 64 << 20;

/// What a sheet states and what was derived from it or checked against it.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Record {
    /// The version of the format.
    pub format: u32,
    /// The title of the sheet.
    pub title: String,
    /// The quantities in order of declaration, time first.
    pub quantities: Vec<QuantityEntry>,
    /// The particles in order of declaration.
    pub particles: Vec<ParticleEntry>,
    /// The applied forces in order of declaration.
    pub forces: Vec<ForceEntry>,
    /// The ideal reactions in order of declaration.
    pub reactions: Vec<ReactionEntry>,
    /// The register of assumptions.
    pub assumptions: Vec<AssumptionEntry>,
    /// What the steps derive.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub derivation: Option<DerivationEntry>,
    /// The steps, each after those that it rests on.
    pub steps: Vec<Step>,
    /// The comparison with the numerical reference.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub reference: Option<ReferenceEntry>,
}

/// A derivation without its steps.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct DerivationEntry {
    /// The stage.
    pub stage: String,
    /// The title.
    pub title: String,
    /// The result.
    pub headline: Vec<Shown>,
    /// Remarks.
    pub notes: Vec<String>,
    /// What it was checked against.
    pub checked: Vec<String>,
}

/// A comparison with the numerical reference: its finding in short, and the whole report.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct ReferenceEntry {
    /// Whether everything that was compared agrees; not so where the numbers cannot tell.
    pub agrees: bool,
    /// The deviation that comes nearest to its tolerance, or exceeds it most.
    pub largest_deviation: String,
    /// That tolerance.
    pub tolerance: String,
    /// The report.
    pub report: Report,
}

impl ReferenceEntry {
    fn of(report: &Report) -> Self {
        let deviations = [
            &report.accelerations,
            &report.motion.deviation,
            &report.motion.energy,
        ];
        let worst = deviations
            .into_iter()
            .reduce(|worst, next| if share(next) > share(worst) { next } else { worst })
            .unwrap_or(&report.accelerations);
        Self {
            agrees: report.agreement == Agreement::Agrees,
            largest_deviation: worst.largest.clone(),
            tolerance: worst.tolerance.clone(),
            report: report.clone(),
        }
    }
}

/// A deviation as a share of its tolerance; what is no number exceeds every tolerance.
fn share(deviation: &Deviation) -> f64 {
    let number = |text: &str| text.rsplit(' ').next().and_then(|last| last.parse::<f64>().ok());
    match (number(&deviation.largest), number(&deviation.tolerance)) {
        (Some(largest), Some(tolerance)) if largest.is_finite() => largest / tolerance,
        _ => f64::INFINITY,
    }
}

impl Record {
    /// What a model states, without steps.
    #[must_use]
    pub fn of_model(model: &Model) -> Self {
        let forces = model.forces().iter().map(|force| ForceEntry::of(model, force));
        let reactions = model.reactions().iter();
        Self {
            format: FORMAT,
            title: model.title().to_owned(),
            quantities: model.quantities().iter().map(QuantityEntry::from).collect(),
            particles: model.particles().iter().map(ParticleEntry::from).collect(),
            forces: forces.collect(),
            reactions: reactions
                .map(|reaction| ReactionEntry::of(model, reaction))
                .collect(),
            assumptions: model
                .register_of_assumptions()
                .iter()
                .map(AssumptionEntry::from)
                .collect(),
            derivation: None,
            steps: Vec::new(),
            reference: None,
        }
    }

    /// What a model states, and what was derived from it.
    #[must_use]
    pub fn of(model: &Model, derivation: &Derivation) -> Self {
        Self {
            derivation: Some(DerivationEntry {
                stage: derivation.stage.clone(),
                title: derivation.title.clone(),
                headline: derivation.headline.clone(),
                notes: derivation.notes.clone(),
                checked: derivation.checked.clone(),
            }),
            steps: derivation.steps.clone(),
            ..Self::of_model(model)
        }
    }

    /// What a model states, and how its derived equations compare with the numerical reference.
    #[must_use]
    pub fn of_reference(model: &Model, report: &Report) -> Self {
        Self {
            reference: Some(ReferenceEntry::of(report)),
            ..Self::of_model(model)
        }
    }

    /// The derivation with its steps, as it was recorded.
    #[must_use]
    pub fn derivation(&self) -> Option<Derivation> {
        self.derivation.as_ref().map(|entry| Derivation {
            stage: entry.stage.clone(),
            title: entry.title.clone(),
            headline: entry.headline.clone(),
            steps: self.steps.clone(),
            notes: entry.notes.clone(),
            checked: entry.checked.clone(),
        })
    }

    /// The record as JSON on one line, its keys in the order of the format.
    ///
    /// # Errors
    /// An expression that is too long, or nested too deeply, to be read back from its text.
    pub fn to_json(&self) -> Result<String, RecordError> {
        let mut json = Vec::new();
        let mut writer = serde_json::Serializer::new(&mut json);
        serde_path_to_error::serialize(self, &mut writer).map_err(|error| RecordError::NotWritten {
            path: error.path().to_string(),
            reason: error.into_inner().to_string(),
        })?;
        Ok(String::from_utf8(json).expect("invariant: JSON is UTF-8"))
    }

    /// The record that was stored as this JSON.
    ///
    /// # Errors
    /// A text that is no JSON, a record of another format, a field that is missing, unknown or
    /// holds something that it cannot, steps that rest on themselves or on later ones.
    pub fn from_json(json: &str) -> Result<Self, RecordError> {
        if json.len() > MOST_BYTES {
            return Err(RecordError::TooLong {
                bytes: json.len(),
                limit: MOST_BYTES,
            });
        }
        let not_json = |error: serde_json::Error| RecordError::NotJson {
            line: error.line(),
            column: error.column(),
            reason: error.to_string(),
        };
        let value: serde_json::Value = serde_json::from_str(json).map_err(not_json)?;
        match value.get("format") {
            Some(found) if found.as_u64() == Some(FORMAT.into()) => {}
            found => {
                return Err(RecordError::Format {
                    found: found.map_or_else(|| "none".to_owned(), written::shortened),
                });
            }
        }
        let record: Self = serde_path_to_error::deserialize(value).map_err(|error| RecordError::Field {
            path: error.path().to_string(),
            reason: error.into_inner().to_string(),
        })?;
        record.check_grounds()?;
        Ok(record)
    }

    /// Refuses steps of one key, and steps that rest on themselves or on later ones.
    fn check_grounds(&self) -> Result<(), RecordError> {
        let mut places = BTreeMap::new();
        for (place, step) in self.steps.iter().enumerate() {
            if let Some(first) = places.insert(step.key.as_str(), place) {
                return Err(RecordError::SameKey {
                    key: step.key.clone(),
                    places: [first, place],
                });
            }
        }
        for (place, step) in self.steps.iter().enumerate() {
            for (ground_place, ground) in step.rests_on.iter().enumerate() {
                let path = || format!("steps[{place}].rests_on[{ground_place}]");
                match ground {
                    Ground::Step(key) if places.get(key.as_str()).is_some_and(|other| *other >= place) => {
                        return Err(RecordError::Circle {
                            path: path(),
                            key: key.clone(),
                        });
                    }
                    Ground::Assumption(number)
                        if self.assumptions.iter().all(|entry| entry.number != *number) =>
                    {
                        return Err(RecordError::NoAssumption {
                            path: path(),
                            number: *number,
                        });
                    }
                    Ground::Step(_) | Ground::Stated(_) | Ground::Assumption(_) => {}
                }
            }
        }
        Ok(())
    }
}
