use super::*;

fn stretch() -> Stretch {
    Stretch {
        duration: 28_800.0,
        climate: Climate {
            air_temperature: 313.15,
            mean_radiant: 313.15,
            vapour_pressure: 2500.0,
            air_speed: 0.3,
        },
        clothing: Clothing::ordinary(0.5 * CLO),
        work: Work {
            metabolic_rate: 150.0,
            mechanical_power: 0.0,
            posture: Posture::Standing,
            walking: None,
        },
    }
}

fn strain(edition: Edition, stretches: &[Stretch]) -> Strain {
    match predict(edition, &Person::standard(true), stretches) {
        Ok(Prediction::Strain(strain)) => strain,
        other => panic!("expected a strain, found {other:?}"),
    }
}

#[test]
fn halves_of_a_stretch_are_the_whole() {
    for edition in [Edition::Iso2004, Edition::Iso2023] {
        let whole = strain(edition, &[stretch()]);
        let half = Stretch {
            duration: 14_400.0,
            ..stretch()
        };
        assert_eq!(strain(edition, &[half, half]), whole);
    }
}

#[test]
fn more_heat_or_work_never_leaves_more_time() {
    // Not so the rectal temperature itself: while sweat keeps up, warmer skin
    // takes a share of the same stored heat, and the standard's core dips by
    // hundredths of a kelvin.
    for edition in [Edition::Iso2004, Edition::Iso2023] {
        let mut last = (f64::INFINITY, 0.0);
        for over in 0..=12_u32 {
            let mut hot = stretch();
            hot.climate.mean_radiant += f64::from(over) * 5.0;
            let found = strain(edition, &[hot]);
            let allowed = found.allowed_time().expect("the first is not unlimited");
            assert!(
                allowed <= last.0 && found.water_loss >= last.1,
                "{edition:?}, {over}: {found:?} after {last:?}"
            );
            last = (allowed, found.water_loss);
        }
        let mut last = 0.0;
        for rate in [100.0, 130.0, 160.0, 200.0, 250.0] {
            let mut hard = stretch();
            hard.work.metabolic_rate = rate;
            let found = strain(edition, &[hard]);
            assert!(found.water_loss > last, "{rate} W/m²: {found:?}");
            last = found.water_loss;
        }
    }
}

#[test]
fn no_drink_brings_the_limit_of_water_forward() {
    for edition in [Edition::Iso2004, Edition::Iso2023] {
        let dry = Person {
            drinks: false,
            ..Person::standard(true)
        };
        let Ok(Prediction::Strain(dry)) = predict(edition, &dry, &[stretch()]) else {
            panic!("in range");
        };
        let free = strain(edition, &[stretch()]);
        assert!(
            dry.water_limit < free.water_limit,
            "{dry:?} against {free:?}"
        );
        assert_eq!(dry.water_limit, dry.average_water_limit);
    }
}

#[test]
fn outside_the_range_the_reason_is_told() {
    let mut furnace = stretch();
    furnace.climate.mean_radiant += 61.0;
    let found = predict(Edition::Iso2023, &Person::standard(true), &[furnace]);
    let Ok(Prediction::NotAssessed(outside)) = found else {
        panic!("expected no answer, found {found:?}");
    };
    assert_eq!(
        outside.parameter,
        "mean radiant temperature above that of the air"
    );
    assert!((outside.value - 61.0).abs() < 1e-9, "{outside}");
    assert!(
        outside
            .to_string()
            .contains("outside the range of the method, 0 K to 60 K")
    );
    for edition in [Edition::Iso2004, Edition::Iso2023] {
        for change in [
            |s: &mut Stretch| s.climate.air_temperature = 330.0,
            |s: &mut Stretch| s.climate.mean_radiant = 312.0,
            |s: &mut Stretch| s.climate.vapour_pressure = 4600.0,
            |s: &mut Stretch| s.climate.air_speed = 3.1,
            |s: &mut Stretch| s.work.metabolic_rate = 451.0,
            |s: &mut Stretch| s.work.metabolic_rate = 50.0,
            |s: &mut Stretch| s.clothing.insulation = 1.1 * CLO,
            |s: &mut Stretch| s.clothing.insulation = 0.05 * CLO,
        ] {
            let mut odd = stretch();
            change(&mut odd);
            let found = predict(edition, &Person::standard(true), &[stretch(), odd]);
            assert!(
                matches!(found, Ok(Prediction::NotAssessed(_))),
                "{odd:?}: {found:?}"
            );
        }
    }
}

#[test]
fn ends_of_the_range_are_answered() {
    let mut edge = stretch();
    edge.climate.air_temperature = 323.15;
    edge.climate.mean_radiant = 383.15;
    edge.climate.air_speed = 3.0;
    edge.clothing.insulation = 0.1 * CLO;
    edge.work.metabolic_rate = 250.0;
    for edition in [Edition::Iso2004, Edition::Iso2023] {
        let found = strain(edition, &[edge]);
        assert!(
            found.rectal.is_finite() && found.water_loss.is_finite() && found.skin.is_finite(),
            "{found:?}"
        );
    }
}

#[test]
fn impossible_numbers_are_refused() {
    let person = Person::standard(true);
    for change in [
        |s: &mut Stretch| s.duration = f64::NAN,
        |s: &mut Stretch| s.duration = 1e6,
        |s: &mut Stretch| s.climate.air_temperature = -1.0,
        |s: &mut Stretch| s.climate.vapour_pressure = f64::INFINITY,
        |s: &mut Stretch| s.clothing.permeability = 0.0,
        |s: &mut Stretch| s.work.mechanical_power = 151.0,
        |s: &mut Stretch| {
            s.clothing.reflective = Some(Reflective {
                share: 1.1,
                emissivity: 0.2,
            });
        },
        |s: &mut Stretch| {
            s.work.walking = Some(Walking {
                speed: f64::NAN,
                to_wind: None,
            });
        },
    ] {
        let mut odd = stretch();
        change(&mut odd);
        assert!(
            predict(Edition::Iso2004, &person, &[odd]).is_err(),
            "{odd:?}"
        );
    }
    let giant = Person {
        mass: 1000.0,
        ..person
    };
    assert!(predict(Edition::Iso2004, &giant, &[stretch()]).is_err());
}

#[test]
fn allowed_time_is_the_first_limit() {
    let found = strain(Edition::Iso2004, &[stretch()]);
    assert_eq!(found.allowed_time(), found.water_limit);
    let short = Stretch {
        duration: 61.0,
        ..stretch()
    };
    let found = strain(Edition::Iso2023, &[short]);
    assert_eq!((found.allowed_time(), found.duration), (None, 120.0));
}
