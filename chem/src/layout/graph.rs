//! One connected part of a molecule as the layout sees it, numbered by what its atoms are.
//!
//! Everything that is laid out breaks its ties by number. The numbers here depend on the graph and not
//! on the order of the file, so that a molecule comes out alike however its atoms were numbered.

use super::Wish;
use super::cycles::{self, Block};
use crate::element::Element;
use crate::molecule::{AtomIx, Molecule, Order};
use crate::perceive::Rings;
use smallvec::SmallVec;
use std::collections::BTreeMap;

/// A neighbour within a part.
#[derive(Clone, Copy, Debug)]
pub(super) struct Link {
    pub(super) to: usize,
    pub(super) bond: usize,
}

/// A wished geometry in the numbers of the part.
#[derive(Clone, Copy, Debug)]
pub(super) struct Pair {
    pub(super) ends: [usize; 2],
    pub(super) ligands: [usize; 2],
    pub(super) together: bool,
}

/// A connected part.
#[derive(Clone, Debug)]
pub(super) struct Graph {
    /// Handle of each atom in the molecule.
    pub(super) atoms: Vec<AtomIx>,
    pub(super) near: Vec<SmallVec<[Link; 4]>>,
    pub(super) ends: Vec<[usize; 2]>,
    pub(super) order: Vec<Order>,
    /// Whether a bond lies in a ring.
    pub(super) in_ring: Vec<bool>,
    pub(super) blocks: Vec<Block>,
    pub(super) element: Vec<Element>,
    pub(super) pairs: Vec<Pair>,
}

impl Graph {
    /// These atoms, which hang together, and the bonds among them. Rings are those of the part, even if the
    /// molecule has more.
    pub(super) fn new(
        molecule: &Molecule,
        rings: &Rings,
        atoms: &[AtomIx],
        wishes: &[Wish],
    ) -> Graph {
        let atoms = numbered(molecule, rings, atoms);
        let mut number = BTreeMap::new();
        for (i, a) in atoms.iter().enumerate() {
            number.insert(*a, i);
        }
        let mut bonds: Vec<([usize; 2], Order)> = Vec::new();
        for (i, a) in atoms.iter().enumerate() {
            for n in molecule.neighbors(*a) {
                match number.get(&n.atom) {
                    Some(j) if *j > i => bonds.push(([i, *j], n.order)),
                    _ => {}
                }
            }
        }
        bonds.sort_by_key(|b| b.0);
        let mut near = vec![SmallVec::new(); atoms.len()];
        for (b, (ends, _)) in bonds.iter().enumerate() {
            near[ends[0]].push(Link {
                to: ends[1],
                bond: b,
            });
            near[ends[1]].push(Link {
                to: ends[0],
                bond: b,
            });
        }
        let find = |a: AtomIx| number.get(&a).copied();
        let pairs = wishes
            .iter()
            .filter_map(|w| {
                Some(Pair {
                    ends: [find(w.ends[0])?, find(w.ends[1])?],
                    ligands: [find(w.ligands[0])?, find(w.ligands[1])?],
                    together: w.together,
                })
            })
            .collect();
        let mut graph = Graph {
            element: atoms.iter().map(|a| molecule.element(*a)).collect(),
            near,
            ends: bonds.iter().map(|b| b.0).collect(),
            order: bonds.iter().map(|b| b.1).collect(),
            in_ring: vec![false; bonds.len()],
            blocks: Vec::new(),
            atoms,
            pairs,
        };
        graph.blocks = cycles::blocks(&graph);
        for b in graph.blocks.iter().flat_map(|b| &b.bonds) {
            graph.in_ring[*b] = true;
        }
        graph
    }

    pub(super) fn len(&self) -> usize {
        self.atoms.len()
    }

    /// The bond between two atoms.
    pub(super) fn bond(&self, a: usize, b: usize) -> Option<usize> {
        self.near[a].iter().find(|l| l.to == b).map(|l| l.bond)
    }

    /// Whether the two bonds of an atom go straight on: a triple bond or two double bonds at carbon or
    /// nitrogen.
    pub(super) fn is_linear(&self, a: usize) -> bool {
        let pairs = |order: Order| {
            self.near[a]
                .iter()
                .filter(move |l| self.order[l.bond] == order)
        };
        self.near[a].len() == 2
            && matches!(self.element[a], Element::C | Element::N)
            && (pairs(Order::Triple).count() == 1 || pairs(Order::Double).count() == 2)
    }
}

