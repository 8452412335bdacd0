//! From written atoms and bonds to a molecule: lower case turned into single and double bonds, hydrogens
//! counted.
//!
//! Unlike a molfile, a line says which atoms bear hydrogen: what each lower-case atom needs is settled by
//! its valence. Source of the valences of the organic subset: OpenSMILES, "Organic subset".

use super::cycles;
use super::error::{Fault, SmilesError};
use super::lex::Symbol;
use super::parse::{Parsed, WrittenAtom, WrittenBond};
use crate::element::Element;
use crate::format::kekule::{self, Need};
use crate::molecule::{Atom, AtomIx, Bond, Molecule, Order};
use crate::perceive::ring_bonds;

/// The molecule of a line; its atoms and bonds have the order of writing.
pub(super) fn molecule(parsed: &Parsed) -> Result<Molecule, SmilesError> {
    let mut atoms: Vec<Atom> = parsed.atoms.iter().map(stated).collect();
    let mut bonds: Vec<Bond> = parsed.bonds.iter().map(bond).collect();
    let raw = build(&atoms, &bonds)?;
    let in_ring = ring_bonds(&raw);
    if cycles::work(&raw, &in_ring) > cycles::MOST_WORK {
        let at = parsed.bonds.iter().zip(&in_ring).find(|(_, ring)| **ring);
        let column = at.map_or(1, |(bond, _)| bond.column);
        return Err(SmilesError::new(column, Fault::TooLarge));
    }
    let aromatic = aromatic_bonds(parsed, &raw, &in_ring)?;
    let filled = if aromatic.is_empty() {
        raw
    } else {
        let needs = needs(parsed, &raw);
        kekule::localize(&needs, &mut bonds, &aromatic)
            .map_err(|fault| unlocalized(parsed, fault))?;
        build(&atoms, &bonds)?
    };
    let mut states_valence = false;
    for ix in filled.atoms() {
        let written = &parsed.atoms[ix.index()];
        let used = filled.bond_pairs(ix);
        let hydrogens = hydrogens(written, used);
        if hydrogens != filled.hydrogens(ix) {
            atoms[ix.index()].valence = Some(used.saturating_add(hydrogens));
            states_valence = true;
        }
    }
    if states_valence {
        build(&atoms, &bonds)
    } else {
        Ok(filled)
    }
}

fn build(atoms: &[Atom], bonds: &[Bond]) -> Result<Molecule, SmilesError> {
    Molecule::new(atoms.to_vec(), bonds.to_vec())
        .map_err(|e| SmilesError::new(1, Fault::NoMolecule(e.to_string())))
}

fn stated(written: &WrittenAtom) -> Atom {
    let token = &written.token;
    let mut atom = Atom::new(token.element);
    atom.isotope = token.isotope;
    atom.charge = token.charge;
    atom.map = token.class;
    atom
}

fn bond(written: &WrittenBond) -> Bond {
    Bond {
        ends: written.ends.map(AtomIx::new),
        order: match written.symbol {
            Some(Symbol::Double) => Order::Double,
            Some(Symbol::Triple) => Order::Triple,
            None | Some(Symbol::Single | Symbol::Aromatic | Symbol::Up | Symbol::Down) => {
                Order::Single
            }
        },
    }
}

/// Bonds that may become double: without sign or with `:`, in a ring, between lower-case atoms. A
/// placeholder beside a lower-case atom counts as one. Bonds outside of rings (biphenyl) stay single.
fn aromatic_bonds(
    parsed: &Parsed,
    raw: &Molecule,
    in_ring: &[bool],
) -> Result<Vec<usize>, SmilesError> {
    for (atom, ix) in parsed.atoms.iter().zip(raw.atoms()) {
        let is_ring = || raw.neighbors(ix).iter().any(|n| in_ring[n.bond.index()]);
        if atom.token.aromatic && !is_ring() {
            return Err(SmilesError::new(atom.column, Fault::AromaticAtom));
        }
    }
    let mut list = Vec::new();
    for (i, bond) in parsed.bonds.iter().enumerate() {
        let [a, b] = bond.ends.map(|atom| &parsed.atoms[atom].token);
        let fits = (a.aromatic || a.element == Element::ANY)
            && (b.aromatic || b.element == Element::ANY)
            && (a.aromatic || b.aromatic);
        match bond.symbol {
            Some(Symbol::Aromatic) if !fits => {
                return Err(SmilesError::new(bond.column, Fault::AromaticBond));
            }
            None | Some(Symbol::Aromatic) if fits && in_ring[i] => list.push(i),
            _ => {}
        }
    }
    Ok(list)
}

