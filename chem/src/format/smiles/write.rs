//! A molecule with its configurations as one line.
//!
//! The line is the same in every run and says what the molecule is, but it is not canonical: another order
//! of the atoms gives another line. Bonds are written as they are, rings in upper case. Carriers of marks
//! are chosen in `slash`, the order of atoms in `tree`.

use super::bracket::{MOST_CHARGE, MOST_CLASS, MOST_HYDROGENS, MOST_ISOTOPE};
use super::slash;
use super::stereo::{is_odd, middle, order_of};
use super::tree::Tree;
use super::{MOST_CHARACTERS, atoms::organic_hydrogens};
use crate::format::Notice;
use crate::molecule::{AtomIx, BondIx, Molecule, Neighbor, Order, Radical};
use crate::stereo::{Configuration, Focus, Kind, Ligand, Parity, Unit, UnitIx, Units};
use std::cmp::Reverse;
use std::collections::BinaryHeap;
use std::fmt::{self, Write};

/// A line and how it stands to the molecule.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Written {
    /// The line.
    pub text: String,
    /// Atoms of the molecule in the order of the line.
    pub order: Vec<AtomIx>,
    /// Units whose configuration the line does not say: hindered axes and helices, those stated to be
    /// unknown, and double bonds whose marks would contradict others.
    pub unsaid: Vec<UnitIx>,
    /// What else the line does not say.
    pub notices: Vec<Notice>,
}

/// Why a molecule has no line.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Unwritable {
    /// A bond that is no definite covalent bond.
    Bond(BondIx),
    /// A number at an atom that the notation has no room for.
    Number {
        /// The atom.
        atom: AtomIx,
        /// Which number.
        what: &'static str,
    },
    /// The line would be longer than any that is read.
    TooLong,
}

impl fmt::Display for Unwritable {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Unwritable::Bond(bond) => write!(
                f,
                "bond {} is neither single, double nor triple, which a line cannot say; give it an order",
                bond.index() + 1
            ),
            Unwritable::Number { atom, what } => write!(
                f,
                "{what} of atom {} does not fit a line; take it away or correct it",
                atom.index() + 1
            ),
            Unwritable::TooLong => write!(
                f,
                "the line would be longer than {MOST_CHARACTERS} characters; split the molecule"
            ),
        }
    }
}

impl std::error::Error for Unwritable {}

/// Writes a molecule whose units have these configurations.
///
/// # Errors
/// If it holds a bond or a number that the notation cannot say.
pub fn write(
    molecule: &Molecule,
    units: &Units,
    configurations: &[Configuration],
) -> Result<Written, Unwritable> {
    let special = |b: &BondIx| matches!(molecule.bond(*b).order, Order::Special(_));
    if let Some(bond) = molecule.bonds().find(special) {
        return Err(Unwritable::Bond(bond));
    }
    let tree = Tree::new(molecule, &lone_pairs(units, configurations));
    let slashes = slash::choose(molecule, &tree, units, configurations);
    let mut unsaid = slashes.unsaid;
    let mut signs = vec![None; molecule.n_atoms()];
    for ((ix, unit), configuration) in units.iter().zip(configurations) {
        match (configuration, sign_at(unit)) {
            (Configuration::Open, _) => {}
            (Configuration::Defined(parity), Some(atom)) => {
                signs[atom.index()] = Some(sign(&tree, unit, *parity));
            }
            (Configuration::Defined(_), None) if unit.kind == Kind::DoubleBond => {}
            (Configuration::Defined(_) | Configuration::Either, _) => unsaid.push(ix),
        }
    }
    unsaid.sort_unstable();
    let mut line = Line {
        molecule,
        tree: &tree,
        up: &slashes.up,
        signs: &signs,
        text: String::new(),
        numbers: vec![0; molecule.n_bonds()],
        free: BinaryHeap::new(),
        used: 0,
    };
    line.all()?;
    let text = line.text;
    if text.len() > MOST_CHARACTERS {
        return Err(Unwritable::TooLong);
    }
    Ok(Written {
        text,
        order: tree.order,
        unsaid,
        notices: notices(molecule),
    })
}

