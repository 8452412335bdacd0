//! Turns a double bond from E to Z or back by moving one side of it on paper.
//!
//! The lesser side is mirrored in the axis of the double bond, which changes nothing else than this
//! geometry: distances and angles stay, and wedges of the mirrored atoms change their kind so that
//! their configuration stays too. Where atoms then collide, the other side is tried, then branches
//! are mirrored in their own bond or swung about it, the fewest first.

mod clash;

use crate::drawing::{Drawing, Edit, Mark};
use crate::geom::{self, Point};
use crate::molecule::{AtomIx, BondIx, Order};
use crate::perceive::Rings;
use crate::stereo::{Parity, Units};
use clash::{Clash, ROOMY, TIGHT};
use std::f64::consts::PI;
use std::fmt;

/// Why a double bond cannot be turned.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum TurnError {
    /// It lies in a ring: turning it would need a new shape of the ring.
    InRing,
    /// Every way to turn it makes atoms collide.
    Collides,
    /// The drawing is a model in space.
    InSpace,
}

impl fmt::Display for TurnError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(match self {
            TurnError::InRing => {
                "it lies in a ring, and redrawing a ring in its other geometry is not done yet: redraw the ring by hand"
            }
            TurnError::Collides => {
                "each way to turn it makes atoms collide: move its branches apart and ask again"
            }
            TurnError::InSpace => "the drawing is a model with depth: draw it flat",
        })
    }
}

impl std::error::Error for TurnError {}

/// A double bond as it is to be drawn.
#[derive(Clone, Copy, Debug)]
pub struct Geometry {
    /// Its two ends.
    pub ends: [AtomIx; 2],
    /// The neighbors of the ends on the way to each other: the ends themselves, or the inner atoms of a
    /// chain of cumulated double bonds.
    pub toward: [AtomIx; 2],
    /// Of each end the ligand that counts (the unit's first ligand there).
    pub first: [AtomIx; 2],
    /// `Even`: these two on the same side.
    pub parity: Parity,
}

/// Edits that draw a double bond in the geometry asked for; none if it stands so already.
///
/// # Errors
/// If it lies in a ring or cannot be turned without collisions.
pub fn turn(
    drawing: &Drawing,
    rings: &Rings,
    units: &Units,
    wanted: Geometry,
) -> Result<Vec<Edit>, TurnError> {
    if drawing.depths().is_some() {
        return Err(TurnError::InSpace);
    }
    let mut pose = Pose::new(drawing);
    let mut edits = clear_either(drawing, units, wanted.ends);
    let way = |k: usize| {
        drawing
            .molecule()
            .bond_between(wanted.ends[k], wanted.toward[k])
    };
    let (Some(first), Some(last)) = (way(0), way(1)) else {
        return Ok(edits);
    };
    for k in 0..2 {
        if pose.side(wanted, k).is_none() {
            bend(&mut pose, rings, wanted, k)?;
        }
    }
    let same = pose.side(wanted, 0) == pose.side(wanted, 1);
    if same != (wanted.parity == Parity::Even) {
        if rings.has_bond(first) {
            return Err(TurnError::InRing);
        }
        let with = |clash| mirrored(&pose, wanted, [first, last], rings, clash);
        pose = with(ROOMY).or_else(|_| with(TIGHT))?;
    }
    edits.extend(pose.edits());
    Ok(edits)
}

/// Takes away what says "either" at a double bond.
fn clear_either(drawing: &Drawing, units: &Units, ends: [AtomIx; 2]) -> Vec<Edit> {
    let molecule = drawing.molecule();
    let mut edits = Vec::new();
    for end in ends {
        for n in molecule.neighbors(end) {
            let either = match drawing.mark(n.bond) {
                Mark::Crossed => !edits.contains(&Edit::Mark(n.bond, Mark::Plain)),
                Mark::Wavy(_) => {
                    // a wavy bond of another unit is that unit's own
                    let others = drawing.mark_from(end, n.bond) == Mark::Plain
                        && units.iter().any(|(_, u)| u.atoms().contains(&n.atom));
                    n.order == Order::Single && !others
                }
                Mark::Plain | Mark::Solid(_) | Mark::Hashed(_) => false,
            };
            if either {
                edits.push(Edit::Mark(n.bond, Mark::Plain));
            }
        }
    }
    edits
}

