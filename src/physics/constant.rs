//! Constants of radiation from the defining constants of the SI (2019).
//!
//! The first three are exact by definition; the others are derived from them
//! and rounded to the nearest `f64`. Checked in
//! `tests/published/defining_constants.rs`.

/// The Planck constant h, J·s, exact.
///
/// # Source
///
/// BIPM, *The International System of Units*, 9th edition (2019), table 1.
pub const PLANCK: f64 = 6.626_070_15e-34;

/// The speed of light in vacuum c, m/s, exact.
///
/// # Source
///
/// BIPM, *The International System of Units*, 9th edition (2019), table 1.
pub const LIGHT: f64 = 299_792_458.0;

/// The Boltzmann constant k, J/K, exact.
///
/// # Source
///
/// BIPM, *The International System of Units*, 9th edition (2019), table 1.
pub const BOLTZMANN: f64 = 1.380_649e-23;

/// The Stefan-Boltzmann constant σ = 2π⁵k⁴/(15h³c²), W/(m²·K⁴).
pub const STEFAN_BOLTZMANN: f64 = 5.670_374_419_184_429e-8;

/// The Wien wavelength displacement constant b: λ_peak = b/T, m·K.
pub const WIEN: f64 = 2.897_771_955_185_173e-3;

/// The Wien frequency displacement constant b′: ν_peak = b′·T, Hz/K.
pub const WIEN_FREQUENCY: f64 = 58_789_257_576.468_25;

/// The first radiation constant for exitance c₁ = 2πhc², W·m².
pub const FIRST_RADIATION: f64 = 2.0 * std::f64::consts::PI * PLANCK * LIGHT * LIGHT;

/// The second radiation constant c₂ = hc/k, m·K.
pub const SECOND_RADIATION: f64 = 1.438_776_877_503_933_9e-2;

/// The temperature of 0 °C, K, exact: t/°C = T/K − 273.15.
///
/// # Source
///
/// BIPM, *The International System of Units*, 9th edition (2019), 2.3.1.
pub const ZERO_CELSIUS: f64 = 273.15;
