//! What is seen past what hides it: against rays, and by what must hold.

use std::f64::consts::{PI, TAU};

use farglow::physics::exposure;
use farglow::physics::region::Region;
use farglow::physics::scene::{Barrier, Looked, Part, Scene};
use farglow::physics::view::View;
use glam::{DQuat, DVec3};
use proptest::prelude::*;

use crate::rays::agrees_with_rays;
use crate::view_factor_laws::{config, heading, place, region, turned};

/// Parts that are all seen from anywhere.
fn bare(regions: &[Region]) -> Vec<Part> {
    regions.iter().cloned().map(Part::bare).collect()
}

fn solid(regions: &[Region]) -> Vec<Barrier> {
    regions.iter().cloned().map(Barrier::solid).collect()
}

/// The flux of all that is seen of a part.
fn flux(looked: &Looked, part: usize) -> DVec3 {
    looked
        .of(part)
        .iter()
        .map(|glimpse| glimpse.view.flux())
        .sum()
}

/// The view of a region by itself.
fn alone(region: &Region, point: DVec3) -> Option<View> {
    region.view(point).into_view()
}

/// A point some way off a part, barriers between the two.
fn between(part: &Region, point: DVec3, barriers: Vec<Region>, shares: &[f64]) -> Vec<Region> {
    barriers
        .into_iter()
        .zip(shares)
        .map(|(barrier, share)| {
            let there = point.lerp(part.centre(), *share);
            turned(&barrier, DQuat::IDENTITY, (there - barrier.centre()) * 0.85)
        })
        .collect()
}

prop_compose! {
    fn scene()(
        part in region(),
        others in proptest::collection::vec(region(), 0..3),
        point in place(),
        barriers in proptest::collection::vec(region(), 1..5),
        shares in proptest::collection::vec(0.2..0.9_f64, 5),
        clear in proptest::collection::vec(any::<bool>(), 5),
    ) -> (Vec<Part>, Vec<Barrier>, DVec3) {
        let mut parts = bare(std::slice::from_ref(&part));
        parts.extend(bare(&others));
        let barriers = between(&part, point, barriers, &shares)
            .into_iter()
            .zip(clear)
            .map(|(region, clear)| Barrier { region, clear })
            .collect();
        (parts, barriers, point)
    }
}

proptest! {
    #![proptest_config(config(3000))]

    #[test]
    fn what_is_hidden_and_what_is_seen_make_all((parts, barriers, point) in scene()) {
        // Clear barriers part what is seen; the pieces make up the whole.
        let clear: Vec<Barrier> = barriers.iter().map(|barrier| Barrier::clear(barrier.region.clone())).collect();
        let Ok(scene) = Scene::new(parts[..1].to_vec(), clear) else { return Ok(()) };
        let looked = scene.look(point);
        if let Some(view) = alone(&parts[0].region, point) {
            let (sum, all) = (flux(&looked, 0), view.flux());
            prop_assert!((sum - all).length() <= 1e-11 * all.length() + 1e-14, "{sum} against {all}");
        }
        // Behind solid ones remains what passes none of the clear ones.
        let solid = solid(&barriers.iter().map(|barrier| barrier.region.clone()).collect::<Vec<_>>());
        let hidden = Scene::new(parts[..1].to_vec(), solid).expect("as before").look(point);
        let free: DVec3 = looked.of(0).iter().filter(|glimpse| glimpse.through.is_empty()).map(|glimpse| glimpse.view.flux()).sum();
        let left = flux(&hidden, 0);
        prop_assert!((free - left).length() <= 1e-11, "{free} against {left}");
    }
}

