//! How much work the rings of a line will be: a bound before they are searched.

use crate::molecule::{AtomIx, Molecule};

/// Most steps that are spent on rings: under a second, a single system of seven thousand bonds.
pub(super) const MOST_WORK: u64 = 50_000_000;

/// Steps of a search for the smallest ring through each ring bond: each may walk over its whole system.
pub(super) fn work(molecule: &Molecule, in_ring: &[bool]) -> u64 {
    let mut leader: Vec<usize> = (0..molecule.n_atoms()).collect();
    let ends = || {
        let bonds = molecule.bonds().filter(|b| in_ring[b.index()]);
        bonds.map(|b| molecule.bond(b).ends.map(AtomIx::index))
    };
    for bond in ends() {
        let [a, b] = bond.map(|atom| find(&mut leader, atom));
        leader[a.max(b)] = a.min(b);
    }
    let mut size = vec![0u64; leader.len()];
    for [a, _] in ends() {
        size[find(&mut leader, a)] += 1;
    }
    size.iter()
        .map(|n| n.saturating_mul(*n))
        .fold(0, u64::saturating_add)
}

fn find(leader: &mut [usize], mut atom: usize) -> usize {
    while leader[atom] != atom {
        leader[atom] = leader[leader[atom]];
        atom = leader[atom];
    }
    atom
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::molecule::tests::build;
    use crate::perceive::ring_bonds;

    #[test]
    fn systems_count_by_the_square_of_their_bonds() {
        let ring = |from: usize| {
            [
                (from, from + 1, 1),
                (from + 1, from + 2, 1),
                (from + 2, from, 1),
            ]
        };
        let mut bonds = vec![(2, 3, 1), (3, 4, 1)];
        bonds.extend(ring(0));
        bonds.extend(ring(4));
        let m = build(&["C"; 7], &bonds);
        let in_ring = ring_bonds(&m);
        assert_eq!(in_ring.iter().filter(|r| **r).count(), 6);
        assert_eq!(work(&m, &in_ring), 18);
    }
}
