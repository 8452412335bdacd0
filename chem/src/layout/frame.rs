//! A block in numbers of its own, with what hangs on it: the material of all ways to lay out rings.

use super::cycles::{self, Block};
use super::graph::Graph;
use crate::geom::{self, Point, Vec2};
use crate::molecule::Order;
use crate::stereo::LARGEST_CIS_RING;
use smallvec::SmallVec;
use std::f64::consts::TAU;

/// A wished geometry of a ring bond, told by neighbours within the block.
#[derive(Clone, Copy, Debug)]
pub(super) struct RingPair {
    /// Ends of the double bond (or of the chain of them).
    pub(super) ends: [usize; 2],
    /// A neighbour of each end in the block.
    pub(super) ligands: [usize; 2],
    pub(super) together: bool,
}

/// A block in numbers of its own.
#[derive(Clone, Debug)]
pub(super) struct Frame {
    /// Number in the part of each atom.
    pub(super) atoms: Vec<usize>,
    pub(super) bonds: Vec<[usize; 2]>,
    pub(super) near: Vec<SmallVec<[usize; 4]>>,
    /// A smallest set of rings, shortest first.
    pub(super) rings: Vec<Vec<usize>>,
    /// Bonds that leave the block at each atom.
    pub(super) outside: Vec<usize>,
    /// Whether more than one atom hangs on a bond that leaves the block here.
    pub(super) heavy: Vec<bool>,
    /// Whether the ring goes straight on here (a triple bond, cumulated double bonds).
    pub(super) linear: Vec<bool>,
    /// Whether an atom has a double bond in the block.
    pub(super) double: Vec<bool>,
    pub(super) pairs: Vec<RingPair>,
}

impl Frame {
    pub(super) fn new(graph: &Graph, block: &Block) -> Frame {
        let local = |a: usize| block.atoms.binary_search(&a).ok();
        let mut near = vec![SmallVec::new(); block.atoms.len()];
        let mut bonds = Vec::with_capacity(block.bonds.len());
        for b in &block.bonds {
            let [p, q] = graph.ends[*b];
            if let (Some(p), Some(q)) = (local(p), local(q)) {
                bonds.push([p, q]);
                near[p].push(q);
                near[q].push(p);
            }
        }
        let in_block = |b: &usize| block.bonds.binary_search(b).is_ok();
        let leaves = |a: usize| graph.near[a].iter().filter(move |l| !in_block(&l.bond));
        let rings = cycles::basis(graph, block);
        Frame {
            rings: rings
                .iter()
                .map(|r| r.iter().filter_map(|a| local(*a)).collect())
                .collect(),
            outside: block.atoms.iter().map(|a| leaves(*a).count()).collect(),
            heavy: block
                .atoms
                .iter()
                .map(|a| leaves(*a).any(|l| graph.near[l.to].len() > 1))
                .collect(),
            linear: block.atoms.iter().map(|a| graph.is_linear(*a)).collect(),
            double: block
                .atoms
                .iter()
                .map(|a| {
                    graph.near[*a]
                        .iter()
                        .any(|l| in_block(&l.bond) && graph.order[l.bond] == Order::Double)
                })
                .collect(),
            pairs: ring_pairs(graph, block, &near, &rings),
            atoms: block.atoms.clone(),
            bonds,
            near,
        }
    }

    pub(super) fn len(&self) -> usize {
        self.atoms.len()
    }

    pub(super) fn joined(&self, a: usize, b: usize) -> bool {
        self.near[a].contains(&b)
    }

    /// Directions in which the bonds that leave the block start.
    pub(super) fn stubs(&self, points: &[Point], a: usize) -> Vec<f64> {
        let bonds: Vec<Vec2> = self.near[a]
            .iter()
            .map(|b| points[*b] - points[a])
            .collect();
        spread(&bonds, self.outside[a])
    }

    /// Whether a wished geometry is drawn.
    pub(super) fn meets(&self, points: &[Point], pair: &RingPair) -> bool {
        together(
            pair.ends.map(|a| points[a]),
            pair.ligands.map(|a| points[a]),
        ) == Some(pair.together)
    }
}

/// Sine of the angle with the axis from which the side of a ligand can be seen.
const CLEAR: f64 = 0.2;

/// Whether two ligands lie on one side of the axis through two ends; `None` if one of them is nearly
/// in line with the axis or the ends coincide.
pub(super) fn together(ends: [Point; 2], ligands: [Point; 2]) -> Option<bool> {
    let axis = geom::direction(ends[0], ends[1], 1e-9)?;
    let side = |k: usize| Some(axis.cross(geom::direction(ends[k], ligands[k], 1e-9)?));
    let (a, b) = (side(0)?, side(1)?);
    (a.abs() > CLEAR && b.abs() > CLEAR).then_some((a > 0.0) == (b > 0.0))
}

