//! The hierarchical digraph: all simple paths from one atom, with duplicate atoms, grown on demand.
//!
//! Nodes live in one arena and name their parents; children of a node are made together when first
//! asked for. A branch seen from another node than its parent (for auxiliary descriptors) is the pair
//! (node, node it is seen from): the tree itself is never built anew.

use super::Stop;
use super::context::{Code, Context, NO_MASS};
use crate::molecule::AtomIx;
use crate::perceive::Ratio;
use crate::stereo::Descriptor;
use smallvec::SmallVec;
use std::ops::Range;

pub(super) type NodeIx = u32;

/// The root of every digraph.
pub(super) const ROOT: NodeIx = 0;

/// Neighbours of a node in the tree; most atoms have four at the most.
pub(super) type Nodes = SmallVec<[NodeIx; 6]>;

#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum NodeKind {
    /// An atom reached for the first time on its path.
    Atom,
    /// An atom that stands on the path already: the ring closes here.
    RingDuplicate,
    /// A duplicate for a further electron pair of a bond.
    BondDuplicate,
    /// A hydrogen that no atom of the drawing stands for.
    Hydrogen,
}

/// Whether it is known what a node stands for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Known {
    Yes,
    /// Some atom or other is there.
    Placeholder,
    /// The order of the bond that leads there is not stated: perhaps none is there.
    BondUnstated,
}

#[derive(Clone, Debug)]
pub(super) struct Node {
    /// The atom it stands for; of a hydrogen, the atom that bears it.
    pub(super) atom: AtomIx,
    pub(super) parent: NodeIx,
    first_child: NodeIx,
    /// Distance from the root.
    pub(super) sphere: u32,
    /// Of a ring duplicate, the sphere of the atom that it repeats.
    pub(super) original_sphere: u32,
    /// Atomic number, as far as it is known.
    pub(super) number: Code,
    /// Mass for Rule 2.
    pub(super) mass: Code,
    n_children: u32,
    pub(super) kind: NodeKind,
    pub(super) known: Known,
    grown: bool,
    /// Auxiliary descriptor, once found.
    pub(super) descriptor: Option<Descriptor>,
}

#[derive(Clone, Debug)]
pub(super) struct Digraph<'a> {
    context: &'a Context,
    nodes: Vec<Node>,
    limit: usize,
}

