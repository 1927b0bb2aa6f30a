//! Dry air at one atmosphere, as convection on a screen needs it.
//!
//! Kelvin in, SI out. Meant for film temperatures from 200 K to 1200 K; moisture
//! and height above the sea are left out, which moves a coefficient by a few per
//! cent at most.

/// The pressure of a standard atmosphere, Pa, exact by definition.
const PRESSURE: f64 = 101_325.0;

/// The gas constant of dry air, J/(kg·K): 8.314 463 over 28.9647 g/mol.
const GAS_CONSTANT: f64 = 287.055;

/// What of air at one temperature counts for convection.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Air {
    /// The thermal conductivity k, W/(m·K).
    pub conductivity: f64,
    /// The kinematic viscosity ν, m²/s.
    pub kinematic_viscosity: f64,
    /// The Prandtl number, dimensionless.
    pub prandtl: f64,
    /// The volumetric expansion coefficient β, 1/K: 1/T of an ideal gas.
    pub expansion: f64,
}

impl Air {
    /// Returns the properties of dry air at a temperature.
    ///
    /// `temperature` in kelvin; outside 200 K to 1200 K those at the nearer end
    /// of that range are taken, but for the expansion.
    ///
    /// # Accuracy
    ///
    /// Against CoolProp 8.0: within 2.5 % from 250 K to 600 K, the Prandtl number
    /// within 4 %; all within 6 % up to 1200 K; checked in this file. A
    /// coefficient of convection goes with their roots.
    ///
    /// # Source
    ///
    /// Viscosity by Sutherland's law and conductivity, both with the constants
    /// of the *U.S. Standard Atmosphere* (1976); heat capacity by the polynomial
    /// of Zografos, Martin and Sunderland (1987), *Comput. Methods Appl. Mech.
    /// Eng.* 61, 177; density of an ideal gas. All constants from memory.
    #[must_use]
    pub fn at(temperature: f64) -> Self {
        let t = temperature.clamp(200.0, 1200.0);
        let root = t.sqrt();
        let viscosity = 1.458e-6 * t * root / (t + 110.4);
        let conductivity = 2.646_38e-3 * t * root / (t + 245.4 * 10_f64.powf(-12.0 / t));
        let capacity =
            (((1.9327e-10 * t - 7.9999e-7) * t + 1.1407e-3) * t - 4.4890e-1) * t + 1.0575e3;
        let density = PRESSURE / (GAS_CONSTANT * t);
        Self {
            conductivity,
            kinematic_viscosity: viscosity / density,
            prandtl: capacity * viscosity / conductivity,
            expansion: 1.0 / temperature.max(1.0),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Source: computed with CoolProp 8.0 (air of Lemmon and others 2000, its
    /// transport of Lemmon and Jacobsen 2004) at 101 325 Pa: temperature in K,
    /// density, viscosity, conductivity, Prandtl number.
    #[test]
    fn air_is_that_of_a_library_of_properties() {
        for (t, density, viscosity, conductivity, prandtl) in [
            (250.0, 1.4133, 1.6038e-5, 0.022_564, 0.7147),
            (300.0, 1.1770, 1.8537e-5, 0.026_384, 0.707_08),
            (400.0, 0.882_31, 2.3055e-5, 0.033_453, 0.6989),
            (500.0, 0.705_74, 2.7090e-5, 0.039_945, 0.6984),
            (600.0, 0.588_10, 3.0769e-5, 0.046_011, 0.7030),
            (800.0, 0.441_08, 3.7370e-5, 0.057_249, 0.7172),
            (1000.0, 0.352_88, 4.3280e-5, 0.067_677, 0.7297),
            (1200.0, 0.294_08, 4.8728e-5, 0.077_576, 0.7377),
        ] {
            let found = Air::at(t);
            for (name, found, expected) in [
                ("k", found.conductivity, conductivity),
                ("nu", found.kinematic_viscosity, viscosity / density),
                ("Pr", found.prandtl, prandtl),
                ("beta", found.expansion, 1.0 / t),
            ] {
                let tolerance = match name {
                    _ if t > 600.0 => 0.06,
                    "Pr" => 0.04,
                    _ => 0.025,
                };
                assert!(
                    (found / expected - 1.0).abs() < tolerance,
                    "{t} K: {name} {found} against {expected}, off by {:.4}",
                    found / expected - 1.0
                );
            }
        }
    }

    #[test]
    fn air_beyond_its_range_stays_finite_and_positive() {
        for t in [0.0, 1.0, 199.0, 1201.0, 1e5, 1e300] {
            let found = Air::at(t);
            for value in [
                found.conductivity,
                found.kinematic_viscosity,
                found.prandtl,
                found.expansion,
            ] {
                assert!(value.is_finite() && value > 0.0, "{t} K: {found:?}");
            }
        }
    }
}
