//! Laws of heat strain: what a hot source does to the indices.

use farglow::physics::heat_strain::predicted::{
    CLO, Clothing, Edition, Person, Posture, Prediction, Stretch, Work, predict,
};
use farglow::physics::heat_strain::{Climate, humidity};
use farglow::physics::planck;
use farglow::physics::radiant::mean_temperature_of_sphere;
use farglow::physics::region::Region;
use farglow::physics::view::Sight;
use glam::DVec3;
use proptest::prelude::*;

/// The air of a warm shop, with radiation from a furnace door at a distance.
fn before_a_door(kelvin: f64, distance: f64) -> Climate {
    let door = Region::disc(DVec3::new(0.0, 0.0, 1.2), DVec3::Y, 0.4).expect("a fair door");
    let Sight::Seen(view) = door.view(DVec3::new(0.0, distance, 1.2)) else {
        panic!("the door is seen from {distance} m in front of it");
    };
    let exitance = planck::exitance(kelvin);
    let radiant = mean_temperature_of_sphere(&[view.solid_angle()], &[exitance], 303.15)
        .expect("a fair view");
    Climate {
        air_temperature: 303.15,
        mean_radiant: radiant,
        vapour_pressure: humidity::vapour_pressure(303.15, 0.4).expect("fair air"),
        air_speed: 0.3,
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(64))]

    /// A hotter door and a nearer one raise the index by calculation, and far
    /// away nothing is left of either.
    #[test]
    fn a_hot_source_raises_the_index(kelvin in 800.0..1900.0_f64, distance in 1.0..20.0_f64) {
        let index = |kelvin, distance| before_a_door(kelvin, distance).wbgt().expect("fair");
        let (here, hotter, nearer) = (
            index(kelvin, distance),
            index(kelvin * 1.1, distance),
            index(kelvin, distance * 0.8),
        );
        prop_assert!(hotter > here && nearer > here, "{} K, {} K, {} K", here, hotter, nearer);
        let (none, far) = (index(303.15, distance), index(kelvin, 2000.0));
        prop_assert!(here > none, "{} K against {} K without", here, none);
        prop_assert!((far - none).abs() < 0.01, "{} K against {} K without", far, none);
    }

    /// Near enough to a hot door the prediction refuses, and says why.
    #[test]
    fn a_prediction_is_a_number_or_a_reason(kelvin in 400.0..2000.0_f64, distance in 0.5..30.0_f64) {
        let climate = before_a_door(kelvin, distance);
        let stretch = Stretch {
            duration: 7200.0,
            climate,
            clothing: Clothing::ordinary(0.6 * CLO),
            work: Work {
                metabolic_rate: 165.0,
                mechanical_power: 0.0,
                posture: Posture::Standing,
                walking: None,
            },
        };
        for edition in [Edition::Iso2004, Edition::Iso2023] {
            match predict(edition, &Person::standard(true), &[stretch]).expect("fair") {
                Prediction::Strain(strain) => {
                    prop_assert!(climate.mean_radiant - climate.air_temperature <= 60.0 + 1e-6);
                    prop_assert!(strain.rectal.is_finite() && strain.water_loss > 0.0);
                }
                Prediction::NotAssessed(outside) => {
                    prop_assert!(outside.value > 60.0, "{}", outside);
                }
            }
        }
    }

    /// Whatever the air, the index lies between the wick and the globe.
    #[test]
    fn the_index_lies_between_its_parts(
        air in 275.0..320.0_f64,
        over in -20.0..300.0_f64,
        damp in 0.0..1.0_f64,
        speed in 0.0..10.0_f64,
    ) {
        let climate = Climate {
            air_temperature: air,
            mean_radiant: air + over,
            vapour_pressure: humidity::vapour_pressure(air, damp).expect("fair air"),
            air_speed: speed,
        };
        let (wet, globe, index) = (
            climate.natural_wet_bulb().expect("fair"),
            climate.globe().expect("fair"),
            climate.wbgt().expect("fair"),
        );
        let (low, high) = (wet.min(globe), wet.max(globe));
        prop_assert!((low - 1e-9..=high + 1e-9).contains(&index), "{} {} {}", wet, globe, index);
    }
}
