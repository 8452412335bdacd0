//! The narrow view of a molecule that the rules need: numbers, masses, neighbours, duplicates.

use crate::element::Element;
use crate::molecule::{AtomIx, Molecule};
use crate::perceive::{Ratio, Rings, delocalised, drawn_without_charges};
use std::cmp::Ordering;

/// Place of a value among all that occur in the molecule: order and equality are those of the values.
pub(super) type Code = u16;

/// One atom as the rules see it.
#[derive(Clone, Copy, Debug)]
pub(super) struct CipAtom {
    /// Its atomic number.
    pub(super) number: Code,
    /// Its mass for Rule 2.
    pub(super) mass: Code,
    /// Whether it is a placeholder, whose rank is unknown.
    pub(super) wildcard: bool,
    /// Implicit hydrogens.
    pub(super) hydrogens: u8,
    /// Atomic number of a duplicate that this atom carries, where it is not that of the partner.
    pub(super) duplicate: Option<Code>,
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
    /// Whether it lies in a ring, so that it can close a path.
    pub(super) in_ring: bool,
    /// Whether its order is not known, so that what it leads to cannot be ranked.
    pub(super) is_vague: bool,
}

/// A molecule prepared for ranking; made once, used for every unit.
#[derive(Clone, Debug)]
pub(super) struct Context {
    atoms: Vec<CipAtom>,
    bonds: Vec<CipBond>,
    /// Atomic numbers that occur, mean ones included, ascending.
    numbers: Vec<Ratio>,
    /// Masses that occur, ascending; the first is that of a duplicate.
    masses: Vec<f64>,
    /// Atomic number and mass of a hydrogen in a label.
    pub(super) hydrogen: (Code, Code),
}

/// Mass of a duplicate atom.
pub(super) const NO_MASS: Code = 0;

impl Context {
    pub(super) fn new(molecule: &Molecule, rings: &Rings) -> Context {
        let delocalised = delocalised(molecule, rings);
        let number_of = |a| Ratio::whole(u32::from(molecule.element(a).number()));
        let mut numbers: Vec<Ratio> = vec![Ratio::whole(1)];
        let mut masses = vec![0.0, Element::H.weight()];
        for a in molecule.atoms() {
            note(&mut numbers, number_of(a), Ratio::cmp);
            note(&mut masses, molecule.atom(a).mass(), f64::total_cmp);
            if let Some(member) = delocalised[a.index()] {
                note(&mut numbers, member.number, Ratio::cmp);
            }
        }
        let number = |value: Ratio| code(&numbers, value, Ratio::cmp);
        let mass = |value: f64| code(&masses, value, f64::total_cmp);
        let mut bonds = Vec::with_capacity(2 * molecule.n_bonds());
        let atoms = molecule
            .atoms()
            .map(|a| {
                // offsets of a molecule fit easily
                let first = u32::try_from(bonds.len()).unwrap_or(u32::MAX);
                let neglected = neglects_pi(molecule, a);
                let bonded = molecule.neighbors(a).iter();
                let bonded = bonded.filter(|n| !n.order.is_hydrogen_bond());
                bonds.extend(bonded.map(|n| CipBond {
                    to: n.atom,
                    duplicates: if neglected || neglects_pi(molecule, n.atom) {
                        0
                    } else {
                        let further = n.order.pairs().saturating_sub(1);
                        let charged = |end| drawn_without_charges(molecule, end) == Some(n.bond);
                        further - u8::from(further > 0 && (charged(a) || charged(n.atom)))
                    },
                    in_ring: rings.has_bond(n.bond),
                    is_vague: n.order.is_vague(),
                }));
                let member = delocalised[a.index()];
                CipAtom {
                    number: number(number_of(a)),
                    mass: mass(molecule.atom(a).mass()),
                    wildcard: molecule.element(a).number() == 0,
                    hydrogens: molecule.hydrogens(a),
                    duplicate: member.map(|d| number(d.number)),
                    adds_duplicate: member.is_some_and(|d| d.adds_duplicate),
                    first,
                    end: u32::try_from(bonds.len()).unwrap_or(u32::MAX),
                }
            })
            .collect();
        let hydrogen = (number(Ratio::whole(1)), mass(Element::H.weight()));
        Context {
            atoms,
            bonds,
            numbers,
            masses,
            hydrogen,
        }
    }

    /// Number of atoms.
    pub(super) fn len(&self) -> usize {
        self.atoms.len()
    }

    pub(super) fn atom(&self, atom: AtomIx) -> &CipAtom {
        &self.atoms[atom.index()]
    }

    pub(super) fn bonds(&self, atom: AtomIx) -> &[CipBond] {
        let a = &self.atoms[atom.index()];
        &self.bonds[a.first as usize..a.end as usize]
    }

    /// The atomic number of a code.
    pub(super) fn number(&self, code: Code) -> Ratio {
        self.numbers[usize::from(code)]
    }

    /// The mass of a code.
    pub(super) fn mass(&self, code: Code) -> f64 {
        self.masses[usize::from(code)]
    }
}

/// Adds a value to an ascending list that lacks it.
fn note<T: Copy>(list: &mut Vec<T>, value: T, order: impl Fn(&T, &T) -> Ordering) {
    if let Err(at) = list.binary_search_by(|known| order(known, &value)) {
        list.insert(at, value);
    }
}

/// Place of a value in an ascending list that has it; a molecule has far fewer values than codes.
fn code<T: Copy>(list: &[T], value: T, order: impl Fn(&T, &T) -> Ordering) -> Code {
    let at = list.binary_search_by(|known| order(known, &value));
    Code::try_from(at.unwrap_or_else(|at| at)).unwrap_or(Code::MAX)
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
