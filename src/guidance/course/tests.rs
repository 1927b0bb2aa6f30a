use proptest::prelude::*;

use crate::guidance::{Allowed, Error, Finding, Judgement, Library, Reason};

fn judge(id: &str, exposure: f64, stay: impl Into<Option<f64>>) -> Judgement {
    Library::shipped()
        .judge(id, exposure, stay.into())
        .expect("the id is shipped and the exposure is one")
}

fn allowed(id: &str, exposure: f64) -> Allowed {
    Library::shipped()
        .allowed(id, exposure)
        .expect("the id is shipped and the exposure is one")
}

/// The seconds of an allowed time, and whether it is one that ends where guidance does.
fn seconds(allowed: Allowed) -> (f64, &'static str) {
    match allowed {
        Allowed::Seconds(time) => (time, "seconds"),
        Allowed::CappedAt(time) => (time, "capped"),
        Allowed::Unlimited => (f64::INFINITY, "unlimited"),
    }
}

#[test]
fn allowed_times_are_the_inverse_of_the_limits() {
    let infinite = f64::INFINITY;
    let eye_end = 18_000.0 * 1000.0_f64.powf(-0.75);
    let skin_end = 20_000.0 * 10.0_f64.powf(-0.75);
    let pain_end = (35.0_f64 / 1.7).powf(1.33);
    for (id, exposure, expected, how) in [
        // (18000/E)^(4/3), by rows m and n alike.
        ("eu-2006-25-m", 18_000.0, 1.0, "seconds"),
        ("eu-2006-25-n", 18_000.0, 1.0, "seconds"),
        ("eu-2006-25-m", 9000.0, 2.519_842_099_789_746_3, "seconds"),
        ("eu-2006-25-m", 1125.0, 40.317_473_596_635_94, "seconds"),
        ("eu-2006-25-m", 18.0e9, 1e-8, "seconds"),
        ("eu-2006-25-m", eye_end, 1000.0, "seconds"),
        ("eu-2006-25-n", 100.5, 1000.0, "seconds"),
        ("eu-2006-25-m", 100.000_001, 1000.0, "seconds"),
        ("eu-2006-25-m", 100.0, infinite, "unlimited"),
        ("eu-2006-25-n", 100.0, infinite, "unlimited"),
        ("eu-2006-25-m", 1e-300, infinite, "unlimited"),
        ("eu-2006-25-n", 0.0, infinite, "unlimited"),
        ("eu-2006-25-m", f64::MAX, 0.0, "seconds"),
        ("icnirp-2013-ir-eye", 18_000.0, 1.0, "seconds"),
        ("icnirp-2013-ir-eye", 100.0, infinite, "unlimited"),
        // A stay of exactly 1000 s belongs to 100 W/m² there.
        (
            "icnirp-2013-ir-eye",
            100.5,
            1000.0_f64.next_down(),
            "seconds",
        ),
        // Doses: H = E·t ≤ 20000·t^0.25, so (20000/E)^(4/3).
        ("eu-2006-25-o", 20_000.0, 1.0, "seconds"),
        ("eu-2006-25-o", 10_000.0, 2.519_842_099_789_746_3, "seconds"),
        (
            "icnirp-2013-skin",
            10_000.0,
            2.519_842_099_789_746_3,
            "seconds",
        ),
        ("eu-2006-25-o", skin_end, 10.0, "capped"),
        ("eu-2006-25-o", 0.0, 10.0, "capped"),
        ("icnirp-2013-skin", 100.0, 10.0, "capped"),
        ("eu-2006-25-o", f64::MAX, 0.0, "seconds"),
        // (35/q)^1.33, q in kW/m².
        ("pain-time", 35_000.0, 1.0, "seconds"),
        ("pain-time", 17_500.0, 2.0_f64.powf(1.33), "seconds"),
        ("pain-time", 1800.0, (35.0_f64 / 1.8).powf(1.33), "seconds"),
        ("pain-time", 1_699.999_999, pain_end, "capped"),
        ("pain-time", 0.0, pain_end, "capped"),
    ] {
        let (found, kind) = seconds(allowed(id, exposure));
        assert_eq!(kind, how, "{id} at {exposure} W/m²: {found} s");
        let near = found == expected || (found - expected).abs() <= 4e-15 * expected;
        assert!(
            near,
            "{id} at {exposure} W/m²: expected {expected} s, found {found} s"
        );
    }
}

