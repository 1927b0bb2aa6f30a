//! What is seen from a point: the scene's regions, the envelope around a
//! position, and the way a receiver faces.

use std::sync::{Arc, OnceLock};

use glam::DVec3;

use crate::graph::Node;
use crate::guidance::Envelope;
use crate::notebook::Diagnostic;
use crate::notebook::cell::source::{Shape, direction};
use crate::notebook::datum::Datum;
use crate::notebook::task::Inputs;
use crate::physics::exposure;
use crate::physics::surface::Emission;
use crate::physics::view::{Sight, View};

/// Where all sources are, in file order.
#[derive(Clone, Debug, PartialEq)]
pub struct Form {
    /// Their names.
    pub names: Vec<Arc<str>>,
    /// Their shapes, parallel to the names.
    pub shapes: Vec<Arc<Shape>>,
}

/// Gathers the shapes of all sources.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct FormTask {
    pub(in crate::notebook) names: Vec<Arc<str>>,
    pub(in crate::notebook) shapes: Vec<Node>,
}

impl FormTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend(&self.shapes);
    }

    // Returns a result as every task does.
    #[allow(clippy::unnecessary_wraps)]
    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        Ok(Datum::Form(Arc::new(Form {
            names: self.names.clone(),
            shapes: self
                .shapes
                .iter()
                .map(|node| Arc::clone(inputs.shape(*node)))
                .collect(),
        })))
    }
}

/// Gathers what all sources emit.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct HeatTask {
    pub(in crate::notebook) emissions: Vec<Node>,
}

impl HeatTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        nodes.extend(&self.emissions);
    }

    // Returns a result as every task does.
    #[allow(clippy::unnecessary_wraps)]
    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        Ok(Datum::Heat(Arc::new(
            self.emissions
                .iter()
                .map(|node| *inputs.emission(*node))
                .collect(),
        )))
    }
}

/// One of the quantities that guidance judges.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Band {
    /// All wavelengths.
    Total,
    /// 780–3000 nm.
    NearInfrared,
    /// 380–3000 nm.
    Skin,
}

impl Band {
    /// The three, in the order in which results list them.
    pub const ALL: [Band; 3] = [Band::Total, Band::NearInfrared, Band::Skin];

    /// Returns the exitance of a source in this band, W/m².
    #[must_use]
    pub const fn of(self, emission: &Emission) -> f64 {
        match self {
            Band::Total => emission.total,
            Band::NearInfrared => emission.near_infrared,
            Band::Skin => emission.skin,
        }
    }

    /// Returns the band that guidance judges an exposure in.
    #[must_use]
    pub const fn judged(exposure: crate::guidance::Exposure) -> Band {
        match exposure {
            crate::guidance::Exposure::Total => Band::Total,
            crate::guidance::Exposure::NearInfrared => Band::NearInfrared,
            crate::guidance::Exposure::Skin => Band::Skin,
        }
    }

    /// Returns the band that the guidance of this id judges an exposure in.
    #[must_use]
    pub fn of_guidance(id: &str) -> Option<Band> {
        let limit = crate::guidance::Library::shipped().get(id)?;
        Some(Band::judged(limit.metric.exposure()))
    }

    /// Returns the exitances of all sources in this band, for judging: where a
    /// band exceeds the whole, the whole is taken as that band.
    #[must_use]
    pub fn judged_weights(self, heat: &[Emission]) -> Vec<f64> {
        heat.iter()
            .map(|emission| match self {
                Band::Total => emission
                    .total
                    .max(emission.skin)
                    .max(emission.near_infrared),
                Band::NearInfrared | Band::Skin => self.of(emission),
            })
            .collect()
    }

    /// Returns the exitances of all sources in this band.
    #[must_use]
    pub fn weights(self, heat: &[Emission]) -> Vec<f64> {
        heat.iter().map(|emission| self.of(emission)).collect()
    }
}

/// Which way a receiver faces, as linked.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(in crate::notebook) enum Facing {
    Strongest,
    /// Towards the centre of this shape.
    Source(Node),
    Heading {
        heading: Node,
        tilt: Option<Node>,
    },
}

