use super::*;
use crate::units::{Dimension, Sense, Unit};

/// The values behind the names that the tables use.
fn named(used: &NameUse) -> Quantity {
    let point = |si| Quantity {
        sense: Sense::Point,
        ..Quantity::new(si, Dimension::TEMPERATURE)
    };
    match (used.cell.as_str(), used.member.first().map(String::as_str)) {
        ("t_hearth", None) => point(1523.15),
        ("t_air", None) => Quantity::new(298.15, Dimension::TEMPERATURE),
        ("rise", None) => Quantity {
            sense: Sense::Difference,
            ..Quantity::new(20.0, Dimension::TEMPERATURE)
        },
        ("door", Some("width")) => Quantity::new(0.9, Dimension::LENGTH),
        ("door", Some("height")) => Quantity::new(0.7, Dimension::LENGTH),
        ("door", None) => Quantity::new(290e3, Dimension::IRRADIANCE),
        ("t", None) => Quantity::new(16.0, Dimension::TIME),
        ("x", None) => Quantity::number(3.0),
        ("y", None) => Quantity::number(2.0),
        ("zero", None) => Quantity::number(0.0),
        ("broken", None) => Quantity::number(f64::NAN),
        _ => Quantity::number(1.0),
    }
}

fn evaluate(text: &str) -> Result<Outcome, Vec<Diagnostic>> {
    let entry = Entry::parse(text)?;
    let values: Vec<Quantity> = entry.names().iter().map(named).collect();
    let outcome = entry.evaluate(&values, entry.nominal_literals());
    outcome.map_err(|fault| vec![fault])
}

