//! Prose under the hand: typed over several lines, taken back, and one plain
//! line at rest.

use farglow::app::{self, preset};
use iced::keyboard::key::Named;
use iced::keyboard::{Key, Modifiers};

use crate::desk::Desk;

const NOTE: &str = "The charging door of furnace 2";

/// Opens the note of the demo.
fn open(desk: &mut Desk) -> String {
    let text = desk
        .text("about", "text")
        .expect("the demo has a note")
        .to_owned();
    let shown = desk.shown();
    let line = shown
        .iter()
        .find(|line| line.starts_with(NOTE))
        .expect("the note is shown")
        .clone();
    desk.click(&line);
    text
}

#[test]
fn a_note_is_typed_over_several_lines_and_taken_back_as_one_change() {
    let mut desk = Desk::tall(preset::demo());
    let before = open(&mut desk);
    desk.write_prose(
        app::TYPING,
        "\nThe foreman holds the key.\n\nAsk at the gate.",
    );
    let after = format!("{before}\nThe foreman holds the key.\n\nAsk at the gate.");
    assert_eq!(desk.text("about", "text"), Some(after.as_str()));
    // Prose draws no bounds anew, and one change has one name.
    desk.expect("Undo change about");
    desk.command('z');
    assert_eq!(desk.text("about", "text"), Some(before.as_str()));
    // What is typed next is typed into what is stored now.
    desk.write_prose(app::TYPING, " Again.");
    let again = format!("{before} Again.");
    assert_eq!(desk.text("about", "text"), Some(again.as_str()));
    desk.press(Key::Named(Named::Escape), Modifiers::empty());
    assert_eq!(desk.text("about", "text"), Some(again.as_str()));
}

#[test]
fn a_note_at_rest_is_one_line_and_whole_where_it_is_selected() {
    let mut desk = Desk::tall(preset::demo());
    let at_rest = desk.shown();
    let line = at_rest
        .iter()
        .find(|line| line.starts_with(NOTE))
        .expect("the note is shown");
    assert!(line.ends_with('…'), "{line}");
    desk.press(Key::Named(Named::ArrowDown), Modifiers::empty());
    desk.expect("confirmed for your own door.");
}

#[test]
fn a_remark_on_an_input_has_lines_and_is_taken_back_as_one_change() {
    let mut desk = Desk::tall(preset::demo());
    desk.click("1250 ± 25 °C");
    desk.write_prose(app::REMARK, "\nagain on 2 May");
    assert_eq!(
        desk.text("t_hearth", "note"),
        Some("two-colour pyrometer, door open\nagain on 2 May")
    );
    desk.command('z');
    assert_eq!(
        desk.text("t_hearth", "note"),
        Some("two-colour pyrometer, door open")
    );
    desk.click("0.90 m");
    desk.write_prose(app::REMARK, ", by two people");
    let width = |desk: &Desk| {
        let place = desk.notebook().find("door").expect("the demo has a door");
        let cell = &desk.notebook().cells[place];
        cell.field("width").and_then(|field| field.note.clone())
    };
    assert_eq!(
        width(&desk).as_deref(),
        Some("clear opening, taped, by two people")
    );
    desk.command('z');
    assert_eq!(width(&desk).as_deref(), Some("clear opening, taped"));
}

#[test]
fn a_note_that_is_emptied_comes_back_by_undo() {
    let mut desk = Desk::tall(preset::demo());
    let before = open(&mut desk);
    desk.paste("");
    assert_eq!(desk.text("about", "text"), None);
    desk.command('z');
    assert_eq!(desk.text("about", "text"), Some(before.as_str()));
}
