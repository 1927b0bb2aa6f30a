//! What depends on what, and what must run again; generic, knows no cells.
//!
//! A [`Graph`] holds one value a node. After an edit, [`Graph::run`] works out
//! only the nodes that are stale and those whose inputs really changed, each
//! once, in topological order; nodes in a ring are told so instead.

mod event;
mod link;
mod node;
mod order;
mod overlay;
mod revision;
mod ring;
mod values;

#[cfg(test)]
mod tests;

use std::cmp::Reverse;
use std::collections::BinaryHeap;

pub use event::{Effect, Event, Run};
pub use node::Node;
pub use overlay::{Overlay, Plan};
pub use revision::Revision;
pub use values::Values;

use link::Links;
use order::Order;
use ring::Rings;

/// Says whether two values are the same, so that nothing that depends on them
/// needs to run again.
///
/// Numbers should compare by their bits: then a node that is worked out afresh
/// never differs from one that was left alone, and a NaN does not run for ever.
pub trait Same {
    /// Returns `true` if `other` may stand for `self` everywhere.
    fn same(&self, other: &Self) -> bool;
}

/// Values linked by what feeds what, worked out again only where they must be.
///
/// A node that was removed, or that belongs to another graph, is nobody's:
/// setting it does nothing and asking for it finds nothing. Numbers of removed
/// nodes are never used again.
///
/// [`order`](Graph::order), [`ring_of`](Graph::ring_of),
/// [`cycle_of`](Graph::cycle_of) and [`downstream`](Graph::downstream) tell the
/// state as of the last [`run`](Graph::run) or [`settle`](Graph::settle).
///
/// # Examples
///
/// ```
/// use farglow::graph::{Graph, Same};
///
/// struct Number(f64);
/// impl Same for Number {
///     fn same(&self, other: &Self) -> bool {
///         self.0.to_bits() == other.0.to_bits()
///     }
/// }
///
/// let mut graph = Graph::<Number>::new();
/// let width = graph.add();
/// let double = graph.add();
/// graph.set_inputs(double, vec![width]);
/// let run = graph.run(
///     &mut |node, values| {
///         if node == width {
///             Number(0.9)
///         } else {
///             Number(2.0 * values.input(0).map_or(0.0, |number| number.0))
///         }
///     },
///     &mut |_, _| Number(f64::NAN),
/// );
/// assert_eq!(run.ran, [width, double]);
/// assert_eq!(graph.value(double).map(|number| number.0), Some(1.8));
/// ```
#[derive(Clone, Debug)]
pub struct Graph<V> {
    values: Vec<Option<V>>,
    alive: Vec<bool>,
    changed_at: Vec<Revision>,
    stale: Vec<bool>,
    stale_nodes: Vec<Node>,
    links: Links,
    order: Order,
    rings: Rings,
    /// Links added since the last settling that do not agree with the order.
    pending: Vec<(Node, Node)>,
    /// Links that close a ring, and so stand against the order.
    against: Vec<(Node, Node)>,
    /// Whether the order exists: the first settling sorts everything at once.
    sorted: bool,
    links_changed: bool,
    /// Counts changes of links and nodes, so that a plan knows it is old.
    shape: u64,
    revision: Revision,
    population: usize,
}

impl<V> Default for Graph<V> {
    fn default() -> Self {
        Graph {
            values: Vec::new(),
            alive: Vec::new(),
            changed_at: Vec::new(),
            stale: Vec::new(),
            stale_nodes: Vec::new(),
            links: Links::default(),
            order: Order::default(),
            rings: Rings::default(),
            pending: Vec::new(),
            against: Vec::new(),
            sorted: false,
            links_changed: false,
            shape: 0,
            revision: Revision::default(),
            population: 0,
        }
    }
}

impl<V: Same> Graph<V> {
    /// Returns a graph without nodes.
    #[must_use]
    pub fn new() -> Self {
        Graph::default()
    }

    /// Adds a node without inputs, stale, and returns its number.
    pub fn add(&mut self) -> Node {
        let node = Node::from_index(self.values.len());
        self.values.push(None);
        self.alive.push(true);
        self.changed_at.push(self.revision);
        self.stale.push(false);
        self.links.add();
        self.rings.add();
        self.order.add(node);
        self.population += 1;
        self.shape += 1;
        self.mark_stale(node);
        node
    }

