//! What is printed reads back as what it was, and rounding goes the way that
//! was asked.

use farglow::units::format::{Rounding, quantity, safe_distance, significant};
use farglow::units::{Literal, Unit};
use proptest::prelude::*;

const UNITS: &[&str] = &[
    "",
    "nm",
    "µm",
    "mm",
    "cm",
    "m",
    "in",
    "ft",
    "s",
    "min",
    "h",
    "K",
    "W",
    "kW",
    "W/m²",
    "kW/m²",
    "mW/cm²",
    "W/cm²",
    "cal/(cm²·s)",
    "kcal/(m²·h)",
    "Btu/(h·ft²)",
    "J/m²",
    "kJ/m²",
    "W/(m²·sr)",
    "Pa",
    "kPa",
    "m/s",
    "kg",
    "sr",
    "mrad",
    "°",
    "%",
    "W/(m²·K⁴)",
    "s⁻¹",
];

fn read(text: &str) -> Result<Literal, TestCaseError> {
    let literal = Literal::read(text);
    let literal = literal.map_err(|error| TestCaseError::fail(format!("{text}: {error}")))?;
    prop_assert_eq!(
        literal.length,
        text.len(),
        "{} is not read to its end",
        text
    );
    Ok(literal)
}

fn number() -> impl Strategy<Value = f64> {
    (-1.0..1.0_f64, -12_i32..13).prop_map(|(mantissa, exponent)| mantissa * 10_f64.powi(exponent))
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 3_000, ..ProptestConfig::default() })]

    #[test]
    fn fifteen_figures_read_back_as_the_same_quantity(si in number(), unit in prop::sample::select(UNITS)) {
        let unit = Unit::parse(unit).expect("known");
        let text = quantity(si, &unit, 15, Rounding::Nearest);
        let literal = read(&text)?;
        let found = literal.quantity();
        prop_assert_eq!(found.dimension, unit.dimension());
        let close = (found.si - si).abs() <= 1e-14 * si.abs();
        prop_assert!(close, "{}: {:e} against {:e}", text, found.si, si);
    }

    #[test]
    fn a_unit_reads_back_from_its_own_symbol(above in prop::sample::select(UNITS), below in prop::sample::select(UNITS)) {
        let text = format!("({above})/({below})");
        if let Ok(unit) = Unit::parse(&text) {
            let again = Unit::parse(unit.symbol());
            prop_assert_eq!(again.as_ref(), Ok(&unit), "{}", text);
        }
    }

    #[test]
    fn rounding_brackets_the_value(value in number(), figures in 1_u32..10) {
        let read = |rounding| read(&significant(value, figures, rounding)).map(|l| l.number);
        let (down, near, up) = (read(Rounding::Down)?, read(Rounding::Nearest)?, read(Rounding::Up)?);
        let hair = 1.1e-9 * value.abs();
        prop_assert!(down <= value + hair && value - hair <= up, "{} {} {}", down, value, up);
        prop_assert!(down <= near && near <= up, "{} {} {}", down, near, up);
        let step = 10_f64.powf(value.abs().log10().floor() + 1.0 - f64::from(figures));
        prop_assert!(up - down <= step * 1.000_001, "{} to {} is more than {}", down, up, step);
    }

    #[test]
    fn a_safe_distance_is_never_short_and_at_most_a_step_long(si in 0.0..1e6_f64) {
        let shown = read(&safe_distance(si))?.number;
        prop_assert!(shown >= si * (1.0 - 1.1e-9), "{} shown for {}", shown, si);
        prop_assert!(shown - si <= 0.1 + 1e-9, "{} shown for {}", shown, si);
    }

    #[test]
    fn typed_text_keeps_its_number(number in 0.0..1e9_f64, spread in 0.0..1e3_f64) {
        let text = format!("{number} ± {spread} kW/m²");
        let literal = read(&text)?;
        prop_assert_eq!(literal.number.to_bits(), number.to_bits());
        prop_assert_eq!(literal.spread.map(f64::to_bits), Some(spread.to_bits()));
    }
}
