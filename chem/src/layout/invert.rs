//! Wished geometries in large rings drawn without crossings: one end of a double bond is pushed to the
//! other side of its neighbours, where it stays.

use super::frame::{Frame, RingPair};
use super::relax::{Height, Spring, Springs};
use crate::geom::{self, Point};

/// Distance of the outer atoms of four in a row: on one side, on different sides (angles of 120 degrees).
const SAME_SIDE: f64 = 2.0;
const OTHER_SIDE: f64 = 2.645_751_311_064_590_7;

/// How far off the line of its neighbours an end is put.
const OFF_LINE: f64 = 0.55;

/// Pushes ends of double bonds until the wishes are met, as far as that goes; first the ends that carry
/// less, or the others.
pub(super) fn meet(frame: &Frame, springs: &Springs, points: &mut [Point], lighter: bool) {
    let mut springs = springs.clone();
    let touched: Vec<usize> = frame.pairs.iter().flat_map(|p| p.ends).collect();
    // angles of 120 degrees at the double bonds, in place of those of a circle
    for s in &mut springs.list {
        let middle = frame.near[s.ends[0]]
            .iter()
            .find(|m| touched.contains(m) && frame.joined(**m, s.ends[1]));
        if middle.is_some() && s.force < 0.5 {
            s.length = 3.0f64.sqrt();
            s.force = 2.0;
        }
    }
    for p in &frame.pairs {
        springs.list.push(Spring {
            ends: p.ligands,
            length: if p.together { SAME_SIDE } else { OTHER_SIDE },
            force: 1.2,
        });
    }
    for round in 0..4 {
        let unmet: Vec<&RingPair> = frame
            .pairs
            .iter()
            .filter(|p| !frame.meets(points, p))
            .collect();
        if unmet.is_empty() {
            return;
        }
        for pair in unmet {
            let k = pushed(frame, pair, lighter == (round % 2 == 0));
            if let Some(height) = beyond(points, [pair.ligands[k], pair.ends[k], pair.ends[1 - k]])
            {
                // what was wished of this corner before no longer holds
                springs.heights.retain(|h| h.points[1] != pair.ends[k]);
                springs.heights.push(height);
            }
        }
        springs.relax(points, 500);
    }
}

/// The end that carries less, or the other.
fn pushed(frame: &Frame, pair: &RingPair, lighter: bool) -> usize {
    let weight = |k: usize| {
        let a = pair.ends[k];
        (frame.near[a].len(), frame.outside[a], frame.heavy[a])
    };
    usize::from((weight(1) < weight(0)) == lighter)
}

/// Brings the middle one of three atoms to the other side of the line through the others; what keeps it
/// there.
fn beyond(points: &mut [Point], [p, a, q]: [usize; 3]) -> Option<Height> {
    let way = geom::direction(points[p], points[q], 1e-6)?;
    let side = way.cross(points[a] - points[p]).signum();
    points[a] = points[p].midpoint(points[q]) - way.turn_90() * (side * OFF_LINE);
    Some(Height {
        points: [p, a, q],
        off: -side * OFF_LINE,
        force: 2.0,
    })
}
