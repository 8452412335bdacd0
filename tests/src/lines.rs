//! Molecules of line notation under other atom numbers, and in the mirror.

use crate::change::Dice;
use crate::labels::Labels;
use chem::format::smiles::{self, Smiles};
use chem::molecule::{AtomIx, Bond, Molecule};
use chem::perceive::Rings;
use chem::pipeline;
use chem::stereo::{Configuration, Kind, Ligand, Parity, Unit, Units, odd_permutation};

/// A molecule with the configurations of its units.
#[derive(Clone, Debug)]
pub struct Isomer {
    /// Atoms and bonds.
    pub molecule: Molecule,
    /// Its rings.
    pub rings: Rings,
    /// Its units.
    pub units: Units,
    /// Of each unit.
    pub configurations: Vec<Configuration>,
}

impl From<Smiles> for Isomer {
    fn from(line: Smiles) -> Isomer {
        Isomer {
            molecule: line.molecule,
            rings: line.rings,
            units: line.units,
            configurations: line.configurations,
        }
    }
}

impl Isomer {
    /// What it carries.
    pub fn labels(&self) -> Labels {
        let carried = pipeline::labels_of(
            &self.molecule,
            &self.rings,
            &self.units,
            &self.configurations,
        );
        Labels::parse(&carried.labels)
    }

    /// Its mirror image.
    #[must_use]
    pub fn mirrored(&self) -> Isomer {
        let mut other = self.clone();
        for ((_, unit), configuration) in self.units.iter().zip(&mut other.configurations) {
            if let (Configuration::Defined(p), false) =
                (&configuration, unit.kind == Kind::DoubleBond)
            {
                *configuration = Configuration::Defined(p.flipped());
            }
        }
        other
    }

    /// The same with atoms and bonds in another order; also the new number of each atom, both from 1.
    ///
    /// # Panics
    /// If a unit is lost on the way.
    pub fn reordered(&self, dice: &mut Dice) -> (Isomer, Vec<usize>) {
        let m = &self.molecule;
        let old_atoms = dice.order(m.n_atoms());
        let mut new = vec![AtomIx::new(0); m.n_atoms()];
        for (place, old) in old_atoms.iter().enumerate() {
            new[*old] = AtomIx::new(place);
        }
        let atoms = old_atoms.iter().map(|a| m.atom(AtomIx::new(*a)).clone());
        let bonds: Vec<_> = m.bonds().collect();
        let bonds = dice.order(bonds.len()).into_iter().map(|i| Bond {
            ends: m.bond(bonds[i]).ends.map(|a| new[a.index()]),
            order: m.bond(bonds[i]).order,
        });
        let molecule =
            Molecule::new(atoms.collect(), bonds.collect()).expect("the same in another order");
        let rings = Rings::find(&molecule);
        let units = Units::find(&molecule, &rings);
        let mut configurations = vec![Configuration::Open; units.len()];
        for ((_, unit), configuration) in self.units.iter().zip(&self.configurations) {
            let mut atoms: Vec<AtomIx> = unit.atoms().iter().map(|a| new[a.index()]).collect();
            atoms.sort_unstable();
            let (ix, other) = units
                .iter()
                .find(|(_, u)| u.kind == unit.kind && u.atoms().as_slice() == atoms)
                .unwrap_or_else(|| panic!("{unit:?} is no unit any more"));
            configurations[ix.index()] = match configuration {
                Configuration::Defined(p) => {
                    Configuration::Defined(renumbered(*p, unit, other, &new))
                }
                other => *other,
            };
        }
        let known = Isomer {
            molecule,
            rings,
            units,
            configurations,
        };
        (known, new.iter().map(|a| a.index() + 1).collect())
    }

    /// Written and read again; also the new number of each atom, both from 1.
    ///
    /// # Panics
    /// If it cannot be written or read.
    pub fn rewritten(&self) -> (Isomer, Vec<usize>, String) {
        let written = smiles::write(&self.molecule, &self.units, &self.configurations)
            .unwrap_or_else(|e| panic!("{e}"));
        assert!(written.unsaid.is_empty(), "not all is in {}", written.text);
        let mut numbers = vec![0; written.order.len()];
        for (place, atom) in written.order.iter().enumerate() {
            numbers[atom.index()] = place + 1;
        }
        let again = smiles::read(&written.text).unwrap_or_else(|e| panic!("{}: {e}", written.text));
        (again.into(), numbers, written.text)
    }
}

/// A parity in terms of the same unit under other atom numbers.
fn renumbered(parity: Parity, unit: &Unit, other: &Unit, new: &[AtomIx]) -> Parity {
    let moved = unit.ligands.map(|l| match l {
        Ligand::Atom(a) => Ligand::Atom(new[a.index()]),
        Ligand::Hydrogen | Ligand::LonePair => l,
    });
    match unit.kind {
        // the first ligand of an end is drawn; does another come first now, at one end only?
        Kind::DoubleBond | Kind::CumulatedAxis => {
            let second = |l: &Ligand| moved[1] == *l || moved[3] == *l;
            parity.flipped_if(second(&other.ligands[0]) != second(&other.ligands[2]))
        }
        Kind::Tetrahedral | Kind::HinderedAxis | Kind::Helix => {
            parity.flipped_if(odd_permutation(&moved, &other.ligands))
        }
    }
}
