//! A whole part from its blocks and chains, from the root of its tree outwards.

use super::chains::{self, Item};
use super::cycles::Block;
use super::frame::Frame;
use super::graph::Graph;
use super::tree::{ROOT, Reach, Tree};
use crate::geom::{self, Point, Vec2};
use crate::molecule::Order;
use kurbo::Affine;
use std::f64::consts::{PI, TAU};

/// Blocks of a part, each with a layout of its own.
#[derive(Clone, Debug)]
pub(super) struct Shapes {
    pub(super) blocks: Vec<Block>,
    pub(super) points: Vec<Vec<Point>>,
    /// Blocks of each atom.
    pub(super) of_atom: Vec<Vec<usize>>,
    /// Rings of each block.
    pub(super) rings: Vec<Vec<Vec<usize>>>,
}

/// Nothing is drawn inside rings up to this size.
const LARGEST_FULL: usize = 9;

impl Shapes {
    pub(super) fn new(graph: &Graph) -> Shapes {
        let blocks = graph.blocks.clone();
        let (mut points, mut rings) = (Vec::new(), Vec::new());
        for b in &blocks {
            let frame = Frame::new(graph, b);
            points.push(super::rings::lay_block(&frame));
            let named = |r: &Vec<usize>| r.iter().map(|a| frame.atoms[*a]).collect();
            rings.push(frame.rings.iter().map(named).collect());
        }
        let mut of_atom = vec![Vec::new(); graph.len()];
        for (i, b) in blocks.iter().enumerate() {
            for a in &b.atoms {
                of_atom[*a].push(i);
            }
        }
        Shapes {
            blocks,
            points,
            of_atom,
            rings,
        }
    }

    /// Whether three atoms lie in a small ring.
    fn in_small_ring(&self, atoms: [usize; 3]) -> bool {
        self.of_atom[atoms[0]]
            .iter()
            .flat_map(|b| &self.rings[*b])
            .any(|r| r.len() <= LARGEST_FULL && atoms.iter().all(|a| r.contains(a)))
    }

    /// Where the block's own layout has an atom of the block.
    fn point(&self, block: usize, atom: usize) -> Point {
        match self.blocks[block].atoms.binary_search(&atom) {
            Ok(i) => self.points[block][i],
            Err(_) => Point::ORIGIN,
        }
    }

    /// Directions of an atom's bonds within a block, in the block's own layout.
    fn bonds(&self, graph: &Graph, block: usize, atom: usize) -> Vec<Vec2> {
        let at = self.point(block, atom);
        graph.near[atom]
            .iter()
            .filter(|l| self.blocks[block].bonds.binary_search(&l.bond).is_ok())
            .map(|l| self.point(block, l.to) - at)
            .collect()
    }
}

/// A part under construction.
pub(super) struct Assembly<'a> {
    graph: &'a Graph,
    tree: &'a Tree,
    shapes: &'a Shapes,
    places: Vec<Option<Point>>,
    placed: Vec<usize>,
    /// For an atom, the wish whose farther end it is, as the index of the pair and of that end.
    wish_at: Vec<Option<(usize, usize)>>,
}

/// Places of all atoms of a part, bonds of about 1.
pub(super) fn assemble(graph: &Graph, tree: &Tree, shapes: &Shapes) -> Vec<Point> {
    let mut assembly = Assembly {
        graph,
        tree,
        shapes,
        places: vec![None; graph.len()],
        placed: Vec::new(),
        wish_at: farther_ends(graph, tree),
    };
    assembly.begin();
    for node in &tree.outward {
        if !tree.is_block(*node) {
            assembly.extend(*node);
        }
    }
    let places = assembly.places.into_iter();
    places.map(|p| p.unwrap_or_default()).collect()
}

/// Which atoms are the ends of wishes away from the root.
fn farther_ends(graph: &Graph, tree: &Tree) -> Vec<Option<(usize, usize)>> {
    let mut list = vec![None; graph.len()];
    for (i, pair) in graph.pairs.iter().enumerate() {
        for k in 0..2 {
            let mut at = pair.ends[k];
            // chains of cumulated double bonds are short
            for _ in 0..12 {
                at = tree.parent[at];
                if at == ROOT || at == pair.ends[1 - k] {
                    break;
                }
            }
            if at == pair.ends[1 - k] {
                list[pair.ends[k]] = Some((i, k));
            }
        }
    }
    list
}

