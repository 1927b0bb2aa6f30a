use super::{Effect, Graph, Node, Revision, Same, Values};

#[derive(Clone, Debug, PartialEq)]
enum Value {
    Number(i64),
    Ring(Vec<Node>),
}

impl Same for Value {
    fn same(&self, other: &Self) -> bool {
        self == other
    }
}

/// A graph whose nodes are their own number plus the sum of their inputs, the
/// sum cut at a ceiling.
#[derive(Clone, Default)]
struct Sums {
    graph: Graph<Value>,
    own: Vec<i64>,
    ceiling: Vec<i64>,
}

fn total(own: i64, ceiling: i64, inputs: &[Node], values: &Values<'_, Value>) -> Value {
    let mut sum = own;
    for input in inputs {
        match values.get(*input) {
            Some(Value::Number(number)) => sum += number,
            Some(Value::Ring(_)) => sum += 1000,
            None => panic!("{input:?} has no value when it is read"),
        }
    }
    Value::Number(sum.min(ceiling))
}

impl Sums {
    fn add(&mut self, own: i64, inputs: &[Node]) -> Node {
        let node = self.graph.add();
        self.own.push(own);
        self.ceiling.push(i64::MAX);
        self.graph.set_inputs(node, inputs.to_vec());
        node
    }

    fn set(&mut self, node: Node, own: i64) {
        self.own[node.index()] = own;
        self.graph.touch(node);
    }

    /// Runs, and returns the log as one line: the nodes in order, `=` behind
    /// those that were cut off, `o` behind those in a ring.
    fn run(&mut self) -> String {
        let Sums {
            graph,
            own,
            ceiling,
        } = self;
        let run = graph.run(
            &mut |node, values| {
                let inputs = values.inputs();
                total(own[node.index()], ceiling[node.index()], inputs, values)
            },
            // A list a member would be the square of a long ring.
            &mut |_, members| Value::Ring(members[..members.len().min(9)].to_vec()),
        );
        let line: Vec<String> = run
            .events
            .iter()
            .map(|event| {
                let cut = if event.effect == Effect::CutOff {
                    "="
                } else {
                    ""
                };
                let ring = if event.in_ring { "o" } else { "" };
                format!("{}{ring}{cut}", event.node.index())
            })
            .collect();
        line.join(" ")
    }

    fn number(&self, node: Node) -> i64 {
        match self.graph.value(node) {
            Some(Value::Number(number)) => *number,
            other => panic!("{node:?} holds {other:?}, not a number"),
        }
    }

    fn ring(&self, node: Node) -> Vec<usize> {
        let ring = self.graph.cycle_of(node).unwrap_or_default();
        ring.into_iter().map(Node::index).collect()
    }
}

#[test]
fn everything_runs_once_and_then_nothing_does() {
    let mut sums = Sums::default();
    let a = sums.add(1, &[]);
    let b = sums.add(10, &[a]);
    assert_eq!(sums.run(), "0 1");
    assert_eq!(sums.number(b), 11);
    assert_eq!(sums.run(), "");
    assert_eq!(sums.graph.revision().number(), 2);
}

///```text
///      ┌─▶ 1 ─┐
///  0 ──┤      ├─▶ 3 ──▶ 4      5
///      └─▶ 2 ─┘
///```
#[test]
fn a_diamond_runs_once_after_both_of_its_sides() {
    let mut sums = Sums::default();
    let top = sums.add(1, &[]);
    let left = sums.add(10, &[top]);
    let right = sums.add(100, &[top]);
    let bottom = sums.add(0, &[left, right]);
    let last = sums.add(0, &[bottom]);
    let apart = sums.add(7, &[]);
    assert_eq!(sums.run(), "0 1 2 3 4 5");
    sums.set(top, 2);
    assert_eq!(sums.run(), "0 1 2 3 4");
    assert_eq!(sums.number(last), 114);
    sums.set(right, 200);
    assert_eq!(sums.run(), "2 3 4");
    sums.set(apart, 8);
    assert_eq!(sums.run(), "5");
}

