//! Chains of double bonds, and the axis of those with an odd number of atoms.
//!
//! In a chain of three, five ... atoms the planes of the two ends cross, so that it is chiral like a
//! stretched centre (IUPAC 2013 recommendations, P-92.1.2.2: chirality axis of allenes). With an even
//! number the ends share a plane: see `double_bond`.

use super::double_bond::{LARGEST_CIS_RING, chain_ligands};
use super::{Focus, Kind, Ligand, Unit};
use crate::element::Element;
use crate::molecule::{AtomIx, BondIx, Molecule, Order};
use crate::perceive::Rings;
use smallvec::SmallVec;

/// A run of atoms joined by double bonds, the lower end first.
pub(super) struct Chain {
    pub(super) atoms: SmallVec<[AtomIx; 4]>,
    pub(super) bonds: SmallVec<[BondIx; 3]>,
}

impl Chain {
    pub(super) fn unit(&self, kind: Kind, ligands: [Ligand; 4]) -> Unit {
        let n = self.atoms.len();
        Unit {
            kind,
            focus: Focus::Pair([self.atoms[0], self.atoms[n - 1]]),
            ligands,
            inner: self.atoms[1..n - 1].iter().copied().collect(),
        }
    }
}

/// Whether an atom lies inside a chain: carbon with two double bonds and nothing else.
fn is_inner(molecule: &Molecule, atom: AtomIx) -> bool {
    molecule.element(atom) == Element::C
        && molecule.hydrogens(atom) == 0
        && molecule.degree(atom) == 2
        && molecule
            .neighbors(atom)
            .iter()
            .all(|n| n.order == Order::Double)
}

/// All maximal chains of one or more double bonds; closed loops of them have no ends and are left out.
pub(super) fn chains(molecule: &Molecule) -> Vec<Chain> {
    let mut chains = Vec::new();
    for start in molecule.atoms().filter(|a| !is_inner(molecule, *a)) {
        for first in molecule.neighbors(start) {
            let is_chain = |to| is_inner(molecule, to);
            if first.order != Order::Double || (first.atom < start && !is_chain(first.atom)) {
                continue;
            }
            let mut chain = Chain {
                atoms: SmallVec::from_slice(&[start, first.atom]),
                bonds: SmallVec::from_slice(&[first.bond]),
            };
            let mut at = first.atom;
            while is_inner(molecule, at) {
                let last = chain.bonds[chain.bonds.len() - 1];
                let Some(next) = molecule.neighbors(at).iter().find(|n| n.bond != last) else {
                    break;
                };
                chain.atoms.push(next.atom);
                chain.bonds.push(next.bond);
                at = next.atom;
            }
            // found from both ends; kept from the lower one
            if start < at {
                chains.push(chain);
            }
        }
    }
    chains
}

pub(super) fn find(molecule: &Molecule, rings: &Rings, chains: &[Chain], list: &mut Vec<Unit>) {
    for chain in chains.iter().filter(|c| c.atoms.len() % 2 == 1) {
        let small = chain.bonds.iter().any(|b| {
            rings
                .smallest_through(*b)
                .is_some_and(|n| n <= LARGEST_CIS_RING)
        });
        if let (false, Some(ligands)) = (small, chain_ligands(molecule, chain)) {
            list.push(chain.unit(Kind::CumulatedAxis, ligands));
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::molecule::tests::build;

    #[test]
    fn chains_are_found_once_each() {
        let m = build(
            &["C", "C", "C", "C", "C", "O"],
            &[(0, 1, 1), (1, 2, 2), (2, 3, 2), (3, 4, 2), (4, 5, 1)],
        );
        let found = chains(&m);
        assert_eq!(found.len(), 1);
        assert_eq!(found[0].atoms.len(), 4);
        assert_eq!(found[0].bonds.len(), 3);
    }
}
