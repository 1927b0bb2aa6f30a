//! A straight line over the floor from a source, and what is met along it.

use std::collections::BTreeMap;
use std::sync::Arc;

use glam::DVec3;

use crate::notebook::cell::curve::along;
use crate::notebook::cell::position::{Band, Orientation, Views};
use crate::notebook::cell::source::{self, Shape};
use crate::notebook::cell::{Cell, Kind};
use crate::notebook::datum::{CellId, Datum};
use crate::notebook::engine::{Engine, Slot};
use crate::notebook::results::sights;
use crate::notebook::scene::{Form, Heat};
use crate::units::format::{self, Rounding};

/// The height of a standing eye where nothing on the line gives one, m.
const EYE: f64 = 1.6;

/// How far beside the line a position may stand and still be on it, m.
const ASIDE: f64 = 0.05;

/// A straight line over the floor, from a source.
#[derive(Clone, Debug, PartialEq)]
pub struct Line {
    /// The source's name.
    pub source: String,
    /// The source's number.
    pub id: CellId,
    /// How far the source's outline reaches along the line, in metres: where
    /// the rail begins.
    pub edge: f64,
    /// The height above the floor at which irradiance is shown, in metres.
    pub height: f64,
    origin: DVec3,
    ahead: DVec3,
    /// Whether the line runs as an opening faces.
    straight: bool,
}

impl Line {
    /// Returns the lines of a notebook: those on which a zone or a curve runs,
    /// in file order, then the own line of every source that has none.
    #[must_use]
    pub fn all(engine: &Engine) -> Vec<Line> {
        let cells = &engine.notebook().cells;
        let mut lines: Vec<Line> = Vec::new();
        // The places of each source's lines: there may be thousands of sources.
        let mut known: BTreeMap<String, Vec<usize>> = BTreeMap::new();
        for kinds in [&[Kind::Zone, Kind::Curve][..], &[Kind::Source][..]] {
            for (place, cell) in cells.iter().enumerate() {
                if !kinds.contains(&cell.kind)
                    || (cell.kind == Kind::Source && known.contains_key(&cell.name))
                {
                    continue;
                }
                let Some(line) = engine.id(place).and_then(|id| Line::drawn_by(engine, id)) else {
                    continue;
                };
                let own = known.entry(line.source.clone()).or_default();
                if !own.iter().any(|at| lines[*at].same(&line)) {
                    own.push(lines.len());
                    lines.push(line);
                }
            }
        }
        lines
    }

    /// Returns the line that belongs to a cell: a zone's or a curve's own, a
    /// source's own, the first on which a position stands, and the same for an
    /// assessment's position.
    #[must_use]
    pub fn of(engine: &Engine, id: CellId) -> Option<Line> {
        let cell = engine.cell(id)?;
        match cell.kind {
            Kind::Zone | Kind::Curve | Kind::Source => {
                let line = Line::drawn_by(engine, id)?;
                let all = Line::all(engine);
                all.into_iter().find(|other| match cell.kind {
                    Kind::Source => other.source == line.source,
                    _ => other.same(&line),
                })
            }
            Kind::Position => Line::all(engine)
                .into_iter()
                .find(|line| line.standing(engine, id).is_some()),
            Kind::Assessment => Line::of(engine, engine.find(cell.text("position")?)?),
            Kind::Value | Kind::Formula | Kind::Surroundings | Kind::Screen | Kind::Note => None,
        }
    }

    /// Returns the line along which a zone, a curve or a source itself runs.
    fn drawn_by(engine: &Engine, id: CellId) -> Option<Line> {
        let cell = engine.cell(id)?;
        let (source, heading, height) = match cell.kind {
            Kind::Source => (cell, None, None),
            _ => {
                let from = engine.cell(engine.find(cell.text("from")?)?)?;
                (from, si(engine, id, "heading"), si(engine, id, "z"))
            }
        };
        if cell.field("heading").is_some() && cell.kind != Kind::Source && heading.is_none() {
            // The heading is in error: the line is not known.
            return None;
        }
        let shape = shape(engine, source)?;
        let ahead = along(&shape, heading);
        Some(Line {
            source: source.name.clone(),
            id: engine.find(&source.name)?,
            edge: shape.edge_along(ahead),
            height: height.unwrap_or(EYE),
            origin: shape.centre,
            ahead,
            straight: shape.kind == source::Kind::Opening && ahead.dot(shape.ahead) > 1.0 - 1e-12,
        })
    }

    /// Returns the same line at the height of a zone or a curve on it.
    #[must_use]
    pub fn at_height_of(mut self, engine: &Engine, id: CellId) -> Line {
        if let Some(z) = si(engine, id, "z") {
            self.height = z;
        }
        self
    }

    /// Returns whether two lines run over the same ground, whatever the height.
    #[must_use]
    pub fn same(&self, other: &Line) -> bool {
        self.source == other.source && self.ahead.dot(other.ahead) > 1.0 - 1e-12
    }

