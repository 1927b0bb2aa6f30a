//! What kind of quantity a number is: exponents of five base dimensions.
//! Metre, kilogram, second, kelvin and radian; a steradian is a square radian.

use std::fmt;

/// The kind of a quantity, as exponents of length, mass, time, temperature and
/// plane angle.
///
/// Exponents are whole numbers in `-128..=127`. Two quantities can be added or
/// compared only if their dimensions are equal.
///
/// # Source
///
/// SI Brochure, 9th edition (2019), section 2.3.3, but for the angle: the SI
/// counts the radian as the number one, which would let `90` pass as a heading
/// and a radiance as an irradiance.
///
/// # Examples
///
/// ```
/// use farglow::units::Dimension;
///
/// let flux = Dimension::POWER.over(Dimension::AREA);
/// assert_eq!(flux, Some(Dimension::IRRADIANCE));
/// assert_eq!(Dimension::IRRADIANCE.describe(), "an irradiance (W/m²)");
/// ```
#[derive(Clone, Copy, PartialEq, Eq, Hash, Debug)]
pub struct Dimension {
    length: i8,
    mass: i8,
    time: i8,
    temperature: i8,
    angle: i8,
}

/// The named dimensions: dimension, name, article, symbol of the coherent unit.
const NAMED: &[(Dimension, &str, &str, &str)] = &[
    (Dimension::NONE, "plain number", "a", ""),
    (Dimension::LENGTH, "length", "a", "m"),
    (Dimension::AREA, "area", "an", "m²"),
    (Dimension::VOLUME, "volume", "a", "m³"),
    (Dimension::TIME, "time", "a", "s"),
    (Dimension::FREQUENCY, "frequency", "a", "Hz"),
    (Dimension::SPEED, "speed", "a", "m/s"),
    (Dimension::MASS, "mass", "a", "kg"),
    (Dimension::TEMPERATURE, "temperature", "a", "K"),
    (Dimension::ANGLE, "angle", "an", "rad"),
    (Dimension::SOLID_ANGLE, "solid angle", "a", "sr"),
    (Dimension::ENERGY, "energy", "an", "J"),
    (Dimension::POWER, "power", "a", "W"),
    (Dimension::IRRADIANCE, "irradiance", "an", "W/m²"),
    (Dimension::RADIANT_EXPOSURE, "radiant exposure", "a", "J/m²"),
    (
        Dimension::SPECTRAL_EXITANCE,
        "spectral exitance",
        "a",
        "W/m³",
    ),
    (Dimension::RADIANCE, "radiance", "a", "W/(m²·sr)"),
    (Dimension::PRESSURE, "pressure", "a", "Pa"),
];

impl Dimension {
    /// A plain number.
    pub const NONE: Self = Self::of(0, 0, 0, 0, 0);
    /// A length, m.
    pub const LENGTH: Self = Self::of(1, 0, 0, 0, 0);
    /// An area, m².
    pub const AREA: Self = Self::of(2, 0, 0, 0, 0);
    /// A volume, m³.
    pub const VOLUME: Self = Self::of(3, 0, 0, 0, 0);
    /// A time, s.
    pub const TIME: Self = Self::of(0, 0, 1, 0, 0);
    /// A frequency, Hz.
    pub const FREQUENCY: Self = Self::of(0, 0, -1, 0, 0);
    /// A speed, m/s.
    pub const SPEED: Self = Self::of(1, 0, -1, 0, 0);
    /// A mass, kg.
    pub const MASS: Self = Self::of(0, 1, 0, 0, 0);
    /// A thermodynamic temperature or a difference of two, K.
    pub const TEMPERATURE: Self = Self::of(0, 0, 0, 1, 0);
    /// A plane angle, rad.
    pub const ANGLE: Self = Self::of(0, 0, 0, 0, 1);
    /// A solid angle, sr, which is rad².
    pub const SOLID_ANGLE: Self = Self::of(0, 0, 0, 0, 2);
    /// An energy, J.
    pub const ENERGY: Self = Self::of(2, 1, -2, 0, 0);
    /// A power or radiant flux, W.
    pub const POWER: Self = Self::of(2, 1, -3, 0, 0);
    /// An irradiance or exitance, W/m².
    pub const IRRADIANCE: Self = Self::of(0, 1, -3, 0, 0);
    /// An exitance or irradiance per wavelength, W/m³.
    pub const SPECTRAL_EXITANCE: Self = Self::of(-1, 1, -3, 0, 0);
    /// A radiant exposure (dose), J/m².
    pub const RADIANT_EXPOSURE: Self = Self::of(0, 1, -2, 0, 0);
    /// A radiance, W/(m²·sr).
    pub const RADIANCE: Self = Self::of(0, 1, -3, 0, -2);
    /// A pressure, Pa.
    pub const PRESSURE: Self = Self::of(-1, 1, -2, 0, 0);

