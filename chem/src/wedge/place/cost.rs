//! What it costs to mark a bond: the preferences of the recommendations as one number.
//!
//! Units: a hundredth of the smallest preference, so that costs are whole numbers and sums exact.

use super::Scene;
use super::option::Arm;
use crate::drawing::Drawing;
use crate::element::Element;
use crate::geom;
use crate::molecule::{AtomIx, Order};
use crate::stereo::{Focus, Kind};
use std::f64::consts::PI;

const UNIT: i64 = 100;
/// The mark stays where the author put it if the cost differs by less.
pub(super) const KEEP: i64 = 20 * UNIT;
/// Drawing a hydrogen: better than a mark in a ring or between centres, worse than any other.
pub(super) const HYDROGEN: i64 = 290 * UNIT;

const DRAWN_HYDROGEN: i64 = -1000 * UNIT;
const BETWEEN_CENTERS: i64 = 500 * UNIT;
const RING_BOND: i64 = 300 * UNIT;
const RING_NEIGHBOR: i64 = 100 * UNIT;
const DOUBLE_BOND: i64 = 40 * UNIT;
const STEREO_DOUBLE_BOND: i64 = 60 * UNIT;
const OPEN_DOUBLE_BOND: i64 = 230 * UNIT;
const CARBON: i64 = 5 * UNIT;
const EXTRA_NEIGHBOR: i64 = 10 * UNIT;
/// A mark squeezed between two plain bonds is read the other way than it looks.
const SQUEEZED: i64 = 300 * UNIT;
const NARROW_GAP: i64 = 60 * UNIT;

/// Cost of a mark on arm `i`, narrow end at `center`.
pub(super) fn of_bond(scene: &Scene<'_>, center: AtomIx, arms: &[Arm], i: usize) -> i64 {
    let drawing = scene.drawing;
    let molecule = drawing.molecule();
    let arm = arms[i];
    let mut cost = 0;
    if molecule.element(arm.to) == Element::H && molecule.degree(arm.to) == 1 {
        cost += DRAWN_HYDROGEN;
    }
    if scene.is_center[arm.to.index()] {
        cost += BETWEEN_CENTERS;
    }
    let rings_with = |wanted: &dyn Fn(&[AtomIx]) -> bool| {
        let n = scene.rings.cycles().iter().filter(|c| wanted(c)).count();
        i64::try_from(n).unwrap_or(i64::MAX / 1_000_000)
    };
    if let Some(size) = scene.rings.smallest_through(arm.bond) {
        let both = |c: &[AtomIx]| c.contains(&center) && c.contains(&arm.to);
        let size = i64::try_from(size.min(30)).unwrap_or(30);
        cost += RING_BOND * rings_with(&both).max(1) + (30 - size) * UNIT;
    }
    cost += RING_NEIGHBOR * rings_with(&|c: &[AtomIx]| c.contains(&arm.to));
    cost += double_bonds(scene, arm.to);
    let branch = branch_size(drawing, center, arm.to);
    cost += UNIT * i64::try_from(branch).unwrap_or(1000);
    let extra = molecule.degree(arm.to).saturating_sub(2);
    cost += EXTRA_NEIGHBOR * i64::try_from(extra).unwrap_or(0);
    if molecule.element(arm.to) == Element::C {
        cost += CARBON;
    }
    cost + angles(arms, i)
}

/// Double bonds at the far end are worse the more they have to say themselves.
fn double_bonds(scene: &Scene<'_>, at: AtomIx) -> i64 {
    let molecule = scene.drawing.molecule();
    let mut cost = 0;
    for n in molecule
        .neighbors(at)
        .iter()
        .filter(|n| n.order == Order::Double)
    {
        let is_unit = scene.units.iter().any(|(_, u)| {
            u.kind == Kind::DoubleBond && matches!(u.focus, Focus::Pair(ends) if ends.contains(&at))
        });
        let crossed = scene.drawing.mark(n.bond) == crate::drawing::Mark::Crossed;
        cost += match (is_unit, crossed) {
            (true, true) => OPEN_DOUBLE_BOND,
            (true, false) => STEREO_DOUBLE_BOND,
            (false, _) => DOUBLE_BOND,
        };
    }
    cost
}

/// Drawn atoms other than hydrogen that hang on a bond, all of them if it is a ring bond; at most 200.
fn branch_size(drawing: &Drawing, center: AtomIx, to: AtomIx) -> usize {
    let molecule = drawing.molecule();
    let mut seen = vec![center, to];
    let mut next = 1;
    while next < seen.len() && seen.len() < 200 {
        for n in molecule.neighbors(seen[next]) {
            if !seen.contains(&n.atom) && molecule.element(n.atom) != Element::H {
                seen.push(n.atom);
            }
        }
        next += 1;
    }
    seen.len() - 1
}

/// Off the middle of the widest gap between the other bonds; squeezed; or close to a neighbor.
fn angles(arms: &[Arm], i: usize) -> i64 {
    let others: Vec<_> = arms
        .iter()
        .enumerate()
        .filter(|(k, _)| *k != i)
        .map(|(_, arm)| arm.direction)
        .collect();
    let (middle, _) = geom::widest_gap(&others);
    let off = geom::between(geom::unit(middle), arms[i].direction).to_degrees();
    // a fifth of a unit for each degree beyond 30; the cast drops a fraction of no account
    let mut cost = ((off - 30.0).max(0.0) * UNIT as f64 / 5.0) as i64;
    let nearest = others
        .iter()
        .map(|d| geom::between(*d, arms[i].direction))
        .fold(PI, f64::min);
    if nearest.to_degrees() < 30.0 {
        cost += NARROW_GAP;
    }
    let all: Vec<_> = arms.iter().map(|arm| arm.direction).collect();
    let (open, wide) = geom::widest_gap(&all);
    let faces_gap = PI - geom::between(geom::unit(open), arms[i].direction) < PI / 6.0;
    if arms.len() == 3 && wide > PI - 0.15 && faces_gap {
        cost += SQUEEZED;
    }
    cost
}
