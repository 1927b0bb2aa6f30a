//! The layers: which module may name which. Every path into the crate counts,
//! in code, tests inside the files included; comments and texts do not.

use std::fs;
use std::path::{Path, PathBuf};

const ALL: &[&str] = &[
    "app",
    "command",
    "drawing",
    "entry",
    "graph",
    "guidance",
    "json",
    "material",
    "notebook",
    "numeric",
    "physics",
    "spelling",
    "store",
    "units",
    "work",
    "worksheet",
];

/// Whom each module may name, beside itself.
const MAY_NAME: &[(&str, &[&str])] = &[
    ("numeric", &[]),
    ("units", &["spelling"]),
    ("json", &["spelling"]),
    ("graph", &["spelling"]),
    ("spelling", &[]),
    ("physics", &["numeric", "spelling"]),
    ("entry", &["units", "spelling"]),
    ("guidance", &["entry", "json", "units", "spelling"]),
    ("material", &["entry", "json", "units", "spelling"]),
    (
        "notebook",
        &[
            "entry", "guidance", "material", "graph", "physics", "units", "spelling",
        ],
    ),
    (
        "store",
        &["notebook", "guidance", "json", "units", "spelling"],
    ),
    ("drawing", &["notebook", "units", "spelling"]),
    (
        "worksheet",
        &[
            "drawing", "store", "notebook", "guidance", "units", "spelling",
        ],
    ),
    ("work", &["notebook"]),
    (
        "app",
        &[
            "work",
            "worksheet",
            "drawing",
            "store",
            "notebook",
            "guidance",
            "physics",
            "entry",
            "graph",
            "json",
            "units",
            "numeric",
            "spelling",
        ],
    ),
    ("command", ALL),
];

/// Files that may name more than their module.
const MORE: &[(&str, &[&str])] = &[
    ("entry/function/radiation.rs", &["physics"]),
    // Tests of the rail read a template.
    ("drawing/rail/tests.rs", &["store"]),
];

/// One name of a top module, with its line from 1.
#[derive(Debug, PartialEq, Eq)]
struct Found {
    line: usize,
    module: String,
}

#[test]
fn imports_point_down_only() {
    let src = Path::new(env!("CARGO_MANIFEST_DIR")).join("src");
    let mut wrong = Vec::new();
    let mut read = 0;
    for path in files(&src) {
        let text = fs::read_to_string(&path).expect("a source file is text");
        let inside = path
            .strip_prefix(&src)
            .expect("found in it")
            .to_string_lossy()
            .replace('\\', "/");
        if inside == "lib.rs" || inside == "main.rs" {
            continue;
        }
        let way = module(&inside);
        let top = way[0].clone();
        let (_, may) = MAY_NAME
            .iter()
            .find(|(name, _)| *name == top)
            .unwrap_or_else(|| panic!("src/{inside}: module {top} is in no layer: add it"));
        let more = MORE
            .iter()
            .find(|(file, _)| *file == inside)
            .map_or(&[][..], |(_, more)| *more);
        for found in names(&text, way.len()) {
            read += 1;
            let module = found.module.as_str();
            if module != top && !may.contains(&module) && !more.contains(&module) {
                wrong.push(format!(
                    "src/{inside}:{}: {top} may not name {module}",
                    found.line
                ));
            }
        }
    }
    assert!(wrong.is_empty(), "\n{}", wrong.join("\n"));
    assert!(read > 200, "only {read} paths were read");
}

#[test]
fn every_module_of_the_crate_is_in_a_layer_and_back() {
    let lib = fs::read_to_string(Path::new(env!("CARGO_MANIFEST_DIR")).join("src/lib.rs"))
        .expect("the crate has a root");
    let mut there: Vec<&str> = lib
        .lines()
        .filter_map(|line| {
            line.trim_start_matches("pub ")
                .strip_prefix("mod ")?
                .strip_suffix(';')
        })
        .collect();
    there.sort_unstable();
    assert_eq!(there, ALL);
    let mut layered: Vec<&str> = MAY_NAME.iter().map(|(name, _)| *name).collect();
    layered.sort_unstable();
    assert_eq!(layered, ALL);
    // Nothing at the root hides whose a name is.
    assert!(!bare(&lib).contains("use "), "the root re-exports");
}

#[test]
fn nobody_is_below_himself() {
    // The table itself points down only: no ring of modules, command aside.
    let mut done: Vec<&str> = Vec::new();
    while done.len() < MAY_NAME.len() {
        let next: Vec<&str> = MAY_NAME
            .iter()
            .filter(|(name, may)| {
                !done.contains(name)
                    && may
                        .iter()
                        .chain(
                            MORE.iter()
                                .filter(|(file, _)| {
                                    file.starts_with(&format!("{name}/"))
                                        && !file.ends_with("tests.rs")
                                })
                                .flat_map(|(_, more)| *more),
                        )
                        .all(|other| other == name || done.contains(other))
            })
            .map(|(name, _)| *name)
            .collect();
        assert!(!next.is_empty(), "a ring above {done:?}");
        done.extend(next);
    }
}

