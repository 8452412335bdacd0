//! Aromatic bonds turned into alternating single and double bonds.
//!
//! The atoms that need a double bond are paired along aromatic bonds (a matching in a graph with odd
//! rings: Edmonds 1965). An atom that may do without is paired only where that is possible; if it is
//! open which of several such atoms goes without, there is no answer. Each format says for itself what
//! its atoms need.

use super::pairing::Pairing;
use crate::molecule::{Bond, Order};

/// How an atom with aromatic bonds stands to a double bond.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Need {
    /// Must have one.
    Must,
    /// Has one, or a hydrogen or free electrons in its place.
    May,
    /// Has none.
    Never,
}

/// Why aromatic bonds could not be localised; atoms by index.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) enum Fault {
    /// No alternating single and double bonds: this atom is left over.
    NoPattern(usize),
    /// It is open which of several atoms goes without a double bond: the one that was left, all of them.
    SeveralPatterns(usize, Vec<usize>),
    /// The bound of work was reached at this atom.
    TooLarge(usize),
}

/// Sets the orders of the aromatic bonds (indices into `bonds`, which hold them as single ones) by what
/// each atom needs.
pub(super) fn localize(need: &[Need], bonds: &mut [Bond], aromatic: &[usize]) -> Result<(), Fault> {
    let mut edges = vec![Vec::new(); need.len()];
    for i in aromatic {
        let [a, b] = bonds[*i].ends.map(|e| e.index());
        if need[a] != Need::Never && need[b] != Need::Never {
            edges[a].push(b);
            edges[b].push(a);
        }
    }
    let mut mates = vec![None; need.len()];
    for system in systems(&edges) {
        pair(&system, &edges, need, &mut mates)?;
    }
    for i in aromatic {
        let [a, b] = bonds[*i].ends.map(|e| e.index());
        if mates[a] == Some(b) {
            bonds[*i].order = Order::Double;
        }
    }
    Ok(())
}

/// Atoms that hang together by edges, in ascending order.
fn systems(edges: &[Vec<usize>]) -> Vec<Vec<usize>> {
    let mut seen = vec![false; edges.len()];
    let mut systems = Vec::new();
    for start in 0..edges.len() {
        if std::mem::replace(&mut seen[start], true) {
            continue;
        }
        let mut system = vec![start];
        let mut next = 0;
        while let Some(v) = system.get(next).copied() {
            next += 1;
            for to in &edges[v] {
                if !std::mem::replace(&mut seen[*to], true) {
                    system.push(*to);
                }
            }
        }
        system.sort_unstable();
        systems.push(system);
    }
    systems
}

/// Pairs the atoms of one system.
fn pair(
    system: &[usize],
    edges: &[Vec<usize>],
    need: &[Need],
    mates: &mut [Option<usize>],
) -> Result<(), Fault> {
    let own = |atom: &usize| system.binary_search(atom).unwrap_or(0);
    let local = system
        .iter()
        .map(|atom| edges[*atom].iter().map(own).collect())
        .collect();
    let need_of = |v: usize| need[system[v]];
    let mut pairing = Pairing::new(local);
    for v in (0..system.len()).filter(|v| need_of(*v) == Need::Must) {
        if pairing.mate(v).is_some() {
            continue;
        }
        // an atom that may go without gives way to one that must not
        let covered = pairing.cover(v, |w| need_of(w) == Need::May);
        if pairing.is_exhausted() {
            return Err(Fault::TooLarge(system[v]));
        }
        if !covered {
            return Err(Fault::NoPattern(system[v]));
        }
    }
    let optional = || (0..system.len()).filter(|v| need_of(*v) == Need::May);
    for v in optional() {
        if pairing.mate(v).is_none() {
            pairing.cover(v, |_| false);
        }
    }
    for v in optional().filter(|v| pairing.mate(*v).is_none()) {
        let mut rivals = pairing.exchangeable(v, |w| need_of(w) == Need::May);
        if !rivals.is_empty() {
            rivals.push(v);
            rivals.sort_unstable();
            let atoms = rivals.into_iter().map(|w| system[w]).collect();
            return Err(Fault::SeveralPatterns(system[v], atoms));
        }
        if pairing.is_exhausted() {
            return Err(Fault::TooLarge(system[v]));
        }
    }
    for (v, atom) in system.iter().enumerate() {
        mates[*atom] = pairing.mate(v).map(|w| system[w]);
    }
    Ok(())
}
