//! The line between the cells and the drawing: dragged, moved with keys, and
//! remembered.

use std::fs;

use farglow::app::preset;
use farglow::store::settings;
use iced::Point;
use iced::keyboard::key::Named;
use iced::keyboard::{Key, Modifiers};

use crate::desk::Desk;

/// Where the line stands at first.
const LINE: Point = Point::new(431.5, 400.0);

#[test]
fn the_cells_are_drawn_wider_and_neither_side_is_lost() {
    let folder = tempfile::tempdir().expect("a folder can be made");
    let place = folder.path().join("window.json");
    for (to, expected) in [(631.5, 628.0), (5.0, 320.0), (1438.0, 1040.0)] {
        let mut desk = Desk::new(preset::remembering(preset::demo(), &place));
        desk.drag(LINE, Point::new(to, 500.0));
        let (kept, said) = settings::load(&place);
        assert_eq!(said, None);
        assert!(
            (kept.cells - expected).abs() < 0.01,
            "drawn to {to}: {}, wanted {expected}",
            kept.cells
        );
        // Cards and drawing are both still there.
        desk.expect("2.5 m");
        desk.expect("Rest the pointer on the plot");
    }
}

#[test]
fn the_line_moves_with_keys_and_is_where_it_was_left() {
    let folder = tempfile::tempdir().expect("a folder can be made");
    let place = folder.path().join("window.json");
    let mut desk = Desk::new(preset::remembering(preset::demo(), &place));
    for (key, expected) in [
        (Named::ArrowRight, 452.0),
        (Named::ArrowRight, 476.0),
        (Named::ArrowLeft, 452.0),
    ] {
        desk.press(Key::Named(key), Modifiers::ALT);
        let kept = settings::load(&place).0.cells;
        assert!((kept - expected).abs() < 0.01, "{kept}, wanted {expected}");
    }
    let text = fs::read_to_string(&place).expect("it was written");
    assert!(text.contains("\"cells\": 452"), "{text}");
}

#[test]
fn a_click_elsewhere_moves_no_line() {
    let folder = tempfile::tempdir().expect("a folder can be made");
    let place = folder.path().join("window.json");
    let mut desk = Desk::new(preset::remembering(preset::demo(), &place));
    desk.drag(Point::new(440.0, 400.0), Point::new(700.0, 400.0));
    assert!(!place.exists(), "nothing was remembered");
}
