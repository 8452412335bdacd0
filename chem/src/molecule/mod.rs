//! Atoms and bonds, without positions and without stereo.
//!
//! A [`Molecule`] is immutable once built: handles ([`AtomIx`], [`BondIx`]) stay valid as long as it
//! lives, count from 0 in the order of the file, and are shared by everything derived from it. A change
//! is a new molecule (see [`crate::drawing::Drawing::apply`], which also hands out the renumbering).
//! petgraph stores the graph; a flat neighbour table beside it serves the inner loops.

mod formula;
mod hydrogens;

pub use formula::charge_text;

use crate::element::Element;
use petgraph::graph::UnGraph;
use std::fmt;

/// Handle of an atom of one [`Molecule`]; its index counts from 0 in the order of the file.
pub type AtomIx = petgraph::graph::NodeIndex<u32>;
/// Handle of a bond of one [`Molecule`].
pub type BondIx = petgraph::graph::EdgeIndex<u32>;

/// What is stated of one atom.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Atom {
    /// The element; [`Element::ANY`] for a placeholder, whose text is then in `alias`.
    pub element: Element,
    /// Mass number, where one isotope is stated.
    pub isotope: Option<u16>,
    /// Formal charge in elementary charges.
    pub charge: i8,
    /// Unpaired electrons.
    pub radical: Radical,
    /// Stated total valence (bonds and hydrogens), which then fixes the number of hydrogens.
    pub valence: Option<u8>,
    /// Text that stands in place of the symbol (`R1`, `Boc` ...).
    pub alias: Option<Box<str>>,
    /// Atom-atom mapping number of the file, 0 for none; carried along, never used.
    pub map: u16,
}

impl Atom {
    /// A neutral atom of an element, nothing else stated.
    pub fn new(element: Element) -> Atom {
        Atom {
            element,
            isotope: None,
            charge: 0,
            radical: Radical::None,
            valence: None,
            alias: None,
            map: 0,
        }
    }

    /// Mass that CIP Rule 2 compares: the exact mass of a stated isotope, else the standard weight.
    pub fn mass(&self) -> f64 {
        match self.isotope {
            Some(a) => self.element.isotope_mass(a),
            None => self.element.weight(),
        }
    }
}

/// Unpaired electrons of an atom, in the molfile's three kinds.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Default)]
pub enum Radical {
    /// No radical.
    #[default]
    None,
    /// Two electrons, paired (a singlet carbene).
    Singlet,
    /// One unpaired electron.
    Doublet,
    /// Two unpaired electrons.
    Triplet,
}

impl Radical {
    /// Valences that the radical takes from the atom.
    pub fn valences(self) -> u8 {
        match self {
            Radical::None => 0,
            Radical::Doublet => 1,
            Radical::Singlet | Radical::Triplet => 2,
        }
    }
}

/// Order of a bond, in localised (Kekulé) form.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Order {
    /// One electron pair.
    Single,
    /// Two.
    Double,
    /// Three.
    Triple,
    /// A bond that is no definite covalent bond; the molfile's code is kept: 0 unstated, 5 to 8
    /// query bonds, 9 dative, 10 hydrogen bond.
    Special(u8),
}

impl Order {
    /// Electron pairs that the bond takes from each atom's valence; 0 for a special bond.
    pub fn pairs(self) -> u8 {
        match self {
            Order::Single => 1,
            Order::Double => 2,
            Order::Triple => 3,
            Order::Special(_) => 0,
        }
    }

    /// Whether it is a hydrogen bond, which makes no ligand.
    pub fn is_hydrogen_bond(self) -> bool {
        self == Order::Special(10)
    }

    /// Whether it is a dative bond: a ligand like one held by a single bond.
    pub fn is_dative(self) -> bool {
        self == Order::Special(9)
    }

    /// Whether a wedge on it can be read: it holds a ligand by one electron pair.
    pub fn bears_wedge(self) -> bool {
        self == Order::Single || self.is_dative()
    }

    /// Whether its order is unstated or a query's: what depends on it cannot be decided.
    pub fn is_vague(self) -> bool {
        matches!(self, Order::Special(_)) && !self.is_hydrogen_bond() && !self.is_dative()
    }
}

/// One bond.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Bond {
    /// Its two atoms, in the order of the file.
    pub ends: [AtomIx; 2],
    /// Its order.
    pub order: Order,
}

impl Bond {
    /// The atom at the other end; `atom` itself must be an end.
    pub fn other(&self, atom: AtomIx) -> AtomIx {
        if self.ends[0] == atom {
            self.ends[1]
        } else {
            self.ends[0]
        }
    }
}

