//! A selection laid out anew while the rest of the drawing stays.
//!
//! What hangs on one atom that stays is laid out on its own and set into the gap there. What is held at
//! several places (a ring of which a part stays, a chain between two places) is laid out with what holds
//! it, brought onto those places and then let go, so that its bonds fit.

use super::chains::{self, Item};
use super::field::APART;
use super::graph::Graph;
use super::lay::{Layout, Wish, part, unmet};
use super::relax::{Spring, Springs};
use super::tree::Reach;
use super::{fit, fuse};
use crate::drawing::Drawing;
use crate::geom::{self, Point, Vec2};
use crate::molecule::{AtomIx, Molecule, Order};
use crate::perceive::Rings;
use kurbo::Affine;
use std::f64::consts::{PI, TAU};

/// Places of all atoms with the selected ones laid out anew and all others where they are, in the units
/// of the drawing; repeated atoms count once.
pub fn tidy(drawing: &Drawing, rings: &Rings, selected: &[AtomIx], wishes: &[Wish]) -> Layout {
    let molecule = drawing.molecule();
    let scale = drawing.bond_length();
    let mut free = vec![false; molecule.n_atoms()];
    for a in selected {
        free[a.index()] = true;
    }
    let mut sheet = Sheet {
        molecule,
        rings,
        wishes,
        points: drawing
            .points()
            .iter()
            .map(|p| (p.to_vec2() / scale).to_point())
            .collect(),
        stands: free.iter().map(|f| !f).collect(),
    };
    let pieces = pieces(molecule, &free);
    for (k, piece) in pieces.iter().enumerate() {
        match holders(molecule, piece, &free).as_slice() {
            [] => sheet.alone(piece),
            [holder] => {
                // others that will hang there too
                let more = pieces[k + 1..]
                    .iter()
                    .filter(|p| holders(molecule, p, &free) == [*holder])
                    .count();
                sheet.hung(piece, *holder, more);
            }
            several => sheet.spanned(piece, several),
        }
        for a in piece {
            sheet.stands[a.index()] = true;
        }
    }
    let points: Vec<Point> = sheet
        .points
        .iter()
        .zip(drawing.points().iter().zip(&free))
        .map(|(p, (old, free))| {
            if *free {
                (p.to_vec2() * scale).to_point()
            } else {
                *old
            }
        })
        .collect();
    Layout {
        unmet: unmet(molecule, wishes, &points),
        points,
    }
}

/// Selected atoms that hang together, each piece in ascending order.
fn pieces(molecule: &Molecule, free: &[bool]) -> Vec<Vec<AtomIx>> {
    let mut seen: Vec<bool> = free.iter().map(|f| !f).collect();
    let mut pieces = Vec::new();
    for root in molecule.atoms() {
        if std::mem::replace(&mut seen[root.index()], true) {
            continue;
        }
        let mut piece = vec![root];
        let mut at = 0;
        while let Some(a) = piece.get(at).copied() {
            at += 1;
            for n in molecule.neighbors(a) {
                if !std::mem::replace(&mut seen[n.atom.index()], true) {
                    piece.push(n.atom);
                }
            }
        }
        piece.sort_unstable();
        pieces.push(piece);
    }
    pieces
}

/// Atoms that stay and are joined to a piece.
fn holders(molecule: &Molecule, piece: &[AtomIx], free: &[bool]) -> Vec<AtomIx> {
    let near = piece.iter().flat_map(|a| molecule.neighbors(*a));
    let mut list: Vec<AtomIx> = near.map(|n| n.atom).filter(|a| !free[a.index()]).collect();
    list.sort_unstable();
    list.dedup();
    list
}

/// The drawing while pieces of it are laid out, bonds of about 1.
struct Sheet<'a> {
    molecule: &'a Molecule,
    rings: &'a Rings,
    wishes: &'a [Wish],
    points: Vec<Point>,
    stands: Vec<bool>,
}

