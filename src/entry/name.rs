//! What a cell may be called.

/// The longest name of a cell, in characters.
pub(super) const LONGEST_NAME: usize = 40;

/// The names a cell may not have: constants, functions, bare unit symbols, and
/// words that would read as a number or a truth. Sorted, and frozen for format
/// 1 of the notebook file: units and functions that come later are recognised
/// only inside a literal or before a bracket.
pub const RESERVED: &[&str] = &[
    "Btu",
    "Hz",
    "J",
    "K",
    "MJ",
    "MW",
    "Pa",
    "W",
    "abs",
    "acos",
    "asin",
    "atan",
    "band_fraction",
    "blackbody_exitance",
    "cal",
    "ceil",
    "cm",
    "cm2",
    "cm3",
    "cos",
    "deg",
    "degC",
    "degF",
    "e",
    "exp",
    "false",
    "floor",
    "ft",
    "ft2",
    "ft3",
    "g",
    "h",
    "hPa",
    "in",
    "in2",
    "in3",
    "inf",
    "kJ",
    "kPa",
    "kW",
    "kcal",
    "kg",
    "km",
    "ln",
    "log10",
    "m",
    "m2",
    "m3",
    "mW",
    "max",
    "min",
    "mm",
    "mm2",
    "mm3",
    "mrad",
    "ms",
    "nan",
    "nm",
    "peak_wavelength",
    "pi",
    "rad",
    "round",
    "s",
    "sin",
    "sqrt",
    "sr",
    "stefan_boltzmann",
    "tan",
    "true",
    "um",
];

/// Returns whether a text has the shape of a name: `[A-Za-z_][A-Za-z0-9_]*`, at
/// most 40 characters.
///
/// A name of this shape may still be reserved: see [`is_reserved`].
pub fn is_name(text: &str) -> bool {
    let mut bytes = text.bytes();
    let first = bytes.next().is_some_and(is_first);
    first && text.len() <= LONGEST_NAME && bytes.all(is_later)
}

/// Returns whether a name is one of [`RESERVED`].
pub fn is_reserved(name: &str) -> bool {
    RESERVED.binary_search(&name).is_ok()
}

pub(super) const fn is_first(byte: u8) -> bool {
    byte.is_ascii_alphabetic() || byte == b'_'
}

pub(super) const fn is_later(byte: u8) -> bool {
    byte.is_ascii_alphanumeric() || byte == b'_'
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_list_of_reserved_names_is_frozen() {
        let printed = "Btu Hz J K MJ MW Pa W abs acos asin atan band_fraction blackbody_exitance \
            cal ceil cm cm2 cm3 cos deg degC degF e exp false floor ft ft2 ft3 g h hPa in in2 in3 \
            inf kJ kPa kW kcal kg km ln log10 m m2 m3 mW max min mm mm2 mm3 mrad ms nan nm \
            peak_wavelength pi rad round s sin sqrt sr stefan_boltzmann tan true um";
        assert_eq!(RESERVED.join(" "), printed);
        assert!(RESERVED.is_sorted(), "{RESERVED:?}");
    }

    #[test]
    fn names_have_latin_letters_digits_and_low_lines() {
        let long = "a".repeat(LONGEST_NAME);
        let table = [
            ("door", true),
            ("_1", true),
            ("T_hearth2", true),
            (long.as_str(), true),
            ("", false),
            ("2door", false),
            ("door.width", false),
            ("tür", false),
            ("a b", false),
            ("a-b", false),
        ];
        for (text, expected) in table {
            assert_eq!(is_name(text), expected, "{text}");
        }
        assert!(!is_name(&format!("{long}a")), "41 characters");
        assert!(is_name("m") && is_reserved("m"));
        assert!(!is_reserved("door"));
    }
}
