//! What leaves a hot surface, by band and by hazard weighting.
//!
//! All exitances in W/m² into the hemisphere; surfaces are diffuse emitters, so
//! that a radiance is the exitance over π sr.

use super::error::positive;
use super::spectrum::Spectrum;
use super::{Error, hazard, planck};

/// The greatest temperature that is accepted, K: far above any arc.
const HOTTEST: f64 = 1e5;

/// A band of wavelengths, in metres.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Band {
    /// The shortest wavelength.
    pub from: f64,
    /// The longest wavelength.
    pub to: f64,
}

impl Band {
    /// What limits for cornea and lens judge: 780–3000 nm.
    pub const NEAR_INFRARED: Self = Self {
        from: 780e-9,
        to: 3000e-9,
    };
    /// What limits for the skin judge: 380–3000 nm.
    pub const SKIN: Self = Self {
        from: 380e-9,
        to: 3000e-9,
    };
    /// UV-A: 315–400 nm.
    pub const ULTRAVIOLET_A: Self = Self {
        from: 315e-9,
        to: 400e-9,
    };
    /// IR-A: 780–1400 nm, what still reaches the retina unseen.
    pub const INFRARED_A: Self = Self {
        from: 780e-9,
        to: 1400e-9,
    };

    /// Returns the fraction of a black body's exitance in this band.
    ///
    /// `temperature` in kelvin; see [`planck::band_fraction`].
    #[must_use]
    pub fn fraction(self, temperature: f64) -> f64 {
        planck::band_fraction(self.from, self.to, temperature)
    }
}

/// The exitance of a surface for every quantity that guidance judges, W/m².
///
/// The weighted ones are the exitance times a dimensionless hazard weight.
/// How the tables of the weights are known stands in the heads of the files in
/// `resources/spectra`, in short:
///
/// - blue light B(λ) and the retinal R(λ) of directive 2006/25/EC: most rows
///   read in a library that quotes the same table of IEC 62471, but 300–380 nm
///   and the value at 485 nm from memory (0.32 here, where IEC 62471 and ICNIRP
///   have 0.40: 1.2 % of a furnace's blue-light radiance);
/// - the retinal R(λ) of ICNIRP 2013: from memory. Its peak is 1 where that of
///   the directive is 10: pair each with its own limit;
/// - the ultraviolet S(λ): from memory, every number.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Emission {
    /// All wavelengths.
    pub total: f64,
    /// 780–3000 nm, unweighted.
    pub near_infrared: f64,
    /// 380–3000 nm, unweighted.
    pub skin: f64,
    /// 300–700 nm, weighted with B(λ) of directive 2006/25/EC.
    pub blue_light: f64,
    /// 380–1400 nm, weighted with R(λ) of directive 2006/25/EC, peak 10.
    pub retinal_2006: f64,
    /// 380–1400 nm, weighted with R(λ) of ICNIRP 2013, peak 1.
    pub retinal_2013: f64,
    /// 780–1400 nm, unweighted.
    pub infrared_a: f64,
    /// 180–400 nm, weighted with S(λ) of directive 2006/25/EC, peak 1.
    pub ultraviolet: f64,
    /// 315–400 nm, unweighted.
    pub ultraviolet_a: f64,
}

impl Emission {
    /// Returns the exitances of a grey surface that may emit more strongly at
    /// short wavelengths.
    ///
    /// `temperature` in kelvin; both emissivities in (0, 1].
    /// `near_infrared_emissivity` counts in every band and weighting, all of
    /// which end at or below 3000 nm; `emissivity` counts in the total, which
    /// is ε σ T⁴. Where the first is much the greater a band may come out above
    /// the total: each is meant for its own limit, on the safe side.
    ///
    /// For a surface of one emissivity give the same number twice.
    ///
    /// # Accuracy
    ///
    /// Bands as [`planck::band_fraction`]. Weighted exitances: the weight is
    /// linear between the rows of its table (5 nm apart), and its product with
    /// Planck's law is integrated by two Gauss points between rows: relative
    /// error below `2e-5` from 800 K up, against a fine quadrature of the same
    /// integrand.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the temperature is not above 0 K and at most
    /// 100 000 K, or an emissivity not in (0, 1].
    ///
    /// # Source
    ///
    /// Stefan-Boltzmann and Planck; checked in
    /// `tests/published/ladle_case.rs`.
    ///
    /// # Examples
    ///
    /// ```
    /// use farglow::physics::surface::Emission;
    ///
    /// let door = Emission::grey(1273.15, 1.0, 1.0)?;
    /// assert!((door.near_infrared / door.total - 0.4468).abs() < 5e-5);
    /// # Ok::<(), farglow::physics::Error>(())
    /// ```
    pub fn grey(
        temperature: f64,
        emissivity: f64,
        near_infrared_emissivity: f64,
    ) -> Result<Self, Error> {
        let temperature = positive(
            "temperature",
            temperature,
            HOTTEST,
            "above 0 K and at most 100000 K",
        )?;
        let total = positive("emissivity", emissivity, 1.0, "above 0 and at most 1")?;
        let short = positive(
            "near infrared emissivity",
            near_infrared_emissivity,
            1.0,
            "above 0 and at most 1",
        )?;
        let black = planck::exitance(temperature);
        let weighted = hazard::exitances(temperature);
        Ok(Self {
            total: total * black,
            near_infrared: short * black * Band::NEAR_INFRARED.fraction(temperature),
            skin: short * black * Band::SKIN.fraction(temperature),
            blue_light: short * weighted.blue_light,
            retinal_2006: short * weighted.retinal_2006,
            retinal_2013: short * weighted.retinal_2013,
            infrared_a: short * black * Band::INFRARED_A.fraction(temperature),
            ultraviolet: short * weighted.ultraviolet,
            ultraviolet_a: short * black * Band::ULTRAVIOLET_A.fraction(temperature),
        })
    }

