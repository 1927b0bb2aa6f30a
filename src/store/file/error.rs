use std::io::{self, ErrorKind};
use std::path::{Path, PathBuf};

use crate::json::LARGEST;

/// Why a file was not read or written; the text names the file as it was given.
#[derive(Debug, thiserror::Error)]
#[non_exhaustive]
pub enum Error {
    /// There is no such file.
    #[error("cannot read `{}`: there is no such file, check its name and folder", path.display())]
    Missing {
        /// The file.
        path: PathBuf,
    },
    /// It is a folder.
    #[error("`{}` is a folder: name a file in it", path.display())]
    Folder {
        /// The folder.
        path: PathBuf,
    },
    /// It has more bytes than are read.
    #[error(
        "cannot read `{}`: it has {size} bytes or more, and at most {LARGEST} are read: split it",
        path.display()
    )]
    TooLarge {
        /// The file.
        path: PathBuf,
        /// Its size in bytes, as far as it was read.
        size: u64,
    },
    /// It is neither a file nor a folder.
    #[error("cannot save `{}`: it is a device or a pipe, choose a file", path.display())]
    NotAFile {
        /// What it is called.
        path: PathBuf,
    },
    /// It may not be written by anybody.
    #[error(
        "cannot save `{}`: the file is write-protected, save under another name or lift the protection",
        path.display()
    )]
    Protected {
        /// The file.
        path: PathBuf,
    },
    /// It is a symlink that leads nowhere.
    #[error("cannot save `{}`: it is a link to a file that is not there, remove the link", path.display())]
    DeadLink {
        /// The link.
        path: PathBuf,
    },
    /// The path does not end in a name.
    #[error("cannot save `{}`: expected a file name at the end", path.display())]
    NoName {
        /// The path.
        path: PathBuf,
    },
    /// Somebody else holds its lock.
    #[error(
        "cannot save `{}`: another program is writing it, try again or save under another name",
        path.display()
    )]
    Held {
        /// The file.
        path: PathBuf,
    },
    /// Somebody else created it while it was written.
    #[error(
        "cannot save `{}`: somebody else created it a moment ago, look at that file first",
        path.display()
    )]
    Appeared {
        /// The file.
        path: PathBuf,
    },
    /// The system refused.
    #[error("{} `{}`{}: {}{}", doing.words(), path.display(), doing.step(), reason(source), doing.state())]
    Io {
        /// What was being done.
        doing: Doing,
        /// The file.
        path: PathBuf,
        /// What the system said.
        source: io::Error,
    },
}

/// What was being done to a file.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[non_exhaustive]
pub enum Doing {
    /// Reading it.
    Read,
    /// Finding its folder, to save it.
    Find,
    /// Locking the old file, to save it.
    Lock,
    /// Writing the new file beside the old one.
    Write,
    /// Renaming the new file over the old one.
    Replace,
    /// Bringing the renaming to the disk: the file itself is written.
    SyncFolder,
}

impl Doing {
    fn words(self) -> &'static str {
        match self {
            Doing::Read => "cannot read",
            Doing::Find | Doing::Lock | Doing::Write | Doing::Replace => "cannot save",
            Doing::SyncFolder => "cannot be sure of",
        }
    }

    fn step(self) -> &'static str {
        match self {
            Doing::Read | Doing::Find => "",
            Doing::Lock => " (locking the old file)",
            Doing::Write => " (writing beside the old file)",
            Doing::Replace => " (replacing the old file)",
            Doing::SyncFolder => " (bringing its folder to the disk)",
        }
    }

    fn state(self) -> &'static str {
        match self {
            Doing::Read | Doing::Find => "",
            Doing::Lock | Doing::Write | Doing::Replace => "; what was there before is unchanged",
            Doing::SyncFolder => "; the new file is in place, but may not outlive a power cut",
        }
    }
}

/// The usual reasons in words with a remedy, the others as the system says them.
fn reason(source: &io::Error) -> String {
    let words = match source.kind() {
        ErrorKind::NotFound => "there is no such folder",
        ErrorKind::PermissionDenied => "you have no permission for it here",
        ErrorKind::StorageFull => "the disk is full, make room or save elsewhere",
        ErrorKind::QuotaExceeded => {
            "your share of the disk is used up, make room or save elsewhere"
        }
        ErrorKind::ReadOnlyFilesystem => "the disk is read-only, save elsewhere",
        ErrorKind::NotADirectory => "a part of its path is a file, not a folder",
        ErrorKind::InvalidFilename => "the name is too long or not possible here",
        _ => return source.to_string(),
    };
    words.to_owned()
}

impl Error {
    pub(super) fn io(doing: Doing, path: &Path, source: io::Error) -> Error {
        Error::Io {
            doing,
            path: path.to_owned(),
            source,
        }
    }

    /// Returns the file, as it was given.
    #[must_use]
    pub fn path(&self) -> &Path {
        match self {
            Error::Missing { path }
            | Error::Folder { path }
            | Error::TooLarge { path, .. }
            | Error::NotAFile { path }
            | Error::Protected { path }
            | Error::DeadLink { path }
            | Error::NoName { path }
            | Error::Held { path }
            | Error::Appeared { path }
            | Error::Io { path, .. } => path,
        }
    }
}
