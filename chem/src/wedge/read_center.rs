//! Reads the marks at a tetrahedral centre.
//!
//! Each mark alone fixes the sense; several must agree. With four drawn bonds neighbouring bonds lie on
//! opposite sides of the paper. With three, the missing ligand (hydrogen or lone pair) lies opposite
//! their sum: in a spread pattern every mark means what it shows, in a half plane the middle bond means
//! the opposite of the outer ones, and where two bonds are in line the third says nothing.

use super::read::Doubt;
use crate::drawing::{Drawing, Mark};
use crate::geom;
use crate::molecule::{AtomIx, Order};
use crate::stereo::{Configuration, Ligand, Parity, odd_permutation};
use smallvec::SmallVec;
use std::f64::consts::PI;

/// Half width of the window about a straight angle in which two bonds count as in line: 0.10 rad, as in
/// the InChI library.
const IN_LINE: f64 = 0.10;
/// Two bonds closer than this (5 degrees) have one direction.
const SAME_DIRECTION: f64 = 5.0 * PI / 180.0;

/// A drawn bond as seen from the centre.
struct Spoke {
    ligand: Ligand,
    angle: f64,
    /// +1 towards the reader, -1 away, 0 in the paper.
    lift: i8,
}

pub(super) fn read(
    drawing: &Drawing,
    center: AtomIx,
    ligands: &[Ligand; 4],
) -> Result<Configuration, Doubt> {
    let marks = marks(drawing, center);
    if marks.wavy {
        return if marks.wedges > 0 {
            Err(Doubt::EitherWithWedge)
        } else {
            Ok(Configuration::Either)
        };
    }
    if drawing.depths().is_some() {
        return in_space(drawing, center, ligands);
    }
    if marks.wedges == 0 {
        return Ok(Configuration::Open);
    }
    let spokes = spokes(drawing, center)?;
    let order: SmallVec<[Ligand; 4]> = spokes.iter().map(|s| s.ligand).collect();
    let parity = if spokes.len() == 4 {
        // bonds 0 and 2 towards the reader: seen from bond 0 the rest goes round anticlockwise
        let sense = four(&spokes)?;
        Parity::from_even(!sense).flipped_if(odd_permutation(&order, ligands))
    } else {
        // towards the reader of the missing ligand: seen from that, the bonds go round clockwise
        let sense = three(&spokes)?;
        let mut seen: SmallVec<[Ligand; 4]> = SmallVec::new();
        seen.extend(ligands.iter().copied().filter(|l| l.atom().is_none()));
        seen.extend(order);
        Parity::from_even(sense).flipped_if(odd_permutation(&seen, ligands))
    };
    Ok(Configuration::Defined(parity))
}

struct Marks {
    wavy: bool,
    wedges: usize,
}

fn marks(drawing: &Drawing, center: AtomIx) -> Marks {
    let mut marks = Marks {
        wavy: false,
        wedges: 0,
    };
    for n in drawing.molecule().neighbors(center) {
        if n.order != Order::Single {
            continue;
        }
        match drawing.mark_from(center, n.bond) {
            Mark::Wavy(_) => marks.wavy = true,
            Mark::Solid(_) | Mark::Hashed(_) => marks.wedges += 1,
            Mark::Plain | Mark::Crossed => {}
        }
    }
    marks
}

/// The drawn bonds in anticlockwise order.
fn spokes(drawing: &Drawing, center: AtomIx) -> Result<SmallVec<[Spoke; 4]>, Doubt> {
    let mut spokes: SmallVec<[Spoke; 4]> = SmallVec::new();
    for n in drawing.molecule().neighbors(center) {
        let direction = drawing.direction(center, n.atom).ok_or(Doubt::Overlap)?;
        let lift = match drawing.mark_from(center, n.bond) {
            Mark::Solid(_) if n.order == Order::Single => 1,
            Mark::Hashed(_) if n.order == Order::Single => -1,
            _ => 0,
        };
        spokes.push(Spoke {
            ligand: Ligand::Atom(n.atom),
            angle: geom::angle(direction),
            lift,
        });
    }
    spokes.sort_by(|a, b| a.angle.total_cmp(&b.angle));
    if gaps(&spokes).iter().any(|gap| *gap < SAME_DIRECTION) {
        return Err(Doubt::Overlap);
    }
    Ok(spokes)
}

