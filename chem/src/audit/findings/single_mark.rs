//! Four drawn bonds with one mark, or a marked end of an allene with one, where two read better.

use super::super::case::Case;
use super::super::clause;
use super::super::words::{mark, n, unit};
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::drawing::Mark;
use crate::geom;
use crate::molecule::{AtomIx, BondIx};
use crate::stereo::{Configuration, Focus, Kind as UnitKind};
use crate::wedge::{Pattern, Shape};

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (_, _, a, pattern) in case.defined_centers() {
        let (Shape::Four, Some(only)) = (pattern.shape, pattern.only_mark()) else {
            continue;
        };
        let first = pattern.spokes[only];
        // a drawn hydrogen alone carries the mark clearly
        if case.is_drawn_hydrogen(first.atom) {
            continue;
        }
        let Some(second) = partner(case, a, &pattern, only) else {
            continue;
        };
        let spoke = pattern.spokes[second];
        let text = format!(
            "atom {} has four drawn bonds and one mark, the {} to atom {}; a second one of the other kind, to atom {}, makes it plain at a glance",
            n(a),
            mark(case.drawing.mark(first.bond)),
            n(first.atom),
            n(spoke.atom)
        );
        out.push(finding(
            Kind::SingleMark,
            Grade::PoorStyle,
            &[a],
            &[first.bond, spoke.bond],
            text,
            clause::FOUR,
        ));
    }
    allenes(case, out);
}

/// The bond beside the only mark that could bear the second one: acyclic, free, 25 to 100 degrees away.
fn partner(case: &Case<'_>, a: AtomIx, pattern: &Pattern, only: usize) -> Option<usize> {
    let angle = |i: usize| {
        let turn = geom::turn(pattern.spokes[only].angle, pattern.spokes[i].angle);
        turn.min(std::f64::consts::TAU - turn).to_degrees()
    };
    [(only + 1) % 4, (only + 3) % 4]
        .into_iter()
        .filter(|i| {
            let s = pattern.spokes[*i];
            let plain = case.drawing.mark(s.bond) == Mark::Plain;
            plain
                && case.is_free(a, s.bond)
                && !case.rings().has_bond(s.bond)
                && (25.0..100.0).contains(&angle(*i))
        })
        .min_by_key(|i| {
            let s = pattern.spokes[*i];
            (case.molecule().degree(s.atom), s.atom)
        })
}

fn allenes(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (ix, u) in case.units().iter() {
        let defined = matches!(case.reading.configuration(ix), Configuration::Defined(_));
        let Focus::Pair(ends) = u.focus else { continue };
        if u.kind != UnitKind::CumulatedAxis || !defined {
            continue;
        }
        for (k, end) in ends.into_iter().enumerate() {
            let bonds: Vec<(AtomIx, BondIx)> = u.ligands[2 * k..2 * k + 2]
                .iter()
                .filter_map(|l| l.atom())
                .filter_map(|l| Some((l, case.molecule().bond_between(end, l)?)))
                .collect();
            let [p, q] = bonds.as_slice() else { continue };
            let is_plain = |b: BondIx| case.drawing.mark(b) == Mark::Plain;
            let (marked, plain) = match (is_plain(p.1), is_plain(q.1)) {
                (false, true) => (p, q),
                (true, false) => (q, p),
                _ => continue,
            };
            if case.drawing.mark_from(end, marked.1) == Mark::Plain || !case.is_free(end, plain.1) {
                continue;
            }
            let text = format!(
                "at atom {} of {} only the bond to atom {} is marked; the one to atom {} is the other kind and may say so",
                n(end),
                unit(u),
                n(marked.0),
                n(plain.0)
            );
            out.push(finding(
                Kind::SingleMark,
                Grade::PoorStyle,
                &ends,
                &[marked.1, plain.1],
                text,
                clause::AXIS,
            ));
        }
    }
}
