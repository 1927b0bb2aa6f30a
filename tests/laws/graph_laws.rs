//! The incremental graph against a slow and plain one, after random edits.

use farglow::graph::{Graph, Node, Same, Values};
use proptest::prelude::*;

#[derive(Clone, Debug, PartialEq)]
enum Value {
    Number(u8),
    /// The members of the ring by number, sorted.
    Ring(Vec<Node>),
}

impl Same for Value {
    fn same(&self, other: &Self) -> bool {
        self == other
    }
}

#[derive(Clone, Debug)]
enum Edit {
    Add(Vec<usize>),
    Remove(usize),
    Link(usize, Vec<usize>),
    Own(usize, u8),
    Run,
}

fn edit() -> impl Strategy<Value = Edit> {
    let list = || prop::collection::vec(0..1000_usize, 0..4);
    prop_oneof![
        3 => list().prop_map(Edit::Add),
        1 => (0..1000_usize).prop_map(Edit::Remove),
        4 => (0..1000_usize, list()).prop_map(|(node, inputs)| Edit::Link(node, inputs)),
        2 => (0..1000_usize, 0..6_u8).prop_map(|(node, own)| Edit::Own(node, own)),
        3 => Just(Edit::Run),
    ]
}

/// What a node makes of its own number and its inputs; few values, so that many
/// edits change nothing further on.
fn mix<'a>(own: u8, inputs: impl Iterator<Item = &'a Value>) -> Value {
    let mut sum = own;
    for (place, input) in inputs.enumerate() {
        let input = match input {
            Value::Number(number) => *number,
            Value::Ring(members) => u8::try_from(members.len() % 5).unwrap_or(0),
        };
        sum = (sum + input * u8::try_from(place + 1).unwrap_or(1)) % 4;
    }
    Value::Number(sum)
}

fn work(own: &[u8], node: Node, values: &Values<'_, Value>) -> Value {
    let inputs = values.inputs();
    let read = inputs
        .iter()
        .map(|input| values.get(*input).expect("every input has a value"));
    mix(own[node.index()], read)
}

fn ring_value(members: &[Node]) -> Value {
    let mut members = members.to_vec();
    members.sort_unstable();
    Value::Ring(members)
}

/// Everything worked out afresh: who reaches whom by repeated squaring of the
/// whole table, then passes over all nodes until nothing is left.
fn from_scratch(own: &[u8], inputs: &[Option<Vec<Node>>]) -> Vec<Option<Value>> {
    let size = own.len();
    let mut reaches = vec![vec![false; size]; size];
    for (to, list) in inputs.iter().enumerate() {
        for from in list.iter().flatten() {
            reaches[from.index()][to] = true;
        }
    }
    for via in 0..size {
        for from in 0..size {
            for to in 0..size {
                reaches[from][to] |= reaches[from][via] && reaches[via][to];
            }
        }
    }
    let mut values: Vec<Option<Value>> = vec![None; size];
    let all: Vec<Node> = numbered(size);
    for (node, row) in reaches.iter().enumerate() {
        if row[node] {
            let members = (0..size).filter(|other| row[*other] && reaches[*other][node]);
            values[node] = Some(Value::Ring(members.map(|other| all[other]).collect()));
        }
    }
    loop {
        let mut moved = false;
        for node in 0..size {
            let Some(list) = &inputs[node] else { continue };
            if values[node].is_none() && list.iter().all(|i| values[i.index()].is_some()) {
                let read = list
                    .iter()
                    .filter_map(|input| values[input.index()].as_ref());
                values[node] = Some(mix(own[node], read));
                moved = true;
            }
        }
        if !moved {
            return values;
        }
    }
}

fn numbered(size: usize) -> Vec<Node> {
    let mut graph: Graph<Value> = Graph::new();
    (0..size).map(|_| graph.add()).collect()
}

#[derive(Default)]
struct Both {
    graph: Graph<Value>,
    own: Vec<u8>,
    /// `None` for removed nodes.
    inputs: Vec<Option<Vec<Node>>>,
    nodes: Vec<Node>,
}

impl Both {
    fn pick(&self, number: usize) -> Option<Node> {
        (!self.nodes.is_empty()).then(|| self.nodes[number % self.nodes.len()])
    }

    fn link(&mut self, node: Node, numbers: &[usize]) {
        let mut list = Vec::new();
        for node in numbers.iter().filter_map(|number| self.pick(*number)) {
            if !list.contains(&node) {
                list.push(node);
            }
        }
        self.graph.set_inputs(node, list.clone());
        self.inputs[node.index()] = Some(list);
    }

    fn apply(&mut self, edit: &Edit) -> Result<(), TestCaseError> {
        match edit {
            Edit::Add(numbers) => {
                let node = self.graph.add();
                self.own.push(1);
                self.inputs.push(Some(Vec::new()));
                self.nodes.push(node);
                self.link(node, numbers);
            }
            Edit::Remove(number) => {
                if let Some(node) = self.pick(*number) {
                    self.graph.remove(node);
                    self.nodes.retain(|other| *other != node);
                    self.inputs[node.index()] = None;
                    for list in self.inputs.iter_mut().flatten() {
                        list.retain(|other| *other != node);
                    }
                }
            }
            Edit::Link(number, numbers) => {
                if let Some(node) = self.pick(*number) {
                    self.link(node, numbers);
                }
            }
            Edit::Own(number, own) => {
                if let Some(node) = self.pick(*number) {
                    self.own[node.index()] = *own;
                    self.graph.touch(node);
                }
            }
            Edit::Run => self.run_and_compare()?,
        }
        Ok(())
    }

