//! Laws of heat in skin and of exposure over time.

use farglow::physics::repeated::{Schedule, Spell};
use farglow::physics::skin::tissue::{Layer, Pulse, Tissue};
use farglow::physics::skin::{Injury, Onset, blister, burn, dose, pain};
use proptest::prelude::*;

/// A deep layer of one kind, as good as semi-infinite for a while.
fn deep(conductivity: f64, heat_capacity: f64) -> Tissue {
    let layer = |thickness| Layer {
        thickness,
        conductivity,
        heat_capacity,
        perfusion: 0.0,
    };
    Tissue::new(&[1e-4, 1e-3, 8e-3, 5e-2].map(layer), 306.0, 306.0).expect("a fair layer")
}

/// The time of an onset, for comparing: sooner is smaller, later is larger.
fn comes(onset: Onset) -> f64 {
    match onset {
        Onset::After(time) => time,
        Onset::Sooner(time) => time.next_down(),
        Onset::Later(_) => f64::INFINITY,
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(64))]

    /// Carslaw and Jaeger, semi-infinite solid under constant flux: the surface
    /// rises by 2q·√(t/(π·k·ρ·c)).
    #[test]
    fn a_deep_layer_heats_like_a_half_space(
        conductivity in 0.2..1.0_f64,
        heat_capacity in 2e6..5e6_f64,
        flux in 500.0..80_000.0_f64,
        time in 0.02..60.0_f64,
    ) {
        let tissue = deep(conductivity, heat_capacity);
        let history = tissue.heated(&[Pulse::steady(100.0, flux)]).expect("fair");
        let found = history.temperature(0.0, time).expect("fair") - 306.0;
        let expected = 2.0 * flux * (time / (std::f64::consts::PI * conductivity * heat_capacity)).sqrt();
        prop_assert!((found / expected - 1.0).abs() < 1e-4, "{} K against {} K", found, expected);
    }

    /// What two fluxes do together is the sum of what each does.
    #[test]
    fn rises_add(a in 0.0..50_000.0_f64, b in 0.0..50_000.0_f64, t in 0.1..50.0_f64, depth in 0.0..5e-3_f64) {
        let rise = |flux: f64| {
            let history = Tissue::standard().heated(&[Pulse::steady(5.0, flux)]).expect("fair");
            history.temperature(depth, t).expect("fair")
        };
        let (both, none) = (rise(a + b), rise(0.0));
        let sum = rise(a) + rise(b) - none;
        prop_assert!((both - sum).abs() < 1e-8 * both, "{} K against {} K", both, sum);
    }

    /// A pulse cut in two is the same pulse.
    #[test]
    fn a_cut_pulse_is_the_same_pulse(flux in 0.0..50_000.0_f64, cut in 0.01..0.99_f64, t in 0.1..30.0_f64) {
        let whole = Tissue::standard().heated(&[Pulse::steady(10.0, flux)]).expect("fair");
        let halves = [Pulse::steady(10.0 * cut, flux), Pulse::steady(10.0 * (1.0 - cut), flux)];
        let halves = Tissue::standard().heated(&halves).expect("fair");
        let (a, b) = (
            whole.temperature(75e-6, t).expect("fair"),
            halves.temperature(75e-6, t).expect("fair"),
        );
        prop_assert!((a - b).abs() < 1e-8 * a, "{} K against {} K", a, b);
    }

    /// More flux never takes longer to hurt, to blister or to burn.
    #[test]
    fn more_flux_never_takes_longer(flux in 1.0..200_000.0_f64, more in 1.0..3.0_f64) {
        let (low, high) = (flux, (flux * more).min(200_000.0));
        let hurts = |q| pain::shortest(q).expect("fair").map_or(f64::INFINITY, |found| found.time);
        prop_assert!(hurts(high) <= hurts(low), "pain: {} after {}", hurts(high), hurts(low));
        for curve in [blister::onset, blister::onset_of_1959] {
            let (a, b) = (comes(curve(low).expect("fair")), comes(curve(high).expect("fair")));
            prop_assert!(b <= a, "blister: {} after {}", b, a);
        }
        let limit = dose::Threshold::SecondDegree.least();
        let reach = |q| dose::reached(q, limit).expect("fair").unwrap_or(f64::INFINITY);
        prop_assert!(reach(high) <= reach(low));
    }

    /// The burn integral grows with flux and with time.
    #[test]
    fn more_heat_never_burns_less(flux in 1000.0..60_000.0_f64, time in 0.5..20.0_f64, more in 1.0..1.5_f64) {
        for injury in Injury::ALL {
            let omega = |q, t| burn::after_pulse(Tissue::standard(), q, t, injury).expect("fair");
            let (base, hotter, longer) = (omega(flux, time), omega(flux * more, time), omega(flux, time * more));
            prop_assert!(hotter >= base * (1.0 - 1e-7), "{:?}: {} below {}", injury, hotter, base);
            prop_assert!(longer >= base * (1.0 - 1e-7), "{:?}: {} below {}", injury, longer, base);
            prop_assert!(base.is_finite() && base >= 0.0);
        }
    }

    /// Doses of the parts are the dose of the whole.
    #[test]
    fn doses_add(flux in 0.0..50_000.0_f64, a in 0.0..1000.0_f64, b in 0.0..1000.0_f64) {
        let dose = |t| dose::steady(flux, t).expect("fair");
        let (sum, whole) = (dose(a) + dose(b), dose(a + b));
        prop_assert!((sum - whole).abs() <= 1e-14 * whole, "{} against {}", sum, whole);
    }

    /// No window is heavier than the one that is called the worst.
    #[test]
    fn no_window_is_worse_than_the_worst(
        parts in proptest::collection::vec((0.0..300.0_f64, 0.1..400.0_f64, 0.0..5000.0_f64), 1..12),
        tries in proptest::collection::vec((0.0..1.0_f64, 0.0..1.0_f64), 200),
    ) {
        let mut now = 0.0;
        let spells: Vec<Spell> = parts
            .iter()
            .map(|(rest, duration, irradiance)| {
                let start = now + rest;
                now = start + duration;
                Spell { start, duration: *duration, irradiance: *irradiance }
            })
            .collect();
        let schedule = Schedule::new(spells).expect("one after the other");
        let eye = schedule.eye(18_000.0, 100.0).expect("fair");
        for (at, share) in tries {
            let (from, length) = (at * now, (share * 1000.0).max(1e-3));
            let dose = schedule.dose(from, from + length).expect("fair");
            let ratio = dose / (18_000.0 * length.powf(0.25));
            prop_assert!(ratio <= eye.window.map_or(0.0, |w| w.ratio) * (1.0 + 1e-9));
            let mean = schedule.dose(from, from + 1000.0).expect("fair") / 1e5;
            prop_assert!(mean <= eye.mean.map_or(0.0, |w| w.ratio) * (1.0 + 1e-9));
        }
    }
}
