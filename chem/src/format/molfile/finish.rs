//! From the tables of a molfile to a drawing: bond orders, marks, and what is odd about the places.

use super::super::{Notice, ReadError, Reason};
use super::need;
use crate::drawing::{Drawing, End, Mark};
use crate::geom::Point;
use crate::molecule::{Atom, AtomIx, Bond, BondIx, Molecule, Order};

/// What a molfile states of a bond's stereo, in words common to both versions of the format.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Stereo {
    Plain,
    Up,
    Down,
    /// Wavy at a single bond, crossed at a double one.
    Either,
}

/// A row of the bond table.
#[derive(Clone, Copy, Debug)]
pub(super) struct BondRow {
    pub(super) ends: [usize; 2],
    /// The format's code; 4 is aromatic.
    pub(super) kind: u8,
    pub(super) stereo: Stereo,
    /// Line of the file.
    pub(super) line: usize,
}

/// The tables of a molfile.
#[derive(Debug, Default)]
pub(super) struct Tables {
    pub(super) atoms: Vec<Atom>,
    pub(super) points: Vec<Point>,
    pub(super) depths: Vec<f64>,
    pub(super) bonds: Vec<BondRow>,
    /// Lines of the file at which the atoms stand.
    pub(super) atom_lines: AtomLines,
}

/// Lines of the file at which atoms stand.
#[derive(Clone, Debug)]
pub(super) enum AtomLines {
    /// One after the other from this line on.
    From(usize),
    /// Each at its own.
    Each(Vec<usize>),
}

impl Default for AtomLines {
    fn default() -> AtomLines {
        AtomLines::From(0)
    }
}

impl AtomLines {
    /// The line of atom `index`, which counts from 0.
    fn of(&self, index: usize) -> usize {
        match self {
            AtomLines::From(first) => first + index,
            AtomLines::Each(lines) => lines.get(index).copied().unwrap_or(0),
        }
    }
}

impl Tables {
    /// The drawing, or why these tables make none.
    pub(super) fn finish(mut self, notices: &mut Vec<Notice>) -> Result<Drawing, ReadError> {
        let has_depth = self.depths.iter().any(|z| *z != 0.0);
        let lines = std::mem::take(&mut self.atom_lines);
        let atom_line = lines.of(0);
        let mut bonds = self.localized(&lines, notices)?;
        let mut marks = Vec::with_capacity(bonds.len());
        for (row, bond) in self.bonds.iter().zip(&mut bonds) {
            marks.push(mark(row, bond.order, notices));
        }
        let rows = std::mem::take(&mut self.bonds);
        let molecule = Molecule::new(self.atoms, bonds)
            .map_err(|e| ReadError::line(atom_line, Reason::NoDrawing(e.to_string())))?;
        let mut drawing = Drawing::new(molecule, self.points, marks)
            .map_err(|e| ReadError::line(atom_line, Reason::NoDrawing(e.to_string())))?;
        if has_depth {
            drawing = drawing
                .with_depths(self.depths)
                .map_err(|e| ReadError::line(atom_line, Reason::NoDrawing(e.to_string())))?;
            notices.push(Notice::new(
                atom_line,
                "in-space",
                "the atoms have depth (z): a model in space, not a flat drawing".to_owned(),
            ));
        }
        places(&drawing, &lines, &rows, notices);
        valences(&drawing, &lines, notices);
        placeholders(&drawing, &lines, notices);
        special_bonds(&drawing, &rows, notices);
        Ok(drawing)
    }

    /// Bonds with localized orders: aromatic ones turned into alternating ones.
    fn localized(
        &self,
        lines: &AtomLines,
        notices: &mut Vec<Notice>,
    ) -> Result<Vec<Bond>, ReadError> {
        let order = |kind: u8| match kind {
            1 | 4 => Order::Single,
            2 => Order::Double,
            3 => Order::Triple,
            other => Order::Special(other),
        };
        let mut bonds: Vec<Bond> = self
            .bonds
            .iter()
            .map(|row| Bond {
                ends: row.ends.map(AtomIx::new),
                order: order(row.kind),
            })
            .collect();
        let aromatic: Vec<usize> = (0..bonds.len())
            .filter(|i| self.bonds[*i].kind == 4)
            .collect();
        if let Some(line) = aromatic.first().map(|i| self.bonds[*i].line) {
            need::localize(&self.atoms, &mut bonds, &aromatic)
                .map_err(|(atom, reason)| ReadError::line(lines.of(atom), reason))?;
            notices.push(Notice::new(
                line,
                "aromatic-bonds",
                "aromatic bonds were turned into alternating single and double bonds".to_owned(),
            ));
        }
        Ok(bonds)
    }
}