    fn run(&mut self) -> farglow::graph::Run {
        let own = &self.own;
        self.graph.run(
            &mut |node, values| work(own, node, values),
            &mut |_, members| ring_value(members),
        )
    }

    fn run_and_compare(&mut self) -> Result<(), TestCaseError> {
        self.graph.settle();
        let nodes = self.nodes.iter().copied();
        let stale: Vec<Node> = nodes.filter(|node| self.graph.is_stale(*node)).collect();
        let run = self.run();

        let mut once = run.ran.clone();
        once.sort_unstable();
        once.dedup();
        prop_assert_eq!(once.len(), run.ran.len(), "a node ran twice: {:?}", run.ran);

        for node in &run.ran {
            let fed = self.graph.fed_by(*node);
            let moved = fed.iter().any(|input| run.changed.contains(input));
            prop_assert!(
                stale.contains(node) || moved,
                "{node:?} ran though it was not stale and none of {fed:?} changed"
            );
        }

        let order: Vec<Node> = self.graph.order().collect();
        let mut sorted = order.clone();
        sorted.sort_unstable();
        prop_assert_eq!(
            &sorted,
            &self.nodes,
            "the order does not hold each node once"
        );
        for (place, node) in order.iter().enumerate() {
            for input in self.graph.fed_by(*node) {
                let together = self.graph.ring_of(*node).is_some_and(|r| r.contains(input));
                prop_assert!(
                    together || order[..place].contains(input),
                    "{input:?} feeds {node:?} but comes after it in {order:?}"
                );
            }
        }

        let expected = from_scratch(&self.own, &self.inputs);
        for node in &self.nodes {
            prop_assert_eq!(
                self.graph.value(*node),
                expected[node.index()].as_ref(),
                "{:?} of {:?}",
                node,
                self.inputs
            );
            let ring = self.graph.ring_of(*node).map(ring_value);
            let is_ring = matches!(expected[node.index()], Some(Value::Ring(_)));
            prop_assert_eq!(ring.is_some(), is_ring);
            if let Some(ring) = self.graph.ring_of(*node) {
                prop_assert_eq!(Some(&ring[0]), ring.iter().min());
            }
        }
        Ok(())
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 1500, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn incremental_equals_from_scratch(edits in prop::collection::vec(edit(), 0..60)) {
        let mut both = Both::default();
        for edit in &edits {
            both.apply(edit)?;
        }
        both.run_and_compare()?;
        prop_assert_eq!(both.run().ran, [] as [Node; 0]);
    }

    #[test]
    fn the_same_edits_run_the_same_nodes_in_the_same_order(
        edits in prop::collection::vec(edit(), 0..60),
    ) {
        let logs = [(); 2].map(|()| {
            let mut both = Both::default();
            for edit in edits.iter().filter(|edit| !matches!(edit, Edit::Run)) {
                let _ = both.apply(edit);
                if matches!(edit, Edit::Own(..)) {
                    let _ = both.run();
                }
            }
            (both.run(), both.graph.order().collect::<Vec<_>>())
        });
        prop_assert_eq!(&logs[0], &logs[1]);
    }

    #[test]
    fn an_overlay_equals_an_edited_graph(
        edits in prop::collection::vec(edit(), 0..60),
        draws in prop::collection::vec(
            prop::collection::vec((0..1000_usize, 0..6_u8, any::<bool>()), 0..4),
            1..4,
        ),
    ) {
        let mut both = Both::default();
        for edit in &edits {
            both.apply(edit)?;
        }
        let _ = both.run();
        let mut overlay = both.graph.overlay();
        for draw in &draws {
            // Some nodes are given a value, others another number of their own.
            let mut given: Vec<(Node, Value)> = Vec::new();
            let mut own = both.own.clone();
            let mut seeds = Vec::new();
            for (number, drawn, is_given) in draw {
                let Some(node) = both.pick(*number) else { continue };
                if seeds.contains(&node) {
                    continue;
                }
                seeds.push(node);
                if *is_given {
                    given.push((node, Value::Number(*drawn)));
                } else {
                    own[node.index()] = *drawn;
                }
            }
            let plan = both.graph.downstream(&seeds);
            overlay.follow(&both.graph, &plan, &given, &mut |node, values| {
                work(&own, node, values)
            });

            let mut edited = both.graph.clone();
            for seed in &seeds {
                edited.touch(*seed);
            }
            let find = |node: Node| given.iter().find(|(other, _)| *other == node);
            let run = edited.run(
                &mut |node, values| match find(node) {
                    Some((_, value)) => value.clone(),
                    None => work(&own, node, values),
                },
                &mut |node, members| match find(node) {
                    Some((_, value)) => value.clone(),
                    None => ring_value(members),
                },
            );
            for node in &both.nodes {
                prop_assert_eq!(overlay.value(&both.graph, *node), edited.value(*node));
                prop_assert_eq!(overlay.differs(*node), run.changed.contains(node));
            }
        }
    }
}
