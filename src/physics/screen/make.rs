//! What a screen is made of: what it passes, absorbs and gives off.

use crate::physics::Error;
use crate::physics::error::positive;
use crate::physics::surface::Emission;

/// The absorptance of a shop plate for radiation from hot sources, unless its
/// emissivity is the greater: plates are soiled.
///
/// # Source
///
/// Common practice, no source.
pub const SOILED: f64 = 0.6;

/// The least emissivity, and share of wires: less gives off nothing to speak of.
const LEAST: f64 = 0.001;

/// What a screen is made of.
///
/// Front is the face that the normal points from.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Make {
    /// A plate that lets nothing through.
    Solid {
        /// The emissivities of front and back, from 0.001 to 1: no metal is below
        /// 0.01.
        emissivities: [f64; 2],
        /// The absorptances of front and back for radiation from hot sources,
        /// in (0, 1].
        absorptances: [f64; 2],
    },
    /// Wire mesh or a chain curtain.
    Mesh {
        /// The share of its area that lets through, from 0 to 0.999.
        open_fraction: f64,
    },
    /// Filter glass.
    Filter {
        /// The transmittance for the total of a hot source, in `0..=1`.
        transmittance: f64,
        /// The transmittance for 780–3000 nm, in `0..=1`.
        near_infrared_transmittance: f64,
        /// The transmittance for visible light and ultraviolet, in `0..=1`: 1
        /// where it is not known.
        visible_transmittance: f64,
    },
}

impl Make {
    /// Returns a solid plate whose absorptances are those of soiled plates:
    /// [`SOILED`] or the emissivity, whichever is more.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] for an emissivity not from 0.001 to 1.
    pub fn soiled(front_emissivity: f64, back_emissivity: f64) -> Result<Self, Error> {
        Self::Solid {
            emissivities: [front_emissivity, back_emissivity],
            absorptances: [front_emissivity.max(SOILED), back_emissivity.max(SOILED)],
        }
        .checked()
    }

    /// Returns itself if every number lies in its range.
    pub(super) fn checked(self) -> Result<Self, Error> {
        let fraction = |parameter, value: f64| {
            if (0.0..=1.0).contains(&value) {
                Ok(())
            } else {
                Err(Error::OutOfRange {
                    parameter,
                    range: "from 0 to 1",
                    value,
                })
            }
        };
        match self {
            Self::Solid {
                emissivities,
                absorptances,
            } => {
                for (parameter, value) in [
                    ("front emissivity", emissivities[0]),
                    ("back emissivity", emissivities[1]),
                ] {
                    if !(LEAST..=1.0).contains(&value) {
                        return Err(Error::OutOfRange {
                            parameter,
                            range: "from 0.001 to 1",
                            value,
                        });
                    }
                }
                for (name, value) in [
                    ("front absorptance", absorptances[0]),
                    ("back absorptance", absorptances[1]),
                ] {
                    let _ = positive(name, value, 1.0, "above 0 and at most 1")?;
                }
            }
            Self::Mesh { open_fraction } => {
                if !(0.0..=1.0 - LEAST).contains(&open_fraction) {
                    return Err(Error::OutOfRange {
                        parameter: "open fraction",
                        range: "from 0 to 0.999",
                        value: open_fraction,
                    });
                }
            }
            Self::Filter {
                transmittance,
                near_infrared_transmittance,
                visible_transmittance,
            } => {
                fraction("transmittance", transmittance)?;
                fraction("near infrared transmittance", near_infrared_transmittance)?;
                fraction("visible transmittance", visible_transmittance)?;
            }
        }
        Ok(self)
    }

    /// Says whether part of what falls on it goes through.
    #[must_use]
    pub fn is_clear(&self) -> bool {
        !matches!(self, Self::Solid { .. })
    }

