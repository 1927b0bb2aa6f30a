use super::Node;

/// Who feeds whom, kept from both sides.
#[derive(Clone, Debug, Default)]
pub(super) struct Links {
    fed_by: Vec<Vec<Node>>,
    /// By number, so that a link is found quickly and the order does not tell
    /// the history.
    feeds: Vec<Vec<Node>>,
    count: usize,
    marks: Vec<u64>,
    stamp: u64,
}

impl Links {
    pub(super) fn add(&mut self) {
        self.fed_by.push(Vec::new());
        self.feeds.push(Vec::new());
        self.marks.push(0);
    }

    pub(super) fn len(&self) -> usize {
        self.count
    }

    pub(super) fn fed_by(&self, node: Node) -> &[Node] {
        self.fed_by.get(node.index()).map_or(&[], Vec::as_slice)
    }

    pub(super) fn feeds(&self, node: Node) -> &[Node] {
        self.feeds.get(node.index()).map_or(&[], Vec::as_slice)
    }

    pub(super) fn has(&self, from: Node, to: Node) -> bool {
        self.feeds[from.index()].binary_search(&to).is_ok()
    }

    /// Replaces what feeds `node`, and calls `added` for each input that is new.
    pub(super) fn set(
        &mut self,
        node: Node,
        inputs: impl Iterator<Item = Node>,
        mut added: impl FnMut(Node),
    ) {
        let old = std::mem::take(&mut self.fed_by[node.index()]);
        let before = self.stamp + 1;
        let after = self.stamp + 2;
        self.stamp = after;
        for input in &old {
            self.marks[input.index()] = before;
        }
        let mut new = Vec::with_capacity(inputs.size_hint().0);
        for input in inputs {
            let mark = std::mem::replace(&mut self.marks[input.index()], after);
            if mark == after {
                continue;
            }
            new.push(input);
            if mark != before {
                self.connect(input, node);
                added(input);
            }
        }
        for &input in &old {
            if self.marks[input.index()] == before {
                self.disconnect(input, node);
            }
        }
        self.fed_by[node.index()] = new;
    }

    /// Drops every link from and to `node`.
    pub(super) fn cut(&mut self, node: Node) {
        for input in std::mem::take(&mut self.fed_by[node.index()]) {
            self.disconnect(input, node);
        }
        let dependents = std::mem::take(&mut self.feeds[node.index()]);
        self.count -= dependents.len();
        for dependent in dependents {
            self.fed_by[dependent.index()].retain(|input| *input != node);
        }
    }

    fn connect(&mut self, from: Node, to: Node) {
        let list = &mut self.feeds[from.index()];
        if let Err(place) = list.binary_search(&to) {
            list.insert(place, to);
            self.count += 1;
        }
    }

    fn disconnect(&mut self, from: Node, to: Node) {
        let list = &mut self.feeds[from.index()];
        if let Ok(place) = list.binary_search(&to) {
            let _ = list.remove(place);
            self.count -= 1;
        }
    }
}
