//! Two bridgeheads of a small bridged ring whose marks ask one of them to turn inside out.
//!
//! Seen from outside each bridgehead, the three bridges go round clockwise at one and anticlockwise at the
//! other. Rings of at most ten atoms in all cannot hold it otherwise (in,out-bicycles are known from larger
//! ones; from memory).

use super::super::case::Case;
use super::super::clause;
use super::super::words::n;
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::molecule::AtomIx;
use crate::stereo::{Configuration, Ligand, Parity, UnitIx, odd_permutation};

/// Atoms of the largest bicycle that surely cannot hold an inward bridgehead.
const LARGEST: usize = 10;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (a, b, bridges) in bicycles(case) {
        let (Some(p), Some(q)) = (parity(case, a), parity(case, b)) else {
            continue;
        };
        let first: Vec<AtomIx> = bridges
            .iter()
            .filter_map(|path| path.first().copied())
            .collect();
        let last: Vec<AtomIx> = bridges
            .iter()
            .filter_map(|path| path.last().copied())
            .collect();
        let (Some(s), Some(t)) = (clockwise(case, p, &first), clockwise(case, q, &last)) else {
            continue;
        };
        // marks at bridgeheads that carry nothing are idle, whatever they say
        if s != t || !(case.is_stereocenter(a) || case.is_stereocenter(b)) {
            continue;
        }
        let text = format!(
            "the marks at the bridgeheads, atoms {} and {}, cannot both hold: in so small a ring both must point outwards",
            n(a),
            n(b)
        );
        out.push(finding(
            Kind::ImpossibleGeometry,
            Grade::Wrong,
            &[a, b],
            &[],
            text,
            clause::BRIDGE,
        ));
    }
}

fn parity(case: &Case<'_>, a: AtomIx) -> Option<(UnitIx, Parity)> {
    let ix = case.center(a)?;
    match case.reading.configuration(ix) {
        Configuration::Defined(parity) => Some((ix, parity)),
        Configuration::Open | Configuration::Either => None,
    }
}

/// Whether the three bridges go round clockwise, seen from the fourth ligand.
fn clockwise(case: &Case<'_>, (ix, parity): (UnitIx, Parity), bridges: &[AtomIx]) -> Option<bool> {
    let ligands = &case.units().get(ix).ligands;
    let outer = ligands
        .iter()
        .find(|l| l.atom().is_none_or(|a| !bridges.contains(&a)))?;
    let mut seen = vec![*outer];
    seen.extend(bridges.iter().map(|a| Ligand::Atom(*a)));
    (seen.len() == 4).then(|| (parity == Parity::Even) != odd_permutation(&seen, ligands))
}

/// Pairs of centres joined by three separate bridges of at least one atom each, at most ten atoms in all:
/// the bridges, each from the first atom to the second.
pub(super) fn bicycles(case: &Case<'_>) -> Vec<(AtomIx, AtomIx, Vec<Vec<AtomIx>>)> {
    let molecule = case.molecule();
    let heads: Vec<AtomIx> = molecule
        .atoms()
        .filter(|a| case.center(*a).is_some())
        .filter(|a| {
            let ring = molecule.neighbors(*a).iter();
            ring.filter(|n| case.rings().has_bond(n.bond)).count() == 3
        })
        .collect();
    let mut found = Vec::new();
    for (i, a) in heads.iter().enumerate() {
        for b in &heads[i + 1..] {
            let share_a_ring = case
                .rings()
                .cycles()
                .iter()
                .any(|c| c.len() <= LARGEST && c.contains(a) && c.contains(b));
            if share_a_ring && let Some(bridges) = bridges(case, *a, *b) {
                found.push((*a, *b, bridges));
            }
        }
    }
    found
}

/// The three bridges between two atoms, each a shortest way from one of the ring neighbours of the first
/// that avoids the others.
fn bridges(case: &Case<'_>, a: AtomIx, b: AtomIx) -> Option<Vec<Vec<AtomIx>>> {
    let molecule = case.molecule();
    if molecule.bond_between(a, b).is_some() {
        return None;
    }
    let mut used = vec![a];
    let mut all = Vec::new();
    // shortest bridges first, so that a long one does not take their atoms
    let mut starts: Vec<AtomIx> = molecule
        .neighbors(a)
        .iter()
        .filter(|n| case.rings().has_bond(n.bond))
        .map(|n| n.atom)
        .collect();
    starts.sort_by_key(|s| (way(case, *s, b, &[a]).map_or(usize::MAX, |w| w.len()), *s));
    for start in starts {
        let path = way(case, start, b, &used)?;
        used.extend(&path);
        all.push(path);
    }
    (all.len() == 3 && used.len() < LARGEST).then_some(all)
}

/// A shortest way from `start` to a neighbour of `goal` over ring bonds, without some atoms; at most
/// eight long.
fn way(case: &Case<'_>, start: AtomIx, goal: AtomIx, without: &[AtomIx]) -> Option<Vec<AtomIx>> {
    if without.contains(&start) || start == goal {
        return None;
    }
    let mut queue = vec![vec![start]];
    let mut seen = without.to_vec();
    seen.push(start);
    let mut next = 0;
    while let Some(path) = queue.get(next).cloned() {
        next += 1;
        let at = *path.last()?;
        for n in case.molecule().neighbors(at) {
            if !case.rings().has_bond(n.bond) {
                continue;
            }
            if n.atom == goal {
                return Some(path);
            }
            if !seen.contains(&n.atom) && path.len() < 8 {
                seen.push(n.atom);
                let mut longer = path.clone();
                longer.push(n.atom);
                queue.push(longer);
            }
        }
    }
    None
}
