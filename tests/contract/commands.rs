//! The commands as a person meets them: help, templates, worksheets, pipes.

use std::io::Read;
use std::process::Stdio;

use farglow::guidance::Library;
use farglow::store::template;
use serde_json::{Value, json};

use crate::notebook_files::EXAMPLE;
use crate::program::{Desk, text};
use crate::tools;

fn tool(name: &str, arguments: &[&str]) -> String {
    let output = tools::output(name, arguments);
    let out = String::from_utf8_lossy(&output.stdout).into_owned();
    assert!(
        output.status.success(),
        "{name} {arguments:?}: {out}\n{}",
        String::from_utf8_lossy(&output.stderr)
    );
    out
}

/// The text of each page.
fn pages(desk: &Desk, pdf: &str) -> Vec<String> {
    let all = tool("pdftotext", &["-layout", text(&desk.path(pdf)), "-"]);
    all.split('\u{c}')
        .map(str::to_owned)
        .filter(|page| !page.trim().is_empty())
        .collect()
}

/// The demo with everything filled in that a person has to fill in.
fn finished() -> String {
    let mut notebook: Value = serde_json::from_str(template::DEMO.text).expect("JSON");
    for (line, words) in [
        ("prepared_by", "R. Aldous"),
        ("checked_by", "T. Wren"),
        ("date", "2026-12-01"),
    ] {
        notebook["job"][line] = json!(words);
    }
    let mut used = Vec::new();
    for cell in notebook["cells"].as_array_mut().expect("a list") {
        let cell = cell.as_object_mut().expect("an object");
        if cell.get("basis") == Some(&json!("unconfirmed")) {
            let _ = cell.insert("basis".to_owned(), json!("measured"));
        }
        for (_, field) in cell.iter_mut() {
            if field.get("basis") == Some(&json!("unconfirmed")) {
                field["basis"] = json!("measured");
            }
        }
        match cell.get("guidance") {
            Some(Value::Array(ids)) => used.extend(ids.clone()),
            Some(id) => used.push(id.clone()),
            None => {}
        }
    }
    let mut confirmed: Vec<Value> = Vec::new();
    for id in used {
        for limit in Library::shipped().family(id.as_str().expect("a text")) {
            let entry = json!({
                "guidance": limit.id, "edition": limit.edition, "by": "R. Aldous", "date": "2026-12-01"
            });
            if !confirmed.contains(&entry) {
                confirmed.push(entry);
            }
        }
    }
    notebook["confirmed"] = json!(confirmed);
    notebook.to_string()
}

#[test]
fn help_tells_a_newcomer_what_to_do() {
    let desk = Desk::new();
    for (arguments, says) in [
        (
            &["--help"][..],
            &[
                "calc",
                "issue",
                "templates",
                "A first job",
                "Exit codes",
                "Planning aid only",
            ][..],
        ),
        (&["-h"], &["calc", "issue", "templates"]),
        (&["calc", "--help"], &["--json", "--jobs", "<FILE>"]),
        (
            &["issue", "--help"],
            &["--output", "--paper", "letter", "DRAFT"],
        ),
        (&["templates", "--help"], &["--new", "--output"]),
        (&["--version"], &["farglow 0."]),
    ] {
        let ran = desk.run(arguments);
        assert_eq!(ran.code, 0, "{arguments:?}: {}", ran.err);
        assert_eq!(ran.err, "", "{arguments:?}");
        for piece in says {
            assert!(
                ran.out.contains(piece),
                "{arguments:?}: {piece}\n{}",
                ran.out
            );
        }
    }
}

#[test]
fn bad_usage_is_said_with_a_remedy_and_exit_code_2() {
    let desk = Desk::new();
    let _ = desk.put("a.farglow", EXAMPLE);
    for (arguments, says) in [
        (&["cacl", "a.farglow"][..], "calc"),
        (&["calc"], "<FILE>"),
        (&["calc", "--jsn", "a.farglow"], "--json"),
        (&["calc", "--jobs", "0", "a.farglow"], "1..=64"),
        (&["calc", "--jobs", "many", "a.farglow"], "many"),
        (&["issue", "a.farglow"], "--output"),
        (
            &["issue", "a.farglow", "-o", "a.pdf", "--paper", "a3"],
            "letter",
        ),
        (&["templates", "--new", "ladle"], "--output"),
        (&["templates", "-o", "x.farglow"], "--new"),
    ] {
        let ran = desk.run(arguments);
        assert_eq!(ran.code, 2, "{arguments:?}: {ran:?}");
        assert_eq!(ran.out, "", "{arguments:?}");
        assert!(ran.err.contains(says), "{arguments:?}: {}", ran.err);
    }
    assert!(!desk.path("a.pdf").exists() && !desk.path("x.farglow").exists());
}

