//! What a cell may be called.

use crate::entry;

/// The longest name, in characters.
pub const LONGEST: usize = 40;

/// Why a name cannot be a cell's.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum Error {
    /// It is empty.
    #[error("expected a name, found nothing: a cell needs a name by which others refer to it")]
    Empty,
    /// It is longer than [`LONGEST`].
    #[error("expected at most {LONGEST} characters, found {0}: shorten the name")]
    TooLong(usize),
    /// It has a character that names do not have.
    #[error(
        "expected letters a to z, digits and underscores, not beginning with a digit, found `{0}`: \
         rename the cell"
    )]
    Character(String),
    /// It stands for something else in an entry.
    #[error(
        "expected a free name, found `{0}`, which stands for a unit, a function or a constant in \
         an entry: rename the cell"
    )]
    Reserved(String),
    /// Another cell has it.
    #[error("expected a name of its own, found `{0}`, which another cell has: rename one of them")]
    Taken(String),
}

/// Checks that a cell may be called so, other cells left aside.
///
/// # Errors
///
/// What is wrong with the name, with the remedy.
pub fn check(name: &str) -> Result<(), Error> {
    if name.is_empty() {
        return Err(Error::Empty);
    }
    let length = name.chars().count();
    if length > LONGEST {
        return Err(Error::TooLong(length));
    }
    if entry::RESERVED.contains(&name) {
        return Err(Error::Reserved(name.to_owned()));
    }
    if !entry::is_name(name) {
        return Err(Error::Character(name.to_owned()));
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_are_checked() {
        let long = "a".repeat(41);
        for (name, holds) in [
            ("door", true),
            ("_d2", true),
            ("Door_2", true),
            ("", false),
            ("2door", false),
            ("door 2", false),
            ("tür", false),
            ("door.x", false),
            ("m", false),
            ("sqrt", false),
            ("pi", false),
            (long.as_str(), false),
            (&long[..40], true),
        ] {
            assert_eq!(check(name).is_ok(), holds, "{name}: {:?}", check(name));
        }
    }
}
