//! A molecule on paper: a place for each atom and a mark for each bond.
//!
//! Coordinates: x right, y up, in the units of the file. A drawing may also have depth (a z for each
//! atom, towards the reader), when the file holds a model in space rather than a flat drawing.

mod edit;

pub use edit::{Edit, EditError, Renumbering};

use crate::geom::{self, Point, Vec2};
use crate::molecule::{AtomIx, BondIx, Molecule, Order};
use std::fmt;

/// One end of a bond: the first or second of [`crate::molecule::Bond::ends`].
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum End {
    /// `ends[0]`.
    First,
    /// `ends[1]`.
    Second,
}

impl End {
    /// Index into [`crate::molecule::Bond::ends`].
    pub fn index(self) -> usize {
        match self {
            End::First => 0,
            End::Second => 1,
        }
    }

    /// The other end.
    pub fn other(self) -> End {
        match self {
            End::First => End::Second,
            End::Second => End::First,
        }
    }
}

/// What is drawn on a bond beside its plain line. The end named is the narrow one.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Default)]
pub enum Mark {
    /// Nothing.
    #[default]
    Plain,
    /// A solid wedge: widens towards the reader.
    Solid(End),
    /// A hashed wedge: widens away from the reader.
    Hashed(End),
    /// A wavy line: either way, unknown or mixed, at the narrow end.
    Wavy(End),
    /// A crossed double bond: either geometry, unknown or mixed.
    Crossed,
}

impl Mark {
    /// The narrow end, where there is one.
    pub fn narrow(self) -> Option<End> {
        match self {
            Mark::Solid(end) | Mark::Hashed(end) | Mark::Wavy(end) => Some(end),
            Mark::Plain | Mark::Crossed => None,
        }
    }

    /// The same kind of mark with its narrow end at `end`; plain and crossed marks stay.
    pub fn at(self, end: End) -> Mark {
        match self {
            Mark::Solid(_) => Mark::Solid(end),
            Mark::Hashed(_) => Mark::Hashed(end),
            Mark::Wavy(_) => Mark::Wavy(end),
            Mark::Plain | Mark::Crossed => self,
        }
    }
}

/// Why parts do not make a drawing.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum DrawingError {
    /// The number of places, depths or marks is not that of atoms or bonds.
    Count,
    /// The coordinates of an atom are no numbers.
    NotFinite(AtomIx),
    /// A crossed mark on a bond that is not double.
    Crossed(BondIx),
}

impl fmt::Display for DrawingError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            DrawingError::Count => write!(
                f,
                "the number of positions or marks is not that of atoms or bonds"
            ),
            DrawingError::NotFinite(a) => {
                write!(f, "the position of atom {} is no number", a.index() + 1)
            }
            DrawingError::Crossed(b) => {
                write!(f, "bond {} is crossed but is no double bond", b.index() + 1)
            }
        }
    }
}

impl std::error::Error for DrawingError {}

/// A molecule with one place per atom and one mark per bond.
///
/// Guarantees: counts fit, coordinates are finite, a crossed mark stands on a double bond only, and
/// the narrow end of a mark is an end of its own bond. Two atoms on one spot are allowed: that is a
/// matter for the reader of the drawing.
#[derive(Clone, Debug)]
pub struct Drawing {
    molecule: Molecule,
    points: Vec<Point>,
    marks: Vec<Mark>,
    depths: Option<Vec<f64>>,
    bond_length: f64,
}

impl Drawing {
    /// A flat drawing.
    ///
    /// # Errors
    /// If counts do not fit, a coordinate is not finite, or a crossed mark is not on a double bond.
    pub fn new(
        molecule: Molecule,
        points: Vec<Point>,
        marks: Vec<Mark>,
    ) -> Result<Drawing, DrawingError> {
        if points.len() != molecule.n_atoms() || marks.len() != molecule.n_bonds() {
            return Err(DrawingError::Count);
        }
        if let Some(i) = points.iter().position(|p| !p.is_finite()) {
            return Err(DrawingError::NotFinite(AtomIx::new(i)));
        }
        for b in molecule.bonds() {
            if marks[b.index()] == Mark::Crossed && molecule.bond(b).order != Order::Double {
                return Err(DrawingError::Crossed(b));
            }
        }
        let bond_length = median_bond(&molecule, &points);
        Ok(Drawing {
            molecule,
            points,
            marks,
            depths: None,
            bond_length,
        })
    }

    /// The same drawing with a depth for each atom (z, towards the reader); all zero means flat.
    ///
    /// # Errors
    /// If the count does not fit or a depth is not finite.
    pub fn with_depths(mut self, depths: Vec<f64>) -> Result<Drawing, DrawingError> {
        if depths.len() != self.points.len() {
            return Err(DrawingError::Count);
        }
        if let Some(i) = depths.iter().position(|z| !z.is_finite()) {
            return Err(DrawingError::NotFinite(AtomIx::new(i)));
        }
        self.depths = depths.iter().any(|z| *z != 0.0).then_some(depths);
        Ok(self)
    }

    /// An empty sheet.
    pub fn empty() -> Drawing {
        Drawing {
            molecule: Molecule::default(),
            points: Vec::new(),
            marks: Vec::new(),
            depths: None,
            bond_length: 1.0,
        }
    }

