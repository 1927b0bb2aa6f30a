//! Dates as they stand in a job block: `YYYY-MM-DD`.

/// Returns whether a text is a date of the calendar, written `YYYY-MM-DD`.
#[must_use]
pub fn is_date(text: &str) -> bool {
    let bytes = text.as_bytes();
    let digits = |range: std::ops::Range<usize>| bytes[range].iter().all(u8::is_ascii_digit);
    if bytes.len() != 10 || bytes[4] != b'-' || bytes[7] != b'-' {
        return false;
    }
    if !(digits(0..4) && digits(5..7) && digits(8..10)) {
        return false;
    }
    let number = |range: std::ops::Range<usize>| text[range].parse::<u32>().unwrap_or(0);
    let (year, month, day) = (number(0..4), number(5..7), number(8..10));
    let leap = year % 4 == 0 && (year % 100 != 0 || year % 400 == 0);
    let days = match month {
        4 | 6 | 9 | 11 => 30,
        2 if leap => 29,
        2 => 28,
        1..=12 => 31,
        _ => 0,
    };
    (1..=days).contains(&day)
}

#[cfg(test)]
mod tests {
    use super::is_date;

    #[test]
    fn dates_are_told_from_other_texts() {
        for (text, holds) in [
            ("2026-12-01", true),
            ("2028-02-29", true),
            ("2026-02-29", false),
            ("2026-13-01", false),
            ("2026-04-31", false),
            ("2026-12-1", false),
            ("", false),
            ("tomorrow!!", false),
            ("20é6-12-01", false),
        ] {
            assert_eq!(is_date(text), holds, "{text}");
        }
    }
}
