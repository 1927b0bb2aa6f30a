//! Globe temperature and mean radiant temperature: worked values of ISO 7726's
//! relation in the tests of the library pythermalcomfort.

use farglow::physics::radiant::Globe;

/// Source: pythermalcomfort, tests/test_environment.py (read), ISO form: globe of 0.1 m and emissivity 0.95 in air of 30 °C; temperatures in °C, to 0.1 K.
#[test]
fn globe_shows_the_radiant_temperature_of_the_library() {
    for (reading, speed, expected) in [(53.2, 0.3, 74.8), (55.0, 0.3, 77.8), (55.0, 0.1, 71.9)] {
        let globe = Globe::new(0.1, 0.95, 303.15, speed).expect("a globe");
        let found = globe
            .radiant_temperature(reading + 273.15)
            .expect("a temperature")
            - 273.15;
        assert!(
            (found - expected).abs() <= 0.1,
            "{reading} °C at {speed} m/s: {found} °C against {expected} °C"
        );
    }
}
