use std::fmt;

use super::Place;
use super::read::{LARGEST, MOST_LEVELS, MOST_VALUES};

/// Why a text is not the JSON that is read here, and where.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Error {
    /// Where the fault is.
    pub place: Place,
    /// What it is.
    pub kind: Kind,
}

/// What is wrong with a text.
#[derive(Clone, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub enum Kind {
    /// There is nothing but white space.
    Empty,
    /// More bytes than [`LARGEST`].
    TooLarge {
        /// The size in bytes.
        size: u64,
    },
    /// More values than [`MOST_VALUES`].
    TooMany,
    /// More levels of lists and objects than [`MOST_LEVELS`].
    TooDeep,
    /// The text begins with a byte-order mark.
    ByteOrderMark,
    /// A byte that is not UTF-8, or a text in UTF-16.
    NotUtf8 {
        /// The byte.
        byte: u8,
    },
    /// The text ends before its value does.
    Truncated {
        /// The bracket, brace or quote left open last, and where it is.
        open: Option<(char, Place)>,
    },
    /// Something else should stand here.
    Expected {
        /// What should stand here.
        what: &'static str,
        /// What does.
        found: Option<char>,
    },
    /// A text holds what a text may not.
    BadText {
        /// What is wrong, and the remedy.
        what: &'static str,
    },
    /// A number that no 64-bit floating point number stands for.
    OutOfRange {
        /// The number as written.
        written: String,
    },
    /// A key that its object already has.
    KeyTwice {
        /// The key.
        key: String,
        /// Where it was given first.
        first: Place,
    },
    /// Something follows the value.
    Trailing {
        /// Its first character.
        found: Option<char>,
    },
}

impl fmt::Display for Error {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let place = self.place;
        match &self.kind {
            Kind::Empty => f.write_str("the file is empty: a JSON object was expected, take a copy of it or start a new one"),
            Kind::TooLarge { size } => write!(
                f,
                "the file has {size} bytes, and at most {LARGEST} are read: split it"
            ),
            Kind::ByteOrderMark => {
                f.write_str("the file begins with a byte-order mark: save it as UTF-8 without one")
            }
            Kind::NotUtf8 { byte } => {
                write!(f, "{place} (byte {}): ", place.offset)?;
                if matches!(byte, 0xFE | 0xFF) && place.offset == 0 {
                    return f.write_str("the file looks like UTF-16: save it as UTF-8");
                }
                write!(
                    f,
                    "the byte {byte:#04x} is not UTF-8: save the file as UTF-8"
                )
            }
            Kind::TooMany => write!(
                f,
                "{place}: more than {MOST_VALUES} values in one file: split it"
            ),
            Kind::TooDeep => write!(
                f,
                "{place}: lists and objects nested more than {MOST_LEVELS} levels deep"
            ),
            Kind::Truncated { open } => {
                write!(f, "{place}: the file breaks off here")?;
                match open {
                    Some(('"', at)) => write!(f, ", in the text that begins at {at}")?,
                    Some((sign, at)) => {
                        write!(f, ", before the `{sign}` of {at} is closed")?;
                    }
                    None => f.write_str(", in the middle of a value")?,
                }
                f.write_str(": is a part of it missing?")
            }
            Kind::Expected { what, found } => {
                write!(f, "{place}: expected {what}, found {}", Found(*found))
            }
            Kind::BadText { what } => write!(f, "{place}: {what}"),
            Kind::OutOfRange { written } => write!(
                f,
                "{place}: the number `{}` is beyond what can be calculated with, about 1e-308 to 1e308",
                Short(written)
            ),
            Kind::KeyTwice { key, first } => write!(
                f,
                "{place}: the key `{}` is given twice, first at {first}: remove one of them",
                Short(key)
            ),
            Kind::Trailing { found } => write!(
                f,
                "{place}: expected the end of the file, found {}: one file holds one value",
                Found(*found)
            ),
        }
    }
}

impl std::error::Error for Error {}

struct Found(Option<char>);

impl fmt::Display for Found {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self.0 {
            None => f.write_str("the end of the file"),
            Some('\n' | '\r') => f.write_str("the end of the line"),
            Some('`') => f.write_str("a backtick"),
            Some(sign) if sign.is_control() => write!(f, "`{}`", sign.escape_default()),
            Some(sign) => write!(f, "`{sign}`"),
        }
    }
}

/// The first 40 characters, with no control characters among them.
struct Short<'a>(&'a str);

impl fmt::Display for Short<'_> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        const MOST: usize = 40;
        for sign in self.0.chars().take(MOST) {
            if sign.is_control() {
                write!(f, "{}", sign.escape_default())?;
            } else {
                write!(f, "{sign}")?;
            }
        }
        if self.0.chars().nth(MOST).is_some() {
            f.write_str("…")?;
        }
        Ok(())
    }
}