/// Wishes for bonds of a block; those for bonds of rings too small for a choice are left out.
fn ring_pairs(
    graph: &Graph,
    block: &Block,
    near: &[SmallVec<[usize; 4]>],
    rings: &[Vec<usize>],
) -> Vec<RingPair> {
    let local = |a: usize| block.atoms.binary_search(&a).ok();
    let is_linear = |a: usize| graph.is_linear(block.atoms[a]);
    let mut pairs = Vec::new();
    let in_small = |ends: &[usize; 2]| {
        let mut small = rings.iter().filter(|r| r.len() <= LARGEST_CIS_RING);
        small.any(|r| ends.iter().all(|e| r.contains(e)))
    };
    for pair in graph.pairs.iter().filter(|p| !in_small(&p.ends)) {
        let ends = pair.ends.map(local);
        let [Some(p), Some(q)] = ends else { continue };
        let ends = [p, q];
        let mut together = pair.together;
        let mut ligands = [0; 2];
        let mut complete = true;
        for k in 0..2 {
            let way = toward(near, &is_linear, ends, k);
            let inside = local(pair.ligands[k]).filter(|l| near[ends[k]].contains(l));
            let other = near[ends[k]].iter().copied().find(|x| Some(*x) != way);
            match (inside, other, way) {
                (Some(l), _, Some(_)) => ligands[k] = l,
                (None, Some(l), Some(_)) => {
                    ligands[k] = l;
                    together = !together;
                }
                _ => complete = false,
            }
        }
        if complete {
            pairs.push(RingPair {
                ends,
                ligands,
                together,
            });
        }
    }
    pairs
}

/// The neighbour of an end on the way to the other end: that end, or the first of the atoms between.
fn toward(
    near: &[SmallVec<[usize; 4]>],
    is_linear: &dyn Fn(usize) -> bool,
    ends: [usize; 2],
    k: usize,
) -> Option<usize> {
    let (start, goal) = (ends[k], ends[1 - k]);
    if near[start].contains(&goal) {
        return Some(goal);
    }
    near[start].iter().copied().find(|first| {
        let (mut last, mut at) = (start, *first);
        // chains of cumulated double bonds are short
        for _ in 0..8 {
            if at == goal {
                return true;
            }
            let next = near[at].iter().copied().find(|x| *x != last);
            match next {
                Some(next) if is_linear(at) => (last, at) = (at, next),
                _ => return false,
            }
        }
        false
    })
}

/// Directions for `count` more bonds at an atom whose bonds are `bonds`: the widest gap in equal shares.
pub(super) fn spread(bonds: &[Vec2], count: usize) -> Vec<f64> {
    let (middle, width) = geom::widest_gap(bonds);
    let step = match bonds.len() {
        0 => TAU / count.max(1) as f64,
        _ => width / (count + 1) as f64,
    };
    let shift = (count as f64 - 1.0) / 2.0;
    (0..count)
        .map(|i| middle + (i as f64 - shift) * step)
        .collect()
}

impl Frame {
    /// The frame of some of the rings, and the number here of each of its atoms; `None` for no ring.
    pub(super) fn sub(&self, rings: &[Vec<usize>]) -> Option<(Frame, Vec<usize>)> {
        let mut atoms: Vec<usize> = rings.iter().flatten().copied().collect();
        atoms.sort_unstable();
        atoms.dedup();
        let local = |a: usize| atoms.binary_search(&a).ok();
        let bonds: Vec<[usize; 2]> = self
            .bonds
            .iter()
            .filter_map(|[p, q]| Some([local(*p)?, local(*q)?]))
            .filter(|[p, q]| {
                let (p, q) = (atoms[*p], atoms[*q]);
                rings.iter().any(|r| {
                    let n = r.len();
                    (0..n).any(|i| {
                        let (x, y) = (r[i], r[(i + 1) % n]);
                        (x == p && y == q) || (x == q && y == p)
                    })
                })
            })
            .collect();
        let mut near = vec![SmallVec::new(); atoms.len()];
        for [p, q] in &bonds {
            near[*p].push(*q);
            near[*q].push(*p);
        }
        let more = |i: usize, a: usize| self.near[a].len() - SmallVec::<[usize; 4]>::len(&near[i]);
        let sub = Frame {
            rings: rings
                .iter()
                .map(|r| r.iter().filter_map(|a| local(*a)).collect())
                .collect(),
            outside: atoms
                .iter()
                .enumerate()
                .map(|(i, a)| self.outside[*a] + more(i, *a))
                .collect(),
            heavy: atoms
                .iter()
                .enumerate()
                .map(|(i, a)| self.heavy[*a] || more(i, *a) > 0)
                .collect(),
            linear: atoms.iter().map(|a| self.linear[*a]).collect(),
            double: atoms.iter().map(|a| self.double[*a]).collect(),
            pairs: Vec::new(),
            atoms: atoms.iter().map(|a| self.atoms[*a]).collect(),
            bonds,
            near,
        };
        (!sub.atoms.is_empty()).then_some((sub, atoms))
    }
}
