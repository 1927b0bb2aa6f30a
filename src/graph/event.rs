use super::{Node, Revision};

/// What came of running a node.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub enum Effect {
    /// The node ran for the first time.
    First,
    /// Its value is another one than before.
    Changed,
    /// Its value is the same as before: the wave stops here.
    CutOff,
}

/// One node that ran.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub struct Event {
    /// Which node.
    pub node: Node,
    /// What came of it.
    pub effect: Effect,
    /// Whether it is in a ring, and so was only told so.
    pub in_ring: bool,
}

/// What one run did.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Run {
    /// The nodes that ran, in the order in which they did.
    pub ran: Vec<Node>,
    /// Those of them whose value was new, in the same order.
    pub changed: Vec<Node>,
    /// The same at length.
    pub events: Vec<Event>,
    /// The number of this run.
    pub revision: Revision,
}

impl Run {
    pub(super) fn new(revision: Revision) -> Run {
        Run {
            ran: Vec::new(),
            changed: Vec::new(),
            events: Vec::new(),
            revision,
        }
    }

    pub(super) fn note(&mut self, event: Event) {
        self.ran.push(event.node);
        if event.effect != Effect::CutOff {
            self.changed.push(event.node);
        }
        self.events.push(event);
    }
}