/// A neighbour as seen from one atom.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Neighbor {
    /// The atom at the other end.
    pub atom: AtomIx,
    /// The bond that leads there.
    pub bond: BondIx,
    /// Order of that bond.
    pub order: Order,
}

/// Why atoms and bonds do not make a molecule.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum MoleculeError {
    /// A bond names an atom that is not there.
    NoSuchAtom {
        /// Index of the bond in the list.
        bond: usize,
    },
    /// A bond joins an atom with itself.
    Loop {
        /// Index of the bond in the list.
        bond: usize,
    },
    /// Two bonds join the same two atoms.
    Twice {
        /// Index of the second of them.
        bond: usize,
    },
}

impl fmt::Display for MoleculeError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            MoleculeError::NoSuchAtom { bond } => {
                write!(f, "bond {} names an atom that is not there", bond + 1)
            }
            MoleculeError::Loop { bond } => {
                write!(f, "bond {} joins an atom with itself", bond + 1)
            }
            MoleculeError::Twice { bond } => write!(
                f,
                "bond {} joins two atoms that are joined already",
                bond + 1
            ),
        }
    }
}

impl std::error::Error for MoleculeError {}

/// Atoms and bonds; immutable once built.
///
/// Guarantees: both ends of every bond exist and differ, two atoms share at most one bond, orders are
/// localised, and the number of implicit hydrogens of each atom is settled (see [`Molecule::hydrogens`]).
#[derive(Clone, Debug, Default)]
pub struct Molecule {
    graph: UnGraph<Atom, Bond>,
    first_neighbor: Vec<u32>,
    neighbors: Vec<Neighbor>,
    hydrogens: Vec<u8>,
}

impl Molecule {
    /// A molecule from its atoms and bonds, in the order of the file.
    ///
    /// # Errors
    /// A bond that names a missing atom, joins an atom with itself, or repeats another.
    pub fn new(atoms: Vec<Atom>, bonds: Vec<Bond>) -> Result<Molecule, MoleculeError> {
        let n = atoms.len();
        let mut first_neighbor = vec![0u32; n + 1];
        for (i, bond) in bonds.iter().enumerate() {
            let [a, b] = bond.ends.map(AtomIx::index);
            if a >= n || b >= n {
                return Err(MoleculeError::NoSuchAtom { bond: i });
            }
            if a == b {
                return Err(MoleculeError::Loop { bond: i });
            }
            first_neighbor[a + 1] += 1;
            first_neighbor[b + 1] += 1;
        }
        for i in 0..n {
            first_neighbor[i + 1] += first_neighbor[i];
        }
        let blank = Neighbor {
            atom: AtomIx::new(0),
            bond: BondIx::new(0),
            order: Order::Single,
        };
        let mut neighbors = vec![blank; 2 * bonds.len()];
        let mut fill = first_neighbor.clone();
        for (i, bond) in bonds.iter().enumerate() {
            for [from, to] in [bond.ends, [bond.ends[1], bond.ends[0]]] {
                let start = first_neighbor[from.index()] as usize;
                let slot = &mut fill[from.index()];
                if neighbors[start..*slot as usize]
                    .iter()
                    .any(|known| known.atom == to)
                {
                    return Err(MoleculeError::Twice { bond: i });
                }
                neighbors[*slot as usize] = Neighbor {
                    atom: to,
                    bond: BondIx::new(i),
                    order: bond.order,
                };
                *slot += 1;
            }
        }
        let mut graph = UnGraph::with_capacity(n, bonds.len());
        for atom in atoms {
            graph.add_node(atom);
        }
        for bond in bonds {
            graph.add_edge(bond.ends[0], bond.ends[1], bond);
        }
        let mut molecule = Molecule {
            graph,
            first_neighbor,
            neighbors,
            hydrogens: Vec::new(),
        };
        molecule.hydrogens = hydrogens::count_all(&molecule);
        Ok(molecule)
    }

    /// Number of drawn atoms.
    pub fn n_atoms(&self) -> usize {
        self.graph.node_count()
    }

    /// Number of bonds.
    pub fn n_bonds(&self) -> usize {
        self.graph.edge_count()
    }

    /// Handles of all atoms, in the order of the file.
    pub fn atoms(&self) -> impl ExactSizeIterator<Item = AtomIx> + use<> {
        (0..self.n_atoms()).map(AtomIx::new)
    }