impl Sheet<'_> {
    fn graph(&self, atoms: &[AtomIx]) -> Graph {
        Graph::new(self.molecule, self.rings, atoms, self.wishes)
    }

    fn point(&self, atom: AtomIx) -> Point {
        self.points[atom.index()]
    }

    fn set(&mut self, piece: &[AtomIx], graph: &Graph, points: &[Point], motion: Affine) {
        for (a, p) in graph.atoms.iter().zip(points) {
            if piece.binary_search(a).is_ok() {
                self.points[a.index()] = motion * *p;
            }
        }
    }

    /// A part that nothing holds: its middle stays.
    fn alone(&mut self, piece: &[AtomIx]) {
        let graph = self.graph(piece);
        let points = part(&graph);
        let old: Vec<Point> = piece.iter().map(|a| self.point(*a)).collect();
        let shift = fuse::mean(&old) - fuse::mean(&points);
        self.set(piece, &graph, &points, Affine::translate(shift));
    }

    /// A piece on one atom, set into the gap between the bonds there; `more` others follow.
    fn hung(&mut self, piece: &[AtomIx], holder: AtomIx, more: usize) {
        let mut atoms = piece.to_vec();
        atoms.push(holder);
        atoms.sort_unstable();
        let graph = self.graph(&atoms);
        let points = part(&graph);
        let Some(at) = graph.atoms.iter().position(|a| *a == holder) else {
            return;
        };
        let own: Vec<Vec2> = graph.near[at]
            .iter()
            .map(|l| points[l.to] - points[at])
            .collect();
        let gap = geom::widest_gap(&own);
        let inside = gap.0 + PI;
        let width = if own.len() > 1 { TAU - gap.1 } else { 0.0 };
        let from = Affine::translate(-points[at].to_vec2());
        let to = Affine::translate(self.point(holder).to_vec2());
        let mut best: Option<(usize, f64, Affine)> = None;
        for angle in self.ways(holder, width, own.len(), more) {
            let plain = to * Affine::rotate(angle - inside) * from;
            let mirrored = to * Affine::rotate(angle + inside) * Affine::FLIP_Y * from;
            for motion in [plain, mirrored] {
                let (faults, crowd) = self.cost(piece, &graph, &points, motion);
                let is_best =
                    best.is_none_or(|b| faults < b.0 || (faults == b.0 && crowd < b.1 - 1e-6));
                if is_best {
                    best = Some((faults, crowd, motion));
                }
            }
        }
        if let Some((_, _, motion)) = best {
            self.set(piece, &graph, &points, motion);
        }
    }

    /// Directions in which a piece can leave an atom.
    fn ways(&self, holder: AtomIx, width: f64, bonds: usize, more: usize) -> Vec<f64> {
        let near = self.molecule.neighbors(holder);
        let there: Vec<Vec2> = near
            .iter()
            .filter(|n| self.stands[n.atom.index()])
            .map(|n| self.point(n.atom) - self.point(holder))
            .filter(|v| v.hypot() > 1e-6)
            .collect();
        let order = |o: Order| near.iter().filter(|n| n.order == o).count();
        let is_straight = order(Order::Triple) == 1 || order(Order::Double) == 2;
        let item = Item {
            node: 0,
            width,
            reach: Reach::default(),
        };
        let items = vec![item; more + 1];
        match there.as_slice() {
            [] => vec![0.0],
            [only] if bonds == 1 && more == 0 => {
                let back = geom::angle(*only);
                if near.len() == 2 && is_straight {
                    vec![back + PI]
                } else {
                    vec![back + TAU / 3.0, back - TAU / 3.0]
                }
            }
            _ => chains::gaps_for(&there, &items)
                .into_iter()
                .filter_map(|(start, wide)| {
                    chains::shared_out(start, wide, &items).first().copied()
                })
                .collect(),
        }
    }

    /// Wishes that a place of a piece does not meet, and how near it comes to what stands.
    fn cost(
        &self,
        piece: &[AtomIx],
        graph: &Graph,
        points: &[Point],
        motion: Affine,
    ) -> (usize, f64) {
        let mut all = self.points.clone();
        for (a, p) in graph.atoms.iter().zip(points) {
            if piece.binary_search(a).is_ok() {
                all[a.index()] = motion * *p;
            }
        }
        // only wishes whose atoms all have their places
        let has_place = |a: &AtomIx| self.stands[a.index()] || piece.binary_search(a).is_ok();
        let told: Vec<Wish> = self
            .wishes
            .iter()
            .filter(|w| w.ends.iter().chain(&w.ligands).all(has_place))
            .copied()
            .collect();
        let faults = unmet(self.molecule, &told, &all).len();
        let mut crowd = 0.0;
        for b in self.molecule.atoms().filter(|b| self.stands[b.index()]) {
            let q = all[b.index()];
            for a in piece {
                let d = all[a.index()].distance(q);
                if d < 3.0 && self.molecule.bond_between(*a, b).is_none() {
                    let lack = ((APART - d) / APART).max(0.0);
                    crowd += 0.02 / (d + 0.1) + 2.0 * lack * lack + if d < 0.5 { 1.5 } else { 0.0 };
                }
            }
        }
        (faults, crowd)
    }

    /// A piece held at several atoms.
    fn spanned(&mut self, piece: &[AtomIx], holders: &[AtomIx]) {
        let mut atoms = piece.to_vec();
        atoms.extend(holders);
        // what stays of the rings that the piece has a share in
        for ring in self.rings.cycles() {
            if ring.iter().any(|a| piece.binary_search(a).is_ok()) {
                atoms.extend(ring.iter().filter(|a| self.stands[a.index()]));
            }
        }
        atoms.sort_unstable();
        atoms.dedup();
        let graph = self.graph(&atoms);
        let points = part(&graph);
        let is_new = |a: &AtomIx| piece.binary_search(a).is_ok();
        let (mut own, mut goal) = (Vec::new(), Vec::new());
        for (a, p) in graph.atoms.iter().zip(&points) {
            if !is_new(a) && self.stands[a.index()] {
                own.push(*p);
                goal.push(self.point(*a));
            }
        }
        let motion = fit::onto(&own, &goal, true);
        let mut moved: Vec<Point> = graph
            .atoms
            .iter()
            .zip(&points)
            .map(|(a, p)| {
                if is_new(a) {
                    motion * *p
                } else {
                    self.point(*a)
                }
            })
            .collect();
        let misfit = fit::misfit(&own, &goal, motion) / own.len().max(1) as f64;
        if misfit > 1e-4 {
            let fixed = graph.atoms.iter().map(|a| !is_new(a)).collect();
            springs(&graph, &points, fixed).relax(&mut moved, 500);
        }
        self.set(piece, &graph, &moved, Affine::IDENTITY);
    }
}

/// Springs that keep bonds, angles and small rings of a layout.
fn springs(graph: &Graph, points: &[Point], fixed: Vec<bool>) -> Springs {
    let mut list = Vec::new();
    let mut hold = |a: usize, b: usize, force: f64| {
        list.push(Spring {
            ends: [a, b],
            length: points[a].distance(points[b]),
            force,
        });
    };
    for [a, b] in &graph.ends {
        hold(*a, *b, 4.0);
    }
    for links in &graph.near {
        for (i, p) in links.iter().enumerate() {
            for q in &links[i + 1..] {
                hold(p.to, q.to, 0.7);
            }
        }
    }
    Springs {
        list,
        heights: Vec::new(),
        apart: 0.8,
        push: 1.0,
        fixed,
    }
}
