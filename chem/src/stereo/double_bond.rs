//! Stereogenic double bonds: two different places at each end, not in a ring too small for both geometries.
//!
//! Bonds of cumulated chains belong to other kinds of unit.

use super::{Focus, Kind, Ligand, Unit};
use crate::element::Element;
use crate::molecule::{AtomIx, BondIx, Molecule, Order};
use crate::perceive::Rings;

/// The largest ring whose double bonds have one geometry only (InChI technical manual, appendix 5).
pub const LARGEST_CIS_RING: usize = 7;

pub(super) fn find(molecule: &Molecule, rings: &Rings, list: &mut Vec<Unit>) {
    let first = list.len();
    for bond in molecule.bonds() {
        if let Some(unit) = unit(molecule, rings, bond) {
            list.push(unit);
        }
    }
    list[first..].sort_by_key(Unit::atoms);
}

fn unit(molecule: &Molecule, rings: &Rings, bond: BondIx) -> Option<Unit> {
    let b = molecule.bond(bond);
    if b.order != Order::Double
        || rings
            .smallest_through(bond)
            .is_some_and(|n| n <= LARGEST_CIS_RING)
    {
        return None;
    }
    let mut ends = b.ends;
    ends.sort_unstable();
    let [a, c] = end_ligands(molecule, ends[0], ends[1])?;
    let [d, e] = end_ligands(molecule, ends[1], ends[0])?;
    Some(Unit {
        kind: Kind::DoubleBond,
        focus: Focus::Pair(ends),
        ligands: [a, c, d, e],
    })
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