    /// Returns the exitances of a surface whose emissivity is known by
    /// wavelength.
    ///
    /// `temperature` in kelvin. The total is that of the table too: with few
    /// rows in the far infrared it stands on what is held beyond the last.
    ///
    /// # Accuracy
    ///
    /// Total and bands to `1e-12` relative, as [`Spectrum::band_fraction`].
    /// Weighted exitances: weight and emissivity are linear between the rows of
    /// their tables, and their product with Planck's law is integrated by two
    /// Gauss points between any two rows of either: relative error below `2e-5`
    /// from 800 K up, against a fine quadrature of the same integrand.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the temperature is not above 0 K and at most
    /// 100 000 K.
    ///
    /// # Source
    ///
    /// Planck's law times the table; checked in
    /// `tests/published/quadrature_of_planck.rs`.
    ///
    /// # Examples
    ///
    /// ```
    /// use farglow::physics::spectrum::Spectrum;
    /// use farglow::physics::surface::Emission;
    ///
    /// let metal = Spectrum::new(&[[1.0e-6, 0.36], [10.0e-6, 0.12]])?;
    /// let pool = Emission::spectral(1673.15, &metal)?;
    /// // Half of what leaves it lies below 2.4 µm, where it emits most strongly.
    /// assert!(pool.near_infrared / pool.total > 0.65);
    /// # Ok::<(), farglow::physics::Error>(())
    /// ```
    pub fn spectral(temperature: f64, emissivity: &Spectrum) -> Result<Self, Error> {
        let temperature = positive(
            "temperature",
            temperature,
            HOTTEST,
            "above 0 K and at most 100000 K",
        )?;
        let black = planck::exitance(temperature);
        let weighted = hazard::spectral(temperature, emissivity);
        let band = |band: Band| black * emissivity.band_fraction(band.from, band.to, temperature);
        Ok(Self {
            total: black * emissivity.total(temperature),
            near_infrared: band(Band::NEAR_INFRARED),
            skin: band(Band::SKIN),
            blue_light: weighted.blue_light,
            retinal_2006: weighted.retinal_2006,
            retinal_2013: weighted.retinal_2013,
            infrared_a: band(Band::INFRARED_A),
            ultraviolet: weighted.ultraviolet,
            ultraviolet_a: band(Band::ULTRAVIOLET_A),
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn each_emissivity_acts_on_its_own_quantities() {
        let black = Emission::grey(1500.0, 1.0, 1.0).expect("a black body");
        let grey = Emission::grey(1500.0, 0.3, 0.45).expect("a bare metal");
        let ratios = [
            (grey.total / black.total, 0.3),
            (grey.near_infrared / black.near_infrared, 0.45),
            (grey.skin / black.skin, 0.45),
            (grey.blue_light / black.blue_light, 0.45),
            (grey.retinal_2006 / black.retinal_2006, 0.45),
            (grey.retinal_2013 / black.retinal_2013, 0.45),
            (grey.infrared_a / black.infrared_a, 0.45),
            (grey.ultraviolet / black.ultraviolet, 0.45),
            (grey.ultraviolet_a / black.ultraviolet_a, 0.45),
        ];
        for (found, expected) in ratios {
            assert!(
                (found - expected).abs() < 1e-15,
                "{found} against {expected}"
            );
        }
        assert!(
            black.infrared_a < black.near_infrared
                && black.near_infrared < black.skin
                && black.skin < black.total,
            "{black:?}"
        );
    }

    #[test]
    fn impossible_surfaces_are_refused_by_name() {
        let text = |made: Result<Emission, Error>| {
            made.map_or_else(|error| error.to_string(), |made| format!("{made:?}"))
        };
        for (made, expected) in [
            (
                Emission::grey(0.0, 1.0, 1.0),
                "temperature must be above 0 K and at most 100000 K, found 0",
            ),
            (
                Emission::grey(f64::NAN, 1.0, 1.0),
                "temperature must be above 0 K and at most 100000 K, found NaN",
            ),
            (
                Emission::grey(300.0, 0.0, 1.0),
                "emissivity must be above 0 and at most 1, found 0",
            ),
            (
                Emission::grey(300.0, 1.01, 1.0),
                "emissivity must be above 0 and at most 1, found 1.01",
            ),
            (
                Emission::grey(300.0, 1.0, -0.1),
                "near infrared emissivity must be above 0 and at most 1, found -0.1",
            ),
        ] {
            assert_eq!(text(made), expected);
        }
    }

    #[test]
    fn cold_and_hottest_surfaces_give_finite_numbers() {
        for temperature in [1e-300, 1e-3, 1.0, 77.0, 1e5] {
            let table = Spectrum::new(&[[1e-6, 0.4], [3e-6, 1.0]]).expect("a table");
            let grey = Emission::grey(temperature, 1.0, 1.0);
            let spectral = Emission::spectral(temperature, &table);
            for found in [grey, spectral].map(|made| made.expect("a possible surface")) {
                for value in [
                    found.total,
                    found.near_infrared,
                    found.skin,
                    found.blue_light,
                    found.retinal_2006,
                    found.retinal_2013,
                    found.infrared_a,
                    found.ultraviolet,
                    found.ultraviolet_a,
                ] {
                    assert!(
                        value.is_finite() && value >= 0.0,
                        "{temperature} K: {found:?}"
                    );
                }
            }
        }
    }
}
