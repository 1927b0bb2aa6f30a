//! The worksheet's PDF read back by other tools, which share no code with us.

use std::path::{Path, PathBuf};

use glam::DVec2;

use farglow::drawing::font;
use farglow::drawing::mark::{Anchor, Backing, Mark, Text};
use farglow::drawing::picture::Picture;
use farglow::drawing::role::Role;
use farglow::worksheet::attach;
use farglow::worksheet::block::{Block, Cell, Column, Run, Table};
use farglow::worksheet::layout::{self, Paper};
use farglow::worksheet::paint;

use crate::{sheet, tools};

fn succeeded(name: &str, arguments: &[&str]) -> String {
    let output = tools::output(name, arguments);
    let (out, err) = (
        String::from_utf8_lossy(&output.stdout),
        String::from_utf8_lossy(&output.stderr),
    );
    assert!(
        output.status.success(),
        "{name} {arguments:?}: {}\n{out}\n{err}",
        output.status
    );
    assert!(!err.contains("Syntax"), "{name} {arguments:?}: {err}");
    out.into_owned()
}

/// A file in a folder of its own, gone with the test.
struct Written {
    folder: tempfile::TempDir,
    path: PathBuf,
}

impl Written {
    fn new(bytes: &[u8]) -> Self {
        let folder = tempfile::tempdir().expect("a temporary folder can be made");
        let path = folder.path().join("sheet.pdf");
        std::fs::write(&path, bytes).expect("a temporary file can be written");
        Self { folder, path }
    }

    fn path(&self) -> &str {
        text(&self.path)
    }
}

fn text(path: &Path) -> &str {
    path.to_str().expect("temporary folders have plain names")
}

fn issued(paper: Paper, draft: bool) -> Vec<u8> {
    sheet::issued(paper, draft).expect("the sheet is written")
}

#[test]
fn qpdf_accepts_the_file() {
    if !tools::are_there() {
        return;
    }
    for paper in [Paper::A4, Paper::Letter] {
        for draft in [false, true] {
            let file = Written::new(&issued(paper, draft));
            let said = succeeded("qpdf", &["--check", file.path()]);
            assert!(
                said.contains("No syntax or stream encoding errors found"),
                "{said}"
            );
        }
    }
}

#[test]
fn every_text_is_found_again_with_its_signs() {
    if !tools::are_there() {
        return;
    }
    let file = Written::new(&issued(Paper::A4, false));
    let said = succeeded("pdftotext", &["-layout", file.path(), "-"]);
    for wanted in [
        "Charging door, furnace 2",
        "1250 ± 25 °C",
        "0.630 m²",
        "ε σ T⁴",
        "5.670 374 × 10⁻⁸ W/(m²·K⁴)",
        "18 000·t^(−0.75) W/m², t ≤ 1000 s",
        "± ° µ × · − – — ≤ ≥ ≈ √ ² ³ ⁻ ⁴ ₀ ₁ α ε λ σ θ π Σ Δ τ → “ ” ‘ ’ … •",
        "not assessed: crane hand",
        "Molten metal: splash and steam are not in this model.",
        "Prepared",
        "eye, all shift",
        "page 1 of",
        "sha256:6b1f0a94c8e2d7530f4b9ad11c27e6853d90ab42f7715ce06e88d2349ba1c05f",
    ] {
        assert!(said.contains(wanted), "{wanted:?} is not in:\n{said}");
    }
    assert!(!said.contains("DRAFT"), "a final sheet says DRAFT:\n{said}");
}

#[test]
fn every_page_of_a_draft_says_so() {
    if !tools::are_there() {
        return;
    }
    let file = Written::new(&issued(Paper::A4, true));
    let said = succeeded("pdftotext", &["-layout", file.path(), "-"]);
    let pages: Vec<&str> = said
        .split('\u{c}')
        .filter(|page| !page.trim().is_empty())
        .collect();
    assert!(
        pages.len() >= 3,
        "{} pages, wanted a sheet of at least 3",
        pages.len()
    );
    for (index, page) in pages.iter().enumerate() {
        let number = format!("page {} of {}", index + 1, pages.len());
        assert!(
            page.contains("DRAFT"),
            "page {} without DRAFT:\n{page}",
            index + 1
        );
        assert!(
            page.contains(&number),
            "{number} is not on its page:\n{page}"
        );
    }
}

