use std::f64::consts::PI;

use super::*;
use crate::physics::view::View;
use glam::DVec3;

fn at(x: f64, y: f64, z: f64) -> DVec3 {
    DVec3::new(x, y, z)
}

/// A square door of 2 m in the plane y = 0, facing +y.
fn door() -> Region {
    upright(0.0, 0.0, 0.0, 2.0, 2.0)
}

/// An upright rectangle facing +y, by the middle of it.
fn upright(x: f64, y: f64, z: f64, width: f64, height: f64) -> Region {
    Region::rectangle(at(x, y, z), DVec3::Y, DVec3::Z, width, height).expect("a rectangle")
}

fn round(y: f64, radius: f64) -> Region {
    Region::disc(DVec3::Y * y, DVec3::Y, radius).expect("a disc")
}

fn look(part: Region, barriers: Vec<Region>, point: DVec3) -> Looked {
    let barriers = barriers.into_iter().map(Barrier::solid).collect();
    Scene::new(vec![Part::bare(part)], barriers)
        .expect("a possible scene")
        .look(point)
}

fn flux(looked: &Looked, part: usize) -> DVec3 {
    let glimpses = looked.of(part).iter();
    glimpses.map(|glimpse| glimpse.view.flux()).sum()
}

fn alone(region: &Region, point: DVec3) -> DVec3 {
    region.view(point).into_view().unwrap_or(View::EMPTY).flux()
}

