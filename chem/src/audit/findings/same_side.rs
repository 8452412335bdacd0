//! Both ligands of one end of a double bond or axis on one side.

use super::super::case::Case;
use super::super::clause;
use super::super::words::unit;
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::wedge::Doubt;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (ix, u) in case.doubtful(|d| d == Doubt::SameSide) {
        // equal ligands have no sides to mix up
        if !case.is_capable(ix) {
            continue;
        }
        let text = format!(
            "both ligands of one end of {} are drawn on the same side: which of them faces the other end cannot be seen",
            unit(u)
        );
        out.push(finding(
            Kind::SameSide,
            Grade::Unclear,
            &u.atoms(),
            &[],
            text,
            clause::ONE_SIDE,
        ));
    }
}
