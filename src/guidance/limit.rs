//! One published limit, as its file states it.

use super::error::seconds;
use super::form::Form;
use super::{Envelope, HowKnown, Metric, Organ, Standing};

/// One published limit with its citation.
#[derive(Clone, Debug, PartialEq)]
pub struct Limit {
    /// The name by which notebooks call it, such as `eu-2006-25-m`.
    pub id: String,
    /// What it limits, in a few words.
    pub title: String,
    /// The title of the publication.
    pub document: String,
    /// Who published it.
    pub issuer: String,
    /// The edition or year that the numbers belong to.
    pub edition: String,
    /// The clause, table or row.
    pub clause: String,
    /// Where the publication appeared, empty if that is not known.
    pub reference: String,
    /// What weight it carries.
    pub standing: Standing,
    /// Where that weight holds, in words.
    pub jurisdiction: String,
    /// The harm it guards against, in words.
    pub effect: String,
    /// What it protects.
    pub organ: Organ,
    /// What it measures.
    pub metric: Metric,
    /// The exposure time in seconds from which it applies, not itself included; 0 for all.
    pub from: f64,
    /// The limit over exposure time, in order of time.
    pub pieces: Vec<Piece>,
    /// The id of the row that holds for longer stays.
    pub continued_by: Option<String>,
    /// Where it applies, in words, with the convention at its bounds.
    pub valid: String,
    /// How its numbers are known.
    pub how_known: HowKnown,
    /// How its band and quantity are known.
    pub band_how_known: HowKnown,
    /// How its publication's title and reference are known.
    pub reference_how_known: HowKnown,
    /// Where it was read, and what of it was recalled.
    pub where_known: String,
    /// What must be said beside it.
    pub caution: String,
    /// Who supplied it.
    pub origin: Origin,
}

/// Who supplied a limit.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Origin {
    /// It came with the program.
    Shipped,
    /// The user's own file, to be marked as theirs wherever it is shown.
    Own {
        /// The file's name.
        file: String,
    },
}

/// One stretch of exposure time with its limit.
#[derive(Clone, Debug, PartialEq)]
pub struct Piece {
    /// The exposure time in seconds at which it ends; absent when it never does.
    pub until: Option<f64>,
    /// Whether the end belongs to this piece (`until`) or not (`before`).
    pub includes_end: bool,
    /// The limit as it is written, in the exposure time `t`.
    pub limit: String,
    pub(super) form: Form,
}

impl Limit {
    /// Returns the points around a position that are judged: by the organ it protects.
    #[must_use]
    pub const fn envelope(&self) -> Envelope {
        self.organ.envelope()
    }

    /// Returns whether it is evidence, whose findings speak of an onset and never of `within`.
    #[must_use]
    pub fn is_evidence(&self) -> bool {
        self.standing == Standing::Evidence
    }

    /// Returns whether the user must confirm its numbers before they are relied on.
    #[must_use]
    pub fn needs_confirming(&self) -> bool {
        self.how_known != HowKnown::Read
    }

    /// Returns issuer, document, edition, clause and reference in one line.
    #[must_use]
    pub fn citation(&self) -> String {
        let mut text = format!(
            "{}, {} ({}), {}",
            self.issuer, self.document, self.edition, self.clause
        );
        if !self.reference.is_empty() {
            text.push_str(", ");
            text.push_str(&self.reference);
        }
        text
    }

    /// Returns the standing in words with its jurisdiction, marked when it is the user's own.
    #[must_use]
    pub fn standing_words(&self) -> String {
        let text = format!("{}: {}", self.standing.word(), self.jurisdiction);
        match &self.origin {
            Origin::Shipped => text,
            Origin::Own { file } => format!("{text} (entered by the user in {file})"),
        }
    }

    /// Returns the limit as it is written, each piece with the stays to which it applies.
    ///
    /// # Examples
    ///
    /// ```
    /// use farglow::guidance::Library;
    ///
    /// let row = Library::shipped().get("eu-2006-25-o").expect("it is shipped");
    /// assert_eq!(row.limit_text(), "20000 J/m² * (t / 1 s)^0.25 for t under 10 s");
    /// ```
    #[must_use]
    pub fn limit_text(&self) -> String {
        // The start of a row belongs to the row before it.
        let (mut start, mut taken) = (self.from, true);
        let mut texts = Vec::with_capacity(self.pieces.len());
        for piece in &self.pieces {
            let stays = match piece.until {
                Some(end) if piece.includes_end => {
                    format!("t up to and including {}", seconds(end))
                }
                Some(end) => format!("t under {}", seconds(end)),
                None if start <= 0.0 => "every t".to_owned(),
                None if taken => format!("t longer than {}", seconds(start)),
                None => format!("t of {} and longer", seconds(start)),
            };
            texts.push(format!("{} for {stays}", piece.limit));
            (start, taken) = (piece.until.unwrap_or(f64::MAX), piece.includes_end);
        }
        texts.join("; ")
    }
}