    /// Returns what of an emission goes through, band by band.
    ///
    /// A mesh passes its open fraction of everything, at any angle: a real one
    /// passes less aslant. A filter's near infrared transmittance is a mean over
    /// 780–3000 nm, so that a part of that band may pass it better: IR-A counts
    /// as if all that passes lay there, or as not dimmed if that is less; the
    /// retinal weights, which reach from visible into infrared, with the better
    /// of the two. The total is never less than the bands that make it up: where
    /// the numbers contradict each other for a source, the bands count, and of
    /// two such filters the order. Each bound is on the safe side.
    #[must_use]
    pub fn passed(&self, emission: &Emission) -> Emission {
        match *self {
            Self::Solid { .. } => Emission::default(),
            Self::Mesh { open_fraction } => scaled(emission, open_fraction),
            Self::Filter {
                transmittance,
                near_infrared_transmittance: near,
                visible_transmittance: visible,
            } => {
                let near_infrared = near * emission.near_infrared;
                let infrared_a = emission.infrared_a.min(near_infrared);
                let skin =
                    near_infrared + visible * (emission.skin - emission.near_infrared).max(0.0);
                let best = if emission.infrared_a > 0.0 {
                    visible.max(infrared_a / emission.infrared_a)
                } else {
                    1.0
                };
                Emission {
                    total: (transmittance * emission.total)
                        .max(skin)
                        .min(emission.total),
                    near_infrared,
                    skin,
                    blue_light: visible * emission.blue_light,
                    retinal_2006: best * emission.retinal_2006,
                    retinal_2013: best * emission.retinal_2013,
                    infrared_a,
                    ultraviolet: visible * emission.ultraviolet,
                    ultraviolet_a: visible * emission.ultraviolet_a,
                }
            }
        }
    }

    /// The emissivities of front and back, per area of the screen, which are
    /// also the absorptances for radiation from room and screens. Wires and
    /// glass count as black there: they give off the most to people that they
    /// can.
    pub(super) fn emissivities(&self) -> [f64; 2] {
        match *self {
            Self::Solid { emissivities, .. } => emissivities,
            Self::Mesh { open_fraction } => [1.0 - open_fraction; 2],
            Self::Filter { .. } => [1.0; 2],
        }
    }

    /// The reflectances of front and back for radiation from room and screens.
    pub(super) fn reflectances(&self) -> [f64; 2] {
        match *self {
            Self::Solid { emissivities, .. } => emissivities.map(|value| 1.0 - value),
            Self::Mesh { .. } | Self::Filter { .. } => [0.0; 2],
        }
    }

    /// The reflectances of front and back for radiation from hot sources.
    pub(super) fn hot_reflectances(&self) -> [f64; 2] {
        match *self {
            Self::Solid { absorptances, .. } => absorptances.map(|value| 1.0 - value),
            Self::Mesh { .. } | Self::Filter { .. } => [0.0; 2],
        }
    }

    /// What of radiation from room and screens goes through: glass holds it all
    /// back.
    pub(super) fn long_transmittance(&self) -> f64 {
        match *self {
            Self::Mesh { open_fraction } => open_fraction,
            Self::Solid { .. } | Self::Filter { .. } => 0.0,
        }
    }

    /// What a face absorbs of the total of a hot source that falls on it.
    pub(super) fn absorbed(&self, face: usize, emission: &Emission) -> f64 {
        match self {
            Self::Solid { absorptances, .. } => absorptances[face] * emission.total,
            Self::Mesh { .. } | Self::Filter { .. } => emission.total - self.passed(emission).total,
        }
    }

    /// What a face absorbs of radiation from hot sources that other screens
    /// throw on it, as a share.
    pub(super) fn hot_absorptance(&self, face: usize) -> f64 {
        match *self {
            Self::Solid { absorptances, .. } => absorptances[face],
            Self::Mesh { open_fraction } => 1.0 - open_fraction,
            Self::Filter { transmittance, .. } => 1.0 - transmittance,
        }
    }
}

