use super::*;
use crate::physics::region::Region;

const ROOM: f64 = 298.15;

fn view(region: &Region, point: DVec3) -> View {
    region.view(point).into_view().expect("clear of the source")
}

#[test]
fn room_alone_gives_its_own_temperature() {
    let sphere = mean_temperature_of_sphere(&[], &[], ROOM).expect("a room");
    assert!((sphere - ROOM).abs() < 1e-10, "{sphere}");
    for posture in [Posture::Standing, Posture::Seated] {
        let person = mean_temperature_of_person(&[], &[], ROOM, posture, DVec3::Y).expect("a room");
        assert!((person - ROOM).abs() < 1e-10, "{person}");
    }
    // A source as warm as the room changes nothing.
    let door = Region::disc(DVec3::new(0.0, 2.0, 0.3), DVec3::NEG_Y, 0.7).expect("a disc");
    let seen = view(&door, DVec3::ZERO);
    let exitance = planck::exitance(ROOM);
    let person = mean_temperature_of_person(
        &[seen],
        &[exitance],
        ROOM,
        Posture::Standing,
        DVec3::new(1.0, 1.0, 3.0),
    )
    .expect("a door");
    assert!((person - ROOM).abs() < 1e-10, "{person}");
}

/// A second way to the sphere: the irradiance on each piece of its surface, by
/// quadrature over all normals, is in the mean what the solid angle says.
#[test]
fn sphere_takes_up_the_mean_over_all_normals() {
    let (radius, distance) = (0.6_f64, 1.5_f64);
    let disc = Region::disc(DVec3::new(0.0, distance, 0.0), DVec3::NEG_Y, radius).expect("a disc");
    let seen = view(&disc, DVec3::ZERO);
    let exitance = 150e3;
    let angle = 2.0 * PI * (1.0 - distance / distance.hypot(radius));
    let solid_angle = seen.solid_angle();
    assert!(
        (solid_angle - angle).abs() < 1e-8,
        "{solid_angle} sr against {angle} sr"
    );
    let found = mean_temperature_of_sphere(&[solid_angle], &[exitance], ROOM).expect("a disc");
    let (rings, steps) = (400_u32, 64_u32);
    let mut sum = 0.0;
    for ring in 0..rings {
        // Rings about the axis to the disc, of equal areas.
        let y = -1.0 + 2.0 * (f64::from(ring) + 0.5) / f64::from(rings);
        for step in 0..steps {
            let turn = 2.0 * PI * f64::from(step) / f64::from(steps);
            let across = (1.0 - y * y).sqrt();
            let normal = DVec3::new(across * turn.cos(), y, across * turn.sin());
            let factor = seen.factor(normal);
            sum += exitance * factor + (1.0 - factor) * planck::exitance(ROOM);
        }
    }
    let expected = (sum / f64::from(rings * steps) / STEFAN_BOLTZMANN).powf(0.25);
    assert!(
        (found - expected).abs() < 0.01,
        "{found} K against {expected} K by quadrature"
    );
}

/// A person turned to a source takes up more than one turned away sideways,
/// front and back are alike, and a source adds.
#[test]
fn person_takes_up_most_from_in_front() {
    let door = Region::rectangle(DVec3::new(0.0, 2.5, 0.2), DVec3::NEG_Y, DVec3::Z, 0.9, 0.7)
        .expect("a door");
    let seen = view(&door, DVec3::ZERO);
    let of = |posture, faces| {
        mean_temperature_of_person(std::slice::from_ref(&seen), &[290e3], ROOM, posture, faces)
            .expect("a door")
    };
    let (front, back, side) = (
        of(Posture::Standing, DVec3::Y),
        of(Posture::Standing, DVec3::NEG_Y),
        of(Posture::Standing, DVec3::X),
    );
    assert!((front - back).abs() < 1e-9, "{front} {back}");
    assert!(front > side && side > ROOM, "{front} {side}");
    // By hand: only the normal to the door and, a little, the top see it.
    let (ahead, up) = (seen.factor(DVec3::Y), seen.factor(DVec3::Z));
    let left = seen.factor(DVec3::X);
    let gain = 290e3 - planck::exitance(ROOM);
    let down = seen.factor(DVec3::NEG_Z);
    let sum = 0.35 * ahead + 0.08 * (up + down) + 0.23 * 2.0 * left;
    let expected = ((planck::exitance(ROOM) + gain * sum / 1.32) / STEFAN_BOLTZMANN).powf(0.25);
    assert!(
        (front - expected).abs() < 1e-9,
        "{front} against {expected}"
    );
}

