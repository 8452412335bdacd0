//! Chooses marks for a whole drawing at least total cost.
//!
//! Every centre that must be marked has a list of options: a mark on one of its bonds (with a second one
//! of the other kind where four bonds are drawn), or a hydrogen drawn for the purpose. A bond serves one
//! centre, so options conflict only where two centres share a bond: the exact minimum over the drawing
//! is a least-cost assignment of centres to bonds.
//!
//! The sense of a mark comes from the signed volume of the lifted bonds, not from the rules by which
//! drawings are read, so that reading the result back is a real check.
//!
//! Source of the preferences: IUPAC 2006 recommendations (narrow end at the centre, none between centres,
//! ST-0.5; none in rings; hydrogen in the widest gap, ST-1.1.4); their weights are our own.

mod assign;
mod axis;
mod cost;
mod hydrogen;
mod option;

pub use axis::place_axis;

use crate::drawing::{Drawing, Edit, End, Mark};
use crate::element::Element;
use crate::molecule::{Atom, AtomIx, BondIx, Order};
use crate::perceive::Rings;
use crate::stereo::{Focus, Kind, Parity, UnitIx, Units};
use option::{Choice, Site};
use std::fmt;

/// Why a centre cannot be marked where it stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum PlaceErrorKind {
    /// A neighbor lies on the centre, or two neighbors in one direction.
    Overlap,
    /// No bond can bear the mark, and no hydrogen can be drawn.
    NoBond,
    /// The drawing is a model in space; it must be laid out flat first.
    InSpace,
}

/// A centre that cannot be marked.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct PlaceError {
    /// The centre.
    pub atom: AtomIx,
    /// Why.
    pub kind: PlaceErrorKind,
}

impl fmt::Display for PlaceError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let n = self.atom.index() + 1;
        match self.kind {
            PlaceErrorKind::Overlap => write!(
                f,
                "the bonds at atom {n} lie on each other: move its neighbors apart"
            ),
            PlaceErrorKind::NoBond => write!(
                f,
                "no bond at atom {n} can bear a wedge: all belong to other centres or are not single"
            ),
            PlaceErrorKind::InSpace => write!(
                f,
                "atom {n} stands in a model with depth, which cannot be laid out flat yet: draw it flat"
            ),
        }
    }
}

impl std::error::Error for PlaceError {}

/// A centre and the configuration that its marks must say.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Target {
    /// The centre's unit.
    pub unit: UnitIx,
    /// Its configuration.
    pub parity: Parity,
}

/// Edits that mark every target, at least total cost. Marks of other centres stay; marks that stood at
/// the targets go. Added hydrogens come last and stand in the order of their centres.
///
/// # Errors
/// The first centre that cannot be marked.
pub fn place(
    drawing: &Drawing,
    units: &Units,
    rings: &Rings,
    targets: &[Target],
) -> Result<Vec<Edit>, PlaceError> {
    let scene = Scene::new(drawing, units, rings, targets);
    let sites = targets
        .iter()
        .map(|target| scene.site(*target))
        .collect::<Result<Vec<_>, _>>()?;
    let chosen = assign::assign(&sites, drawing.molecule().n_bonds()).map_err(|i| PlaceError {
        atom: sites[i].center,
        kind: PlaceErrorKind::NoBond,
    })?;
    Ok(scene.edits(&sites, &chosen))
}

/// What every centre's options depend on.
struct Scene<'a> {
    drawing: &'a Drawing,
    units: &'a Units,
    rings: &'a Rings,
    /// Whether an atom is the focus of a centre, or an end of a double bond unit.
    is_center: Vec<bool>,
    is_double_end: Vec<bool>,
    is_axis_end: Vec<bool>,
    is_target: Vec<bool>,
}

