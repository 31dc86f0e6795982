//! The table of the race: rows of two measurements, what differs between them, and growth with size.

use serde_json::{Value, json};

use super::process::{Measurement, Run};

/// One case against one peer.
#[derive(Clone, Debug)]
pub struct Row {
    /// The case.
    pub case: String,
    /// What ours is measured against.
    pub peer: String,
    /// Our run.
    pub ours: Run,
    /// The peer's.
    pub theirs: Run,
}

impl Row {
    /// How many times as long the peer took.
    #[must_use]
    pub fn ratio(&self) -> Option<f64> {
        Some(self.theirs.measurement()?.ms / self.ours.measurement()?.ms)
    }

    /// What is wrong in this row, or why it has gaps; nothing where all is well.
    #[must_use]
    pub fn note(&self) -> String {
        let run = |who: &str, run: &Run| match run {
            Run::Measured(_) => None,
            Run::NotInstalled => Some("not installed".to_owned()),
            Run::OverLimit(limit) => Some(format!("{who}over {} s", limit.as_secs())),
            Run::Failed(error) => Some(format!("{who}failed: {error}")),
        };
        let different = self
            .different_terms()
            .map(|[ours, theirs]| format!("{theirs} terms, ours has {ours}"));
        let notes = [run("ours ", &self.ours), run("", &self.theirs), different];
        notes.into_iter().flatten().collect::<Vec<_>>().join("; ")
    }

    /// The numbers of terms, ours first, where they differ.
    fn different_terms(&self) -> Option<[u64; 2]> {
        let counts = [self.ours.measurement()?.terms?, self.theirs.measurement()?.terms?];
        (counts[0] != counts[1]).then_some(counts)
    }

    /// Whether the race was run as it should be: ours gave a result, and a peer that gave one the same.
    #[must_use]
    pub fn is_sound(&self) -> bool {
        let failed = matches!(self.theirs, Run::Failed(_));
        self.ours.measurement().is_some() && !failed && self.different_terms().is_none()
    }

    /// The row for programs; `note` is there where there is one.
    #[must_use]
    pub fn json(&self) -> Value {
        let (ours, theirs) = (self.ours.measurement(), self.theirs.measurement());
        let mut row = json!({
            "case": self.case,
            "peer": self.peer,
            "ours_ms": ours.map(|run| run.ms),
            "peer_ms": theirs.map(|run| run.ms),
            "ratio": self.ratio(),
            "terms": ours.and_then(|run| run.terms),
            "ours_mb": ours.and_then(|run| run.mb),
            "peer_mb": theirs.and_then(|run| run.mb),
        });
        let note = self.note();
        if !note.is_empty() {
            row["note"] = note.into();
        }
        row
    }

    /// The row for people.
    #[must_use]
    pub fn line(&self) -> String {
        let (ours, theirs) = (self.ours.measurement(), self.theirs.measurement());
        let number = |value: Option<f64>| value.map_or_else(|| "-".to_owned(), three_digits);
        let memory = |run: Option<&Measurement>| number(run.and_then(|run| run.mb));
        let terms = ours
            .and_then(|run| run.terms)
            .map_or_else(|| "-".to_owned(), |terms| terms.to_string());
        let cells = [
            number(ours.map(|run| run.ms)),
            number(theirs.map(|run| run.ms)),
            number(self.ratio()),
            terms,
            memory(ours),
            memory(theirs),
        ];
        aligned(&self.case, &self.peer, &cells, &self.note())
    }

    /// The line above the rows.
    #[must_use]
    pub fn heading() -> String {
        let cells = ["ours ms", "peer ms", "ratio", "terms", "ours MB", "peer MB"].map(str::to_owned);
        aligned("case", "peer", &cells, "")
    }
}

fn aligned(case: &str, peer: &str, cells: &[String; 6], note: &str) -> String {
    let cells = cells.iter().map(|cell| format!("{cell:>9}")).collect::<String>();
    format!("{case:<28}{peer:<18}{cells}  {note}")
        .trim_end()
        .to_owned()
}

/// A number above zero with three digits that count.
fn three_digits(value: f64) -> String {
    let decimals = match value {
        value if value >= 99.95 => 0,
        value if value >= 9.995 => 1,
        value if value >= 0.9995 => 2,
        _ => 3,
    };
    format!("{value:.decimals$}")
}