#[test]
fn a_value_that_stays_the_same_stops_the_wave() {
    let mut sums = Sums::default();
    let first = sums.add(5, &[]);
    let capped = sums.add(0, &[first]);
    let last = sums.add(1, &[capped]);
    sums.ceiling[capped.index()] = 5;
    assert_eq!(sums.run(), "0 1 2");
    sums.set(first, 9);
    assert_eq!(sums.run(), "0 1=");
    assert_eq!(sums.number(last), 6);
    sums.graph.touch(first);
    assert_eq!(sums.run(), "0=");
    let first_run = sums.graph.changed_at(last).map(Revision::number);
    assert_eq!(first_run, Some(1));
    assert_eq!(sums.graph.changed_at(first).map(Revision::number), Some(2));
}

#[test]
fn an_input_given_twice_counts_once() {
    let mut sums = Sums::default();
    let a = sums.add(1, &[]);
    let b = sums.add(2, &[]);
    let c = sums.add(0, &[b, a, b]);
    assert_eq!(sums.graph.fed_by(c), [b, a]);
    assert_eq!(sums.graph.feeds(b), [c]);
    assert_eq!(sums.run(), "0 1 2");
    assert_eq!(sums.number(c), 3);
}

#[test]
fn links_against_the_order_move_nodes_and_nothing_else_runs() {
    let mut sums = Sums::default();
    let nodes: Vec<Node> = (0..6).map(|own| sums.add(own, &[])).collect();
    assert_eq!(sums.run(), "0 1 2 3 4 5");
    // 5 ─▶ 2 ─▶ 0
    sums.graph.set_inputs(nodes[0], vec![nodes[2]]);
    sums.graph.set_inputs(nodes[2], vec![nodes[5]]);
    assert_eq!(sums.run(), "2 0");
    assert_eq!(sums.number(nodes[0]), 7);
    sums.set(nodes[5], 50);
    assert_eq!(sums.run(), "5 2 0");
}

///```text
///  0 ──▶ 1 ──▶ 3 ──▶ 2 ──▶ 4
///        ▲───────────┘
///```
#[test]
fn a_ring_is_told_to_its_members_in_ring_order_and_to_nobody_else() {
    let mut sums = Sums::default();
    let a = sums.add(1, &[]);
    let b = sums.add(1, &[]);
    let c = sums.add(1, &[]);
    let d = sums.add(1, &[b]);
    let e = sums.add(1, &[c]);
    sums.graph.set_inputs(c, vec![d]);
    sums.graph.set_inputs(b, vec![a, c]);
    let mut log: Vec<String> = sums.run().split(' ').map(str::to_owned).collect();
    log.sort_unstable();
    assert_eq!(log, ["0", "1o", "2o", "3o", "4"]);
    for member in [b, c, d] {
        assert_eq!(sums.ring(member), [1, 3, 2]);
        assert_eq!(sums.graph.value(member), Some(&Value::Ring(vec![b, d, c])));
    }
    assert_eq!(sums.ring(a), [0; 0]);
    assert_eq!(sums.ring(e), [0; 0]);
    assert_eq!(sums.number(e), 1001);
    // What feeds a ring does not make its members run: they read no inputs.
    sums.set(a, 2);
    assert_eq!(sums.run(), "0");
}

///```text
///  0 ──▶ 1 ──▶ 2      then the link 2 ▶ 0 comes, and goes again
///  ▲───────────┘
///```
#[test]
fn a_broken_ring_runs_again_with_all_that_depends_on_it() {
    let mut sums = Sums::default();
    let a = sums.add(1, &[]);
    let b = sums.add(1, &[a]);
    let c = sums.add(1, &[b]);
    let after = sums.add(0, &[c]);
    let apart = sums.add(0, &[]);
    assert_eq!(sums.run(), "0 1 2 3 4");
    sums.graph.set_inputs(a, vec![c]);
    assert_eq!(sums.run(), "0o 1o 2o 3");
    assert_eq!(sums.ring(c), [0, 1, 2]);
    assert_eq!(sums.run(), "");
    sums.graph.set_inputs(b, vec![]);
    assert_eq!(sums.run(), "1 2 0 3");
    assert_eq!(sums.ring(c), [0; 0]);
    assert_eq!(
        [a, b, c, after, apart].map(|n| sums.number(n)),
        [3, 1, 2, 2, 0]
    );
}

