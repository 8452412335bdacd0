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
