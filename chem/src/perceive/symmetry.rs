//! Constitutional symmetry: atoms that the graph cannot tell apart by their surroundings.

use crate::molecule::{AtomIx, Molecule};

/// Classes of atoms that look alike from every distance.
///
/// Refinement of neighbour classes until nothing changes: atoms that an automorphism exchanges always
/// share a class; the reverse holds for all but some highly regular graphs, so a class is a hint, never
/// a proof, that atoms are alike.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Symmetry {
    classes: Vec<u32>,
    n_classes: usize,
}

impl Symmetry {
    /// Finds the classes of a molecule; isotopes, charges and hydrogens count, marks do not.
    pub fn find(molecule: &Molecule) -> Symmetry {
        let first: Vec<Vec<u32>> = molecule
            .atoms()
            .map(|a| {
                let atom = molecule.atom(a);
                vec![
                    u32::from(atom.element.number()),
                    u32::from(atom.isotope.unwrap_or(0)),
                    atom.charge.unsigned_abs().into(),
                    u32::from(atom.charge < 0),
                    u32::from(molecule.hydrogens(a)),
                ]
            })
            .collect();
        let (mut classes, mut n_classes) = number(&first);
        loop {
            let signatures: Vec<Vec<u32>> = molecule
                .atoms()
                .map(|a| {
                    let mut around: Vec<u32> = molecule
                        .neighbors(a)
                        .iter()
                        .map(|n| classes[n.atom.index()] * 16 + u32::from(n.order.pairs()))
                        .collect();
                    around.sort_unstable();
                    around.insert(0, classes[a.index()]);
                    around
                })
                .collect();
            let (next, n_next) = number(&signatures);
            if n_next == n_classes {
                return Symmetry { classes, n_classes };
            }
            (classes, n_classes) = (next, n_next);
        }
    }

    /// Class of an atom, from 0.
    pub fn class(&self, atom: AtomIx) -> u32 {
        self.classes[atom.index()]
    }

    /// Number of classes.
    pub fn n_classes(&self) -> usize {
        self.n_classes
    }
}

/// Numbers signatures from 0 in ascending order.
fn number(signatures: &[Vec<u32>]) -> (Vec<u32>, usize) {
    let mut sorted: Vec<&Vec<u32>> = signatures.iter().collect();
    sorted.sort_unstable();
    sorted.dedup();
    let classes = signatures
        .iter()
        .map(|s| {
            let at = sorted.partition_point(|x| *x < s);
            u32::try_from(at).unwrap_or(u32::MAX)
        })
        .collect();
    (classes, sorted.len())
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::molecule::tests::build;

    #[test]
    fn branches_that_look_alike_share_a_class() {
        let m = build(&["C", "C", "C", "O"], &[(0, 1, 1), (1, 2, 1), (1, 3, 1)]);
        let s = Symmetry::find(&m);
        assert_eq!(s.class(AtomIx::new(0)), s.class(AtomIx::new(2)));
        assert_eq!(s.n_classes(), 3);
    }
}
