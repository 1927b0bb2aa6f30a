use super::Node;
use super::link::Links;

const NONE: u32 = u32::MAX;

/// The rings of a graph: its strongly connected components that hold a link.
#[derive(Clone, Debug, Default)]
pub(super) struct Rings {
    rings: Vec<Vec<Node>>,
    /// Which ring each node is in.
    ring: Vec<u32>,
    search: Search,
}

/// Working storage of the search, kept between searches.
#[derive(Clone, Debug, Default)]
struct Search {
    /// The search in which the node was met last.
    met: Vec<u64>,
    stamp: u64,
    number: Vec<u32>,
    low: Vec<u32>,
    open: Vec<bool>,
    path: Vec<(Node, usize)>,
    stack: Vec<Node>,
}

impl Rings {
    pub(super) fn add(&mut self) {
        self.ring.push(NONE);
        self.search.met.push(0);
        self.search.number.push(0);
        self.search.low.push(0);
        self.search.open.push(false);
    }

    pub(super) fn is_empty(&self) -> bool {
        self.rings.is_empty()
    }

    pub(super) fn all(&self) -> &[Vec<Node>] {
        &self.rings
    }

    pub(super) fn of(&self, node: Node) -> Option<&[Node]> {
        let ring = *self.ring.get(node.index())?;
        (ring != NONE).then(|| self.rings[ring as usize].as_slice())
    }

    pub(super) fn same_ring(&self, one: Node, other: Node) -> bool {
        let ring = self.ring[one.index()];
        ring != NONE && ring == self.ring[other.index()]
    }

    /// Finds all rings that can be reached from `heads`, forgets the others, and
    /// returns the nodes whose ring is not what it was.
    ///
    /// Source: R. Tarjan, "Depth-first search and linear graph algorithms",
    /// SIAM J. Comput. 1 (1972) 146–160, with a list in place of recursion.
    pub(super) fn find(&mut self, heads: impl Iterator<Item = Node>, links: &Links) -> Vec<Node> {
        let old = std::mem::take(&mut self.rings);
        for node in old.iter().flatten() {
            self.ring[node.index()] = NONE;
        }
        self.search.stamp += 1;
        let mut counter = 0;
        let mut found = Vec::new();
        for head in heads {
            self.search.from(head, links, &mut counter, &mut found);
        }
        let mut new: Vec<Vec<Node>> = found
            .into_iter()
            .map(|members| self.in_ring_order(members, links))
            .collect();
        new.sort_unstable_by_key(|members| members[0]);
        // Both lists are sorted by their first members: what is in both stays.
        let mut restart = Vec::new();
        let mut kept = 0;
        for members in &new {
            while kept < old.len() && old[kept][0] < members[0] {
                restart.extend_from_slice(&old[kept]);
                kept += 1;
            }
            if kept < old.len() && old[kept] == *members {
                kept += 1;
            } else {
                restart.extend_from_slice(members);
            }
        }
        restart.extend(old[kept..].iter().flatten());
        for (ring, members) in new.iter().enumerate() {
            let ring = u32::try_from(ring).expect("there are no more rings than nodes");
            for node in members {
                self.ring[node.index()] = ring;
            }
        }
        self.rings = new;
        restart
    }

    /// Orders the members by following the links from the lowest number.
    fn in_ring_order(&mut self, mut members: Vec<Node>, links: &Links) -> Vec<Node> {
        let Some(&first) = members.iter().min() else {
            return members;
        };
        let search = &mut self.search;
        // Marks the members open, and closes each when it is passed.
        for member in &members {
            search.open[member.index()] = true;
        }
        members.clear();
        search.open[first.index()] = false;
        members.push(first);
        search.path.push((first, 0));
        while let Some((node, next)) = search.path.last_mut() {
            let Some(&to) = links.feeds(*node).get(*next) else {
                let _ = search.path.pop();
                continue;
            };
            *next += 1;
            if std::mem::replace(&mut search.open[to.index()], false) {
                members.push(to);
                search.path.push((to, 0));
            }
        }
        members
    }
}

impl Search {
    fn meet(&mut self, node: Node, counter: &mut u32) {
        let index = node.index();
        self.met[index] = self.stamp;
        self.number[index] = *counter;
        self.low[index] = *counter;
        self.open[index] = true;
        *counter += 1;
        self.stack.push(node);
        self.path.push((node, 0));
    }

    fn from(&mut self, head: Node, links: &Links, counter: &mut u32, found: &mut Vec<Vec<Node>>) {
        if self.met[head.index()] == self.stamp {
            return;
        }
        self.meet(head, counter);
        while let Some((node, next)) = self.path.last_mut() {
            let node = *node;
            let place = *next;
            *next += 1;
            if let Some(&to) = links.feeds(node).get(place) {
                if self.met[to.index()] != self.stamp {
                    self.meet(to, counter);
                } else if self.open[to.index()] {
                    self.low[node.index()] = self.low[node.index()].min(self.number[to.index()]);
                }
                continue;
            }
            let _ = self.path.pop();
            if let Some((parent, _)) = self.path.last() {
                let low = self.low[node.index()];
                let parent = parent.index();
                self.low[parent] = self.low[parent].min(low);
            }
            if self.low[node.index()] == self.number[node.index()] {
                self.close(node, links, found);
            }
        }
    }

    /// Takes the component that `root` was the first of off the stack.
    fn close(&mut self, root: Node, links: &Links, found: &mut Vec<Vec<Node>>) {
        let start = self
            .stack
            .iter()
            .rposition(|node| *node == root)
            .expect("a node is on the stack until its component is closed");
        for node in &self.stack[start..] {
            self.open[node.index()] = false;
        }
        if self.stack.len() - start > 1 || links.has(root, root) {
            found.push(self.stack.split_off(start));
        } else {
            self.stack.truncate(start);
        }
    }
}
