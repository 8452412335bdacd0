//! Wished geometries in large rings drawn without crossings: one end of a double bond is pushed to the
//! other side of its neighbours, where it stays.

use super::frame::{Frame, RingPair};
use super::relax::{Spring, Springs};
use crate::geom::Point;

/// Distance of the outer atoms of four in a row: on one side, on different sides (angles of 120 degrees).
const SAME_SIDE: f64 = 2.0;
const OTHER_SIDE: f64 = 2.645_751_311_064_590_7;

/// Pushes ends of double bonds until the wishes are met, as far as that goes.
pub(super) fn meet(frame: &Frame, springs: &Springs, points: &mut [Point]) {
    let mut springs = springs.clone();
    let touched: Vec<usize> = frame.pairs.iter().flat_map(|p| p.ends).collect();
    // angles of 120 degrees at the double bonds, in place of those of a circle
    for s in &mut springs.list {
        let middle = frame.near[s.ends[0]]
            .iter()
            .find(|m| touched.contains(m) && frame.joined(**m, s.ends[1]));
        if middle.is_some() && s.force < 0.5 {
            s.length = 3.0f64.sqrt();
            s.force = 1.2;
        }
    }
    for p in &frame.pairs {
        springs.list.push(Spring {
            ends: p.ligands,
            length: if p.together { SAME_SIDE } else { OTHER_SIDE },
            force: 0.8,
        });
    }
    for _ in 0..3 {
        let unmet: Vec<&RingPair> = frame
            .pairs
            .iter()
            .filter(|p| !frame.meets(points, p))
            .collect();
        if unmet.is_empty() {
            return;
        }
        for pair in unmet {
            let end = pushed(frame, pair);
            through(frame, points, end);
        }
        springs.relax(points, 500);
    }
}

/// The end that carries less.
fn pushed(frame: &Frame, pair: &RingPair) -> usize {
    let weight = |a: usize| (frame.near[a].len(), frame.outside[a], frame.heavy[a]);
    let [a, b] = pair.ends;
    if weight(b) < weight(a) { b } else { a }
}

/// Mirrors an atom in the line through its first two neighbours.
fn through(frame: &Frame, points: &mut [Point], atom: usize) {
    if let [b, c, ..] = frame.near[atom].as_slice() {
        points[atom] = crate::geom::mirror(points[atom], points[*b], points[*c]);
    }
}