#[test]
fn templates_are_listed_and_started_from() {
    let desk = Desk::new();
    let listed = desk.run(&["templates"]);
    assert_eq!(listed.code, 0);
    for template in template::ALL {
        assert!(listed.out.contains(template.name) && listed.out.contains(template.about));
        let file = format!("my-{}.farglow", template.name);
        let ran = desk.run(&["templates", "--new", template.name, "-o", &file]);
        assert_eq!(ran.code, 0, "{}", ran.err);
        assert_eq!(desk.read(&file), template.text.as_bytes());
        assert_eq!(desk.run(&["calc", &file]).code, 0);
    }
}

#[test]
fn a_template_never_overwrites_and_an_unknown_one_is_guessed() {
    let desk = Desk::new();
    let _ = desk.put("mine.farglow", "mine");
    let ran = desk.run(&["templates", "--new", "ladle", "-o", "mine.farglow"]);
    assert_eq!(ran.code, 2);
    assert!(
        ran.err.contains("mine.farglow is there already"),
        "{}",
        ran.err
    );
    assert!(ran.err.contains("choose another name"), "{}", ran.err);
    assert_eq!(desk.read("mine.farglow"), b"mine");
    for (name, says) in [("ladel", "did you mean `ladle`?"), ("kiln", "furnace-door")] {
        let ran = desk.run(&["templates", "--new", name, "-o", "new.farglow"]);
        assert_eq!(ran.code, 2, "{name}");
        assert!(ran.err.contains(says), "{name}: {}", ran.err);
        assert!(!desk.path("new.farglow").exists(), "{name}");
    }
    let ran = desk.run(&[
        "templates",
        "--new",
        "ladle",
        "-o",
        "no/such/folder.farglow",
    ]);
    assert_eq!(ran.code, 2);
    assert!(ran.err.contains("there is no such folder"), "{}", ran.err);
}

#[test]
fn a_worksheet_is_a_draft_on_every_page_until_all_is_confirmed() {
    if !tools::are_there() {
        return;
    }
    let desk = Desk::new();
    let open = template::DEMO.text;
    let whole = finished();
    let recalled = {
        let mut notebook: Value = serde_json::from_str(&whole).expect("JSON");
        // All is filled in but one limit of one family.
        let list = notebook["confirmed"].as_array_mut().expect("a list");
        let before = list.len();
        list.retain(|entry| entry["guidance"] != "eu-2006-25-n");
        assert_eq!(list.len() + 1, before);
        notebook.to_string()
    };
    let edition = whole.replacen("\"edition\":\"", "\"edition\":\"another ", 1);
    assert_ne!(edition, whole);
    for (contents, draft) in [
        (open, true),
        (&recalled, true),
        (&edition, true),
        (&whole, false),
    ] {
        let _ = desk.put("door.farglow", contents);
        let ran = desk.run(&["issue", "door.farglow", "-o", "door.pdf"]);
        assert_eq!(ran.code, 0, "{}", ran.err);
        assert_eq!(ran.out.contains("DRAFT"), draft, "{}", ran.out);
        assert_eq!(
            ran.out.contains("left before it can be issued"),
            draft,
            "{}",
            ran.out
        );
        let pages = pages(&desk, "door.pdf");
        assert!(
            ran.out.contains(&format!("({} pages", pages.len())),
            "{}",
            ran.out
        );
        for (at, page) in pages.iter().enumerate() {
            assert_eq!(page.contains("DRAFT"), draft, "page {}:\n{page}", at + 1);
            let count = format!("page {} of {}", at + 1, pages.len());
            assert!(page.contains(&count), "{count}:\n{page}");
        }
    }
}

#[test]
fn a_worksheet_holds_its_notebook_and_other_tools_accept_it() {
    if !tools::are_there() {
        return;
    }
    for (paper, size) in [("a4", "595.276 x 841.89"), ("letter", "612 x 792")] {
        let desk = Desk::new();
        let contents = finished();
        let _ = desk.put("door 2.farglow", &contents);
        let ran = desk.run(&[
            "issue",
            "door 2.farglow",
            "-o",
            "door.pdf",
            "--paper",
            paper,
        ]);
        assert_eq!(ran.code, 0, "{}", ran.err);
        let path = desk.path("door.pdf");
        let checked = tool("qpdf", &["--check", text(&path)]);
        assert!(
            checked.contains("No syntax or stream encoding errors"),
            "{checked}"
        );
        let info = tool("pdfinfo", &[text(&path)]);
        assert!(info.contains(size), "{paper}: {info}");
        let out = desk.path("taken-out");
        let _ = tool("pdfdetach", &["-save", "1", "-o", text(&out), text(&path)]);
        assert_eq!(desk.read("taken-out"), contents.as_bytes(), "{paper}");
        assert_eq!(desk.read("door 2.farglow"), contents.as_bytes());
        // What was taken out gives the figures that were printed.
        let digest = desk.calc(&["taken-out"], 0)["digest"].clone();
        let digest = digest
            .as_str()
            .expect("a text")
            .trim_start_matches("sha256:");
        let pages = pages(&desk, "door.pdf");
        assert!(
            pages.iter().all(|page| page.contains(&digest[..16])),
            "{digest}"
        );
    }
}

