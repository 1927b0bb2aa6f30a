//! `farglow issue`: writes the worksheet of a notebook.

use std::io::{self, Write};
use std::path::Path;

use super::{CAUTION, Outcome, load};
use crate::notebook::readiness;
use crate::notebook::results::State;
use crate::store::file;
use crate::worksheet::layout::Paper;
use crate::worksheet::sheet;

/// Writes the worksheet of the notebook in `notebook` to `output`.
///
/// # Errors
///
/// An [`io::Error`] if `out` or `err` cannot be written.
pub fn run(
    notebook: &Path,
    output: &Path,
    paper: Paper,
    out: &mut dyn Write,
    err: &mut dyn Write,
) -> io::Result<Outcome> {
    let loaded = match load::file(notebook) {
        Ok(loaded) => loaded,
        Err(error) => {
            writeln!(err, "farglow: {}: {error}", notebook.display())?;
            return Ok(Outcome::Unusable);
        }
    };
    let same = |a: &Path, b: &Path| matches!((a.canonicalize(), b.canonicalize()), (Ok(a), Ok(b)) if a == b);
    if same(notebook, output) {
        writeln!(
            err,
            "farglow: {} is the notebook itself and was left alone: give the worksheet another name",
            output.display()
        )?;
        return Ok(Outcome::Unusable);
    }
    let name = notebook.file_name().map_or_else(
        || "notebook.farglow".to_owned(),
        |name| name.to_string_lossy().into_owned(),
    );
    write(&loaded, &name, output, paper, out, err)
}

/// Writes the worksheet of a notebook that was worked out.
///
/// # Errors
///
/// An [`io::Error`] if `out` or `err` cannot be written.
pub fn write(
    loaded: &load::Loaded,
    name: &str,
    output: &Path,
    paper: Paper,
    out: &mut dyn Write,
    err: &mut dyn Write,
) -> io::Result<Outcome> {
    let sheet = sheet::Sheet {
        engine: &loaded.engine,
        results: &loaded.results,
        digest: &loaded.digest,
        file: name,
        contents: &loaded.bytes,
    };
    let written = sheet
        .pdf(paper)
        .map_err(|error| error.to_string())
        .and_then(|pdf| {
            file::write(output, &pdf.bytes)
                .map(|()| pdf.pages)
                .map_err(|error| error.to_string())
        });
    let pages = match written {
        Ok(pages) => pages,
        Err(error) => {
            writeln!(err, "farglow: {error}")?;
            return Ok(Outcome::Unusable);
        }
    };
    let left = &loaded.results.readiness;
    let standing = if left.is_empty() { "final" } else { "DRAFT" };
    writeln!(
        out,
        "wrote {} ({pages} pages, {standing})",
        output.display()
    )?;
    if !left.is_empty() {
        writeln!(out, "left before it can be issued as final:")?;
        for item in left {
            writeln!(out, "  - {}", item.text)?;
        }
    }
    confirmations(loaded, out)?;
    writeln!(out, "{CAUTION}")?;
    let whole = loaded
        .results
        .cells
        .iter()
        .all(|cell| cell.state == State::Ok);
    if whole {
        return Ok(Outcome::Done);
    }
    for cell in &loaded.results.cells {
        for error in &cell.errors {
            writeln!(err, "farglow: cell {}: {error}", cell.name)?;
        }
    }
    Ok(Outcome::Faults)
}

/// Prints what the notebook needs to say once the limits have been compared,
/// ready to be filled in.
fn confirmations(loaded: &load::Loaded, out: &mut dyn Write) -> io::Result<()> {
    let open = readiness::unconfirmed(&loaded.engine);
    if open.is_empty() {
        return Ok(());
    }
    writeln!(
        out,
        "once you have compared each limit with its edition, fill in and put into the notebook:"
    )?;
    writeln!(out, "  \"confirmed\": [")?;
    for (at, limit) in open.iter().enumerate() {
        let comma = if at + 1 < open.len() { "," } else { "" };
        writeln!(
            out,
            "    {{ \"guidance\": \"{}\", \"edition\": \"{}\", \"by\": \"\", \"date\": \"\" }}{comma}",
            limit.id, limit.edition
        )?;
    }
    writeln!(out, "  ]")
}
