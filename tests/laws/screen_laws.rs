//! Screens in balance: no heat is lost or made, and published shields are the
//! limit of large plates.

use farglow::physics::planck;
use farglow::physics::region::Region;
use farglow::physics::scene::{Part, Scene};
use farglow::physics::screen::{
    Balance, Convection, Heated, Make, Room, Screen, Walls, balance, passed,
};
use farglow::physics::surface::Emission;
use glam::DVec3;
use proptest::prelude::*;

fn config(cases: u32) -> ProptestConfig {
    ProptestConfig {
        cases,
        failure_persistence: None,
        ..ProptestConfig::default()
    }
}

fn room() -> Room {
    Room {
        air: 298.15,
        radiant: 298.15,
        convection: Convection::Moving(0.3),
    }
}

fn black(temperature: f64) -> Emission {
    Emission::grey(temperature, 1.0, 1.0).expect("a black body")
}

fn door(temperature: f64) -> (Vec<Part>, Vec<Emission>) {
    let door = Region::rectangle(DVec3::Z, DVec3::Y, DVec3::Z, 0.9, 0.7).expect("a door");
    (vec![Part::bare(door)], vec![black(temperature)])
}

fn upright(place: [f64; 3], size: f64, make: Make) -> Screen {
    let place = DVec3::from_array(place);
    Screen::new(place, DVec3::NEG_Y, DVec3::Z, size, size, make).expect("a screen")
}

fn grey(front: f64, back: f64) -> Make {
    Make::Solid {
        emissivities: [front, back],
        absorptances: [front, back],
    }
}

fn solved(door: &(Vec<Part>, Vec<Emission>), screens: &[Screen], room: &Room) -> Balance {
    balance(&door.0, &door.1, screens, room).expect("a possible scene")
}

/// Any make.
fn make() -> impl Strategy<Value = Make> {
    let share = 0.02..1.0_f64;
    prop_oneof![
        (share.clone(), share.clone(), share.clone(), share.clone()).prop_map(
            |(one, two, three, four)| Make::Solid {
                emissivities: [one, two],
                absorptances: [three, four],
            }
        ),
        (0.0..0.95_f64).prop_map(|open_fraction| Make::Mesh { open_fraction }),
        // No band passes better than the whole: else the numbers contradict each
        // other for some sources, and of two such filters the order counts.
        (share.clone(), share.clone(), share).prop_map(|(total, near, visible)| Make::Filter {
            transmittance: total,
            near_infrared_transmittance: total * near,
            visible_transmittance: total * visible,
        }),
    ]
}

/// Any screen in front of the door, in any pose.
fn screen(make: impl Strategy<Value = Make>) -> impl Strategy<Value = Screen> {
    let place = (-2.0..2.0_f64, 0.3..4.0_f64, 0.0..2.5_f64);
    let normal = (-1.0..1.0_f64, -1.0..1.0_f64, -1.0..1.0_f64)
        .prop_filter("a direction", |(x, y, z)| x * x + y * y + z * z > 0.01);
    (place, normal, 0.3..2.5_f64, 0.3..2.5_f64, make).prop_map(
        |(place, normal, width, height, make)| {
            let normal = DVec3::from(normal);
            let up = normal.any_orthogonal_vector();
            Screen::new(DVec3::from(place), normal, up, width, height, make).expect("a screen")
        },
    )
}

/// What all screens absorb from sources, and what they give to air and room, W.
fn budget(found: &Balance, screens: &[Screen]) -> (f64, f64) {
    let absorbed: f64 = found.screens.iter().map(|heated| heated.power).sum();
    let convected: f64 = (found.screens.iter().zip(screens))
        .map(|(heated, screen)| heated.convected * screen.area())
        .sum();
    (absorbed, convected + found.radiated)
}

fn numbers(heated: &Heated) -> Vec<f64> {
    let mut all = vec![
        heated.mean_temperature,
        heated.hottest_temperature,
        heated.absorbed,
        heated.power,
        heated.exitances[0],
        heated.exitances[1],
        heated.convected,
    ];
    all.extend(heated.hottest.to_array());
    for patch in &heated.patches {
        all.extend([patch.temperature, patch.emission.total, patch.thrown_back]);
    }
    all
}

