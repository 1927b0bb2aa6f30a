//! What the graph itself costs, with next to no work in its nodes.

use divan::Bencher;
use farglow::graph::{Graph, Node, Same, Values};

#[derive(Clone)]
struct Number(f64);

impl Same for Number {
    fn same(&self, other: &Self) -> bool {
        self.0.to_bits() == other.0.to_bits()
    }
}

fn main() {
    divan::main();
}

fn sum(own: f64, values: &Values<'_, Number>) -> Number {
    let inputs = (0..values.inputs().len()).filter_map(|place| values.input(place));
    Number(inputs.fold(own, |sum, input| sum + input.0))
}

fn run(graph: &mut Graph<Number>, own: f64) -> usize {
    let run = graph.run(&mut |_, values| sum(own, values), &mut |_, _| {
        Number(f64::NAN)
    });
    run.ran.len()
}

/// A first node with ten dependents; the other nodes are fed by the two before.
fn thousand() -> (Graph<Number>, Vec<Node>) {
    let mut graph = Graph::new();
    let nodes: Vec<Node> = (0..1000).map(|_| graph.add()).collect();
    for node in 1..=10 {
        graph.set_inputs(nodes[node], vec![nodes[0]]);
    }
    for node in 13..1000 {
        graph.set_inputs(nodes[node], vec![nodes[node - 2], nodes[node - 1]]);
    }
    assert_eq!(run(&mut graph, 1e-300), 1000);
    (graph, nodes)
}

#[divan::bench]
fn edit_with_ten_dependents_among_1000(bencher: Bencher<'_, '_>) {
    let (mut graph, nodes) = thousand();
    let mut own = 1.0;
    bencher.bench_local(|| {
        own += 1.0;
        graph.touch(nodes[0]);
        assert_eq!(run(&mut graph, own), 11);
    });
}

/// A link from the last node to one half-way comes and goes. It adds nothing to
/// the sum: what it costs is moving the node before all that it now feeds.
#[divan::bench]
fn link_against_the_order_among_1000(bencher: Bencher<'_, '_>) {
    let (mut graph, nodes) = thousand();
    let usual = graph.fed_by(nodes[500]).to_vec();
    bencher.bench_local(|| {
        let last = graph.add();
        let mut ran = 0;
        let mut inputs = usual.clone();
        inputs.push(last);
        for inputs in [inputs, usual.clone()] {
            graph.set_inputs(nodes[500], inputs);
            let own = |node: Node| if node == last { 0.0 } else { 1e-300 };
            let run = graph.run(&mut |node, values| sum(own(node), values), &mut |_, _| {
                Number(f64::NAN)
            });
            ran += run.ran.len();
        }
        graph.remove(last);
        assert_eq!(ran, 3);
    });
}

#[divan::bench]
fn full_run_of_1000(bencher: Bencher<'_, '_>) {
    let (mut graph, nodes) = thousand();
    let mut own = 1e-300;
    bencher.bench_local(|| {
        own *= 1.1;
        for node in &nodes {
            graph.touch(*node);
        }
        assert_eq!(run(&mut graph, own), 1000);
    });
}

#[divan::bench]
fn building_1000_and_first_run(bencher: Bencher<'_, '_>) {
    bencher.bench_local(|| thousand().0.len());
}

#[divan::bench(sample_count = 10)]
fn chain_of_100_000_linked_backwards_and_run(bencher: Bencher<'_, '_>) {
    bencher.bench_local(|| {
        let mut graph = Graph::new();
        let nodes: Vec<Node> = (0..100_000).map(|_| graph.add()).collect();
        for pair in nodes.windows(2) {
            graph.set_inputs(pair[0], vec![pair[1]]);
        }
        run(&mut graph, 1.0)
    });
}

#[divan::bench]
fn overlay_with_ten_dependents_among_1000(bencher: Bencher<'_, '_>) {
    let (graph, nodes) = thousand();
    let plan = graph.downstream(&nodes[..1]);
    let mut overlay = graph.overlay();
    let mut given = [(nodes[0], Number(1.0))];
    bencher.bench_local(|| {
        given[0].1.0 += 1.0;
        overlay.follow(&graph, &plan, &given, &mut |_, values| sum(0.0, values));
        assert!(overlay.differs(nodes[10]));
    });
}
