use std::fs::{self, File};
use std::io::Write as _;
use std::path::Path;

use tempfile::TempDir;

use super::{Doing, Error, read, write, write_by};
use crate::json::LARGEST;

fn folder() -> TempDir {
    tempfile::tempdir().expect("there is a folder for temporary files")
}

fn names(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> = fs::read_dir(folder)
        .expect("the folder is there")
        .map(|entry| entry.expect("it can be listed").file_name())
        .map(|name| name.to_string_lossy().into_owned())
        .collect();
    names.sort_unstable();
    names
}

fn assert_says(result: Result<impl std::fmt::Debug, Error>, expected: &str) {
    let said = result.expect_err("it must be refused").to_string();
    assert!(
        said.contains(expected),
        "`{said}` does not say `{expected}`"
    );
}

#[test]
fn what_is_written_is_read_and_replaces_what_was_there() {
    let folder = folder();
    let path = folder.path().join("door.farglow");
    for bytes in [&b"first"[..], b"", b"third and longer \xff\x00"] {
        write(&path, bytes).expect("the folder can be written");
        assert_eq!(read(&path).expect("it is there"), bytes);
        assert_eq!(names(folder.path()), ["door.farglow"]);
    }
}

#[test]
fn a_name_of_the_greatest_length_can_be_written() {
    let folder = folder();
    let path = folder.path().join("n".repeat(255));
    write(&path, b"1").expect("255 bytes are allowed");
    assert_eq!(read(&path).expect("it is there"), b"1");
    let too_long = folder.path().join("n".repeat(256));
    assert_says(write(&too_long, b"1"), "the name is too long");
    assert_eq!(names(folder.path()).len(), 1);
}

#[test]
fn reading_says_why_it_cannot() {
    let folder = folder();
    let missing = folder.path().join("none.farglow");
    assert_says(read(&missing), "there is no such file");
    assert_says(read(folder.path()), "is a folder: name a file in it");
    let file = folder.path().join("file");
    fs::write(&file, b"x").expect("the folder can be written");
    assert_says(read(&file.join("below")), "a part of its path is a file");
    let large = folder.path().join("large");
    let made = File::create(&large).expect("the folder can be written");
    made.set_len(LARGEST as u64 + 1)
        .expect("a gap takes no room");
    assert_says(
        read(&large),
        "it has 67108865 bytes or more, and at most 67108864",
    );
    made.set_len(LARGEST as u64).expect("a gap takes no room");
    assert_eq!(
        read(&large).expect("it is just small enough").len(),
        LARGEST
    );
}

#[test]
fn writing_says_why_it_cannot_and_leaves_nothing_behind() {
    let folder = folder();
    let file = folder.path().join("file");
    fs::write(&file, b"old").expect("the folder can be written");
    let nowhere = folder.path().join("no folder").join("file");
    assert_says(write(&nowhere, b"new"), "there is no such folder");
    assert_says(
        write(&file.join("below"), b"new"),
        "a part of its path is a file",
    );
    assert_says(
        write(folder.path(), b"new"),
        "is a folder: name a file in it",
    );
    assert_says(
        write(Path::new("/"), b"new"),
        "expected a file name at the end",
    );
    assert_says(
        write(&folder.path().join("none").join(".."), b"new"),
        "expected a file name",
    );
    assert_eq!(names(folder.path()), ["file"]);
    assert_eq!(fs::read(&file).expect("it is there"), b"old");
}

#[test]
fn a_bare_name_is_written_into_the_current_folder() {
    let place = super::Place::find(Path::new("no such file here")).expect("a name is enough");
    let here = fs::canonicalize(".").expect("there is a current folder");
    assert_eq!(place.target, here.join("no such file here"));
    assert_eq!(place.folder, here);
}

#[test]
fn a_write_that_breaks_off_leaves_the_old_file_whole() {
    let folder = folder();
    let path = folder.path().join("door.farglow");
    let broken = |file: &mut File| {
        file.write_all(b"half of the new")?;
        Err(std::io::Error::from(std::io::ErrorKind::StorageFull))
    };
    assert_says(write_by(&path, &mut { broken }), "the disk is full");
    assert_eq!(names(folder.path()), [""; 0]);
    write(&path, b"old").expect("the folder can be written");
    assert_says(
        write_by(&path, &mut { broken }),
        "what was there before is unchanged",
    );
    assert_eq!(names(folder.path()), ["door.farglow"]);
    assert_eq!(read(&path).expect("it is there"), b"old");
}

#[test]
fn a_file_that_somebody_else_holds_is_not_written() {
    let folder = folder();
    let path = folder.path().join("door.farglow");
    write(&path, b"old").expect("the folder can be written");
    let other = File::open(&path).expect("it is there");
    other.try_lock().expect("nobody else holds it");
    assert_says(write(&path, b"new"), "another program is writing it");
    assert_eq!(read(&path).expect("reading asks for no lock"), b"old");
    assert_eq!(names(folder.path()), ["door.farglow"]);
    drop(other);
    write(&path, b"new").expect("it was let go");
    assert_eq!(read(&path).expect("it is there"), b"new");
}

#[test]
fn a_file_that_appears_meanwhile_is_not_overwritten() {
    let folder = folder();
    let path = folder.path().join("door.farglow");
    let result = write_by(&path, &mut |file| {
        fs::write(&path, b"theirs")?;
        file.write_all(b"ours")
    });
    assert_says(result, "somebody else created it a moment ago");
    assert_eq!(read(&path).expect("it is there"), b"theirs");
    assert_eq!(names(folder.path()), ["door.farglow"]);
}

