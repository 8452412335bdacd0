//! Marks for axes and helices: at the end that reads best, by the sides on which the ligands of the other
//! end are drawn.
//!
//! Source: InChI technical manual (allenes: both bonds of one end, one up and one down); for hindered
//! axes one ring bond, as open libraries write them.

use crate::drawing::{Drawing, Edit, Mark};
use crate::molecule::{AtomIx, BondIx, Order};
use crate::perceive::Rings;
use crate::stereo::{Focus, Kind, Parity, Unit, Units};

/// Edits that mark an axis or helix; `None` if no bond at its ends can bear a mark.
pub fn place_axis(
    drawing: &Drawing,
    units: &Units,
    rings: &Rings,
    unit: &Unit,
    parity: Parity,
) -> Option<Vec<Edit>> {
    let Focus::Pair(ends) = unit.focus else {
        return None;
    };
    let cleared = clear(drawing, unit, ends);
    let marks = match unit.kind {
        Kind::Helix => helix(drawing, unit, ends, parity),
        Kind::CumulatedAxis | Kind::HinderedAxis => {
            let best = [0, 1]
                .into_iter()
                .filter(|k| !unit.mute[*k])
                .filter_map(|k| end(drawing, units, rings, unit, ends, k, parity))
                .min_by_key(|(cost, _)| *cost);
            best.map(|(_, marks)| marks)
        }
        Kind::Tetrahedral | Kind::DoubleBond => None,
    }?;
    let mut edits: Vec<Edit> = cleared
        .into_iter()
        .filter(|bond| marks.iter().all(|(marked, _)| marked != bond))
        .map(|bond| Edit::Mark(bond, Mark::Plain))
        .collect();
    edits.extend(marks.into_iter().map(|(bond, mark)| Edit::Mark(bond, mark)));
    Some(edits)
}

/// Bonds whose marks speak for the unit now.
fn clear(drawing: &Drawing, unit: &Unit, ends: [AtomIx; 2]) -> Vec<BondIx> {
    let narrow_at: Vec<AtomIx> = if unit.kind == Kind::Helix {
        unit.toward_each_other().to_vec()
    } else {
        ends.to_vec()
    };
    let mut bonds = Vec::new();
    for atom in narrow_at {
        for n in drawing.molecule().neighbors(atom) {
            if drawing.mark_from(atom, n.bond) != Mark::Plain {
                bonds.push(n.bond);
            }
        }
    }
    bonds
}

/// A solid or hashed wedge on a bond, narrow at `narrow`.
fn wedge(drawing: &Drawing, bond: BondIx, narrow: AtomIx, up: bool) -> (BondIx, Mark) {
    let end = drawing.end_at(bond, narrow);
    let mark = if up {
        Mark::Solid(end)
    } else {
        Mark::Hashed(end)
    };
    (bond, mark)
}

/// Whether a bond may bear a mark that is narrow at `narrow`: single, and no other atom's mark on it.
fn bears(drawing: &Drawing, bond: BondIx, narrow: AtomIx) -> bool {
    let free = match drawing.mark(bond) {
        Mark::Plain => true,
        _ => drawing.mark_from(narrow, bond) != Mark::Plain,
    };
    free && drawing.molecule().bond(bond).order == Order::Single
}

/// Marks at end `k`, with their cost.
fn end(
    drawing: &Drawing,
    units: &Units,
    rings: &Rings,
    unit: &Unit,
    ends: [AtomIx; 2],
    k: usize,
    parity: Parity,
) -> Option<(usize, Vec<(BondIx, Mark)>)> {
    let molecule = drawing.molecule();
    let left = first_is_left(drawing, unit, ends, 1 - k)?;
    let first_up = left == (parity == Parity::Even);
    let bonds: Vec<(usize, AtomIx, BondIx)> = unit.ligands[2 * k..2 * k + 2]
        .iter()
        .enumerate()
        .filter_map(|(i, ligand)| {
            let atom = ligand.atom()?;
            let bond = molecule.bond_between(ends[k], atom)?;
            bears(drawing, bond, ends[k]).then_some((i, atom, bond))
        })
        .collect();
    let mark = |(i, _, bond): &(usize, AtomIx, BondIx)| {
        wedge(drawing, *bond, ends[k], first_up == (*i == 0))
    };
    let cost = |(_, atom, bond): &(usize, AtomIx, BondIx)| {
        let center = usize::from(units.center_at(*atom).is_some());
        let ring = rings.smallest_through(*bond).map_or(0, |n| 40 - n.min(30));
        100 * center + ring + molecule.degree(*atom)
    };
    if unit.kind == Kind::CumulatedAxis {
        let total = bonds.iter().map(cost).sum::<usize>();
        // a drawn ligand that cannot bear its mark leaves the other to speak alone
        return (!bonds.is_empty()).then(|| (total, bonds.iter().map(mark).collect()));
    }
    let best = bonds.iter().min_by_key(|b| (cost(b), b.1))?;
    Some((cost(best), vec![mark(best)]))
}

/// Whether the first ligand of end `k` is drawn left of the axis, seen from the other end.
fn first_is_left(drawing: &Drawing, unit: &Unit, ends: [AtomIx; 2], k: usize) -> Option<bool> {
    let (from, to) = (drawing.point(ends[1 - k]), drawing.point(ends[k]));
    let turn = |atom: AtomIx| {
        let area = (to - from).cross(drawing.point(atom) - to);
        let size = (to - from).hypot() * (drawing.point(atom) - to).hypot();
        // 8 degrees: more than readers ask
        (area.abs() > 0.14 * size).then_some(area > 0.0)
    };
    let ligands = &unit.ligands[2 * k..2 * k + 2];
    match (ligands[0].atom(), ligands[1].atom()) {
        (Some(a), _) => turn(a),
        (None, Some(b)) => turn(b).map(|left| !left),
        (None, None) => None,
    }
}

/// Marks on the bonds that lead to the two ends of a rim: the nearer solid, the farther hashed.
fn helix(
    drawing: &Drawing,
    unit: &Unit,
    ends: [AtomIx; 2],
    parity: Parity,
) -> Option<Vec<(BondIx, Mark)>> {
    let mut turned = 0.0;
    let mut rim = vec![drawing.point(ends[0])];
    rim.extend(unit.inner.iter().map(|a| drawing.point(*a)));
    rim.push(drawing.point(ends[1]));
    for corner in rim.windows(3) {
        turned += (corner[1] - corner[0])
            .cross(corner[2] - corner[1])
            .atan2((corner[1] - corner[0]).dot(corner[2] - corner[1]));
    }
    // an open or straight rim shows no hand
    if turned.abs() < std::f64::consts::PI {
        return None;
    }
    let first_near = (turned > 0.0) == (parity == Parity::Even);
    let fusions = unit.toward_each_other();
    let marks: Vec<(BondIx, Mark)> = (0..2)
        .filter_map(|k| {
            let bond = drawing.molecule().bond_between(fusions[k], ends[k])?;
            let up = first_near == (k == 0);
            bears(drawing, bond, fusions[k]).then(|| wedge(drawing, bond, fusions[k], up))
        })
        .collect();
    (!marks.is_empty()).then_some(marks)
}
