//! Coordinates for a molecule that has none.

use super::assemble::{Shapes, assemble};
use super::frame::together;
use super::graph::{self, Graph};
use super::tree::Tree;
use super::{orient, overlap, parts, settle};
use crate::geom::Point;
use crate::molecule::{AtomIx, Molecule};
use crate::perceive::Rings;

/// A geometry wished for a double bond, or for a chain of an odd number of cumulated ones.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Wish {
    /// The two ends of the double bond or chain.
    pub ends: [AtomIx; 2],
    /// A neighbour of each end, beside the bond itself.
    pub ligands: [AtomIx; 2],
    /// Whether the two lie on the same side.
    pub together: bool,
}

/// Places of the atoms of a molecule.
#[derive(Clone, Debug, Default)]
pub struct Layout {
    /// A place for each atom; bonds are about 1 long, the middle of the drawing is at the origin.
    pub points: Vec<Point>,
    /// Which of the wishes (by place in the list) the drawing does not meet: a trans bond in a small ring,
    /// wishes that contradict each other, or an atom that is no neighbour.
    pub unmet: Vec<usize>,
}

/// Lays out a molecule: regular rings, zigzag chains, disconnected parts side by side.
///
/// The result depends on the molecule and the wishes alone, but for atoms that look alike not on the
/// order of atoms. Work is bounded: about quadratic in the atoms of a part at the worst.
pub fn lay_out(molecule: &Molecule, rings: &Rings, wishes: &[Wish]) -> Layout {
    let mut layout = Layout {
        points: vec![Point::ORIGIN; molecule.n_atoms()],
        unmet: Vec::new(),
    };
    let mut pieces = Vec::new();
    for atoms in graph::parts(molecule) {
        let graph = Graph::new(molecule, rings, &atoms, wishes);
        let points = part(&graph);
        pieces.push(parts::Piece {
            atoms: graph.atoms.clone(),
            points,
        });
    }
    parts::side_by_side(&mut pieces);
    for piece in &pieces {
        for (a, p) in piece.atoms.iter().zip(&piece.points) {
            layout.points[a.index()] = *p;
        }
    }
    layout.unmet = unmet(molecule, wishes, &layout.points);
    layout
}

/// Places of the atoms of one part.
pub(super) fn part(graph: &Graph) -> Vec<Point> {
    let tree = Tree::new(graph);
    let shapes = Shapes::new(graph);
    let mut points = assemble(graph, &tree, &shapes);
    overlap::relieve(graph, &tree, &shapes, &mut points);
    settle::settle(graph, &shapes, &mut points);
    orient::turn(graph, &shapes, &mut points);
    points
}

/// Wishes that a drawing does not meet.
pub(super) fn unmet(molecule: &Molecule, wishes: &[Wish], points: &[Point]) -> Vec<usize> {
    let at = |a: AtomIx| points.get(a.index()).copied();
    let is_met = |w: &Wish| {
        let neighbours = (0..2).all(|k| molecule.bond_between(w.ends[k], w.ligands[k]).is_some());
        let (Some(p), Some(q)) = (at(w.ends[0]), at(w.ends[1])) else {
            return false;
        };
        let (Some(a), Some(b)) = (at(w.ligands[0]), at(w.ligands[1])) else {
            return false;
        };
        neighbours && together([p, q], [a, b]) == Some(w.together)
    };
    (0..wishes.len()).filter(|i| !is_met(&wishes[*i])).collect()
}