#[test]
fn entries_have_the_value_that_is_written() {
    let table = [
        // Literals.
        ("2.5 m", 2.5, "m"),
        ("1250 ± 25 °C", 1250.0, "°C"),
        ("-40 degF", -40.0, "°C"),
        ("- 0.4 m", -0.4, "m"),
        ("12 kW/m²", 12e3, "W/m²"),
        ("90 °", 90.0, "°"),
        ("6 %", 0.06, ""),
        ("50% * x", 1.5, ""),
        ("0.9", 0.9, ""),
        ("  0.9  ", 0.9, ""),
        ("(1250 °C)", 1250.0, "°C"),
        // Plain arithmetic.
        ("1/2", 0.5, ""),
        ("1 - 2 - 3", -4.0, ""),
        ("8 / 4 / 2", 1.0, ""),
        ("2 + 3 * 4", 14.0, ""),
        ("(2 + 3) * 4", 20.0, ""),
        ("2 · 3 × 4 ⋅ 5", 120.0, ""),
        ("5 − 3", 2.0, ""),
        ("5 - -3", 8.0, ""),
        ("5 * -3", -15.0, ""),
        ("5--3", 8.0, ""),
        ("2^10", 1024.0, ""),
        ("-2^2", -4.0, ""),
        ("(-2)^2", 4.0, ""),
        ("2^-2", 0.25, ""),
        ("2^-2 * 8", 2.0, ""),
        ("3 * 2^2 + 1", 13.0, ""),
        ("(2^3)^2", 64.0, ""),
        ("2^(3^2)", 512.0, ""),
        ("2^2 + 2^3", 12.0, ""),
        ("max(2^2, 2^3)^2", 64.0, ""),
        ("-x * y", -6.0, ""),
        ("-x^2", -9.0, ""),
        ("x - -x^2", 12.0, ""),
        ("((((x))))", 3.0, ""),
        ("1e3 + 1E-3", 1000.001, ""),
        ("5 +- 1 * 2", 10.0, ""),
        // Units within expressions.
        ("door.width + 0.4 m", 1.3, "m"),
        ("door.width * door.height", 0.63, "m²"),
        ("door.width / 2", 0.45, "m"),
        ("2 * door.width + 10 cm", 1.9, "m"),
        ("100 W / (2 m^2)", 50.0, "W/m²"),
        ("3 m * 2 m", 6.0, "m²"),
        ("2 m/door.width", 2.0 / 0.9, ""),
        ("100 W/m²*60 s", 6000.0, "J/m²"),
        ("(3 m)^2", 9.0, "m²"),
        ("3 m^2", 3.0, "m²"),
        ("5 m/s * 2 s", 10.0, "m"),
        ("1 ft + 1 in", 0.3302, "m"),
        ("18000 W/m² * (t / 1 s)^(-0.75)", 2250.0, "W/m²"),
        ("(door / stefan_boltzmann)^0.25", 1_503.822_455, "K"),
        ("290 kW/m² / stefan_boltzmann / (1 K)^3", 5.114_3e12, "K"),
        // Functions.
        ("sqrt(16 m²)", 4.0, "m"),
        ("sqrt (16)", 4.0, ""),
        ("abs(-3 m)", 3.0, "m"),
        ("max(1 m, 20 cm, 3 m)", 3.0, "m"),
        ("min(1 m, 20 cm, 3 m)", 0.2, "m"),
        ("exp(1)", std::f64::consts::E, ""),
        ("ln(exp(2))", 2.0, ""),
        ("log10(1000)", 3.0, ""),
        ("sin(30 °)", 0.5, ""),
        ("cos(60 deg)", 0.5, ""),
        ("tan(45 °)", 1.0, ""),
        ("asin(0.5)", 30.0, "°"),
        ("acos(0.5)", 60.0, "°"),
        ("atan(1)", 45.0, "°"),
        ("floor(2.7) + ceil(2.2) + round(2.5)", 8.0, ""),
        ("ceil(door.width / (0.4 m)) * 0.4 m", 1.2, "m"),
        ("2 * pi", std::f64::consts::TAU, ""),
        // Temperatures.
        ("t_hearth + 20 K", 1543.15, "K"),
        ("t_hearth + 20 K", 1270.0, "°C"),
        ("t_hearth - 20 K", 1230.0, "°C"),
        ("t_hearth - (20 K)", 1230.0, "°C"),
        ("t_hearth - t_air", 1225.0, "K"),
        ("1250 °C - 1200 °C", 50.0, "K"),
        ("1250 °C - t_air", 1225.0, "K"),
        ("t_hearth + rise", 1270.0, "°C"),
        ("t_hearth - rise", 1230.0, "°C"),
        ("2 * rise", 40.0, "K"),
        ("max(20 °C, 300 K)", 300.0, "K"),
        ("stefan_boltzmann * t_air^4", 448.075_4, "W/m²"),
    ];
    for (text, expected, unit) in table {
        let unit = Unit::parse(unit).expect(unit);
        let found = match evaluate(text) {
            Ok(Outcome::Quantity(quantity)) => quantity.to_unit(&unit),
            other => panic!("{text}: {other:?}"),
        };
        let found = found.unwrap_or_else(|error| panic!("{text}: {error}"));
        // Written to seven digits where it is no round number.
        let tolerance = 5e-7 * f64::abs(expected);
        assert!(
            (found - expected).abs() <= tolerance,
            "{text}: {found} against {expected}"
        );
    }
}

