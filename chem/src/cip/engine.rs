//! Comparing branches of a digraph: sphere by sphere, one rule after the other.
//!
//! Each rule is run over the whole of both branches before the next is looked at. Within a rule, sets
//! of nodes are compared in the order of their parents, and that order is the one under all rules up to
//! the present one: ties among siblings are broken by looking deeper before sets are lined up. What was
//! compared is remembered, or symmetric molecules would take exponential time.
//!
//! Source: IUPAC 2013 recommendations, P-92.1.4; Hanson et al., J. Chem. Inf. Model. 2018, 58, 1755, as
//! digested from open implementations.

use super::Stop;
use super::context::Code;
use super::digraph::{Digraph, Known, NodeIx, NodeKind, Nodes};
use super::rules::{Step, rule4b};
use crate::molecule::AtomIx;
use rustc_hash::FxHashMap;
use smallvec::SmallVec;
use std::cmp::Ordering;

/// A node and the neighbour that it is seen from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Branch {
    pub(super) node: NodeIx,
    pub(super) from: NodeIx,
}

/// Nodes from high to low; neighbours may be tied.
#[derive(Clone, Debug, Default)]
pub(super) struct Ranked {
    nodes: Nodes,
    /// Bit i: node i and node i + 1 are tied.
    ties: u64,
}

impl Ranked {
    pub(super) fn nodes(&self) -> &[NodeIx] {
        &self.nodes
    }

    pub(super) fn is_complete(&self) -> bool {
        self.ties == 0
    }

    /// Runs of tied nodes, from high to low.
    pub(super) fn groups(&self) -> impl Iterator<Item = &[NodeIx]> {
        let mut start = 0;
        (0..self.nodes.len()).filter_map(move |i| {
            if self.is_tied(i) {
                return None;
            }
            let group = &self.nodes[start..=i];
            start = i + 1;
            Some(group)
        })
    }

    fn is_tied(&self, i: usize) -> bool {
        i + 1 < self.nodes.len() && i < 64 && self.ties & (1 << i) != 0
    }
}

/// What to take for a number that is not known.
#[derive(Clone, Copy)]
enum Bound {
    Lowest,
    Highest,
}

/// Known orders of what lies beyond a node, seen from its parent, under one step.
#[derive(Debug, Default)]
struct Orders {
    /// For each node, its place in `list` and one more; 0 if not known.
    at: Vec<u32>,
    list: Vec<Ranked>,
}

impl Orders {
    fn get(&self, node: NodeIx) -> Option<&Ranked> {
        let at = *self.at.get(node as usize)?;
        self.list.get((at as usize).checked_sub(1)?)
    }

    fn set(&mut self, node: NodeIx, ranked: Ranked) {
        let node = node as usize;
        if self.at.len() <= node {
            self.at.resize((2 * node).max(63) + 1, 0);
            self.list.reserve(16);
        }
        self.list.push(ranked);
        self.at[node] = u32::try_from(self.list.len()).unwrap_or(0);
    }

    fn clear(&mut self) {
        if !self.list.is_empty() {
            self.at.fill(0);
            self.list.clear();
        }
    }
}

/// One digraph under comparison, with what is known of it so far.
#[derive(Debug)]
pub(super) struct Engine<'a> {
    pub(super) tree: Digraph<'a>,
    /// The ligand that Rule 6 puts first.
    reference: Option<AtomIx>,
    work: u64,
    max_work: u64,
    /// Whether ligands of a focus are compared only once, so that nothing is gained by remembering.
    pub(super) forgetful: bool,
    /// Ligands of a focus that were compared, by both nodes and the step; the second map holds what
    /// rests on auxiliary descriptors.
    compared: [FxHashMap<u64, Ordering>; 2],
    /// Orders below a node, one list for each step.
    below: [Orders; Step::COUNT],
    /// Orders seen from another neighbour than the parent: towards the root and back.
    across: [FxHashMap<u64, Ranked>; 2],
}

