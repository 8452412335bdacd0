//! Faces of a block drawn without crossings, and points for it inside any one of them.
//!
//! Faces: Demoucron, Malgrange and Pertuiset 1964, from memory (one path after another is drawn into a face
//! that holds its ends). Points: Tutte 1963, from memory (the outer face on a circle, each other point in the
//! middle of its neighbours), here with a helper point in each face so that no two points fall together.

use super::frame::Frame;
use crate::geom::{self, Point, Vec2};
use std::collections::VecDeque;
use std::f64::consts::TAU;

/// Blocks with more atoms are not tried.
const MOST: usize = 700;

/// Faces of the block, each as its atoms in order; `None` if it cannot be drawn without crossings.
pub(super) fn faces(frame: &Frame) -> Option<Vec<Vec<usize>>> {
    let n = frame.len();
    if n > MOST {
        return None;
    }
    let start = frame.rings.first()?.clone();
    let mut drawn = vec![false; n];
    let mut done: Vec<[usize; 2]> = Vec::new();
    for (i, a) in start.iter().enumerate() {
        drawn[*a] = true;
        done.push(sorted(*a, start[(i + 1) % start.len()]));
    }
    done.sort_unstable();
    let mut faces = vec![start.clone(), start];
    while done.len() < frame.bonds.len() {
        let fragments = fragments(frame, &drawn, &done);
        let mut best: Option<(usize, usize, usize)> = None;
        for (f, fragment) in fragments.iter().enumerate() {
            let fits: Vec<usize> = (0..faces.len())
                .filter(|i| fragment.ends.iter().all(|e| faces[*i].contains(e)))
                .collect();
            let first = *fits.first()?;
            if best.is_none_or(|b| fits.len() < b.0) {
                best = Some((fits.len(), f, first));
            }
        }
        let (_, f, face) = best?;
        let path = path(frame, &fragments[f], &drawn)?;
        for pair in path.windows(2) {
            let bond = sorted(pair[0], pair[1]);
            if let Err(at) = done.binary_search(&bond) {
                done.insert(at, bond);
            }
        }
        for a in &path {
            drawn[*a] = true;
        }
        let (one, two) = split(&faces[face], &path)?;
        faces[face] = one;
        faces.push(two);
    }
    Some(faces)
}

fn sorted(a: usize, b: usize) -> [usize; 2] {
    [a.min(b), a.max(b)]
}

/// A piece that is not drawn yet: a single bond, or atoms that hang together, and where it is held.
struct Fragment {
    ends: Vec<usize>,
    inner: Vec<usize>,
}

fn fragments(frame: &Frame, drawn: &[bool], done: &[[usize; 2]]) -> Vec<Fragment> {
    let mut list: Vec<Fragment> = frame
        .bonds
        .iter()
        .map(|[a, b]| sorted(*a, *b))
        .filter(|[a, b]| drawn[*a] && drawn[*b] && done.binary_search(&[*a, *b]).is_err())
        .map(|ends| Fragment {
            ends: ends.to_vec(),
            inner: Vec::new(),
        })
        .collect();
    let mut seen = drawn.to_vec();
    for root in 0..frame.len() {
        if seen[root] {
            continue;
        }
        seen[root] = true;
        let (mut inner, mut ends) = (vec![root], Vec::new());
        let mut at = 0;
        while let Some(a) = inner.get(at).copied() {
            at += 1;
            for b in &frame.near[a] {
                if drawn[*b] {
                    ends.push(*b);
                } else if !seen[*b] {
                    seen[*b] = true;
                    inner.push(*b);
                }
            }
        }
        ends.sort_unstable();
        ends.dedup();
        list.push(Fragment { ends, inner });
    }
    list
}

/// A way through a fragment from one of its ends to another.
fn path(frame: &Frame, fragment: &Fragment, drawn: &[bool]) -> Option<Vec<usize>> {
    let start = *fragment.ends.first()?;
    if fragment.inner.is_empty() {
        return Some(fragment.ends.clone());
    }
    let mut from = vec![usize::MAX; frame.len()];
    let mut queue = VecDeque::from([start]);
    from[start] = start;
    while let Some(a) = queue.pop_front() {
        for b in &frame.near[a] {
            let inside = fragment.inner.contains(b);
            let is_goal = drawn[*b] && *b != start && a != start && fragment.ends.contains(b);
            if from[*b] != usize::MAX || !(inside || is_goal) {
                continue;
            }
            from[*b] = a;
            if is_goal {
                let mut path = vec![*b];
                let mut at = *b;
                while at != start {
                    at = from[at];
                    path.push(at);
                }
                return Some(path);
            }
            queue.push_back(*b);
        }
    }
    None
}

/// The two faces that a path makes of one.
fn split(face: &[usize], path: &[usize]) -> Option<(Vec<usize>, Vec<usize>)> {
    let (first, last) = (*path.first()?, *path.last()?);
    let at = face.iter().position(|a| *a == first)?;
    let turned: Vec<usize> = face[at..].iter().chain(&face[..at]).copied().collect();
    let cut = turned.iter().position(|a| *a == last)?;
    let mut one: Vec<usize> = turned[..=cut].to_vec();
    one.extend(path[1..path.len() - 1].iter().rev());
    let mut two: Vec<usize> = turned[cut..].to_vec();
    two.extend(&path[..path.len() - 1]);
    Some((one, two))
}

/// Points for a block whose face `outer` is to lie outside, without crossings; bonds of all lengths.
pub(super) fn points(frame: &Frame, faces: &[Vec<usize>], outer: usize) -> Vec<Point> {
    let n = frame.len();
    let mut near: Vec<Vec<usize>> = frame.near.iter().map(|l| l.to_vec()).collect();
    for face in faces.iter().enumerate().filter(|f| f.0 != outer) {
        let helper = near.len();
        near.push(face.1.clone());
        for a in face.1 {
            near[*a].push(helper);
        }
    }
    let ring = &faces[outer];
    let radius = ring.len() as f64 / TAU;
    let mut points = vec![Point::ORIGIN; near.len()];
    let mut fixed = vec![false; near.len()];
    for (i, a) in ring.iter().enumerate() {
        let angle = TAU * i as f64 / ring.len() as f64;
        points[*a] = (radius * geom::unit(angle)).to_point();
        fixed[*a] = true;
    }
    for _ in 0..(60 + 4 * n).min(1200) {
        let mut most = 0.0f64;
        for a in (0..near.len()).filter(|a| !fixed[*a]) {
            let sum = near[a]
                .iter()
                .fold(Vec2::ZERO, |sum, b| sum + points[*b].to_vec2());
            let next = (sum / near[a].len() as f64).to_point();
            most = most.max(next.distance(points[a]));
            points[a] = next;
        }
        if most < 1e-6 {
            break;
        }
    }
    points.truncate(n);
    points
}
