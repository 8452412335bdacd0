//! A block as a model in space, seen from the side that shows it best: cages and bridged rings as they
//! are drawn by hand.

use super::frame::Frame;
use super::graph::mixed;
use crate::geom::Point;
use std::f64::consts::PI;

type Spot = [f64; 3];

/// Larger blocks are not tried.
pub(super) const MOST: usize = 40;
const MODELS: u64 = 6;
const STEPS: usize = 500;
/// Directions from which a model is looked at.
const VIEWS: usize = 120;

/// Views of a model of the block, scaled so that its bonds are about 1 on paper.
pub(super) fn views(frame: &Frame) -> Vec<Vec<Point>> {
    if frame.len() > MOST {
        return Vec::new();
    }
    let pairs = wanted(frame);
    let best = (0..MODELS)
        .map(|seed| model(frame.len(), &pairs, seed))
        .min_by(|a, b| a.0.total_cmp(&b.0));
    let Some((_, spots)) = best else {
        return Vec::new();
    };
    (0..VIEWS).map(|k| view(frame, &spots, k)).collect()
}

/// Distance wished for two atoms, and how strongly; apart pairs only push.
struct Wanted {
    ends: [usize; 2],
    length: f64,
    force: f64,
    only_apart: bool,
}

fn wanted(frame: &Frame) -> Vec<Wanted> {
    let mut list = Vec::new();
    for i in 0..frame.len() {
        for j in i + 1..frame.len() {
            let ends = [i, j];
            let bonded = frame.joined(i, j);
            let middle = frame.near[i].iter().find(|m| frame.near[**m].contains(&j));
            list.push(match (bonded, middle) {
                (true, _) => Wanted {
                    ends,
                    length: 1.0,
                    force: 3.0,
                    only_apart: false,
                },
                (false, Some(m)) => Wanted {
                    ends,
                    length: two_bonds(frame, i, *m, j),
                    force: 1.0,
                    only_apart: false,
                },
                _ => Wanted {
                    ends,
                    length: 2.3,
                    force: 0.2,
                    only_apart: true,
                },
            });
        }
    }
    list
}

/// Distance over two bonds: that of the smallest ring they lie in, at most a tetrahedral angle.
fn two_bonds(frame: &Frame, a: usize, middle: usize, b: usize) -> f64 {
    let tetrahedral = (8.0f64 / 3.0).sqrt();
    frame
        .rings
        .iter()
        .filter(|r| [a, middle, b].iter().all(|x| r.contains(x)))
        .map(|r| 2.0 * (PI / 2.0 - PI / r.len() as f64).sin())
        .fold(tetrahedral, f64::min)
}

/// A model and how far it is from what is wished.
fn model(n: usize, pairs: &[Wanted], seed: u64) -> (f64, Vec<Spot>) {
    let number = |i: usize, k: u64| {
        let bits = mixed(mixed(seed * 1_000_003 + i as u64) ^ (k + 1)) >> 11;
        bits as f64 / (1u64 << 53) as f64 - 0.5
    };
    let size = (n as f64).cbrt() * 1.5;
    let mut spots: Vec<Spot> = (0..n)
        .map(|i| [0, 1, 2].map(|k| size * number(i, k)))
        .collect();
    let mut speed = vec![[0.0; 3]; n];
    let mut strain = 0.0;
    for step in 0..STEPS {
        let mut force = vec![[0.0; 3]; n];
        strain = 0.0;
        for w in pairs {
            let [i, j] = w.ends;
            let v = [0, 1, 2].map(|k| spots[j][k] - spots[i][k]);
            let d = (v[0] * v[0] + v[1] * v[1] + v[2] * v[2]).sqrt().max(1e-6);
            if w.only_apart && d >= w.length {
                continue;
            }
            let off = d - w.length;
            strain += w.force * off * off;
            for k in 0..3 {
                let by = 2.0 * w.force * off * v[k] / d;
                force[i][k] += by;
                force[j][k] -= by;
            }
        }
        let drag = if step < STEPS / 2 { 0.85 } else { 0.7 };
        for i in 0..n {
            for k in 0..3 {
                speed[i][k] = drag * speed[i][k] + 0.04 * force[i][k];
                spots[i][k] += speed[i][k].clamp(-0.2, 0.2);
            }
        }
    }
    (strain, spots)
}

/// The model seen along the `k`th of directions spread evenly over half a sphere.
fn view(frame: &Frame, spots: &[Spot], k: usize) -> Vec<Point> {
    let z = (k as f64 + 0.5) / VIEWS as f64;
    let turn = k as f64 * PI * (3.0 - 5.0f64.sqrt());
    let r = (1.0 - z * z).sqrt();
    let (x, y) = (r * turn.cos(), r * turn.sin());
    // two directions across the line of sight
    let u = [-turn.sin(), turn.cos(), 0.0];
    let w = [
        y * u[2] - z * u[1],
        z * u[0] - x * u[2],
        x * u[1] - y * u[0],
    ];
    let dot = |s: &Spot, d: &Spot| s[0] * d[0] + s[1] * d[1] + s[2] * d[2];
    let flat: Vec<Point> = spots
        .iter()
        .map(|s| Point::new(dot(s, &u), dot(s, &w)))
        .collect();
    let sum: f64 = frame
        .bonds
        .iter()
        .map(|[a, b]| flat[*a].distance(flat[*b]))
        .sum();
    let scale = frame.bonds.len() as f64 / sum.max(1e-6);
    flat.iter()
        .map(|p| (scale * p.to_vec2()).to_point())
        .collect()
}