/// Centres of defined configuration with a lone pair: where one begins a line, readers differ on whether
/// the lone pair counts as its first neighbour.
fn lone_pairs(units: &Units, configurations: &[Configuration]) -> Vec<AtomIx> {
    let defined = units
        .iter()
        .zip(configurations)
        .filter(|(_, c)| **c != Configuration::Open);
    let with_pair = defined.filter(|((_, unit), _)| unit.ligands[3] == Ligand::LonePair);
    with_pair
        .filter_map(|((_, unit), _)| match unit.focus {
            Focus::Center(atom) => Some(atom),
            Focus::Pair(_) => None,
        })
        .collect()
}

/// The atom at which a unit's `@` stands.
fn sign_at(unit: &Unit) -> Option<AtomIx> {
    match (unit.kind, unit.focus) {
        (_, Focus::Center(atom)) => Some(atom),
        (Kind::CumulatedAxis, Focus::Pair(_)) => middle(unit),
        (_, Focus::Pair(_)) => None,
    }
}

/// `@` or `@@` of a unit, in the order of writing.
fn sign(tree: &Tree, unit: &Unit, parity: Parity) -> &'static str {
    let ligands = |atom: AtomIx, partner: Option<AtomIx>, ligands: &[Ligand]| {
        let undrawn = ligands.iter().copied().find(|l| l.atom().is_none());
        let has_previous = tree.around[atom.index()].previous.is_some();
        order_of(&tree.as_written(atom), has_previous, partner, undrawn)
    };
    let written = match unit.focus {
        Focus::Center(atom) => ligands(atom, None, &unit.ligands),
        Focus::Pair([a, b]) => {
            let [to_b, to_a] = unit.toward_each_other();
            let (of_a, of_b) = unit.ligands.split_at(2);
            let mut all = ligands(a, Some(to_b), of_a);
            all.extend(ligands(b, Some(to_a), of_b));
            all
        }
    };
    match parity.flipped_if(is_odd(unit, &written)) {
        Parity::Even => "@@",
        Parity::Odd => "@",
    }
}

fn notices(molecule: &Molecule) -> Vec<Notice> {
    let list = |wanted: &dyn Fn(AtomIx) -> bool| {
        let atoms = molecule.atoms().filter(|a| wanted(*a));
        let numbers: Vec<String> = atoms.map(|a| (a.index() + 1).to_string()).collect();
        numbers.join(", ")
    };
    let radicals = list(&|a| molecule.atom(a).radical != Radical::None);
    let aliases = list(&|a| {
        let atom = molecule.atom(a);
        atom.alias.as_deref().is_some_and(|text| text != "*")
    });
    let mut notices = Vec::new();
    if !radicals.is_empty() {
        let text = format!("kinds of radicals are not in the line (atoms {radicals})");
        notices.push(Notice::new(0, "radical", text));
    }
    if !aliases.is_empty() {
        let text = format!("text of placeholders is not in the line (atoms {aliases})");
        notices.push(Notice::new(0, "placeholder", text));
    }
    notices
}

/// What comes next in the line.
enum Step {
    Atom(AtomIx),
    /// A branch that begins with this bond.
    Branch(Neighbor),
    Close,
    /// The way on.
    On(Neighbor),
}

struct Line<'a> {
    molecule: &'a Molecule,
    tree: &'a Tree,
    up: &'a [Option<bool>],
    signs: &'a [Option<&'static str>],
    text: String,
    /// Number of each ring bond.
    numbers: Vec<u32>,
    free: BinaryHeap<Reverse<u32>>,
    /// Highest number used so far.
    used: u32,
}