proptest! {
    #![proptest_config(config(60))]

    /// What is absorbed is given off, to the last watt, whatever stands where.
    #[test]
    fn no_heat_is_lost_or_made(screens in proptest::collection::vec(screen(make()), 1..5), temperature in 800.0..2000.0_f64) {
        let Ok(found) = balance(&door(temperature).0, &door(temperature).1, &screens, &room()) else { return Ok(()) };
        let (absorbed, given) = budget(&found, &screens);
        let scale = absorbed + 500.0 * screens.iter().map(Screen::area).sum::<f64>();
        // A piece that sees more than there is room for is held at nothing of the
        // room: the only place where the budget may stay open, to the hot side.
        prop_assert!(given <= absorbed + 1e-6 * scale, "absorbed {absorbed} W, given off {given} W");
        prop_assert!(given >= absorbed - 0.01 * scale, "absorbed {absorbed} W, given off {given} W");
        prop_assert!(found.residual <= 1e-6 * scale, "residual {}", found.residual);
        for heated in &found.screens {
            for value in numbers(heated) {
                prop_assert!(value.is_finite(), "{heated:?}");
            }
            prop_assert!(heated.hottest_temperature >= heated.patches.iter().map(|patch| patch.temperature).fold(0.0, f64::max) - 1e-6, "{heated:?}");
        }
    }

    /// In a room as warm as the source nothing is warmer or cooler.
    #[test]
    fn all_is_of_one_temperature_when_nothing_is_hot(makes in proptest::collection::vec((0.02..1.0_f64, 0.02..1.0_f64, 0.0..0.9_f64, any::<bool>()), 3), temperature in 280.0..700.0_f64) {
        let screens: Vec<Screen> = makes.iter().zip([[0.0, 1.0, 1.0], [0.3, 1.4, 1.2], [-0.2, 2.4, 0.9]]).map(|((front, back, open, solid), place)| {
            let make = if *solid { grey(*front, *back) } else { Make::Mesh { open_fraction: *open } };
            upright(place, 1.1, make)
        }).collect();
        let room = Room { air: temperature, radiant: temperature, convection: Convection::Moving(0.3) };
        let found = solved(&door(temperature), &screens, &room);
        for heated in &found.screens {
            prop_assert!((heated.mean_temperature / temperature - 1.0).abs() < 2e-3, "{} K in a room of {temperature} K", heated.mean_temperature);
            prop_assert!(heated.convected.abs() < 2e-3 * planck::exitance(temperature) + 0.5, "{} W/m²", heated.convected);
        }
    }

    /// A hotter source makes every screen hotter.
    #[test]
    fn hotter_source_makes_hotter_screens(screens in proptest::collection::vec(screen(make()), 1..4), temperature in 700.0..1900.0_f64) {
        let (cooler, hotter) = (door(temperature), door(temperature * 1.05));
        let Ok(before) = balance(&cooler.0, &cooler.1, &screens, &room()) else { return Ok(()) };
        let after = solved(&hotter, &screens, &room());
        for (before, after) in before.screens.iter().zip(&after.screens) {
            // A finer cut may move the mean by its own accuracy.
            prop_assert!(after.mean_temperature >= before.mean_temperature - 1.5, "{} after {}", after.mean_temperature, before.mean_temperature);
            prop_assert!(after.hottest_temperature >= before.hottest_temperature - 1e-3 * before.hottest_temperature, "{} after {}", after.hottest_temperature, before.hottest_temperature);
        }
    }

    /// In another order the same screens come to the same temperatures.
    #[test]
    fn order_of_the_screens_does_not_matter(screens in proptest::collection::vec(screen(make()), 2..5)) {
        let hot = door(1500.0);
        let Ok(found) = balance(&hot.0, &hot.1, &screens, &room()) else { return Ok(()) };
        let turned: Vec<Screen> = screens.iter().rev().cloned().collect();
        let again = solved(&hot, &turned, &room());
        for (one, other) in found.screens.iter().zip(again.screens.iter().rev()) {
            prop_assert!((one.mean_temperature - other.mean_temperature).abs() < 1e-6, "{} and {}", one.mean_temperature, other.mean_temperature);
            prop_assert!((one.power - other.power).abs() < 1e-6 * (1.0 + one.power), "{} and {}", one.power, other.power);
        }
    }
}

