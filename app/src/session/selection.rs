//! What is selected.

use chem::drawing::{Drawing, Renumbering};
use chem::molecule::{AtomIx, BondIx};
use std::collections::BTreeSet;

/// Selected atoms and bonds.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Selection {
    /// Selected atoms.
    pub atoms: BTreeSet<AtomIx>,
    /// Selected bonds.
    pub bonds: BTreeSet<BondIx>,
}

impl Selection {
    /// One atom.
    pub fn atom(atom: AtomIx) -> Selection {
        Selection {
            atoms: BTreeSet::from([atom]),
            bonds: BTreeSet::new(),
        }
    }

    /// One bond.
    pub fn bond(bond: BondIx) -> Selection {
        Selection {
            atoms: BTreeSet::new(),
            bonds: BTreeSet::from([bond]),
        }
    }

    /// Everything drawn.
    pub fn all(drawing: &Drawing) -> Selection {
        Selection {
            atoms: drawing.molecule().atoms().collect(),
            bonds: drawing.molecule().bonds().collect(),
        }
    }

    /// Whether nothing is selected.
    pub fn is_empty(&self) -> bool {
        self.atoms.is_empty() && self.bonds.is_empty()
    }

    /// The one selected bond, if that is all.
    pub fn only_bond(&self) -> Option<BondIx> {
        match (self.atoms.len(), self.bonds.len()) {
            (0, 1) => self.bonds.first().copied(),
            _ => None,
        }
    }

    /// The one selected atom, if that is all.
    pub fn only_atom(&self) -> Option<AtomIx> {
        match (self.atoms.len(), self.bonds.len()) {
            (1, 0) => self.atoms.first().copied(),
            _ => None,
        }
    }

    /// Adds what is not selected and takes out what is.
    pub fn toggle(&mut self, other: &Selection) {
        for atom in &other.atoms {
            if !self.atoms.remove(atom) {
                self.atoms.insert(*atom);
            }
        }
        for bond in &other.bonds {
            if !self.bonds.remove(bond) {
                self.bonds.insert(*bond);
            }
        }
    }

    /// Whether all of `other`, which is not empty, is selected.
    pub fn holds(&self, other: &Selection) -> bool {
        !other.is_empty()
            && other.atoms.is_subset(&self.atoms)
            && other.bonds.is_subset(&self.bonds)
    }

    /// Atoms that a move of the selection takes along: the selected ones and the ends of selected bonds.
    pub fn carried(&self, drawing: &Drawing) -> BTreeSet<AtomIx> {
        let mut atoms = self.atoms.clone();
        for bond in &self.bonds {
            atoms.extend(drawing.molecule().bond(*bond).ends);
        }
        atoms
    }

    /// The selection after a step.
    pub(super) fn renumbered(&self, map: &Renumbering) -> Selection {
        Selection {
            atoms: self.atoms.iter().filter_map(|a| map.atom(*a)).collect(),
            bonds: self.bonds.iter().filter_map(|b| map.bond(*b)).collect(),
        }
    }

    /// Drops what the drawing does not have.
    pub(super) fn keep_within(&mut self, drawing: &Drawing) {
        let m = drawing.molecule();
        self.atoms.retain(|a| a.index() < m.n_atoms());
        self.bonds.retain(|b| b.index() < m.n_bonds());
    }
}
