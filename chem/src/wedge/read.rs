//! Reads the marks and positions of a drawing into configurations.
//!
//! A mark counts only at its narrow end. What cannot be read is open, or doubtful with a reason: it is
//! never guessed. The rules stand with each kind of unit.
//!
//! Sources: IUPAC 2006 recommendations on graphical representation of stereochemical configuration
//! (ST-0.4, ST-0.5, ST-1.2.10, ST-1.2.12, ST-4.4, as their readers quote them); InChI technical manual,
//! stereochemical layer.

use super::{read_axis, read_center, read_double, read_helix, read_projection};
use crate::drawing::Drawing;
use crate::molecule::AtomIx;
use crate::perceive::Rings;
use crate::stereo::{Configuration, Focus, Kind, UnitIx, Units};

/// Why a unit's marks cannot be read.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Doubt {
    /// The marks at the centre say two different things.
    Contradiction,
    /// A wavy bond and a wedge stand at the same centre.
    EitherWithWedge,
    /// Two of three bonds are in line and only the third is marked.
    Stem,
    /// Three bonds lie in a half plane and all are marked alike.
    AllAlike,
    /// Two ligands are drawn in one direction, or one on top of the focus.
    Overlap,
    /// A ligand of a double bond lies on its axis.
    Straight,
    /// Both ligands of one end are drawn on the same side of the double bond.
    SameSide,
    /// The wedges are the near edge of a ring in perspective.
    Perspective,
}

impl Doubt {
    /// What the drawing does, in a sentence without its subject's number.
    pub fn text(self) -> &'static str {
        match self {
            Doubt::Contradiction => "the marks at this centre contradict each other",
            Doubt::EitherWithWedge => "a wavy bond and a wedge start at the same centre",
            Doubt::Stem => "two bonds are in line and only the third is marked, which says nothing",
            Doubt::AllAlike => "three bonds in a half plane are all marked alike",
            Doubt::Overlap => "two bonds point the same way or an atom lies on the centre",
            Doubt::Straight => "a ligand lies in line with the double bond",
            Doubt::SameSide => "both ligands of one end are drawn on the same side",
            Doubt::Perspective => {
                "the wedges are the near edge of a ring in perspective, not those of a flat drawing"
            }
        }
    }
}

/// What a drawing says of each unit.
#[derive(Clone, Debug, Default)]
pub struct Reading {
    configurations: Vec<Configuration>,
    doubts: Vec<Option<Doubt>>,
}

impl Reading {
    /// Configuration of a unit as drawn; open where there is a doubt.
    pub fn configuration(&self, unit: UnitIx) -> Configuration {
        self.configurations[unit.index()]
    }

    /// Why the unit cannot be read, if so.
    pub fn doubt(&self, unit: UnitIx) -> Option<Doubt> {
        self.doubts[unit.index()]
    }

    /// Configurations of all units, in their order.
    pub fn configurations(&self) -> &[Configuration] {
        &self.configurations
    }
}

/// Reads the configuration of every unit from a drawing.
pub fn read(drawing: &Drawing, units: &Units) -> Reading {
    let mut reading = Reading::default();
    let in_perspective = near_edges(drawing, units);
    for (_, unit) in units.iter() {
        let seen = match unit.focus {
            Focus::Center(center) => match read_center::read(drawing, center, &unit.ligands) {
                Ok(Configuration::Defined(_)) | Err(_) if in_perspective.contains(&center) => {
                    Err(Doubt::Perspective)
                }
                seen => seen,
            },
            Focus::Pair(ends) => match unit.kind {
                Kind::CumulatedAxis | Kind::HinderedAxis => read_axis::read(drawing, ends, unit),
                Kind::Helix => read_helix::read(drawing, ends, unit),
                Kind::DoubleBond | Kind::Tetrahedral => {
                    read_double::read(drawing, ends, unit, units)
                }
            },
        };
        reading
            .configurations
            .push(*seen.as_ref().unwrap_or(&Configuration::Open));
        reading.doubts.push(seen.err());
    }
    reading
}

/// Centres of Haworth rings whose near edge is drawn with wedges.
fn near_edges(drawing: &Drawing, units: &Units) -> Vec<AtomIx> {
    if !read_projection::may_have_front_edge(drawing) {
        return Vec::new();
    }
    let rings = Rings::find(drawing.molecule());
    read_projection::projections(drawing, units, &rings)
        .into_iter()
        .filter(|(_, p)| *p == read_projection::Projection::Haworth)
        .map(|(a, _)| a)
        .collect()
}
