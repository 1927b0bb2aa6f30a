//! The body minute by minute, in the units of the standard: °C, kPa, clo, min.
//!
//! Names follow the standard's symbols, said beside them. Numbers come checked.

use super::{CLO, Clothing, Edition, Person, Posture, Strain, Stretch, Work};

/// What stays the same over a stretch.
pub struct Phase {
    edition: Edition,
    /// t_a, t_r, °C; p_a, kPa; v_a, m/s.
    air: f64,
    radiant: f64,
    vapour: f64,
    speed: f64,
    /// I_cl, clo.
    clo: f64,
    /// M and W, W/m².
    rate: f64,
    power: f64,
    /// f_cl, the area factor of the clothing.
    area_factor: f64,
    /// F_clr times σ and the radiating share, W/(m²·K⁴).
    radiation: f64,
    /// h_c by moved air, W/(m²·K).
    moved: f64,
    /// I_cl,dyn, m²·K/W, and R_t,dyn, m²·kPa/W.
    insulation: f64,
    resistance: f64,
    /// C_res + E_res and E_res, W/m².
    breath: f64,
    wet_breath: f64,
    /// SW_max, W/m², and w_max.
    most_sweat: f64,
    most_wet: f64,
}

impl Phase {
    pub fn new(edition: Edition, person: &Person, stretch: &Stretch) -> Phase {
        let Stretch {
            climate,
            clothing,
            work,
            ..
        } = stretch;
        let air = climate.air_temperature - 273.15;
        let vapour = climate.vapour_pressure / 1000.0;
        let rate = work.metabolic_rate;
        let clo = clothing.insulation / CLO;
        let (relative, walking) = speeds(work, climate.air_speed);
        let area_factor = match edition {
            Edition::Iso2004 => 1.0 + 0.30 * clo,
            Edition::Iso2023 => 1.0 + 0.28 * clo,
        };
        let (insulation, resistance) = dynamic(clothing, area_factor, relative, walking);
        let expired = 28.56 + 0.115 * air + 0.641 * vapour;
        let wet_breath = 0.001_27 * rate * (59.34 + 0.53 * air - 11.63 * vapour);
        Phase {
            edition,
            air,
            radiant: climate.mean_radiant - 273.15,
            vapour,
            speed: climate.air_speed,
            clo,
            rate,
            power: work.mechanical_power,
            area_factor,
            radiation: emission(clothing) * 5.67e-8 * radiating(work.posture),
            moved: if relative > 1.0 {
                8.7 * relative.powf(0.6)
            } else {
                3.5 + 5.2 * relative
            },
            insulation,
            resistance,
            breath: 0.001_516 * rate * (expired - air) + wet_breath,
            wet_breath,
            most_sweat: most_sweat(edition, person, rate),
            most_wet: if person.acclimatised { 1.0 } else { 0.85 },
        }
    }

    /// The coefficient of convection, W/(m²·K): by 2004 from the skin's
    /// temperature, by 2023 from that of the clothing's surface.
    fn convection(&self, skin: f64, surface: f64) -> f64 {
        let warm = match self.edition {
            Edition::Iso2004 => skin,
            Edition::Iso2023 => surface,
        };
        self.moved.max(2.38 * (warm - self.air).abs().sqrt().sqrt())
    }

    /// Heat that leaves the clothing by convection and radiation, W/m².
    fn dry_loss(&self, skin: f64, surface: f64) -> f64 {
        let (hot, around) = ((surface + 273.0).powi(4), (self.radiant + 273.0).powi(4));
        self.area_factor
            * (self.convection(skin, surface) * (surface - self.air)
                + self.radiation * (hot - around))
    }

    /// The same for the surface that lets as much through from the skin. The
    /// balance falls with the surface's temperature: halving always finds it.
    fn balanced_loss(&self, skin: f64) -> f64 {
        let (mut low, mut high) = (
            skin.min(self.air).min(self.radiant),
            skin.max(self.air).max(self.radiant),
        );
        for _ in 0..48 {
            let middle = f64::midpoint(low, high);
            if (skin - middle) / self.insulation > self.dry_loss(skin, middle) {
                low = middle;
            } else {
                high = middle;
            }
        }
        self.dry_loss(skin, f64::midpoint(low, high))
    }

