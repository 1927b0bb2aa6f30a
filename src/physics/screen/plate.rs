//! The balance of a thin plate, and of plates between two large walls.
//!
//! Kelvin and W/m². A thin plate has one temperature through its thickness, and
//! nothing is led sideways in it.

use super::air::Air;
use super::convection::{Convection, Face, LEAST_SHARE};
use crate::physics::constant::STEFAN_BOLTZMANN;
use crate::physics::error::positive;
use crate::physics::{Error, planck};

/// A thin plate, or a small piece of one, between what it takes up and what it
/// gives off.
///
/// Nothing is checked here: [`balance`](super::balance()) makes it of what was.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Plate {
    /// The emissivities of both faces together: 2 at most.
    pub emissivities: f64,
    /// The share of the plate's area that is there to touch the air: 1 for a
    /// plate, what is not open of a mesh.
    pub covered: f64,
    /// The two faces, as convection sees them.
    pub faces: [Face; 2],
    /// How heat passes to the air.
    pub convection: Convection,
    /// The temperature of the air.
    pub air: f64,
}

impl Plate {
    /// Returns what the plate gives off to the air by both faces, W/m², below
    /// zero if the air is warmer.
    #[must_use]
    pub fn convected(&self, temperature: f64) -> f64 {
        self.convected_by(temperature, 1.0)
    }

    fn convected_by(&self, temperature: f64, share: f64) -> f64 {
        let coefficient = match self.convection {
            Convection::Stated(coefficient) => 2.0 * coefficient,
            Convection::Moving(speed) => {
                let film = Air::at(0.5 * (temperature + self.air));
                let of = |face: &Face| face.in_film(&film, temperature, self.air, speed);
                let front = of(&self.faces[0]);
                // The two faces of a standing plate are alike.
                let back = if self.faces[0] == self.faces[1] {
                    front
                } else {
                    of(&self.faces[1])
                };
                share * (front + back)
            }
        };
        self.covered * coefficient * (temperature - self.air)
    }

    /// Returns the temperature at which the plate gives off what it takes up.
    ///
    /// `absorbed` is what both faces together absorb, from sources, screens and
    /// room, W/m² of the plate's area. The result is in kelvin, between the
    /// temperature of the air and that of a plate that has no air.
    ///
    /// # Accuracy
    ///
    /// The root of the balance to `1e-13` relative.
    ///
    /// # Source
    ///
    /// a G = (ε_f + ε_b) σ T⁴ + q(T); checked in `tests/published/shields.rs`.
    #[must_use]
    pub fn temperature(&self, absorbed: f64) -> f64 {
        self.balanced(absorbed, 1.0)
    }

    /// Returns the same for the place on the plate where convection takes
    /// least: [`LEAST_SHARE`] of the mean. A stated coefficient holds
    /// everywhere.
    #[must_use]
    pub fn hottest(&self, absorbed: f64) -> f64 {
        self.balanced(absorbed, LEAST_SHARE)
    }

    fn balanced(&self, absorbed: f64, share: f64) -> f64 {
        let emitted = self.emissivities * STEFAN_BOLTZMANN;
        let without_air = (absorbed.max(0.0) / emitted).sqrt().sqrt();
        let surplus = |temperature: f64| {
            self.emissivities * planck::exitance(temperature)
                + self.convected_by(temperature, share)
                - absorbed
        };
        root(self.air, without_air, surplus)
    }

    /// Returns the same as [`Plate::temperature`], quickly where `near` is near
    /// it.
    pub(super) fn temperature_near(&self, absorbed: f64, near: f64) -> f64 {
        let surplus = |temperature: f64| {
            let convected = self.convected(temperature);
            let surplus = self.emissivities * planck::exitance(temperature) + convected - absorbed;
            (surplus, convected)
        };
        let (mut at, (mut off, convected)) = (near, surplus(near));
        let mut step = -off / self.slope(near, convected);
        // Far from the root secants may stand still where there is none.
        for _ in 0..8 {
            if step.is_nan() || step.abs() > 0.3 * at {
                break;
            }
            let (found, _) = surplus(at + step);
            at += step;
            if step.abs() <= 1e-13 * at || found == 0.0 || found == off {
                // As near as rounding lets it come, or not near at all.
                if found.abs() <= 1e-11 * absorbed.abs().max(planck::exitance(at)) {
                    return at;
                }
                break;
            }
            step *= -found / (found - off);
            off = found;
        }
        self.temperature(absorbed)
    }

    /// How what is given off grows with the temperature, W/(m²·K): that by
    /// convection as the power 5/4 of the difference, which is nearly so.
    fn slope(&self, temperature: f64, convected: f64) -> f64 {
        let difference = temperature - self.air;
        let lost = if difference.abs() > 1e-6 {
            1.25 * convected / difference
        } else {
            0.0
        };
        4.0 * self.emissivities * STEFAN_BOLTZMANN * temperature.powi(3) + lost.max(0.0)
    }