#[test]
fn both_weights_are_embedded_and_cut() {
    if !tools::are_there() {
        return;
    }
    let file = Written::new(&issued(Paper::A4, false));
    let said = succeeded("pdffonts", &[file.path()]);
    let fonts: Vec<&str> = said.lines().skip(2).collect();
    assert_eq!(fonts.len(), 2, "{said}");
    for (font, name) in fonts
        .iter()
        .zip(["FarglowSans-Regular", "FarglowSans-SemiBold"])
    {
        assert!(font.contains(&format!("+{name}")), "{font}");
        // Embedded, cut, and with a way back to characters: in this order.
        let flags: Vec<&str> = font
            .split_whitespace()
            .filter(|word| ["yes", "no"].contains(word))
            .collect();
        assert_eq!(flags, ["yes", "yes", "yes"], "{said}");
    }
}

#[test]
fn the_notebook_comes_out_byte_for_byte() {
    if !tools::are_there() {
        return;
    }
    let bytes = issued(Paper::A4, false);
    let file = Written::new(&bytes);
    let listed = succeeded("pdfdetach", &["-list", file.path()]);
    assert!(
        listed.contains("1 embedded files") && listed.contains("charging-door.farglow"),
        "{listed}"
    );
    let target = file.folder.path().join("out");
    let _ = succeeded(
        "pdfdetach",
        &["-save", "1", "-o", text(&target), file.path()],
    );
    let saved = std::fs::read(&target).expect("pdfdetach wrote it");
    assert_eq!(saved, sheet::NOTEBOOK.as_bytes());

    let ours = attach::extract(&bytes).expect("our own reader finds it");
    assert_eq!(ours.len(), 1);
    assert_eq!(ours[0].contents, saved);
    assert_eq!(ours[0].media_type.as_deref(), Some("application/json"));
}

#[test]
fn the_attachment_is_the_source_of_the_document() {
    if !tools::are_there() {
        return;
    }
    let file = Written::new(&issued(Paper::A4, false));
    let said = succeeded(
        "qpdf",
        &["--qdf", "--object-streams=disable", file.path(), "-"],
    );
    for wanted in [
        "/AFRelationship /Source",
        "/AF [",
        "/EmbeddedFiles",
        "/Lang (en-GB)",
        "/Type /EmbeddedFile",
    ] {
        assert!(said.contains(wanted), "{wanted} is not in the file");
    }
}

#[test]
fn an_attachment_survives_a_rewrite_by_another_tool() {
    if !tools::are_there() {
        return;
    }
    let file = Written::new(&issued(Paper::A4, false));
    let target = file.folder.path().join("again.pdf");
    let arguments = [
        "--object-streams=generate",
        "--compress-streams=y",
        file.path(),
        text(&target),
    ];
    let _ = succeeded("qpdf", &arguments);
    let again = std::fs::read(&target).expect("qpdf wrote it");
    let found = attach::extract(&again).expect("our reader finds it in a file with object streams");
    assert_eq!(found[0].contents, sheet::NOTEBOOK.as_bytes());
}

#[test]
fn an_encrypted_file_is_refused_by_name() {
    if !tools::are_there() {
        return;
    }
    let file = Written::new(&issued(Paper::A4, false));
    let target = file.folder.path().join("locked.pdf");
    let _ = succeeded(
        "qpdf",
        &[
            "--encrypt",
            "door",
            "door",
            "256",
            "--",
            file.path(),
            text(&target),
        ],
    );
    let locked = std::fs::read(&target).expect("qpdf wrote it");
    let got = attach::extract(&locked);
    assert_eq!(got, Err(farglow::worksheet::Error::Encrypted));
}

