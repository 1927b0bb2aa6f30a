//! Runs the built program, each time in a folder of its own.

use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};

use serde_json::Value;

/// What a run of the program left behind.
#[derive(Debug)]
pub struct Ran {
    pub code: i32,
    pub out: String,
    pub err: String,
}

/// A folder that is gone with the test.
pub struct Desk {
    folder: tempfile::TempDir,
}

impl Desk {
    pub fn new() -> Self {
        Desk {
            folder: tempfile::tempdir().expect("a temporary folder can be made"),
        }
    }

    pub fn path(&self, name: &str) -> PathBuf {
        self.folder.path().join(name)
    }

    pub fn put(&self, name: &str, bytes: impl AsRef<[u8]>) -> PathBuf {
        let path = self.path(name);
        std::fs::write(&path, bytes).expect("a temporary file can be written");
        path
    }

    pub fn read(&self, name: &str) -> Vec<u8> {
        std::fs::read(self.path(name)).unwrap_or_else(|error| panic!("{name}: {error}"))
    }

    pub fn command(&self, arguments: &[&str]) -> Command {
        let mut command = Command::new(env!("CARGO_BIN_EXE_farglow"));
        let _ = command
            .current_dir(self.folder.path())
            .args(arguments)
            .stdin(Stdio::null());
        command
    }

    /// Runs the program in the folder. Whatever it is given, it never panics.
    pub fn run(&self, arguments: &[&str]) -> Ran {
        let output = self
            .command(arguments)
            .output()
            .expect("the program can be started");
        let ran = Ran {
            code: output.status.code().unwrap_or(-1),
            out: String::from_utf8(output.stdout).expect("it prints UTF-8"),
            err: String::from_utf8_lossy(&output.stderr).into_owned(),
        };
        assert!(
            !ran.err.contains("panicked") && (0..=3).contains(&ran.code) && ran.code != 1,
            "{arguments:?}: {ran:?}"
        );
        ran
    }

    /// Runs `calc --json` and reads what it prints.
    pub fn calc(&self, files: &[&str], code: i32) -> Value {
        let mut arguments = vec!["calc", "--json"];
        arguments.extend(files);
        let ran = self.run(&arguments);
        assert_eq!(ran.code, code, "{files:?}: {}", ran.err);
        serde_json::from_str(&ran.out).unwrap_or_else(|error| panic!("{error}: {}", ran.out))
    }
}

/// The object of a cell in what `calc --json` prints.
pub fn cell<'a>(notebook: &'a Value, name: &str) -> &'a Value {
    notebook["cells"]
        .as_array()
        .and_then(|cells| cells.iter().find(|cell| cell["name"] == name))
        .unwrap_or_else(|| panic!("no cell {name} in {notebook}"))
}

pub fn text(path: &Path) -> &str {
    path.to_str().expect("temporary folders have plain names")
}

/// A notebook file of these cells.
pub fn notebook(cells: &str) -> String {
    format!("{{\"farglow\": 1, \"cells\": [{cells}]}}")
}
