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
    // A list is broken between its words, each of which opens it.
    desk.click("icnirp-2013-skin,");
    let guidance = |desk: &Desk| -> Vec<String> {
        let place = desk.notebook().find("charger_limits").expect("it is there");
        let texts = desk.notebook().cells[place].texts("guidance");
        texts.into_iter().map(str::to_owned).collect()
    };
    let before = guidance(&desk);
    desk.click("eu-2006-25-n");
    let mut with = before.clone();
    with.push("eu-2006-25-n".to_owned());
    assert_eq!(guidance(&desk), with);
    // The choices stand below the words of the list.
    desk.click_last("eu-2006-25-n");
    assert_eq!(guidance(&desk), before);
}

#[test]
fn a_number_that_is_none_is_kept_under_the_hand_and_not_stored() {
    let mut desk = Desk::tall(preset::demo());
    desk.click("falloff");
    desk.click("60");
    desk.type_into(app::TYPING, "60", "x");
    desk.expect("expected a whole number from 2 to 2000, found `x`");
    let place = desk.notebook().find("falloff").expect("it is there");
    // The number was emptied first, and is left out until there is another.
    let points = desk.notebook().cells[place].field("points");
    assert!(points.is_none(), "{points:?}");
    desk.type_into(app::TYPING, "x", "40");
    let points = &desk.notebook().cells[place]
        .field("points")
        .map(|field| &field.content);
    assert_eq!(
        *points,
        Some(&farglow::notebook::cell::Content::Count(40.0))
    );
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

#[test]
fn what_is_chosen_is_never_typed() {
    let mut desk = Desk::tall(preset::demo());
    let before = desk.notebook().clone();
    desk.click("charger_limits");
    desk.click("icnirp-2013-skin,");
    desk.paste("nonsense");
    desk.click("opening");
    desk.paste("nonsense");
    assert_eq!(*desk.notebook(), before);
}

#[test]
fn a_number_that_is_emptied_is_left_out() {
    let mut desk = Desk::tall(preset::demo());
    desk.click("falloff");
    desk.click("60");
    desk.type_into(app::TYPING, "60", "");
    let place = desk.notebook().find("falloff").expect("it is there");
    assert_eq!(desk.notebook().cells[place].field("points"), None);
}

#[test]
fn an_entry_of_a_thousand_characters_is_shown_cut_at_rest_and_whole_when_selected() {
    let mut desk = Desk::tall(preset::chain(1));
    desk.click("1 m");
    let long = format!("1 m{}", " + 1 mm".repeat(142));
    assert_eq!(long.chars().count(), 997);
    desk.paste(&long);
    desk.window.settle();
    assert_eq!(desk.text("link_0", "entry"), Some(long.as_str()));
    desk.press(Key::Named(Named::Escape), Modifiers::empty());
    let words = |desk: &Desk| desk.shown().iter().filter(|text| *text == "mm").count();
    assert_eq!(words(&desk), 142);
    desk.press(Key::Named(Named::Escape), Modifiers::empty());
    assert!(words(&desk) < 30, "{}", words(&desk));
    assert!(desk.shown().iter().any(|text| text.ends_with('…')));
    // 1 m and 142 mm.
    desk.expect("1.142 m");
}

#[test]
fn figures_have_the_digits_that_they_need() {
    let mut desk = Desk::tall(preset::demo());
    // 0.90 m by 0.70 m.
    desk.expect("0.63 m²");
    desk.expect_not("0.6300");
    desk.press(Key::Named(Named::F9), Modifiers::empty());
    let long = |text: &String| {
        text.split(' ').any(|word| {
            word.chars().filter(char::is_ascii_digit).count() > 5 && word.parse::<f64>().is_ok()
        })
    };
    let shown = desk.shown();
    assert!(shown.iter().any(|text| text.ends_with(" ft")), "{shown:#?}");
    assert!(!shown.iter().any(long), "{shown:#?}");
}

#[test]
fn a_name_that_is_typed_is_given_when_another_cell_is_looked_at() {
    let mut desk = Desk::tall(preset::demo());
    desk.click("t_hearth");
    desk.press(Key::Named(Named::F2), Modifiers::empty());
    desk.type_into(app::TYPING, "t_hearth", "bath");
    desk.click("charger");
    assert_eq!(desk.text("door", "temperature"), Some("bath"));
    // One that is taken is said, and the old one stays.
    desk.press(Key::Named(Named::F2), Modifiers::empty());
    desk.type_into(app::TYPING, "charger", "door");
    desk.click("0.90 m");
    desk.expect("which another cell has");
    assert!(desk.notebook().find("charger").is_some());
}
