//! Where a hydrogen is drawn: in the widest gap between the bonds of its centre (IUPAC 2006, ST-1.1.4),
//! outside of rings where there is room, and clear of other atoms, bonds and drawn hydrogens.

use crate::drawing::Drawing;
use crate::element::Element;
use crate::geom::{self, Point};
use crate::molecule::AtomIx;
use crate::perceive::Rings;

/// Lengths of the bond to a drawn hydrogen that are tried, in bond lengths, the best first.
const LENGTHS: [f64; 3] = [0.8, 0.7, 0.6];
/// Turns out of the middle of a gap that are tried, in degrees.
const TURNS: [f64; 9] = [0.0, 10.0, -10.0, 20.0, -20.0, 30.0, -30.0, 40.0, -40.0];
/// Nearer than this (in bond lengths) to a written atom, or to another hydrogen, the letters touch.
const LETTER: f64 = 0.62;
/// Nearer than this to a bare carbon the letter touches its bonds.
const VERTEX: f64 = 0.45;
/// Nearer than this to another bond the letter touches it.
const BOND: f64 = 0.36;
/// The bond to the hydrogen keeps this far (degrees) from its neighbours where it can.
const ROOM: f64 = 35.0;

/// Cost of drawing the hydrogen at its best place beyond that of a free one.
pub(super) fn crowding(drawing: &Drawing, rings: &Rings, center: AtomIx) -> i64 {
    best(drawing, rings, center, &[]).map_or(0, |(_, badness)| (badness * 100.0) as i64)
}

/// Places for the hydrogens of several centres, chosen together: each is set, then each is moved to where
/// it is best with the others in place, until none moves.
pub(super) fn spots(drawing: &Drawing, rings: &Rings, centers: &[AtomIx]) -> Vec<Point> {
    let mut spots: Vec<Point> = Vec::with_capacity(centers.len());
    for center in centers {
        spots.push(spot(drawing, rings, *center, &spots));
    }
    for _ in 0..3 {
        let before = spots.clone();
        for (i, center) in centers.iter().enumerate() {
            let mut others = spots.clone();
            others.swap_remove(i);
            spots[i] = spot(drawing, rings, *center, &others);
        }
        if spots == before {
            break;
        }
    }
    spots
}

/// The best place for a hydrogen at `center`, clear also of other hydrogens just placed.
fn spot(drawing: &Drawing, rings: &Rings, center: AtomIx, placed: &[Point]) -> Point {
    best(drawing, rings, center, placed).map_or_else(|| drawing.point(center), |(spot, _)| spot)
}

fn best(
    drawing: &Drawing,
    rings: &Rings,
    center: AtomIx,
    placed: &[Point],
) -> Option<(Point, f64)> {
    let at = drawing.point(center);
    let directions: Vec<_> = drawing
        .molecule()
        .neighbors(center)
        .iter()
        .filter_map(|n| drawing.direction(center, n.atom))
        .collect();
    let mut best: Option<(Point, f64)> = None;
    for (middle, wide) in geom::gaps(&directions) {
        for turn in TURNS {
            // room that is left on the nearer side of the gap
            let left = wide.to_degrees() / 2.0 - turn.abs();
            if left < 20.0 {
                continue;
            }
            for (i, length) in LENGTHS.into_iter().enumerate() {
                let direction = geom::unit(middle + turn.to_radians());
                let spot = at + direction * (length * drawing.bond_length());
                let mut badness = obstruction(drawing, center, spot, placed);
                // narrower gaps crowd the bonds; 120 degrees is as good as it gets with three
                badness += 60.0 * (120.0 - wide.to_degrees().min(120.0)) / 120.0;
                badness += 0.5 * turn.abs() + 4.0 * i as f64;
                badness += 1.5 * (ROOM - left).max(0.0);
                if inside_ring(drawing, rings, center, spot) {
                    badness += 80.0;
                }
                if best.is_none_or(|(_, b)| badness < b - 1e-9) {
                    best = Some((spot, badness));
                }
            }
        }
    }
    best
}

/// How much is in the way of a letter at `spot` and a bond from `center` to it.
fn obstruction(drawing: &Drawing, center: AtomIx, spot: Point, placed: &[Point]) -> f64 {
    let molecule = drawing.molecule();
    let at = drawing.point(center);
    let unit = drawing.bond_length();
    let too_near = |distance: f64, room: f64| {
        let room = room * unit;
        if distance < room {
            20.0 + 100.0 * (1.0 - distance / room)
        } else {
            0.0
        }
    };
    let mut badness = 0.0;
    for a in molecule.atoms().filter(|a| *a != center) {
        let p = drawing.point(a);
        let bare = molecule.element(a) == Element::C && molecule.degree(a) > 0;
        badness += too_near(p.distance(spot), if bare { VERTEX } else { LETTER });
        badness += too_near(geom::distance_to_segment(p, at, spot), 0.3);
    }
    for p in placed {
        badness += too_near(p.distance(spot), LETTER);
        badness += too_near(geom::distance_to_segment(*p, at, spot), 0.3);
    }
    for b in molecule.bonds() {
        let ends = molecule.bond(b).ends;
        let [p, q] = ends.map(|e| drawing.point(e));
        if ends.contains(&center) {
            continue;
        }
        if geom::cross(at, spot, p, q) {
            badness += 60.0;
        }
        badness += 0.6 * too_near(geom::distance_to_segment(spot, p, q), BOND);
    }
    badness
}

/// Whether a place lies inside a ring of at most eight atoms that holds the centre.
fn inside_ring(drawing: &Drawing, rings: &Rings, center: AtomIx, spot: Point) -> bool {
    rings
        .cycles()
        .iter()
        .filter(|cycle| cycle.len() <= 8 && cycle.contains(&center))
        .any(|cycle| {
            let polygon: Vec<Point> = cycle.iter().map(|a| drawing.point(*a)).collect();
            let mut inside = false;
            for (i, p) in polygon.iter().enumerate() {
                let q = polygon[(i + 1) % polygon.len()];
                if (p.y > spot.y) != (q.y > spot.y)
                    && spot.x < p.x + (spot.y - p.y) / (q.y - p.y) * (q.x - p.x)
                {
                    inside = !inside;
                }
            }
            inside
        })
}
