//! Reads the geometry of a double bond from positions; wedges say nothing about it.
//!
//! Crossed, or with a wavy bond at an end: stated to be unknown. A ligand within 5 degrees of the axis
//! (the InChI library's limit for an ambiguous drawing) has no side.

use super::read::Doubt;
use crate::drawing::{Drawing, Mark};
use crate::molecule::{AtomIx, Order};
use crate::stereo::{Configuration, Kind, Ligand, Parity, Unit, Units};
use smallvec::SmallVec;

/// Sine of 5 degrees.
const ON_AXIS: f64 = 0.087_155_742_747_658_17;

pub(super) fn read(
    drawing: &Drawing,
    ends: [AtomIx; 2],
    unit: &Unit,
    units: &Units,
) -> Result<Configuration, Doubt> {
    let ligands = &unit.ligands;
    let mut chain: SmallVec<[AtomIx; 4]> = SmallVec::from_slice(&ends[..1]);
    chain.extend_from_slice(&unit.inner);
    chain.push(ends[1]);
    let crossed = chain.windows(2).any(|pair| {
        drawing
            .molecule()
            .bond_between(pair[0], pair[1])
            .is_some_and(|b| drawing.mark(b) == Mark::Crossed)
    });
    if crossed || ends.iter().any(|end| has_wavy(drawing, units, *end)) {
        return Ok(Configuration::Either);
    }
    // an imine whose hydrogen stands in the label only: there is nothing to see
    if ligands
        .chunks(2)
        .any(|pair| pair.iter().all(|l| l.atom().is_none()))
    {
        return Ok(Configuration::Open);
    }
    let first = side(drawing, ends, ends[0], &ligands[..2]);
    let second = side(drawing, ends, ends[1], &ligands[2..]);
    match (first, second) {
        (Ok(a), Ok(b)) => Ok(Configuration::Defined(Parity::from_even(a == b))),
        // one ligand at each end and all in line: a way to leave it unstated (IUPAC 2006, ST-4.4)
        (Err(Doubt::Straight), Err(Doubt::Straight)) => Ok(Configuration::Open),
        (Err(doubt), _) | (_, Err(doubt)) => Err(doubt),
    }
}

/// Whether a wavy bond at an end speaks for the double bond: its narrow end is here, or at an atom that
/// has no configuration of its own to leave unknown, or at the end of another double bond (on paper a wavy
/// bond shows no narrow end, and one that two double bonds share leaves both unknown). A centre at its
/// narrow end keeps it for itself, as files mean it.
fn has_wavy(drawing: &Drawing, units: &Units, end: AtomIx) -> bool {
    drawing.molecule().neighbors(end).iter().any(|n| {
        let wavy = n.order == Order::Single && matches!(drawing.mark(n.bond), Mark::Wavy(_));
        wavy && (drawing.mark_from(end, n.bond) != Mark::Plain
            || !units
                .iter()
                .any(|(_, u)| u.kind != Kind::DoubleBond && u.atoms().contains(&n.atom)))
    })
}

/// Whether the first ligand of an end lies to the left of the axis from the first to the second end.
fn side(
    drawing: &Drawing,
    ends: [AtomIx; 2],
    end: AtomIx,
    ligands: &[Ligand],
) -> Result<bool, Doubt> {
    let left = |ligand: &Ligand| -> Result<Option<bool>, Doubt> {
        let Some(atom) = ligand.atom() else {
            return Ok(None);
        };
        let across = if drawing.depths().is_some() {
            across_in_space(drawing, ends, end, atom)
        } else {
            across(drawing, ends, end, atom)
        };
        let across = across.ok_or(Doubt::Overlap)?;
        if across.abs() < ON_AXIS {
            return Err(Doubt::Straight);
        }
        Ok(Some(across > 0.0))
    };
    let first = left(&ligands[0])?;
    let second = left(&ligands[1])?;
    match (first, second) {
        (Some(a), Some(b)) if a == b => Err(Doubt::SameSide),
        (Some(a), _) => Ok(a),
        (None, Some(b)) => Ok(!b),
        (None, None) => Err(Doubt::Overlap),
    }
}

