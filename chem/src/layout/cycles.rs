//! Ring systems, the blocks they consist of, and a smallest set of rings of a block.
//!
//! A ring system is what hangs together over ring bonds; a block is what still hangs together when any
//! one atom is taken out, so blocks of a system share single (spiro) atoms only.

use super::graph::Graph;
use std::collections::{BTreeSet, VecDeque};

/// A block: at least one ring.
#[derive(Clone, Debug)]
pub(super) struct Block {
    /// Atoms in ascending order.
    pub(super) atoms: Vec<usize>,
    /// Bonds in ascending order.
    pub(super) bonds: Vec<usize>,
}

/// Blocks of a part, each once; bonds outside rings are in none.
pub(super) fn blocks(graph: &Graph) -> Vec<Block> {
    let n = graph.len();
    let (mut seen, mut low) = (vec![0usize; n], vec![0usize; n]);
    let mut clock = 0;
    let mut open: Vec<usize> = Vec::new();
    let mut found = Vec::new();
    for root in 0..n {
        if seen[root] != 0 {
            continue;
        }
        clock += 1;
        (seen[root], low[root]) = (clock, clock);
        let mut stack: Vec<(usize, usize, usize)> = vec![(root, usize::MAX, 0)];
        while let Some((atom, by, next)) = stack.last_mut() {
            let (atom, by) = (*atom, *by);
            let Some(link) = graph.near[atom].get(*next).copied() else {
                stack.pop();
                if let Some((parent, _, _)) = stack.last() {
                    low[*parent] = low[*parent].min(low[atom]);
                    if low[atom] >= seen[*parent] {
                        found.extend(close(graph, &mut open, by));
                    }
                }
                continue;
            };
            *next += 1;
            if link.bond == by {
                continue;
            }
            if seen[link.to] == 0 {
                clock += 1;
                (seen[link.to], low[link.to]) = (clock, clock);
                open.push(link.bond);
                stack.push((link.to, link.bond, 0));
            } else if seen[link.to] < seen[atom] {
                open.push(link.bond);
                low[atom] = low[atom].min(seen[link.to]);
            }
        }
    }
    found.sort_by(|a, b| a.atoms.cmp(&b.atoms));
    found
}

/// The block whose first bond is `by`, taken off the list of open bonds.
fn close(graph: &Graph, open: &mut Vec<usize>, by: usize) -> Option<Block> {
    let at = open.iter().rposition(|b| *b == by)?;
    let mut bonds = open.split_off(at);
    if bonds.len() < 3 {
        return None;
    }
    bonds.sort_unstable();
    let atoms: BTreeSet<usize> = bonds.iter().flat_map(|b| graph.ends[*b]).collect();
    Some(Block {
        atoms: atoms.into_iter().collect(),
        bonds,
    })
}

/// Larger blocks are searched for short rings only, beside one set of rings that is complete.
const MOST_SEARCHED: usize = 150;
/// Longest ring that is looked for in a large block.
const SHORT: usize = 12;

/// A smallest set of rings that spans the block (from Horton's candidates), shortest first; each ring
/// as its atoms in order.
pub(super) fn basis(graph: &Graph, block: &Block) -> Vec<Vec<usize>> {
    let wanted = block.bonds.len() + 1 - block.atoms.len();
    let mut inside = vec![false; graph.ends.len()];
    for b in &block.bonds {
        inside[*b] = true;
    }
    let is_large = block.atoms.len() > MOST_SEARCHED;
    let mut known: BTreeSet<(usize, Vec<usize>)> = BTreeSet::new();
    let mut candidates: Vec<Vec<usize>> = Vec::new();
    for (i, root) in block.atoms.iter().enumerate() {
        let most = if is_large && i > 0 { SHORT } else { usize::MAX };
        for cycle in cycles_at(graph, &inside, *root, most) {
            let mut key = cycle.clone();
            key.sort_unstable();
            if known.insert((cycle.len(), key)) {
                candidates.push(cycle);
            }
        }
    }
    // equal lengths: by their atoms, so that the choice depends on numbers only
    candidates.sort_by_cached_key(|c| {
        let mut key = c.clone();
        key.sort_unstable();
        (c.len(), key)
    });
    let mut span = Span::new(block);
    let mut rings = Vec::with_capacity(wanted);
    for cycle in candidates {
        if rings.len() == wanted {
            break;
        }
        if span.adds(graph, &cycle) {
            rings.push(cycle);
        }
    }
    rings
}

