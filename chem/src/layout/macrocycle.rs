//! Large rings: the turns of a lattice way, small rings at its outside, the wished geometries of its
//! double bonds.

use super::frame::Frame;
use super::fuse;
use super::judge;
use super::lattice::{self, Corner, Relation, Way};
use super::relax::{Height, Spring, Springs, across};
use crate::geom::{self, Point};
use std::f64::consts::{FRAC_PI_3, TAU};

/// Rings up to this size are regular polygons unless a wished geometry forbids it.
pub(super) const LARGEST_POLYGON: usize = 8;
/// Larger rings are circles.
const LARGEST_WAY: usize = 150;

/// A small ring or several fused ones that share one stretch with the large ring.
#[derive(Clone, Debug)]
struct Cluster {
    /// Atoms, in numbers of the frame.
    atoms: Vec<usize>,
    /// Their places, of the cluster on its own; the large ring's inside lies to the left of the stretch.
    points: Vec<Point>,
    /// First place of the stretch in the large ring, and its number of atoms.
    start: usize,
    count: usize,
}

/// Layouts of a block with one large ring, the likely best first; empty if it is not such a block.
/// `lay` lays out a smaller block.
pub(super) fn shapes(frame: &Frame, lay: &dyn Fn(&Frame) -> Vec<Point>) -> Vec<Vec<Point>> {
    let Some((ring, small)) = frame.rings.split_last() else {
        return Vec::new();
    };
    if ring.len() > LARGEST_WAY || small.iter().any(|r| r.len() > LARGEST_POLYGON) {
        return Vec::new();
    }
    let Some(clusters) = clusters(frame, ring, small, lay) else {
        return Vec::new();
    };
    let relations = relations(frame, ring);
    let corners = corners(frame, ring, &clusters);
    let mut shapes = Vec::new();
    for points in closed(&corners, &relations) {
        shapes.push(settled(frame, ring, &clusters, &relations, points));
    }
    shapes
}

/// The clusters of small rings; `None` if one meets the large ring in several stretches or not at all.
fn clusters(
    frame: &Frame,
    ring: &[usize],
    small: &[Vec<usize>],
    lay: &dyn Fn(&Frame) -> Vec<Point>,
) -> Option<Vec<Cluster>> {
    let mut groups: Vec<Vec<usize>> = Vec::new();
    for (i, r) in small.iter().enumerate() {
        let meets = |g: &Vec<usize>| g.iter().any(|j| small[*j].iter().any(|a| r.contains(a)));
        let (mut joined, rest): (Vec<_>, Vec<_>) = groups.into_iter().partition(meets);
        let mut merged = vec![i];
        merged.extend(joined.drain(..).flatten());
        groups = rest;
        groups.push(merged);
    }
    groups
        .iter()
        .map(|g| {
            let rings: Vec<Vec<usize>> = g.iter().map(|i| small[*i].clone()).collect();
            let (sub, atoms) = frame.sub(&rings)?;
            let n = ring.len();
            let inside = |i: usize| atoms.contains(&ring[i % n]);
            let starts: Vec<usize> = (0..n)
                .filter(|i| inside(*i) && !inside(i + n - 1))
                .collect();
            let [start] = starts.as_slice() else {
                return None;
            };
            let count = (0..n).take_while(|k| inside(start + k)).count();
            if count < 2 {
                return None;
            }
            let mut points = lay(&sub);
            outward(&mut points, &atoms, ring, *start, count);
            Some(Cluster {
                atoms,
                points,
                start: *start,
                count,
            })
        })
        .collect()
}

