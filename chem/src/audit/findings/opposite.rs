//! A unit that carries another descriptor than it must.

use super::super::case::Case;
use super::super::clause;
use super::super::words::unit;
use super::super::{Finding, Grade, Kind};
use super::finding;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (ix, u) in case.units().iter() {
        let Some(wanted) = case.wanted[ix.index()] else {
            continue;
        };
        let Ok(carried) = case.labels[ix.index()].descriptor else {
            continue;
        };
        if carried == wanted {
            continue;
        }
        let text = format!("{} carries {carried} and must carry {wanted}", unit(u));
        out.push(finding(
            Kind::Opposite,
            Grade::Wrong,
            &u.atoms(),
            &[],
            text,
            clause::REQUIREMENT,
        ));
    }
}
