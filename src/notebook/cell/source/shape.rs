//! Where a source is: its outline in the room, and the parts that emit.

use std::sync::Arc;

use glam::DVec3;

use super::Kind;
use crate::graph::Node;
use crate::notebook::Diagnostic;
use crate::notebook::datum::Datum;
use crate::notebook::engine::Linker;
use crate::notebook::task::Inputs;
use crate::physics::opening::{Opening, Walls};
use crate::physics::pool::Pool;
use crate::physics::scene::{Barrier, Part};
use crate::physics::{self, region::Region};

/// The outline of a source, with the nodes of its sizes.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) enum Outline {
    Disc {
        diameter: Node,
    },
    /// `along` is the height of an opening, the length of a pool.
    Rectangle {
        width: Node,
        along: Node,
    },
    Polygon {
        vertices: Vec<[Node; 2]>,
    },
    Sphere {
        diameter: Node,
    },
    Cylinder {
        diameter: Node,
        height: Node,
        lying: bool,
    },
    Plate {
        width: Node,
        height: Node,
    },
}

/// The place and the outline of a source or a screen in the room.
#[derive(Clone, Debug)]
pub struct Shape {
    /// The outline that people see first: of an opening its outer edge, of a
    /// pool its rim.
    pub region: Region,
    /// Which form it is.
    pub kind: Kind,
    /// The centre of its outline.
    pub centre: DVec3,
    /// Its heading on the plan, a horizontal unit vector.
    pub ahead: DVec3,
    /// How far it reaches behind its outline, m: the wall around an opening,
    /// the freeboard of a pool.
    pub depth: f64,
    /// What of it emits, each of one exitance.
    pub parts: Vec<Part>,
    /// What it hides or dims.
    pub barrier: Option<Barrier>,
    /// How a screen stands.
    pub frame: Option<Frame>,
    /// The opening through a thick wall, with its walls in balance.
    pub tunnel: Option<Arc<Opening>>,
}

impl PartialEq for Shape {
    /// The tunnel follows from the outline, the depth and the parts.
    fn eq(&self, other: &Shape) -> bool {
        self.region == other.region
            && self.kind == other.kind
            && self.centre == other.centre
            && self.ahead == other.ahead
            && self.depth == other.depth
            && self.parts == other.parts
            && self.barrier == other.barrier
            && self.frame == other.frame
    }
}

/// How a flat rectangle stands: its directions, and its sizes in m.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Frame {
    /// Where its front faces, a unit vector.
    pub normal: DVec3,
    /// Along its height, a unit vector.
    pub up: DVec3,
    /// Across.
    pub width: f64,
    /// Along `up`.
    pub height: f64,
}

impl Shape {
    /// Returns the shape of a region that emits as a whole.
    #[must_use]
    pub fn simple(region: Region, kind: Kind, centre: DVec3, ahead: DVec3) -> Shape {
        let part = Part::bare(region.clone());
        Shape {
            region,
            kind,
            centre,
            ahead,
            depth: 0.0,
            parts: vec![part],
            barrier: None,
            frame: None,
            tunnel: None,
        }
    }

    /// Returns how far the outline reaches along a direction on the plan from
    /// its stated centre, m.
    #[must_use]
    pub fn edge_along(&self, ahead: DVec3) -> f64 {
        let middle = self.region.centre();
        if middle.distance(self.centre) <= 1e-9 * self.region.bounding_radius() {
            self.region.edge_along(ahead)
        } else {
            self.region.edge_from(self.centre, ahead)
        }
    }

    /// Returns whether this is a source, not a screen.
    #[must_use]
    pub fn is_source(&self) -> bool {
        self.kind != Kind::Screen
    }

    /// Returns whether a point lies behind the outline of an opening or a rim,
    /// in the wall's tunnel or above the metal.
    #[must_use]
    pub fn swallows(&self, point: DVec3) -> bool {
        if self.depth <= 0.0 {
            return false;
        }
        let Some(normal) = self.region.normal() else {
            return false;
        };
        let above = (point - self.region.centre()).dot(normal);
        (-self.depth..=0.0).contains(&above) && self.region.touches(point - normal * above)
    }

    /// Returns whether the straight way between two points meets this source.
    /// A screen can be reached past.
    #[must_use]
    pub fn is_met(&self, from: DVec3, to: DVec3) -> bool {
        self.is_source() && self.region.crosses(from, to)
    }
}

/// Returns the horizontal unit vector of a heading in radians, clockwise from
/// north.
#[must_use]
pub fn direction(heading: f64) -> DVec3 {
    DVec3::new(heading.sin(), heading.cos(), 0.0)
}

/// What lies behind the outline of a source, with the nodes of its sizes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(in crate::notebook) enum Behind {
    /// Nothing that was given.
    Nothing,
    /// A wall with a tunnel through it.
    Wall { thickness: Node, walls: Walls },
    /// A vessel: the melt lies below its rim, and the vessel leans.
    Vessel { freeboard: Node, lean: Node },
}

