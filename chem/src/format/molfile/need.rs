//! What the aromatic atoms of a molfile need: it does not say which of them bear hydrogen.

use super::super::Reason;
use super::super::kekule::{self, Fault, Need};
use crate::element::Element;
use crate::molecule::{Atom, Bond};

/// Sets the orders of the aromatic bonds (indices into `bonds`, which hold them as single ones); where
/// that fails, an atom at which it does, and why.
pub(super) fn localize(
    atoms: &[Atom],
    bonds: &mut [Bond],
    aromatic: &[usize],
) -> Result<(), (usize, Reason)> {
    let mut used = vec![0u8; atoms.len()];
    for bond in bonds.iter() {
        for end in bond.ends {
            let slot = &mut used[end.index()];
            *slot = slot.saturating_add(bond.order.pairs());
        }
    }
    let mut need = vec![Need::Never; atoms.len()];
    for i in aromatic {
        for end in bonds[*i].ends {
            need[end.index()] = need_of(&atoms[end.index()], used[end.index()]);
        }
    }
    kekule::localize(&need, bonds, aromatic).map_err(|fault| match fault {
        // a table of 999 atoms never reaches the bound
        Fault::NoPattern(v) | Fault::TooLarge(v) => (v, Reason::NoPattern(v + 1)),
        Fault::SeveralPatterns(v, rivals) => {
            let atoms = rivals.into_iter().map(|w| w + 1).collect();
            (v, Reason::SeveralPatterns(atoms))
        }
    })
}

fn need_of(atom: &Atom, used: u8) -> Need {
    if atom.element == Element::ANY {
        return Need::May;
    }
    let taken = used.saturating_add(atom.radical.valences());
    let stated = atom.valence.map(|v| [v]);
    let valences = match &stated {
        Some(valence) => valence,
        None => atom.element.valences(atom.charge),
    };
    let room = valences.iter().find(|v| **v >= taken).map(|v| v - taken);
    match room {
        None | Some(0) => Need::Never,
        // carbon and its row, and every cation, bear a double bond where they have room for one
        Some(_) if matches!(atom.element.number(), 6 | 14 | 32 | 50) && atom.charge == 0 => {
            Need::Must
        }
        Some(_) if atom.charge > 0 && atom.element != Element::C => Need::Must,
        Some(_) => Need::May,
    }
}
