//! What `@`, `/` and `\` say, in terms of the molecule's units.
//!
//! A line states an arrangement by the order of writing, a unit by its reference order: the two differ by
//! a permutation. An implicit hydrogen or a lone pair counts directly after the atom before, first if there
//! is none. Source: OpenSMILES, "Tetrahedral centers", "Cis/trans", "Extended tetrahedral"; where a bare
//! end of an axis has its hydrogen was found with the drawings of the CIP Validation Suite.

use super::error::{Fault, SmilesError};
use super::lex::{Chirality, Shape, Symbol};
use super::parse::{Parsed, WrittenAtom};
use crate::format::Notice;
use crate::molecule::{AtomIx, Molecule};
use crate::stereo::{
    Configuration, Focus, Kind, Ligand, Parity, Unit, UnitIx, Units, odd_permutation,
};
use smallvec::SmallVec;

/// The configuration of each unit.
pub(super) fn configurations(
    parsed: &Parsed,
    molecule: &Molecule,
    units: &Units,
    notices: &mut Vec<Notice>,
) -> Result<Vec<Configuration>, SmilesError> {
    let mut list = vec![Configuration::Open; units.len()];
    at_signs(parsed, units, &mut list, notices);
    slashes(parsed, molecule, units, &mut list, notices)?;
    Ok(list)
}

/// The unit that an `@` at each atom speaks of: its centre or the axis whose middle it is.
fn units_at(units: &Units, n_atoms: usize) -> Vec<Option<UnitIx>> {
    let mut at = vec![None; n_atoms];
    for (ix, unit) in units.iter() {
        match (unit.focus, unit.kind) {
            (Focus::Center(atom), _) => at[atom.index()] = Some(ix),
            (Focus::Pair(_), Kind::CumulatedAxis) => {
                if let Some(middle) = middle(unit) {
                    at[middle.index()] = Some(ix);
                }
            }
            (Focus::Pair(_), _) => {}
        }
    }
    at
}

/// The middle atom of an axis.
pub(super) fn middle(axis: &Unit) -> Option<AtomIx> {
    axis.inner.get(axis.inner.len() / 2).copied()
}

fn at_signs(parsed: &Parsed, units: &Units, list: &mut [Configuration], notices: &mut Vec<Notice>) {
    let unit_at = units_at(units, parsed.atoms.len());
    for (i, atom) in parsed.atoms.iter().enumerate() {
        let Some(Chirality { shape, parity }) = atom.token.chirality else {
            continue;
        };
        let unit = unit_at[i].filter(|ix| {
            matches!(
                (shape, units.get(*ix).kind),
                (Shape::Any, _)
                    | (Shape::Tetrahedral, Kind::Tetrahedral)
                    | (Shape::Axis, Kind::CumulatedAxis)
            )
        });
        match unit {
            Some(ix) => {
                let unit = units.get(ix);
                let written = ligands_as_written(parsed, unit);
                let flip = is_odd(unit, &written);
                list[ix.index()] = Configuration::Defined(parity.flipped_if(flip));
                if unit.ligands[3] == Ligand::LonePair && !atom.has_previous {
                    notices.push(Notice::new(0, "lone-pair-first", format!(
                        "the line begins with atom {}, a centre with a lone pair: some programs read its @ the other way; begin with another atom",
                        i + 1
                    )));
                }
            }
            None => notices.push(Notice::new(
                0,
                "idle-mark",
                format!(
                    "the @ at atom {} (column {}) says nothing: the atom is no such centre",
                    i + 1,
                    atom.column
                ),
            )),
        }
    }
}

/// The ligands of a centre or axis in the order of writing.
fn ligands_as_written(parsed: &Parsed, unit: &Unit) -> SmallVec<[Ligand; 4]> {
    match unit.focus {
        Focus::Center(atom) => in_order(&parsed.atoms[atom.index()], None, &unit.ligands),
        Focus::Pair([first, second]) => {
            let [a, b] = unit.toward_each_other();
            let (of_first, of_second) = unit.ligands.split_at(2);
            let mut all = in_order(&parsed.atoms[first.index()], Some(a), of_first);
            all.extend(in_order(&parsed.atoms[second.index()], Some(b), of_second));
            all
        }
    }
}

/// The ligands of one atom in the order of writing, `partner` left out.
fn in_order(
    atom: &WrittenAtom,
    partner: Option<AtomIx>,
    ligands: &[Ligand],
) -> SmallVec<[Ligand; 4]> {
    let undrawn = ligands.iter().copied().find(|l| l.atom().is_none());
    order_of(&atom.neighbors, atom.has_previous, partner, undrawn)
}