    /// Returns by how much the exitance of a black body at the plate's
    /// temperature grows for each W/m² that it absorbs more, to a fifth.
    pub(super) fn gain(&self, temperature: f64, convected: f64) -> f64 {
        let emitted = 4.0 * STEFAN_BOLTZMANN * temperature.powi(3);
        emitted / self.slope(temperature, convected)
    }
}

/// The root between two places of a function that crosses zero once there, by
/// secants held inside a bracket (Illinois).
fn root(one: f64, other: f64, value: impl Fn(f64) -> f64) -> f64 {
    let (mut a, mut b) = (one, other);
    let (mut at_a, mut at_b) = (value(a), value(b));
    // By construction the signs differ, but for rounding when both are the root.
    if at_a == 0.0 || (at_a > 0.0) == (at_b > 0.0) {
        return if at_a.abs() < at_b.abs() { a } else { b };
    }
    for _ in 0..200 {
        let next = (a * at_b - b * at_a) / (at_b - at_a);
        let next = if next > a.min(b) && next < a.max(b) {
            next
        } else {
            0.5 * (a + b)
        };
        let found = value(next);
        if found == 0.0 || (next - b).abs() <= 1e-14 * b.abs() {
            return next;
        }
        if (found > 0.0) == (at_b > 0.0) {
            at_a *= 0.5;
        } else {
            (a, at_a) = (b, at_b);
        }
        (b, at_b) = (next, found);
    }
    b
}

/// Two large parallel walls with thin plates between them.
#[derive(Clone, Copy, Debug)]
pub struct Walls<'a> {
    /// The temperature of the first wall, K.
    pub from: f64,
    /// The emissivity of the first wall.
    pub from_emissivity: f64,
    /// The temperature of the second wall, K.
    pub to: f64,
    /// The emissivity of the second wall.
    pub to_emissivity: f64,
    /// The plates from the first wall on: emissivities of the face towards it
    /// and of the face away from it.
    pub plates: &'a [[f64; 2]],
}

