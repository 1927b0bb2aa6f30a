//! Cells that are added: with a free name and a sensible first filling.

use crate::notebook::cell::{Basis, Cell, Content, Kind};
use crate::notebook::datum::CellId;
use crate::notebook::engine::Engine;
use crate::notebook::name;

/// What each kind is for, and what a new cell of it is called. A kind that is
/// not here is known by its own name.
const KINDS: &[(Kind, &str, &str)] = &[
    (Kind::Value, "a quantity that you give", "input"),
    (Kind::Formula, "a quantity worked out from others", "result"),
    (
        Kind::Surroundings,
        "the air and the walls of the room",
        "room",
    ),
    (
        Kind::Source,
        "what is hot: an opening, a pool, a body",
        "hot",
    ),
    (
        Kind::Screen,
        "a plate, a mesh or a filter between what is hot and people",
        "screen",
    ),
    (
        Kind::Position,
        "where a person stands, and for how long",
        "person",
    ),
    (Kind::Curve, "irradiance against distance", "falloff"),
    (Kind::Assessment, "a position judged by guidance", "limits"),
    (Kind::Zone, "how far one rule reaches", "line"),
    (Kind::Note, "words", "note"),
];

/// Returns what a kind of cell is for, in a few words.
#[must_use]
pub fn about(kind: Kind) -> &'static str {
    KINDS
        .iter()
        .find(|(known, ..)| *known == kind)
        .map_or("", |(_, about, _)| about)
}

/// Returns what a new cell of a kind is called.
fn called(kind: Kind) -> &'static str {
    KINDS
        .iter()
        .find(|(known, ..)| *known == kind)
        .map_or_else(|| kind.name(), |(.., name)| name)
}

/// Returns a new cell and its place: after the selected one, else at the end.
#[must_use]
pub fn cell(engine: &Engine, kind: Kind, selected: Option<CellId>) -> (Cell, usize) {
    let cells = &engine.notebook().cells;
    let at = selected
        .and_then(|id| engine.cell(id))
        .and_then(|cell| engine.notebook().find(&cell.name))
        .map_or(cells.len(), |at| at + 1);
    let first = |kind: Kind| {
        cells
            .iter()
            .find(|cell| cell.kind == kind)
            .map(|cell| cell.name.clone())
    };
    let mut cell = Cell::new(kind, free(engine, called(kind)));
    let mut fill = |field: &str, text: Option<String>| {
        if let Some(text) = text {
            cell = std::mem::replace(&mut cell, Cell::new(kind, "")).with(field, text);
        }
    };
    let own = |text: &str| Some(text.to_owned());
    match kind {
        Kind::Value => fill("basis", own(Basis::Unconfirmed.words())),
        Kind::Surroundings => fill("air_temperature", own("25 °C")),
        Kind::Source => {
            fill("form", own("opening"));
            fill("outline", own("rectangle"));
            fill("z", own("1.2 m"));
        }
        Kind::Screen => {
            fill("make", own("solid"));
            fill("width", own("2 m"));
            fill("height", own("2 m"));
            fill("z", own("1 m"));
        }
        Kind::Position => {
            // Without a source it is placed by x and y.
            match first(Kind::Source) {
                Some(source) => fill("from", Some(source)),
                None => {
                    fill("x", own("0 m"));
                    fill("y", own("3 m"));
                }
            }
            fill("z", own("1.6 m"));
        }
        Kind::Curve => {
            fill("from", first(Kind::Source));
            fill("nearest", own("0.5 m"));
            fill("farthest", own("20 m"));
        }
        Kind::Assessment => {
            fill("position", first(Kind::Position));
        }
        Kind::Zone => {
            fill("from", first(Kind::Source));
            fill("stay", own("8 h"));
        }
        _ => {}
    }
    if kind == Kind::Assessment {
        let ids = crate::guidance::Library::shipped()
            .ids()
            .map(str::to_owned)
            .collect();
        let mut list = crate::notebook::cell::Field::new("guidance", Content::List(ids));
        list.name = "guidance";
        cell.fields.push(list);
    }
    (cell, at)
}

/// Returns a name like this one that no cell has.
#[must_use]
pub fn free(engine: &Engine, like: &str) -> String {
    let fits = |name: &str| name::check(name).is_ok() && engine.find(name).is_none();
    if fits(like) {
        return like.to_owned();
    }
    let stem = like.trim_end_matches(|letter: char| letter.is_ascii_digit());
    let stem = stem.strip_suffix('_').unwrap_or(stem);
    // Room for the number, since a name has at most so many characters.
    let stem: String = stem.chars().take(name::LONGEST - 8).collect();
    (2..)
        .map(|number: u32| format!("{stem}_{number}"))
        .find(|name| fits(name))
        .unwrap_or_else(|| format!("{stem}_again"))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::notebook::Notebook;
    use crate::notebook::edit::Edit;

    #[test]
    fn a_new_cell_of_every_kind_can_be_added_and_has_a_free_name() {
        let mut engine = Engine::open(Notebook::default()).expect("nothing is wrong");
        for kind in Kind::ALL {
            for _ in 0..2 {
                if kind == Kind::Surroundings && engine.find("room").is_some() {
                    continue;
                }
                let (cell, at) = cell(&engine, kind, None);
                let _ = engine
                    .apply(Edit::Add { at, cell })
                    .unwrap_or_else(|error| panic!("{kind}: {error}"));
            }
        }
        assert_eq!(engine.notebook().cells.len(), 2 * Kind::ALL.len() - 1);
        assert_eq!(free(&engine, "input_2"), "input_3");
        assert_eq!(free(&engine, "sqrt"), "sqrt_2");
    }
}
