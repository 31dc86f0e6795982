//! The known name nearest to a mistyped one, for suggestions in error messages.

/// Of `known`, the name that differs least from `given`, where it differs by few letters only.
///
/// The measure counts letters inserted, removed, changed or exchanged with their neighbour; equal
/// distances go to the name that comes first.
pub(crate) fn nearest_of(given: &str, known: impl IntoIterator<Item = String>) -> Option<String> {
    let allowed = match given.chars().count() {
        0 | 1 => 0,
        2 | 3 => 1,
        4..=7 => 2,
        _ => 3,
    };
    known
        .into_iter()
        .map(|name| (distance(given, &name), name))
        .filter(|(distance, name)| *distance <= allowed && *distance < name.chars().count())
        .min_by_key(|(distance, _)| *distance)
        .map(|(_, name)| name)
}

/// Insertions, removals, changes and exchanges of neighbours between two texts (Damerau 1964,
/// restricted form); a change of case alone counts nothing.
fn distance(a: &str, b: &str) -> usize {
    const LONGEST: usize = 64;
    let fold = |text: &str| -> Vec<char> { text.to_lowercase().chars().take(LONGEST).collect() };
    let (a, b) = (fold(a), fold(b));
    let mut rows: Vec<Vec<usize>> = vec![(0..=b.len()).collect()];
    for i in 1..=a.len() {
        let mut row = vec![i];
        for j in 1..=b.len() {
            let changed = rows[i - 1][j - 1] + usize::from(a[i - 1] != b[j - 1]);
            let mut least = changed.min(rows[i - 1][j] + 1).min(row[j - 1] + 1);
            if i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1] {
                least = least.min(rows[i - 2][j - 2] + 1);
            }
            row.push(least);
        }
        rows.push(row);
    }
    rows[a.len()][b.len()]
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn near_names_are_found_and_far_ones_are_not() {
        let known = || ["trolley", "container", "phi", "m_t"].map(str::to_owned);
        assert_eq!(nearest_of("troley", known()).as_deref(), Some("trolley"));
        assert_eq!(nearest_of("Trolley", known()).as_deref(), Some("trolley"));
        assert_eq!(nearest_of("phi1", known()).as_deref(), Some("phi"));
        assert_eq!(nearest_of("contianer", known()).as_deref(), Some("container"));
        assert_eq!(nearest_of("girder", known()), None);
        assert_eq!(nearest_of("", known()), None);
        assert_eq!(
            nearest_of("x", ["m".to_owned()]),
            None,
            "any letter is near any other"
        );
        assert_eq!(nearest_of("M", ["m".to_owned()]).as_deref(), Some("m"));
        assert_eq!(nearest_of(&"x".repeat(10_000), known()), None);
    }

    #[test]
    fn distances() {
        assert_eq!(distance("kgg", "kg"), 1);
        assert_eq!(distance("abc", "acb"), 1);
        assert_eq!(distance("abc", ""), 3);
    }
}