proptest! {
    #![proptest_config(config(60))]

    #[test]
    fn what_is_seen_agrees_with_rays((parts, barriers, point) in scene(), normal in heading()) {
        let Ok(scene) = Scene::new(parts.clone(), barriers.clone()) else { return Ok(()) };
        let looked = scene.look(point);
        prop_assume!(looked.touched_barrier().is_none() && looked.touched().is_none());
        let Some(view) = alone(&parts[0].region, point) else { return Ok(()) };
        let region = &parts[0].region;
        prop_assume!(region.centre().distance(point) > 1.3 * region.bounding_radius());
        prop_assume!(view.flux().length() > 1e-4);
        agrees_with_rays(&parts, &barriers, point, normal, &looked, view.flux().length())?;
    }

    #[test]
    fn what_is_seen_through_a_mouth_agrees_with_rays(
        base in region(), depth in 0.05..1.0_f64, deeper in 0.05..1.0_f64, narrow in 0.4..1.0_f64, wall in any::<bool>(),
        point in place(), normal in heading(), barriers in proptest::collection::vec(region(), 0..3), shares in proptest::collection::vec(0.2..0.7_f64, 3),
    ) {
        let Some(own) = base.normal() else { return Ok(()) };
        prop_assume!(!matches!(base, Region::Plate { .. }));
        // The mouth in front, and behind it a smaller outline that is left out.
        let size = base.bounding_radius();
        let mouth = turned(&base, DQuat::IDENTITY, own * (depth * size));
        let less = match &base {
            Region::Disc { centre, normal, radius } => Region::disc(*centre - own * (deeper * size), *normal, radius * narrow),
            other => {
                let Region::Polygon { vertices, .. } = other else { return Ok(()) };
                let centre = base.centre();
                Region::polygon(vertices.iter().map(|vertex| centre + (*vertex - centre) * narrow - own * (deeper * size)).collect())
            }
        };
        let less = less.expect("smaller and farther back");
        let part = Part { region: base.clone(), through: Some(mouth.clone()), less: wall.then_some(less) };
        let point = if (point - base.centre()).dot(own) < 0.0 { point - own * (2.0 * (point - base.centre()).dot(own)) } else { point };
        prop_assume!(base.centre().distance(point) > 1.3 * size && (point - mouth.centre()).dot(own) > 0.05);
        // Barriers in front of the mouth: within it they would hide the wall.
        let barriers: Vec<Barrier> = between(&mouth, point, barriers, &shares).into_iter()
            .filter(|barrier| (barrier.centre() - mouth.centre()).dot(own) > barrier.bounding_radius())
            .map(Barrier::solid).collect();
        let view = alone(&base, point).expect("in front of it");
        prop_assume!(view.flux().length() > 1e-4);
        let parts = vec![part];
        let scene = Scene::new(parts.clone(), barriers.clone()).expect("flat parts overlap nothing");
        let looked = scene.look(point);
        agrees_with_rays(&parts, &barriers, point, normal, &looked, view.flux().length())?;
    }
}

/// Regions on a lattice, as people draw them: edges in line, in one plane, end
/// to end.
fn lattice_region() -> impl Strategy<Value = Region> {
    let whole = |low: i32, high: i32| (low..=high).prop_map(f64::from);
    let spot = [whole(-2, 2), whole(-2, 2), whole(-2, 2)].prop_map(DVec3::from_array);
    let axis = prop_oneof![
        Just(DVec3::X),
        Just(DVec3::Y),
        Just(DVec3::Z),
        Just(DVec3::NEG_X),
        Just(DVec3::NEG_Y),
        Just(DVec3::NEG_Z)
    ];
    (spot, axis, whole(1, 3), whole(1, 3), 0..6_u8).prop_map(|(spot, axis, wide, high, kind)| {
        let up = if axis.z == 0.0 { DVec3::Z } else { DVec3::X };
        match kind {
            0 => Region::disc(spot, axis, 0.5 * wide),
            1 => Region::sphere(spot, 0.5 * wide),
            2 => Region::cylinder(spot, axis * high, 0.5 * wide),
            3 => Region::plate(spot, axis, up, wide, high),
            4 => Region::outline(
                spot,
                axis,
                up,
                &[
                    [0.0, 0.0],
                    [wide, 0.0],
                    [wide, high],
                    [0.5 * wide, 0.5],
                    [0.0, high],
                ],
            ),
            _ => Region::rectangle(spot, axis, up, wide, high),
        }
        .expect("a possible region")
    })
}