impl Facing {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        match self {
            Facing::Strongest => {}
            Facing::Source(shape) => nodes.push(*shape),
            Facing::Heading { heading, tilt } => {
                nodes.push(*heading);
                nodes.extend(*tilt);
            }
        }
    }

    pub(in crate::notebook) fn orientation(&self, inputs: Inputs<'_>) -> Orientation {
        match self {
            Facing::Strongest => Orientation::Strongest,
            Facing::Source(shape) => Orientation::Towards(inputs.shape(*shape).centre),
            Facing::Heading { heading, tilt } => {
                let (sin, cos) = inputs.maybe(*tilt).unwrap_or(0.0).sin_cos();
                Orientation::Normal(direction(inputs.si(*heading)) * cos + DVec3::Z * sin)
            }
        }
    }
}

/// Which way a receiver faces.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Orientation {
    /// The way of greatest irradiance, for each quantity and point by itself.
    Strongest,
    /// Towards a point.
    Towards(DVec3),
    /// Along this unit vector.
    Normal(DVec3),
}

impl Orientation {
    /// Returns the irradiance at a point in W/m² for the exitances `weights`,
    /// and the normal of the receiver.
    ///
    /// A receiver that stands in the very point it should face has no such
    /// direction: it is taken the strongest way.
    #[must_use]
    pub fn irradiance(&self, point: DVec3, views: &[View], weights: &[f64]) -> (f64, DVec3) {
        let normal = match self {
            Orientation::Strongest => None,
            Orientation::Towards(target) => (*target - point).try_normalize(),
            Orientation::Normal(normal) => Some(*normal),
        };
        match normal {
            Some(normal) => (exposure::facing(views, weights, normal), normal),
            None => exposure::strongest(views, weights),
        }
    }
}

/// The heights above the ground at which skin is judged, m.
pub const SKIN_HEIGHTS: [f64; 6] = [0.3, 0.6, 0.9, 1.2, 1.5, 1.8];

/// Returns the points that are judged around an eye point.
///
/// For the eye: the point itself first, then the six points at ± `reach`
/// along x, y and z. For the skin: the [`SKIN_HEIGHTS`] above `ground` at the
/// standing point and at ± `reach` around it, and the points of the eye, since
/// the face is skin and may be above the highest of them. With a reach of zero
/// only the distinct points are listed.
#[must_use]
pub fn envelope(eye: DVec3, ground: f64, reach: f64, envelope: Envelope) -> Vec<DVec3> {
    let axes: &[DVec3] = match envelope {
        Envelope::Eye => &[DVec3::X, DVec3::Y, DVec3::Z],
        Envelope::Skin => &[DVec3::X, DVec3::Y],
    };
    let centres: Vec<DVec3> = match envelope {
        Envelope::Eye => vec![eye],
        Envelope::Skin => SKIN_HEIGHTS
            .iter()
            .map(|height| eye.with_z(ground + height))
            .collect(),
    };
    let mut points = Vec::with_capacity(centres.len() * (1 + 2 * axes.len()));
    for centre in centres {
        points.push(centre);
        if reach > 0.0 {
            for axis in axes {
                points.extend([centre + *axis * reach, centre - *axis * reach]);
            }
        }
    }
    if envelope == Envelope::Skin {
        points.extend(self::envelope(eye, ground, reach, Envelope::Eye));
    }
    points
}

/// What keeps a point from being looked from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Hit {
    /// The point lies in or on this source.
    Inside(usize),
    /// The way from the stated point to it meets this source.
    Reached(usize),
}

/// What is seen from several points.
///
/// What is worked out from the views alone is kept from the first time that it
/// is asked for: it depends on nothing that could change afterwards.
#[derive(Clone, Debug)]
pub struct Views {
    /// The points.
    pub points: Vec<DVec3>,
    /// For each point the views of all sources.
    views: Vec<View>,
    sources: usize,
    alone: OnceLock<Alone>,
    /// Parallel to the views, a bound on each one's factor in any orientation.
    ceilings: OnceLock<Vec<f64>>,
}