#[test]
fn every_way_of_naming_a_module_is_seen() {
    for (text, depth, expected) in [
        ("use crate::units::Unit;", 1, vec![(1, "units")]),
        ("\npub use crate::json;", 2, vec![(2, "json")]),
        (
            "use crate::{json::Node,\n physics::{self, planck}, units};",
            1,
            vec![(1, "json"), (2, "physics"), (2, "units")],
        ),
        ("fn a() { crate :: graph::b() }", 1, vec![(1, "graph")]),
        (
            "macro_rules! a { () => { $crate::entry::b() } }",
            1,
            vec![(1, "entry")],
        ),
        (
            "pub(in crate::notebook) fn a() {}",
            1,
            vec![(1, "notebook")],
        ),
        ("use super::units;", 1, vec![(1, "units")]),
        ("use super::units;", 2, vec![]),
        ("use super::super::units as u;", 2, vec![(1, "units")]),
        ("use super::{super::physics, own};", 2, vec![(1, "physics")]),
        ("pub use self::super::super::json;", 2, vec![(1, "json")]),
        (
            "mod tests { use super::super::guidance; }",
            1,
            vec![(1, "guidance")],
        ),
        (
            "mod tests { use super::own; } use super::store;",
            1,
            vec![(1, "store")],
        ),
        ("use farglow::drawing;", 1, vec![(1, "drawing")]),
        ("use crate::*;", 1, vec![(1, "*")]),
        (
            "// crate::units\n/* crate::json /* crate::json */ */ crate::graph::A",
            1,
            vec![(2, "graph")],
        ),
        (
            "let a = \"crate::units\"; let b = r#\"\"crate::json\"#; let c = '\"'; crate::entry::E",
            1,
            vec![(1, "entry")],
        ),
        (
            "fn a<'a>(b: &'a str) { crate::store::c(b, '\\'') }",
            1,
            vec![(1, "store")],
        ),
    ] {
        let expected: Vec<Found> = expected
            .into_iter()
            .map(|(line, module)| Found {
                line,
                module: module.to_owned(),
            })
            .collect();
        assert_eq!(names(text, depth), expected, "{text}");
    }
}

fn files(folder: &Path) -> Vec<PathBuf> {
    let mut found = Vec::new();
    let mut entries: Vec<PathBuf> = fs::read_dir(folder)
        .expect("the folder can be listed")
        .map(|entry| entry.expect("an entry of it").path())
        .collect();
    entries.sort();
    for path in entries {
        if path.is_dir() {
            found.extend(files(&path));
        } else if path.extension().is_some_and(|ending| ending == "rs") {
            found.push(path);
        }
    }
    found
}

/// The module of a file, as a path from the root.
fn module(inside: &str) -> Vec<String> {
    inside
        .trim_end_matches(".rs")
        .split('/')
        .map(str::to_owned)
        .collect()
}

/// The text without comments, texts and characters, each replaced by blanks,
/// so that lines stay.
fn bare(text: &str) -> String {
    let signs: Vec<char> = text.chars().collect();
    let mut bare = String::with_capacity(text.len());
    let mut at = 0;
    let at_is = |at: usize, sign: char| signs.get(at) == Some(&sign);
    let blank = |bare: &mut String, from: usize, to: usize| {
        for sign in &signs[from..to.min(signs.len())] {
            bare.push(if *sign == '\n' { '\n' } else { ' ' });
        }
    };
    while at < signs.len() {
        let start = at;
        match signs[at] {
            '/' if at_is(at + 1, '/') => {
                while at < signs.len() && signs[at] != '\n' {
                    at += 1;
                }
                blank(&mut bare, start, at);
            }
            '/' if at_is(at + 1, '*') => {
                let mut deep = 0;
                while at < signs.len() {
                    if at_is(at, '/') && at_is(at + 1, '*') {
                        deep += 1;
                        at += 2;
                    } else if at_is(at, '*') && at_is(at + 1, '/') {
                        deep -= 1;
                        at += 2;
                    } else {
                        at += 1;
                    }
                    if deep == 0 {
                        break;
                    }
                }
                blank(&mut bare, start, at);
            }
            'r' if raw(&signs, at).is_some() => {
                let fence = raw(&signs, at).unwrap_or(0);
                at += fence + 2;
                while at < signs.len() {
                    if signs[at] == '"' && (1..=fence).all(|more| at_is(at + more, '#')) {
                        at += fence + 1;
                        break;
                    }
                    at += 1;
                }
                blank(&mut bare, start, at);
            }
            '"' => {
                at += 1;
                while at < signs.len() && signs[at] != '"' {
                    at += if signs[at] == '\\' { 2 } else { 1 };
                }
                at += 1;
                blank(&mut bare, start, at);
            }
            '\'' if at_is(at + 1, '\\') => {
                at += 3;
                while at < signs.len() && signs[at] != '\'' {
                    at += 1;
                }
                at += 1;
                blank(&mut bare, start, at);
            }
            '\'' if at_is(at + 2, '\'') => {
                at += 3;
                blank(&mut bare, start, at);
            }
            sign => {
                bare.push(sign);
                at += 1;
            }
        }
    }
    bare
}

