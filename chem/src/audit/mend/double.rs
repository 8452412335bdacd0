//! Ways to draw a double bond: its ligands swung to 120 degrees, turned over, a wavy bond for a cross.

use super::super::case::Case;
use super::ligand;
use crate::drawing::{Edit, Mark};
use crate::geom::{self, Point};
use crate::molecule::{AtomIx, BondIx, Order};
use crate::solve::turn::{Geometry, turn};
use crate::stereo::{Focus, Kind, Parity, UnitIx};
use std::f64::consts::PI;

/// Changes after which a double bond may read as `parity`.
pub(super) fn turned(case: &Case<'_>, ix: UnitIx, parity: Parity) -> Vec<Vec<Edit>> {
    let unit = case.units().get(ix);
    let (Focus::Pair(ends), Kind::DoubleBond) = (unit.focus, unit.kind) else {
        return Vec::new();
    };
    let (Some(a), Some(b)) = (unit.ligands[0].atom(), unit.ligands[2].atom()) else {
        return Vec::new();
    };
    let geometry = Geometry {
        ends,
        toward: unit.toward_each_other(),
        first: [a, b],
        parity,
    };
    let mut list = Vec::new();
    // one ligand swung is less than a side turned over
    list.extend(swung(case, ix));
    list.extend(turn(case.drawing, case.rings(), case.units(), geometry).ok());
    list
}

/// Changes that swing the ligands of one end or both to 120 degrees from the double bond, to either side.
pub(super) fn swung(case: &Case<'_>, ix: UnitIx) -> Vec<Vec<Edit>> {
    let unit = case.units().get(ix);
    let Focus::Pair(ends) = unit.focus else {
        return Vec::new();
    };
    let toward = unit.toward_each_other();
    let mut of_ends: Vec<Vec<Vec<Edit>>> = Vec::new();
    for k in 0..2 {
        let ligands: Vec<AtomIx> = unit.ligands[2 * k..2 * k + 2]
            .iter()
            .filter_map(|l| l.atom())
            .collect();
        let axis = geom::angle(case.drawing.point(toward[k]) - case.drawing.point(ends[k]));
        let mut ways = Vec::new();
        for side in [1.0, -1.0] {
            let goals: Vec<(AtomIx, f64)> = ligands
                .iter()
                .zip([side, -side])
                .map(|(l, s)| (*l, axis + s * 2.0 * PI / 3.0))
                .collect();
            ways.extend(swing(case, ends[k], &goals));
        }
        // the side on which they stand first
        let shift = |edits: &Vec<Edit>| -> f64 {
            edits
                .iter()
                .map(|e| match e {
                    Edit::Move(a, p) => p.distance(case.drawing.point(*a)),
                    _ => 0.0,
                })
                .sum()
        };
        ways.sort_by(|a, b| shift(a).total_cmp(&shift(b)));
        of_ends.push(ways);
    }
    let mut list: Vec<Vec<Edit>> = of_ends.concat();
    for a in &of_ends[0] {
        for b in &of_ends[1] {
            list.push(a.iter().chain(b).cloned().collect());
        }
    }
    list
}

/// Swings ligands of an end to given directions.
fn swing(case: &Case<'_>, end: AtomIx, goals: &[(AtomIx, f64)]) -> Option<Vec<Edit>> {
    let drawing = case.drawing;
    let at = drawing.point(end);
    let mut points: Vec<Point> = drawing.points().to_vec();
    let mut moved = Vec::new();
    for (ligand, goal) in goals {
        let bond = case.molecule().bond_between(end, *ligand)?;
        let v = drawing.point(*ligand) - at;
        let by = goal - geom::angle(v);
        let turn = (by + PI).rem_euclid(2.0 * PI) - PI;
        if turn.abs() < 0.05 {
            continue;
        }
        let atoms = ligand::branch(case, bond, end)?;
        for a in &atoms {
            points[a.index()] = geom::rotate(drawing.point(*a), at, turn);
        }
        moved.extend(atoms);
    }
    let is_clear = !moved.is_empty() && ligand::clear(drawing, end, &moved, &points);
    is_clear.then(|| {
        moved
            .iter()
            .map(|a| Edit::Move(*a, points[a.index()]))
            .collect()
    })
}

/// A wavy bond in place of a cross: at an end with one ligand, to an atom that belongs to no unit.
pub(super) fn wavy_for_crossed(
    case: &Case<'_>,
    bond: BondIx,
    ix: Option<UnitIx>,
) -> Vec<Vec<Edit>> {
    let plain = Edit::Mark(bond, Mark::Plain);
    let Some(ix) = ix else {
        // no E or Z to be unknown
        return vec![vec![plain]];
    };
    let unit = case.units().get(ix);
    let belongs = |a: AtomIx| {
        let units = case.units();
        units
            .iter()
            .any(|(j, u)| u.atoms().contains(&a) && case.is_readable(j))
    };
    let mut list: Vec<((usize, usize, AtomIx), Vec<Edit>)> = Vec::new();
    for end in unit.atoms() {
        let drawn = case.molecule().degree(end);
        for n in case.molecule().neighbors(end) {
            let free = n.order == Order::Single && case.drawing.mark(n.bond) == Mark::Plain;
            if !free || case.rings().has_bond(n.bond) || belongs(n.atom) {
                continue;
            }
            let wavy = Mark::Wavy(case.drawing.end_at(n.bond, end));
            let key = (drawn, case.molecule().degree(n.atom), n.atom);
            list.push((key, vec![plain.clone(), Edit::Mark(n.bond, wavy)]));
        }
    }
    list.sort_by_key(|(key, _)| *key);
    list.into_iter().map(|(_, edits)| edits).collect()
}