///```text
///  0 ──▶ 1 ──▶ 2 ──▶ 3      two rings that share 1: one component
///  ▲─────┤     │
///        ▲─────┘
///```
#[test]
fn rings_that_share_a_node_are_one_until_one_of_them_is_broken() {
    let mut sums = Sums::default();
    let a = sums.add(1, &[]);
    let b = sums.add(1, &[a]);
    let c = sums.add(1, &[b]);
    let d = sums.add(1, &[c]);
    sums.graph.set_inputs(a, vec![b]);
    sums.graph.set_inputs(b, vec![a, c]);
    assert_eq!(sums.run(), "0o 1o 2o 3");
    assert_eq!(sums.ring(c), [0, 1, 2]);
    sums.graph.set_inputs(a, vec![]);
    assert_eq!(sums.run(), "0 1o 2o 3=");
    assert_eq!(sums.ring(c), [1, 2]);
    assert_eq!(sums.number(d), 1001);
}

/// 0 ──▶ 0
#[test]
fn a_node_that_feeds_itself_is_a_ring_of_one() {
    let mut sums = Sums::default();
    let a = sums.add(1, &[]);
    assert_eq!(sums.run(), "0");
    sums.graph.set_inputs(a, vec![a]);
    assert_eq!(sums.run(), "0o");
    assert_eq!(sums.ring(a), [0]);
    sums.graph.set_inputs(a, vec![]);
    assert_eq!(sums.run(), "0");
    assert_eq!(sums.number(a), 1);
    let mut fresh = Sums::default();
    let b = fresh.add(1, &[]);
    fresh.graph.set_inputs(b, vec![b]);
    assert_eq!(fresh.run(), "0o");
    fresh.graph.remove(b);
    assert_eq!(fresh.run(), "");
    assert!(fresh.graph.is_empty());
}

#[test]
fn a_removed_node_leaves_its_dependents_stale_and_its_number_unused() {
    let mut sums = Sums::default();
    let a = sums.add(1, &[]);
    let b = sums.add(10, &[a]);
    let c = sums.add(100, &[b, a]);
    assert_eq!(sums.run(), "0 1 2");
    sums.graph.remove(b);
    assert!(!sums.graph.contains(b));
    assert_eq!(sums.graph.value(b), None);
    assert_eq!(sums.graph.fed_by(c), [a]);
    assert_eq!(sums.run(), "2");
    assert_eq!(sums.number(c), 101);
    let d = sums.add(5, &[b]);
    assert_ne!(d, b);
    assert_eq!(sums.graph.fed_by(d), [] as [Node; 0]);
    sums.graph.set_inputs(b, vec![a]);
    sums.graph.touch(b);
    sums.graph.remove(b);
    assert_eq!(sums.run(), "3");
    assert_eq!(sums.graph.len(), 3);
    assert_eq!(sums.graph.order().collect::<Vec<_>>(), [a, c, d]);
}

#[test]
fn removing_most_nodes_keeps_the_order_of_the_rest() {
    let mut sums = Sums::default();
    let nodes: Vec<Node> = (0..100).map(|own| sums.add(own, &[])).collect();
    assert!(!sums.run().is_empty());
    for pair in nodes.chunks(10) {
        for node in &pair[1..] {
            sums.graph.remove(*node);
        }
    }
    assert_eq!(sums.run(), "");
    let left: Vec<usize> = sums.graph.order().map(Node::index).collect();
    assert_eq!(left, [0, 10, 20, 30, 40, 50, 60, 70, 80, 90]);
    sums.graph.set_inputs(nodes[0], vec![nodes[90]]);
    assert_eq!(sums.run(), "0");
    assert_eq!(sums.number(nodes[0]), 90);
}

