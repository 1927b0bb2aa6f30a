//! What is seen from a point: the pieces of the scene's parts, the envelope
//! around a position, and the way a receiver faces.

use std::borrow::Cow;
use std::sync::OnceLock;

use glam::DVec3;

use crate::graph::Node;
use crate::guidance::Envelope;
use crate::notebook::cell::source::direction;
use crate::notebook::scene::{Form, Tag, Touched, Weights};
use crate::notebook::task::Inputs;
use crate::physics::exposure;
use crate::physics::surface::Emission;
use crate::physics::view::View;

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

    /// Returns the exitance of a source in this band, for judging: where a band
    /// exceeds the whole, the whole is taken as that band.
    #[must_use]
    pub fn judged_of(self, emission: &Emission) -> f64 {
        match self {
            Band::Total => emission
                .total
                .max(emission.skin)
                .max(emission.near_infrared),
            Band::NearInfrared | Band::Skin => self.of(emission),
        }
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
    /// The pieces that are seen, point by point.
    views: Vec<View>,
    pieces: Pieces,
    alone: OnceLock<Alone>,
    /// Parallel to the views, a bound on each one's factor in any orientation.
    ceilings: OnceLock<Vec<f64>>,
}

/// Which piece belongs to what.
#[derive(Clone, Debug)]
enum Pieces {
    /// From every point one of each part, in order: so many.
    OneOfEach(usize),
    /// As they come: parallel to the views, and where those of each point
    /// begin, with the end of the last.
    Tagged { tags: Vec<Tag>, starts: Vec<usize> },
}

