use super::*;

#[test]
fn integral_of_a_held_temperature_is_rate_times_time() {
    let warm = Tissue::new(&super::super::tissue::STANDARD, 316.15, 316.15)
        .expect("43 °C is the warmest that is taken");
    let history = warm
        .heated(&[Pulse::steady(1e5, 130.0)])
        .expect("a fair flux");
    // The steady profile from 5000 s on, by the resistance below 75 µm.
    let below: f64 = super::super::tissue::STANDARD[1..]
        .iter()
        .map(|l| l.thickness / l.conductivity)
        .sum();
    let rate = EPIDERMIS.rate(316.15 + 130.0 * below);
    let found = integral(&history, 75e-6, &EPIDERMIS).expect("fair");
    let expected = rate * 1e5;
    assert!(
        (found / expected - 1.0).abs() < 3e-3,
        "{found} against {expected}"
    );
}

#[test]
fn integral_agrees_with_small_steps() {
    for (flux, duration) in [(5903.0, 21.09), (39_348.0, 1.41)] {
        let history = Tissue::standard()
            .heated(&[Pulse::steady(duration, flux)])
            .expect("fair");
        for injury in Injury::ALL {
            let found = integral(&history, injury.depth(), injury.kinetics()).expect("fair");
            let step = duration / 5000.0;
            let brute: f64 = (0..50_000)
                .map(|i| {
                    let at = (f64::from(i) + 0.5) * step;
                    let hot = history.temperature(injury.depth(), at).expect("fair");
                    injury.kinetics().rate(hot) * step
                })
                .sum();
            assert!(
                (found - brute).abs() < 1e-4 * brute + 1e-9,
                "{injury:?} at {flux} W/m²: {found} against {brute}"
            );
        }
    }
}

#[test]
fn longest_exposure_is_where_the_criterion_is_reached() {
    for flux in [900.0, 3000.0, 15_000.0, 80_000.0, 400_000.0] {
        for injury in Injury::ALL {
            match longest_exposure(Tissue::standard(), flux, injury).expect("fair") {
                Onset::After(time) => {
                    let reached =
                        after_pulse(Tissue::standard(), flux, time, injury).expect("fair");
                    assert!(
                        (reached - 1.0).abs() < 1e-6,
                        "{injury:?} at {flux} W/m² after {time} s: {reached}"
                    );
                }
                other => assert!(flux < 1000.0, "{injury:?} at {flux} W/m²: {other:?}"),
            }
        }
    }
}

#[test]
fn deeper_and_worse_burns_take_longer() {
    for flux in [3000.0, 20_000.0, 100_000.0] {
        let times: Vec<f64> = Injury::ALL
            .iter()
            .map(
                |injury| match longest_exposure(Tissue::standard(), flux, *injury) {
                    Ok(Onset::After(time)) => time,
                    other => panic!("{injury:?} at {flux} W/m²: {other:?}"),
                },
            )
            .collect();
        assert!(
            times[0] < times[1] && times[1] < times[2],
            "{flux} W/m²: {times:?}"
        );
    }
}

#[test]
fn no_flux_never_burns_and_a_huge_one_burns_at_once() {
    let tissue = Tissue::standard();
    for injury in Injury::ALL {
        assert_eq!(
            longest_exposure(tissue, 0.0, injury),
            Ok(Onset::Later(LONGEST))
        );
        assert_eq!(
            longest_exposure(tissue, 1e9, injury),
            Ok(Onset::Sooner(SHORTEST))
        );
        let huge = after_pulse(tissue, 1e9, 1e9, injury).expect("fair");
        assert!(huge.is_finite() && huge > 1.0, "{huge}");
    }
    assert!(longest_exposure(tissue, f64::NAN, Injury::FirstDegree).is_err());
    let thin = Tissue::new(&super::super::tissue::STANDARD[..1], 305.0, 306.0).expect("fair");
    assert!(longest_exposure(&thin, 1e4, Injury::ThirdDegree).is_err());
}

#[test]
fn rates_are_those_of_their_branches() {
    // Ω of 1 at 53 °C in about 6 s by Weaver and Stoll's upper branch.
    let rate = EPIDERMIS.rate(326.15);
    let by_hand = (1.823e51_f64.ln() - 39_109.8 / 326.15).exp();
    assert!(
        (rate / by_hand - 1.0).abs() < 1e-12,
        "{rate} against {by_hand}"
    );
    assert_eq!(EPIDERMIS.rate(317.0), 0.0);
    assert!(HENRIQUES.rate(317.15) > 0.0);
}

#[test]
fn integral_does_not_hang_on_where_the_pulses_are_cut() {
    for (flux, injury) in [
        (4000.0, Injury::SecondDegree),
        (12_000.0, Injury::SecondDegree),
        (12_000.0, Injury::ThirdDegree),
    ] {
        let whole = after_pulse(Tissue::standard(), flux, 30.0, injury).expect("fair");
        let cut: Vec<Pulse> = [0.013, 3.3, 1.7, 24.987]
            .iter()
            .map(|duration| Pulse::steady(*duration, flux))
            .collect();
        let cut = ratio(&Tissue::standard().heated(&cut).expect("fair"), injury).expect("fair");
        assert!((cut / whole - 1.0).abs() < 1e-8, "{cut} against {whole}");
    }
}