impl<'a> Scene<'a> {
    fn new(
        drawing: &'a Drawing,
        units: &'a Units,
        rings: &'a Rings,
        targets: &'a [Target],
    ) -> Scene<'a> {
        let n = drawing.molecule().n_atoms();
        let mut scene = Scene {
            drawing,
            units,
            rings,
            is_center: vec![false; n],
            is_double_end: vec![false; n],
            is_axis_end: vec![false; n],
            is_target: vec![false; n],
        };
        for (_, unit) in units.iter() {
            match unit.focus {
                Focus::Center(a) => scene.is_center[a.index()] = true,
                Focus::Pair(_) if unit.kind == Kind::Helix => {
                    for a in unit.toward_each_other() {
                        scene.is_axis_end[a.index()] = true;
                    }
                }
                Focus::Pair(ends) => {
                    for a in ends {
                        if unit.kind == Kind::DoubleBond {
                            scene.is_double_end[a.index()] = true;
                        } else {
                            scene.is_axis_end[a.index()] = true;
                        }
                    }
                }
            }
        }
        for target in targets {
            if let Focus::Center(a) = units.get(target.unit).focus {
                scene.is_target[a.index()] = true;
            }
        }
        scene
    }

    /// Whether a bond may bear a mark whose narrow end is at `center`.
    fn is_free(&self, center: AtomIx, bond: BondIx) -> bool {
        let molecule = self.drawing.molecule();
        if molecule.bond(bond).order != Order::Single {
            return false;
        }
        let mark = self.drawing.mark(bond);
        let Some(end) = mark.narrow() else {
            return true;
        };
        let narrow = molecule.bond(bond).ends[end.index()];
        if narrow == center || self.is_target[narrow.index()] {
            return true;
        }
        // a mark that another unit needs stays; one that says nothing may be replaced
        let needed = self.is_center[narrow.index()]
            || self.is_axis_end[narrow.index()]
            || (matches!(mark, Mark::Wavy(_)) && self.is_double_end[narrow.index()]);
        !needed
    }

    fn edits(&self, sites: &[Site], chosen: &[usize]) -> Vec<Edit> {
        let molecule = self.drawing.molecule();
        let mut marks: Vec<Mark> = self.drawing.marks().to_vec();
        for b in molecule.bonds() {
            let mark = marks[b.index()];
            let at_target = mark
                .narrow()
                .is_some_and(|end| self.is_target[molecule.bond(b).ends[end.index()].index()]);
            if at_target {
                marks[b.index()] = Mark::Plain;
            }
        }
        let mut with_hydrogen: Vec<&Site> = Vec::new();
        for (site, choice) in sites.iter().zip(chosen) {
            let option = &site.options[*choice];
            match option.choice {
                Choice::Bond { bond, lift, second } => {
                    let mark = |bond: BondIx, up: bool| {
                        let end = self.drawing.end_at(bond, site.center);
                        if up {
                            Mark::Solid(end)
                        } else {
                            Mark::Hashed(end)
                        }
                    };
                    marks[bond.index()] = mark(bond, lift);
                    if let Some(second) = second {
                        marks[second.index()] = mark(second, !lift);
                    }
                }
                Choice::Hydrogen => with_hydrogen.push(site),
            }
        }
        let mut edits: Vec<Edit> = molecule
            .bonds()
            .filter(|b| marks[b.index()] != self.drawing.mark(*b))
            .map(|b| Edit::Mark(b, marks[b.index()]))
            .collect();
        edits.extend(self.hydrogens(&with_hydrogen));
        edits
    }

    /// Edits that draw a hydrogen with its mark at each of these centres.
    fn hydrogens(&self, sites: &[&Site]) -> Vec<Edit> {
        let molecule = self.drawing.molecule();
        let centers: Vec<AtomIx> = sites.iter().map(|s| s.center).collect();
        let spots = hydrogen::spots(self.drawing, self.rings, &centers);
        let mut edits = Vec::new();
        for (i, (site, spot)) in sites.iter().zip(spots).enumerate() {
            let h = AtomIx::new(molecule.n_atoms() + i);
            let bond = BondIx::new(molecule.n_bonds() + i);
            let mark = if option::hydrogen_lift(self, site, spot) {
                Mark::Solid(End::First)
            } else {
                Mark::Hashed(End::First)
            };
            edits.push(Edit::AddAtom(Atom::new(Element::H), spot));
            edits.push(Edit::AddBond([site.center, h], Order::Single));
            edits.push(Edit::Mark(bond, mark));
        }
        edits
    }
}
