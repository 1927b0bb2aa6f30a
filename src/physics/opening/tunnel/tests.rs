use glam::DVec2;

use super::*;

fn sections() -> Vec<(Section, f64)> {
    let triangle = vec![DVec2::ZERO, DVec2::X, DVec2::new(0.3, 0.9)];
    vec![
        (Section::disc(0.5).expect("a disc"), 1e-9),
        (Section::slot(1.0).expect("a slot"), 1e-9),
        (Section::rectangle(1.0, 1.0).expect("a square"), 5e-6),
        (Section::rectangle(6.0, 1.0).expect("a rectangle"), 5e-6),
        (Section::polygon(triangle).expect("a triangle"), 1e-5),
    ]
}

#[test]
fn what_enters_a_tunnel_leaves_it() {
    for (section, tolerance) in sections() {
        for ratio in [0.05, 0.5, 2.0, 15.0] {
            let depth = ratio * section.least_width();
            let tunnel = Tunnel::new(section.clone(), depth).expect("a possible wall");
            let fine = Rule::new(90);
            let returned = section.outline_over_area()
                * fine.integral(0.0, depth, |x| {
                    section.from_wall(depth - x) * tunnel.exitance(x)
                });
            let sum = tunnel.transmitted() + returned;
            assert!(
                (sum - 1.0).abs() < tolerance,
                "{section:?} {ratio}: {} leaves, {returned} goes back",
                tunnel.transmitted()
            );
        }
    }
}

#[test]
fn every_wall_sends_what_it_gets() {
    // By shells of the walls themselves, the middle rule: second order.
    let section = Section::disc(1.0).expect("a disc");
    let depth = 2.0;
    let tunnel = Tunnel::new(section.clone(), depth).expect("a possible wall");
    let shells = 2000_u32;
    let step = depth / f64::from(shells);
    for place in [200_u32, 1000, 1900] {
        let x = step * f64::from(place);
        let mut gets = section.from_wall(depth - x);
        for shell in 0..shells {
            let (near, far) = if shell < place {
                (f64::from(place - shell - 1), f64::from(place - shell))
            } else {
                (f64::from(shell - place), f64::from(shell + 1 - place))
            };
            let share = section.from_wall(step * near) - section.from_wall(step * far);
            gets += share * tunnel.exitance(step * (f64::from(shell) + 0.5));
        }
        let sends = tunnel.exitance(x);
        assert!(
            (gets - sends).abs() < 1e-6,
            "{x}: gets {gets}, sends {sends}"
        );
    }
}

#[test]
fn more_terms_change_nothing() {
    for (section, tolerance) in sections() {
        for ratio in [0.1, 1.0, 5.0] {
            let depth = ratio * section.least_width();
            let tunnel = Tunnel::new(section.clone(), depth).expect("a possible wall");
            let finer = Tunnel::with_terms(section.clone(), depth, 24).expect("a possible wall");
            let (found, expected) = (tunnel.transmitted(), finer.transmitted());
            assert!(
                (found - expected).abs() < tolerance,
                "{section:?} {ratio}: {found} against {expected}"
            );
            for share in [0.0, 0.2, 0.7, 1.0] {
                let (found, expected) = (
                    tunnel.exitance(share * depth),
                    finer.exitance(share * depth),
                );
                assert!(
                    (found - expected).abs() < 3e-3_f64.min(1e3 * tolerance),
                    "{section:?} {ratio} at {share}: {found} against {expected}"
                );
            }
        }
    }
}

#[test]
fn the_factor_falls_with_depth_and_lies_between_the_bounds() {
    for (section, _) in sections() {
        let mut last = 1.0;
        for ratio in [0.01, 0.03, 0.1, 0.3, 1.0, 3.0, 10.0, 20.0] {
            let depth = ratio * section.least_width();
            let tunnel = Tunnel::new(section.clone(), depth).expect("a possible wall");
            let found = tunnel.transmitted();
            let cold = section.through(depth);
            // One zone for the whole wall lets too much through.
            let one_zone = 0.5 * (1.0 + cold);
            assert!(
                cold < found && found <= one_zone && found < last,
                "{section:?} {ratio}: {found} between {cold} and {one_zone}, after {last}"
            );
            last = found;
        }
    }
}

#[test]
fn the_exitance_rises_inwards_and_is_one_half_in_the_middle() {
    for (section, _) in sections() {
        for ratio in [1e-6, 0.3, 20.0] {
            let depth = ratio * section.least_width();
            let tunnel = Tunnel::new(section.clone(), depth).expect("a possible wall");
            let mut last = 0.0;
            for step in 0..=100_u8 {
                let x = depth * f64::from(step) / 100.0;
                let (found, slope) = (tunnel.exitance(x), tunnel.slope(x));
                assert!(
                    found >= last && slope >= -1e-9,
                    "{section:?} {ratio} at {x}: {found} after {last}, slope {slope}"
                );
                last = found;
            }
            let middle = tunnel.exitance(0.5 * depth);
            assert!(
                (middle - 0.5).abs() < 1e-12,
                "{section:?} {ratio}: {middle}"
            );
        }
    }
}