#[test]
fn row_n_alone_forbids_what_row_m_forbids() {
    for exposure in [101.0, 500.0, 5000.0, 1e9] {
        for stay in [0.5, 30.0, 1000.0, 1001.0, 28_800.0] {
            let (m, n) = (
                judge("eu-2006-25-m", exposure, stay),
                judge("eu-2006-25-n", exposure, stay),
            );
            assert_eq!(m, n, "{exposure} W/m² for {stay} s");
        }
    }
    assert_eq!(judge("eu-2006-25-n", 5000.0, 900.0).finding, Finding::Over);
}

#[test]
fn bounds_belong_to_the_side_that_the_texts_give_them() {
    let just_after = 1000.0_f64.next_up();
    let just_before = 10.0_f64.next_down();
    let beyond = |until| Finding::NotAssessed(Reason::Beyond { until });
    for (id, exposure, stay, limit, finding) in [
        // t ≤ 1000 s is row m: 101.2 W/m².
        (
            "eu-2006-25-m",
            101.0,
            1000.0,
            Some(101.221),
            Finding::Within,
        ),
        (
            "eu-2006-25-m",
            101.0,
            just_after,
            Some(100.0),
            Finding::Over,
        ),
        (
            "eu-2006-25-n",
            101.0,
            1000.0,
            Some(101.221),
            Finding::Within,
        ),
        // t ≥ 1000 s is the long-time value there.
        (
            "icnirp-2013-ir-eye",
            101.0,
            1000.0,
            Some(100.0),
            Finding::Over,
        ),
        (
            "icnirp-2013-ir-eye",
            101.0,
            999.0,
            Some(101.297),
            Finding::Within,
        ),
        (
            "icnirp-2013-ir-eye",
            100.0,
            28_800.0,
            Some(100.0),
            Finding::Within,
        ),
        // Under 10 s only.
        (
            "eu-2006-25-o",
            3000.0,
            just_before,
            Some(3556.559),
            Finding::Within,
        ),
        ("eu-2006-25-o", 3000.0, 10.0, None, beyond(10.0)),
        ("icnirp-2013-skin", 3000.0, 240.0, None, beyond(10.0)),
        // A stay that goes on past 10 s has passed through every second before.
        ("eu-2006-25-o", 5000.0, 240.0, Some(3556.559), Finding::Over),
        ("eu-2006-25-o", 5000.0, 10.0, Some(3556.559), Finding::Over),
    ] {
        let found = judge(id, exposure, stay);
        assert_eq!(found.finding, finding, "{id}, {exposure} W/m², {stay} s");
        match (found.limit, limit) {
            (Some(found), Some(expected)) => assert!(
                (found - expected).abs() < 6e-4,
                "{id} at {stay} s: expected {expected} W/m², found {found} W/m²"
            ),
            (found, expected) => assert_eq!(found, expected, "{id} at {stay} s"),
        }
    }
}

#[test]
fn evidence_speaks_of_an_onset_and_never_of_within() {
    let end = (35.0_f64 / 1.7).powf(1.33);
    for (exposure, stay, finding) in [
        (9460.0, 5.0, Finding::BelowOnset),
        (9460.0, 6.0, Finding::OnsetReached),
        (1740.0, 240.0, Finding::OnsetReached),
        (1500.0, 30.0, Finding::BelowOnset),
        (
            1500.0,
            240.0,
            Finding::NotAssessed(Reason::Beyond { until: end }),
        ),
    ] {
        let found = judge("pain-time", exposure, stay).finding;
        assert_eq!(found, finding, "{exposure} W/m² for {stay} s");
    }
}