    const fn of(length: i8, mass: i8, time: i8, temperature: i8, angle: i8) -> Self {
        Self {
            length,
            mass,
            time,
            temperature,
            angle,
        }
    }

    /// The exponents with the symbols of their base units, in the order in
    /// which a symbol is written.
    const fn exponents(self) -> [(&'static str, i8); 5] {
        [
            ("kg", self.mass),
            ("m", self.length),
            ("s", self.time),
            ("K", self.temperature),
            ("rad", self.angle),
        ]
    }

    fn map2(self, other: Self, f: impl Fn(i8, i8) -> Option<i8>) -> Option<Self> {
        Some(Self {
            length: f(self.length, other.length)?,
            mass: f(self.mass, other.mass)?,
            time: f(self.time, other.time)?,
            temperature: f(self.temperature, other.temperature)?,
            angle: f(self.angle, other.angle)?,
        })
    }

    /// Returns the dimension of a product, or `None` if an exponent leaves its
    /// range.
    pub fn times(self, other: Self) -> Option<Self> {
        self.map2(other, i8::checked_add)
    }

    /// Returns the dimension of a quotient, or `None` if an exponent leaves
    /// its range.
    pub fn over(self, other: Self) -> Option<Self> {
        self.map2(other, i8::checked_sub)
    }

    /// Returns the dimension of a whole power, or `None` if an exponent leaves
    /// its range.
    pub fn power(self, exponent: i8) -> Option<Self> {
        self.map2(self, |own, _| own.checked_mul(exponent))
    }

    /// Returns the dimension of the `n`-th root, or `None` if `n` is below one
    /// or an exponent is not a multiple of `n`.
    pub fn root(self, n: i8) -> Option<Self> {
        if n < 1 {
            return None;
        }
        self.map2(self, |own, _| (own % n == 0).then_some(own / n))
    }

    /// Returns the field's name for this dimension, such as `irradiance`, or
    /// `None` if it has no name of its own.
    pub fn name(self) -> Option<&'static str> {
        self.named().map(|&(_, name, _, _)| name)
    }

    /// Returns the symbol of the coherent SI unit: `W/m²`, empty for a plain
    /// number, `kg·m/s` for a dimension without a name.
    pub fn si_unit(self) -> String {
        if let Some(&(_, _, _, symbol)) = self.named() {
            return symbol.to_owned();
        }
        let part = |sign: i8| -> Vec<String> {
            self.exponents()
                .iter()
                .filter(|&&(_, exponent)| exponent.signum() == sign)
                .map(|&(symbol, exponent)| {
                    let size = i32::from(exponent).unsigned_abs();
                    if size == 1 {
                        symbol.to_owned()
                    } else {
                        format!("{symbol}{}", superscript(i64::from(size)))
                    }
                })
                .collect()
        };
        let (above, below) = (part(1), part(-1));
        let above = if above.is_empty() {
            "1".to_owned()
        } else {
            above.join("·")
        };
        match below.as_slice() {
            [] => above,
            [one] => format!("{above}/{one}"),
            many => format!("{above}/({})", many.join("·")),
        }
    }

    /// Returns how a message names this dimension: `an irradiance (W/m²)`,
    /// `a plain number`, or the unit alone where there is no name.
    pub fn describe(self) -> String {
        match self.named() {
            Some(&(_, name, article, "")) => format!("{article} {name}"),
            Some(&(_, name, article, symbol)) => format!("{article} {name} ({symbol})"),
            None => self.si_unit(),
        }
    }

