//! Hindered axes: a single bond between two flat rings (biaryls, also bridged), or between a flat ring and
//! a flat group (styrenes, anilides, benzamides, vinyl lactams).
//!
//! The graph cannot tell whether rotation is hindered, so every such bond is a unit and only a mark on a
//! ring bond of one of its ends makes it speak. A ring end lies in unsaturated rings of three to seven
//! atoms: bold ring bonds of cyclophanes, drawn in perspective, are no axes. A wedge that is narrow at a
//! flat atom outside rings is a slip far more often than an axis, and says nothing.

use super::{Focus, Kind, Ligand, Unit};
use crate::element::Element;
use crate::molecule::{AtomIx, BondIx, Molecule, Order};
use crate::perceive::Rings;
use smallvec::SmallVec;

/// The smallest ring through the axis itself: a bridge of seven atoms still lets both senses exist.
const SMALLEST_BRIDGE: usize = 7;
/// The largest ring that is flat enough.
const LARGEST_RING: usize = 7;

pub(super) fn find(molecule: &Molecule, rings: &Rings, list: &mut Vec<Unit>) {
    for bond in molecule.bonds() {
        if let Some(unit) = unit(molecule, rings, bond) {
            list.push(unit);
        }
    }
}

fn unit(molecule: &Molecule, rings: &Rings, bond: BondIx) -> Option<Unit> {
    let b = molecule.bond(bond);
    let bridged_tightly = rings
        .smallest_through(bond)
        .is_some_and(|n| n < SMALLEST_BRIDGE);
    if b.order != Order::Single || bridged_tightly {
        return None;
    }
    let mut ends = b.ends;
    ends.sort_unstable();
    let first = ortho(molecule, rings, ends[0], ends[1]);
    let second = ortho(molecule, rings, ends[1], ends[0]);
    let (first, second, mute) = match (first, second) {
        (Some(first), Some(second)) => (first, second, [false; 2]),
        (Some(first), None) if !rings.has_bond(bond) => (
            first,
            group(molecule, rings, ends[1], ends[0])?,
            [false, true],
        ),
        (None, Some(second)) if !rings.has_bond(bond) => (
            group(molecule, rings, ends[0], ends[1])?,
            second,
            [true, false],
        ),
        _ => return None,
    };
    Some(Unit {
        kind: Kind::HinderedAxis,
        focus: Focus::Pair(ends),
        ligands: [first[0], first[1], second[0], second[1]],
        inner: SmallVec::new(),
        mute,
    })
}

/// The two ligands of a flat atom outside rings at the far end of an axis, the lower one first.
fn group(molecule: &Molecule, rings: &Rings, end: AtomIx, partner: AtomIx) -> Option<[Ligand; 2]> {
    let others = flat_neighbors(molecule, end, partner)?;
    // carboxyl, ester and nitro groups turn too easily for an axis (common practice, no source)
    let turns = others.iter().all(|a| {
        matches!(
            molecule.element(*a),
            Element::O | Element::S | Element::SE | Element::TE
        )
    });
    (!turns && !rings.has_atom(molecule, end)).then(|| others.map(Ligand::Atom))
}

/// The two ring neighbors of an axis atom, the lower one first.
fn ortho(molecule: &Molecule, rings: &Rings, end: AtomIx, partner: AtomIx) -> Option<[Ligand; 2]> {
    let atoms = flat_neighbors(molecule, end, partner)?;
    let small = |b: BondIx| rings.smallest_through(b).is_some_and(|n| n <= LARGEST_RING);
    let near = molecule.neighbors(end).iter();
    near.filter(|n| n.atom != partner)
        .all(|n| small(n.bond))
        .then(|| atoms.map(Ligand::Atom))
}

/// The two neighbors of a flat atom but the partner, the lower one first.
fn flat_neighbors(molecule: &Molecule, end: AtomIx, partner: AtomIx) -> Option<[AtomIx; 2]> {
    if molecule.degree(end) != 3 || molecule.hydrogens(end) > 0 {
        return None;
    }
    let others = || molecule.neighbors(end).iter().filter(|n| n.atom != partner);
    let flat = match molecule.element(end) {
        Element::C => others().any(|n| n.order == Order::Double),
        // the nitrogen of a pyrrole or lactam has no double bond of its own
        Element::N => others().any(|n| {
            n.order == Order::Double
                || molecule
                    .neighbors(n.atom)
                    .iter()
                    .any(|m| m.order == Order::Double)
        }),
        _ => false,
    };
    if !flat {
        return None;
    }
    let mut atoms: SmallVec<[AtomIx; 2]> = others().map(|n| n.atom).collect();
    atoms.sort_unstable();
    match atoms.as_slice() {
        [a, b] => Some([*a, *b]),
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::super::Units;
    use super::*;
    use crate::molecule::tests::build;

    /// Hindered axes of a benzene ring with methyl groups beside a substituent on atom 0.
    fn axes(symbols: &[&str], bonds: &[(usize, usize, u8)]) -> Vec<([usize; 2], [bool; 2])> {
        let ring = (0..6).map(|i| (i, (i + 1) % 6, if i % 2 == 0 { 2 } else { 1 }));
        let all: Vec<_> = ring
            .chain([(1, 6, 1), (5, 7, 1)])
            .chain(bonds.iter().copied())
            .collect();
        let m = build(&[&["C"; 8], symbols].concat(), &all);
        let units = Units::find(&m, &Rings::find(&m));
        let hindered = units.iter().filter(|(_, u)| u.kind == Kind::HinderedAxis);
        hindered
            .filter_map(|(_, u)| match u.focus {
                Focus::Pair(ends) => Some((ends.map(AtomIx::index), u.mute)),
                Focus::Center(_) => None,
            })
            .collect()
    }

    #[test]
    fn a_flat_group_on_a_flat_ring() {
        // a styrene, a benzamide and an anilide: the ring's end alone speaks
        let styrene = [(0, 8, 1), (8, 9, 2), (8, 10, 1)];
        let expected = [([0, 8], [false, true])];
        assert_eq!(axes(&["C", "C", "Cl"], &styrene), expected);
        let amide = [(0, 8, 1), (8, 9, 2), (8, 10, 1), (10, 11, 1)];
        assert_eq!(axes(&["C", "O", "N", "C"], &amide), expected);
        let anilide = [(0, 8, 1), (8, 9, 1), (8, 10, 1), (10, 11, 2)];
        assert_eq!(axes(&["N", "C", "C", "O"], &anilide), expected);
    }

    #[test]
    fn groups_that_turn_or_are_not_flat() {
        let acid = [(0, 8, 1), (8, 9, 2), (8, 10, 1)];
        assert!(axes(&["C", "O", "O"], &acid).is_empty());
        let alkyl = [(0, 8, 1), (8, 9, 1), (8, 10, 1)];
        assert!(axes(&["C", "C", "Cl"], &alkyl).is_empty());
        // a vinyl group with a hydrogen at the axis
        assert!(axes(&["C", "C"], &[(0, 8, 1), (8, 9, 2)]).is_empty());
    }
}
