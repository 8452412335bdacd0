//! Rings: which bonds lie in one, and the smallest ring through a bond or through two bonds at an atom.

use crate::molecule::{AtomIx, BondIx, Molecule};

/// Rings of a molecule.
#[derive(Clone, Debug, Default)]
pub struct Rings {
    in_ring: Vec<bool>,
    smallest: Vec<u32>,
    cycles: Vec<Vec<AtomIx>>,
}

impl Rings {
    /// Finds the rings of a molecule: for each ring bond one smallest ring through it.
    pub fn find(molecule: &Molecule) -> Rings {
        let in_ring = ring_bonds(molecule);
        let mut smallest = vec![0; molecule.n_bonds()];
        let mut cycles: Vec<Vec<AtomIx>> = Vec::new();
        let mut search = Search::new(molecule.n_atoms());
        for b in molecule.bonds().filter(|b| in_ring[b.index()]) {
            let [from, to] = molecule.bond(b).ends;
            let Some(path) = search.shortest(molecule, &in_ring, from, to, &[b]) else {
                continue;
            };
            // rings are far smaller than u32
            smallest[b.index()] = u32::try_from(path.len()).unwrap_or(u32::MAX);
            if !search.is_known(&cycles, &path) {
                cycles.push(path);
            }
        }
        Rings {
            in_ring,
            smallest,
            cycles,
        }
    }

    /// Whether a bond lies in a ring.
    pub fn has_bond(&self, bond: BondIx) -> bool {
        self.in_ring[bond.index()]
    }

    /// Whether an atom lies in a ring.
    pub fn has_atom(&self, molecule: &Molecule, atom: AtomIx) -> bool {
        molecule
            .neighbors(atom)
            .iter()
            .any(|n| self.has_bond(n.bond))
    }

    /// Number of atoms of the smallest ring through a bond; `None` if it lies in no ring.
    pub fn smallest_through(&self, bond: BondIx) -> Option<usize> {
        match self.smallest[bond.index()] {
            0 => None,
            n => Some(n as usize),
        }
    }

    /// For each ring bond one smallest ring through it, without repeats: atoms in ring order.
    pub fn cycles(&self) -> &[Vec<AtomIx>] {
        &self.cycles
    }

    /// A smallest ring that holds `atom` between its neighbours `a` and `b`, in ring order from `a` to
    /// `b` without `atom`; `None` if no ring does.
    pub fn through_pair(
        &self,
        molecule: &Molecule,
        atom: AtomIx,
        a: AtomIx,
        b: AtomIx,
    ) -> Option<Vec<AtomIx>> {
        let cut: Vec<BondIx> = molecule.neighbors(atom).iter().map(|n| n.bond).collect();
        let mut search = Search::new(molecule.n_atoms());
        search.shortest(molecule, &self.in_ring, a, b, &cut)
    }
}

/// Bonds that are no bridges, by depth-first search without recursion; time linear in the bonds.
pub(crate) fn ring_bonds(molecule: &Molecule) -> Vec<bool> {
    let n = molecule.n_atoms();
    let mut in_ring = vec![true; molecule.n_bonds()];
    let mut seen = vec![0u32; n];
    let mut low = vec![0u32; n];
    let mut clock = 0;
    let mut stack: Vec<(AtomIx, Option<BondIx>, usize)> = Vec::new();
    for root in molecule.atoms() {
        if seen[root.index()] != 0 {
            continue;
        }
        clock += 1;
        seen[root.index()] = clock;
        low[root.index()] = clock;
        stack.push((root, None, 0));
        while let Some((atom, by, next)) = stack.last_mut() {
            let (atom, by) = (*atom, *by);
            if let Some(neighbor) = molecule.neighbors(atom).get(*next) {
                *next += 1;
                if Some(neighbor.bond) == by {
                    continue;
                }
                let to = neighbor.atom;
                if seen[to.index()] == 0 {
                    clock += 1;
                    seen[to.index()] = clock;
                    low[to.index()] = clock;
                    stack.push((to, Some(neighbor.bond), 0));
                } else {
                    low[atom.index()] = low[atom.index()].min(seen[to.index()]);
                }
            } else {
                stack.pop();
                if let (Some(bond), Some((parent, _, _))) = (by, stack.last()) {
                    let parent = *parent;
                    low[parent.index()] = low[parent.index()].min(low[atom.index()]);
                    if low[atom.index()] > seen[parent.index()] {
                        in_ring[bond.index()] = false;
                    }
                }
            }
        }
    }
    in_ring
}

