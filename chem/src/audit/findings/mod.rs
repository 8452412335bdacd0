//! What is looked for: one file for each kind of finding, one table of them all.

mod between_centres;
mod contradiction;
mod crossed_double_bond;
mod crowded_hydrogen;
mod either_mark;
mod idle_mark;
mod impossible_geometry;
mod not_stereogenic;
mod one_sided;
mod opposite;
mod overlap;
mod projection;
mod reentrant;
mod ring_bond;
mod same_side;
mod short_bond;
mod single_mark;
mod straight_angle;
mod straight_double_bond;
mod surplus_marks;
mod undefined_axis;
mod undefined_centre;
mod undefined_double_bond;
mod valence;
mod wide_end;

#[cfg(test)]
mod tests;

use super::case::{Case, Graph, with_case};
use super::clause::Clause;
use super::{Finding, Grade, Kind};
use crate::drawing::Drawing;
use crate::molecule::{AtomIx, BondIx};
use crate::solve::require::Requirement;

pub(super) use crowded_hydrogen::{free_spots, is_crowded};
pub(super) use idle_mark::left_out;

/// How each kind is found.
fn finder(kind: Kind) -> fn(&Case<'_>, &mut Vec<Finding>) {
    match kind {
        Kind::Opposite => opposite::find,
        Kind::NotStereogenic => not_stereogenic::find,
        Kind::Contradiction => contradiction::find,
        Kind::WideEnd => wide_end::find,
        Kind::ImpossibleGeometry => impossible_geometry::find,
        Kind::Valence => valence::find,
        Kind::Projection => projection::find,
        Kind::Overlap => overlap::find,
        Kind::Reentrant => reentrant::find,
        Kind::StraightAngle => straight_angle::find,
        Kind::StraightDoubleBond => straight_double_bond::find,
        Kind::SameSide => same_side::find,
        Kind::CrossedDoubleBond => crossed_double_bond::find,
        Kind::UndefinedDoubleBond => undefined_double_bond::find,
        Kind::EitherMark => either_mark::find,
        Kind::UndefinedCentre => undefined_centre::find,
        Kind::UndefinedAxis => undefined_axis::find,
        Kind::IdleMark => idle_mark::find,
        Kind::BetweenCentres => between_centres::find,
        Kind::SurplusMarks => surplus_marks::find,
        Kind::RingBond => ring_bond::find,
        Kind::OneSided => one_sided::find,
        Kind::ShortBond => short_bond::find,
        Kind::CrowdedHydrogen => crowded_hydrogen::find,
        Kind::SingleMark => single_mark::find,
    }
}

/// Everything there is to find, without mends: the gravest first, then by kind and atoms.
pub(super) fn all(case: &Case<'_>) -> Vec<Finding> {
    let mut found = Vec::new();
    for kind in Kind::ALL {
        finder(kind)(case, &mut found);
    }
    found.sort_by(|a, b| {
        let key = |f: &Finding| (f.grade, f.kind, f.atoms.clone(), f.bonds.clone());
        key(a).cmp(&key(b))
    });
    found
}

fn finding(
    kind: Kind,
    grade: Grade,
    atoms: &[AtomIx],
    bonds: &[BondIx],
    text: String,
    clause: Clause,
) -> Finding {
    Finding {
        kind,
        grade,
        atoms: atoms.to_vec(),
        bonds: bonds.to_vec(),
        text,
        clause,
        mends: Vec::new(),
    }
}

/// Everything there is to find in a drawing.
pub(super) fn all_of(drawing: &Drawing, requirement: &Requirement) -> Vec<Finding> {
    let graph = Graph::of(drawing.molecule());
    with_case(drawing, requirement, &graph, None, all)
}
