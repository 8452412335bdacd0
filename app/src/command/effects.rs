//! What commands do to the drawing.

use super::Effect;
use crate::session::{Offer, Selection, Session};
use chem::drawing::{Edit, End, Mark};
use chem::molecule::{AtomIx, BondIx, Order};

/// The number after or before `now` among `n`, round and round.
fn walk(now: Option<usize>, n: usize, forward: bool) -> Option<usize> {
    let last = n.checked_sub(1)?;
    Some(match (now, forward) {
        (None, true) => 0,
        (None, false) => last,
        (Some(i), true) => {
            if i >= last {
                0
            } else {
                i + 1
            }
        }
        (Some(i), false) => i.checked_sub(1).unwrap_or(last),
    })
}

pub(super) fn walk_atoms(session: &mut Session, forward: bool) {
    let now = session.selection().atoms.first().map(|a| a.index());
    let next = walk(now, session.drawing().molecule().n_atoms(), forward);
    if let Some(i) = next {
        session.select(Selection::atom(AtomIx::new(i)));
    }
}

pub(super) fn walk_bonds(session: &mut Session, forward: bool) {
    let now = session.selection().bonds.first().map(|b| b.index());
    let next = walk(now, session.drawing().molecule().n_bonds(), forward);
    if let Some(i) = next {
        session.select(Selection::bond(BondIx::new(i)));
    }
}

pub(super) fn step(session: &mut Session, name: &str, edits: &[Edit]) -> Effect {
    if edits.is_empty() {
        return Effect::Done;
    }
    match session.step(name, edits) {
        Ok(_) => Effect::Done,
        Err(e) => Effect::Refused(format!("{name}: {e}")),
    }
}

/// Takes a mend.
pub(super) fn mend(session: &mut Session, offer: Offer) -> Effect {
    match session.mend(offer) {
        Ok(()) => Effect::Done,
        Err(e) => Effect::Refused(format!("the mend does not fit the drawing: {e}")),
    }
}

/// Removes the selection.
pub(super) fn delete(session: &mut Session) -> Effect {
    let edits = removal(session);
    step(session, "Delete", &edits)
}

/// Removal of the selection. A carbon that only the removed bonds held goes with them: nobody who
/// deletes the last bond of a chain means to leave methane.
fn removal(session: &Session) -> Vec<Edit> {
    let drawing = session.drawing();
    let (m, selection) = (drawing.molecule(), session.selection());
    let mut atoms = selection.atoms.clone();
    for bond in &selection.bonds {
        for end in m.bond(*bond).ends {
            let bare = m
                .neighbors(end)
                .iter()
                .all(|n| selection.bonds.contains(&n.bond));
            let plain = *m.atom(end) == chem::molecule::Atom::new(chem::element::Element::C);
            if bare && plain && m.degree(end) == 1 {
                atoms.insert(end);
            }
        }
    }
    let bonds = selection.bonds.iter().map(|b| Edit::RemoveBond(*b));
    bonds
        .chain(atoms.into_iter().map(Edit::RemoveAtom))
        .collect()
}

/// The selected bond, if it is one single bond that can bear a wedge.
pub(super) fn wedgeable(session: &Session) -> Option<BondIx> {
    let bond = session.selection().only_bond()?;
    (session.drawing().molecule().bond(bond).order == Order::Single).then_some(bond)
}

pub(super) fn wedge(session: &mut Session, name: &str, mark: fn(End) -> Mark) -> Effect {
    let Some(bond) = wedgeable(session) else {
        return Effect::Done;
    };
    let now = session.drawing().mark(bond);
    let narrow = now.narrow().unwrap_or_else(|| narrow_end(session, bond));
    let next = if now == mark(narrow) {
        Mark::Plain
    } else {
        mark(narrow)
    };
    step(session, name, &[Edit::Mark(bond, next)])
}

pub(super) fn swap(session: &mut Session) -> Effect {
    let Some(bond) = wedgeable(session) else {
        return Effect::Done;
    };
    let now = session.drawing().mark(bond);
    match now.narrow() {
        Some(end) => {
            let edit = Edit::Mark(bond, now.at(end.other()));
            step(session, "Swap the narrow end", &[edit])
        }
        None => Effect::Done,
    }
}

/// Where a new wedge starts: at the end that is a stereogenic place, else at the one with more bonds.
fn narrow_end(session: &Session, bond: BondIx) -> End {
    let m = session.drawing().molecule();
    let weight = |atom: AtomIx| {
        let place = session
            .report()
            .places
            .iter()
            .any(|p| p.atoms.as_slice() == [atom]);
        (place, m.degree(atom))
    };
    let [first, second] = m.bond(bond).ends;
    if weight(second) > weight(first) {
        End::Second
    } else {
        End::First
    }
}

pub(super) fn clear_marks(session: &mut Session) -> Effect {
    let (drawing, selection) = (session.drawing(), session.selection());
    let within = |b: &BondIx| {
        let ends = drawing.molecule().bond(*b).ends;
        selection.is_empty()
            || selection.bonds.contains(b)
            || ends.iter().any(|a| selection.atoms.contains(a))
    };
    let edits: Vec<Edit> = drawing
        .molecule()
        .bonds()
        .filter(|b| drawing.mark(*b) != Mark::Plain)
        .filter(within)
        .map(|b| Edit::Mark(b, Mark::Plain))
        .collect();
    step(session, "Clear marks", &edits)
}