/// Sine of the angle between the axis and the bond to a ligand.
fn across(drawing: &Drawing, ends: [AtomIx; 2], end: AtomIx, ligand: AtomIx) -> Option<f64> {
    let axis = drawing.direction(ends[0], ends[1])?;
    Some(axis.cross(drawing.direction(end, ligand)?))
}

/// The same in a model with depth: the part of the bond across the axis, signed by the side it shares
/// with a fixed ligand of the first end.
fn across_in_space(
    drawing: &Drawing,
    ends: [AtomIx; 2],
    end: AtomIx,
    ligand: AtomIx,
) -> Option<f64> {
    let depths = drawing.depths()?;
    let vector = |from: AtomIx, to: AtomIx| {
        let v = drawing.point(to) - drawing.point(from);
        [v.x, v.y, depths[to.index()] - depths[from.index()]]
    };
    let dot = |a: [f64; 3], b: [f64; 3]| a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
    let unit = |v: [f64; 3]| {
        let length = dot(v, v).sqrt();
        (length > 1e-9).then(|| v.map(|x| x / length))
    };
    let axis = unit(vector(ends[0], ends[1]))?;
    let off_axis = |v: [f64; 3]| {
        let along = dot(v, axis);
        [0, 1, 2].map(|k| v[k] - along * axis[k])
    };
    let fixed = drawing
        .molecule()
        .neighbors(ends[0])
        .iter()
        .find(|n| n.atom != ends[1])?;
    let reference = unit(off_axis(unit(vector(ends[0], fixed.atom))?))?;
    Some(dot(off_axis(unit(vector(end, ligand))?), reference))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::drawing::tests::draw;
    use crate::perceive::Rings;
    use crate::stereo::Units;

    fn geometry(
        atoms: &[(&str, f64, f64)],
        bonds: &[(usize, usize, u8, char)],
    ) -> Result<Configuration, Doubt> {
        let d = draw(atoms, bonds);
        let units = Units::find(d.molecule(), &Rings::find(d.molecule()));
        let (_, unit) = units.iter().next().unwrap();
        read(&d, unit.atoms().to_vec().try_into().unwrap(), unit, &units)
    }

    const BONDS: [(usize, usize, u8, char); 3] = [(0, 1, 1, ' '), (1, 2, 2, ' '), (2, 3, 1, ' ')];

    #[test]
    fn but_2_enes() {
        let cis = [
            ("C", -0.5, 0.8),
            ("C", 0.0, 0.0),
            ("C", 1.0, 0.0),
            ("C", 1.5, 0.8),
        ];
        assert_eq!(
            geometry(&cis, &BONDS),
            Ok(Configuration::Defined(Parity::Even))
        );
        let mut trans = cis;
        trans[3].2 = -0.8;
        assert_eq!(
            geometry(&trans, &BONDS),
            Ok(Configuration::Defined(Parity::Odd))
        );
    }

    // IUPAC 2006, ST-4.4: all in line, crossed, wavy
    #[test]
    fn ways_to_leave_it_open() {
        let straight = [
            ("C", -1.0, 0.0),
            ("C", 0.0, 0.0),
            ("C", 1.0, 0.0),
            ("C", 2.0, 0.0),
        ];
        assert_eq!(geometry(&straight, &BONDS), Ok(Configuration::Open));
        let bent = [
            ("C", -0.5, 0.8),
            ("C", 0.0, 0.0),
            ("C", 1.0, 0.0),
            ("C", 2.0, 0.0),
        ];
        assert_eq!(geometry(&bent, &BONDS), Err(Doubt::Straight));
        let cis = [
            ("C", -0.5, 0.8),
            ("C", 0.0, 0.0),
            ("C", 1.0, 0.0),
            ("C", 1.5, 0.8),
        ];
        let crossed = [(0, 1, 1, ' '), (1, 2, 2, 'x'), (2, 3, 1, ' ')];
        assert_eq!(geometry(&cis, &crossed), Ok(Configuration::Either));
        let wavy = [(0, 1, 1, ' '), (1, 2, 2, ' '), (2, 3, 1, '~')];
        assert_eq!(geometry(&cis, &wavy), Ok(Configuration::Either));
        let from_methyl = [(0, 1, 1, ' '), (1, 2, 2, ' '), (3, 2, 1, '~')];
        assert_eq!(geometry(&cis, &from_methyl), Ok(Configuration::Either));
    }
}
