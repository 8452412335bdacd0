//! Stereogenic units and their configurations, relative to atom numbers, not to ranks.
//!
//! A unit names its focus and its ligands and depends on the graph alone. Whether it can carry a
//! descriptor is for the ranking to say: no unit is left out because its ligands look alike.
//! Each kind of unit has a file; what is common to all stands here. Square-planar, bipyramidal and
//! octahedral centres have more than two arrangements and are left out knowingly.
//!
//! Source of the candidate lists: the InChI technical manual's tables of stereogenic elements, as far
//! as they agree with the drawings of the public CIP Validation Suite.

mod cumulated;
mod descriptor;
mod double_bond;
mod helix;
mod hindered;
mod tetrahedral;

pub use descriptor::Descriptor;
pub use double_bond::LARGEST_CIS_RING;

use crate::element::Element;
use crate::molecule::{AtomIx, Molecule};
use crate::perceive::Rings;
use smallvec::SmallVec;

/// Kinds of stereogenic unit.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Kind {
    /// A centre with four ligands, a hydrogen or a lone pair among them.
    Tetrahedral,
    /// A double bond, or three, five ... in a row.
    DoubleBond,
    /// Two, four ... double bonds in a row: the planes of the ends cross.
    CumulatedAxis,
    /// A single bond between two rings that cannot turn. Only a mark says that it is hindered.
    HinderedAxis,
    /// The inner rim of a helicene.
    Helix,
}

impl Kind {
    /// Name in files (`tetrahedral`, `double-bond`).
    pub fn name(self) -> &'static str {
        match self {
            Kind::Tetrahedral => "tetrahedral",
            Kind::DoubleBond => "double-bond",
            Kind::CumulatedAxis => "cumulated-axis",
            Kind::HinderedAxis => "hindered-axis",
            Kind::Helix => "helix",
        }
    }

    /// Whether only a mark can tell that a unit of this kind is there: that rotation is hindered, or that
    /// rings form a helix.
    pub fn needs_mark(self) -> bool {
        matches!(self, Kind::HinderedAxis | Kind::Helix)
    }

    /// Whether a unit of this kind can carry such a letter at all.
    pub fn can_carry(self, descriptor: Descriptor) -> bool {
        use Descriptor as D;
        match self {
            Kind::Tetrahedral => matches!(descriptor, D::R | D::S | D::LowerR | D::LowerS),
            Kind::DoubleBond => matches!(descriptor, D::E | D::Z | D::LowerE | D::LowerZ),
            Kind::CumulatedAxis | Kind::HinderedAxis => {
                matches!(descriptor, D::M | D::P | D::LowerM | D::LowerP)
            }
            Kind::Helix => matches!(descriptor, D::M | D::P),
        }
    }
}

/// What holds the ligands of a unit.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Focus {
    /// One atom.
    Center(AtomIx),
    /// Two atoms, the lower one first: each holds two of the ligands.
    Pair([AtomIx; 2]),
}

/// A ligand of a unit. The order is the reference order: drawn atoms by number, then an implicit
/// hydrogen, then a lone pair.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Ligand {
    /// A drawn atom.
    Atom(AtomIx),
    /// A hydrogen that no atom of the drawing stands for.
    Hydrogen,
    /// A lone pair.
    LonePair,
}

impl Ligand {
    /// The drawn atom, if it is one.
    pub fn atom(self) -> Option<AtomIx> {
        match self {
            Ligand::Atom(a) => Some(a),
            Ligand::Hydrogen | Ligand::LonePair => None,
        }
    }
}

/// Handle of a unit in its [`Units`].
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct UnitIx(u32);

impl UnitIx {
    /// The handle with this index.
    pub fn new(index: usize) -> UnitIx {
        UnitIx(u32::try_from(index).unwrap_or(u32::MAX))
    }

    /// Its index.
    pub fn index(self) -> usize {
        self.0 as usize
    }
}

/// A place where two arrangements are possible.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Unit {
    /// What kind of place.
    pub kind: Kind,
    /// The atom or the two atoms that hold the ligands.
    pub focus: Focus,
    /// Four ligands in reference order; of a pair, the two of its first atom, then the two of its second.
    /// A helix has none: each of its slots holds an end.
    pub ligands: [Ligand; 4],
    /// Atoms of a pair between its ends, from the first to the second.
    pub inner: SmallVec<[AtomIx; 2]>,
    /// Ends of a pair at which marks say nothing of it: of a hindered axis, one outside rings.
    pub mute: [bool; 2],
}

impl Unit {
    /// Atoms that a label of this unit is written at: the centre, or both ends.
    pub fn atoms(&self) -> SmallVec<[AtomIx; 2]> {
        match self.focus {
            Focus::Center(a) => SmallVec::from_slice(&[a]),
            Focus::Pair(ends) => SmallVec::from_slice(&ends),
        }
    }

