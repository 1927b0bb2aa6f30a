//! The one place where numbers become text. What people act on is rounded to
//! the safe side; a hair of rounding noise (1e-9 relative) costs no step.
//! Decimal point, thin spaces in groups of three, no locale.

use super::dimension::superscript;
use super::{Dimension, Quantity, Sense, Unit};

/// One foot in metres, exact (NIST SP 811, B.8).
const FOOT: f64 = 0.3048;

/// Which way a number is rounded.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Rounding {
    /// To the nearest, ties to the even digit of the exact binary value.
    Nearest,
    /// Towards greater numbers.
    Up,
    /// Towards smaller numbers.
    Down,
}

/// What groups digits: a narrow no-break space.
pub const GROUP: char = '\u{202f}';

/// What stands for a number that is infinite or undefined; results never are.
pub const NOT_FINITE: &str = "not a finite number";

/// How much a value may overshoot a step, relative to itself, and still count
/// as that step: the noise of a chain of `f64` operations, far below anything
/// that can be measured.
const HAIR: f64 = 1e-9;

/// Returns `value` at a number of significant figures (1 to 15).
///
/// Plain digits from 0.0001 to below 10⁹, in groups of three from five digits
/// on; beyond, `1.25×10⁻⁷`.
///
/// # Examples
///
/// ```
/// use farglow::units::format::{Rounding, significant};
///
/// assert_eq!(significant(8.7349, 3, Rounding::Nearest), "8.73");
/// assert_eq!(significant(8.7349, 3, Rounding::Up), "8.74");
/// assert_eq!(significant(289_938.6, 3, Rounding::Up), "290\u{202f}000");
/// ```
pub fn significant(value: f64, figures: u32, rounding: Rounding) -> String {
    if !value.is_finite() {
        return NOT_FINITE.to_owned();
    }
    let figures = figures.clamp(1, 15) as usize;
    if value == 0.0 {
        return decimal("0", figures, 0);
    }
    // `{:e}` rounds the exact binary value to the nearest decimal.
    let nearest = format!("{:.*e}", figures - 1, value.abs());
    let (mantissa, exponent) = nearest.split_once('e').expect("`{:e}` writes an e");
    let mut exponent: i32 = exponent.parse().expect("`{:e}` writes a whole exponent");
    let mut digits: u64 = mantissa
        .replace('.', "")
        .parse()
        .expect("`{:e}` writes digits and a point");
    let away = match rounding {
        Rounding::Nearest => None,
        Rounding::Up => Some(value > 0.0),
        Rounding::Down => Some(value < 0.0),
    };
    if let Some(away) = away {
        let shown: f64 = nearest.parse().expect("`{:e}` writes a number");
        let excess = (shown - value.abs()) / value.abs();
        if away && excess < -HAIR {
            digits += 1;
        } else if !away && excess > HAIR {
            digits -= 1;
        }
        let first = 10_u64.pow(figures as u32 - 1);
        if digits < first {
            // 1.00 stepped down to 0.99: the next lower with all its figures.
            exponent -= 1;
            digits = digits * 10 + 9;
        } else if digits >= first * 10 {
            exponent += 1;
            digits /= 10;
        }
    }
    let sign = if value < 0.0 { "−" } else { "" };
    format!("{sign}{}", decimal(&digits.to_string(), figures, exponent))
}

/// Writes significant digits with the decimal exponent of the first one.
fn decimal(digits: &str, figures: usize, exponent: i32) -> String {
    if !(-4..9).contains(&exponent) {
        let (first, rest) = digits.split_at(1);
        let point = if rest.is_empty() { "" } else { "." };
        let power = superscript(i64::from(exponent));
        return format!("{first}{point}{rest}×10{power}");
    }
    if exponent < 0 {
        let zeros = "0".repeat(exponent.unsigned_abs() as usize - 1);
        return format!("0.{zeros}{digits}");
    }
    let whole = exponent.unsigned_abs() as usize + 1;
    let padded = format!("{digits:0<width$}", width = whole.max(figures));
    let (whole, places) = padded.split_at(whole);
    let point = if places.is_empty() { "" } else { "." };
    format!("{}{point}{places}", grouped(whole))
}

/// Puts thin spaces between groups of three digits, from five digits on.
fn grouped(whole: &str) -> String {
    if whole.len() < 5 {
        return whole.to_owned();
    }
    let mut text = String::new();
    for (index, digit) in whole.chars().enumerate() {
        if index > 0 && (whole.len() - index).is_multiple_of(3) {
            text.push(GROUP);
        }
        text.push(digit);
    }
    text
}

fn with_unit(number: &str, symbol: &str) -> String {
    if symbol.is_empty() {
        number.to_owned()
    } else {
        format!("{number} {symbol}")
    }
}

