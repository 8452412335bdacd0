//! Tetrahedral centres: four ligands, one of which may be a hydrogen in the label or a lone pair.

use super::{Focus, Kind, Ligand, Unit};
use crate::element::Element;
use crate::molecule::{AtomIx, Molecule, Order};
use crate::perceive::Rings;
use smallvec::SmallVec;

pub(super) fn find(molecule: &Molecule, rings: &Rings, list: &mut Vec<Unit>) {
    for atom in molecule.atoms() {
        if let Some(ligands) = ligands(molecule, rings, atom) {
            list.push(Unit {
                kind: Kind::Tetrahedral,
                focus: Focus::Center(atom),
                ligands,
                inner: SmallVec::new(),
            });
        }
    }
}

/// The four ligands of an atom in reference order, if it has the shape of a centre.
fn ligands(molecule: &Molecule, rings: &Rings, atom: AtomIx) -> Option<[Ligand; 4]> {
    let neighbors = molecule.neighbors(atom).iter();
    let drawn = neighbors.clone().filter(|n| !n.order.is_hydrogen_bond());
    let drawn: SmallVec<[AtomIx; 4]> = drawn.map(|n| n.atom).collect();
    let hydrogens = usize::from(molecule.hydrogens(atom));
    let last = match (drawn.len(), hydrogens) {
        (4, 0) if four_ligands_hold(molecule, atom) => None,
        (3, 1) if four_ligands_hold(molecule, atom) => Some(Ligand::Hydrogen),
        (3, 0) if lone_pair_holds(molecule, rings, atom) => Some(Ligand::LonePair),
        _ => return None,
    };
    let mut ligands = [last.unwrap_or(Ligand::Hydrogen); 4];
    for (slot, neighbor) in ligands.iter_mut().zip(&drawn) {
        *slot = Ligand::Atom(*neighbor);
    }
    ligands[..drawn.len()].sort_unstable();
    Some(ligands)
}

/// Numbers of bonds that are drawn at an atom.
#[derive(Default)]
struct Bonds {
    double: usize,
    dative: usize,
    /// Triple bonds and those whose order is not stated.
    other: usize,
}

fn bonds(molecule: &Molecule, atom: AtomIx) -> Bonds {
    let mut counts = Bonds::default();
    for n in molecule.neighbors(atom) {
        match n.order {
            Order::Single => {}
            Order::Double => counts.double += 1,
            order if order.is_dative() => counts.dative += 1,
            order if order.is_hydrogen_bond() => {}
            Order::Triple | Order::Special(_) => counts.other += 1,
        }
    }
    counts
}

fn four_ligands_hold(molecule: &Molecule, atom: AtomIx) -> bool {
    let bonds = bonds(molecule, atom);
    let charge = molecule.atom(atom).charge;
    if bonds.other > 0 {
        return false;
    }
    match molecule.element(atom) {
        Element::C | Element::SI | Element::GE | Element::SN => {
            bonds.double == 0 && bonds.dative == 0 && charge == 0
        }
        // a borate, or a borane that takes the pair of a donor
        Element::B => bonds.double == 0 && (charge == -1 || (charge == 0 && bonds.dative == 1)),
        // ammonium and N-oxide, the latter also drawn with N=O; an amine that gives its pair
        Element::N => {
            (bonds.double == 0 && (charge == 1 || (charge == 0 && bonds.dative == 1)))
                || (bonds.double == 1 && charge == 0 && bonds.dative == 0)
        }
        Element::P | Element::AS | Element::SB => true,
        Element::S | Element::SE | Element::TE => true,
        _ => false,
    }
}

fn lone_pair_holds(molecule: &Molecule, rings: &Rings, atom: AtomIx) -> bool {
    let bonds = bonds(molecule, atom);
    let charge = molecule.atom(atom).charge;
    if bonds.other > 0 {
        return false;
    }
    let donates = bonds.dative > 0;
    match molecule.element(atom) {
        Element::N => {
            bonds.double == 0
                && charge == 0
                && !donates
                && nitrogen_cannot_invert(molecule, rings, atom)
        }
        Element::P | Element::AS | Element::SB => bonds.double == 0 && charge == 0 && !donates,
        // of the two pairs of a sulfide one may be given away
        Element::S | Element::SE | Element::TE => matches!(
            (bonds.double, charge, bonds.dative),
            (1, 0, 0) | (0, 1, 0) | (0, 0, 1)
        ),
        _ => false,
    }
}

/// Nitrogen in a three-membered ring, or at a bridgehead: all three bonds in rings, and two of the
/// smallest rings through its neighbour pairs share three atoms or more (plain fusion shares two, and the
/// ring round both is left out, being larger than either).
fn nitrogen_cannot_invert(molecule: &Molecule, rings: &Rings, atom: AtomIx) -> bool {
    let neighbors = molecule.neighbors(atom);
    if !neighbors.iter().all(|n| rings.has_bond(n.bond)) {
        return neighbors
            .iter()
            .any(|n| rings.smallest_through(n.bond) == Some(3));
    }
    if neighbors
        .iter()
        .any(|n| rings.smallest_through(n.bond) == Some(3))
    {
        return true;
    }
    let pairs = [(0, 1), (0, 2), (1, 2)];
    let cycles: Vec<Vec<AtomIx>> = pairs
        .iter()
        .filter_map(|(i, j)| {
            rings.through_pair(molecule, atom, neighbors[*i].atom, neighbors[*j].atom)
        })
        .collect();
    let mut sizes: SmallVec<[usize; 3]> = cycles.iter().map(Vec::len).collect();
    sizes.sort_unstable();
    let largest = sizes.get(1).copied().unwrap_or(0);
    let cycles: Vec<&Vec<AtomIx>> = cycles.iter().filter(|c| c.len() <= largest).collect();
    // the nitrogen itself is shared and left out of each list
    let shared = |a: &[AtomIx], b: &[AtomIx]| a.iter().filter(|x| b.contains(x)).count() + 1;
    cycles
        .iter()
        .enumerate()
        .any(|(i, a)| cycles[i + 1..].iter().any(|b| shared(a, b) >= 3))
}
