//! What a worksheet is made of, from title to signature lines; says nothing
//! about pages.

use crate::drawing::mark::Shape;
use crate::drawing::picture::Picture;
use crate::drawing::role::Role;

/// A stretch of text in one weight and role.
#[derive(Clone, Debug, PartialEq)]
pub struct Run {
    /// The text; `\n` starts a new line.
    pub text: String,
    /// Whether it is semibold.
    pub bold: bool,
    /// What it is for.
    pub role: Role,
}

impl Run {
    /// Returns plain text.
    pub fn plain(text: impl Into<String>) -> Self {
        Self {
            text: text.into(),
            bold: false,
            role: Role::Ink,
        }
    }

    /// Returns semibold text.
    pub fn bold(text: impl Into<String>) -> Self {
        Self {
            text: text.into(),
            bold: true,
            role: Role::Ink,
        }
    }

    /// Returns secondary text.
    pub fn muted(text: impl Into<String>) -> Self {
        Self {
            text: text.into(),
            bold: false,
            role: Role::Muted,
        }
    }
}

impl From<&str> for Run {
    fn from(text: &str) -> Self {
        Self::plain(text)
    }
}

impl From<String> for Run {
    fn from(text: String) -> Self {
        Self::plain(text)
    }
}

/// Where the text of a column stands.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Align {
    /// Against the left side: words.
    #[default]
    Start,
    /// In the middle.
    Middle,
    /// Against the right side: numbers, whose digits are equally wide.
    End,
}

/// The head of a column.
#[derive(Clone, Debug, PartialEq)]
pub struct Column {
    /// Its heading.
    pub title: String,
    /// Where its text stands, the heading's too.
    pub align: Align,
}

impl Column {
    /// Returns a column of words.
    pub fn words(title: impl Into<String>) -> Self {
        Self {
            title: title.into(),
            align: Align::Start,
        }
    }

    /// Returns a column of numbers.
    pub fn numbers(title: impl Into<String>) -> Self {
        Self {
            title: title.into(),
            align: Align::End,
        }
    }
}

/// A cell of a table.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Cell {
    /// A finding's shape in front of the text.
    pub shape: Option<Shape>,
    /// The text, wrapped to the column.
    pub runs: Vec<Run>,
}

impl Cell {
    /// Returns a cell of plain text.
    pub fn plain(text: impl Into<String>) -> Self {
        Self {
            shape: None,
            runs: vec![Run::plain(text)],
        }
    }

    /// Returns a cell with several runs of text.
    pub const fn runs(runs: Vec<Run>) -> Self {
        Self { shape: None, runs }
    }

    /// Returns a finding: its shape, and its word in the shape's role.
    pub fn finding(shape: Shape, word: impl Into<String>) -> Self {
        let run = Run {
            text: word.into(),
            bold: true,
            role: shape.role(),
        };
        Self {
            shape: Some(shape),
            runs: vec![run],
        }
    }
}

impl From<&str> for Cell {
    fn from(text: &str) -> Self {
        Self::plain(text)
    }
}

impl From<String> for Cell {
    fn from(text: String) -> Self {
        Self::plain(text)
    }
}

/// Rows under a header.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Table {
    /// The columns; their heads are repeated after a page break.
    pub columns: Vec<Column>,
    /// The rows; cells beyond the columns are appended to the last one, missing ones are empty.
    pub rows: Vec<Vec<Cell>>,
}

/// One named value of a block of particulars.
#[derive(Clone, Debug, PartialEq)]
pub struct Pair {
    /// The name, small, above.
    pub name: String,
    /// The value; an empty one leaves room to write by hand.
    pub value: Vec<Run>,
}

impl Pair {
    /// Returns a pair of plain texts.
    pub fn new(name: impl Into<String>, value: impl Into<String>) -> Self {
        Self {
            name: name.into(),
            value: vec![Run::plain(value)],
        }
    }
}

/// One person who signs.
#[derive(Clone, Debug, PartialEq)]
pub struct Signature {
    /// What they did: `Prepared`.
    pub act: String,
    /// Their name, if known; empty leaves a line.
    pub name: String,
    /// The date, if known; empty leaves a line.
    pub date: String,
}

/// One piece of a worksheet.
#[derive(Clone, Debug, PartialEq)]
pub enum Block {
    /// The name of the sheet, and what it is under it.
    Title {
        /// The name.
        text: String,
        /// The line under it; may be empty.
        under: String,
    },
    /// The heading of a section; stays with what follows.
    Heading(String),
    /// Wrapped text.
    Paragraph(Vec<Run>),
    /// Wrapped text behind a bullet.
    Bullet(Vec<Run>),
    /// Named values in a framed grid.
    Pairs {
        /// Pairs side by side, at least 1.
        columns: usize,
        /// The pairs, row by row.
        pairs: Vec<Pair>,
    },
    /// A table.
    Table(Table),
    /// A picture, scaled down if it is larger than the page.
    Picture {
        /// The picture.
        picture: Picture,
        /// The line under it; may be empty.
        caption: String,
    },
    /// Cautions in a framed box with the warning triangle; one entry a paragraph.
    Caution(Vec<Vec<Run>>),
    /// A finding in one sentence: shape, word, text.
    Finding {
        /// The shape of the finding.
        shape: Shape,
        /// Its word.
        word: String,
        /// The rest of the sentence.
        text: Vec<Run>,
    },
    /// Lines to sign on.
    Signatures(Vec<Signature>),
    /// Blocks that stay on one page if they fit on one.
    Together(Vec<Block>),
    /// A block that stays with the next one.
    WithNext(Box<Block>),
    /// What follows starts on a new page.
    NewPage,
}
