//! Changes of a drawing whose effect on its labels is known beforehand.

use chem::drawing::{Drawing, Mark};
use chem::geom::Point;
use chem::molecule::{AtomIx, Bond, Molecule};

/// Numbers that look random and are the same in every run.
#[derive(Clone, Debug)]
pub struct Dice(u64);

impl Dice {
    /// Dice for a seed.
    pub fn new(seed: u64) -> Dice {
        Dice(seed.wrapping_mul(0x9E37_79B9_7F4A_7C15) | 1)
    }

    /// The next number below `n`, which is greater than 0 (xorshift).
    pub fn below(&mut self, n: usize) -> usize {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        usize::try_from((self.0 >> 20) % n as u64).unwrap_or(0)
    }

    /// The next number from 0 up to 1.
    pub fn unit(&mut self) -> f64 {
        self.below(1 << 24) as f64 / f64::from(1 << 24)
    }

    /// The numbers `0 .. n` in another order.
    pub fn order(&mut self, n: usize) -> Vec<usize> {
        let mut order: Vec<usize> = (0..n).collect();
        for i in (1..n).rev() {
            order.swap(i, self.below(i + 1));
        }
        order
    }
}

/// The drawing with atoms and bonds in another order and some bonds written from their other end; also
/// the new number of each atom, both from 1.
pub fn reordered(drawing: &Drawing, dice: &mut Dice) -> (Drawing, Vec<usize>) {
    let m = drawing.molecule();
    let old_atoms = dice.order(m.n_atoms());
    let mut new_atom = vec![0; m.n_atoms()];
    for (new, old) in old_atoms.iter().enumerate() {
        new_atom[*old] = new;
    }
    let atoms = old_atoms
        .iter()
        .map(|old| m.atom(AtomIx::new(*old)).clone())
        .collect();
    let points = old_atoms.iter().map(|old| drawing.points()[*old]).collect();
    let mut bonds = Vec::with_capacity(m.n_bonds());
    let mut marks = Vec::with_capacity(m.n_bonds());
    let all: Vec<_> = m.bonds().collect();
    for old in dice.order(all.len()) {
        let bond = m.bond(all[old]);
        let mut ends = bond.ends.map(|a| AtomIx::new(new_atom[a.index()]));
        let mut mark = drawing.mark(all[old]);
        if dice.below(2) == 1 {
            ends.reverse();
            mark = mark.narrow().map_or(mark, |end| mark.at(end.other()));
        }
        bonds.push(Bond {
            ends,
            order: bond.order,
        });
        marks.push(mark);
    }
    let numbers = new_atom.iter().map(|n| n + 1).collect();
    (build(atoms_and(atoms, bonds), points, marks), numbers)
}

/// The drawing with every atom put where `place` says.
pub fn moved(drawing: &Drawing, place: impl Fn(Point) -> Point) -> Drawing {
    let points = drawing.points().iter().map(|p| place(*p)).collect();
    build(drawing.molecule().clone(), points, drawing.marks().to_vec())
}

/// The drawing with every mark put through `mark`.
pub fn remarked(drawing: &Drawing, mark: impl Fn(Mark) -> Mark) -> Drawing {
    let marks = drawing.marks().iter().map(|m| mark(*m)).collect();
    build(drawing.molecule().clone(), drawing.points().to_vec(), marks)
}

/// Mirror image in the y axis, marks kept.
pub fn mirrored(drawing: &Drawing) -> Drawing {
    moved(drawing, |p| Point::new(-p.x, p.y))
}

/// Solid wedges for hashed ones and the other way round.
pub fn swapped(drawing: &Drawing) -> Drawing {
    remarked(drawing, |mark| match mark {
        Mark::Solid(end) => Mark::Hashed(end),
        Mark::Hashed(end) => Mark::Solid(end),
        Mark::Plain | Mark::Wavy(_) | Mark::Crossed => mark,
    })
}

/// The drawing without any mark.
pub fn bare(drawing: &Drawing) -> Drawing {
    remarked(drawing, |_| Mark::Plain)
}

fn atoms_and(atoms: Vec<chem::molecule::Atom>, bonds: Vec<Bond>) -> Molecule {
    Molecule::new(atoms, bonds).expect("the same atoms and bonds in another order")
}

fn build(molecule: Molecule, points: Vec<Point>, marks: Vec<Mark>) -> Drawing {
    Drawing::new(molecule, points, marks).expect("the parts of a drawing")
}