/// Every exitance times a share.
fn scaled(emission: &Emission, share: f64) -> Emission {
    Emission {
        total: share * emission.total,
        near_infrared: share * emission.near_infrared,
        skin: share * emission.skin,
        blue_light: share * emission.blue_light,
        retinal_2006: share * emission.retinal_2006,
        retinal_2013: share * emission.retinal_2013,
        infrared_a: share * emission.infrared_a,
        ultraviolet: share * emission.ultraviolet,
        ultraviolet_a: share * emission.ultraviolet_a,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn bands(emission: &Emission) -> [f64; 9] {
        [
            emission.total,
            emission.near_infrared,
            emission.skin,
            emission.blue_light,
            emission.retinal_2006,
            emission.retinal_2013,
            emission.infrared_a,
            emission.ultraviolet,
            emission.ultraviolet_a,
        ]
    }

    #[test]
    fn nothing_goes_through_that_did_not_fall_on_it() {
        let steps = [0.0, 0.02, 0.3, 0.9, 1.0];
        for temperature in [500.0, 1273.15, 1900.0] {
            let source = Emission::grey(temperature, 0.9, 0.9).expect("a source");
            for transmittance in steps {
                for near_infrared_transmittance in steps {
                    for visible_transmittance in steps {
                        let filter = Make::Filter {
                            transmittance,
                            near_infrared_transmittance,
                            visible_transmittance,
                        };
                        let passed = filter.passed(&source);
                        for (found, fell) in bands(&passed).into_iter().zip(bands(&source)) {
                            assert!(
                                (0.0..=fell).contains(&found),
                                "{filter:?}, {temperature} K: {passed:?} of {source:?}"
                            );
                        }
                        assert!(
                            passed.total >= passed.skin && passed.skin >= passed.near_infrared,
                            "{filter:?}: {passed:?}"
                        );
                    }
                }
            }
        }
    }

    #[test]
    fn mesh_passes_its_open_fraction_and_a_plate_nothing() {
        let source = Emission::grey(1500.0, 0.8, 0.8).expect("a source");
        let mesh = Make::Mesh { open_fraction: 0.4 };
        for (found, fell) in bands(&mesh.passed(&source)).into_iter().zip(bands(&source)) {
            assert_eq!(found, 0.4 * fell);
        }
        let absorbed = mesh.absorbed(0, &source);
        assert!(
            (absorbed - 0.6 * source.total).abs() < 1e-9,
            "{absorbed} of {}",
            source.total
        );
        let plate = Make::soiled(0.2, 0.9).expect("a plate");
        assert_eq!(plate.passed(&source), Emission::default());
        assert_eq!(plate.absorbed(0, &source), SOILED * source.total);
        assert_eq!(plate.absorbed(1, &source), 0.9 * source.total);
    }

    #[test]
    fn impossible_makes_are_refused_by_name() {
        let filter = |transmittance, near, visible| Make::Filter {
            transmittance,
            near_infrared_transmittance: near,
            visible_transmittance: visible,
        };
        for (made, expected) in [
            (
                Make::soiled(0.0, 0.5),
                "front emissivity must be from 0.001 to 1, found 0",
            ),
            (
                Make::soiled(0.5, f64::NAN),
                "back emissivity must be from 0.001 to 1, found NaN",
            ),
            (
                Make::Mesh { open_fraction: 1.0 }.checked(),
                "open fraction must be from 0 to 0.999, found 1",
            ),
            (
                filter(1.5, 0.1, 0.1).checked(),
                "transmittance must be from 0 to 1, found 1.5",
            ),
            (
                filter(0.5, -0.1, 0.1).checked(),
                "near infrared transmittance must be from 0 to 1, found -0.1",
            ),
            (
                filter(0.5, 0.1, 2.0).checked(),
                "visible transmittance must be from 0 to 1, found 2",
            ),
        ] {
            assert_eq!(made.expect_err("refused").to_string(), expected);
        }
    }
}
