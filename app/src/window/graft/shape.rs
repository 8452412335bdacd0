//! From a graft to edits: where the new atoms go.
//!
//! Plain geometry: regular polygons, 120-degree turns, the widest gap. A new atom that falls on one
//! that is there becomes that one, so that rings can be fused round a corner.

use super::words::Word;
use crate::session::Selection;
use chem::drawing::{Drawing, Edit};
use chem::element::Element;
use chem::geom::{self, Point, Vec2};
use chem::molecule::{Atom, AtomIx, BondIx, Order};
use std::f64::consts::{PI, TAU};

/// Edits of a graft and what is to be selected when they are made.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Graft {
    /// Name of the step.
    pub(crate) name: String,
    /// The edits.
    pub(crate) edits: Vec<Edit>,
    /// The atom to go on from.
    pub(crate) then: Option<AtomIx>,
    /// What it does, in a few words.
    pub(crate) says: String,
}

/// What a word does to the selection; with nothing drawn, what it starts with.
///
/// # Errors
/// Why it cannot be done here, and what can.
pub(crate) fn shape(drawing: &Drawing, selection: &Selection, word: Word) -> Result<Graft, String> {
    match word {
        Word::Element(element, charge) => set_element(drawing, selection, element, charge),
        Word::Charge(charge) => set_charge(drawing, selection, charge),
        Word::Bond(order) => bond(drawing, selection, order),
        Word::Ring { size, alternating } => ring(drawing, selection, size, alternating),
    }
}

fn set_element(
    drawing: &Drawing,
    selection: &Selection,
    element: Element,
    charge: Option<i8>,
) -> Result<Graft, String> {
    let mut atom = Atom::new(element);
    atom.charge = charge.unwrap_or(0);
    let symbol = element.symbol();
    if selection.is_empty() && drawing.molecule().n_atoms() == 0 {
        return Ok(Graft {
            name: format!("Start with {symbol}"),
            edits: vec![Edit::AddAtom(atom, Point::ORIGIN)],
            then: Some(AtomIx::new(0)),
            says: format!("one atom of {symbol}"),
        });
    }
    if selection.atoms.is_empty() {
        return Err("an element goes on an atom; select one".to_owned());
    }
    let edits = selection
        .atoms
        .iter()
        .map(|a| Edit::SetAtom(*a, atom.clone()))
        .collect();
    Ok(Graft {
        name: format!("Make it {symbol}"),
        edits,
        then: selection.only_atom(),
        says: match selection.atoms.len() {
            1 => format!("{symbol} at this atom"),
            n => format!("{symbol} at {n} atoms"),
        },
    })
}

fn set_charge(drawing: &Drawing, selection: &Selection, charge: i8) -> Result<Graft, String> {
    if selection.atoms.is_empty() {
        return Err("a charge goes on an atom; select one".to_owned());
    }
    let edits = selection
        .atoms
        .iter()
        .map(|a| {
            let mut atom = drawing.molecule().atom(*a).clone();
            atom.charge = charge;
            Edit::SetAtom(*a, atom)
        })
        .collect();
    let says = match charge {
        0 => "no charge".to_owned(),
        1 => "charge +".to_owned(),
        -1 => "charge \u{2212}".to_owned(),
        n if n > 0 => format!("charge {n}+"),
        n => format!("charge {}\u{2212}", -i32::from(n)),
    };
    Ok(Graft {
        name: "Set the charge".to_owned(),
        edits,
        then: selection.only_atom(),
        says,
    })
}

fn order_name(order: Order) -> &'static str {
    match order {
        Order::Single => "single bond",
        Order::Double => "double bond",
        Order::Triple => "triple bond",
        Order::Special(_) => "special bond",
    }
}

