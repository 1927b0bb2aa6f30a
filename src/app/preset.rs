//! Windows to begin with in tests and demonstrations: the same state each
//! time, without settings, files or a display.

use std::path::Path;

use super::desk::Desk;
use super::{Error, Window};
use crate::notebook::{Cell, Kind, Notebook};
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

fn settled(mut desk: Desk) -> Window {
    desk.settle();
    Window::alone(desk).0
}
