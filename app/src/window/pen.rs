//! The pen: from a press and a place to the edits that will come of it.
//!
//! Pure geometry in the drawing's own coordinates (y up). What a gesture will do is asked for again
//! at every move and shown as a ghost; the same edits are then made.

use chem::drawing::{Drawing, Edit};
use chem::element::Element;
use chem::geom::{self, Point};
use chem::layout::atom_at;
use chem::molecule::{Atom, AtomIx, Order};

/// Angles snap to this, in degrees.
const SNAP: f64 = 15.0;

/// Where a stroke of the pen starts.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Start {
    /// On paper.
    Paper(Point),
    /// On an atom.
    Atom(AtomIx),
}

/// A stroke and what it will make.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Stroke {
    /// Name of the step.
    pub(super) name: &'static str,
    /// The edits; empty if there is nothing to do.
    pub(super) edits: Vec<Edit>,
    /// Its two ends, for the ghost.
    pub(super) ends: [Point; 2],
    /// The order that the bond will have.
    pub(super) order: Order,
}

/// The stroke from `start` to where the pointer is now. `onto` is the atom under the pointer; `free`
/// lets go of angle and length.
pub(super) fn stroke(
    drawing: &Drawing,
    start: Start,
    pointer: Point,
    onto: Option<AtomIx>,
    free: bool,
) -> Stroke {
    let carbon = || Atom::new(Element::C);
    let n = drawing.molecule().n_atoms();
    let next = AtomIx::new(n);
    match (start, onto) {
        (Start::Atom(from), Some(to)) if from == to => nothing(drawing.point(from), pointer),
        (Start::Atom(from), Some(to)) => join(drawing, from, to),
        (Start::Atom(from), None) => {
            let base = drawing.point(from);
            let end = snapped(drawing, base, Some(from), pointer, free);
            // a snapped end may meet an atom that the pointer itself has missed
            match atom_at(drawing, end).filter(|to| *to != from && !free) {
                Some(to) => join(drawing, from, to),
                None => Stroke {
                    name: "Draw a bond",
                    edits: vec![
                        Edit::AddAtom(carbon(), end),
                        Edit::AddBond([from, next], Order::Single),
                    ],
                    ends: [base, end],
                    order: Order::Single,
                },
            }
        }
        (Start::Paper(at), Some(to)) => {
            let target = drawing.point(to);
            let from = snapped(drawing, target, Some(to), at, free);
            Stroke {
                name: "Draw a bond",
                edits: vec![
                    Edit::AddAtom(carbon(), from),
                    Edit::AddBond([next, to], Order::Single),
                ],
                ends: [from, target],
                order: Order::Single,
            }
        }
        (Start::Paper(at), None) => {
            let end = snapped(drawing, at, None, pointer, free);
            Stroke {
                name: "Draw a bond",
                edits: vec![
                    Edit::AddAtom(carbon(), at),
                    Edit::AddAtom(carbon(), end),
                    Edit::AddBond([next, AtomIx::new(n + 1)], Order::Single),
                ],
                ends: [at, end],
                order: Order::Single,
            }
        }
    }
}

fn nothing(from: Point, to: Point) -> Stroke {
    Stroke {
        name: "Draw a bond",
        edits: Vec::new(),
        ends: [from, to],
        order: Order::Single,
    }
}

/// A bond between two atoms; drawn over a bond that is there, its next order.
fn join(drawing: &Drawing, from: AtomIx, to: AtomIx) -> Stroke {
    let ends = [drawing.point(from), drawing.point(to)];
    let m = drawing.molecule();
    match m.bond_between(from, to) {
        Some(bond) => {
            let order = match m.bond(bond).order {
                Order::Single => Order::Double,
                Order::Double => Order::Triple,
                Order::Triple | Order::Special(_) => Order::Single,
            };
            Stroke {
                name: "Change the bond's order",
                edits: vec![Edit::SetOrder(bond, order)],
                ends,
                order,
            }
        }
        None => Stroke {
            name: "Join two atoms",
            edits: vec![Edit::AddBond([from, to], Order::Single)],
            ends,
            order: Order::Single,
        },
    }
}

/// The end of a bond from `base` towards `pointer`: 15-degree steps, counted from a bond that is there
/// already if it lies off them, and the drawing's bond length.
fn snapped(
    drawing: &Drawing,
    base: Point,
    from: Option<AtomIx>,
    pointer: Point,
    free: bool,
) -> Point {
    let v = pointer - base;
    if free || v.hypot() < 1e-9 {
        return pointer;
    }
    let step = SNAP.to_radians();
    let offset = from
        .and_then(|a| {
            let first = drawing.molecule().neighbors(a).first()?;
            drawing.direction(a, first.atom)
        })
        .map_or(0.0, |d| geom::angle(d) % step);
    let angle = ((geom::angle(v) - offset) / step).round() * step + offset;
    base + drawing.bond_length() * geom::unit(angle)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn bond() -> Drawing {
        let s = stroke(
            &Drawing::empty(),
            Start::Paper(Point::ORIGIN),
            Point::new(1.3, 0.1),
            None,
            false,
        );
        Drawing::empty().apply(&s.edits).unwrap().0
    }

    #[test]
    fn angles_and_lengths_snap_unless_freed() {
        let d = bond();
        assert!(d.point(AtomIx::new(1)).distance(Point::new(1.0, 0.0)) < 1e-9);
        let free = stroke(
            &d,
            Start::Atom(AtomIx::new(1)),
            Point::new(1.7, 0.33),
            None,
            true,
        );
        assert_eq!(free.ends[1], Point::new(1.7, 0.33));
        let snap = stroke(
            &d,
            Start::Atom(AtomIx::new(1)),
            Point::new(1.7, 1.3),
            None,
            false,
        );
        let degrees = geom::angle(snap.ends[1] - snap.ends[0]).to_degrees();
        assert!((degrees - 60.0).abs() < 1e-9, "{degrees}");
    }

    #[test]
    fn six_strokes_close_a_ring() {
        let mut d = bond();
        for i in 1..5_usize {
            let at = d.point(AtomIx::new(i));
            let to = at + geom::unit((60.0 * i as f64).to_radians()) * 0.9;
            let s = stroke(&d, Start::Atom(AtomIx::new(i)), to, None, false);
            d = d.apply(&s.edits).unwrap().0;
        }
        let last = AtomIx::new(5);
        let s = stroke(
            &d,
            Start::Atom(last),
            d.point(last) + geom::unit(-1.1),
            None,
            false,
        );
        assert_eq!(s.name, "Join two atoms");
        d = d.apply(&s.edits).unwrap().0;
        assert_eq!((d.molecule().n_atoms(), d.molecule().n_bonds()), (6, 6));
    }

    #[test]
    fn a_bond_drawn_again_is_double() {
        let d = bond();
        let s = stroke(
            &d,
            Start::Atom(AtomIx::new(0)),
            Point::new(1.0, 0.0),
            Some(AtomIx::new(1)),
            false,
        );
        assert_eq!(s.order, Order::Double);
        let none = stroke(
            &d,
            Start::Atom(AtomIx::new(0)),
            Point::ORIGIN,
            Some(AtomIx::new(0)),
            false,
        );
        assert!(none.edits.is_empty());
    }
}