#[test]
fn surfaces_gain_what_they_absorb_less_what_they_emit() {
    let room = background(ROOM, 0.0).expect("a room");
    assert!((room - planck::exitance(ROOM)).abs() < 1e-12, "{room}");
    let net = net_heat(0.0, room, 0.9, 0.98, ROOM).expect("in balance");
    assert!(net.abs() < 1e-10, "{net}");
    let net = net_heat(5000.0, 0.9 * room, 0.9, 0.98, 306.15).expect("a face");
    let expected = 4500.0 + 0.98 * (0.9 * room - planck::exitance(306.15));
    assert!((net - expected).abs() < 1e-9, "{net} against {expected}");
    let half = background(ROOM, 0.25).expect("a room");
    assert!((half - 0.75 * room).abs() < 1e-10, "{half}");
}

#[test]
fn globe_reads_back_what_it_was_given() {
    for diameter in [0.04, 0.1, 0.15] {
        for speed in [0.0, 0.3, 4.0] {
            let globe = Globe::new(diameter, 0.95, 303.15, speed).expect("a globe");
            for radiant in [290.0, 303.15, 320.0, 400.0, 700.0] {
                let reading = globe.reading(radiant).expect("a temperature");
                let found = globe.radiant_temperature(reading).expect("its inverse");
                assert!(
                    (found / radiant - 1.0).abs() < 1e-10,
                    "{diameter} m, {speed} m/s: {radiant} K reads {reading} K, shows {found} K"
                );
            }
        }
    }
}

#[test]
fn impossible_radiant_inputs_are_refused_by_name() {
    let text = |error: Result<f64, Error>| error.expect_err("refused").to_string();
    for (found, expected) in [
        (
            text(background(0.0, 0.1)),
            "temperature of the room must be above 0 K and at most 100000 K, found 0",
        ),
        (
            text(background(300.0, 1.1)),
            "configuration factor must be from 0 to 1, found 1.1",
        ),
        (
            text(net_heat(-1.0, 0.0, 1.0, 1.0, 300.0)),
            "irradiance must be from 0 W/m² to 10¹⁵ W/m², found -1",
        ),
        (
            text(mean_temperature_of_sphere(&[13.0], &[1.0], 300.0)),
            "solid angle must be from 0 sr to 4π sr, found 13",
        ),
        (
            text(mean_temperature_of_sphere(&[1.0], &[f64::NAN], 300.0)),
            "exitance must be a finite number, found NaN",
        ),
        (
            text(mean_temperature_of_person(
                &[],
                &[],
                300.0,
                Posture::Seated,
                DVec3::Z,
            )),
            "facing direction must point in a direction, found a vector of length 0",
        ),
        (
            text(Globe::new(0.001, 0.95, 300.0, 0.1).and_then(|globe| globe.reading(300.0))),
            "diameter of the globe must be from 0.01 m to 1 m, found 0.001",
        ),
        (
            text(
                Globe::new(0.15, 0.95, 300.0, 50.0)
                    .and_then(|globe| globe.radiant_temperature(200.0)),
            ),
            "globe temperature must be one that an enclosure above 0 K can bring about in this air, found 200",
        ),
    ] {
        assert_eq!(found, expected);
    }
}
