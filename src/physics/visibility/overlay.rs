//! Outlines laid over each other: which pieces of their edges bound what is
//! seen.

use std::borrow::Cow;

use glam::DVec3;

use super::crossing::{self, Common};
use super::edge::Edge;
use super::outline::Outline;
use crate::physics::view::loops::Piece;

/// A shadow: what lies in one outline, and in a second if there is one.
#[derive(Clone, Copy, Debug)]
pub(in crate::physics) struct Shadow {
    /// The outline, by its place in the overlay.
    pub(in crate::physics) outline: usize,
    /// The second outline.
    pub(in crate::physics) within: Option<usize>,
    /// None if it hides all, else the bit by which what is seen through it is
    /// told from the rest.
    pub(in crate::physics) clear: Option<u32>,
}

/// The outlines that decide what is seen of one part.
#[derive(Clone, Debug)]
pub(in crate::physics) struct Overlay<'a> {
    /// First those that what is seen lies in, then those of the shadows.
    pub(in crate::physics) outlines: Vec<Cow<'a, Outline>>,
    /// How many of them what is seen must lie in; the first is the part's own.
    pub(in crate::physics) frames: usize,
    /// What is seen in this one is left out.
    pub(in crate::physics) less: Option<usize>,
    /// What hides or dims.
    pub(in crate::physics) shadows: Vec<Shadow>,
    /// The angle in radians below which directions count as one.
    pub(in crate::physics) hair: f64,
}

/// What is seen through one set of clear shadows.
#[derive(Clone, Debug)]
pub(in crate::physics) struct Seen {
    /// The bits of the clear shadows it is seen through.
    pub(in crate::physics) through: u128,
    /// Its outline.
    pub(in crate::physics) pieces: Vec<Piece>,
    /// Nothing of the part is missing: the outline is the part's own.
    pub(in crate::physics) whole: bool,
    nodes: Vec<(u32, u32)>,
}

impl Seen {
    /// Closes the gap between an arc's own ends and the places it is split at:
    /// where a circle is seen nearly edge on, a hair off it is far along it.
    fn close(&mut self, piece: &Piece, forward: bool) {
        const GAP: f64 = 1e-14;
        let Piece::Round {
            circle,
            start,
            stop,
            from,
            to,
        } = *piece
        else {
            return;
        };
        for (node, angle, is_start) in [(from, start, true), (to, stop, false)] {
            let end = circle.point(angle).normalize();
            if end.distance_squared(node) > GAP * GAP {
                let inwards = is_start == forward;
                let (from, to) = if inwards { (node, end) } else { (end, node) };
                self.pieces.push(Piece::Straight { from, to });
                if let Some(Piece::Round { from, to, .. }) =
                    (self.pieces.iter_mut()).rfind(|piece| matches!(piece, Piece::Round { .. }))
                {
                    *(if inwards { from } else { to }) = end;
                }
            }
        }
    }
}

/// A place where an edge is split.
#[derive(Clone, Copy, Debug)]
struct Split {
    edge: u32,
    at: f64,
    node: u32,
}

/// The directions in which edges end or cross, each once.
struct Nodes {
    places: Vec<DVec3>,
    hair: f64,
}

impl Nodes {
    fn number(&mut self, place: DVec3) -> u32 {
        let near = |other: &DVec3| (place - *other).abs().max_element() <= self.hair;
        // From the last: an edge mostly starts where the one before ends.
        let found = self.places.iter().rposition(near).unwrap_or_else(|| {
            self.places.push(place);
            self.places.len() - 1
        });
        u32::try_from(found).unwrap_or(u32::MAX)
    }

    fn place(&self, node: u32) -> DVec3 {
        self.places[node as usize]
    }
}

/// On which sides of an edge something is.
type Sides = [bool; 2];

