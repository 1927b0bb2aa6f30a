//! The tools that share no code with us: qpdf and poppler.

use std::process::{Command, Output};
use std::sync::LazyLock;

/// What installs them.
const INSTALL: &str = "apt-get install -y qpdf poppler-utils";

static MISSING: LazyLock<Option<&str>> = LazyLock::new(|| {
    ["qpdf", "pdftotext", "pdfinfo", "pdffonts", "pdfdetach"]
        .into_iter()
        .find(|name| Command::new(name).arg("--version").output().is_err())
});

/// Returns whether a check that needs the tools can run.
///
/// On a machine without them the check stands aside and says so; where
/// `FARGLOW_REQUIRE_TOOLS` is set, as it is in `.ci/run`, it fails.
pub fn are_there() -> bool {
    let Some(name) = *MISSING else { return true };
    assert!(
        std::env::var_os("FARGLOW_REQUIRE_TOOLS").is_none(),
        "cannot run {name}; install it: {INSTALL}"
    );
    eprintln!("left out, since {name} is not installed: {INSTALL}");
    false
}

/// Runs a tool and returns what it did.
pub fn output(name: &str, arguments: &[&str]) -> Output {
    Command::new(name)
        .args(arguments)
        .output()
        .unwrap_or_else(|error| panic!("cannot run {name} ({error}); install it: {INSTALL}"))
}