proptest! {
    #![proptest_config(config(4000))]

    #[test]
    fn edges_in_line_leave_no_gap(part in lattice_region(), barriers in proptest::collection::vec(lattice_region(), 1..5), spot in [-6..=6_i32, -6..=6_i32, -6..=6_i32], jitter in place()) {
        let point = DVec3::from_array(spot.map(|at| 0.5 * f64::from(at)));
        let clear: Vec<Barrier> = barriers.iter().cloned().map(Barrier::clear).collect();
        let Ok(scene) = Scene::new(bare(std::slice::from_ref(&part)), clear) else { return Ok(()) };
        let looked = scene.look(point);
        let Some(view) = alone(&part, point) else { return Ok(()) };
        let (sum, all) = (flux(&looked, 0), view.flux());
        prop_assert!((sum - all).length() <= 1e-11, "{sum} against {all}");
        let hidden = Scene::new(bare(std::slice::from_ref(&part)), solid(&barriers)).expect("as before");
        let here = hidden.look(point);
        let free: DVec3 = looked.of(0).iter().filter(|glimpse| glimpse.through.is_empty()).map(|glimpse| glimpse.view.flux()).sum();
        prop_assert!((free - flux(&here, 0)).length() <= 1e-11, "{free} against {}", flux(&here, 0));
        // A hair off everything is nearly the same.
        let there = hidden.look(point + jitter * 1e-9);
        if here.touched_barrier().is_some() || there.touched_barrier().is_some() || there.touched().is_some() {
            return Ok(());
        }
        let (here, there) = (flux(&here, 0), flux(&there, 0));
        prop_assert!((here - there).length() <= 1e-6, "{here} against {there} a hair off");
    }
}

