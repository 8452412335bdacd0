//! The one noun of change: a gesture of the pen, a mark set by the solver, a step of a mend.

use super::{Drawing, DrawingError, Mark};
use crate::geom::Point;
use crate::molecule::{Atom, AtomIx, Bond, BondIx, Molecule, MoleculeError, Order};
use std::fmt;

/// One change of a drawing.
///
/// All handles of one list of edits mean the drawing before it, plus the atoms and bonds that the list
/// itself has added, which follow in the order of their adding. Removals take effect last.
#[derive(Clone, Debug, PartialEq)]
pub enum Edit {
    /// Set the mark of a bond.
    Mark(BondIx, Mark),
    /// Put an atom elsewhere.
    Move(AtomIx, Point),
    /// Add an atom; it comes last.
    AddAtom(Atom, Point),
    /// Add a plain bond; it comes last.
    AddBond([AtomIx; 2], Order),
    /// Replace what is stated of an atom.
    SetAtom(AtomIx, Atom),
    /// Set the order of a bond; a mark that the new order cannot bear goes.
    SetOrder(BondIx, Order),
    /// Remove an atom with its bonds.
    RemoveAtom(AtomIx),
    /// Remove a bond.
    RemoveBond(BondIx),
}

/// Why a list of edits cannot be applied; the drawing is unchanged.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum EditError {
    /// An edit names an atom that is not there.
    NoSuchAtom(AtomIx),
    /// An edit names a bond that is not there.
    NoSuchBond(BondIx),
    /// The result is no molecule.
    Molecule(MoleculeError),
    /// The result is no drawing.
    Drawing(DrawingError),
}

impl fmt::Display for EditError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            EditError::NoSuchAtom(a) => write!(f, "there is no atom {}", a.index() + 1),
            EditError::NoSuchBond(b) => write!(f, "there is no bond {}", b.index() + 1),
            EditError::Molecule(e) => e.fmt(f),
            EditError::Drawing(e) => e.fmt(f),
        }
    }
}

impl std::error::Error for EditError {}

/// Where atoms and bonds of the drawing before went; the order of those that stay is kept.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Renumbering {
    atoms: Vec<Option<AtomIx>>,
    bonds: Vec<Option<BondIx>>,
}

impl Renumbering {
    /// New handle of an atom, `None` if it was removed.
    pub fn atom(&self, before: AtomIx) -> Option<AtomIx> {
        self.atoms.get(before.index()).copied().flatten()
    }

    /// New handle of a bond, `None` if it was removed.
    pub fn bond(&self, before: BondIx) -> Option<BondIx> {
        self.bonds.get(before.index()).copied().flatten()
    }

    /// Whether every atom and bond kept its handle.
    pub fn is_identity(&self) -> bool {
        let same_atoms = self
            .atoms
            .iter()
            .enumerate()
            .all(|(i, a)| a.map(AtomIx::index) == Some(i));
        let same_bonds = self
            .bonds
            .iter()
            .enumerate()
            .all(|(i, b)| b.map(BondIx::index) == Some(i));
        same_atoms && same_bonds
    }
}

struct Parts {
    atoms: Vec<Atom>,
    points: Vec<Point>,
    depths: Option<Vec<f64>>,
    bonds: Vec<Bond>,
    marks: Vec<Mark>,
    gone_atoms: Vec<bool>,
    gone_bonds: Vec<bool>,
}

impl Drawing {
    /// The drawing after a list of edits, and where its atoms and bonds went.
    ///
    /// # Errors
    /// If an edit names something that is not there or the result would be no drawing.
    pub fn apply(&self, edits: &[Edit]) -> Result<(Drawing, Renumbering), EditError> {
        let mut parts = Parts::of(self);
        for edit in edits {
            parts.change(edit)?;
        }
        parts.build()
    }
}

impl Parts {
    fn of(drawing: &Drawing) -> Parts {
        let m = drawing.molecule();
        Parts {
            atoms: m.atoms().map(|a| m.atom(a).clone()).collect(),
            points: drawing.points.clone(),
            depths: drawing.depths.clone(),
            bonds: m.bonds().map(|b| *m.bond(b)).collect(),
            marks: drawing.marks.clone(),
            gone_atoms: vec![false; m.n_atoms()],
            gone_bonds: vec![false; m.n_bonds()],
        }
    }

    fn atom(&self, a: AtomIx) -> Result<usize, EditError> {
        (a.index() < self.atoms.len())
            .then_some(a.index())
            .ok_or(EditError::NoSuchAtom(a))
    }

    fn bond(&self, b: BondIx) -> Result<usize, EditError> {
        (b.index() < self.bonds.len())
            .then_some(b.index())
            .ok_or(EditError::NoSuchBond(b))
    }