/// Positions while they are being changed, and which atoms have been mirrored.
#[derive(Clone)]
struct Pose<'a> {
    drawing: &'a Drawing,
    points: Vec<Point>,
    mirrored: Vec<bool>,
}

impl<'a> Pose<'a> {
    fn new(drawing: &'a Drawing) -> Pose<'a> {
        Pose {
            drawing,
            points: drawing.points().to_vec(),
            mirrored: vec![false; drawing.molecule().n_atoms()],
        }
    }

    fn at(&self, atom: AtomIx) -> Point {
        self.points[atom.index()]
    }

    /// Whether the ligand that counts at end `k` is left of the axis; `None` within 8 degrees of it, or
    /// if the other ligand of that end is on the same side.
    fn side(&self, wanted: Geometry, k: usize) -> Option<bool> {
        let axis = self.at(wanted.ends[1]) - self.at(wanted.ends[0]);
        let across = |ligand: AtomIx| -> Option<bool> {
            let v = self.at(ligand) - self.at(wanted.ends[k]);
            let sine = axis.cross(v) / (axis.hypot() * v.hypot());
            (sine.abs() > 0.14).then_some(sine > 0.0)
        };
        let side = across(wanted.first[k])?;
        let other = self.other_ligand(wanted, k);
        match other.map(across) {
            None => Some(side),
            Some(Some(opposite)) if opposite != side => Some(side),
            Some(_) => None,
        }
    }

    fn other_ligand(&self, wanted: Geometry, k: usize) -> Option<AtomIx> {
        self.drawing
            .molecule()
            .neighbors(wanted.ends[k])
            .iter()
            .map(|n| n.atom)
            .find(|a| *a != wanted.toward[k] && *a != wanted.first[k])
    }

    fn edits(&self) -> Vec<Edit> {
        let molecule = self.drawing.molecule();
        let mut edits: Vec<Edit> = molecule
            .atoms()
            .filter(|a| self.at(*a) != self.drawing.point(*a))
            .map(|a| Edit::Move(a, self.at(a)))
            .collect();
        for b in molecule.bonds() {
            let mark = self.drawing.mark(b);
            let swapped = match mark {
                Mark::Solid(end) => Mark::Hashed(end),
                Mark::Hashed(end) => Mark::Solid(end),
                Mark::Plain | Mark::Wavy(_) | Mark::Crossed => continue,
            };
            let narrow = mark.narrow().map(|end| molecule.bond(b).ends[end.index()]);
            if narrow.is_some_and(|a| self.mirrored[a.index()]) {
                edits.push(Edit::Mark(b, swapped));
            }
        }
        edits
    }

    fn mirror(&mut self, side: &[AtomIx], a: Point, b: Point) {
        for atom in side {
            let i = atom.index();
            self.points[i] = geom::mirror(self.points[i], a, b);
            self.mirrored[i] = !self.mirrored[i];
        }
    }

    fn swing(&mut self, side: &[AtomIx], about: Point, angle: f64) {
        for atom in side {
            let i = atom.index();
            self.points[i] = geom::rotate(self.points[i], about, angle);
        }
    }
}

/// Atoms on the far side of a bond as seen from `from`; `None` if the bond lies in a ring.
fn beyond(drawing: &Drawing, bond: BondIx, from: AtomIx) -> Option<Vec<AtomIx>> {
    let molecule = drawing.molecule();
    let start = molecule.bond(bond).other(from);
    let mut side = vec![start];
    let mut seen = vec![false; molecule.n_atoms()];
    seen[start.index()] = true;
    let mut next = 0;
    while let Some(atom) = side.get(next).copied() {
        next += 1;
        for n in molecule.neighbors(atom) {
            if n.bond == bond {
                continue;
            }
            if n.atom == from {
                return None;
            }
            if !seen[n.atom.index()] {
                seen[n.atom.index()] = true;
                side.push(n.atom);
            }
        }
    }
    Some(side)
}

/// Swings the ligands of an end that lies in line to 120 degrees from the axis.
fn bend(pose: &mut Pose<'_>, rings: &Rings, wanted: Geometry, k: usize) -> Result<(), TurnError> {
    let (end, partner) = (wanted.ends[k], wanted.ends[1 - k]);
    let axis = geom::angle(pose.at(partner) - pose.at(end));
    let ligands = [Some(wanted.first[k]), pose.other_ligand(wanted, k)];
    let mut best: Option<(f64, Pose<'_>)> = None;
    for turn in [2.0 * PI / 3.0, -2.0 * PI / 3.0] {
        let mut trial = pose.clone();
        for (ligand, sign) in ligands.iter().zip([1.0, -1.0]) {
            let Some(ligand) = ligand else { continue };
            let bond = pose.drawing.molecule().bond_between(end, *ligand);
            let side = bond
                .filter(|b| !rings.has_bond(*b))
                .and_then(|b| beyond(pose.drawing, b, end))
                .ok_or(TurnError::InRing)?;
            let now = geom::angle(trial.at(*ligand) - trial.at(end));
            let about = trial.at(end);
            trial.swing(&side, about, axis + sign * turn - now);
        }
        let clash = ROOMY.everywhere(&trial);
        if best.as_ref().is_none_or(|(least, _)| clash < *least) {
            best = Some((clash, trial));
        }
    }
    if let Some((_, trial)) = best {
        *pose = trial;
    }
    Ok(())
}

/// One way to make room.
#[derive(Clone, Copy)]
enum Relief {
    Mirror(BondIx, AtomIx),
    Swing(BondIx, AtomIx, f64),
}

/// The pose with one side of the double bond mirrored, and branches moved where that makes atoms collide.
fn mirrored<'a>(
    pose: &Pose<'a>,
    wanted: Geometry,
    axis: [BondIx; 2],
    rings: &Rings,
    room: Clash,
) -> Result<Pose<'a>, TurnError> {
    let mut sides: Vec<Vec<AtomIx>> = wanted
        .ends
        .iter()
        .zip(axis)
        .map(|(end, bond)| beyond(pose.drawing, bond, *end).ok_or(TurnError::InRing))
        .collect::<Result<_, _>>()?;
    // the lesser side first; at equal size the one of the later end
    sides.sort_by_key(Vec::len);
    let tolerated = room.everywhere(pose);
    let mut poses = Vec::new();
    for side in &sides {
        let mut trial = pose.clone();
        let [a, b] = wanted.ends.map(|e| pose.at(e));
        trial.mirror(side, a, b);
        if room.everywhere(&trial) <= tolerated {
            return Ok(trial);
        }
        poses.push((trial, side));
    }
    for (trial, side) in &poses {
        let reliefs = reliefs(trial, side, rings);
        if let Some(found) = relieve(trial, &reliefs, tolerated, room) {
            return Ok(found);
        }
    }
    Err(TurnError::Collides)
}

