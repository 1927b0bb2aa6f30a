//! Radiant heat at a person: from the room, and what a body would make of it.
//!
//! Kelvin and W/m². The room is black and of one temperature wherever no source
//! or hot screen is seen. `views` and `exitances` are parallel, as in
//! [`exposure`]: what is seen of each, and its exitance at all
//! wavelengths; one that is not above zero counts as a body at absolute zero.

use std::f64::consts::PI;

use glam::DVec3;

use super::constant::STEFAN_BOLTZMANN;
use super::error::{direction, positive};
use super::view::View;
use super::{Error, exposure, planck};

/// The highest temperature that is accepted, K.
const HOTTEST: f64 = 1e5;

/// Returns `value` if it is a temperature.
fn temperature(parameter: &'static str, value: f64) -> Result<f64, Error> {
    positive(parameter, value, HOTTEST, "above 0 K and at most 100000 K")
}

/// Returns the irradiance from the room on a receiver, W/m².
///
/// `seen` is the configuration factor to all sources and screens together, in
/// `0..=1`: what of the receiver's outlook is not the room. `room` is the mean
/// temperature of the room's surfaces.
///
/// # Errors
///
/// [`Error::OutOfRange`] if an argument is outside its range.
///
/// # Source
///
/// (1 − F) σT⁴, an enclosure of one temperature being black.
pub fn background(room: f64, seen: f64) -> Result<f64, Error> {
    let black = planck::exitance(temperature("temperature of the room", room)?);
    Ok((1.0 - fraction("configuration factor", seen)?) * black)
}

/// Returns the net radiant heat into a surface of skin or clothing, W/m²; below
/// zero where it gives off more than it takes up.
///
/// `irradiance` is what comes from hot sources and screens, `background` what
/// comes from the room, both W/m² on the surface. `absorptance` is that for the
/// first, `emissivity` that of the surface at its own temperature, which is also
/// its absorptance for the second; both in (0, 1]. `surface` is its temperature
/// in kelvin.
///
/// # Errors
///
/// [`Error::OutOfRange`] if an argument is outside its range, or an irradiance
/// below zero.
///
/// # Source
///
/// q = α E + ε (E_room − σT_s⁴), the balance of a grey surface.
pub fn net_heat(
    irradiance: f64,
    background: f64,
    absorptance: f64,
    emissivity: f64,
    surface: f64,
) -> Result<f64, Error> {
    let hot = flux("irradiance", irradiance)?;
    let room = flux("background", background)?;
    let absorptance = positive("absorptance", absorptance, 1.0, "above 0 and at most 1")?;
    let emissivity = positive("emissivity", emissivity, 1.0, "above 0 and at most 1")?;
    let given = planck::exitance(temperature("surface temperature", surface)?);
    Ok(absorptance * hot + emissivity * (room - given))
}

/// Returns the mean radiant temperature of a small sphere at the point of the
/// views, K.
///
/// `solid_angles` in sr and `exitances` in W/m² are parallel; the room fills
/// what they leave of 4π. A solid angle beyond that counts as 4π in all.
///
/// # Accuracy
///
/// Exact relation for diffuse sources.
///
/// # Errors
///
/// [`Error::OutOfRange`] for a solid angle that is below zero or not finite, an
/// exitance that is not finite, or the room's temperature.
///
/// # Source
///
/// Definition in ISO 7726: the uniform black enclosure with which the sphere
/// would exchange as much: σT⁴ = ¼ ∫ L dΩ with L = M/π. Checked in this file
/// against the quadrature of the irradiance over a sphere.
pub fn mean_temperature_of_sphere(
    solid_angles: &[f64],
    exitances: &[f64],
    room: f64,
) -> Result<f64, Error> {
    let black = planck::exitance(temperature("temperature of the room", room)?);
    let mut hot = 0.0;
    let mut filled = 0.0;
    for (angle, exitance) in solid_angles.iter().zip(exitances) {
        if !(0.0..=4.0 * PI * (1.0 + 1e-9)).contains(angle) {
            return Err(Error::OutOfRange {
                parameter: "solid angle",
                range: "from 0 sr to 4π sr",
                value: *angle,
            });
        }
        hot += angle * finite("exitance", *exitance)?.max(0.0);
        filled += angle;
    }
    let room = (1.0 - filled / (4.0 * PI)).max(0.0) * black;
    Ok(black_temperature(hot / (4.0 * PI) + room))
}

