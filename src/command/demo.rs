//! `farglow` alone: works the demo out and writes its worksheet.

use std::io::{self, Write};
use std::path::Path;

use super::{Outcome, calc, issue, load};
use crate::store::template::DEMO;
use crate::worksheet::layout::Paper;

/// Works the demo out, prints it, and writes its worksheet to the current
/// folder.
///
/// # Errors
///
/// An [`io::Error`] if `out` or `err` cannot be written.
pub fn run(out: &mut dyn Write, err: &mut dyn Write) -> io::Result<Outcome> {
    let loaded = match load::bytes(DEMO.text.as_bytes().to_vec()) {
        Ok(loaded) => loaded,
        Err(error) => {
            writeln!(err, "farglow: the demo: {error}")?;
            return Ok(Outcome::Unusable);
        }
    };
    writeln!(
        out,
        "The window is not there yet: this works the demo out and writes its worksheet here.\n"
    )?;
    calc::print(DEMO.name, &loaded, out)?;
    writeln!(out)?;
    let name = format!("{}.farglow", DEMO.name);
    let output = "farglow-demo.pdf";
    let outcome = issue::write(&loaded, &name, Path::new(output), Paper::A4, out, err)?;
    writeln!(
        out,
        "\nNext: `farglow templates` lists what to start your own from; `farglow --help` the rest."
    )?;
    Ok(outcome)
}
