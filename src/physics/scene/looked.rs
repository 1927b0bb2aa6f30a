//! What was seen of a scene from one point.

use crate::physics::view::View;

/// A piece of a part, seen through one set of clear barriers.
#[derive(Clone, Debug, PartialEq)]
pub struct Glimpse {
    /// Which part, by its place in the scene.
    pub part: usize,
    /// The clear barriers it is seen through, by their places in the scene,
    /// ascending.
    pub through: Box<[u16]>,
    /// What is seen.
    pub view: View,
}

/// How the point stands to a part.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stance {
    /// Where the part can be seen, though it may be hidden or lie edge on.
    InFront,
    /// Behind the face of a flat part, or behind the outline it is seen through:
    /// nothing is seen.
    Behind,
    /// On the part, inside it, or inside the tunnel it is seen through: nothing
    /// can be said.
    Touching,
}

/// What is seen of every part of a scene from one point.
#[derive(Clone, Debug, PartialEq)]
pub struct Looked {
    glimpses: Vec<Glimpse>,
    /// Of each part how the point stands to it, and where its glimpses end.
    parts: Vec<(Stance, usize)>,
    pub(super) barrier: Option<usize>,
}

impl Looked {
    pub(super) fn with_room(parts: usize) -> Self {
        Self {
            glimpses: Vec::with_capacity(parts),
            parts: Vec::with_capacity(parts),
            barrier: None,
        }
    }

    /// Adds the next part.
    pub(super) fn add(
        &mut self,
        stance: Stance,
        glimpses: impl IntoIterator<Item = (Box<[u16]>, View)>,
    ) {
        let part = self.parts.len();
        for (through, view) in glimpses {
            if view != View::EMPTY {
                self.glimpses.push(Glimpse {
                    part,
                    through,
                    view,
                });
            }
        }
        self.parts.push((stance, self.glimpses.len()));
    }

    /// Returns all glimpses in the order of the parts, and of one part in the
    /// order of the barriers they pass. What is not seen has none.
    #[must_use]
    pub fn glimpses(&self) -> &[Glimpse] {
        &self.glimpses
    }

    /// Returns the glimpses of one part; none of a part that there is not.
    #[must_use]
    pub fn of(&self, part: usize) -> &[Glimpse] {
        let Some((_, end)) = self.parts.get(part) else {
            return &[];
        };
        let start = part.checked_sub(1).map_or(0, |before| self.parts[before].1);
        &self.glimpses[start..*end]
    }

    /// Returns how the point stands to a part; behind one that there is not.
    #[must_use]
    pub fn stance(&self, part: usize) -> Stance {
        self.parts
            .get(part)
            .map_or(Stance::Behind, |(stance, _)| *stance)
    }

    /// Returns the first part that the point touches or lies in.
    #[must_use]
    pub fn touched(&self) -> Option<usize> {
        self.parts
            .iter()
            .position(|(stance, _)| *stance == Stance::Touching)
    }

    /// Returns the first barrier that the point touches or lies in. Such a
    /// barrier hides nothing from that point, which errs to the safe side.
    #[must_use]
    pub fn touched_barrier(&self) -> Option<usize> {
        self.barrier
    }
}
