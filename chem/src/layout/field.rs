//! Who stands near whom: a grid over atoms and bonds, and what it costs when they come too near.

use super::graph::Graph;
use crate::geom::{self, Point};
use std::cell::Cell;

/// Atoms that are not joined should keep this distance.
pub(super) const APART: f64 = 0.85;
/// Atoms nearer than this can be taken for one.
const MERGED: f64 = 0.5;
/// Atoms should keep this distance from bonds.
const OFF_BOND: f64 = 0.3;
const CROSSING: f64 = 2.0;
/// Longer than half of any bond, so that what meets lies in neighbouring cells.
const CELL: f64 = 1.7;

type Square = (i32, i32);

/// Numbers sorted into cells; cells share buckets by a fixed rule.
struct Grid {
    /// Where each bucket begins in `items`.
    first: Vec<usize>,
    items: Vec<(Square, usize)>,
}

fn cell(p: Point) -> Square {
    // drawings are some thousand bonds wide at most; a cast of more saturates
    ((p.x / CELL).floor() as i32, (p.y / CELL).floor() as i32)
}

impl Grid {
    fn new(points: &[Point]) -> Grid {
        let size = (2 * points.len()).next_power_of_two();
        let mut grid = Grid {
            first: vec![0; size + 1],
            items: vec![((0, 0), 0); points.len()],
        };
        let cells: Vec<Square> = points.iter().map(|p| cell(*p)).collect();
        let buckets: Vec<usize> = cells.iter().map(|c| grid.bucket(*c)).collect();
        for b in &buckets {
            grid.first[b + 1] += 1;
        }
        for b in 0..size {
            grid.first[b + 1] += grid.first[b];
        }
        let mut next = grid.first.clone();
        for (i, b) in buckets.iter().enumerate() {
            grid.items[next[*b]] = (cells[i], i);
            next[*b] += 1;
        }
        grid
    }

    fn bucket(&self, (x, y): Square) -> usize {
        let mask = self.first.len() - 2;
        let mixed = (x as u32).wrapping_mul(0x9e37_79b1) ^ (y as u32).wrapping_mul(0x85eb_ca77);
        (mixed ^ (mixed >> 15)) as usize & mask
    }

    /// What lies in the cell of a point and the eight round it.
    fn around(&self, p: Point) -> impl Iterator<Item = usize> + '_ {
        let (x, y) = cell(p);
        (0..9).flat_map(move |k| {
            let here = (x.saturating_add(k % 3 - 1), y.saturating_add(k / 3 - 1));
            let bucket = self.bucket(here);
            self.items[self.first[bucket]..self.first[bucket + 1]]
                .iter()
                .filter(move |item| item.0 == here)
                .map(|item| item.1)
        })
    }
}

/// Atoms and bonds in cells.
pub(super) struct Field<'a> {
    graph: &'a Graph,
    atoms: Grid,
    bonds: Grid,
    /// Atoms and bonds looked at so far.
    looked: Cell<usize>,
}

impl<'a> Field<'a> {
    pub(super) fn new(graph: &'a Graph, points: &[Point]) -> Field<'a> {
        let middles: Vec<Point> = graph
            .ends
            .iter()
            .map(|[p, q]| points[*p].midpoint(points[*q]))
            .collect();
        Field {
            graph,
            atoms: Grid::new(points),
            bonds: Grid::new(&middles),
            looked: Cell::new(0),
        }
    }

    fn near_atoms(&self, p: Point) -> impl Iterator<Item = usize> + '_ {
        self.counted(self.atoms.around(p))
    }

    fn near_bonds(&self, p: Point) -> impl Iterator<Item = usize> + '_ {
        self.counted(self.bonds.around(p))
    }

    fn counted(&self, list: impl Iterator<Item = usize>) -> impl Iterator<Item = usize> {
        list.inspect(|_| self.looked.set(self.looked.get() + 1))
    }

    /// How many atoms and bonds were looked at since this was last asked.
    pub(super) fn work(&self) -> usize {
        self.looked.take()
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
            for b in self.near_atoms(p) {
                if !moves[b] && self.graph.bond(*a, b).is_none() {
                    sum += Field::nearness(p.distance(now(b)));
                }
            }
            for b in self.near_bonds(p) {
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
        for other in self.near_bonds(middle) {
            let [r, s] = self.graph.ends[other];
            if !moves[r] && !moves[s] && self.crosses(bond, other, now) {
                sum += CROSSING;
            }
        }
        for a in self.near_atoms(middle) {
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
            for b in self.near_atoms(*p) {
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
            for other in self.near_bonds(middle) {
                if other > bond && self.crosses(bond, other, &now) {
                    list.push((CROSSING, [*p, self.graph.ends[other][0]]));
                }
            }
            for a in self.near_atoms(middle) {
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
