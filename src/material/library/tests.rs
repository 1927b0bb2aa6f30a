use super::*;

const EMISSIVITY: &str = include_str!("../../../resources/materials/emissivity.json");
const TEMPERATURE: &str = include_str!("../../../resources/materials/temperatures.json");

#[test]
fn every_shipped_row_is_well_formed() {
    let library = Library::read(EMISSIVITY, TEMPERATURE).unwrap_or_else(|fault| panic!("{fault}"));
    let count = |holds: &dyn Fn(&Row) -> bool| library.rows().filter(|row| holds(row)).count();
    assert_eq!(count(&|_| true), 75);
    assert_eq!(count(&|row| row.property == Property::Temperature), 25);
    // One micrometre is where pyrometers look and eyes are judged.
    assert_eq!(count(&Row::is_near_infrared), 6);
    for row in library.rows() {
        assert!(
            row.property == Property::Temperature || row.valid.is_some(),
            "{} is for no temperature",
            row.id
        );
        for path in ["/home/", "/tmp/", ".json", ".csv"] {
            assert!(!row.cited().contains(path), "{}: {}", row.id, row.cited());
        }
    }
}

/// Source: the rows as compiled, spot by spot; ids are frozen, since notebooks hold them.
#[test]
fn ids_and_values_stay_what_notebooks_were_made_with() {
    let library = Library::shipped();
    for (id, low, typical, high, how_known) in [
        ("cast_iron_molten_clean", 0.2, 0.29, 0.35, HowKnown::Read),
        ("cast_iron_molten_1um", 0.3, 0.35, 0.4, HowKnown::Read),
        ("slag_on_metal", 0.7, 0.85, 0.93, HowKnown::CommonPractice),
        ("glass_pool", 0.88, 0.9, 0.92, HowKnown::Computed),
        (
            "aluminium_molten_skimmed",
            0.05,
            0.1,
            0.15,
            HowKnown::Memory,
        ),
        ("aluminised_fabric", 0.05, 0.15, 0.4, HowKnown::Memory),
        (
            "grey_iron_pouring",
            1573.15,
            1643.15,
            1713.15,
            HowKnown::Read,
        ),
        (
            "glory_hole",
            1373.15,
            1473.15,
            1573.15,
            HowKnown::CommonPractice,
        ),
        (
            "glass_tempering_exit",
            893.15,
            913.15,
            953.15,
            HowKnown::Read,
        ),
    ] {
        let row = library.get(id).unwrap_or_else(|| panic!("no row {id}"));
        assert_eq!(
            (row.low, row.typical, row.high, row.how_known),
            (low, typical, high, how_known),
            "{id}"
        );
    }
}

#[test]
fn a_row_says_what_it_is_and_how_it_is_known() {
    let library = Library::shipped();
    let row = library.get("cast_iron_molten_clean").expect("a row");
    assert_eq!(
        row.said(),
        "cast iron, molten, clean: total normal emissivity 0.29 (0.2 to 0.35), for 1300 °C to 1400 °C"
    );
    let row = library.get("grey_iron_pouring").expect("a row");
    assert_eq!(
        row.said(),
        "foundry, grey iron pouring: temperature 1370 °C (1300 °C to 1440 °C)"
    );
    assert!(row.cited().contains("[read]"), "{}", row.cited());
    let row = library.get("aluminium_molten_skimmed").expect("a row");
    assert!(
        row.cited().contains("[recalled, not read]"),
        "{}",
        row.cited()
    );
    let row = library.get("steel_molten_1um").expect("a row");
    assert!(row.said().contains("emissivity at 1 µm"), "{}", row.said());
}

#[test]
fn mistyped_ids_find_the_nearest_row() {
    let library = Library::shipped();
    for (typed, expected) in [
        ("cast-iron-molten-clean", Some("cast_iron_molten_clean")),
        ("Cast iron molten clean", Some("cast_iron_molten_clean")),
        ("cast_iron_molten_claen", Some("cast_iron_molten_clean")),
        ("grey_iron_poring", Some("grey_iron_pouring")),
        ("dross", Some("aluminium_molten_dross")),
        ("zz", None),
    ] {
        assert_eq!(library.suggest(typed), expected, "{typed}");
    }
}

#[test]
fn rows_with_a_fault_are_refused_by_their_id() {
    let row = |change: &str, to: &str| {
        let text = r#"{ "note": "n", "rows": [ { "id": "iron", "material": "iron", "state": "molten",
            "kind": "total", "celsius": [1500, 1600], "low": 0.2, "typical": 0.3, "high": 0.4,
            "source": "s", "how_known": "read" } ] }"#;
        assert!(text.contains(change), "{change}");
        Library::read(&text.replace(change, to), r#"{ "note": "n", "rows": [] }"#)
            .map(|library| library.rows.len())
    };
    assert_eq!(row("iron", "iron"), Ok(1));
    for (change, to, expected) in [
        (
            "\"id\": \"iron\"",
            "\"id\": \"molten-iron\"",
            "small letters",
        ),
        ("\"id\": \"iron\"", "\"id\": \"m\"", "small letters"),
        ("\"low\": 0.2", "\"low\": 0.35", "in order"),
        ("\"high\": 0.4", "\"high\": 1.4", "out of range"),
        ("\"low\": 0.2", "\"low\": 0", "out of range"),
        ("\"total\"", "\"spectral\"", "unknown kind"),
        ("\"total\"", "\"spectral 9999 µm\"", "wavelength"),
        ("[1500, 1600]", "[1600, 1500]", "temperatures"),
        ("\"source\": \"s\"", "\"source\": \" \"", "a source"),
        ("\"read\"", "\"certain\"", "unknown variant"),
        ("\"read\"", "\"read\", \"colour\": 1", "unknown field"),
    ] {
        let fault = row(change, to).expect_err(to);
        assert!(fault.contains(expected), "{to}: {fault}");
    }
    let twice = EMISSIVITY.replace("\"steel_scale\"", "\"cast_iron_molten_clean\"");
    let fault = Library::read(&twice, TEMPERATURE).expect_err("one id twice");
    assert!(fault.contains("twice"), "{fault}");
}

/// Source: the definition of the distribution: median at typical, 2.5 % beyond either end (JCGM 101:2008, 7.7 has the interval).
#[test]
fn draws_have_their_median_at_typical_and_their_central_95_percent_from_low_to_high() {
    // Quantiles of the standard normal distribution, from memory, 15 digits.
    let point = 1.959_963_984_540_054;
    for row in Library::shipped().rows() {
        for (score, expected) in [(-point, row.low), (0.0, row.typical), (point, row.high)] {
            let found = row.at_score(score);
            assert!(
                (found - expected).abs() < 1e-12 * expected,
                "{} at {score}: {found} against {expected}",
                row.id
            );
        }
        let mut last = 0.0;
        for step in -60..=60_i8 {
            let found = row.at_score(f64::from(step) / 10.0);
            assert!(
                found > 0.0 && found >= last,
                "{} at {step}: {found} after {last}",
                row.id
            );
            assert!(
                row.property == Property::Temperature || found <= 1.0,
                "{} at {step}: {found}",
                row.id
            );
            last = found;
        }
    }
}
