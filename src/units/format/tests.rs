use super::Rounding::{Down, Nearest, Up};
use super::*;

#[test]
fn figures_are_rounded_the_way_that_is_asked() {
    let table = [
        (8.7349, 3, Nearest, "8.73"),
        (8.7349, 3, Up, "8.74"),
        (8.7349, 3, Down, "8.73"),
        (8.739, 3, Down, "8.73"),
        (-8.7349, 3, Up, "−8.73"),
        (-8.7349, 3, Down, "−8.74"),
        (9.999, 3, Up, "10.0"),
        (9.999, 3, Nearest, "10.0"),
        (9.999, 3, Down, "9.99"),
        (1.0, 3, Up, "1.00"),
        (0.999_99, 3, Down, "0.999"),
        (99.999_9, 3, Down, "99.9"),
        (0.1 + 0.2, 3, Up, "0.300"),
        (0.3 - 1e-12, 3, Down, "0.300"),
        (0.3 + 1e-8, 3, Up, "0.301"),
        (0.0, 3, Up, "0.00"),
        (1250.0, 4, Nearest, "1250"),
        (1250.0, 3, Nearest, "1250"),
        (1255.0, 3, Up, "1260"),
        (12345.0, 5, Nearest, "12\u{202f}345"),
        (289_938.6, 3, Up, "290\u{202f}000"),
        (1_234_567.0, 7, Nearest, "1\u{202f}234\u{202f}567"),
        (999_999_999.0, 3, Nearest, "1.00×10⁹"),
        (1.2345e-7, 3, Nearest, "1.23×10⁻⁷"),
        (0.000_123_4, 3, Nearest, "0.000123"),
        (0.000_012_34, 3, Nearest, "1.23×10⁻⁵"),
        (5.0, 1, Nearest, "5"),
        (5e20, 1, Nearest, "5×10²⁰"),
        (f64::MAX, 3, Up, "1.80×10³⁰⁸"),
        (5e-324, 3, Nearest, "4.94×10⁻³²⁴"),
        (f64::NAN, 3, Up, NOT_FINITE),
        (f64::INFINITY, 3, Up, NOT_FINITE),
    ];
    for (value, figures, rounding, expected) in table {
        let found = significant(value, figures, rounding);
        assert_eq!(found, expected, "{value} {figures} {rounding:?}");
    }
}

#[test]
fn distances_go_up_to_the_next_tenth() {
    let table = [
        (0.0, "0.0 m"),
        (0.1 + 0.2, "0.3 m"),
        (0.3, "0.3 m"),
        (0.300_000_1, "0.4 m"),
        (2.41, "2.5 m"),
        (2.5, "2.5 m"),
        (2.500_001, "2.6 m"),
        (9.99, "10.0 m"),
        (12_345.61, "12\u{202f}345.7 m"),
        (-0.25, "−0.2 m"),
        (f64::NAN, NOT_FINITE),
        (f64::INFINITY, NOT_FINITE),
    ];
    for (si, expected) in table {
        assert_eq!(safe_distance(si), expected, "{si}");
    }
}

#[test]
fn distances_in_feet_go_up_to_the_next_half() {
    let table = [
        (0.0, "0.0 ft"),
        (0.3048, "1.0 ft"),
        (0.304_800_001, "1.5 ft"),
        // 10 m is 32.81 ft.
        (10.0, "33.0 ft"),
        (9.9, "32.5 ft"),
        (3_048_000.0, "10\u{202f}000\u{202f}000.0 ft"),
        (-0.2, "−0.5 ft"),
        (1e300, "3.28083989501312×10³⁰⁰ ft"),
        (f64::NAN, NOT_FINITE),
        (f64::MAX, NOT_FINITE),
    ];
    for (si, expected) in table {
        assert_eq!(safe_feet(si), expected, "{si}");
    }
}

#[test]
fn times_go_down_to_what_a_watch_shows() {
    let table = [
        (-1.0, "no planned stay"),
        (0.0, "no planned stay"),
        (9.99, "no planned stay"),
        (10.0, "10 s"),
        (10.999, "10 s"),
        (119.9, "119 s"),
        (120.0, "2 min"),
        (155.0, "2 min 35 s"),
        (599.9, "9 min 59 s"),
        (600.0, "10 min"),
        (600.0 - 1e-9, "10 min"),
        (659.9, "10 min"),
        (7199.0, "119 min"),
        (7200.0, "2 h"),
        (11_520.0, "3 h 12 min"),
        (28_800.0, "8 h"),
        (f64::NAN, "no planned stay"),
        (f64::NEG_INFINITY, "no planned stay"),
        (f64::INFINITY, NOT_FINITE),
    ];
    for (si, expected) in table {
        assert_eq!(safe_time(si), expected, "{si}");
    }
}