/// Source: common practice, no source: a body at 300 K peaks near 9.7 µm and
/// emits about 460 W/m²; at 77 K near 38 µm. Source of the band fraction: half
/// of a black body's exitance lies below λT = 4107 µm·K (from memory of the
/// usual blackbody tables). The near-infrared row is by an independent Simpson
/// quadrature of Planck's law with 200,000 steps.
#[test]
fn the_bridge_to_the_physics_carries_values_across() {
    let table = [
        ("blackbody_exitance(300 K)", 459.3, 0.2, "W/m²"),
        ("peak_wavelength(300 K)", 9.66, 0.01, "µm"),
        ("peak_wavelength(-196.15 °C)", 37.6, 0.1, "µm"),
        ("band_fraction(1000 K, 0 nm, 4107 nm)", 0.5, 1e-4, ""),
        (
            "band_fraction(t_hearth, 780 nm, 3000 nm) + 0 %",
            0.572_807_306,
            1e-9,
            "",
        ),
        ("near_ir_fraction(t_hearth)", 0.572_807_306, 1e-9, ""),
        // σ T⁴ at 300 K times 0.9.
        ("exitance(300 K, 0.9)", 413.370, 1e-3, "W/m²"),
        ("blackbody_temperature(459.300 W/m²)", 300.0, 1e-4, "K"),
        // c₁ λ⁻⁵/(e^(c₂/λT) − 1) at its peak: 1.2867e-5 T⁵ W/(m³·K⁵), from memory.
        (
            "spectral_exitance(1000 K, peak_wavelength(1000 K))",
            1.2867e10,
            1e6,
            "W/m³",
        ),
        ("view_factor_disc_parallel(1 m, 1 m)", 0.5, 1e-15, ""),
        // The families `disc_parallel`, `disc_perpendicular`, `rect_*_corner` of
        // the published checks, by quadrature.
        (
            "view_factor_disc_parallel(1 m, 0.5 m, 2 m)",
            0.022_110_495_639,
            1e-12,
            "",
        ),
        (
            "view_factor_disc_perpendicular(1 m, 1 m, 2 m)",
            0.085_410_196_625,
            1e-12,
            "",
        ),
        (
            "view_factor_rectangle_parallel(1 m, 1 m, 1 m)",
            0.138_531_605_995,
            1e-12,
            "",
        ),
        (
            "view_factor_rectangle_perpendicular(1 m, 1 m, 1 m)",
            0.055_734_197_003,
            1e-12,
            "",
        ),
        ("view_factor_sphere(0.5 m, 1 m)", 0.25, 1e-15, ""),
        // The families `disc_disc` and `rect_rect_parallel`, by quadrature.
        (
            "view_factor_disc_disc(1 m, 1 m, 1 m)",
            0.381_966_011_250,
            1e-12,
            "",
        ),
        (
            "view_factor_rectangle_rectangle(1 m, 1 m, 1 m)",
            0.199_824_895_698,
            1e-12,
            "",
        ),
        ("view_factor_sphere(0.5 m, 1 m, 60 °)", 0.125, 1e-15, ""),
        // Worked values read in the tests of the library pythermalcomfort.
        (
            "mean_radiant_temperature(53.2 °C, 30 °C, 0.3 m/s, 10 cm)",
            74.8,
            0.1,
            "°C",
        ),
        (
            "mean_radiant_temperature(55 °C, 30 °C, 0.1 m/s, 10 cm)",
            71.9,
            0.1,
            "°C",
        ),
        // CoolProp 8.0, computed.
        ("saturation_pressure(20 °C)", 2339.3, 2.4, "Pa"),
    ];
    for (text, expected, tolerance, unit) in table {
        let unit = Unit::parse(unit).expect(unit);
        let Ok(Outcome::Quantity(quantity)) = evaluate(text) else {
            panic!("{text}: {:?}", evaluate(text));
        };
        let found = quantity.to_unit(&unit).expect(text);
        assert!(
            (found - expected).abs() <= tolerance,
            "{text}: {found} against {expected}"
        );
    }
}

#[test]
fn comparisons_come_to_a_truth() {
    let table = [
        ("door.width > 0.5 m", true),
        ("door.width < 50 cm", false),
        ("1 m == 100 cm", true),
        ("1 m != 100 cm", false),
        ("1 m ≠ 2 m", true),
        ("2 >= 2 && 2 <= 2", true),
        ("2 ≥ 3 || 2 ≤ 1", false),
        ("!(1 > 2)", true),
        ("t_hearth > 1000 °C", true),
        ("20 °C < 68.1 °F", true),
        ("1 > 2 || 2 > 1 && 3 > 2", true),
        ("1 + 1 == 2", true),
    ];
    for (text, expected) in table {
        assert_eq!(evaluate(text), Ok(Outcome::Truth(expected)), "{text}");
    }
}