/// Ligands in the order that `@` counts, from an atom's neighbours in the order of writing.
pub(super) fn order_of(
    neighbors: &[usize],
    has_previous: bool,
    partner: Option<AtomIx>,
    undrawn: Option<Ligand>,
) -> SmallVec<[Ligand; 4]> {
    let mut ligands = SmallVec::new();
    if !has_previous {
        ligands.extend(undrawn);
    }
    for (i, neighbor) in neighbors.iter().enumerate() {
        let neighbor = AtomIx::new(*neighbor);
        if Some(neighbor) != partner {
            ligands.push(Ligand::Atom(neighbor));
        }
        if has_previous && i == 0 {
            ligands.extend(undrawn);
        }
    }
    ligands
}

/// Whether the order of writing is an odd permutation of a unit's reference order.
pub(super) fn is_odd(unit: &Unit, written: &[Ligand]) -> bool {
    match unit.focus {
        Focus::Center(_) => odd_permutation(&unit.ligands, written),
        // end by end: a hydrogen or lone pair of one is no other than that of the other
        Focus::Pair(_) => {
            let turned = |first: usize| written.get(first) != unit.ligands.get(first);
            turned(0) != turned(2)
        }
    }
}

fn slashes(
    parsed: &Parsed,
    molecule: &Molecule,
    units: &Units,
    list: &mut [Configuration],
    notices: &mut Vec<Notice>,
) -> Result<(), SmilesError> {
    let is_slash = |s: Option<Symbol>| matches!(s, Some(Symbol::Up | Symbol::Down));
    if !parsed.bonds.iter().any(|b| is_slash(b.symbol)) {
        return Ok(());
    }
    let mut speaks = vec![false; parsed.bonds.len()];
    for (ix, unit) in units.iter().filter(|(_, u)| u.kind == Kind::DoubleBond) {
        let Focus::Pair(ends) = unit.focus else {
            continue;
        };
        // a double bond that was found for lower-case atoms is not one that was written
        let [next, _] = unit.toward_each_other();
        let written = molecule.bond_between(ends[0], next);
        if written.is_none_or(|b| parsed.bonds[b.index()].symbol != Some(Symbol::Double)) {
            continue;
        }
        let (of_first, of_second) = unit.ligands.split_at(2);
        let first = end_side(parsed, molecule, ends[0], of_first);
        let second = end_side(parsed, molecule, ends[1], of_second);
        match (first, second) {
            (Ok(None), Ok(_)) | (Ok(_), Ok(None)) => {}
            (Ok(Some(a)), Ok(Some(b))) => {
                list[ix.index()] = Configuration::Defined(Parity::from_even(a.above == b.above));
                for bond in a.bonds.iter().chain(&b.bonds) {
                    speaks[*bond] = true;
                }
            }
            // slashes meant for other double bonds meet here; nothing is said of this one
            (Ok(None), Err(column)) | (Err(column), Ok(None)) => {
                let [a, b] = ends.map(|end| end.index() + 1);
                let text = format!(
                    "the double bond of atoms {a} and {b} stays open: slashes put both ligands of one end on the same side (column {column}), and none stands at the other"
                );
                notices.push(Notice::new(0, "same-side", text));
            }
            (Err(column), _) | (_, Err(column)) => {
                return Err(SmilesError::new(column, Fault::SameSide));
            }
        }
    }
    for (bond, speaks) in parsed.bonds.iter().zip(speaks) {
        if is_slash(bond.symbol) && !speaks {
            let [a, b] = bond.ends.map(|atom| atom + 1);
            notices.push(Notice::new(
                0,
                "idle-mark",
                format!(
                    "the slash between atoms {a} and {b} (column {}) says nothing: no double bond has marks at both ends there",
                    bond.column
                ),
            ));
        }
    }
    Ok(())
}

/// What the slashes at one end of a double bond say.
struct Side {
    /// Whether the first ligand of the end lies above it.
    above: bool,
    /// The bonds that say so.
    bonds: SmallVec<[usize; 2]>,
}

/// What is said at an end; `Err` with the column of the second slash if two contradict each other.
fn end_side(
    parsed: &Parsed,
    molecule: &Molecule,
    end: AtomIx,
    ligands: &[Ligand],
) -> Result<Option<Side>, usize> {
    let mut side: Option<Side> = None;
    for (i, ligand) in ligands.iter().enumerate() {
        let bond = ligand.atom().and_then(|a| molecule.bond_between(end, a));
        let Some(bond) = bond.map(petgraph::graph::EdgeIndex::index) else {
            continue;
        };
        let written = &parsed.bonds[bond];
        let is_up = match written.symbol {
            Some(Symbol::Up) => true,
            Some(Symbol::Down) => false,
            _ => continue,
        };
        // up: the second end lies above the first; and the second ligand opposite to the first
        let is_above = is_up == (written.ends[0] == end.index());
        let above = is_above == (i == 0);
        match &mut side {
            None => {
                let bonds = SmallVec::from_slice(&[bond]);
                side = Some(Side { above, bonds });
            }
            Some(known) if known.above == above => known.bonds.push(bond),
            Some(known) => {
                let columns = known.bonds.iter().map(|b| parsed.bonds[*b].column);
                let column = columns.chain([written.column]).max().unwrap_or(1);
                return Err(column);
            }
        }
    }
    Ok(side)
}
