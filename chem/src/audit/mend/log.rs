//! What was mended: a drawing's log.

use super::super::{Finding, Mend, words};
use crate::drawing::{Drawing, Mark};
use crate::geom::Point;
use crate::molecule::{AtomIx, BondIx};

/// A drawing after all mends, with its log and what is left.
#[derive(Clone, Debug)]
pub struct Mended {
    /// The drawing.
    pub drawing: Drawing,
    /// What was done, in order.
    pub steps: Vec<Step>,
    /// What is still to be said of it, without mends.
    pub left: Vec<Finding>,
}

/// One mend that was applied.
#[derive(Clone, Debug, PartialEq)]
pub struct Step {
    /// Why: the finding that it mended (without its list of mends).
    pub reason: Finding,
    /// What was done, in a few words.
    pub text: String,
    /// Whether the drawing meant the same afterwards.
    pub keeps_meaning: bool,
    /// What changed, as it was.
    pub before: Vec<Trait>,
    /// The same things as they are now; atoms and bonds that were added stand only here.
    pub after: Vec<Trait>,
}

/// One trait of a drawing that a mend can change.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Trait {
    /// The mark of a bond, from its narrow end where it has one, else from its first atom.
    Mark {
        /// The bond.
        bond: BondIx,
        /// Its atoms, the narrow end first.
        atoms: [AtomIx; 2],
        /// Its mark.
        mark: Mark,
    },
    /// Where an atom stands.
    Place {
        /// The atom.
        atom: AtomIx,
        /// Its place.
        point: Point,
    },
}

impl Step {
    /// What a mend of a finding changed between two drawings; atoms and bonds keep their numbers, and what
    /// was added comes last.
    pub fn new(before: &Drawing, after: &Drawing, finding: Finding, mend: &Mend) -> Step {
        let mends = Vec::new();
        let mut step = Step {
            reason: Finding { mends, ..finding },
            text: mend.text.clone(),
            keeps_meaning: mend.keeps_meaning,
            before: Vec::new(),
            after: Vec::new(),
        };
        let molecule = after.molecule();
        let known = before.molecule();
        for atom in molecule.atoms() {
            let is_new = atom.index() >= known.n_atoms();
            if is_new || before.point(atom) != after.point(atom) {
                step.after.push(place(after, atom));
                if !is_new {
                    step.before.push(place(before, atom));
                }
            }
        }
        for bond in molecule.bonds() {
            let is_new = bond.index() >= known.n_bonds();
            if is_new || before.mark(bond) != after.mark(bond) {
                step.after.push(mark(after, bond));
                if !is_new {
                    step.before.push(mark(before, bond));
                }
            }
        }
        step
    }
}

fn place(drawing: &Drawing, atom: AtomIx) -> Trait {
    Trait::Place {
        atom,
        point: drawing.point(atom),
    }
}

fn mark(drawing: &Drawing, bond: BondIx) -> Trait {
    let mark = drawing.mark(bond);
    let [a, b] = drawing.molecule().bond(bond).ends;
    let atoms = match mark.narrow() {
        Some(end) if end.index() == 1 => [b, a],
        _ => [a, b],
    };
    Trait::Mark { bond, atoms, mark }
}

impl Trait {
    /// In a few words: `solid wedge 3-7`, `atom 8 at 1.2, -0.5`.
    pub fn text(&self) -> String {
        match self {
            Trait::Mark { atoms, mark, .. } => format!(
                "{} {}-{}",
                words::mark(*mark),
                words::n(atoms[0]),
                words::n(atoms[1])
            ),
            Trait::Place { atom, point } => {
                format!("atom {} at {:.4}, {:.4}", words::n(*atom), point.x, point.y)
            }
        }
    }
}