/// Mirrors a cluster if its atoms lie mostly to the left of the stretch it shares.
fn outward(points: &mut [Point], atoms: &[usize], ring: &[usize], start: usize, count: usize) {
    let stretch = stretch(points, atoms, ring, start, count);
    let (Some(p), Some(q)) = (stretch.first(), stretch.last()) else {
        return;
    };
    // off the stretch where there is anything, else the inner atoms of the stretch
    let on = |a: &usize| (0..count).any(|k| ring[(start + k) % ring.len()] == *a);
    let off: Vec<Point> = atoms
        .iter()
        .zip(points.iter())
        .filter(|(a, _)| !on(a))
        .map(|(_, p)| *p)
        .collect();
    let path_middle = fuse::mean(&stretch);
    let middle = fuse::mean(&off);
    let axis = *q - *p;
    if axis.cross(middle - path_middle) > 0.0 {
        for point in points.iter_mut() {
            point.y = -point.y;
        }
    }
}

fn stretch(
    points: &[Point],
    atoms: &[usize],
    ring: &[usize],
    start: usize,
    count: usize,
) -> Vec<Point> {
    (0..count)
        .filter_map(|k| {
            let a = ring[(start + k) % ring.len()];
            Some(points[atoms.iter().position(|x| *x == a)?])
        })
        .collect()
}

/// Wished geometries as relations of the turns at both ends of each ring bond.
fn relations(frame: &Frame, ring: &[usize]) -> Vec<Relation> {
    let n = ring.len();
    let place = |a: usize| ring.iter().position(|x| *x == a);
    let mut list = vec![Relation::Free; n];
    for pair in &frame.pairs {
        let (Some(i), Some(j)) = (place(pair.ends[0]), place(pair.ends[1])) else {
            continue;
        };
        let bond = match (j + n - i) % n {
            1 => i,
            d if d == n - 1 => j,
            _ => continue,
        };
        // told by the neighbours in this ring
        let mut alike = pair.together;
        for k in 0..2 {
            if !ring.contains(&pair.ligands[k])
                || !near_in_ring(ring, pair.ends[k], pair.ligands[k])
            {
                alike = !alike;
            }
        }
        list[bond] = if alike {
            Relation::Alike
        } else {
            Relation::Unlike
        };
    }
    list
}

fn near_in_ring(ring: &[usize], a: usize, b: usize) -> bool {
    let n = ring.len();
    (0..n).any(|i| {
        let next = ring[(i + 1) % n];
        (ring[i] == a && next == b) || (ring[i] == b && next == a)
    })
}

const NEVER: f64 = f64::INFINITY;

fn corners(frame: &Frame, ring: &[usize], clusters: &[Cluster]) -> Vec<Corner> {
    let n = ring.len();
    let mut corners: Vec<Corner> = ring
        .iter()
        .map(|a| {
            if frame.linear[*a] {
                return [NEVER, 0.0, NEVER];
            }
            // inward corners are for atoms that carry nothing
            let inward = match (frame.outside[*a], frame.heavy[*a]) {
                (0, _) => 0.15,
                // the ligand of a double bond can only point inside
                (1, _) if frame.double[*a] => 4.0,
                (1, false) => 1.5,
                (1, true) => 4.0,
                _ => 4.5,
            };
            [inward, NEVER, 0.0]
        })
        .collect();
    for cluster in clusters {
        let turns = cluster_turns(ring, cluster);
        for (k, turn) in turns.into_iter().enumerate() {
            let corner = &mut corners[(cluster.start + k) % n];
            *corner = [NEVER; 3];
            corner[match turn {
                t if t < -0.5 => 0,
                t if t > 0.5 => 2,
                _ => 1,
            }] = 0.0;
        }
    }
    corners
}

/// Turns along the stretch of a cluster, in units of 60 degrees; at its ends the large ring goes on in
/// the middle of the gap.
fn cluster_turns(ring: &[usize], cluster: &Cluster) -> Vec<f64> {
    let path = stretch(
        &cluster.points,
        &cluster.atoms,
        ring,
        cluster.start,
        cluster.count,
    );
    let n = path.len();
    let free = |at: Point| {
        let bonds: Vec<_> = cluster
            .points
            .iter()
            .map(|p| *p - at)
            .filter(|v| (0.3..1.35).contains(&v.hypot()))
            .collect();
        geom::unit(geom::widest_gap(&bonds).0)
    };
    (0..n)
        .map(|k| {
            let before = if k == 0 {
                -free(path[0])
            } else {
                path[k] - path[k - 1]
            };
            let after = if k + 1 == n {
                free(path[k])
            } else {
                path[k + 1] - path[k]
            };
            let turn = before.cross(after).atan2(before.dot(after)) / FRAC_PI_3;
            turn.clamp(-1.0, 1.0)
        })
        .collect()
}