impl Assembly<'_> {
    fn begin(&mut self) {
        let Some(root) = self.tree.outward.first().copied() else {
            return;
        };
        if self.tree.is_block(root) {
            let block = root - self.tree.n_atoms;
            self.set_block(block, Affine::IDENTITY);
        } else {
            self.set(root, Point::ORIGIN);
        }
    }

    fn set(&mut self, atom: usize, at: Point) {
        if self.places[atom].is_none() {
            self.places[atom] = Some(at);
            self.placed.push(atom);
        }
    }

    fn set_block(&mut self, block: usize, motion: Affine) {
        let shapes = self.shapes;
        let own = shapes.blocks[block].atoms.iter().zip(&shapes.points[block]);
        for (a, p) in own {
            self.set(*a, motion * *p);
        }
    }

    fn at(&self, atom: usize) -> Point {
        self.places[atom].unwrap_or_default()
    }

    /// Places all that hangs on an atom.
    fn extend(&mut self, atom: usize) {
        let items = self.items(atom);
        if items.is_empty() {
            return;
        }
        let at = self.at(atom);
        let there: Vec<usize> = self.graph.near[atom]
            .iter()
            .map(|l| l.to)
            .filter(|b| self.places[*b].is_some())
            .collect();
        let bonds: Vec<Vec2> = there.iter().map(|b| self.at(*b) - at).collect();
        let (items, angles) = match there.as_slice() {
            [] => {
                let angles = chains::round_nothing(self.graph, atom, &items);
                (items, angles)
            }
            [from] => {
                let back = geom::angle(bonds[0]);
                let side = self.side(atom, *from, back, &items);
                let angles =
                    chains::round_one_bond(self.graph, self.tree, atom, back, side, &items);
                (items, angles)
            }
            _ => self.in_gap(atom, &there, &bonds, items),
        };
        for (item, angle) in items.iter().zip(&angles) {
            if self.tree.is_block(item.node) {
                self.place_block(atom, item.node - self.tree.n_atoms, *angle);
            } else {
                self.set(item.node, at + geom::unit(*angle));
            }
        }
    }

    /// What is to be placed at an atom, the heaviest first.
    fn items(&self, atom: usize) -> Vec<Item> {
        let mut items: Vec<Item> = self
            .tree
            .children(atom)
            .map(|node| Item {
                node,
                width: if self.tree.is_block(node) {
                    let block = node - self.tree.n_atoms;
                    let bonds = self.shapes.bonds(self.graph, block, atom);
                    TAU - geom::widest_gap(&bonds).1
                } else {
                    0.0
                },
                reach: self.tree.branch(atom, node),
            })
            .collect();
        items.sort_by(|a, b| heavier(a.reach, b.reach).then(a.node.cmp(&b.node)));
        items
    }

    /// The side of the heaviest item at an atom with one bond there: as wished, else so that the chain
    /// goes on in a zigzag, else where there is more room.
    fn side(&self, atom: usize, from: usize, back: f64, items: &[Item]) -> f64 {
        if let Some(side) = self.wished_side(atom, items) {
            return side;
        }
        let (mut here, mut last) = (from, atom);
        for _ in 0..self.graph.len() {
            if !self.graph.is_linear(here) {
                break;
            }
            let beyond = self.graph.near[here].iter().find(|l| l.to != last);
            match beyond {
                Some(l) if self.places[l.to].is_some() => (here, last) = (l.to, here),
                _ => break,
            }
        }
        if let Some(other) = self.heaviest_other(here, last) {
            let axis = self.at(last) - self.at(here);
            let s = axis.cross(self.at(other) - self.at(here));
            if s.abs() > 0.1 {
                return s.signum();
            }
        }
        let at = self.at(atom);
        let room = |side: f64| {
            let way = geom::unit(back + side * TAU / 3.0);
            self.crowd(at + way, atom) + 0.5 * self.crowd(at + 2.0 * way, atom)
        };
        if room(-1.0) < room(1.0) - 1e-6 {
            -1.0
        } else {
            1.0
        }
    }

    fn wished_side(&self, atom: usize, items: &[Item]) -> Option<f64> {
        let (i, k) = self.wish_at[atom]?;
        let pair = &self.graph.pairs[i];
        let place = items.iter().position(|x| x.node == pair.ligands[k])?;
        let (near, far) = (self.at(atom), self.at(pair.ends[1 - k]));
        let known = self.places[pair.ligands[1 - k]]?;
        let s = (near - far).cross(known - far);
        if s.abs() < 1e-6 {
            return None;
        }
        let apart = s.signum();
        let side = if pair.together { -apart } else { apart };
        Some(if place == 0 { side } else { -side })
    }

    /// The heaviest placed neighbour of an atom other than one; `None` if two are alike.
    fn heaviest_other(&self, atom: usize, but: usize) -> Option<usize> {
        let mut others: Vec<(Reach, usize)> = self.graph.near[atom]
            .iter()
            .filter(|l| l.to != but && self.places[l.to].is_some())
            .map(|l| (self.reach(atom, l.to), l.to))
            .collect();
        others.sort_by(|a, b| heavier(a.0, b.0).then(a.1.cmp(&b.1)));
        match others.as_slice() {
            [] => None,
            [a, b, ..] if heavier(a.0, b.0).is_eq() => None,
            [a, ..] => Some(a.1),
        }
    }

    /// How far the branch from an atom over one of its bonds reaches.
    fn reach(&self, atom: usize, to: usize) -> Reach {
        let shared = self.shapes.of_atom[atom]
            .iter()
            .find(|b| self.shapes.of_atom[to].contains(b));
        match shared {
            Some(b) => self.tree.branch(atom, self.tree.n_atoms + b),
            None => self.tree.branch(atom, to),
        }
    }

    /// How crowded a place is, leaving one atom out of account.
    fn crowd(&self, at: Point, but: usize) -> f64 {
        self.placed
            .iter()
            .filter(|a| **a != but)
            .map(|a| self.at(*a).distance_squared(at))
            .filter(|d| *d < 12.0)
            .map(|d| 1.0 / (d + 0.05))
            .sum()
    }

    /// Items in the best gap between bonds, in the best order.
    fn in_gap(
        &self,
        atom: usize,
        there: &[usize],
        bonds: &[Vec2],
        items: Vec<Item>,
    ) -> (Vec<Item>, Vec<f64>) {
        let at = self.at(atom);
        let mut gaps = chains::gaps_for(bonds, &items);
        let is_flat = self.graph.near[atom]
            .iter()
            .any(|l| self.graph.order[l.bond] == Order::Double);
        // outside a small ring; on the free side of a double bond
        if let [i, j] = there
            && (is_flat || self.shapes.in_small_ring([atom, *i, *j]))
            && gaps.iter().any(|g| g.1 > PI)
        {
            gaps.retain(|g| g.1 > PI);
        }
        // the bonds on both sides of a gap
        let beside = |angle: f64| {
            (0..bonds.len()).find(|i| {
                let off = geom::turn(0.0, geom::angle(bonds[*i]) - angle);
                !(1e-6..=TAU - 1e-6).contains(&off)
            })
        };
        let is_inside = |gap: (f64, f64)| match (beside(gap.0), beside(gap.0 + gap.1)) {
            (Some(i), Some(j)) => {
                gap.1 < PI && self.shapes.in_small_ring([atom, there[i], there[j]])
            }
            _ => false,
        };
        let mut orders = vec![items.clone()];
        if items.len() > 1 {
            orders.push(items.iter().rev().copied().collect());
        }
        let mut best: Option<(f64, Vec<Item>, Vec<f64>)> = None;
        for (start, wide) in gaps {
            for order in &orders {
                let angles = chains::shared_out(start, wide, order);
                let cost: f64 = order
                    .iter()
                    .zip(&angles)
                    .map(|(item, angle)| {
                        let far = if item.reach.atoms > 1.5 { 1.0 } else { 0.0 };
                        let way = geom::unit(*angle);
                        self.crowd(at + way, usize::MAX)
                            + far * self.crowd(at + 2.2 * way, usize::MAX)
                    })
                    .sum();
                let cost = if is_inside((start, wide)) {
                    cost + 1.0
                } else {
                    cost
                };
                if best.as_ref().is_none_or(|b| cost < b.0 - 1e-6) {
                    best = Some((cost, order.clone(), angles));
                }
            }
        }
        match best {
            Some((_, order, angles)) => (order, angles),
            None => {
                let angles = chains::shared_out(0.0, TAU, &items);
                (items, angles)
            }
        }
    }

    /// A block at an atom that is there, its inside in a given direction; mirrored if that is wished or
    /// finds more room.
    fn place_block(&mut self, atom: usize, block: usize, angle: f64) {
        let bonds = self.shapes.bonds(self.graph, block, atom);
        let inside = geom::widest_gap(&bonds).0 + PI;
        let own = self.shapes.point(block, atom);
        let at = self.at(atom);
        let plain = Affine::translate(at.to_vec2())
            * Affine::rotate(angle - inside)
            * Affine::translate(-own.to_vec2());
        let mirrored = Affine::translate(at.to_vec2())
            * Affine::rotate(angle + inside)
            * Affine::FLIP_Y
            * Affine::translate(-own.to_vec2());
        let motion = match self.wished_mirror(atom, block, plain) {
            Some(true) => mirrored,
            Some(false) => plain,
            None if self.room_for(block, atom, mirrored)
                < self.room_for(block, atom, plain) - 1e-6 =>
            {
                mirrored
            }
            None => plain,
        };
        self.set_block(block, motion);
    }

    /// Whether the wish at an atom asks for the mirror image of the block.
    fn wished_mirror(&self, atom: usize, block: usize, plain: Affine) -> Option<bool> {
        let (i, k) = self.wish_at[atom]?;
        let pair = &self.graph.pairs[i];
        if !self.shapes.of_atom[pair.ligands[k]].contains(&block) {
            return None;
        }
        let known = self.places[pair.ligands[1 - k]]?;
        let (near, far) = (self.at(atom), self.at(pair.ends[1 - k]));
        let axis = near - far;
        let own = plain * self.shapes.point(block, pair.ligands[k]);
        let together = (axis.cross(known - far) > 0.0) == (axis.cross(own - near) > 0.0);
        Some(together != pair.together)
    }

    /// How crowded a block would be, and how far inwards its heaviest way on would point.
    fn room_for(&self, block: usize, atom: usize, motion: Affine) -> f64 {
        let own = &self.shapes.blocks[block];
        let middle =
            super::fuse::mean(&self.placed.iter().map(|a| self.at(*a)).collect::<Vec<_>>());
        let points: Vec<Point> = self.shapes.points[block]
            .iter()
            .map(|p| motion * *p)
            .collect();
        let mut sum = 0.0;
        for (a, p) in own.atoms.iter().zip(&points) {
            if *a == atom {
                continue;
            }
            sum += self.crowd(*p, atom);
            let more: f64 = self
                .tree
                .children(*a)
                .filter(|c| *c != self.tree.n_atoms + block)
                .map(|c| self.tree.branch(*a, c).far)
                .sum();
            if more > 0.0 {
                let bonds = self.shapes.bonds(self.graph, block, *a);
                let own = Affine::new([
                    motion.as_coeffs()[0],
                    motion.as_coeffs()[1],
                    motion.as_coeffs()[2],
                    motion.as_coeffs()[3],
                    0.0,
                    0.0,
                ]);
                let way = own * geom::unit(geom::widest_gap(&bonds).0).to_point();
                let end = *p + way.to_vec2();
                sum += self.crowd(end, atom) - 0.05 * more.min(10.0) * end.distance(middle);
            }
        }
        sum
    }
}

/// Heaviest first.
fn heavier(a: Reach, b: Reach) -> std::cmp::Ordering {
    if (a.weight() - b.weight()).abs() < 1e-9 {
        b.far.total_cmp(&a.far)
    } else {
        b.weight().total_cmp(&a.weight())
    }
}
