//! Fused rings by construction: regular polygons, each set on the bonds it shares with those before.

use super::frame::Frame;
use crate::geom::{self, Point};
use std::f64::consts::{PI, TAU};

/// Corners of a regular polygon with sides of 1 about the origin, the first at `first` radians.
pub(super) fn polygon(size: usize, first: f64) -> Vec<Point> {
    let radius = 0.5 / (PI / size as f64).sin();
    (0..size)
        .map(|i| (radius * geom::unit(first + TAU * i as f64 / size as f64)).to_point())
        .collect()
}

/// `count` points on an arc from `p` to `q`, joined by sides of 1 and bulging to the left of the way
/// from `p` to `q`; where the way is too long the sides stretch along it.
pub(super) fn arc(p: Point, q: Point, count: usize) -> Vec<Point> {
    let sides = (count + 1) as f64;
    let chord = p.distance(q);
    let at = |i: usize| (i + 1) as f64 / sides;
    if chord >= 0.999 * sides {
        return (0..count).map(|i| p.lerp(q, at(i))).collect();
    }
    // each side spans the angle `a` of the circle: chord / side = sin(sides a / 2) / sin(a / 2)
    let (mut low, mut high) = (1e-9, TAU / sides);
    for _ in 0..60 {
        let a = (low + high) / 2.0;
        if (sides * a / 2.0).sin() / (a / 2.0).sin() > chord {
            low = a;
        } else {
            high = a;
        }
    }
    let a = (low + high) / 2.0;
    let mut heading = if chord > 1e-9 {
        geom::angle(q - p)
    } else {
        0.0
    } + sides * a / 2.0;
    heading -= a / 2.0;
    let mut at = p;
    (0..count)
        .map(|_| {
            at += geom::unit(heading);
            heading -= a;
            at
        })
        .collect()
}

/// Every atom of the block, ring after ring; `None` where a ring meets those before it in pieces.
pub(super) fn fused(frame: &Frame, rings: &[Vec<usize>]) -> Option<Vec<Point>> {
    let mut places: Vec<Option<Point>> = vec![None; frame.len()];
    let mut open: Vec<usize> = (0..rings.len()).collect();
    let first = *open.iter().max_by_key(|r| {
        // the ring with most neighbours lies in the middle
        let shares = rings.iter().filter(|o| shared(&rings[**r], o) >= 2).count();
        (shares, std::cmp::Reverse(**r))
    })?;
    open.retain(|r| *r != first);
    let start = polygon(rings[first].len(), PI / 2.0);
    for (a, p) in rings[first].iter().zip(start) {
        places[*a] = Some(p);
    }
    let mut done = vec![first];
    while !open.is_empty() {
        let known = |r: &usize| rings[*r].iter().filter(|a| places[**a].is_some()).count();
        // most of its atoms first: bays are closed before new rings are begun
        let next = *open.iter().filter(|r| known(r) >= 2).max_by_key(|r| {
            let missing = rings[**r].len() - known(r);
            (std::cmp::Reverse(missing), known(r), std::cmp::Reverse(**r))
        })?;
        open.retain(|r| *r != next);
        close(rings, &done, next, &mut places)?;
        done.push(next);
    }
    places.into_iter().collect()
}

fn shared(a: &[usize], b: &[usize]) -> usize {
    a.iter().filter(|x| b.contains(x)).count()
}

/// Places the missing atoms of a ring on the free side of those that are there.
fn close(
    rings: &[Vec<usize>],
    done: &[usize],
    next: usize,
    places: &mut [Option<Point>],
) -> Option<()> {
    let ring = &rings[next];
    let size = ring.len();
    let is_known = |i: usize| places[ring[i % size]].is_some();
    if (0..size).all(is_known) {
        return Some(());
    }
    let starts: Vec<usize> = (0..size)
        .filter(|i| is_known(*i) && !is_known(i + size - 1))
        .collect();
    let [start] = starts.as_slice() else {
        return None;
    };
    let path: Vec<usize> = (0..size)
        .take_while(|k| is_known(start + k))
        .map(|k| ring[(start + k) % size])
        .collect();
    let missing: Vec<usize> = (path.len()..size)
        .map(|k| ring[(start + k) % size])
        .collect();
    let (p, q) = (places[*path.last()?]?, places[*path.first()?]?);
    // away from what lies beside the shared bonds: the middle of a long path, else the rings there
    let beside = if path.len() > 2 {
        let inner: Vec<Point> = path[1..path.len() - 1]
            .iter()
            .filter_map(|a| places[*a])
            .collect();
        mean(&inner)
    } else {
        let others: Vec<Point> = done
            .iter()
            .filter(|d| path.iter().all(|a| rings[**d].contains(a)))
            .filter_map(|d| center(&rings[*d], places))
            .collect();
        if others.is_empty() {
            let all: Vec<Point> = places.iter().flatten().copied().collect();
            mean(&all)
        } else {
            mean(&others)
        }
    };
    let is_left = (q - p).cross(beside - p) > 0.0;
    let points = if is_left {
        let mut back = arc(q, p, missing.len());
        back.reverse();
        back
    } else {
        arc(p, q, missing.len())
    };
    for (a, point) in missing.iter().zip(points) {
        places[*a] = Some(point);
    }
    Some(())
}

fn center(ring: &[usize], places: &[Option<Point>]) -> Option<Point> {
    let points: Option<Vec<Point>> = ring.iter().map(|a| places[*a]).collect();
    points.map(|p| mean(&p))
}

/// Middle of some points; the origin if there is none.
pub(super) fn mean(points: &[Point]) -> Point {
    let n = points.len().max(1) as f64;
    let sum = points
        .iter()
        .fold(geom::Vec2::ZERO, |sum, p| sum + p.to_vec2());
    (sum / n).to_point()
}