/// The published relation for shields is the limit of large plates that stand
/// close, without air: net flux, and the temperature of each.
#[test]
fn large_plates_are_the_published_shields() {
    let still = Room {
        air: 300.0,
        radiant: 300.0,
        convection: Convection::Stated(0.0),
    };
    let large = 400.0;
    let wall = Region::rectangle(DVec3::ZERO, DVec3::Y, DVec3::Z, large, large).expect("a wall");
    let hot = (vec![Part::bare(wall)], vec![black(1000.0)]);
    for plates in [
        vec![[1.0, 1.0]],
        vec![[0.3, 0.3]],
        vec![[0.1, 0.8]],
        vec![[0.9, 0.9], [0.9, 0.9]],
        vec![[0.8, 0.2], [0.1, 0.3]],
        vec![[0.5, 0.05], [0.1, 0.3], [0.9, 0.2]],
        vec![[0.2, 0.2]; 6],
    ] {
        let screens: Vec<Screen> = (1_u8..)
            .zip(&plates)
            .map(|(place, [front, back])| {
                upright(
                    [0.0, 0.01 * f64::from(place), 0.0],
                    large,
                    grey(*front, *back),
                )
            })
            .collect();
        let found = solved(&hot, &screens, &still);
        let expected = Walls {
            from: 1000.0,
            from_emissivity: 1.0,
            to: 300.0,
            to_emissivity: 1.0,
            plates: &plates,
        };
        let temperatures = expected.temperatures().expect("possible walls");
        for (heated, expected) in found.screens.iter().zip(&temperatures) {
            // Each sees a little past the next: 0.01 m in 400 m.
            assert!(
                (heated.mean_temperature - expected).abs() < 1e-4,
                "{plates:?}: {} K against {expected} K",
                heated.mean_temperature
            );
        }
        let net = found.radiated / (large * large);
        let flux = expected.net_flux().expect("possible walls");
        let absorbed: f64 = found.screens[0].absorbed;
        assert!(
            (net - absorbed).abs() < 1e-6 * absorbed,
            "{plates:?}: {net} W/m² to room and wall, {absorbed} W/m² from the wall"
        );
        // What the last plate gives to the room beyond is the net flux.
        let last = found.screens.last().expect("a plate");
        let [_, back] = *plates.last().expect("a plate");
        let through = last.exitances[1] - back * planck::exitance(300.0);
        assert!(
            (through - flux).abs() < 1e-6 * flux,
            "{plates:?}: {through} W/m² against {flux} W/m²"
        );
    }
}

/// One small plate far from the source: its balance by hand, with the fixed
/// coefficient of the rows of family plate_balance.
#[test]
fn small_plate_is_the_balance_by_hand() {
    let stated = Room {
        convection: Convection::Stated(10.0),
        ..room()
    };
    let hot = door(1600.0);
    let make = Make::soiled(0.2, 0.8).expect("a make");
    let screen = upright([0.0, 6.0, 1.0], 0.2, make);
    let found = solved(&hot, std::slice::from_ref(&screen), &stated);
    let view = hot.0[0]
        .region
        .view(DVec3::new(0.0, 6.0, 1.0))
        .into_view()
        .expect("in front");
    let factor = view.factor(DVec3::NEG_Y);
    let absorbed = 0.6 * factor * hot.1[0].total;
    let sky = (0.2 * (1.0 - factor) + 0.8) * planck::exitance(298.15);
    // Bisection, for another way to the root.
    let (mut low, mut high) = (200.0_f64, 2000.0_f64);
    for _ in 0..200 {
        let middle = 0.5 * (low + high);
        let given = 1.0 * planck::exitance(middle) + 20.0 * (middle - 298.15);
        if given > absorbed + sky {
            high = middle;
        } else {
            low = middle;
        }
    }
    let heated = &found.screens[0];
    assert!(
        (heated.mean_temperature - low).abs() < 1e-6,
        "{} K against {low} K",
        heated.mean_temperature
    );
    assert!(
        (heated.absorbed / absorbed - 1.0).abs() < 1e-9,
        "{} against {absorbed}",
        heated.absorbed
    );
    assert_eq!(heated.patches.len(), 2, "one piece");
}

