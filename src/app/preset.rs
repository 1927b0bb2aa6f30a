//! Windows to begin with in tests and demonstrations: the same state each
//! time, without settings, files or a display.

use std::path::Path;

use super::desk::Desk;
use super::dialog::{Answer, Ask, Dialog};
use super::{Error, Window};
use crate::notebook::cell::{Content, Field};
use crate::notebook::{Cell, Kind, Notebook};
use crate::store::file;
use crate::store::template::{self, Template};

/// Returns the window on the demo, with its bounds drawn.
///
/// # Panics
///
/// Never: the demo is a notebook, which a test proves.
#[must_use]
pub fn demo() -> Window {
    on_template(template::DEMO)
}

/// Returns the window on the demo as it opens: its bounds are still to be
/// drawn.
///
/// # Panics
///
/// Never: the demo is a notebook, which a test proves.
#[must_use]
pub fn unsettled_demo() -> Window {
    let desk = Desk::from_template(template::DEMO).expect("every template is a notebook");
    Window::alone(desk).0
}

/// Returns the window on a template, with its bounds drawn.
///
/// # Panics
///
/// Never: every template is a notebook, which a test proves.
#[must_use]
pub fn on_template(template: &Template) -> Window {
    settled(Desk::from_template(template).expect("every template is a notebook"))
}

/// Returns the window on an empty notebook.
///
/// # Panics
///
/// Never: an empty notebook has no names to be wrong.
#[must_use]
pub fn empty() -> Window {
    settled(Desk::new(Notebook::default()).expect("nothing is wrong with nothing"))
}

/// Returns the window on a notebook of `count` values, each of which feeds the
/// next.
///
/// # Panics
///
/// Never: the names are made to be legal.
#[must_use]
pub fn chain(count: usize) -> Window {
    let cells = (0..count)
        .map(|at| match at {
            0 => Cell::new(Kind::Value, "link_0").with("entry", "1 m"),
            _ => Cell::new(Kind::Formula, format!("link_{at}"))
                .with("entry", format!("link_{} + 1 mm", at - 1)),
        })
        .collect();
    let notebook = Notebook {
        title: Some(format!("{count} links")),
        cells,
        ..Notebook::default()
    };
    settled(Desk::new(notebook).expect("the names are legal"))
}

/// Returns the window on a works of `count` cells: furnace doors along a wall,
/// all at one temperature, with people in front of them, the limits that judge
/// on them, zones, curves, and values with formulas. Its bounds are still to be
/// drawn.
///
/// # Panics
///
/// Never: the names are made to be legal.
#[must_use]
pub fn works(count: usize) -> Window {
    let mut cells = vec![Cell::new(Kind::Value, "t_hearth").with("entry", "1250 ± 25 °C")];
    // Doors are few beside people, and people beside figures.
    let doors = (count / 100).clamp(1, 8);
    for door in 0..doors {
        cells.push(
            Cell::new(Kind::Source, format!("door_{door}"))
                .with("form", "opening")
                .with("outline", "rectangle")
                .with("width", "0.9 m")
                .with("height", "0.7 m")
                .with("temperature", "t_hearth")
                .with("emissivity", "0.95 ± 0.03")
                .with("x", format!("{} m", 6 * door))
                .with("z", "1.2 m"),
        );
        cells.push(
            Cell::new(Kind::Zone, format!("eye_line_{door}"))
                .with("from", format!("door_{door}"))
                .with("guidance", "icnirp-2013-ir-eye")
                .with("stay", "8 h"),
        );
    }
    cells.push(
        Cell::new(Kind::Curve, "falloff")
            .with("from", "door_0")
            .with("nearest", "0.5 m")
            .with("farthest", "20 m"),
    );
    for at in 0.. {
        if cells.len() >= count {
            break;
        }
        let cell = match at % 10 {
            0 => Cell::new(Kind::Position, format!("person_{at}"))
                .with("from", format!("door_{}", at / 10 % doors))
                .with("distance", format!("{} m", 2 + at / 10 % 17))
                .with("stay", "4 min"),
            1 => {
                let mut cell = Cell::new(Kind::Assessment, format!("judged_{at}"))
                    .with("position", format!("person_{}", at - 1));
                let guidance = vec!["icnirp-2013-ir-eye".to_owned(), "pain-time".to_owned()];
                cell.fields
                    .push(Field::new("guidance", Content::List(guidance)));
                cell
            }
            2 => Cell::new(Kind::Value, format!("figure_{at}")).with("entry", "2.5 m"),
            _ => Cell::new(Kind::Formula, format!("figure_{at}"))
                .with("entry", format!("figure_{} * 1.01", at - 1)),
        };
        cells.push(cell);
    }
    let notebook = Notebook {
        title: Some(format!("A works of {count} cells")),
        cells,
        ..Notebook::default()
    };
    Window::alone(Desk::new(notebook).expect("the names are legal")).0
}

/// Returns the window on a file.
///
/// # Errors
///
/// [`Error`] where it cannot be read or is no notebook.
pub fn on_file(path: &Path) -> Result<Window, Error> {
    Desk::open(path).map(settled)
}

/// Returns a window whose dialog for files answers by itself.
#[must_use]
pub fn answering(
    mut window: Window,
    answer: impl Fn(&Ask) -> Answer + Send + Sync + 'static,
) -> Window {
    window.dialog = Dialog::answering(answer);
    window
}

/// Returns a window on whose disk there is no room for one byte more.
#[must_use]
pub fn on_a_full_disk(mut window: Window) -> Window {
    window.writer = |path, _| {
        Err(file::Error::Io {
            doing: file::Doing::Write,
            path: path.to_owned(),
            source: std::io::ErrorKind::StorageFull.into(),
        })
    };
    window
}

/// Returns a window that keeps its settings in a file.
#[must_use]
pub fn remembering(mut window: Window, place: &Path) -> Window {
    window.settings = Some(place.to_owned());
    window
}

fn settled(mut desk: Desk) -> Window {
    desk.settle();
    Window::alone(desk).0
}
