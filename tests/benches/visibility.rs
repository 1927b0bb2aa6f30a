//! What a look past screens costs, beside plain quadrature of equal accuracy.
//!
//! The scenes are named for what is in them: a wall of ten furnace doors two
//! metres apart with a person before its middle, plates between the two, and
//! the same with round and solid things among them.

use std::f64::consts::PI;
use std::hint::black_box;

use divan::Bencher;
use farglow::physics::exposure;
use farglow::physics::region::Region;
use farglow::physics::scene::{Barrier, Part, Scene};
use farglow::physics::view::View;
use glam::DVec3;

fn main() {
    println!("{}", accuracy());
    divan::main();
}

const EYE: DVec3 = DVec3::new(0.3, 4.0, 1.6);

/// Ten doors in a wall; with `mixed` every second one is round, and a ladle, a
/// ball and two bars lie before them.
fn sources(mixed: bool) -> Vec<Part> {
    let mut parts: Vec<Part> = (0..10_u32)
        .map(|index| {
            let centre = DVec3::new(2.0 * f64::from(index) - 9.0, 0.0, 1.2);
            let region = if mixed && index % 2 == 1 {
                Region::disc(centre, DVec3::Y, 0.4)
            } else {
                Region::rectangle(centre, DVec3::Y, DVec3::Z, 0.9, 0.7)
            };
            Part::bare(region.expect("a door"))
        })
        .collect();
    if mixed {
        let bodies = [
            Region::disc(DVec3::new(-2.0, 1.5, 0.6), DVec3::Z, 0.5),
            Region::sphere(DVec3::new(1.2, 1.2, 0.9), 0.25),
            Region::cylinder(DVec3::new(-0.8, 0.8, 0.9), DVec3::X * 0.9, 0.1),
            Region::cylinder(DVec3::new(3.0, 1.0, 0.0), DVec3::Z * 1.5, 0.2),
        ];
        parts.extend(bodies.map(|region| Part::bare(region.expect("a body"))));
    }
    parts
}

/// Ten plates: three overlap before the middle doors, seven stand aside.
fn plates(mixed: bool) -> Vec<Barrier> {
    let plate = |x: f64, y: f64, z: f64, wide: f64, high: f64, turn: f64| {
        let normal = DVec3::new(turn, 1.0, 0.1);
        Region::rectangle(DVec3::new(x, y, z), normal, DVec3::Z, wide, high).expect("a plate")
    };
    let mut regions = vec![
        plate(-0.2, 2.0, 1.2, 0.3, 0.5, 0.0),
        plate(-0.1, 2.4, 1.5, 0.4, 0.3, 0.3),
        plate(-0.45, 1.8, 1.45, 0.5, 0.2, -0.2),
    ];
    regions.extend((0..7_u32).map(|index| {
        let side = if index % 2 == 0 { 1.0 } else { -1.0 };
        plate(side * (4.0 + f64::from(index)), 6.0, 1.0, 1.0, 2.0, side)
    }));
    if mixed {
        regions[1] = Region::disc(DVec3::new(-0.1, 2.4, 1.5), DVec3::Y, 0.2).expect("a disc");
        regions[2] =
            Region::cylinder(DVec3::new(-0.45, 1.8, 0.0), DVec3::Z * 1.9, 0.15).expect("a column");
        regions[3] = Region::sphere(DVec3::new(0.6, 2.0, 1.3), 0.2).expect("a ball");
    }
    regions.into_iter().map(Barrier::solid).collect()
}

fn scene(mixed: bool, screens: bool) -> Scene {
    let barriers = if screens { plates(mixed) } else { Vec::new() };
    Scene::new(sources(mixed), barriers).expect("a possible scene")
}

/// The irradiance facing the wall, all doors of one exitance.
fn facing(scene: &Scene, point: DVec3) -> f64 {
    scene
        .look(point)
        .glimpses()
        .iter()
        .map(|glimpse| glimpse.view.factor(DVec3::NEG_Y))
        .sum()
}

#[divan::bench]
fn ten_doors_unobstructed(bencher: Bencher<'_, '_>) {
    let scene = scene(false, false);
    bencher.bench(|| facing(black_box(&scene), black_box(EYE)));
}

#[divan::bench]
fn ten_doors_past_ten_plates_three_overlapping(bencher: Bencher<'_, '_>) {
    let scene = scene(false, true);
    bencher.bench(|| facing(black_box(&scene), black_box(EYE)));
}

#[divan::bench]
fn doors_ladle_ball_bars_past_plates_disc_column_ball(bencher: Bencher<'_, '_>) {
    let scene = scene(true, true);
    bencher.bench(|| facing(black_box(&scene), black_box(EYE)));
}

