//! The order in which atoms are written: a search in depth from each part's lowest atom.
//!
//! Every bond either leads on to the next atom or closes a ring back to one written before. Of the ways on
//! from an atom the longest comes last, so that branches are short. No recursion: chains may be long.

use crate::molecule::{AtomIx, Molecule, Neighbor};

/// How a molecule is written.
#[derive(Debug)]
pub(super) struct Tree {
    /// Atoms in the order of writing.
    pub(super) order: Vec<AtomIx>,
    /// Place of each atom in it.
    pub(super) place: Vec<usize>,
    /// What stands around each atom.
    pub(super) around: Vec<Around>,
}

/// The bonds of one atom.
#[derive(Clone, Debug, Default)]
pub(super) struct Around {
    /// From the atom before.
    pub(super) previous: Option<Neighbor>,
    /// Ring bonds, those that close first; in the order of their numbers.
    pub(super) rings: Vec<Neighbor>,
    /// To the atoms that follow; the last is no branch.
    pub(super) next: Vec<Neighbor>,
}

impl Tree {
    /// `late`: atoms with which no part begins if it has others.
    pub(super) fn new(molecule: &Molecule, late: &[AtomIx]) -> Tree {
        let n = molecule.n_atoms();
        let mut tree = Tree {
            order: Vec::with_capacity(n),
            place: vec![usize::MAX; n],
            around: vec![Around::default(); n],
        };
        let found = tree.search(molecule, late);
        tree.sort_branches(&found);
        tree.set_places();
        for around in 0..n {
            let place = &tree.place;
            tree.around[around]
                .rings
                .sort_by_key(|ring| place[ring.atom.index()]);
        }
        tree
    }

    /// Parts the bonds into those that lead on and those that close rings; the order of finding.
    fn search(&mut self, molecule: &Molecule, late: &[AtomIx]) -> Vec<AtomIx> {
        let mut found = Vec::with_capacity(molecule.n_atoms());
        let mut is_found = vec![false; molecule.n_atoms()];
        let mut is_late = vec![false; molecule.n_atoms()];
        for atom in late {
            is_late[atom.index()] = true;
        }
        let first = molecule.atoms().filter(|a| !is_late[a.index()]);
        for root in first.chain(late.iter().copied()) {
            if is_found[root.index()] {
                continue;
            }
            is_found[root.index()] = true;
            found.push(root);
            let mut path = vec![(root, ways(molecule, root))];
            while let Some((at, ways)) = path.last_mut() {
                let at = *at;
                let Some(way) = ways.pop() else {
                    path.pop();
                    continue;
                };
                if std::mem::replace(&mut is_found[way.atom.index()], true) {
                    let previous = self.around[at.index()].previous;
                    if previous.is_none_or(|p| p.bond != way.bond) {
                        self.around[at.index()].rings.push(way);
                    }
                    continue;
                }
                found.push(way.atom);
                self.around[at.index()].next.push(way);
                self.around[way.atom.index()].previous = Some(Neighbor { atom: at, ..way });
                path.push((way.atom, self::ways(molecule, way.atom)));
            }
        }
        found
    }

    /// Puts the longest way on from each atom last.
    fn sort_branches(&mut self, found: &[AtomIx]) {
        let mut size = vec![1usize; self.place.len()];
        for atom in found.iter().rev() {
            let own = size[atom.index()];
            if let Some(previous) = self.around[atom.index()].previous {
                size[previous.atom.index()] += own;
            }
        }
        for around in &mut self.around {
            around.next.sort_by_key(|n| (size[n.atom.index()], n.atom));
        }
    }

    fn set_places(&mut self) {
        let is_root = |a: &AtomIx| self.around[a.index()].previous.is_none();
        let mut waiting: Vec<AtomIx> = (0..self.place.len()).map(AtomIx::new).collect();
        waiting.retain(is_root);
        waiting.reverse();
        while let Some(atom) = waiting.pop() {
            self.place[atom.index()] = self.order.len();
            self.order.push(atom);
            let next = &self.around[atom.index()].next;
            waiting.extend(next.iter().rev().map(|n| n.atom));
        }
    }

    /// Neighbours of an atom in the order that `@` counts.
    pub(super) fn as_written(&self, atom: AtomIx) -> Vec<usize> {
        let around = &self.around[atom.index()];
        let all = around
            .previous
            .iter()
            .chain(&around.rings)
            .chain(&around.next);
        all.map(|n| n.atom.index()).collect()
    }
}

/// Ways from an atom, the lowest neighbour last.
fn ways(molecule: &Molecule, atom: AtomIx) -> Vec<Neighbor> {
    let mut ways = molecule.neighbors(atom).to_vec();
    ways.sort_by_key(|n| std::cmp::Reverse(n.atom));
    ways
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::molecule::tests::build;

    #[test]
    fn long_ways_come_last_and_rings_close_back() {
        // a ring of three with a tail of two and a branch of one
        let m = build(
            &["C"; 6],
            &[
                (0, 1, 1),
                (1, 2, 1),
                (2, 0, 1),
                (1, 3, 1),
                (3, 4, 1),
                (1, 5, 1),
            ],
        );
        let tree = Tree::new(&m, &[]);
        let order: Vec<usize> = tree.order.iter().map(|a| a.index()).collect();
        assert_eq!(order, [0, 1, 2, 5, 3, 4]);
        let rings: Vec<usize> = tree.around.iter().map(|a| a.rings.len()).collect();
        assert_eq!(rings, [1, 0, 1, 0, 0, 0]);
        assert_eq!(tree.as_written(AtomIx::new(0)), [2, 1]);
        let late = Tree::new(&m, &[AtomIx::new(0)]);
        assert_eq!(late.order[0], AtomIx::new(1));
    }
}
