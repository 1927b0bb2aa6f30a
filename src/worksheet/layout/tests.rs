use super::*;
use crate::drawing::mark::{Rectangle, Shape};
use crate::worksheet::block::{Cell, Column, Pair, Run, Signature, Table};

fn furniture() -> Furniture {
    Furniture {
        title: "Charging door, furnace 2".into(),
        site: "Harrow Bank Foundry".into(),
        revision: "revision B".into(),
        digest: "sha256:0123456789abcdef".into(),
        program: "farglow 0.1.0".into(),
        draft: None,
    }
}

fn table(rows: usize) -> Block {
    Block::Table(Table {
        columns: vec![Column::words("position"), Column::numbers("irradiance")],
        rows: (0..rows)
            .map(|i| {
                vec![
                    Cell::plain(format!("row {i}")),
                    Cell::plain(format!("{i} W/m²")),
                ]
            })
            .collect(),
    })
}

fn texts(page: &Picture) -> Vec<String> {
    page.texts().iter().map(|text| text.text.clone()).collect()
}

fn inside(pages: &[Picture]) {
    for (number, page) in pages.iter().enumerate() {
        let sheet = Rectangle::new(
            MARGIN,
            MARGIN,
            page.width - 2.0 * MARGIN,
            page.height - 2.0 * MARGIN,
        )
        .grown(1.0);
        for text in page.texts().iter().filter(|text| text.turn == 0.0) {
            assert!(
                sheet.holds(&text.extent()),
                "page {}: {:?} at {:?}",
                number + 1,
                text.text,
                text.extent()
            );
        }
    }
}

#[test]
fn a_long_table_repeats_its_head_and_loses_no_row() {
    for paper in [Paper::A4, Paper::Letter] {
        let pages = pages(&[table(200)], paper, &furniture());
        assert!(pages.len() >= 4, "{} pages", pages.len());
        let mut rows = Vec::new();
        for page in &pages {
            let texts = texts(page);
            assert_eq!(texts.iter().filter(|t| *t == "position").count(), 1);
            rows.extend(texts.into_iter().filter(|t| t.starts_with("row ")));
        }
        let expected: Vec<String> = (0..200).map(|i| format!("row {i}")).collect();
        assert_eq!(rows, expected);
        inside(&pages);
    }
}

#[test]
fn a_heading_never_stands_alone_at_the_foot() {
    for lines in 0..70 {
        let mut blocks: Vec<Block> = (0..lines)
            .map(|i| Block::Paragraph(vec![Run::plain(format!("line {i}"))]))
            .collect();
        blocks.push(Block::Heading("Findings".into()));
        blocks.push(Block::Paragraph(vec![Run::plain("after")]));
        for page in pages(&blocks, Paper::A4, &furniture()) {
            let texts = texts(&page);
            let heading = texts.iter().any(|t| t == "Findings");
            let after = texts.iter().any(|t| t == "after");
            assert_eq!(heading, after, "with {lines} lines above");
        }
    }
}

#[test]
fn what_belongs_together_is_on_one_page() {
    for lines in 0..70 {
        let mut blocks: Vec<Block> = (0..lines)
            .map(|_| Block::Paragraph(vec![Run::plain("line")]))
            .collect();
        let kept = (0..12)
            .map(|i| Block::Paragraph(vec![Run::plain(format!("kept {i}"))]))
            .collect();
        blocks.push(Block::Together(kept));
        let counts: Vec<usize> = pages(&blocks, Paper::A4, &furniture())
            .iter()
            .map(|page| {
                texts(page)
                    .iter()
                    .filter(|t| t.starts_with("kept "))
                    .count()
            })
            .collect();
        assert!(counts.contains(&12), "with {lines} lines above: {counts:?}");
    }
}

