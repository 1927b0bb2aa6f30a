/// The number of a node in its graph; never given twice in one graph.
///
/// Nodes are ordered by when they were added.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Debug)]
pub struct Node(u32);

impl Node {
    pub(super) fn from_index(index: usize) -> Node {
        Node(u32::try_from(index).expect("memory ends long before 2³² nodes"))
    }

    /// Returns the node's number, counted from 0 in the order of adding, for
    /// owners that keep a list beside the graph.
    #[must_use]
    pub fn index(self) -> usize {
        self.0 as usize
    }
}
