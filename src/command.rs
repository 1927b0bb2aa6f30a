//! The command line: one file per subcommand.

pub mod calc;
pub mod issue;
pub mod load;
pub mod templates;
pub mod window;

use std::ffi::OsString;
use std::io::{self, Write};
use std::path::PathBuf;
use std::process::ExitCode;

use clap::{CommandFactory, Parser, Subcommand, ValueEnum};

use crate::worksheet::layout;

/// The caution that stands over everything that is printed.
pub const CAUTION: &str = "Planning aid only. Local law, the rules in force where you work and \
                           licensed practice decide. Measure before anyone relies on a figure.";

const ABOUT: &str = "Where may a person stand near a hot source, for how long, and by whose \
                     guidance?\n\nfarglow works out the irradiance at work positions around \
                     furnace doors, ladles and pools, judges it by cited exposure guidance, and \
                     writes the worksheet to sign and file.";

const AFTER: &str = "A first job:\n  \
    farglow                                            the window, on the demo or the notebook last open\n  \
    farglow templates                                  what there is to start from\n  \
    farglow templates --new ladle -o my-ladle.farglow  a notebook of your own, to be edited as text\n  \
    farglow calc my-ladle.farglow                      every figure, finding and caution\n  \
    farglow issue my-ladle.farglow -o my-ladle.pdf     the worksheet\n\n\
    Exit codes: 0 all worked out; 2 bad usage, or a file that cannot be read; 3 a cell is in \
    error.\n\nPlanning aid only: local law, the rules in force where you work and licensed \
    practice decide. Measure before anyone relies on a figure.";

#[derive(Debug, Parser)]
#[command(name = "farglow", version, about = ABOUT, after_help = AFTER, max_term_width = 100)]
#[command(args_conflicts_with_subcommands = true)]
struct Arguments {
    #[command(subcommand)]
    command: Option<Command>,
    /// The notebook to open in the window; else the one last open, else the demo
    #[arg(value_name = "FILE")]
    file: Option<PathBuf>,
}

#[derive(Debug, Subcommand)]
enum Command {
    /// Work every cell of notebooks out and print them, with findings and cautions
    #[command(after_long_help = crate::notebook::reference::text())]
    Calc {
        /// The notebooks
        #[arg(required = true, value_name = "FILE")]
        files: Vec<PathBuf>,
        /// Print JSON for other programs
        #[arg(long)]
        json: bool,
        /// How many notebooks to work on at once
        #[arg(long, value_name = "N", default_value_t = 1, value_parser = clap::value_parser!(u16).range(1..=64))]
        jobs: u16,
    },
    /// Write the worksheet of a notebook as PDF; DRAFT until nothing is left to confirm
    Issue {
        /// The notebook
        file: PathBuf,
        /// The worksheet to write
        #[arg(short, long, value_name = "OUT.pdf")]
        output: PathBuf,
        /// The paper
        #[arg(long, value_enum, default_value_t = Paper::A4)]
        paper: Paper,
    },
    /// List site templates, or start a notebook from one
    Templates {
        /// The template to start from
        #[arg(long, value_name = "NAME", requires = "output")]
        new: Option<String>,
        /// The notebook to write; a file that is there already is left alone
        #[arg(short, long, value_name = "FILE", requires = "new")]
        output: Option<PathBuf>,
    },
}

#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
enum Paper {
    /// 210 mm by 297 mm
    A4,
    /// 8½ in by 11 in
    Letter,
}

impl From<Paper> for layout::Paper {
    fn from(paper: Paper) -> Self {
        match paper {
            Paper::A4 => layout::Paper::A4,
            Paper::Letter => layout::Paper::Letter,
        }
    }
}

/// How a run of the program ended.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Outcome {
    /// Everything was worked out.
    Done,
    /// Some cell is in error or waits for one that is.
    Faults,
    /// Bad usage, an unreadable file, or faults of JSON, field, kind or name.
    Unusable,
}

impl Outcome {
    /// Returns the exit code.
    #[must_use]
    pub const fn code(self) -> u8 {
        match self {
            Outcome::Done => 0,
            Outcome::Faults => 3,
            Outcome::Unusable => 2,
        }
    }
}

/// Runs the program on its arguments, and returns its exit code.
///
/// Results go to `out`, everything that went wrong to `err`.
pub fn run(
    arguments: impl IntoIterator<Item = OsString>,
    out: &mut dyn Write,
    err: &mut dyn Write,
) -> ExitCode {
    let arguments: Vec<OsString> = arguments.into_iter().collect();
    if let Some((typed, near)) = mistyped(&arguments) {
        let _ = writeln!(
            err,
            "farglow: no command and no file is named `{typed}`, did you mean `{near}`?"
        );
        return ExitCode::from(Outcome::Unusable.code());
    }
    let outcome = match Arguments::try_parse_from(arguments) {
        Ok(arguments) => match dispatch(arguments, out, err) {
            Ok(outcome) => outcome,
            Err(error) => {
                // The reader of a pipe that went away wants nothing more.
                if error.kind() == io::ErrorKind::BrokenPipe {
                    return ExitCode::SUCCESS;
                }
                let _ = writeln!(err, "farglow: cannot write what was worked out: {error}");
                Outcome::Unusable
            }
        },
        Err(help) => {
            let text = help.render().to_string();
            if help.use_stderr() {
                let _ = write!(err, "{text}");
                Outcome::Unusable
            } else {
                let _ = write!(out, "{text}");
                Outcome::Done
            }
        }
    };
    ExitCode::from(outcome.code())
}

/// Returns a first word that is neither a command nor a file, with the command
/// that was most likely meant: it would else be taken for a notebook's name.
fn mistyped(arguments: &[OsString]) -> Option<(String, String)> {
    let typed = arguments.get(1)?.to_str()?;
    let names: Vec<String> = Arguments::command()
        .get_subcommands()
        .map(|command| command.get_name().to_owned())
        .collect();
    if names.iter().any(|name| name == typed) || std::path::Path::new(typed).exists() {
        return None;
    }
    let near = crate::spelling::nearest(typed, names.iter().map(String::as_str))?;
    Some((typed.to_owned(), near.to_owned()))
}

fn dispatch(arguments: Arguments, out: &mut dyn Write, err: &mut dyn Write) -> io::Result<Outcome> {
    match arguments.command {
        None => window::run(arguments.file.as_deref(), err),
        Some(Command::Calc { files, json, jobs }) => {
            calc::run(&files, json, usize::from(jobs), out, err)
        }
        Some(Command::Issue {
            file,
            output,
            paper,
        }) => issue::run(&file, &output, paper.into(), out, err),
        Some(Command::Templates { new, output }) => match (new, output) {
            (Some(name), Some(output)) => templates::start(&name, &output, out, err),
            _ => templates::list(out),
        },
    }
}
