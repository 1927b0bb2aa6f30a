use super::*;

fn uneven() -> Schedule {
    let spells = [
        (0.0, 20.0, 900.0),
        (20.0, 5.0, 3000.0),
        (40.0, 300.0, 90.0),
        (500.0, 2.0, 6000.0),
        (900.0, 100.0, 400.0),
        (1400.0, 1.0, 12_000.0),
        (1401.0, 700.0, 120.0),
        (4000.0, 1500.0, 60.0),
    ];
    Schedule::new(
        spells
            .iter()
            .map(|(start, duration, irradiance)| Spell {
                start: *start,
                duration: *duration,
                irradiance: *irradiance,
            })
            .collect(),
    )
    .expect("no overlap")
}

/// Doses up to whole seconds, by counting.
fn counted(schedule: &Schedule, end: usize) -> Vec<f64> {
    let mut sum = vec![0.0];
    for second in 0..end {
        let middle = second as f64 + 0.5;
        let now = schedule
            .spells()
            .iter()
            .find(|s| s.start <= middle && middle < s.start + s.duration)
            .map_or(0.0, |s| s.irradiance);
        sum.push(sum[second] + now);
    }
    sum
}

#[test]
fn worst_window_is_found_by_trying_them_all() {
    let schedule = uneven();
    let sum = counted(&schedule, 6000);
    let allowed = |t: f64| 18_000.0 * t.powf(0.25);
    let mut best = 0.0_f64;
    for from in 0..6000 {
        for to in from + 1..=(from + 1000).min(6000) {
            best = best.max((sum[to] - sum[from]) / allowed((to - from) as f64));
        }
    }
    let found = schedule
        .worst_window(1000.0, &allowed)
        .expect("fair")
        .expect("some exposure");
    // Spells begin and end on whole seconds here, so trying those is complete.
    assert!(
        (found.ratio / best - 1.0).abs() < 1e-12,
        "{found:?} against {best}"
    );
}

#[test]
fn worst_mean_is_found_by_trying_them_all() {
    let schedule = uneven();
    let sum = counted(&schedule, 8000);
    for window in [10_usize, 333, 1000, 2000] {
        let best = (0..8000 - window)
            .map(|from| sum[from + window] - sum[from])
            .fold(0.0, f64::max);
        let found = schedule
            .worst_of_length(window as f64, 1.0)
            .expect("fair")
            .expect("some exposure");
        // A window that reaches back before the shift holds what it holds.
        let early = sum[window];
        assert!(
            (found.dose / best.max(early) - 1.0).abs() < 1e-12,
            "{window} s: {found:?} against {best}"
        );
    }
}

#[test]
fn one_stay_is_judged_by_its_own_limit() {
    for (stay, e) in [(1.0, 18_000.0), (30.0, 1000.0), (600.0, 140.0)] {
        let schedule = Schedule::repeated(e, stay, 0.0, 1).expect("fair");
        let found = schedule.eye(18_000.0, 100.0).expect("fair");
        let expected = e / (18_000.0 * f64::powf(stay, -0.75));
        let window = found.window.expect("some exposure");
        assert!(
            (window.ratio / expected - 1.0).abs() < 1e-12,
            "{stay} s: {window:?} against {expected}"
        );
    }
}

#[test]
fn thirty_seconds_every_three_minutes_pass_alone_and_fail_as_a_shift() {
    let once = Schedule::repeated(1000.0, 30.0, 150.0, 1).expect("fair");
    let shift = Schedule::repeated(1000.0, 30.0, 150.0, 160).expect("fair");
    let (once, shift) = (
        once.eye(18_000.0, 100.0).expect("fair"),
        shift.eye(18_000.0, 100.0).expect("fair"),
    );
    assert!(once.ratio() < 1.0, "{once:?}");
    let mean = shift.mean.expect("some exposure");
    // Six stays fit into 1000 s: 180 kJ/m² against 100 kJ/m².
    assert!((mean.ratio - 1.8).abs() < 1e-12, "{mean:?}");
}

#[test]
fn doses_add_over_spells_and_windows() {
    let schedule = uneven();
    let total: f64 = schedule
        .spells()
        .iter()
        .map(|s| s.duration * s.irradiance)
        .sum();
    assert!((schedule.total() - total).abs() < 1e-9 * total);
    let (a, b, c) = (
        schedule.dose(0.0, 950.0).expect("fair"),
        schedule.dose(950.0, 1e6).expect("fair"),
        schedule.dose(0.0, 1e6).expect("fair"),
    );
    assert!(
        (a + b - c).abs() < 1e-9 * c && (c - total).abs() < 1e-9 * total,
        "{a} {b} {c}"
    );
    assert_eq!(schedule.dose(10.0, 5.0), Ok(0.0));
    let split = Schedule::repeated(5000.0, 5.0, 0.0, 4).expect("fair");
    let whole = Schedule::repeated(5000.0, 20.0, 0.0, 1).expect("fair");
    assert!((split.thermal_dose() / whole.thermal_dose() - 1.0).abs() < 1e-12);
    let (split, whole) = (
        split.eye(18_000.0, 100.0).expect("fair").ratio(),
        whole.eye(18_000.0, 100.0).expect("fair").ratio(),
    );
    assert!(
        (split / whole - 1.0).abs() < 1e-9,
        "{split} against {whole}"
    );
}

#[test]
fn pulses_keep_time_and_dose() {
    let schedule = uneven();
    let pulses = schedule.pulses(0.9).expect("fair");
    let (time, dose): (f64, f64) = pulses.iter().fold((0.0, 0.0), |(t, d), p| {
        (t + p.duration, d + p.duration * p.from)
    });
    assert!((time - 5500.0).abs() < 1e-9, "{time} s");
    assert!((dose / schedule.total() - 0.9).abs() < 1e-12, "{dose} J/m²");
}

#[test]
fn overlaps_and_nonsense_are_refused_and_nothing_is_nothing() {
    let spell = Spell {
        start: 0.0,
        duration: 10.0,
        irradiance: 1.0,
    };
    let later = Spell {
        start: 5.0,
        ..spell
    };
    assert!(Schedule::new(vec![later, spell]).is_err());
    for wrong in [
        Spell {
            start: -1.0,
            ..spell
        },
        Spell {
            duration: f64::NAN,
            ..spell
        },
        Spell {
            irradiance: f64::INFINITY,
            ..spell
        },
    ] {
        assert!(Schedule::new(vec![wrong]).is_err(), "{wrong:?} was taken");
    }
    assert!(Schedule::repeated(1.0, 1.0, 1.0, 200_000).is_err());
    let nothing = Schedule::repeated(0.0, 10.0, 1.0, 5).expect("no exposure");
    assert_eq!(nothing.eye(18_000.0, 100.0).expect("fair").ratio(), 0.0);
    assert_eq!(nothing.total(), 0.0);
    assert!(uneven().worst_window(1000.0, &|_| 0.0).is_err());
    assert!(uneven().worst_of_length(f64::NAN, 1.0).is_err());
}