/// Of each scene what is seen must be what other regions show unobstructed:
/// the first less the second, or nothing, exactly.
#[test]
fn what_remains_is_what_other_regions_show() {
    let eye = at(0.0, 4.0, 0.0);
    let far_side = |region: Region| Some((region, None));
    let cases: Vec<(
        &str,
        Region,
        Vec<Region>,
        DVec3,
        Option<(Region, Option<Region>)>,
    )> = vec![
        (
            "a screen that exactly covers",
            door(),
            vec![upright(0.0, 2.0, 0.0, 1.0, 1.0)],
            eye,
            None,
        ),
        (
            "the same as a plate",
            door(),
            vec![Region::plate(DVec3::Y * 2.0, DVec3::NEG_Y, DVec3::Z, 1.0, 1.0).expect("a plate")],
            eye,
            None,
        ),
        (
            "a screen larger than the source",
            door(),
            vec![upright(0.3, 2.0, 0.1, 5.0, 7.0)],
            eye,
            None,
        ),
        (
            "a screen up to half, edges in line",
            door(),
            vec![upright(0.0, 2.0, -0.25, 1.0, 0.5)],
            eye,
            far_side(upright(0.0, 0.0, 0.5, 2.0, 1.0)),
        ),
        (
            "two screens end to end",
            door(),
            vec![
                upright(0.0, 2.0, -0.25, 1.0, 0.5),
                upright(0.0, 2.0, 0.25, 1.0, 0.5),
            ],
            eye,
            None,
        ),
        (
            "two screens that overlap",
            door(),
            vec![
                upright(0.0, 2.0, -0.2, 1.0, 0.8),
                upright(0.0, 2.0, 0.25, 1.0, 0.5),
            ],
            eye,
            None,
        ),
        (
            "one screen twice",
            door(),
            vec![
                upright(0.0, 2.0, -0.25, 1.0, 0.5),
                upright(0.0, 2.0, -0.25, 1.0, 0.5),
            ],
            eye,
            far_side(upright(0.0, 0.0, 0.5, 2.0, 1.0)),
        ),
        (
            "one behind the other",
            door(),
            vec![
                upright(0.0, 2.0, -0.25, 1.0, 0.5),
                upright(0.0, 3.0, -0.125, 0.5, 0.25),
            ],
            eye,
            far_side(upright(0.0, 0.0, 0.5, 2.0, 1.0)),
        ),
        (
            "a hole cut in the middle",
            door(),
            vec![upright(0.0, 2.0, 0.0, 0.25, 0.25)],
            eye,
            Some((door(), Some(upright(0.0, 0.0, 0.0, 0.5, 0.5)))),
        ),
        (
            "a screen behind the source",
            door(),
            vec![upright(0.0, -1.0, 0.0, 9.0, 9.0)],
            eye,
            far_side(door()),
        ),
        (
            "a screen behind the person",
            door(),
            vec![upright(0.0, 5.0, 0.0, 9.0, 9.0)],
            eye,
            far_side(door()),
        ),
        (
            "a screen beside",
            door(),
            vec![upright(9.0, 2.0, 0.0, 1.0, 1.0)],
            eye,
            far_side(door()),
        ),
        (
            "a screen edge on",
            door(),
            vec![Region::rectangle(DVec3::Y * 2.0, DVec3::X, DVec3::Z, 1.0, 1.0).expect("a plate")],
            eye,
            far_side(door()),
        ),
        (
            "a screen in the person's plane",
            door(),
            vec![upright(3.0, 4.0, 0.0, 2.0, 2.0)],
            eye,
            far_side(door()),
        ),
        (
            "a screen from before to behind the person",
            door(),
            vec![
                Region::rectangle(at(0.0, 4.0, -0.5), DVec3::Z, DVec3::Y, 20.0, 7.9)
                    .expect("a plate"),
            ],
            eye,
            far_side(upright(0.0, 0.0, 0.5 - 1.0 / 3.95, 2.0, 1.0 + 2.0 / 3.95)),
        ),
        (
            "a panel in the door's own plane",
            door(),
            vec![upright(0.0, 0.0, -1.0, 4.0, 2.0)],
            eye,
            far_side(upright(0.0, 0.0, 0.5, 2.0, 1.0)),
        ),
        ("its own face", door(), vec![door()], eye, far_side(door())),
        (
            "a screen through the source's plane",
            door(),
            vec![Region::rectangle(DVec3::ZERO, DVec3::Z, DVec3::Y, 9.0, 1.0).expect("a plate")],
            at(0.0, 4.0, 1.0),
            Some((door(), Some(upright(0.0, 0.0, -1.0 / 14.0, 2.0, 1.0 / 7.0)))),
        ),
        (
            "a disc past a smaller one",
            round(0.0, 1.0),
            vec![round(2.0, 0.25)],
            eye,
            Some((round(0.0, 1.0), Some(round(0.0, 0.5)))),
        ),
        (
            "a disc past one that just covers it",
            round(0.0, 1.0),
            vec![round(2.0, 0.5)],
            eye,
            None,
        ),
        (
            "a disc past a ball that just covers it",
            round(0.0, 1.0),
            vec![Region::sphere(DVec3::Y * 2.0, 2.0 / 17_f64.sqrt()).expect("a ball")],
            eye,
            None,
        ),
        (
            "a ball past a ball",
            Region::sphere(DVec3::ZERO, 1.0).expect("a ball"),
            vec![Region::sphere(DVec3::Y * 2.0, 0.25).expect("a ball")],
            eye,
            Some((
                Region::sphere(DVec3::ZERO, 1.0).expect("a ball"),
                Some(Region::sphere(DVec3::ZERO, 0.5).expect("a ball")),
            )),
        ),
        (
            "a door behind a column of its width",
            door(),
            vec![Region::cylinder(at(0.0, 1.5, -9.0), DVec3::Z * 18.0, 0.7).expect("a column")],
            eye,
            None,
        ),
        (
            "a door behind a barrel seen end on",
            door(),
            vec![Region::cylinder(at(0.0, 1.0, 0.0), DVec3::Y, 0.25).expect("a barrel")],
            eye,
            Some((door(), Some(round(0.0, 0.5)))),
        ),
    ];
    for (name, part, barriers, point, remains) in cases {
        let looked = look(part, barriers, point);
        let found = flux(&looked, 0);
        match remains {
            None => {
                assert!(looked.of(0).is_empty(), "{name}: {found} is still seen");
                assert_eq!(looked.stance(0), Stance::InFront, "{name}");
            }
            Some((whole, less)) => {
                let expected =
                    alone(&whole, point) - less.map_or(DVec3::ZERO, |less| alone(&less, point));
                assert!(
                    (found - expected).length() < 1e-14,
                    "{name}: {found} against {expected}"
                );
            }
        }
    }
}

