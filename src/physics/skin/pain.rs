//! How long until bare skin hurts under a steady irradiance of all wavelengths.
//!
//! Several published relations disagree by up to a factor of two and more; the
//! shortest time counts, so the order in which they are tried does not matter.

use super::{Error, dose, irradiance};

/// A published relation between an irradiance and the time to pain.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Relation {
    /// t = (35/q)^1.33 s, q in kW/m², above 1.7 kW/m².
    ///
    /// # Source
    ///
    /// SFPE Engineering Guide, *Predicting 1st and 2nd Degree Skin Burns from
    /// Thermal Radiation* (2000), pain correlation; from memory. The ratio is
    /// raised to the power, not the irradiance alone.
    Guide2000,
    /// t = 125·q^-1.9 s, q in kW/m², above 1.7 kW/m².
    ///
    /// # Source
    ///
    /// Mudan and Croce in a handbook of fire protection engineering; from
    /// memory, less surely than the others.
    MudanCroce,
    /// The table of older editions of API 521, 1.74 kW/m² to 19.87 kW/m²,
    /// straight lines between its points on logarithmic scales.
    ///
    /// # Source
    ///
    /// API 521, older editions, exposure times to pain; from memory.
    FlareTable,
    /// The table of Stoll and Greene, 4.2 kW/m² to 16.8 kW/m², straight lines
    /// between its points on logarithmic scales.
    ///
    /// # Source
    ///
    /// Stoll and Greene, *Journal of Applied Physiology* 14:373 (1959),
    /// blackened forearm skin; from memory.
    StollGreene,
    /// Rows of a data sheet on thermal stress, 1.5 kW/m² to 10 kW/m²: the
    /// lower end of each row's range, and between rows that of the hotter one.
    ///
    /// # Source
    ///
    /// An oil company's guide (1991) after Hymes (1983); read in a reprint.
    Hymes,
    /// The thermal dose for pain, by the lower end of its range, 86
    /// (kW/m²)^(4/3)·s; for any irradiance, since no range is given with it.
    ///
    /// # Source
    ///
    /// HSL/2004/04 and sources in it; thresholds read in a text that cites it.
    Dose,
}

/// A time to pain and the relation that gave it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Shortest {
    /// The time, in seconds.
    pub time: f64,
    /// The relation that gives the shortest time here.
    pub relation: Relation,
}

/// Effective irradiance from which skin is said to hurt in long exposure, W/m²;
/// no time is given with it.
///
/// Another quantity, net of the body's own exchange, and another scale of time
/// than the relations here, which take no pain below 1.5 kW/m² to 1.7 kW/m²:
/// the two are never merged.
///
/// # Source
///
/// DGUV Information 212-013 (2013), section 1.2; read.
pub const LONG_EXPOSURE: f64 = 300.0;

/// Irradiance in W/m² at and below which two of the fits take no pain.
const NO_PAIN: f64 = 1700.0;

/// Irradiance in kW/m² and time to pain in s, API 521, older editions.
const FLARE: [(f64, f64); 8] = [
    (1.74, 60.0),
    (2.33, 40.0),
    (2.90, 30.0),
    (4.73, 16.0),
    (6.94, 9.0),
    (9.46, 6.0),
    (11.67, 4.0),
    (19.87, 2.0),
];

/// Irradiance in kW/m² and time to pain in s, Stoll and Greene.
const FOREARM: [(f64, f64); 5] = [
    (4.2, 13.5),
    (6.3, 7.8),
    (8.4, 5.5),
    (12.6, 2.9),
    (16.8, 2.2),
];

/// Hottest irradiance of each row in kW/m² and the shortest time it gives in s,
/// after Hymes; nothing hurts at 1.5 kW/m² and below.
const ROWS: [(f64, f64); 5] = [
    (1.8, 120.0),
    (3.0, 30.0),
    (4.0, 15.0),
    (6.0, 10.0),
    (10.0, 5.0),
];

impl Relation {
    /// All relations.
    pub const ALL: [Relation; 6] = [
        Relation::Guide2000,
        Relation::MudanCroce,
        Relation::FlareTable,
        Relation::StollGreene,
        Relation::Hymes,
        Relation::Dose,
    ];

