//! Where `/` and `\` stand so that they say the geometry of each double bond and nothing else.
//!
//! A slash on a single bond speaks at both of its atoms. Each end of a defined double bond needs one; a
//! bond that is at no other double bond is taken first. What the marks must be to each other is a system
//! of equations over two values; in a ring whose bonds are all shared it may have no solution (all-Z
//! cyclodecapentaene without drawn hydrogens), and then a double bond stays unsaid.

use super::tree::Tree;
use crate::molecule::{AtomIx, BondIx, Molecule};
use crate::stereo::{Configuration, Focus, Kind, Ligand, Parity, UnitIx, Units};
use smallvec::SmallVec;

/// The marks of a line.
#[derive(Debug)]
pub(super) struct Slashes {
    /// For each bond, whether the atom written later lies above the other; `None` for no mark.
    pub(super) up: Vec<Option<bool>>,
    /// Double bonds whose geometry the line does not say.
    pub(super) unsaid: Vec<UnitIx>,
}

/// A double bond with the single bonds at its ends.
struct Double {
    unit: UnitIx,
    /// Its geometry, as long as the line is to say it.
    parity: Option<Parity>,
    ends: [End; 2],
}

struct End {
    /// Bonds to drawn ligands, and whether each is the first ligand.
    bonds: SmallVec<[(BondIx, bool); 2]>,
    atom: AtomIx,
    /// The bond that is to bear the mark.
    chosen: Option<BondIx>,
}

/// Chooses and turns the marks.
pub(super) fn choose(
    molecule: &Molecule,
    tree: &Tree,
    units: &Units,
    configurations: &[Configuration],
) -> Slashes {
    let mut doubles: Vec<Double> = units
        .iter()
        .filter(|(_, u)| u.kind == Kind::DoubleBond)
        .filter_map(|(unit, u)| {
            let Focus::Pair([a, b]) = u.focus else {
                return None;
            };
            let (of_a, of_b) = u.ligands.split_at(2);
            let parity = match configurations.get(unit.index()) {
                Some(Configuration::Defined(parity)) => Some(*parity),
                _ => None,
            };
            Some(Double {
                unit,
                parity,
                ends: [end(molecule, a, of_a), end(molecule, b, of_b)],
            })
        })
        .collect();
    let mut unsaid = Vec::new();
    loop {
        let marked = mark(molecule, tree, &mut doubles);
        let solved = solve(molecule, tree, &doubles, &marked);
        let lost = match solved {
            Ok(up) => match false_statement(&doubles, &marked) {
                None => return Slashes { up, unsaid },
                Some(cause) => cause,
            },
            Err(lost) => lost,
        };
        // each round takes one out, so this ends
        doubles[lost].parity = None;
        unsaid.push(doubles[lost].unit);
    }
}

fn end(molecule: &Molecule, atom: AtomIx, ligands: &[Ligand]) -> End {
    let bonds = ligands.iter().enumerate().filter_map(|(i, ligand)| {
        let bond = molecule.bond_between(atom, ligand.atom()?)?;
        Some((bond, i == 0))
    });
    End {
        bonds: bonds.collect(),
        atom,
        chosen: None,
    }
}

/// Chooses a bond for each end of each defined double bond; which bonds are marked then.
fn mark(molecule: &Molecule, tree: &Tree, doubles: &mut [Double]) -> Vec<bool> {
    // how many ends of other kinds a bond has: none is best, one of a defined double bond next
    let mut at_defined = vec![0u8; molecule.n_bonds()];
    let mut at_open = vec![0u8; molecule.n_bonds()];
    for double in doubles.iter() {
        let count = match double.parity {
            Some(_) => &mut at_defined,
            None => &mut at_open,
        };
        for (bond, _) in double.ends.iter().flat_map(|e| &e.bonds) {
            count[bond.index()] += 1;
        }
    }
    let mut marked = vec![false; molecule.n_bonds()];
    for double in doubles.iter_mut() {
        for end in &mut double.ends {
            let near = end.bonds.iter().map(|(bond, _)| *bond);
            let best = near.min_by_key(|bond| {
                let other = molecule.bond(*bond).other(end.atom);
                let i = bond.index();
                (at_open[i], at_defined[i], tree.place[other.index()])
            });
            end.chosen = best.filter(|_| double.parity.is_some());
            if let Some(bond) = end.chosen {
                marked[bond.index()] = true;
            }
        }
    }
    marked
}

