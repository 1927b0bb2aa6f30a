//! What the disk and other people do to files while they are open, and the
//! system's dialog for files.

use std::fs;
use std::path::{Path, PathBuf};
use std::sync::{Arc, Mutex};

use farglow::app::dialog::{Answer, Ask, Purpose};
use farglow::app::{self, preset};
use farglow::notebook::Notebook;
use farglow::store::{schema, template};

use crate::desk::Desk;

const OTHER: &str = "{\"farglow\": 1, \"title\": \"theirs\", \"cells\": []}";

fn folder() -> tempfile::TempDir {
    tempfile::tempdir().expect("a folder can be made")
}

fn demo_in(folder: &Path) -> PathBuf {
    let path = folder.join("door.farglow");
    fs::write(&path, template::DEMO.text).expect("the folder is writable");
    path
}

fn on(path: &Path) -> Desk {
    Desk::tall(preset::on_file(path).expect("it is a notebook"))
}

fn read(path: &Path) -> String {
    fs::read_to_string(path).expect("it is there")
}

/// A window whose dialog gives this answer, and what it was asked.
fn answering(window: app::Window, answer: Answer) -> (Desk, Arc<Mutex<Vec<Ask>>>) {
    let asked = Arc::new(Mutex::new(Vec::new()));
    let heard = Arc::clone(&asked);
    let window = preset::answering(window, move |ask| {
        heard
            .lock()
            .expect("no test panics while it holds this")
            .push(ask.clone());
        answer.clone()
    });
    (Desk::tall(window), asked)
}

#[test]
fn a_machine_without_a_dialog_says_so_and_the_path_can_be_typed() {
    let folder = folder();
    let file = demo_in(folder.path());
    let missing = Answer::Missing("no session bus answers");
    let (mut desk, _) = answering(preset::empty(), missing);
    desk.command('o');
    for button in ["look for a file to open", "look for a place to save"] {
        desk.click_and_wait(button);
        desk.expect(
            "this machine has no dialog for files (no session bus answers): type the path instead",
        );
    }
    desk.type_into(app::PATH, "", &file.display().to_string());
    desk.click("open it");
    assert!(desk.notebook().find("charger").is_some());
    desk.command('p');
    desk.click_and_wait("look for a place");
    desk.expect("this machine has no dialog for files");
}

#[test]
fn the_file_that_the_dialog_gives_is_opened() {
    let folder = folder();
    let file = demo_in(folder.path());
    let (mut desk, asked) = answering(preset::empty(), Answer::Chosen(file.clone()));
    desk.command('o');
    desk.click_and_wait("look for a file to open");
    assert!(desk.notebook().find("charger").is_some());
    let asked = asked.lock().expect("no test panics while it holds this");
    assert_eq!(asked.len(), 1);
    assert_eq!(asked[0].purpose, Purpose::Open);
}

#[test]
fn the_dialog_opens_nothing_over_changes_without_a_question() {
    let folder = folder();
    let file = demo_in(folder.path());
    let (mut desk, _) = answering(preset::chain(2), Answer::Chosen(file));
    desk.change("1 m", "2 m");
    desk.command('o');
    desk.click_and_wait("look for a file to open");
    desk.expect("There are changes that no file holds");
    assert_eq!(desk.text("link_0", "entry"), Some("2 m"));
}

#[test]
fn a_dialog_that_is_left_changes_nothing() {
    let (mut desk, _) = answering(preset::demo(), Answer::Left);
    desk.command('o');
    desk.click_and_wait("look for a file to open");
    desk.expect("no file was chosen; its path can be typed as well");
    assert!(desk.notebook().find("charger").is_some());
}

