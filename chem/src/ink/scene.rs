//! The drawing on the page: atoms in points, labels in place, and where lines must stop for them.

use super::Style;
use super::face::Setter;
use super::letters::{self, Label};
use super::spelling;
use crate::drawing::Drawing;
use crate::geom;
use crate::molecule::{AtomIx, BondIx, Molecule};
use crate::perceive::Rings;
use kurbo::{Point, Vec2};

/// Coordinates on the page stay within this, so that everything after is finite. Points.
const FARTHEST: f64 = 40_000.0;

/// Closer than this, in points, two atoms have no direction between them.
const TOUCHING: f64 = 1e-3;

/// A drawing whose atoms and labels are placed on the page.
pub(super) struct Scene<'a> {
    pub(super) drawing: &'a Drawing,
    pub(super) style: &'a Style,
    pub(super) points_per_unit: f64,
    pub(super) rings: Rings,
    points: Vec<Point>,
    labels: Vec<Option<Label>>,
}

/// The axis of a bond on the page.
#[derive(Clone, Copy, Debug)]
pub(super) struct Axis {
    pub(super) ends: [AtomIx; 2],
    pub(super) from: Point,
    pub(super) to: Point,
    /// Direction, length 1.
    pub(super) u: Vec2,
    /// Normal, length 1: `u` turned by a quarter clockwise as seen on the page.
    pub(super) n: Vec2,
    pub(super) length: f64,
}

impl Axis {
    pub(super) fn reversed(self) -> Axis {
        Axis {
            ends: [self.ends[1], self.ends[0]],
            from: self.to,
            to: self.from,
            u: -self.u,
            n: -self.n,
            length: self.length,
        }
    }

    /// The point `along` the axis from its start and `aside` of it.
    pub(super) fn at(&self, along: f64, aside: f64) -> Point {
        self.from + self.u * along + self.n * aside
    }
}

impl<'a> Scene<'a> {
    pub(super) fn new(
        drawing: &'a Drawing,
        style: &'a Style,
        points_per_unit: Option<f64>,
        setter: &mut Setter,
    ) -> Scene<'a> {
        let usable = |k: f64| k.is_finite() && k > 0.0;
        let points_per_unit = points_per_unit
            .filter(|k| usable(*k))
            .or(Some(style.bond_length / drawing.bond_length()).filter(|k| usable(*k)))
            .unwrap_or(1.0);
        let place = |v: f64| (v * points_per_unit).clamp(-FARTHEST, FARTHEST);
        let points = drawing
            .points()
            .iter()
            .map(|p| Point::new(place(p.x), place(-p.y)))
            .collect();
        let mut scene = Scene {
            drawing,
            style,
            points_per_unit,
            rings: Rings::find(drawing.molecule()),
            points,
            labels: Vec::new(),
        };
        scene.labels = drawing
            .molecule()
            .atoms()
            .map(|a| scene.make_label(a, setter))
            .collect();
        scene
    }

    pub(super) fn molecule(&self) -> &'a Molecule {
        self.drawing.molecule()
    }

    pub(super) fn point(&self, atom: AtomIx) -> Point {
        self.points[atom.index()]
    }

    pub(super) fn label(&self, atom: AtomIx) -> Option<&Label> {
        self.labels[atom.index()].as_ref()
    }

    /// Direction from one atom to another on the page; `None` if they touch.
    pub(super) fn direction(&self, from: AtomIx, to: AtomIx) -> Option<Vec2> {
        geom::direction(self.point(from), self.point(to), TOUCHING)
    }

    /// Directions of the bonds of an atom, but for those to `except`.
    pub(super) fn directions(&self, atom: AtomIx, except: Option<AtomIx>) -> Vec<Vec2> {
        self.molecule()
            .neighbors(atom)
            .iter()
            .filter(|n| Some(n.atom) != except)
            .filter_map(|n| self.direction(atom, n.atom))
            .collect()
    }

    /// The axis of a bond; `None` if its atoms touch.
    pub(super) fn axis(&self, bond: BondIx) -> Option<Axis> {
        let ends = self.molecule().bond(bond).ends;
        let u = self.direction(ends[0], ends[1])?;
        let [from, to] = ends.map(|e| self.point(e));
        Some(Axis {
            ends,
            from,
            to,
            u,
            n: u.turn_90(),
            length: from.distance(to),
        })
    }

    /// How much to cut from both ends of lines beside an axis so that they stop clear of the labels;
    /// `None` if nothing would be left. Where the labels leave little room, so does the margin.
    ///
    /// `shifts` are the distances of the lines from the axis, `half` half their width.
    pub(super) fn trims(&self, axis: &Axis, shifts: &[f64], half: f64) -> Option<[f64; 2]> {
        let cut = |axis: &Axis, margin: f64| {
            let Some(label) = self.label(axis.ends[0]) else {
                return 0.0;
            };
            shifts
                .iter()
                .map(|s| label.exit(axis.at(0.0, *s), axis.u, margin + half))
                .fold(0.0, f64::max)
        };
        let back = axis.reversed();
        for share in [1.0, 0.6, 0.3, 0.0] {
            let margin = self.style.label_margin * share;
            let trims = [cut(axis, margin), cut(&back, margin)];
            let rest = axis.length - trims[0] - trims[1];
            if rest >= 0.16 * axis.length || (share <= 0.0 && rest > 0.0) {
                return Some(trims);
            }
        }
        None
    }

    fn make_label(&self, atom: AtomIx, setter: &mut Setter) -> Option<Label> {
        let spelling = spelling::spell(self.molecule(), atom, self.is_straight(atom))?;
        let bonds = self.directions(atom, None);
        let at = self.point(atom);
        let near = 2.2 * self.style.font_size;
        let others: Vec<Vec2> = self
            .molecule()
            .atoms()
            .filter(|a| *a != atom)
            .map(|a| self.point(a) - at)
            .filter(|v| v.x.abs() < near && v.y.abs() < near)
            .collect();
        Some(letters::place(
            setter, self.style, &spelling, at, &bonds, &others,
        ))
    }

    /// Whether an atom would not show as a vertex: two like bonds without marks in a straight line.
    fn is_straight(&self, atom: AtomIx) -> bool {
        let plain = |n: &crate::molecule::Neighbor| {
            self.drawing.mark(n.bond) == crate::drawing::Mark::Plain
        };
        if !spelling::could_vanish(self.molecule(), atom)
            || !self.molecule().neighbors(atom).iter().all(plain)
        {
            return false;
        }
        match self.directions(atom, None).as_slice() {
            // within 4 degrees
            [a, b] => geom::between(*a, -*b) < 0.07,
            _ => false,
        }
    }
}
