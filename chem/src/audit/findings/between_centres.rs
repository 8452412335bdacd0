//! A wedge from one centre to another though another bond could bear it.

use super::super::case::{Case, Wedge};
use super::super::clause;
use super::super::words::{mark, n};
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::molecule::{AtomIx, Order};
use crate::stereo::{Configuration, Ligand};

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for w in case.wedges().filter(|w| w.order == Order::Single) {
        let Some(ix) = case.center(w.narrow).filter(|ix| case.is_readable(*ix)) else {
            continue;
        };
        let both = case.is_stereocenter(w.wide) && case.reading.doubt(ix).is_none();
        if both && has_another_bond(case, w) {
            out.push(tell(case, w));
        }
    }
}

fn tell(case: &Case<'_>, w: Wedge) -> Finding {
    let (a, b) = (n(w.narrow), n(w.wide));
    let open = case
        .center(w.wide)
        .is_some_and(|ix| case.reading.configuration(ix) == Configuration::Open);
    let mut text = format!(
        "the {} from atom {a} to atom {b} joins two centres: it speaks for atom {a} only, where it is narrow",
        mark(w.mark)
    );
    // with no mark of its own, the far centre may seem to be defined by this one
    let (grade, atoms): (Grade, &[AtomIx]) = if open && !case.has_own_mark(w.wide) {
        text +=
            &format!("; a reader may take it for atom {b} as well, which has no mark of its own");
        (Grade::Unclear, &[w.narrow, w.wide])
    } else {
        (Grade::PoorStyle, &[w.narrow])
    };
    finding(
        Kind::BetweenCentres,
        grade,
        atoms,
        &[w.bond],
        text,
        clause::BETWEEN,
    )
}

/// Whether the centre has another bond for the mark, or a hydrogen that can be drawn.
fn has_another_bond(case: &Case<'_>, w: Wedge) -> bool {
    let hidden = case
        .center(w.narrow)
        .is_some_and(|ix| case.units().get(ix).ligands[3] == Ligand::Hydrogen);
    hidden
        || case
            .molecule()
            .neighbors(w.narrow)
            .iter()
            .any(|m| m.bond != w.bond && case.is_free(w.narrow, m.bond))
}
