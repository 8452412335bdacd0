//! Atoms and marks as sentences name them.

use crate::drawing::{Drawing, Mark};
use crate::molecule::{AtomIx, BondIx};
use crate::stereo::{Focus, Kind, Unit};

/// Number of an atom from 1.
pub(super) fn n(atom: AtomIx) -> usize {
    atom.index() + 1
}

/// `solid wedge`, `hashed wedge`, `wavy bond`.
pub(super) fn mark(mark: Mark) -> &'static str {
    match mark {
        Mark::Solid(_) => "solid wedge",
        Mark::Hashed(_) => "hashed wedge",
        Mark::Wavy(_) => "wavy bond",
        Mark::Crossed => "crossed bond",
        Mark::Plain => "plain bond",
    }
}

/// The marks at an atom: `solid wedge to atom 2, hashed wedge to atom 7`.
pub(super) fn marks_at(drawing: &Drawing, atom: AtomIx) -> String {
    let molecule = drawing.molecule();
    let words: Vec<String> = molecule
        .neighbors(atom)
        .iter()
        .filter(|m| drawing.mark_from(atom, m.bond) != Mark::Plain)
        .map(|m| format!("{} to atom {}", mark(drawing.mark(m.bond)), n(m.atom)))
        .collect();
    words.join(", ")
}

/// A unit: `atom 3`, `the double bond 7=8`.
pub(super) fn unit(unit: &Unit) -> String {
    match unit.focus {
        Focus::Center(a) => format!("atom {}", n(a)),
        Focus::Pair([a, b]) => match unit.kind {
            Kind::DoubleBond => format!("the double bond {}={}", n(a), n(b)),
            Kind::Helix => format!("the helix {}-{}", n(a), n(b)),
            Kind::Tetrahedral | Kind::CumulatedAxis | Kind::HinderedAxis => {
                format!("the axis {}-{}", n(a), n(b))
            }
        },
    }
}

/// A bond by its atoms: `3-4`.
pub(super) fn bond(drawing: &Drawing, bond: BondIx) -> String {
    let [a, b] = drawing.molecule().bond(bond).ends;
    format!("{}-{}", n(a), n(b))
}
