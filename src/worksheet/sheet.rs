//! A notebook's results as the blocks of a worksheet, and the whole as a PDF
//! that carries its notebook inside.

mod findings;
mod inputs;
mod limits;
mod method;
mod plot;

use super::block::{Block, Pair, Run, Signature};
use super::layout::{self, Furniture, Paper};
use super::paint::{self, Meta};
use super::{Error, attach};
use crate::notebook::caution;
use crate::notebook::date::is_date;
use crate::notebook::engine::Engine;
use crate::notebook::results::Results;

/// The media type of a notebook.
pub const MEDIA_TYPE: &str = "application/json";

/// A notebook worked out, ready to be put on paper.
#[derive(Clone, Copy, Debug)]
pub struct Sheet<'a> {
    /// The engine that holds the notebook.
    pub engine: &'a Engine,
    /// Everything that was worked out.
    pub results: &'a Results,
    /// The digest of what is stored, 64 hexadecimal digits.
    pub digest: &'a str,
    /// The name of the notebook's file, without its folder.
    pub file: &'a str,
    /// The bytes of the notebook's file.
    pub contents: &'a [u8],
}

/// A worksheet as a file.
#[derive(Clone, Debug)]
pub struct Pdf {
    /// The bytes of the file.
    pub bytes: Vec<u8>,
    /// How many pages it has.
    pub pages: usize,
}

impl Sheet<'_> {
    /// Returns the worksheet. The same notebook gives the same bytes.
    ///
    /// # Errors
    ///
    /// [`Error`] if the PDF cannot be written.
    pub fn pdf(&self, paper: Paper) -> Result<Pdf, Error> {
        let notebook = self.engine.notebook();
        let title = notebook.title.as_deref().unwrap_or("Untitled job");
        let job = &notebook.job;
        let text = |line: &Option<String>| line.clone().unwrap_or_default();
        let left = self.results.readiness.len();
        let furniture = Furniture {
            title: title.to_owned(),
            site: text(&job.site),
            revision: text(&job.revision),
            digest: format!("sha256:{}", self.digest),
            program: paint::PRODUCER.to_owned(),
            draft: (left > 0).then(|| match left {
                1 => "one thing is left to confirm".to_owned(),
                _ => format!("{left} things are left to confirm"),
            }),
        };
        let pages = layout::pages(&self.blocks(), paper, &furniture);
        // A date that is not one belongs on the sheet as it was typed, but not
        // into the file's metadata.
        let date = job.date.clone().filter(|date| is_date(date));
        let filled = |line: &Option<String>| line.clone().filter(|text| !text.trim().is_empty());
        let meta = Meta {
            title: title.to_owned(),
            author: filled(&job.prepared_by),
            subject: filled(&job.task),
            date,
        };
        let bytes = paint::pdf(&pages, &meta)?;
        let bytes = attach::attach(
            &bytes,
            self.file,
            MEDIA_TYPE,
            self.contents,
            "the notebook that this worksheet was made from",
        )?;
        Ok(Pdf {
            bytes,
            pages: pages.len(),
        })
    }

    /// Returns the worksheet's blocks, in order.
    #[must_use]
    pub fn blocks(&self) -> Vec<Block> {
        let mut blocks = self.top();
        blocks.extend(findings::blocks(self));
        blocks.extend(self.left());
        blocks.extend(plot::blocks(self));
        blocks.extend(findings::tables(self));
        blocks.extend(inputs::blocks(self));
        blocks.extend(method::blocks(self));
        blocks.extend(limits::blocks(self));
        blocks.extend(self.cautions());
        blocks.push(self.signatures());
        blocks
    }

    fn top(&self) -> Vec<Block> {
        let notebook = self.engine.notebook();
        let mut pairs: Vec<Pair> = notebook
            .job
            .lines()
            .into_iter()
            .map(|(name, text)| Pair::new(name.replace('_', " "), text.unwrap_or_default()))
            .collect();
        pairs.push(Pair::new("notebook", self.file));
        let main = ["planning-aid", "local-law", "measure-first"];
        let cautions = caution::always()
            .into_iter()
            .filter(|caution| main.contains(&caution.code.as_str()))
            .map(|caution| vec![Run::plain(caution.text)])
            .collect();
        vec![
            Block::Title {
                text: notebook
                    .title
                    .clone()
                    .unwrap_or_else(|| "Untitled job".to_owned()),
                under: "Worksheet: heat radiation at work positions".to_owned(),
            },
            Block::Pairs { columns: 4, pairs },
            Block::Caution(cautions),
        ]
    }

    fn left(&self) -> Vec<Block> {
        if self.results.readiness.is_empty() {
            return Vec::new();
        }
        let mut blocks = vec![Block::Heading("Left before this sheet is final".to_owned())];
        blocks.extend(
            self.results
                .readiness
                .iter()
                .map(|item| Block::Bullet(vec![Run::plain(item.text.clone())])),
        );
        blocks
    }

    fn cautions(&self) -> Vec<Block> {
        let mut texts: Vec<Vec<Run>> = caution::always()
            .into_iter()
            .map(|caution| vec![Run::plain(caution.text)])
            .collect();
        // The same words called up by several cells are said once, with their
        // names in front.
        let mut called: Vec<(String, Vec<&str>)> = Vec::new();
        for cell in &self.results.cells {
            for caution in &cell.cautions {
                match called.iter_mut().find(|(text, _)| *text == caution.text) {
                    Some((_, cells)) => cells.push(&cell.name),
                    None => called.push((caution.text.clone(), vec![&cell.name])),
                }
            }
        }
        texts.extend(called.into_iter().map(|(text, cells)| {
            vec![
                Run::bold(format!("{}: ", cells.join(", "))),
                Run::plain(text),
            ]
        }));
        vec![Block::Heading("Cautions".to_owned()), Block::Caution(texts)]
    }

    fn signatures(&self) -> Block {
        let job = &self.engine.notebook().job;
        let line = |act: &str, name: Option<&String>| Signature {
            act: act.to_owned(),
            name: name.cloned().unwrap_or_default(),
            date: String::new(),
        };
        Block::Together(vec![
            Block::Heading("Signatures".to_owned()),
            Block::Signatures(vec![
                line("Prepared", job.prepared_by.as_ref()),
                line("Checked", job.checked_by.as_ref()),
                line("Approved", None),
            ]),
        ])
    }
}
