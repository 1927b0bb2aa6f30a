//! The curve of second degree burns under a steady absorbed flux.
//!
//! Bare blackened skin, a rectangular pulse from 1 s to 30 s; outside it the
//! curve says nothing. Fluxes in W/m², energies in J/m², times in seconds.

use super::{Error, Onset, irradiance, pain, within};

/// One point of the published table.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Point {
    /// Duration of the pulse, s.
    pub time: f64,
    /// Absorbed flux, W/m².
    pub flux: f64,
    /// Absorbed energy as printed, cal/cm².
    pub calories: f64,
    /// Rise of a copper calorimeter, K.
    pub rise: f64,
}

/// The published table.
///
/// # Source
///
/// Stoll and Chianta, *Aerospace Medicine* 40:1232–1238 (1969), as reprinted in
/// standards of protective clothing; from memory. It is consistent in itself:
/// flux times time gives the energies, and the fits give both columns to 1 %.
pub const TABLE: [Point; 14] = [
    point(1.0, 50.0, 1.2, 8.9),
    point(2.0, 31.0, 1.46, 10.8),
    point(3.0, 23.0, 1.65, 12.2),
    point(4.0, 19.0, 1.8, 13.3),
    point(5.0, 16.0, 1.9, 14.1),
    point(6.0, 14.0, 2.04, 15.1),
    point(7.0, 13.0, 2.1, 15.5),
    point(8.0, 11.5, 2.19, 16.2),
    point(9.0, 10.6, 2.27, 16.8),
    point(10.0, 9.8, 2.33, 17.3),
    point(15.0, 7.4, 2.66, 19.7),
    point(20.0, 6.0, 2.86, 21.2),
    point(25.0, 5.1, 3.05, 22.6),
    point(30.0, 4.5, 3.21, 23.8),
];

/// The time from which the curve holds, s.
pub const FROM: f64 = 1.0;

/// The time to which the curve holds, s.
pub const UNTIL: f64 = 30.0;

/// Energy of the fit at 1 s, J/m².
const COEFFICIENT: f64 = 5.0204e4;

/// Exponent of time in the fit of the energy.
const EXPONENT: f64 = 0.2901;

const fn point(time: f64, kilowatts: f64, calories: f64, rise: f64) -> Point {
    Point {
        time,
        flux: kilowatts * 1000.0,
        calories,
        rise,
    }
}

/// Returns the absorbed energy of a steady pulse at which a blister begins, J/m².
///
/// `duration` of the pulse in seconds, 1 s to 30 s: E = 5.0204·t^0.2901 J/cm².
///
/// # Accuracy
///
/// Of the table: within 1 % in energy.
///
/// # Errors
///
/// [`Error::OutOfRange`] outside 1 s to 30 s.
///
/// # Source
///
/// Fit in ASTM F1939, F2700 and F1959 to [`TABLE`]; from memory. Checked in
/// `tests/published/burns.rs`.
pub fn energy(duration: f64) -> Result<f64, Error> {
    let duration = pulse(duration)?;
    Ok(COEFFICIENT * duration.powf(EXPONENT))
}

/// Returns the steady absorbed flux that begins a blister in a given time, W/m².
///
/// `duration` in seconds, 1 s to 30 s.
///
/// # Errors
///
/// [`Error::OutOfRange`] outside 1 s to 30 s.
///
/// # Source
///
/// As [`energy`], over time.
pub fn flux(duration: f64) -> Result<f64, Error> {
    Ok(energy(duration)? / duration)
}

/// Returns the rise of a copper calorimeter that matches a blister, K.
///
/// `duration` in seconds, 1 s to 30 s: 8.871465·t^0.2905449 K.
///
/// # Errors
///
/// [`Error::OutOfRange`] outside 1 s to 30 s.
///
/// # Source
///
/// As [`energy`].
pub fn calorimeter_rise(duration: f64) -> Result<f64, Error> {
    Ok(8.871_465 * pulse(duration)?.powf(0.290_544_9))
}

