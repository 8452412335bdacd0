//! Reads the marks at a tetrahedral centre.
//!
//! Each mark alone fixes the sense; several must agree. With four drawn bonds neighbouring bonds lie on
//! opposite sides of the paper. With three, the missing ligand (hydrogen or lone pair) lies opposite
//! their sum: in a spread pattern every mark means what it shows, in a half plane the middle bond means
//! the opposite of the outer ones, and where two bonds are in line the third says nothing.

use super::read::Doubt;
use super::read_pattern::{Pattern, Shape};
use crate::drawing::{Drawing, Mark};
use crate::molecule::AtomIx;
use crate::stereo::{Configuration, Ligand, Parity, odd_permutation};
use smallvec::SmallVec;
use std::f64::consts::PI;

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
    let pattern = Pattern::of(drawing, center)?;
    let order: SmallVec<[Ligand; 4]> = pattern
        .spokes
        .iter()
        .map(|s| Ligand::Atom(s.atom))
        .collect();
    let parity = if pattern.shape == Shape::Four {
        // bonds 0 and 2 towards the reader: seen from bond 0 the rest goes round anticlockwise
        let sense = four(&pattern)?;
        Parity::from_even(!sense).flipped_if(odd_permutation(&order, ligands))
    } else {
        // towards the reader of the missing ligand: seen from that, the bonds go round clockwise
        let sense = three(&pattern)?;
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
        if !n.order.bears_wedge() {
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

/// Whether bonds 0 and 2 lie towards the reader.
fn four(pattern: &Pattern) -> Result<bool, Doubt> {
    let spokes = &pattern.spokes;
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
    let spread = pattern.widest() < PI;
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
fn three(pattern: &Pattern) -> Result<bool, Doubt> {
    let lift = |i: usize| pattern.spokes[i].lift;
    let mut votes: SmallVec<[i8; 4]> = SmallVec::new();
    match pattern.shape {
        Shape::Tee { bars, .. } => {
            votes.extend(bars.iter().map(|i| lift(*i)).filter(|h| *h != 0));
            if votes.is_empty() {
                return Err(Doubt::Stem);
            }
        }
        Shape::HalfPlane { middle, outer } => {
            let first = lift(middle);
            if first != 0 && outer.iter().all(|i| lift(*i) == first) {
                return Err(Doubt::AllAlike);
            }
            votes.push(-first);
            votes.extend(outer.iter().map(|i| lift(*i)));
            votes.retain(|h| *h != 0);
        }
        Shape::Spread | Shape::Four | Shape::Other => {
            votes.extend(pattern.spokes.iter().map(|s| s.lift).filter(|h| *h != 0));
        }
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
    use super::super::read_pattern::Spoke;
    use super::*;
    use crate::geom;
    use crate::molecule::BondIx;

    fn spoke(angle_degrees: f64, lift: i8) -> Spoke {
        Spoke {
            atom: AtomIx::new(0),
            bond: BondIx::new(0),
            angle: geom::angle(geom::unit(angle_degrees.to_radians())),
            lift,
        }
    }

    fn read3(angles: [f64; 3], lifts: [i8; 3]) -> Result<bool, Doubt> {
        let spokes = angles
            .iter()
            .zip(lifts)
            .map(|(a, h)| spoke(*a, h))
            .collect();
        three(&Pattern::from_spokes(spokes))
    }

    fn read4(angles: [f64; 4], lifts: [i8; 4]) -> Result<bool, Doubt> {
        let spokes = angles
            .iter()
            .zip(lifts)
            .map(|(a, h)| spoke(*a, h))
            .collect();
        four(&Pattern::from_spokes(spokes))
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