/// Returns a quantity of `si` coherent SI units in `unit`: `8.73 kW/m²`.
///
/// The figures are those of the number shown. A value of a scale (°C, °F) is
/// read as a point on it.
pub fn quantity(si: f64, unit: &Unit, figures: u32, rounding: Rounding) -> String {
    with_unit(
        &significant(unit.from_si(si), figures, rounding),
        unit.symbol(),
    )
}

/// Returns a quantity with every digit that it has: for faults, where a rounded
/// number could look like one that is allowed.
///
/// # Examples
///
/// ```
/// use farglow::units::{Unit, format};
///
/// assert_eq!(format::exactly(1.0001, &Unit::one()), "1.0001");
/// ```
#[must_use]
pub fn exactly(si: f64, unit: &Unit) -> String {
    let number = unit.from_si(si);
    let text = format!("{}", number.abs());
    let sign = if number < 0.0 { "−" } else { "" };
    with_unit(&format!("{sign}{text}"), unit.symbol())
}

/// Returns a quantity in the unit that reads best, or in `hint` if that
/// measures the same kind; a difference of temperatures is always in kelvin.
///
/// # Examples
///
/// ```
/// use farglow::units::format::{Rounding, of};
/// use farglow::units::Literal;
///
/// let hearth = Literal::read("1523.15 K").expect("this is a literal").quantity();
/// assert_eq!(of(hearth, None, 4, Rounding::Nearest), "1250 °C");
/// let rise = hearth.minus(hearth)?;
/// assert_eq!(of(rise, None, 1, Rounding::Nearest), "0 K");
/// # Ok::<(), farglow::units::Error>(())
/// ```
pub fn of(value: Quantity, hint: Option<&Unit>, figures: u32, rounding: Rounding) -> String {
    let unit = natural_unit(value.dimension, value.si, hint);
    if value.sense == Sense::Difference && unit.is_scale() {
        let kelvin = Unit::coherent(Dimension::TEMPERATURE);
        return quantity(value.si, &kelvin, figures, rounding);
    }
    quantity(value.si, &unit, figures, rounding)
}

/// Returns a quantity as [`of`] does, to the nearest, with at most this many
/// figures: zeros at the end that its value does not need are left out.
///
/// # Examples
///
/// ```
/// use farglow::units::Literal;
/// use farglow::units::format::at_most;
///
/// let area = Literal::read("0.63 m²").expect("this is a literal").quantity();
/// assert_eq!(at_most(area, None, 4), "0.63 m²");
/// ```
pub fn at_most(value: Quantity, hint: Option<&Unit>, figures: u32) -> String {
    let unit = natural_unit(value.dimension, value.si, hint);
    let difference = value.sense == Sense::Difference && unit.is_scale();
    let number = if difference {
        value.si
    } else {
        unit.from_si(value.si)
    };
    let needed = (1..figures).find(|&few| {
        let shown = format!("{:.*e}", few as usize - 1, number);
        shown
            .parse::<f64>()
            .is_ok_and(|shown| (shown - number).abs() <= HAIR * number.abs())
    });
    of(value, hint, needed.unwrap_or(figures), Rounding::Nearest)
}

