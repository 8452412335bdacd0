//! Where a hydrogen is drawn: in the widest gap between the bonds of its centre (IUPAC 2006, ST-1.1.4),
//! outside of rings where there is room, and clear of other atoms and bonds.

use crate::drawing::Drawing;
use crate::geom::{self, Point};
use crate::molecule::AtomIx;
use crate::perceive::Rings;

/// Length of the bond to a drawn hydrogen, in bond lengths.
const LENGTH: f64 = 0.8;
/// Nearer than this (in bond lengths) another atom is in the way.
const CLEAR: f64 = 0.45;

/// Cost of drawing the hydrogen at its best place beyond that of a free one.
pub(super) fn crowding(drawing: &Drawing, rings: &Rings, center: AtomIx) -> i64 {
    best(drawing, rings, center, &[]).map_or(0, |(_, badness)| (badness * 100.0) as i64)
}

/// The best place for a hydrogen at `center`, clear also of hydrogens just placed.
pub(super) fn spot(drawing: &Drawing, rings: &Rings, center: AtomIx, placed: &[Point]) -> Point {
    best(drawing, rings, center, placed).map_or_else(|| drawing.point(center), |(spot, _)| spot)
}

fn best(
    drawing: &Drawing,
    rings: &Rings,
    center: AtomIx,
    placed: &[Point],
) -> Option<(Point, f64)> {
    let molecule = drawing.molecule();
    let at = drawing.point(center);
    let directions: Vec<_> = molecule
        .neighbors(center)
        .iter()
        .filter_map(|n| drawing.direction(center, n.atom))
        .collect();
    let gaps = geom::gaps(&directions);
    let mut best: Option<(Point, f64)> = None;
    for (middle, wide) in gaps {
        for length in [LENGTH, 0.65] {
            let spot = at + geom::unit(middle) * (length * drawing.bond_length());
            let mut badness = obstruction(drawing, center, spot, placed);
            // narrower gaps crowd the bonds; 120 degrees is as good as it gets with three
            badness += 60.0 * (120.0 - wide.to_degrees().min(120.0)) / 120.0;
            badness += 20.0 * (LENGTH - length);
            if inside_ring(drawing, rings, center, spot) {
                badness += 80.0;
            }
            if best.is_none_or(|(_, b)| badness < b - 1e-9) {
                best = Some((spot, badness));
            }
        }
    }
    best
}

/// How much is in the way of a bond from `center` to `spot`.
fn obstruction(drawing: &Drawing, center: AtomIx, spot: Point, placed: &[Point]) -> f64 {
    let molecule = drawing.molecule();
    let at = drawing.point(center);
    let near = CLEAR * drawing.bond_length();
    let atoms = molecule
        .atoms()
        .filter(|a| *a != center)
        .map(|a| drawing.point(a));
    let mut badness = 0.0;
    for p in atoms.chain(placed.iter().copied()) {
        let distance = p.distance(spot).min(geom::distance_to_segment(p, at, spot));
        if distance < near {
            badness += 100.0 * (1.0 - distance / near) + 20.0;
        }
    }
    for b in molecule.bonds() {
        let ends = molecule.bond(b).ends;
        if ends.contains(&center) {
            continue;
        }
        let [p, q] = ends.map(|e| drawing.point(e));
        if geom::cross(at, spot, p, q) {
            badness += 60.0;
        } else if geom::distance_to_segment(spot, p, q) < 0.25 * drawing.bond_length() {
            badness += 30.0;
        }
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