fn reliefs(pose: &Pose<'_>, moved: &[AtomIx], rings: &Rings) -> Vec<Relief> {
    let molecule = pose.drawing.molecule();
    let mut list = Vec::new();
    let acyclic: Vec<(BondIx, AtomIx)> = molecule
        .bonds()
        .filter(|b| !rings.has_bond(*b) && molecule.bond(*b).order == Order::Single)
        .filter_map(|b| {
            let [p, q] = molecule.bond(b).ends;
            // the part that moves is the one away from the double bond
            let nearer = match (moved.contains(&p), moved.contains(&q)) {
                (true, true) => {
                    let from_p = moved.iter().position(|a| *a == p)?;
                    let from_q = moved.iter().position(|a| *a == q)?;
                    if from_p < from_q { p } else { q }
                }
                _ => return None,
            };
            let far = molecule.bond(b).other(nearer);
            (molecule.degree(nearer) > 1 && molecule.degree(far) > 0).then_some((b, nearer))
        })
        .collect();
    list.extend(acyclic.iter().map(|(b, p)| Relief::Mirror(*b, *p)));
    for degrees in [30.0_f64, -30.0, 60.0, -60.0] {
        let swing = degrees.to_radians();
        list.extend(acyclic.iter().filter_map(|(b, p)| {
            // the geometry at another double bond is never bent to make room
            let plain = molecule
                .neighbors(*p)
                .iter()
                .all(|n| n.order == Order::Single);
            plain.then_some(Relief::Swing(*b, *p, swing))
        }));
    }
    list.truncate(200);
    list
}