    /// Returns who published the relation and how it is known here.
    #[must_use]
    pub const fn source(self) -> &'static str {
        match self {
            Relation::Guide2000 => "SFPE Engineering Guide (2000), recalled",
            Relation::MudanCroce => "Mudan and Croce, recalled",
            Relation::FlareTable => "API 521, older editions, recalled",
            Relation::StollGreene => "Stoll and Greene (1959), recalled",
            Relation::Hymes => "oil company's guide (1991) after Hymes (1983), read in a reprint",
            Relation::Dose => {
                "thermal dose for pain after HSL/2004/04, read in a text that cites it"
            }
        }
    }

    /// Returns the time until bare skin hurts, in seconds; none where the
    /// relation says nothing, or takes no pain.
    ///
    /// `total` is the steady irradiance of all wavelengths, W/m².
    ///
    /// # Accuracy
    ///
    /// The relation to 1e-14 relative; how far it is from a given person is
    /// not known, and a factor of two between the relations is common.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the irradiance is negative, above 10⁹ W/m² or
    /// not finite.
    ///
    /// # Source
    ///
    /// Beside each relation. Checked in `tests/published/time_to_pain.rs`.
    pub fn time(self, total: f64) -> Result<Option<f64>, Error> {
        let total = irradiance("irradiance on the skin", total)?;
        let q = total / 1000.0;
        let fitted = total > NO_PAIN;
        Ok(match self {
            Relation::Guide2000 => fitted.then(|| (35.0 / q).powf(1.33)),
            Relation::MudanCroce => fitted.then(|| 125.0 * q.powf(-1.9)),
            Relation::FlareTable => between(&FLARE, q),
            Relation::StollGreene => between(&FOREARM, q),
            Relation::Hymes => (q > 1.5)
                .then(|| ROWS.iter().find(|(most, _)| q <= *most))
                .flatten()
                .map(|(_, time)| *time),
            Relation::Dose => (total > 0.0)
                .then(|| dose::Threshold::Pain.least() / total.powf(4.0 / 3.0))
                .filter(|time| time.is_finite()),
        })
    }
}

/// Returns the shortest time until bare skin hurts by any of the relations;
/// none at zero irradiance, and where a stay would last over 10⁹ s.
///
/// `total` is the steady irradiance of all wavelengths, W/m². It never tells
/// that a shorter stay is free of harm: it is evidence of where pain begins.
///
/// # Accuracy
///
/// As [`Relation::time`].
///
/// # Errors
///
/// As [`Relation::time`].
///
/// # Source
///
/// As the [`Relation`] that it names.
///
/// # Examples
///
/// ```
/// let pain = farglow::physics::skin::pain::shortest(4730.0).unwrap().unwrap();
/// assert!(pain.time < 7.0);
/// ```
pub fn shortest(total: f64) -> Result<Option<Shortest>, Error> {
    let mut best: Option<Shortest> = None;
    for relation in Relation::ALL {
        if let Some(time) = relation.time(total)?
            && time <= super::LONGEST_TIME
            && best.is_none_or(|best| time < best.time)
        {
            best = Some(Shortest { time, relation });
        }
    }
    Ok(best)
}

/// Returns what a table gives, straight lines on logarithmic scales; none
/// outside it.
pub(super) fn between(table: &[(f64, f64)], x: f64) -> Option<f64> {
    if let Some((_, y)) = table.iter().find(|(at, _)| *at == x) {
        return Some(*y);
    }
    let pair = table
        .windows(2)
        .find(|pair| pair[0].0 < x && x < pair[1].0)?;
    let share = (x / pair[0].0).ln() / (pair[1].0 / pair[0].0).ln();
    Some(pair[0].1 * (pair[1].1 / pair[0].1).powf(share))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn tables_give_their_own_points_and_nothing_beyond() {
        for (relation, table) in [
            (Relation::FlareTable, &FLARE[..]),
            (Relation::StollGreene, &FOREARM[..]),
        ] {
            for (q, time) in table {
                let found = relation.time(q * 1000.0).expect("a fair irradiance");
                let found = found.unwrap_or_else(|| panic!("{relation:?} is silent at {q}"));
                assert!((found / time - 1.0).abs() < 1e-12, "{found} against {time}");
            }
            let last = table[table.len() - 1].0;
            for q in [table[0].0 * 0.999, last * 1.001] {
                assert_eq!(relation.time(q * 1000.0), Ok(None), "{relation:?} at {q}");
            }
        }
    }

    #[test]
    fn pain_never_comes_later_under_more_heat() {
        let mut last = f64::INFINITY;
        for step in 1..20_000_u32 {
            let q = f64::from(step) * 5.0;
            if let Some(found) = shortest(q).expect("a fair irradiance") {
                assert!(found.time <= last, "{} s after {last} s at {q}", found.time);
                last = found.time;
            }
        }
    }

    #[test]
    fn shortest_is_no_longer_than_any_relation() {
        for q in [300.0, 1690.0, 1701.0, 2200.0, 4730.0, 9460.0, 40_000.0] {
            let best = shortest(q).expect("fair").expect("it hurts at some time");
            for relation in Relation::ALL {
                if let Some(time) = relation.time(q).expect("fair") {
                    assert!(
                        best.time <= time,
                        "{relation:?}: {time} below {}",
                        best.time
                    );
                }
            }
        }
    }

    #[test]
    fn edges_are_answered_or_refused() {
        assert_eq!(shortest(0.0), Ok(None));
        assert_eq!(Relation::Hymes.time(1500.0), Ok(None));
        assert_eq!(Relation::Hymes.time(1501.0), Ok(Some(120.0)));
        assert_eq!(Relation::Hymes.time(10_001.0), Ok(None));
        assert_eq!(Relation::Guide2000.time(1700.0), Ok(None));
        for wrong in [-1.0, f64::NAN, f64::INFINITY, 2e9] {
            assert!(shortest(wrong).is_err(), "{wrong} was taken");
        }
        assert_eq!(shortest(5e-324), Ok(None), "no infinite time");
    }
}
