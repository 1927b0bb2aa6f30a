//! `farglow [FILE]`: opens the window.

use std::io::{self, Write};
use std::path::Path;

use super::Outcome;
use crate::app;

/// Opens the window, and returns when it was closed.
///
/// # Errors
///
/// An [`io::Error`] if `err` cannot be written.
pub fn run(file: Option<&Path>, err: &mut dyn Write) -> io::Result<Outcome> {
    match app::start(file) {
        Ok(()) => Ok(Outcome::Done),
        Err(error) => {
            writeln!(err, "farglow: {error}")?;
            Ok(Outcome::Unusable)
        }
    }
}