fn relieve<'a>(
    pose: &Pose<'a>,
    reliefs: &[Relief],
    tolerated: f64,
    room: Clash,
) -> Option<Pose<'a>> {
    let mut best: Option<(f64, Pose<'a>)> = None;
    for relief in reliefs {
        let trial = relieved(pose, *relief)?;
        let clash = room.everywhere(&trial);
        if clash <= tolerated {
            return Some(trial);
        }
        if best.as_ref().is_none_or(|(least, _)| clash < *least) {
            best = Some((clash, trial));
        }
    }
    // a second and third step from the best first one
    for _ in 0..2 {
        let (least, from) = best.take()?;
        for relief in reliefs {
            let trial = relieved(&from, *relief)?;
            let clash = room.everywhere(&trial);
            if clash <= tolerated {
                return Some(trial);
            }
            if clash < least && best.as_ref().is_none_or(|(b, _)| clash < *b) {
                best = Some((clash, trial));
            }
        }
    }
    None
}

fn relieved<'a>(pose: &Pose<'a>, relief: Relief) -> Option<Pose<'a>> {
    let mut trial = pose.clone();
    match relief {
        Relief::Mirror(bond, near) => {
            let side = beyond(pose.drawing, bond, near)?;
            let far = pose.drawing.molecule().bond(bond).other(near);
            let (a, b) = (pose.at(near), pose.at(far));
            trial.mirror(&side, a, b);
        }
        Relief::Swing(bond, near, angle) => {
            let side = beyond(pose.drawing, bond, near)?;
            let about = pose.at(near);
            trial.swing(&side, about, angle);
        }
    }
    Some(trial)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::drawing::tests::draw;

    fn diene() -> Drawing {
        draw(
            &[
                ("C", -0.5, 0.8),
                ("C", 0.0, 0.0),
                ("C", 1.0, 0.0),
                ("C", 1.5, 0.8),
                ("O", 2.5, 0.8),
            ],
            &[
                (0, 1, 1, ' '),
                (1, 2, 2, ' '),
                (2, 3, 1, ' '),
                (3, 4, 1, ' '),
            ],
        )
    }

    fn ix(i: usize) -> AtomIx {
        AtomIx::new(i)
    }

    fn wanted(parity: Parity) -> Geometry {
        Geometry {
            ends: [ix(1), ix(2)],
            toward: [ix(2), ix(1)],
            first: [ix(0), ix(3)],
            parity,
        }
    }

    #[test]
    fn the_lesser_side_moves() {
        let d = diene();
        let rings = Rings::find(d.molecule());
        assert!(
            turn(&d, &rings, &Units::default(), wanted(Parity::Even))
                .unwrap()
                .is_empty()
        );
        let edits = turn(&d, &rings, &Units::default(), wanted(Parity::Odd)).unwrap();
        assert!(matches!(edits.as_slice(), [Edit::Move(a, p)] if *a == ix(0) && p.y < -0.7));
    }

    #[test]
    fn a_straight_end_is_bent() {
        let d = draw(
            &[
                ("C", -1.0, 0.0),
                ("C", 0.0, 0.0),
                ("C", 1.0, 0.0),
                ("C", 2.0, 0.0),
            ],
            &[(0, 1, 1, ' '), (1, 2, 2, 'x'), (2, 3, 1, ' ')],
        );
        let rings = Rings::find(d.molecule());
        let edits = turn(&d, &rings, &Units::default(), wanted(Parity::Odd)).unwrap();
        let (after, _) = d.apply(&edits).unwrap();
        let (y0, y3) = (after.point(ix(0)).y, after.point(ix(3)).y);
        assert!(y0 * y3 < 0.0 && y0.abs() > 0.8);
        assert_eq!(after.mark(BondIx::new(1)), Mark::Plain);
    }
}
