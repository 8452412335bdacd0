//! Another Kekulé form of a drawing: the same delocalised rings with single and double bonds elsewhere.
//!
//! Single and double bonds are exchanged round closed ways on which they alternate, that have 4n + 2
//! atoms (Hückel's rule: with 4n the two forms are two compounds) and that run through rings of seven
//! atoms at the most (larger ones have a geometry). Labels must not notice: IUPAC 2013 recommendations,
//! P-92.1.4.3.

use crate::change::Dice;
use chem::drawing::{Drawing, Mark};
use chem::molecule::{AtomIx, Bond, BondIx, Molecule, Neighbor, Order};
use chem::perceive::Rings;

/// Largest ring whose bonds may be exchanged.
const LARGEST_RING: usize = 7;
/// Longest closed way that is looked for; the perimeter of azulene has 10 atoms, of pyrene 14.
const LONGEST_WAY: usize = 18;
/// Steps after which the search for a way gives up.
const MOST_STEPS: usize = 5_000;
/// Ways exchanged, at the most.
const EXCHANGES: usize = 6;

/// A drawing with some of its delocalised bonds elsewhere, which differs from `drawing` in at least one
/// double bond; `None` if it has no such form that its marks can stay in.
pub fn other_form(drawing: &Drawing, dice: &mut Dice) -> Option<Drawing> {
    let rings = Rings::find(drawing.molecule());
    let mut form = drawing.clone();
    for _ in 0..=dice.below(EXCHANGES) {
        form = exchanged(&form, &rings, dice)?;
    }
    if double_bonds(&form) == double_bonds(drawing) {
        // ways exchanged twice; once more cannot lead to the same again
        form = exchanged(&form, &rings, dice)?;
    }
    Some(form)
}

/// Indices of the double bonds.
pub fn double_bonds(drawing: &Drawing) -> Vec<usize> {
    let m = drawing.molecule();
    m.bonds()
        .filter(|b| m.bond(*b).order == Order::Double)
        .map(BondIx::index)
        .collect()
}

/// One way exchanged, the first that allows it.
fn exchanged(drawing: &Drawing, rings: &Rings, dice: &mut Dice) -> Option<Drawing> {
    let m = drawing.molecule();
    for i in dice.order(m.n_bonds()) {
        let start = m.bond(BondIx::new(i));
        if start.order != Order::Double || !is_small(rings, BondIx::new(i)) {
            continue;
        }
        let mut search = Search {
            molecule: m,
            rings,
            atoms: start.ends.to_vec(),
            bonds: vec![BondIx::new(i)],
            steps: 0,
        };
        if search.closes(dice)
            && let Some(form) = exchange(drawing, rings, &search.bonds)
        {
            return Some(form);
        }
    }
    None
}

fn is_small(rings: &Rings, bond: BondIx) -> bool {
    rings
        .smallest_through(bond)
        .is_some_and(|n| n <= LARGEST_RING)
}

/// A way that begins with a double bond and on which single and double bonds alternate.
struct Search<'a> {
    molecule: &'a Molecule,
    rings: &'a Rings,
    atoms: Vec<AtomIx>,
    bonds: Vec<BondIx>,
    steps: usize,
}

impl Search<'_> {
    /// Whether the way can be closed by a single bond; it is then in `bonds`.
    fn closes(&mut self, dice: &mut Dice) -> bool {
        self.steps += 1;
        let at = self.atoms[self.atoms.len() - 1];
        let wanted = if self.bonds.len() % 2 == 1 {
            Order::Single
        } else {
            Order::Double
        };
        if self.steps > MOST_STEPS {
            return false;
        }
        let near: Vec<Neighbor> = self.molecule.neighbors(at).to_vec();
        for i in dice.order(near.len()) {
            let next = near[i];
            if next.order != wanted || !is_small(self.rings, next.bond) {
                continue;
            }
            self.bonds.push(next.bond);
            if next.atom == self.atoms[0] {
                if self.bonds.len() % 4 == 2 {
                    return true;
                }
            } else if !self.atoms.contains(&next.atom) && self.atoms.len() < LONGEST_WAY {
                self.atoms.push(next.atom);
                if self.closes(dice) {
                    return true;
                }
                self.atoms.pop();
            }
            self.bonds.pop();
        }
        false
    }
}

