//! What a field holds, what is expected of it, and where an input came from.

use std::fmt;

use super::Kind;
use crate::units::{Dimension, Quantity, Unit, format};

/// Where an input came from.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Basis {
    /// Measured on the spot.
    Measured,
    /// From the maker's plate or papers.
    Nameplate,
    /// From a handbook.
    Handbook,
    /// Somebody's estimate.
    Estimate,
    /// A rule of the trade without a source.
    CommonPractice,
    /// Left to be confirmed for this job.
    Unconfirmed,
}

impl Basis {
    /// All of them, in the order in which they are listed.
    pub const ALL: [Basis; 6] = [
        Basis::Measured,
        Basis::Nameplate,
        Basis::Handbook,
        Basis::Estimate,
        Basis::CommonPractice,
        Basis::Unconfirmed,
    ];

    /// Returns the words that stand in a file and on a worksheet.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Basis::Measured => "measured",
            Basis::Nameplate => "nameplate",
            Basis::Handbook => "handbook",
            Basis::Estimate => "estimate",
            Basis::CommonPractice => "common practice",
            Basis::Unconfirmed => "unconfirmed",
        }
    }

    /// Returns the basis of these words.
    #[must_use]
    pub fn from_words(words: &str) -> Option<Basis> {
        Basis::ALL.into_iter().find(|basis| basis.words() == words)
    }
}

impl fmt::Display for Basis {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.words())
    }
}

/// What was typed into a field.
#[derive(Clone, Debug, PartialEq)]
pub enum Content {
    /// One text: an entry, a word, a name, prose.
    Text(String),
    /// Several texts, such as the ids of guidance.
    List(Vec<String>),
    /// A whole number.
    Count(f64),
    /// Pairs of entries, such as the vertices of an outline.
    Pairs(Vec<[String; 2]>),
}

/// Which entry of a field of pairs: the pair and the side of it, from 0.
pub type Item = (u16, u8);

impl Content {
    /// Returns what a text stands for in a field of this form: pairs where it
    /// reads as such, else the text itself.
    #[must_use]
    pub fn typed(form: Form, text: String) -> Content {
        match form {
            Form::Pairs(_) => pairs(&text).map_or(Content::Text(text), Content::Pairs),
            _ => Content::Text(text),
        }
    }

    /// Returns the content as one text.
    #[must_use]
    pub fn to_text(&self) -> String {
        match self {
            Content::Text(text) => text.clone(),
            Content::List(list) => list.join(", "),
            Content::Count(number) => number.to_string(),
            Content::Pairs(pairs) => pairs
                .iter()
                .map(|[one, other]| format!("{one}, {other}"))
                .collect::<Vec<_>>()
                .join("; "),
        }
    }
}

/// Reads pairs from one text, such as `0 m, 0 m; 1 m, 0 m; 1 m, 2 m`; `None`
/// where a piece between semicolons is no pair. Commas in brackets part
/// nothing.
#[must_use]
pub fn pairs(text: &str) -> Option<Vec<[String; 2]>> {
    let parted = |text: &str, mark: char| -> Vec<String> {
        let (mut pieces, mut depth) = (vec![String::new()], 0_u32);
        for sign in text.chars() {
            match sign {
                '(' => depth += 1,
                ')' => depth = depth.saturating_sub(1),
                _ => {}
            }
            if sign == mark && depth == 0 {
                pieces.push(String::new());
            } else if let Some(last) = pieces.last_mut() {
                last.push(sign);
            }
        }
        pieces
    };
    let mut list = Vec::new();
    for piece in parted(text, ';') {
        let sides = parted(&piece, ',');
        let [one, other] = <[String; 2]>::try_from(sides).ok()?;
        list.push([one.trim().to_owned(), other.trim().to_owned()]);
    }
    Some(list)
}

/// One field of a cell, as typed.
#[derive(Clone, Debug, PartialEq)]
pub struct Field {
    /// Its name, one of the kind's [`Spec`]s.
    pub name: &'static str,
    /// What was typed.
    pub content: Content,
    /// Where the input came from, where that was said.
    pub basis: Option<Basis>,
    /// A remark on this input.
    pub note: Option<String>,
    /// Whether the file writes it as an object even with neither basis nor
    /// note, so that saving it again gives the same digest.
    pub wrapped: bool,
}