fn needs(parsed: &Parsed, raw: &Molecule) -> Vec<Need> {
    let written = parsed.atoms.iter().zip(raw.atoms());
    written.map(|(atom, ix)| need(atom, raw, ix)).collect()
}

/// Whether an atom bears one of the double bonds to be found. `raw` has the lower-case bonds as single.
fn need(written: &WrittenAtom, raw: &Molecule, ix: AtomIx) -> Need {
    let token = &written.token;
    let used = raw.bond_pairs(ix);
    let has_multiple = usize::from(used) > raw.degree(ix);
    let taken = match token.hydrogens {
        Some(stated) => used.saturating_add(stated),
        // all the hydrogen it can bear beside a double bond
        None if token.element == Element::C && !has_multiple => used.max(3),
        None if token.element == Element::C => used.max(4),
        None => used,
    };
    let valences = valences(token.element, token.charge);
    if token.element == Element::ANY {
        Need::May
    } else if !token.aromatic || valences.contains(&taken) {
        Need::Never
    } else if valences.contains(&taken.saturating_add(1)) {
        Need::Must
    } else if valences.last().is_some_and(|most| *most > taken) {
        // a carbene or radical
        Need::May
    } else {
        Need::Never
    }
}

fn valences(element: Element, charge: i8) -> &'static [u8] {
    match (element, charge) {
        // nitro groups and N-oxides with five bonds
        (Element::N, 0) => &[3, 5],
        _ => element.valences(charge),
    }
}

/// Hydrogens that an atom bears beside `used` electron pairs of its bonds.
fn hydrogens(written: &WrittenAtom, used: u8) -> u8 {
    let token = &written.token;
    if let Some(stated) = token.hydrogens {
        return stated;
    }
    if token.aromatic && token.element != Element::C {
        return 0;
    }
    organic_hydrogens(token.element, used).unwrap_or(0)
}

/// Hydrogens of an atom that is written without brackets, beside `used` electron pairs of its bonds;
/// `None` if the element needs brackets.
pub(super) fn organic_hydrogens(element: Element, used: u8) -> Option<u8> {
    let valences: &[u8] = match element {
        Element::ANY => &[0],
        Element::B => &[3],
        Element::C => &[4],
        Element::N | Element::P => &[3, 5],
        Element::O => &[2],
        Element::S => &[2, 4, 6],
        Element::F | Element::CL | Element::BR | Element::I => &[1],
        _ => return None,
    };
    Some(
        valences
            .iter()
            .find(|v| **v >= used)
            .map_or(0, |v| v - used),
    )
}

fn unlocalized(parsed: &Parsed, fault: kekule::Fault) -> SmilesError {
    let column = |atom: usize| parsed.atoms.get(atom).map_or(1, |a| a.column);
    match fault {
        kekule::Fault::NoPattern(atom) => {
            SmilesError::new(column(atom), Fault::NoPattern(atom + 1))
        }
        kekule::Fault::TooLarge(atom) => SmilesError::new(column(atom), Fault::TooLarge),
        kekule::Fault::SeveralPatterns(atom, all) => {
            let all = all.into_iter().map(|a| a + 1).collect();
            SmilesError::new(column(atom), Fault::SeveralPatterns(all))
        }
    }
}

#[cfg(test)]
mod tests {
    use super::super::parse::parse;
    use super::*;

    /// Hydrogens of each atom and number of double bonds.
    fn counts(text: &str) -> (Vec<u8>, usize) {
        let m = molecule(&parse(text).unwrap()).unwrap_or_else(|e| panic!("{text}: {e}"));
        let doubles = m.bonds().filter(|b| m.bond(*b).order == Order::Double);
        (m.atoms().map(|a| m.hydrogens(a)).collect(), doubles.count())
    }

    fn fault(text: &str) -> (usize, Fault) {
        let error = molecule(&parse(text).unwrap()).err();
        let error = error.unwrap_or_else(|| panic!("{text} was read"));
        (error.column, error.reason)
    }