#[test]
fn ratios_above_one_never_read_one() {
    let table = [
        (0.0, "0.00"),
        (0.994, "0.994"),
        (0.9991, "1.00"),
        (1.0, "1.00"),
        (1.0 + 1e-15, "1.01"),
        (1.001, "1.01"),
        (1.011, "1.02"),
        (87.31, "87.4"),
        (1234.0, "1240"),
    ];
    for (ratio, expected) in table {
        assert_eq!(safe_ratio(ratio), expected, "{ratio}");
    }
}

#[test]
fn irradiances_go_up_and_what_is_permitted_goes_down() {
    let table = [
        (99.91, "100 W/m²"),
        (100.0, "100 W/m²"),
        (100.1, "101 W/m²"),
        (9994.0, "10\u{202f}000 W/m²"),
        (8731.0, "8740 W/m²"),
        (12_340.0, "12.4 kW/m²"),
    ];
    for (si, expected) in table {
        assert_eq!(safe_irradiance(si), expected, "{si}");
    }
    let unit = |symbol| Unit::parse(symbol).expect("known");
    assert_eq!(permitted(0.062_9, &unit("%"), 2), "6.2 %");
    assert_eq!(permitted(1523.15 + 9.9, &unit("°C"), 4), "1259 °C");
    assert_eq!(permitted(99.99, &unit("W/m²"), 3), "99.9 W/m²");
    assert_eq!(quantity(8734.9, &unit("kW/m²"), 3, Nearest), "8.73 kW/m²");
    assert_eq!(quantity(0.9, &Unit::one(), 2, Nearest), "0.90");
}

#[test]
fn the_unit_fits_the_size() {
    let table = [
        (Dimension::IRRADIANCE, 9999.0, "W/m²"),
        (Dimension::IRRADIANCE, 1e4, "kW/m²"),
        (Dimension::LENGTH, 0.0, "m"),
        (Dimension::LENGTH, 0.5, "m"),
        (Dimension::LENGTH, 1.9e-6, "µm"),
        (Dimension::TIME, 95.0, "s"),
        (Dimension::TIME, 600.0, "min"),
        (Dimension::TIME, 28_800.0, "h"),
        (Dimension::TEMPERATURE, 1523.15, "°C"),
        (Dimension::ANGLE, 1.0, "°"),
        (Dimension::POWER, 182_000.0, "kW"),
        (Dimension::NONE, 0.5, ""),
        (Dimension::SPEED, 0.3, "m/s"),
    ];
    for (dimension, si, expected) in table {
        assert_eq!(natural_unit(dimension, si, None).symbol(), expected, "{si}");
    }
    let feet = Unit::parse("ft").expect("known");
    assert_eq!(natural_unit(Dimension::LENGTH, 0.5, Some(&feet)), feet);
    let other = natural_unit(Dimension::AREA, 0.5, Some(&feet));
    assert_eq!(other.symbol(), "m²", "a hint of another kind is left aside");
}

#[test]
fn zeros_that_a_value_does_not_need_are_left_out() {
    let literal = |text: &str| {
        crate::units::Literal::read(text)
            .expect("this is a literal")
            .quantity()
    };
    for (text, expected) in [
        ("0.63 m²", "0.63 m²"),
        ("1250 °C", "1250 °C"),
        ("2.5 m", "2.5 m"),
        ("0 m", "0 m"),
        ("-4.20 m", "−4.2 m"),
        ("12346 m", "12\u{202f}350 m"),
        ("0.123456", "0.1235"),
    ] {
        assert_eq!(at_most(literal(text), None, 4), expected, "{text}");
    }
    // A product whose last bits are noise needs no more figures than it has.
    let area = Quantity::new(0.9 * 0.7, Dimension::AREA);
    assert_eq!(at_most(area, None, 4), "0.63 m²");
}

#[test]
fn a_limit_that_is_reached_at_once_says_the_second() {
    for (seconds, expected) in [(3.9, "3 s"), (0.2, "0 s"), (-1.0, "0 s"), (95.0, "95 s")] {
        assert_eq!(reached(seconds), expected, "{seconds} s");
    }
}