/// The drawing with the bonds of a way exchanged. A wedge that stands on a bond which becomes double goes
/// to the other bond of its narrow end on the way: at the end of an axis the two lie on opposite sides of
/// the paper. `None` if a mark has nowhere to go.
fn exchange(drawing: &Drawing, rings: &Rings, way: &[BondIx]) -> Option<Drawing> {
    let m = drawing.molecule();
    let mut bonds: Vec<Bond> = m.bonds().map(|b| *m.bond(b)).collect();
    let mut marks = drawing.marks().to_vec();
    for bond in way {
        let order = &mut bonds[bond.index()].order;
        *order = match order {
            Order::Single => Order::Double,
            _ => Order::Single,
        };
    }
    for bond in way {
        if m.bond(*bond).order != Order::Single {
            continue;
        }
        let opposite = match marks[bond.index()] {
            Mark::Plain => continue,
            Mark::Solid(end) => Mark::Hashed(end),
            Mark::Hashed(end) => Mark::Solid(end),
            Mark::Wavy(_) | Mark::Crossed => return None,
        };
        let narrow = opposite
            .narrow()
            .map(|end| m.bond(*bond).ends[end.index()])?;
        let other = way
            .iter()
            .find(|b| *b != bond && m.bond(**b).ends.contains(&narrow))?;
        if !ends_axis(m, rings, narrow, way) || marks[other.index()] != Mark::Plain {
            return None;
        }
        marks[bond.index()] = Mark::Plain;
        marks[other.index()] = opposite.at(drawing.end_at(*other, narrow));
    }
    let atoms = m.atoms().map(|a| m.atom(a).clone()).collect();
    let molecule = Molecule::new(atoms, bonds).expect("the same atoms and bonds");
    Some(Drawing::new(molecule, drawing.points().to_vec(), marks).expect("parts of a drawing"))
}

/// Whether an atom's bond off the way can be an axis: a third, single bond in no ring of six or fewer.
fn ends_axis(m: &Molecule, rings: &Rings, atom: AtomIx, way: &[BondIx]) -> bool {
    let mut off = m.neighbors(atom).iter().filter(|n| !way.contains(&n.bond));
    match (off.next(), off.next()) {
        (Some(axis), None) => {
            axis.order == Order::Single && rings.smallest_through(axis.bond).is_none_or(|n| n > 6)
        }
        _ => false,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use chem::element::Element;
    use chem::geom::Point;
    use chem::molecule::Atom;

    fn ring(n: usize) -> Drawing {
        let bond = |i| Bond {
            ends: [AtomIx::new(i), AtomIx::new((i + 1) % n)],
            order: [Order::Double, Order::Single][i % 2],
        };
        let atoms = vec![Atom::new(Element::C); n];
        let molecule = Molecule::new(atoms, (0..n).map(bond).collect()).expect("a ring");
        let points = (0..n)
            .map(|i| Point::new(i as f64, (i * i) as f64))
            .collect();
        Drawing::new(molecule, points, vec![Mark::Plain; n]).expect("a drawing")
    }

    // benzene has one other form; cyclobutadiene with its bonds elsewhere is another compound, and the
    // bonds of larger rings have a geometry (textbook knowledge)
    #[test]
    fn forms_of_rings() {
        for (n, other) in [(4, None), (6, Some(vec![1, 3, 5])), (8, None), (10, None)] {
            for seed in 1..20 {
                let form = other_form(&ring(n), &mut Dice::new(seed));
                assert_eq!(form.as_ref().map(double_bonds), other, "a ring of {n}");
            }
        }
    }
}