    /// t_sk,eq, °C, between the models for clothed and for bare skin.
    fn skin_equilibrium(&self, rectal: f64) -> f64 {
        let clothed =
            12.165 + 0.020_17 * self.air + 0.043_61 * self.radiant + 0.193_54 * self.vapour
                - 0.253_15 * self.speed
                + 0.005_346 * self.rate
                + 0.512_74 * rectal;
        let bare = 7.191 + 0.064 * self.air + 0.061 * self.radiant + 0.198 * self.vapour
            - 0.348 * self.speed
            + 0.616 * rectal;
        let share = ((self.clo - 0.2) / 0.4).clamp(0.0, 1.0);
        bare + share * (clothed - bare)
    }
}

/// Relative speed of the air and speed of walking, m/s.
fn speeds(work: &Work, air: f64) -> (f64, f64) {
    match work.walking {
        Some(walking) if walking.speed > 0.0 => match walking.to_wind {
            Some(angle) => ((air - walking.speed * angle.cos()).abs(), walking.speed),
            None => (air.max(walking.speed), walking.speed),
        },
        _ => (air, (0.0052 * (work.metabolic_rate - 58.0)).min(0.7)),
    }
}

/// I_cl,dyn in m²·K/W and R_t,dyn in m²·kPa/W: insulation as wind and walking
/// leave it.
fn dynamic(clothing: &Clothing, area_factor: f64, relative: f64, walking: f64) -> (f64, f64) {
    let clo = clothing.insulation / CLO;
    let layer = 0.111;
    let (v, w) = (relative.min(3.0), walking.min(1.5));
    let clothed = (1.044 * ((0.066 * v - 0.398) * v + (0.094 * w - 0.378) * w).exp()).min(1.0);
    let bare = ((0.047 * relative - 0.472) * relative + (0.117 * w - 0.342) * w)
        .exp()
        .min(1.0);
    let all = if clo > 0.6 {
        clothed
    } else {
        ((0.6 - clo) * bare + clo * clothed) / 0.6
    };
    let total = (clothing.insulation + layer / area_factor) * all;
    let permeability = (clothing.permeability * ((2.6 * all - 6.5) * all + 4.9)).min(0.9);
    (
        total - bare * layer / area_factor,
        total / permeability / 16.7,
    )
}

/// F_clr: emissivity of the clothed body.
fn emission(clothing: &Clothing) -> f64 {
    clothing.reflective.map_or(0.97, |reflective| {
        (1.0 - reflective.share) * 0.97 + reflective.share * reflective.emissivity
    })
}

/// A_r/A_Du: the share of the body that radiates.
fn radiating(posture: Posture) -> f64 {
    match posture {
        Posture::Standing => 0.77,
        Posture::Sitting => 0.70,
        Posture::Crouching => 0.67,
    }
}

/// SW_max, W/m².
fn most_sweat(edition: Edition, person: &Person, rate: f64) -> f64 {
    match (edition, person.acclimatised) {
        (Edition::Iso2004, acclimatised) => {
            let most = ((rate - 32.0) * person.area()).clamp(250.0, 400.0);
            if acclimatised { most * 1.25 } else { most }
        }
        (Edition::Iso2023, true) => 500.0,
        (Edition::Iso2023, false) => 400.0,
    }
}

/// A person in a hot place, by the minute.
pub struct Body {
    edition: Edition,
    person: Person,
    /// c_sp, W·min/(m²·K).
    capacity: f64,
    minutes: u32,
    /// t_re, t_cr, t_cr,eq, t_sk, °C.
    rectal: f64,
    core: f64,
    core_equilibrium: f64,
    skin: f64,
    /// The weight of the skin in the mean body temperature.
    weight: f64,
    /// SW_p, W/m², and all water lost so far, W·min/m².
    sweat: f64,
    water: f64,
    core_limit: Option<u32>,
    average_limit: Option<u32>,
    water_limit: Option<u32>,
}

impl Body {
    pub fn new(edition: Edition, person: Person) -> Body {
        Body {
            edition,
            person,
            // 57.83 in the standard's own program; the open library takes 58.15,
            // which changes water by some grams and times by a minute at most.
            capacity: 57.83 * person.mass / person.area(),
            minutes: 0,
            rectal: 36.8,
            core: 36.8,
            core_equilibrium: 36.8,
            skin: 34.1,
            weight: 0.3,
            sweat: 0.0,
            water: 0.0,
            core_limit: None,
            average_limit: None,
            water_limit: None,
        }
    }

