//! The ways to mark one centre, each with its cost.

use super::{PlaceError, PlaceErrorKind, Scene, Target, cost, hydrogen};
use crate::drawing::{Drawing, Mark};
use crate::geom::{self, Point, Vec2};
use crate::molecule::{AtomIx, BondIx};
use crate::stereo::{Focus, Ligand, Parity};
use smallvec::SmallVec;
use std::f64::consts::PI;

/// How a centre is marked.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Choice {
    /// A mark on a bond (solid if `lift`), and one of the other kind on a second bond.
    Bond {
        bond: BondIx,
        lift: bool,
        second: Option<BondIx>,
    },
    /// A hydrogen drawn in the freest place, and the mark on its bond.
    Hydrogen,
}

#[derive(Clone, Copy, Debug)]
pub(super) struct Candidate {
    pub(super) choice: Choice,
    /// Lower is better; see [`cost`].
    pub(super) cost: i64,
}

/// A centre to be marked.
#[derive(Clone, Debug)]
pub(super) struct Site {
    pub(super) center: AtomIx,
    pub(super) parity: Parity,
    pub(super) ligands: [Ligand; 4],
    pub(super) options: Vec<Candidate>,
}

/// A drawn bond as seen from the centre.
#[derive(Clone, Copy, Debug)]
pub(super) struct Arm {
    pub(super) to: AtomIx,
    pub(super) bond: BondIx,
    pub(super) direction: Vec2,
}

/// A pattern flatter than this in signed volume could be read either way, or not at all.
const FLAT: f64 = 0.05;
/// Bonds closer than this cannot be told apart: 6 degrees, a little more than readers ask.
const TOO_CLOSE: f64 = 6.0 * PI / 180.0;
/// Half width of the window about a straight angle in which the third bond's mark says nothing: half
/// as wide again as the one in which readers stop reading.
const NEAR_STRAIGHT: f64 = 0.15;

impl Scene<'_> {
    pub(super) fn site(&self, target: Target) -> Result<Site, PlaceError> {
        let unit = self.units.get(target.unit);
        let Focus::Center(center) = unit.focus else {
            // only centres are marked; a pair here is a mistake of the caller that changes nothing
            return Ok(Site {
                center: unit.atoms()[0],
                parity: target.parity,
                ligands: unit.ligands,
                options: Vec::new(),
            });
        };
        let error = |kind| PlaceError { atom: center, kind };
        if self.drawing.depths().is_some() {
            return Err(error(PlaceErrorKind::InSpace));
        }
        let arms = arms(self.drawing, center).ok_or(error(PlaceErrorKind::Overlap))?;
        let mut site = Site {
            center,
            parity: target.parity,
            ligands: unit.ligands,
            options: Vec::new(),
        };
        for (i, arm) in arms.iter().enumerate() {
            if !self.is_free(center, arm.bond) || is_stem(&arms, i) {
                continue;
            }
            let Some(lift) = lift(&site.ligands, site.parity, &arms, i) else {
                continue;
            };
            let mut cost = cost::of_bond(self, center, &arms, i);
            if self.author_marked(center, arm.bond) {
                cost -= cost::KEEP;
            }
            site.options.push(Candidate {
                choice: Choice::Bond {
                    bond: arm.bond,
                    lift,
                    second: self.second(center, &arms, i, lift, &site),
                },
                cost,
            });
        }
        if unit.ligands[3] == Ligand::Hydrogen {
            site.options.push(Candidate {
                choice: Choice::Hydrogen,
                cost: cost::HYDROGEN + hydrogen::crowding(self.drawing, self.rings, center),
            });
        }
        if site.options.is_empty() {
            return Err(error(PlaceErrorKind::NoBond));
        }
        Ok(site)
    }

    /// Whether the author's mark for this centre stands on the bond.
    fn author_marked(&self, center: AtomIx, bond: BondIx) -> bool {
        matches!(
            self.drawing.mark_from(center, bond),
            Mark::Solid(_) | Mark::Hashed(_)
        )
    }

    /// The second mark of a centre with four drawn bonds: the other kind, on a bond beside the first,
    /// in no ring and to no centre; none if there is no such bond. IUPAC recommends two for four bonds.
    fn second(
        &self,
        center: AtomIx,
        arms: &[Arm],
        first: usize,
        up: bool,
        site: &Site,
    ) -> Option<BondIx> {
        let [_, _, _, _] = arms else {
            return None;
        };
        let molecule = self.drawing.molecule();
        // a drawn hydrogen alone carries the mark clearly
        if molecule.element(arms[first].to) == crate::element::Element::H {
            return None;
        }
        [(first + 1) % 4, (first + 3) % 4]
            .into_iter()
            .filter(|i| {
                let arm = arms[*i];
                let angle = geom::between(arm.direction, arms[first].direction);
                self.is_free(center, arm.bond)
                    && !self.rings.has_bond(arm.bond)
                    && !self.is_center[arm.to.index()]
                    && (25.0_f64..100.0).contains(&angle.to_degrees())
                    && lift(&site.ligands, site.parity, arms, *i) == Some(!up)
            })
            .min_by_key(|i| (cost::of_bond(self, center, arms, *i), arms[*i].to))
            .map(|i| arms[i].bond)
    }
}

