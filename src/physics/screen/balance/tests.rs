use super::*;
use crate::physics::exposure;
use crate::physics::region::Region;
use crate::physics::screen::{Convection, Make};
use crate::physics::view::View;

pub(super) const ROOM: Room = Room {
    air: 298.15,
    radiant: 298.15,
    convection: Convection::Moving(0.3),
};

pub(super) fn door() -> (Part, Emission) {
    let door = Region::rectangle(DVec3::Z, DVec3::Y, DVec3::Z, 0.9, 0.7).expect("a door");
    let hot = Emission::grey(1523.15, 0.95, 0.95).expect("a hot door");
    (Part::bare(door), hot)
}

pub(super) fn upright(place: [f64; 3], width: f64, height: f64, make: Make) -> Screen {
    Screen::new(
        DVec3::from_array(place),
        DVec3::NEG_Y,
        DVec3::Z,
        width,
        height,
        make,
    )
    .expect("a screen")
}

/// The irradiance from a screen's patches on somebody behind it.
fn behind(heated: &Heated, point: DVec3) -> f64 {
    let views: Vec<View> = heated
        .patches
        .iter()
        .map(|patch| patch.part.region.view(point).into_view().expect("clear"))
        .collect();
    let weights: Vec<f64> = heated
        .patches
        .iter()
        .map(|patch| patch.emission.total)
        .collect();
    exposure::facing(&views, &weights, DVec3::NEG_Y)
}

/// A screen cut by hand.
fn cut(screen: &Screen, count: u32) -> Heated {
    let (part, hot) = door();
    let screens = std::slice::from_ref(screen);
    let (parts, emissions) = ([part], [hot]);
    let around = Surroundings::new(&parts, &emissions, screens).expect("a scene");
    let mut grids = vec![Grid::of(&around, screens, 0, count, count).expect("pieces")];
    let exchange = Exchange::solve(screens, &mut grids, &ROOM);
    let plate = screen.plate(&ROOM);
    let mut found = screen_in_balance(screen, 0, &grids[0], &exchange, &plate)
        .expect("a balance")
        .0;
    let hottest = hottest::place(&around, 0, &grids[0], &exchange);
    found.hottest_temperature = plate.hottest(hottest.absorbed);
    found
}

/// A second way: the same plate in 1600 pieces. The middles of few pieces say a
/// little too much of a peaked field and too little close behind its peak.
#[test]
fn pieces_are_fine_enough() {
    let (part, hot) = door();
    let make = Make::soiled(0.3, 0.9).expect("a make");
    for distance in [0.3, 0.6, 1.0, 1.5, 2.5, 5.0] {
        for (side, x) in [(2.0, 0.0), (1.0, 0.4), (0.6, 1.0)] {
            let screen = upright([x, distance, 1.0], side, side, make);
            let fine = cut(&screen, 40);
            let found = balance(
                std::slice::from_ref(&part),
                &[hot],
                std::slice::from_ref(&screen),
                &ROOM,
            )
            .expect("a balance");
            let heated = &found.screens[0];
            let place = format!("{side} m wide, {distance} m off, {x} m aside");
            assert!(heated.patches.len() <= 98, "{place}");
            assert!(
                (heated.power / fine.power - 1.0).abs() < 0.01,
                "{place}: {} W against {} W",
                heated.power,
                fine.power
            );
            assert!(
                (heated.mean_temperature - fine.mean_temperature).abs() < 2.5,
                "{place}: {} K against {} K",
                heated.mean_temperature,
                fine.mean_temperature
            );
            assert!(
                (heated.hottest_temperature - fine.hottest_temperature).abs() < 0.1,
                "{place}: {} K against {} K at the hottest",
                heated.hottest_temperature,
                fine.hottest_temperature
            );
            for (back, tolerance) in [(0.2, 0.025), (1.0, 0.01), (3.0, 0.01)] {
                let point = DVec3::new(x + 0.1, distance + back, 1.3);
                let (found, expected) = (behind(heated, point), behind(&fine, point));
                assert!(
                    (found / expected - 1.0).abs() < tolerance,
                    "{place}: {found} W/m² {back} m behind it, against {expected} W/m²"
                );
            }
        }
    }
}