/// Works out where a source is.
#[derive(Clone, Debug, PartialEq)]
pub(in crate::notebook) struct ShapeTask {
    pub(super) kind: Kind,
    pub(super) outline: Outline,
    pub(super) place: [Node; 3],
    pub(super) heading: Node,
    pub(super) tilt: Node,
    /// What lies behind the outline.
    pub(super) behind: Behind,
}

impl ShapeTask {
    pub(in crate::notebook) fn inputs(&self, nodes: &mut Vec<Node>) {
        match &self.outline {
            Outline::Disc { diameter } | Outline::Sphere { diameter } => nodes.push(*diameter),
            Outline::Rectangle { width, along } => nodes.extend([width, along]),
            Outline::Polygon { vertices } => nodes.extend(vertices.iter().flatten()),
            Outline::Cylinder {
                diameter, height, ..
            } => nodes.extend([diameter, height]),
            Outline::Plate { width, height } => nodes.extend([width, height]),
        }
        nodes.extend(self.place);
        nodes.extend([self.heading, self.tilt]);
        match self.behind {
            Behind::Nothing => {}
            Behind::Wall { thickness, .. } => nodes.push(thickness),
            Behind::Vessel { freeboard, lean } => nodes.extend([freeboard, lean]),
        }
    }

    pub(in crate::notebook) fn run(&self, inputs: Inputs<'_>) -> Result<Datum, Diagnostic> {
        let [x, y, z] = self.place.map(|node| inputs.si(node));
        let centre = DVec3::new(x, y, z);
        let heading = inputs.si(self.heading);
        let ahead = direction(heading);
        let (normal, up) = match self.kind {
            Kind::Pool => (DVec3::Z, ahead),
            Kind::Opening | Kind::Body | Kind::Screen => {
                let (sin, cos) = inputs.si(self.tilt).sin_cos();
                (ahead * cos + DVec3::Z * sin, DVec3::Z * cos - ahead * sin)
            }
        };
        let simple = |region| Shape::simple(region, self.kind, centre, ahead);
        let shape = match self.behind {
            Behind::Nothing => simple(self.region(inputs, centre, normal, up)?),
            Behind::Wall { thickness, walls } => {
                let mut shape = simple(self.region(inputs, centre, normal, up)?);
                let depth = inputs.si(thickness);
                if depth > 0.0 {
                    let opening =
                        Opening::new(shape.region.clone(), depth, walls).map_err(of_wall)?;
                    shape.depth = depth;
                    shape.parts = opening.parts().to_vec();
                    shape.tunnel = Some(Arc::new(opening));
                }
                shape
            }
            Behind::Vessel { freeboard, lean } => {
                let (freeboard, lean) = (inputs.si(freeboard), inputs.si(lean));
                if freeboard == 0.0 && lean == 0.0 {
                    simple(self.region(inputs, centre, normal, up)?)
                } else {
                    let (sin, cos) = lean.sin_cos();
                    let axis = DVec3::Z * cos + ahead * sin;
                    let along = ahead * cos - DVec3::Z * sin;
                    let mouth = centre + axis * freeboard;
                    let rim = self.region(inputs, mouth, axis, along)?;
                    let pool = if lean == 0.0 {
                        Pool::new(self.region(inputs, centre, normal, up)?, freeboard)
                    } else {
                        Pool::tilted(rim.clone(), z)
                    };
                    let pool = pool.map_err(of_vessel)?;
                    let mut shape = simple(rim);
                    shape.depth = freeboard;
                    shape.parts = pool.parts().to_vec();
                    shape
                }
            }
        };
        Ok(Datum::Shape(Arc::new(shape)))
    }

    /// Returns the outline in the room.
    fn region(
        &self,
        inputs: Inputs<'_>,
        centre: DVec3,
        normal: DVec3,
        up: DVec3,
    ) -> Result<Region, Diagnostic> {
        let region = match &self.outline {
            Outline::Disc { diameter } => Region::disc(centre, normal, inputs.si(*diameter) / 2.0),
            Outline::Rectangle { width, along } => {
                Region::rectangle(centre, normal, up, inputs.si(*width), inputs.si(*along))
            }
            Outline::Polygon { vertices } => {
                let points: Vec<[f64; 2]> = vertices
                    .iter()
                    .map(|pair| pair.map(|node| inputs.si(node)))
                    .collect();
                return Region::outline(centre, normal, up, &points).map_err(of_polygon);
            }
            Outline::Sphere { diameter } => Region::sphere(centre, inputs.si(*diameter) / 2.0),
            Outline::Cylinder {
                diameter,
                height,
                lying,
            } => {
                let way = if *lying { normal } else { DVec3::Z };
                let axis = way * inputs.si(*height);
                Region::cylinder(centre - axis * 0.5, axis, inputs.si(*diameter) / 2.0)
            }
            Outline::Plate { width, height } => {
                Region::plate(centre, normal, up, inputs.si(*width), inputs.si(*height))
            }
        };
        region.map_err(|error| {
            Diagnostic::of_cell("no-such-shape", error.to_string())
                .with_hint("check the sizes and the place of the source")
        })
    }
}

