//! Moves single ligands: a branch turned about its centre into a wider gap, or pushed out to full length.
//! Nothing is mirrored, so marks elsewhere keep their meaning.

use super::super::case::Case;
use crate::drawing::{Drawing, Edit};
use crate::geom::{self, Point, Vec2};
use crate::molecule::{AtomIx, BondIx};
use std::f64::consts::PI;

/// Branches of a centre that are tried, the smallest first.
const MOST_BRANCHES: usize = 4;
/// Larger branches than this are not moved.
const LARGEST_BRANCH: usize = 60;
/// Nearer than this (in bond lengths) a moved atom and another one collide.
const ROOM: f64 = 0.5;

/// Moves that give the bonds of a centre wider gaps: few atoms and small turns first.
pub(super) fn moves(case: &Case<'_>, center: AtomIx) -> Vec<Vec<Edit>> {
    let drawing = case.drawing;
    let mut branches: Vec<(AtomIx, Vec<AtomIx>)> = case
        .molecule()
        .neighbors(center)
        .iter()
        .filter_map(|n| Some((n.atom, branch(case, n.bond, center)?)))
        .collect();
    branches.sort_by_key(|(root, atoms)| (atoms.len(), *root));
    let mut list: Vec<(f64, Vec<Edit>)> = Vec::new();
    for (root, atoms) in branches.iter().take(MOST_BRANCHES) {
        let others: Vec<Vec2> = case
            .molecule()
            .neighbors(center)
            .iter()
            .filter(|n| n.atom != *root)
            .filter_map(|n| drawing.direction(center, n.atom))
            .collect();
        let now = drawing.point(*root) - drawing.point(center);
        let length = now.hypot();
        let full = drawing.bond_length();
        // a length that is far off is put right on the way
        let length = if length < 0.7 * full { full } else { length };
        let here = if now.hypot() > 0.05 * full {
            geom::angle(now)
        } else {
            0.0
        };
        let mut goals: Vec<f64> = vec![here];
        for (middle, wide) in geom::gaps(&others) {
            goals.push(middle);
            // a wide gap has good places on both sides of its middle
            if wide > 1.2 * PI {
                goals.push(middle + PI / 6.0);
                goals.push(middle - PI / 6.0);
            }
        }
        for goal in goals {
            let turn = (goal - here + PI).rem_euclid(2.0 * PI) - PI;
            let to = drawing.point(center) + geom::unit(goal) * length;
            if let Some(edits) = carried(drawing, center, *root, atoms, turn, to) {
                let effort = atoms.len() as f64 * (0.2 + turn.abs());
                list.push((effort, edits));
            }
        }
    }
    list.sort_by(|a, b| a.0.total_cmp(&b.0));
    list.into_iter().map(|(_, edits)| edits).collect()
}

/// Atoms on the far side of an acyclic bond, if they are not too many.
pub(super) fn branch(case: &Case<'_>, bond: BondIx, from: AtomIx) -> Option<Vec<AtomIx>> {
    if case.rings().has_bond(bond) {
        return None;
    }
    let molecule = case.molecule();
    let mut atoms = vec![molecule.bond(bond).other(from)];
    let mut seen = vec![false; molecule.n_atoms()];
    seen[from.index()] = true;
    seen[atoms[0].index()] = true;
    let mut next = 0;
    while let Some(atom) = atoms.get(next).copied() {
        next += 1;
        if atoms.len() > LARGEST_BRANCH {
            return None;
        }
        for n in molecule.neighbors(atom) {
            if !seen[n.atom.index()] {
                seen[n.atom.index()] = true;
                atoms.push(n.atom);
            }
        }
    }
    Some(atoms)
}

/// Edits that turn a branch and put its root at `to`; `None` if nothing moves or atoms or bonds collide.
pub(super) fn carried(
    drawing: &Drawing,
    center: AtomIx,
    root: AtomIx,
    atoms: &[AtomIx],
    turn: f64,
    to: Point,
) -> Option<Vec<Edit>> {
    let from = drawing.point(root);
    if from.distance(to) < 0.02 * drawing.bond_length() {
        return None;
    }
    let place = |a: AtomIx| to + (geom::rotate(drawing.point(a), from, turn) - from);
    let mut points: Vec<Point> = drawing.points().to_vec();
    for a in atoms {
        points[a.index()] = place(*a);
    }
    let is_clear = clear(drawing, center, atoms, &points);
    is_clear.then(|| atoms.iter().map(|a| Edit::Move(*a, place(*a))).collect())
}

/// Whether moved atoms keep clear of the rest, and their bonds cross no other.
pub(super) fn clear(drawing: &Drawing, center: AtomIx, moved: &[AtomIx], points: &[Point]) -> bool {
    let molecule = drawing.molecule();
    let mut moves = vec![false; molecule.n_atoms()];
    for a in moved {
        moves[a.index()] = true;
    }
    let room = ROOM * drawing.bond_length();
    let still = || {
        molecule
            .atoms()
            .filter(|a| !moves[a.index()] && *a != center)
    };
    let near = moved.iter().any(|a| {
        still().any(|b| {
            let now = points[a.index()].distance(points[b.index()]);
            // what was near before may stay so
            now < room && now < drawing.point(*a).distance(drawing.point(b)) - 1e-9
        })
    });
    if near {
        return false;
    }
    let at = |a: AtomIx| points[a.index()];
    molecule.bonds().all(|b| {
        let [p, q] = molecule.bond(b).ends;
        if !moves[p.index()] && !moves[q.index()] {
            return true;
        }
        molecule.bonds().all(|c| {
            let [r, s] = molecule.bond(c).ends;
            let stays = !moves[r.index()] && !moves[s.index()];
            let apart = p != r && p != s && q != r && q != s;
            let before = || {
                let old = |a: AtomIx| drawing.point(a);
                geom::cross(old(p), old(q), old(r), old(s))
            };
            !(stays && apart && geom::cross(at(p), at(q), at(r), at(s))) || before()
        })
    })
}