/// Two plates facing each other, one of them heated: by hand with the closed
/// form between equal parallel squares, iterated plainly.
#[test]
fn two_facing_plates_are_solved_by_hand_alike() {
    let stated = Room {
        convection: Convection::Stated(8.0),
        ..room()
    };
    // A source that only the first plate sees, far off and no larger than it.
    let far = Region::disc(DVec3::new(0.0, -30.0, 0.0), DVec3::Y, 0.45).expect("a disc");
    let bright = Emission {
        total: 5e7,
        ..Emission::default()
    };
    let hot = (vec![Part::bare(far)], vec![bright]);
    let (first, second) = (grey(0.9, 0.7), grey(0.4, 0.8));
    let screens = [
        upright([0.0, 0.0, 0.0], 1.0, first),
        upright([0.0, 1.0, 0.0], 1.0, second),
    ];
    let found = solved(&hot, &screens, &stated);
    // Howell C-11, equal squares a side apart: 0.1998 (Incropera table 13.2 and
    // figure 13.4, from memory), here from the closed form.
    let (x, y) = (1.0_f64, 1.0_f64);
    let (root_x, root_y) = ((1.0 + x * x).sqrt(), (1.0 + y * y).sqrt());
    let between = 2.0 / (std::f64::consts::PI * x * y)
        * (((root_x * root_x * root_y * root_y) / (1.0 + x * x + y * y))
            .sqrt()
            .ln()
            + x * root_y * (x / root_y).atan()
            + y * root_x * (y / root_x).atan()
            - x * x.atan()
            - y * y.atan());
    assert!((between - 0.1998).abs() < 5e-5, "{between}");
    let view = hot.0[0]
        .region
        .view(DVec3::ZERO)
        .into_view()
        .expect("ahead");
    let factor = view.factor(DVec3::NEG_Y);
    let fell = factor * hot.1[0].total;
    let sky = planck::exitance(298.15);
    let root = |emissivities: f64, absorbed: f64| {
        let (mut low, mut high) = (200.0_f64, 3000.0_f64);
        for _ in 0..100 {
            let middle = 0.5 * (low + high);
            if emissivities * planck::exitance(middle) + 16.0 * (middle - 298.15) > absorbed {
                high = middle;
            } else {
                low = middle;
            }
        }
        low
    };
    let (mut one, mut two) = (300.0, 300.0);
    let (mut back, mut front) = (sky, sky);
    for _ in 0..200 {
        let on_back = between * front + (1.0 - between) * sky;
        let on_front = between * back + (1.0 - between) * sky;
        one = root(1.6, 0.9 * (fell + (1.0 - factor) * sky) + 0.7 * on_back);
        two = root(1.2, 0.4 * on_front + 0.8 * sky);
        back = 0.7 * planck::exitance(one) + 0.3 * on_back;
        front = 0.4 * planck::exitance(two) + 0.6 * on_front;
    }
    for (heated, expected) in found.screens.iter().zip([one, two]) {
        assert!(
            (heated.mean_temperature - expected).abs() < 0.3,
            "{} K against {expected} K",
            heated.mean_temperature
        );
    }
    assert!(two > 307.0, "the second plate is warmed to {two} K");
}

/// The unshaded scene is its own mirror image: so are the screens.
#[test]
fn screens_set_alike_come_out_alike() {
    let hot = door(1500.0);
    let make = Make::soiled(0.3, 0.9).expect("a make");
    let screens = [-0.8, 0.8].map(|x| upright([x, 1.5, 1.0], 1.0, make));
    let found = solved(&hot, &screens, &room());
    let [left, right] = &found.screens[..] else {
        panic!("two screens")
    };
    for (one, other) in [
        (left.mean_temperature, right.mean_temperature),
        (left.hottest_temperature, right.hottest_temperature),
        (left.power, right.power),
        (left.hottest.x, -right.hottest.x),
    ] {
        assert!((one - other).abs() < 1e-6 * one.abs(), "{one} and {other}");
    }
}

