//! Reads the marks at an axis: one end is seen as crossing the paper, the other as lying in it.
//!
//! At the marked end the two ligands stand towards and away from the reader; if one is marked or drawn
//! alone, the other takes the other side. At the far end they lie in the paper on the sides where they
//! are drawn. Marks at both ends must agree.
//!
//! Source: InChI technical manual (both bonds of one end of an allene marked, one up and one down);
//! signs after the drawings of the public CIP Validation Suite.

use super::read::Doubt;
use crate::drawing::{Drawing, Mark};
use crate::geom::Vec2;
use crate::molecule::{AtomIx, Order};
use crate::stereo::{Configuration, Ligand, Parity, Unit};

/// A ligand nearer to the axis than this (sine of 5 degrees) has no side.
const ON_AXIS: f64 = 0.087_155_742_747_658_17;

pub(super) fn read(
    drawing: &Drawing,
    ends: [AtomIx; 2],
    unit: &Unit,
) -> Result<Configuration, Doubt> {
    let mut seen = None;
    for k in (0..2).filter(|k| !unit.mute[*k]) {
        let lifts = match lifts(drawing, ends[k], &unit.ligands[2 * k..2 * k + 2])? {
            Lifts::None => continue,
            Lifts::Either => return Ok(Configuration::Either),
            Lifts::Known(first_up) => first_up,
        };
        let first_left = side(drawing, ends, 1 - k, &unit.ligands[2 - 2 * k..4 - 2 * k])?;
        let parity = sense(lifts, first_left);
        match seen {
            Some(other) if other != parity => return Err(Doubt::Contradiction),
            _ => seen = Some(parity),
        }
    }
    Ok(seen.map_or(Configuration::Open, Configuration::Defined))
}

enum Lifts {
    None,
    Either,
    /// Whether the first ligand of the end is towards the reader.
    Known(bool),
}

fn lifts(drawing: &Drawing, end: AtomIx, ligands: &[Ligand]) -> Result<Lifts, Doubt> {
    let mut first_up = None;
    let mut either = false;
    for (i, ligand) in ligands.iter().enumerate() {
        let bond = ligand
            .atom()
            .and_then(|a| drawing.molecule().bond_between(end, a));
        let Some(bond) = bond.filter(|b| drawing.molecule().bond(*b).order == Order::Single) else {
            continue;
        };
        let up = match drawing.mark_from(end, bond) {
            Mark::Solid(_) => true,
            Mark::Hashed(_) => false,
            Mark::Wavy(_) => {
                either = true;
                continue;
            }
            Mark::Plain | Mark::Crossed => continue,
        };
        let up = up == (i == 0);
        if first_up.is_some_and(|known| known != up) {
            return Err(Doubt::Contradiction);
        }
        first_up = Some(up);
    }
    match (first_up, either) {
        (Some(_), true) => Err(Doubt::EitherWithWedge),
        (None, true) => Ok(Lifts::Either),
        (Some(up), false) => Ok(Lifts::Known(up)),
        (None, false) => Ok(Lifts::None),
    }
}

/// Whether the first ligand of the end in the paper lies to the left of the axis, seen from the marked
/// end.
fn side(drawing: &Drawing, ends: [AtomIx; 2], k: usize, ligands: &[Ligand]) -> Result<bool, Doubt> {
    let axis = drawing
        .direction(ends[1 - k], ends[k])
        .ok_or(Doubt::Overlap)?;
    let left = |ligand: &Ligand| -> Result<Option<bool>, Doubt> {
        let Some(atom) = ligand.atom() else {
            return Ok(None);
        };
        let v: Vec2 = drawing.direction(ends[k], atom).ok_or(Doubt::Overlap)?;
        let across = axis.cross(v);
        if across.abs() < ON_AXIS {
            return Err(Doubt::Straight);
        }
        Ok(Some(across > 0.0))
    };
    match (left(&ligands[0])?, left(&ligands[1])?) {
        (Some(a), Some(b)) if a == b => Err(Doubt::SameSide),
        (Some(a), _) => Ok(a),
        (None, Some(b)) => Ok(!b),
        (None, None) => Err(Doubt::Overlap),
    }
}

/// Parity of an axis from its marked end, whichever that is: exchanging the two pairs of ligands is an
/// even permutation. First ligand up, the other down; first ligand of the far end left, the other right:
/// seen from the first, the rest goes round clockwise.
fn sense(first_up: bool, first_left: bool) -> Parity {
    Parity::from_even(first_up == first_left)
}
