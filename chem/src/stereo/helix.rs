//! Helices: the inner rim of five or more angularly fused rings, whose ends lie on each other.
//!
//! The rim runs from an atom of one end ring over fusion atoms to an atom of the other; each of its bonds
//! lies in one ring only. Only marks at both ends of the rim make the unit speak.

use super::{Focus, Kind, Ligand, Unit};
use crate::molecule::{AtomIx, BondIx, Molecule, Order};
use crate::perceive::Rings;
use smallvec::SmallVec;

/// Fusion atoms of the rim of five rings; with four the ends still pass each other.
const FEWEST_FUSION_ATOMS: usize = 4;
/// Rings larger than this are no part of a fused system.
const LARGEST_RING: usize = 8;

pub(super) fn find(molecule: &Molecule, rings: &Rings, list: &mut Vec<Unit>) {
    let cycles: Vec<&Vec<AtomIx>> = rings
        .cycles()
        .iter()
        .filter(|c| c.len() <= LARGEST_RING)
        .collect();
    if cycles.len() <= FEWEST_FUSION_ATOMS {
        return;
    }
    let rim = Rim::new(molecule, &cycles);
    for start in molecule.atoms().filter(|a| rim.is_end(*a)) {
        for first in molecule.neighbors(start) {
            if let Some(path) = rim.follow(start, first.atom, first.bond)
                && path[0] < path[path.len() - 1]
                && path.len() - 2 >= FEWEST_FUSION_ATOMS
            {
                let n = path.len();
                let ends = [path[0], path[n - 1]];
                list.push(Unit {
                    kind: Kind::Helix,
                    focus: Focus::Pair(ends),
                    ligands: [ends[0], ends[0], ends[1], ends[1]].map(Ligand::Atom),
                    inner: path[1..n - 1].iter().copied().collect::<SmallVec<_>>(),
                    mute: [false; 2],
                });
            }
        }
    }
}

struct Rim<'a> {
    molecule: &'a Molecule,
    rings_at: Vec<u8>,
    rings_on: Vec<u8>,
}

impl<'a> Rim<'a> {
    fn new(molecule: &'a Molecule, cycles: &[&Vec<AtomIx>]) -> Rim<'a> {
        let mut rim = Rim {
            molecule,
            rings_at: vec![0; molecule.n_atoms()],
            rings_on: vec![0; molecule.n_bonds()],
        };
        for cycle in cycles {
            for (i, atom) in cycle.iter().enumerate() {
                let count = &mut rim.rings_at[atom.index()];
                *count = count.saturating_add(1);
                let next = cycle[(i + 1) % cycle.len()];
                if let Some(bond) = molecule.bond_between(*atom, next) {
                    let count = &mut rim.rings_on[bond.index()];
                    *count = count.saturating_add(1);
                }
            }
        }
        rim
    }

    fn is_flat(&self, atom: AtomIx) -> bool {
        self.molecule
            .neighbors(atom)
            .iter()
            .any(|n| n.order == Order::Double)
    }

    fn is_end(&self, atom: AtomIx) -> bool {
        self.rings_at[atom.index()] == 1 && self.is_flat(atom)
    }

    fn is_fusion(&self, atom: AtomIx) -> bool {
        self.rings_at[atom.index()] == 2 && self.molecule.degree(atom) == 3 && self.is_flat(atom)
    }

    /// The way along the rim from an end atom to the next atom that lies in one ring only.
    fn follow(&self, start: AtomIx, first: AtomIx, by: BondIx) -> Option<Vec<AtomIx>> {
        let mut path = vec![start];
        let (mut at, mut by) = (first, by);
        while self.is_fusion(at) && self.rings_on[by.index()] == 1 {
            if path.contains(&at) {
                return None;
            }
            path.push(at);
            let next = self
                .molecule
                .neighbors(at)
                .iter()
                .find(|n| n.bond != by && self.rings_on[n.bond.index()] == 1)?;
            (at, by) = (next.atom, next.bond);
        }
        let closes = self.is_end(at) && self.rings_on[by.index()] == 1 && !path.contains(&at);
        closes.then(|| {
            path.push(at);
            path
        })
    }
}
