//! The keys: one table for what they do and for the list that is shown.

use iced::keyboard::key::Named;
use iced::keyboard::{Key, Modifiers};

/// What a key asks for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Wish {
    /// Show or hide the drawer with files.
    Open,
    /// Store the notebook in its file.
    Save,
    /// Store it in another file.
    SaveAs,
    /// Put the worksheet on paper.
    Print,
    /// Take the last change back.
    Undo,
    /// Make it again.
    Redo,
    /// Show what is left before issue.
    Left,
    /// Show the job block.
    Job,
    /// Show the cells that can be added.
    Add,
    /// Copy the selected cell.
    Duplicate,
    /// Remove it.
    Remove,
    /// Give it another name.
    Rename,
    /// Move it up.
    Raise,
    /// Move it down.
    Lower,
    /// Select the cell above.
    Above,
    /// Select the cell below.
    Below,
    /// Type into the first field of the selected cell.
    Enter,
    /// Go to the next field.
    Next,
    /// Go to the one before.
    Previous,
    /// Leave the field, the drawer or the selection.
    Leave,
    /// Everything larger.
    Larger,
    /// Everything smaller.
    Smaller,
    /// Everything at 100 %.
    Plain,
    /// The cells narrower, the drawing wider.
    Narrower,
    /// The cells wider, the drawing narrower.
    Wider,
    /// The next theme.
    Theme,
    /// The other system of units.
    Measure,
    /// Show this list.
    Keys,
    /// Close the window.
    Close,
}

/// A key with what it does.
#[derive(Clone, Copy, Debug)]
pub struct Shortcut {
    /// What it asks for.
    pub wish: Wish,
    /// How it is written in the list.
    pub keys: &'static str,
    /// What it does, in the list.
    pub about: &'static str,
    /// Whether it works while a field is open for typing.
    pub typing: bool,
}

const fn shortcut(wish: Wish, keys: &'static str, about: &'static str, typing: bool) -> Shortcut {
    Shortcut {
        wish,
        keys,
        about,
        typing,
    }
}

/// All of them, as they are listed.
pub const ALL: &[Shortcut] = &[
    shortcut(Wish::Open, "Ctrl O", "open a notebook or a template", true),
    shortcut(Wish::Save, "Ctrl S", "save", true),
    shortcut(Wish::SaveAs, "Ctrl Shift S", "save in another file", true),
    shortcut(Wish::Print, "Ctrl P", "put the worksheet on paper", true),
    shortcut(Wish::Left, "Ctrl L", "what is left before issue", true),
    shortcut(Wish::Job, "Ctrl J", "title and job", true),
    shortcut(Wish::Undo, "Ctrl Z", "take the last change back", true),
    shortcut(Wish::Redo, "Ctrl Shift Z", "make it again", true),
    shortcut(
        Wish::Add,
        "Ctrl N",
        "add a cell after the selected one",
        true,
    ),
    shortcut(Wish::Duplicate, "Ctrl D", "copy the selected cell", true),
    shortcut(
        Wish::Rename,
        "F2",
        "rename it, with every mention of it",
        true,
    ),
    shortcut(Wish::Remove, "Delete", "remove it", false),
    shortcut(Wish::Raise, "Alt Up", "move it up", true),
    shortcut(Wish::Lower, "Alt Down", "move it down", true),
    shortcut(Wish::Above, "Up", "select the cell above", false),
    shortcut(Wish::Below, "Down", "select the cell below", false),
    shortcut(
        Wish::Enter,
        "Enter",
        "type into the selected cell; keep what was typed",
        false,
    ),
    shortcut(Wish::Next, "Tab", "next field", true),
    shortcut(Wish::Previous, "Shift Tab", "field before", true),
    shortcut(Wish::Leave, "Esc", "leave the field, then the cell", true),
    shortcut(Wish::Larger, "Ctrl +", "everything larger", true),
    shortcut(Wish::Smaller, "Ctrl −", "everything smaller", true),
    shortcut(Wish::Plain, "Ctrl 0", "everything at 100 %", true),
    shortcut(Wish::Narrower, "Alt Left", "cells narrower", true),
    shortcut(Wish::Wider, "Alt Right", "cells wider", true),
    shortcut(Wish::Theme, "F8", "light, dark, high contrast", true),
    shortcut(Wish::Measure, "F9", "metric or US units", true),
    shortcut(Wish::Keys, "F1", "this list", true),
    shortcut(Wish::Close, "Ctrl Q", "close", true),
];

