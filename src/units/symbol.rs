//! The known unit symbols with their exact factors, and what people write for
//! them. Factors are kept as a multiplier and a divisor, so that `780 nm` is
//! the `f64` nearest to 7.8e-7 and not a rounding of a rounding.

use crate::spelling::nearest;

use super::Dimension;

/// One known symbol: `si = (x + offset) · multiply / divide`.
#[derive(Debug)]
pub(super) struct Symbol {
    pub(super) symbol: &'static str,
    pub(super) multiply: f64,
    pub(super) divide: f64,
    /// Set for a scale with a zero of its own.
    pub(super) offset: Option<f64>,
    pub(super) dimension: Dimension,
}

const fn unit(symbol: &'static str, multiply: f64, divide: f64, dimension: Dimension) -> Symbol {
    Symbol {
        symbol,
        multiply,
        divide,
        offset: None,
        dimension,
    }
}

const fn scale(symbol: &'static str, offset: f64, multiply: f64, divide: f64) -> Symbol {
    Symbol {
        symbol,
        multiply,
        divide,
        offset: Some(offset),
        dimension: Dimension::TEMPERATURE,
    }
}

/// Every known symbol, as it is printed.
///
/// # Source
///
/// SI Brochure, 9th edition (2019): Table 4 (derived units), Table 7
/// (prefixes), Table 8 (min, h, °). NIST SP 811 (2008), Appendix B: inch and
/// foot (exact since 1959), °F, calorie and Btu; all from memory of those
/// tables. `cal` and `Btu` are the *International Table* ones, 4.1868 J and
/// 1055.055 852 62 J, both exact: they are the pair behind the trade's
/// 1 kcal/(m²·h) = 1.163 W/m², and the thermochemical ones are smaller by
/// 0.067 %, so that a limit or reading in calories is never taken for less heat
/// than it may be.
pub(super) static SYMBOLS: &[Symbol] = &[
    unit("nm", 1.0, 1e9, Dimension::LENGTH),
    unit("µm", 1.0, 1e6, Dimension::LENGTH),
    unit("mm", 1.0, 1e3, Dimension::LENGTH),
    unit("cm", 1.0, 1e2, Dimension::LENGTH),
    unit("m", 1.0, 1.0, Dimension::LENGTH),
    unit("km", 1e3, 1.0, Dimension::LENGTH),
    unit("in", 254.0, 1e4, Dimension::LENGTH),
    unit("ft", 3048.0, 1e4, Dimension::LENGTH),
    unit("ms", 1.0, 1e3, Dimension::TIME),
    unit("s", 1.0, 1.0, Dimension::TIME),
    unit("min", 60.0, 1.0, Dimension::TIME),
    unit("h", 3600.0, 1.0, Dimension::TIME),
    unit("Hz", 1.0, 1.0, Dimension::FREQUENCY),
    unit("g", 1.0, 1e3, Dimension::MASS),
    unit("kg", 1.0, 1.0, Dimension::MASS),
    unit("K", 1.0, 1.0, Dimension::TEMPERATURE),
    scale("°C", 273.15, 1.0, 1.0),
    scale("°F", 459.67, 5.0, 9.0),
    unit("mrad", 1.0, 1e3, Dimension::ANGLE),
    unit("rad", 1.0, 1.0, Dimension::ANGLE),
    unit("°", std::f64::consts::PI, 180.0, Dimension::ANGLE),
    unit("sr", 1.0, 1.0, Dimension::SOLID_ANGLE),
    unit("%", 1.0, 1e2, Dimension::NONE),
    unit("J", 1.0, 1.0, Dimension::ENERGY),
    unit("kJ", 1e3, 1.0, Dimension::ENERGY),
    unit("MJ", 1e6, 1.0, Dimension::ENERGY),
    unit("cal", 41868.0, 1e4, Dimension::ENERGY),
    unit("kcal", 41868.0, 10.0, Dimension::ENERGY),
    unit("Btu", 105_505_585_262.0, 1e8, Dimension::ENERGY),
    unit("mW", 1.0, 1e3, Dimension::POWER),
    unit("W", 1.0, 1.0, Dimension::POWER),
    unit("kW", 1e3, 1.0, Dimension::POWER),
    unit("MW", 1e6, 1.0, Dimension::POWER),
    unit("Pa", 1.0, 1.0, Dimension::PRESSURE),
    unit("hPa", 1e2, 1.0, Dimension::PRESSURE),
    unit("kPa", 1e3, 1.0, Dimension::PRESSURE),
];