/// Nine tiles hide a door exactly; without one of them its square shows.
#[test]
fn tiles_end_to_end_leave_no_crack() {
    let eye = at(0.3, 4.0, -0.2);
    // Seen from the eye the tiles at half way tile the door.
    let tile = |index: u32| {
        let (x, z) = (f64::from(index % 3) - 1.0, f64::from(index / 3) - 1.0);
        let there = at(x * 2.0 / 3.0, 0.0, z * 2.0 / 3.0);
        let here = there.lerp(eye, 0.5);
        upright(here.x, here.y, here.z, 1.0 / 3.0, 1.0 / 3.0)
    };
    let tiles: Vec<Region> = (0..9).map(tile).collect();
    let all = look(door(), tiles.clone(), eye);
    assert!(
        all.of(0).is_empty(),
        "{} of {}",
        flux(&all, 0),
        alone(&door(), eye)
    );
    for missing in 0..9_usize {
        let mut some = tiles.clone();
        let _ = some.remove(missing);
        let (x, z) = (
            f64::from(missing as u32 % 3) - 1.0,
            f64::from(missing as u32 / 3) - 1.0,
        );
        let hole = upright(x * 2.0 / 3.0, 0.0, z * 2.0 / 3.0, 2.0 / 3.0, 2.0 / 3.0);
        let (found, expected) = (flux(&look(door(), some, eye), 0), alone(&hole, eye));
        assert!(
            (found - expected).length() < 1e-13,
            "{missing}: {found} against {expected}"
        );
    }
}

/// As a screen slides over a door what is seen changes by little at a time.
#[test]
fn nothing_jumps_as_a_shadow_comes_and_goes() {
    let eye = at(0.1, 4.0, 0.05);
    for part in [
        door(),
        round(0.0, 1.0),
        Region::sphere(DVec3::ZERO, 1.0).expect("a ball"),
    ] {
        for screen in [
            upright(0.0, 2.0, 0.0, 0.6, 0.5),
            round(2.0, 0.3),
            Region::sphere(DVec3::Y * 2.0, 0.3).expect("a ball"),
            Region::cylinder(at(0.0, 2.0, -0.4), at(0.2, 0.1, 0.8), 0.2).expect("a bar"),
        ] {
            let mut last = alone(&part, eye);
            let whole = last.length();
            for step in 0..=4000_u32 {
                let shift = DVec3::X * (f64::from(step) * 5e-4 - 1.0);
                let now = flux(&look(part.clone(), vec![moved(&screen, shift)], eye), 0);
                let jump = (now - last).length();
                assert!(jump < 3e-3 * whole, "{jump} of {whole} at {}", shift.x);
                last = now;
            }
            assert!(
                (last - alone(&part, eye)).length() < 1e-14,
                "off again: {last}"
            );
        }
    }
}

fn moved(region: &Region, shift: DVec3) -> Region {
    match region.clone() {
        Region::Disc {
            centre,
            normal,
            radius,
        } => Region::Disc {
            centre: centre + shift,
            normal,
            radius,
        },
        Region::Polygon { vertices, normal } => Region::Polygon {
            vertices: vertices.into_iter().map(|vertex| vertex + shift).collect(),
            normal,
        },
        Region::Plate { vertices, normal } => Region::Plate {
            vertices: vertices.into_iter().map(|vertex| vertex + shift).collect(),
            normal,
        },
        Region::Sphere { centre, radius } => Region::Sphere {
            centre: centre + shift,
            radius,
        },
        Region::Cylinder { base, axis, radius } => Region::Cylinder {
            base: base + shift,
            axis,
            radius,
        },
    }
}

