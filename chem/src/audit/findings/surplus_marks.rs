//! More marks than the pattern needs: readable, but discouraged, or read otherwise by some.

use super::super::case::Case;
use super::super::clause;
use super::super::words::{marks_at, n};
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::wedge::{Pattern, Shape};

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (_, _, a, pattern) in case.defined_centers() {
        let marks = pattern.n_marks();
        let marked = marks_at(case.drawing, a);
        let (grade, text, clause) = match pattern.shape {
            Shape::Four if !alternates(&pattern) => (
                Grade::Unclear,
                format!(
                    "three bonds of atom {} are marked alike ({marked}): readers that stop at the first two find a contradiction",
                    n(a)
                ),
                clause::FOUR_MARKS,
            ),
            Shape::Spread | Shape::HalfPlane { .. } if marks > 1 => (
                Grade::PoorStyle,
                format!(
                    "atom {} has three drawn bonds and {marks} marks ({marked}): one is enough and reads better",
                    n(a)
                ),
                clause::THREE_LIKE,
            ),
            Shape::Tee { bars, .. } if bars.iter().all(|i| pattern.spokes[*i].lift != 0) => (
                Grade::PoorStyle,
                format!(
                    "both bonds in line at atom {} are marked ({marked}): open the angle and keep one mark",
                    n(a)
                ),
                clause::THREE_MARKS,
            ),
            _ => continue,
        };
        let bonds: Vec<_> = pattern
            .marked()
            .iter()
            .map(|i| pattern.spokes[*i].bond)
            .collect();
        out.push(finding(
            Kind::SurplusMarks,
            grade,
            &[a],
            &bonds,
            text,
            clause,
        ));
    }
}

/// Whether marks on four bonds follow the rule "neighbours unlike, opposites alike".
fn alternates(pattern: &Pattern) -> bool {
    let mut votes = pattern
        .spokes
        .iter()
        .enumerate()
        .filter(|(_, s)| s.lift != 0)
        .map(|(i, s)| if i % 2 == 0 { s.lift } else { -s.lift });
    let first = votes.next();
    votes.all(|v| Some(v) == first)
}
