//! A crossed double bond: says unknown, in a way to be avoided.

use super::super::case::Case;
use super::super::clause;
use super::super::words::{bond, n};
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::drawing::Mark;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for b in case.molecule().bonds() {
        if case.drawing.mark(b) != Mark::Crossed {
            continue;
        }
        let ends = case.molecule().bond(b).ends;
        let unit = case.units().iter().find(|(_, u)| {
            ends.iter()
                .all(|e| u.atoms().contains(e) || u.inner.contains(e))
        });
        let (atoms, must) = match unit {
            Some((ix, u)) => (u.atoms().to_vec(), case.wanted[ix.index()]),
            None => (ends.to_vec(), None),
        };
        let (grade, what) = match (must, unit) {
            (Some(d), _) => (Grade::Wrong, format!("and it must carry {d}")),
            (None, Some(_)) => (
                Grade::PoorStyle,
                "a wavy bond at one end is the recommended way to say so".to_owned(),
            ),
            (None, None) => (
                Grade::PoorStyle,
                format!(
                    "but atoms {} and {} have no E or Z to be unknown",
                    n(ends[0]),
                    n(ends[1])
                ),
            ),
        };
        out.push(finding(
            Kind::CrossedDoubleBond,
            grade,
            &atoms,
            &[b],
            format!(
                "the double bond {} is crossed, which says unknown; {what}",
                bond(case.drawing, b)
            ),
            clause::DOUBLE,
        ));
    }
}