/// Returns the mean radiant temperature of a person at the point of the views, K,
/// from the irradiances on the six sides of a small cube.
///
/// `faces` is the direction the person faces; what of it is horizontal counts.
/// The six irradiances are weighted with the projected area factors of a
/// standing or seated person, in fourth powers: the linear mean of the six
/// plane radiant temperatures, also in use, is never above it.
///
/// # Accuracy
///
/// That of six directions in place of a body: where one small source is the
/// heat, within about 20 % of the radiant heat taken up.
///
/// # Errors
///
/// [`Error::OutOfRange`] for the room's temperature or an exitance that is not
/// finite, [`Error::NoDirection`] for a direction that is not horizontal.
///
/// # Source
///
/// ISO 7726:1998, annex B: weights 0.08 up and down, 0.23 left and right, 0.35
/// front and back of a standing person; 0.18, 0.22 and 0.30 of a seated one; from memory.
/// Checked in this file.
pub fn mean_temperature_of_person(
    views: &[View],
    exitances: &[f64],
    room: f64,
    posture: Posture,
    faces: DVec3,
) -> Result<f64, Error> {
    let black = planck::exitance(temperature("temperature of the room", room)?);
    for exitance in exitances {
        let _ = finite("exitance", *exitance)?;
    }
    let front = direction("facing direction", faces.with_z(0.0))?;
    let side = front.cross(DVec3::Z);
    let [vertical, sideways, facing] = posture.weights();
    let mut sum = 0.0;
    let mut weights = 0.0;
    for (axis, weight) in [(DVec3::Z, vertical), (side, sideways), (front, facing)] {
        for normal in [axis, -axis] {
            let hot = exposure::facing(views, exitances, normal);
            let seen: f64 = views.iter().map(|view| view.factor(normal)).sum();
            sum += weight * (hot + (1.0 - seen).max(0.0) * black);
            weights += weight;
        }
    }
    Ok(black_temperature(sum / weights))
}

/// How a person holds themselves, for what they show to each side.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Posture {
    /// Upright on their feet.
    Standing,
    /// On a seat.
    Seated,
}

impl Posture {
    /// Projected area factors: up or down, left or right, front or back.
    fn weights(self) -> [f64; 3] {
        match self {
            Self::Standing => [0.08, 0.23, 0.35],
            Self::Seated => [0.18, 0.22, 0.30],
        }
    }
}

/// A black globe thermometer in moving air.
///
/// # Source
///
/// ISO 7726:1998, annex B: the globe's balance
/// ε σ (T_r⁴ − T_g⁴) = h (T_g − T_a) with the greater of
/// h = 1.4 (|T_g − T_a|/D)^0.25 and h = 6.3 v^0.6 / D^0.4, from memory; worked
/// values read in the tests of the library pythermalcomfort, checked in
/// `tests/published/globe.rs`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Globe {
    diameter: f64,
    emissivity: f64,
    air: f64,
    speed: f64,
}

impl Globe {
    /// Returns a globe thermometer.
    ///
    /// `diameter` in m (0.15 for the usual one), `emissivity` (0.95), `air` the
    /// temperature of the air in kelvin, `speed` that of the air in m/s.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] unless the diameter is from 0.01 m to 1 m, the
    /// emissivity in (0, 1], the speed from 0 m/s to 100 m/s and the air's
    /// temperature above 0 K.
    pub fn new(diameter: f64, emissivity: f64, air: f64, speed: f64) -> Result<Self, Error> {
        if !(0.01..=1.0).contains(&diameter) {
            return Err(Error::OutOfRange {
                parameter: "diameter of the globe",
                range: "from 0.01 m to 1 m",
                value: diameter,
            });
        }
        if !(0.0..=100.0).contains(&speed) {
            return Err(Error::OutOfRange {
                parameter: "speed of the air",
                range: "from 0 m/s to 100 m/s",
                value: speed,
            });
        }
        Ok(Self {
            diameter,
            emissivity: positive(
                "emissivity of the globe",
                emissivity,
                1.0,
                "above 0 and at most 1",
            )?,
            air: temperature("temperature of the air", air)?,
            speed,
        })
    }

