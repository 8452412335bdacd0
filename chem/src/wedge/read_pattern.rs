//! The bonds drawn at a centre as one pattern: their order round it, their marks, their gaps.

use super::read::Doubt;
use crate::drawing::{Drawing, Mark};
use crate::geom;
use crate::molecule::{AtomIx, BondIx};
use smallvec::SmallVec;
use std::f64::consts::PI;

/// Half width of the window about a straight angle in which two bonds count as in line: 0.10 rad, as in
/// the InChI library.
pub const IN_LINE: f64 = 0.10;
/// Two bonds closer than this (5 degrees) have one direction.
const SAME_DIRECTION: f64 = 5.0 * PI / 180.0;

/// A drawn bond as seen from the centre.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spoke {
    /// The atom at its other end.
    pub atom: AtomIx,
    /// The bond.
    pub bond: BondIx,
    /// Its direction in radians, anticlockwise from the x axis.
    pub angle: f64,
    /// +1 towards the reader, -1 away, 0 in the paper: only a single bond that is narrow here is lifted.
    pub lift: i8,
}

/// How the bonds stand round the centre.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Shape {
    /// Three bonds, no gap wider than a straight angle.
    Spread,
    /// Three bonds in a half plane: the bond opposite the open side, and the two others.
    HalfPlane {
        /// Opposite the open side.
        middle: usize,
        /// The others.
        outer: [usize; 2],
    },
    /// Two of three bonds in line.
    Tee {
        /// The bond that stands on the line.
        stem: usize,
        /// The two in line.
        bars: [usize; 2],
    },
    /// Four bonds.
    Four,
    /// Another number of bonds.
    Other,
}

/// The drawn bonds of a centre, anticlockwise.
#[derive(Clone, Debug, PartialEq)]
pub struct Pattern {
    /// The bonds in their order round the centre.
    pub spokes: SmallVec<[Spoke; 4]>,
    /// How they stand.
    pub shape: Shape,
    /// Angle from each bond to the next, in radians.
    pub gaps: SmallVec<[f64; 4]>,
}

impl Pattern {
    /// The pattern at an atom.
    ///
    /// # Errors
    /// If a neighbour lies on the atom or two lie in one direction.
    pub fn of(drawing: &Drawing, center: AtomIx) -> Result<Pattern, Doubt> {
        let mut spokes: SmallVec<[Spoke; 4]> = SmallVec::new();
        let neighbors = drawing.molecule().neighbors(center).iter();
        for n in neighbors.filter(|n| !n.order.is_hydrogen_bond()) {
            let direction = drawing.direction(center, n.atom).ok_or(Doubt::Overlap)?;
            let lift = match drawing.mark_from(center, n.bond) {
                Mark::Solid(_) if n.order.bears_wedge() => 1,
                Mark::Hashed(_) if n.order.bears_wedge() => -1,
                _ => 0,
            };
            spokes.push(Spoke {
                atom: n.atom,
                bond: n.bond,
                angle: geom::angle(direction),
                lift,
            });
        }
        let pattern = Pattern::from_spokes(spokes);
        if pattern.spokes.len() > 1 && pattern.gaps.iter().any(|gap| *gap < SAME_DIRECTION) {
            return Err(Doubt::Overlap);
        }
        Ok(pattern)
    }

    pub(super) fn from_spokes(mut spokes: SmallVec<[Spoke; 4]>) -> Pattern {
        spokes.sort_by(|a, b| a.angle.total_cmp(&b.angle));
        let n = spokes.len();
        let gaps: SmallVec<[f64; 4]> = (0..n)
            .map(|i| geom::turn(spokes[i].angle, spokes[(i + 1) % n].angle))
            .collect();
        let shape = match n {
            4 => Shape::Four,
            3 => three(&gaps),
            _ => Shape::Other,
        };
        Pattern {
            spokes,
            shape,
            gaps,
        }
    }

    /// The widest gap, in radians.
    pub fn widest(&self) -> f64 {
        widest(&self.gaps).1
    }

    /// Number of bonds lifted out of the paper.
    pub fn n_marks(&self) -> usize {
        self.spokes.iter().filter(|s| s.lift != 0).count()
    }

    /// Places of the lifted bonds in `spokes`.
    pub fn marked(&self) -> SmallVec<[usize; 4]> {
        (0..self.spokes.len())
            .filter(|i| self.spokes[*i].lift != 0)
            .collect()
    }

    /// The place of the lifted bond, if there is just one.
    pub fn only_mark(&self) -> Option<usize> {
        match self.marked().as_slice() {
            [only] => Some(*only),
            _ => None,
        }
    }

    /// Angle at the centre from bond `i` to the next but one, on the side away from the bond between.
    pub fn far_side(&self, i: usize) -> f64 {
        let n = self.spokes.len();
        let before = self.spokes[(i + n - 1) % n].angle;
        let after = self.spokes[(i + 1) % n].angle;
        geom::turn(after, before)
    }
}

fn widest(gaps: &[f64]) -> (usize, f64) {
    gaps.iter().copied().enumerate().fold(
        (0, 0.0),
        |best, (i, gap)| {
            if gap > best.1 { (i, gap) } else { best }
        },
    )
}

/// The widest gap opens after bond `at`, so the bond that faces it is the one after the next.
fn three(gaps: &[f64]) -> Shape {
    let (at, gap) = widest(gaps);
    let (facing, others) = ((at + 2) % 3, [at, (at + 1) % 3]);
    if (gap - PI).abs() < IN_LINE {
        Shape::Tee {
            stem: facing,
            bars: others,
        }
    } else if gap > PI {
        Shape::HalfPlane {
            middle: facing,
            outer: others,
        }
    } else {
        Shape::Spread
    }
}
