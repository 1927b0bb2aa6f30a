//! Files under the hand: opened, stored, guarded, and all that can be wrong
//! with them.

use std::fs;
use std::path::Path;

use farglow::app::{self, preset};
use farglow::store::template;
use iced::keyboard::key::Named;

use crate::desk::{Desk, named};

fn folder() -> tempfile::TempDir {
    tempfile::tempdir().expect("a folder can be made")
}

fn on(path: &Path) -> Desk {
    Desk::tall(preset::on_file(path).expect("it is a notebook"))
}

fn demo_in(folder: &Path) -> std::path::PathBuf {
    let path = folder.join("door.farglow");
    fs::write(&path, template::DEMO.text).expect("the folder is writable");
    path
}

/// Types a path into the drawer with files, which is open.
fn path(desk: &mut Desk, old: &str, path: &Path) {
    desk.type_into(app::PATH, old, &path.display().to_string());
}

#[test]
fn what_is_saved_is_what_was_typed() {
    let folder = folder();
    let path = demo_in(folder.path());
    let mut desk = on(&path);
    desk.expect("saved");
    desk.change("2.5 m", "3 m");
    desk.expect("not saved");
    desk.command('s');
    desk.expect("saved");
    desk.expect_not("not saved");
    let text = fs::read_to_string(&path).expect("it is there");
    assert!(text.contains("\"entry\": \"3 m\""), "{text}");
    assert_eq!(text.matches("2.5 m").count(), 0);
}

#[test]
fn a_notebook_without_a_file_asks_for_a_path_and_is_saved_there() {
    let folder = folder();
    let mut desk = Desk::tall(preset::demo());
    desk.command('s');
    desk.expect("type a path and save it");
    let place = folder.path().join("new");
    path(&mut desk, "", &place);
    desk.click("save here");
    let stored = fs::read_to_string(place.with_extension("farglow")).expect("it was written");
    assert_eq!(stored, template::DEMO.text);
}

#[test]
fn nothing_is_lost_without_a_question() {
    let folder = folder();
    let file = demo_in(folder.path());
    let mut desk = on(&file);
    desk.change("2.5 m", "3 m");
    desk.command('o');
    desk.click("ladle");
    desk.expect("There are changes that no file holds");
    desk.click("stay");
    assert_eq!(desk.text("charger", "distance"), Some("3 m"));
    desk.click("ladle");
    desk.click("save first");
    assert!(
        desk.notebook().find("charger").is_none(),
        "the template is open"
    );
    let text = fs::read_to_string(&file).expect("it is there");
    assert!(text.contains("\"entry\": \"3 m\""), "{text}");
}

#[test]
fn a_file_that_somebody_else_changed_is_not_replaced_without_a_question() {
    let folder = folder();
    let file = demo_in(folder.path());
    let mut desk = on(&file);
    desk.change("2.5 m", "3 m");
    fs::write(&file, "{\"farglow\": 1, \"cells\": []}").expect("it is writable");
    desk.command('s');
    desk.expect("was changed by somebody else since it was opened");
    assert!(fs::read_to_string(&file).is_ok_and(|text| text.contains("[]")));
    desk.click("replace it with mine");
    assert!(fs::read_to_string(&file).is_ok_and(|text| text.contains("\"entry\": \"3 m\"")));
}

#[test]
fn a_file_that_vanished_is_written_again() {
    let folder = folder();
    let file = demo_in(folder.path());
    let mut desk = on(&file);
    desk.change("2.5 m", "3 m");
    fs::remove_file(&file).expect("it is there");
    desk.command('s');
    desk.expect("which had vanished");
    assert!(file.exists());
}

#[test]
fn a_folder_that_vanished_is_said_and_nothing_is_lost() {
    let folder = folder();
    let deep = folder.path().join("deep");
    fs::create_dir(&deep).expect("it can be made");
    let file = demo_in(&deep);
    let mut desk = on(&file);
    desk.change("2.5 m", "3 m");
    fs::remove_dir_all(&deep).expect("it is there");
    desk.command('s');
    desk.expect("cannot save");
    assert_eq!(desk.text("charger", "distance"), Some("3 m"));
    desk.expect("not saved");
}

#[test]
fn a_protected_file_is_said_with_the_remedy() {
    let folder = folder();
    let file = demo_in(folder.path());
    let mut desk = on(&file);
    desk.change("2.5 m", "3 m");
    let mut permissions = fs::metadata(&file).expect("it is there").permissions();
    permissions.set_readonly(true);
    fs::set_permissions(&file, permissions).expect("it is ours");
    desk.command('s');
    desk.expect("the file is write-protected, save under another name");
    desk.expect("not saved");
}