#[test]
fn faults_have_a_code_and_a_place() {
    let long = format!("1{}", "0".repeat(1000));
    let signs = "-".repeat(900) + "1";
    let deep = "(".repeat(65) + "1" + &")".repeat(65);
    let name = "a".repeat(41);
    let table = [
        // The text itself.
        ("", "empty", None),
        ("   ", "empty", None),
        (long.as_str(), "too-long", Some(1000..1001)),
        (deep.as_str(), "too-deep", Some(64..65)),
        (signs.as_str(), "sign-run", Some(1..900)),
        // Literals.
        ("1e999", "too-large", Some(0..5)),
        ("2 * 1e999", "too-large", Some(4..9)),
        ("1e-999", "too-small", Some(0..6)),
        ("5 mtr", "unknown-unit", Some(2..5)),
        ("door.width + 5 mtr", "unknown-unit", Some(15..18)),
        ("2x", "unknown-unit", Some(1..2)),
        ("5 w/m2 + 1", "unknown-unit", Some(2..3)),
        ("5 Kw/(m2*sr) * 2", "unknown-unit", Some(2..4)),
        ("(5 mtr)/x", "unknown-unit", Some(3..6)),
        ("0x1F", "unknown-unit", Some(1..4)),
        ("-300 °C", "below-absolute-zero", Some(0..7)),
        ("5 ± -1 m", "negative-spread", Some(2..6)),
        ("5 ± m", "missing-spread", Some(2..3)),
        (".5", "point-without-digits", Some(0..2)),
        ("5. + 1", "point-without-digits", Some(0..2)),
        ("1250 °C ± 25 °C", "stray-spread", Some(8..9)),
        ("door.width ± 0.1 m", "stray-spread", Some(11..12)),
        ("± 5", "stray-spread", Some(0..1)),
        // Commas.
        ("2,5 m", "decimal-comma", Some(1..2)),
        ("door.width * 2,5", "decimal-comma", Some(14..15)),
        ("max(2,5)", "decimal-comma", Some(5..6)),
        ("max(2,5, 3)", "decimal-comma", Some(5..6)),
        ("x, y", "stray-comma", Some(1..2)),
        ("max((x, y), 2)", "stray-comma", Some(6..7)),
        // Values and operators.
        ("1 +", "missing-value", Some(3..3)),
        ("* 2", "missing-value", Some(0..1)),
        ("2 * / 3", "missing-value", Some(4..5)),
        ("max(1, )", "missing-value", Some(7..8)),
        ("max(, 1)", "missing-value", Some(4..5)),
        ("(1 + )", "missing-value", Some(5..6)),
        ("1++2", "prefix-plus", Some(2..3)),
        ("+5", "prefix-plus", Some(0..1)),
        ("--5", "sign-run", Some(1..2)),
        ("x - - - 5", "sign-run", Some(6..8)),
        ("!!x", "sign-run", Some(1..2)),
        ("x y", "missing-operator", Some(2..3)),
        ("x (y)", "unknown-function", Some(0..1)),
        ("(x) (y)", "missing-operator", Some(4..5)),
        ("2 (3)", "missing-operator", Some(2..3)),
        ("2 m 3 m", "missing-operator", Some(4..5)),
        ("12 kW/m² per hour", "missing-operator", Some(9..12)),
        ("1.2.3", "missing-operator", Some(3..5)),
        ("50%x", "missing-operator", Some(3..4)),
        ("2 sqrt(4)", "missing-operator", Some(2..6)),
        ("1 250 °C", "missing-operator", Some(2..5)),
        ("()", "empty-brackets", Some(0..2)),
        ("sqrt()", "empty-brackets", Some(4..6)),
        ("(x", "unmatched-bracket", Some(0..1)),
        ("x)", "unmatched-bracket", Some(1..2)),
        (")", "unmatched-bracket", Some(0..1)),
        ("2^3^2", "power-chain", Some(3..4)),
        ("2^-3^2", "power-chain", Some(4..5)),
        ("x^(2)^y", "power-chain", Some(5..6)),
        ("3 m ^ 2", "power-after-unit", Some(4..5)),
        ("3 m^2.5", "power-after-unit", Some(3..4)),
        ("x ** 2", "operator", Some(2..4)),
        ("x & y", "operator", Some(2..3)),
        ("x | y", "operator", Some(2..3)),
        ("5 % 3", "missing-operator", Some(4..5)),
        ("x % 3", "percent", Some(2..3)),
        ("x²", "superscript", Some(1..2)),
        // What has no place here.
        ("x = 5", "assignment", Some(2..3)),
        ("x += 5", "assignment", Some(2..4)),
        ("x *= 5", "assignment", Some(2..4)),
        ("1; 2", "chain", Some(1..2)),
        ("x ? 1 : 2", "conditional", Some(2..3)),
        ("if(x > 1, 2, 3)", "conditional", Some(0..2)),
        ("1 // two", "comment", Some(2..8)),
        ("1 /* two */ + 2", "comment", Some(2..15)),
        ("# note", "comment", Some(0..6)),
        ("\"text\"", "string", Some(0..6)),
        ("x + 'a'", "string", Some(4..7)),
        ("[1", "character", Some(0..1)),
        ("x $ y", "character", Some(2..3)),
        ("tür + 1", "character", Some(1..3)),
        ("√4", "character", Some(0..1)),
        ("x\u{0} + 1", "character", Some(1..2)),
        // Names and functions.
        ("m", "bare-unit", Some(0..1)),
        ("x * m", "bare-unit", Some(4..5)),
        ("W/m²", "bare-unit", Some(0..4)),
        ("°C", "bare-unit", Some(0..2)),
        ("min", "bare-unit", Some(0..3)),
        ("sqrt", "bare-function", Some(0..4)),
        ("e", "reserved-word", Some(0..1)),
        ("true", "reserved-word", Some(0..4)),
        ("inf", "reserved-word", Some(0..3)),
        ("m.width", "reserved-word", Some(0..7)),
        ("door.", "broken-name", Some(0..5)),
        ("door. width", "broken-name", Some(0..5)),
        ("a.b.c.d", "broken-name", Some(0..7)),
        ("door..width + 1", "broken-name", Some(0..11)),
        (name.as_str(), "name-too-long", Some(0..41)),
        ("sqr(2)", "unknown-function", Some(0..3)),
        ("lookup(2)", "unknown-function", Some(0..6)),
        ("pi(2)", "unknown-function", Some(0..2)),
        ("sqrt(1, 2)", "argument-count", Some(0..10)),
        ("1 + max(1)", "argument-count", Some(4..10)),
        ("band_fraction(300 K)", "argument-count", Some(0..20)),
        // Working out.
        ("1 m + 1", "dimension", Some(4..5)),
        ("1 m + 1 s", "dimension", Some(4..5)),
        ("x + door.width * 2", "dimension", Some(2..3)),
        ("1 m > 1", "dimension", Some(4..5)),
        ("x / zero", "division-by-zero", Some(2..3)),
        ("1 / (x - 3)", "division-by-zero", Some(2..3)),
        ("zero^-1", "division-by-zero", Some(4..5)),
        ("sqrt(-4)", "negative-root", Some(5..7)),
        ("(-8)^0.5", "negative-root", Some(4..5)),
        ("sqrt(2 m)", "broken-power", Some(5..8)),
        ("2^(1 m)", "exponent", Some(1..2)),
        ("1e300 * 1e300", "not-finite", Some(6..7)),
        ("exp(1000)", "not-finite", Some(0..3)),
        ("1 + broken", "not-finite", Some(4..10)),
        ("ln(0)", "out-of-range", Some(3..4)),
        ("asin(2)", "out-of-range", Some(5..6)),
        ("tan(90 °)", "out-of-range", Some(4..8)),
        ("sin(30)", "dimension", Some(4..6)),
        ("floor(2.5 m)", "dimension", Some(6..11)),
        ("blackbody_exitance(0 K)", "out-of-range", Some(19..22)),
        ("blackbody_exitance(rise)", "difference", Some(19..23)),
        ("exitance(1250 °C, 1.2)", "out-of-range", Some(18..21)),
        ("exitance(1250 °C, 0)", "out-of-range", Some(18..19)),
        ("exitance(0.9, 1250 °C)", "dimension", Some(9..12)),
        (
            "exitance(1250 °C, 1 > 2)",
            "truth-in-arithmetic",
            Some(18..23),
        ),
        ("exitance(1250 °C)", "argument-count", Some(0..17)),
        ("max(1 m, x + 2, 3 m)", "dimension", Some(9..14)),
        ("near_ir_fraction(3 m)", "dimension", Some(17..20)),
        (
            "spectral_exitance(1000 K, -1 nm)",
            "out-of-range",
            Some(26..31),
        ),
        (
            "blackbody_temperature(0 W/m²)",
            "out-of-range",
            Some(22..28),
        ),
        (
            "view_factor_disc_parallel(1 m)",
            "argument-count",
            Some(0..30),
        ),
        (
            "view_factor_disc_parallel(0 m, 1 m)",
            "out-of-range",
            Some(26..29),
        ),
        (
            "view_factor_disc_parallel(1 m, 1 m, -1 m)",
            "out-of-range",
            Some(36..40),
        ),
        (
            "view_factor_disc_parallel(1 m, 1e10 m)",
            "out-of-range",
            Some(31..37),
        ),
        (
            "view_factor_sphere(1 m, 0.5 m)",
            "out-of-range",
            Some(24..29),
        ),
        (
            "view_factor_sphere(1 m, 2 m, 30)",
            "dimension",
            Some(29..31),
        ),
        ("saturation_pressure(500 K)", "out-of-range", Some(20..25)),
        (
            "mean_radiant_temperature(55 °C, 30 °C, 0.3 m/s, 2 m)",
            "out-of-range",
            Some(48..51),
        ),
        (
            "mean_radiant_temperature(55 °C, 30 °C, -0.3 m/s, 10 cm)",
            "out-of-range",
            Some(39..47),
        ),
        (
            "band_fraction(300 K, 2 µm, 1 µm)",
            "out-of-range",
            Some(27..31),
        ),
        ("1250 °C + 20 K", "point-in-arithmetic", Some(8..9)),
        ("1250 °C - 20 K", "point-in-arithmetic", Some(8..9)),
        ("2 * 1250 °C", "point-in-arithmetic", Some(2..3)),
        ("-(5 °C)", "point-in-arithmetic", Some(0..1)),
        ("1 + (1 > 2)", "truth-in-arithmetic", Some(2..3)),
        ("1 < 2 < 3", "truth-in-arithmetic", Some(6..7)),
        ("1 && 2", "quantity-in-logic", Some(2..4)),
        ("!x", "quantity-in-logic", Some(0..1)),
    ];
    for (text, code, span) in table {
        let faults = evaluate(text).expect_err(text);
        let first = &faults[0];
        assert_eq!(
            (first.code, first.span.clone()),
            (code, span),
            "{text}: {faults:?}"
        );
        assert!(first.hint.is_some(), "{text} has no remedy");
        assert_eq!(faults.len(), 1, "one slip is told once: {text}: {faults:?}");
    }
}