/// Other ways of writing a symbol, with the power they stand for.
static ALIASES: &[(&str, &str, i8)] = &[
    ("um", "µm", 1),
    // The Greek letter mu, U+03BC, beside the micro sign U+00B5.
    ("\u{3bc}m", "µm", 1),
    ("degC", "°C", 1),
    ("degF", "°F", 1),
    ("deg", "°", 1),
    ("mm2", "mm", 2),
    ("mm3", "mm", 3),
    ("cm2", "cm", 2),
    ("cm3", "cm", 3),
    ("m2", "m", 2),
    ("m3", "m", 3),
    ("in2", "in", 2),
    ("in3", "in", 3),
    ("ft2", "ft", 2),
    ("ft3", "ft", 3),
];

/// Words that people write for a unit, with the symbol that is meant.
static MEANT: &[(&str, &str)] = &[
    ("mtr", "m"),
    ("mtrs", "m"),
    ("meter", "m"),
    ("meters", "m"),
    ("metre", "m"),
    ("metres", "m"),
    ("micron", "µm"),
    ("microns", "µm"),
    ("inch", "in"),
    ("inches", "in"),
    ("foot", "ft"),
    ("feet", "ft"),
    ("sec", "s"),
    ("secs", "s"),
    ("second", "s"),
    ("seconds", "s"),
    ("mins", "min"),
    ("minute", "min"),
    ("minutes", "min"),
    ("hr", "h"),
    ("hrs", "h"),
    ("hour", "h"),
    ("hours", "h"),
    ("C", "°C"),
    ("celsius", "°C"),
    ("F", "°F"),
    ("fahrenheit", "°F"),
    ("kelvin", "K"),
    ("degree", "°"),
    ("degrees", "°"),
    ("radian", "rad"),
    ("radians", "rad"),
    ("percent", "%"),
    ("pct", "%"),
    ("watt", "W"),
    ("watts", "W"),
    ("kilowatt", "kW"),
    ("kilowatts", "kW"),
    ("joule", "J"),
    ("joules", "J"),
    ("gram", "g"),
    ("grams", "g"),
    ("kilo", "kg"),
    ("kilos", "kg"),
    ("calorie", "cal"),
    ("calories", "cal"),
];

/// The frozen list of bare symbols that a cell may not be named by, sorted.
/// Symbols that come later are read only after a number, so that old files
/// stay legal.
pub(super) static RESERVED: &[&str] = &[
    "Btu", "Hz", "J", "K", "MJ", "MW", "Pa", "W", "cal", "cm", "cm2", "cm3", "deg", "degC", "degF",
    "ft", "ft2", "ft3", "g", "h", "hPa", "in", "in2", "in3", "kJ", "kPa", "kW", "kcal", "kg", "km",
    "m", "m2", "m3", "mW", "min", "mm", "mm2", "mm3", "mrad", "ms", "nm", "rad", "s", "sr", "um",
];

/// Returns the symbol written as `text` and the power it stands for.
pub(super) fn find(text: &str) -> Option<(&'static Symbol, i8)> {
    let (symbol, power) = ALIASES
        .iter()
        .find(|&&(alias, ..)| alias == text)
        .map_or((text, 1), |&(_, symbol, power)| (symbol, power));
    SYMBOLS
        .iter()
        .find(|known| known.symbol == symbol)
        .map(|known| (known, power))
}

/// Returns the known symbol that was probably meant by `text`.
pub(super) fn suggest(text: &str) -> Option<&'static str> {
    let meant = MEANT.iter().find(|(word, _)| *word == text).or_else(|| {
        MEANT
            .iter()
            .find(|(word, _)| word.eq_ignore_ascii_case(text))
    });
    if let Some(&(_, symbol)) = meant {
        return Some(symbol);
    }
    nearest(text, SYMBOLS.iter().map(|known| known.symbol))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_reserved_symbols_are_frozen_and_known() {
        assert_eq!(RESERVED.len(), 45, "the list is frozen for format 1");
        assert!(RESERVED.is_sorted(), "{RESERVED:?}");
        for symbol in RESERVED {
            assert!(find(symbol).is_some(), "{symbol} is reserved but unknown");
        }
        let ascii = |text: &&str| text.bytes().all(|byte| byte.is_ascii_alphanumeric());
        let names = SYMBOLS.iter().map(|known| known.symbol);
        let names = names.chain(ALIASES.iter().map(|&(alias, ..)| alias));
        for name in names.filter(ascii) {
            assert!(RESERVED.contains(&name), "{name} could be a cell's name");
        }
    }

    #[test]
    fn slips_of_the_pen_are_recognised() {
        let table = [
            ("mtr", Some("m")),
            ("kw", Some("kW")),
            ("KW", Some("kW")),
            ("BTU", Some("Btu")),
            ("C", Some("°C")),
            ("kcla", Some("kcal")),
            ("Celsius", Some("°C")),
            ("pa", Some("Pa")),
            ("hearth", None),
            ("", None),
        ];
        for (text, expected) in table {
            assert_eq!(suggest(text), expected, "{text}");
        }
    }
}
