//! Relief where atoms or bonds of an assembled part lie on each other: branches are mirrored in their
//! bond, swung about their atom, and only then are bonds stretched.
//!
//! Each conflict is between two atoms; what can part them are the hinges on the way from one to the other
//! in the tree. The move that saves most is made, one after another, a bounded number of times.

use super::assemble::Shapes;
use super::field::Field;
use super::frame::together;
use super::graph::{Graph, Pair};
use super::tree::{ROOT, Tree};
use crate::element::Element;
use crate::geom::{self, Point};
use kurbo::Affine;
use std::f64::consts::{PI, TAU};

/// Hinges looked at for one conflict.
const MOST_HINGES: usize = 24;
/// Hinges tried two at a time.
const MOST_PAIRED: usize = 9;
/// Atoms and bonds looked at in all trials together, so that the work is bounded.
const MOST_WORK: usize = 25_000_000;
/// A move must save this much.
const WORTH: f64 = 0.05;

/// A way to move what hangs on a hinge.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Move {
    /// Mirrored in the hinge's axis.
    Flip,
    /// Turned about the atom that holds it, by radians.
    Swing(f64),
    /// A single atom on a corner of several rings turned into one of the rings.
    Inward(f64),
    /// Moved outwards along its bond.
    Stretch(f64),
}

impl Move {
    /// What a drawing loses by it.
    fn price(self) -> f64 {
        match self {
            // more where it breaks a chain, see `breaks`
            Move::Flip => 0.03,
            Move::Swing(by) => 0.15 + 0.5 * by.abs(),
            Move::Inward(_) => 0.3,
            Move::Stretch(by) => 0.4 + 2.0 * by,
        }
    }
}

const FLIPS: &[Move] = &[Move::Flip];
const SWINGS: &[Move] = &[
    Move::Inward(TAU / 3.0),
    Move::Inward(-TAU / 3.0),
    Move::Swing(PI / 6.0),
    Move::Swing(-PI / 6.0),
    Move::Swing(PI / 3.0),
    Move::Swing(-PI / 3.0),
];
const STRETCHES: &[Move] = &[
    Move::Swing(PI / 12.0),
    Move::Swing(-PI / 12.0),
    Move::Stretch(0.2),
    Move::Stretch(0.4),
];

/// Relieves conflicts of a part as far as moves at hinges can.
pub(super) fn relieve(graph: &Graph, tree: &Tree, shapes: &Shapes, points: &mut Vec<Point>) {
    let mut relief = Relief {
        graph,
        tree,
        shapes,
        points: std::mem::take(points),
        moves: vec![false; graph.len()],
        work: 0,
    };
    relief.pass(FLIPS, true);
    relief.pass(SWINGS, false);
    relief.pass(FLIPS, true);
    relief.pass(STRETCHES, false);
    *points = relief.points;
}

struct Relief<'a> {
    graph: &'a Graph,
    tree: &'a Tree,
    shapes: &'a Shapes,
    points: Vec<Point>,
    /// Scratch: which atoms a trial moves.
    moves: Vec<bool>,
    work: usize,
}

/// A move of some atoms, thought through.
struct Trial {
    gain: f64,
    node: usize,
    motion: Affine,
}

