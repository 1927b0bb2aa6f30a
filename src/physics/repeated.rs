//! Exposure that comes in spells: windows, sums and means over a shift.
//!
//! Irradiances in W/m², times in seconds. Between spells there is none. Exact
//! for spells of steady irradiance: extremes lie where a spell begins or ends.

use super::error::Error;
use super::skin::{irradiance, time, within};

/// A spell of steady irradiance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spell {
    /// When it begins, s.
    pub start: f64,
    /// How long it lasts, s.
    pub duration: f64,
    /// Irradiance, W/m², of the band that is judged.
    pub irradiance: f64,
}

/// The most spells that a schedule holds.
pub const MOST_SPELLS: usize = 10_000;

/// The longest window over which the eye is judged by a limit that falls with
/// time, s.
pub const EYE_WINDOW: f64 = 1000.0;

/// Spells in the order of time, none over another.
#[derive(Clone, Debug, PartialEq)]
pub struct Schedule {
    spells: Vec<Spell>,
    /// Dose before each spell, and of all at the end, J/m².
    before: Vec<f64>,
}

/// The window that weighs heaviest against a limit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Worst {
    /// When it begins, s.
    pub from: f64,
    /// When it ends, s.
    pub to: f64,
    /// Its dose, J/m².
    pub dose: f64,
    /// Its dose over that which the limit allows in as long a window; above 1
    /// the limit is passed.
    pub ratio: f64,
}

/// What a schedule is for the eye.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Eye {
    /// The worst window of up to 1000 s against the limit for its own length;
    /// none without any exposure.
    pub window: Option<Worst>,
    /// The worst mean over 1000 s against the limit for long times.
    pub mean: Option<Worst>,
}

impl Eye {
    /// Returns the greater of both ratios; zero without any exposure.
    #[must_use]
    pub fn ratio(&self) -> f64 {
        let ratio = |worst: Option<Worst>| worst.map_or(0.0, |worst| worst.ratio);
        ratio(self.window).max(ratio(self.mean))
    }
}

impl Schedule {
    /// Returns a schedule of spells, in any order.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if there are over 10 000 spells, a number is
    /// negative, above 10⁹ or not finite, or a spell begins before another
    /// one ends.
    pub fn new(mut spells: Vec<Spell>) -> Result<Schedule, Error> {
        let _ = within(
            "number of spells",
            spells.len() as f64,
            0.0,
            MOST_SPELLS as f64,
            "at most 10 000",
        )?;
        for spell in &spells {
            let _ = time("beginning of a spell", spell.start)?;
            let _ = time("duration of a spell", spell.duration)?;
            let _ = irradiance("irradiance of a spell", spell.irradiance)?;
        }
        spells.retain(|spell| spell.duration > 0.0 && spell.irradiance > 0.0);
        spells.sort_by(|a, b| a.start.total_cmp(&b.start));
        for pair in spells.windows(2) {
            let over = pair[0].start + pair[0].duration - pair[1].start;
            // Spells that touch may overlap by the rounding of their sums.
            if over > 1e-9 * pair[1].start.max(1.0) {
                return Err(Error::OutOfRange {
                    parameter: "beginning of a spell",
                    range: "not before the end of the spell before it",
                    value: pair[1].start,
                });
            }
        }
        let mut before = Vec::with_capacity(spells.len() + 1);
        let mut sum = 0.0;
        before.push(sum);
        for spell in &spells {
            sum += spell.duration * spell.irradiance;
            before.push(sum);
        }
        Ok(Schedule { spells, before })
    }

    /// Returns the schedule of one stay that comes again and again.
    ///
    /// `stay` and `rest` between stays in seconds, `times` how often.
    ///
    /// # Errors
    ///
    /// As [`Schedule::new`].
    pub fn repeated(total: f64, stay: f64, rest: f64, times: u32) -> Result<Schedule, Error> {
        let _ = within(
            "number of stays",
            f64::from(times),
            0.0,
            MOST_SPELLS as f64,
            "at most 10 000",
        )?;
        let (stay, rest) = (
            time("duration of a stay", stay)?,
            time("rest between stays", rest)?,
        );
        Schedule::new(
            (0..times)
                .map(|index| Spell {
                    start: f64::from(index) * (stay + rest),
                    duration: stay,
                    irradiance: total,
                })
                .collect(),
        )
    }

