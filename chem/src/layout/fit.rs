//! One set of points laid on another by turning, shifting and, if allowed, mirroring.

use super::fuse::mean;
use crate::geom::Point;
use kurbo::Affine;

/// The motion that brings `from` nearest to `to` (least squares), point by point.
pub(super) fn onto(from: &[Point], to: &[Point], may_mirror: bool) -> Affine {
    let plain = turned(from, to, Affine::IDENTITY);
    if !may_mirror {
        return plain;
    }
    let mirrored = turned(from, to, Affine::FLIP_Y);
    if misfit(from, to, plain) <= misfit(from, to, mirrored) + 1e-9 {
        plain
    } else {
        mirrored
    }
}

fn turned(from: &[Point], to: &[Point], first: Affine) -> Affine {
    let from: Vec<Point> = from.iter().map(|p| first * *p).collect();
    let (a, b) = (mean(&from), mean(to));
    let (mut along, mut across) = (0.0, 0.0);
    for (p, q) in from.iter().zip(to) {
        let (v, w) = (*p - a, *q - b);
        along += v.dot(w);
        across += v.cross(w);
    }
    Affine::translate(b.to_vec2())
        * Affine::rotate(across.atan2(along))
        * Affine::translate(-a.to_vec2())
        * first
}

/// Sum of squared distances that remain.
pub(super) fn misfit(from: &[Point], to: &[Point], by: Affine) -> f64 {
    from.iter()
        .zip(to)
        .map(|(p, q)| (by * *p).distance_squared(*q))
        .sum()
}
