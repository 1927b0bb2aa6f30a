//! The results as text for people.

use std::io::{self, Write};

use crate::command::CAUTION;
use crate::command::load::Loaded;
use crate::notebook::caution;
use crate::notebook::cell::{Content, Kind};
use crate::notebook::engine::Engine;
use crate::notebook::results::{CellResult, State};
use crate::notebook::wording;

/// Prints everything that was worked out in a notebook.
///
/// # Errors
///
/// An [`io::Error`] if `out` cannot be written.
pub fn print(file: &str, loaded: &Loaded, out: &mut dyn Write) -> io::Result<()> {
    let notebook = loaded.engine.notebook();
    writeln!(out, "{CAUTION}")?;
    writeln!(out)?;
    writeln!(out, "{}", notebook.title.as_deref().unwrap_or("untitled"))?;
    let job: Vec<String> = notebook
        .job
        .lines()
        .into_iter()
        .filter_map(|(name, text)| {
            let text = text.filter(|text| !text.trim().is_empty())?;
            Some(if name == "revision" {
                format!("revision {text}")
            } else {
                text.to_owned()
            })
        })
        .collect();
    if !job.is_empty() {
        writeln!(out, "{}", job.join(" · "))?;
    }
    writeln!(out, "{file} · sha256:{}", loaded.digest)?;
    if loaded.results.draws > 0 {
        writeln!(
            out,
            "± is a 95 % interval: bounds are the central 95 % of {} draws (seed {}); findings are \
             on the unfavourable bound",
            loaded.results.draws, loaded.results.seed
        )?;
    }
    print_findings(loaded, out)?;
    for cell in &loaded.results.cells {
        writeln!(out)?;
        print_cell(&loaded.engine, cell, out)?;
    }
    writeln!(out)?;
    writeln!(out, "Cautions")?;
    for caution in caution::always() {
        writeln!(out, "  ! {}", caution.text)?;
    }
    Ok(())
}

/// Prints what a person acts on: one line a position and a zone.
fn print_findings(loaded: &Loaded, out: &mut dyn Write) -> io::Result<()> {
    let mut lines = Vec::new();
    for cell in &loaded.results.cells {
        let typed = loaded.engine.cell(cell.id);
        let text = |field: &str| typed.and_then(|cell| cell.text(field)).unwrap_or_default();
        match cell.kind {
            Kind::Position if loaded.results.word_of(&loaded.engine, &cell.name).is_none() => {
                lines.push(match cell.state {
                    State::Ok => format!("{}: NOT ASSESSED: nothing here judges it", cell.name),
                    State::Error | State::Waiting(_) => {
                        format!("{}: {}", cell.name, wording::not_worked_out(cell))
                    }
                });
            }
            Kind::Assessment => {
                let sentence = wording::finding(&loaded.engine, cell).map_or_else(
                    || wording::not_worked_out(cell),
                    |finding| format!("{}: {}", finding.word.to_uppercase(), finding.text),
                );
                lines.push(format!("{}: {sentence}", text("position")));
            }
            Kind::Zone => lines.push(format!(
                "{} ({} for one stay of {}): {}",
                cell.name,
                text("guidance"),
                text("stay"),
                wording::zone(&loaded.engine, cell)
            )),
            _ => {}
        }
    }
    if !lines.is_empty() {
        writeln!(out)?;
        writeln!(out, "Findings")?;
        for line in lines {
            writeln!(out, "  {line}")?;
        }
    }
    Ok(())
}

fn print_cell(engine: &Engine, cell: &CellResult, out: &mut dyn Write) -> io::Result<()> {
    writeln!(out, "{} ({})", cell.name, cell.kind)?;
    print_typed(engine, cell, out)?;
    match &cell.state {
        State::Ok => print_outputs(engine, cell, out)?,
        State::Error => {
            for error in &cell.errors {
                writeln!(out, "  error: {error}")?;
            }
        }
        State::Waiting(cells) => writeln!(out, "  waiting for {}", cells.join(", "))?,
    }
    for caution in &cell.cautions {
        writeln!(out, "  ! {}", caution.text)?;
    }
    Ok(())
}