#[test]
fn title_and_producer_are_ours_and_dates_are_the_jobs() {
    if !tools::are_there() {
        return;
    }
    let file = Written::new(&issued(Paper::Letter, false));
    let said = succeeded("pdfinfo", &["-rawdates", file.path()]);
    for wanted in [
        "Charging door, furnace 2 · ε σ T⁴",
        "M. Okafor",
        paint::PRODUCER,
        "D:20261201",
        "612 x 792 pts (letter)",
    ] {
        assert!(said.contains(wanted), "{wanted:?} is not in:\n{said}");
    }
    let pages = layout::pages(&[], Paper::A4, &sheet::furniture(false));
    let undated = paint::pdf(&pages, &paint::Meta::default()).expect("written");
    let file = Written::new(&undated);
    let said = succeeded("pdfinfo", &["-rawdates", file.path()]);
    assert!(!said.contains("Date:"), "a date from nowhere:\n{said}");
    assert!(said.contains("(A4)"), "{said}");
}

#[test]
fn the_same_sheet_gives_the_same_bytes() {
    for paper in [Paper::A4, Paper::Letter] {
        let (one, two) = (issued(paper, true), issued(paper, true));
        assert!(one == two, "{paper:?}: two runs differ");
    }
}

#[test]
fn the_sheet_is_small() {
    let bytes = issued(Paper::A4, true);
    assert!(
        bytes.len() <= 150_000,
        "{} bytes, wanted at most 150,000",
        bytes.len()
    );
}

#[test]
fn a_long_table_has_its_head_on_every_page() {
    if !tools::are_there() {
        return;
    }
    let table = Table {
        columns: vec![Column::words("position"), Column::numbers("irradiance")],
        rows: (0..180)
            .map(|i| {
                vec![
                    Cell::plain(format!("row-{i}")),
                    Cell::plain(format!("{i} W/m²")),
                ]
            })
            .collect(),
    };
    let pages = layout::pages(&[Block::Table(table)], Paper::A4, &sheet::furniture(false));
    let file = Written::new(&paint::pdf(&pages, &sheet::meta()).expect("written"));
    let info = succeeded("pdfinfo", &[file.path()]);
    let counted = info
        .lines()
        .find_map(|line| line.strip_prefix("Pages:"))
        .map(str::trim);
    assert_eq!(counted, Some(pages.len().to_string().as_str()));
    let said = succeeded("pdftotext", &["-layout", file.path(), "-"]);
    let mut rows = 0;
    for (index, page) in said
        .split('\u{c}')
        .filter(|page| !page.trim().is_empty())
        .enumerate()
    {
        let heads = page
            .lines()
            .filter(|line| line.contains("position") && line.contains("irradiance"))
            .count();
        assert_eq!(heads, 1, "page {}:\n{page}", index + 1);
        rows += page.matches("row-").count();
    }
    assert_eq!(rows, 180, "rows printed");
}

#[test]
fn every_latin_letter_and_greek_sign_is_read_back_as_itself() {
    if !tools::are_there() {
        return;
    }
    let signs: String = (0xa1_u32..0x180)
        .filter_map(char::from_u32)
        .filter(|c| *c != '\u{ad}' && font::glyph(*c, font::Weight::Regular).is_some())
        .chain("αβγδεθλμπσστφωΓΔΘΛΞΠΣΦΨΩ⁰¹²³⁴⁵⁶⁷⁸⁹⁻₀₁₂₃∞≠←→".chars())
        .collect();
    // Short groups, so that no line breaks inside one.
    let all: Vec<char> = signs.chars().collect();
    let groups: Vec<String> = all
        .chunks(8)
        .map(|group| format!("[{}]", group.iter().collect::<String>()))
        .collect();
    let runs = groups.iter().flat_map(|group| {
        [
            Run::plain(format!("{group} ")),
            Run::bold(format!("{group} ")),
        ]
    });
    let pages = layout::pages(
        &[Block::Paragraph(runs.collect())],
        Paper::A4,
        &sheet::furniture(false),
    );
    let file = Written::new(&paint::pdf(&pages, &sheet::meta()).expect("written"));
    let said = succeeded("pdftotext", &["-raw", file.path(), "-"]);
    for group in groups {
        let times = said.matches(&group).count();
        assert_eq!(times, 2, "{group} found {times} times in:\n{said}");
    }
}

