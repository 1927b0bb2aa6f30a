//! `farglow calc`: works every cell out and prints it.

mod report;
mod value;

use std::io::{self, Write};
use std::path::{Path, PathBuf};
use std::sync::atomic::{AtomicUsize, Ordering};
use std::sync::mpsc;

use super::{Outcome, load};

pub use report::print;

/// Works notebooks out and prints them, in the order in which they are given.
///
/// With `json` one object is printed, or a list of them if several files are
/// given; a file that cannot be read then has an object with `error`.
///
/// # Errors
///
/// An [`io::Error`] if `out` or `err` cannot be written.
pub fn run(
    files: &[PathBuf],
    json: bool,
    jobs: usize,
    out: &mut dyn Write,
    err: &mut dyn Write,
) -> io::Result<Outcome> {
    let mut outcome = Outcome::Done;
    let mut values = Vec::new();
    for (file, loaded) in files.iter().zip(load_all(files, jobs)) {
        let name = file.display().to_string();
        match loaded {
            Ok(loaded) => {
                if !loaded.results.is_whole() {
                    outcome = outcome.max(Outcome::Faults);
                }
                if json {
                    values.push(value::notebook(&name, &loaded));
                } else {
                    if file != &files[0] {
                        writeln!(out)?;
                    }
                    print(&name, &loaded, out)?;
                }
            }
            Err(error) => {
                outcome = Outcome::Unusable;
                writeln!(err, "farglow: {name}: {error}")?;
                if json {
                    values.push(serde_json::json!({ "file": name, "error": error.to_string() }));
                }
            }
        }
    }
    if json {
        let value = match <[_; 1]>::try_from(values) {
            Ok([single]) => single,
            Err(several) => serde_json::Value::from(several),
        };
        serde_json::to_writer_pretty(&mut *out, &value)?;
        writeln!(out)?;
    }
    Ok(outcome)
}

/// Loads files with so many threads, in order.
fn load_all(files: &[PathBuf], jobs: usize) -> Vec<Result<load::Loaded, load::Error>> {
    let jobs = jobs.min(files.len()).max(1);
    if jobs == 1 {
        return files.iter().map(|file| load_one(file)).collect();
    }
    let next = AtomicUsize::new(0);
    let (sender, receiver) = mpsc::channel();
    std::thread::scope(|scope| {
        for _ in 0..jobs {
            let sender = sender.clone();
            let next = &next;
            let _ = scope.spawn(move || {
                loop {
                    let at = next.fetch_add(1, Ordering::Relaxed);
                    let Some(file) = files.get(at) else { break };
                    if sender.send((at, load_one(file))).is_err() {
                        break;
                    }
                }
            });
        }
        drop(sender);
        let mut loaded: Vec<_> = receiver.iter().collect();
        loaded.sort_by_key(|(at, _)| *at);
        loaded.into_iter().map(|(_, loaded)| loaded).collect()
    })
}

fn load_one(file: &Path) -> Result<load::Loaded, load::Error> {
    load::file(file)
}