proptest! {
    #![proptest_config(config(1500))]

    #[test]
    fn every_glimpse_gives_a_factor_between_zero_and_one((parts, barriers, point) in scene(), normal in heading()) {
        let Ok(scene) = Scene::new(parts, barriers) else { return Ok(()) };
        let looked = scene.look(point);
        let mut sum = 0.0;
        for glimpse in looked.glimpses() {
            let raw = glimpse.view.clipped_flux(normal).dot(normal);
            prop_assert!((-1e-12..=1.0 + 1e-12).contains(&raw), "{raw}");
            let (front, back, net) = (glimpse.view.factor(normal), glimpse.view.factor(-normal), glimpse.view.flux().dot(normal));
            prop_assert!((front - back - net).abs() < 1e-12, "{front} - {back} against {net}");
            let angle = glimpse.view.solid_angle();
            prop_assert!(front <= angle / PI + 1e-9 && angle <= TAU, "{front} of {angle} sr");
            if glimpse.part == 0 {
                sum += front;
            }
        }
        prop_assert!(sum <= 1.0 + 1e-12, "{sum}");
    }

    #[test]
    fn a_screen_never_raises_a_sources_own_contribution((parts, barriers, point) in scene(), normal in heading()) {
        let bare_parts = parts[..1].to_vec();
        let (Ok(open), Ok(scene)) = (Scene::new(bare_parts, Vec::new()), Scene::new(parts, barriers)) else { return Ok(()) };
        let factor = |looked: &Looked| -> f64 { looked.of(0).iter().map(|glimpse| glimpse.view.factor(normal)).sum() };
        let (all, left) = (factor(&open.look(point)), factor(&scene.look(point)));
        prop_assert!(left <= all + 1e-12, "{left} behind the screens, {all} without");
    }

    #[test]
    fn a_source_that_hides_nothing_lowers_no_position((parts, barriers, point) in scene(), more in region(), normal in heading()) {
        if !matches!(more, Region::Disc { .. } | Region::Polygon { .. }) {
            return Ok(());
        }
        let mut others = parts.clone();
        others.push(Part::bare(more));
        let (Ok(before), Ok(after)) = (Scene::new(parts, barriers.clone()), Scene::new(others, barriers)) else { return Ok(()) };
        let sum = |looked: &Looked| -> f64 { looked.glimpses().iter().map(|glimpse| glimpse.view.factor(normal)).sum() };
        let (before, after) = (sum(&before.look(point)), sum(&after.look(point)));
        prop_assert!(after >= before - 1e-13, "{after} with it, {before} without");
    }

    #[test]
    fn turning_and_moving_a_scene_changes_nothing((parts, barriers, point) in scene(), axis in heading(), angle in 0.0..TAU, shift in place()) {
        let turn = DQuat::from_axis_angle(axis, angle);
        let moved = |region: &Region| turned(region, turn, shift);
        let there_parts: Vec<Part> = parts.iter().map(|part| Part::bare(moved(&part.region))).collect();
        let there_barriers: Vec<Barrier> = barriers.iter().map(|barrier| Barrier { region: moved(&barrier.region), clear: barrier.clear }).collect();
        let mut regions = parts.iter().map(|part| &part.region).chain(barriers.iter().map(|barrier| &barrier.region));
        let bars = regions.any(|region| matches!(region, Region::Cylinder { .. }));
        let (Ok(here), Ok(there)) = (Scene::new(parts.clone(), barriers.clone()), Scene::new(there_parts, there_barriers)) else { return Ok(()) };
        let (here, there) = (here.look(point), there.look(turn * point + shift));
        // A cylinder that pierces a flat source is cut there along a polygon,
        // whose corners turn otherwise.
        let slack = if bars { 1e-7 } else { 1e-10 };
        for part in 0..here.glimpses().iter().map(|glimpse| glimpse.part + 1).max().unwrap_or(0) {
            let (one, other) = (turn * flux(&here, part), flux(&there, part));
            prop_assert!((one - other).length() < slack, "{one} against {other}");
        }
    }

    #[test]
    fn parts_of_a_split_source_add_up_behind_screens((parts, barriers, point) in scene(), share in 0.1..0.9_f64) {
        let Region::Polygon { vertices, .. } = &parts[0].region else { return Ok(()) };
        if vertices.len() != 4 {
            return Ok(());
        }
        let (top, bottom) = (vertices[3].lerp(vertices[2], share), vertices[0].lerp(vertices[1], share));
        let halves = [vec![vertices[0], bottom, top, vertices[3]], vec![bottom, vertices[1], vertices[2], top]];
        let split: Vec<Region> = halves.into_iter().map(|half| Region::polygon(half).expect("half a rectangle")).collect();
        let mut others = bare(&split);
        others.extend(parts[1..].to_vec());
        let (Ok(whole), Ok(split)) = (Scene::new(parts, barriers.clone()), Scene::new(others, barriers.clone())) else { return Ok(()) };
        // As above; and a bar may pierce the whole, but one half only.
        let bars = barriers.iter().any(|barrier| matches!(barrier.region, Region::Cylinder { .. }));
        let slack = if bars { 1e-7 } else { 1e-12 };
        let (whole, split) = (whole.look(point), split.look(point));
        let (all, sum) = (flux(&whole, 0), flux(&split, 0) + flux(&split, 1));
        prop_assert!((all - sum).length() < slack, "{all} against {sum}");
    }

    #[test]
    fn no_orientation_beats_the_strongest_behind_screens((parts, barriers, point) in scene(), tries in proptest::collection::vec(heading(), 20), weights in proptest::collection::vec(0.1..10.0_f64, 4)) {
        let Ok(scene) = Scene::new(parts, barriers) else { return Ok(()) };
        let looked = scene.look(point);
        let views: Vec<View> = looked.glimpses().iter().map(|glimpse| glimpse.view.clone()).collect();
        let weights: Vec<f64> = looked.glimpses().iter().map(|glimpse| weights[glimpse.part % 4]).collect();
        let (found, normal) = exposure::strongest(&views, &weights);
        let here = exposure::facing(&views, &weights, normal);
        prop_assert!((found - here).abs() <= 1e-12 * found.max(1.0), "said {found}, is {here}");
        for normal in tries {
            let tried = exposure::facing(&views, &weights, normal);
            prop_assert!(tried <= found * (1.0 + 1e-12) + 1e-13, "{tried} above {found}");
        }
    }

    #[test]
    fn no_scene_whatever_gives_a_nan((parts, barriers, point) in scene(), scale in -6..7_i32, far in -3..12_i32, normal in heading()) {
        let size = 10_f64.powi(scale);
        let sized = |region: &Region| match region {
            Region::Disc { centre, normal, radius } => Region::disc(*centre * size, *normal, radius * size),
            Region::Polygon { vertices, .. } => Region::polygon(vertices.iter().map(|vertex| *vertex * size).collect()),
            Region::Sphere { centre, radius } => Region::sphere(*centre * size, radius * size),
            Region::Cylinder { base, axis, radius } => Region::cylinder(*base * size, *axis * size, radius * size),
            Region::Plate { vertices, normal } => Ok(Region::Plate { vertices: vertices.iter().map(|vertex| *vertex * size).collect(), normal: *normal }),
        };
        let parts: Result<Vec<Part>, _> = parts.iter().map(|part| sized(&part.region).map(Part::bare)).collect();
        let barriers: Result<Vec<Barrier>, _> = barriers.iter().map(|barrier| sized(&barrier.region).map(|region| Barrier { region, clear: barrier.clear })).collect();
        let (Ok(parts), Ok(barriers)) = (parts, barriers) else { return Ok(()) };
        let Ok(scene) = Scene::new(parts.clone(), barriers) else { return Ok(()) };
        let near = parts[0].region.centre();
        for point in [point * size, point * size * 10_f64.powi(far), near + normal * size * 10_f64.powi(-far), near, DVec3::splat(1e300), point * f64::NAN] {
            let looked = scene.look(point);
            for glimpse in looked.glimpses() {
                let (factor, flux, angle) = (glimpse.view.factor(normal), glimpse.view.clipped_flux(normal), glimpse.view.solid_angle());
                prop_assert!((0.0..=1.0).contains(&factor) && flux.is_finite() && angle.is_finite(), "{factor} {flux} {angle}");
            }
        }
    }
}