#[test]
fn a_character_the_font_lacks_leaves_a_mark() {
    if !tools::are_there() {
        return;
    }
    let blocks = [Block::Paragraph(vec![Run::plain("Kupol 炉 2")])];
    let pages = layout::pages(&blocks, Paper::A4, &sheet::furniture(false));
    let file = Written::new(&paint::pdf(&pages, &sheet::meta()).expect("written"));
    let said = succeeded("pdftotext", &[file.path(), "-"]);
    assert!(said.contains("Kupol □ 2"), "{said}");
}

/// Writes the sheet into the folder named by `FARGLOW_SHEETS`, to be looked at.
#[test]
fn a_sheet_can_be_kept_to_be_looked_at() {
    let bytes = issued(Paper::A4, true);
    assert!(bytes.starts_with(b"%PDF-1.7"));
    if let Some(folder) = std::env::var_os("FARGLOW_SHEETS") {
        let folder = PathBuf::from(folder);
        for (name, draft) in [("draft.pdf", true), ("final.pdf", false)] {
            std::fs::write(folder.join(name), issued(Paper::A4, draft))
                .expect("the folder can be written to");
        }
    }
}

#[test]
fn turned_and_haloed_texts_are_found_once() {
    if !tools::are_there() {
        return;
    }
    let mut page = Picture::new(400.0, 300.0);
    let text = |x: f64, y: f64, text: &str| Text::new(DVec2::new(x, y), 12.0, text);
    page.push(Mark::Text(
        text(40.0, 60.0, "295 W/m²").backed(Backing::Halo(Role::Card)),
    ));
    page.push(Mark::Text(
        text(40.0, 120.0, "eye, 4 min").backed(Backing::Box(Role::Card)),
    ));
    page.push(Mark::Text(Text {
        turn: 90.0,
        ..text(200.0, 200.0, "upwards")
    }));
    let file = Written::new(&paint::pdf(&[page], &sheet::meta()).expect("written"));
    let said = succeeded("pdftotext", &[file.path(), "-"]);
    for wanted in ["295 W/m²", "eye, 4 min", "upwards"] {
        let times = said.matches(wanted).count();
        assert_eq!(times, 1, "{wanted} found {times} times in:\n{said}");
    }
}

#[test]
fn a_turned_text_stands_where_it_is_put() {
    if !tools::are_there() {
        return;
    }
    let mut page = Picture::new(400.0, 300.0);
    let upright = Text {
        turn: 90.0,
        ..Text::new(DVec2::new(200.0, 200.0), 12.0, "upwards")
    };
    let width = upright.width();
    page.push(Mark::Text(upright.anchored(Anchor::Middle)));
    let file = Written::new(&paint::pdf(&[page], &sheet::meta()).expect("written"));
    let said = succeeded("pdftotext", &["-bbox", file.path(), "-"]);
    let number = |name: &str| -> f64 {
        let found = said
            .split(&format!("{name}=\""))
            .nth(1)
            .and_then(|rest| rest.split('"').next());
        found
            .and_then(|text| text.parse().ok())
            .unwrap_or_else(|| panic!("no {name} in:\n{said}"))
    };
    // It climbs from below the point to above it, its middle at the point.
    let (low, high) = (number("yMin"), number("yMax"));
    let word = said.split("<word").nth(1).unwrap_or_default();
    assert!(word.contains("upwards"), "{said}");
    assert!(
        ((high + low) / 2.0 - 200.0).abs() < 0.5,
        "middle at {}, wanted 200",
        (high + low) / 2.0
    );
    assert!(
        (high - low - width).abs() < 0.5,
        "{} high, wanted {width}",
        high - low
    );
}
