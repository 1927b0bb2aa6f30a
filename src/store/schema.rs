//! Notebooks as JSON: reading with the place of every fault, and writing so
//! that what was read comes out the same.
//!
//! The present format number is [`FORMAT`]. A file of a newer one is refused,
//! untouched; nothing in a file is dropped silently.

mod read;
mod write;

use std::fmt;

use sha2::{Digest, Sha256};

use crate::json::{self, Place};
use crate::notebook::Notebook;

pub use write::to_value;

/// The number of the format that is written.
pub const FORMAT: u32 = 1;

/// A notebook as it was read, with the digest of what is stored.
#[derive(Clone, Debug, PartialEq)]
pub struct Stored {
    /// The notebook.
    pub notebook: Notebook,
    /// SHA-256 of the canonical form (RFC 8785) of the stored JSON, as 64
    /// hexadecimal digits.
    pub digest: String,
}

/// One fault of a file, with its place.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Fault {
    /// Where it is.
    pub place: Place,
    /// The cell and field it is in, such as `cell 4 (door), field width`; empty
    /// outside the cells.
    pub path: String,
    /// What was expected, what was found, and the remedy.
    pub message: String,
}

impl fmt::Display for Fault {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}", self.place)?;
        if !self.path.is_empty() {
            write!(f, ", {}", self.path)?;
        }
        write!(f, ": {}", self.message)
    }
}

/// Why a file is no notebook that can be opened.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum Error {
    /// It is no JSON, or a key stands twice in it.
    #[error(transparent)]
    Json(#[from] json::Error),
    /// It was written by a newer program.
    #[error(
        "{place}: the notebook has format {found}, and this program knows up to {FORMAT}: open it \
         with a newer program; it was left untouched"
    )]
    Newer {
        /// The place of the number.
        place: Place,
        /// The number.
        found: String,
    },
    /// It is JSON, but holds things that a notebook does not have.
    #[error("{}", list(.0))]
    Faults(Vec<Fault>),
}

fn list(faults: &[Fault]) -> String {
    let lines: Vec<String> = faults.iter().map(ToString::to_string).collect();
    lines.join("\n")
}

/// Reads a notebook from the bytes of its file.
///
/// # Errors
///
/// [`Error`] with every fault of structure, field, kind and name, each with its
/// place. Faults of entries and links are not found here: they belong to their
/// cells.
pub fn read(bytes: &[u8]) -> Result<Stored, Error> {
    let node = json::parse(bytes)?;
    let notebook = read::notebook(&node)?;
    Ok(Stored {
        notebook,
        digest: digest(&node.to_value()),
    })
}

/// Returns the text of a notebook's file.
#[must_use]
pub fn write(notebook: &Notebook) -> String {
    json::write(&to_value(notebook))
}

/// Returns the SHA-256 of the canonical form (RFC 8785) of a JSON value, as 64
/// hexadecimal digits.
#[must_use]
pub fn digest(value: &serde_json::Value) -> String {
    use std::fmt::Write as _;
    let hash = Sha256::digest(json::canonical(value).as_bytes());
    hash.iter()
        .fold(String::with_capacity(64), |mut text, byte| {
            write!(text, "{byte:02x}").expect("writing to a text does not fail");
            text
        })
}

#[cfg(test)]
mod tests;