/// Breadth-first search whose memory is used again and again.
struct Search {
    round: u32,
    seen: Vec<u32>,
    from: Vec<AtomIx>,
    queue: Vec<AtomIx>,
}

impl Search {
    fn new(n_atoms: usize) -> Search {
        Search {
            round: 0,
            seen: vec![0; n_atoms],
            from: vec![AtomIx::new(0); n_atoms],
            queue: Vec::new(),
        }
    }

    /// Whether one of the cycles has the same atoms as another one.
    fn is_known(&mut self, cycles: &[Vec<AtomIx>], other: &[AtomIx]) -> bool {
        self.round += 1;
        for atom in other {
            self.seen[atom.index()] = self.round;
        }
        let is_in = |atom: &AtomIx| self.seen[atom.index()] == self.round;
        // most rings that share an atom stand close together in the list
        let mut latest_first = cycles.iter().rev();
        latest_first.any(|cycle| cycle.len() == other.len() && cycle.iter().all(is_in))
    }

    /// The way by which the search came from one atom to another.
    fn way(&self, start: AtomIx, goal: AtomIx) -> Vec<AtomIx> {
        let mut path = Vec::with_capacity(8);
        path.push(goal);
        let mut at = goal;
        while at != start {
            at = self.from[at.index()];
            path.push(at);
        }
        path.reverse();
        path
    }

    /// Atoms of a shortest path over ring bonds other than those cut, both ends included.
    fn shortest(
        &mut self,
        molecule: &Molecule,
        in_ring: &[bool],
        start: AtomIx,
        goal: AtomIx,
        cut: &[BondIx],
    ) -> Option<Vec<AtomIx>> {
        self.round += 1;
        self.queue.clear();
        self.queue.push(start);
        self.seen[start.index()] = self.round;
        let mut next = 0;
        while let Some(atom) = self.queue.get(next).copied() {
            next += 1;
            for n in molecule.neighbors(atom) {
                if !in_ring[n.bond.index()]
                    || self.seen[n.atom.index()] == self.round
                    || cut.contains(&n.bond)
                {
                    continue;
                }
                self.seen[n.atom.index()] = self.round;
                self.from[n.atom.index()] = atom;
                if n.atom == goal {
                    return Some(self.way(start, goal));
                }
                self.queue.push(n.atom);
            }
        }
        None
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::molecule::tests::build;

    #[test]
    fn bridges_and_smallest_rings() {
        // a four-ring and a three-ring that share a bond, with a tail
        let m = build(
            &["C"; 6],
            &[
                (0, 1, 1),
                (1, 2, 1),
                (2, 3, 1),
                (3, 0, 1),
                (2, 4, 1),
                (4, 3, 1),
                (0, 5, 1),
            ],
        );
        let rings = Rings::find(&m);
        let size = |i| rings.smallest_through(BondIx::new(i));
        assert_eq!(size(0), Some(4));
        assert_eq!(size(2), Some(3));
        assert_eq!(size(4), Some(3));
        assert_eq!(size(6), None);
        assert_eq!(rings.cycles().len(), 2);
        assert!(!rings.has_atom(&m, AtomIx::new(5)));
        let five = rings
            .through_pair(&m, AtomIx::new(2), AtomIx::new(1), AtomIx::new(4))
            .unwrap();
        assert_eq!(five.len(), 4);
    }
}