#[test]
fn many_writers_leave_one_whole_file() {
    let folder = folder();
    let path = folder.path().join("door.farglow");
    write(&path, b"old").expect("the folder can be written");
    std::thread::scope(|scope| {
        for writer in 0..4_u8 {
            let path = &path;
            let _ = scope.spawn(move || {
                for _ in 0..20 {
                    match write(path, &[writer; 5000]) {
                        Ok(()) | Err(Error::Held { .. }) => {}
                        Err(error) => panic!("{error}"),
                    }
                }
            });
        }
    });
    let bytes = read(&path).expect("it is there");
    assert!(
        bytes.len() == 5000 && bytes.iter().all(|byte| *byte == bytes[0]),
        "{} bytes, mixed",
        bytes.len()
    );
    assert_eq!(names(folder.path()), ["door.farglow"]);
}

#[test]
fn a_write_protected_file_is_not_replaced() {
    let folder = folder();
    let path = folder.path().join("door.farglow");
    write(&path, b"old").expect("the folder can be written");
    let mut permissions = fs::metadata(&path).expect("it is there").permissions();
    permissions.set_readonly(true);
    fs::set_permissions(&path, permissions).expect("it is ours");
    assert_says(write(&path, b"new"), "the file is write-protected");
    assert_eq!(read(&path).expect("it is there"), b"old");
}

#[test]
fn errors_name_the_file_as_it_was_given() {
    let path = Path::new("no such folder/door.farglow");
    let error = write(path, b"").expect_err("there is no such folder");
    assert_eq!(error.path(), path);
    assert!(
        matches!(
            error,
            Error::Io {
                doing: Doing::Find,
                ..
            }
        ),
        "{error:?}"
    );
    assert_eq!(
        error.to_string(),
        "cannot save `no such folder/door.farglow`: there is no such folder"
    );
}

#[cfg(unix)]
mod unix {
    use std::os::unix::fs::{PermissionsExt, symlink};

    use super::*;

    fn mode(path: &Path) -> u32 {
        fs::metadata(path)
            .expect("it is there")
            .permissions()
            .mode()
            & 0o7777
    }

    #[test]
    fn a_symlink_stays_one_and_its_target_is_written() {
        let folder = folder();
        let other = tempfile::tempdir().expect("there is a folder for temporary files");
        let target = other.path().join("real.farglow");
        write(&target, b"old").expect("the folder can be written");
        let link = folder.path().join("link.farglow");
        let second = folder.path().join("second.farglow");
        symlink(&target, &link).expect("links can be made");
        symlink("link.farglow", &second).expect("links can be made");
        write(&second, b"new").expect("the folder can be written");
        for path in [&link, &second] {
            let kind = fs::symlink_metadata(path).expect("it is there").file_type();
            assert!(kind.is_symlink(), "{} is no link any more", path.display());
        }
        assert_eq!(fs::read(&target).expect("it is there"), b"new");
        assert_eq!(names(folder.path()), ["link.farglow", "second.farglow"]);
        assert_eq!(names(other.path()), ["real.farglow"]);
    }

    #[test]
    fn a_link_to_nowhere_is_not_replaced() {
        let folder = folder();
        let link = folder.path().join("link.farglow");
        symlink("nowhere", &link).expect("links can be made");
        assert_says(write(&link, b"new"), "a link to a file that is not there");
        assert_says(read(&link), "there is no such file");
        assert_eq!(names(folder.path()), ["link.farglow"]);
        let ring = folder.path().join("ring");
        symlink("ring", &ring).expect("links can be made");
        assert!(write(&ring, b"new").is_err());
        assert!(read(&ring).is_err());
    }

    #[test]
    fn permissions_are_kept_and_new_files_get_the_usual_ones() {
        let folder = folder();
        let usual = folder.path().join("usual");
        let _ = File::create(&usual).expect("the folder can be written");
        let path = folder.path().join("door.farglow");
        write(&path, b"1").expect("the folder can be written");
        assert_eq!(
            mode(&path),
            mode(&usual),
            "{:o} {:o}",
            mode(&path),
            mode(&usual)
        );
        for kept in [0o600, 0o640, 0o664, 0o755] {
            fs::set_permissions(&path, fs::Permissions::from_mode(kept)).expect("it is ours");
            write(&path, b"2").expect("the folder can be written");
            assert_eq!(mode(&path), kept, "{:o} became {:o}", kept, mode(&path));
        }
    }

    #[test]
    fn devices_are_not_replaced_by_files() {
        for device in ["/dev/null", "/dev/full"] {
            assert_says(write(Path::new(device), b"new"), "it is a device or a pipe");
        }
        assert_says(
            read(Path::new("/dev/zero")),
            "it has 67108865 bytes or more",
        );
    }

    /// The system's own error of a full disk, from the device made to give it.
    #[cfg(target_os = "linux")]
    #[test]
    fn a_full_disk_is_said_and_the_old_file_stays() {
        let folder = folder();
        let path = folder.path().join("door.farglow");
        write(&path, b"old").expect("the folder can be written");
        let result = write_by(&path, &mut |file| {
            file.write_all(b"ne")?;
            File::options()
                .write(true)
                .open("/dev/full")?
                .write_all(b"w")
        });
        assert_says(result, "the disk is full, make room or save elsewhere");
        assert_eq!(read(&path).expect("it is there"), b"old");
        assert_eq!(names(folder.path()), ["door.farglow"]);
    }

    /// A folder in which nobody, not even the administrator, can create a file.
    #[cfg(target_os = "linux")]
    #[test]
    fn a_folder_that_takes_no_files_is_said() {
        let result = write(Path::new("/proc/door.farglow"), b"new");
        let error = result.expect_err("no file can be created there");
        assert!(
            matches!(
                error,
                Error::Io {
                    doing: Doing::Write,
                    ..
                }
            ),
            "{error:?}"
        );
    }
}