/// Atoms of each connected part, in the order of the file.
pub(super) fn parts(molecule: &Molecule) -> Vec<Vec<AtomIx>> {
    let mut seen = vec![false; molecule.n_atoms()];
    let mut parts = Vec::new();
    for root in molecule.atoms() {
        if seen[root.index()] {
            continue;
        }
        seen[root.index()] = true;
        let mut part = vec![root];
        let mut at = 0;
        while let Some(a) = part.get(at).copied() {
            at += 1;
            for n in molecule.neighbors(a) {
                if !seen[n.atom.index()] {
                    seen[n.atom.index()] = true;
                    part.push(n.atom);
                }
            }
        }
        part.sort_unstable();
        parts.push(part);
    }
    parts
}

/// Rounds of refinement at most: atoms that differ only farther away count as alike.
const ROUNDS: usize = 40;
/// Parts with more atoms keep the order of the file among atoms that look alike.
const MOST_SETTLED: usize = 250;

/// The atoms in an order that depends on the graph.
fn numbered(molecule: &Molecule, rings: &Rings, atoms: &[AtomIx]) -> Vec<AtomIx> {
    let mut place = BTreeMap::new();
    for (i, a) in atoms.iter().enumerate() {
        place.insert(*a, i);
    }
    let near: Vec<Vec<(usize, u64)>> = atoms
        .iter()
        .map(|a| {
            let inside = molecule.neighbors(*a).iter();
            inside
                .filter_map(|n| Some((*place.get(&n.atom)?, u64::from(n.order.pairs()))))
                .collect()
        })
        .collect();
    let mut colors: Vec<u64> = atoms
        .iter()
        .map(|a| {
            let atom = molecule.atom(*a);
            let parts = [
                u64::from(rings.has_atom(molecule, *a)),
                molecule.degree(*a) as u64,
                u64::from(atom.element.number()),
                u64::from(atom.charge.unsigned_abs()) * 2 + u64::from(atom.charge < 0),
                u64::from(atom.isotope.unwrap_or(0)),
                u64::from(molecule.hydrogens(*a)),
            ];
            parts.iter().fold(7, |h, p| mixed(h ^ mixed(*p)))
        })
        .collect();
    refine(&near, &mut colors);
    if atoms.len() <= MOST_SETTLED {
        while let Some(first) = first_tied(&colors) {
            colors[first] = mixed(colors[first] ^ 0x9e37);
            refine(&near, &mut colors);
        }
    }
    let mut order: Vec<usize> = (0..atoms.len()).collect();
    order.sort_by_key(|i| (colors[*i], *i));
    order.into_iter().map(|i| atoms[i]).collect()
}

/// Colours each atom by its own colour and those around it until no more differ.
fn refine(near: &[Vec<(usize, u64)>], colors: &mut Vec<u64>) {
    let count = |colors: &[u64]| {
        let mut sorted = colors.to_vec();
        sorted.sort_unstable();
        sorted.dedup();
        sorted.len()
    };
    let mut known = count(colors);
    for _ in 0..ROUNDS {
        let next: Vec<u64> = near
            .iter()
            .enumerate()
            .map(|(i, list)| {
                // a sum does not depend on the order of the neighbours
                let around = list.iter().fold(0u64, |sum, (j, order)| {
                    sum.wrapping_add(mixed(colors[*j] ^ mixed(*order)))
                });
                mixed(colors[i].wrapping_mul(3) ^ mixed(around))
            })
            .collect();
        *colors = next;
        let now = count(colors);
        if now == known || now == colors.len() {
            return;
        }
        known = now;
    }
}

/// First atom of the lowest colour that several atoms share.
fn first_tied(colors: &[u64]) -> Option<usize> {
    let mut sorted: Vec<(u64, usize)> = colors.iter().copied().zip(0..).collect();
    sorted.sort_unstable();
    sorted.windows(2).find(|w| w[0].0 == w[1].0).map(|w| w[0].1)
}

/// A number that looks random and depends on `x` alone (splitmix64).
pub(super) fn mixed(x: u64) -> u64 {
    let mut z = x.wrapping_add(0x9e37_79b9_7f4a_7c15);
    z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
    z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
    z ^ (z >> 31)
}