    /// Removes a node: the nodes that it feeds lose that input and become stale.
    pub fn remove(&mut self, node: Node) {
        if !self.contains(node) {
            return;
        }
        for dependent in self.links.feeds(node).to_vec() {
            self.mark_stale(dependent);
        }
        self.links.cut(node);
        self.links_changed = true;
        self.shape += 1;
        let index = node.index();
        self.values[index] = None;
        self.alive[index] = false;
        self.order.remove();
        self.population -= 1;
    }

    /// Sets what a node is fed by, in the order in which
    /// [`Values::input`] will number it, and marks the node stale.
    ///
    /// An input given twice counts once, where it was first given; nodes that
    /// the graph does not hold are left out.
    // The owner hands its list over, as the interface promises; it is not kept as it is.
    #[allow(clippy::needless_pass_by_value)]
    pub fn set_inputs(&mut self, node: Node, inputs: Vec<Node>) {
        if !self.contains(node) {
            return;
        }
        self.mark_stale(node);
        if self.links.fed_by(node) == inputs {
            return;
        }
        let alive = &self.alive;
        let known = |input: &Node| alive.get(input.index()).copied().unwrap_or(false);
        let order = &self.order;
        let pending = &mut self.pending;
        let sorted = self.sorted;
        self.links
            .set(node, inputs.iter().copied().filter(known), |from| {
                if sorted && !order.agrees(from, node) {
                    pending.push((from, node));
                }
            });
        self.links_changed = true;
        self.shape += 1;
    }

    /// Marks a node stale: something that is not in the graph changed its value.
    pub fn touch(&mut self, node: Node) {
        if self.contains(node) {
            self.mark_stale(node);
        }
    }

    /// Returns the value that the node had after it last ran, or `None` if it
    /// never did.
    #[must_use]
    pub fn value(&self, node: Node) -> Option<&V> {
        self.values.get(node.index())?.as_ref()
    }

    /// Returns what the node is fed by, in the order in which it was set.
    #[must_use]
    pub fn fed_by(&self, node: Node) -> &[Node] {
        self.links.fed_by(node)
    }

    /// Returns the nodes that the node feeds, by number.
    #[must_use]
    pub fn feeds(&self, node: Node) -> &[Node] {
        self.links.feeds(node)
    }

    /// Returns `true` if the graph holds the node.
    #[must_use]
    pub fn contains(&self, node: Node) -> bool {
        self.alive.get(node.index()).copied().unwrap_or(false)
    }

    /// Returns `true` if the node itself will run at the next run, whatever
    /// becomes of its inputs.
    #[must_use]
    pub fn is_stale(&self, node: Node) -> bool {
        self.contains(node) && self.stale[node.index()]
    }

    /// Returns the number of nodes.
    #[must_use]
    pub fn len(&self) -> usize {
        self.population
    }