/// Meshes and filters between the ends of their kind: from a plate to nothing.
#[test]
fn meshes_absorb_what_they_do_not_let_through() {
    let hot = door(1500.0);
    let mut before = f64::INFINITY;
    let mut cut_alike = 0;
    for open_fraction in [0.0, 0.3, 0.6, 0.9, 0.99] {
        let mesh = upright([0.0, 2.0, 1.0], 1.0, Make::Mesh { open_fraction });
        let found = solved(&hot, std::slice::from_ref(&mesh), &room());
        let heated = &found.screens[0];
        assert!(heated.absorbed < before, "{open_fraction}: {heated:?}");
        before = heated.absorbed;
        // Wires are as hot, whatever is between them.
        let plate = upright([0.0, 2.0, 1.0], 1.0, grey(1.0, 1.0));
        let whole = solved(&hot, std::slice::from_ref(&plate), &room());
        let whole = &whole.screens[0];
        // What little a thin mesh takes up is cut less finely: there the two
        // agree as well as the cut is good, elsewhere to rounding.
        let alike = heated.patches.len() == whole.patches.len();
        cut_alike += usize::from(alike);
        let (kelvin, part) = if alike { (1e-6, 1e-9) } else { (1.0, 0.01) };
        assert!(
            (heated.mean_temperature - whole.mean_temperature).abs() < kelvin,
            "{open_fraction}: {} K against {} K",
            heated.mean_temperature,
            whole.mean_temperature
        );
        let share = heated.exitances[1] / whole.exitances[1];
        let expected = 1.0 - open_fraction;
        assert!(
            (share / expected - 1.0).abs() < part,
            "{open_fraction}: {share}"
        );
    }
    assert!(cut_alike >= 3, "only {cut_alike} of 5 are cut alike");
}

/// A plate behind a mesh or a filter that covers all its view absorbs of the
/// source what those let through, and is warmed by them.
#[test]
fn plate_behind_a_clear_screen_gets_what_goes_through() {
    let hot = door(1500.0);
    // So far off that it is cut alike with and without what stands before it.
    let plate = upright(
        [0.0, 3.0, 1.0],
        0.8,
        Make::soiled(0.3, 0.9).expect("a make"),
    );
    let alone = solved(&hot, std::slice::from_ref(&plate), &room());
    let filter = Make::Filter {
        transmittance: 0.35,
        near_infrared_transmittance: 0.2,
        visible_transmittance: 0.1,
    };
    for (make, share) in [
        (
            Make::Mesh {
                open_fraction: 0.45,
            },
            0.45,
        ),
        (filter, 0.35),
    ] {
        let screens = [upright([0.0, 1.0, 1.0], 3.0, make), plate.clone()];
        let found = solved(&hot, &screens, &room());
        let ratio = found.screens[1].power / alone.screens[0].power;
        // What the plate throws back lights the filter or the mesh alone.
        assert!((ratio / share - 1.0).abs() < 1e-9, "{make:?}: {ratio}");
        let lone = solved(&hot, &screens[..1], &room());
        assert!(
            found.screens[0].mean_temperature > lone.screens[0].mean_temperature,
            "{make:?}: {} K with the plate behind it, {} K without",
            found.screens[0].mean_temperature,
            lone.screens[0].mean_temperature
        );
        let dimmed = passed(&screens, &[0], &hot.1[0]);
        assert!(
            (dimmed.total / hot.1[0].total - share).abs() < 1e-12,
            "{make:?}: {dimmed:?}"
        );
    }
    // The second of two plates that the first hides takes up nothing directly.
    let hidden = [upright([0.0, 1.0, 1.0], 3.0, grey(0.9, 0.9)), plate];
    let found = solved(&hot, &hidden, &room());
    assert_eq!(found.screens[1].power, 0.0);
    assert!(
        found.screens[1].mean_temperature > 310.0,
        "{} K",
        found.screens[1].mean_temperature
    );
}

/// A screen does not hide its own patches, and people on each side see those of
/// that side alone: together they are the face.
#[test]
fn patches_are_seen_from_their_own_side() {
    let hot = door(1500.0);
    let make = Make::soiled(0.3, 0.9).expect("a make");
    let screen = upright([0.0, 1.5, 1.0], 1.2, make);
    let found = solved(&hot, std::slice::from_ref(&screen), &room());
    let patches = &found.screens[0].patches;
    let parts = patches.iter().map(|patch| patch.part.clone()).collect();
    let scene = Scene::new(parts, vec![screen.barrier()]).expect("a scene");
    for (point, is_front) in [
        (DVec3::new(0.3, 0.9, 1.6), true),
        (DVec3::new(0.3, 2.1, 1.6), false),
        (DVec3::new(0.3, 6.0, 0.4), false),
    ] {
        let normal = if is_front { DVec3::Y } else { DVec3::NEG_Y };
        let mut sum = 0.0;
        for glimpse in scene.look(point).glimpses() {
            assert_eq!(patches[glimpse.part].is_front, is_front, "{point}");
            assert!(glimpse.through.is_empty(), "{point}: {glimpse:?}");
            sum += glimpse.view.factor(normal);
        }
        let whole = Region::rectangle(DVec3::new(0.0, 1.5, 1.0), -normal, DVec3::Z, 1.2, 1.2)
            .expect("a face")
            .view(point)
            .into_view()
            .expect("ahead")
            .factor(normal);
        assert!(
            (sum - whole).abs() < 1e-6 * whole,
            "{point}: {sum} of {whole}"
        );
    }
}

