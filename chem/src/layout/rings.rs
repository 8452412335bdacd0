//! Ring systems: each block in the best of several ways, then the blocks joined at their spiro atoms.

use super::frame::Frame;
use super::judge::objections;
use super::macrocycle::{self, LARGEST_POLYGON};
use super::relax::{Spring, Springs, across};
use super::{fuse, invert, planar, space};
use crate::geom::{self, Point};
use std::f64::consts::PI;

/// A block drawn this well is not tried in other ways.
const GOOD: f64 = 0.25;
/// Faces tried as the outer one.
const OUTER: usize = 8;

/// Places of the atoms of a block, bonds of about 1.
pub(super) fn lay_block(frame: &Frame) -> Vec<Point> {
    let mut best = Best::default();
    let largest = frame.rings.last().map_or(0, Vec::len);
    if largest <= LARGEST_POLYGON {
        if let Some(mut points) = fuse::fused(frame, &frame.rings) {
            best.offer(frame, points.clone());
            if best.cost < GOOD {
                return best.points;
            }
            ring_springs(frame, &frame.rings).relax(&mut points, 500);
            best.offer(frame, points);
        }
        if best.cost < GOOD {
            return best.points;
        }
    }
    let second = frame
        .rings
        .len()
        .checked_sub(2)
        .map_or(0, |i| frame.rings[i].len());
    if second <= LARGEST_POLYGON && (largest > LARGEST_POLYGON || frame.rings.len() == 1) {
        best.offer_ring(frame);
    }
    if frame.rings.len() > 1 && best.cost > GOOD * 4.0 {
        best.offer_planar(frame);
        best.offer_views(frame);
    }
    if best.points.is_empty() {
        best.offer(frame, apart(frame));
    }
    best.points
}

/// The layout that least speaks against.
struct Best {
    cost: f64,
    points: Vec<Point>,
}

impl Default for Best {
    fn default() -> Best {
        Best {
            cost: f64::INFINITY,
            points: Vec::new(),
        }
    }
}

impl Best {
    fn offer(&mut self, frame: &Frame, points: Vec<Point>) {
        let cost = objections(frame, &points);
        self.take(cost, points);
    }

    fn take(&mut self, cost: f64, points: Vec<Point>) {
        if cost < self.cost - 1e-9 && points.iter().all(|p| p.is_finite()) {
            self.cost = cost;
            self.points = points;
        }
    }

    fn offer_ring(&mut self, frame: &Frame) {
        for points in macrocycle::shapes(frame, &lay_block) {
            self.take(macrocycle::objections(frame, &points), points);
        }
    }

    fn offer_planar(&mut self, frame: &Frame) {
        let Some(faces) = planar::faces(frame) else {
            return;
        };
        let mut order: Vec<usize> = (0..faces.len()).collect();
        order.sort_by_key(|f| (std::cmp::Reverse(faces[*f].len()), *f));
        for outer in order.into_iter().take(OUTER) {
            let mut points = planar::points(frame, &faces, outer);
            let inner: Vec<Vec<usize>> = (0..faces.len())
                .filter(|f| *f != outer)
                .map(|f| faces[f].clone())
                .collect();
            let springs = ring_springs(frame, &inner);
            springs.relax(&mut points, 900);
            if frame.pairs.iter().any(|p| !frame.meets(&points, p)) {
                for lighter in [true, false] {
                    let mut turned = points.clone();
                    invert::meet(frame, &springs, &mut turned, lighter);
                    self.offer_kinked(frame, turned);
                }
            }
            self.offer_kinked(frame, points);
        }
    }

    /// A layout as it is, and with the corners that lie in line with their neighbours pushed aside.
    fn offer_kinked(&mut self, frame: &Frame, points: Vec<Point>) {
        for side in [1.0, -1.0] {
            if let Some(kinked) = kinked(frame, &points, side) {
                self.offer(frame, kinked);
            }
        }
        self.offer(frame, points);
    }

    /// The best views, let go a little so that no bond is too short.
    fn offer_views(&mut self, frame: &Frame) {
        let mut views: Vec<(f64, Vec<Point>)> = space::views(frame)
            .into_iter()
            .map(|v| (objections(frame, &v), v))
            .collect();
        views.sort_by(|a, b| a.0.total_cmp(&b.0));
        for (_, mut points) in views.into_iter().take(4) {
            self.offer(frame, points.clone());
            view_springs(frame, &points).relax(&mut points, 60);
            self.offer_kinked(frame, points);
        }
    }
}

