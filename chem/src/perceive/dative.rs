//! Nitrogen drawn with five bonds: the one of them that is as well drawn with two charges.
//!
//! `N=O` of an amine oxide, a nitro or an azoxy group and the end of an azide stand for `N+-O-` and
//! `N+=N-`; both drawings are one compound and must be ranked alike (common practice, no source).

use crate::element::Element;
use crate::molecule::{AtomIx, BondIx, Molecule, Order};

/// The bond of a five-bonded neutral nitrogen that has one electron pair less with the charges apart.
pub fn drawn_without_charges(molecule: &Molecule, atom: AtomIx) -> Option<BondIx> {
    let is_five = molecule.element(atom) == Element::N
        && molecule.atom(atom).charge == 0
        && molecule.bond_pairs(atom) + molecule.hydrogens(atom) == 5;
    if !is_five {
        return None;
    }
    let ends_here = |n: AtomIx| molecule.degree(n) == 1 && molecule.atom(n).charge == 0;
    let neighbors = molecule.neighbors(atom).iter();
    let takes_charge = neighbors.filter(|n| {
        ends_here(n.atom)
            && match molecule.element(n.atom) {
                Element::O | Element::S | Element::SE => n.order == Order::Double,
                Element::N => n.order == Order::Triple,
                _ => false,
            }
    });
    // oxygen first: the other one may be the imine of a nitro-like group
    takes_charge
        .min_by_key(|n| molecule.element(n.atom) != Element::O)
        .map(|n| n.bond)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::molecule::tests::build;

    #[test]
    fn one_bond_of_a_five_bonded_nitrogen() {
        let nitro = build(&["C", "N", "O", "O"], &[(0, 1, 1), (1, 2, 2), (1, 3, 2)]);
        let n = AtomIx::new(1);
        assert_eq!(drawn_without_charges(&nitro, n), Some(BondIx::new(1)));
        let imine = build(&["C", "N", "C"], &[(0, 1, 1), (1, 2, 2)]);
        assert_eq!(drawn_without_charges(&imine, n), None);
        let azide = build(&["C", "N", "N", "N"], &[(0, 1, 1), (1, 2, 2), (2, 3, 3)]);
        assert_eq!(
            drawn_without_charges(&azide, AtomIx::new(2)),
            Some(BondIx::new(2))
        );
    }
}