fn bond(drawing: &Drawing, selection: &Selection, order: Order) -> Result<Graft, String> {
    let word = order_name(order);
    if !selection.bonds.is_empty() {
        return Ok(Graft {
            name: format!("Make it a {word}"),
            edits: selection
                .bonds
                .iter()
                .map(|b| Edit::SetOrder(*b, order))
                .collect(),
            then: None,
            says: word.to_owned(),
        });
    }
    let m = drawing.molecule();
    let atoms: Vec<AtomIx> = selection.atoms.iter().copied().collect();
    match atoms.as_slice() {
        [a, b] => Ok(Graft {
            name: format!("Join by a {word}"),
            edits: match m.bond_between(*a, *b) {
                Some(bond) => vec![Edit::SetOrder(bond, order)],
                None => vec![Edit::AddBond([*a, *b], order)],
            },
            then: None,
            says: format!("{word} between the two"),
        }),
        [a] => {
            let next = AtomIx::new(m.n_atoms());
            Ok(Graft {
                name: format!("Grow a {word}"),
                edits: vec![
                    Edit::AddAtom(Atom::new(Element::C), grown(drawing, *a, order)),
                    Edit::AddBond([*a, next], order),
                ],
                then: Some(next),
                says: match order {
                    Order::Single => "grows a single bond; 1- is a charge".to_owned(),
                    _ => format!("grows a {word}"),
                },
            })
        }
        [] => Err("a bond needs an atom or a bond; select one".to_owned()),
        _ => Err("a bond grows from one atom or joins two".to_owned()),
    }
}

/// Where a new atom at `a` stands best.
fn grown(drawing: &Drawing, a: AtomIx, order: Order) -> Point {
    let m = drawing.molecule();
    let (at, length) = (drawing.point(a), drawing.bond_length());
    let near = m.neighbors(a);
    let directions = directions(drawing, a);
    let straight = order == Order::Triple
        || near.iter().any(|n| {
            n.order == Order::Triple || (n.order, order) == (Order::Double, Order::Double)
        });
    let angle = match directions.as_slice() {
        [] => PI / 6.0,
        [only] if straight => geom::angle(*only) + PI,
        [only] => {
            // of the two 120-degree turns the one farther from everything: chains go on in a zigzag
            let base = geom::angle(*only);
            let room = |angle: f64| room(drawing, at + length * geom::unit(angle));
            let (left, right) = (base + TAU / 3.0, base - TAU / 3.0);
            let (room_left, room_right) = (room(left), room(right));
            if (room_left - room_right).abs() > 1e-6 * length {
                if room_left > room_right { left } else { right }
            } else if geom::unit(left).x >= geom::unit(right).x {
                left
            } else {
                right
            }
        }
        _ => geom::widest_gap(&directions).0,
    };
    at + length * geom::unit(angle)
}

fn directions(drawing: &Drawing, a: AtomIx) -> Vec<Vec2> {
    drawing
        .molecule()
        .neighbors(a)
        .iter()
        .filter_map(|n| drawing.direction(a, n.atom))
        .collect()
}

/// Sum of what the atoms within three bonds leave free round a place: larger is emptier.
fn room(drawing: &Drawing, place: Point) -> f64 {
    let reach = 3.0 * drawing.bond_length();
    drawing
        .points()
        .iter()
        .map(|p| (p.distance(place) - reach).min(0.0))
        .sum()
}

/// A ring under construction: its corners in order, each an atom that is there or a new one.
struct Corners {
    points: Vec<Point>,
    atoms: Vec<Option<AtomIx>>,
}

fn ring(
    drawing: &Drawing,
    selection: &Selection,
    size: usize,
    alternating: bool,
) -> Result<Graft, String> {
    let kind = if alternating {
        "ring with alternating double bonds"
    } else {
        "ring"
    };
    let (corners, link, how) = if let Some(bond) = selection.only_bond() {
        (fused(drawing, bond, size), None, "fused here")
    } else if let Some(atom) = selection.only_atom() {
        at_atom(drawing, atom, size, alternating)?
    } else if selection.is_empty() && drawing.molecule().n_atoms() == 0 {
        let (center, first) = (Point::ORIGIN, PI / 2.0);
        let corners = polygon(center, first, size, drawing.bond_length());
        (free(drawing, corners), None, "on its own")
    } else {
        return Err("a ring goes on one atom or one bond".to_owned());
    };
    let start = selection.only_bond();
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
    let atoms = points
        .iter()
        .map(|p| super::super::pen::atom_at(drawing, *p))
        .collect();
    Corners { points, atoms }
}

