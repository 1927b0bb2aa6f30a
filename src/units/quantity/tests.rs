use super::*;

const ROOM: Quantity = Quantity::new(293.15, Dimension::TEMPERATURE);
const STEP: Quantity = Quantity {
    si: 20.0,
    dimension: Dimension::TEMPERATURE,
    sense: Sense::Difference,
};
const POINT: Quantity = Quantity {
    si: 1523.15,
    dimension: Dimension::TEMPERATURE,
    sense: Sense::Point,
};

fn length(si: f64) -> Quantity {
    Quantity::new(si, Dimension::LENGTH)
}

#[test]
fn sums_need_the_same_kind() {
    assert_eq!(length(1.0).plus(length(2.0)), Ok(length(3.0)));
    let code = |result: Result<Quantity, Error>| result.map_err(|error| error.code());
    let number = Quantity::number(1.0);
    assert_eq!(code(length(1.0).plus(number)), Err("dimension"));
    assert_eq!(code(number.minus(length(1.0))), Err("dimension"));
    let radiance = Quantity::new(1.0, Dimension::RADIANCE);
    let irradiance = Quantity::new(1.0, Dimension::IRRADIANCE);
    assert_eq!(code(radiance.plus(irradiance)), Err("dimension"));
}

#[test]
fn temperatures_keep_their_sense() {
    let table = [
        ("point - point", POINT.minus(POINT), Ok(Sense::Difference)),
        ("point - absolute", POINT.minus(ROOM), Ok(Sense::Difference)),
        (
            "absolute - absolute",
            ROOM.minus(ROOM),
            Ok(Sense::Difference),
        ),
        ("absolute - step", ROOM.minus(STEP), Ok(Sense::Plain)),
        ("absolute + step", ROOM.plus(STEP), Ok(Sense::Plain)),
        ("step + step", STEP.plus(STEP), Ok(Sense::Difference)),
        ("absolute lowered", ROOM.lowered(ROOM), Ok(Sense::Plain)),
        (
            "2 steps",
            STEP.times(Quantity::number(2.0)),
            Ok(Sense::Difference),
        ),
        (
            "2 times step",
            Quantity::number(2.0).times(STEP),
            Ok(Sense::Difference),
        ),
        (
            "step / 2",
            STEP.over(Quantity::number(2.0)),
            Ok(Sense::Difference),
        ),
        ("step / step", STEP.over(STEP), Ok(Sense::Plain)),
        ("-step", STEP.negated(), Ok(Sense::Difference)),
        ("point + step", POINT.plus(STEP), Err("point-in-arithmetic")),
        (
            "point - step",
            POINT.minus(STEP),
            Err("point-in-arithmetic"),
        ),
        (
            "point lowered",
            POINT.lowered(ROOM),
            Err("point-in-arithmetic"),
        ),
        (
            "2 * point",
            Quantity::number(2.0).times(POINT),
            Err("point-in-arithmetic"),
        ),
        (
            "point / 2",
            POINT.over(Quantity::number(2.0)),
            Err("point-in-arithmetic"),
        ),
        ("-point", POINT.negated(), Err("point-in-arithmetic")),
        (
            "point²",
            POINT.power(Quantity::number(2.0)),
            Err("point-in-arithmetic"),
        ),
    ];
    for (name, result, expected) in table {
        let found = result.map(|q| q.sense).map_err(|error| error.code());
        assert_eq!(found, expected, "{name}");
    }
    assert_eq!(POINT.compare(ROOM), Ok(Ordering::Greater));
    assert!(POINT.compare(STEP).is_err(), "a point is no difference");
    assert_eq!(POINT.absolute().sense, Sense::Plain);
}

#[test]
fn powers_keep_whole_units_or_are_refused() {
    let fourth = Quantity::new(16.0, Dimension::TEMPERATURE.power(4).expect("fits"));
    let area = Quantity::new(16.0, Dimension::AREA);
    let table = [
        (area, 0.5, Ok((4.0, Dimension::LENGTH))),
        (area, 1.5, Ok((64.0, Dimension::VOLUME))),
        (
            area,
            -1.0,
            Ok((0.0625, Dimension::LENGTH.power(-2).expect("fits"))),
        ),
        (fourth, 0.25, Ok((2.0, Dimension::TEMPERATURE))),
        (length(3.0), 2.0, Ok((9.0, Dimension::AREA))),
        (length(3.0), 0.0, Ok((1.0, Dimension::NONE))),
        (length(-2.0), 3.0, Ok((-8.0, Dimension::VOLUME))),
        (
            Quantity::number(2.0),
            0.37,
            Ok((2.0_f64.powf(0.37), Dimension::NONE)),
        ),
        (Quantity::number(-8.0), 0.5, Err("negative-root")),
        (Quantity::number(0.0), -1.0, Err("division-by-zero")),
        (Quantity::number(1e200), 2.0, Err("not-finite")),
        (length(2.0), 0.5, Err("broken-power")),
        (length(2.0), 0.37, Err("broken-power")),
        (length(1.0), 200.0, Err("exponent-range")),
        (area, 100.0, Err("exponent-range")),
    ];
    for (base, exponent, expected) in table {
        let result = base.power(Quantity::number(exponent));
        let found = result
            .map(|q| (q.si, q.dimension))
            .map_err(|error| error.code());
        assert_eq!(found, expected, "{base:?} ^ {exponent}");
    }
    let found = length(1.0).power(length(1.0)).map_err(|error| error.code());
    assert_eq!(found, Err("exponent"));
}

#[test]
fn nothing_leaves_that_is_not_finite() {
    let huge = Quantity::number(1e308);
    let code = |result: Result<Quantity, Error>| result.map_err(|error| error.code());
    assert_eq!(code(huge.plus(huge)), Err("not-finite"));
    assert_eq!(code(huge.times(huge)), Err("not-finite"));
    assert_eq!(code(huge.over(Quantity::number(1e-10))), Err("not-finite"));
    assert_eq!(
        code(huge.over(Quantity::number(0.0))),
        Err("division-by-zero")
    );
    assert_eq!(
        code(huge.over(Quantity::number(-0.0))),
        Err("division-by-zero")
    );
}

#[test]
fn a_difference_is_shown_in_kelvin_alone() {
    let celsius = Unit::parse("°C").expect("known");
    let kelvin = Unit::parse("K").expect("known");
    assert_eq!(STEP.to_unit(&kelvin), Ok(20.0));
    let code = STEP.to_unit(&celsius).map_err(|error| error.code());
    assert_eq!(code, Err("difference-on-scale"));
    assert_eq!(POINT.to_unit(&celsius), Ok(1250.0));
    let metre = Unit::parse("m").expect("known");
    let code = POINT.to_unit(&metre).map_err(|error| error.code());
    assert_eq!(code, Err("dimension"));
}

#[test]
fn same_bits_tells_zeros_and_senses_apart() {
    assert!(length(0.5).same_bits(&length(0.5)));
    assert!(!length(0.0).same_bits(&length(-0.0)));
    assert!(!ROOM.same_bits(&Quantity {
        sense: Sense::Point,
        ..ROOM
    }));
    assert!(!length(1.0).same_bits(&Quantity::number(1.0)));
}