#[test]
fn notebook_and_worksheet_go_where_the_dialog_says() {
    let folder = folder();
    let place = folder.path().join("new");
    let (mut desk, asked) = answering(preset::demo(), Answer::Chosen(place.clone()));
    desk.command('o');
    desk.click_and_wait("look for a place to save");
    assert_eq!(read(&place.with_extension("farglow")), template::DEMO.text);
    desk.expect("saved");
    desk.command('p');
    desk.click_and_wait("look for a place");
    desk.expect("DRAFT)");
    let pdf = fs::read(place.with_extension("pdf")).expect("it was written");
    assert!(pdf.starts_with(b"%PDF"), "{} bytes", pdf.len());
    let asked = asked.lock().expect("no test panics while it holds this");
    let purposes: Vec<Purpose> = asked.iter().map(|ask| ask.purpose).collect();
    assert_eq!(purposes, [Purpose::Save, Purpose::Worksheet]);
    // The sheet's place is asked for beside the notebook that was just saved.
    assert_eq!(
        asked[1].near.as_deref(),
        Some(place.with_extension("pdf").as_path())
    );
}

#[test]
fn a_file_that_changed_meanwhile_is_noticed_and_can_be_taken() {
    let folder = folder();
    let file = demo_in(folder.path());
    let mut desk = on(&file);
    desk.comes_back();
    desk.expect_not("was changed by somebody else");
    fs::write(&file, OTHER).expect("it is writable");
    desk.comes_back();
    desk.expect("was changed by somebody else since it was opened");
    desk.expect_not("loses the changes made here");
    desk.click("take the one on disk");
    assert_eq!(desk.notebook().title.as_deref(), Some("theirs"));
    desk.expect("the notebook is now the one on the disk");
    desk.comes_back();
    desk.expect_not("was changed by somebody else");
}

#[test]
fn mine_is_kept_and_replaces_theirs_when_it_is_saved() {
    let folder = folder();
    let file = demo_in(folder.path());
    let mut desk = on(&file);
    desk.change("2.5 m", "3 m");
    fs::write(&file, OTHER).expect("it is writable");
    desk.comes_back();
    desk.expect("Taking that one loses the changes made here");
    desk.click("keep mine");
    // It is asked once, and what is on the desk is in no file.
    desk.comes_back();
    desk.expect_not("was changed by somebody else");
    desk.expect("not saved");
    desk.command('z');
    desk.expect("not saved");
    assert_eq!(read(&file), OTHER);
    desk.command('s');
    assert_eq!(read(&file), template::DEMO.text);
    desk.expect_not("not saved");
}

#[test]
fn mine_is_saved_under_another_name_beside_theirs() {
    let folder = folder();
    let file = demo_in(folder.path());
    let mut desk = on(&file);
    desk.change("2.5 m", "3 m");
    fs::write(&file, OTHER).expect("it is writable");
    desk.command('s');
    desk.expect("was changed by somebody else since it was opened");
    desk.click("save under another name");
    desk.expect("type another path, and save there");
    let old = file.display().to_string();
    let other = folder.path().join("mine.farglow");
    desk.type_into(app::PATH, &old, &other.display().to_string());
    desk.click("save here");
    assert!(read(&other).contains("\"entry\": \"3 m\""));
    assert_eq!(read(&file), OTHER);
    desk.comes_back();
    desk.expect_not("was changed by somebody else");
}

#[test]
fn a_file_that_was_only_touched_is_the_same() {
    let folder = folder();
    let file = demo_in(folder.path());
    let mut desk = on(&file);
    let text = read(&file);
    fs::write(&file, text).expect("it is writable");
    desk.comes_back();
    desk.expect_not("was changed by somebody else");
}

#[test]
fn a_file_that_vanished_is_noticed_and_written_again() {
    let folder = folder();
    let file = demo_in(folder.path());
    let mut desk = on(&file);
    fs::remove_file(&file).expect("it is there");
    desk.comes_back();
    desk.expect("is no longer on the disk. What is on the desk is whole.");
    desk.click("leave it so");
    desk.expect("not saved");
    desk.comes_back();
    desk.expect_not("is no longer on the disk");
    desk.command('s');
    assert_eq!(read(&file), template::DEMO.text);
    fs::remove_file(&file).expect("it is there");
    desk.comes_back();
    desk.click("write it again");
    assert_eq!(read(&file), template::DEMO.text);
}

