//! The orientation of a part on the page: the long axis horizontal, bonds at 30 degrees and upright as in
//! hexagons that stand on a corner, rising to the right, chains to the right of rings.
//!
//! common practice, no source: the weights are matters of taste and were set by looking at drawings.

use super::assemble::Shapes;
use super::fuse::mean;
use super::graph::Graph;
use crate::element::Element;
use crate::geom::{self, Point, Vec2};
use crate::molecule::Order;
use kurbo::{Affine, Rect};
use std::f64::consts::{FRAC_PI_3, FRAC_PI_6};

/// What a wide drawing is worth, from -1 (all height) to 1 (all width).
const WIDE: f64 = 1.0;
/// What it is worth if all bonds stand at 30, 90 and 150 degrees.
const UPRIGHT: f64 = 0.6;
const RISING: f64 = 0.06;
const CHAINS_RIGHT: f64 = 0.08;
const ACID_RIGHT: f64 = 0.12;
const FIVE_RIGHT: f64 = 0.06;
const UP: f64 = 0.02;
/// What a wide fused ring system is worth, whatever hangs on it.
const RINGS_WIDE: f64 = 0.5;
/// Single atoms on fused corners (the methyl groups of steroids) point up.
const ANGULAR_UP: f64 = 0.05;

/// Turns and perhaps mirrors a part about its middle.
pub(super) fn turn(graph: &Graph, shapes: &Shapes, points: &mut [Point]) {
    let middle = mean(points);
    // the block with most rings, if it is a system of several
    let main = shapes
        .blocks
        .iter()
        .zip(&shapes.rings)
        .filter(|(_, rings)| rings.len() > 2)
        .max_by_key(|(b, rings)| (rings.len(), b.atoms.len(), std::cmp::Reverse(&b.atoms)))
        .map_or(&[][..], |(b, _)| b.atoms.as_slice());
    let base = FRAC_PI_6 - usual_angle(graph, points);
    let mut best: Option<(f64, Affine)> = None;
    for k in 0..12 {
        for mirror in [Affine::IDENTITY, Affine::FLIP_X] {
            let motion = mirror
                * Affine::rotate(base + f64::from(k) * FRAC_PI_6)
                * Affine::translate(-middle.to_vec2());
            let score = score((graph, shapes), main, points, motion);
            // equals are settled by the first: rounding must not decide
            if best.is_none_or(|b| score > b.0 + 1e-6) {
                best = Some((score, motion));
            }
        }
    }
    if let Some((_, motion)) = best {
        for p in points.iter_mut() {
            *p = motion * *p;
        }
    }
}

/// The angle, within 30 degrees, at which most bonds stand (ring bonds count double).
fn usual_angle(graph: &Graph, points: &[Point]) -> f64 {
    let mut angles: Vec<(f64, f64)> = graph
        .ends
        .iter()
        .zip(&graph.in_ring)
        .map(|([a, b], ring)| {
            let angle = geom::angle(points[*b] - points[*a]) % FRAC_PI_6;
            (angle, if *ring { 2.0 } else { 1.0 })
        })
        .collect();
    angles.sort_by(|a, b| a.0.total_cmp(&b.0));
    let slack = 0.03;
    let (mut best, mut most) = (0.0, 0.0);
    let n = angles.len();
    let mut sum = 0.0;
    let mut end = 0;
    // a window moves over the angles, round the end
    for start in 0..n {
        while end < start + n && {
            let ahead = angles[end % n].0 - angles[start].0;
            geom::turn(0.0, ahead + if end >= n { FRAC_PI_6 } else { 0.0 }) <= slack
        } {
            sum += angles[end % n].1;
            end += 1;
        }
        if sum > most + 1e-9 {
            most = sum;
            let last = angles[(end + n - 1) % n].0 + if end > n { FRAC_PI_6 } else { 0.0 };
            best = (angles[start].0 + last) / 2.0;
        }
        sum -= angles[start].1;
    }
    best
}

