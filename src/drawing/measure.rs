//! The units that a picture tells lengths and irradiances in, and how they are
//! rounded there: distances to stand off and irradiances up. What was typed and
//! what is stored stay as they are.

use std::sync::LazyLock;

use crate::units::format::{self, Rounding};
use crate::units::{Dimension, Unit};

/// A system of units to show quantities in.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Measure {
    /// Metres, °C, W/m².
    #[default]
    Metric,
    /// Feet, °F, Btu/(h·ft²).
    Us,
}

/// The units that are asked for at every frame, read once.
static UNITS: LazyLock<[Unit; 4]> = LazyLock::new(|| {
    let known = |symbol| Unit::parse(symbol).expect("the units of a picture are known");
    [
        Unit::coherent(Dimension::LENGTH),
        known("W/m²"),
        known("ft"),
        known("Btu/(h·ft²)"),
    ]
});

impl Measure {
    /// Returns the unit of lengths.
    #[must_use]
    pub fn length(self) -> &'static Unit {
        match self {
            Measure::Metric => &UNITS[0],
            Measure::Us => &UNITS[2],
        }
    }

    /// Returns the unit of irradiances along an axis or a legend.
    #[must_use]
    pub fn irradiance(self) -> &'static Unit {
        match self {
            Measure::Metric => &UNITS[1],
            Measure::Us => &UNITS[3],
        }
    }

    /// Returns a stand-off distance in metres, rounded outwards: to the next
    /// 0.1 m or the next half foot.
    #[must_use]
    pub fn safe_distance(self, si: f64) -> String {
        match self {
            Measure::Metric => format::safe_distance(si),
            Measure::Us => format::safe_feet(si),
        }
    }

    /// Returns where something stands, in metres, rounded inwards: who stands
    /// farther out than is told is no worse off.
    #[must_use]
    pub fn standing(self, si: f64) -> String {
        if si <= 0.0 {
            return format!("0 {}", self.length().symbol());
        }
        format::quantity(si, self.length(), 3, Rounding::Down)
    }

    /// Returns a height above the floor in metres, which has no safe side.
    #[must_use]
    pub fn height(self, si: f64) -> String {
        format::quantity(si, self.length(), 3, Rounding::Nearest)
    }

    /// Returns an irradiance in W/m², up at three figures.
    #[must_use]
    pub fn safe_irradiance(self, si: f64) -> String {
        match self {
            Measure::Metric => format::safe_irradiance(si),
            Measure::Us => format::quantity(si, self.irradiance(), 3, Rounding::Up),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn stand_off_distances_go_outwards_and_standing_ones_inwards() {
        for (si, safe, standing) in [
            (0.0, "0.0 ft", "0 ft"),
            (0.3048, "1.0 ft", "1.00 ft"),
            // 11.31 m is 37.106 ft.
            (11.31, "37.5 ft", "37.1 ft"),
            (11.4, "37.5 ft", "37.4 ft"),
            (11.43, "37.5 ft", "37.5 ft"),
            (3.06, "10.5 ft", "10.0 ft"),
            (2.5, "8.5 ft", "8.20 ft"),
        ] {
            assert_eq!(Measure::Us.safe_distance(si), safe, "{si} m");
            assert_eq!(Measure::Us.standing(si), standing, "{si} m");
        }
        assert_eq!(Measure::Metric.safe_distance(11.31), "11.4 m");
        assert_eq!(Measure::Metric.standing(11.39), "11.3 m");
    }

    /// Source: NIST SP 811 (2008), B.8: 1 Btu(IT)/(h·ft²) = 3.154 591 W/m²
    /// (from memory); the digits below follow from it.
    #[test]
    fn irradiances_go_up_in_either_unit() {
        assert_eq!(Measure::Metric.safe_irradiance(100.01), "101 W/m²");
        // 31.702 by the factor above.
        assert_eq!(Measure::Us.safe_irradiance(100.01), "31.8 Btu/(h·ft²)");
        assert_eq!(
            Measure::Us.safe_irradiance(3.154_591 * 1.0001),
            "1.01 Btu/(h·ft²)"
        );
        assert_eq!(Measure::Us.safe_irradiance(0.0), "0.00 Btu/(h·ft²)");
    }
}
