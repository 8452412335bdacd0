//! Rings: regular polygons fused to a bond, through an atom or held by it.

use super::GraftError;
use super::graft::Graft;
use super::grow::{atom_at, directions, grown};
use crate::drawing::{Drawing, Edit};
use crate::element::Element;
use crate::geom::{self, Point};
use crate::molecule::{Atom, AtomIx, BondIx, Order};
use std::f64::consts::{PI, TAU};

/// A ring under construction: its corners in order, each an atom that is there or a new one.
struct Corners {
    points: Vec<Point>,
    atoms: Vec<Option<AtomIx>>,
}

/// A ring on some atoms or bonds, or on its own.
pub(super) fn graft(
    drawing: &Drawing,
    on: (&[AtomIx], &[BondIx]),
    size: usize,
    alternating: bool,
) -> Result<Graft, GraftError> {
    let kind = if alternating {
        "ring with alternating double bonds"
    } else {
        "ring"
    };
    let mut start = None;
    let (corners, link, how) = match on {
        ([], [bond]) => {
            start = Some(*bond);
            (fused(drawing, *bond, size), None, "fused here")
        }
        ([atom], []) => at_atom(drawing, *atom, size, alternating)?,
        ([], []) if drawing.molecule().n_atoms() == 0 => {
            let corners = polygon(Point::ORIGIN, PI / 2.0, size, drawing.bond_length());
            (free(drawing, corners), None, "on its own")
        }
        _ => return Err(GraftError::RingPlace),
    };
    let (edits, then) = build(drawing, &corners, link, start, alternating);
    Ok(Graft {
        name: format!("Graft a {size}-ring"),
        edits,
        then,
        says: format!("{size}-membered {kind}, {how}"),
    })
}

/// Radius of a regular polygon with this side.
fn radius(size: usize, side: f64) -> f64 {
    side / (2.0 * (PI / size as f64).sin())
}

fn polygon(center: Point, first: f64, size: usize, side: f64) -> Vec<Point> {
    let r = radius(size, side);
    (0..size)
        .map(|i| center + r * geom::unit(first + TAU * i as f64 / size as f64))
        .collect()
}

/// Corners, each the atom that stands there already, if one does.
fn free(drawing: &Drawing, points: Vec<Point>) -> Corners {
    let atoms = points.iter().map(|p| atom_at(drawing, *p)).collect();
    Corners { points, atoms }
}

/// A ring over a bond, on the side with more room; the bond's atoms are the first two corners.
fn fused(drawing: &Drawing, bond: BondIx, size: usize) -> Corners {
    let ends = drawing.molecule().bond(bond).ends;
    let [p, q] = ends.map(|a| drawing.point(a));
    let middle = p.midpoint(q);
    let side = p.distance(q).max(1e-3 * drawing.bond_length());
    let height = radius(size, side) * (PI / size as f64).cos();
    let across = (q - p).turn_90() / side;
    let [left, right] = [height, -height].map(|h| middle + h * across);
    let reach = side * 1.2;
    let crowd = |c: Point| -> f64 {
        drawing
            .points()
            .iter()
            .map(|x| (radius(size, side) + reach - x.distance(c)).max(0.0))
            .sum()
    };
    let center = if crowd(left) <= crowd(right) {
        left
    } else {
        right
    };
    let (from, to) = (geom::angle(p - center), geom::angle(q - center));
    let turn = TAU / size as f64;
    let step = if geom::turn(from, to) <= PI {
        turn
    } else {
        -turn
    };
    let r = radius(size, side);
    let points = (0..size)
        .map(|i| match i {
            0 => p,
            1 => q,
            _ => center + r * geom::unit(from + step * i as f64),
        })
        .collect();
    let mut corners = free(drawing, points);
    corners.atoms[0] = Some(ends[0]);
    corners.atoms[1] = Some(ends[1]);
    corners
}

type Placed = (Corners, Option<AtomIx>, &'static str);

/// A ring at an atom: through it where it has two valences to spare (three with double bonds), else
/// held by a bond.
fn at_atom(
    drawing: &Drawing,
    atom: AtomIx,
    size: usize,
    alternating: bool,
) -> Result<Placed, GraftError> {
    let m = drawing.molecule();
    let (at, length) = (drawing.point(atom), drawing.bond_length());
    let hydrogens = m.hydrogens(atom);
    let needs = if alternating { 3 } else { 2 };
    let toward = match directions(drawing, atom).as_slice() {
        [] => PI / 2.0,
        some => geom::widest_gap(some).0,
    };
    if hydrogens >= needs {
        let center = at + radius(size, length) * geom::unit(toward);
        let mut corners = free(drawing, polygon(center, toward + PI, size, length));
        corners.points[0] = at;
        corners.atoms[0] = Some(atom);
        let how = if m.degree(atom) >= 2 {
            "spiro at this atom"
        } else {
            "through this atom"
        };
        return Ok((corners, None, how));
    }
    if hydrogens == 0 {
        return Err(GraftError::NoHydrogen(atom));
    }
    let first = grown(drawing, atom, Order::Single);
    let toward = geom::angle(first - at);
    let center = first + radius(size, length) * geom::unit(toward);
    let mut corners = free(drawing, polygon(center, toward + PI, size, length));
    corners.points[0] = first;
    corners.atoms[0] = None;
    Ok((corners, Some(atom), "attached to this atom"))
}

/// The edits of a ring. Double bonds alternate from the third side on, so that a fused side keeps its
/// order unless both its atoms can bear one more.
fn build(
    drawing: &Drawing,
    corners: &Corners,
    link: Option<AtomIx>,
    start: Option<BondIx>,
    alternating: bool,
) -> (Vec<Edit>, Option<AtomIx>) {
    let m = drawing.molecule();
    let size = corners.points.len();
    let mut edits = Vec::new();
    let mut next = m.n_atoms();
    let mut atoms = Vec::with_capacity(size);
    for (known, point) in corners.atoms.iter().zip(&corners.points) {
        atoms.push(known.unwrap_or_else(|| {
            edits.push(Edit::AddAtom(Atom::new(Element::C), *point));
            next += 1;
            AtomIx::new(next - 1)
        }));
    }
    if let (Some(link), Some(first)) = (link, atoms.first()) {
        edits.push(Edit::AddBond([link, *first], Order::Single));
    }
    for i in 0..size {
        let ends = [atoms[i], atoms[(i + 1) % size]];
        let double = alternating && i % 2 == 0 && i + 1 < size && (i > 0 || start.is_none());
        let order = if double { Order::Double } else { Order::Single };
        match bond_now(drawing, ends) {
            None if ends[0] != ends[1] => edits.push(Edit::AddBond(ends, order)),
            _ => {}
        }
    }
    if let Some(bond) = start.filter(|_| alternating) {
        let b = m.bond(bond);
        let spare = |a: &AtomIx| m.hydrogens(*a) >= 2;
        if b.order == Order::Single && b.ends.iter().all(spare) {
            edits.push(Edit::SetOrder(bond, Order::Double));
        }
    }
    let opposite = atoms.get(size / 2 + size % 2).copied();
    (edits, opposite.filter(|a| a.index() >= m.n_atoms()))
}

fn bond_now(drawing: &Drawing, ends: [AtomIx; 2]) -> Option<BondIx> {
    let m = drawing.molecule();
    let known = ends.iter().all(|a| a.index() < m.n_atoms());
    known.then(|| m.bond_between(ends[0], ends[1])).flatten()
}
