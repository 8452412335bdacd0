//! A wedge whose wide end is at the centre and whose narrow end is at an atom that is none.

use super::super::case::Case;
use super::super::clause;
use super::super::words::{mark, n};
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::molecule::Order;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for w in case.wedges() {
        let silent = w.order == Order::Single && !case.speaks(w.narrow, w.wide);
        if !silent || !case.is_stereocenter(w.wide) || case.has_own_mark(w.wide) {
            continue;
        }
        let text = format!(
            "the {} between atoms {} and {} is wide at atom {}, the centre, and narrow at atom {}, which is no centre: it defines nothing",
            mark(w.mark),
            n(w.narrow),
            n(w.wide),
            n(w.wide),
            n(w.narrow)
        );
        out.push(finding(
            Kind::WideEnd,
            Grade::Wrong,
            &[w.wide, w.narrow],
            &[w.bond],
            text,
            clause::NARROW_END,
        ));
    }
}