/// What a single source sends the strongest way: its exitance times these.
#[derive(Clone, Debug)]
struct Alone {
    /// The factor at each point, and the normal of the receiver.
    points: Vec<(f64, DVec3)>,
    /// The greatest of the factors.
    worst: f64,
}

/// How far rounding may bring a factor above its bound, as a share of it and
/// besides: the stated error of a factor that the horizon cuts.
const ROUNDING: (f64, f64) = (1e-9, 1e-12);

impl Views {
    /// Looks at every source of the scene from each of the points, all of them
    /// within reach of `stated`.
    ///
    /// # Errors
    ///
    /// [`Hit`] where a point lies in a source, or where the way to it from
    /// `stated` meets one.
    pub fn look(form: &Form, stated: DVec3, points: Vec<DVec3>) -> Result<Views, Hit> {
        let mut views = Vec::with_capacity(points.len() * form.shapes.len());
        for point in &points {
            for (index, shape) in form.shapes.iter().enumerate() {
                if *point != stated && shape.region.crosses(stated, *point) {
                    return Err(Hit::Reached(index));
                }
                match shape.region.view(*point).into_view() {
                    Some(view) => views.push(view),
                    None if *point == stated => return Err(Hit::Inside(index)),
                    None => return Err(Hit::Reached(index)),
                }
            }
        }
        Ok(Views::new(points, views, form.shapes.len()))
    }

    /// Looks at every source of the scene from each of the points, which have
    /// nothing to do with one another.
    ///
    /// # Errors
    ///
    /// [`Hit::Inside`] where a point lies in a source.
    pub fn standing(form: &Form, points: Vec<DVec3>) -> Result<Views, Hit> {
        let mut views = Vec::with_capacity(points.len() * form.shapes.len());
        for point in &points {
            for (index, shape) in form.shapes.iter().enumerate() {
                views.push(
                    shape
                        .region
                        .view(*point)
                        .into_view()
                        .ok_or(Hit::Inside(index))?,
                );
            }
        }
        Ok(Views::new(points, views, form.shapes.len()))
    }

    fn new(points: Vec<DVec3>, views: Vec<View>, sources: usize) -> Views {
        Views {
            points,
            views,
            sources,
            alone: OnceLock::new(),
            ceilings: OnceLock::new(),
        }
    }

    /// Returns the views of all sources from the point of this number.
    #[must_use]
    pub fn at(&self, point: usize) -> &[View] {
        &self.views[point * self.sources..(point + 1) * self.sources]
    }

    /// Returns the irradiance at the point of this number in W/m² for the
    /// exitances `weights`, and the normal of the receiver.
    #[must_use]
    pub fn irradiance(
        &self,
        point: usize,
        orientation: Orientation,
        weights: &[f64],
    ) -> (f64, DVec3) {
        match (self.alone(orientation), weights) {
            // The answer of the long way, to the bit: there the only weight is
            // taken out before anything is worked out.
            (Some(alone), [weight]) if counts(*weight) => {
                let (factor, normal) = alone.points[point];
                (weight * factor, normal)
            }
            _ => orientation.irradiance(self.points[point], self.at(point), weights),
        }
    }

    /// Returns the greatest irradiance over all points, W/m².
    ///
    /// Points that cannot be the worst, because even the sum of what each
    /// source could send there at most is less, are passed over.
    #[must_use]
    pub fn worst(&self, orientation: Orientation, weights: &[f64]) -> f64 {
        if let (Some(alone), [weight]) = (self.alone(orientation), weights)
            && counts(*weight)
        {
            return weight * alone.worst;
        }
        let bounds: Vec<f64> = (0..self.points.len())
            .map(|point| self.bound(point, weights))
            .collect();
        let highest = (0..bounds.len()).max_by(|a, b| bounds[*a].total_cmp(&bounds[*b]));
        let mut worst = 0.0;
        for point in highest.into_iter().chain(0..bounds.len()) {
            if bounds[point] > worst && (worst == 0.0 || Some(point) != highest) {
                worst = self.irradiance(point, orientation, weights).0.max(worst);
            }
        }
        worst
    }