    /// Returns the spells with any exposure, in the order of time.
    #[must_use]
    pub fn spells(&self) -> &[Spell] {
        &self.spells
    }

    /// Returns the dose between two times, J/m²; zero if they are turned round.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if a time is negative, above 10⁹ s or not finite.
    pub fn dose(&self, from: f64, to: f64) -> Result<f64, Error> {
        let (from, to) = (
            time("beginning of the window", from)?,
            time("end of the window", to)?,
        );
        Ok((self.until(to) - self.until(from)).max(0.0))
    }

    /// Returns the dose of all spells, J/m²: the sum that ultraviolet over a
    /// day is judged by.
    #[must_use]
    pub fn total(&self) -> f64 {
        self.before[self.spells.len()]
    }

    /// Returns the thermal dose of all spells, (W/m²)^(4/3)·s, as if no heat
    /// left between them: the safe side.
    ///
    /// # Source
    ///
    /// As [`super::skin::dose::steady`].
    #[must_use]
    pub fn thermal_dose(&self) -> f64 {
        self.spells
            .iter()
            .map(|spell| spell.irradiance.powf(4.0 / 3.0) * spell.duration)
            .sum()
    }

    /// The dose up to a time.
    fn until(&self, at: f64) -> f64 {
        let index = self.spells.partition_point(|spell| spell.start <= at);
        if index == 0 {
            return 0.0;
        }
        let spell = &self.spells[index - 1];
        self.before[index - 1] + spell.irradiance * (at - spell.start).clamp(0.0, spell.duration)
    }

    /// Returns the window of up to a length that is heaviest against a limit on
    /// the dose that grows with the window; none without any exposure.
    ///
    /// `longest` in seconds; `allowed` gives the dose in J/m² that a window of
    /// so many seconds may hold. It must be concave in time, as `18000·t^0.25`
    /// and `100·t` are: then the ratio has no peak inside a spell, and windows
    /// that begin with one and end with one, or are of full length, are all
    /// that has to be tried.
    ///
    /// # Accuracy
    ///
    /// Exact but for rounding.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the length is not above zero, above 10⁹ s or
    /// not finite, or the limit gives a dose that is not above zero.
    pub fn worst_window(
        &self,
        longest: f64,
        allowed: &dyn Fn(f64) -> f64,
    ) -> Result<Option<Worst>, Error> {
        let longest = length(longest)?;
        let mut worst: Option<Worst> = None;
        let mut weigh = |from: f64, to: f64, dose: f64| -> Result<(), Error> {
            let may = allowed(to - from);
            if !(may > 0.0 && may.is_finite()) {
                return Err(Error::OutOfRange {
                    parameter: "dose that a window may hold",
                    range: "above zero",
                    value: may,
                });
            }
            let ratio = dose / may;
            if worst.is_none_or(|worst| ratio > worst.ratio) {
                worst = Some(Worst {
                    from,
                    to,
                    dose,
                    ratio,
                });
            }
            Ok(())
        };
        for (first, spell) in self.spells.iter().enumerate() {
            for (last, other) in self.spells.iter().enumerate().skip(first) {
                let to = other.start + other.duration;
                if to - spell.start > longest {
                    break;
                }
                weigh(spell.start, to, self.before[last + 1] - self.before[first])?;
            }
            self.full(spell, longest, &mut weigh)?;
        }
        Ok(worst)
    }

    /// Returns the window of just one length that holds the greatest dose,
    /// against the dose that it may hold; none without any exposure.
    ///
    /// `window` in seconds, `allowed` in J/m².
    ///
    /// # Accuracy
    ///
    /// Exact but for rounding.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if either is not above zero, above 10⁹ s or 10²⁰
    /// J/m², or not finite.
    pub fn worst_of_length(&self, window: f64, allowed: f64) -> Result<Option<Worst>, Error> {
        let window = length(window)?;
        let allowed = within(
            "dose that a window may hold",
            allowed,
            f64::MIN_POSITIVE,
            1e20,
            "above zero",
        )?;
        let mut worst: Option<Worst> = None;
        for spell in &self.spells {
            self.full(spell, window, &mut |from, to, dose| {
                let ratio = dose / allowed;
                if worst.is_none_or(|worst| ratio > worst.ratio) {
                    worst = Some(Worst {
                        from,
                        to,
                        dose,
                        ratio,
                    });
                }
                Ok(())
            })?;
        }
        Ok(worst)
    }