/// Returns what a key asks for, while a field is open for typing or not.
#[must_use]
pub fn wish(key: &Key, modifiers: Modifiers, typing: bool) -> Option<Wish> {
    let found = pressed(key, modifiers)?;
    let shortcut = ALL.iter().find(|shortcut| shortcut.wish == found)?;
    (shortcut.typing || !typing).then_some(found)
}

fn pressed(key: &Key, modifiers: Modifiers) -> Option<Wish> {
    let (command, shift, alt) = (modifiers.command(), modifiers.shift(), modifiers.alt());
    match key.as_ref() {
        Key::Named(named) => Some(match (named, command, shift, alt) {
            (Named::F1, false, ..) => Wish::Keys,
            (Named::F2, false, ..) => Wish::Rename,
            (Named::F8, false, ..) => Wish::Theme,
            (Named::F9, false, ..) => Wish::Measure,
            (Named::Delete, false, false, false) => Wish::Remove,
            (Named::ArrowUp, false, false, true) => Wish::Raise,
            (Named::ArrowDown, false, false, true) => Wish::Lower,
            (Named::ArrowLeft, false, false, true) => Wish::Narrower,
            (Named::ArrowRight, false, false, true) => Wish::Wider,
            (Named::ArrowUp, false, false, false) => Wish::Above,
            (Named::ArrowDown, false, false, false) => Wish::Below,
            (Named::Enter, false, false, false) => Wish::Enter,
            (Named::Tab, false, false, false) => Wish::Next,
            (Named::Tab, false, true, false) => Wish::Previous,
            (Named::Escape, ..) => Wish::Leave,
            _ => return None,
        }),
        Key::Character(text) if command && !alt => {
            Some(match (text.to_lowercase().as_str(), shift) {
                ("o", false) => Wish::Open,
                ("s", false) => Wish::Save,
                ("s", true) => Wish::SaveAs,
                ("p", false) => Wish::Print,
                ("l", false) => Wish::Left,
                ("j", false) => Wish::Job,
                ("z", false) => Wish::Undo,
                ("z", true) | ("y", false) => Wish::Redo,
                ("n", false) => Wish::Add,
                ("d", false) => Wish::Duplicate,
                ("+" | "=", _) => Wish::Larger,
                ("-" | "−", _) => Wish::Smaller,
                ("0", false) => Wish::Plain,
                ("q", false) => Wish::Close,
                _ => return None,
            })
        }
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_readme_lists_every_key() {
        let readme = include_str!("../../README.md");
        for shortcut in ALL {
            let row = format!("| {} | {} |", shortcut.keys, shortcut.about);
            assert!(readme.contains(&row), "no row `{row}` in README.md");
        }
    }

    #[test]
    fn each_wish_stands_once_in_the_list() {
        for (place, shortcut) in ALL.iter().enumerate() {
            for other in &ALL[place + 1..] {
                assert_ne!(shortcut.wish, other.wish, "{}", shortcut.about);
                assert_ne!(shortcut.keys, other.keys, "{}", shortcut.about);
            }
        }
    }

    #[test]
    fn the_keys_that_are_listed_are_the_keys_that_work() {
        for shortcut in ALL {
            let mut modifiers = Modifiers::empty();
            let mut key = None;
            for word in shortcut.keys.split(' ') {
                match word {
                    "Ctrl" => modifiers |= Modifiers::COMMAND,
                    "Shift" => modifiers |= Modifiers::SHIFT,
                    "Alt" => modifiers |= Modifiers::ALT,
                    "Up" => key = Some(Key::Named(Named::ArrowUp)),
                    "Left" => key = Some(Key::Named(Named::ArrowLeft)),
                    "Right" => key = Some(Key::Named(Named::ArrowRight)),
                    "Down" => key = Some(Key::Named(Named::ArrowDown)),
                    "Tab" => key = Some(Key::Named(Named::Tab)),
                    "Enter" => key = Some(Key::Named(Named::Enter)),
                    "Esc" => key = Some(Key::Named(Named::Escape)),
                    "Delete" => key = Some(Key::Named(Named::Delete)),
                    "F1" => key = Some(Key::Named(Named::F1)),
                    "F2" => key = Some(Key::Named(Named::F2)),
                    "F8" => key = Some(Key::Named(Named::F8)),
                    "F9" => key = Some(Key::Named(Named::F9)),
                    letter => key = Some(Key::Character(letter.to_lowercase().into())),
                }
            }
            let key = key.unwrap_or_else(|| panic!("{}: no key", shortcut.keys));
            assert_eq!(
                wish(&key, modifiers, false),
                Some(shortcut.wish),
                "{}",
                shortcut.keys
            );
            assert_eq!(
                wish(&key, modifiers, true).is_some(),
                shortcut.typing,
                "{}",
                shortcut.keys
            );
        }
    }
}
