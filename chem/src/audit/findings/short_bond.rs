//! A bond at a marked centre drawn so short that its end does not show where the ligand is.

use super::super::case::Case;
use super::super::clause;
use super::super::words::n;
use super::super::{Finding, Grade, Kind};
use super::finding;

/// Bonds shorter than this part of the usual length; hydrogens may be drawn closer.
const SHORT: f64 = 0.45;
const SHORT_TO_HYDROGEN: f64 = 0.3;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    let usual = case.drawing.bond_length();
    for (_, _, a, pattern) in case.defined_centers() {
        for spoke in &pattern.spokes {
            let length = case
                .drawing
                .point(a)
                .distance(case.drawing.point(spoke.atom))
                / usual;
            let least = if case.is_drawn_hydrogen(spoke.atom) {
                SHORT_TO_HYDROGEN
            } else {
                SHORT
            };
            if length >= least {
                continue;
            }
            let text = format!(
                "the bond from atom {} to atom {} is drawn at {:.0} % of the usual length: read by its end, it lies between the others",
                n(a),
                n(spoke.atom),
                100.0 * length
            );
            let bonds = [spoke.bond];
            out.push(finding(
                Kind::ShortBond,
                Grade::PoorStyle,
                &[a],
                &bonds,
                text,
                clause::LENGTH,
            ));
        }
    }
}
