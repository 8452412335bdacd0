//! Implicit hydrogens by the standard valences.

use super::{AtomIx, Molecule};
use crate::element::Element;

/// Hydrogens that fill each atom up to the next valence of its element.
pub(super) fn count_all(molecule: &Molecule) -> Vec<u8> {
    molecule.atoms().map(|a| count(molecule, a)).collect()
}

fn count(molecule: &Molecule, ix: AtomIx) -> u8 {
    let atom = molecule.atom(ix);
    let used = molecule.bond_pairs(ix);
    if let Some(valence) = atom.valence {
        return valence.saturating_sub(used);
    }
    let used = used.saturating_add(atom.radical.valences());
    let valences = atom.element.valences(atom.charge);
    // a halogen with two bonds is a slip, not a halogen hydride
    let filled = match (valences, atom.element) {
        ([first, ..], Element::CL | Element::BR | Element::I) => std::slice::from_ref(first),
        _ => valences,
    };
    filled.iter().find(|v| **v >= used).map_or(0, |v| v - used)
}

pub(super) fn valence_is_usual(molecule: &Molecule, ix: AtomIx) -> bool {
    let atom = molecule.atom(ix);
    let valences = atom.element.valences(atom.charge);
    let used = molecule
        .bond_pairs(ix)
        .saturating_add(atom.radical.valences())
        .saturating_add(molecule.hydrogens(ix));
    let special = molecule.neighbors(ix).iter().any(|n| n.order.pairs() == 0);
    valences.is_empty() || special || valences.contains(&used)
        // nitro and N-oxide drawn with five bonds on nitrogen
        || (atom.element == Element::N && atom.charge == 0 && used == 5)
}

#[cfg(test)]
mod tests {
    use super::super::tests::build;
    use crate::element::Element;
    use crate::molecule::{Atom, AtomIx, Molecule, Radical};

    fn hydrogens(symbols: &[&str], bonds: &[(usize, usize, u8)]) -> Vec<u8> {
        let m = build(symbols, bonds);
        m.atoms().map(|a| m.hydrogens(a)).collect()
    }

    #[test]
    fn usual_valences() {
        assert_eq!(
            hydrogens(&["C", "C", "O"], &[(0, 1, 1), (1, 2, 1)]),
            [3, 2, 1]
        );
        assert_eq!(
            hydrogens(&["S", "O", "O", "C"], &[(0, 1, 2), (0, 2, 2), (0, 3, 1)]),
            [1, 0, 0, 3]
        );
        assert_eq!(
            hydrogens(&["P", "C", "C", "C"], &[(0, 1, 1), (0, 2, 1), (0, 3, 1)]),
            [0, 3, 3, 3]
        );
        assert_eq!(hydrogens(&["Na", "Fe", "He"], &[]), [0, 0, 0]);
    }

    #[test]
    fn a_halogen_is_never_filled_up() {
        let bridge = build(&["Cl", "C", "C"], &[(0, 1, 1), (0, 2, 1)]);
        assert_eq!(bridge.hydrogens(AtomIx::new(0)), 0);
        assert!(!bridge.valence_is_usual(AtomIx::new(0)));
        assert_eq!(hydrogens(&["Cl"], &[]), [1]);
    }

    #[test]
    fn charge_radical_and_stated_valence() {
        let single = |atom: Atom| {
            let m = Molecule::new(vec![atom], Vec::new()).unwrap();
            m.hydrogens(AtomIx::new(0))
        };
        let with = |element, change: fn(&mut Atom)| {
            let mut atom = Atom::new(element);
            change(&mut atom);
            single(atom)
        };
        assert_eq!(with(Element::N, |a| a.charge = 1), 4);
        assert_eq!(with(Element::O, |a| a.charge = -1), 1);
        assert_eq!(with(Element::C, |a| a.radical = Radical::Doublet), 3);
        assert_eq!(with(Element::C, |a| a.valence = Some(0)), 0);
        assert_eq!(with(Element::SI, |a| a.valence = Some(6)), 6);
    }
}