/// Returns when a blister begins under a steady flux, by the fitted curve.
///
/// `absorbed` in W/m², all wavelengths; taking the irradiance for it is the
/// safe side.
///
/// # Errors
///
/// [`Error::OutOfRange`] if the flux is negative, above 10⁹ W/m² or not finite.
///
/// # Source
///
/// As [`energy`], solved for the time.
///
/// # Examples
///
/// ```
/// use farglow::physics::skin::{Onset, blister};
/// assert_eq!(blister::onset(4000.0), Ok(Onset::Later(30.0)));
/// assert_eq!(blister::onset(60_000.0), Ok(Onset::Sooner(1.0)));
/// ```
pub fn onset(absorbed: f64) -> Result<Onset, Error> {
    let absorbed = irradiance("absorbed flux", absorbed)?;
    let time = (COEFFICIENT / absorbed).powf(1.0 / (1.0 - EXPONENT));
    Ok(if time < FROM {
        Onset::Sooner(FROM)
    } else if time > UNTIL {
        Onset::Later(UNTIL)
    } else {
        Onset::After(time)
    })
}

/// Returns when a blister begins by the table of Stoll and Greene.
///
/// `absorbed` in W/m²; the table goes from 4.2 kW/m² to 16.8 kW/m², straight
/// lines between its points on logarithmic scales.
///
/// # Errors
///
/// [`Error::OutOfRange`] if the flux is negative, above 10⁹ W/m² or not finite.
///
/// # Source
///
/// Stoll and Greene, *Journal of Applied Physiology* 14:373 (1959); from memory.
pub fn onset_of_1959(absorbed: f64) -> Result<Onset, Error> {
    const TABLE: [(f64, f64); 5] = [
        (4.2, 33.8),
        (6.3, 20.8),
        (8.4, 13.4),
        (12.6, 7.8),
        (16.8, 5.6),
    ];
    let q = irradiance("absorbed flux", absorbed)? / 1000.0;
    Ok(match pain::between(&TABLE, q) {
        Some(time) => Onset::After(time),
        None if q < TABLE[0].0 => Onset::Later(TABLE[0].1),
        None => Onset::Sooner(TABLE[4].1),
    })
}

fn pulse(duration: f64) -> Result<f64, Error> {
    within(
        "duration of the pulse",
        duration,
        FROM,
        UNTIL,
        "from 1 s to 30 s",
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn curve_and_its_inverse_agree() {
        for time in [1.000_001, 2.0, 7.5, 29.999] {
            let flux = flux(time).expect("within the curve");
            let Ok(Onset::After(found)) = onset(flux) else {
                panic!("no time at {flux} W/m²");
            };
            assert!((found / time - 1.0).abs() < 1e-12, "{found} against {time}");
        }
    }

    #[test]
    fn short_form_of_the_fit_is_as_far_off_as_is_said_of_it() {
        // t = 223·q^-1.35: 13 % long at 1 s, within 6 % from 5 s on; from memory.
        let ratio = |time: f64| {
            let q = flux(time).expect("within the curve") / 1000.0;
            223.0 * q.powf(-1.35) / time
        };
        assert!((ratio(1.0) - 1.13).abs() < 0.005, "{}", ratio(1.0));
        for time in [5.0, 10.0, 20.0, 30.0] {
            assert!(
                (ratio(time) - 1.0).abs() < 0.06,
                "{} at {time} s",
                ratio(time)
            );
        }
    }

    #[test]
    fn outside_the_curve_nothing_is_made_up() {
        assert!(energy(0.999).is_err() && energy(30.001).is_err() && flux(f64::NAN).is_err());
        assert_eq!(onset(0.0), Ok(Onset::Later(30.0)));
        assert_eq!(onset_of_1959(3000.0), Ok(Onset::Later(33.8)));
        assert_eq!(onset_of_1959(20_000.0), Ok(Onset::Sooner(5.6)));
        assert!(onset(-1.0).is_err() && onset(f64::NAN).is_err());
    }
}
