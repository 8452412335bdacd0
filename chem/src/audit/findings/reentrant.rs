//! Three bonds in a half plane with the middle one marked: many readers take the mark at face value,
//! programs take it the other way, because the missing ligand lies on the open side.
//!
//! The bond to the bridge of a bridged ring is drawn so on purpose and is let be.

use super::super::case::Case;
use super::super::clause;
use super::super::words::n;
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::molecule::AtomIx;
use crate::wedge::{Doubt, Shape};

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (_, _, a, pattern) in case.defined_centers() {
        let Shape::HalfPlane { middle, outer } = pattern.shape else {
            continue;
        };
        let to_bridge = pattern.spokes.iter().all(|s| case.rings().has_bond(s.bond));
        if pattern.spokes[middle].lift == 0 || (to_bridge && pattern.n_marks() == 1) {
            continue;
        }
        let others = outer.map(|i| n(pattern.spokes[i].atom));
        let text = format!(
            "the mark from atom {} to atom {} stands between its bonds to atoms {} and {}, less than a straight angle apart: some read it as it looks, others the other way round",
            n(a),
            n(pattern.spokes[middle].atom),
            others[0],
            others[1]
        );
        let bonds = [pattern.spokes[middle].bond];
        out.push(finding(
            Kind::Reentrant,
            Grade::Unclear,
            &[a],
            &bonds,
            text,
            clause::SQUEEZED,
        ));
    }
    all_alike(case, out);
}

fn all_alike(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (ix, u) in case.doubtful(|d| d == Doubt::AllAlike) {
        if !case.is_readable(ix) {
            continue;
        }
        let a: AtomIx = u.atoms()[0];
        let bonds: Vec<_> = case
            .molecule()
            .neighbors(a)
            .iter()
            .map(|m| m.bond)
            .collect();
        let text = format!(
            "the three bonds of atom {} lie in a half plane and are all marked alike: the outer ones and the middle one then say opposite things",
            n(a)
        );
        out.push(finding(
            Kind::Reentrant,
            Grade::Unclear,
            &[a],
            &bonds,
            text,
            clause::THREE_MARKS,
        ));
    }
}
