use super::*;

/// Source: NIST SP 811 (2008), Appendix B.8. `cal_th` and `Btu_IT` in joules
/// are read (in a reprint of its introduction), 1 kcal/(m²·h) = 1.163 W/m² is
/// read in a printed table of heat transfer factors; the other rows are from
/// memory of the appendix. Printed to seven figures, exact ones in full.
#[test]
fn factors_are_those_of_nist_sp_811() {
    const SEVEN: f64 = 5e-7;
    const EXACT: f64 = 4e-16;
    let table = [
        ("in", 2.54e-2, EXACT),
        ("ft", 3.048e-1, EXACT),
        ("ft²", 9.290304e-2, EXACT),
        ("min", 60.0, EXACT),
        ("h", 3600.0, EXACT),
        ("°", 1.745_329_251_994_33e-2, 1e-14),
        ("mrad", 1e-3, EXACT),
        ("cal", 4.1868, EXACT),
        ("kcal", 4186.8, EXACT),
        ("Btu", 1.055056e3, SEVEN),
        ("Btu/(h·ft²)", 3.154591, SEVEN),
        ("kcal/(m²·h)", 1.163, EXACT),
        ("cal/(cm²·s)", 4.1868e4, EXACT),
        ("W/cm²", 1e4, EXACT),
        ("mW/cm²", 10.0, EXACT),
        ("kW/m²", 1e3, EXACT),
        ("hPa", 1e2, EXACT),
    ];
    for (symbol, expected, tolerance) in table {
        let factor = Unit::parse(symbol).expect(symbol).factor();
        let error = (factor / expected - 1.0).abs();
        assert!(error <= tolerance, "{symbol}: {factor} against {expected}");
    }
}

/// Source: NIST SP 811 (2008), Appendix B.8: `cal_th` = 4.184 J (read),
/// `cal_th/(cm²·s)` = 4.184e4 W/m², `Btu_th/(ft²·h)` = 3.152481 W/m² (memory).
#[test]
fn the_thermochemical_units_are_smaller_than_ours() {
    let ours = Unit::parse("cal/(cm2*s)").expect("known").factor();
    let ratio = ours / 4.184e4;
    assert!((ratio - 1.000_669_216).abs() < 1e-9, "{ratio}");
    let ours = Unit::parse("Btu/(h*ft2)").expect("known").factor();
    let ratio = ours / 3.152_481;
    assert!((ratio - 1.000_669_4).abs() < 5e-7, "{ratio}");
}

/// Source: SI Brochure, 9th edition, Table 8 and section 2.3.1 (0 °C is
/// 273.15 K); NIST SP 811 Appendix B: T/K = (t/°F + 459.67)/1.8 (read).
#[test]
fn scales_have_their_own_zero() {
    let table = [
        ("°C", 0.0, 273.15),
        ("°C", 1250.0, 1523.15),
        ("degC", -273.15, 0.0),
        ("°F", 32.0, 273.15),
        ("degF", 212.0, 373.15),
        ("°F", -459.67, 0.0),
        ("K", 300.0, 300.0),
    ];
    for (symbol, value, kelvin) in table {
        let unit = Unit::parse(symbol).expect(symbol);
        let si = unit.to_si(value);
        assert!(
            (si - kelvin).abs() < 1e-10,
            "{value} {symbol}: {si} against {kelvin}"
        );
        let back = unit.from_si(si);
        assert!((back - value).abs() < 1e-10, "{value} {symbol}: {back}");
    }
    let step = Unit::parse("°F").expect("known").step_to_si(9.0);
    assert_eq!(step, 5.0);
}

#[test]
fn spellings_of_one_unit_read_alike() {
    let table = [
        (&["m²", "m2", "m^2", "m^(2)"][..], "m²"),
        (&["µm", "\u{3bc}m", "um"], "µm"),
        (&["W/(m²·sr)", "W/(m2*sr)", "W/(m^2×sr)"], "W/(m²·sr)"),
        (&["kcal/(m²·h)", "kcal/(m2·h)"], "kcal/(m²·h)"),
        (&["°C", "degC"], "°C"),
        (&["s⁻¹", "s^-1", "s^(-1)", "s^−1"], "s⁻¹"),
        (&["m·s⁻²"], "m·s⁻²"),
        (&["W/(m²·K⁴)", "W/(m^2*K^4)"], "W/(m²·K⁴)"),
        (&["1/m"], "1/m"),
        (&["", "1", " "], ""),
    ];
    for (spellings, symbol) in table {
        for spelling in spellings {
            let unit = Unit::parse(spelling).expect(spelling);
            assert_eq!(unit.symbol(), symbol, "{spelling}");
            let again = Unit::parse(unit.symbol()).expect(symbol);
            assert_eq!(again, unit, "{spelling}");
        }
    }
}

#[test]
fn what_is_no_unit_says_why() {
    let table = [
        ("mtr", "unknown-unit"),
        ("W/mtr", "unknown-unit"),
        ("°C/s", "scale-in-compound"),
        ("W/(m²·°C)", "scale-in-compound"),
        ("W/m²/sr", "not-a-unit"),
        ("W/m²·sr", "not-a-unit"),
        ("W / m", "not-a-unit"),
        ("m^2.5", "not-a-unit"),
        ("m^", "not-a-unit"),
        ("(m", "not-a-unit"),
        ("5", "not-a-unit"),
        ("m^999", "not-a-unit"),
        ("nm^100", "not-a-unit"),
        ("m^127·m", "not-a-unit"),
        ("%m", "not-a-unit"),
    ];
    for (text, code) in table {
        let found = Unit::parse(text).map_err(|error| error.code());
        assert_eq!(found, Err(code), "{text}");
    }
    let brackets = format!("{}m{}", "m·(".repeat(300), ")".repeat(300));
    assert!(Unit::parse(&brackets).is_err(), "300 brackets");
}

#[test]
fn the_longest_run_is_read_and_no_more() {
    let table = [
        ("m + 2", Some(("m", 1))),
        ("W/(m²·sr)*x", Some(("W/(m²·sr)", 11))),
        ("W/(m²·door)", Some(("W", 1))),
        ("m/door.width", Some(("m", 1))),
        ("m/min(a, b)", Some(("m", 1))),
        ("min(a, b)", None),
        ("m*hearth", Some(("m", 1))),
        ("m/s)", Some(("m/s", 3))),
        ("°C/s", Some(("°C", 3))),
        ("m^x", Some(("m", 1))),
        ("m/s/s", Some(("m/s", 3))),
        ("% of", Some(("%", 1))),
        ("hearth", None),
        ("(m)", None),
        ("", None),
    ];
    for (text, expected) in table {
        let found = Unit::longest(text);
        let found = found
            .as_ref()
            .map(|(unit, length)| (unit.symbol(), *length));
        assert_eq!(found, expected, "{text}");
    }
}