/// A tunnel in zones: what is seen of the walls and of the far end is what the
/// mouth shows.
#[test]
fn a_tunnel_fills_its_mouth() {
    let edge = |round: bool, depth: f64| {
        if round {
            self::round(-depth, 0.5)
        } else {
            upright(0.0, -depth, 0.0, 1.0, 0.8)
        }
    };
    for is_round in [true, false] {
        let mouth = edge(is_round, 0.0);
        let depths = [0.0, 0.1, 0.25, 0.5, 1.0];
        let mut parts: Vec<Part> = depths
            .windows(2)
            .map(|zone| Part {
                region: edge(is_round, zone[0]),
                through: Some(mouth.clone()),
                less: Some(edge(is_round, zone[1])),
            })
            .collect();
        parts.push(Part {
            region: edge(is_round, 1.0),
            through: Some(mouth.clone()),
            less: None,
        });
        let scene = Scene::new(parts, Vec::new()).expect("a tunnel");
        for point in [
            at(0.0, 2.0, 0.0),
            at(0.2, 1.0, -0.1),
            at(1.5, 0.7, 0.4),
            at(-4.0, 0.01, 2.0),
            at(0.5, 3.0, 0.4),
        ] {
            let looked = scene.look(point);
            let sum: DVec3 = (0..depths.len()).map(|part| flux(&looked, part)).sum();
            let all = alone(&mouth, point);
            assert!((sum - all).length() < 1e-14, "{point}: {sum} against {all}");
        }
        // On the axis the far end is all of its disc that the mouth lets by.
        let looked = scene.look(at(0.0, 1.0, 0.0));
        let (found, expected) = (
            flux(&looked, depths.len() - 1),
            alone(&edge(is_round, 1.0), DVec3::Y),
        );
        assert!(
            (found - expected).length() < 1e-15,
            "{found} against {expected}"
        );
        assert_eq!(looked.stance(0), Stance::InFront);
        // Within the tunnel nothing can be said; behind the wall nothing is seen.
        assert_eq!(scene.look(at(0.0, -0.3, 0.0)).stance(4), Stance::Touching);
        assert_eq!(scene.look(at(3.0, -0.3, 0.0)).stance(4), Stance::Behind);
    }
}

/// A stream into a pool hides the metal and the wall behind it, also below the
/// rim; and the two with the stream's shadow make up the rim.
#[test]
fn a_stream_hides_metal_and_wall_below_the_rim() {
    let level = |z: f64| Region::disc(DVec3::Z * z, DVec3::Z, 1.0).expect("a level");
    let stream = Region::cylinder(at(0.0, 0.0, -0.5), DVec3::Z * 3.0, 0.1).expect("a stream");
    let parts = vec![
        Part {
            region: level(-0.5),
            through: Some(level(0.0)),
            less: None,
        },
        Part {
            region: level(0.0),
            through: None,
            less: Some(level(-0.5)),
        },
        Part::bare(stream.clone()),
    ];
    let scene = Scene::new(parts, Vec::new()).expect("a ladle");
    let point = at(3.0, 0.0, 1.5);
    let looked = scene.look(point);
    let pool = flux(&looked, 0) + flux(&looked, 1);
    // By the rim alone, with all of the stream before it.
    let bar = Region::cylinder(at(0.0, 0.0, -0.5), DVec3::Z * 3.0, 0.1).expect("a bar");
    let behind = Scene::new(
        vec![Part {
            less: None,
            ..Part::bare(level(0.0))
        }],
        vec![Barrier::clear(bar)],
    )
    .expect("a rim");
    let past = behind.look(point);
    let free: DVec3 = past
        .of(0)
        .iter()
        .filter(|glimpse| glimpse.through.is_empty())
        .map(|glimpse| glimpse.view.flux())
        .sum();
    // The foot of the stream below the rim hides some more of it.
    assert!(
        pool.length() < free.length() - 1e-6,
        "{pool} against {free}"
    );
    let all = alone(&level(0.0), point).length();
    assert!(pool.length() > 0.8 * all, "{pool} of {all}");
    assert_eq!(looked.of(2).len(), 1);
}

#[test]
fn clear_barriers_part_what_is_seen() {
    let barriers = vec![
        Barrier::clear(upright(-0.25, 2.0, 0.0, 0.5, 1.0)),
        Barrier::solid(upright(0.0, 2.5, 5.0, 1.0, 1.0)),
        Barrier::clear(upright(0.0, 3.0, -0.125, 0.5, 0.25)),
    ];
    let scene = Scene::new(vec![Part::bare(door())], barriers).expect("a possible scene");
    let looked = scene.look(DVec3::Y * 4.0);
    let quarter = |x: f64, z: f64| alone(&upright(x, 0.0, z, 1.0, 1.0), DVec3::Y * 4.0);
    let expected: [(&[u16], DVec3); 4] = [
        (&[], quarter(0.5, 0.5)),
        (&[0], quarter(-0.5, 0.5)),
        (&[0, 2], quarter(-0.5, -0.5)),
        (&[2], quarter(0.5, -0.5)),
    ];
    assert_eq!(looked.glimpses().len(), 4);
    for (glimpse, (through, flux)) in looked.glimpses().iter().zip(expected) {
        assert_eq!(&*glimpse.through, through);
        let found = glimpse.view.flux();
        assert!(
            (found - flux).length() < 1e-15,
            "{through:?}: {found} against {flux}"
        );
    }
}

