//! The outline of one region, or of one half of what is seen, and what lies
//! inside it.

use glam::{DVec2, DVec3};

use super::edge::{Edge, Rim};
use crate::physics::region::cylinder::Cylinder;
use crate::physics::view::loops::Piece;
use crate::physics::view_factor::contour::Circle;

/// How to tell whether a direction lies inside an outline.
#[derive(Clone, Debug)]
pub(in crate::physics) enum Inside {
    /// On the inner side of all its edges, which are straight.
    Convex,
    /// In a polygon with dents, drawn in its own plane.
    Crooked {
        /// Towards the receiver.
        normal: DVec3,
        height: f64,
        right: DVec3,
        up: DVec3,
        corners: Vec<DVec2>,
    },
    /// In the cone over the only edge, a whole circle.
    Round,
    /// Where the way from the receiver meets a cylinder.
    Solid { cylinder: Cylinder, point: DVec3 },
    /// On the inner side of the plane through the only edge.
    Front,
}

/// An outline as seen from the receiver.
#[derive(Clone, Debug)]
pub(in crate::physics) struct Outline {
    pub(super) edges: Vec<Edge>,
    pub(super) inside: Inside,
}

impl Outline {
    /// A polygon: corners from the receiver, anticlockwise as seen.
    pub(in crate::physics) fn of_polygon(corners: &[DVec3], normal: DVec3, convex: bool) -> Self {
        let from = corners.iter().cycle().skip(corners.len().max(1) - 1);
        let edges = from
            .zip(corners)
            .filter_map(|(from, to)| Edge::straight(*from, *to))
            .collect();
        let inside = if convex {
            Inside::Convex
        } else {
            let (right, up) = normal.any_orthonormal_pair();
            Inside::Crooked {
                normal,
                height: -corners[0].dot(normal),
                right,
                up,
                corners: corners
                    .iter()
                    .map(|corner| DVec2::new(corner.dot(right), corner.dot(up)))
                    .collect(),
            }
        };
        Self { edges, inside }
    }

    /// What lies within a whole circle; none if it is seen edge on.
    pub(in crate::physics) fn of_circle(circle: Circle) -> Option<Self> {
        Edge::of_piece(&Piece::whole(circle)).map(|edge| Self {
            edges: vec![edge],
            inside: Inside::Round,
        })
    }

    /// The outline of a cylinder as seen from a point outside it.
    pub(in crate::physics) fn of_cylinder(
        cylinder: Cylinder,
        point: DVec3,
        pieces: &[Piece],
    ) -> Self {
        Self {
            edges: pieces.iter().filter_map(Edge::of_piece).collect(),
            inside: Inside::Solid { cylinder, point },
        }
    }

    /// What lies left of the plane through the receiver and one straight edge.
    pub(in crate::physics) fn of_front(from: DVec3, to: DVec3) -> Option<Self> {
        Edge::straight(from, to).map(|edge| Self {
            edges: vec![edge],
            inside: Inside::Front,
        })
    }

    /// Says whether a direction lies inside.
    pub(super) fn holds(&self, direction: DVec3) -> bool {
        match &self.inside {
            Inside::Convex | Inside::Front => self.is_left_of_all(direction),
            Inside::Crooked {
                normal,
                height,
                right,
                up,
                corners,
            } => {
                let share = -normal.dot(direction);
                if share <= 0.0 {
                    return false;
                }
                let place =
                    DVec2::new(direction.dot(*right), direction.dot(*up)) * (height / share);
                let mut inside = false;
                let mut from = corners[corners.len() - 1];
                for to in corners {
                    let (a, b) = (from - place, *to - place);
                    // Even-odd rule; one end of an edge counts, the other not.
                    if (a.y > 0.0) != (b.y > 0.0) && (b.y > a.y) == (a.perp_dot(b) > 0.0) {
                        inside = !inside;
                    }
                    from = *to;
                }
                inside
            }
            Inside::Round => match self.edges.first() {
                Some(Edge::Round { rim, .. }) => rim.holds(direction),
                _ => false,
            },
            // Its straight edges too, for one may stand for an arc seen edge on.
            Inside::Solid { cylinder, point } => {
                self.is_left_of_all(direction)
                    && cylinder
                        .stretch(*point, direction)
                        .is_some_and(|(_, leave)| leave > 0.0)
            }
        }
    }

    fn is_left_of_all(&self, direction: DVec3) -> bool {
        self.edges.iter().all(|edge| match edge {
            Edge::Straight { inward, .. } => inward.dot(direction) > 0.0,
            Edge::Round { .. } => true,
        })
    }

    /// Says whether all of another outline surely lies beyond one edge of this.
    pub(in crate::physics) fn misses(&self, other: &Self) -> bool {
        matches!(self.inside, Inside::Convex)
            && self.edges.iter().any(|edge| match edge {
                Edge::Straight { inward, .. } => other.lies_beyond(*inward),
                Edge::Round { .. } => false,
            })
    }

    fn lies_beyond(&self, inward: DVec3) -> bool {
        self.edges.iter().all(|edge| match edge {
            Edge::Straight { from, .. } => from.dot(inward) <= 0.0,
            Edge::Round { rim, .. } => beyond(rim, inward),
        })
    }

    /// Says whether all of another outline surely lies inside this one.
    pub(in crate::physics) fn covers(&self, other: &Self) -> bool {
        match self.inside {
            Inside::Convex => self.edges.iter().all(|edge| match edge {
                Edge::Straight { inward, .. } => other.lies_beyond(-*inward),
                Edge::Round { .. } => false,
            }),
            Inside::Round | Inside::Solid { .. } => other.edges.iter().all(|edge| match edge {
                Edge::Straight { from, .. } => self.holds(*from),
                Edge::Round { .. } => false,
            }),
            Inside::Crooked { .. } | Inside::Front => false,
        }
    }
}

/// Whether a whole circle lies beyond a plane through the receiver.
fn beyond(rim: &Rim, inward: DVec3) -> bool {
    let swing = rim.circle.swing(inward);
    swing.middle + swing.half <= 0.0
}
