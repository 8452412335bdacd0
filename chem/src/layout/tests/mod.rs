//! What a layout promises, on skeletons and on molecules made by chance.

mod properties;
mod skeletons;
mod tidied;
mod wishes;

use super::{Layout, Wish, lay_out};
use crate::element::Element;
use crate::geom::{self, Point};
use crate::molecule::{Atom, AtomIx, Bond, Molecule, Order};
use crate::perceive::Rings;

/// Bonds under construction, all atoms carbon unless said otherwise.
#[derive(Clone, Debug, Default)]
struct Sketch {
    bonds: Vec<(usize, usize, Order)>,
    elements: Vec<(usize, Element)>,
    n_atoms: usize,
}

impl Sketch {
    /// A single atom.
    fn atom() -> Sketch {
        Sketch {
            n_atoms: 1,
            ..Sketch::default()
        }
    }

    /// From walks over bonds (`0-1=2 1-3`) and elements (`O3`).
    fn read(walks: &str, elements: &str) -> Sketch {
        let mut sketch = Sketch::default();
        for walk in walks.split(' ') {
            let mut last: Option<(usize, Order)> = None;
            let mut rest = walk;
            while !rest.is_empty() {
                let end = rest.find(['-', '=', '#']).unwrap_or(rest.len());
                let at: usize = rest[..end].parse().unwrap();
                let order = match rest[end..].chars().next() {
                    Some('=') => Order::Double,
                    Some('#') => Order::Triple,
                    _ => Order::Single,
                };
                if let Some((from, order)) = last {
                    sketch.join(from, at, order);
                }
                last = Some((at, order));
                rest = rest.get(end + 1..).unwrap_or("");
            }
        }
        for word in elements.split(' ').filter(|w| !w.is_empty()) {
            let digits = word.find(|c: char| c.is_ascii_digit()).unwrap();
            let element = Element::from_symbol(&word[..digits]).unwrap();
            sketch
                .elements
                .push((word[digits..].parse().unwrap(), element));
        }
        sketch
    }

    fn join(&mut self, a: usize, b: usize, order: Order) {
        self.n_atoms = self.n_atoms.max(a + 1).max(b + 1);
        self.bonds.push((a, b, order));
    }

    /// A new atom on another one, by a single bond.
    fn grow(&mut self, from: usize) -> usize {
        let new = self.n_atoms;
        self.join(from, new, Order::Single);
        new
    }

    /// A ring of new atoms through one that is there.
    fn ring(&mut self, from: usize, size: usize) -> Vec<usize> {
        let mut ring = vec![from];
        for i in 1..size {
            let new = self.grow(ring[i - 1]);
            ring.push(new);
        }
        self.join(ring[size - 1], from, Order::Single);
        ring
    }

    /// The molecule, atom `i` of the sketch being atom `order[i]`; bonds in reverse for any order but the
    /// plain one.
    fn build(&self, order: &[usize]) -> Molecule {
        let mut atoms = vec![Atom::new(Element::C); self.n_atoms];
        for (i, element) in &self.elements {
            atoms[order[*i]] = Atom::new(*element);
        }
        let bond = |(a, b, pairs): &(usize, usize, Order)| Bond {
            ends: [AtomIx::new(order[*a]), AtomIx::new(order[*b])],
            order: *pairs,
        };
        let mut bonds: Vec<Bond> = self.bonds.iter().map(bond).collect();
        if order.windows(2).any(|w| w[0] > w[1]) {
            bonds.reverse();
        }
        Molecule::new(atoms, bonds).unwrap()
    }

    fn molecule(&self) -> Molecule {
        let plain: Vec<usize> = (0..self.n_atoms).collect();
        self.build(&plain)
    }
}

fn lay(molecule: &Molecule, wishes: &[Wish]) -> Layout {
    lay_out(molecule, &Rings::find(molecule), wishes)
}

/// Shortest and longest bond.
fn bonds(molecule: &Molecule, points: &[Point]) -> (f64, f64) {
    molecule
        .bonds()
        .map(|b| molecule.bond(b).ends.map(|a| points[a.index()]))
        .map(|[p, q]| p.distance(q))
        .fold((f64::INFINITY, 0.0), |(low, high), d| {
            (f64::min(low, d), f64::max(high, d))
        })
}

/// Smallest distance between two atoms.
fn nearest(points: &[Point]) -> f64 {
    let mut order: Vec<&Point> = points.iter().collect();
    order.sort_by(|a, b| a.x.total_cmp(&b.x));
    let mut least = f64::INFINITY;
    for (i, p) in order.iter().enumerate() {
        for q in &order[i + 1..] {
            if q.x - p.x > least {
                break;
            }
            least = least.min(p.distance(**q));
        }
    }
    least
}

fn crossings(molecule: &Molecule, points: &[Point]) -> usize {
    let all: Vec<_> = molecule.bonds().map(|b| molecule.bond(b).ends).collect();
    let at = |a: AtomIx| points[a.index()];
    let mut count = 0;
    for (i, [a, b]) in all.iter().enumerate() {
        for [c, d] in &all[i + 1..] {
            let apart = a != c && a != d && b != c && b != d;
            if apart && geom::cross(at(*a), at(*b), at(*c), at(*d)) {
                count += 1;
            }
        }
    }
    count
}