impl Relief<'_> {
    /// Makes moves of some kinds until none helps.
    fn pass(&mut self, kinds: &[Move], in_pairs: bool) {
        let mut stuck: Vec<[usize; 2]> = Vec::new();
        while self.work < MOST_WORK {
            let field = Field::new(self.graph, &self.points);
            let conflicts = field.conflicts(&self.points);
            self.work += 20 * self.graph.len() + field.work();
            let mut is_better = false;
            for (_, pair) in &conflicts {
                if stuck.binary_search(pair).is_ok() {
                    continue;
                }
                if self.work > MOST_WORK {
                    return;
                }
                let hinges = self.hinges(*pair);
                let single = self.best(&field, &hinges, kinds);
                if let Some(trial) = single {
                    self.make(trial.node, trial.motion);
                    is_better = true;
                    break;
                }
                if in_pairs && self.try_pairs(&field, &hinges) {
                    is_better = true;
                    break;
                }
                if let Err(at) = stuck.binary_search(pair) {
                    stuck.insert(at, *pair);
                }
            }
            if !is_better {
                return;
            }
        }
    }

    /// Nodes on the way between two atoms that can move against their parent.
    fn hinges(&self, [a, b]: [usize; 2]) -> Vec<usize> {
        let holds = |node: usize, atom: usize| {
            let (from, to) = self.tree.range[node];
            (from..to).contains(&self.tree_place(atom))
        };
        let mut list = Vec::new();
        for (start, other) in [(a, b), (b, a)] {
            let mut at = start;
            let mut one = Vec::new();
            // upwards until the node holds both
            while at != ROOT && !holds(at, other) {
                let parent = self.tree.parent[at];
                if parent != ROOT && !self.tree.is_block(parent) {
                    one.push(at);
                }
                at = parent;
            }
            list.push(one);
        }
        let mut both: Vec<usize> = Vec::new();
        let longest = list.iter().map(Vec::len).max().unwrap_or(0);
        // those nearest to the common holder move most, those nearest to the conflict least: the latter
        // first, in turn from both sides
        for i in 0..longest {
            for one in &list {
                both.extend(one.get(i));
            }
        }
        both.truncate(MOST_HINGES);
        both
    }

    fn best(&mut self, field: &Field<'_>, hinges: &[usize], kinds: &[Move]) -> Option<Trial> {
        let mut best: Option<Trial> = None;
        for node in hinges {
            for kind in kinds {
                let Some(motion) = self.motion(*node, *kind) else {
                    continue;
                };
                let mut price = kind.price() + self.breaks(*node, *kind);
                if matches!(kind, Move::Inward(_)) && self.graph.element[*node] == Element::C {
                    // rather a halogen than a methyl group
                    price += 0.05;
                }
                let gain = self.gain(field, *node, motion) - price;
                let is_best = best.as_ref().is_none_or(|b| gain > b.gain + 1e-9);
                if gain > WORTH && is_best && self.is_allowed(*node, motion, *kind) {
                    best = Some(Trial {
                        gain,
                        node: *node,
                        motion,
                    });
                }
            }
        }
        best
    }

    /// Two flips one after the other, where one does not help.
    fn try_pairs(&mut self, field: &Field<'_>, hinges: &[usize]) -> bool {
        let few = &hinges[..hinges.len().min(MOST_PAIRED)];
        for (i, first) in few.iter().enumerate() {
            let Some(motion) = self.motion(*first, Move::Flip) else {
                continue;
            };
            if !self.is_allowed(*first, motion, Move::Flip) {
                continue;
            }
            let price = Move::Flip.price() + self.breaks(*first, Move::Flip);
            let loss = self.gain(field, *first, motion) - price;
            let before = self.points.clone();
            self.make(*first, motion);
            let field = Field::new(self.graph, &self.points);
            self.work += 20 * self.graph.len();
            let rest: Vec<usize> = few.iter().skip(i + 1).copied().collect();
            if let Some(second) = self.best(&field, &rest, FLIPS)
                && second.gain + loss > WORTH
            {
                self.make(second.node, second.motion);
                return true;
            }
            self.points = before;
        }
        false
    }

    /// What a flip costs because a long chain then no longer goes on in a zigzag; less than nothing where
    /// it does so only then.
    fn breaks(&self, node: usize, kind: Move) -> f64 {
        let holder = self.tree.parent[node];
        if kind != Move::Flip || self.tree.is_block(node) {
            return 0.0;
        }
        let heaviest = |atom: usize, but: usize| {
            self.tree.near[atom]
                .iter()
                .filter(|x| **x != but)
                .map(|x| (self.tree.branch(atom, *x).weight(), *x))
                .max_by(|a, b| a.0.total_cmp(&b.0).then(b.1.cmp(&a.1)))
        };
        let (Some((w, a)), Some((v, b))) = (heaviest(holder, node), heaviest(node, holder)) else {
            return 0.0;
        };
        if self.tree.is_block(a) || self.tree.is_block(b) {
            return 0.0;
        }
        let at = |x: usize| self.points[x];
        let share = (0.012 * f64::min(w, v)).min(0.5);
        match together([at(holder), at(node)], [at(a), at(b)]) {
            Some(true) => -0.5 * share,
            Some(false) => share,
            None => 0.0,
        }
    }

    /// The motion of what hangs on a node; `None` if it would change nothing.
    fn motion(&self, node: usize, kind: Move) -> Option<Affine> {
        let holder = self.tree.parent[node];
        let at = self.points[holder];
        let toward = self.toward(node, holder);
        let way = geom::direction(at, toward, 1e-6)?;
        let to_origin = Affine::translate(-at.to_vec2());
        let back = Affine::translate(at.to_vec2());
        match kind {
            Move::Flip => {
                let few = self.tree.below(node).len() < 2;
                let angle = way.y.atan2(way.x);
                let mirror = Affine::rotate(angle) * Affine::FLIP_Y * Affine::rotate(-angle);
                (!few).then_some(back * mirror * to_origin)
            }
            Move::Inward(by) => {
                let ring_bonds = self.graph.near[holder]
                    .iter()
                    .filter(|l| self.graph.in_ring[l.bond]);
                let fits = self.tree.below(node).len() == 1 && ring_bonds.count() == 3;
                fits.then_some(back * Affine::rotate(by) * to_origin)
            }
            Move::Swing(by) => Some(back * Affine::rotate(by) * to_origin),
            Move::Stretch(by) => {
                let length = at.distance(toward);
                (length < 1.1).then_some(Affine::translate(way * by))
            }
        }
    }

    /// A point on the axis of a hinge: the atom that hangs there, the middle of a block's neighbours.
    fn toward(&self, node: usize, holder: usize) -> Point {
        if !self.tree.is_block(node) {
            return self.points[node];
        }
        let block = node - self.tree.n_atoms;
        let near: Vec<Point> = self.graph.near[holder]
            .iter()
            .filter(|l| self.shapes.of_atom[l.to].contains(&block))
            .map(|l| self.points[l.to])
            .collect();
        super::fuse::mean(&near)
    }

    /// What the conflicts of all pairs cost less after a motion of what hangs on a node.
    fn gain(&mut self, field: &Field<'_>, node: usize, motion: Affine) -> f64 {
        let (from, to) = self.tree.range[node];
        let n = self.graph.len();
        // the smaller side moves, the other way round
        let is_small = 2 * (to - from) <= n;
        let (moving, motion): (Vec<usize>, Affine) = if is_small {
            (self.tree.order[from..to].to_vec(), motion)
        } else {
            let rest = self.tree.order[..from].iter().chain(&self.tree.order[to..]);
            (rest.copied().collect(), motion.inverse())
        };
        for a in &moving {
            self.moves[*a] = true;
        }
        let (points, moves) = (&self.points, &self.moves);
        let before = field.cost(&moving, moves, &|a| points[a]);
        let after = field.cost(&moving, moves, &|a| {
            if moves[a] {
                motion * points[a]
            } else {
                points[a]
            }
        });
        for a in &moving {
            self.moves[*a] = false;
        }
        self.work += 20 * moving.len() + field.work();
        before - after
    }

    /// Whether wished geometries stay and the bonds at the holder keep their angles.
    fn is_allowed(&self, node: usize, motion: Affine, kind: Move) -> bool {
        let below = self.tree.range[node];
        let moved = |a: usize| {
            let at = self.tree_place(a);
            if (below.0..below.1).contains(&at) {
                motion * self.points[a]
            } else {
                self.points[a]
            }
        };
        let meets = |pair: &Pair, at: &dyn Fn(usize) -> Point| {
            together(pair.ends.map(at), pair.ligands.map(at)) == Some(pair.together)
        };
        let keeps = self
            .graph
            .pairs
            .iter()
            .all(|p| !meets(p, &|a| self.points[a]) || meets(p, &moved));
        if !keeps || kind == Move::Flip {
            return keeps;
        }
        let holder = self.tree.parent[node];
        let bonds: Vec<_> = self.graph.near[holder]
            .iter()
            .map(|l| moved(l.to) - self.points[holder])
            .collect();
        let gaps = geom::gaps(&bonds);
        let is_tee = bonds.len() == 3 && gaps.iter().any(|g| (g.1 - PI).abs() < 0.2);
        !is_tee
            && gaps.iter().all(|g| g.1 > 0.75)
            && (bonds.len() > 2 || gaps.iter().all(|g| g.1 > 1.2))
    }

    /// Place of an atom in the order of the tree.
    fn tree_place(&self, atom: usize) -> usize {
        self.tree.range[atom].0
    }

    fn make(&mut self, node: usize, motion: Affine) {
        for a in self.tree.below(node) {
            self.points[*a] = motion * self.points[*a];
        }
    }
}
