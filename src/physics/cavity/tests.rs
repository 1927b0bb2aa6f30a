use super::*;

#[test]
fn what_leaves_the_mouth_is_what_the_walls_give_off() {
    for depth in [0.05, 0.5, 1.0, 3.0, 10.0, 100.0] {
        for emissivity in [0.05, 0.3, 0.9] {
            let cylinder = Cylinder::new(depth, emissivity).expect("a possible cavity");
            let (left, given) = (cylinder.apparent(), cylinder.given_off(emissivity));
            assert!(
                (left - given).abs() < 5e-6,
                "L/R {depth}, ε {emissivity}: {left} leaves, {given} is given off"
            );
        }
    }
}

#[test]
fn more_terms_change_nothing() {
    for depth in [0.1, 1.0, 4.0, 30.0] {
        for emissivity in [0.1, 0.5] {
            let found = Cylinder::new(depth, emissivity).expect("a possible cavity");
            let finer = Cylinder::with_terms(depth, emissivity, 60, 50).expect("a possible cavity");
            let (found, expected) = (found.apparent(), finer.apparent());
            assert!(
                (found - expected).abs() < 1e-6,
                "L/R {depth}, ε {emissivity}: {found} against {expected}"
            );
        }
    }
}

#[test]
fn deeper_cavities_are_blacker_and_never_black() {
    for emissivity in [0.05, 0.5, 0.95] {
        let mut last = emissivity;
        for depth in [0.01, 0.1, 1.0, 10.0, 100.0] {
            let found = of_cylinder(2.0, 2.0 * depth, emissivity).expect("a possible cavity");
            let even = enclosure(1.0 / (1.0 + 2.0 * depth), emissivity).expect("an enclosure");
            assert!(
                last < found && found <= even && even < 1.0,
                "L/R {depth}, ε {emissivity}: {found} after {last}, below {even}"
            );
            last = found;
        }
        assert_eq!(
            of_cylinder(1.0, 3.0, 1.0).map(|black| (black * 1e12).round()),
            Ok(1e12)
        );
    }
}

#[test]
fn impossible_cavities_are_refused_by_name() {
    for (made, expected) in [
        (
            of_cylinder(1.0, 101.0, 0.5),
            "depth over radius must be above 0 and at most 100, found 101",
        ),
        (
            gouffe(0.0, 1.0, 0.5),
            "radius must be from 10⁻⁹ m to 10⁹ m, found 0",
        ),
        (
            of_cylinder(1.0, f64::NAN, 0.5),
            "depth must be from 10⁻⁹ m to 10⁹ m, found NaN",
        ),
        (
            gouffe(1.0, 1.0, 1.1),
            "emissivity must be above 0 and at most 1, found 1.1",
        ),
        (
            enclosure(0.0, 0.5),
            "mouth over wall must be above 0 and at most 1, found 0",
        ),
    ] {
        let found = made.map_or_else(|error| error.to_string(), |made| made.to_string());
        assert_eq!(found, expected);
    }
}