/// How far a corner is pushed out of the line of its neighbours.
const KINK: f64 = 0.32;

/// The layout with each run of corners that lie in line pushed to one side of its line; `None` if there
/// is no such run.
fn kinked(frame: &Frame, points: &[Point], side: f64) -> Option<Vec<Point>> {
    let is_hidden = |a: usize| match frame.near[a].as_slice() {
        [b, c] => {
            let angle = geom::between(points[*b] - points[a], points[*c] - points[a]);
            !frame.linear[a] && angle > 2.8
        }
        _ => false,
    };
    let hidden: Vec<usize> = (0..frame.len()).filter(|a| is_hidden(*a)).collect();
    let mut moved = points.to_vec();
    let mut done = vec![false; frame.len()];
    for start in &hidden {
        if done[*start] {
            continue;
        }
        done[*start] = true;
        let mut run = vec![*start];
        let mut at = 0;
        while let Some(a) = run.get(at).copied() {
            at += 1;
            for b in frame.near[a].iter().filter(|b| hidden.contains(b)) {
                if !done[*b] {
                    done[*b] = true;
                    run.push(*b);
                }
            }
        }
        let near = frame.near[*start].first()?;
        let across = geom::direction(points[*start], points[*near], 1e-6)?.turn_90();
        for a in run {
            moved[a] += across * (side * KINK);
        }
    }
    (!hidden.is_empty()).then_some(moved)
}

/// Springs that make each of some rings a regular polygon as far as that goes.
pub(super) fn ring_springs(frame: &Frame, rings: &[Vec<usize>]) -> Springs {
    let mut springs = Springs {
        apart: 0.9,
        push: 1.0,
        ..Springs::default()
    };
    for [a, b] in &frame.bonds {
        springs.list.push(Spring {
            ends: [*a, *b],
            length: 1.0,
            force: 4.0,
        });
    }
    for ring in rings {
        let n = ring.len();
        for i in 0..n {
            for k in 2..=n / 2 {
                let ends = [ring[i], ring[(i + k) % n]];
                if (2 * k == n && i >= k) || frame.joined(ends[0], ends[1]) {
                    continue;
                }
                let (length, force) = match n {
                    ..=8 => (across(n, k), 0.8),
                    _ if k == 2 && frame.linear[ring[(i + 1) % n]] => (2.0, 2.0),
                    // large rings only keep open
                    _ if k == 2 => (across(n, k), 0.25),
                    _ => (across(n, k), 0.4 / n as f64),
                };
                springs.list.push(Spring {
                    ends,
                    length,
                    force,
                });
            }
        }
    }
    springs
}

/// Springs that keep a view as it is but for bonds that are too short or too long.
fn view_springs(frame: &Frame, points: &[Point]) -> Springs {
    let mut springs = Springs {
        apart: 0.55,
        push: 1.0,
        ..Springs::default()
    };
    for i in 0..frame.len() {
        for j in i + 1..frame.len() {
            let now = points[i].distance(points[j]);
            let joined = frame.joined(i, j);
            if !joined && now < 0.55 {
                continue;
            }
            springs.list.push(Spring {
                ends: [i, j],
                length: if joined { now.clamp(0.78, 1.3) } else { now },
                force: if joined { 3.0 } else { 0.15 },
            });
        }
    }
    springs
}

/// Atoms as far apart as their bonds ask for: for what cannot be drawn without crossings.
fn apart(frame: &Frame) -> Vec<Point> {
    let n = frame.len();
    let mut points: Vec<Point> = fuse::polygon(n.max(3), PI / 2.0);
    points.truncate(n);
    let shrink = 2.0 / (n as f64).sqrt().max(1.0);
    for p in &mut points {
        *p = (p.to_vec2() * shrink).to_point();
    }
    let mut springs = Springs {
        apart: 1.6,
        push: 0.3,
        ..Springs::default()
    };
    for [a, b] in &frame.bonds {
        springs.list.push(Spring {
            ends: [*a, *b],
            length: 1.0,
            force: 3.0,
        });
    }
    springs.relax(&mut points, 800);
    springs.apart = 0.8;
    springs.relax(&mut points, 200);
    points
}
