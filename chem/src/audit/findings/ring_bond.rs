//! A mark on a ring bond though a bond outside the ring, or a hydrogen yet to be drawn, could bear it.

use super::super::case::Case;
use super::super::clause;
use super::super::words::{mark, n};
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::geom;
use crate::molecule::AtomIx;
use crate::stereo::{Ligand, Unit};
use crate::wedge::{Pattern, Spoke};
use std::f64::consts::PI;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (_, unit, a, pattern) in case.defined_centers() {
        let in_ring = |s: &&Spoke| case.rings().has_bond(s.bond);
        let to_bridge = bridge(case, &pattern);
        for spoke in pattern
            .spokes
            .iter()
            .filter(|s| s.lift != 0)
            .filter(in_ring)
        {
            if to_bridge == Some(spoke.bond) {
                continue;
            }
            let Some(instead) = alternative(case, unit, a, &pattern) else {
                continue;
            };
            let text = format!(
                "the {} from atom {} to atom {} lies in a ring; {instead}",
                mark(case.drawing.mark(spoke.bond)),
                n(a),
                n(spoke.atom)
            );
            let bonds = [spoke.bond];
            out.push(finding(
                Kind::RingBond,
                Grade::PoorStyle,
                &[a],
                &bonds,
                text,
                clause::RING,
            ));
        }
    }
}

/// What could bear the mark instead, in words.
fn alternative(case: &Case<'_>, unit: &Unit, a: AtomIx, pattern: &Pattern) -> Option<String> {
    let outside = pattern
        .spokes
        .iter()
        .find(|s| !case.rings().has_bond(s.bond) && case.is_free(a, s.bond));
    match outside {
        Some(s) => Some(format!("its bond to atom {}, outside, is free", n(s.atom))),
        None if unit.ligands[3] == Ligand::Hydrogen => {
            Some(format!("a hydrogen drawn at atom {} would bear it", n(a)))
        }
        None => None,
    }
}

/// Of a bridgehead, the bond to the inner bridge: the ring bond between two others less than a straight
/// angle apart. Marks belong there.
fn bridge(case: &Case<'_>, pattern: &Pattern) -> Option<crate::molecule::BondIx> {
    let ring: Vec<&Spoke> = pattern
        .spokes
        .iter()
        .filter(|s| case.rings().has_bond(s.bond))
        .collect();
    let [_, _, _] = ring.as_slice() else {
        return None;
    };
    (0..3).find_map(|i| {
        let (before, after) = (ring[(i + 2) % 3].angle, ring[(i + 1) % 3].angle);
        (geom::turn(after, before) > PI).then(|| ring[i].bond)
    })
}