#[divan::bench]
fn one_door_past_three_overlapping_plates(bencher: Bencher<'_, '_>) {
    let (door, plates) = (sources(false)[4].clone(), plates(false)[..3].to_vec());
    let scene = Scene::new(vec![door], plates).expect("a possible scene");
    bencher.bench(|| facing(black_box(&scene), black_box(EYE)));
}

#[divan::bench(args = [10, 100, 1000])]
fn ten_doors_past_screens_that_hide_nothing(bencher: Bencher<'_, '_>, count: u32) {
    let aside = (0..count).map(|index| {
        let at = DVec3::new(0.01 * f64::from(index), 8.0, 1.0);
        Barrier::solid(Region::rectangle(at, DVec3::Y, DVec3::Z, 1.0, 2.0).expect("a plate"))
    });
    let scene = Scene::new(sources(false), aside.collect()).expect("a possible scene");
    bencher.bench(|| facing(black_box(&scene), black_box(EYE)));
}

#[divan::bench]
fn orientation_after_the_look(bencher: Bencher<'_, '_>) {
    let looked = scene(false, true).look(EYE);
    let normal = DVec3::new(0.4, -0.9, 0.1);
    bencher.bench(|| {
        let glimpses = black_box(&looked).glimpses().iter();
        glimpses
            .map(|glimpse| glimpse.view.factor(black_box(normal)))
            .sum::<f64>()
    });
}

#[divan::bench]
fn strongest_after_the_look(bencher: Bencher<'_, '_>) {
    let looked = scene(false, true).look(EYE);
    let views: Vec<View> = (looked.glimpses().iter())
        .map(|glimpse| glimpse.view.clone())
        .collect();
    let weights = vec![290e3; views.len()];
    bencher.bench(|| exposure::strongest(black_box(&views), black_box(&weights)));
}

#[divan::bench]
fn building_the_mixed_scene(bencher: Bencher<'_, '_>) {
    bencher.bench(|| scene(black_box(true), true));
}

/// A field of 40 × 40 points: 1600 looks, of which 200 × 200 make 25 times.
#[divan::bench(sample_count = 20)]
fn field_of_40_by_40_points(bencher: Bencher<'_, '_>) {
    let scene = scene(false, true);
    bencher.bench(|| {
        let mut sum = 0.0;
        for row in 0..40_u32 {
            for column in 0..40_u32 {
                let x = 0.25 * f64::from(column) - 5.0;
                let y = 3.0 + 0.1 * f64::from(row);
                sum += facing(black_box(&scene), DVec3::new(x, y, 1.6));
            }
        }
        sum
    });
}

/// The middle door past the three plates by plain quadrature: its face in
/// `count` × `count` squares, each seen or not by its middle.
fn by_squares(count: u32) -> f64 {
    let door = DVec3::new(-1.0, 0.0, 1.2);
    let plates: Vec<(Vec<DVec3>, DVec3)> = plates(false)[..3]
        .iter()
        .filter_map(|barrier| match &barrier.region {
            Region::Polygon { vertices, normal } => Some((vertices.clone(), *normal)),
            _ => None,
        })
        .collect();
    let (wide, high) = (0.9 / f64::from(count), 0.7 / f64::from(count));
    let mut sum = 0.0;
    for row in 0..count {
        for column in 0..count {
            let place = door
                + DVec3::X * (wide * (f64::from(column) + 0.5) - 0.45)
                + DVec3::Z * (high * (f64::from(row) + 0.5) - 0.35);
            let way = place - EYE;
            let hidden = plates.iter().any(|(corners, normal)| {
                let share = (corners[0] - EYE).dot(*normal) / way.dot(*normal);
                let there = EYE + way * share;
                share > 0.0
                    && share < 1.0
                    && (0..4).all(|index| {
                        let (a, b) = (corners[index], corners[(index + 1) % 4]);
                        normal.cross(b - a).dot(there - a) > 0.0
                    })
            });
            if !hidden {
                let square = way.length_squared();
                sum += way.y * way.y / (square * square);
            }
        }
    }
    sum * wide * high / PI
}

/// What quadrature reaches, beside the exact value.
fn accuracy() -> String {
    let (door, plates) = (sources(false)[4].clone(), plates(false)[..3].to_vec());
    let open = Scene::new(vec![door.clone()], Vec::new()).expect("a possible scene");
    let scene = Scene::new(vec![door], plates).expect("a possible scene");
    let (all, exact) = (facing(&open, EYE), facing(&scene, EYE));
    let mut text = format!("one door past three plates: {exact:.9} of {all:.9} is seen");
    for count in [100, 400, 1600] {
        let error = (by_squares(count) - exact).abs() / all;
        text += &format!("\n  {count} × {count} squares: off by {error:.1e} of the whole");
    }
    text
}

#[divan::bench(args = [100, 400], sample_count = 20)]
fn one_door_past_three_overlapping_plates_by_squares(bencher: Bencher<'_, '_>, count: u32) {
    bencher.bench(|| by_squares(black_box(count)));
}
