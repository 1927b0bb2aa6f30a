//! The natural wet bulb by three independent formulas.

use farglow::physics::heat_strain::{humidity, wet_bulb};
use farglow::physics::radiant::Globe;

const ZERO: f64 = 273.15;

/// Air in °C, relative humidity in %, air speed in m/s, mean radiant
/// temperature in °C, vapour pressure in hPa, natural wet bulb in °C.
const RECORDED: [[f64; 6]; 27] = [
    [20.0, 20.0, 0.13, 8.9996, 4.69326, 9.093],
    [20.0, 20.0, 0.5, 8.9996, 4.69326, 9.103],
    [20.0, 20.0, 2.0, 8.9996, 4.69326, 9.109],
    [20.0, 50.0, 0.13, 13.0392, 11.73316, 13.56],
    [20.0, 50.0, 0.5, 13.0392, 11.73316, 13.608],
    [20.0, 50.0, 2.0, 13.0392, 11.73316, 13.634],
    [20.0, 80.0, 0.13, 15.2522, 18.77305, 17.286],
    [20.0, 80.0, 0.5, 15.2522, 18.77305, 17.46],
    [20.0, 80.0, 2.0, 15.2522, 18.77305, 17.55],
    [30.0, 20.0, 0.13, 21.3013, 8.52097, 16.342],
    [30.0, 20.0, 0.5, 21.3013, 8.52097, 15.888],
    [30.0, 20.0, 2.0, 21.3013, 8.52097, 15.65],
    [30.0, 50.0, 0.13, 25.723, 21.30242, 22.338],
    [30.0, 50.0, 0.5, 25.723, 21.30242, 22.076],
    [30.0, 50.0, 2.0, 25.723, 21.30242, 21.942],
    [30.0, 80.0, 0.13, 28.1416, 34.08387, 27.151],
    [30.0, 80.0, 0.5, 28.1416, 34.08387, 27.085],
    [30.0, 80.0, 2.0, 28.1416, 34.08387, 27.051],
    [40.0, 20.0, 0.13, 33.7285, 14.82742, 23.301],
    [40.0, 20.0, 0.5, 33.7285, 14.82742, 22.483],
    [40.0, 20.0, 2.0, 33.7285, 14.82742, 22.059],
    [40.0, 50.0, 0.13, 38.5379, 37.06856, 30.994],
    [40.0, 50.0, 0.5, 38.5379, 37.06856, 30.534],
    [40.0, 50.0, 2.0, 38.5379, 37.06856, 30.302],
    [40.0, 80.0, 0.13, 41.1647, 59.3097, 36.884],
    [40.0, 80.0, 0.5, 41.1647, 59.3097, 36.672],
    [40.0, 80.0, 2.0, 41.1647, 59.3097, 36.568],
];

/// Source: an open program of the method of Liljegren et al. (2008), alfcrisci/thermalcomfort (MIT), run without sun, its sky and ground taken as one mean radiant temperature, searched in steps of 0.002 K.
///
/// It takes the saturation pressure after Buck, raised by 0.4 % for moist air,
/// and properties of the air at other temperatures: 0.15 K at most.
#[test]
fn heat_balance_of_2008_is_that_of_an_open_program() {
    for [air, humidity, speed, radiant, vapour, expected] in RECORDED {
        let found = wet_bulb::natural(air + ZERO, radiant + ZERO, vapour * 100.0, speed)
            .expect("fair air")
            - ZERO;
        assert!(
            (found - expected).abs() < 0.16,
            "{air} °C, {humidity} %, {speed} m/s: {found} °C against {expected} °C"
        );
    }
}

/// Source: Malchaire, Annals of Occupational Hygiene 19:251–258 (1976), linear correlation in the globe's temperature, read in open code: t_nw = t_w + (0.16·(t_g − t_a) + 0.8)/200·(560 − 2·rh − 5·t_a) − 0.8. His heat balance is from memory.
///
/// The correlation lies above both balances under strong radiation, by up to
/// 1.7 K with the globe 20 K above the air.
#[test]
fn three_formulas_agree_within_their_spread() {
    for air in [20.0, 25.0, 30.0, 35.0, 40.0] {
        for percent in [30.0, 50.0, 70.0] {
            for (over, spread) in [(0.0, 0.45), (5.0, 0.6), (10.0, 0.9), (20.0, 1.7)] {
                let speed = 0.3;
                let t = air + ZERO;
                let vapour = humidity::vapour_pressure(t, percent / 100.0).expect("fair air");
                let radiant = Globe::new(0.15, 0.95, t, speed)
                    .expect("a fair globe")
                    .radiant_temperature(t + over)
                    .expect("fair readings");
                let new = wet_bulb::natural(t, radiant, vapour, speed).expect("fair air");
                let old = wet_bulb::after_malchaire(t, radiant, vapour, speed).expect("fair air");
                let forced = wet_bulb::psychrometric(t, vapour).expect("fair air");
                let linear = forced
                    + (0.16 * over + 0.8) / 200.0 * (560.0 - 2.0 * percent - 5.0 * air)
                    - 0.8;
                assert!(
                    (new - old).abs() < 0.5,
                    "{air} °C, {percent} %, globe {over} K above: {new} K, in 1976 {old} K"
                );
                for found in [new, old] {
                    assert!(
                        (found - linear).abs() < spread,
                        "{air} °C, {percent} %, globe {over} K above: {found} K, linear {linear} K"
                    );
                }
            }
        }
    }
}