/// What a single part sends the strongest way: its exitance times these.
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
    /// Looks at every part of the scene from each of the points, all of them
    /// within reach of `stated`.
    ///
    /// # Errors
    ///
    /// [`Hit`] where a point lies in a source, or where the way to it from
    /// `stated` meets one.
    pub fn look(form: &Form, stated: DVec3, points: Vec<DVec3>) -> Result<Views, Hit> {
        let mut pieces = Vec::with_capacity(points.len() * form.parts());
        let (mut tags, mut starts) = (Vec::new(), vec![0]);
        for point in &points {
            for (index, shape) in form.shapes.iter().enumerate() {
                let reached = *point != stated && shape.is_met(stated, *point);
                if reached || shape.swallows(*point) {
                    return Err(if reached || *point != stated {
                        Hit::Reached(index)
                    } else {
                        Hit::Inside(index)
                    });
                }
            }
            form.look(*point, &mut pieces, &mut tags)
                .map_err(|Touched(part)| {
                    let index = form.owner(part);
                    if *point == stated {
                        Hit::Inside(index)
                    } else {
                        Hit::Reached(index)
                    }
                })?;
            starts.push(pieces.len());
        }
        Ok(Views::new(form, points, pieces, tags, starts))
    }

    /// Looks at every part of the scene from each of the points, which have
    /// nothing to do with one another.
    ///
    /// # Errors
    ///
    /// [`Hit::Inside`] where a point lies in a source.
    pub fn standing(form: &Form, points: Vec<DVec3>) -> Result<Views, Hit> {
        let mut pieces = Vec::with_capacity(points.len() * form.parts());
        let (mut tags, mut starts) = (Vec::new(), vec![0]);
        for point in &points {
            let swallowed = form.shapes.iter().position(|shape| shape.swallows(*point));
            if let Some(index) = swallowed {
                return Err(Hit::Inside(index));
            }
            form.look(*point, &mut pieces, &mut tags)
                .map_err(|Touched(part)| Hit::Inside(form.owner(part)))?;
            starts.push(pieces.len());
        }
        Ok(Views::new(form, points, pieces, tags, starts))
    }

    fn new(
        form: &Form,
        points: Vec<DVec3>,
        views: Vec<View>,
        tags: Vec<Tag>,
        starts: Vec<usize>,
    ) -> Views {
        Views {
            points,
            views,
            pieces: if form.is_plain() {
                Pieces::OneOfEach(form.parts())
            } else {
                Pieces::Tagged { tags, starts }
            },
            alone: OnceLock::new(),
            ceilings: OnceLock::new(),
        }
    }

    /// Returns where the pieces of a point lie among the views.
    fn range(&self, point: usize) -> std::ops::Range<usize> {
        match &self.pieces {
            Pieces::OneOfEach(parts) => point * parts..(point + 1) * parts,
            Pieces::Tagged { starts, .. } => starts[point]..starts[point + 1],
        }
    }

    /// Returns the pieces that are seen from the point of this number.
    #[must_use]
    pub fn at(&self, point: usize) -> &[View] {
        &self.views[self.range(point)]
    }

    /// Returns the exitances that arrive of the pieces seen from a point,
    /// parallel to them, W/m².
    #[must_use]
    pub fn arriving<'a>(&self, point: usize, weights: &'a Weights<'_>) -> Cow<'a, [f64]> {
        match &self.pieces {
            Pieces::OneOfEach(_) => Cow::Borrowed(weights.sent()),
            Pieces::Tagged { tags, .. } => Cow::Owned(
                tags[self.range(point)]
                    .iter()
                    .map(|tag| weights.arriving(tag))
                    .collect(),
            ),
        }
    }

    /// Returns what is known of a piece seen from a point beside its view;
    /// `None` where every part is one piece and nothing is in its way.
    #[must_use]
    pub fn tag(&self, point: usize, piece: usize) -> Option<&Tag> {
        match &self.pieces {
            Pieces::OneOfEach(_) => None,
            Pieces::Tagged { tags, .. } => tags[self.range(point)].get(piece),
        }
    }

    /// Returns the part that each piece seen from a point belongs to, with the
    /// piece.
    pub fn parts(&self, point: usize) -> impl Iterator<Item = (usize, &View)> {
        let range = self.range(point);
        let start = range.start;
        range.map(move |at| {
            let part = match &self.pieces {
                Pieces::OneOfEach(_) => at - start,
                Pieces::Tagged { tags, .. } => tags[at].part,
            };
            (part, &self.views[at])
        })
    }

    /// Returns the irradiance at the point of this number in W/m² for what the
    /// parts send, and the normal of the receiver.
    #[must_use]
    pub fn irradiance(
        &self,
        point: usize,
        orientation: Orientation,
        weights: &Weights<'_>,
    ) -> (f64, DVec3) {
        match (self.alone(orientation), weights.sent()) {
            // The answer of the long way, to the bit: there the only weight is
            // taken out before anything is worked out.
            (Some(alone), [weight]) if counts(*weight) => {
                let (factor, normal) = alone.points[point];
                (weight * factor, normal)
            }
            _ => orientation.irradiance(
                self.points[point],
                self.at(point),
                &self.arriving(point, weights),
            ),
        }
    }

    /// Returns the greatest irradiance over all points, W/m².
    ///
    /// Points that cannot be the worst, because even the sum of what each
    /// part could send there at most is less, are passed over.
    #[must_use]
    pub fn worst(&self, orientation: Orientation, weights: &Weights<'_>) -> f64 {
        if let (Some(alone), [weight]) = (self.alone(orientation), weights.sent())
            && counts(*weight)
        {
            return weight * alone.worst;
        }
        self.worst_point(orientation, weights).0
    }

    /// Returns the greatest irradiance over all points in W/m², and the number
    /// of the point that meets it: the first, where nothing is met anywhere.
    #[must_use]
    pub fn worst_point(&self, orientation: Orientation, weights: &Weights<'_>) -> (f64, usize) {
        let bounds: Vec<f64> = (0..self.points.len())
            .map(|point| self.bound(point, weights))
            .collect();
        let highest = (0..bounds.len()).max_by(|a, b| bounds[*a].total_cmp(&bounds[*b]));
        let (mut worst, mut at) = (0.0, 0);
        for point in highest.into_iter().chain(0..bounds.len()) {
            if bounds[point] > worst && (worst == 0.0 || Some(point) != highest) {
                let found = self.irradiance(point, orientation, weights).0;
                if found > worst {
                    (worst, at) = (found, point);
                }
            }
        }
        (worst, at)
    }

    /// Returns what a single part sends the strongest way, if that is asked.
    fn alone(&self, orientation: Orientation) -> Option<&Alone> {
        let is_alone = matches!(self.pieces, Pieces::OneOfEach(1));
        (is_alone && orientation == Orientation::Strongest).then(|| {
            self.alone.get_or_init(|| {
                let factor = |view| exposure::strongest(std::slice::from_ref(view), &[1.0]);
                let points: Vec<(f64, DVec3)> = self.views.iter().map(factor).collect();
                let worst = points.iter().map(|(factor, _)| *factor).fold(0.0, f64::max);
                Alone { points, worst }
            })
        })
    }

    /// Returns what the irradiance at a point stays below in any orientation.
    fn bound(&self, point: usize, weights: &Weights<'_>) -> f64 {
        let (share, besides) = ROUNDING;
        let ceilings = self
            .ceilings
            .get_or_init(|| self.views.iter().map(View::ceiling).collect());
        ceilings[self.range(point)]
            .iter()
            .zip(self.arriving(point, weights).iter())
            .filter(|(_, weight)| counts(**weight))
            .map(|(ceiling, weight)| weight * (ceiling * (1.0 + share) + besides))
            .sum()
    }
}

/// Whether a weight counts for an irradiance at all.
fn counts(weight: f64) -> bool {
    weight.is_finite() && weight > 0.0
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::sync::Arc;

    use crate::notebook::cell::source::{Kind, Shape};
    use crate::notebook::scene::Heat;
    use crate::physics::region::Region;

    fn form(centres: &[DVec3]) -> Form {
        let shape = |centre: &DVec3| {
            let region = Region::rectangle(*centre, DVec3::Y, DVec3::Z, 0.9, 0.7);
            Arc::new(Shape::simple(
                region.expect("a door"),
                Kind::Opening,
                *centre,
                DVec3::Y,
            ))
        };
        Form::new(
            centres.iter().map(|_| Arc::from("door")).collect(),
            centres.iter().map(shape).collect(),
            false,
        )
        .expect("a small scene")
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
                            let heat = Heat::of_totals(&weights[..sources]);
                            let weights = &heat.weights(Band::Total);
                            let found = views.worst(way, weights);
                            let each = (0..views.points.len()).map(|point| {
                                let sent = weights.sent();
                                way.irradiance(views.points[point], views.at(point), sent).0
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