impl<'a> Digraph<'a> {
    /// A digraph that has only its root yet and may grow to `limit` nodes.
    pub(super) fn new(context: &'a Context, root: AtomIx, limit: usize) -> Digraph<'a> {
        let mut tree = Digraph {
            context,
            nodes: Vec::with_capacity(64),
            limit,
        };
        tree.push(NodeKind::Atom, root, ROOT, 0, 0);
        tree
    }

    pub(super) fn node(&self, ix: NodeIx) -> &Node {
        &self.nodes[ix as usize]
    }

    /// Atomic number of a node.
    pub(super) fn number(&self, ix: NodeIx) -> Ratio {
        self.context.number(self.node(ix).number)
    }

    /// Mass of a node for Rule 2.
    pub(super) fn mass(&self, ix: NodeIx) -> f64 {
        self.context.mass(self.node(ix).mass)
    }

    pub(super) fn len(&self) -> usize {
        self.nodes.len()
    }

    pub(super) fn set_descriptor(&mut self, ix: NodeIx, descriptor: Option<Descriptor>) {
        self.nodes[ix as usize].descriptor = descriptor;
    }

    /// Children of a node, highest atomic number first; made now if need be.
    pub(super) fn children(&mut self, ix: NodeIx) -> Result<Range<NodeIx>, Stop> {
        if !self.node(ix).grown {
            self.grow(ix)?;
        }
        let node = self.node(ix);
        Ok(node.first_child..node.first_child + node.n_children)
    }

    /// All neighbours of a node but the one that it is seen from. The root has no parent, so seen from
    /// itself it shows every child.
    pub(super) fn away_from(&mut self, ix: NodeIx, from: NodeIx) -> Result<Nodes, Stop> {
        let children = self.children(ix)?;
        let mut nodes: Nodes = children.filter(|c| *c != from).collect();
        let parent = self.node(ix).parent;
        if ix != ROOT && parent != from {
            nodes.push(parent);
        }
        Ok(nodes)
    }

    /// Grows the whole tree.
    pub(super) fn grow_all(&mut self) -> Result<(), Stop> {
        let mut next = 0;
        while (next as usize) < self.nodes.len() {
            self.children(next)?;
            next += 1;
        }
        Ok(())
    }

    fn grow(&mut self, ix: NodeIx) -> Result<(), Stop> {
        // node counts stay below the limit, which fits
        let first = u32::try_from(self.nodes.len()).unwrap_or(u32::MAX);
        let node = self.node(ix);
        if node.kind == NodeKind::Atom {
            let (atom, parent, sphere) = (node.atom, node.parent, node.sphere + 1);
            let above = (ix != ROOT).then(|| self.node(parent).atom);
            let context = self.context;
            for bond in context.bonds(atom) {
                if above != Some(bond.to) {
                    // only a ring leads back to an atom on the path
                    let original = if bond.in_ring {
                        self.on_path(ix, bond.to)
                    } else {
                        None
                    };
                    match original {
                        Some(original) => {
                            self.push(NodeKind::RingDuplicate, bond.to, ix, sphere, original);
                        }
                        None => self.push(NodeKind::Atom, bond.to, ix, sphere, 0),
                    }
                    if bond.is_vague
                        && let Some(child) = self.nodes.last_mut()
                    {
                        child.known = Known::BondUnstated;
                    }
                }
                for _ in 0..bond.duplicates {
                    self.push(NodeKind::BondDuplicate, bond.to, ix, sphere, 0);
                }
            }
            if context.atom(atom).adds_duplicate {
                self.push(NodeKind::BondDuplicate, atom, ix, sphere, 0);
            }
            for _ in 0..context.atom(atom).hydrogens {
                self.push(NodeKind::Hydrogen, atom, ix, sphere, 0);
            }
        }
        let children = self.nodes.get_mut(first as usize..).unwrap_or_default();
        children.sort_by_key(|child| std::cmp::Reverse(child.number));
        let n_children = u32::try_from(children.len()).unwrap_or(u32::MAX);
        let node = &mut self.nodes[ix as usize];
        node.grown = true;
        node.first_child = first;
        node.n_children = n_children;
        if self.nodes.len() > self.limit {
            return Err(Stop::Nodes(self.nodes.len()));
        }
        Ok(())
    }

    /// Sphere of the node on the way from `ix` to the root that stands for `atom`.
    fn on_path(&self, ix: NodeIx, atom: AtomIx) -> Option<u32> {
        let mut at = ix;
        loop {
            let node = self.node(at);
            if node.atom == atom {
                return Some(node.sphere);
            }
            if at == ROOT {
                return None;
            }
            at = node.parent;
        }
    }

    fn push(
        &mut self,
        kind: NodeKind,
        atom: AtomIx,
        parent: NodeIx,
        sphere: u32,
        original_sphere: u32,
    ) {
        let of = self.context.atom(atom);
        let (number, mass) = match kind {
            NodeKind::Atom => (of.number, of.mass),
            NodeKind::RingDuplicate => (of.number, NO_MASS),
            NodeKind::BondDuplicate => {
                let carrier = self.context.atom(self.node(parent).atom);
                (carrier.duplicate.unwrap_or(of.number), NO_MASS)
            }
            NodeKind::Hydrogen => self.context.hydrogen,
        };
        self.nodes.push(Node {
            atom,
            parent,
            first_child: 0,
            sphere,
            original_sphere,
            number,
            mass,
            n_children: 0,
            kind,
            known: if of.wildcard && kind != NodeKind::Hydrogen {
                Known::Placeholder
            } else {
                Known::Yes
            },
            grown: false,
            descriptor: None,
        });
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::molecule::tests::build;
    use crate::perceive::Rings;

    #[test]
    fn rings_and_double_bonds_make_duplicates() {
        // a three-ring with an exocyclic double bond to oxygen
        let m = build(
            &["C", "C", "C", "O"],
            &[(0, 1, 1), (1, 2, 1), (2, 0, 1), (0, 3, 2)],
        );
        let context = Context::new(&m, &Rings::find(&m));
        let mut tree = Digraph::new(&context, AtomIx::new(0), 1000);
        tree.grow_all().unwrap();
        let count = |kind| {
            (0..tree.len())
                .filter(|i| tree.nodes[*i].kind == kind)
                .count()
        };
        // both ways round the ring: 2 + 2 atoms, and the oxygen; the root itself
        assert_eq!(count(NodeKind::Atom), 6);
        assert_eq!(count(NodeKind::RingDuplicate), 2);
        // on the carbon and on the oxygen
        assert_eq!(count(NodeKind::BondDuplicate), 2);
        assert_eq!(count(NodeKind::Hydrogen), 8);
    }

    #[test]
    fn the_limit_stops_growth() {
        let m = build(
            &["C"; 9],
            &(1..9).map(|i| (i - 1, i, 1)).collect::<Vec<_>>(),
        );
        let context = Context::new(&m, &Rings::find(&m));
        let mut tree = Digraph::new(&context, AtomIx::new(0), 10);
        assert!(matches!(tree.grow_all(), Err(Stop::Nodes(n)) if n > 10));
    }
}
