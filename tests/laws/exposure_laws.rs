//! The strongest orientation is the strongest.

use farglow::physics::exposure::{facing, strongest};
use farglow::physics::region::Region;
use farglow::physics::view::{Sight, View};
use glam::DVec3;
use proptest::prelude::*;

use crate::view_factor_laws::{config, heading, place, region};

/// A net of directions, evenly over the sphere (golden spiral).
fn net(count: u32) -> impl Iterator<Item = DVec3> {
    let golden = std::f64::consts::PI * (3.0 - 5.0_f64.sqrt());
    (0..count).map(move |index| {
        let z = 1.0 - (2.0 * f64::from(index) + 1.0) / f64::from(count);
        let (across, angle) = ((1.0 - z * z).sqrt(), golden * f64::from(index));
        DVec3::new(across * angle.cos(), across * angle.sin(), z)
    })
}

/// The best of a dense net, then closed in on by ever smaller steps.
fn by_force(views: &[View], weights: &[f64]) -> f64 {
    let value = |normal: DVec3| facing(views, weights, normal);
    let mut tried: Vec<(f64, DVec3)> = net(3000).map(|normal| (value(normal), normal)).collect();
    tried.sort_by(|one, other| other.0.total_cmp(&one.0));
    let mut most: f64 = 0.0;
    for (start, normal) in tried.into_iter().take(12) {
        let (mut best, mut at, mut step) = (start, normal, 0.04);
        while step > 1e-9 {
            let (right, up) = at.any_orthonormal_pair();
            let better = [right, -right, up, -up]
                .map(|way| (at + way * step).normalize())
                .into_iter()
                .map(|normal| (value(normal), normal))
                .find(|found| found.0 > best);
            match better {
                Some(found) => (best, at) = found,
                None => step *= 0.5,
            }
        }
        most = most.max(best);
    }
    most
}

fn views(regions: &[Region], point: DVec3) -> Option<Vec<View>> {
    regions
        .iter()
        .map(|region| region.view(point).into_view())
        .collect()
}

proptest! {
    #![proptest_config(config(120))]

    #[test]
    fn strongest_is_the_best_of_a_dense_search(regions in proptest::collection::vec(region(), 1..6), weights in proptest::collection::vec(0.1..10.0_f64, 6), point in place()) {
        let Some(views) = views(&regions, point) else { return Ok(()) };
        let (found, normal) = strongest(&views, &weights);
        let here = facing(&views, &weights, normal);
        prop_assert!((found - here).abs() <= 1e-12 * found.max(1.0), "said {found}, is {here}");
        let tried = by_force(&views, &weights);
        prop_assert!(found >= tried * (1.0 - 1e-9), "found {found}, by force {tried}");
        prop_assert!(found <= tried * (1.0 + 1e-7) + 1e-300, "found {found}, by force only {tried}");
    }
}

proptest! {
    #![proptest_config(config(1000))]

    #[test]
    fn no_orientation_passes_a_views_ceiling(region in region(), point in place(), tries in proptest::collection::vec(heading(), 40)) {
        let Some(view) = region.view(point).into_view() else { return Ok(()) };
        let ceiling = view.ceiling();
        prop_assert!((0.0..=1.0).contains(&ceiling), "{ceiling}");
        for normal in tries.into_iter().chain([view.flux()]) {
            let factor = view.factor(normal);
            prop_assert!(factor <= ceiling * (1.0 + 1e-12) + 1e-13, "{normal}: {factor} above {ceiling}");
        }
    }

    #[test]
    fn no_orientation_beats_the_strongest(regions in proptest::collection::vec(region(), 1..9), weights in proptest::collection::vec(0.0..10.0_f64, 9), point in place(), tries in proptest::collection::vec(heading(), 20)) {
        let Some(views) = views(&regions, point) else { return Ok(()) };
        let (found, normal) = strongest(&views, &weights);
        prop_assert!(found.is_finite() && (normal.length() - 1.0).abs() < 1e-12, "{found} {normal}");
        for normal in tries {
            let tried = facing(&views, &weights, normal);
            prop_assert!(tried <= found * (1.0 + 1e-12), "{tried} above {found}");
        }
    }

    #[test]
    fn order_of_the_sources_does_not_change_the_value(regions in proptest::collection::vec(region(), 1..6), weights in proptest::collection::vec(0.1..10.0_f64, 6), point in place()) {
        let Some(mut seen) = views(&regions, point) else { return Ok(()) };
        let (found, _) = strongest(&seen, &weights);
        seen.reverse();
        let turned: Vec<f64> = weights[..seen.len()].iter().rev().copied().collect();
        let (other, _) = strongest(&seen, &turned);
        prop_assert!((found - other).abs() <= 1e-9 * found, "{found} against {other}");
    }
}

