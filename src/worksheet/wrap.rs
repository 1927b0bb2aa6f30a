//! Breaking runs of text into lines of a given width.
//!
//! Lines break at spaces and after hyphens and slashes inside words; a word
//! wider than the line is broken between characters, so nothing ever overflows.

use glam::DVec2;

use crate::drawing::font::{self, Weight};
use crate::drawing::mark::{Mark, Text};
use crate::drawing::role::Role;
use crate::worksheet::block::{Align, Run};

/// A stretch of a line in one style.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Piece {
    pub text: String,
    pub weight: Weight,
    pub role: Role,
    /// Distance from the start of the line, in points.
    pub x: f64,
}

/// One line of wrapped text.
#[derive(Clone, Debug, Default, PartialEq)]
pub(super) struct Line {
    pub pieces: Vec<Piece>,
    pub width: f64,
}

impl Line {
    /// Returns the marks of the line, `left` and `room` being its column.
    pub(super) fn marks(
        &self,
        left: f64,
        baseline: f64,
        room: f64,
        size: f64,
        align: Align,
    ) -> Vec<Mark> {
        let shift = match align {
            Align::Start => 0.0,
            Align::Middle => (room - self.width) / 2.0,
            Align::End => room - self.width,
        };
        self.pieces
            .iter()
            .map(|piece| {
                let at = DVec2::new(left + shift + piece.x, baseline);
                Mark::Text(
                    Text {
                        weight: piece.weight,
                        ..Text::new(at, size, piece.text.as_str())
                    }
                    .role(piece.role),
                )
            })
            .collect()
    }
}

#[derive(Clone, Copy)]
struct Sign {
    c: char,
    run: usize,
    advance: f64,
}

const fn weight(run: &Run) -> Weight {
    if run.bold {
        Weight::SemiBold
    } else {
        Weight::Regular
    }
}

fn signs(runs: &[Run], size: f64) -> Vec<Sign> {
    let mut found = Vec::new();
    for (index, run) in runs.iter().enumerate() {
        for c in run.text.chars() {
            let c = match c {
                '\n' => '\n',
                c if c.is_control() => ' ',
                c => c,
            };
            let advance = if c == '\n' {
                0.0
            } else {
                font::advance(c, weight(run)) * size
            };
            found.push(Sign {
                c,
                run: index,
                advance,
            });
        }
    }
    found
}

/// Whether a line may break after `c`, given what comes next.
fn breaks_after(c: char, next: Option<char>) -> bool {
    match c {
        ' ' => true,
        '-' | '–' | '/' => next.is_some_and(char::is_alphabetic),
        '—' => true,
        _ => false,
    }
}

/// Returns the lines of `runs`, none wider than `room` points unless a single
/// character is. Empty text gives one empty line.
pub(super) fn lines(runs: &[Run], size: f64, room: f64) -> Vec<Line> {
    let all = signs(runs, size);
    // A hair of slack, so that a column measured from this very text holds it.
    let room = room + 1e-6;
    let mut found = Vec::new();
    let mut from = 0;
    loop {
        let mut used = 0.0;
        let mut at = from;
        let mut safe = None;
        let mut forced = false;
        while let Some(sign) = all.get(at) {
            if sign.c == '\n' {
                forced = true;
                break;
            }
            // Spaces may hang over the end; they are cut off below.
            if used + sign.advance > room && sign.c != ' ' {
                break;
            }
            used += sign.advance;
            at += 1;
            if breaks_after(sign.c, all.get(at).map(|next| next.c)) {
                safe = Some(at);
            }
        }
        let whole = at >= all.len();
        let end = match safe {
            _ if whole || forced => at,
            Some(safe) => safe,
            // Nowhere to break: cut the word, taking at least one character.
            None => at.max(from + 1),
        };
        found.push(line(&all[from..end], runs));
        if whole {
            return found;
        }
        from = if forced { end + 1 } else { end };
        if !forced {
            while all.get(from).is_some_and(|sign| sign.c == ' ') {
                from += 1;
            }
            if from >= all.len() {
                return found;
            }
        }
    }
}

