//! The rows that are shipped, and how they are read.

use std::collections::BTreeMap;
use std::ops::RangeInclusive;
use std::sync::LazyLock;

use serde::Deserialize;

use super::row::{Directions, HowKnown, Property, Row};
use crate::entry;
use crate::spelling::nearest;

static SHIPPED: LazyLock<Library> = LazyLock::new(|| {
    Library::read(
        include_str!("../../resources/materials/emissivity.json"),
        include_str!("../../resources/materials/temperatures.json"),
    )
    .expect("the shipped rows are read by a test")
});

/// The file of emissivities.
#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Emissivities {
    #[serde(rename = "note")]
    _note: String,
    rows: Vec<Emissivity>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Emissivity {
    id: String,
    material: String,
    state: String,
    kind: String,
    celsius: [f64; 2],
    low: f64,
    typical: f64,
    high: f64,
    source: String,
    how_known: HowKnown,
    #[serde(default)]
    note: Option<String>,
}

/// The file of process temperatures, °C.
#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Temperatures {
    #[serde(rename = "note")]
    _note: String,
    rows: Vec<Temperature>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Temperature {
    id: String,
    process: String,
    what: String,
    low: f64,
    typical: f64,
    high: f64,
    source: String,
    how_known: HowKnown,
    #[serde(default)]
    note: Option<String>,
}

/// The temperature of 0 °C, K.
const ZERO_CELSIUS: f64 = 273.15;

/// The temperatures that a row may be for, or have, in kelvin.
const TEMPERATURES: RangeInclusive<f64> = 250.0..=3300.0;

/// All rows, by id.
#[derive(Clone, Debug, PartialEq)]
pub struct Library {
    rows: Vec<Row>,
    /// From an id to the row's place.
    index: BTreeMap<String, usize>,
}

impl Library {
    /// Returns the rows that are shipped with the program.
    #[must_use]
    pub fn shipped() -> &'static Library {
        &SHIPPED
    }

    /// Returns the row of this id.
    #[must_use]
    pub fn get(&self, id: &str) -> Option<&Row> {
        self.index.get(id).map(|place| &self.rows[*place])
    }

    /// Returns the rows in the order of the files: emissivities, then
    /// temperatures.
    pub fn rows(&self) -> impl Iterator<Item = &Row> {
        self.rows.iter()
    }

    /// Returns the id nearest to a mistyped one; hyphens and spaces count as
    /// low lines.
    #[must_use]
    pub fn suggest(&self, id: &str) -> Option<&str> {
        let written = id.trim().to_lowercase().replace(['-', ' '], "_");
        if let Some((known, _)) = self.index.get_key_value(&written) {
            return Some(known);
        }
        nearest(&written, self.index.keys().map(String::as_str)).or_else(|| {
            // The beginning of an id, or a word of it, is a good guess too.
            (written.len() >= 3)
                .then(|| self.index.keys().find(|known| known.contains(&written)))
                .flatten()
                .map(String::as_str)
        })
    }

    /// Reads the two files.
    ///
    /// # Errors
    ///
    /// What is wrong, with the row's id.
    fn read(emissivities: &str, temperatures: &str) -> Result<Library, String> {
        let emissivities: Emissivities = serde_json::from_str(emissivities)
            .map_err(|error| format!("the file of emissivities: {error}"))?;
        let temperatures: Temperatures = serde_json::from_str(temperatures)
            .map_err(|error| format!("the file of temperatures: {error}"))?;
        let mut rows = Vec::new();
        for row in emissivities.rows {
            rows.push(emissivity(row)?);
        }
        rows.extend(temperatures.rows.into_iter().map(temperature));
        let mut index = BTreeMap::new();
        for (place, row) in rows.iter().enumerate() {
            check(row).map_err(|fault| format!("row {}: {fault}", row.id))?;
            if index.insert(row.id.clone(), place).is_some() {
                return Err(format!("row {}: the id stands there twice", row.id));
            }
        }
        Ok(Library { rows, index })
    }
}

fn emissivity(row: Emissivity) -> Result<Row, String> {
    let property = match row.kind.as_str() {
        "total" => Property::TotalEmissivity(Directions::Unsaid),
        "total normal" => Property::TotalEmissivity(Directions::Normal),
        "total hemispherical" => Property::TotalEmissivity(Directions::Hemispherical),
        kind => kind
            .strip_prefix("spectral ")
            .and_then(|rest| rest.strip_suffix(" µm"))
            .and_then(|number| number.parse::<f64>().ok())
            .map(|micrometres| Property::SpectralEmissivity(micrometres * 1e-6))
            .ok_or_else(|| format!("row {}: unknown kind `{kind}`", row.id))?,
    };
    Ok(Row {
        title: format!("{}, {}", row.material, row.state),
        property,
        low: row.low,
        typical: row.typical,
        high: row.high,
        valid: Some(row.celsius.map(|celsius| celsius + ZERO_CELSIUS)),
        source: row.source,
        how_known: row.how_known,
        note: row.note,
        id: row.id,
    })
}

fn temperature(row: Temperature) -> Row {
    Row {
        title: format!("{}, {}", row.process, row.what),
        property: Property::Temperature,
        low: row.low + ZERO_CELSIUS,
        typical: row.typical + ZERO_CELSIUS,
        high: row.high + ZERO_CELSIUS,
        valid: None,
        source: row.source,
        how_known: row.how_known,
        note: row.note,
        id: row.id,
    }
}

/// Says what is wrong with a row.
fn check(row: &Row) -> Result<(), String> {
    let is_small = |sign: char| sign.is_ascii_lowercase() || sign.is_ascii_digit() || sign == '_';
    if !entry::is_name(&row.id) || !row.id.chars().all(is_small) || entry::is_reserved(&row.id) {
        return Err("expected an id of small letters, digits and low lines".to_owned());
    }
    let texts = [Some(&row.title), Some(&row.source), row.note.as_ref()];
    if texts
        .into_iter()
        .flatten()
        .any(|text| text.trim().is_empty())
    {
        return Err("expected a title, a source and no empty note".to_owned());
    }
    if !(row.low <= row.typical && row.typical <= row.high) {
        return Err(format!(
            "expected low, typical, high in order, found {}, {}, {}",
            row.low, row.typical, row.high
        ));
    }
    let range = match row.property {
        Property::Temperature => TEMPERATURES,
        Property::TotalEmissivity(_) | Property::SpectralEmissivity(_) => 0.01..=1.0,
    };
    if !range.contains(&row.low) || !range.contains(&row.high) {
        return Err(format!("{} to {} is out of range", row.low, row.high));
    }
    if let Property::SpectralEmissivity(wavelength) = row.property
        && !(100e-9..=100e-6).contains(&wavelength)
    {
        return Err(format!("found a wavelength of {wavelength} m"));
    }
    if let Some([from, to]) = row.valid
        && !(from <= to && TEMPERATURES.contains(&from) && TEMPERATURES.contains(&to))
    {
        return Err(format!("found temperatures from {from} K to {to} K"));
    }
    Ok(())
}

#[cfg(test)]
mod tests;