    /// Handles of all bonds, in the order of the file.
    pub fn bonds(&self) -> impl ExactSizeIterator<Item = BondIx> + use<> {
        (0..self.n_bonds()).map(BondIx::new)
    }

    /// What is stated of an atom.
    ///
    /// # Panics
    /// If the handle belongs to another molecule.
    pub fn atom(&self, atom: AtomIx) -> &Atom {
        &self.graph[atom]
    }

    /// A bond.
    ///
    /// # Panics
    /// If the handle belongs to another molecule.
    pub fn bond(&self, bond: BondIx) -> &Bond {
        &self.graph[bond]
    }

    /// Element of an atom.
    pub fn element(&self, atom: AtomIx) -> Element {
        self.graph[atom].element
    }

    /// Drawn neighbours of an atom, in the order of their bonds.
    pub fn neighbors(&self, atom: AtomIx) -> &[Neighbor] {
        let i = atom.index();
        &self.neighbors[self.first_neighbor[i] as usize..self.first_neighbor[i + 1] as usize]
    }

    /// Number of drawn neighbours.
    pub fn degree(&self, atom: AtomIx) -> usize {
        self.neighbors(atom).len()
    }

    /// Implicit hydrogens of an atom: those that no atom of the drawing stands for.
    pub fn hydrogens(&self, atom: AtomIx) -> u8 {
        self.hydrogens[atom.index()]
    }

    /// Electron pairs that the drawn bonds take from an atom.
    pub fn bond_pairs(&self, atom: AtomIx) -> u8 {
        self.neighbors(atom)
            .iter()
            .fold(0u8, |sum, n| sum.saturating_add(n.order.pairs()))
    }

    /// The bond between two atoms, if there is one.
    pub fn bond_between(&self, a: AtomIx, b: AtomIx) -> Option<BondIx> {
        self.neighbors(a)
            .iter()
            .find(|n| n.atom == b)
            .map(|n| n.bond)
    }

    /// The graph that stores the molecule, for algorithms on graphs.
    pub fn graph(&self) -> &UnGraph<Atom, Bond> {
        &self.graph
    }

    /// Whether an atom's valence is one that its element has; placeholders and metals always pass.
    pub fn valence_is_usual(&self, atom: AtomIx) -> bool {
        hydrogens::valence_is_usual(self, atom)
    }
}

#[cfg(test)]
pub(crate) mod tests {
    use super::*;

    /// A molecule from symbols and `(first, second, pairs)`; for tests.
    pub(crate) fn build(symbols: &[&str], bonds: &[(usize, usize, u8)]) -> Molecule {
        let atoms = symbols
            .iter()
            .map(|s| Atom::new(Element::from_symbol(s).unwrap()))
            .collect();
        let bonds = bonds
            .iter()
            .map(|(a, b, pairs)| Bond {
                ends: [AtomIx::new(*a), AtomIx::new(*b)],
                order: match pairs {
                    1 => Order::Single,
                    2 => Order::Double,
                    3 => Order::Triple,
                    other => Order::Special(*other),
                },
            })
            .collect();
        Molecule::new(atoms, bonds).unwrap()
    }

    #[test]
    fn neighbours_agree_with_bonds() {
        let m = build(&["C", "O", "N"], &[(0, 1, 2), (2, 0, 1)]);
        let c = AtomIx::new(0);
        assert_eq!(
            m.neighbors(c)
                .iter()
                .map(|n| n.atom.index())
                .collect::<Vec<_>>(),
            [1, 2]
        );
        assert_eq!(m.bond_pairs(c), 3);
        assert_eq!(
            m.bond_between(AtomIx::new(2), c).map(BondIx::index),
            Some(1)
        );
        assert_eq!(m.bond_between(AtomIx::new(2), AtomIx::new(1)), None);
    }

    #[test]
    fn faulty_bonds_are_refused() {
        let atoms = || vec![Atom::new(Element::C), Atom::new(Element::C)];
        let bond = |a: usize, b: usize| Bond {
            ends: [AtomIx::new(a), AtomIx::new(b)],
            order: Order::Single,
        };
        assert_eq!(
            Molecule::new(atoms(), vec![bond(0, 2)]).err(),
            Some(MoleculeError::NoSuchAtom { bond: 0 })
        );
        assert_eq!(
            Molecule::new(atoms(), vec![bond(1, 1)]).err(),
            Some(MoleculeError::Loop { bond: 0 })
        );
        assert_eq!(
            Molecule::new(atoms(), vec![bond(0, 1), bond(1, 0)]).err(),
            Some(MoleculeError::Twice { bond: 1 })
        );
    }
}