/// The first double bond that is to stay open and has marks at both ends: the lowest defined one whose
/// mark is among them.
fn false_statement(doubles: &[Double], marked: &[bool]) -> Option<usize> {
    let is_marked = |end: &End| end.bonds.iter().any(|(b, _)| marked[b.index()]);
    for double in doubles.iter().filter(|d| d.parity.is_none()) {
        if !double.ends.iter().all(is_marked) {
            continue;
        }
        let near = |bond| {
            double
                .ends
                .iter()
                .any(|e| e.bonds.iter().any(|(b, _)| *b == bond))
        };
        return doubles
            .iter()
            .position(|d| d.parity.is_some() && d.ends.iter().any(|e| e.chosen.is_some_and(near)));
    }
    None
}

/// The direction of each marked bond, or the first double bond that contradicts those before it.
fn solve(
    molecule: &Molecule,
    tree: &Tree,
    doubles: &[Double],
    marked: &[bool],
) -> Result<Vec<Option<bool>>, usize> {
    let mut equations = Equations::new(molecule.n_bonds());
    // whether a ligand above its end makes the bond go up
    let is_forward = |end: &End, bond: BondIx| {
        let other = molecule.bond(bond).other(end.atom);
        tree.place[end.atom.index()] < tree.place[other.index()]
    };
    for (i, double) in doubles.iter().enumerate() {
        for end in &double.ends {
            if let [(a, _), (b, _)] = end.bonds.as_slice()
                && marked[a.index()]
                && marked[b.index()]
            {
                // opposite sides
                let differ = is_forward(end, *a) == is_forward(end, *b);
                if !equations.set(a.index(), b.index(), differ) {
                    return Err(first_defined(doubles, i));
                }
            }
        }
    }
    for (i, double) in doubles.iter().enumerate() {
        let [first, second] = &double.ends;
        let (Some(parity), Some(a), Some(b)) = (double.parity, first.chosen, second.chosen) else {
            continue;
        };
        let turn = |end: &End, bond: BondIx| {
            let is_first = end.bonds.iter().any(|(b, first)| *b == bond && *first);
            is_forward(end, bond) == is_first
        };
        let same = turn(first, a) == turn(second, b);
        let differ = same == (parity == Parity::Odd);
        if !equations.set(a.index(), b.index(), differ) {
            return Err(i);
        }
    }
    Ok((0..marked.len())
        .map(|i| marked[i].then(|| !equations.value(i)))
        .collect())
}

fn first_defined(doubles: &[Double], from: usize) -> usize {
    let defined = |i: &usize| doubles[*i].parity.is_some();
    let mut all = (from..doubles.len()).chain(0..from);
    all.find(defined).unwrap_or(from)
}

/// Variables of two values that are equal or differ (a forest with the difference to each parent).
struct Equations {
    parent: Vec<usize>,
    differs: Vec<bool>,
}

impl Equations {
    fn new(n: usize) -> Equations {
        Equations {
            parent: (0..n).collect(),
            differs: vec![false; n],
        }
    }

    /// The leader of a variable, and whether it differs from it.
    fn find(&mut self, variable: usize) -> (usize, bool) {
        let (mut at, mut differs) = (variable, false);
        while self.parent[at] != at {
            differs ^= self.differs[at];
            at = self.parent[at];
        }
        let leader = at;
        let (mut at, mut rest) = (variable, differs);
        while self.parent[at] != leader && at != leader {
            let next = self.parent[at];
            let own = std::mem::replace(&mut self.differs[at], rest);
            self.parent[at] = leader;
            rest ^= own;
            at = next;
        }
        (leader, differs)
    }

    /// Says how two variables stand to each other; whether that can be.
    fn set(&mut self, a: usize, b: usize, differ: bool) -> bool {
        let ((a, da), (b, db)) = (self.find(a), self.find(b));
        if a == b {
            return da ^ db == differ;
        }
        let (low, high) = (a.min(b), a.max(b));
        self.parent[high] = low;
        self.differs[high] = da ^ db ^ differ;
        true
    }

    /// The value of a variable when its leader is false.
    fn value(&mut self, variable: usize) -> bool {
        self.find(variable).1
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn equations_are_kept() {
        let mut e = Equations::new(5);
        assert!(e.set(0, 1, true) && e.set(1, 2, true) && e.set(3, 2, false));
        assert!(e.set(0, 3, false));
        assert!(!e.set(0, 3, true));
        assert!(!e.set(1, 3, false));
        assert!(e.set(4, 1, false));
        let values: Vec<bool> = (0..5).map(|i| e.value(i)).collect();
        assert_eq!(values[0], values[2]);
        assert_eq!(values[0], values[3]);
        assert_eq!(values[1], values[4]);
        assert_ne!(values[0], values[1]);
    }
}
