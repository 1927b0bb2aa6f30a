//! Files read with a limit, and written whole or not at all.
//!
//! A file is written beside the old one, brought to the disk and then renamed
//! over it. Whatever goes wrong before that, the old file stays as it was.

mod error;

#[cfg(test)]
mod tests;

use std::fs::{self, File, Permissions, TryLockError};
use std::io::{self, ErrorKind, Read, Write};
use std::path::{Path, PathBuf};

use tempfile::NamedTempFile;

use crate::json::LARGEST;

pub use error::{Doing, Error};

/// Returns what is in a file, up to [`LARGEST`] bytes.
///
/// # Errors
///
/// [`Error::Missing`], [`Error::Folder`], [`Error::TooLarge`] before anything is
/// read, and [`Error::Io`] for all that the system refuses.
pub fn read(path: &Path) -> Result<Vec<u8>, Error> {
    let failed = |source| Error::io(Doing::Read, path, source);
    let too_large = |size| Error::TooLarge {
        path: path.to_owned(),
        size,
    };
    let found = match fs::metadata(path) {
        Ok(found) => found,
        Err(error) if error.kind() == ErrorKind::NotFound => {
            return Err(Error::Missing {
                path: path.to_owned(),
            });
        }
        Err(error) => return Err(failed(error)),
    };
    if found.is_dir() {
        return Err(Error::Folder {
            path: path.to_owned(),
        });
    }
    let most = LARGEST as u64;
    if found.len() > most {
        return Err(too_large(found.len()));
    }
    let file = File::open(path).map_err(failed)?;
    let mut bytes = Vec::new();
    // A pipe has no length beforehand, and a file may grow meanwhile.
    let size = file
        .take(most + 1)
        .read_to_end(&mut bytes)
        .map_err(failed)? as u64;
    if size > most {
        return Err(too_large(size));
    }
    Ok(bytes)
}

/// Writes a file whole or not at all.
///
/// A symlink stays one: the file that it leads to is replaced. The old file's
/// permissions are kept, not its owner; a new file gets those that are usual
/// for the user. While it writes, it holds the old file's lock.
///
/// # Errors
///
/// [`Error::Held`] if somebody else holds the file's lock, [`Error::Appeared`]
/// if a new file was created by somebody else meanwhile, [`Error::Protected`]
/// for a file that nobody may write, [`Error::Folder`], [`Error::NotAFile`],
/// [`Error::DeadLink`] and [`Error::NoName`] for what is no place for a file,
/// and [`Error::Io`] for all that the system refuses. In every case but
/// [`Doing::SyncFolder`] the old file is as it was and nothing is left beside it.
pub fn write(path: &Path, bytes: &[u8]) -> Result<(), Error> {
    write_by(path, &mut |file| file.write_all(bytes))
}

fn write_by(path: &Path, fill: &mut dyn FnMut(&mut File) -> io::Result<()>) -> Result<(), Error> {
    let place = Place::find(path)?;
    let failed = |doing| move |source| Error::io(doing, path, source);

    // Held until the end of this function.
    let old = place.lock(path)?;
    let mut beside = create_beside(&place.target, &place.folder).map_err(failed(Doing::Write))?;
    if let Some((_, permissions)) = &old {
        let file = beside.as_file();
        file.set_permissions(permissions.clone())
            .map_err(failed(Doing::Write))?;
    }
    fill(beside.as_file_mut()).map_err(failed(Doing::Write))?;
    beside.as_file().sync_all().map_err(failed(Doing::Write))?;
    let renamed = if old.is_some() {
        beside.persist(&place.target)
    } else {
        beside.persist_noclobber(&place.target)
    };
    match renamed {
        Ok(_) => {}
        Err(refused) if refused.error.kind() == ErrorKind::AlreadyExists => {
            return Err(Error::Appeared {
                path: path.to_owned(),
            });
        }
        Err(refused) => return Err(Error::io(Doing::Replace, path, refused.error)),
    }
    sync_folder(&place.folder).map_err(failed(Doing::SyncFolder))
}

/// Where a file is to be written, with every symlink followed.
struct Place {
    folder: PathBuf,
    target: PathBuf,
    exists: bool,
}

impl Place {
    fn find(path: &Path) -> Result<Place, Error> {
        let failed = |source| Error::io(Doing::Find, path, source);
        let no_name = || Error::NoName {
            path: path.to_owned(),
        };
        match fs::canonicalize(path) {
            Ok(target) => {
                let folder = target.parent().ok_or_else(no_name)?.to_owned();
                Ok(Place {
                    folder,
                    target,
                    exists: true,
                })
            }
            Err(error) if error.kind() == ErrorKind::NotFound => {
                if fs::symlink_metadata(path).is_ok() {
                    return Err(Error::DeadLink {
                        path: path.to_owned(),
                    });
                }
                let name = path.file_name().ok_or_else(no_name)?;
                let folder = match path.parent() {
                    Some(folder) if folder != Path::new("") => folder,
                    _ => Path::new("."),
                };
                let folder = fs::canonicalize(folder).map_err(failed)?;
                let target = folder.join(name);
                Ok(Place {
                    folder,
                    target,
                    exists: false,
                })
            }
            Err(error) => Err(failed(error)),
        }
    }

    /// Checks and locks the old file, if there is one; the lock goes with it.
    fn lock(&self, path: &Path) -> Result<Option<(File, Permissions)>, Error> {
        if !self.exists {
            return Ok(None);
        }
        let failed = |source| Error::io(Doing::Lock, path, source);
        let path = path.to_owned();
        let found = fs::metadata(&self.target).map_err(failed)?;
        if found.is_dir() {
            return Err(Error::Folder { path });
        }
        if !found.is_file() {
            return Err(Error::NotAFile { path });
        }
        let permissions = found.permissions();
        // Renaming over it would not ask.
        if permissions.readonly() {
            return Err(Error::Protected { path });
        }
        let file = File::options()
            .read(true)
            .write(true)
            .open(&self.target)
            .map_err(failed)?;
        match file.try_lock() {
            Ok(()) => Ok(Some((file, permissions))),
            // Some network folders have no locks; writing whole still holds there.
            Err(TryLockError::Error(error)) if error.kind() == ErrorKind::Unsupported => {
                Ok(Some((file, permissions)))
            }
            Err(TryLockError::WouldBlock) => Err(Error::Held { path }),
            Err(TryLockError::Error(error)) => Err(failed(error)),
        }
    }
}

fn create_beside(target: &Path, folder: &Path) -> io::Result<NamedTempFile> {
    let mut prefix = std::ffi::OsString::from(".");
    // Names have a limit, 255 bytes nearly everywhere: a long one is left out.
    if let Some(name) = target.file_name().filter(|name| name.len() <= 200) {
        prefix.push(name);
    }
    prefix.push(".");
    let mut builder = tempfile::Builder::new();
    let builder = builder.prefix(&prefix).suffix(".part");
    #[cfg(unix)]
    {
        use std::os::unix::fs::PermissionsExt;
        // What a new file has; the user's mask takes away from it.
        let _ = builder.permissions(Permissions::from_mode(0o666));
    }
    builder.tempfile_in(folder)
}

/// Brings the renaming itself to the disk.
fn sync_folder(folder: &Path) -> io::Result<()> {
    #[cfg(unix)]
    match File::open(folder)?.sync_all() {
        // Not every file system can.
        Err(error)
            if matches!(
                error.kind(),
                ErrorKind::InvalidInput | ErrorKind::Unsupported
            ) => {}
        done => return done,
    }
    #[cfg(not(unix))]
    let _ = folder;
    Ok(())
}
