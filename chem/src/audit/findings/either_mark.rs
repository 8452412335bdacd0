//! A wavy bond: what it says, and to whom.
//!
//! On paper a wavy bond has no narrow end; in a file it speaks for its first atom.

use super::super::case::{Case, Wedge};
use super::super::clause;
use super::super::words::{n, unit};
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::molecule::AtomIx;
use crate::stereo::{Configuration, Unit, UnitIx};

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for w in case.wavy() {
        let narrow = units_at(case, w.narrow);
        let wide = units_at(case, w.wide);
        if !wide.is_empty() && (!narrow.is_empty() || !case.is_double_end(w.wide)) {
            out.push(shared(w, &narrow, &wide));
        }
    }
    for (ix, u) in case.units().iter() {
        if case.reading.configuration(ix) != Configuration::Either || !case.is_readable(ix) {
            continue;
        }
        let wavy: Vec<_> = case
            .wavy()
            .filter(|w| u.atoms().contains(&w.narrow) || u.atoms().contains(&w.wide))
            .map(|w| w.bond)
            .collect();
        if wavy.is_empty() {
            continue;
        }
        let (grade, what) = match case.wanted[ix.index()] {
            Some(d) => (Grade::Wrong, format!("and it must carry {d}")),
            None => (
                Grade::Open,
                "its configuration is unknown or mixed".to_owned(),
            ),
        };
        let text = format!("a wavy bond at {} says unknown: {what}", unit(u));
        out.push(finding(
            Kind::EitherMark,
            grade,
            &u.atoms(),
            &wavy,
            text,
            clause::WAVY,
        ));
    }
}

/// Units that a wavy bond at an atom could be about.
fn units_at<'a>(case: &'a Case<'_>, atom: AtomIx) -> Vec<(UnitIx, &'a Unit)> {
    case.units()
        .iter()
        .filter(|(ix, u)| {
            u.atoms().contains(&atom) && (case.is_capable(*ix) || is_either(case, *ix))
        })
        .collect()
}

fn is_either(case: &Case<'_>, ix: UnitIx) -> bool {
    case.reading.configuration(ix) == Configuration::Either
}

fn shared(w: Wedge, narrow: &[(UnitIx, &Unit)], wide: &[(UnitIx, &Unit)]) -> Finding {
    let mut atoms: Vec<AtomIx> = Vec::new();
    for (_, u) in narrow.iter().chain(wide) {
        for a in u.atoms() {
            if !atoms.contains(&a) {
                atoms.push(a);
            }
        }
    }
    let (a, b) = (n(w.narrow), n(w.wide));
    let text = if narrow.is_empty() {
        format!(
            "the wavy bond between atoms {a} and {b} starts at atom {a}, where nothing can be unknown; on paper it seems to speak for atom {b}"
        )
    } else {
        let names: Vec<String> = narrow.iter().chain(wide).map(|(_, u)| unit(u)).collect();
        format!(
            "the wavy bond between atoms {a} and {b} touches {}: on paper it has no first end, so it may be taken for either",
            names.join(" and ")
        )
    };
    let is_same_unit = narrow.iter().any(|(i, _)| wide.iter().any(|(j, _)| i == j));
    let grade = if is_same_unit {
        Grade::PoorStyle
    } else {
        Grade::Unclear
    };
    finding(
        Kind::EitherMark,
        grade,
        &atoms,
        &[w.bond],
        text,
        clause::WAVY,
    )
}
