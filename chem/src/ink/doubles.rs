//! Double bonds: on which side the second line stands, and how far it runs (GR-1.10).

use super::plane;
use super::scene::{Axis, Scene};
use crate::geom;
use crate::molecule::{AtomIx, BondIx, Order};
use kurbo::{Point, Vec2};
use std::cmp::Reverse;

/// Where the second line stands, seen along the axis on the page.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Aside {
    /// Both lines beside the axis.
    Centered,
    /// On the side of [`Axis::n`].
    Clockwise,
    /// On the other one.
    Anticlockwise,
}

impl Aside {
    /// Sign of the shift along [`Axis::n`].
    pub(super) fn sign(self) -> f64 {
        match self {
            Aside::Centered => 0.0,
            Aside::Clockwise => 1.0,
            Aside::Anticlockwise => -1.0,
        }
    }

    fn of(shift: f64) -> Aside {
        if shift > 0.0 {
            Aside::Clockwise
        } else {
            Aside::Anticlockwise
        }
    }
}

/// Where the second line of a double bond stands.
pub(super) fn side(scene: &Scene<'_>, axis: &Axis, bond: BondIx) -> Aside {
    if let Some(aside) = ring_side(scene, axis, bond) {
        return aside;
    }
    let [a, b] = axis.ends;
    if is_cumulated(scene, a, bond) || is_cumulated(scene, b, bond) {
        return Aside::Centered;
    }
    let ends = [(a, b), (b, a)].map(|(end, other)| {
        let directions = scene.directions(end, Some(other));
        let on = |sign: f64| {
            directions
                .iter()
                .filter(|d| d.dot(axis.n) * sign > 0.1)
                .count()
        };
        (on(1.0), on(-1.0), directions.len())
    });
    // terminal: =O, =CH2
    for (i, end) in ends.iter().enumerate() {
        let other = &ends[1 - i];
        if end.2 == 0 && (other.2 != 1 || scene.label(axis.ends[1 - i]).is_some()) {
            return Aside::Centered;
        }
    }
    let (clockwise, anticlockwise) = (ends[0].0 + ends[1].0, ends[0].1 + ends[1].1);
    match clockwise.cmp(&anticlockwise) {
        std::cmp::Ordering::Greater => Aside::Clockwise,
        std::cmp::Ordering::Less => Aside::Anticlockwise,
        // a tie says nothing: always towards the foot of the page, so that neighbours look alike
        std::cmp::Ordering::Equal => Aside::of(axis.n.dot(Vec2::new(0.3, 1.0))),
    }
}

/// Whether another double bond goes straight on at an atom.
fn is_cumulated(scene: &Scene<'_>, atom: AtomIx, bond: BondIx) -> bool {
    let neighbors = scene.molecule().neighbors(atom);
    neighbors.len() == 2
        && neighbors
            .iter()
            .any(|n| n.bond != bond && n.order == Order::Double)
}

/// Towards the inside of the ring: of several the one that holds most double bonds (rings of up to
/// seven members first), then the smallest.
fn ring_side(scene: &Scene<'_>, axis: &Axis, bond: BondIx) -> Option<Aside> {
    scene.rings.smallest_through(bond)?;
    let cycle = scene
        .rings
        .cycles()
        .iter()
        .filter(|cycle| holds_pair(cycle, axis.ends))
        .min_by_key(|cycle| {
            (
                cycle.len() > 7,
                Reverse(double_bonds(scene, cycle)),
                cycle.len(),
            )
        })?;
    let polygon: Vec<Point> = cycle.iter().map(|a| scene.point(*a)).collect();
    let near = 0.05 * axis.length;
    let [one, other] = [near, -near].map(|s| plane::holds(&polygon, axis.at(0.5 * axis.length, s)));
    if one != other {
        return Some(if one {
            Aside::Clockwise
        } else {
            Aside::Anticlockwise
        });
    }
    // a ring drawn across itself: towards the middle of its atoms
    let sum = polygon
        .iter()
        .fold(Vec2::ZERO, |sum, p| sum + (*p - axis.from));
    Some(Aside::of(sum.dot(axis.n)))
}

fn holds_pair(cycle: &[AtomIx], ends: [AtomIx; 2]) -> bool {
    let n = cycle.len();
    (0..n).any(|i| {
        let pair = [cycle[i], cycle[(i + 1) % n]];
        pair == ends || pair == [ends[1], ends[0]]
    })
}

fn double_bonds(scene: &Scene<'_>, cycle: &[AtomIx]) -> usize {
    let molecule = scene.molecule();
    let n = cycle.len();
    (0..n)
        .filter_map(|i| molecule.bond_between(cycle[i], cycle[(i + 1) % n]))
        .filter(|b| molecule.bond(*b).order == Order::Double)
        .count()
}

/// Bonds at the start of an axis that lie on the side of `shift`, as their angle to the axis.
fn angles_aside<'s>(
    scene: &'s Scene<'_>,
    axis: &'s Axis,
    shift: f64,
) -> impl Iterator<Item = f64> + 's {
    scene
        .directions(axis.ends[0], Some(axis.ends[1]))
        .into_iter()
        .filter(move |d| d.dot(axis.n) * shift > 0.0)
        .map(|d| geom::between(d, axis.u))
}

/// How far the inner line stays behind the start of the axis: to the bisector of the angle there.
pub(super) fn cut_back(scene: &Scene<'_>, axis: &Axis, shift: f64) -> f64 {
    let most = 0.32 * axis.length;
    if scene.molecule().degree(axis.ends[0]) < 2 {
        return 0.0;
    }
    // without a neighbour on that side, as for an angle of 120 degrees
    let angle = angles_aside(scene, axis, shift)
        .fold(f64::INFINITY, f64::min)
        .min(std::f64::consts::PI * 2.0 / 3.0);
    (shift.abs() / (0.5 * angle).tan()).clamp(0.0, most)
}

/// Where a line beside the axis meets the neighbouring bond on its side, along the axis from its
/// start; negative beyond the start, 0 without a neighbour.
pub(super) fn meet(scene: &Scene<'_>, axis: &Axis, shift: f64) -> f64 {
    let angle = angles_aside(scene, axis, shift).fold(f64::INFINITY, f64::min);
    if !angle.is_finite() || angle.sin() < 0.2 {
        return 0.0;
    }
    (shift.abs() / angle.tan()).clamp(-1.5 * shift.abs(), 0.32 * axis.length)
}