#[test]
fn nothing_leaves_the_margins_whatever_the_text() {
    let word = "W".repeat(300);
    let long = "a cell with very many words in it ".repeat(2000);
    let blocks = vec![
        Block::Title {
            text: word.clone(),
            under: word.clone(),
        },
        Block::Heading(word.clone()),
        Block::Paragraph(vec![Run::plain(word.clone()), Run::bold(long.clone())]),
        Block::Bullet(vec![Run::plain(word.clone())]),
        Block::Pairs {
            columns: 3,
            pairs: vec![
                Pair::new("site", word.clone()),
                Pair::new("area", long.clone()),
                Pair::new("", ""),
            ],
        },
        Block::Table(Table {
            columns: vec![Column::words("a"), Column::numbers("b"), Column::words("c")],
            rows: vec![
                vec![
                    Cell::plain(long.clone()),
                    Cell::plain(word.clone()),
                    Cell::finding(Shape::Over, "over"),
                ],
                vec![Cell::plain("short")],
                vec![
                    Cell::plain("1"),
                    Cell::plain("2"),
                    Cell::plain("3"),
                    Cell::plain("a fourth in three columns"),
                ],
            ],
        }),
        Block::Picture {
            picture: Picture::new(5000.0, 9000.0),
            caption: word.clone(),
        },
        Block::Caution(vec![
            vec![Run::plain(long.clone())],
            vec![Run::plain(word.clone())],
        ]),
        Block::Finding {
            shape: Shape::NotAssessed,
            word: word.clone(),
            text: vec![Run::plain(long)],
        },
        Block::Signatures(vec![Signature {
            act: "Prepared".into(),
            name: word.clone(),
            date: word,
        }]),
    ];
    let furniture = Furniture {
        title: "T".repeat(500),
        draft: Some("r".repeat(500)),
        ..furniture()
    };
    for paper in [Paper::A4, Paper::Letter] {
        inside(&pages(&blocks, paper, &furniture));
    }
}

#[test]
fn every_word_of_a_cell_higher_than_a_page_is_printed() {
    let words: Vec<String> = (0..6000).map(|i| format!("w{i}")).collect();
    let block = Block::Table(Table {
        columns: vec![Column::words("note")],
        rows: vec![vec![Cell::plain(words.join(" "))]],
    });
    let pages = pages(&[block], Paper::A4, &furniture());
    let printed: Vec<String> = pages
        .iter()
        .flat_map(texts)
        .flat_map(|t| t.split(' ').map(str::to_owned).collect::<Vec<_>>())
        .filter(|w| words.contains(w))
        .collect();
    assert_eq!(printed.len(), words.len());
    assert_eq!(printed, words);
}

#[test]
fn a_draft_says_so_on_every_page_twice() {
    let draft = Furniture {
        draft: Some("two limits are not confirmed".into()),
        ..furniture()
    };
    let pages = pages(&[table(150)], Paper::A4, &draft);
    for page in &pages {
        let words = page
            .texts()
            .iter()
            .filter(|text| text.text == "DRAFT")
            .count();
        assert_eq!(words, 2, "the word in the head and behind the content");
        assert!(
            texts(page)
                .iter()
                .any(|t| t.contains("two limits are not confirmed"))
        );
        assert!(
            matches!(&page.marks[0], Mark::Text(text) if text.hollow),
            "the large word is under everything"
        );
    }
    let last = pages.len();
    assert!(texts(&pages[last - 1]).contains(&format!("page {last} of {last}")));
}

#[test]
fn numbers_of_a_column_end_at_one_line() {
    let page = &pages(&[table(30)], Paper::A4, &furniture())[0];
    let ends: Vec<f64> = page
        .texts()
        .iter()
        .filter(|t| t.text.ends_with("W/m²"))
        .map(|t| t.extent().to.x)
        .collect();
    assert_eq!(ends.len(), 30);
    for end in &ends {
        assert!((end - ends[0]).abs() < 1e-9, "{end}, wanted {}", ends[0]);
    }
}

#[test]
fn nothing_to_print_is_one_empty_page() {
    assert_eq!(pages(&[], Paper::A4, &furniture()).len(), 1);
    let none = Block::Table(Table::default());
    assert_eq!(
        pages(&[none, Block::NewPage], Paper::Letter, &furniture()).len(),
        1
    );
}

#[test]
fn a_new_page_begins_where_it_is_asked_for() {
    let blocks = [
        Block::Heading("one".into()),
        Block::NewPage,
        Block::Heading("two".into()),
    ];
    let pages = pages(&blocks, Paper::A4, &furniture());
    assert_eq!(pages.len(), 2);
    assert!(texts(&pages[1]).contains(&"two".to_owned()));
}
