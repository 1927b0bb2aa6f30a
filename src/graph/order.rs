use std::cmp::Reverse;
use std::collections::BinaryHeap;

use super::Node;
use super::link::Links;
use super::ring::Rings;

/// A topological order that is kept up while links are added.
///
/// A link agrees with the order if it leads from a lower place to a higher one.
/// Only links that agree are ever followed, so those that close a ring need no
/// mark of their own; moving nodes never turns an agreeing link round.
///
/// # Source
///
/// D. J. Pearce and P. H. J. Kelly, "A dynamic topological sort algorithm for
/// directed acyclic graphs", ACM J. Exp. Algorithmics 11 (2006) 1.7. The first
/// sort is A. B. Kahn's, Comm. ACM 5 (1962) 558–562.
#[derive(Clone, Debug, Default)]
pub(super) struct Order {
    place: Vec<u32>,
    /// Every place's node; removed nodes keep theirs until the next compacting.
    nodes: Vec<Node>,
    removed: usize,
    met: Vec<u64>,
    stamp: u64,
    ahead: Vec<Node>,
    behind: Vec<Node>,
    pool: Vec<u32>,
}

impl Order {
    pub(super) fn add(&mut self, node: Node) {
        self.place.push(to_place(self.nodes.len()));
        self.nodes.push(node);
        self.met.push(0);
    }

    pub(super) fn remove(&mut self) {
        self.removed += 1;
    }

    pub(super) fn place(&self, node: Node) -> u32 {
        self.place[node.index()]
    }

    pub(super) fn at(&self, place: u32) -> Node {
        self.nodes[place as usize]
    }

    pub(super) fn nodes(&self) -> impl Iterator<Item = Node> + '_ {
        self.nodes.iter().copied()
    }

    pub(super) fn agrees(&self, from: Node, to: Node) -> bool {
        self.place(from) < self.place(to)
    }

    /// Closes the gaps of removed nodes once they are more than the nodes left.
    pub(super) fn compact(&mut self, alive: &[bool]) {
        if self.removed * 2 <= self.nodes.len() {
            return;
        }
        self.nodes.retain(|node| alive[node.index()]);
        self.removed = 0;
        self.number();
    }

    /// Moves nodes so that the link agrees; adds the links looked at to `spent`.
    ///
    /// Returns `false`, with nothing moved, if the link closes a ring.
    pub(super) fn insert(
        &mut self,
        from: Node,
        to: Node,
        links: &Links,
        spent: &mut usize,
    ) -> bool {
        if self.agrees(from, to) {
            return true;
        }
        if from == to {
            return false;
        }
        let lowest = self.place(to);
        let highest = self.place(from);
        self.stamp += 1;

        self.ahead.clear();
        self.ahead.push(to);
        self.met[to.index()] = self.stamp;
        let mut next = 0;
        while let Some(&node) = self.ahead.get(next) {
            next += 1;
            let place = self.place(node);
            let feeds = links.feeds(node);
            *spent += 1 + feeds.len();
            for &dependent in feeds {
                if dependent == from {
                    return false;
                }
                let further = self.place(dependent);
                let index = dependent.index();
                if further > place && further < highest && self.met[index] != self.stamp {
                    self.met[index] = self.stamp;
                    self.ahead.push(dependent);
                }
            }
        }

        self.behind.clear();
        self.behind.push(from);
        self.met[from.index()] = self.stamp;
        let mut next = 0;
        while let Some(&node) = self.behind.get(next) {
            next += 1;
            let place = self.place(node);
            let inputs = links.fed_by(node);
            *spent += 1 + inputs.len();
            for &input in inputs {
                let nearer = self.place(input);
                let index = input.index();
                if nearer < place && nearer > lowest && self.met[index] != self.stamp {
                    self.met[index] = self.stamp;
                    self.behind.push(input);
                }
            }
        }

        // The places of both, handed out again: first what comes before the
        // link, then what comes after it, each in the order that it was in.
        let place = &self.place;
        self.ahead.sort_unstable_by_key(|node| place[node.index()]);
        self.behind.sort_unstable_by_key(|node| place[node.index()]);
        self.pool.clear();
        self.pool.extend(
            self.behind
                .iter()
                .chain(&self.ahead)
                .map(|node| place[node.index()]),
        );
        self.pool.sort_unstable();
        for (&node, &place) in self.behind.iter().chain(&self.ahead).zip(&self.pool) {
            self.place[node.index()] = place;
            self.nodes[place as usize] = node;
        }
        true
    }

    /// Sorts everything afresh, the lowest number first among what is free.
    ///
    /// Inside a ring, links from a higher number to a lower one do not count:
    /// without them nothing is in a ring.
    pub(super) fn sort(&mut self, alive: &[bool], links: &Links, rings: &Rings) {
        let counts = |from: Node, to: Node| from < to || !rings.same_ring(from, to);
        let mut waits: Vec<u32> = vec![0; alive.len()];
        let mut free = BinaryHeap::new();
        for (index, _) in alive.iter().enumerate().filter(|(_, alive)| **alive) {
            let node = Node::from_index(index);
            let inputs = links.fed_by(node);
            let count = inputs.iter().filter(|input| counts(**input, node)).count();
            waits[index] = to_place(count);
            if count == 0 {
                free.push(Reverse(node));
            }
        }
        self.nodes.clear();
        self.removed = 0;
        while let Some(Reverse(node)) = free.pop() {
            self.nodes.push(node);
            for &dependent in links.feeds(node) {
                if counts(node, dependent) {
                    waits[dependent.index()] -= 1;
                    if waits[dependent.index()] == 0 {
                        free.push(Reverse(dependent));
                    }
                }
            }
        }
        self.number();
    }

    fn number(&mut self) {
        for (place, node) in self.nodes.iter().enumerate() {
            self.place[node.index()] = to_place(place);
        }
    }
}

fn to_place(index: usize) -> u32 {
    u32::try_from(index).expect("there are no more places than nodes")
}
