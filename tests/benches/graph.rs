//! What the graph itself costs, with next to no work in its nodes.

use divan::{Bencher, black_box};
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

/// A link against the order comes and goes: nodes move, one node runs.
#[divan::bench]
fn link_against_the_order_among_1000(bencher: Bencher<'_, '_>) {
    let (mut graph, nodes) = thousand();
    let mut turn = false;
    bencher.bench_local(|| {
        turn = !turn;
        let (to, from) = if turn { (11, 12) } else { (12, 11) };
        graph.set_inputs(nodes[from], vec![]);
        graph.set_inputs(nodes[to], vec![nodes[from]]);
        let own = if turn { 1.0 } else { 2.0 };
        let _ = black_box(run(&mut graph, own));
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
