//! The system's own dialog for files, beside the path that can always be typed.
//!
//! The dialog is another program's: it is asked off the window's thread, and
//! where there is none the window says so and goes on.

use std::ffi::OsString;
use std::path::{Path, PathBuf};
use std::sync::Arc;

/// What the dialog is asked for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Purpose {
    /// A notebook to open.
    Open,
    /// Where to store the notebook.
    Save,
    /// Where to write the worksheet.
    Worksheet,
}

/// A question to the dialog.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Ask {
    /// What for.
    pub purpose: Purpose,
    /// The path that is typed already, where one is.
    pub near: Option<PathBuf>,
}

/// What the dialog answers.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Answer {
    /// This file.
    Chosen(PathBuf),
    /// It was left without a choice.
    Left,
    /// There is no dialog on this machine, for this reason.
    Missing(&'static str),
}

/// Who is asked: the system, or a test.
#[derive(Clone)]
pub struct Dialog(Arc<dyn Fn(&Ask) -> Answer + Send + Sync>);

impl std::fmt::Debug for Dialog {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str("Dialog")
    }
}

impl Dialog {
    /// Returns the system's dialog.
    #[must_use]
    pub fn system() -> Self {
        Dialog(Arc::new(|ask| {
            match missing(&|name| std::env::var_os(name), &Path::exists) {
                Some(reason) => Answer::Missing(reason),
                None => show(ask),
            }
        }))
    }

    /// Returns a dialog that answers by itself.
    #[must_use]
    pub fn answering(answer: impl Fn(&Ask) -> Answer + Send + Sync + 'static) -> Self {
        Dialog(Arc::new(answer))
    }

    /// Asks, and waits for the answer: never on the window's own thread.
    #[must_use]
    pub fn ask(&self, ask: &Ask) -> Answer {
        (self.0)(ask)
    }
}

/// Returns why there is no dialog on this machine: without this question a
/// dialog that is missing could not be told from one that was left.
fn missing(
    variable: &dyn Fn(&str) -> Option<OsString>,
    exists: &dyn Fn(&Path) -> bool,
) -> Option<&'static str> {
    if !cfg!(target_os = "linux") {
        return None;
    }
    let set = |name: &str| variable(name).filter(|value| !value.is_empty());
    let folders = |name: &str, usual: &str| -> Vec<PathBuf> {
        let value = set(name).unwrap_or_else(|| usual.into());
        std::env::split_paths(&value).collect()
    };
    // Asked by name where the desktop offers no service.
    let program = folders("PATH", "/usr/bin")
        .iter()
        .any(|folder| exists(&folder.join("zenity")));
    if program {
        return None;
    }
    let bus = set("DBUS_SESSION_BUS_ADDRESS").is_some()
        || set("XDG_RUNTIME_DIR").is_some_and(|folder| exists(&Path::new(&folder).join("bus")));
    if !bus {
        return Some("no session bus answers");
    }
    let mut data = folders("XDG_DATA_DIRS", "/usr/local/share:/usr/share");
    data.extend(set("XDG_DATA_HOME").map(PathBuf::from));
    data.extend(set("HOME").map(|home| Path::new(&home).join(".local/share")));
    let service = "dbus-1/services/org.freedesktop.portal.Desktop.service";
    let portal = data.iter().any(|folder| exists(&folder.join(service)));
    (!portal).then_some("the package xdg-desktop-portal is not installed")
}

fn show(ask: &Ask) -> Answer {
    let mut dialog = rfd::FileDialog::new();
    dialog = match ask.purpose {
        Purpose::Open => dialog
            .set_title("Open a notebook")
            .add_filter("notebooks", &["farglow"]),
        Purpose::Save => dialog
            .set_title("Save the notebook")
            .add_filter("notebooks", &["farglow"]),
        Purpose::Worksheet => dialog
            .set_title("Write the worksheet")
            .add_filter("worksheets", &["pdf"]),
    };
    if let Some(near) = &ask.near {
        if let Some(folder) = near.parent().filter(|folder| folder.is_dir()) {
            dialog = dialog.set_directory(folder);
        }
        if ask.purpose != Purpose::Open
            && let Some(name) = near.file_name()
        {
            dialog = dialog.set_file_name(name.to_string_lossy());
        }
    }
    let chosen = match ask.purpose {
        Purpose::Open => dialog.pick_file(),
        Purpose::Save | Purpose::Worksheet => dialog.save_file(),
    };
    chosen.map_or(Answer::Left, Answer::Chosen)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_machine_without_a_dialog_is_known_before_it_is_asked() {
        if !cfg!(target_os = "linux") {
            return;
        }
        let bus = |name: &str| (name == "DBUS_SESSION_BUS_ADDRESS").then(|| "unix:path=/b".into());
        let portal = |path: &Path| path.ends_with("org.freedesktop.portal.Desktop.service");
        let reason = missing(&|_| None, &|_| false).expect("there is nothing at all");
        assert!(reason.contains("bus"), "{reason}");
        let reason = missing(&bus, &|_| false).expect("there is no service");
        assert!(reason.contains("xdg-desktop-portal"), "{reason}");
        assert_eq!(missing(&bus, &portal), None);
        // A socket in the user's own folder is as good as the variable.
        let folder = |name: &str| (name == "XDG_RUNTIME_DIR").then(|| "/run/user/1".into());
        let both = |path: &Path| path == Path::new("/run/user/1/bus") || portal(path);
        assert_eq!(missing(&folder, &both), None);
        assert_eq!(missing(&|_| None, &|path| path.ends_with("zenity")), None);
    }
}
