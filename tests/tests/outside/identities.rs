//! Verdicts on published identities and near misses, which judges from outside have looked at as well.

use std::collections::BTreeMap;

use anyhow::{Result, ensure};
use cas::Effort;
use tests::identities::{Finding, all};

#[test]
fn the_corpus_is_large_and_has_both_kinds() -> Result<()> {
    let entries = all()?;
    let identities = entries.iter().filter(|entry| entry.identity).count();
    let others = entries.len() - identities;
    ensure!(entries.len() >= 300, "only {} entries", entries.len());
    ensure!(identities >= 180 && others >= 120, "{identities} and {others}");
    for entry in &entries {
        ensure!(
            entry.identity != entry.name.starts_with("changed from "),
            "{}: the name and the column say different things",
            entry.name
        );
    }
    Ok(())
}

/// The list shows progress and regressions alike: it is compared to the letter.
#[test]
fn no_verdict_on_a_published_identity_is_wrong() -> Result<()> {
    let effort = Effort::default();
    let mut counts = BTreeMap::<Finding, usize>::new();
    let mut open = String::new();
    let mut wrong = Vec::new();
    for entry in all()? {
        let finding = entry.finding(&effort)?;
        *counts.entry(finding).or_default() += 1;
        match finding {
            Finding::Proved | Finding::Refuted if (finding == Finding::Proved) != entry.identity => {
                wrong.push(format!(
                    "{}: {} = {} is {finding}",
                    entry.name, entry.left, entry.right
                ));
            }
            Finding::Proved | Finding::Refuted => {}
            _ => open.push_str(&format!("{}: {finding}\n", entry.name)),
        }
    }
    ensure!(wrong.is_empty(), "wrong verdicts:\n  {}", wrong.join("\n  "));
    let counted: Vec<String> = counts
        .iter()
        .map(|(finding, count)| format!("{count} {finding}"))
        .collect();
    let now = format!("{}\n\n{open}", counted.join(", "));
    let listed = include_str!("../../data/undecided.txt");
    ensure!(
        now == listed,
        "tests/data/undecided.txt does not list what is open now:\n{now}"
    );
    Ok(())
}
