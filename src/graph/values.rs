use super::Node;

/// The values that a node may read while it is being worked out.
#[derive(Debug)]
pub struct Values<'a, V> {
    nominal: &'a [Option<V>],
    inputs: &'a [Node],
    /// Other values, the stamp of each, and the stamp that counts.
    over: Option<(&'a [Option<V>], &'a [u64], u64)>,
}

impl<'a, V> Values<'a, V> {
    pub(super) fn nominal(nominal: &'a [Option<V>], inputs: &'a [Node]) -> Self {
        Values {
            nominal,
            inputs,
            over: None,
        }
    }

    pub(super) fn over(
        nominal: &'a [Option<V>],
        inputs: &'a [Node],
        values: &'a [Option<V>],
        stamps: &'a [u64],
        stamp: u64,
    ) -> Self {
        Values {
            nominal,
            inputs,
            over: Some((values, stamps, stamp)),
        }
    }

    /// Returns the value of an input.
    ///
    /// Only what the node is fed by may be read: a value read past the links
    /// would not bring the node to run again. `None` means that the node is
    /// not in the graph any more, or has not run yet.
    #[must_use]
    pub fn get(&self, node: Node) -> Option<&'a V> {
        debug_assert!(
            self.inputs.contains(&node),
            "{node:?} is read but was not set as an input"
        );
        self.read(node)
    }

    /// Returns the value of the input with this place, from 0, in the list that
    /// the node is fed by.
    #[must_use]
    pub fn input(&self, place: usize) -> Option<&'a V> {
        self.read(*self.inputs.get(place)?)
    }

    /// Returns the nodes that the node is fed by, as they were set.
    #[must_use]
    pub fn inputs(&self) -> &'a [Node] {
        self.inputs
    }

    fn read(&self, node: Node) -> Option<&'a V> {
        if let Some((values, stamps, stamp)) = self.over
            && stamps.get(node.index()) == Some(&stamp)
        {
            return values[node.index()].as_ref();
        }
        self.nominal.get(node.index())?.as_ref()
    }
}