#[test]
fn ratios_are_exposure_over_limit_in_irradiance_and_in_dose() {
    for (id, exposure, stay, ratio) in [
        ("eu-2006-25-m", 36_000.0, 1.0, 2.0),
        ("eu-2006-25-m", 50.0, 28_800.0, 0.5),
        ("eu-2006-25-m", 0.0, 60.0, 0.0),
        ("eu-2006-25-o", 10_000.0, 1.0, 0.5),
        (
            "eu-2006-25-o",
            10_000.0,
            5.0,
            50_000.0 / (20_000.0 * 5.0_f64.powf(0.25)),
        ),
        ("pain-time", 70_000.0, 1.0, 2.0),
    ] {
        let found = judge(id, exposure, stay);
        let value = found.ratio.expect("the stay is covered");
        assert!(
            (value - ratio).abs() <= 1e-14 * ratio,
            "{id}, {exposure} W/m², {stay} s: expected {ratio}, found {value}"
        );
        if let Some(dose) = found.dose {
            let same = dose.exposure / dose.limit;
            assert!(
                (same - value).abs() <= 1e-14 * value,
                "{id}: ratio {value}, as doses {same}"
            );
        }
        assert_eq!(found.dose.is_some(), id.ends_with("-o"), "{id}");
    }
}

#[test]
fn without_a_stay_the_allowed_time_is_still_given() {
    for (stay, reason) in [
        (None, Reason::NoStay),
        (Some(0.0), Reason::StayNotPositive),
        (Some(-1.0), Reason::StayNotPositive),
        (Some(f64::NAN), Reason::StayNotPositive),
        (Some(f64::INFINITY), Reason::StayNotPositive),
    ] {
        let found = judge("eu-2006-25-m", 18_000.0, stay);
        assert_eq!(found.finding, Finding::NotAssessed(reason), "{stay:?}");
        assert_eq!(found.ratio, None, "{stay:?}");
        assert_eq!(found.allowed, Allowed::Seconds(1.0), "{stay:?}");
    }
}

#[test]
fn an_exposure_that_is_none_is_refused() {
    for value in [-1.0, -1e-300, f64::INFINITY, f64::NEG_INFINITY, f64::NAN] {
        let found = Library::shipped().judge("eu-2006-25-m", value, Some(1.0));
        assert!(
            matches!(found, Err(Error::Exposure { .. })),
            "{value}: {found:?}"
        );
    }
}

#[test]
fn limits_are_given_only_where_guidance_speaks() {
    let library = Library::shipped();
    for (id, t, speaks) in [
        ("eu-2006-25-m", 0.0, false),
        ("eu-2006-25-m", -1.0, false),
        ("eu-2006-25-m", f64::NAN, false),
        ("eu-2006-25-m", 1e-12, true),
        ("eu-2006-25-m", 1e9, true),
        ("eu-2006-25-o", 9.999, true),
        ("eu-2006-25-o", 10.0, false),
        ("pain-time", 55.8, true),
        ("pain-time", 55.9, false),
        ("no-such-row", 1.0, false),
    ] {
        let found = library.limit_at(id, t);
        assert_eq!(found.is_some(), speaks, "{id} at {t} s: {found:?}");
    }
}

#[test]
fn extremes_give_finite_numbers() {
    let steep = crate::guidance::library::tests::own(
        r#""irradiance", "band": "all wavelengths""#,
        r#"[{"limit": "1e-300 W/m² * (t / 1 s)^(-1.5)"}]"#,
    );
    let steep = Library::read("own.json", steep.as_bytes()).expect("the file is sound");
    for (library, id) in [
        (Library::shipped(), "eu-2006-25-m"),
        (Library::shipped(), "eu-2006-25-o"),
        (Library::shipped(), "pain-time"),
        (&steep, "own-rule"),
    ] {
        for exposure in [0.0, f64::MIN_POSITIVE, 1.0, f64::MAX] {
            for stay in [5e-324, 1e-300, 1e-3, 9.99, 1e5, f64::MAX] {
                let found = library
                    .judge(id, exposure, Some(stay))
                    .expect("it is loaded");
                let dose = found.dose.map(|dose| [dose.exposure, dose.limit]);
                let numbers = [found.ratio, found.limit, found.judged_at];
                let all = numbers.iter().flatten().chain(dose.iter().flatten());
                assert!(
                    all.copied().all(f64::is_finite),
                    "{id}, {exposure} W/m² for {stay} s: {found:?}"
                );
            }
        }
    }
}