impl Line<'_> {
    fn all(&mut self) -> Result<(), Unwritable> {
        let roots = self.tree.order.iter().copied();
        let is_root = |a: &AtomIx| self.tree.around[a.index()].previous.is_none();
        let roots: Vec<AtomIx> = roots.filter(is_root).collect();
        for root in roots {
            if !self.text.is_empty() {
                self.text.push('.');
            }
            let mut steps = vec![Step::Atom(root)];
            while let Some(step) = steps.pop() {
                match step {
                    Step::Close => self.text.push(')'),
                    Step::Branch(way) => {
                        self.text.push('(');
                        self.bond(way.bond);
                        steps.push(Step::Close);
                        steps.push(Step::Atom(way.atom));
                    }
                    Step::On(way) => {
                        self.bond(way.bond);
                        steps.push(Step::Atom(way.atom));
                    }
                    Step::Atom(atom) => {
                        self.atom(atom)?;
                        self.rings(atom);
                        if let [branches @ .., last] =
                            self.tree.around[atom.index()].next.as_slice()
                        {
                            steps.push(Step::On(*last));
                            steps.extend(branches.iter().rev().map(|way| Step::Branch(*way)));
                        }
                    }
                }
            }
        }
        Ok(())
    }

    fn bond(&mut self, bond: BondIx) {
        let sign = match (self.molecule.bond(bond).order, self.up[bond.index()]) {
            (Order::Double, _) => "=",
            (Order::Triple, _) => "#",
            (_, Some(true)) => "/",
            (_, Some(false)) => "\\",
            (_, None) => "",
        };
        self.text.push_str(sign);
    }

    /// Ring numbers at an atom; a number that closes here is free again after the atom.
    fn rings(&mut self, atom: AtomIx) {
        let tree = self.tree;
        let mut closed = Vec::new();
        for ring in &tree.around[atom.index()].rings {
            let number = if tree.place[ring.atom.index()] < tree.place[atom.index()] {
                let number = self.numbers[ring.bond.index()];
                closed.push(Reverse(number));
                number
            } else {
                let number = match self.free.pop() {
                    Some(Reverse(number)) => number,
                    None => {
                        self.used += 1;
                        self.used
                    }
                };
                self.numbers[ring.bond.index()] = number;
                self.bond(ring.bond);
                number
            };
            // writing to a string does not fail
            let _ = match number {
                0..=9 => write!(self.text, "{number}"),
                10..=99 => write!(self.text, "%{number}"),
                _ => write!(self.text, "%({number})"),
            };
        }
        self.free.extend(closed);
    }

    fn atom(&mut self, ix: AtomIx) -> Result<(), Unwritable> {
        let atom = self.molecule.atom(ix);
        let hydrogens = self.molecule.hydrogens(ix);
        let sign = self.signs[ix.index()];
        let symbol = atom.element.symbol();
        let isotope = atom.isotope.filter(|n| *n > 0);
        let is_bare = sign.is_none()
            && isotope.is_none()
            && atom.charge == 0
            && atom.map == 0
            && organic_hydrogens(atom.element, self.molecule.bond_pairs(ix)) == Some(hydrogens);
        if is_bare {
            self.text.push_str(symbol);
            return Ok(());
        }
        let charge = u32::from(atom.charge.unsigned_abs());
        for (value, most, what) in [
            (
                isotope.map_or(0, u32::from),
                MOST_ISOTOPE,
                "the mass number",
            ),
            (
                u32::from(hydrogens),
                MOST_HYDROGENS,
                "the number of hydrogens",
            ),
            (charge, MOST_CHARGE, "the charge"),
            (u32::from(atom.map), MOST_CLASS, "the mapping number"),
        ] {
            if value > most {
                return Err(Unwritable::Number { atom: ix, what });
            }
        }
        self.text.push('[');
        let out = &mut self.text;
        // writing to a string does not fail
        let _ = isotope.map(|n| write!(out, "{n}"));
        out.push_str(symbol);
        out.push_str(sign.unwrap_or_default());
        let _ = match hydrogens {
            0 => Ok(()),
            1 => write!(out, "H"),
            n => write!(out, "H{n}"),
        };
        let charge_sign = if atom.charge < 0 { '-' } else { '+' };
        let _ = match charge {
            0 => Ok(()),
            1 => write!(out, "{charge_sign}"),
            n => write!(out, "{charge_sign}{n}"),
        };
        if atom.map > 0 {
            let _ = write!(out, ":{}", atom.map);
        }
        out.push(']');
        Ok(())
    }
}