    pub fn minute(&mut self, phase: &Phase) {
        self.minutes += 1;
        let (skin_before, weight_before) = (self.skin, self.weight);
        let (slow, fast) = ((-0.1_f64).exp(), (-1.0_f64 / 3.0).exp());
        let settled = 0.0036 * phase.rate + 36.6;
        let equilibrium = self.core_equilibrium * slow + settled * (1.0 - slow);
        let rise = self.capacity * (equilibrium - self.core_equilibrium) * (1.0 - weight_before);
        self.core_equilibrium = equilibrium;
        let skin = phase.skin_equilibrium(self.rectal);
        // The program of 2023 sets the skin to its equilibrium in the first minute.
        self.skin = if self.edition == Edition::Iso2023 && self.minutes == 1 {
            skin
        } else {
            skin_before * fast + skin * (1.0 - fast)
        };
        let saturated = 0.6105 * (17.27 * self.skin / (self.skin + 237.3)).exp();
        let possible = ((saturated - phase.vapour) / phase.resistance).max(0.0);
        let dry = phase.balanced_loss(self.skin);
        let required = (phase.rate - rise - phase.power - phase.breath - dry).max(0.0);
        let wanted = self.wanted_sweat(phase, required, possible);
        self.sweat = (self.sweat * slow + wanted * (1.0 - slow)).max(0.0);
        let evaporated = evaporated(self.sweat, possible, phase.most_wet);
        self.warm(required - evaporated + rise, skin_before, weight_before);
        self.rectal += (2.0 * self.core - 1.962 * self.rectal - 1.31) / 9.0;
        self.water += self.sweat + phase.wet_breath;
        self.note_limits();
    }

    /// SW_req, W/m²: more than is needed, since some drips off.
    fn wanted_sweat(&self, phase: &Phase, required: f64, possible: f64) -> f64 {
        if required <= 0.0 {
            return 0.0;
        }
        let wetness = required / possible;
        if possible <= 0.0 || wetness >= 1.7 {
            return phase.most_sweat;
        }
        let efficiency = if wetness > 1.0 {
            (2.0 - wetness).powi(2) / 2.0
        } else {
            1.0 - wetness * wetness / 2.0
        };
        let efficiency = match self.edition {
            Edition::Iso2004 => efficiency,
            Edition::Iso2023 => efficiency.max(0.05),
        };
        (required / efficiency).min(phase.most_sweat)
    }

    /// The core after a minute in which `stored` W/m² stayed, with the weight of
    /// the skin that goes with it, iterated as the standard does.
    fn warm(&mut self, stored: f64, skin_before: f64, weight_before: f64) {
        let core_before = self.core;
        let mut guess = core_before;
        for _ in 0..200 {
            self.weight = (0.3 - 0.09 * (guess - 36.8)).clamp(0.1, 0.3);
            self.core = (stored / self.capacity + skin_before * weight_before / 2.0
                - self.skin * self.weight / 2.0
                + core_before * (1.0 - weight_before / 2.0))
                / (1.0 - self.weight / 2.0);
            if (self.core - guess).abs() <= 0.001 {
                break;
            }
            guess = f64::midpoint(guess, self.core);
        }
    }

    /// Water lost so far, g: 2.67 g/h for each watt, halved and more by 1.8.
    fn grams(&self) -> f64 {
        self.water * 2.67 * self.person.area() / 1.8 / 60.0
    }

    fn note_limits(&mut self) {
        let grams = self.grams();
        let mass = self.person.mass * 1000.0;
        let (average, most) = match (self.person.drinks, self.edition) {
            (false, _) => (0.03, 0.03),
            (true, Edition::Iso2004) => (0.075, 0.05),
            (true, Edition::Iso2023) => (0.05, 0.05),
        };
        let now = self.minutes;
        if self.rectal >= 38.0 {
            let _ = self.core_limit.get_or_insert(now);
        }
        if grams >= average * mass {
            let _ = self.average_limit.get_or_insert(now);
        }
        if grams >= most * mass {
            let _ = self.water_limit.get_or_insert(now);
        }
    }

    pub fn strain(&self) -> Strain {
        let seconds = |minutes: u32| f64::from(minutes) * 60.0;
        Strain {
            rectal: self.rectal + 273.15,
            core: self.core + 273.15,
            skin: self.skin + 273.15,
            water_loss: self.grams() / 1000.0,
            core_limit: self.core_limit.map(seconds),
            average_water_limit: self.average_limit.map(seconds),
            water_limit: self.water_limit.map(seconds),
            duration: seconds(self.minutes),
        }
    }
}

/// E_p, W/m²: what evaporates of the sweat.
fn evaporated(sweat: f64, possible: f64, most_wet: f64) -> f64 {
    if sweat <= 0.0 {
        return 0.0;
    }
    let ratio = possible / sweat;
    let wet = if ratio >= 0.5 {
        (ratio * ratio + 2.0).sqrt() - ratio
    } else {
        1.0
    };
    wet.min(most_wet) * possible
}