#[test]
fn files_that_are_no_notebooks_are_said_and_the_desk_stays() {
    let folder = folder();
    for (name, text, said) in [
        (
            "newer.farglow",
            "{\"farglow\": 2, \"cells\": []}",
            "newer program",
        ),
        ("damaged.farglow", "{\"farglow\": 1, \"cells\": [", "line 1"),
        ("empty.farglow", "", "empty"),
        ("unknown.farglow", "{\"farglow\": 1, \"cels\": []}", "cels"),
    ] {
        let file = folder.path().join(name);
        fs::write(&file, text).expect("the folder is writable");
        let mut desk = Desk::tall(preset::demo());
        desk.command('o');
        path(&mut desk, "", &file);
        desk.click("open it");
        desk.expect(said);
        assert_eq!(desk.notebook().cells.len(), 12, "{name}");
        assert_eq!(
            fs::read_to_string(&file).ok().as_deref(),
            Some(text),
            "{name}"
        );
    }
    let mut desk = Desk::tall(preset::demo());
    desk.command('o');
    path(&mut desk, "", &folder.path().join("not-there.farglow"));
    desk.keys_into(app::PATH, &[named(Named::Enter)]);
    desk.expect("there is no such file");
}

#[test]
fn the_worksheet_is_written_as_a_draft_with_what_is_left() {
    let folder = folder();
    let file = demo_in(folder.path());
    let mut desk = on(&file);
    desk.click("6 left before issue");
    desk.expect("confirm value of t_hearth for this job");
    desk.expect("fill in who prepared it");
    desk.command('p');
    desk.expect("marked DRAFT on every page: 6 things are left");
    desk.click("write the draft");
    desk.expect("DRAFT)");
    let pdf = fs::read(folder.path().join("door.pdf")).expect("it was written");
    assert!(pdf.starts_with(b"%PDF"), "{} bytes", pdf.len());
}

#[test]
fn the_job_is_filled_in_and_counts_at_once() {
    let mut desk = Desk::tall(preset::demo());
    desk.expect("6 left before issue");
    desk.command('j');
    desk.type_into("prepared_by", "", "A. Smith");
    assert_eq!(desk.notebook().job.prepared_by.as_deref(), Some("A. Smith"));
    desk.expect("5 left before issue");
    desk.command('z');
    assert_eq!(desk.notebook().job.prepared_by.as_deref(), Some(""));
}

#[test]
fn a_limit_is_confirmed_by_a_person_on_a_day() {
    let mut desk = Desk::tall(preset::demo());
    desk.command('j');
    desk.click("I compared eu-2006-25-m");
    desk.expect("fill in who prepared this sheet and its date first");
    desk.type_into("prepared_by", "", "A. Smith");
    desk.type_into("date", "", "2026-12-01");
    for id in [
        "eu-2006-25-m",
        "eu-2006-25-n",
        "eu-2006-25-o",
        "icnirp-2013-ir-eye",
        "icnirp-2013-skin",
        "pain-time",
    ] {
        desk.click(&format!("I compared {id}"));
    }
    // Three inputs of the demo are still to be confirmed for the job.
    desk.expect("3 left before issue");
    let confirmed = &desk.notebook().confirmed;
    assert_eq!(confirmed.len(), 6);
    assert!(
        confirmed
            .iter()
            .all(|word| word.by == "A. Smith" && word.date == "2026-12-01")
    );
}

#[test]
fn the_head_of_the_sheet_is_typed_without_drawing_bounds_anew() {
    let mut desk = Desk::tall(preset::demo());
    desk.command('j');
    desk.type_into("title", "", "!");
    desk.type_into("prepared_by", "", "A. Smith");
    // The bounds of before still stand, and so do the findings.
    desk.expect("312 kW/m²");
    desk.expect("nominal 290 kW/m²");
    desk.expect_not("being worked out");
    desk.expect("5 left before issue");
    desk.command('z');
    desk.expect_not("being worked out");
    desk.expect("6 left before issue");
}

#[test]
fn everything_that_is_left_leads_to_its_place() {
    let mut desk = Desk::tall(preset::empty());
    desk.command('l');
    desk.click("add it");
    assert_eq!(desk.notebook().cells.len(), 1, "a position was added");
    desk.expect("assess position person");
    desk.click("add it");
    assert_eq!(desk.text("limits", "position"), Some("person"));
    // What is left of the job leads to the job block.
    let mut desk = Desk::tall(preset::demo());
    desk.command('l');
    for _ in 0..desk.notebook().cells.len() {
        if desk.shows("what is done there") || !desk.shows("go there") {
            break;
        }
        desk.click_last("go there");
    }
    desk.expect("prepared by");
}

#[test]
fn a_word_on_a_limit_can_be_taken_back() {
    let mut desk = Desk::tall(preset::demo());
    desk.command('j');
    desk.type_into("prepared_by", "", "A. Smith");
    desk.type_into("date", "", "2026-12-01");
    desk.click("I compared eu-2006-25-m");
    desk.expect("compared by A. Smith on 2026-12-01");
    desk.click("take back");
    assert!(desk.notebook().confirmed.is_empty());
}