#[test]
fn several_faults_are_told_in_their_order() {
    let faults = evaluate("5 mtr + 2,5 * sqr(4) + (m").expect_err("five faults");
    let codes: Vec<&str> = faults.iter().map(|fault| fault.code).collect();
    let expected = [
        "unknown-unit",
        "decimal-comma",
        "unknown-function",
        "bare-unit",
        "unmatched-bracket",
    ];
    assert_eq!(codes, expected);
    let many = evaluate(&"$ ".repeat(400)).expect_err("400 faults");
    assert_eq!(many.len(), 8, "more would hide the first");
}

#[test]
fn monstrous_texts_are_refused_at_once() {
    let texts = [
        "(".repeat(20_000),
        "-".repeat(3_000) + "1",
        "sqrt(".repeat(20_000),
        "1+".repeat(1_000_000),
        "(".repeat(900),
        "!".repeat(999),
        "sqrt(".repeat(199) + "1",
    ];
    for text in texts {
        let faults = evaluate(&text).expect_err("refused");
        let shown: String = text.chars().take(12).collect();
        assert!(faults.len() <= 8, "{shown}: {} faults", faults.len());
    }
    // What is just allowed works.
    let deep = "(".repeat(64) + "1" + &")".repeat(64);
    assert_eq!(
        evaluate(&deep),
        Ok(Outcome::Quantity(Quantity::number(1.0)))
    );
    let wide = "1+".repeat(499) + "1";
    assert_eq!(
        evaluate(&wide),
        Ok(Outcome::Quantity(Quantity::number(500.0)))
    );
    let nested = "max(1, ".repeat(64) + "2" + &")".repeat(64);
    assert_eq!(
        evaluate(&nested),
        Ok(Outcome::Quantity(Quantity::number(2.0)))
    );
}

