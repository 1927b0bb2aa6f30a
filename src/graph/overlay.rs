use super::{Graph, Node, Same, Values};

/// What must be worked out when some nodes get other values, in order.
///
/// A plan belongs to the graph that it was made for. It may outlive an edit of
/// the links: it is then made afresh wherever it is used.
#[derive(Clone, Debug)]
pub struct Plan {
    seeds: Vec<Node>,
    steps: Vec<Step>,
    shape: u64,
}

#[derive(Clone, Copy, Debug)]
struct Step {
    node: Node,
    is_seed: bool,
    in_ring: bool,
}

impl Plan {
    pub(super) fn new<V: Same>(graph: &Graph<V>, seeds: &[Node]) -> Plan {
        let mut seeds: Vec<Node> = seeds.to_vec();
        seeds.sort_unstable();
        seeds.dedup();
        seeds.retain(|node| graph.contains(*node));
        let mut met = vec![false; graph.values.len()];
        let mut list = seeds.clone();
        for node in &list {
            met[node.index()] = true;
        }
        let mut next = 0;
        while let Some(&node) = list.get(next) {
            next += 1;
            for &dependent in graph.feeds(node) {
                // What is in a ring does not read its inputs.
                if !met[dependent.index()] && graph.ring_of(dependent).is_none() {
                    met[dependent.index()] = true;
                    list.push(dependent);
                }
            }
        }
        list.sort_unstable_by_key(|node| graph.order.place(*node));
        let steps = list
            .into_iter()
            .map(|node| Step {
                node,
                is_seed: seeds.binary_search(&node).is_ok(),
                in_ring: graph.ring_of(node).is_some(),
            })
            .collect();
        Plan {
            seeds,
            steps,
            shape: graph.shape,
        }
    }

    /// Returns the nodes that start the wave, by number.
    #[must_use]
    pub fn seeds(&self) -> &[Node] {
        &self.seeds
    }

    /// Returns every node that may change, the seeds among them, each after
    /// what feeds it.
    pub fn nodes(&self) -> impl ExactSizeIterator<Item = Node> + '_ {
        self.steps.iter().map(|step| step.node)
    }
}

/// Other values laid over those of a graph, which stays as it is.
///
/// Kept and used again, it does not allocate except for what a `V` itself does.
#[derive(Clone, Debug)]
pub struct Overlay<V> {
    values: Vec<Option<V>>,
    /// A node has another value than the graph's if its stamp is the current one.
    stamps: Vec<u64>,
    stamp: u64,
}

impl<V: Same> Overlay<V> {
    pub(super) fn new() -> Self {
        Overlay {
            values: Vec::new(),
            stamps: Vec::new(),
            stamp: 1,
        }
    }

    /// Gives some nodes other values and works out what is downstream of them.
    ///
    /// The graph must have run. To try many values of the same nodes, make a
    /// [`Plan`] once and [`follow`](Overlay::follow) it.
    pub fn evaluate(
        &mut self,
        graph: &Graph<V>,
        overrides: &[(Node, V)],
        work: &mut dyn FnMut(Node, &Values<'_, V>) -> V,
    ) where
        V: Clone,
    {
        let seeds: Vec<Node> = overrides.iter().map(|(node, _)| *node).collect();
        self.follow(graph, &graph.downstream(&seeds), overrides, work);
    }

    /// Gives some seeds of a plan other values, and works out by `work` the
    /// other seeds and every node one of whose inputs differs from the graph's.
    ///
    /// The graph must have run. What was laid over it before is forgotten. A
    /// node whose new value is the same as the graph's stops the wave; members
    /// of a ring keep their value unless they are given another. Of two values
    /// for one node the later counts, and a value for a node that is not a seed
    /// of the plan is left out.
    pub fn follow(
        &mut self,
        graph: &Graph<V>,
        plan: &Plan,
        overrides: &[(Node, V)],
        work: &mut dyn FnMut(Node, &Values<'_, V>) -> V,
    ) where
        V: Clone,
    {
        if plan.shape != graph.shape {
            let plan = Plan::new(graph, &plan.seeds);
            self.follow_new(graph, &plan, overrides, work);
        } else {
            self.follow_new(graph, plan, overrides, work);
        }
    }

    /// Returns the node's value under the overlay, else the graph's.
    #[must_use]
    pub fn value<'a>(&'a self, graph: &'a Graph<V>, node: Node) -> Option<&'a V> {
        if self.differs(node) {
            self.values[node.index()].as_ref()
        } else {
            graph.value(node)
        }
    }

    /// Returns `true` if the last evaluation gave the node another value than
    /// the graph's.
    #[must_use]
    pub fn differs(&self, node: Node) -> bool {
        self.stamps.get(node.index()) == Some(&self.stamp)
    }

    fn follow_new(
        &mut self,
        graph: &Graph<V>,
        plan: &Plan,
        overrides: &[(Node, V)],
        work: &mut dyn FnMut(Node, &Values<'_, V>) -> V,
    ) where
        V: Clone,
    {
        let size = graph.values.len();
        if self.values.len() < size {
            self.values.resize_with(size, || None);
            self.stamps.resize(size, 0);
        }
        // Two stamps an evaluation: given in advance, and differing.
        let given = self.stamp + 1;
        let stamp = self.stamp + 2;
        self.stamp = stamp;
        for (node, value) in overrides {
            if plan.seeds.binary_search(node).is_ok() {
                self.values[node.index()] = Some(value.clone());
                self.stamps[node.index()] = given;
            }
        }
        for step in &plan.steps {
            let node = step.node;
            let index = node.index();
            if self.stamps[index] != given {
                let inputs = graph.fed_by(node);
                let must = step.is_seed
                    || inputs
                        .iter()
                        .any(|input| self.stamps[input.index()] == stamp);
                if step.in_ring || !must {
                    continue;
                }
                let values = Values::over(&graph.values, inputs, &self.values, &self.stamps, stamp);
                let value = work(node, &values);
                self.values[index] = Some(value);
            }
            let same = match (&self.values[index], graph.value(node)) {
                (Some(new), Some(old)) => new.same(old),
                _ => false,
            };
            self.stamps[index] = if same { 0 } else { stamp };
        }
    }
}
