//! Four bonds with all plain ones crowded on one side: the mark is read against a fan, not against a centre.

use super::super::case::Case;
use super::super::clause;
use super::super::words::n;
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::wedge::{IN_LINE, Pattern, Shape};
use std::f64::consts::PI;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (_, _, a, pattern) in case.defined_centers() {
        if pattern.shape != Shape::Four {
            continue;
        }
        let text = if pattern.widest() > PI + IN_LINE {
            format!(
                "all four bonds of atom {} lie in a half plane: what is near and what is far shows badly",
                n(a)
            )
        } else if let Some((only, angle)) = umbrella(&pattern) {
            format!(
                "the plain bonds of atom {} all lie within {angle:.0} degrees opposite its one mark, to atom {}",
                n(a),
                n(pattern.spokes[only].atom)
            )
        } else {
            continue;
        };
        let bonds: Vec<_> = pattern
            .marked()
            .iter()
            .map(|i| pattern.spokes[*i].bond)
            .collect();
        out.push(finding(
            Kind::OneSided,
            Grade::PoorStyle,
            &[a],
            &bonds,
            text,
            clause::FOUR_MARKS,
        ));
    }
}

/// The single mark, and the angle in degrees that holds the three plain bonds on its far side.
fn umbrella(pattern: &Pattern) -> Option<(usize, f64)> {
    let only = pattern.only_mark()?;
    let far = pattern.far_side(only);
    (far < PI - IN_LINE).then_some((only, far.to_degrees()))
}
