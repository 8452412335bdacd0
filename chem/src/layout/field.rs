//! Who stands near whom: a grid over atoms and bonds, and what it costs when they come too near.

use super::graph::Graph;
use crate::geom::{self, Point};
use std::collections::BTreeMap;

/// Atoms that are not joined should keep this distance.
pub(super) const APART: f64 = 0.85;
/// Atoms nearer than this can be taken for one.
const MERGED: f64 = 0.5;
/// Atoms should keep this distance from bonds.
const OFF_BOND: f64 = 0.3;
const CROSSING: f64 = 2.0;
/// Longer than half of any bond, so that what meets lies in neighbouring cells.
const CELL: f64 = 1.7;

type Cell = (i32, i32);

/// Atoms and bonds in cells.
pub(super) struct Field<'a> {
    graph: &'a Graph,
    atoms: BTreeMap<Cell, Vec<usize>>,
    bonds: BTreeMap<Cell, Vec<usize>>,
}

fn cell(p: Point) -> Cell {
    // drawings are some thousand bonds wide at most; a cast of more saturates
    ((p.x / CELL).floor() as i32, (p.y / CELL).floor() as i32)
}

fn around(map: &BTreeMap<Cell, Vec<usize>>, p: Point) -> impl Iterator<Item = usize> + '_ {
    let (x, y) = cell(p);
    (x - 1..=x + 1).flat_map(move |i| {
        map.range((i, y - 1)..=(i, y + 1))
            .flat_map(|(_, list)| list.iter().copied())
    })
}

impl<'a> Field<'a> {
    pub(super) fn new(graph: &'a Graph, points: &[Point]) -> Field<'a> {
        let mut field = Field {
            graph,
            atoms: BTreeMap::new(),
            bonds: BTreeMap::new(),
        };
        for (i, p) in points.iter().enumerate() {
            field.atoms.entry(cell(*p)).or_default().push(i);
        }
        for (b, [p, q]) in graph.ends.iter().enumerate() {
            let middle = points[*p].midpoint(points[*q]);
            field.bonds.entry(cell(middle)).or_default().push(b);
        }
        field
    }

    /// What the nearness of two places costs, for atoms that are not joined.
    fn nearness(d: f64) -> f64 {
        if d >= APART {
            return 0.0;
        }
        let lack = (APART - d) / APART;
        2.0 * lack * lack + if d < MERGED { 1.5 } else { 0.0 }
    }

    /// Cost of what moves (`moves` says which atoms) against what stays, with all atoms at `now`. The
    /// field knows where those that stay are.
    pub(super) fn cost(
        &self,
        moving: &[usize],
        moves: &[bool],
        now: &dyn Fn(usize) -> Point,
    ) -> f64 {
        let mut sum = 0.0;
        for a in moving {
            let p = now(*a);
            for b in around(&self.atoms, p) {
                if !moves[b] && self.graph.bond(*a, b).is_none() {
                    sum += Field::nearness(p.distance(now(b)));
                }
            }
            for b in around(&self.bonds, p) {
                let [q, r] = self.graph.ends[b];
                if !moves[q] && !moves[r] {
                    sum += self.off_bond(*a, b, now);
                }
            }
            for l in &self.graph.near[*a] {
                if moves[l.to] && l.to < *a {
                    continue;
                }
                sum += self.bond_cost(l.bond, moves, now);
            }
        }
        sum
    }

    /// Cost of a moving bond against bonds and atoms that stay.
    fn bond_cost(&self, bond: usize, moves: &[bool], now: &dyn Fn(usize) -> Point) -> f64 {
        let [p, q] = self.graph.ends[bond];
        let middle = now(p).midpoint(now(q));
        let mut sum = 0.0;
        for other in around(&self.bonds, middle) {
            let [r, s] = self.graph.ends[other];
            if !moves[r] && !moves[s] && self.crosses(bond, other, now) {
                sum += CROSSING;
            }
        }
        for a in around(&self.atoms, middle) {
            if !moves[a] {
                sum += self.off_bond(a, bond, now);
            }
        }
        sum
    }

    fn off_bond(&self, atom: usize, bond: usize, now: &dyn Fn(usize) -> Point) -> f64 {
        let [p, q] = self.graph.ends[bond];
        if p == atom || q == atom {
            return 0.0;
        }
        let d = geom::distance_to_segment(now(atom), now(p), now(q));
        ((OFF_BOND - d) / OFF_BOND).max(0.0)
    }

    fn crosses(&self, a: usize, b: usize, now: &dyn Fn(usize) -> Point) -> bool {
        let ([p, q], [r, s]) = (self.graph.ends[a], self.graph.ends[b]);
        let apart = p != r && p != s && q != r && q != s;
        apart && geom::cross(now(p), now(q), now(r), now(s))
    }

    /// Pairs of atoms that stand for what is too near or crosses, the worst first.
    pub(super) fn conflicts(&self, points: &[Point]) -> Vec<(f64, [usize; 2])> {
        let now = |a: usize| points[a];
        let mut list: Vec<(f64, [usize; 2])> = Vec::new();
        for (a, p) in points.iter().enumerate() {
            for b in around(&self.atoms, *p) {
                if b > a && self.graph.bond(a, b).is_none() {
                    let cost = Field::nearness(p.distance(points[b]));
                    if cost > 0.02 {
                        list.push((cost, [a, b]));
                    }
                }
            }
        }
        for (bond, [p, q]) in self.graph.ends.iter().enumerate() {
            let middle = points[*p].midpoint(points[*q]);
            for other in around(&self.bonds, middle) {
                if other > bond && self.crosses(bond, other, &now) {
                    list.push((CROSSING, [*p, self.graph.ends[other][0]]));
                }
            }
            for a in around(&self.atoms, middle) {
                let cost = self.off_bond(a, bond, &now);
                if cost > 0.1 {
                    list.push((cost, [a, *p]));
                }
            }
        }
        list.sort_by(|a, b| b.0.total_cmp(&a.0).then(a.1.cmp(&b.1)));
        list
    }
}
