use super::*;
use crate::drawing::picture::Picture;
use crate::worksheet::paint::{self, Meta};

fn blank() -> Vec<u8> {
    paint::pdf(&[Picture::new(200.0, 100.0)], &Meta::default()).expect("a blank page is written")
}

#[test]
fn what_is_attached_comes_out_again() {
    let contents = "{ \"title\": \"Tür ± 2 °C\" }\r\n\0\u{ff}".as_bytes();
    let pdf = attach(
        &blank(),
        "Tür 2.farglow",
        "application/json",
        contents,
        "das Blatt",
    )
    .expect("it is attached");
    let found = extract(&pdf).expect("it is found");
    let expected = Attachment {
        name: "Tür 2.farglow".into(),
        media_type: Some("application/json".into()),
        description: Some("das Blatt".into()),
        contents: contents.to_vec(),
    };
    assert_eq!(found, vec![expected]);
}

#[test]
fn a_second_file_is_kept_beside_and_a_same_name_replaced() {
    let one = attach(&blank(), "b.txt", "text/plain", b"one", "").expect("attached");
    let two = attach(&one, "a.txt", "text/plain", b"two", "").expect("attached");
    let three = attach(&two, "b.txt", "text/plain", b"three", "").expect("attached");
    let found: Vec<(String, Vec<u8>)> = extract(&three)
        .expect("found")
        .into_iter()
        .map(|a| (a.name, a.contents))
        .collect();
    assert_eq!(
        found,
        vec![
            ("a.txt".into(), b"two".to_vec()),
            ("b.txt".into(), b"three".to_vec())
        ]
    );
}

#[test]
fn an_empty_file_is_a_file() {
    let pdf = attach(&blank(), "empty", "text/plain", b"", "").expect("attached");
    assert_eq!(extract(&pdf).expect("found")[0].contents, b"");
}

#[test]
fn names_that_reach_outside_a_folder_are_refused() {
    for name in ["", "..", ".", "a/b", "a\\b", "a\0b", "a\nb"] {
        let got = attach(&blank(), name, "text/plain", b"x", "");
        assert_eq!(got, Err(Error::Name(name.to_owned())));
    }
}

#[test]
fn a_pdf_without_files_says_so() {
    assert_eq!(extract(&blank()), Err(Error::NothingAttached));
}

#[test]
fn what_is_no_pdf_is_refused() {
    for bytes in [
        &b""[..],
        b"hello",
        b"%PDF-1.7",
        b"%PDF-1.7\n1 0 obj\n<<>>\nendobj\ntrailer<</Root 1 0 R>>\n",
        &[0xff; 4096],
    ] {
        let got = extract(bytes);
        assert!(
            matches!(got, Err(Error::Damaged(_) | Error::NothingAttached)),
            "{got:?}"
        );
    }
}

#[test]
fn no_cut_and_no_changed_byte_makes_it_panic_or_lie() {
    let contents = b"the notebook, byte for byte".repeat(40);
    let pdf =
        attach(&blank(), "door.farglow", "application/json", &contents, "").expect("attached");
    for length in (0..pdf.len()).step_by(7) {
        if let Ok(found) = extract(&pdf[..length]) {
            assert_eq!(found[0].contents, contents, "cut to {length} bytes");
        }
    }
    let mut seed = 1_u32;
    for round in 0..400 {
        let mut changed = pdf.clone();
        for _ in 0..=(round % 4) {
            seed = seed.wrapping_mul(1_664_525).wrapping_add(1_013_904_223);
            let place = seed as usize % changed.len();
            changed[place] ^= 1 << (seed >> 29);
        }
        // Whatever comes out, it comes out: an error, or files with some bytes.
        if let Err(error) = extract(&changed) {
            assert!(!error.to_string().is_empty());
        }
    }
}

#[test]
fn a_tree_that_bites_its_tail_ends() {
    let mut file = Document::load_mem(&blank()).expect("our own file opens");
    let node = file.new_object_id();
    let mut tree = Dictionary::new();
    tree.set(
        "Kids",
        vec![Object::Reference(node), Object::Reference(node)],
    );
    file.set_object(node, tree);
    let mut names = Dictionary::new();
    names.set("EmbeddedFiles", Object::Reference(node));
    file.catalog_mut()
        .expect("it has a catalog")
        .set("Names", names);
    let mut bytes = Vec::new();
    file.save_to(&mut bytes).expect("it is written");
    assert_eq!(extract(&bytes), Err(Error::NothingAttached));
}

#[test]
fn the_same_input_gives_the_same_bytes() {
    let make = || attach(&blank(), "a", "text/plain", b"x", "y").expect("attached");
    assert_eq!(make(), make());
}

#[test]
fn deep_nesting_is_refused_without_running_out_of_stack() {
    for (open, close) in [("[", "]"), ("<</A ", ">>")] {
        let deep = format!("{}null{}", open.repeat(200_000), close.repeat(200_000));
        let mut pdf =
            format!("%PDF-1.7\n1 0 obj\n<</Type/Catalog/Names {deep}>>\nendobj\n").into_bytes();
        let place = pdf.len();
        let table = format!(
            "xref\n0 2\n0000000000 65535 f \n0000000009 00000 n \ntrailer\n<</Size 2/Root 1 0 R>>\nstartxref\n{place}\n%%EOF\n"
        );
        pdf.extend_from_slice(table.as_bytes());
        let got = extract(&pdf);
        assert!(
            matches!(got, Err(Error::Damaged(_) | Error::NothingAttached)),
            "{got:?}"
        );
        // And in the trailer, which is read first.
        let head = format!(
            "%PDF-1.7\nxref\n0 1\n0000000000 65535 f \ntrailer\n<</Root {deep}>>\nstartxref\n9\n%%EOF\n"
        );
        let got = extract(head.as_bytes());
        assert!(
            matches!(got, Err(Error::Damaged(_) | Error::NothingAttached)),
            "{got:?}"
        );
    }
}