    /// Weighs the windows of one length that begin or end with a spell.
    fn full(
        &self,
        spell: &Spell,
        window: f64,
        weigh: &mut dyn FnMut(f64, f64, f64) -> Result<(), Error>,
    ) -> Result<(), Error> {
        let end = spell.start + spell.duration;
        for (from, to) in [
            (spell.start, spell.start + window),
            (end - window, end),
            (spell.start - window, spell.start),
            (end, end + window),
        ] {
            // A window may reach back before the shift, where there is nothing.
            let dose = self.until(to.max(0.0)) - self.until(from.max(0.0));
            weigh(from, to, dose.max(0.0))?;
        }
        Ok(())
    }

    /// Returns what the schedule is for cornea and lens: every window of up to
    /// 1000 s against the limit for its length, and every mean over 1000 s
    /// against that for long times.
    ///
    /// The spells carry the irradiance from 780 nm to 3000 nm. `coefficient`
    /// is that of `E = c·t^-0.75`, 18 000 W·s^0.75/m² in the guidance, and
    /// `long_time` the irradiance beyond 1000 s, 100 W/m².
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if either is not above zero or not finite.
    ///
    /// # Source
    ///
    /// A rule of this program on the limits of Directive 2006/25/EC, rows m and
    /// n, and ICNIRP 2013 (numbers from memory); it is not law.
    ///
    /// # Examples
    ///
    /// ```
    /// use farglow::physics::repeated::Schedule;
    /// // Half a minute in 1 kW/m² passes alone, and fails every three minutes.
    /// let once = Schedule::repeated(1000.0, 30.0, 150.0, 1).unwrap();
    /// let shift = Schedule::repeated(1000.0, 30.0, 150.0, 160).unwrap();
    /// assert!(once.eye(18_000.0, 100.0).unwrap().ratio() < 1.0);
    /// assert!(shift.eye(18_000.0, 100.0).unwrap().ratio() > 1.0);
    /// ```
    pub fn eye(&self, coefficient: f64, long_time: f64) -> Result<Eye, Error> {
        let coefficient = within(
            "coefficient of the limit",
            coefficient,
            1e-9,
            1e12,
            "above zero",
        )?;
        let long_time = within("limit for long times", long_time, 1e-9, 1e12, "above zero")?;
        Ok(Eye {
            window: self.worst_window(EYE_WINDOW, &|t| coefficient * t.powf(0.25))?,
            mean: self.worst_of_length(EYE_WINDOW, long_time * EYE_WINDOW)?,
        })
    }

    /// Returns the absorbed flux as pulses for the layered model of skin, every
    /// rest among them, beginning with the first spell; `absorptance` is the
    /// share that the skin takes up.
    ///
    /// # Errors
    ///
    /// [`Error::OutOfRange`] if the absorptance lies outside 0 to 1.
    pub fn pulses(&self, absorptance: f64) -> Result<Vec<super::skin::tissue::Pulse>, Error> {
        use super::skin::tissue::Pulse;
        let absorptance = within(
            "absorptance of the skin",
            absorptance,
            0.0,
            1.0,
            "from 0 to 1",
        )?;
        let mut pulses = Vec::with_capacity(2 * self.spells.len());
        let mut now = self.spells.first().map_or(0.0, |spell| spell.start);
        for spell in &self.spells {
            if spell.start > now {
                pulses.push(Pulse::steady(spell.start - now, 0.0));
            }
            pulses.push(Pulse::steady(
                spell.duration,
                absorptance * spell.irradiance,
            ));
            now = spell.start + spell.duration;
        }
        Ok(pulses)
    }
}

fn length(window: f64) -> Result<f64, Error> {
    within(
        "length of the window",
        window,
        1e-9,
        1e9,
        "from 10⁻⁹ s to 10⁹ s",
    )
}

#[cfg(test)]
mod tests;