/// Behind a row of plates it is the cooler the more there are, down to the room.
#[test]
fn more_screens_never_let_more_through() {
    let hot = door(1600.0);
    let make = Make::soiled(0.3, 0.9).expect("a make");
    let point = DVec3::new(0.2, 4.0, 1.5);
    let mut before = f64::INFINITY;
    for count in 0..5_u8 {
        let screens: Vec<Screen> = (0..count)
            .map(|place| upright([0.0, 1.0 + 0.15 * f64::from(place), 1.0], 2.0, make))
            .collect();
        let found = solved(&hot, &screens, &room());
        let (absorbed, given) = budget(&found, &screens);
        assert!(
            (given - absorbed).abs() <= 1e-6 * absorbed,
            "{count} plates: absorbed {absorbed} W, given off {given} W"
        );
        let mut parts = hot.0.clone();
        let mut emissions = hot.1.clone();
        for patch in found.screens.iter().flat_map(|heated| &heated.patches) {
            parts.push(patch.part.clone());
            emissions.push(patch.emission);
        }
        let barriers = screens.iter().map(Screen::barrier).collect();
        let scene = Scene::new(parts, barriers).expect("a scene");
        let irradiance: f64 = (scene.look(point).glimpses().iter())
            .map(|glimpse| {
                let emission = passed(&screens, &glimpse.through, &emissions[glimpse.part]);
                emission.total * glimpse.view.factor(DVec3::NEG_Y)
            })
            .sum();
        assert!(
            irradiance < before && irradiance > 0.0,
            "{count} plates: {irradiance} W/m² after {before} W/m²"
        );
        before = irradiance;
    }
    let room = planck::exitance(298.15);
    assert!(before < 0.5 * room, "{before} W/m² behind four plates");
}

/// What cannot be is refused by name.
#[test]
fn impossible_scenes_are_refused() {
    let hot = door(1500.0);
    let make = Make::soiled(0.3, 0.9).expect("a make");
    let text =
        |found: Result<Balance, farglow::physics::Error>| found.expect_err("refused").to_string();
    let plate = upright([0.0, 1.5, 1.0], 1.0, make);
    let against_the_door = upright([0.0, 0.0, 1.0], 1.0, make);
    let windy = Room {
        convection: Convection::Moving(f64::NAN),
        ..room()
    };
    let frozen = Room { air: 0.0, ..room() };
    for (found, expected) in [
        (
            text(balance(
                &hot.0,
                &hot.1,
                &[plate.clone(), plate.clone()],
                &room(),
            )),
            "screens must not lie in one another, found screen 1 in screen 2; move one of them",
        ),
        (
            text(balance(&hot.0, &hot.1, &[against_the_door], &room())),
            "a screen must stand clear of hot sources, found screen 1 touching part 1; move one of them",
        ),
        (
            text(balance(&hot.0, &[], std::slice::from_ref(&plate), &room())),
            "number of emissions must be that of the emitting parts, found 0",
        ),
        (
            text(balance(
                &hot.0,
                &hot.1,
                std::slice::from_ref(&plate),
                &windy,
            )),
            "speed of the air must be from 0 m/s to 100 m/s, found NaN",
        ),
        (
            text(balance(&hot.0, &hot.1, &[plate], &frozen)),
            "temperature of the air must be above 0 K and at most 2000 K, found 0",
        ),
    ] {
        assert_eq!(found, expected);
    }
    let none = solved(&hot, &[], &room());
    assert!(none.screens.is_empty() && none.radiated == 0.0, "{none:?}");
}
