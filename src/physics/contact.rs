//! Burns from touching hot surfaces, by material and time of contact.
//!
//! Temperatures in kelvin, times in seconds. Contact of less than a tenth of the
//! skin of the body and of the head, healthy adults; thresholds of onset, not
//! limits.

use super::error::Error;
use super::skin::time;

/// What is touched, bare and smooth.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Material {
    /// Metal without a coating.
    Metal,
    /// Ceramics, glass, stone.
    Mineral,
    /// Plastics, wood.
    PlasticOrWood,
}

impl Material {
    /// All materials.
    pub const ALL: [Material; 3] = [Material::Metal, Material::Mineral, Material::PlasticOrWood];
}

/// The shortest contact that the thresholds hold for, s.
pub const SHORTEST: f64 = 0.5;

/// Time of contact in s and lower end of the threshold in °C, for bare metal.
const METAL: [(f64, f64); 5] = [
    (1.0, 65.0),
    (10.0, 55.0),
    (60.0, 51.0),
    (600.0, 48.0),
    (28_800.0, 43.0),
];

/// Returns the surface temperature at which a burn may begin, K; none where no
/// threshold is known here.
///
/// `contact` is the time of contact in seconds. Between the times of the table
/// the threshold of the next longer one is given, the safe side. For ceramics,
/// glass, stone, plastics and wood only that of 1 min is known here, so that
/// shorter contacts get it too and longer ones that of metal.
///
/// # Accuracy
///
/// As printed, to 1 K; at 1 s the lower end of 65 °C to 70 °C.
///
/// # Errors
///
/// [`Error::OutOfRange`] if the time is negative, above 10⁹ s or not finite.
///
/// # Source
///
/// ISO 13732-1:2006, figures and table 1; from memory. Its scope (0.5 s and
/// longer, under a tenth of the skin) and "no burn under 65 °C at 0.5 s" were
/// read in a catalogue and in a trade text.
///
/// # Examples
///
/// ```
/// use farglow::physics::contact::{Material, threshold};
/// assert_eq!(threshold(Material::Metal, 60.0), Ok(Some(324.15)));
/// assert_eq!(threshold(Material::Metal, 0.1), Ok(None));
/// ```
pub fn threshold(material: Material, contact: f64) -> Result<Option<f64>, Error> {
    let contact = time("time of contact", contact)?;
    if contact < SHORTEST {
        return Ok(None);
    }
    let metal = METAL
        .iter()
        .find(|(until, _)| contact <= *until)
        .map(|(_, celsius)| *celsius);
    let celsius = match material {
        Material::Mineral if contact <= 60.0 => Some(56.0),
        Material::PlasticOrWood if contact <= 60.0 => Some(60.0),
        _ => metal,
    };
    Ok(celsius.map(|celsius| celsius + 273.15))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn longer_contact_never_takes_more_heat() {
        for material in Material::ALL {
            let mut last = f64::INFINITY;
            for step in 0..1000_u32 {
                let contact = 0.5 * 1.0116_f64.powi(step as i32);
                if let Some(found) = threshold(material, contact).expect("fair") {
                    assert!(
                        found <= last,
                        "{material:?}, {contact} s: {found} K after {last} K"
                    );
                    last = found;
                }
            }
            assert!((last - 316.15).abs() < 1e-9, "43 °C at 8 h, found {last} K");
        }
    }

    #[test]
    fn table_is_met_and_nothing_is_said_beyond_it() {
        for (contact, celsius) in METAL {
            let found = threshold(Material::Metal, contact)
                .expect("fair")
                .expect("known");
            assert!(
                (found - 273.15 - celsius).abs() < 1e-9,
                "{found} K at {contact} s"
            );
        }
        for contact in [0.0, 0.49, 28_801.0] {
            assert_eq!(threshold(Material::Mineral, contact), Ok(None));
        }
        assert!(threshold(Material::Metal, f64::NAN).is_err());
        assert!(threshold(Material::Metal, -1.0).is_err());
    }
}
