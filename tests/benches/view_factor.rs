//! What a view factor costs, beside plain quadrature of equal accuracy.

use std::f64::consts::{PI, TAU};
use std::hint::black_box;

use divan::Bencher;
use farglow::physics::exposure;
use farglow::physics::region::Region;
use farglow::physics::surface::Emission;
use farglow::physics::view::View;
use farglow::physics::view_factor::disc;
use glam::DVec3;

fn main() {
    divan::main();
}

fn door() -> Region {
    Region::rectangle(DVec3::new(0.0, 0.0, 1.2), DVec3::Y, DVec3::Z, 0.9, 0.7).expect("a door")
}

fn ladle() -> Region {
    Region::disc(DVec3::ZERO, DVec3::Z, 0.425).expect("a ladle")
}

const EYE: DVec3 = DVec3::new(0.4, 2.5, 1.6);

fn view(region: &Region) -> View {
    region.view(EYE).into_view().expect("off the source")
}

#[divan::bench]
fn closed_form_of_a_disc(bencher: Bencher<'_, '_>) {
    bencher.bench(|| disc::from_parallel_element(black_box(0.425), black_box(1.6), black_box(2.5)));
}

#[divan::bench]
fn disc_in_space(bencher: Bencher<'_, '_>) {
    let (region, normal) = (ladle(), -EYE.normalize());
    bencher.bench(|| {
        black_box(&region)
            .view(black_box(EYE))
            .into_view()
            .map(|view| view.factor(black_box(normal)))
    });
}

#[divan::bench]
fn disc_in_space_cut_by_the_horizon(bencher: Bencher<'_, '_>) {
    let (region, normal) = (ladle(), DVec3::new(1.0, 0.0, 0.0));
    bencher.bench(|| {
        black_box(&region)
            .view(black_box(EYE))
            .into_view()
            .map(|view| view.factor(black_box(normal)))
    });
}

#[divan::bench]
fn four_sided_polygon_by_contour(bencher: Bencher<'_, '_>) {
    let (region, normal) = (door(), DVec3::NEG_Y);
    bencher.bench(|| {
        black_box(&region)
            .view(black_box(EYE))
            .into_view()
            .map(|view| view.factor(black_box(normal)))
    });
}

#[divan::bench]
fn four_sided_polygon_cut_by_the_horizon(bencher: Bencher<'_, '_>) {
    let (region, normal) = (door(), DVec3::X);
    bencher.bench(|| {
        black_box(&region)
            .view(black_box(EYE))
            .into_view()
            .map(|view| view.factor(black_box(normal)))
    });
}

#[divan::bench]
fn strongest_of_one_source(bencher: Bencher<'_, '_>) {
    let views = [view(&door())];
    bencher.bench(|| exposure::strongest(black_box(&views), black_box(&[290e3])));
}

#[divan::bench]
fn strongest_of_six_sources_all_round(bencher: Bencher<'_, '_>) {
    let views: Vec<View> = (0..6_u32)
        .map(|index| {
            let angle = TAU * f64::from(index) / 6.0;
            let way = DVec3::new(angle.cos(), angle.sin(), 0.1);
            view(&Region::disc(EYE + way * 3.0, -way, 0.4).expect("a disc"))
        })
        .collect();
    bencher.bench(|| {
        exposure::strongest(
            black_box(&views),
            black_box(&[1.0, 2.0, 3.0, 2.5, 1.5, 0.5]),
        )
    });
}

#[divan::bench]
fn emission_of_a_surface(bencher: Bencher<'_, '_>) {
    bencher.bench(|| Emission::grey(black_box(1523.15), black_box(0.95), black_box(0.95)));
}

/// Gauss points and weights on −1 to 1, eight of them.
const GAUSS: [(f64, f64); 4] = [
    (0.183_434_642_495_649_8, 0.362_683_783_378_362),
    (0.525_532_409_916_329, 0.313_706_645_877_887_27),
    (0.796_666_477_413_626_7, 0.222_381_034_453_374_48),
    (0.960_289_856_497_536_3, 0.101_228_536_290_376_26),
];

/// The door by Gauss quadrature, 8 × 8 points: good to 1e-9 at this distance.
fn door_by_quadrature(point: DVec3, normal: DVec3) -> f64 {
    let mut sum = 0.0;
    for (u, wu) in GAUSS {
        for (v, wv) in GAUSS {
            for (su, sv) in [(1.0, 1.0), (1.0, -1.0), (-1.0, 1.0), (-1.0, -1.0)] {
                let way = DVec3::new(0.45 * u * su, 0.0, 1.2 + 0.35 * v * sv) - point;
                let square = way.length_squared();
                sum += wu * wv * way.dot(normal) * -way.y / (square * square);
            }
        }
    }
    sum * 0.45 * 0.35 / PI
}

#[divan::bench]
fn four_sided_polygon_by_gauss_quadrature(bencher: Bencher<'_, '_>) {
    let (exact, plain) = (
        view(&door()).factor(DVec3::NEG_Y),
        door_by_quadrature(EYE, DVec3::NEG_Y),
    );
    assert!(
        (exact - plain).abs() < 1e-9,
        "{exact} by contour, {plain} by quadrature"
    );
    bencher.bench(|| door_by_quadrature(black_box(EYE), black_box(DVec3::NEG_Y)));
}