    /// Returns whether a zone or a curve runs over the same ground.
    #[must_use]
    pub fn carries(&self, engine: &Engine, id: CellId) -> bool {
        Line::drawn_by(engine, id).is_some_and(|line| self.same(&line))
    }

    /// Returns how far from the edge a position stands on the line, in metres;
    /// `None` for one that stands elsewhere.
    #[must_use]
    pub fn standing(&self, engine: &Engine, id: CellId) -> Option<f64> {
        let eye = sights(engine, id)?.eye;
        let from = (eye - self.origin).with_z(0.0);
        let distance = from.dot(self.ahead);
        let aside = (from - self.ahead * distance).length();
        let clear = distance - self.edge;
        (aside <= ASIDE && clear > -1e-9).then(|| clear.max(0.0))
    }

    /// Returns the way of the line in words: `straight out`, `heading 45 °`.
    #[must_use]
    pub fn way(&self) -> String {
        if self.straight {
            return "straight out".to_owned();
        }
        let degrees = self.ahead.x.atan2(self.ahead.y).to_degrees();
        let degrees = (degrees * 10.0).round() / 10.0;
        let degrees = if degrees < 0.0 {
            degrees + 360.0
        } else {
            degrees
        };
        let figures = if degrees.fract() == 0.0 { 3 } else { 4 };
        let text = if degrees == 0.0 {
            "0".to_owned()
        } else if degrees.fract() == 0.0 {
            format!("{degrees}")
        } else {
            format::significant(degrees, figures, Rounding::Nearest)
        };
        format!("heading {text} °")
    }
}

/// Returns the quantity in a field, in SI units.
pub(super) fn si(engine: &Engine, id: CellId, field: &'static str) -> Option<f64> {
    Some(engine.value_of(id, Slot::Field(field))?.as_quantity()?.si)
}

fn shape(engine: &Engine, source: &Cell) -> Option<Arc<Shape>> {
    match engine.value_of(engine.find(&source.name)?, Slot::Group("shape"))? {
        Datum::Shape(shape) => Some(Arc::clone(shape)),
        _ => None,
    }
}

/// What is met at one point of a line, nominal, in W/m².
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Reading {
    /// Over all wavelengths, as it is judged.
    pub total: f64,
    /// 780–3000 nm.
    pub near_infrared: f64,
    /// 380–3000 nm.
    pub skin: f64,
}

impl Reading {
    /// Returns the irradiance in one band.
    #[must_use]
    pub const fn band(&self, band: Band) -> f64 {
        match band {
            Band::Total => self.total,
            Band::NearInfrared => self.near_infrared,
            Band::Skin => self.skin,
        }
    }
}

/// Looks at all sources from anywhere on a line.
#[derive(Clone, Debug)]
pub struct Probe {
    form: Arc<Form>,
    heat: Arc<Heat>,
    orientation: Orientation,
    origin: DVec3,
    ahead: DVec3,
    height: f64,
}

impl Probe {
    /// Returns the probe of a line, its receiver turned as `orientation` says;
    /// `None` where a source is in error.
    #[must_use]
    pub fn new(engine: &Engine, line: &Line, orientation: Orientation) -> Option<Probe> {
        Some(Probe {
            form: Arc::clone(engine.form()?),
            heat: Arc::clone(engine.heat()?),
            orientation,
            origin: line.origin,
            ahead: line.ahead,
            height: line.height,
        })
    }

    /// Where all is that emits and that hides.
    pub(super) fn form(&self) -> &Form {
        &self.form
    }

    /// The centre of the line's source, and the way of the line, a unit vector.
    pub(super) fn way(&self) -> (DVec3, DVec3) {
        (self.origin, self.ahead)
    }

    /// The point that is looked from at a distance in metres from the centre.
    pub(super) fn point(&self, distance: f64) -> DVec3 {
        (self.origin + self.ahead * distance).with_z(self.height)
    }

    /// Returns whether two probes read the same everywhere.
    #[must_use]
    pub fn same(&self, other: &Probe) -> bool {
        (Arc::ptr_eq(&self.form, &other.form) || self.form == other.form)
            && (Arc::ptr_eq(&self.heat, &other.heat) || self.heat == other.heat)
            && self.orientation == other.orientation
            && self.origin == other.origin
            && self.ahead == other.ahead
            && self.height == other.height
    }

    /// Returns what is met at a distance in metres from the centre of the
    /// source; `None` inside a source.
    #[must_use]
    pub fn read(&self, distance: f64) -> Option<Reading> {
        let views = Views::standing(&self.form, vec![self.point(distance)]).ok()?;
        let [total, near_infrared, skin] = Band::ALL.map(|band| {
            views
                .irradiance(0, self.orientation, &self.heat.judged(band))
                .0
        });
        Some(Reading {
            total,
            near_infrared,
            skin,
        })
    }
}
