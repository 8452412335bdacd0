//! Aromatic bonds turned into alternating single and double bonds.
//!
//! The atoms that need a double bond are paired along aromatic bonds (a matching in a graph with odd
//! rings: Edmonds 1965). An atom that may bear a hydrogen instead (pyrrole's nitrogen) is paired only
//! where that is possible; if it is open which of several such atoms bears the hydrogen, there is no
//! answer.

use super::super::Reason;
use super::pairing::Pairing;
use crate::element::Element;
use crate::molecule::{Atom, Bond, Order};

/// How an atom with aromatic bonds stands to a double bond.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Need {
    /// Must have one.
    Must,
    /// Has one, or a hydrogen.
    May,
    /// Has none.
    Never,
}

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
    let mut edges = vec![Vec::new(); atoms.len()];
    for i in aromatic {
        for end in bonds[*i].ends {
            need[end.index()] = need_of(&atoms[end.index()], used[end.index()]);
        }
    }
    for i in aromatic {
        let [a, b] = bonds[*i].ends.map(|e| e.index());
        if need[a] != Need::Never && need[b] != Need::Never {
            edges[a].push(b);
            edges[b].push(a);
        }
    }
    let mut pairing = Pairing::new(edges);
    for (v, own) in need.iter().enumerate() {
        if *own == Need::Must && pairing.mate(v).is_none() {
            // an atom that may go without gives way to one that must not
            let gives_way = |w: usize| need[w] == Need::May;
            if !pairing.cover(v, gives_way) {
                return Err((v, Reason::NoPattern(v + 1)));
            }
        }
    }
    for (v, own) in need.iter().enumerate() {
        if *own == Need::May && pairing.mate(v).is_none() {
            pairing.cover(v, |_| false);
        }
    }
    for (v, own) in need.iter().enumerate() {
        if *own != Need::May || pairing.mate(v).is_some() {
            continue;
        }
        let mut rivals = pairing.exchangeable(v, |w| need[w] == Need::May);
        if !rivals.is_empty() {
            rivals.push(v);
            rivals.sort_unstable();
            let atoms = rivals.into_iter().map(|w| w + 1).collect();
            return Err((v, Reason::SeveralPatterns(atoms)));
        }
    }
    for i in aromatic {
        let [a, b] = bonds[*i].ends.map(|e| e.index());
        if pairing.mate(a) == Some(b) {
            bonds[*i].order = Order::Double;
        }
    }
    Ok(())
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