/// A ring over a bond, on the side with more room; the bond's atoms are the first two corners.
fn fused(drawing: &Drawing, bond: BondIx, size: usize) -> Corners {
    let ends = drawing.molecule().bond(bond).ends;
    let [p, q] = ends.map(|a| drawing.point(a));
    let middle = p.midpoint(q);
    let side = p.distance(q).max(1e-3 * drawing.bond_length());
    let height = radius(size, side) * (PI / size as f64).cos();
    let across = Vec2::new(-(q - p).y, (q - p).x) / side;
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
) -> Result<Placed, String> {
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
        return Err(format!(
            "atom {} has no hydrogen to give up for a ring; select another or a bond",
            atom.index() + 1
        ));
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

#[cfg(test)]
mod tests {
    use super::super::words::read;
    use super::*;

    fn graft(drawing: &Drawing, selection: &Selection, text: &str) -> Result<Drawing, String> {
        let graft = shape(drawing, selection, read(text)?)?;
        Ok(drawing.apply(&graft.edits).unwrap().0)
    }

    fn on_atom(i: usize) -> Selection {
        Selection::atom(AtomIx::new(i))
    }

    fn formula(d: &Drawing) -> String {
        let parts = d.molecule().formula();
        parts.iter().map(|(s, n)| format!("{s}{n}")).collect()
    }

    fn start(text: &str) -> Drawing {
        graft(&Drawing::empty(), &Selection::default(), text).unwrap()
    }

    fn even(d: &Drawing) {
        let m = d.molecule();
        for b in m.bonds() {
            let [p, q] = m.bond(b).ends.map(|a| d.point(a));
            assert!((p.distance(q) - d.bond_length()).abs() < 1e-6);
        }
        for a in m.atoms() {
            for b in m.atoms().filter(|b| *b > a) {
                assert!(d.point(a).distance(d.point(b)) > 0.5 * d.bond_length());
            }
        }
    }

    #[test]
    fn rings_of_every_size_start_a_drawing() {
        for size in 3..=8 {
            let d = start(&size.to_string());
            assert_eq!(formula(&d), format!("C{size}H{}", 2 * size));
            even(&d);
        }
        assert_eq!(formula(&start("6=")), "C6H6");
        assert_eq!(formula(&start("5=")), "C5H6");
    }

    #[test]
    fn rings_fuse_to_a_bond() {
        for (first, second, result) in [
            ("6", "6", "C10H18"),
            ("6=", "6=", "C10H8"),
            ("6", "6=", "C10H12"),
            ("6=", "5", "C9H10"),
        ] {
            let d = start(first);
            for bond in d.molecule().bonds() {
                let both = graft(&d, &Selection::bond(bond), second).unwrap();
                assert_eq!(formula(&both), result, "{first} {second}");
                even(&both);
            }
        }
    }

    #[test]
    fn rings_take_the_atom_in_or_hang_on_it() {
        let ethane = graft(&start("C"), &on_atom(0), "-").unwrap();
        let ring = graft(&ethane, &on_atom(1), "6").unwrap();
        assert_eq!(formula(&ring), "C7H14");
        let spiro = graft(&ring, &on_atom(3), "5").unwrap();
        assert_eq!(formula(&spiro), "C11H20");
        let arene = graft(&ring, &on_atom(3), "6=").unwrap();
        assert_eq!(formula(&arene), "C13H18");
        for d in [&ring, &spiro, &arene] {
            even(d);
        }
        let full = graft(&spiro, &on_atom(3), "5").unwrap_err();
        assert!(full.contains("atom 4"), "{full}");
    }

    #[test]
    fn chains_grow_in_a_zigzag_by_typing_alone() {
        let mut d = start("C");
        for i in 0..5 {
            d = graft(&d, &on_atom(i), "-").unwrap();
        }
        assert_eq!(formula(&d), "C6H14");
        even(&d);
        let span = d.point(AtomIx::new(0)).distance(d.point(AtomIx::new(4)));
        assert!((span - 4.0 * (PI / 3.0).sin()).abs() < 1e-6);
        let alkyne = graft(&d, &on_atom(5), "#").unwrap();
        assert_eq!(formula(&alkyne), "C7H12");
    }

    #[test]
    fn elements_and_charges() {
        let d = graft(&start("6="), &on_atom(0), "N").unwrap();
        assert_eq!(formula(&d), "C5H5N1");
        let d = graft(&d, &on_atom(0), "+").unwrap();
        assert_eq!(d.molecule().charge(), 1);
        let bond = Selection::bond(BondIx::new(0));
        assert!(graft(&d, &bond, "N").unwrap_err().contains("atom"));
        assert!(graft(&d, &bond, "+").unwrap_err().contains("atom"));
        let single = graft(&start("6="), &bond, "-").unwrap();
        assert_eq!(formula(&single), "C6H8");
    }
}