/// How many `#` open a raw text here.
fn raw(signs: &[char], at: usize) -> Option<usize> {
    let before = at.checked_sub(1).and_then(|before| signs.get(before));
    // `br"…"` is one too; an identifier that ends in r is none.
    if before.is_some_and(|sign| (sign.is_alphanumeric() && *sign != 'b') || *sign == '_') {
        return None;
    }
    let fence = signs[at + 1..]
        .iter()
        .take_while(|sign| **sign == '#')
        .count();
    (signs.get(at + 1 + fence) == Some(&'"')).then_some(fence)
}

/// Words and signs, each with its line.
fn tokens(text: &str) -> Vec<(usize, String)> {
    let mut tokens: Vec<(usize, String)> = Vec::new();
    let mut line = 1;
    let mut joined = false;
    for sign in text.chars() {
        let word = sign.is_alphanumeric() || sign == '_';
        match tokens.last_mut() {
            Some((_, last)) if joined && word => last.push(sign),
            Some((_, last)) if sign == ':' && last == ":" && !joined => last.push(':'),
            _ if sign.is_whitespace() => {}
            _ => tokens.push((line, sign.to_string())),
        }
        joined = word;
        line += usize::from(sign == '\n');
    }
    tokens
}

/// The top modules that a file names; `depth` is that of its module, 1 for one
/// at the top.
fn names(text: &str, depth: usize) -> Vec<Found> {
    let tokens = tokens(&bare(text));
    let word = |at: usize| tokens.get(at).map_or("", |(_, token)| token.as_str());
    let mut found = Vec::new();
    // For each open brace whether it is that of a module inside the file.
    let mut braces: Vec<bool> = Vec::new();
    let mut at = 0;
    while at < tokens.len() {
        match word(at) {
            "{" => braces.push(at >= 2 && word(at - 2) == "mod"),
            "}" => drop(braces.pop()),
            "crate" | "farglow" if word(at + 1) == "::" => root(&tokens, at + 2, &mut found),
            "super" if word(at + 1) == "::" && !(at >= 2 && word(at - 2) == "super") => {
                let inner = braces.iter().filter(|module| **module).count();
                climb(&tokens, at, depth + inner, &mut found);
            }
            _ => {}
        }
        at += 1;
    }
    found
}

/// Follows `super::super::…` from the token at `at`, `left` modules deep.
fn climb(tokens: &[(usize, String)], mut at: usize, left: usize, found: &mut Vec<Found>) {
    let word = |at: usize| tokens.get(at).map_or("", |(_, token)| token.as_str());
    let mut left = left;
    while word(at) == "super" && word(at + 1) == "::" {
        left = left.saturating_sub(1);
        at += 2;
    }
    if left == 0 {
        root(tokens, at, found);
    } else if word(at) == "{" {
        for branch in branches(tokens, at) {
            if word(branch) == "super" {
                climb(tokens, branch, left, found);
            }
        }
    }
}

/// Notes what is named at the root: one name, or those in braces.
fn root(tokens: &[(usize, String)], at: usize, found: &mut Vec<Found>) {
    let Some((line, token)) = tokens.get(at) else {
        return;
    };
    if token == "{" {
        for branch in branches(tokens, at) {
            root(tokens, branch, found);
        }
    } else if token != "self" {
        found.push(Found {
            line: *line,
            module: token.clone(),
        });
    }
}

/// Where each branch of a group in braces begins.
fn branches(tokens: &[(usize, String)], open: usize) -> Vec<usize> {
    let mut starts = vec![open + 1];
    let mut deep = 0;
    for (at, (_, token)) in tokens.iter().enumerate().skip(open) {
        match token.as_str() {
            "{" => deep += 1,
            "}" => deep -= 1,
            "," if deep == 1 => starts.push(at + 1),
            _ => {}
        }
        if deep == 0 {
            break;
        }
    }
    starts.retain(|at| tokens.get(*at).is_some_and(|(_, token)| token != "}"));
    starts
}