impl Field {
    /// Returns a field without basis and note.
    #[must_use]
    pub const fn new(name: &'static str, content: Content) -> Self {
        Field {
            name,
            content,
            basis: None,
            note: None,
            wrapped: false,
        }
    }
}

/// What a field of a kind may hold.
#[derive(Clone, Copy, Debug)]
pub struct Spec {
    /// Its name in the file.
    pub name: &'static str,
    /// What it holds.
    pub form: Form,
    /// Whether it must be there.
    pub need: Need,
    /// What it means, for help and for messages.
    pub about: &'static str,
}

/// The forms of a field.
#[derive(Clone, Copy, Debug)]
pub enum Form {
    /// An entry that is worked out to a quantity.
    Entry(Expect),
    /// Pairs of entries: what is expected of each side, and how many pairs
    /// there may be.
    Pairs(&'static Pairs),
    /// One of these words.
    Word(&'static [&'static str]),
    /// The name of a cell of one of these kinds.
    Cell(&'static [Kind]),
    /// `strongest`, the name of a source, or a heading.
    Facing,
    /// One id of guidance.
    Guidance,
    /// One or several ids of guidance.
    GuidanceList,
    /// A whole number in this range.
    Count(u32, u32),
    /// A unit to show a result in.
    Unit,
    /// A basis, where the kind has one entry only.
    Basis,
    /// Prose.
    Text,
}

/// What a field of pairs may hold.
#[derive(Clone, Copy, Debug)]
pub struct Pairs {
    /// What is expected of either side.
    pub sides: [Expect; 2],
    /// How few pairs there may be.
    pub least: usize,
    /// How many.
    pub most: usize,
    /// How one is written, for messages.
    pub example: &'static str,
}

/// Whether a field must be there.
#[derive(Clone, Copy, Debug)]
pub enum Need {
    /// It must.
    Required,
    /// It may be left out, and then counts as this entry.
    Default(&'static str),
    /// It may be left out.
    Optional,
}

/// What is expected of an entry's result.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Expect {
    /// The dimension; `None` for any.
    pub dimension: Option<Dimension>,
    /// The range.
    pub range: Range,
}

/// The range that an entry's result must lie in.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Range {
    /// Any finite number.
    Any,
    /// Above zero.
    Positive,
    /// Zero or above.
    NotNegative,
    /// Above zero and at most one: an emissivity.
    Emissivity,
    /// From zero to one.
    Fraction,
    /// From zero to less than one.
    Share,
    /// From a right angle down to a right angle up.
    RightAngle,
    /// From zero to less than a right angle.
    Lean,
}

impl Expect {
    /// Any quantity of any dimension.
    pub const ANYTHING: Expect = Expect {
        dimension: None,
        range: Range::Any,
    };
    /// A length, positive, zero or negative: a coordinate.
    pub const COORDINATE: Expect = Expect::of(Dimension::LENGTH, Range::Any);
    /// A length above zero.
    pub const SIZE: Expect = Expect::of(Dimension::LENGTH, Range::Positive);
    /// A length that may be zero.
    pub const REACH: Expect = Expect::of(Dimension::LENGTH, Range::NotNegative);
    /// An absolute temperature above zero kelvin.
    pub const TEMPERATURE: Expect = Expect::of(Dimension::TEMPERATURE, Range::Positive);
    /// An emissivity.
    pub const EMISSIVITY: Expect = Expect::of(Dimension::NONE, Range::Emissivity);
    /// A fraction.
    pub const FRACTION: Expect = Expect::of(Dimension::NONE, Range::Fraction);
    /// A heading.
    pub const HEADING: Expect = Expect::of(Dimension::ANGLE, Range::Any);
    /// A tilt.
    pub const TILT: Expect = Expect::of(Dimension::ANGLE, Range::RightAngle);
    /// A duration above zero.
    pub const DURATION: Expect = Expect::of(Dimension::TIME, Range::Positive);
    /// A speed that may be zero.
    pub const SPEED: Expect = Expect::of(Dimension::SPEED, Range::NotNegative);

    /// Returns the expectation of one dimension and range.
    #[must_use]
    pub const fn of(dimension: Dimension, range: Range) -> Self {
        Expect {
            dimension: Some(dimension),
            range,
        }
    }