/// Angle from each bond to the next, anticlockwise.
fn gaps(spokes: &[Spoke]) -> SmallVec<[f64; 4]> {
    (0..spokes.len())
        .map(|i| geom::turn(spokes[i].angle, spokes[(i + 1) % spokes.len()].angle))
        .collect()
}

fn widest(gaps: &[f64]) -> (usize, f64) {
    gaps.iter().copied().enumerate().fold(
        (0, 0.0),
        |best, (i, gap)| {
            if gap > best.1 { (i, gap) } else { best }
        },
    )
}

/// Whether bonds 0 and 2 lie towards the reader.
fn four(spokes: &[Spoke]) -> Result<bool, Doubt> {
    let votes: SmallVec<[i8; 4]> = spokes
        .iter()
        .enumerate()
        .filter(|(_, s)| s.lift != 0)
        .map(|(i, s)| if i % 2 == 0 { s.lift } else { -s.lift })
        .collect();
    if let Ok(sense) = agreed(&votes) {
        return Ok(sense);
    }
    // three alike and one that differs, all round the centre: the odd one is on the other side
    let spread = widest(&gaps(spokes)).1 < PI;
    for kind in [1, -1] {
        let others: SmallVec<[usize; 4]> = (0..4).filter(|i| spokes[*i].lift != kind).collect();
        if let ([odd], true) = (others.as_slice(), spread) {
            let sense = if odd % 2 == 0 { -kind } else { kind };
            return Ok(sense > 0);
        }
    }
    Err(Doubt::Contradiction)
}

/// Whether the three bonds lie towards the reader of the missing ligand.
fn three(spokes: &[Spoke]) -> Result<bool, Doubt> {
    let (at, gap) = widest(&gaps(spokes));
    // the widest gap opens after bond `at`, so the bond that faces it is the one after the next
    let middle = (at + 2) % 3;
    let outer = [at, (at + 1) % 3];
    let mut votes: SmallVec<[i8; 4]> = SmallVec::new();
    if (gap - PI).abs() < IN_LINE {
        votes.extend(outer.iter().map(|i| spokes[*i].lift).filter(|h| *h != 0));
        if votes.is_empty() {
            return Err(Doubt::Stem);
        }
    } else if gap > PI {
        let lifts: SmallVec<[i8; 4]> = spokes.iter().map(|s| s.lift).collect();
        if lifts.iter().all(|h| *h != 0 && *h == lifts[0]) {
            return Err(Doubt::AllAlike);
        }
        votes.push(-spokes[middle].lift);
        votes.extend(outer.iter().map(|i| spokes[*i].lift));
        votes.retain(|h| *h != 0);
    } else {
        votes.extend(spokes.iter().map(|s| s.lift).filter(|h| *h != 0));
    }
    agreed(&votes)
}

fn agreed(votes: &[i8]) -> Result<bool, Doubt> {
    match votes.first() {
        Some(first) if votes.iter().all(|v| v == first) => Ok(*first > 0),
        _ => Err(Doubt::Contradiction),
    }
}