/// Closed ways for the corners, the best first. Rings that no lattice way closes get one more corner,
/// which is taken out again.
fn closed(corners: &[Corner], relations: &[Relation]) -> Vec<Vec<Point>> {
    let n = corners.len();
    let mut found: Vec<Way> = lattice::ways(corners, relations);
    if found.is_empty() {
        let step = n.div_ceil(24);
        for at in (0..n).step_by(step) {
            if relations[at] != Relation::Free {
                continue;
            }
            let (mut more, mut related) = (corners.to_vec(), relations.to_vec());
            more.insert(at + 1, [NEVER, 0.4, 0.0]);
            related.insert(at + 1, Relation::Free);
            for mut way in lattice::ways(&more, &related).into_iter().take(3) {
                way.points.remove(at + 1);
                found.push(way);
            }
        }
        found.sort_by(|a, b| a.cost.total_cmp(&b.cost));
        found.truncate(8);
    }
    let mut list: Vec<Vec<Point>> = found.into_iter().map(|w| w.points).collect();
    if list.len() < 3 {
        // not by turns of 60 degrees, and the springs must close it
        list.extend(crooked(corners, relations));
    }
    list
}

/// A ring with outward corners all alike and as few inward ones as the relations ask for.
fn crooked(corners: &[Corner], relations: &[Relation]) -> Option<Vec<Point>> {
    let n = corners.len();
    let mut signs: Vec<f64> = corners
        .iter()
        .map(|c| match c {
            [_, _, left] if left.is_finite() => 1.0,
            [right, _, _] if right.is_finite() => -1.0,
            _ => 0.0,
        })
        .collect();
    for i in 0..n {
        let j = (i + 1) % n;
        if relations[i] == Relation::Unlike && signs[i] * signs[j] > 0.0 {
            let low = if corners[i][0] <= corners[j][0] { i } else { j };
            signs[low] = -1.0;
        }
    }
    let inward = signs.iter().filter(|s| **s < 0.0).count() as f64;
    let outward = signs.iter().filter(|s| **s > 0.0).count() as f64;
    if outward < 3.0 {
        return None;
    }
    let right = (40.0f64).to_radians();
    let left = (TAU + inward * right) / outward;
    let mut heading = 0.0;
    let mut at = Point::ORIGIN;
    let mut points = Vec::with_capacity(n);
    for s in &signs {
        points.push(at);
        heading += match s {
            s if *s > 0.0 => left,
            s if *s < 0.0 => -right,
            _ => 0.0,
        };
        at += geom::unit(heading);
    }
    // what is missing to close is shared out
    let gap = at - points[0];
    for (i, p) in points.iter_mut().enumerate() {
        *p -= gap * (i as f64 / n as f64);
    }
    Some(points)
}