/// Returns the unit in which a value reads best: `hint` if it measures the same
/// kind of quantity, else the one of the trade for its size.
///
/// A temperature is shown in °C; give K as the hint for a difference.
pub fn natural_unit(dimension: Dimension, si: f64, hint: Option<&Unit>) -> Unit {
    if let Some(hint) = hint
        && hint.dimension() == dimension
    {
        return hint.clone();
    }
    let size = si.abs();
    let pick = |steps: &[(f64, &'static str)], last: &'static str| {
        steps
            .iter()
            .find(|&&(below, _)| size < below)
            .map_or(last, |&(_, symbol)| symbol)
    };
    let symbol = match dimension {
        Dimension::LENGTH if size == 0.0 => "m",
        Dimension::LENGTH => pick(&[(1e-6, "nm"), (1e-4, "µm"), (1e-2, "mm")], "m"),
        Dimension::TIME => pick(&[(120.0, "s"), (7200.0, "min")], "h"),
        Dimension::TEMPERATURE => "°C",
        Dimension::ANGLE => "°",
        Dimension::IRRADIANCE => pick(&[(1e4, "W/m²")], "kW/m²"),
        Dimension::RADIANT_EXPOSURE => pick(&[(1e4, "J/m²")], "kJ/m²"),
        Dimension::RADIANCE => pick(&[(1e4, "W/(m²·sr)")], "kW/(m²·sr)"),
        Dimension::POWER => pick(&[(1e4, "W"), (1e7, "kW")], "MW"),
        Dimension::ENERGY => pick(&[(1e4, "J"), (1e7, "kJ")], "MJ"),
        Dimension::PRESSURE => pick(&[(1e4, "Pa")], "kPa"),
        _ => return Unit::coherent(dimension),
    };
    Unit::parse(symbol).expect("the units above are known")
}

/// Returns a stand-off distance or plate size in metres, up to the next 0.1 m.
pub fn safe_distance(si: f64) -> String {
    if !si.is_finite() {
        return NOT_FINITE.to_owned();
    }
    let tenths = up(si * 10.0);
    if tenths.abs() >= 1e15 {
        return format!("{} m", significant(si, 15, Rounding::Up));
    }
    let sign = if tenths < 0.0 { "−" } else { "" };
    // Whole and below 1e15, so the casts keep every digit.
    let tenths = tenths.abs() as u64;
    format!(
        "{sign}{}.{} m",
        grouped(&(tenths / 10).to_string()),
        tenths % 10
    )
}

/// Returns a stand-off distance of `si` metres in feet, up to the next half
/// foot.
pub fn safe_feet(si: f64) -> String {
    let feet = si / FOOT;
    if !feet.is_finite() {
        return NOT_FINITE.to_owned();
    }
    let halves = up(feet * 2.0);
    if halves.abs() >= 1e15 {
        return format!("{} ft", significant(feet, 15, Rounding::Up));
    }
    let sign = if halves < 0.0 { "−" } else { "" };
    // Whole and below 1e15, so the casts keep every digit.
    let halves = halves.abs() as u64;
    let place = if halves.is_multiple_of(2) { 0 } else { 5 };
    format!("{sign}{}.{place} ft", grouped(&(halves / 2).to_string()))
}

/// Returns a time after which a limit is reached, down to the whole second:
/// what happens, not what is permitted.
pub fn reached(si: f64) -> String {
    if si.is_nan() || si >= 10.0 {
        return safe_time(si);
    }
    let second = Unit::coherent(Dimension::TIME);
    quantity(down(si).max(0.0), &second, 1, Rounding::Down)
}

/// Returns a permitted time, down to the whole second below 10 min and to the
/// whole minute above; below 10 s it is `no planned stay`.
///
/// Below 2 min `95 s`, then `9 min 59 s`, then `45 min`, from 2 h on
/// `3 h 12 min`. A time that is no number permits nothing.
pub fn safe_time(si: f64) -> String {
    if si == f64::INFINITY {
        return NOT_FINITE.to_owned();
    }
    // A time that is no number, or before the start, permits nothing.
    let seconds = if si > 0.0 { down(si) } else { 0.0 };
    if seconds < 10.0 {
        return "no planned stay".to_owned();
    }
    if seconds >= 1e15 {
        let hours = significant(seconds / 3600.0, 3, Rounding::Down);
        return format!("{hours} h");
    }
    // Whole and below 1e15, so the cast keeps every digit.
    let seconds = seconds as u64;
    let minutes = seconds / 60;
    match seconds {
        0..120 => format!("{seconds} s"),
        120..600 => two_parts(minutes, "min", seconds % 60, "s"),
        600..7200 => format!("{minutes} min"),
        _ => two_parts(minutes / 60, "h", minutes % 60, "min"),
    }
}

fn two_parts(large: u64, large_unit: &str, small: u64, small_unit: &str) -> String {
    let large = grouped(&large.to_string());
    if small == 0 {
        format!("{large} {large_unit}")
    } else {
        format!("{large} {large_unit} {small} {small_unit}")
    }
}

/// Returns an irradiance or exitance, up at three figures.
pub fn safe_irradiance(si: f64) -> String {
    let unit = natural_unit(Dimension::IRRADIANCE, si, None);
    quantity(si, &unit, 3, Rounding::Up)
}

/// Returns the ratio of an exposure to its limit, up at three figures.
///
/// Any ratio above one, by however little, reads above `1.00`.
pub fn safe_ratio(ratio: f64) -> String {
    if ratio > 1.0 && ratio < 1.01 {
        return "1.01".to_owned();
    }
    significant(ratio, 3, Rounding::Up)
}

/// Returns what is permitted (a limit, a transmittance, a temperature), rounded
/// down.
pub fn permitted(si: f64, unit: &Unit, figures: u32) -> String {
    quantity(si, unit, figures, Rounding::Down)
}

/// The next whole number upwards, but for a hair of noise.
fn up(steps: f64) -> f64 {
    (steps - steps.abs() * HAIR).ceil()
}

/// The next whole number downwards, but for a hair of noise.
fn down(steps: f64) -> f64 {
    (steps + steps.abs() * HAIR).floor()
}

#[cfg(test)]
mod tests;