    fn change(&mut self, edit: &Edit) -> Result<(), EditError> {
        match edit {
            Edit::Mark(b, mark) => {
                let i = self.bond(*b)?;
                self.marks[i] = *mark;
            }
            Edit::Move(a, to) => {
                let i = self.atom(*a)?;
                self.points[i] = *to;
            }
            Edit::AddAtom(atom, at) => {
                self.atoms.push(atom.clone());
                self.points.push(*at);
                self.gone_atoms.push(false);
                if let Some(depths) = &mut self.depths {
                    depths.push(0.0);
                }
            }
            Edit::AddBond(ends, order) => {
                self.atom(ends[0])?;
                self.atom(ends[1])?;
                self.bonds.push(Bond {
                    ends: *ends,
                    order: *order,
                });
                self.marks.push(Mark::Plain);
                self.gone_bonds.push(false);
            }
            Edit::SetAtom(a, atom) => {
                let i = self.atom(*a)?;
                self.atoms[i] = atom.clone();
            }
            Edit::SetOrder(b, order) => {
                let i = self.bond(*b)?;
                self.bonds[i].order = *order;
                let keeps = match self.marks[i] {
                    Mark::Plain => true,
                    Mark::Crossed => *order == Order::Double,
                    Mark::Solid(_) | Mark::Hashed(_) | Mark::Wavy(_) => *order == Order::Single,
                };
                if !keeps {
                    self.marks[i] = Mark::Plain;
                }
            }
            Edit::RemoveAtom(a) => {
                let i = self.atom(*a)?;
                self.gone_atoms[i] = true;
            }
            Edit::RemoveBond(b) => {
                let i = self.bond(*b)?;
                self.gone_bonds[i] = true;
            }
        }
        Ok(())
    }

    fn build(self) -> Result<(Drawing, Renumbering), EditError> {
        let mut next = 0;
        let atom_map: Vec<Option<AtomIx>> = self
            .gone_atoms
            .iter()
            .map(|gone| {
                (!gone).then(|| {
                    next += 1;
                    AtomIx::new(next - 1)
                })
            })
            .collect();
        let mut bonds = Vec::with_capacity(self.bonds.len());
        let mut marks = Vec::with_capacity(self.bonds.len());
        let bond_map = self
            .bonds
            .iter()
            .zip(&self.marks)
            .zip(&self.gone_bonds)
            .map(|((bond, mark), gone)| {
                let [a, b] = bond.ends.map(|e| atom_map[e.index()]);
                match (a, b, gone) {
                    (Some(a), Some(b), false) => {
                        bonds.push(Bond {
                            ends: [a, b],
                            order: bond.order,
                        });
                        marks.push(*mark);
                        Some(BondIx::new(bonds.len() - 1))
                    }
                    _ => None,
                }
            })
            .collect();
        let kept = |i: &usize| !self.gone_atoms[*i];
        let n = self.atoms.len();
        let points = (0..n).filter(kept).map(|i| self.points[i]).collect();
        let depths = self
            .depths
            .as_ref()
            .map(|d| (0..n).filter(kept).map(|i| d[i]).collect());
        let gone = &self.gone_atoms;
        let atoms = self
            .atoms
            .into_iter()
            .zip(gone)
            .filter_map(|(atom, gone)| (!gone).then_some(atom))
            .collect();
        let molecule = Molecule::new(atoms, bonds).map_err(EditError::Molecule)?;
        let mut drawing = Drawing::new(molecule, points, marks).map_err(EditError::Drawing)?;
        if let Some(depths) = depths {
            drawing = drawing.with_depths(depths).map_err(EditError::Drawing)?;
        }
        Ok((
            drawing,
            Renumbering {
                atoms: atom_map,
                bonds: bond_map,
            },
        ))
    }
}

#[cfg(test)]
mod tests {
    use super::super::End;
    use super::super::tests::draw;
    use super::*;
    use crate::element::Element;

    fn chain() -> Drawing {
        draw(
            &[("C", 0.0, 0.0), ("C", 1.0, 0.5), ("O", 2.0, 0.0)],
            &[(0, 1, 1, ' '), (1, 2, 1, 'w')],
        )
    }

    #[test]
    fn removal_keeps_the_order_of_the_rest() {
        let (d, map) = chain().apply(&[Edit::RemoveAtom(AtomIx::new(0))]).unwrap();
        assert_eq!(d.molecule().n_atoms(), 2);
        assert_eq!(map.atom(AtomIx::new(0)), None);
        assert_eq!(map.atom(AtomIx::new(2)), Some(AtomIx::new(1)));
        assert_eq!(map.bond(BondIx::new(1)), Some(BondIx::new(0)));
        assert_eq!(d.mark(BondIx::new(0)), Mark::Solid(End::First));
    }

    #[test]
    fn added_atoms_can_be_bonded_in_the_same_list() {
        let edits = [
            Edit::AddAtom(Atom::new(Element::N), Point::new(1.0, 1.5)),
            Edit::AddBond([AtomIx::new(1), AtomIx::new(3)], Order::Single),
            Edit::Mark(BondIx::new(2), Mark::Hashed(End::First)),
        ];
        let (d, map) = chain().apply(&edits).unwrap();
        assert!(map.is_identity());
        assert_eq!(d.molecule().n_bonds(), 3);
        assert_eq!(d.mark(BondIx::new(2)), Mark::Hashed(End::First));
    }

    #[test]
    fn a_double_bond_loses_its_wedge() {
        let (d, _) = chain()
            .apply(&[Edit::SetOrder(BondIx::new(1), Order::Double)])
            .unwrap();
        assert_eq!(d.mark(BondIx::new(1)), Mark::Plain);
    }

    #[test]
    fn bad_handles_are_refused() {
        let far = AtomIx::new(9);
        assert_eq!(
            chain().apply(&[Edit::Move(far, Point::ORIGIN)]).err(),
            Some(EditError::NoSuchAtom(far))
        );
        let twice = Edit::AddBond([AtomIx::new(0), AtomIx::new(1)], Order::Single);
        assert!(matches!(
            chain().apply(&[twice]),
            Err(EditError::Molecule(MoleculeError::Twice { bond: 2 }))
        ));
    }
}