/// Returns the fault of a polygon at its place.
fn of_polygon(error: physics::Error) -> Diagnostic {
    use physics::Error;
    // Edges are counted from 1, the pairs of the field from 0: edge 1 begins at
    // the first corner.
    let item = match error {
        Error::CrossesItself { second, .. } => u16::try_from(second.saturating_sub(1)).ok(),
        Error::NotFlat { vertex, .. } => u16::try_from(vertex.saturating_sub(1)).ok(),
        _ => None,
    };
    Diagnostic::of_field("vertices", "no-such-shape", error.to_string())
        .with_hint("give the corners in order around the outline, each once")
        .in_item(item.map(|pair| (pair, 0)))
}

/// Returns the fault of a wall at its place.
fn of_wall(error: physics::Error) -> Diagnostic {
    use physics::Error;
    let field = match error {
        Error::NotConvex { .. } => "vertices",
        _ => "wall_thickness",
    };
    Diagnostic::of_field(field, "no-such-wall", error.to_string())
        .with_hint("check the wall's thickness and the outline of the opening")
}

/// Returns the fault of a vessel at its place.
fn of_vessel(error: physics::Error) -> Diagnostic {
    use physics::Error;
    let field = match error {
        Error::NotConvex { .. } => "vertices",
        Error::OutOfRange {
            parameter: "freeboard",
            ..
        } => "freeboard",
        _ => "vessel_tilt",
    };
    Diagnostic::of_field(field, "no-such-vessel", error.to_string())
        .with_hint("check the freeboard and how far the vessel leans")
}

/// Reads what lies behind the outline.
pub(super) fn behind(linker: &mut Linker<'_>, kind: Kind) -> Behind {
    match kind {
        Kind::Opening => {
            let cold = linker.word("wall") == Some("cold");
            let thickness = linker.always("wall_thickness");
            if linker.has("wall_thickness") {
                Behind::Wall {
                    thickness,
                    walls: if cold {
                        Walls::Cold
                    } else {
                        Walls::Reradiating
                    },
                }
            } else {
                Behind::Nothing
            }
        }
        Kind::Pool if linker.has("freeboard") || linker.has("vessel_tilt") => Behind::Vessel {
            freeboard: linker.always("freeboard"),
            lean: linker.always("vessel_tilt"),
        },
        Kind::Pool | Kind::Body | Kind::Screen => Behind::Nothing,
    }
}

/// Reads the outline that goes with a form, or says what is wrong with it.
pub(super) fn outline_of(
    linker: &mut Linker<'_>,
    kind: Kind,
    outline: &'static str,
) -> Option<Outline> {
    /// The fields of sizes, and which of them each outline has.
    const SIZES: [&str; 6] = [
        "diameter", "width", "height", "length", "vertices", "stance",
    ];
    let (form, fits): (_, &[&str]) = match kind {
        Kind::Opening => ("an opening", &["disc", "rectangle", "polygon"]),
        Kind::Pool => ("a pool", &["disc", "rectangle", "polygon"]),
        Kind::Body | Kind::Screen => ("a body", &["sphere", "cylinder", "plate"]),
    };
    if !fits.contains(&outline) {
        linker.fault(
            Diagnostic::of_field(
                "outline",
                "outline-out-of-place",
                format!("expected {} for {form}, found {outline}", fits.join(" or ")),
            )
            .with_hint("change the outline or the form"),
        );
        return None;
    }
    let own: &[&str] = match (kind, outline) {
        (_, "disc" | "sphere") => &["diameter"],
        (Kind::Pool, "rectangle") => &["width", "length"],
        (_, "rectangle" | "plate") => &["width", "height"],
        (_, "polygon") => &["vertices"],
        _ => &["diameter", "height", "stance"],
    };
    for size in SIZES {
        if !own.contains(&size) {
            linker.refuse(&[size], "does not belong to this outline");
        }
    }
    Some(match (kind, outline) {
        (_, "disc") => Outline::Disc {
            diameter: linker.need("diameter", "a disc")?,
        },
        (_, "sphere") => Outline::Sphere {
            diameter: linker.need("diameter", "a sphere")?,
        },
        (Kind::Pool, "rectangle") => {
            let width = linker.need("width", "a rectangle");
            let along = linker.need("length", "a rectangular pool");
            Outline::Rectangle {
                width: width?,
                along: along?,
            }
        }
        (_, "rectangle") => {
            let width = linker.need("width", "a rectangle");
            let along = linker.need("height", "a rectangular opening");
            Outline::Rectangle {
                width: width?,
                along: along?,
            }
        }
        (_, "plate") => {
            let width = linker.need("width", "a plate");
            let height = linker.need("height", "a plate");
            Outline::Plate {
                width: width?,
                height: height?,
            }
        }
        (_, "polygon") => Outline::Polygon {
            vertices: linker.need_pairs("vertices", "a polygon")?,
        },
        _ => {
            let lying = linker.word("stance") == Some("lying");
            let diameter = linker.need("diameter", "a cylinder");
            let height = linker.need("height", "a cylinder");
            Outline::Cylinder {
                diameter: diameter?,
                height: height?,
                lying,
            }
        }
    })
}
