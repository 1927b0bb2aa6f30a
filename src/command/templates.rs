//! `farglow templates`: lists site templates, or starts a notebook from one.

use std::io::{self, Write};
use std::path::Path;

use super::Outcome;
use crate::spelling::nearest;
use crate::store::file;
use crate::store::template::{self, ALL};

/// Prints the templates.
///
/// # Errors
///
/// An [`io::Error`] if `out` cannot be written.
pub fn list(out: &mut dyn Write) -> io::Result<Outcome> {
    let width = ALL.iter().map(|template| template.name.len()).max();
    for template in ALL {
        writeln!(
            out,
            "{:width$}  {}",
            template.name,
            template.about,
            width = width.unwrap_or(0)
        )?;
    }
    writeln!(out)?;
    writeln!(
        out,
        "start from one:  farglow templates --new {} -o my-job.farglow",
        ALL[0].name
    )?;
    Ok(Outcome::Done)
}

/// Writes a template's notebook to a new file.
///
/// # Errors
///
/// An [`io::Error`] if `out` or `err` cannot be written.
pub fn start(
    name: &str,
    output: &Path,
    out: &mut dyn Write,
    err: &mut dyn Write,
) -> io::Result<Outcome> {
    let Some(template) = template::find(name) else {
        let names: Vec<&str> = ALL.iter().map(|template| template.name).collect();
        let hint = nearest(name, names.iter().copied()).map_or_else(
            || format!("there are {}", names.join(", ")),
            |near| format!("did you mean `{near}`?"),
        );
        writeln!(err, "farglow: no template is named `{name}`; {hint}")?;
        return Ok(Outcome::Unusable);
    };
    if output.symlink_metadata().is_ok() {
        writeln!(
            err,
            "farglow: {} is there already and was left alone: choose another name",
            output.display()
        )?;
        return Ok(Outcome::Unusable);
    }
    if let Err(error) = file::write(output, template.text.as_bytes()) {
        writeln!(err, "farglow: {error}")?;
        return Ok(Outcome::Unusable);
    }
    writeln!(out, "wrote {}: {}", output.display(), template.about)?;
    writeln!(
        out,
        "edit it as text, then:  farglow calc {}",
        output.display()
    )?;
    Ok(Outcome::Done)
}