/// The mark of a bond. The first atom of the row is the narrow end (CTfile Formats, bond block).
fn mark(row: &BondRow, order: Order, notices: &mut Vec<Notice>) -> Mark {
    match (row.stereo, order) {
        (Stereo::Plain, _) => Mark::Plain,
        (Stereo::Up, Order::Single | Order::Special(_)) => Mark::Solid(End::First),
        (Stereo::Down, Order::Single | Order::Special(_)) => Mark::Hashed(End::First),
        (Stereo::Either, Order::Single | Order::Special(_)) => Mark::Wavy(End::First),
        (Stereo::Either, Order::Double) => Mark::Crossed,
        (Stereo::Up | Stereo::Down, Order::Double) | (_, Order::Triple) => {
            notices.push(Notice::new(
                row.line,
                "mark-on-multiple-bond",
                format!(
                    "a wedge or wavy line on the multiple bond of atoms {} and {} says nothing and was left out",
                    row.ends[0] + 1,
                    row.ends[1] + 1
                ),
            )
            .about(&row.ends.map(AtomIx::new)));
            Mark::Plain
        }
    }
}

fn places(drawing: &Drawing, lines: &AtomLines, rows: &[BondRow], notices: &mut Vec<Notice>) {
    let (points, has_depth) = (drawing.points(), drawing.depths().is_some());
    if points.len() > 1 && points.iter().all(|p| *p == Point::ORIGIN) {
        if !has_depth {
            notices.push(Notice::new(
                lines.of(0),
                "no-coordinates",
                "all atoms stand at 0, 0: nothing is drawn, and no wedge can be read".to_owned(),
            ));
        }
        return;
    }
    if has_depth {
        return;
    }
    let slack = 0.01 * drawing.bond_length();
    let mut by_x: Vec<u32> = (0..points.len() as u32).collect();
    by_x.sort_unstable_by(|a, b| points[*a as usize].x.total_cmp(&points[*b as usize].x));
    for (i, a) in by_x.iter().enumerate() {
        let p = points[*a as usize];
        let close = by_x[i + 1..]
            .iter()
            .take_while(|b| points[**b as usize].x - p.x <= slack)
            .find(|b| points[**b as usize].distance(p) <= slack);
        if let Some(b) = close {
            let (first, second) = (a.min(b), a.max(b));
            notices.push(Notice::new(
                lines.of(*second as usize),
                "same-place",
                format!("atoms {} and {} stand on one spot", first + 1, second + 1),
            ));
        }
    }
    uneven(drawing, rows, notices);
}

/// Bonds far from the usual length: 0.4 to 2.5 times the median passes.
fn uneven(drawing: &Drawing, rows: &[BondRow], notices: &mut Vec<Notice>) {
    let (m, usual) = (drawing.molecule(), drawing.bond_length());
    let length = |b: BondIx| {
        let [a, c] = m.bond(b).ends;
        drawing.point(a).distance(drawing.point(c)) / usual
    };
    if let Some(b) = m.bonds().find(|b| !(0.4..=2.5).contains(&length(*b))) {
        let [a, c] = m.bond(b).ends;
        notices.push(Notice::new(
            rows.get(b.index()).map_or(0, |row| row.line),
            "uneven-lengths",
            format!(
                "bond lengths are uneven: that of atoms {} and {} is {:.2} times the usual one",
                a.index() + 1,
                c.index() + 1,
                length(b)
            ),
        ));
    }
}

fn valences(drawing: &Drawing, lines: &AtomLines, notices: &mut Vec<Notice>) {
    let m = drawing.molecule();
    for a in m.atoms().filter(|a| !m.valence_is_usual(*a)) {
        notices.push(Notice::new(
            lines.of(a.index()),
            "valence",
            format!(
                "atom {} ({}) has an unusual valence: {}",
                a.index() + 1,
                m.element(a).symbol(),
                m.bond_pairs(a).saturating_add(m.hydrogens(a))
            ),
        ));
    }
}

fn placeholders(drawing: &Drawing, lines: &AtomLines, notices: &mut Vec<Notice>) {
    let m = drawing.molecule();
    for a in m.atoms() {
        let atom = m.atom(a);
        let Some(alias) = &atom.alias else { continue };
        let (n, symbol) = (a.index() + 1, atom.element.symbol());
        if atom.element.number() == 0 {
            notices.push(Notice::new(
                lines.of(a.index()),
                "placeholder",
                format!("atom {n} ({alias}) stands for something not stated; what depends on it cannot be decided"),
            ));
        } else if **alias != *symbol {
            notices.push(Notice::new(
                lines.of(a.index()),
                "alias",
                format!("atom {n} is shown as '{alias}' but counts as {symbol}"),
            ));
        }
    }
}

fn special_bonds(drawing: &Drawing, rows: &[BondRow], notices: &mut Vec<Notice>) {
    let m = drawing.molecule();
    for (b, row) in m.bonds().zip(rows) {
        let Order::Special(kind) = m.bond(b).order else {
            continue;
        };
        let (code, text) = match kind {
            5..=8 => ("query-bond", "a query bond: not a definite structure"),
            9 => ("dative-bond", "a dative bond"),
            10 => ("hydrogen-bond", "a hydrogen bond"),
            _ => ("unstated-bond", "a bond whose order is not stated"),
        };
        notices.push(Notice::new(
            row.line,
            code,
            format!(
                "atoms {} and {} are joined by {text}",
                row.ends[0] + 1,
                row.ends[1] + 1
            ),
        ));
    }
}