/// Rings that leave `root` two ways along shortest paths and meet at one bond; the atoms in ring order.
fn cycles_at(graph: &Graph, inside: &[bool], root: usize, most: usize) -> Vec<Vec<usize>> {
    let mut depth: Vec<Option<usize>> = vec![None; graph.len()];
    let mut from = vec![usize::MAX; graph.len()];
    let mut reached = vec![root];
    depth[root] = Some(0);
    let mut queue = VecDeque::from([root]);
    while let Some(a) = queue.pop_front() {
        let d = depth[a].unwrap_or(0);
        if d > most / 2 {
            continue;
        }
        for l in graph.near[a].iter().filter(|l| inside[l.bond]) {
            if depth[l.to].is_none() {
                depth[l.to] = Some(d + 1);
                from[l.to] = a;
                reached.push(l.to);
                queue.push_back(l.to);
            }
        }
    }
    let up = |mut a: usize| {
        let mut path = vec![a];
        while a != root {
            a = from[a];
            path.push(a);
        }
        path
    };
    let mut cycles = Vec::new();
    for a in &reached {
        for l in graph.near[*a].iter().filter(|l| inside[l.bond]) {
            let (Some(d), Some(e)) = (depth[*a], depth[l.to]) else {
                continue;
            };
            if *a > l.to || from[*a] == l.to || from[l.to] == *a || d + e + 1 > most {
                continue;
            }
            let (mut left, mut right) = (up(*a), up(l.to));
            // where both ways share more than the root, the shorter ring is found at another root; the
            // complete set of one root needs it all the same
            if most != usize::MAX && left.iter().any(|x| *x != root && right.contains(x)) {
                continue;
            }
            while left.len() > 1
                && right.len() > 1
                && left[left.len() - 2] == right[right.len() - 2]
            {
                left.pop();
                right.pop();
            }
            // root .. a, then from the other end of the bond back to before the root
            right.pop();
            left.reverse();
            left.extend(right);
            cycles.push(left);
        }
    }
    cycles
}

/// Sets of bonds under exclusive or.
struct Span {
    place: Vec<usize>,
    first: usize,
    rows: Vec<(usize, Vec<u64>)>,
    words: usize,
}

impl Span {
    fn new(block: &Block) -> Span {
        let first = block.bonds.first().copied().unwrap_or(0);
        let last = block.bonds.last().copied().unwrap_or(0);
        let mut place = vec![0; last - first + 1];
        for (i, b) in block.bonds.iter().enumerate() {
            place[*b - first] = i;
        }
        Span {
            place,
            first,
            rows: Vec::new(),
            words: block.bonds.len().div_ceil(64),
        }
    }

    /// Adds a ring unless it is a sum of those there; whether it was added.
    fn adds(&mut self, graph: &Graph, cycle: &[usize]) -> bool {
        let mut row = vec![0u64; self.words];
        for (i, a) in cycle.iter().enumerate() {
            if let Some(b) = graph.bond(*a, cycle[(i + 1) % cycle.len()]) {
                let at = self.place[b - self.first];
                row[at / 64] ^= 1 << (at % 64);
            }
        }
        for (pivot, known) in &self.rows {
            if row[pivot / 64] >> (pivot % 64) & 1 == 1 {
                for (x, y) in row.iter_mut().zip(known) {
                    *x ^= y;
                }
            }
        }
        let Some(word) = row.iter().position(|w| *w != 0) else {
            return false;
        };
        let pivot = word * 64 + row[word].trailing_zeros() as usize;
        self.rows.push((pivot, row));
        true
    }
}
