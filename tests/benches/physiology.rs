//! What it costs to solve the layered skin, a shift of predicted heat strain and
//! the windows of a schedule: at most 5 ms a solve.

use divan::{Bencher, black_box};
use farglow::physics::heat_strain::Climate;
use farglow::physics::heat_strain::predicted::{
    CLO, Clothing, Edition, Person, Posture, Stretch, Work, predict,
};
use farglow::physics::repeated::Schedule;
use farglow::physics::skin::{Injury, Tissue, burn};

fn main() {
    divan::main();
}

#[divan::bench(args = [1500.0, 5000.0, 20_000.0, 80_000.0])]
fn burn_integral_of_a_pulse(bencher: Bencher<'_, '_>, flux: f64) {
    let tissue = Tissue::standard();
    bencher.bench(|| burn::after_pulse(tissue, black_box(flux), 5.0, Injury::SecondDegree));
}

#[divan::bench(args = [1500.0, 5000.0, 20_000.0, 80_000.0])]
fn longest_exposure(bencher: Bencher<'_, '_>, flux: f64) {
    let tissue = Tissue::standard();
    bencher.bench(|| burn::longest_exposure(tissue, black_box(flux), Injury::SecondDegree));
}

#[divan::bench(args = [Edition::Iso2004, Edition::Iso2023])]
fn predicted_heat_strain_of_eight_hours(bencher: Bencher<'_, '_>, edition: Edition) {
    let stretch = Stretch {
        duration: 28_800.0,
        climate: Climate {
            air_temperature: 303.15,
            mean_radiant: 343.15,
            vapour_pressure: 2000.0,
            air_speed: 0.3,
        },
        clothing: Clothing::ordinary(0.6 * CLO),
        work: Work {
            metabolic_rate: 165.0,
            mechanical_power: 0.0,
            posture: Posture::Standing,
            walking: None,
        },
    };
    bencher.bench(|| predict(edition, &Person::standard(true), black_box(&[stretch])));
}

#[divan::bench]
fn windows_of_a_shift_for_the_eye(bencher: Bencher<'_, '_>) {
    let shift = Schedule::repeated(1000.0, 30.0, 150.0, 160).expect("a fair shift");
    bencher.bench(|| black_box(&shift).eye(18_000.0, 100.0));
}
