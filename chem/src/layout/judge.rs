//! How well a block is drawn: what a careful hand would object to, as one number.

use super::frame::Frame;
use super::relax::across;
use crate::geom::{self, Point};

/// Weights of objections; the scale is that of one crossing of two bonds.
const CROSSING: f64 = 1.0;
const LENGTH: f64 = 6.0;
const NEAR: f64 = 5.0;
const ON_BOND: f64 = 4.0;
const NARROW: f64 = 1.6;
const RING: f64 = 0.9;
const STUB: f64 = 1.2;
/// A corner that cannot be seen, because its two bonds are in line.
const STRAIGHT: f64 = 0.35;
const WISH: f64 = 60.0;
/// Atoms that are not joined should keep this distance.
const APART: f64 = 0.8;
/// Atoms should keep this distance from bonds.
const OFF_BOND: f64 = 0.4;
/// Bonds of one atom should keep this angle.
const WIDE: f64 = 0.9;

/// The sum of all objections; 0 for regular polygons side by side.
pub(super) fn objections(frame: &Frame, points: &[Point]) -> f64 {
    lengths(frame, points)
        + distances(frame, points)
        + on_bonds(frame, points)
        + angles(frame, points)
        + regular(frame, points)
        + stubs(frame, points)
        + frame
            .pairs
            .iter()
            .filter(|p| !frame.meets(points, p))
            .count() as f64
            * WISH
}

fn lengths(frame: &Frame, points: &[Point]) -> f64 {
    frame
        .bonds
        .iter()
        .map(|[a, b]| {
            let off = points[*a].distance(points[*b]).max(0.05).ln();
            // far off is worse than twice as bad as half of it
            LENGTH * (off * off + 8.0 * off.abs().powi(4))
        })
        .sum()
}

/// Pairs of items whose intervals on the x axis overlap, found by sweeping.
fn sweep(spans: &[(f64, f64)], mut see: impl FnMut(usize, usize)) {
    let mut order: Vec<usize> = (0..spans.len()).collect();
    order.sort_by(|a, b| spans[*a].0.total_cmp(&spans[*b].0).then(a.cmp(b)));
    for (k, i) in order.iter().enumerate() {
        for j in &order[k + 1..] {
            if spans[*j].0 > spans[*i].1 {
                break;
            }
            see(*i, *j);
        }
    }
}

fn distances(frame: &Frame, points: &[Point]) -> f64 {
    let spans: Vec<_> = points.iter().map(|p| (p.x, p.x + APART)).collect();
    let mut sum = 0.0;
    sweep(&spans, |i, j| {
        let d = points[i].distance(points[j]);
        if d < APART && !frame.joined(i, j) {
            let lack = (APART - d) / APART;
            sum += NEAR * lack * lack;
        }
    });
    sum
}

fn on_bonds(frame: &Frame, points: &[Point]) -> f64 {
    let mut sum = 0.0;
    let span = |b: &[usize; 2], by: f64| {
        let (x, y) = (points[b[0]].x, points[b[1]].x);
        (x.min(y) - by, x.max(y) + by)
    };
    let bonds: Vec<_> = frame.bonds.iter().map(|b| span(b, 0.0)).collect();
    sweep(&bonds, |i, j| {
        let ([a, b], [c, d]) = (frame.bonds[i], frame.bonds[j]);
        let apart = a != c && a != d && b != c && b != d;
        if apart && geom::cross(points[a], points[b], points[c], points[d]) {
            sum += CROSSING;
        }
    });
    let n = points.len();
    let mut both: Vec<_> = points.iter().map(|p| (p.x, p.x)).collect();
    both.extend(frame.bonds.iter().map(|b| span(b, OFF_BOND)));
    sweep(&both, |i, j| {
        let (atom, bond) = match (i < n, j < n) {
            (true, false) => (i, j - n),
            (false, true) => (j, i - n),
            _ => return,
        };
        let [a, b] = frame.bonds[bond];
        if a == atom || b == atom {
            return;
        }
        let d = geom::distance_to_segment(points[atom], points[a], points[b]);
        if d < OFF_BOND {
            let lack = (OFF_BOND - d) / OFF_BOND;
            sum += ON_BOND * lack * lack;
        }
    });
    sum
}

fn angles(frame: &Frame, points: &[Point]) -> f64 {
    (0..frame.len())
        .map(|a| {
            let bonds: Vec<_> = frame.near[a]
                .iter()
                .map(|b| points[*b] - points[a])
                .collect();
            let narrow: f64 = geom::gaps(&bonds)
                .iter()
                .filter(|(_, wide)| *wide < WIDE)
                .map(|(_, wide)| {
                    let lack = (WIDE - wide) / WIDE;
                    NARROW * lack * lack
                })
                .sum();
            // three bonds of which two are in line say nothing about a wedge on the third
            let tee = bonds.len() == 3
                && geom::gaps(&bonds)
                    .iter()
                    .any(|(_, wide)| (wide - std::f64::consts::PI).abs() < 0.12);
            let hidden = bonds.len() == 2
                && frame.outside[a] == 0
                && !frame.linear[a]
                && geom::between(bonds[0], bonds[1]) > 2.85;
            narrow + if tee { 0.25 } else { 0.0 } + if hidden { STRAIGHT } else { 0.0 }
        })
        .sum()
}

/// Small rings should be regular polygons.
fn regular(frame: &Frame, points: &[Point]) -> f64 {
    frame
        .rings
        .iter()
        .filter(|r| (5..=7).contains(&r.len()))
        .map(|ring| {
            let n = ring.len();
            let ideal = across(n, 2);
            let off: f64 = (0..n)
                .map(|i| {
                    let d = points[ring[i]].distance(points[ring[(i + 2) % n]]) - ideal;
                    d * d
                })
                .sum();
            RING * off / n as f64
        })
        .sum()
}

/// What hangs on the block needs room.
fn stubs(frame: &Frame, points: &[Point]) -> f64 {
    let mut ends: Vec<(usize, Point)> = Vec::new();
    for a in 0..frame.len() {
        for angle in frame.stubs(points, a) {
            ends.push((a, points[a] + geom::unit(angle)));
        }
    }
    let weight = |a: usize| if frame.heavy[a] { 2.0 * STUB } else { STUB };
    let mut sum = 0.0;
    for (k, (a, end)) in ends.iter().enumerate() {
        for (b, p) in points.iter().enumerate() {
            let d = p.distance(*end);
            if b != *a && d < APART {
                let lack = (APART - d) / APART;
                sum += weight(*a) * lack * lack * 4.0;
            }
        }
        for (b, other) in &ends[k + 1..] {
            let d = other.distance(*end);
            if b != a && d < APART {
                let lack = (APART - d) / APART;
                sum += weight(*a) * lack * lack * 2.5;
            }
        }
        for [p, q] in &frame.bonds {
            if p != a && q != a && geom::cross(points[*a], *end, points[*p], points[*q]) {
                sum += weight(*a) * 0.8;
            }
        }
    }
    sum
}
