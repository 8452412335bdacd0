//! Wedges and waves. Every axis here runs from the narrow end to the wide one.

use super::Shape;
use super::bonds::{count, pieces, share};
use super::plane;
use super::scene::{Axis, Scene};
use kurbo::{BezPath, Point, Vec2};

/// The bars of a hashed wedge are at least this many.
const FEWEST_BARS: usize = 4;

/// A solid wedge: a point at the narrow end; the wide end square, or cut along the bonds that follow.
pub(super) fn solid(scene: &Scene<'_>, axis: &Axis) -> Vec<Shape> {
    let half = 0.5 * scene.style.wedge_width;
    let Some([a, b]) = scene.trims(axis, &[0.0, 0.8 * half, -0.8 * half], 0.0) else {
        return Vec::new();
    };
    let tip = axis.at(a, 0.0);
    let mut path = BezPath::new();
    path.move_to(tip);
    let corners = if scene.label(axis.ends[1]).is_none() {
        joined_end(scene, axis, tip, half)
    } else {
        None
    };
    for corner in corners.unwrap_or_else(|| {
        let end = axis.length - b;
        vec![axis.at(end, half), axis.at(end, -half)]
    }) {
        path.line_to(corner);
    }
    path.close_path();
    vec![Shape::Fill(path)]
}

/// Corners of a wide end that runs into the outer edges of the bonds which follow it; `None` if they
/// leave at angles that give no neat corner.
fn joined_end(scene: &Scene<'_>, axis: &Axis, tip: Point, half: f64) -> Option<Vec<Point>> {
    let bonds = scene.directions(axis.ends[1], Some(axis.ends[0]));
    // of several bonds on a side the one nearest to the wedge
    let on = |side: f64| {
        bonds
            .iter()
            .copied()
            .filter(|d| d.dot(axis.n) * side > 0.2)
            .min_by(|d, e| d.dot(axis.u).total_cmp(&e.dot(axis.u)))
    };
    let corner = |side: f64, bond: Vec2| {
        let edge = axis.at(axis.length, side * half) - tip;
        let across = bond.turn_90();
        let outward = if across.dot(axis.u) < 0.0 {
            -across
        } else {
            across
        };
        let outer = axis.to + outward * (0.5 * scene.style.line_width);
        plane::crossing(tip, edge, outer, bond).filter(|p| p.distance(axis.to) < 3.2 * half)
    };
    match (on(1.0), on(-1.0)) {
        (Some(one), Some(other)) => Some(vec![corner(1.0, one)?, axis.to, corner(-1.0, other)?]),
        (Some(only), None) | (None, Some(only)) if bonds.len() == 1 => {
            Some(vec![corner(1.0, only)?, corner(-1.0, only)?])
        }
        _ => None,
    }
}

/// A hashed wedge: the outline of a solid one, in bars across; the first bar clear of the narrow end.
pub(super) fn hashed(scene: &Scene<'_>, axis: &Axis) -> Vec<Shape> {
    let style = scene.style;
    let half = 0.5 * style.wedge_width;
    let Some([a, b]) = scene.trims(
        axis,
        &[0.0, 0.8 * half, -0.8 * half],
        0.5 * style.line_width,
    ) else {
        return Vec::new();
    };
    let length = axis.length - a - b;
    let is_vertex = |i: usize| scene.label(axis.ends[i]).is_none();
    let start = if is_vertex(0) {
        0.7 * style.hash_pitch
    } else {
        0.3 * style.hash_pitch
    };
    let start = start.min(0.2 * length);
    // bonds that follow need the same room as the bars
    let end = if is_vertex(1) && scene.molecule().degree(axis.ends[1]) > 1 {
        (0.7 * style.hash_pitch).min(0.15 * length)
    } else {
        0.0
    };
    let span = length - start - end;
    let n = pieces(span + 0.4 * style.hash_pitch, style.hash_pitch, FEWEST_BARS);
    let mut path = BezPath::new();
    for i in 0..n {
        let along = start + span * share(i, n);
        // round caps add half a line at both ends
        let reach = (half * along / length - 0.5 * style.line_width).max(0.35 * style.line_width);
        path.move_to(axis.at(a + along, reach));
        path.line_to(axis.at(a + along, -reach));
    }
    vec![Shape::Stroke(path, style.line_width)]
}

/// A wavy line: half waves in turn to either side.
pub(super) fn wavy(scene: &Scene<'_>, axis: &Axis) -> Vec<Shape> {
    let style = scene.style;
    let height = 0.5 * style.wedge_width;
    let Some([a, b]) = scene.trims(axis, &[0.0, height, -height], 0.5 * style.line_width) else {
        return Vec::new();
    };
    let length = axis.length - a - b;
    let n = pieces(length, 0.9 * style.hash_pitch, 4);
    let step = length / count(n);
    let mut path = BezPath::new();
    path.move_to(axis.at(a, 0.0));
    for i in 0..n {
        let from = a + step * count(i);
        // a parabola is half as high as its control point
        let aside = if i % 2 == 0 {
            2.0 * height
        } else {
            -2.0 * height
        };
        path.quad_to(axis.at(from + 0.5 * step, aside), axis.at(from + step, 0.0));
    }
    vec![Shape::Stroke(path, style.line_width)]
}