    /// Returns what is wrong with `quantity`, as a message and a remedy.
    ///
    /// # Errors
    ///
    /// The message and the remedy where the dimension or the range is not the
    /// one expected.
    pub fn check(&self, quantity: &Quantity) -> Result<(), (&'static str, String, String)> {
        if let Some(dimension) = self.dimension
            && quantity.dimension != dimension
        {
            return Err((
                "wrong-dimension",
                format!(
                    "expected {}, found {}",
                    dimension.describe(),
                    quantity.dimension.describe()
                ),
                self.example(),
            ));
        }
        let si = quantity.si;
        let (holds, wanted) = match self.range {
            Range::Any => (true, ""),
            Range::Positive if self.dimension == Some(Dimension::TEMPERATURE) => {
                (si > 0.0, "a temperature above absolute zero")
            }
            Range::Positive => (si > 0.0, "a value above zero"),
            Range::NotNegative => (si >= 0.0, "zero or a value above it"),
            Range::Emissivity => (si > 0.0 && si <= 1.0, "a value above 0 and at most 1"),
            Range::Share => ((0.0..1.0).contains(&si), "a value from 0 to less than 1"),
            Range::Fraction => ((0.0..=1.0).contains(&si), "a value from 0 to 1"),
            Range::RightAngle => (
                si.abs() <= std::f64::consts::FRAC_PI_2 * (1.0 + 1e-12),
                "an angle from -90 ° to 90 °",
            ),
            Range::Lean => (
                (0.0..std::f64::consts::FRAC_PI_2).contains(&si),
                "an angle from 0 ° to less than 90 °",
            ),
        };
        if holds {
            Ok(())
        } else {
            let unit = format::natural_unit(quantity.dimension, si, None);
            Err((
                "out-of-range",
                format!("expected {wanted}, found {}", format::exactly(si, &unit)),
                self.example(),
            ))
        }
    }

    /// Returns the nearest value that the range allows. Draws of an uncertain
    /// emissivity are held at 1 by nature; nothing else is moved.
    #[must_use]
    pub fn held(&self, si: f64) -> f64 {
        match self.range {
            Range::Emissivity => si.min(1.0),
            Range::Fraction => si.clamp(0.0, 1.0),
            // The next below one.
            Range::Share => si.clamp(0.0, 1.0 - f64::EPSILON),
            Range::Any | Range::Positive | Range::NotNegative | Range::RightAngle | Range::Lean => {
                si
            }
        }
    }

    fn example(self) -> String {
        let example = match (self.dimension, self.range) {
            (_, Range::Emissivity) => "0.95",
            (Some(Dimension::LENGTH), _) => "2.5 m",
            (Some(Dimension::TEMPERATURE), _) => "1250 °C",
            (Some(Dimension::ANGLE), _) => "90 °",
            (Some(Dimension::TIME), _) => "4 min",
            (Some(Dimension::SPEED), _) => "0.3 m/s",
            (_, Range::Fraction | Range::Share) => "50 %",
            _ => return "see the field's meaning".to_owned(),
        };
        format!("write it as in `{example}`")
    }
}

/// Returns the unit that a field's own literal is written in, so that a result
/// can be shown in it.
#[must_use]
pub fn typed_unit(entry: &crate::entry::Entry) -> Option<&Unit> {
    entry
        .is_single_literal()
        .and_then(|literal| literal.unit.as_ref())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn pairs_are_read_from_one_text_and_written_back() {
        for (text, expected) in [
            ("0 m, 0 m; 1 m, 0 m", Some("0 m, 0 m; 1 m, 0 m")),
            ("0 m,0 m;max(a, b),2 m", Some("0 m, 0 m; max(a, b), 2 m")),
            ("a, b", Some("a, b")),
            ("a, b;", None),
            ("a; b", None),
            ("a, b, c", None),
            ("", None),
            // Nonsense, but a pair: its entries say what is wrong with them.
            (") , (; (,", Some("), (; (,")),
        ] {
            let found = pairs(text).map(|pairs| Content::Pairs(pairs).to_text());
            assert_eq!(found.as_deref(), expected, "{text}");
        }
    }
}
