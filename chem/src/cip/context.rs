//! The narrow view of a molecule that the rules need: numbers, masses, neighbours, duplicates.

use crate::element::Element;
use crate::molecule::{AtomIx, Molecule};
use crate::perceive::{Ratio, Rings, delocalised};

/// One atom as the rules see it.
#[derive(Clone, Copy, Debug)]
pub(super) struct CipAtom {
    /// Atomic number; 0 for a placeholder, whose rank is unknown.
    pub(super) number: u8,
    /// Mass for Rule 2.
    pub(super) mass: f64,
    /// Implicit hydrogens.
    pub(super) hydrogens: u8,
    /// Atomic number of a duplicate that this atom carries, where it is not that of the partner.
    pub(super) duplicate: Option<Ratio>,
    /// Whether it carries one duplicate more than its bonds say.
    pub(super) adds_duplicate: bool,
    first: u32,
    end: u32,
}

/// A bond from one atom to another.
#[derive(Clone, Copy, Debug)]
pub(super) struct CipBond {
    /// The atom it leads to.
    pub(super) to: AtomIx,
    /// Duplicates that stand for its further electron pairs.
    pub(super) duplicates: u8,
}

/// A molecule prepared for ranking; made once, used for every unit.
#[derive(Clone, Debug)]
pub(super) struct Context {
    atoms: Vec<CipAtom>,
    bonds: Vec<CipBond>,
}

impl Context {
    pub(super) fn new(molecule: &Molecule, rings: &Rings) -> Context {
        let delocalised = delocalised(molecule, rings);
        let mut bonds = Vec::with_capacity(2 * molecule.n_bonds());
        let atoms = molecule
            .atoms()
            .map(|a| {
                // offsets of a molecule fit easily
                let first = u32::try_from(bonds.len()).unwrap_or(u32::MAX);
                bonds.extend(molecule.neighbors(a).iter().map(|n| CipBond {
                    to: n.atom,
                    duplicates: if neglects_pi(molecule, a) || neglects_pi(molecule, n.atom) {
                        0
                    } else {
                        n.order.pairs().saturating_sub(1)
                    },
                }));
                let member = delocalised[a.index()];
                CipAtom {
                    number: molecule.element(a).number(),
                    mass: molecule.atom(a).mass(),
                    hydrogens: molecule.hydrogens(a),
                    duplicate: member.map(|d| d.number),
                    adds_duplicate: member.is_some_and(|d| d.adds_duplicate),
                    first,
                    end: u32::try_from(bonds.len()).unwrap_or(u32::MAX),
                }
            })
            .collect();
        Context { atoms, bonds }
    }

    pub(super) fn atom(&self, atom: AtomIx) -> &CipAtom {
        &self.atoms[atom.index()]
    }

    pub(super) fn bonds(&self, atom: AtomIx) -> &[CipBond] {
        let a = &self.atoms[atom.index()];
        &self.bonds[a.first as usize..a.end as usize]
    }
}

/// Whether further electron pairs to this atom are left out: third-row and heavier centres of three or
/// more ligands, whose d orbitals the rules neglect (from memory; the public CIP Validation Suite
/// confirms it at the root of the digraph).
fn neglects_pi(molecule: &Molecule, atom: AtomIx) -> bool {
    matches!(
        molecule.element(atom),
        Element::P | Element::AS | Element::S | Element::SE | Element::TE
    ) && molecule.degree(atom) + usize::from(molecule.hydrogens(atom)) >= 3
}
