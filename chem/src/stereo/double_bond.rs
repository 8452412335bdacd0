//! Stereogenic double bonds.

use super::Unit;
use crate::molecule::Molecule;
use crate::perceive::Rings;

pub(super) fn find(_molecule: &Molecule, _rings: &Rings, _list: &mut Vec<Unit>) {}
