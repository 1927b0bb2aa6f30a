use super::*;

/// Finer elements of the same layers.
fn finer() -> Tissue {
    Tissue::of_degrees(&STANDARD, STANDARD_SURFACE, STANDARD_BASE, &[20, 22, 20])
        .expect("the published layers lie in range")
}

#[test]
fn elements_are_converged_in_depth() {
    let (coarse, fine) = (Tissue::standard(), finer());
    let pulses = [Pulse::steady(3.0, 20_000.0)];
    let (coarse, fine) = (
        coarse.heated(&pulses).expect("fair"),
        fine.heated(&pulses).expect("fair"),
    );
    let rise = fine.temperature(0.0, 3.0).expect("fair") - STANDARD_SURFACE;
    for (depth, from, tolerance) in [
        (0.0, 1e-4, 1e-3),
        (0.0, 1e-2, 5e-6),
        (75e-6, 1e-2, 5e-6),
        (400e-6, 1e-2, 5e-6),
        (1200e-6, 1e-2, 5e-6),
        (3000e-6, 1e-2, 5e-6),
    ] {
        for step in 0..60 {
            let at = from * 1.25_f64.powi(step);
            let (a, b) = (
                coarse.temperature(depth, at).expect("fair"),
                fine.temperature(depth, at).expect("fair"),
            );
            assert!(
                (a - b).abs() < tolerance * rise,
                "{depth} m, {at} s: {a} K against {b} K, rise {rise} K"
            );
        }
    }
}

/// The heat in the tissue above the straight line it began with, by Simpson's
/// rule over temperatures alone, J/m².
fn heat(history: &History<'_>, at: f64) -> f64 {
    let depth = Tissue::standard().depth();
    let mut top = 0.0;
    let mut sum = 0.0;
    for layer in &STANDARD {
        const PIECES: u32 = 400;
        for i in 0..=2 * PIECES {
            let share = f64::from(i) / f64::from(2 * PIECES);
            let x = (top + share * layer.thickness).min(depth);
            let before = STANDARD_SURFACE + x / depth * (STANDARD_BASE - STANDARD_SURFACE);
            let rise = history.temperature(x, at).expect("fair") - before;
            let weight = if i == 0 || i == 2 * PIECES {
                1.0
            } else {
                f64::from(2 + 2 * (i % 2))
            };
            sum += weight * rise * layer.heat_capacity * layer.thickness / f64::from(6 * PIECES);
        }
        top += layer.thickness;
    }
    sum
}

const UNEVEN: [Pulse; 4] = [
    Pulse::steady(2.0, 5000.0),
    Pulse {
        duration: 4.0,
        from: 5000.0,
        to: 20_000.0,
    },
    Pulse::steady(10.0, 0.0),
    Pulse::steady(30.0, 2000.0),
];

#[test]
fn heat_is_neither_made_nor_lost() {
    let perfused = STANDARD.map(|layer| Layer {
        perfusion: 3000.0,
        ..layer
    });
    let perfused = Tissue::new(&perfused, STANDARD_SURFACE, STANDARD_BASE).expect("fair");
    for tissue in [Tissue::standard(), &perfused] {
        let history = tissue.heated(&UNEVEN).expect("fair");
        for at in [0.0, 0.01, 1.0, 2.0, 5.0, 20.0, 46.0, 100.0, 1e4] {
            let budget = history.budget(at).expect("fair");
            let off = budget.absorbed - budget.stored - budget.passed_on;
            assert!(
                off.abs() < 1e-9 * budget.absorbed.max(1000.0),
                "{at} s: {budget:?}, off by {off} J/m²"
            );
            let seen = heat(&history, at);
            assert!(
                (seen - budget.stored).abs() < 1e-6 * budget.absorbed.max(1000.0),
                "{at} s: temperatures hold {seen} J/m², the budget {}",
                budget.stored
            );
        }
        let late = history.budget(1e5).expect("fair");
        assert!((late.absorbed - 120_000.0).abs() < 1e-6, "{late:?}");
    }
}

#[test]
fn what_leaves_is_the_gradient_at_the_base() {
    let history = Tissue::standard().heated(&UNEVEN).expect("fair");
    let (depth, k) = (Tissue::standard().depth(), STANDARD[2].conductivity);
    let flux = |at: f64| {
        let step = 2e-6;
        let near = history.temperature(depth - step, at).expect("fair");
        let far = history.temperature(depth - 2.0 * step, at).expect("fair");
        k * (4.0 * near - far - 3.0 * STANDARD_BASE) / (2.0 * step)
    };
    let (from, to, pieces) = (10.0, 60.0, 2000_u32);
    let step = (to - from) / f64::from(pieces);
    let sum: f64 = (0..pieces)
        .map(|i| flux(from + step * (f64::from(i) + 0.5)) * step)
        .sum();
    let budget = |at: f64| history.budget(at).expect("fair").passed_on;
    let left = budget(to) - budget(from);
    assert!(
        (sum / left - 1.0).abs() < 1e-5,
        "{sum} J/m² against {left} J/m²"
    );
}

