//! The rows of `resources/checks/physics_checks.json`.

use serde_json::Value;

const FILE: &str = include_str!("../../resources/checks/physics_checks.json");

/// One published or independently computed number.
#[derive(Debug, serde::Deserialize)]
pub struct Row {
    pub id: String,
    pub family: String,
    pub quantity: String,
    pub inputs: Value,
    pub expected: Value,
    pub tolerance: Value,
    pub source: String,
}

impl Row {
    /// A number among the inputs.
    pub fn number(&self, name: &str) -> f64 {
        self.inputs[name]
            .as_f64()
            .unwrap_or_else(|| panic!("{}: no number {name}", self.id))
    }

    /// A vector among the inputs.
    pub fn vector(&self, name: &str) -> glam::DVec3 {
        vector(&self.inputs[name])
    }
}

pub fn vector(value: &Value) -> glam::DVec3 {
    let at = |index: usize| value[index].as_f64().expect("three numbers");
    glam::DVec3::new(at(0), at(1), at(2))
}

pub fn all() -> Vec<Row> {
    serde_json::from_str(FILE).expect("the file of checks is a list of rows")
}

/// Rows whose number is itself wrong, with the right one and how that is known.
/// They are held against the right one; `blackbody_tables` shows their error.
pub const MENDED: [(&str, f64, &str); 1] = [(
    "bb_exact-01",
    3.419_578_138_452_396e-27,
    "50-digit decimal sum of the series in exp(-x) at x = c2/(200 um K) = 71.938843875196690; the row is 1.12e-9 high, above its own tolerance of 1e-9",
)];

/// Works a row out; none if that row is not for this relation.
pub type Work = fn(&Row) -> Option<f64>;

/// Works out all rows of a family and holds them against the printed numbers,
/// to the printed tolerance. Returns how many ran.
pub fn check(family: &str, work: Work) -> usize {
    let mut ran = 0;
    let mut failed = Vec::new();
    for row in all().into_iter().filter(|row| row.family == family) {
        let Some(found) = work(&row) else { continue };
        let mended = MENDED.iter().find(|(id, _, _)| *id == row.id);
        let expected = mended.map_or_else(
            || row.expected.as_f64().expect("the row has a number"),
            |(_, right, _)| *right,
        );
        let tolerance = row.tolerance.as_f64().expect("the row has a tolerance");
        ran += 1;
        let error = (found - expected).abs();
        if error.is_nan() || error > tolerance {
            failed.push(format!(
                "{} {} {}: found {found:e}, expected {expected:e}, error {error:e} above {tolerance:e} ({})",
                row.id, row.quantity, row.inputs, row.source
            ));
        }
    }
    assert!(ran > 0, "no row of family {family} ran");
    assert!(
        failed.is_empty(),
        "{} of {ran} rows failed:\n{}",
        failed.len(),
        failed.join("\n")
    );
    ran
}