    /// Returns the mean radiant temperature that a globe temperature shows, K.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the globe's temperature is not a temperature, or
    /// is so far below the air's that no enclosure could keep it there.
    ///
    /// # Examples
    ///
    /// ```
    /// use farglow::physics::radiant::Globe;
    ///
    /// let globe = Globe::new(0.1, 0.95, 303.15, 0.3)?;
    /// assert!((globe.radiant_temperature(326.35)? - 273.15 - 74.8).abs() < 0.1);
    /// # Ok::<(), farglow::physics::Error>(())
    /// ```
    pub fn radiant_temperature(&self, globe: f64) -> Result<f64, Error> {
        let reading = temperature("globe temperature", globe)?;
        let black = planck::exitance(reading) + self.lost(reading) / self.emissivity;
        if black > 0.0 {
            Ok(black_temperature(black))
        } else {
            Err(Error::OutOfRange {
                parameter: "globe temperature",
                range: "one that an enclosure above 0 K can bring about in this air",
                value: globe,
            })
        }
    }

    /// Returns the temperature that the globe takes at a mean radiant
    /// temperature, K, between that and the air's.
    ///
    /// # Accuracy
    ///
    /// The inverse of [`Globe::radiant_temperature`], to `1e-12` relative.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if `radiant` is not a temperature.
    pub fn reading(&self, radiant: f64) -> Result<f64, Error> {
        let radiant = temperature("mean radiant temperature", radiant)?;
        let black = planck::exitance(radiant);
        let (mut low, mut high) = (radiant.min(self.air), radiant.max(self.air));
        // The balance rises with the globe's temperature: halved until it rests.
        for _ in 0..100 {
            let middle = 0.5 * (low + high);
            let surplus = self.emissivity * (planck::exitance(middle) - black) + self.lost(middle);
            if surplus > 0.0 {
                high = middle;
            } else {
                low = middle;
            }
        }
        Ok(0.5 * (low + high))
    }

    /// What the globe gives off to the air, W/m².
    fn lost(&self, globe: f64) -> f64 {
        let difference = globe - self.air;
        let natural = 1.4 * (difference.abs() / self.diameter).powf(0.25);
        let forced = 6.3 * self.speed.powf(0.6) / self.diameter.powf(0.4);
        natural.max(forced) * difference
    }
}

/// The temperature of a black body of an exitance, which is not below zero.
fn black_temperature(exitance: f64) -> f64 {
    (exitance / STEFAN_BOLTZMANN).sqrt().sqrt()
}

/// Returns `value` if it is finite.
fn finite(parameter: &'static str, value: f64) -> Result<f64, Error> {
    if value.is_finite() {
        Ok(value)
    } else {
        Err(Error::OutOfRange {
            parameter,
            range: "a finite number",
            value,
        })
    }
}

/// Returns `value` if it is a flux that can be.
fn flux(parameter: &'static str, value: f64) -> Result<f64, Error> {
    if (0.0..=1e15).contains(&value) {
        Ok(value)
    } else {
        Err(Error::OutOfRange {
            parameter,
            range: "from 0 W/m² to 10¹⁵ W/m²",
            value,
        })
    }
}

/// Returns `value` if it is a fraction.
fn fraction(parameter: &'static str, value: f64) -> Result<f64, Error> {
    if (0.0..=1.0).contains(&value) {
        Ok(value)
    } else {
        Err(Error::OutOfRange {
            parameter,
            range: "from 0 to 1",
            value,
        })
    }
}

#[cfg(test)]
mod tests;