    // OpenSMILES, "Organic subset"
    #[test]
    fn hydrogens_of_the_organic_subset_and_of_brackets() {
        for (text, hydrogens) in [
            ("C", vec![4]),
            ("N", vec![3]),
            ("[N]", vec![0]),
            ("CN(C)(C)C", vec![3, 1, 3, 3, 3]),
            ("CS(C)C", vec![3, 1, 3, 3]),
            ("OS(=O)(=O)O", vec![1, 0, 0, 0, 1]),
            ("CP(C)(C)C", vec![3, 1, 3, 3, 3]),
            ("C[N+](C)(C)C", vec![3, 0, 3, 3, 3]),
            ("CN(=O)=O", vec![3, 0, 0, 0]),
            ("[CH3]", vec![3]),
            ("[H]", vec![0]),
            ("[HH]", vec![1]),
            ("[H+]", vec![0]),
            ("[OH2]", vec![2]),
            ("[Na]", vec![0]),
            ("[AlH3]", vec![3]),
            ("*C", vec![0, 3]),
            ("[*H2]", vec![2]),
            ("ClC", vec![0, 3]),
            ("CClC", vec![3, 0, 3]),
            ("[SiH3]C", vec![3, 3]),
        ] {
            assert_eq!(counts(text).0, hydrogens, "{text}");
        }
    }

    // lower-case rings of OpenSMILES, "Aromaticity", and of rings that programs write
    #[test]
    fn lower_case_rings_become_alternating_bonds() {
        for (text, doubles) in [
            ("c1ccccc1", 3),
            ("c1ccc2ccccc2c1", 5),
            ("c1ccc2cccc2cc1", 5),
            ("n1ccccc1", 3),
            ("[nH]1cccc1", 2),
            ("Cn1cccc1", 2),
            ("c1cnc[nH]1", 2),
            ("o1cccc1", 2),
            ("s1cccc1", 2),
            ("[se]1cccc1", 2),
            ("[te]1cccc1", 2),
            ("[asH]1cccc1", 2),
            ("p1ccccc1", 3),
            ("[siH]1ccccc1", 3),
            ("b1ccccc1", 3),
            ("[bH]1cccc1", 2),
            ("[cH-]1cccc1", 2),
            ("[cH+]1cccccc1", 3),
            ("[o+]1ccccc1", 3),
            ("[s+]1ccccc1", 3),
            ("C[n+]1ccccc1", 3),
            ("[nH+]1ccccc1", 3),
            ("O=n1ccccc1", 4),
            ("[O-][n+]1ccccc1", 3),
            ("O=c1cccc[nH]1", 3),
            ("O=s1cccc1", 3),
            ("O=c1c(=O)c1=O", 3),
            ("Cs1ccccc1", 3),
            ("[c]1n(C)ccn1C", 1),
            ("c1ccccc1c1ccccc1", 6),
            ("c12ccccc1c1ccccc12", 6),
            ("c1ccc2c(c1)c1ccccc1[nH]2", 6),
            ("c1cc*cc1", 3),
            ("c1ccc(*)cc1", 3),
            ("c:1:c:c:c:c:c1", 3),
            ("C=1-c2ccccc2C1", 4),
            ("c1=cc=cc=c1", 3),
            ("[n-]1cccc1", 2),
            ("n1[nH]nnc1", 2),
            ("Cn1c(=O)c2c(ncn2C)n(C)c1=O", 4),
        ] {
            assert_eq!(counts(text).1, doubles, "{text}");
        }
    }

    #[test]
    fn lower_case_that_says_no_molecule() {
        assert_eq!(fault("c"), (1, Fault::AromaticAtom));
        assert_eq!(fault("c1ccccc1o"), (9, Fault::AromaticAtom));
        assert_eq!(fault("c1cccc1"), (6, Fault::NoPattern(5)));
        // which nitrogen bears the hydrogen is not written
        assert!(matches!(fault("n1cccc1").1, Fault::NoPattern(_)));
        assert_eq!(fault("C1:C:C1"), (3, Fault::AromaticBond));
        assert_eq!(fault("c1cccc1c1cccc1").1, Fault::NoPattern(5));
    }

    #[test]
    fn a_bound_on_rings() {
        let ring = format!("C1{}C1", "C".repeat(90_000));
        assert_eq!(fault(&ring), (3, Fault::TooLarge));
        let chain = "c1ccccc1C".repeat(1_000);
        assert_eq!(counts(&chain).1, 3_000);
    }
}
