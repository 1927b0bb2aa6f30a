//! The known word that was most likely meant by one that is not known.

/// Words longer than this are no mistyped names, and comparing them would cost.
const LONGEST: usize = 80;

/// Returns the candidate nearest to `typed`, if it is near enough to have been
/// meant: at most one slip for every three letters of the shorter word.
///
/// A slip is a letter left out, put in, changed, or swapped with its
/// neighbour. Upper and lower case, and blanks, hyphens and underscores, count
/// as alike. Ties go to the first candidate.
///
/// # Examples
///
/// ```
/// use farglow::spelling::nearest;
///
/// assert_eq!(nearest("hieght", ["width", "height"]), Some("height"));
/// assert_eq!(nearest("depth", ["width", "height"]), None);
/// ```
#[must_use]
pub fn nearest<'a>(typed: &str, candidates: impl IntoIterator<Item = &'a str>) -> Option<&'a str> {
    if typed.chars().take(LONGEST + 1).count() > LONGEST {
        return None;
    }
    let typed = plain(typed);
    let mut best: Option<(usize, &'a str)> = None;
    for candidate in candidates {
        let known = plain(candidate);
        let slips = strsim::osa_distance(&typed, &known);
        let shorter = typed.chars().count().min(known.chars().count());
        let near = slips <= shorter / 3;
        if near && best.is_none_or(|(least, _)| slips < least) {
            best = Some((slips, candidate));
        }
    }
    best.map(|(_, candidate)| candidate)
}

fn plain(text: &str) -> String {
    text.trim()
        .chars()
        .map(|letter| match letter {
            '_' | '-' => '-',
            letter if letter.is_whitespace() => '-',
            letter => letter.to_ascii_lowercase(),
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::nearest;

    #[test]
    fn a_slip_finds_its_word_and_nonsense_finds_none() {
        let words = [
            "eu-2006-25-m",
            "icnirp-2013-ir-eye",
            "pain-time",
            "door",
            "m",
        ];
        for (typed, expected) in [
            ("eu-2006-25-m", Some("eu-2006-25-m")),
            ("EU_2006_25 m", Some("eu-2006-25-m")),
            ("icnirp-2013-ireye", Some("icnirp-2013-ir-eye")),
            ("paintime", Some("pain-time")),
            ("pian-tmie", Some("pain-time")),
            ("dor", Some("door")),
            ("M", Some("m")),
            ("x", None),
            ("", None),
            ("something else", None),
        ] {
            let found = nearest(typed, words);
            assert_eq!(found, expected, "typed {typed:?}, found {found:?}");
        }
        let endless = "m".repeat(100_000);
        assert_eq!(nearest(&endless, words), None);
    }
}