    /// Returns what a single source sends the strongest way, if that is asked.
    fn alone(&self, orientation: Orientation) -> Option<&Alone> {
        (self.sources == 1 && orientation == Orientation::Strongest).then(|| {
            self.alone.get_or_init(|| {
                let factor = |view| exposure::strongest(std::slice::from_ref(view), &[1.0]);
                let points: Vec<(f64, DVec3)> = self.views.iter().map(factor).collect();
                let worst = points.iter().map(|(factor, _)| *factor).fold(0.0, f64::max);
                Alone { points, worst }
            })
        })
    }

    /// Returns what the irradiance at a point stays below in any orientation.
    fn bound(&self, point: usize, weights: &[f64]) -> f64 {
        let (share, besides) = ROUNDING;
        let ceilings = self
            .ceilings
            .get_or_init(|| self.views.iter().map(View::ceiling).collect());
        ceilings[point * self.sources..(point + 1) * self.sources]
            .iter()
            .zip(weights)
            .filter(|(_, weight)| counts(**weight))
            .map(|(ceiling, weight)| weight * (ceiling * (1.0 + share) + besides))
            .sum()
    }
}

/// Whether a weight counts for an irradiance at all.
fn counts(weight: f64) -> bool {
    weight.is_finite() && weight > 0.0
}

/// Returns the sources that a point lies behind, and so does not see.
#[must_use]
pub fn behind(form: &Form, point: DVec3) -> Vec<usize> {
    form.shapes
        .iter()
        .enumerate()
        .filter(|(_, shape)| matches!(shape.region.view(point), Sight::Behind))
        .map(|(index, _)| index)
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::notebook::cell::source::Kind;
    use crate::physics::region::Region;

    fn form(centres: &[DVec3]) -> Form {
        let shape = |centre: &DVec3| {
            let region = Region::rectangle(*centre, DVec3::Y, DVec3::Z, 0.9, 0.7);
            Arc::new(Shape {
                region: region.expect("a door"),
                kind: Kind::Opening,
                centre: *centre,
                ahead: DVec3::Y,
            })
        };
        Form {
            names: centres.iter().map(|_| Arc::from("door")).collect(),
            shapes: centres.iter().map(shape).collect(),
        }
    }

    #[test]
    fn what_is_passed_over_or_kept_changes_no_bit_of_the_worst() {
        let doors = [0.0, 3.0, -5.0].map(|x| DVec3::new(x, 0.0, 1.2));
        let ways = [
            Orientation::Strongest,
            Orientation::Towards(doors[0]),
            Orientation::Normal(DVec3::NEG_Y),
            Orientation::Normal(DVec3::X),
        ];
        let mut compared = 0;
        for sources in 1..=3 {
            let form = form(&doors[..sources]);
            for (x, y) in [
                (0.0, 0.4),
                (0.2, 1.0),
                (1.5, 2.5),
                (-2.0, 8.0),
                (40.0, 0.35),
            ] {
                let eye = DVec3::new(x, y, 1.6);
                for kind in [Envelope::Eye, Envelope::Skin] {
                    let views = Views::look(&form, eye, envelope(eye, 0.0, 0.3, kind))
                        .expect("it touches nothing");
                    for weights in [[3e5, 2e5, 1e5], [0.0, 1e5, f64::NAN], [1e-300, 1e5, 9e5]] {
                        for way in ways {
                            let weights = &weights[..sources];
                            let found = views.worst(way, weights);
                            let each = (0..views.points.len()).map(|point| {
                                way.irradiance(views.points[point], views.at(point), weights)
                                    .0
                            });
                            let expected = each.fold(0.0, f64::max);
                            assert!(
                                found.to_bits() == expected.to_bits(),
                                "{sources} from ({x}, {y}), {kind:?}, {way:?}: {found} {expected}"
                            );
                            compared += 1;
                        }
                    }
                }
            }
        }
        assert_eq!(compared, 360);
    }
}