#[test]
fn places_that_touch_are_said() {
    let scene = Scene::new(
        vec![Part::bare(door())],
        vec![Barrier::solid(upright(0.0, 2.0, 0.0, 1.0, 1.0))],
    )
    .expect("a possible scene");
    let on_screen = scene.look(at(0.2, 2.0, 0.1));
    assert_eq!(on_screen.touched_barrier(), Some(0));
    let (found, all) = (flux(&on_screen, 0), alone(&door(), at(0.2, 2.0, 0.1)));
    assert_eq!(found, all, "a screen that is touched hides nothing");
    assert_eq!(scene.look(at(0.2, 0.0, 0.1)).touched(), Some(0));
    assert_eq!(scene.look(at(0.2, -1.0, 0.1)).stance(0), Stance::Behind);
    assert_eq!(scene.look(DVec3::NAN).touched(), Some(0));
    assert_eq!(scene.look(at(0.0, 4.0, 0.0)).touched_barrier(), None);
    assert_eq!(
        (
            scene.look(DVec3::Y).stance(7),
            scene.look(DVec3::Y).of(7).len()
        ),
        (Stance::Behind, 0)
    );
}

#[test]
fn impossible_scenes_are_refused_by_place() {
    let ball =
        |x: f64, radius: f64| Part::bare(Region::sphere(DVec3::X * x, radius).expect("a ball"));
    let cases = [
        (
            Scene::new(
                vec![ball(0.0, 1.0), ball(5.0, 1.0), ball(1.5, 1.0)],
                Vec::new(),
            ),
            "bodies that emit must lie apart, found parts 1 and 3 overlapping; move them apart",
        ),
        (
            Scene::new(
                vec![ball(0.0, 1.0)],
                vec![
                    Barrier::solid(upright(0.0, 5.0, 0.0, 1.0, 1.0)),
                    Barrier::solid(upright(0.0, 0.2, 0.0, 1.0, 1.0)),
                ],
            ),
            "a barrier must lie clear of what emits, found barrier 2 overlapping part 1; move one of them",
        ),
        (
            Scene::new(
                vec![Part::bare(door())],
                vec![
                    Barrier::solid(door()),
                    Barrier::solid(upright(1.0, 0.0, 0.0, 1.0, 1.0)),
                ],
            ),
            "a barrier must lie clear of what emits, found barrier 2 overlapping part 1; move one of them",
        ),
        (
            Scene::new(
                vec![Part {
                    through: Some(Region::sphere(DVec3::ZERO, 1.0).expect("a ball")),
                    ..Part::bare(door())
                }],
                Vec::new(),
            ),
            "a part must be seen through a disc or a polygon, found a body for part 1",
        ),
        (
            Scene::new(
                vec![Part::bare(Region::Sphere {
                    centre: DVec3::ZERO,
                    radius: f64::NAN,
                })],
                Vec::new(),
            ),
            "radius must be from 10⁻⁹ m to 10⁹ m, found NaN",
        ),
    ];
    for (made, expected) in cases {
        let found = made.err().map(|error| error.to_string());
        assert_eq!(found.as_deref(), Some(expected));
    }
    // What only touches is no fault: a ball on a plate, a ball against a ball.
    let plate = Region::rectangle(DVec3::NEG_Z, DVec3::Z, DVec3::X, 3.0, 3.0).expect("a plate");
    let touching = Scene::new(
        vec![ball(0.0, 1.0), ball(2.0, 1.0)],
        vec![Barrier::solid(plate)],
    )
    .expect("touching only");
    // From below, at the plate's edge, the plate hides what of the balls it covers.
    let looked = touching.look(at(0.0, 0.0, -3.0));
    assert!(looked.of(0).is_empty(), "under the plate");
    assert!(
        PI > looked
            .of(1)
            .iter()
            .map(|glimpse| glimpse.view.solid_angle())
            .sum::<f64>()
    );
}

