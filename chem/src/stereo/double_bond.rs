//! Stereogenic double bonds: two different places at each end, not in a ring too small for both geometries.
//!
//! A chain of three, five ... cumulated double bonds lies flat like a single one and is read alike.

use super::cumulated::Chain;
use super::{Kind, Ligand, Unit};
use crate::element::Element;
use crate::molecule::{AtomIx, Molecule, Order};
use crate::perceive::{Rings, drawn_without_charges};
use smallvec::SmallVec;

/// The largest ring whose double bonds have one geometry only (InChI technical manual, appendix 5).
pub const LARGEST_CIS_RING: usize = 7;

pub(super) fn find(molecule: &Molecule, rings: &Rings, chains: &[Chain], list: &mut Vec<Unit>) {
    for chain in chains.iter().filter(|c| c.atoms.len() % 2 == 0) {
        let small = chain.bonds.iter().any(|b| {
            rings
                .smallest_through(*b)
                .is_some_and(|n| n <= LARGEST_CIS_RING)
        });
        if small || alternation_moves(molecule, rings, chain) {
            continue;
        }
        if let Some(ligands) = chain_ligands(molecule, chain) {
            list.push(chain.unit(Kind::DoubleBond, ligands));
        }
    }
}

/// Steps after which the search for a circuit gives up; porphyrins need some hundreds.
const MOST_STEPS: usize = 20_000;

/// Whether a double bond of a large ring may as well be drawn one bond further: it lies on a circuit of
/// single and double bonds in turn with 4n + 2 atoms (a porphyrin). Such a bond has no geometry of its
/// own; where the circuit has 4n atoms (cyclooctatetraene) the bonds stay where they are drawn.
fn alternation_moves(molecule: &Molecule, rings: &Rings, chain: &Chain) -> bool {
    let ([start, goal], [bond]) = (chain.atoms.as_slice(), chain.bonds.as_slice()) else {
        return false;
    };
    if !rings.has_bond(*bond) {
        return false;
    }
    let mut circuit = Circuit {
        molecule,
        rings,
        goal: *start,
        on_path: vec![false; molecule.n_atoms()],
        steps: 0,
    };
    circuit.on_path[start.index()] = true;
    circuit.on_path[goal.index()] = true;
    circuit.closes(*goal, 1)
}

/// A search for a circuit of alternating ring bonds.
struct Circuit<'a> {
    molecule: &'a Molecule,
    rings: &'a Rings,
    goal: AtomIx,
    on_path: Vec<bool>,
    steps: usize,
}

impl Circuit<'_> {
    /// Whether a path with `doubles` double bonds that ends at `at`, with a double bond, can be closed
    /// with an odd number of them.
    fn closes(&mut self, at: AtomIx, doubles: usize) -> bool {
        self.steps += 1;
        // the path of a porphyrin has nine
        if self.steps > MOST_STEPS || doubles > 40 {
            return false;
        }
        let ring_bonds = |molecule: &Molecule, rings: &Rings, from: AtomIx, order: Order| {
            let near = molecule.neighbors(from).iter();
            near.filter(|n| n.order == order && rings.has_bond(n.bond))
                .map(|n| n.atom)
                .collect::<SmallVec<[AtomIx; 4]>>()
        };
        for over in ring_bonds(self.molecule, self.rings, at, Order::Single) {
            if over == self.goal && doubles % 2 == 1 && doubles > 1 {
                return true;
            }
            if self.on_path[over.index()] {
                continue;
            }
            for next in ring_bonds(self.molecule, self.rings, over, Order::Double) {
                if self.on_path[next.index()] {
                    continue;
                }
                self.on_path[over.index()] = true;
                self.on_path[next.index()] = true;
                let closed = self.closes(next, doubles + 1);
                self.on_path[over.index()] = false;
                self.on_path[next.index()] = false;
                if closed {
                    return true;
                }
            }
        }
        false
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
    let mut drawn: SmallVec<[AtomIx; 2]> = SmallVec::new();
    let dative = drawn_without_charges(molecule, end);
    for n in molecule.neighbors(end).iter().filter(|n| n.atom != partner) {
        if n.order.is_hydrogen_bond() {
            continue;
        }
        if n.order != Order::Single && Some(n.bond) != dative {
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

#[cfg(test)]
mod tests {
    use super::super::Units;
    use super::*;
    use crate::molecule::tests::build;

    fn annulene(n: usize) -> usize {
        let bonds: Vec<_> = (0..n)
            .map(|i| (i, (i + 1) % n, if i % 2 == 0 { 2 } else { 1 }))
            .collect();
        let m = build(&vec!["C"; n], &bonds);
        Units::find(&m, &Rings::find(&m))
            .iter()
            .filter(|(_, u)| u.kind == Kind::DoubleBond)
            .count()
    }

    // Hückel's rule: 18 atoms share their bonds, 8 do not; 6 are too few for both geometries
    #[test]
    fn bonds_that_move_have_no_geometry() {
        assert_eq!(annulene(18), 0);
        assert_eq!(annulene(8), 4);
        assert_eq!(annulene(6), 0);
    }
}
