//! The tree of single atoms and blocks that a part is: what hangs on what, and how far it reaches.
//!
//! Nodes below the number of atoms are atoms, those above are blocks. Edges are bonds outside rings and
//! the membership of an atom in a block; without the rings' own bonds there is no way round.

use super::cycles::Block;
use super::graph::Graph;

/// A rooted tree over atoms and blocks.
#[derive(Clone, Debug)]
pub(super) struct Tree {
    pub(super) n_atoms: usize,
    pub(super) parent: Vec<usize>,
    /// Neighbours of each node, the parent among them.
    pub(super) near: Vec<Vec<usize>>,
    /// Atoms in an order in which all that hangs on a node follows it.
    pub(super) order: Vec<usize>,
    /// For each node the range of `order` that it and all that hangs on it take.
    pub(super) range: Vec<(usize, usize)>,
    /// Nodes from the root outwards.
    pub(super) outward: Vec<usize>,
    /// Longest way down from a node, and the number of atoms there.
    down: Vec<Reach>,
    /// The same for what lies beyond the parent, seen from the node.
    up: Vec<Reach>,
}

/// How far a branch reaches and how many atoms it has; compared in this order.
#[derive(Clone, Copy, Debug, PartialEq, PartialOrd, Default)]
pub(super) struct Reach {
    pub(super) far: f64,
    pub(super) atoms: f64,
}

impl Reach {
    /// One number for both: the main chain is long, but not a thin branch beside a large rest.
    pub(super) fn weight(self) -> f64 {
        1.5 * self.far + 0.5 * self.atoms
    }
}

/// No parent.
pub(super) const ROOT: usize = usize::MAX;

impl Tree {
    pub(super) fn new(graph: &Graph) -> Tree {
        let blocks = &graph.blocks;
        let n = graph.len();
        let mut near: Vec<Vec<usize>> = (0..n)
            .map(|a| {
                let open = graph.near[a].iter().filter(|l| !graph.in_ring[l.bond]);
                open.map(|l| l.to).collect()
            })
            .collect();
        for (b, block) in blocks.iter().enumerate() {
            near.push(block.atoms.clone());
            for a in &block.atoms {
                near[*a].push(n + b);
            }
        }
        let root = root(&near, n, blocks);
        let (parent, outward) = rooted(&near, root);
        let (order, range) = preorder(&near, &parent, root, n);
        let mut tree = Tree {
            n_atoms: n,
            down: vec![Reach::default(); near.len()],
            up: vec![Reach::default(); near.len()],
            parent,
            near,
            order,
            range,
            outward,
        };
        tree.measure();
        tree
    }

    pub(super) fn is_block(&self, node: usize) -> bool {
        node >= self.n_atoms
    }

    /// Nodes that hang on a node.
    pub(super) fn children(&self, node: usize) -> impl Iterator<Item = usize> + '_ {
        let parent = self.parent[node];
        self.near[node]
            .iter()
            .copied()
            .filter(move |c| *c != parent)
    }

    /// All atoms that a node holds up, itself included.
    pub(super) fn below(&self, node: usize) -> &[usize] {
        let (from, to) = self.range[node];
        &self.order[from..to]
    }

    /// The branch that begins with the step from `from` to its neighbour `to`.
    pub(super) fn branch(&self, from: usize, to: usize) -> Reach {
        let mut reach = if self.parent[to] == from {
            self.down[to]
        } else {
            self.up[from]
        };
        reach.far += self.step(from, to);
        reach
    }

    /// Length of a step: a bond, or half the way through a block.
    fn step(&self, a: usize, b: usize) -> f64 {
        let block = a.max(b);
        if self.is_block(block) {
            0.7 * (self.near[block].len() as f64).sqrt()
        } else {
            1.0
        }
    }

    fn measure(&mut self) {
        let own = |node: usize| if node < self.n_atoms { 1.0 } else { 0.0 };
        for i in (0..self.outward.len()).rev() {
            let node = self.outward[i];
            let mut reach = Reach {
                far: 0.0,
                atoms: own(node),
            };
            for c in self.children(node) {
                reach.far = reach.far.max(self.down[c].far + self.step(node, c));
                reach.atoms += self.down[c].atoms;
            }
            self.down[node] = reach;
        }
        for i in 0..self.outward.len() {
            let node = self.outward[i];
            // the two farthest ways out of this node
            let mut ways: Vec<(f64, usize)> = self
                .children(node)
                .map(|c| (self.down[c].far + self.step(node, c), c))
                .collect();
            let parent = self.parent[node];
            if parent != ROOT {
                ways.push((self.up[node].far + self.step(node, parent), parent));
            }
            ways.sort_by(|a, b| b.0.total_cmp(&a.0).then(a.1.cmp(&b.1)));
            let total = self.down[node].atoms + self.up[node].atoms;
            let children: Vec<usize> = self.children(node).collect();
            for c in children {
                let far = ways.iter().find(|w| w.1 != c).map_or(0.0, |w| w.0);
                self.up[c] = Reach {
                    far,
                    atoms: total - self.down[c].atoms,
                };
            }
        }
    }
}

/// The largest block; without blocks an end of a longest chain.
fn root(near: &[Vec<usize>], n: usize, blocks: &[Block]) -> usize {
    let largest = (0..blocks.len()).max_by_key(|b| (blocks[*b].atoms.len(), std::cmp::Reverse(*b)));
    match largest {
        Some(b) => n + b,
        None => rooted(near, 0).1.last().copied().unwrap_or(0),
    }
}

/// Parents, and the nodes breadth first.
fn rooted(near: &[Vec<usize>], root: usize) -> (Vec<usize>, Vec<usize>) {
    let mut parent = vec![ROOT; near.len()];
    let mut outward = vec![root];
    let mut at = 0;
    while let Some(node) = outward.get(at).copied() {
        at += 1;
        for c in &near[node] {
            if *c != parent[node] {
                parent[*c] = node;
                outward.push(*c);
            }
        }
    }
    (parent, outward)
}

fn preorder(
    near: &[Vec<usize>],
    parent: &[usize],
    root: usize,
    n_atoms: usize,
) -> (Vec<usize>, Vec<(usize, usize)>) {
    let mut order = Vec::with_capacity(n_atoms);
    let mut range = vec![(0, 0); near.len()];
    let mut stack = vec![(root, false)];
    while let Some((node, is_done)) = stack.pop() {
        if is_done {
            range[node].1 = order.len();
            continue;
        }
        range[node].0 = order.len();
        if node < n_atoms {
            order.push(node);
        }
        stack.push((node, true));
        let children = near[node].iter().rev().filter(|c| **c != parent[node]);
        stack.extend(children.map(|c| (*c, false)));
    }
    (order, range)
}
