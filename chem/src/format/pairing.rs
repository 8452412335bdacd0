//! Pairs of neighboring vertices in any graph (a matching; Edmonds 1965), grown one vertex at a time.

use std::cell::Cell;

/// A graph and the pairs found in it.
pub(super) struct Pairing {
    edges: Vec<Vec<usize>>,
    mate: Vec<Option<usize>>,
    /// Vertices looked at; searches end when there were too many.
    work: Cell<u64>,
}

/// Most vertices looked at: some seconds. A system of a thousand atoms takes a few millions.
const MOST_WORK: u64 = 2_000_000_000;

/// A tree of alternating paths from one root.
struct Forest {
    /// Vertices at an even distance from the root, in the order of their finding.
    outer: Vec<usize>,
    is_outer: Vec<bool>,
    /// The vertex before an inner one, or before an outer one when it is entered through an odd ring.
    before: Vec<Option<usize>>,
    /// The vertex that stands for the odd ring a vertex lies in.
    base: Vec<usize>,
}

impl Pairing {
    /// No pairs yet; `edges` holds the neighbors of each vertex.
    pub(super) fn new(edges: Vec<Vec<usize>>) -> Pairing {
        let mate = vec![None; edges.len()];
        let work = Cell::new(0);
        Pairing { edges, mate, work }
    }

    /// Whether the bound of work was reached, so that what is not found may still exist.
    pub(super) fn is_exhausted(&self) -> bool {
        self.work.get() > MOST_WORK
    }

    /// The vertex that `vertex` is paired with.
    pub(super) fn mate(&self, vertex: usize) -> Option<usize> {
        self.mate.get(vertex).copied().flatten()
    }

    /// Pairs `root`, keeping all paired that are so, save one for which `gives_way` holds.
    pub(super) fn cover(&mut self, root: usize, gives_way: impl Fn(usize) -> bool) -> bool {
        let (forest, free) = self.search(root);
        if let Some(end) = free {
            self.flip(&forest, end);
            return true;
        }
        let Some(loser) = forest
            .outer
            .iter()
            .copied()
            .find(|w| *w != root && gives_way(*w))
        else {
            return false;
        };
        if let Some(end) = self.mate[loser].take() {
            self.flip(&forest, end);
        }
        true
    }

    /// Paired vertices that could go without in place of the unpaired `root`.
    pub(super) fn exchangeable(&self, root: usize, wanted: impl Fn(usize) -> bool) -> Vec<usize> {
        let (forest, _) = self.search(root);
        let found = forest.outer.into_iter();
        found.filter(|w| *w != root && wanted(*w)).collect()
    }

    /// Alternating paths from `root`; the first unpaired vertex that one reaches, if any.
    fn search(&self, root: usize) -> (Forest, Option<usize>) {
        let n = self.edges.len();
        self.work.set(self.work.get() + n as u64);
        let mut forest = Forest {
            outer: vec![root],
            is_outer: vec![false; n],
            before: vec![None; n],
            base: (0..n).collect(),
        };
        forest.is_outer[root] = true;
        let mut next = 0;
        while let Some(v) = forest.outer.get(next).copied() {
            next += 1;
            if self.is_exhausted() {
                break;
            }
            for to in self.edges[v].iter().copied() {
                if forest.base[v] == forest.base[to] || self.mate[v] == Some(to) {
                    continue;
                }
                let joins_outer =
                    to == root || self.mate[to].is_some_and(|m| forest.before[m].is_some());
                if joins_outer {
                    self.contract(&mut forest, root, v, to);
                } else if forest.before[to].is_none() {
                    forest.before[to] = Some(v);
                    match self.mate[to] {
                        None => return (forest, Some(to)),
                        Some(mate) => {
                            forest.is_outer[mate] = true;
                            forest.outer.push(mate);
                        }
                    }
                }
            }
        }
        (forest, None)
    }

    /// Draws an odd ring, closed by the edge `v to`, together into its base.
    fn contract(&self, forest: &mut Forest, root: usize, v: usize, to: usize) {
        self.work.set(self.work.get() + 3 * self.edges.len() as u64);
        let base = self.common_base(forest, root, v, to);
        let mut in_ring = vec![false; self.edges.len()];
        self.mark_path(forest, v, base, to, &mut in_ring);
        self.mark_path(forest, to, base, v, &mut in_ring);
        for i in 0..self.edges.len() {
            if in_ring[forest.base[i]] {
                forest.base[i] = base;
                if !forest.is_outer[i] {
                    forest.is_outer[i] = true;
                    forest.outer.push(i);
                }
            }
        }
    }

    fn common_base(&self, forest: &Forest, root: usize, a: usize, b: usize) -> usize {
        let mut on_path = vec![false; self.edges.len()];
        let mut at = a;
        loop {
            at = forest.base[at];
            on_path[at] = true;
            match self.mate[at].and_then(|m| forest.before[m]) {
                Some(up) if at != root => at = up,
                _ => break,
            }
        }
        let mut at = b;
        loop {
            at = forest.base[at];
            if on_path[at] {
                return at;
            }
            match self.mate[at].and_then(|m| forest.before[m]) {
                Some(up) => at = up,
                None => return root,
            }
        }
    }

    fn mark_path(
        &self,
        forest: &mut Forest,
        mut v: usize,
        base: usize,
        mut child: usize,
        in_ring: &mut [bool],
    ) {
        while forest.base[v] != base {
            let Some(mate) = self.mate[v] else { return };
            in_ring[forest.base[v]] = true;
            in_ring[forest.base[mate]] = true;
            forest.before[v] = Some(child);
            child = mate;
            match forest.before[mate] {
                Some(up) => v = up,
                None => return,
            }
        }
    }

    /// Exchanges paired and unpaired edges along the path that ends at the unpaired vertex `end`.
    fn flip(&mut self, forest: &Forest, end: usize) {
        let mut at = Some(end);
        while let Some(v) = at {
            let Some(before) = forest.before[v] else {
                return;
            };
            let next = self.mate[before];
            self.mate[v] = Some(before);
            self.mate[before] = Some(v);
            at = next;
        }
    }
}
