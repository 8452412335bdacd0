//! Delocalised ring systems: the atomic number that a duplicate atom has there.
//!
//! In a mancude ring the place of the double bonds is a matter of drawing, so a duplicate atom has the
//! mean atomic number over the places that the double bond could take (IUPAC 2013 recommendations,
//! P-92.1.4.3, as digested from open implementations; equal weight for each neighbour).

use super::{Rings, drawn_without_charges};
use crate::element::Element;
use crate::molecule::{AtomIx, Molecule, Order};

/// An exact non-negative fraction.
#[derive(Clone, Copy, Debug)]
pub struct Ratio {
    /// Numerator.
    pub over: u32,
    /// Denominator, at least 1.
    pub under: u32,
}

impl Ratio {
    /// A whole number.
    pub fn whole(n: u32) -> Ratio {
        Ratio { over: n, under: 1 }
    }
}

impl PartialEq for Ratio {
    fn eq(&self, other: &Ratio) -> bool {
        self.cmp(other).is_eq()
    }
}

impl Eq for Ratio {}

impl PartialOrd for Ratio {
    fn partial_cmp(&self, other: &Ratio) -> Option<std::cmp::Ordering> {
        Some(self.cmp(other))
    }
}

impl Ord for Ratio {
    fn cmp(&self, other: &Ratio) -> std::cmp::Ordering {
        let left = u64::from(self.over) * u64::from(other.under);
        let right = u64::from(other.over) * u64::from(self.under);
        left.cmp(&right)
    }
}

/// What an atom of a delocalised ring system carries.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Delocalised {
    /// Atomic number of its duplicate atom.
    pub number: Ratio,
    /// Whether the atom carries that duplicate although none of its bonds is drawn double (the anionic
    /// atom of a cyclopentadienide).
    pub adds_duplicate: bool,
}

#[derive(Clone, Copy, PartialEq, Eq)]
enum Role {
    None,
    Double,
    Anion,
}

/// For each atom, what it carries as a member of a delocalised ring system.
pub fn delocalised(molecule: &Molecule, rings: &Rings) -> Vec<Option<Delocalised>> {
    let mut roles: Vec<Role> = molecule.atoms().map(|a| role(molecule, rings, a)).collect();
    drop_outsiders(molecule, rings, &mut roles);
    let mut carried = vec![None; molecule.n_atoms()];
    let mut seen = vec![false; molecule.n_atoms()];
    for start in molecule.atoms() {
        if roles[start.index()] == Role::None || seen[start.index()] {
            continue;
        }
        let part = collect(molecule, rings, &roles, &mut seen, start);
        let anionic = part.iter().any(|a| roles[a.index()] == Role::Anion);
        let shared = anionic.then(|| mean_of_partners(molecule, &roles, &part));
        for atom in part {
            let number = shared.unwrap_or_else(|| mean_of_neighbors(molecule, rings, &roles, atom));
            carried[atom.index()] = Some(Delocalised {
                number,
                adds_duplicate: roles[atom.index()] == Role::Anion,
            });
        }
    }
    carried
}

fn role(molecule: &Molecule, rings: &Rings, atom: AtomIx) -> Role {
    let (mut single, mut double) = (molecule.hydrogens(atom), 0);
    let mut in_ring = false;
    let dative = drawn_without_charges(molecule, atom);
    let charge = match dative {
        Some(_) => 1,
        None => molecule.atom(atom).charge,
    };
    for n in molecule.neighbors(atom) {
        match n.order {
            Order::Double if Some(n.bond) == dative => single += 1,
            Order::Single => single += 1,
            Order::Double => double += 1,
            Order::Triple | Order::Special(_) => return Role::None,
        }
        in_ring |= rings.has_bond(n.bond);
    }
    if !in_ring {
        return Role::None;
    }
    match (molecule.element(atom), charge, double, single) {
        (Element::C | Element::SI | Element::GE, 0, 1, 2) => Role::Double,
        (Element::C | Element::SI | Element::GE, -1, 0, 3) => Role::Anion,
        (Element::N | Element::P | Element::AS, 0, 1, 1) => Role::Double,
        (Element::N | Element::P | Element::AS, -1, 0, 2) => Role::Anion,
        (Element::N | Element::P | Element::AS, 1, 1, 2) => Role::Double,
        (Element::O, 1, 1, 1) => Role::Double,
        _ => Role::None,
    }
}

