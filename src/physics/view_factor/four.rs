//! Polygons of up to four vertices, worked out in step: the outlines of most
//! openings, and the ones that long work meets most often.

use std::f64::consts::TAU;

use glam::DVec3;

use super::contour;
use crate::numeric::{LARGEST_SQUARE, arc_over_tangent};

/// Four vertices as seen from a receiver, by coordinate; of a triangle the last
/// counts twice, and the edge between gives nothing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(in crate::physics) struct Four {
    x: [f64; 4],
    y: [f64; 4],
    z: [f64; 4],
}

impl Four {
    /// Returns the vertices as seen from `point`, if they are three or four.
    #[inline]
    pub(in crate::physics) fn seen(vertices: &[DVec3], point: DVec3) -> Option<Self> {
        let [a, b, c, d] = match *vertices {
            [a, b, c] => [a, b, c, c],
            [a, b, c, d] => [a, b, c, d],
            _ => return None,
        };
        Some(Self {
            x: [a.x - point.x, b.x - point.x, c.x - point.x, d.x - point.x],
            y: [a.y - point.y, b.y - point.y, c.y - point.y, d.y - point.y],
            z: [a.z - point.z, b.z - point.z, c.z - point.z, d.z - point.z],
        })
    }

    /// Returns the vertices.
    #[inline]
    pub(in crate::physics) fn vertices(&self) -> [DVec3; 4] {
        [0, 1, 2, 3].map(|index: usize| DVec3::new(self.x[index], self.y[index], self.z[index]))
    }

    /// Returns the height of the lowest vertex above a receiver's horizon.
    #[inline]
    pub(in crate::physics) fn lowest(&self, normal: DVec3) -> f64 {
        let height = |index: usize| {
            self.x[index] * normal.x + self.y[index] * normal.y + self.z[index] * normal.z
        };
        height(0).min(height(1)).min(height(2).min(height(3)))
    }

    /// Returns the flux vector: [`contour::edge`] over all edges.
    #[inline]
    pub(in crate::physics) fn flux(&self) -> DVec3 {
        let Self { x, y, z } = self;
        let (mut cx, mut cy, mut cz) = ([0.0; 4], [0.0; 4], [0.0; 4]);
        let (mut cosines, mut squares) = ([0.0; 4], [0.0; 4]);
        for index in 0..4 {
            let next = (index + 1) % 4;
            let (dx, dy, dz) = (x[next] - x[index], y[next] - y[index], z[next] - z[index]);
            cx[index] = dy * z[index] - dz * y[index];
            cy[index] = dz * x[index] - dx * z[index];
            cz[index] = dx * y[index] - dy * x[index];
            cosines[index] = x[index] * x[next] + y[index] * y[next] + z[index] * z[next];
        }
        for index in 0..4 {
            let sine = cx[index] * cx[index] + cy[index] * cy[index] + cz[index] * cz[index];
            squares[index] = sine / (cosines[index] * cosines[index]);
        }
        let narrow = |index: usize| cosines[index] > 0.0 && squares[index] < LARGEST_SQUARE;
        if !(narrow(0) & narrow(1) & narrow(2) & narrow(3)) {
            return self.wide();
        }
        let mut shares = [0.0; 4];
        for index in 0..4 {
            shares[index] = arc_over_tangent(squares[index]) / (TAU * cosines[index]);
        }
        let sum = |part: [f64; 4]| {
            (part[0] * shares[0] + part[1] * shares[1])
                + (part[2] * shares[2] + part[3] * shares[3])
        };
        DVec3::new(sum(cx), sum(cy), sum(cz))
    }

    /// The same for outlines so near that an edge is seen under a wide angle.
    #[cold]
    fn wide(&self) -> DVec3 {
        let [a, b, c, d] = self.vertices();
        contour::edge(a, b) + contour::edge(b, c) + contour::edge(c, d) + contour::edge(d, a)
    }
}
