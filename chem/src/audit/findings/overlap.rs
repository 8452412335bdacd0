//! Bonds of a unit in one direction, or atoms drawn on each other.

use super::super::case::Case;
use super::super::clause;
use super::super::words::{n, unit};
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::molecule::AtomIx;
use crate::wedge::Doubt;

/// Nearer than this part of a bond length two atoms lie on each other.
const ON_EACH_OTHER: f64 = 0.1;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (ix, u) in case.doubtful(|d| d == Doubt::Overlap) {
        if !case.is_readable(ix) {
            continue;
        }
        let text = format!(
            "two bonds of {} point the same way, or an atom lies on it: it cannot be read",
            unit(u)
        );
        out.push(finding(
            Kind::Overlap,
            Grade::Unclear,
            &u.atoms(),
            &[],
            text,
            clause::OVERLAP,
        ));
    }
    if case.is_flat() {
        for (a, b) in pairs(case) {
            let text = format!(
                "atoms {} and {} are drawn on each other: what belongs to which cannot be seen",
                n(a),
                n(b)
            );
            out.push(finding(
                Kind::Overlap,
                Grade::Unclear,
                &[a, b],
                &[],
                text,
                clause::CROWDED,
            ));
        }
    }
}

/// Atoms within a tenth of a bond length of each other: neighbours in a sweep from left to right.
fn pairs(case: &Case<'_>) -> Vec<(AtomIx, AtomIx)> {
    let drawing = case.drawing;
    let near = ON_EACH_OTHER * drawing.bond_length();
    let mut atoms: Vec<AtomIx> = case.molecule().atoms().collect();
    atoms.sort_by(|a, b| {
        let (p, q) = (drawing.point(*a), drawing.point(*b));
        p.x.total_cmp(&q.x).then(a.cmp(b))
    });
    let mut found = Vec::new();
    for (i, a) in atoms.iter().enumerate() {
        let p = drawing.point(*a);
        for b in &atoms[i + 1..] {
            let q = drawing.point(*b);
            // a heap of atoms on one spot is told by its first pairs
            if q.x - p.x > near || found.len() > 2 * atoms.len() {
                break;
            }
            if p.distance(q) < near {
                found.push(((*a).min(*b), (*a).max(*b)));
            }
        }
    }
    found.sort_unstable();
    found
}
