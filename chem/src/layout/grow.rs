//! Where a new atom stands: 120-degree turns, straight on, the widest gap.

use crate::drawing::Drawing;
use crate::geom::{self, Point, Vec2};
use crate::molecule::{AtomIx, Order};
use std::f64::consts::{PI, TAU};

/// Where a new atom at `a` stands best.
pub(super) fn grown(drawing: &Drawing, a: AtomIx, order: Order) -> Point {
    let m = drawing.molecule();
    let (at, length) = (drawing.point(a), drawing.bond_length());
    let near = m.neighbors(a);
    let directions = directions(drawing, a);
    let straight = order == Order::Triple
        || near.iter().any(|n| {
            n.order == Order::Triple || (n.order, order) == (Order::Double, Order::Double)
        });
    let angle = match directions.as_slice() {
        [] => PI / 6.0,
        [only] if straight => geom::angle(*only) + PI,
        [only] => {
            // of the two 120-degree turns the one farther from everything: chains go on in a zigzag
            let base = geom::angle(*only);
            let room = |angle: f64| room(drawing, at + length * geom::unit(angle));
            let (left, right) = (base + TAU / 3.0, base - TAU / 3.0);
            let (room_left, room_right) = (room(left), room(right));
            if (room_left - room_right).abs() > 1e-6 * length {
                if room_left > room_right { left } else { right }
            } else if geom::unit(left).x >= geom::unit(right).x {
                left
            } else {
                right
            }
        }
        _ => geom::widest_gap(&directions).0,
    };
    at + length * geom::unit(angle)
}

pub(super) fn directions(drawing: &Drawing, a: AtomIx) -> Vec<Vec2> {
    drawing
        .molecule()
        .neighbors(a)
        .iter()
        .filter_map(|n| drawing.direction(a, n.atom))
        .collect()
}

/// Sum of what the atoms within three bonds leave free round a place: larger is emptier.
fn room(drawing: &Drawing, place: Point) -> f64 {
    let reach = 3.0 * drawing.bond_length();
    drawing
        .points()
        .iter()
        .map(|p| (p.distance(place) - reach).min(0.0))
        .sum()
}

/// The atom within a fifth of a bond of a point.
pub fn atom_at(drawing: &Drawing, at: Point) -> Option<AtomIx> {
    let near = 0.2 * drawing.bond_length();
    drawing
        .molecule()
        .atoms()
        .map(|a| (a, drawing.point(a).distance(at)))
        .filter(|(_, d)| *d <= near)
        .min_by(|x, y| x.1.total_cmp(&y.1))
        .map(|(a, _)| a)
}
