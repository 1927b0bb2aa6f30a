//! Cells under the hand: typed into, renamed, moved, copied, removed, taken
//! back.

use farglow::app::{self, preset};
use iced::keyboard::key::Named;
use iced::keyboard::{Key, Modifiers};

use crate::desk::{Desk, named};

#[test]
fn a_distance_that_is_typed_changes_the_finding_and_undo_takes_it_back() {
    let mut desk = Desk::tall(preset::demo());
    desk.expect("planned 4 min, limit reached after 3 s: no planned stay");
    desk.change("2.5 m", "14 m");
    assert_eq!(desk.text("charger", "distance"), Some("14 m"));
    desk.expect_not("limit reached after 3 s");
    // One field, one change: however many letters it took.
    desk.click("Undo change distance of cha…");
    desk.window.settle();
    assert_eq!(desk.text("charger", "distance"), Some("2.5 m"));
    desk.expect("limit reached after 3 s: no planned stay");
    desk.press(
        Key::Character("z".into()),
        Modifiers::COMMAND | Modifiers::SHIFT,
    );
    assert_eq!(desk.text("charger", "distance"), Some("14 m"));
}

#[test]
fn figures_without_bounds_are_never_shown_as_a_finding() {
    let mut desk = Desk::tall(preset::demo());
    desk.click("2.5 m");
    desk.type_into(app::TYPING, "2.5 m", "14 m");
    // The bounds are drawn off this thread, and none has come back.
    desk.expect("being worked out:");
    desk.expect("nominally");
    desk.expect_not("planned 4 min, limit reached");
    desk.window.settle();
    desk.expect_not("being worked out");
}

#[test]
fn a_fault_is_stored_and_told_at_its_character_and_those_who_wait_say_so() {
    let mut desk = Desk::tall(preset::demo());
    desk.click("1250 ± 25 °C");
    desk.type_into(app::TYPING, "1250 ± 25 °C", "1250,5 °C");
    assert_eq!(desk.text("t_hearth", "entry"), Some("1250,5 °C"));
    desk.expect("character 5");
    desk.expect("waiting for t_hearth");
    // No number of before stands beside the fault.
    desk.expect_not("312 kW/m²");
    desk.command('z');
    desk.window.settle();
    assert_eq!(desk.text("t_hearth", "entry"), Some("1250 ± 25 °C"));
    desk.expect("312 kW/m²");
}

#[test]
fn a_long_entry_is_told_and_kept() {
    let mut desk = Desk::tall(preset::chain(1));
    desk.click("1 m");
    let long = "1 + ".repeat(260);
    desk.type_into(app::TYPING, "1 m", "2");
    // Pasted as one piece, as a person would.
    desk.paste(&long);
    let stored = desk.text("link_0", "entry").map(str::len);
    assert_eq!(stored, Some(long.len()));
    desk.expect("1000");
}

#[test]
fn a_cell_is_renamed_and_every_mention_follows() {
    let mut desk = Desk::tall(preset::demo());
    desk.click("t_hearth is".split(' ').next().unwrap_or_default());
    desk.press(Key::Named(Named::F2), Modifiers::empty());
    desk.type_into(app::TYPING, "t_hearth", "door");
    desk.keys_into(app::TYPING, &[named(Named::Enter)]);
    desk.expect("which another cell has");
    assert_eq!(desk.text("door", "temperature"), Some("t_hearth"));
    desk.type_into(app::TYPING, "door", "bath");
    desk.keys_into(app::TYPING, &[named(Named::Enter)]);
    assert_eq!(desk.text("door", "temperature"), Some("bath"));
    desk.command('z');
    assert_eq!(desk.text("door", "temperature"), Some("t_hearth"));
}

#[test]
fn cells_are_moved_copied_and_removed_from_the_keyboard() {
    let mut desk = Desk::tall(preset::chain(3));
    let names = |desk: &Desk| -> Vec<String> {
        desk.notebook()
            .cells
            .iter()
            .map(|cell| cell.name.clone())
            .collect()
    };
    let none = Modifiers::empty();
    desk.press(Key::Named(Named::ArrowDown), none);
    desk.press(Key::Named(Named::ArrowDown), Modifiers::ALT);
    assert_eq!(names(&desk), ["link_1", "link_0", "link_2"]);
    desk.command('d');
    assert_eq!(names(&desk), ["link_1", "link_0", "link_3", "link_2"]);
    // The copy is selected, so that is what goes.
    desk.press(Key::Named(Named::Delete), none);
    assert_eq!(names(&desk), ["link_1", "link_0", "link_2"]);
    for _ in 0..3 {
        desk.command('z');
    }
    assert_eq!(names(&desk), ["link_0", "link_1", "link_2"]);
}

#[test]
fn the_keyboard_opens_each_field_in_turn_and_leaves() {
    let mut desk = Desk::tall(preset::demo());
    let none = Modifiers::empty();
    desk.press(Key::Named(Named::ArrowDown), none);
    desk.press(Key::Named(Named::ArrowDown), none);
    desk.press(Key::Named(Named::Tab), none);
    desk.type_into(app::TYPING, "1250 ± 25 °C", "1300 °C");
    assert_eq!(desk.text("t_hearth", "entry"), Some("1300 °C"));
    desk.press(Key::Named(Named::Escape), none);
    desk.press(Key::Named(Named::Delete), none);
    assert!(desk.notebook().find("t_hearth").is_none());
}

#[test]
fn guidance_and_basis_are_chosen_by_a_click() {
    let mut desk = Desk::tall(preset::demo());
    desk.click("1250 ± 25 °C");
    desk.click("nameplate");
    assert_eq!(desk.text("t_hearth", "basis"), Some("nameplate"));
    desk.click("charger_limits");
    desk.click("eu-2006-25-m, eu-2006-25-o, icnirp-2013-ir-eye, icnirp-2013-skin, pain-time");
    desk.click("pain-time");
    let place = desk.notebook().find("charger_limits").expect("it is there");
    assert_eq!(
        desk.notebook().cells[place].texts("guidance"),
        [
            "eu-2006-25-m",
            "eu-2006-25-o",
            "icnirp-2013-ir-eye",
            "icnirp-2013-skin"
        ]
    );
}

#[test]
fn a_number_that_is_none_is_kept_under_the_hand_and_not_stored() {
    let mut desk = Desk::tall(preset::demo());
    desk.click("falloff");
    desk.click("60");
    desk.type_into(app::TYPING, "60", "x");
    desk.expect("expected a whole number from 2 to 2000, found `x`");
    let place = desk.notebook().find("falloff").expect("it is there");
    let points = desk.notebook().cells[place].field("points");
    assert!(points.is_some(), "the last number stays: {points:?}");
}

#[test]
fn figures_are_shown_in_us_units_and_entries_stay_as_typed() {
    let mut desk = Desk::tall(preset::demo());
    desk.press(Key::Named(Named::F9), Modifiers::empty());
    // 1250 °C is 2282 °F.
    desk.expect("2282 °F");
    desk.expect("1250 ± 25 °C");
    desk.expect_not("312 kW/m²");
}

#[test]
fn a_cell_far_down_is_brought_into_view_and_takes_the_typing() {
    let mut desk = Desk::new(preset::chain(300));
    let _ = desk.window.update(farglow::app::Message::seen(0.0, 700.0));
    for _ in 0..200 {
        desk.press(Key::Named(Named::ArrowDown), Modifiers::empty());
    }
    desk.press(Key::Named(Named::Tab), Modifiers::empty());
    desk.expect("link_199");
    desk.paste("7 m");
    assert_eq!(desk.text("link_199", "entry"), Some("7 m"));
}