    /// Returns `true` if there are no nodes.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.population == 0
    }

    /// Returns all nodes so that every node comes after what feeds it.
    ///
    /// Links between members of one ring are the exception. The same edits
    /// always give the same order.
    pub fn order(&self) -> impl Iterator<Item = Node> + '_ {
        self.order.nodes().filter(|node| self.contains(*node))
    }

    /// Returns the members of the ring that the node is in, itself among them,
    /// or `None` if it does not depend on itself.
    ///
    /// The list holds every node that both feeds and is fed by the others. It
    /// starts with the lowest number and follows the links forwards, as far as
    /// they make a single ring.
    #[must_use]
    pub fn ring_of(&self, node: Node) -> Option<&[Node]> {
        self.rings.of(node)
    }

    /// Returns the same as [`ring_of`](Graph::ring_of), as a list of its own.
    #[must_use]
    pub fn cycle_of(&self, node: Node) -> Option<Vec<Node>> {
        self.ring_of(node).map(<[Node]>::to_vec)
    }

    /// Returns the number of runs so far.
    #[must_use]
    pub fn revision(&self) -> Revision {
        self.revision
    }

    /// Returns the run in which the node's value last changed.
    #[must_use]
    pub fn changed_at(&self, node: Node) -> Option<Revision> {
        self.value(node).map(|_| self.changed_at[node.index()])
    }

    /// Works out every stale node and every node one of whose inputs changed,
    /// each once, every node after what feeds it.
    ///
    /// `work` returns the value of a node from the values of its inputs. A node
    /// in a ring gets the value that `ring` returns for it and its ring's
    /// members instead, once, until the ring's members change or the node is
    /// touched. A new value that is the same as the old one stops the wave.
    ///
    /// A ring can be as long as the graph: a value that holds all its members
    /// takes the square of that.
    pub fn run(
        &mut self,
        work: &mut dyn FnMut(Node, &Values<'_, V>) -> V,
        ring: &mut dyn FnMut(Node, &[Node]) -> V,
    ) -> Run {
        self.settle();
        self.revision = self.revision.next();
        let mut run = Run::new(self.revision);
        let mut queue: BinaryHeap<Reverse<u32>> = self
            .stale_nodes
            .drain(..)
            .filter(|node| self.alive[node.index()])
            .map(|node| Reverse(self.order.place(node)))
            .collect();
        while let Some(Reverse(place)) = queue.pop() {
            let node = self.order.at(place);
            let index = node.index();
            let members = self.rings.of(node);
            let value = match members {
                Some(members) => ring(node, members),
                None => work(
                    node,
                    &Values::nominal(&self.values, self.links.fed_by(node)),
                ),
            };
            self.stale[index] = false;
            let effect = match &self.values[index] {
                None => Effect::First,
                Some(old) if old.same(&value) => Effect::CutOff,
                Some(_) => Effect::Changed,
            };
            run.note(Event {
                node,
                effect,
                in_ring: members.is_some(),
            });
            if effect == Effect::CutOff {
                continue;
            }
            self.values[index] = Some(value);
            self.changed_at[index] = self.revision;
            for &dependent in self.links.feeds(node) {
                // What is in a ring does not read its inputs.
                if !self.stale[dependent.index()] && self.rings.of(dependent).is_none() {
                    self.stale[dependent.index()] = true;
                    queue.push(Reverse(self.order.place(dependent)));
                }
            }
        }
        run
    }

    /// Brings order and rings up to date with the links, without running
    /// anything; [`run`](Graph::run) does so by itself.
    pub fn settle(&mut self) {
        if !self.sorted {
            self.sort();
            return;
        }
        self.order.compact(&self.alive);
        if !self.links_changed {
            return;
        }
        self.links_changed = false;
        // Sorting afresh costs about one visit to every node and link: more
        // than that is not worth spending on moving nodes about.
        let budget = self.population + self.links.len();
        let mut spent = 0;
        for (from, to) in std::mem::take(&mut self.pending) {
            if !self.links.has(from, to) {
                continue;
            }
            if !self.order.insert(from, to, &self.links, &mut spent) {
                self.against.push((from, to));
            }
            if spent > budget {
                self.sort();
                return;
            }
        }
        if self.against.is_empty() && self.rings.is_empty() {
            return;
        }
        let links = &self.links;
        self.against.retain(|&(from, to)| links.has(from, to));
        // Every ring has at least one link against the order.
        let heads = self.against.iter().map(|&(_, to)| to);
        let restart = self.rings.find(heads, &self.links);
        for node in restart {
            self.touch(node);
        }
        for (from, to) in std::mem::take(&mut self.against) {
            let held = self.rings.same_ring(from, to);
            if held || !self.order.insert(from, to, &self.links, &mut spent) {
                self.against.push((from, to));
            }
        }
    }

    /// Returns what must be worked out when these nodes get other values, for
    /// [`Overlay::follow`].
    #[must_use]
    pub fn downstream(&self, seeds: &[Node]) -> Plan {
        Plan::new(self, seeds)
    }

    /// Returns an empty overlay for trying other values without changing the
    /// graph.
    #[must_use]
    pub fn overlay(&self) -> Overlay<V> {
        Overlay::new()
    }

    fn sort(&mut self) {
        let heads = (0..self.alive.len())
            .filter(|&index| self.alive[index])
            .map(Node::from_index);
        let restart = self.rings.find(heads, &self.links);
        for node in restart {
            self.touch(node);
        }
        self.order.sort(&self.alive, &self.links, &self.rings);
        self.pending.clear();
        self.against.clear();
        for members in self.rings.all() {
            for &from in members {
                for &to in self.links.feeds(from) {
                    if !self.order.agrees(from, to) {
                        self.against.push((from, to));
                    }
                }
            }
        }
        self.sorted = true;
        self.links_changed = false;
    }

    fn mark_stale(&mut self, node: Node) {
        if !std::mem::replace(&mut self.stale[node.index()], true) {
            self.stale_nodes.push(node);
        }
    }
}
