//! Drawings that follow another convention than wedges: Fischer crosses, Haworth outlines, chairs and
//! boats, sawhorses. Their plain bonds mean something there that flat reading cannot see, so they are
//! recognised and never read as flat ones.
//!
//! Sources: IUPAC 2006, principal recommendations (styles of one class of compounds are to be avoided;
//! ST-1.9 for Haworth, the number as its readers quote it); WHO 1995 guide to graphic formulae, 8.1 and
//! 8.2, for what they mean. The shapes by which they are known here are our own.

use crate::drawing::{Drawing, Mark};
use crate::element::Element;
use crate::geom::{self, Point, Vec2};
use crate::molecule::{AtomIx, Order};
use crate::perceive::Rings;
use crate::stereo::{Focus, Unit, Units};
use std::f64::consts::{FRAC_PI_2, PI};

/// Two lines within 10 degrees of each other count as parallel.
const PARALLEL: f64 = 10.0 * PI / 180.0;
/// Roundness (4 pi area over square of circumference) below which a five- or six-membered ring is seen at
/// a slant; a regular pentagon has 0.86, a regular hexagon 0.91.
const SLANTED: f64 = 0.81;

/// A convention of perspective.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Projection {
    /// A cross: chain in one line, its ligands across.
    Fischer,
    /// A ring seen from its edge, its ligands straight up and down.
    Haworth,
    /// A six-membered ring in its chair or boat.
    Chair,
    /// Two neighbouring centres along their bond.
    Sawhorse,
}

impl Projection {
    /// What a chemist calls it.
    pub fn name(self) -> &'static str {
        match self {
            Projection::Fischer => "a Fischer projection",
            Projection::Haworth => "a Haworth projection",
            Projection::Chair => "a chair or boat",
            Projection::Sawhorse => "a sawhorse or Newman projection",
        }
    }
}

/// Centres that stand in such a drawing and whose wedges, if any, are no wedges of a flat one; by atom.
pub fn projections(drawing: &Drawing, units: &Units, rings: &Rings) -> Vec<(AtomIx, Projection)> {
    if drawing.depths().is_some() {
        return Vec::new();
    }
    let mut is_center = vec![false; drawing.molecule().n_atoms()];
    for (_, unit) in units.iter() {
        if let Focus::Center(a) = unit.focus {
            is_center[a.index()] = true;
        }
    }
    let mut found = Vec::new();
    for (_, unit) in units.iter() {
        if let Focus::Center(a) = unit.focus {
            if is_cross(drawing, rings, unit, a) {
                found.push((a, Projection::Fischer));
            } else if is_sawhorse(drawing, &is_center, a) {
                found.push((a, Projection::Sawhorse));
            }
        }
    }
    for cycle in rings.cycles() {
        let stands_alone = rings
            .cycles()
            .iter()
            .filter(|other| *other != cycle)
            .all(|other| other.iter().filter(|a| cycle.contains(a)).count() <= 2);
        if let (true, Some(projection)) = (stands_alone, ring(drawing, cycle)) {
            let centers = cycle.iter().filter(|a| is_center[a.index()]);
            found.extend(centers.map(|a| (*a, projection)));
        }
    }
    found.sort_unstable();
    found.dedup_by_key(|(a, _)| *a);
    found
}

/// Whether two wedges run towards two neighbouring atoms, as along the near edge of a Haworth ring: only
/// then is it worth looking for one.
pub(super) fn may_have_front_edge(drawing: &Drawing) -> bool {
    let molecule = drawing.molecule();
    let wide = |bond| match drawing.mark(bond) {
        Mark::Solid(end) => Some(molecule.bond(bond).ends[end.other().index()]),
        _ => None,
    };
    molecule.bonds().any(|edge| {
        let [b, c] = molecule.bond(edge).ends;
        let reached = |at: AtomIx| {
            molecule
                .neighbors(at)
                .iter()
                .any(|n| n.bond != edge && wide(n.bond) == Some(at))
        };
        reached(b) && reached(c)
    })
}

/// Whether no mark that is narrow at an atom leaves it.
fn is_unmarked(drawing: &Drawing, atom: AtomIx) -> bool {
    let neighbors = drawing.molecule().neighbors(atom);
    neighbors
        .iter()
        .all(|n| drawing.mark_from(atom, n.bond) == Mark::Plain)
}

fn tilt(v: Vec2, axis: Vec2) -> f64 {
    let angle = geom::between(v, axis);
    angle.min(PI - angle)
}

/// Four plain bonds as a cross, carbon in one line and at least one hydrogen or heteroatom across. The
/// cross may be turned: the convention wants it upright, but who draws it so means it so.
fn is_cross(drawing: &Drawing, rings: &Rings, unit: &Unit, center: AtomIx) -> bool {
    let molecule = drawing.molecule();
    if molecule.element(center) != Element::C
        || rings.has_atom(molecule, center)
        || !is_unmarked(drawing, center)
    {
        return false;
    }
    let mut arms: Vec<(AtomIx, Vec2)> = Vec::new();
    for ligand in &unit.ligands {
        let arm = |a: AtomIx| Some((a, drawing.direction(center, a)?));
        let Some(arm) = ligand.atom().and_then(arm) else {
            return false;
        };
        arms.push(arm);
    }
    let carbon = |(a, _): &(AtomIx, Vec2)| molecule.element(*a) == Element::C;
    let opposite = |p: &(AtomIx, Vec2), q: &(AtomIx, Vec2)| geom::between(p.1, q.1) > PI - PARALLEL;
    [
        (0, 1, 2, 3),
        (0, 2, 1, 3),
        (0, 3, 1, 2),
        (1, 2, 0, 3),
        (1, 3, 0, 2),
        (2, 3, 0, 1),
    ]
    .iter()
    .any(|(p, q, r, s)| {
        let [p, q, r, s] = [p, q, r, s].map(|i| &arms[*i]);
        opposite(p, q)
            && opposite(r, s)
            && tilt(p.1, r.1) > FRAC_PI_2 - PARALLEL
            && carbon(p)
            && carbon(q)
            && !(carbon(r) && carbon(s))
    })
}