impl Overlay<'_> {
    /// Returns what is seen, parted by the clear shadows it is seen through;
    /// none if rounding left an outline open, so that the point must be moved a
    /// hair.
    pub(in crate::physics) fn seen(&self) -> Option<Vec<Seen>> {
        let edges: Vec<(usize, &Edge)> = (self.outlines.iter().enumerate())
            .flat_map(|(index, outline)| outline.edges.iter().map(move |edge| (index, edge)))
            .collect();
        let mut nodes = Nodes {
            places: Vec::with_capacity(2 * edges.len()),
            hair: 4.0 * self.hair,
        };
        let mut splits = Vec::with_capacity(4 * edges.len());
        let number = |edge: usize| u32::try_from(edge).unwrap_or(u32::MAX);
        for (index, (_, edge)) in edges.iter().enumerate() {
            let (from, to) = edge.ends();
            let (start, stop) = edge.span();
            for (place, at) in [(from, start), (to, stop)] {
                let node = nodes.number(place);
                splits.push(Split {
                    edge: number(index),
                    at,
                    node,
                });
            }
        }
        let shared = self.split(&edges, &mut nodes, &mut splits);
        let splits = in_order(&splits, edges.len());
        let mut seen: Vec<Seen> = Vec::new();
        let mut own_edges = 0;
        for run in splits.chunk_by(|one, other| one.edge == other.edge) {
            let index = run[0].edge as usize;
            let (outline, edge) = edges[index];
            own_edges += usize::from(outline == 0);
            for pair in run.windows(2) {
                let (low, high) = (&pair[0], &pair[1]);
                let forward = {
                    let (start, stop) = edge.span();
                    start <= stop
                };
                let (from, to) = if forward { (low, high) } else { (high, low) };
                self.keep(
                    (index, outline, edge),
                    (from, to),
                    (&nodes, &edges, &shared),
                    &mut seen,
                );
            }
        }
        for part in &mut seen {
            if !is_closed(&part.nodes, nodes.places.len()) {
                return None;
            }
            part.whole &= part.pieces.len() == own_edges;
        }
        seen.sort_by_key(|part| part.through);
        Some(seen)
    }

    /// Splits all edges where they cross; returns the pairs that run along each
    /// other.
    fn split(
        &self,
        edges: &[(usize, &Edge)],
        nodes: &mut Nodes,
        splits: &mut Vec<Split>,
    ) -> Vec<(usize, usize)> {
        let mut shared = Vec::new();
        let mut common = Common::default();
        for (one, (first, edge)) in edges.iter().enumerate() {
            for (other, (second, crossed)) in edges.iter().enumerate().skip(one + 1) {
                if first == second {
                    continue;
                }
                crossing::find(edge, crossed, self.hair, &mut common);
                // Where two edges only touch, an end or a crossing on that
                // stretch stands for it.
                let touches = common.touches.iter().map(|place| {
                    let near = nodes.places.iter().find(|node| {
                        node.distance(*place) < 1e-5
                            && edge.is_passed_by(**node, self.hair)
                            && crossed.is_passed_by(**node, self.hair)
                    });
                    near.copied().unwrap_or(*place)
                });
                let touches: Vec<DVec3> = touches.collect();
                for place in common.places.iter().chain(&touches) {
                    let node = nodes.number(*place);
                    // At the node's own place, where edges meet to the last bit.
                    let place = nodes.place(node);
                    for (index, edge) in [(one, edge), (other, crossed)] {
                        if let Some(at) = edge.place_of(place, 1e3 * self.hair) {
                            splits.push(Split {
                                edge: u32::try_from(index).unwrap_or(u32::MAX),
                                at,
                                node,
                            });
                        }
                    }
                }
                if common.shared {
                    shared.push((one, other));
                }
            }
        }
        shared
    }

    /// Keeps a piece of an edge where it bounds what is seen.
    fn keep(
        &self,
        (index, own, edge): (usize, usize, &Edge),
        (from, to): (&Split, &Split),
        (nodes, edges, shared): (&Nodes, &[(usize, &Edge)], &[(usize, usize)]),
        seen: &mut Vec<Seen>,
    ) {
        let (from_place, to_place) = (nodes.place(from.node), nodes.place(to.node));
        let (middle, piece) = match edge {
            Edge::Straight { .. } => {
                if from.node == to.node {
                    return;
                }
                let piece = Piece::Straight {
                    from: from_place,
                    to: to_place,
                };
                (from_place + to_place, piece)
            }
            Edge::Round { rim, .. } => {
                if from.node == to.node && (to.at - from.at).abs() < 1e-3 {
                    return;
                }
                let piece = Piece::Round {
                    circle: rim.circle,
                    start: from.at,
                    stop: to.at,
                    from: from_place,
                    to: to_place,
                };
                (rim.circle.point(0.5 * (from.at + to.at)), piece)
            }
        };
        let sides = |outline: usize| -> Option<Sides> {
            if outline == own {
                return Some([true, false]);
            }
            for (one, other) in shared {
                let along = match (*one == index, *other == index) {
                    (true, _) => *other,
                    (_, true) => *one,
                    _ => continue,
                };
                let (its, along) = edges[along];
                if its == outline && along.place_of(middle, 0.0).is_some() {
                    // Of edges that run along each other the first stands for all.
                    if its < own {
                        return None;
                    }
                    let alike = edge.heading(middle).dot(along.heading(middle)) > 0.0;
                    return Some([alike, !alike]);
                }
            }
            let inside = self.outlines[outline].holds(middle);
            Some([inside, inside])
        };
        let Some([left, right]) = self.through(sides) else {
            return;
        };
        if left == right {
            return;
        }
        for (through, forward) in [(left, true), (right, false)] {
            let Some(through) = through else { continue };
            let place = seen
                .iter()
                .position(|part| part.through == through)
                .unwrap_or_else(|| {
                    seen.push(Seen {
                        through,
                        pieces: Vec::with_capacity(8),
                        whole: true,
                        nodes: Vec::with_capacity(8),
                    });
                    seen.len() - 1
                });
            let part = &mut seen[place];
            part.whole &= own == 0 && forward;
            part.pieces
                .push(if forward { piece } else { piece.reversed() });
            part.close(&piece, forward);
            part.nodes.push(if forward {
                (from.node, to.node)
            } else {
                (to.node, from.node)
            });
        }
    }

    /// Returns for both sides of a piece the clear shadows through which the
    /// part is seen there, none where it is not seen; none at all if it is
    /// seen on neither, or another piece stands for this one.
    fn through(&self, sides: impl Fn(usize) -> Option<Sides>) -> Option<[Option<u128>; 2]> {
        let mut seen = [true; 2];
        for frame in 0..self.frames {
            let inside = sides(frame)?;
            seen = [seen[0] && inside[0], seen[1] && inside[1]];
            if seen == [false; 2] {
                return None;
            }
        }
        if let Some(less) = self.less {
            let inside = sides(less)?;
            seen = [seen[0] && !inside[0], seen[1] && !inside[1]];
        }
        let mut through = [0_u128; 2];
        for shadow in &self.shadows {
            if seen == [false; 2] {
                return None;
            }
            let mut inside = sides(shadow.outline)?;
            if let Some(within) = shadow.within {
                let other = sides(within)?;
                inside = [inside[0] && other[0], inside[1] && other[1]];
            }
            for side in 0..2 {
                if inside[side] {
                    match shadow.clear {
                        None => seen[side] = false,
                        Some(bit) => through[side] |= 1_u128 << bit,
                    }
                }
            }
        }
        if seen == [false; 2] {
            return None;
        }
        Some([seen[0].then_some(through[0]), seen[1].then_some(through[1])])
    }
}

/// The splits edge by edge, and along each edge in order.
fn in_order(splits: &[Split], edges: usize) -> Vec<Split> {
    let mut ends = vec![0_usize; edges + 1];
    for split in splits {
        ends[split.edge as usize + 1] += 1;
    }
    for edge in 0..edges {
        ends[edge + 1] += ends[edge];
    }
    let mut sorted = splits.to_vec();
    for split in splits {
        let next = &mut ends[split.edge as usize];
        sorted[*next] = *split;
        *next += 1;
    }
    for run in sorted.chunk_by_mut(|one, other| one.edge == other.edge) {
        run.sort_unstable_by(|one, other| one.at.total_cmp(&other.at));
    }
    sorted
}

/// Whether at every node as many pieces end as begin.
fn is_closed(pieces: &[(u32, u32)], nodes: usize) -> bool {
    let mut open = vec![0_i32; nodes];
    for (from, to) in pieces {
        open[*from as usize] += 1;
        open[*to as usize] -= 1;
    }
    open.iter().all(|count| *count == 0)
}