#[test]
fn names_and_literals_know_their_places() {
    let entry = Entry::parse("3 µm * x + charger.irradiance_from.door / door").expect("an entry");
    let names: Vec<(&str, &[String], Range<usize>)> = entry
        .names()
        .iter()
        .map(|used| {
            (
                used.cell.as_str(),
                used.member.as_slice(),
                used.span.clone(),
            )
        })
        .collect();
    let member = ["irradiance_from".to_owned(), "door".to_owned()];
    let expected: [(&str, &[String], Range<usize>); 3] = [
        ("x", &[], 7..8),
        ("charger", &member, 11..39),
        ("door", &[], 42..46),
    ];
    assert_eq!(names, expected);
    assert_eq!(entry.literals()[0].span, 0..4);
    assert_eq!(entry.nominal_literals(), [3e-6]);
}

#[test]
fn a_single_literal_is_told_from_an_expression() {
    for (text, expected) in [
        ("1250 ± 25 °C", true),
        (" -0.4 m ", true),
        ("2 m + 1 m", false),
        ("-x", false),
        ("x", false),
        ("2^2", false),
        ("sqrt(4)", false),
    ] {
        let entry = Entry::parse(text).expect(text);
        assert_eq!(entry.is_single_literal().is_some(), expected, "{text}");
    }
}