impl Walls<'_> {
    /// Returns the net heat from the first wall to the second, W/m².
    ///
    /// # Accuracy
    ///
    /// Exact relation; relative error below `1e-14`.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] unless temperatures are above 0 K and at most
    /// 100 000 K, and emissivities in (0, 1].
    ///
    /// # Source
    ///
    /// σ(T₁⁴ − T₂⁴) / [1/ε₁ + 1/ε₂ − 1 + Σ(1/ε_front + 1/ε_back − 1)], the
    /// textbook relation for grey diffuse plates without air; checked in
    /// `tests/published/shields.rs`.
    ///
    /// # Examples
    ///
    /// ```
    /// use farglow::physics::screen::Walls;
    ///
    /// let walls = Walls {
    ///     from: 750.0, from_emissivity: 0.8,
    ///     to: 550.0, to_emissivity: 0.9,
    ///     plates: &[[0.12, 0.12]],
    /// };
    /// assert!((walls.net_flux()? - 748.9).abs() < 0.1);
    /// # Ok::<(), farglow::physics::Error>(())
    /// ```
    pub fn net_flux(&self) -> Result<f64, Error> {
        let resistances = self.resistances()?;
        let total = resistances.iter().sum::<f64>();
        Ok((planck::exitance(self.from) - planck::exitance(self.to)) / total)
    }

    /// Returns the temperature of each plate, K, from the first wall on.
    ///
    /// # Errors
    ///
    /// As [`Walls::net_flux`].
    ///
    /// # Source
    ///
    /// As [`Walls::net_flux`]: σT⁴ falls by the flux times each resistance.
    pub fn temperatures(&self) -> Result<Vec<f64>, Error> {
        let flux = self.net_flux()?;
        let resistances = self.resistances()?;
        let mut black = planck::exitance(self.from);
        Ok(resistances[..self.plates.len()]
            .iter()
            .map(|resistance| {
                black -= flux * resistance;
                (black.max(0.0) / STEFAN_BOLTZMANN).sqrt().sqrt()
            })
            .collect())
    }

    /// The resistance of each gap, between a face and the next.
    fn resistances(&self) -> Result<Vec<f64>, Error> {
        for (name, temperature) in [
            ("temperature of the first wall", self.from),
            ("temperature of the second wall", self.to),
        ] {
            let _ = positive(name, temperature, 1e5, "above 0 K and at most 100000 K")?;
        }
        let faces = std::iter::once(self.from_emissivity)
            .chain(self.plates.iter().flatten().copied())
            .chain(std::iter::once(self.to_emissivity))
            .map(|emissivity| positive("emissivity", emissivity, 1.0, "above 0 and at most 1"))
            .collect::<Result<Vec<f64>, Error>>()?;
        Ok(faces
            .chunks(2)
            .map(|gap| 1.0 / gap[0] + (1.0 - gap[1]) / gap[1])
            .collect())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn plate(emissivities: f64, convection: Convection, air: f64) -> Plate {
        let face = |upward| Face {
            along: 1.0,
            area_over_perimeter: 0.25,
            longest: 1.0,
            upward,
        };
        Plate {
            emissivities,
            covered: 1.0,
            faces: [face(0.0), face(-0.0)],
            convection,
            air,
        }
    }

    #[test]
    fn balance_holds_at_the_root_and_is_bracketed() {
        for air in [260.0, 298.15, 330.0] {
            for emissivities in [0.02, 0.3, 1.1, 2.0] {
                for convection in [
                    Convection::Stated(0.0),
                    Convection::Stated(12.0),
                    Convection::Moving(0.0),
                    Convection::Moving(3.0),
                ] {
                    let plate = plate(emissivities, convection, air);
                    let mut before = 0.0;
                    for absorbed in [0.0, 1.0, 100.0, 450.0, 1e4, 1e5, 1e6] {
                        let found = plate.temperature(absorbed);
                        let given = emissivities * planck::exitance(found) + plate.convected(found);
                        assert!(
                            (given - absorbed).abs() <= 1e-10 * (absorbed + 500.0),
                            "{plate:?} at {found} K gives {given}, takes {absorbed}"
                        );
                        assert!(
                            found >= before && plate.hottest(absorbed) >= found - 1e-9
                                || found < air,
                            "{absorbed}: {found} after {before}"
                        );
                        before = found;
                    }
                }
            }
        }
    }

    #[test]
    fn gain_is_the_slope_of_the_balance() {
        for convection in [Convection::Stated(10.0), Convection::Moving(0.3)] {
            let plate = plate(1.5, convection, 298.15);
            for absorbed in [1000.0, 5e3, 3e4] {
                let at = |absorbed: f64| planck::exitance(plate.temperature(absorbed));
                let slope = (at(absorbed * 1.001) - at(absorbed * 0.999)) / (0.002 * absorbed);
                let temperature = plate.temperature(absorbed);
                let found = plate.gain(temperature, plate.convected(temperature));
                assert!(
                    (found / slope - 1.0).abs() < 0.2,
                    "{absorbed}: {found} against {slope}"
                );
            }
        }
    }

    #[test]
    fn temperatures_are_found_alike_from_anywhere() {
        for convection in [
            Convection::Stated(0.0),
            Convection::Stated(10.0),
            Convection::Moving(0.3),
        ] {
            let plate = plate(1.2, convection, 298.15);
            for absorbed in [10.0, 537.0, 1000.0, 3e4, 1e6] {
                let expected = plate.temperature(absorbed);
                for near in [
                    1.0,
                    2.5,
                    298.15,
                    0.9 * expected,
                    1.001 * expected,
                    expected,
                    9e3,
                ] {
                    let found = plate.temperature_near(absorbed, near);
                    assert!(
                        (found / expected - 1.0).abs() < 1e-11,
                        "{absorbed} from {near} K: {found} against {expected}"
                    );
                }
            }
        }
    }

    #[test]
    fn each_plate_more_lets_less_through() {
        let mut before = f64::INFINITY;
        for count in 0..20 {
            let plates = vec![[0.3, 0.1]; count];
            let walls = Walls {
                from: 1200.0,
                from_emissivity: 0.9,
                to: 300.0,
                to_emissivity: 0.8,
                plates: &plates,
            };
            let found = walls.net_flux().expect("possible walls");
            assert!(found < before, "{count} plates: {found} after {before}");
            before = found;
            let steps = walls.temperatures().expect("possible walls");
            assert!(
                steps.windows(2).all(|pair| pair[1] < pair[0])
                    && steps.iter().all(|step| (300.0..=1200.0).contains(step)),
                "{steps:?}"
            );
        }
    }

    #[test]
    fn impossible_walls_are_refused_by_name() {
        let walls = Walls {
            from: 1200.0,
            from_emissivity: 0.9,
            to: 300.0,
            to_emissivity: 0.8,
            plates: &[[0.0, 0.1]],
        };
        assert_eq!(
            walls.net_flux().expect_err("a mirror").to_string(),
            "emissivity must be above 0 and at most 1, found 0"
        );
        let cold = Walls {
            to: f64::NAN,
            plates: &[],
            ..walls
        };
        assert_eq!(
            cold.temperatures().expect_err("no temperature").to_string(),
            "temperature of the second wall must be above 0 K and at most 100000 K, found NaN"
        );
    }
}