/// Formulas that are no powers of time, in a user's file.
fn own() -> Library {
    let bytes = crate::guidance::library::tests::own(
        r#""irradiance", "band": "all wavelengths""#,
        r#"[{"until": "100 s", "limit": "400 W/m² + 3000 W/m² / (1 + t / 1 s)"}, {"limit": "min(420 W/m², 42 kW/m² * (t / 1 s)^(-1))"}]"#,
    );
    Library::read("own.json", bytes.as_bytes()).expect("the file is sound")
}

#[test]
fn formulas_are_inverted_to_a_part_in_a_million_million() {
    let library = own();
    for (exposure, expected) in [
        // E = 400 + 3000/(1 + t), so t = 3000/(E − 400) − 1.
        (500.0, 29.0),
        (1000.0, 4.0),
        (3000.0, 3000.0 / 2600.0 - 1.0),
        (430.0, 99.0),
        (420.0, 100.0),
        (42.0, 1000.0),
        (0.42, 100_000.0),
    ] {
        let found = library.allowed("own-rule", exposure).expect("it is loaded");
        let Allowed::Seconds(time) = found else {
            panic!("{exposure} W/m²: expected {expected} s, found {found:?}");
        };
        assert!(
            (time - expected).abs() <= 1e-12 * expected,
            "{exposure} W/m²: expected {expected} s, found {time} s"
        );
    }
    assert_eq!(
        library.allowed("own-rule", 0.0),
        Ok(Allowed::Unlimited),
        "nothing is never too much"
    );
    // Above the limit from the first moment.
    let high = library.allowed("own-rule", 1e6).expect("it is loaded");
    assert_eq!(high, Allowed::Seconds(0.0));
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn the_ratio_is_at_most_one_exactly_when_the_stay_is_allowed(
        row in 0..7_usize, exposure in -3.0..7.0_f64, stay in -6.0..6.0_f64, at_the_edge in 0..4_u8,
    ) {
        let ids = [
            "eu-2006-25-m", "eu-2006-25-n", "eu-2006-25-o", "icnirp-2013-ir-eye",
            "icnirp-2013-skin", "pain-time", "own-rule",
        ];
        let library = if row == 6 { own() } else { Library::shipped().clone() };
        let exposure = 10.0_f64.powf(exposure);
        let allowed = library.allowed(ids[row], exposure).expect("it is loaded");
        let longest = seconds(allowed).0;
        let stay = match at_the_edge {
            1 if longest > 0.0 && longest.is_finite() => longest,
            2 if longest.is_finite() => longest.next_up(),
            3 if longest > 0.0 && longest.is_finite() => longest.next_down(),
            _ => 10.0_f64.powf(stay),
        };
        let found = library.judge(ids[row], exposure, Some(stay)).expect("it is loaded");
        prop_assert_eq!(found.allowed, allowed);
        if let Some(ratio) = found.ratio {
            prop_assert_eq!(
                ratio <= 1.0, stay <= longest,
                "{} at {} W/m² for {} s: ratio {}, allowed {:?}", ids[row], exposure, stay, ratio, allowed
            );
            prop_assert_eq!(ratio > 1.0, found.finding.counts_as_over());
            // Second way: the limit at the time judged at, straight from the library.
            if let Some(limit) = library.limit_at(ids[row], stay) {
                let plain = exposure / limit;
                prop_assert!((plain - ratio).abs() <= 4e-12 * ratio, "ratio {}, by the limit {}", ratio, plain);
            }
        } else {
            prop_assert!(matches!(found.finding, Finding::NotAssessed(_)));
            prop_assert!(stay >= longest, "{} s is covered up to {} s", stay, longest);
        }
    }

    #[test]
    fn more_heat_never_allows_a_longer_stay(
        row in 0..6_usize, low in -3.0..7.0_f64, more in 0.0..4.0_f64,
    ) {
        let library = Library::shipped();
        let id = library.limits()[row].id.as_str();
        let (low, high) = (10.0_f64.powf(low), 10.0_f64.powf(low + more));
        let (long, short) = (allowed(id, low), allowed(id, high));
        prop_assert!(
            seconds(long).0 >= seconds(short).0,
            "{}: {:?} at {} W/m², {:?} at {} W/m²", id, long, low, short, high
        );
    }
}