/// Prints what was typed, on one line.
fn print_typed(engine: &Engine, cell: &CellResult, out: &mut dyn Write) -> io::Result<()> {
    let Some(typed) = engine.cell(cell.id) else {
        return Ok(());
    };
    let fields: Vec<String> = typed
        .fields
        .iter()
        .map(|field| {
            let content = match &field.content {
                Content::Text(text) => shortened(text),
                content => content.to_text(),
            };
            let basis = field
                .basis
                .map(|basis| format!(" ({basis})"))
                .unwrap_or_default();
            match (field.name, typed.kind) {
                ("entry" | "text", _) => format!("{content}{basis}"),
                (name, _) => format!("{} {content}{basis}", name.replace('_', " ")),
            }
        })
        .collect();
    if !fields.is_empty() {
        writeln!(out, "  {}", fields.join(" · "))?;
    }
    for named in engine.rows_named(cell.id) {
        writeln!(
            out,
            "  {}: {}; {}",
            named.field.replace('_', " "),
            named.row.said(),
            named.row.cited()
        )?;
    }
    Ok(())
}

/// Returns a text that fits on a line or two: a damaged entry may be endless.
fn shortened(text: &str) -> String {
    const LONGEST: usize = 240;
    if text.chars().nth(LONGEST).is_none() {
        return text.to_owned();
    }
    let kept: String = text.chars().take(LONGEST).collect();
    format!("{kept}…")
}

fn print_outputs(engine: &Engine, cell: &CellResult, out: &mut dyn Write) -> io::Result<()> {
    if let Some(sentence) = wording::finding(engine, cell) {
        writeln!(out, "  {}: {}", sentence.word.to_uppercase(), sentence.text)?;
    }
    let unit = wording::unit_of(engine, cell);
    for figure in &cell.figures {
        // A finding is in the sentence above, a table below.
        if figure.row.is_some()
            || (cell.kind == Kind::Assessment && figure.name != "allowed_time")
            || figure.name == "state"
        {
            continue;
        }
        let value = wording::beside(&figure.name, &figure.shown, unit.as_ref());
        writeln!(out, "  {:<34} {value}", wording::figure_label(figure))?;
    }
    if cell.kind == Kind::Assessment {
        print_verdicts(cell, out)?;
    } else if cell.rows() > 0 {
        print_rows(cell, out)?;
    }
    Ok(())
}

/// Prints what each limit says, on the unfavourable bound.
fn print_verdicts(cell: &CellResult, out: &mut dyn Write) -> io::Result<()> {
    for (row, verdict) in cell.verdicts.iter().enumerate() {
        let judgement = &verdict.judgement;
        let finding = cell
            .in_row(row, "finding")
            .and_then(|shown| shown.word())
            .unwrap_or_default();
        let exposure = crate::units::format::safe_irradiance(judgement.exposure);
        let limit = wording::permitted(verdict)
            .map(|limit| format!(" of {limit}"))
            .unwrap_or_default();
        let ratio = judgement
            .ratio
            .map(|ratio| format!(", ratio {}", crate::units::format::safe_ratio(ratio)))
            .unwrap_or_default();
        let allowed = cell
            .allowed(row)
            .map_or_else(|| "not assessed".to_owned(), wording::span);
        writeln!(
            out,
            "  {:<22} {finding:<14} {exposure}{limit}{ratio}; allowed: {allowed}",
            verdict.guidance
        )?;
    }
    Ok(())
}

fn print_rows(cell: &CellResult, out: &mut dyn Write) -> io::Result<()> {
    // About ten lines tell a person enough; `--json` has them all.
    let rows = cell.rows();
    let step = rows.div_ceil(12).max(1);
    let columns = [
        "distance",
        "clear_distance",
        "irradiance",
        "near_ir_irradiance",
    ];
    let heads: Vec<String> = columns
        .iter()
        .map(|column| {
            format!(
                "{:>16}",
                column.replace('_', " ").replace(" irradiance", "")
            )
        })
        .collect();
    writeln!(out, "  {}", heads.join(""))?;
    for row in (0..rows).filter(|row| row % step == 0 || row + 1 == rows) {
        let cells: Vec<String> = columns
            .iter()
            .map(|column| {
                let text = cell
                    .in_row(row, column)
                    .map(|shown| wording::nominal(column, shown, None))
                    .unwrap_or_default();
                format!("{text:>16}")
            })
            .collect();
        writeln!(out, "  {}", cells.join(""))?;
    }
    if step > 1 {
        writeln!(out, "  every {step} of {rows} rows; `--json` prints all")?;
    }
    Ok(())
}
