//! Says which cells wait for one another in a ring.

use std::collections::{HashMap, VecDeque};

use super::{Engine, Slot, outputs_of};
use crate::graph::Node;

/// How many cells of a ring are told.
const TOLD: usize = 8;

/// How many nodes are looked at for the shortest way around: every member of a
/// ring tells its own, and a ring may have very many.
const LOOKED_AT: usize = 256;

impl Engine {
    /// Returns the message of a node that waits for itself: the shortest way
    /// around, each cell before the one that it waits for.
    ///
    /// It follows the texts alone, so that it is the same however the notebook
    /// came to be what it is.
    pub(in crate::notebook) fn ring(&self, node: Node) -> String {
        let mut path: Vec<String> = Vec::new();
        let (way, closed) = self.way_around(node);
        for label in way.into_iter().map(|node| self.label(node)) {
            if !label.is_empty() && path.last() != Some(&label) {
                path.push(label);
            }
        }
        if path.len() > TOLD || !closed {
            path.truncate(TOLD);
            path.push("…".to_owned());
        }
        if path.len() > 1 && path.first() == path.last() {
            let _ = path.pop();
        }
        path.extend(path.first().cloned());
        format!("these wait for one another in a ring: {}", path.join(" → "))
    }

    /// Returns the nodes on the shortest way from a node through what it waits
    /// for back to itself, and whether it was found.
    fn way_around(&self, start: Node) -> (Vec<Node>, bool) {
        let ring = |node| {
            self.graph
                .ring_of(node)
                .and_then(|members| members.first().copied())
        };
        let own = ring(start);
        let back = |from: &HashMap<Node, Node>, mut node: Node| {
            let mut way = vec![node];
            while node != start {
                node = from[&node];
                way.push(node);
            }
            way.reverse();
            way
        };
        let mut from: HashMap<Node, Node> = HashMap::new();
        let mut front = VecDeque::from([start]);
        let mut last = start;
        while let Some(node) = front.pop_front() {
            last = node;
            let inputs = self.task(node).map(super::Task::inputs).unwrap_or_default();
            for input in inputs {
                if input == start {
                    return (back(&from, node), true);
                }
                if ring(input) == own && !from.contains_key(&input) {
                    let _ = from.insert(input, node);
                    front.push_back(input);
                }
            }
            if from.len() > LOOKED_AT {
                break;
            }
        }
        (back(&from, last), false)
    }

    fn label(&self, node: Node) -> String {
        let (id, slot) = self.owner(node);
        match (self.cell(id), slot) {
            (Some(cell), Slot::Field(field)) if outputs_of(cell.kind) != Some(slot) => {
                format!("{}.{field}", cell.name)
            }
            (Some(cell), _) => cell.name.clone(),
            (None, _) => String::new(),
        }
    }
}
