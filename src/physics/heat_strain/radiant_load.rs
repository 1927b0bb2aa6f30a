//! Guide values of effective irradiance for work in heat.
//!
//! Effective irradiance is the net load on the whole body by all wavelengths,
//! over the body's own exchange at a skin of about 32 °C (definition from
//! memory), in W/m²; it is not the irradiance that limits for eyes judge.

use super::{Error, within};
use crate::physics::constant::STEFAN_BOLTZMANN;

/// Temperature of the skin that the effective irradiance is counted from, K.
pub const SKIN: f64 = 305.15;

/// Returns the effective irradiance, W/m²; below zero where the body gives off
/// more than it takes up.
///
/// `sources` is the irradiance from hot sources and screens, `background` that
/// from the room, both of all wavelengths, W/m². That of a surface which faces
/// the source stands for the whole body on the safe side.
///
/// # Errors
///
/// [`Error::OutOfRange`] if one is negative, above 10⁹ W/m² or not finite.
///
/// # Source
///
/// DGUV Information 213-002: net of the body's own exchange at a skin of about
/// 32 °C, which is taken for black; definition from memory.
pub fn effective(sources: f64, background: f64) -> Result<f64, Error> {
    let sources = crate::physics::skin::irradiance("irradiance from sources", sources)?;
    let background = crate::physics::skin::irradiance("irradiance from the room", background)?;
    Ok(sources + background - STEFAN_BOLTZMANN * SKIN.powi(4))
}

/// How long the guide values hold, in the columns of their table, s.
const COLUMNS: [f64; 3] = [900.0, 1800.0, 3600.0];

/// How heavy the work is, as the table divides it, W.
const ROWS: [f64; 3] = [100.0, 200.0, 300.0];

/// Guide values by workload (rows) and time (columns), W/m², for those who are
/// used to heat; zero where the table has a dash.
const REGULAR: [[f64; 4]; 4] = [
    // Printed as 100 in the text that was read: plainly a misprint for 1000,
    // by the order of the row and by the second group, which reads 1000.
    [1000.0, 750.0, 500.0, 300.0],
    [750.0, 500.0, 300.0, 200.0],
    [500.0, 300.0, 200.0, 100.0],
    [250.0, 200.0, 100.0, 0.0],
];

/// The same for those who work in heat now and then.
const OCCASIONAL: [[f64; 4]; 4] = [
    [1000.0, 500.0, 300.0, 0.0],
    [750.0, 300.0, 200.0, 0.0],
    [500.0, 200.0, 100.0, 0.0],
    [250.0, 100.0, 35.0, 0.0],
];

/// How long an effective irradiance may last by the guide values.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Allowed {
    /// No uninterrupted time at all.
    Never,
    /// This long without a break, s.
    For(f64),
    /// Also longer than 60 min without a break.
    OverAnHour,
}

fn row(workload: f64, regular: bool) -> Result<&'static [f64; 4], Error> {
    let workload = within("workload", workload, 0.0, 2000.0, "from 0 W to 2000 W")?;
    let index = ROWS.iter().position(|most| workload <= *most).unwrap_or(3);
    Ok(if regular {
        &REGULAR[index]
    } else {
        &OCCASIONAL[index]
    })
}

/// Returns the guide value of effective irradiance for a stay without a break,
/// W/m²; none where the table has a dash: no heat work of that kind.
///
/// `workload` in watts, `duration` in seconds; `regular` for those who are
/// acclimatised. A boundary belongs to the shorter column and the lighter row,
/// as printed ("up to").
///
/// # Errors
///
/// [`Error::OutOfRange`] if the workload lies outside 0 W to 2000 W or the
/// duration is negative, above 10⁹ s or not finite.
///
/// # Source
///
/// DGUV Information 213-002 (2013), table 4; read, with one misprint mended
/// beside the table. Above these values a medical check is due whatever is
/// worn, and the technical measures are to be reviewed.
pub fn guide_value(workload: f64, duration: f64, regular: bool) -> Result<Option<f64>, Error> {
    let duration = crate::physics::skin::time("duration of the stay", duration)?;
    let column = COLUMNS
        .iter()
        .position(|most| duration <= *most)
        .unwrap_or(3);
    let value = row(workload, regular)?[column];
    Ok((value > 0.0).then_some(value))
}