fn score(
    (graph, shapes): (&Graph, &Shapes),
    main: &[usize],
    points: &[Point],
    motion: Affine,
) -> f64 {
    let moved: Vec<Point> = points.iter().map(|p| motion * *p).collect();
    let rings: Vec<Point> = main.iter().map(|a| moved[*a]).collect();
    let (w, h) = extent(&moved);
    let (ring_w, ring_h) = extent(&rings);
    let (mut upright, mut all) = (0.0, 1e-9);
    for ([a, b], in_ring) in graph.ends.iter().zip(&graph.in_ring) {
        let angle = geom::angle(moved[*b] - moved[*a]) % FRAC_PI_3;
        let weight = if *in_ring { 2.0 } else { 1.0 };
        all += weight;
        if (angle - FRAC_PI_6).abs() < 0.06 {
            upright += weight;
        }
    }
    let upright = upright / all;
    let (mut along, mut across, mut square) = (0.0, 0.0, 1e-9);
    for p in &moved {
        along += p.x * p.y;
        across += p.x * p.x;
        square += p.y * p.y;
    }
    let rising = along / (across * square).sqrt().max(1e-9);
    let size = w.max(h);
    let lean = |pull: Vec2, weight: f64| weight * (pull.x / size).clamp(-1.0, 1.0);
    let [chains, acid, five, up] = pulls(graph, shapes, &moved);
    WIDE * (w - h) / (w + h)
        + RINGS_WIDE * (ring_w - ring_h) / (ring_w + ring_h)
        + ANGULAR_UP * angular(graph, &moved)
        + UPRIGHT * upright
        + RISING * rising.clamp(-1.0, 1.0)
        + lean(chains, CHAINS_RIGHT)
        + lean(acid, ACID_RIGHT)
        + lean(five, FIVE_RIGHT)
        + UP * (up.y / size).clamp(-1.0, 1.0)
}

/// Width and height of what some points take up, with room for the atoms.
fn extent(points: &[Point]) -> (f64, f64) {
    let first = points.first().copied().unwrap_or_default();
    let bounds = points
        .iter()
        .fold(Rect::from_points(first, first), |r, p| r.union_pt(*p));
    (bounds.width() + 1.0, bounds.height() + 1.0)
}

/// How far up, from -1 to 1, single atoms on corners of several rings point.
fn angular(graph: &Graph, points: &[Point]) -> f64 {
    let ring_bonds = |a: usize| {
        graph.near[a]
            .iter()
            .filter(|l| graph.in_ring[l.bond])
            .count()
    };
    let (mut sum, mut count) = (0.0, 0.0);
    for a in (0..graph.len()).filter(|a| ring_bonds(*a) > 2) {
        for l in graph.near[a].iter().filter(|l| graph.near[l.to].len() == 1) {
            sum += points[l.to].y - points[a].y;
            count += 1.0;
        }
    }
    if count > 0.0 { sum / count } else { 0.0 }
}

/// Where chains lie as seen from rings, acids and esters as seen from amines, five-rings as seen from
/// rings, and hetero atoms as seen from all.
fn pulls(graph: &Graph, shapes: &Shapes, points: &[Point]) -> [Vec2; 4] {
    let middle = |which: &dyn Fn(usize) -> bool| {
        let some: Vec<Point> = (0..graph.len())
            .filter(|a| which(*a))
            .map(|a| points[a])
            .collect();
        (!some.is_empty()).then(|| mean(&some))
    };
    let in_ring = |a: usize| graph.near[a].iter().any(|l| graph.in_ring[l.bond]);
    let between = |a: Option<Point>, b: Option<Point>| match (a, b) {
        (Some(a), Some(b)) => a - b,
        _ => Vec2::ZERO,
    };
    let chains = between(middle(&|a| !in_ring(a)), middle(&in_ring));
    let is = |a: usize, e: Element| graph.element[a] == e;
    let near = |a: usize| graph.near[a].iter();
    let carbonyl = |a: usize| {
        is(a, Element::C)
            && near(a).any(|l| is(l.to, Element::O) && graph.order[l.bond] == Order::Double)
    };
    let amine = middle(&|a| is(a, Element::N) && !near(a).any(|l| carbonyl(l.to)));
    let acid = between(
        middle(&|a| carbonyl(a) && near(a).filter(|l| is(l.to, Element::O)).count() > 1),
        amine.or(Some(mean(points))),
    );
    let in_five = |a: usize| {
        let rings = shapes.of_atom[a].iter().flat_map(|b| &shapes.rings[*b]);
        rings.filter(|r| r.len() == 5).any(|r| r.contains(&a))
    };
    let five = between(middle(&in_five), middle(&in_ring));
    let hetero = between(
        middle(&|a| !is(a, Element::C) && !is(a, Element::H)),
        Some(mean(points)),
    );
    [chains, acid, five, hetero]
}
