//! A notebook's file, read and worked out with its bounds.

use std::path::Path;

use crate::notebook::engine::{self, Engine};
use crate::notebook::results::Results;
use crate::notebook::uncertainty::Settings;
use crate::store::{file, schema};

/// A notebook worked out.
#[derive(Debug)]
pub struct Loaded {
    /// The engine that holds it.
    pub engine: Engine,
    /// Everything in it, with bounds.
    pub results: Results,
    /// The digest of what is stored.
    pub digest: String,
    /// The bytes of the file.
    pub bytes: Vec<u8>,
}

/// Why a file could not be loaded.
#[derive(Debug, thiserror::Error)]
pub enum Error {
    /// It could not be read.
    #[error(transparent)]
    File(#[from] file::Error),
    /// It is no notebook.
    #[error(transparent)]
    Schema(#[from] schema::Error),
    /// Its cells cannot stand together.
    #[error("{}", .0.iter().map(ToString::to_string).collect::<Vec<_>>().join("\n"))]
    Engine(Vec<engine::Error>),
}

/// Reads a file and works it out.
///
/// # Errors
///
/// [`Error`] where the file cannot be read or is no notebook. Faults of entries
/// and links stand in the results.
pub fn file(path: &Path) -> Result<Loaded, Error> {
    bytes(file::read(path)?)
}

/// Works out a notebook from the bytes of its file.
///
/// # Errors
///
/// As [`file()`].
pub fn bytes(bytes: Vec<u8>) -> Result<Loaded, Error> {
    let stored = schema::read(&bytes)?;
    let engine = Engine::open(stored.notebook).map_err(Error::Engine)?;
    let bounds = engine
        .bounds(Settings::default(), &mut |_| true)
        .expect("the work is never told to stop");
    let results = Results::new(&engine, &bounds);
    Ok(Loaded {
        engine,
        results,
        digest: stored.digest,
        bytes,
    })
}