/// Returns how long an effective irradiance may last without a break.
///
/// `effective` irradiance in W/m², `workload` in watts.
///
/// # Errors
///
/// [`Error::OutOfRange`] if the workload lies outside 0 W to 2000 W, or the
/// irradiance is negative, above 10⁹ W/m² or not finite.
///
/// # Source
///
/// As [`guide_value`].
pub fn allowed(effective: f64, workload: f64, regular: bool) -> Result<Allowed, Error> {
    let effective = crate::physics::skin::irradiance("effective irradiance", effective)?;
    let row = row(workload, regular)?;
    Ok(
        match row
            .iter()
            .rposition(|value| *value > 0.0 && effective <= *value)
        {
            None => Allowed::Never,
            Some(3) => Allowed::OverAnHour,
            Some(column) => Allowed::For(COLUMNS[column]),
        },
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn values_fall_with_time_and_workload_and_without_habit() {
        for table in [REGULAR, OCCASIONAL] {
            for r in 0..4 {
                for c in 0..4 {
                    assert!(c == 0 || table[r][c] < table[r][c - 1] || table[r][c] == 0.0);
                    assert!(r == 0 || table[r][c] < table[r - 1][c] || table[r][c] == 0.0);
                    assert!(OCCASIONAL[r][c] <= REGULAR[r][c], "row {r}, column {c}");
                }
            }
        }
    }

    #[test]
    fn boundaries_belong_as_printed() {
        assert_eq!(guide_value(200.0, 1800.0, true), Ok(Some(500.0)));
        assert_eq!(guide_value(200.1, 1800.0, true), Ok(Some(300.0)));
        assert_eq!(guide_value(200.0, 1800.1, true), Ok(Some(300.0)));
        assert_eq!(guide_value(350.0, 7200.0, true), Ok(None));
        assert_eq!(guide_value(350.0, 3600.0, false), Ok(Some(35.0)));
    }

    #[test]
    fn allowed_time_and_guide_value_agree() {
        for regular in [true, false] {
            for workload in [50.0, 150.0, 250.0, 400.0] {
                for effective in [1.0, 35.0, 100.0, 249.0, 500.0, 751.0, 1000.0, 1001.0] {
                    let (fits, beyond) = match allowed(effective, workload, regular).expect("fair")
                    {
                        Allowed::Never => (None, Some(1.0)),
                        Allowed::For(time) => (Some(time), Some(time + 1.0)),
                        Allowed::OverAnHour => (Some(28_800.0), None),
                    };
                    let at = |time| guide_value(workload, time, regular).expect("fair");
                    assert!(
                        fits.is_none_or(|time| at(time).is_some_and(|value| effective <= value)),
                        "{effective} W/m² fits"
                    );
                    assert!(
                        beyond.is_none_or(|time| at(time).is_none_or(|value| effective > value)),
                        "{effective} W/m² does not fit beyond"
                    );
                }
            }
        }
    }

    #[test]
    fn a_body_in_a_room_of_its_own_temperature_has_no_load() {
        let room = STEFAN_BOLTZMANN * SKIN.powi(4);
        let found = effective(0.0, room).expect("fair");
        assert!(found.abs() < 1e-9, "{found} W/m²");
        // A room at 20 °C cools by some 73 W/m², which a source has to make up.
        let cool = effective(300.0, STEFAN_BOLTZMANN * 293.15_f64.powi(4)).expect("fair");
        assert!((cool - 227.0).abs() < 1.0, "{cool} W/m²");
        assert!(effective(-1.0, 0.0).is_err() && effective(0.0, f64::NAN).is_err());
    }

    #[test]
    fn nonsense_is_refused() {
        assert!(guide_value(f64::NAN, 1.0, true).is_err());
        assert!(guide_value(100.0, -1.0, true).is_err());
        assert!(allowed(-1.0, 100.0, true).is_err());
    }
}
