//! Directive 2006/25/EC, Annex I, Table 1.1, rows m to o. Their numbers are
//! recalled; the checks are what others print of them, or arithmetic on them.

use farglow::guidance::{Finding, Library};

use crate::guidance_rows::{self, Row, limit, longest};

/// Holds a row of the file of checks, if it is one of this source's.
pub fn row(row: &Row) -> bool {
    match row.id.as_str() {
        "eir_7s" => eye(row, 0.005),
        "eir_1s" | "eir_10s" | "eir_100s" | "eir_1000s" => {
            assert_eq!(row.tolerance, "5e-4 relative", "{}", row.id);
            eye(row, 5e-4 * row.expected("E_W_m2"));
        }
        "hskin_1s" => skin(row),
        "tros_ladle_numbers" => ladle(row),
        _ => return false,
    }
    true
}

/// The limit for the eye, and its inverse; by ICNIRP 2013 the same under 1000 s.
fn eye(row: &Row, tolerance: f64) {
    let (t, expected) = (row.input("t_s"), row.expected("E_W_m2"));
    row.holds("limit", limit("eu-2006-25-m", t), expected, tolerance);
    let slack = t * tolerance / expected * 4.0 / 3.0 * 1.01;
    row.holds("time", longest("eu-2006-25-m", expected), t, slack);
    if t < 1000.0 {
        row.holds(
            "ICNIRP",
            limit("icnirp-2013-ir-eye", t),
            expected,
            tolerance,
        );
    }
}

/// The limit for the skin at 1 s, exactly, as irradiance and as dose.
fn skin(row: &Row) {
    let (t, irradiance) = (row.input("t_s"), row.expected("E_W_m2"));
    for id in ["eu-2006-25-o", "icnirp-2013-skin"] {
        row.holds("limit", limit(id, t), irradiance, 0.0);
        row.holds("time", longest(id, irradiance), t, 0.0);
        let judged = Library::shipped()
            .judge(id, irradiance, Some(t))
            .expect("it is shipped");
        let dose = judged.dose.expect("row o limits a dose");
        row.holds("dose limit", dose.limit, row.expected("H_J_m2"), 0.0);
        row.holds("dose", dose.exposure, row.expected("H_J_m2"), 0.0);
        row.holds("ratio", judged.ratio.expect("1 s is covered"), 1.0, 0.0);
        assert_eq!(judged.finding, Finding::Within, "a limit met is not passed");
    }
}

/// What row m makes of the ladle: limit at 60 s, and eight times over without a pane.
fn ladle(row: &Row) {
    // Printed to a tenth; the row's own tolerance of 0.5 % would be wider.
    let expected = row.expected("row_m_limit_60s");
    row.holds("row m at 60 s", limit("eu-2006-25-m", 60.0), expected, 0.1);
    let irradiance = row.expected("E_IR_W_m2");
    let judged = Library::shipped()
        .judge("eu-2006-25-m", irradiance, Some(60.0))
        .expect("it is shipped");
    assert_eq!(judged.finding, Finding::Over);
    let ratio = judged.ratio.expect("60 s is covered");
    // The note beside the row says 8-fold.
    row.holds("ratio", ratio, 8.0, 0.05);
}

/// Source: a stored question-and-answer page on IEC 62471, electronics.stackexchange.com/questions/509582, read: 18000·7^-0.75 = 4182.63 W/m².
#[test]
fn eye_limit_at_7_s_is_the_one_printed() {
    assert!(row(&guidance_rows::get("eir_7s")));
}

/// Source: rows `eir_1s` to `eir_1000s`, arithmetic on the recalled formula.
#[test]
fn eye_limit_follows_its_power_of_time() {
    for id in ["eir_1s", "eir_10s", "eir_100s", "eir_1000s"] {
        assert!(row(&guidance_rows::get(id)), "{id}");
    }
}

/// Source: row `hskin_1s`, arithmetic on the recalled formula.
#[test]
fn skin_limit_at_1_s_is_its_coefficient() {
    assert!(row(&guidance_rows::get("hskin_1s")));
}

/// Source: `tros_ladle_numbers`, derived, on the scene of TROS IOS part 2, annex 1.
#[test]
fn ladle_is_over_by_row_m_without_a_pane() {
    assert!(row(&guidance_rows::get("tros_ladle_numbers")));
}

/// Source: NIOSH HETA 88-299-2028, abstract, read: the equal United States value of 10 mW/cm².
#[test]
fn long_time_eye_limit_is_ten_milliwatts_per_square_centimetre() {
    let found = limit("eu-2006-25-n", 28_800.0);
    assert!((found - 0.010 * 1e4).abs() < 1e-12, "found {found} W/m²");
}

/// Source: arithmetic, 18000·1000^-0.75 = 101.2, "a 1.2 percent step" in the reference data.
#[test]
fn the_step_at_1000_s_is_there_and_not_smoothed() {
    let (before, after) = (
        limit("eu-2006-25-n", 1000.0),
        limit("eu-2006-25-m", 1000.0_f64.next_up()),
    );
    assert!(
        ((before / after - 1.0) * 100.0 - 1.2).abs() < 0.05,
        "{before} W/m² steps to {after} W/m²"
    );
}
