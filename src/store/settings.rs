//! What the window remembers between two runs, in the user's own folder.
//!
//! Settings are a convenience: whatever is wrong with them is said once, and
//! the usual ones are used in their place.

use std::path::{Path, PathBuf};

use serde_json::{Map, Value, json};

use super::file;
use crate::json;

/// The settings.
#[derive(Clone, Debug, PartialEq)]
pub struct Settings {
    /// The window's width and height, in logical points.
    pub size: (f32, f32),
    /// How wide the column of cells is, in logical points.
    pub cells: f32,
    /// The theme, by its word.
    pub theme: String,
    /// How much larger than 100 % everything is, `0.75..=3`.
    pub zoom: f32,
    /// The units that quantities are shown in, by their word.
    pub measure: String,
    /// The notebook that was open last.
    pub last: Option<PathBuf>,
}

impl Default for Settings {
    fn default() -> Self {
        Settings {
            size: (1440.0, 900.0),
            cells: 428.0,
            theme: "light".to_owned(),
            zoom: 1.0,
            measure: "metric".to_owned(),
            last: None,
        }
    }
}

/// The least and the greatest zoom.
pub const ZOOM: (f32, f32) = (0.75, 3.0);

/// Returns the settings' file in the user's own folder; `None` where the system
/// gives the user none.
#[must_use]
pub fn place() -> Option<PathBuf> {
    directories::ProjectDirs::from("", "", "farglow")
        .map(|folders| folders.config_dir().join("window.json"))
}

/// Returns the settings in a file, or the usual ones with what was wrong with
/// it. A file that is not there is nothing wrong.
#[must_use]
pub fn load(path: &Path) -> (Settings, Option<String>) {
    let said = |reason: String| {
        let text = format!(
            "the window's settings in {} were left aside: {reason}; the usual ones are used",
            path.display()
        );
        (Settings::default(), Some(text))
    };
    match file::read(path) {
        Ok(bytes) => match read(&bytes) {
            Ok(settings) => (settings, None),
            Err(reason) => said(reason),
        },
        Err(file::Error::Missing { .. }) => (Settings::default(), None),
        Err(error) => said(error.to_string()),
    }
}

/// Writes the settings, with the folder they live in.
///
/// # Errors
///
/// What the system refused, in words.
pub fn save(path: &Path, settings: &Settings) -> Result<(), String> {
    if let Some(folder) = path.parent() {
        std::fs::create_dir_all(folder).map_err(|error| error.to_string())?;
    }
    file::write(path, write(settings).as_bytes()).map_err(|error| error.to_string())
}

fn write(settings: &Settings) -> String {
    let mut object = Map::new();
    let mut put = |key: &str, value: Value| {
        let _ = object.insert(key.to_owned(), value);
    };
    put("width", json!(settings.size.0));
    put("height", json!(settings.size.1));
    put("cells", json!(settings.cells));
    put("theme", settings.theme.as_str().into());
    put("zoom", json!(settings.zoom));
    put("measure", settings.measure.as_str().into());
    if let Some(last) = settings.last.as_ref().and_then(|last| last.to_str()) {
        put("last", last.into());
    }
    json::write(&Value::Object(object))
}

fn read(bytes: &[u8]) -> Result<Settings, String> {
    let node = json::parse(bytes).map_err(|error| error.to_string())?;
    let Some(_) = node.as_object() else {
        return Err("expected an object".to_owned());
    };
    let mut settings = Settings::default();
    let value = |key: &str| node.get(key).map(json::Node::to_value);
    let number = |key: &str, usual: f32, least: f32, most: f32| match value(key) {
        None => Ok(usual),
        Some(Value::Number(number)) => {
            // Points and shares: single precision is plenty.
            #[allow(clippy::cast_possible_truncation)]
            let number = number.as_f64().map_or(usual, |number| number as f32);
            if (least..=most).contains(&number) {
                Ok(number)
            } else {
                Err(format!(
                    "expected {key} from {least} to {most}, found {number}"
                ))
            }
        }
        Some(_) => Err(format!("expected a number for {key}")),
    };
    let word = |key: &str, usual: &str| match value(key) {
        None => Ok(usual.to_owned()),
        Some(Value::String(word)) => Ok(word),
        Some(_) => Err(format!("expected a word for {key}")),
    };
    settings.size = (
        number("width", settings.size.0, 320.0, 20_000.0)?,
        number("height", settings.size.1, 240.0, 20_000.0)?,
    );
    settings.cells = number("cells", settings.cells, 320.0, 20_000.0)?;
    settings.zoom = number("zoom", settings.zoom, ZOOM.0, ZOOM.1)?;
    settings.theme = word("theme", &settings.theme)?;
    settings.measure = word("measure", &settings.measure)?;
    settings.last = match value("last") {
        Some(Value::String(path)) => Some(PathBuf::from(path)),
        None => None,
        Some(_) => return Err("expected a path for last".to_owned()),
    };
    Ok(settings)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn settings_come_back_as_they_were_written() {
        let folder = tempfile::tempdir().expect("a folder can be made");
        let path = folder.path().join("deep").join("window.json");
        let settings = Settings {
            size: (1280.0, 720.0),
            cells: 512.0,
            theme: "dark".to_owned(),
            zoom: 1.25,
            measure: "us".to_owned(),
            last: Some(PathBuf::from("/somewhere/door.farglow")),
        };
        save(&path, &settings).expect("the folder is writable");
        assert_eq!(load(&path), (settings, None));
    }

    #[test]
    fn damaged_settings_are_left_aside_and_said() {
        let folder = tempfile::tempdir().expect("a folder can be made");
        let path = folder.path().join("window.json");
        for text in [
            "",
            "{",
            "[]",
            "{\"zoom\": 50}",
            "{\"zoom\": \"big\"}",
            "{\"width\": 1e999}",
            "{\"cells\": 1}",
            "{\"last\": 4}",
        ] {
            std::fs::write(&path, text).expect("the folder is writable");
            let (settings, said) = load(&path);
            assert_eq!(settings, Settings::default(), "{text}");
            let said = said.unwrap_or_else(|| panic!("{text}: nothing was said"));
            assert!(said.contains("left aside"), "{text}: {said}");
        }
    }

    #[test]
    fn settings_that_are_not_there_are_nothing_wrong() {
        let folder = tempfile::tempdir().expect("a folder can be made");
        let found = load(&folder.path().join("window.json"));
        assert_eq!(found, (Settings::default(), None));
    }
}