/// The whole block: clusters set on the large ring, then let go.
fn settled(
    frame: &Frame,
    ring: &[usize],
    clusters: &[Cluster],
    relations: &[Relation],
    way: Vec<Point>,
) -> Vec<Point> {
    let n = ring.len();
    let mut points = vec![Point::ORIGIN; frame.len()];
    for (a, p) in ring.iter().zip(&way) {
        points[*a] = *p;
    }
    let mut list = Vec::new();
    for cluster in clusters {
        let goal: Vec<Point> = (0..cluster.count)
            .map(|k| way[(cluster.start + k) % n])
            .collect();
        let own = stretch(
            &cluster.points,
            &cluster.atoms,
            ring,
            cluster.start,
            cluster.count,
        );
        let place = super::fit::onto(&own, &goal, false);
        for (a, p) in cluster.atoms.iter().zip(&cluster.points) {
            points[*a] = place * *p;
        }
        for (i, a) in cluster.atoms.iter().enumerate() {
            for (j, b) in cluster.atoms.iter().enumerate().skip(i + 1) {
                let length = cluster.points[i].distance(cluster.points[j]);
                list.push(spring([*a, *b], length, 3.0));
            }
        }
    }
    list.extend(corner_springs(frame, ring, clusters, relations));
    let heights = corner_heights(ring, relations, &points);
    if n < 10 && relations.contains(&Relation::Unlike) {
        // no lattice way closes so small a ring: what keeps its inward corner is memory
        for i in 0..n {
            for j in i + 2..n {
                let length = points[ring[i]].distance(points[ring[j]]);
                list.push(spring([ring[i], ring[j]], length, 0.3));
            }
        }
    }
    let springs = Springs {
        list,
        heights,
        apart: 0.95,
        push: 1.0,
        fixed: Vec::new(),
    };
    springs.relax(&mut points, 600);
    points
}

fn spring(ends: [usize; 2], length: f64, force: f64) -> Spring {
    Spring {
        ends,
        length,
        force,
    }
}

/// What keeps the turns at both ends of a bond with a wished geometry as they are.
fn corner_heights(ring: &[usize], relations: &[Relation], points: &[Point]) -> Vec<Height> {
    let n = ring.len();
    let is_told =
        |i: usize| relations[i] != Relation::Free || relations[(i + n - 1) % n] != Relation::Free;
    (0..n)
        .filter(|i| is_told(*i))
        .filter_map(|i| {
            let [p, a, q] = [n - 1, 0, 1].map(|k| ring[(i + k) % n]);
            let way = geom::direction(points[p], points[q], 1e-6)?;
            let off = way.cross(points[a] - points[p]);
            Some(Height {
                points: [p, a, q],
                off: 0.5f64.copysign(off),
                force: 0.7,
            })
        })
        .collect()
}

/// Springs for bonds, corners and wished geometries of the large ring where no cluster holds them.
fn corner_springs(
    frame: &Frame,
    ring: &[usize],
    clusters: &[Cluster],
    relations: &[Relation],
) -> Vec<Spring> {
    let n = ring.len();
    let third = 3.0f64.sqrt();
    let crooked = relations.contains(&Relation::Unlike);
    let in_cluster = |a: usize, b: usize| {
        clusters
            .iter()
            .any(|c| c.atoms.contains(&a) && c.atoms.contains(&b))
    };
    let mut list = Vec::new();
    for i in 0..n {
        let [a, b, c] = [0, 1, 2].map(|k| ring[(i + k) % n]);
        if !in_cluster(a, b) {
            list.push(spring([a, b], 1.0, 4.0));
        }
        if !in_cluster(a, c) {
            let length = match frame.linear[b] {
                true => 2.0,
                false if crooked => third,
                false => corner_width(n),
            };
            list.push(spring([a, c], length, 0.7));
        }
        let before = ring[(i + n - 1) % n];
        match relations[i] {
            Relation::Free => {}
            Relation::Alike => list.push(spring([before, c], 2.0, 0.7)),
            Relation::Unlike => list.push(spring([before, c], 7.0f64.sqrt(), 0.7)),
        }
    }
    list
}

/// Distance over a corner: 120 degrees, wider in small rings that cannot be drawn in zigzags.
fn corner_width(n: usize) -> f64 {
    if n < 10 {
        f64::max(across(n, 2) * 0.96, 3.0f64.sqrt())
    } else {
        3.0f64.sqrt()
    }
}

/// What speaks against a shape beyond what speaks against any block: corners that nearly touch.
pub(super) fn objections(frame: &Frame, points: &[Point]) -> f64 {
    let mut sum = judge::objections(frame, points);
    let n = frame.len();
    for i in 0..n {
        for j in i + 1..n {
            if points[i].distance(points[j]) < 1.1 && !frame.joined(i, j) {
                sum += 0.3;
            }
        }
    }
    sum
}
