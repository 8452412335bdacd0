//! A drawn hydrogen inside a ring, or on another bond.

use super::super::case::Case;
use super::super::clause;
use super::super::words::n;
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::geom::{self, Point};
use crate::molecule::AtomIx;

/// Nearer than this part of a bond length to another bond, the letter lies on it.
const ON_BOND: f64 = 0.2;
/// Nearer than this to an atom the letters touch.
const NEAR_ATOM: f64 = 0.4;
/// Length of the bond to a hydrogen, in bond lengths.
const LENGTH: f64 = 0.75;
/// Rings up to this size have no room for a letter.
const SMALL_RING: usize = 7;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (_, _, a, pattern) in case.defined_centers() {
        for spoke in pattern
            .spokes
            .iter()
            .filter(|s| case.is_drawn_hydrogen(s.atom))
        {
            let Some(what) = crowd(case, a, case.drawing.point(spoke.atom)) else {
                continue;
            };
            // where rings meet all round a centre its hydrogen stands in one of them
            if free_spots(case, a, spoke.atom).is_empty() {
                continue;
            }
            let text = format!(
                "the hydrogen, atom {}, at atom {} is drawn {what}",
                n(spoke.atom),
                n(a)
            );
            let bonds = [spoke.bond];
            out.push(finding(
                Kind::CrowdedHydrogen,
                Grade::PoorStyle,
                &[a],
                &bonds,
                text,
                clause::HYDROGEN,
            ));
        }
    }
}

/// Places for a drawn hydrogen in the gaps between the other bonds of its centre, the widest gap first,
/// clear of rings, bonds and atoms.
pub(in super::super) fn free_spots(
    case: &Case<'_>,
    center: AtomIx,
    hydrogen: AtomIx,
) -> Vec<Point> {
    let drawing = case.drawing;
    let directions: Vec<_> = case
        .molecule()
        .neighbors(center)
        .iter()
        .filter(|m| m.atom != hydrogen)
        .filter_map(|m| drawing.direction(center, m.atom))
        .collect();
    let mut gaps = geom::gaps(&directions);
    gaps.sort_by(|a, b| b.1.total_cmp(&a.1));
    let near = NEAR_ATOM * drawing.bond_length();
    let is_taken = |spot: Point| {
        let others = case.molecule().atoms();
        others
            .filter(|a| *a != center && *a != hydrogen)
            .any(|a| drawing.point(a).distance(spot) < near)
    };
    let mut spots = Vec::new();
    for (middle, wide) in gaps {
        // as far from the middle as leaves 30 degrees on the nearer side
        let turn = (wide / 2.0 - 0.52).clamp(0.0, 0.35);
        for shift in [0.0, turn, -turn] {
            let length = LENGTH * drawing.bond_length();
            let spot = drawing.point(center) + geom::unit(middle + shift) * length;
            if !is_crowded(case, center, spot) && !is_taken(spot) {
                spots.push(spot);
            }
        }
    }
    spots
}

/// Whether a hydrogen of `center` at `spot` would stand in the way of something.
pub(in super::super) fn is_crowded(case: &Case<'_>, center: AtomIx, spot: Point) -> bool {
    crowd(case, center, spot).is_some()
}

/// What a hydrogen of `center` at `spot` stands in the way of.
fn crowd(case: &Case<'_>, center: AtomIx, spot: Point) -> Option<String> {
    let drawing = case.drawing;
    let molecule = case.molecule();
    let inside = case.rings().cycles().iter().any(|cycle| {
        cycle.len() <= SMALL_RING && cycle.contains(&center) && is_inside(case, cycle, spot)
    });
    if inside {
        return Some("inside a ring".to_owned());
    }
    let near = ON_BOND * drawing.bond_length();
    let at = drawing.point(center);
    molecule.bonds().find_map(|b| {
        let ends = molecule.bond(b).ends;
        if ends.contains(&center) {
            return None;
        }
        let [p, q] = ends.map(|e| drawing.point(e));
        // the hydrogen's own bond is no other one
        let own = p.distance(spot) < 1e-9 || q.distance(spot) < 1e-9;
        let on = geom::distance_to_segment(spot, p, q) < near || geom::cross(at, spot, p, q);
        (on && !own).then(|| {
            format!(
                "on the bond between atoms {} and {}",
                n(ends[0]),
                n(ends[1])
            )
        })
    })
}

fn is_inside(case: &Case<'_>, cycle: &[AtomIx], spot: Point) -> bool {
    let corner = |i: usize| case.drawing.point(cycle[i % cycle.len()]);
    let mut inside = false;
    for i in 0..cycle.len() {
        let (p, q) = (corner(i), corner(i + 1));
        if (p.y > spot.y) != (q.y > spot.y)
            && spot.x < p.x + (spot.y - p.y) / (q.y - p.y) * (q.x - p.x)
        {
            inside = !inside;
        }
    }
    inside
}