/// Members of the system next to an atom, over ring bonds.
fn members<'a>(
    molecule: &'a Molecule,
    rings: &'a Rings,
    roles: &'a [Role],
    atom: AtomIx,
) -> impl Iterator<Item = AtomIx> + 'a {
    molecule
        .neighbors(atom)
        .iter()
        .filter(|n| rings.has_bond(n.bond) && roles[n.atom.index()] != Role::None)
        .map(|n| n.atom)
}

/// Drops, as often as needed, atoms with fewer than two members beside them and atoms whose double bond
/// leads out of the system (the carbonyl carbon of a quinone).
fn drop_outsiders(molecule: &Molecule, rings: &Rings, roles: &mut [Role]) {
    let mut queue: Vec<AtomIx> = molecule
        .atoms()
        .filter(|a| roles[a.index()] != Role::None)
        .collect();
    while let Some(atom) = queue.pop() {
        if roles[atom.index()] == Role::None {
            continue;
        }
        let dative = drawn_without_charges(molecule, atom);
        let leads_out = molecule.neighbors(atom).iter().any(|n| {
            n.order == Order::Double
                && Some(n.bond) != dative
                && (roles[n.atom.index()] != Role::Double || !rings.has_bond(n.bond))
        });
        if leads_out || members(molecule, rings, roles, atom).count() < 2 {
            roles[atom.index()] = Role::None;
            queue.extend(
                molecule
                    .neighbors(atom)
                    .iter()
                    .map(|n| n.atom)
                    .filter(|a| roles[a.index()] != Role::None),
            );
        }
    }
}

fn collect(
    molecule: &Molecule,
    rings: &Rings,
    roles: &[Role],
    seen: &mut [bool],
    start: AtomIx,
) -> Vec<AtomIx> {
    let mut part = vec![start];
    seen[start.index()] = true;
    let mut next = 0;
    while let Some(atom) = part.get(next).copied() {
        next += 1;
        for member in members(molecule, rings, roles, atom) {
            if !seen[member.index()] {
                seen[member.index()] = true;
                part.push(member);
            }
        }
    }
    part
}

fn mean_of_neighbors(molecule: &Molecule, rings: &Rings, roles: &[Role], atom: AtomIx) -> Ratio {
    let (mut over, mut under) = (0, 0);
    for member in members(molecule, rings, roles, atom) {
        over += u32::from(molecule.element(member).number());
        under += 1;
    }
    Ratio {
        over,
        under: under.max(1),
    }
}

/// Sum of the atomic numbers at the far ends of the double bonds, shared by every atom of the part.
fn mean_of_partners(molecule: &Molecule, roles: &[Role], part: &[AtomIx]) -> Ratio {
    let over = part
        .iter()
        .flat_map(|a| molecule.neighbors(*a))
        .filter(|n| n.order == Order::Double && roles[n.atom.index()] != Role::None)
        .map(|n| u32::from(molecule.element(n.atom).number()))
        .sum();
    // a part is never empty and far smaller than u32
    let under = u32::try_from(part.len()).unwrap_or(u32::MAX).max(1);
    Ratio { over, under }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::molecule::tests::build;

    fn six_ring(symbols: &[&str]) -> Vec<Option<Delocalised>> {
        let bonds: Vec<_> = (0..6)
            .map(|i| (i, (i + 1) % 6, if i % 2 == 0 { 2 } else { 1 }))
            .collect();
        let m = build(symbols, &bonds);
        delocalised(&m, &Rings::find(&m))
    }

    // IUPAC 2013 recommendations, P-92.1.4.3: C2 of pyridine carries a duplicate of number 6.5
    #[test]
    fn pyridine() {
        let carried = six_ring(&["N", "C", "C", "C", "C", "C"]);
        let number = |i: usize| carried[i].map(|d| d.number);
        assert_eq!(number(1), Some(Ratio { over: 13, under: 2 }));
        assert_eq!(number(0), Some(Ratio::whole(6)));
        assert_eq!(number(3), Some(Ratio::whole(6)));
    }

    #[test]
    fn quinone_is_not_delocalised() {
        let m = build(
            &["C", "C", "C", "C", "C", "C", "O", "O"],
            &[
                (0, 1, 1),
                (1, 2, 2),
                (2, 3, 1),
                (3, 4, 1),
                (4, 5, 2),
                (5, 0, 1),
                (0, 6, 2),
                (3, 7, 2),
            ],
        );
        assert!(
            delocalised(&m, &Rings::find(&m))
                .iter()
                .all(Option::is_none)
        );
    }
}