/// The exponent `k` with which a time grows as `n^k`: the slope of the straight line through the
/// logarithms that has the least sum of squares.
///
/// There is none for fewer than three sizes: two points lie on a line whatever they are.
#[must_use]
pub fn growth(points: &[(usize, f64)]) -> Option<f64> {
    if points.len() < 3 {
        return None;
    }
    let logarithms: Vec<(f64, f64)> = points.iter().map(|(n, ms)| ((*n as f64).ln(), ms.ln())).collect();
    let count = logarithms.len() as f64;
    let (x, y) = logarithms
        .iter()
        .fold((0.0, 0.0), |(x, y), point| (x + point.0, y + point.1));
    let (x, y) = (x / count, y / count);
    let spread: f64 = logarithms.iter().map(|point| (point.0 - x).powi(2)).sum();
    let together: f64 = logarithms.iter().map(|point| (point.0 - x) * (point.1 - y)).sum();
    (spread > 0.0).then(|| together / spread)
}

#[cfg(test)]
mod tests {
    use std::time::Duration;

    use super::*;

    fn measured(ms: f64, terms: Option<u64>) -> Run {
        Run::Measured(Measurement {
            ms,
            terms,
            mb: Some(8.0),
        })
    }

    fn row(ours: Run, theirs: Run) -> Row {
        Row {
            case: "abs 5".to_owned(),
            peer: "FLINT".to_owned(),
            ours,
            theirs,
        }
    }

    #[test]
    fn the_ratio_says_how_much_longer_the_peer_took() {
        let row = row(measured(2.0, Some(7)), measured(9.0, Some(7)));
        assert!((row.ratio().expect("both are measured") - 4.5).abs() < 1e-12);
        assert!(row.is_sound() && row.note().is_empty());
        assert_eq!(
            row.json(),
            json!({
                "case": "abs 5", "peer": "FLINT", "ours_ms": 2.0, "peer_ms": 9.0, "ratio": 4.5,
                "terms": 7, "ours_mb": 8.0, "peer_mb": 8.0,
            })
        );
    }

    #[test]
    fn other_terms_and_failures_are_named_and_gaps_are_allowed() {
        let other = row(measured(2.0, Some(7)), measured(9.0, Some(8)));
        assert!(!other.is_sound());
        assert_eq!(other.note(), "8 terms, ours has 7");
        let without = row(measured(2.0, None), measured(9.0, Some(8)));
        assert!(without.is_sound());
        let gap = row(measured(2.0, Some(7)), Run::NotInstalled);
        assert!(gap.is_sound() && gap.ratio().is_none());
        assert_eq!(gap.json()["note"], "not installed");
        let long = row(measured(2.0, Some(7)), Run::OverLimit(Duration::from_secs(60)));
        assert!(long.is_sound());
        assert_eq!(long.note(), "over 60 s");
        assert!(!row(measured(2.0, Some(7)), Run::Failed("no".to_owned())).is_sound());
        assert!(!row(Run::OverLimit(Duration::from_secs(1)), measured(2.0, Some(7))).is_sound());
    }

    #[test]
    fn growth_is_the_slope_in_logarithms() {
        let cubic: Vec<(usize, f64)> = [5, 10, 15, 20].map(|n| (n, 0.25 * (n * n * n) as f64)).to_vec();
        assert!((growth(&cubic).expect("four sizes") - 3.0).abs() < 1e-12);
        // By hand: ln n = 0, L, 2L and ln ms = 0, 2L, 2L for L = ln 2 have the slope 1.
        let scattered = [(1, 1.0), (2, 4.0), (4, 4.0)];
        assert!((growth(&scattered).expect("three sizes") - 1.0).abs() < 1e-12);
        assert_eq!(growth(&cubic[..2]), None);
        assert_eq!(growth(&[(5, 1.0), (5, 2.0), (5, 3.0)]), None);
    }

    #[test]
    fn numbers_keep_three_digits() {
        let shown = [0.01234, 0.9999, 1.5, 12.345, 99.99, 1234.5].map(three_digits);
        assert_eq!(shown, ["0.012", "1.00", "1.50", "12.3", "100", "1234"]);
    }
}