#[test]
fn steady_flux_ends_in_the_straight_lines_of_fourier() {
    let history = Tissue::standard()
        .heated(&[Pulse::steady(1e5, 500.0)])
        .expect("fair");
    let resistance: f64 = STANDARD.iter().map(|l| l.thickness / l.conductivity).sum();
    let found = history.temperature(0.0, 1e5).expect("fair");
    let expected = STANDARD_BASE + 500.0 * resistance;
    assert!(
        (found - expected).abs() < 1e-6,
        "{found} K against {expected} K"
    );
}

#[test]
fn blood_holds_a_deep_tissue_at_the_fin_solution() {
    // k·T″ = w·(T − T_base): rise at the surface q/√(k·w)·tanh(L·√(w/k)).
    let layer = Layer {
        thickness: 0.02,
        conductivity: 0.4,
        heat_capacity: 3.8e6,
        perfusion: 8000.0,
    };
    let tissue = Tissue::new(&[layer], 307.0, 307.0).expect("fair");
    let history = tissue.heated(&[Pulse::steady(1e6, 300.0)]).expect("fair");
    let found = history.temperature(0.0, 1e6).expect("fair") - 307.0;
    let expected = 300.0 / (0.4_f64 * 8000.0).sqrt() * (0.02 * (8000.0_f64 / 0.4).sqrt()).tanh();
    assert!(
        (found / expected - 1.0).abs() < 1e-6,
        "{found} K against {expected} K"
    );
}

#[test]
fn before_exposure_the_profile_is_the_stated_line() {
    let history = Tissue::standard().heated(&[]).expect("fair");
    for share in [0.0, 0.01, 0.2, 0.5, 1.0] {
        let depth = share * Tissue::standard().depth();
        let found = history.temperature(depth, 0.0).expect("fair");
        let expected = STANDARD_SURFACE + share * (STANDARD_BASE - STANDARD_SURFACE);
        assert!(
            (found - expected).abs() < 1e-10,
            "{found} K against {expected} K"
        );
    }
}

#[test]
fn a_ramp_is_the_limit_of_small_steps() {
    let ramp = Pulse {
        duration: 2.0,
        from: 1000.0,
        to: 30_000.0,
    };
    let steps: Vec<Pulse> = (0..4000)
        .map(|i| {
            Pulse::steady(
                2.0 / 4000.0,
                1000.0 + 29_000.0 * (f64::from(i) + 0.5) / 4000.0,
            )
        })
        .collect();
    let (smooth, stepped) = (
        Tissue::standard().heated(&[ramp]).expect("fair"),
        Tissue::standard().heated(&steps).expect("fair"),
    );
    for at in [0.5, 1.0, 2.0, 5.0] {
        let (a, b) = (
            smooth.temperature(75e-6, at).expect("fair"),
            stepped.temperature(75e-6, at).expect("fair"),
        );
        assert!((a - b).abs() < 1e-4, "{at} s: {a} K against {b} K");
    }
}

#[test]
fn unfit_layers_and_pulses_are_refused() {
    assert!(Tissue::new(&[], 305.0, 306.0).is_err());
    assert!(Tissue::new(&[STANDARD[0]; 9], 305.0, 306.0).is_err());
    for broken in [
        Layer {
            thickness: 0.0,
            ..STANDARD[0]
        },
        Layer {
            conductivity: f64::NAN,
            ..STANDARD[0]
        },
        Layer {
            heat_capacity: -1.0,
            ..STANDARD[0]
        },
        Layer {
            perfusion: -1.0,
            ..STANDARD[0]
        },
    ] {
        assert!(
            Tissue::new(&[broken], 305.0, 306.0).is_err(),
            "{broken:?} was taken"
        );
    }
    assert!(Tissue::new(&STANDARD, 305.0, 320.0).is_err());
    let tissue = Tissue::standard();
    for pulse in [
        Pulse::steady(-1.0, 1.0),
        Pulse::steady(1.0, f64::NAN),
        Pulse {
            duration: 1.0,
            from: 1.0,
            to: -5.0,
        },
        Pulse {
            duration: f64::INFINITY,
            from: 1.0,
            to: 1.0,
        },
    ] {
        assert!(tissue.heated(&[pulse]).is_err(), "{pulse:?} was taken");
    }
    let hair = Pulse {
        duration: 1e-300,
        from: 0.0,
        to: 1e9,
    };
    let history = tissue.heated(&[hair]).expect("no pulse at all");
    assert!(history.temperature(0.0, 1.0).expect("fair").is_finite());
    let history = tissue
        .heated(&[Pulse::steady(0.0, 1.0)])
        .expect("no pulse at all");
    assert!(history.temperature(-1e-9, 0.0).is_err());
    assert!(history.temperature(0.01, 0.0).is_err());
    assert!(history.temperature(0.0, -1.0).is_err());
}