/// What the first of two plates sends to the second and the second to the first
/// past a screen: A₁F₁₂ = A₂F₂₁, each by a sum over points of the one.
#[test]
fn reciprocity_holds_past_a_screen() {
    let first = Region::rectangle(DVec3::ZERO, DVec3::Y, DVec3::Z, 1.0, 0.8).expect("a plate");
    let second = Region::rectangle(
        DVec3::new(0.4, 2.0, 0.3),
        DVec3::new(-0.2, -1.0, 0.1),
        DVec3::Z,
        0.7,
        1.2,
    )
    .expect("a plate");
    let screens = [
        Region::disc(DVec3::new(0.1, 1.0, 0.2), DVec3::new(0.1, 1.0, 0.3), 0.35).expect("a disc"),
        Region::cylinder(DVec3::new(0.6, 0.7, -1.0), DVec3::Z * 2.0, 0.1).expect("a bar"),
    ];
    let sent = |from: &Region, to: &Region| -> f64 {
        let scene = Scene::new(bare(std::slice::from_ref(from)), solid(&screens))
            .expect("clear of each other");
        let Region::Polygon { vertices, normal } = to else {
            panic!("a rectangle")
        };
        let count = 200_u32;
        let mut sum = 0.0;
        for row in 0..count {
            for column in 0..count {
                let (u, v) = (
                    (f64::from(row) + 0.5) / f64::from(count),
                    (f64::from(column) + 0.5) / f64::from(count),
                );
                let point =
                    vertices[0] + (vertices[1] - vertices[0]) * u + (vertices[3] - vertices[0]) * v;
                sum += scene
                    .look(point)
                    .of(0)
                    .iter()
                    .map(|glimpse| glimpse.view.factor(*normal))
                    .sum::<f64>();
            }
        }
        sum * to.area() / f64::from(count * count)
    };
    let (there, back) = (sent(&first, &second), sent(&second, &first));
    assert!(
        (there / back - 1.0).abs() < 1e-4 && there > 0.01,
        "{there} against {back}"
    );
}