    /// The molecule that is drawn.
    pub fn molecule(&self) -> &Molecule {
        &self.molecule
    }

    /// Place of an atom.
    pub fn point(&self, atom: AtomIx) -> Point {
        self.points[atom.index()]
    }

    /// Places of all atoms.
    pub fn points(&self) -> &[Point] {
        &self.points
    }

    /// Depths of all atoms (z, towards the reader), for a model in space; `None` for a flat drawing.
    pub fn depths(&self) -> Option<&[f64]> {
        self.depths.as_deref()
    }

    /// Mark of a bond.
    pub fn mark(&self, bond: BondIx) -> Mark {
        self.marks[bond.index()]
    }

    /// Marks of all bonds.
    pub fn marks(&self) -> &[Mark] {
        &self.marks
    }

    /// The mark that counts at `atom` on `bond`: one whose narrow end is there.
    pub fn mark_from(&self, atom: AtomIx, bond: BondIx) -> Mark {
        let mark = self.marks[bond.index()];
        match mark.narrow() {
            Some(end) if self.molecule.bond(bond).ends[end.index()] == atom => mark,
            _ => Mark::Plain,
        }
    }

    /// Which end of `bond` is `atom`; the second if it is neither.
    pub fn end_at(&self, bond: BondIx, atom: AtomIx) -> End {
        if self.molecule.bond(bond).ends[0] == atom {
            End::First
        } else {
            End::Second
        }
    }

    /// Median length of the bonds between atoms at different places; 1 where there is none. Greater than 0.
    pub fn bond_length(&self) -> f64 {
        self.bond_length
    }

    /// Direction of the bond from `from` to `to`, length 1; `None` if they stand within 5 % of the
    /// median bond length of each other, so that no direction can be seen.
    pub fn direction(&self, from: AtomIx, to: AtomIx) -> Option<Vec2> {
        geom::direction(self.point(from), self.point(to), 0.05 * self.bond_length)
    }

    /// Smallest box that holds all atoms; a point at the origin for an empty sheet.
    pub fn bounds(&self) -> kurbo::Rect {
        let mut points = self.points.iter();
        let Some(first) = points.next() else {
            return kurbo::Rect::ZERO;
        };
        points.fold(kurbo::Rect::from_points(*first, *first), |r, p| {
            r.union_pt(*p)
        })
    }
}

fn median_bond(molecule: &Molecule, points: &[Point]) -> f64 {
    let lengths = molecule
        .bonds()
        .map(|b| {
            let [a, c] = molecule.bond(b).ends.map(|e| points[e.index()]);
            a.distance(c)
        })
        .filter(|length| *length > 1e-6)
        .collect();
    geom::median(lengths).unwrap_or(1.0)
}

#[cfg(test)]
pub(crate) mod tests {
    use super::*;
    use crate::molecule::tests::build;

    /// A drawing from symbols with places and `(first, second, pairs, mark)`; marks are narrow at the
    /// first atom; for tests.
    pub(crate) fn draw(atoms: &[(&str, f64, f64)], bonds: &[(usize, usize, u8, char)]) -> Drawing {
        let symbols: Vec<_> = atoms.iter().map(|a| a.0).collect();
        let plain: Vec<_> = bonds.iter().map(|b| (b.0, b.1, b.2)).collect();
        let marks = bonds
            .iter()
            .map(|b| match b.3 {
                'w' => Mark::Solid(End::First),
                'h' => Mark::Hashed(End::First),
                '~' => Mark::Wavy(End::First),
                'x' => Mark::Crossed,
                _ => Mark::Plain,
            })
            .collect();
        let points = atoms.iter().map(|a| Point::new(a.1, a.2)).collect();
        Drawing::new(build(&symbols, &plain), points, marks).unwrap()
    }

    #[test]
    fn a_mark_counts_at_its_narrow_end_only() {
        let d = draw(&[("C", 0.0, 0.0), ("O", 1.5, 0.0)], &[(0, 1, 1, 'w')]);
        let (a, b, bond) = (AtomIx::new(0), AtomIx::new(1), BondIx::new(0));
        assert_eq!(d.mark_from(a, bond), Mark::Solid(End::First));
        assert_eq!(d.mark_from(b, bond), Mark::Plain);
        assert!((d.bond_length() - 1.5).abs() < 1e-12);
    }

    #[test]
    fn crossed_single_bonds_and_missing_places_are_refused() {
        let m = build(&["C", "C"], &[(0, 1, 1)]);
        let points = vec![Point::ORIGIN, Point::new(1.0, 0.0)];
        assert_eq!(
            Drawing::new(m.clone(), points, vec![Mark::Crossed]).err(),
            Some(DrawingError::Crossed(BondIx::new(0)))
        );
        assert_eq!(
            Drawing::new(m.clone(), vec![Point::ORIGIN], vec![Mark::Plain]).err(),
            Some(DrawingError::Count)
        );
        let bad = vec![Point::ORIGIN, Point::new(f64::NAN, 0.0)];
        assert_eq!(
            Drawing::new(m, bad, vec![Mark::Plain]).err(),
            Some(DrawingError::NotFinite(AtomIx::new(1)))
        );
    }
}
