//! Bonds in line at a centre: the stem of a T says nothing, and an upright cross with one mark reads badly.

use super::super::case::Case;
use super::super::clause;
use super::super::words::n;
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::wedge::{Doubt, IN_LINE, Pattern, Shape};
use std::f64::consts::PI;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (ix, u) in case.doubtful(|d| d == Doubt::Stem) {
        let a = u.atoms()[0];
        let Ok(pattern) = Pattern::of(case.drawing, a) else {
            continue;
        };
        if let (Shape::Tee { stem, bars }, true) = (pattern.shape, case.is_readable(ix)) {
            let [p, q] = bars.map(|i| n(pattern.spokes[i].atom));
            let text = format!(
                "the bonds of atom {} to atoms {p} and {q} are in line and only the third, to atom {}, is marked: this shows a T and not which side the missing ligand is on",
                n(a),
                n(pattern.spokes[stem].atom)
            );
            let bonds = [pattern.spokes[stem].bond];
            out.push(finding(
                Kind::StraightAngle,
                Grade::Unclear,
                &[a],
                &bonds,
                text,
                clause::STEM,
            ));
        }
    }
    for (_, _, a, pattern) in case.defined_centers() {
        if let Some((p, q)) = cross(&pattern) {
            let text = format!(
                "atom {} is drawn as an upright cross with one mark, its bonds to atoms {} and {} in line: bend them, or mark a second bond",
                n(a),
                n(pattern.spokes[p].atom),
                n(pattern.spokes[q].atom)
            );
            let bonds: Vec<_> = pattern
                .marked()
                .iter()
                .map(|i| pattern.spokes[*i].bond)
                .collect();
            out.push(finding(
                Kind::StraightAngle,
                Grade::PoorStyle,
                &[a],
                &bonds,
                text,
                clause::CROSS,
            ));
        }
    }
}

/// The two plain bonds in line across a single mark whose own line is straight too.
fn cross(pattern: &Pattern) -> Option<(usize, usize)> {
    let (Shape::Four, Some(only)) = (pattern.shape, pattern.only_mark()) else {
        return None;
    };
    let (p, q) = ((only + 1) % 4, (only + 3) % 4);
    let opposite = crate::geom::turn(
        pattern.spokes[only].angle,
        pattern.spokes[(only + 2) % 4].angle,
    );
    let in_line = (pattern.far_side(only) - PI).abs() < IN_LINE;
    // 15 degrees either way is still an upright cross to the eye
    (in_line && (opposite - PI).abs() < 15f64.to_radians()).then_some((p, q))
}
