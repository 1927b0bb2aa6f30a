//! The rows of `resources/checks/guidance_checks.json`.

use farglow::guidance::{Allowed, Library};
use serde_json::Value;

const FILE: &str = include_str!("../../resources/checks/guidance_checks.json");

/// One published or derived case.
#[derive(Debug, serde::Deserialize)]
pub struct Row {
    pub id: String,
    pub inputs: Value,
    pub expected: Value,
    pub tolerance: String,
    pub source: String,
    pub how: String,
    /// What another solution gave, where the file says so.
    #[serde(default)]
    pub own_result: Option<f64>,
}

impl Row {
    /// A number among the inputs.
    pub fn input(&self, name: &str) -> f64 {
        number(&self.inputs, name, &self.id)
    }

    /// A number among what is expected.
    pub fn expected(&self, name: &str) -> f64 {
        number(&self.expected, name, &self.id)
    }

    /// Holds a number against the expected one, to an absolute tolerance.
    pub fn holds(&self, what: &str, found: f64, expected: f64, tolerance: f64) {
        let error = (found - expected).abs();
        assert!(
            error <= tolerance,
            "{} {what}: found {found}, expected {expected}, error {error} above {tolerance} ({}, {})",
            self.id,
            self.source,
            self.how
        );
    }
}

fn number(of: &Value, name: &str, id: &str) -> f64 {
    of[name]
        .as_f64()
        .unwrap_or_else(|| panic!("{id}: no number {name}"))
}

pub fn all() -> Vec<Row> {
    serde_json::from_str(FILE).expect("the file of checks is a list of rows")
}

pub fn get(id: &str) -> Row {
    all()
        .into_iter()
        .find(|row| row.id == id)
        .unwrap_or_else(|| panic!("no row is called {id}"))
}

/// The limit of a shipped row as an irradiance, W/m².
pub fn limit(id: &str, t: f64) -> f64 {
    Library::shipped()
        .limit_at(id, t)
        .unwrap_or_else(|| panic!("{id} has no limit at {t} s"))
}

/// The longest stay by a shipped row that ends it, s.
pub fn longest(id: &str, exposure: f64) -> f64 {
    match Library::shipped().allowed(id, exposure) {
        Ok(Allowed::Seconds(time)) => time,
        other => panic!("{id} at {exposure} W/m²: expected seconds, found {other:?}"),
    }
}
