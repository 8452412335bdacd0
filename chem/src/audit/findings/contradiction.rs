//! Marks at a centre or axis that disagree.

use super::super::case::Case;
use super::super::clause::{self, Clause};
use super::super::words::{marks_at, unit};
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::drawing::Mark;
use crate::molecule::BondIx;
use crate::stereo::{Focus, Unit};
use crate::wedge::{Doubt, Pattern, Shape};

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    let is_wanted = |d| matches!(d, Doubt::Contradiction | Doubt::EitherWithWedge);
    for (ix, u) in case.doubtful(is_wanted) {
        if !case.is_readable(ix) {
            continue;
        }
        let wavy = case.reading.doubt(ix) == Some(Doubt::EitherWithWedge);
        let mut bonds = Vec::new();
        let mut marks = Vec::new();
        for a in holders(u) {
            bonds.extend(marked_bonds(case, a));
            let words = marks_at(case.drawing, a);
            if !words.is_empty() {
                marks.push(words);
            }
        }
        bonds.sort_unstable();
        let (why, clause) = reason(case, u, wavy);
        out.push(finding(
            Kind::Contradiction,
            Grade::Wrong,
            &u.atoms(),
            &bonds,
            format!(
                "the marks at {} disagree ({}): {why}",
                unit(u),
                marks.join("; ")
            ),
            clause,
        ));
    }
}

fn holders(u: &Unit) -> Vec<crate::molecule::AtomIx> {
    let mut atoms = u.atoms().to_vec();
    if u.kind == crate::stereo::Kind::Helix {
        atoms.extend(u.toward_each_other());
    }
    atoms
}

fn marked_bonds(case: &Case<'_>, atom: crate::molecule::AtomIx) -> Vec<BondIx> {
    case.molecule()
        .neighbors(atom)
        .iter()
        .map(|m| m.bond)
        .filter(|b| case.drawing.mark_from(atom, *b) != Mark::Plain)
        .collect()
}

fn reason(case: &Case<'_>, u: &Unit, wavy: bool) -> (&'static str, Clause) {
    if wavy {
        return (
            "the wavy bond says unknown, the wedge says which",
            clause::WAVY_AND_WEDGE,
        );
    }
    let Focus::Center(center) = u.focus else {
        return ("they give the axis two hands", clause::AXIS);
    };
    let Ok(pattern) = Pattern::of(case.drawing, center) else {
        return (
            "they give the centre two configurations",
            clause::FOUR_MARKS,
        );
    };
    match pattern.shape {
        Shape::Spread => (
            "on three bonds all round a centre every mark must be of one kind",
            clause::THREE_UNLIKE,
        ),
        Shape::HalfPlane { .. } | Shape::Tee { .. } => (
            "in a half plane the outer bonds must be alike and the middle one of the other kind",
            clause::THREE_MARKS,
        ),
        Shape::Four | Shape::Other => (
            "on four bonds neighbouring marks must be of different kinds and opposite ones alike",
            clause::FOUR_MARKS,
        ),
    }
}
