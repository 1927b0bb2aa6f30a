use super::*;
use crate::units::Dimension;

#[test]
fn literals_have_the_value_that_is_written() {
    let temperature = Dimension::TEMPERATURE;
    let table = [
        ("1250 ± 25 °C", 1523.15, Some(25.0), temperature),
        ("1250 +- 25 degC", 1523.15, Some(25.0), temperature),
        ("1250±25°C", 1523.15, Some(25.0), temperature),
        ("77 ± 9 °F", 298.15, Some(5.0), temperature),
        ("-40 °C", 233.15, None, temperature),
        ("−40 °F", 233.15, None, temperature),
        ("2.5 m", 2.5, None, Dimension::LENGTH),
        ("- 2.5 m", -2.5, None, Dimension::LENGTH),
        ("780 nm", 7.8e-7, None, Dimension::LENGTH),
        ("3 µm", 3e-6, None, Dimension::LENGTH),
        ("8 ft", 2.4384, None, Dimension::LENGTH),
        ("4 min", 240.0, None, Dimension::TIME),
        ("12 kW/m²", 12e3, None, Dimension::IRRADIANCE),
        ("10 mW/cm2", 100.0, None, Dimension::IRRADIANCE),
        ("0.9", 0.9, None, Dimension::NONE),
        ("6 %", 0.06, None, Dimension::NONE),
        ("0.95 ± 0 ", 0.95, Some(0.0), Dimension::NONE),
        ("1.5e3 W", 1500.0, None, Dimension::POWER),
        ("1e-3", 1e-3, None, Dimension::NONE),
        ("1.2×10⁻⁵", 1.2e-5, None, Dimension::NONE),
        ("12\u{202f}345.5 J", 12345.5, None, Dimension::ENERGY),
        ("12\u{2009}345", 12345.0, None, Dimension::NONE),
        ("0e999", 0.0, None, Dimension::NONE),
        ("180 °", std::f64::consts::PI, None, Dimension::ANGLE),
    ];
    for (text, si, spread, dimension) in table {
        let literal = Literal::read(text).expect(text);
        let quantity = literal.quantity();
        let close = (quantity.si - si).abs() <= 1e-12 * si.abs();
        assert!(close, "{text}: {} against {si}", quantity.si);
        assert_eq!(quantity.dimension, dimension, "{text}");
        assert_eq!(literal.spread_si(), spread, "{text}");
        let rest = &text[literal.length..];
        assert!(rest.trim().is_empty(), "{text} leaves `{rest}`");
    }
}

#[test]
fn a_typed_number_is_the_nearest_one() {
    // The nearest `f64` to the decimal, without a rounding in between.
    let table = [
        ("780 nm", 780e-9),
        ("1400 nm", 1400e-9),
        ("0.3 mm", 0.3e-3),
        ("70 cm", 0.7),
    ];
    for (text, expected) in table {
        let found = Literal::read(text).expect(text).quantity().si;
        assert_eq!(found, expected, "{text}");
    }
}

#[test]
fn faults_say_what_and_where() {
    let table = [
        ("", "no-number", 0..0),
        ("m", "no-number", 0..1),
        (".5", "point-without-digits", 0..2),
        ("5. m", "point-without-digits", 0..2),
        ("1e999", "too-large", 0..5),
        ("1e308 km", "too-large", 0..8),
        ("1e-999", "too-small", 0..6),
        ("1e-307 nm", "too-small", 0..9),
        ("5 ± -1 m", "negative-spread", 2..7),
        ("5 +- −1 m", "negative-spread", 2..9),
        ("5 ± m", "missing-spread", 2..4),
        ("5 mtr", "unknown-unit", 2..5),
        ("2x", "unknown-unit", 1..2),
        ("0x1F", "unknown-unit", 1..4),
        ("-300 °C", "below-absolute-zero", 0..8),
        ("-460 °F", "below-absolute-zero", 0..8),
    ];
    for (text, code, at) in table {
        let error = Literal::read(text).expect_err(text);
        assert_eq!(
            (error.kind.code(), error.at.clone()),
            (code, at),
            "{text}: {error}"
        );
        assert!(!error.kind.hint().is_empty(), "{text} has no remedy");
    }
}

#[test]
fn what_follows_a_literal_is_left_alone() {
    let table = [
        ("0.4 m * 2", 5),
        ("2 sqrt(4)", 1),
        ("2 min(a, b)", 1),
        ("2 + x", 1),
        ("1e + 2", 0),
        ("5 m/door.width", 3),
        ("-273.15 °C", 11),
    ];
    for (text, length) in table {
        let found = Literal::read(text).map_or(0, |literal| literal.length);
        assert_eq!(found, length, "{text}");
    }
}
