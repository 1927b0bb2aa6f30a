//! Absorption by the moist air of a shop: two formulas of the literature on fire
//! hazards, and a bound by a narrow-band model.

use farglow::physics::atmosphere;

use crate::rows::{self, Row};

/// The power law in vapour pressure times path.
pub fn power_law(row: &Row) -> Option<f64> {
    let found = atmosphere::power_law(row.number("p_w_Pa"), row.number("x_m")).ok()?;
    found.in_range.then_some(found.transmittance)
}

/// Wayne's formula.
pub fn wayne(row: &Row) -> Option<f64> {
    let found = atmosphere::wayne(
        row.number("RH"),
        row.number("t_C") + 273.15,
        row.number("path_m"),
    )
    .ok()?;
    found.in_range.then_some(found.transmittance)
}

/// The most that either formula takes off over the conditions of the bound.
pub fn most_absorbed(row: &Row) -> Option<f64> {
    let ends =
        |name: &str| -> Option<[f64; 2]> { serde_json::from_value(row.inputs[name].clone()).ok() };
    let ([near, far], [cold, warm], [dry, moist]) =
        (ends("path_m")?, ends("ambient_C")?, ends("RH")?);
    let mut most = 0.0_f64;
    for path in [near, 0.5 * far, far] {
        for t in [cold, warm] {
            for humidity in [dry, moist] {
                let temperature = t + 273.15;
                let pressure = atmosphere::vapour_pressure(humidity, temperature).ok()?;
                for found in [
                    atmosphere::power_law(pressure, path).ok()?,
                    atmosphere::wayne(humidity, temperature, path).ok()?,
                ] {
                    most = most.max(1.0 - found.transmittance);
                }
            }
        }
    }
    Some(most)
}

/// Source: literature on fire hazards, from memory (rows of family atmosphere_pw).
#[test]
fn power_law_gives_the_rows() {
    assert_eq!(rows::check("atmosphere_pw", power_law), 3);
}

/// Source: Wayne (1991), from memory (rows of family atmosphere_wayne); their vapour pressures are those of CoolProp, ours Buck's.
#[test]
fn wayne_gives_the_rows() {
    assert_eq!(rows::check("atmosphere_wayne", wayne), 3);
}

/// Source: Fuss and Hamins (2002), abstract (read): no more than 42 % is taken off from 10 m to 200 m. Wayne's formula by itself takes off 46.5 % at 200 m of saturated air of 35 °C: there it is not followed.
#[test]
fn no_formula_takes_off_more_than_the_narrow_band_model() {
    let rows = rows::all();
    let row = rows
        .iter()
        .find(|row| row.id == "atmosphere_bound-01")
        .expect("the row is there");
    let (found, bound) = (
        most_absorbed(row).expect("the row runs"),
        row.expected.as_f64().expect("a number"),
    );
    assert!(
        found <= bound + 1e-15 && found > 0.25,
        "{found} taken off, at most {bound}"
    );
    let corner = atmosphere::wayne(1.0, 308.15, 200.0).expect("a path");
    assert!(!corner.in_range, "{corner:?}");
    let before = atmosphere::wayne(0.5, 308.15, 200.0).expect("a path");
    assert!(
        before.in_range && before.transmittance > 1.0 - bound,
        "{before:?}"
    );
}

/// Source: the two formulas, both from memory: they stand for each other within 5 % over ordinary air.
#[test]
fn the_two_formulas_agree() {
    for (t, humidity) in [
        (15.0, 0.5),
        (20.0, 0.5),
        (25.0, 0.5),
        (30.0, 0.6),
        (35.0, 0.3),
    ] {
        for path in [10.0, 15.0, 20.0, 30.0, 50.0, 80.0] {
            let temperature = t + 273.15;
            let pressure = atmosphere::vapour_pressure(humidity, temperature).expect("air");
            let one = atmosphere::power_law(pressure, path).expect("a path");
            let other = atmosphere::wayne(humidity, temperature, path).expect("a path");
            if !(one.in_range && other.in_range) {
                continue;
            }
            assert!(
                (one.transmittance / other.transmittance - 1.0).abs() < 0.05,
                "{t} °C, {humidity}, {path} m: {one:?} against {other:?}"
            );
        }
    }
}