/// Links added from the last node to the first are the worst case of the order.
#[test]
fn a_chain_of_100_000_runs_whichever_way_it_is_linked() {
    let size: usize = 100_000;
    for after_first_run in [false, true] {
        let mut sums = Sums::default();
        let nodes: Vec<Node> = (0..size).map(|_| sums.add(1, &[])).collect();
        if after_first_run {
            let _ = sums.run();
        }
        for pair in nodes.windows(2) {
            sums.graph.set_inputs(pair[0], vec![pair[1]]);
        }
        let log = sums.run();
        assert!(log.starts_with("99998 99997") || log.starts_with("99999 99998"));
        let expected = i64::try_from(size).expect("it is small");
        assert_eq!(sums.number(nodes[0]), expected);
        sums.graph.set_inputs(nodes[size - 1], vec![nodes[0]]);
        let ran = sums.run().split(' ').count();
        assert_eq!(ran, size);
        assert_eq!(sums.ring(nodes[5]).len(), size);
        sums.graph.set_inputs(nodes[size / 2], vec![]);
        let ran = sums.run().split(' ').count();
        assert_eq!(ran, size);
        assert_eq!(sums.number(nodes[size / 2 + 1]), expected);
    }
}

#[test]
fn an_overlay_runs_only_what_differs_and_leaves_the_graph_alone() {
    let mut sums = Sums::default();
    let a = sums.add(1, &[]);
    let b = sums.add(10, &[a]);
    let c = sums.add(0, &[b]);
    let d = sums.add(0, &[c]);
    let apart = sums.add(3, &[]);
    sums.ceiling[c.index()] = 5;
    assert_eq!(sums.run(), "0 1 2 3 4");
    let plan = sums.graph.downstream(&[a]);
    assert_eq!(plan.nodes().collect::<Vec<_>>(), [a, b, c, d]);
    let mut overlay = sums.graph.overlay();
    let mut ran = Vec::new();
    overlay.follow(
        &sums.graph,
        &plan,
        &[(a, Value::Number(2))],
        &mut |node, values| {
            ran.push(node);
            let index = node.index();
            total(
                sums.own[index],
                sums.ceiling[index],
                values.inputs(),
                values,
            )
        },
    );
    assert_eq!(ran, [b, c]);
    let under = |node| overlay.value(&sums.graph, node).cloned();
    assert_eq!(under(a), Some(Value::Number(2)));
    assert_eq!(under(b), Some(Value::Number(12)));
    assert_eq!(under(c), Some(Value::Number(5)));
    assert_eq!(under(apart), Some(Value::Number(3)));
    assert!(!overlay.differs(c) && !overlay.differs(d));
    assert_eq!(sums.number(b), 11);
    // Nothing of the first evaluation shines through the second.
    overlay.evaluate(&sums.graph, &[(apart, Value::Number(4))], &mut |node, _| {
        panic!("{node:?} ran though nothing feeds it")
    });
    assert_eq!(overlay.value(&sums.graph, b), Some(&Value::Number(11)));
    assert_eq!(overlay.value(&sums.graph, apart), Some(&Value::Number(4)));
}

#[test]
fn a_plan_older_than_the_links_is_made_afresh() {
    let mut sums = Sums::default();
    let a = sums.add(1, &[]);
    let b = sums.add(10, &[]);
    assert_eq!(sums.run(), "0 1");
    let plan = sums.graph.downstream(&[a]);
    sums.graph.set_inputs(b, vec![a]);
    assert_eq!(sums.run(), "1");
    let mut overlay = sums.graph.overlay();
    let mut work = |node: Node, values: &Values<'_, Value>| {
        let index = node.index();
        total(
            sums.own[index],
            sums.ceiling[index],
            values.inputs(),
            values,
        )
    };
    overlay.follow(&sums.graph, &plan, &[(a, Value::Number(5))], &mut work);
    assert_eq!(overlay.value(&sums.graph, b), Some(&Value::Number(15)));
}
