//! The nearest of several names to one that does not exist.

/// Returns the candidate nearest to `asked`, if it is near enough to have been meant.
///
/// Case, blanks and underscores do not count; ties go to the first candidate.
pub(super) fn nearest<'a>(
    asked: &str,
    candidates: impl IntoIterator<Item = &'a str>,
) -> Option<&'a str> {
    // Longer texts are no mistyped name, and comparing them would cost.
    const LONGEST: usize = 80;
    let asked = plain(asked);
    if asked.is_empty() || asked.len() > LONGEST {
        return None;
    }
    let allowed = (asked.len() / 4).max(1);
    candidates
        .into_iter()
        .map(|candidate| (distance(&asked, &plain(candidate)), candidate))
        .filter(|&(distance, _)| distance <= allowed)
        .min_by_key(|&(distance, _)| distance)
        .map(|(_, candidate)| candidate)
}

fn plain(text: &str) -> Vec<char> {
    text.trim()
        .chars()
        .map(|c| {
            if c == '_' || c.is_whitespace() {
                '-'
            } else {
                c.to_ascii_lowercase()
            }
        })
        .collect()
}

/// Counts the characters to insert, leave out, replace, or swap with their neighbour.
fn distance(a: &[char], b: &[char]) -> usize {
    let mut before: Vec<usize> = Vec::new();
    let mut last: Vec<usize> = (0..=b.len()).collect();
    for i in 1..=a.len() {
        let mut row = vec![i];
        for j in 1..=b.len() {
            let replaced = last[j - 1] + usize::from(a[i - 1] != b[j - 1]);
            let mut least = replaced.min(last[j] + 1).min(row[j - 1] + 1);
            if i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1] {
                least = least.min(before[j - 2] + 1);
            }
            row.push(least);
        }
        before = std::mem::replace(&mut last, row);
    }
    last[b.len()]
}

#[cfg(test)]
mod tests {
    use super::nearest;

    #[test]
    fn a_slip_finds_its_name_and_nonsense_finds_none() {
        let ids = ["eu-2006-25-m", "icnirp-2013-ir-eye", "pain-time"];
        for (asked, expected) in [
            ("eu-2006-25-m", Some("eu-2006-25-m")),
            ("EU_2006_25 m", Some("eu-2006-25-m")),
            ("icnirp-2013-ireye", Some("icnirp-2013-ir-eye")),
            ("paintime", Some("pain-time")),
            ("pian-tmie", Some("pain-time")),
            ("", None),
            ("something else", None),
        ] {
            let found = nearest(asked, ids);
            assert_eq!(found, expected, "asked for {asked:?}, found {found:?}");
        }
        let endless = "m".repeat(100_000);
        assert_eq!(nearest(&endless, ids), None);
    }
}