#[test]
fn renaming_touches_names_and_nothing_else() {
    let table = [
        ("door.width + doors - 3 m", "hatch.width + doors - 3 m"),
        ("door*door", "hatch*hatch"),
        (
            "charger.irradiance_from.door / door",
            "charger.irradiance_from.hatch / hatch",
        ),
        ("door.door", "hatch.door"),
        ("3 µm · door", "3 µm · hatch"),
    ];
    for (text, expected) in table {
        let entry = Entry::parse(text).expect(text);
        assert_eq!(entry.renamed("door", "hatch"), expected, "{text}");
    }
}

#[test]
fn substitution_shows_values_in_the_place_of_names() {
    let entry = Entry::parse("3 µm · x + door.width / x").expect("an entry");
    let values = ["2".to_owned(), "0.9 m".to_owned(), "4".to_owned()];
    assert_eq!(entry.substituted(&values), "3 µm · 2 + 0.9 m / 4");
    assert_eq!(entry.substituted(&values[..1]), "3 µm · 2 + door.width / x");
}

#[test]
fn overridden_literals_change_the_result_alone() {
    let entry = Entry::parse("(1250 ± 25 °C) - 1000 °C").expect("an entry");
    let nominal = entry.evaluate(&[], entry.nominal_literals());
    let drawn = entry.evaluate(&[], &[1530.15, 1273.15]);
    let difference = |si| {
        Ok(Outcome::Quantity(Quantity {
            si,
            dimension: Dimension::TEMPERATURE,
            sense: Sense::Difference,
        }))
    };
    assert_eq!(nominal, difference(250.0));
    assert_eq!(drawn, difference(257.0));
    let short = entry.evaluate(&[], &[1530.15]).map_err(|fault| fault.code);
    assert_eq!(short, Err("values-missing"));
    let nan = entry
        .evaluate(&[], &[f64::NAN, 1.0])
        .map_err(|fault| fault.code);
    assert_eq!(nan, Err("not-finite"));
}

#[test]
fn reserved_names_are_the_units_functions_and_constants() {
    let words = ["e", "false", "inf", "nan", "true"];
    // Functions that came when the list was frozen are known before a bracket
    // only, so that a cell may have their names.
    let (first, later): (Vec<&str>, Vec<&str>) = function::FUNCTIONS
        .iter()
        .map(|function| function.name)
        .partition(|name| is_reserved(name));
    let mut all: Vec<&str> = Unit::symbols().to_vec();
    all.extend(first);
    all.extend(function::CONSTANTS.iter().map(|constant| constant.name));
    all.extend(words);
    all.sort_unstable();
    all.dedup();
    assert_eq!(all, RESERVED);
    assert!(!later.is_empty(), "no function came later");
    for name in later {
        let both = Entry::parse(&format!("{name} + {name}(1)"));
        let names = both.map(|entry| entry.names().len());
        assert!(
            matches!(names, Ok(1)) || names.is_err_and(|faults| faults[0].code == "argument-count"),
            "{name} is no name of a cell"
        );
    }
}
