//! Points and turns in the plane of the drawing.
//!
//! Coordinates: x right, y up. Angles are in radians, anticlockwise from the x axis, unless a
//! name says degrees.

use std::f64::consts::{PI, TAU};

pub use kurbo::{Point, Vec2};

/// Direction from `from` to `to` as a vector of length 1; `None` if the two coincide within `slack`.
pub fn direction(from: Point, to: Point, slack: f64) -> Option<Vec2> {
    let v = to - from;
    let length = v.hypot();
    (length > slack && length.is_finite()).then(|| v / length)
}

/// Angle of a vector, in `0 .. 2π`.
pub fn angle(v: Vec2) -> f64 {
    let a = v.y.atan2(v.x);
    if a < 0.0 { a + TAU } else { a }
}

/// The vector of length 1 at `angle` radians.
pub fn unit(angle: f64) -> Vec2 {
    Vec2::new(angle.cos(), angle.sin())
}

/// Smallest angle between two directions, in `0 ..= π`.
pub fn between(a: Vec2, b: Vec2) -> f64 {
    a.cross(b).atan2(a.dot(b)).abs()
}

/// Anticlockwise turn from angle `a` to angle `b`, in `0 .. 2π`.
pub fn turn(a: f64, b: f64) -> f64 {
    let t = (b - a) % TAU;
    if t < 0.0 { t + TAU } else { t }
}

/// The middle of the widest gap between directions that leave one point, and the width of that gap.
///
/// With no direction the gap is the full circle and its middle points right; with one direction the
/// middle points straight away from it.
pub fn widest_gap(directions: &[Vec2]) -> (f64, f64) {
    gaps(directions).into_iter().fold(
        (0.0, 0.0),
        |best: (f64, f64), gap| {
            if gap.1 > best.1 + 1e-9 { gap } else { best }
        },
    )
}

/// Every gap between neighbouring directions: its middle angle and its width, in angular order.
pub fn gaps(directions: &[Vec2]) -> Vec<(f64, f64)> {
    let mut angles: Vec<f64> = directions.iter().map(|d| angle(*d)).collect();
    angles.sort_by(f64::total_cmp);
    match angles.as_slice() {
        [] => vec![(0.0, TAU)],
        [only] => vec![((only + PI) % TAU, TAU)],
        _ => (0..angles.len())
            .map(|i| {
                let from = angles[i];
                let wide = turn(from, angles[(i + 1) % angles.len()]);
                ((from + wide / 2.0) % TAU, wide)
            })
            .collect(),
    }
}

/// Mirror image of `p` in the line through `a` and `b`.
pub fn mirror(p: Point, a: Point, b: Point) -> Point {
    let axis = b - a;
    let square = axis.hypot2();
    if square <= 0.0 {
        return p;
    }
    let v = p - a;
    a + axis * (2.0 * v.dot(axis) / square) - v
}

/// `p` turned about `centre` by `angle` radians, anticlockwise.
pub fn rotate(p: Point, centre: Point, angle: f64) -> Point {
    let (s, c) = angle.sin_cos();
    let v = p - centre;
    centre + Vec2::new(v.x * c - v.y * s, v.x * s + v.y * c)
}

/// Whether the segments `a b` and `c d` cross in their insides.
pub fn cross(a: Point, b: Point, c: Point, d: Point) -> bool {
    let side = |p: Point, q: Point, r: Point| (q - p).cross(r - p);
    side(a, b, c) * side(a, b, d) < 0.0 && side(c, d, a) * side(c, d, b) < 0.0
}

/// Distance from `p` to the segment `a b`.
pub fn distance_to_segment(p: Point, a: Point, b: Point) -> f64 {
    let v = b - a;
    let square = v.hypot2();
    let t = if square > 0.0 {
        ((p - a).dot(v) / square).clamp(0.0, 1.0)
    } else {
        0.0
    };
    (a + v * t).distance(p)
}

/// Middle value of a list (the upper one of two); `None` if it is empty.
pub fn median(mut values: Vec<f64>) -> Option<f64> {
    if values.is_empty() {
        return None;
    }
    let middle = values.len() / 2;
    let (_, value, _) = values.select_nth_unstable_by(middle, f64::total_cmp);
    Some(*value)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn widest_gap_points_away_from_the_bonds() {
        let (middle, wide) = widest_gap(&[unit(0.0), unit(PI / 2.0)]);
        assert!((middle - 1.25 * PI).abs() < 1e-9 && (wide - 1.5 * PI).abs() < 1e-9);
        let (middle, _) = widest_gap(&[unit(0.3)]);
        assert!((middle - (0.3 + PI)).abs() < 1e-9);
    }

    #[test]
    fn mirror_twice_is_nothing() {
        let (a, b, p) = (
            Point::new(1.0, 2.0),
            Point::new(-3.0, 0.5),
            Point::new(4.0, 4.0),
        );
        assert!(mirror(mirror(p, a, b), a, b).distance(p) < 1e-12);
        assert!((mirror(p, a, b).distance(a) - p.distance(a)).abs() < 1e-12);
    }
}