#[test]
fn the_same_notebook_gives_the_same_worksheet_to_the_byte() {
    let desk = Desk::new();
    let _ = desk.put("door.farglow", template::DEMO.text);
    for paper in ["a4", "letter"] {
        for file in ["one.pdf", "two.pdf"] {
            let ran = desk.run(&["issue", "door.farglow", "-o", file, "--paper", paper]);
            assert_eq!(ran.code, 0, "{}", ran.err);
        }
        assert!(desk.read("one.pdf") == desk.read("two.pdf"), "{paper}");
    }
}

#[test]
fn a_worksheet_never_replaces_its_notebook() {
    let desk = Desk::new();
    let path = desk.put("door.farglow", EXAMPLE);
    let mut names = vec!["door.farglow".to_owned(), "./door.farglow".to_owned()];
    #[cfg(unix)]
    {
        std::os::unix::fs::symlink(&path, desk.path("link.pdf")).expect("a link can be made");
        names.push("link.pdf".to_owned());
    }
    names.push(text(&path).to_owned());
    for name in &names {
        let ran = desk.run(&["issue", "door.farglow", "-o", name]);
        assert_eq!(ran.code, 2, "{name}: {ran:?}");
        assert!(
            ran.err.contains("is the notebook itself"),
            "{name}: {}",
            ran.err
        );
        assert_eq!(desk.read("door.farglow"), EXAMPLE.as_bytes(), "{name}");
    }
}

#[test]
fn a_worksheet_that_cannot_be_written_says_why() {
    let desk = Desk::new();
    let _ = desk.put("door.farglow", EXAMPLE);
    std::fs::create_dir(desk.path("folder")).expect("a folder can be made");
    for (output, says) in [
        ("missing/door.pdf", "there is no such folder"),
        ("folder", "is a folder"),
        ("door.farglow/x.pdf", "not a folder"),
    ] {
        let ran = desk.run(&["issue", "door.farglow", "-o", output]);
        assert_eq!(ran.code, 2, "{output}: {ran:?}");
        assert!(ran.err.contains(says), "{output}: {}", ran.err);
        assert_eq!(ran.out, "", "{output}");
    }
    let ran = desk.run(&["issue", "nowhere.farglow", "-o", "x.pdf"]);
    assert_eq!(ran.code, 2);
    assert!(ran.err.contains("there is no such file"), "{}", ran.err);
    assert!(!desk.path("x.pdf").exists());
}

#[test]
fn a_notebook_with_an_error_is_issued_as_a_draft_that_tells_it() {
    if !tools::are_there() {
        return;
    }
    let desk = Desk::new();
    let _ = desk.put("door.farglow", finished().replace("0.90 m", "0.90 mtr"));
    let ran = desk.run(&["issue", "door.farglow", "-o", "door.pdf"]);
    assert_eq!(ran.code, 3, "{ran:?}");
    assert!(
        ran.err.contains("cell door") && ran.err.contains("mtr"),
        "{}",
        ran.err
    );
    for page in pages(&desk, "door.pdf") {
        assert!(page.contains("DRAFT"), "{page}");
    }
}

#[test]
fn without_a_display_one_line_names_the_way_without_a_window() {
    let desk = Desk::new();
    let ran = desk
        .command(&[])
        .env_remove("DISPLAY")
        .env_remove("WAYLAND_DISPLAY")
        .output()
        .expect("the program runs");
    let said = String::from_utf8_lossy(&ran.stderr);
    assert_eq!(ran.status.code(), Some(2), "{said}");
    assert_eq!(said.trim_end().lines().count(), 1, "{said}");
    assert!(said.contains("farglow calc FILE"), "{said}");
}

#[test]
fn a_reader_that_goes_away_is_no_fault() {
    let desk = Desk::new();
    let names: Vec<String> = (0..12).map(|number| format!("{number}.farglow")).collect();
    for name in &names {
        let _ = desk.put(name, template::DEMO.text);
    }
    for form in [&["calc", "--json"][..], &["calc"]] {
        let mut arguments = form.to_vec();
        arguments.extend(names.iter().map(String::as_str));
        let mut child = desk
            .command(&arguments)
            .stdout(Stdio::piped())
            .stderr(Stdio::piped())
            .spawn()
            .expect("the program can be started");
        // Far less is read than is written, and a pipe holds 64 kB.
        let mut begin = [0; 16];
        let mut out = child.stdout.take().expect("piped");
        out.read_exact(&mut begin).expect("it prints");
        drop(out);
        let output = child.wait_with_output().expect("it ends");
        let err = String::from_utf8_lossy(&output.stderr);
        assert_eq!(output.status.code(), Some(0), "{form:?}: {err}");
        assert_eq!(err, "", "{form:?}");
    }
}
