//! Windows to begin with in tests and demonstrations: the same state each
//! time, without settings, files or a display.

use std::path::Path;

use super::desk::Desk;
use super::dialog::{Answer, Ask, Dialog};
use super::{Error, Window};
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
