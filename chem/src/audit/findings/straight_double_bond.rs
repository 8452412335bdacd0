//! A ligand in line with its double bond, or nearly.

use super::super::case::Case;
use super::super::clause;
use super::super::words::{n, unit};
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::geom;
use crate::molecule::AtomIx;
use crate::stereo::{Configuration, Focus, Kind as UnitKind, Unit};
use crate::wedge::Doubt;
use std::f64::consts::PI;

/// Nearer than this to the line of the double bond a ligand shows its side badly (degrees).
const NEAR_LINE: f64 = 30.0;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (ix, u) in case.doubtful(|d| d == Doubt::Straight) {
        if !case.is_capable(ix) {
            continue;
        }
        let text = format!(
            "a ligand of {} lies in its line: E and Z look the same",
            unit(u)
        );
        out.push(finding(
            Kind::StraightDoubleBond,
            Grade::Unclear,
            &u.atoms(),
            &[],
            text,
            clause::NEAR_LINE,
        ));
    }
    for (ix, u) in case.units().iter() {
        let defined = matches!(case.reading.configuration(ix), Configuration::Defined(_));
        if u.kind != UnitKind::DoubleBond || !defined || !case.is_capable(ix) || !case.is_flat() {
            continue;
        }
        let Some((ligand, angle)) = nearest_to_line(case, u) else {
            continue;
        };
        if angle >= NEAR_LINE {
            continue;
        }
        let text = format!(
            "atom {} stands only {angle:.0} degrees off the line of {}: its side is easily missed",
            n(ligand),
            unit(u)
        );
        out.push(finding(
            Kind::StraightDoubleBond,
            Grade::PoorStyle,
            &u.atoms(),
            &[],
            text,
            clause::NEAR_LINE,
        ));
    }
}

/// The ligand whose bond makes the smallest angle with the line of the double bond, in degrees.
fn nearest_to_line(case: &Case<'_>, u: &Unit) -> Option<(AtomIx, f64)> {
    let Focus::Pair(ends) = u.focus else {
        return None;
    };
    let axis = case.drawing.direction(ends[0], ends[1])?;
    let mut nearest: Option<(AtomIx, f64)> = None;
    for (i, ligand) in u.ligands.iter().enumerate() {
        let Some(atom) = ligand.atom() else { continue };
        let v = case.drawing.direction(ends[i / 2], atom)?;
        let angle = geom::between(v, axis);
        let off = angle.min(PI - angle).to_degrees();
        if nearest.is_none_or(|(_, least)| off < least - 1e-9) {
            nearest = Some((atom, off));
        }
    }
    nearest
}
