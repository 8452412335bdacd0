//! Stereogenic double bonds: two different places at each end, not in a ring too small for both geometries.
//!
//! A chain of three, five ... cumulated double bonds lies flat like a single one and is read alike.

use super::cumulated::Chain;
use super::{Kind, Ligand, Unit};
use crate::element::Element;
use crate::molecule::{AtomIx, Molecule, Order};
use crate::perceive::Rings;

/// The largest ring whose double bonds have one geometry only (InChI technical manual, appendix 5).
pub const LARGEST_CIS_RING: usize = 7;

pub(super) fn find(molecule: &Molecule, rings: &Rings, chains: &[Chain], list: &mut Vec<Unit>) {
    for chain in chains.iter().filter(|c| c.atoms.len() % 2 == 0) {
        let small = chain.bonds.iter().any(|b| {
            rings
                .smallest_through(*b)
                .is_some_and(|n| n <= LARGEST_CIS_RING)
        });
        if small {
            continue;
        }
        if let Some(ligands) = chain_ligands(molecule, chain) {
            list.push(chain.unit(Kind::DoubleBond, ligands));
        }
    }
}

/// The two ligands of each end of a chain.
pub(super) fn chain_ligands(molecule: &Molecule, chain: &Chain) -> Option<[Ligand; 4]> {
    let n = chain.atoms.len();
    let [a, b] = end_ligands(molecule, chain.atoms[0], chain.atoms[1])?;
    let [c, d] = end_ligands(molecule, chain.atoms[n - 1], chain.atoms[n - 2])?;
    Some([a, b, c, d])
}

/// The two ligands of one end in reference order; at least the first is a drawn atom.
fn end_ligands(molecule: &Molecule, end: AtomIx, partner: AtomIx) -> Option<[Ligand; 2]> {
    let mut drawn: Vec<AtomIx> = Vec::with_capacity(2);
    for n in molecule.neighbors(end).iter().filter(|n| n.atom != partner) {
        if n.order != Order::Single {
            return None;
        }
        drawn.push(n.atom);
    }
    drawn.sort_unstable();
    let hydrogens = molecule.hydrogens(end);
    let second = match (molecule.element(end), drawn.len(), hydrogens) {
        (_, 2, 0) => Ligand::Atom(drawn[1]),
        (_, 1, 1) => Ligand::Hydrogen,
        (Element::N | Element::P | Element::AS, 1, 0) => Ligand::LonePair,
        _ => return None,
    };
    let holds = match molecule.element(end) {
        Element::C | Element::SI | Element::GE | Element::SN | Element::N => true,
        // a phosphorus with three ligands is a centre, not an end
        Element::P | Element::AS => second == Ligand::LonePair,
        _ => false,
    };
    holds.then(|| [Ligand::Atom(drawn[0]), second])
}
