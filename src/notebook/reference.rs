//! What a cell may hold, as text: from the tables that the program itself goes
//! by, so that it is never out of date.

use std::fmt::Write;

use super::cell::Kind;
use super::cell::field::{Form, Need};
use crate::entry;
use crate::material::{Library, Property, Row};
use crate::units::Unit;

/// The longest line, in characters.
const WIDTH: usize = 100;

/// Returns the reference: forms of an entry, functions, constants, units, rows
/// of the libraries, and the fields of every kind of cell.
///
/// Markdown that reads well as plain text too. It stands in `README.md` and in
/// the help of the command that works notebooks out.
#[must_use]
pub fn text() -> String {
    let mut text = String::new();
    text.push_str(&wrapped(
        "An entry is one of three:",
        &words(
            "a quantity, `1250 ± 25 °C` (± is expanded, coverage factor 2); an expression over \
                cells, `door.width / 2 + 0.4 m`, with `+ - * / ^`, comparisons, `&& || !` and the \
                functions below; or a row of the libraries below, `of cast_iron_molten_clean`, \
                which gives its typical value with its range as the central 95 %.",
        ),
    ));
    text.push_str("\n| function | returns |\n| --- | --- |\n");
    for (usage, about) in entry::functions() {
        // Writing into a text does not fail.
        let _ = writeln!(text, "| `{usage}` | {about} |");
    }
    text.push('\n');
    let mut paragraph = |lead: &str, items: &[String]| {
        text.push_str(&wrapped(lead, items));
        text.push('\n');
    };
    let constants: Vec<String> = entry::constants()
        .map(|(name, about)| format!("`{name}` ({about})"))
        .collect();
    paragraph("**Constants:**", &listed(&constants));
    let units: Vec<String> = Unit::known().map(|symbol| format!("`{symbol}`")).collect();
    paragraph("**Units**, also joined as in `W/(m²·sr)`:", &listed(&units));
    let ids = |holds: &dyn Fn(&Row) -> bool| -> Vec<String> {
        let rows = Library::shipped().rows().filter(|row| holds(row));
        rows.map(|row| format!("`{}`", row.id)).collect()
    };
    let is_spectral = |row: &Row| matches!(row.property, Property::SpectralEmissivity(_));
    let is_temperature = |row: &Row| row.property == Property::Temperature;
    paragraph(
        "**Rows, total emissivities:**",
        &listed(&ids(&|row| !is_spectral(row) && !is_temperature(row))),
    );
    paragraph(
        "**Rows, near infrared emissivities:**",
        &listed(&ids(&is_spectral)),
    );
    paragraph("**Rows, temperatures:**", &listed(&ids(&is_temperature)));
    for kind in Kind::ALL {
        let fields: Vec<String> = kind
            .fields()
            .iter()
            .map(|spec| {
                let mut field = format!("`{}`", spec.name);
                if let Form::Word(choices) = spec.form {
                    let _ = write!(field, " ({})", choices.join(", "));
                }
                match spec.need {
                    Need::Required => format!("**{field}**"),
                    Need::Default(entry) => format!("{field} = {entry}"),
                    Need::Optional => field,
                }
            })
            .collect();
        paragraph(&format!("**Fields, {kind}:**"), &listed(&fields));
    }
    text.push_str(&wrapped("", &words(
        "A field in bold must be there; one with `=` counts as what stands behind it if left out. \
         Which of a kind's fields belong together hangs on its `form`, `outline` and `make`.",
    )));
    text
}

fn words(text: &str) -> Vec<String> {
    text.split_whitespace().map(str::to_owned).collect()
}

/// The items as one list, with commas and a full stop.
fn listed(items: &[String]) -> Vec<String> {
    let last = items.len().saturating_sub(1);
    items
        .iter()
        .enumerate()
        .map(|(at, item)| format!("{item}{}", if at == last { "." } else { "," }))
        .collect()
}

/// The lead and the items on lines of at most [`WIDTH`] characters; an item is
/// not broken.
fn wrapped(lead: &str, items: &[String]) -> String {
    let mut text = String::from(lead);
    let mut width = lead.chars().count();
    for item in items {
        let length = item.chars().count();
        if width > 0 && width + 1 + length > WIDTH {
            text.push('\n');
            width = 0;
        } else if width > 0 {
            text.push(' ');
            width += 1;
        }
        text.push_str(item);
        width += length;
    }
    text.push('\n');
    text
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lines_are_wrapped_between_items() {
        let items: Vec<String> = (0..40).map(|number| format!("`item_{number}`")).collect();
        let text = wrapped("**Items:**", &listed(&items));
        assert!(text.lines().count() > 3, "{text}");
        for line in text.lines() {
            assert!(line.chars().count() <= WIDTH, "{line}");
            assert_eq!(line.trim(), line, "{line:?}");
        }
        assert_eq!(text.matches("`item_").count(), 40);
        assert!(text.ends_with("`item_39`.\n"), "{text}");
    }

    #[test]
    fn everything_that_can_be_typed_is_listed() {
        let text = text();
        for needed in [
            "`exitance(temperature, emissivity)`",
            "`max(x, y, …)`",
            "`view_factor_disc_parallel(radius, distance, [offset])`",
            "`stefan_boltzmann`",
            "`°C`",
            "`cast_iron_molten_clean`",
            "`grey_iron_pouring`",
            "`near_ir_emissivity`",
        ] {
            assert!(text.contains(needed), "{needed}:\n{text}");
        }
        for row in Library::shipped().rows() {
            assert!(text.contains(&format!("`{}`", row.id)), "{}", row.id);
        }
    }
}