/// Two neighbouring centres with four drawn bonds each, whose other ligands stand all round them in the
/// same or in opposite directions.
fn is_sawhorse(drawing: &Drawing, is_center: &[bool], center: AtomIx) -> bool {
    let molecule = drawing.molecule();
    let others = |at: AtomIx, partner: AtomIx| -> Option<Vec<f64>> {
        let mut angles = Vec::new();
        for n in molecule.neighbors(at).iter().filter(|n| n.atom != partner) {
            angles.push(geom::angle(drawing.direction(at, n.atom)?));
        }
        angles.sort_by(f64::total_cmp);
        let [a, b, c] = angles.as_slice() else {
            return None;
        };
        let even = [(a, b), (b, c), (c, a)]
            .iter()
            .all(|(p, q)| (geom::turn(**p, **q) - 2.0 * PI / 3.0).abs() < 2.0 * PARALLEL);
        even.then_some(angles)
    };
    let alike = |a: &[f64], b: &[f64], shift: f64| {
        a.iter().all(|p| {
            b.iter()
                .any(|q| geom::between(geom::unit(*p), geom::unit(q + shift)) < PARALLEL)
        })
    };
    is_unmarked(drawing, center)
        && molecule.neighbors(center).iter().any(|n| {
            let partner = n.atom;
            if !is_center[partner.index()] || !is_unmarked(drawing, partner) {
                return false;
            }
            match (others(center, partner), others(partner, center)) {
                (Some(a), Some(b)) => alike(&a, &b, 0.0) || alike(&a, &b, PI),
                _ => false,
            }
        })
}

/// Whether a ring of five or six stands in perspective, and in which.
fn ring(drawing: &Drawing, cycle: &[AtomIx]) -> Option<Projection> {
    let molecule = drawing.molecule();
    let n = cycle.len();
    if !(5..=6).contains(&n) {
        return None;
    }
    let flat = |a: &AtomIx| {
        molecule
            .neighbors(*a)
            .iter()
            .any(|n| n.order != Order::Single)
    };
    if cycle.iter().any(flat) {
        return None;
    }
    let corners: Vec<Point> = cycle.iter().map(|a| drawing.point(*a)).collect();
    let edges: Vec<Vec2> = (0..n).map(|i| corners[(i + 1) % n] - corners[i]).collect();
    let around: f64 = edges.iter().map(|e| e.hypot()).sum();
    let area = area(&corners).abs();
    if around <= 0.0 || 4.0 * PI * area / (around * around) > SLANTED {
        return None;
    }
    let mut arms: Vec<(AtomIx, Vec2)> = Vec::new();
    for atom in cycle {
        for n in molecule.neighbors(*atom) {
            if !cycle.contains(&n.atom) {
                // a wedge on a ligand says that the ring is meant flat
                if drawing.mark(n.bond) != Mark::Plain {
                    return None;
                }
                arms.push((*atom, drawing.direction(*atom, n.atom)?));
            }
        }
    }
    let ring_marks = |i: usize| {
        let bond = molecule.bond_between(cycle[i], cycle[(i + 1) % n]);
        bond.is_some_and(|b| drawing.mark(b) != Mark::Plain)
    };
    let marked = (0..n).any(ring_marks);
    if is_haworth(&corners, &arms) {
        return Some(Projection::Haworth);
    }
    (n == 6 && !arms.is_empty() && !marked && is_chair(&edges)).then_some(Projection::Chair)
}

fn area(corners: &[Point]) -> f64 {
    corners
        .iter()
        .zip(corners.iter().cycle().skip(1))
        .map(|(p, q)| (p.x * q.y - q.x * p.y) / 2.0)
        .sum()
}

/// At least two ligands, all straight up or down, and the ring less high than wide.
fn is_haworth(corners: &[Point], arms: &[(AtomIx, Vec2)]) -> bool {
    let Some((_, up)) = arms.first() else {
        return false;
    };
    let mut bearers: Vec<AtomIx> = arms.iter().map(|(a, _)| *a).collect();
    bearers.dedup();
    let extent = |axis: Vec2| {
        let along = corners.iter().map(|p| p.to_vec2().dot(axis));
        let (low, high) = along.fold((f64::MAX, f64::MIN), |(l, h), x| (l.min(x), h.max(x)));
        high - low
    };
    let across = Vec2::new(-up.y, up.x);
    bearers.len() >= 2
        && arms.iter().all(|(_, v)| tilt(*v, *up) < PARALLEL)
        && extent(*up) < 0.75 * extent(across)
}

/// Opposite edges of a six-membered ring parallel (a chair), or one corner on each side turned in (a boat).
fn is_chair(edges: &[Vec2]) -> bool {
    let parallel = (0..3).all(|i| tilt(edges[i], edges[i + 3]) < 1.5 * PARALLEL);
    let turns: Vec<f64> = (0..6).map(|i| edges[i].cross(edges[(i + 1) % 6])).collect();
    let left = turns.iter().filter(|t| **t > 0.0).count();
    let boat = left == 4 || left == 2;
    parallel || boat
}
