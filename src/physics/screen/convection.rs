//! What convection takes from one face of a flat screen.
//!
//! Published correlations for the mean over an isothermal plate; where two of
//! them hold, the one that takes less is used, since a screen that loses less to
//! the air is hotter and sends more on.

use super::air::Air;

/// The standard acceleration of gravity, m/s², exact by definition.
const GRAVITY: f64 = 9.806_65;

/// The local coefficient at the upper end of a laminar boundary layer on a plate
/// over its mean: the layer grows as x^(1/4), so that the coefficient falls as
/// x^(−1/4), whose mean over the plate is 4/3 of its end value.
///
/// # Source
///
/// Similarity solution of the laminar layer (Ostrach 1953, from memory); the
/// least place on a turbulent plate has about the mean.
pub const LEAST_SHARE: f64 = 0.75;

/// How heat passes from a screen to the air.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Convection {
    /// By the plate's own draught, or the air that is blown along it if that
    /// takes more; with the speed of that air in m/s.
    Moving(f64),
    /// A coefficient that somebody states, for each face, W/(m²·K).
    Stated(f64),
}

/// A face as convection sees it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Face {
    /// The length up the plate, m.
    pub along: f64,
    /// Area over perimeter, m: what counts for a plate that lies.
    pub area_over_perimeter: f64,
    /// The longest side, m: what counts for air that is blown along.
    pub longest: f64,
    /// The vertical part of the outward normal: 1 for a face straight up.
    pub upward: f64,
}

impl Face {
    /// Returns the coefficient of convection of the face, W/(m²·K).
    ///
    /// `surface` and `air` are temperatures in kelvin.
    ///
    /// Standing plate, the lesser of the two forms of Churchill and Chu where
    /// the flow is laminar: Nu = min(all, max(laminar, 0.10 Ra^(1/3))), from
    /// Ra = 0 to 10¹², turbulent from about 3·10⁸. Leaning plate: the same with
    /// g cos θ, θ from the vertical. Lying plate, L = area over perimeter: hot
    /// face up or cold face down 0.54 Ra^(1/4), then 0.15 Ra^(1/3) from where
    /// that is more (Ra = 4.7·10⁶); else 0.27 Ra^(1/4). Between standing and
    /// lying the greater of the two counts, as each by itself is a lower
    /// estimate there. Air that is blown: laminar, then turbulent from
    /// Re = 5·10⁵, over the longest side; it counts where it takes more than
    /// the plate's own draught, and is not added to it.
    ///
    /// # Accuracy
    ///
    /// Churchill and Chu's forms are within about 15 % of measurements, those
    /// for leaning and lying plates within about 25 %. Of the forms for
    /// standing plates the lesser is up to 25 % below the usual one. A draught
    /// against the rising air can take less than either alone.
    ///
    /// # Source
    ///
    /// Churchill and Chu (1975), *Int. J. Heat Mass Transfer* 18, 1323: for all
    /// Ra read in the library ht 1.2.0, which says it was checked with the
    /// original; the laminar form from memory. 0.10 Ra^(1/3): Warner and Arpaci
    /// (1968), from memory. Leaning: Rich (1953), from memory. Lying: McAdams
    /// (1954), read in the same library. Blown: Pohlhausen, and the mixed layer
    /// 0.037 Re^(4/5) − 871, from memory. Checked in this file.
    #[must_use]
    pub fn coefficient(&self, surface: f64, air: f64, speed: f64) -> f64 {
        self.in_film(&Air::at(0.5 * (surface + air)), surface, air, speed)
    }

    /// The same, with the air's properties at the film temperature at hand.
    pub(super) fn in_film(&self, film: &Air, surface: f64, air: f64, speed: f64) -> f64 {
        // Gr Pr over L³.
        let rayleigh = GRAVITY * film.expansion * (surface - air).abs() * film.prandtl
            / (film.kinematic_viscosity * film.kinematic_viscosity);
        let lean = (1.0 - self.upward * self.upward).max(0.0).sqrt();
        let standing = standing_plate(rayleigh * lean * self.along.powi(3), film.prandtl)
            * film.conductivity
            / self.along;
        let rises = (surface >= air) == (self.upward >= 0.0);
        let flat = self.area_over_perimeter;
        let lying = if self.upward == 0.0 {
            0.0
        } else {
            let rayleigh = rayleigh * self.upward.abs() * flat.powi(3);
            lying_plate(rayleigh, rises) * film.conductivity / flat
        };
        let blown = if speed == 0.0 {
            0.0
        } else {
            let reynolds = speed * self.longest / film.kinematic_viscosity;
            blown_plate(reynolds, film.prandtl) * film.conductivity / self.longest
        };
        standing.max(lying).max(blown)
    }
}

/// The mean Nusselt number of a standing isothermal plate.
fn standing_plate(rayleigh: f64, prandtl: f64) -> f64 {
    // Raised to 4/9 it is also what (…)^(8/27) is the 2/3 power of.
    let base = (1.0 + (0.492 / prandtl).powf(9.0 / 16.0)).powf(4.0 / 9.0);
    let cube_root = rayleigh.cbrt();
    let all = 0.825 + 0.387 * cube_root.sqrt() / (base * base).cbrt();
    let laminar = 0.68 + 0.670 * rayleigh.sqrt().sqrt() / base;
    (all * all).min(laminar.max(0.10 * cube_root))
}

/// The mean Nusselt number of a lying plate; `rises` where the heated air rises
/// off it (or the cooled air sinks).
fn lying_plate(rayleigh: f64, rises: bool) -> f64 {
    let quarter = rayleigh.sqrt().sqrt();
    if rises {
        (0.54 * quarter).max(0.15 * rayleigh.cbrt())
    } else {
        0.27 * quarter
    }
}