/// Sense of a centre in a model with depth: signed volume of its ligands, each at distance 1.
fn in_space(
    drawing: &Drawing,
    center: AtomIx,
    ligands: &[Ligand; 4],
) -> Result<Configuration, Doubt> {
    let depths = drawing.depths().unwrap_or_default();
    let at = |a: AtomIx| {
        let p = drawing.point(a);
        [p.x, p.y, depths[a.index()]]
    };
    let origin = at(center);
    let mut places: SmallVec<[[f64; 3]; 4]> = SmallVec::new();
    for ligand in ligands {
        if let Ligand::Atom(a) = ligand {
            let p = at(*a);
            let v = [p[0] - origin[0], p[1] - origin[1], p[2] - origin[2]];
            let length = (v[0] * v[0] + v[1] * v[1] + v[2] * v[2]).sqrt();
            if length < 1e-6 {
                return Err(Doubt::Overlap);
            }
            places.push(v.map(|x| x / length));
        }
    }
    if places.len() == 3 {
        let sum = |k: usize| places.iter().map(|p| p[k]).sum::<f64>();
        places.push([-sum(0), -sum(1), -sum(2)]);
    }
    let from = |i: usize| {
        let (p, q) = (places[i], places[0]);
        [p[0] - q[0], p[1] - q[1], p[2] - q[2]]
    };
    let (a, b, c) = (from(1), from(2), from(3));
    let volume = a[0] * (b[1] * c[2] - b[2] * c[1]) - a[1] * (b[0] * c[2] - b[2] * c[0])
        + a[2] * (b[0] * c[1] - b[1] * c[0]);
    // flatter than this there is nothing to see; a regular centre has 3.1
    if volume.abs() < 0.1 {
        return Ok(Configuration::Open);
    }
    // positive: seen from the first ligand the others follow each other clockwise
    Ok(Configuration::Defined(Parity::from_even(volume > 0.0)))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn spoke(angle_degrees: f64, lift: i8) -> Spoke {
        Spoke {
            ligand: Ligand::Hydrogen,
            angle: geom::angle(geom::unit(angle_degrees.to_radians())),
            lift,
        }
    }

    fn read3(angles: [f64; 3], lifts: [i8; 3]) -> Result<bool, Doubt> {
        let spokes: Vec<Spoke> = angles
            .iter()
            .zip(lifts)
            .map(|(a, h)| spoke(*a, h))
            .collect();
        three(&spokes)
    }

    fn read4(angles: [f64; 4], lifts: [i8; 4]) -> Result<bool, Doubt> {
        let spokes: Vec<Spoke> = angles
            .iter()
            .zip(lifts)
            .map(|(a, h)| spoke(*a, h))
            .collect();
        four(&spokes)
    }

    // InChI technical manual, table of three-bond drawings; IUPAC 2006, ST-1.2.10 and ST-1.2.12
    #[test]
    fn three_bonds() {
        let star = [30.0, 150.0, 270.0];
        assert_eq!(read3(star, [1, 0, 0]), Ok(true));
        assert_eq!(read3(star, [0, -1, 0]), Ok(false));
        assert_eq!(read3(star, [1, 1, 0]), Ok(true));
        assert_eq!(read3(star, [1, -1, 0]), Err(Doubt::Contradiction));
        let fan = [30.0, 90.0, 150.0];
        assert_eq!(read3(fan, [0, 1, 0]), Ok(false));
        assert_eq!(read3(fan, [1, 0, 0]), Ok(true));
        assert_eq!(read3(fan, [1, -1, 0]), Ok(true));
        assert_eq!(read3(fan, [1, 1, 1]), Err(Doubt::AllAlike));
        assert_eq!(read3(fan, [1, 0, -1]), Err(Doubt::Contradiction));
        let tee = [0.0, 90.0, 180.0];
        assert_eq!(read3(tee, [0, 1, 0]), Err(Doubt::Stem));
        assert_eq!(read3(tee, [1, 0, 0]), Ok(true));
        assert_eq!(read3(tee, [1, -1, 1]), Ok(true));
        // 170 degrees between the bars is outside the window
        assert_eq!(read3([5.0, 90.0, 175.0], [0, 1, 0]), Ok(false));
    }

    // InChI technical manual, table of four-bond drawings
    #[test]
    fn four_bonds() {
        let cross = [0.0, 90.0, 180.0, 270.0];
        assert_eq!(read4(cross, [1, 0, 0, 0]), Ok(true));
        assert_eq!(read4(cross, [1, -1, 0, 0]), Ok(true));
        assert_eq!(read4(cross, [1, 0, 1, 0]), Ok(true));
        assert_eq!(read4(cross, [1, -1, 1, -1]), Ok(true));
        assert_eq!(read4(cross, [1, 1, 0, 0]), Err(Doubt::Contradiction));
        assert_eq!(read4(cross, [1, 0, -1, 0]), Err(Doubt::Contradiction));
        assert_eq!(read4(cross, [1, 1, -1, -1]), Err(Doubt::Contradiction));
        assert_eq!(read4(cross, [1, 1, 1, 1]), Err(Doubt::Contradiction));
        // three alike: the odd bond lies on the other side
        assert_eq!(read4(cross, [1, 1, 1, 0]), read4(cross, [0, 0, 0, -1]));
        assert_eq!(read4(cross, [0, 1, 1, 1]), read4(cross, [-1, 0, 0, 0]));
    }
}