impl<'a> Engine<'a> {
    pub(super) fn new(tree: Digraph<'a>, max_work: u64) -> Engine<'a> {
        Engine {
            tree,
            reference: None,
            work: 0,
            max_work,
            forgetful: false,
            compared: Default::default(),
            below: Default::default(),
            across: Default::default(),
        }
    }

    /// Comparisons made so far.
    pub(super) fn work(&self) -> u64 {
        self.work
    }

    /// Forgets what rested on auxiliary descriptors: some have changed.
    pub(super) fn descriptors_changed(&mut self) {
        self.compared[1].clear();
        self.across[1].clear();
        for step in Step::ALL.into_iter().filter(|s| !s.is_constitutional()) {
            self.below[step.index()].clear();
        }
    }

    /// Sets the ligand that Rule 6 puts first.
    pub(super) fn set_reference(&mut self, reference: Option<AtomIx>) {
        let six = Step::R6.code();
        self.compared[1].retain(|key, _| key & 15 != six);
        self.across[1].retain(|key, _| key & 15 != six);
        self.below[Step::R6.index()].clear();
        self.reference = reference;
    }

    /// Nodes beyond a branch, ordered by all rules up to a step.
    pub(super) fn ranked(&mut self, branch: Branch, step: Step) -> Result<Ranked, Stop> {
        if self.is_leaf(branch) {
            return Ok(Ranked::default());
        }
        let key = key(branch.node, branch.from, step);
        let memo = usize::from(!step.is_constitutional());
        let downwards = self.tree.node(branch.node).parent == branch.from;
        let known = if downwards {
            self.below[step.index()].get(branch.node)
        } else {
            self.across[memo].get(&key)
        };
        if let Some(known) = known {
            return Ok(known.clone());
        }
        let before = match step.before() {
            Some(earlier) => self.ranked(branch, earlier)?,
            None => Engine::unranked(self.tree.away_from(branch.node, branch.from)?),
        };
        let after = self.refine(before, branch.node, |engine, a, b| {
            engine.walk_afresh(a, b, step)
        })?;
        if downwards {
            self.below[step.index()].set(branch.node, after.clone());
        } else {
            self.across[memo].insert(key, after.clone());
        }
        Ok(after)
    }

    /// Orders ligands of a node under one more step; `ranked` is their order so far.
    pub(super) fn refine_by(
        &mut self,
        ranked: Ranked,
        hub: NodeIx,
        step: Step,
    ) -> Result<Ranked, Stop> {
        self.refine(ranked, hub, |engine, a, b| engine.walk(a, b, step))
    }

    /// The same under Rule 4b.
    pub(super) fn refine_by_4b(&mut self, ranked: Ranked, hub: NodeIx) -> Result<Ranked, Stop> {
        self.refine(ranked, hub, rule4b::compare_branches)
    }

    /// All ligands of one rank, in the order given.
    pub(super) fn unranked(nodes: Nodes) -> Ranked {
        Ranked {
            ties: if nodes.len() < 2 { 0 } else { u64::MAX },
            nodes,
        }
    }

    /// Sorts each run of ties by a comparison that may stop.
    fn refine(
        &mut self,
        ranked: Ranked,
        hub: NodeIx,
        mut compare: impl FnMut(&mut Self, Branch, Branch) -> Result<Ordering, Stop>,
    ) -> Result<Ranked, Stop> {
        if ranked.is_complete() || ranked.nodes.len() < 2 {
            return Ok(Ranked {
                nodes: ranked.nodes,
                ties: 0,
            });
        }
        let mut nodes = Nodes::new();
        let mut ties = 0u64;
        for group in ranked.groups() {
            // insertion sort: groups are small, and the comparison may fail
            let start = nodes.len();
            let mut tied_to_next: SmallVec<[bool; 6]> = SmallVec::new();
            for node in group {
                let mut at = nodes.len();
                let mut tied = false;
                while at > start {
                    let of = |node| Branch { node, from: hub };
                    match compare(self, of(*node), of(nodes[at - 1]))? {
                        Ordering::Greater => at -= 1,
                        Ordering::Equal => {
                            tied = true;
                            break;
                        }
                        Ordering::Less => break,
                    }
                }
                nodes.insert(at, *node);
                // the new node stands behind its equals
                let local = at - start;
                tied_to_next.insert(local, false);
                if tied {
                    tied_to_next[local - 1] = true;
                }
            }
            for (i, tied) in tied_to_next.iter().enumerate() {
                if *tied && start + i < 64 {
                    ties |= 1 << (start + i);
                }
            }
        }
        Ok(Ranked { nodes, ties })
    }

    /// Compares two branches by one rule; `Greater`: the first ranks higher. Remembered: the ligands of a
    /// focus are compared again for each rule and reference.
    pub(super) fn walk(&mut self, a: Branch, b: Branch, step: Step) -> Result<Ordering, Stop> {
        if self.forgetful {
            return self.walk_afresh(a, b, step);
        }
        let swap = a.node > b.node;
        let (low, high) = if swap { (b, a) } else { (a, b) };
        let key = key(low.node, high.node, step);
        let memo = usize::from(!step.is_constitutional());
        let order = match self.compared[memo].get(&key) {
            Some(known) => *known,
            None => {
                let order = self.walk_afresh(low, high, step)?;
                self.compared[memo].insert(key, order);
                order
            }
        };
        Ok(if swap { order.reverse() } else { order })
    }

    fn walk_afresh(&mut self, a: Branch, b: Branch, step: Step) -> Result<Ordering, Stop> {
        if a.node == b.node {
            return Ok(Ordering::Equal);
        }
        let at_once = self.compare_nodes(a.node, b.node, step)?;
        if at_once.is_ne() || (self.is_leaf(a) && self.is_leaf(b)) {
            return Ok(at_once);
        }
        self.walk_below(a, b, step)
    }

    fn is_leaf(&self, branch: Branch) -> bool {
        let node = self.tree.node(branch.node);
        node.kind != NodeKind::Atom && node.parent == branch.from
    }

    fn walk_below(&mut self, a: Branch, b: Branch, step: Step) -> Result<Ordering, Stop> {
        let mut queue: SmallVec<[(Branch, Branch); 8]> = SmallVec::new();
        queue.push((a, b));
        let mut next = 0;
        while let Some((a, b)) = queue.get(next).copied() {
            next += 1;
            if self.is_leaf(a) && self.is_leaf(b) {
                continue;
            }
            if step == Step::R1a {
                let order = self.compare_sets(a, b)?;
                if order.is_ne() {
                    return Ok(order);
                }
            }
            let above = self.ranked(a, step)?;
            let below = self.ranked(b, step)?;
            for (u, v) in above.nodes.iter().zip(&below.nodes) {
                let order = self.compare_nodes(*u, *v, step)?;
                if order.is_ne() {
                    return Ok(order);
                }
            }
            queue.extend(above.nodes.iter().zip(&below.nodes).map(|(u, v)| {
                let from = |node, from| Branch { node, from };
                (from(*u, a.node), from(*v, b.node))
            }));
        }
        Ok(Ordering::Equal)
    }

    /// Where a rule tells two branches apart: the two sets of nodes compared there, in order; `None` if it
    /// does not. The first sets are the two nodes themselves.
    pub(super) fn decisive_sets(
        &mut self,
        a: Branch,
        b: Branch,
        step: Step,
    ) -> Result<Option<[Nodes; 2]>, Stop> {
        if self.compare_nodes(a.node, b.node, step)?.is_ne() {
            return Ok(Some([
                Nodes::from_slice(&[a.node]),
                Nodes::from_slice(&[b.node]),
            ]));
        }
        let mut queue = vec![(a, b)];
        let mut next = 0;
        while let Some((a, b)) = queue.get(next).copied() {
            next += 1;
            let sets = [self.ranked(a, step)?.nodes, self.ranked(b, step)?.nodes];
            if step == Step::R1a && self.compare_sets(a, b)?.is_ne() {
                return Ok(Some(sets));
            }
            for (u, v) in sets[0].iter().zip(&sets[1]) {
                if self.compare_nodes(*u, *v, step)?.is_ne() {
                    return Ok(Some(sets));
                }
            }
            queue.extend(sets[0].iter().zip(&sets[1]).map(|(u, v)| {
                let from = |node, from| Branch { node, from };
                (from(*u, a.node), from(*v, b.node))
            }));
        }
        Ok(None)
    }

    /// Rule 1a on the sets beyond two nodes: all atomic numbers from high to low; the longer set wins. What
    /// is not known in them matters only if some atom in its place would change the outcome.
    fn compare_sets(&mut self, a: Branch, b: Branch) -> Result<Ordering, Stop> {
        let (low_a, all_known_a) = self.numbers(a, Bound::Lowest)?;
        let (low_b, all_known_b) = self.numbers(b, Bound::Lowest)?;
        if all_known_a && all_known_b {
            return Ok(low_a.cmp(&low_b));
        }
        let (high_a, _) = self.numbers(a, Bound::Highest)?;
        let (high_b, _) = self.numbers(b, Bound::Highest)?;
        if low_a > high_b {
            Ok(Ordering::Greater)
        } else if high_a < low_b {
            Ok(Ordering::Less)
        } else {
            Err(Stop::Placeholder)
        }
    }

    /// Atomic numbers beyond a branch, from high to low, as low or as high as they may be where something is
    /// not known; and whether all is known.
    fn numbers(
        &mut self,
        branch: Branch,
        bound: Bound,
    ) -> Result<(SmallVec<[Code; 6]>, bool), Stop> {
        let set = self.tree.away_from(branch.node, branch.from)?;
        self.spend(set.len() as u64)?;
        let mut numbers = SmallVec::new();
        let mut all_known = true;
        for ix in &set {
            let node = self.tree.node(*ix);
            all_known &= node.known == Known::Yes;
            match (node.known, bound) {
                (Known::Yes, _) => numbers.push(node.number),
                (_, Bound::Highest) => numbers.push(Code::MAX),
                (Known::Placeholder, Bound::Lowest) => numbers.push(Code::MIN),
                (Known::BondUnstated, Bound::Lowest) => {}
            }
        }
        // children stand in this order already; a parent among them comes last
        if !all_known || self.tree.node(branch.node).parent != branch.from {
            numbers.sort_unstable_by(|x: &Code, y| y.cmp(x));
        }
        Ok((numbers, all_known))
    }

    fn compare_nodes(&mut self, a: NodeIx, b: NodeIx, step: Step) -> Result<Ordering, Stop> {
        self.spend(1)?;
        let (a, b) = (self.tree.node(a), self.tree.node(b));
        if step == Step::R1a && (a.known != Known::Yes || b.known != Known::Yes) {
            return Err(Stop::Placeholder);
        }
        Ok(step.compare(a, b, self.reference))
    }

    fn spend(&mut self, work: u64) -> Result<(), Stop> {
        self.work += work;
        if self.work > self.max_work {
            return Err(Stop::Nodes(self.tree.len()));
        }
        Ok(())
    }
}

/// Key of a memo: two nodes and a step. Digraphs stay far below 2^30 nodes.
fn key(a: NodeIx, b: NodeIx, step: Step) -> u64 {
    (u64::from(a) << 34) | (u64::from(b) << 4) | step.code()
}
