//! Reads the hand of a helix: the rim is followed from the end towards the reader to the end away.
//!
//! The bonds that lead to the two ends are marked, one solid and one hashed. Going round clockwise while
//! moving away from the reader is a right-handed helix, P (IUPAC Gold Book, helicity).

use super::read::Doubt;
use crate::drawing::{Drawing, Mark};
use crate::geom::Point;
use crate::molecule::AtomIx;
use crate::stereo::{Configuration, Parity, Unit};

pub(super) fn read(
    drawing: &Drawing,
    ends: [AtomIx; 2],
    unit: &Unit,
) -> Result<Configuration, Doubt> {
    let [before, after] = unit.toward_each_other();
    let up = |fusion: AtomIx, end: AtomIx| {
        let bond = drawing.molecule().bond_between(fusion, end)?;
        match drawing.mark_from(fusion, bond) {
            Mark::Solid(_) => Some(true),
            Mark::Hashed(_) => Some(false),
            Mark::Plain | Mark::Wavy(_) | Mark::Crossed => None,
        }
    };
    let first_up = match (up(before, ends[0]), up(after, ends[1])) {
        (None, None) => return Ok(Configuration::Open),
        (Some(a), Some(b)) if a == b => return Err(Doubt::Contradiction),
        (Some(a), _) => a,
        (None, Some(b)) => !b,
    };
    let mut rim: Vec<Point> = Vec::with_capacity(unit.inner.len() + 2);
    rim.push(drawing.point(ends[0]));
    rim.extend(unit.inner.iter().map(|a| drawing.point(*a)));
    rim.push(drawing.point(ends[1]));
    let area: f64 = rim
        .iter()
        .zip(rim.iter().cycle().skip(1))
        .map(|(p, q)| p.x * q.y - q.x * p.y)
        .sum();
    let length = drawing.bond_length();
    if area.abs() < length * length {
        return Err(Doubt::Straight);
    }
    // anticlockwise from the first end, which is nearer: left-handed
    let left_handed = (area > 0.0) == first_up;
    Ok(Configuration::Defined(Parity::from_even(left_handed)))
}