    /// Whether it is a nitrogen with a lone pair: its cage holds it, so that without a mark it is not open,
    /// merely unmarked.
    pub fn is_held_nitrogen(&self, molecule: &Molecule) -> bool {
        match self.focus {
            Focus::Center(atom) => {
                molecule.element(atom) == Element::N && self.ligands.contains(&Ligand::LonePair)
            }
            Focus::Pair(_) => false,
        }
    }

    /// The neighbors of a pair's ends on the way to each other; of a centre, itself.
    pub fn toward_each_other(&self) -> [AtomIx; 2] {
        match self.focus {
            Focus::Center(a) => [a, a],
            Focus::Pair([a, b]) => [
                self.inner.first().copied().unwrap_or(b),
                self.inner.last().copied().unwrap_or(a),
            ],
        }
    }
}

/// One of the two arrangements of a unit, relative to its ligands in reference order.
///
/// Centre: `Even` if, seen from the first ligand, the other three follow each other clockwise.
/// Double bond: `Even` if the first ligands of both ends are on the same side. Axis: as a centre, the two
/// ligands of the first end before those of the second. Helix: `Even` if it is left-handed.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Parity {
    /// See the type.
    Even,
    /// The other one.
    Odd,
}

impl Parity {
    /// `Even` for true.
    pub fn from_even(even: bool) -> Parity {
        if even { Parity::Even } else { Parity::Odd }
    }

    /// The other arrangement.
    pub fn flipped(self) -> Parity {
        match self {
            Parity::Even => Parity::Odd,
            Parity::Odd => Parity::Even,
        }
    }

    /// The other arrangement if `flip`, else this one.
    pub fn flipped_if(self, flip: bool) -> Parity {
        if flip { self.flipped() } else { self }
    }
}

/// What is known of a unit's arrangement.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Default)]
pub enum Configuration {
    /// One arrangement.
    Defined(Parity),
    /// Not stated.
    #[default]
    Open,
    /// Stated to be unknown or mixed.
    Either,
}

/// All units of a molecule, centres first, each kind by atom number.
#[derive(Clone, Debug, Default)]
pub struct Units {
    list: Vec<Unit>,
}

impl Units {
    /// Every place of the molecule that has the shape of a stereogenic unit.
    pub fn find(molecule: &Molecule, rings: &Rings) -> Units {
        let mut list = Vec::new();
        tetrahedral::find(molecule, rings, &mut list);
        let chains = cumulated::chains(molecule);
        double_bond::find(molecule, rings, &chains, &mut list);
        cumulated::find(molecule, rings, &chains, &mut list);
        hindered::find(molecule, rings, &mut list);
        helix::find(molecule, rings, &mut list);
        list.sort_by_key(|unit| (unit.kind, unit.atoms()));
        Units { list }
    }

    /// Number of units.
    pub fn len(&self) -> usize {
        self.list.len()
    }

    /// Whether there is none.
    pub fn is_empty(&self) -> bool {
        self.list.is_empty()
    }

    /// A unit.
    ///
    /// # Panics
    /// If the handle belongs to other units.
    pub fn get(&self, unit: UnitIx) -> &Unit {
        &self.list[unit.index()]
    }

    /// All units with their handles.
    pub fn iter(&self) -> impl Iterator<Item = (UnitIx, &Unit)> {
        self.list
            .iter()
            .enumerate()
            .map(|(i, u)| (UnitIx::new(i), u))
    }

    /// The centre at an atom, if there is one.
    pub fn center_at(&self, atom: AtomIx) -> Option<UnitIx> {
        self.iter()
            .find(|(_, u)| u.focus == Focus::Center(atom))
            .map(|(i, _)| i)
    }
}

/// Whether reordering `from` into `to` (the same ligands) takes an odd number of exchanges.
pub fn odd_permutation<T: PartialEq>(from: &[T], to: &[T]) -> bool {
    let places: SmallVec<[usize; 4]> = from
        .iter()
        .map(|x| to.iter().position(|y| y == x).unwrap_or(0))
        .collect();
    let mut odd = false;
    for i in 0..places.len() {
        for j in i + 1..places.len() {
            odd ^= places[i] > places[j];
        }
    }
    odd
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn permutations() {
        assert!(!odd_permutation(&[1, 2, 3, 4], &[1, 2, 3, 4]));
        assert!(odd_permutation(&[1, 2, 3, 4], &[2, 1, 3, 4]));
        assert!(!odd_permutation(&[1, 2, 3, 4], &[2, 3, 1, 4]));
        assert!(odd_permutation(&[1, 2, 3, 4], &[2, 3, 4, 1]));
    }

    #[test]
    fn letters_go_both_ways() {
        for d in Descriptor::ALL {
            assert_eq!(Descriptor::from_letter(d.letter()), Some(d));
            assert_eq!(d.opposite().opposite(), d);
            assert_eq!(d.mirrored().mirrored(), d);
        }
    }
}