fn line(signs: &[Sign], runs: &[Run]) -> Line {
    let end = signs
        .iter()
        .rposition(|sign| sign.c != ' ')
        .map_or(0, |last| last + 1);
    let mut found = Line::default();
    let mut current = None;
    for sign in &signs[..end] {
        if current != Some(sign.run) {
            current = Some(sign.run);
            let run = &runs[sign.run];
            found.pieces.push(Piece {
                text: String::new(),
                weight: weight(run),
                role: run.role,
                x: found.width,
            });
        }
        if let Some(piece) = found.pieces.last_mut() {
            piece.text.push(sign.c);
        }
        found.width += sign.advance;
    }
    found
}

/// Returns how wide `runs` are unbroken, and their widest unbreakable part, in points.
pub(super) fn extremes(runs: &[Run], size: f64) -> (f64, f64) {
    let all = signs(runs, size);
    let (mut line, mut longest) = (0.0_f64, 0.0_f64);
    let (mut word, mut widest) = (0.0_f64, 0.0_f64);
    for (i, sign) in all.iter().enumerate() {
        if sign.c == '\n' {
            (line, word) = (0.0, 0.0);
            continue;
        }
        line += sign.advance;
        if sign.c == ' ' {
            word = 0.0;
            continue;
        }
        longest = longest.max(line);
        word += sign.advance;
        widest = widest.max(word);
        if breaks_after(sign.c, all.get(i + 1).map(|next| next.c)) {
            word = 0.0;
        }
    }
    (longest, widest)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn texts(runs: &[Run], room: f64) -> Vec<String> {
        lines(runs, 10.0, room)
            .iter()
            .map(|line| {
                line.pieces
                    .iter()
                    .map(|piece| piece.text.as_str())
                    .collect()
            })
            .collect()
    }

    #[test]
    fn lines_break_at_spaces_and_fit() {
        let runs = [
            Run::plain("stand behind the plate until the door is "),
            Run::bold("closed"),
            Run::plain("."),
        ];
        for room in [40.0, 63.0, 100.0, 400.0] {
            let found = lines(&runs, 10.0, room);
            for line in &found {
                assert!(line.width <= room + 1e-6, "{} in {room}", line.width);
            }
            let joined = texts(&runs, room).join(" ");
            assert_eq!(joined, "stand behind the plate until the door is closed.");
        }
    }

    #[test]
    fn a_run_boundary_inside_a_word_is_no_place_to_break() {
        let runs = [Run::plain("aaaa bb"), Run::bold("bb cc")];
        let room = lines(&[Run::bold("bbbb cc")], 10.0, 1e9)[0].width + 0.5;
        assert_eq!(texts(&runs, room), vec!["aaaa", "bbbb cc"]);
    }

    #[test]
    fn a_word_wider_than_the_line_is_cut() {
        let word = "w".repeat(300);
        let found = texts(&[Run::plain(word.clone())], 80.0);
        assert!(found.len() > 20, "{} lines", found.len());
        assert_eq!(found.concat(), word);
    }

    #[test]
    fn a_column_narrower_than_a_character_still_ends() {
        assert_eq!(texts(&[Run::plain("abc d")], 0.0), vec!["a", "b", "c", "d"]);
    }

    #[test]
    fn new_lines_and_emptiness_are_kept() {
        assert_eq!(texts(&[Run::plain("a\n\nb")], 100.0), vec!["a", "", "b"]);
        assert_eq!(texts(&[], 100.0), vec![""]);
        assert_eq!(texts(&[Run::plain("   ")], 1.0), vec![""]);
        assert_eq!(texts(&[Run::plain("a ")], 5.0), vec!["a"]);
    }

    #[test]
    fn a_width_measured_from_a_text_holds_it() {
        for text in [
            "near-infrared irradiance",
            "12 345 W/m²",
            "2006/25/EC annex II",
        ] {
            let runs = [Run::plain(text)];
            let (longest, widest) = extremes(&runs, 9.0);
            assert_eq!(lines(&runs, 9.0, longest).len(), 1, "{text}");
            assert!(widest <= longest, "{text}: {widest} > {longest}");
            for line in lines(&runs, 9.0, widest) {
                assert!(
                    line.width <= widest + 1e-6,
                    "{text}: {} > {widest}",
                    line.width
                );
            }
        }
    }
}