#[test]
fn regions_overlap_where_they_have_more_in_common_than_touching() {
    let ball = |x: f64| Region::sphere(DVec3::X * x, 1.0).expect("a ball");
    let bar = |x: f64| Region::cylinder(at(x, 0.0, -1.0), DVec3::Z * 2.0, 0.5).expect("a bar");
    let dented = || {
        let points = [
            [-1.0, -1.0],
            [1.0, -1.0],
            [1.0, 1.0],
            [0.0, -0.5],
            [-1.0, 1.0],
        ];
        Region::outline(DVec3::ZERO, DVec3::Y, DVec3::Z, &points).expect("a dented plate")
    };
    let floor =
        |z: f64| Region::rectangle(DVec3::Z * z, DVec3::Z, DVec3::X, 4.0, 4.0).expect("a floor");
    for (name, one, other, expected) in [
        ("balls that touch", ball(0.0), ball(2.0), false),
        ("balls that overlap", ball(0.0), ball(1.99), true),
        ("a ball beside a bar", ball(0.0), bar(1.6), false),
        ("a ball into a bar", ball(0.0), bar(1.4), true),
        ("a bar on a floor", bar(0.0), floor(-1.0), false),
        ("a bar through a floor", bar(0.0), floor(-0.9), true),
        (
            "doors side by side",
            upright(0.0, 0.0, 0.0, 1.0, 1.0),
            upright(1.0, 0.0, 0.0, 1.0, 1.0),
            false,
        ),
        (
            "doors that overlap",
            upright(0.0, 0.0, 0.0, 1.0, 1.0),
            upright(0.9, 0.0, 0.3, 1.0, 1.0),
            true,
        ),
        (
            "doors one behind the other",
            upright(0.0, 0.0, 0.0, 1.0, 1.0),
            upright(0.0, 0.001, 0.0, 1.0, 1.0),
            false,
        ),
        (
            "plates that cross",
            door(),
            Region::rectangle(DVec3::ZERO, DVec3::X, DVec3::Z, 1.0, 1.0).expect("a plate"),
            true,
        ),
        (
            "a ball in a dent",
            Region::sphere(at(0.0, 0.0, 0.8), 0.3).expect("a ball"),
            dented(),
            false,
        ),
        (
            "a ball in the plate",
            Region::sphere(at(0.0, 0.0, -0.5), 0.3).expect("a ball"),
            dented(),
            true,
        ),
        ("a disc in a disc", round(0.0, 1.0), round(0.0, 0.2), true),
        ("a disc in a ball", round(0.1, 0.2), ball(0.0), true),
    ] {
        assert_eq!(overlap(&one, &other), expected, "{name}");
        assert_eq!(
            overlap(&other, &one),
            expected,
            "{name}, the other way round"
        );
    }
}

/// A plate with a dent round a ball, part of it before the ball and part behind.
#[test]
fn a_plate_with_a_dent_round_a_ball_hides_and_is_hidden() {
    let points = [
        [-1.0, -1.0],
        [1.0, -1.0],
        [1.0, 1.0],
        [0.5, 1.0],
        [0.5, -0.5],
        [-0.5, -0.5],
        [-0.5, 1.0],
        [-1.0, 1.0],
    ];
    let plate = Region::outline(DVec3::ZERO, at(1.0, 1.0, 0.0), DVec3::Z, &points)
        .expect("a plate with a dent");
    let ball = Region::sphere(at(0.0, 0.0, 0.2), 0.4).expect("a ball");
    let point = at(-0.6, 4.0, 0.1);
    let looked = look(ball.clone(), vec![plate.clone()], point);
    let found = flux(&looked, 0);
    // The same of the three bars of which the plate consists.
    let along = DVec3::Z.cross(at(1.0, 1.0, 0.0).normalize());
    let bar = |x: f64, z: f64, width: f64, height: f64| {
        Region::rectangle(
            along * x + DVec3::Z * z,
            at(1.0, 1.0, 0.0),
            DVec3::Z,
            width,
            height,
        )
        .expect("a bar")
    };
    let bars = vec![
        bar(-0.75, 0.0, 0.5, 2.0),
        bar(0.75, 0.0, 0.5, 2.0),
        bar(0.0, -0.75, 1.0, 0.5),
    ];
    let expected = flux(&look(ball.clone(), bars, point), 0);
    assert!(
        (found - expected).length() < 1e-13,
        "{found} against {expected}"
    );
    let all = alone(&ball, point);
    assert!(
        found.length() < all.length() * (1.0 - 1e-3),
        "{found} of {all}"
    );
}
