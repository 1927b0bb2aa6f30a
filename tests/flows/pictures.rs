//! The whole window as a picture, per theme: a picture that is missing fails.
//!
//! `FARGLOW_NEW_PICTURES=1 cargo test --test flows pictures` makes them anew,
//! and fails so that somebody looks at the PNG files under `target` first.

use std::path::Path;

use farglow::app::{Window, preset};
use iced::keyboard::key::Named;
use iced::keyboard::{Key, Modifiers};

use crate::desk::Desk;

fn holds(name: &str, window: Window, before: impl FnOnce(&mut Desk)) {
    let mut desk = Desk::new(window);
    before(&mut desk);
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/flows/pictures");
    let stored = path.join(format!("{name}-tiny-skia.sha256"));
    if std::env::var_os("FARGLOW_NEW_PICTURES").is_some() {
        let _ = std::fs::remove_file(&stored);
        let seen = Path::new(env!("CARGO_TARGET_TMPDIR")).join(name);
        let _ = std::fs::remove_file(seen.with_file_name(format!("{name}-tiny-skia.png")));
        let snapshot = desk.snapshot();
        let made = [
            snapshot.matches_hash(path.join(name)),
            snapshot.matches_image(&seen),
        ];
        panic!(
            "{made:?}: made anew, look at {}-tiny-skia.png",
            seen.display()
        );
    }
    // A picture that is not there would be made, and would pass.
    assert!(stored.exists(), "{} is missing", stored.display());
    let matches = desk
        .snapshot()
        .matches_hash(path.join(name))
        .expect("the picture can be read");
    assert!(matches, "{name} looks otherwise than {}", stored.display());
}

#[test]
fn the_demo_looks_as_it_did_in_the_light_theme() {
    holds("light", preset::demo(), |_| {});
}

#[test]
fn the_demo_looks_as_it_did_in_the_dark_theme() {
    holds("dark", preset::demo(), |desk| {
        desk.press(Key::Named(Named::F8), Modifiers::empty());
    });
}

#[test]
fn the_demo_looks_as_it_did_in_high_contrast() {
    holds("contrast", preset::demo(), |desk| {
        desk.press(Key::Named(Named::F8), Modifiers::empty());
        desk.press(Key::Named(Named::F8), Modifiers::empty());
    });
}