#[test]
fn a_damaged_or_newer_file_on_the_disk_is_said_and_mine_stays() {
    for (text, said) in [
        ("{\"farglow\": 1, \"cells\": [", "line 1"),
        ("{\"farglow\": 2, \"cells\": []}", "newer program"),
    ] {
        let folder = folder();
        let file = demo_in(folder.path());
        let mut desk = on(&file);
        desk.change("2.5 m", "3 m");
        fs::write(&file, text).expect("it is writable");
        desk.comes_back();
        desk.click("take the one on disk");
        desk.expect(said);
        assert_eq!(desk.text("charger", "distance"), Some("3 m"));
        assert_eq!(read(&file), text);
        desk.expect("not saved");
    }
}

#[test]
fn a_full_disk_is_said_and_nothing_is_lost() {
    let folder = folder();
    let file = demo_in(folder.path());
    let window = preset::on_file(&file).expect("it is a notebook");
    let mut desk = Desk::tall(preset::on_a_full_disk(window));
    desk.change("2.5 m", "3 m");
    desk.command('s');
    desk.expect("the disk is full, make room or save elsewhere");
    desk.expect("what was there before is unchanged");
    desk.expect("not saved");
    assert_eq!(desk.text("charger", "distance"), Some("3 m"));
    assert_eq!(read(&file), template::DEMO.text);
    desk.command('p');
    desk.click("write the draft");
    desk.expect("the disk is full");
    assert!(!file.with_extension("pdf").exists());
}

#[test]
fn saving_onto_another_file_asks_first() {
    let folder = folder();
    let file = demo_in(folder.path());
    let other = folder.path().join("other.farglow");
    fs::write(&other, OTHER).expect("the folder is writable");
    let mut desk = on(&file);
    desk.command('o');
    let old = file.display().to_string();
    desk.type_into(app::PATH, &old, &other.display().to_string());
    desk.click("save here");
    desk.expect("is there already. Saving replaces what is in it now.");
    desk.click("stay");
    assert_eq!(read(&other), OTHER);
    desk.click("save here");
    desk.click("replace it");
    assert_eq!(read(&other), template::DEMO.text);
}

#[test]
fn a_worksheet_that_is_there_is_not_replaced_without_a_question() {
    let folder = folder();
    let file = demo_in(folder.path());
    let sheet = folder.path().join("door.pdf");
    fs::write(&sheet, "signed").expect("the folder is writable");
    let mut desk = on(&file);
    desk.command('p');
    desk.click("write the draft");
    desk.expect("is there already. Writing the worksheet replaces it.");
    desk.click("stay");
    assert_eq!(read(&sheet), "signed");
    desk.click("write the draft");
    desk.click("replace it");
    desk.expect("DRAFT)");
    assert!(fs::read(&sheet).is_ok_and(|pdf| pdf.starts_with(b"%PDF")));
    // One's own sheet of a moment ago is.
    desk.click("write the draft");
    desk.expect_not("is there already");
}

#[test]
fn an_empty_notebook_is_saved_opened_and_printed() {
    let folder = folder();
    let file = folder.path().join("empty.farglow");
    let mut desk = Desk::tall(preset::empty());
    desk.command('s');
    desk.type_into(app::PATH, "", &file.display().to_string());
    desk.click("save here");
    let mut desk = on(&file);
    desk.expect("This notebook is empty");
    assert!(desk.notebook().cells.is_empty());
    desk.command('p');
    desk.click("write the draft");
    desk.expect("DRAFT)");
}

#[test]
fn a_notebook_of_five_thousand_cells_is_opened_changed_and_saved() {
    let folder = folder();
    let file = folder.path().join("many.farglow");
    let cells = preset::chain(5000).notebook().cells.clone();
    let notebook = Notebook {
        cells,
        ..Notebook::default()
    };
    fs::write(&file, schema::write(&notebook)).expect("the folder is writable");
    let mut desk = Desk::new(preset::on_file(&file).expect("it is a notebook"));
    let shown = desk.shown();
    assert!(shown.len() < 400, "{} texts are built", shown.len());
    desk.click("1 m");
    desk.paste("2 m");
    desk.expect("not saved");
    desk.command('s');
    assert!(read(&file).contains("\"entry\": \"2 m\""));
    // Every link follows: the last is 4999 mm beyond the first.
    let last = desk.window.result("link_4999", "value");
    let wanted = 2.0 + 4.999;
    assert!(
        last.is_some_and(|si| (si - wanted).abs() < 1e-9),
        "{last:?}, wanted {wanted}"
    );
}