/// The drawn bonds of a centre in anticlockwise order; `None` if two lie on each other or a neighbor on
/// the centre.
pub(super) fn arms(drawing: &Drawing, center: AtomIx) -> Option<SmallVec<[Arm; 4]>> {
    let mut arms: SmallVec<[Arm; 4]> = SmallVec::new();
    for n in drawing.molecule().neighbors(center) {
        arms.push(Arm {
            to: n.atom,
            bond: n.bond,
            direction: drawing.direction(center, n.atom)?,
        });
    }
    arms.sort_by(|a, b| geom::angle(a.direction).total_cmp(&geom::angle(b.direction)));
    let clear = arms.iter().enumerate().all(|(i, a)| {
        arms[i + 1..]
            .iter()
            .all(|b| geom::between(a.direction, b.direction) > TOO_CLOSE)
    });
    clear.then_some(arms)
}

/// Whether arm `i` of three stands on the other two as on a straight line.
fn is_stem(arms: &[Arm], i: usize) -> bool {
    let [_, _, _] = arms else {
        return false;
    };
    let (a, b) = (arms[(i + 1) % 3].direction, arms[(i + 2) % 3].direction);
    PI - geom::between(a, b) < NEAR_STRAIGHT
}

/// Whether a mark on arm `i` must be solid (true) or hashed to give the parity; `None` if the lifted
/// bonds are too flat to tell.
fn lift(ligands: &[Ligand; 4], parity: Parity, arms: &[Arm], i: usize) -> Option<bool> {
    let volume = volume_with(ligands, arms, i, 1.0);
    (volume.abs() > FLAT).then(|| (volume > 0.0) == (parity == Parity::Even))
}

/// Whether the bond to a hydrogen drawn at `spot` must be solid.
pub(super) fn hydrogen_lift(scene: &Scene<'_>, site: &Site, spot: Point) -> bool {
    let center = scene.drawing.point(site.center);
    let mut all = arms(scene.drawing, site.center).unwrap_or_default();
    let h = AtomIx::new(scene.drawing.molecule().n_atoms());
    let direction = geom::direction(center, spot, 0.0).unwrap_or(Vec2::new(1.0, 0.0));
    all.push(Arm {
        to: h,
        bond: BondIx::new(scene.drawing.molecule().n_bonds()),
        direction,
    });
    let mut ligands = site.ligands;
    ligands[3] = Ligand::Atom(h);
    let volume = volume_with(&ligands, &all, 3, 1.0);
    (volume > 0.0) == (site.parity == Parity::Even)
}

/// Signed volume of the ligands in reference order when arm `i` is lifted by `z` out of the paper.
/// Positive: seen from the first ligand the others follow each other clockwise. A missing ligand lies
/// opposite the sum of the others, a little flatter than straight behind.
fn volume_with(ligands: &[Ligand; 4], arms: &[Arm], i: usize, z: f64) -> f64 {
    let place = |k: usize| -> [f64; 3] {
        let d = arms[k].direction;
        [d.x, d.y, if k == i { z } else { 0.0 }]
    };
    let missing = || {
        let mut sum = [0.0; 3];
        for k in 0..arms.len() {
            let p = place(k);
            for (total, x) in sum.iter_mut().zip(p) {
                *total += x;
            }
        }
        [-sum[0], -sum[1], -0.7 * sum[2]]
    };
    let points: SmallVec<[[f64; 3]; 4]> = ligands
        .iter()
        .map(|ligand| {
            arms.iter()
                .position(|arm| Ligand::Atom(arm.to) == *ligand)
                .map_or_else(missing, place)
        })
        .collect();
    let from_first = |k: usize| {
        let (p, o) = (points[k], points[0]);
        [p[0] - o[0], p[1] - o[1], p[2] - o[2]]
    };
    let (a, b, c) = (from_first(1), from_first(2), from_first(3));
    a[0] * (b[1] * c[2] - b[2] * c[1]) - a[1] * (b[0] * c[2] - b[2] * c[0])
        + a[2] * (b[0] * c[1] - b[1] * c[0])
}