    fn named(self) -> Option<&'static (Dimension, &'static str, &'static str, &'static str)> {
        NAMED.iter().find(|&&(dimension, ..)| dimension == self)
    }
}

impl fmt::Display for Dimension {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.describe())
    }
}

/// Returns a whole number in superscript digits: `⁻¹²`.
pub(super) fn superscript(number: i64) -> String {
    const DIGITS: [char; 10] = ['⁰', '¹', '²', '³', '⁴', '⁵', '⁶', '⁷', '⁸', '⁹'];
    number
        .to_string()
        .bytes()
        .map(|byte| match byte {
            b'-' => '⁻',
            digit => DIGITS[usize::from(digit - b'0')],
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn named_dimensions_are_what_their_units_say() {
        let watt = Dimension::ENERGY.over(Dimension::TIME);
        assert_eq!(watt, Some(Dimension::POWER));
        let flux = Dimension::POWER.over(Dimension::AREA);
        assert_eq!(flux, Some(Dimension::IRRADIANCE));
        let radiance = Dimension::IRRADIANCE.over(Dimension::SOLID_ANGLE);
        assert_eq!(radiance, Some(Dimension::RADIANCE));
        let dose = Dimension::IRRADIANCE.times(Dimension::TIME);
        assert_eq!(dose, Some(Dimension::RADIANT_EXPOSURE));
        let newton = Dimension::ENERGY.over(Dimension::LENGTH);
        assert_eq!(
            newton.and_then(|n| n.over(Dimension::AREA)),
            Some(Dimension::PRESSURE)
        );
        assert_eq!(Dimension::ANGLE.power(2), Some(Dimension::SOLID_ANGLE));
        assert_eq!(Dimension::TIME.power(-1), Some(Dimension::FREQUENCY));
    }

    #[test]
    fn roots_exist_only_where_every_exponent_divides() {
        assert_eq!(Dimension::AREA.root(2), Some(Dimension::LENGTH));
        assert_eq!(Dimension::VOLUME.root(3), Some(Dimension::LENGTH));
        assert_eq!(Dimension::LENGTH.root(2), None);
        assert_eq!(Dimension::AREA.root(0), None);
        assert_eq!(Dimension::AREA.root(-2), None);
        let fourth = Dimension::TEMPERATURE.power(4);
        assert_eq!(fourth.and_then(|d| d.root(4)), Some(Dimension::TEMPERATURE));
    }

    #[test]
    fn exponents_that_leave_their_range_are_refused() {
        let high = Dimension::LENGTH.power(127);
        assert!(high.is_some(), "127 is the last exponent that fits");
        assert_eq!(high.and_then(|d| d.times(Dimension::LENGTH)), None);
        assert_eq!(Dimension::AREA.power(100), None);
        assert_eq!(
            Dimension::LENGTH
                .power(-128)
                .and_then(|d| d.over(Dimension::LENGTH)),
            None
        );
    }

    #[test]
    fn dimensions_read_as_a_person_would_say_them() {
        let table = [
            (Dimension::NONE, "a plain number", ""),
            (Dimension::ANGLE, "an angle (rad)", "rad"),
            (Dimension::IRRADIANCE, "an irradiance (W/m²)", "W/m²"),
            (Dimension::RADIANCE, "a radiance (W/(m²·sr))", "W/(m²·sr)"),
            (Dimension::of(3, 0, -1, 0, 0), "m³/s", "m³/s"),
            (Dimension::of(1, 1, -2, 0, 0), "kg·m/s²", "kg·m/s²"),
            (Dimension::of(0, 1, -3, -4, 0), "kg/(s³·K⁴)", "kg/(s³·K⁴)"),
            (Dimension::of(-1, 0, 0, 0, 0), "1/m", "1/m"),
        ];
        for (dimension, description, unit) in table {
            assert_eq!(dimension.describe(), description, "{dimension:?}");
            assert_eq!(dimension.si_unit(), unit, "{dimension:?}");
        }
    }
}