/// The mean Nusselt number of a plate along which air is blown.
fn blown_plate(reynolds: f64, prandtl: f64) -> f64 {
    let laminar = 0.664 * reynolds.sqrt();
    // Below Re = 5·10⁵ the mixed layer takes less: no power is needed.
    let mixed = if reynolds > 4e5 {
        0.037 * reynolds.powf(0.8) - 871.0
    } else {
        0.0
    };
    laminar.max(mixed) * prandtl.cbrt()
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Source: the library ht 1.2.0 (computed with it), form for all Ra at
    /// Pr = 0.7. Ours must not take more, and may take 30 % less.
    #[test]
    fn standing_plate_takes_no_more_than_the_usual_form() {
        for (rayleigh, expected) in [
            (1e3, 3.421_822_328_994_774),
            (1e5, 9.198_488_134_386_638),
            (1e7, 31.156_249_942_529_495),
            (1e8, 60.949_183_892_358_29),
            (1e9, 122.615_057_663_336_07),
            (1e10, 251.769_750_204_558_33),
            (1e12, 1_104.402_637_497_955_3),
        ] {
            let found = standing_plate(rayleigh, 0.7);
            assert!(
                found <= expected * (1.0 + 1e-12) && found > 0.70 * expected,
                "Ra {rayleigh:e}: {found} against {expected}"
            );
        }
        // There the form for all Ra is the lesser of the two, and is met exactly.
        let low = standing_plate(1e3, 0.7);
        let laminar = 0.68
            + 0.670 * 1e3_f64.powf(0.25) / (1.0 + (0.492 / 0.7_f64).powf(0.5625)).powf(4.0 / 9.0);
        assert!(
            (low - laminar.min(3.421_822_328_994_774)).abs() < 1e-12,
            "{low} against {laminar}"
        );
    }

    /// Source: the library ht 1.2.0, worked examples of its McAdams forms
    /// (read), Gr = 3.21e8 at Pr = 5.54; its Baehr form for Re = 1e5, Pr = 0.7.
    #[test]
    fn lying_and_blown_plates_are_those_of_the_library() {
        for (found, expected) in [
            (lying_plate(5.54 * 3.21e8, true), 181.731_212_743_844_57),
            (lying_plate(5.54 * 3.21e8, false), 55.445_647_993_628_29),
            (lying_plate(0.01 * 3.21e8, true), 22.857_041_558_492_334),
            (lying_plate(0.01 * 3.21e8, false), 11.428_520_779_246_167),
            (blown_plate(1e5, 0.7), 186.437_852_875_226_2),
        ] {
            assert!(
                (found / expected - 1.0).abs() < 1e-12,
                "{found} against {expected}"
            );
        }
    }

    /// Source: Incropera and DeWitt, *Fundamentals of Heat and Mass Transfer*,
    /// example 9.2 (glass fire screen 0.71 m high at 232 °C in a room at 23 °C:
    /// Ra = 1.813e9, Nu = 147, h = 7.0 W/(m²·K)), from memory; Nu also read in
    /// the library ht. Ours may take 25 % less, never more.
    #[test]
    fn textbook_fire_screen_is_bounded() {
        let face = Face {
            along: 0.71,
            area_over_perimeter: 0.71 * 1.02 / (2.0 * (0.71 + 1.02)),
            longest: 1.02,
            upward: 0.0,
        };
        let found = face.coefficient(505.15, 296.15, 0.0);
        assert!(found < 7.0 && found > 0.75 * 7.0, "{found} against 7.0");
    }

    #[test]
    fn convection_never_jumps_and_grows_with_the_difference() {
        for upward in [-1.0, -0.7, -0.2, 0.0, 0.1, 0.5, 0.99, 1.0] {
            for size in [0.05, 0.4, 1.0, 3.0] {
                let face = Face {
                    along: size,
                    area_over_perimeter: 0.25 * size,
                    longest: size,
                    upward,
                };
                let flux = |surface: f64| face.coefficient(surface, 300.0, 0.3) * (surface - 300.0);
                let mut before = flux(300.0);
                assert_eq!(before, 0.0);
                for step in 1..4000 {
                    let surface = 300.0 + 0.25 * f64::from(step);
                    let found = flux(surface);
                    assert!(
                        found > before,
                        "{surface} K, {upward}, {size} m: {found} after {before}"
                    );
                    let most = 0.05 * before + 5.0;
                    assert!(
                        found - before < most,
                        "{surface} K, {upward}, {size} m: jumps from {before} to {found}"
                    );
                    before = found;
                }
            }
        }
    }

    #[test]
    fn hot_face_downward_keeps_its_heat() {
        let face = |upward| Face {
            along: 1.0,
            area_over_perimeter: 0.25,
            longest: 1.0,
            upward,
        };
        let (down, up, standing) = (
            face(-1.0).coefficient(450.0, 300.0, 0.0),
            face(1.0).coefficient(450.0, 300.0, 0.0),
            face(0.0).coefficient(450.0, 300.0, 0.0),
        );
        assert!(down < standing && standing < up, "{down} {standing} {up}");
        // A cold plate is the same turned over.
        let cold = face(-1.0).coefficient(250.0, 300.0, 0.0);
        assert!(
            cold > face(1.0).coefficient(250.0, 300.0, 0.0),
            "cold face down {cold}"
        );
        // Turning it a hair off the vertical changes nothing to speak of.
        let (one, other) = (
            face(1e-9).coefficient(450.0, 300.0, 0.0),
            face(-1e-9).coefficient(450.0, 300.0, 0.0),
        );
        assert!(
            (one / standing - 1.0).abs() < 1e-9 && (other / standing - 1.0).abs() < 1e-9,
            "{one} {other} {standing}"
        );
    }
}