/// Two equal doors left and right of a person: facing one is best, and of the
/// two the first.
#[test]
fn between_two_doors_the_person_faces_the_first() {
    let door = |side: f64| {
        Region::rectangle(DVec3::X * side * 3.0, DVec3::X * -side, DVec3::Z, 0.9, 0.7)
            .expect("a door")
    };
    for (first, second) in [(1.0, -1.0), (-1.0, 1.0)] {
        let views = views(&[door(first), door(second)], DVec3::ZERO).expect("between the doors");
        let (found, normal) = strongest(&views, &[1.0, 1.0]);
        let expected = views[0].factor(DVec3::X * first);
        assert!(
            (found / expected - 1.0).abs() < 1e-12,
            "{found} against {expected}"
        );
        assert!(normal.dot(DVec3::X * first) > 1.0 - 1e-12, "{normal}");
    }
    // The stronger one wins wherever it stands.
    let both = views(&[door(1.0), door(-1.0)], DVec3::ZERO).expect("between the doors");
    let (_, normal) = strongest(&both, &[1.0, 1.5]);
    assert!(normal.x < -1.0 + 1e-12, "{normal}");
}

/// Sources at one height all round: every half plane of them is tried.
#[test]
fn sources_at_one_height_are_parted_rightly() {
    for count in 3..11_u32 {
        let regions: Vec<Region> = (0..count)
            .map(|index| {
                let angle = std::f64::consts::TAU * f64::from(index * index) / 37.0;
                let way = DVec3::new(angle.cos(), angle.sin(), 0.0);
                Region::disc(way * 4.0, -way, 0.2 + 0.03 * f64::from(index)).expect("a disc")
            })
            .collect();
        let views = views(&regions, DVec3::ZERO).expect("amid the sources");
        let weights: Vec<f64> = (0..count)
            .map(|index| 1.0 + f64::from(index * 7 % 5))
            .collect();
        let (found, _) = strongest(&views, &weights);
        let tried = by_force(&views, &weights);
        assert!(
            found >= tried * (1.0 - 1e-9),
            "{count} sources: found {found}, by force {tried}"
        );
    }
}

/// Nothing seen, no weight, or a weight that cannot be: zero, and a direction.
#[test]
fn nothing_to_face_is_no_irradiance() {
    let door = Region::disc(DVec3::X, DVec3::NEG_X, 0.5).expect("a disc");
    let Sight::Seen(view) = door.view(DVec3::ZERO) else {
        panic!("the disc is seen")
    };
    assert_eq!(strongest(&[], &[]), (0.0, DVec3::Z));
    assert_eq!(strongest(&[View::EMPTY], &[1e5]), (0.0, DVec3::Z));
    for weight in [0.0, -1.0, f64::NAN, f64::INFINITY] {
        assert_eq!(
            strongest(std::slice::from_ref(&view), &[weight]),
            (0.0, DVec3::Z),
            "weight {weight}"
        );
    }
    let (large, _) = strongest(&[view], &[1e308]);
    assert!(large.is_finite() && large > 1e307, "{large}");
}
