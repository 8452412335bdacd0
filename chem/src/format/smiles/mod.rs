//! Line notation (OpenSMILES): one line of text in, a molecule with its configurations out, and back.
//!
//! A line has no coordinates: what `@`, `/` and `\` say is turned straight into the configuration of each
//! unit, relative to its reference order. Lower-case rings become single and double bonds. Hindered axes
//! and helices cannot be said in this notation and stay open.
//!
//! Reading: `lex` and `bracket` (signs), `parse` (grammar), `atoms` (bonds, hydrogens), `stereo`, `tail`
//! (groups, places); `file` cuts a file into lines. Writing: `write`, with `tree` (order) and `slash` (marks at double bonds).
//!
//! Source: OpenSMILES specification (2016 draft), as far as it could be read.

mod atoms;
mod bracket;
mod cycles;
mod error;
mod file;
mod lex;
mod parse;
mod slash;
mod stereo;
mod tail;
mod tree;
mod write;

pub use error::{Fault, SmilesError};
pub use file::{LineReader, recognize};
pub use write::{Unwritable, Written, write};

use super::{GroupKind, Notice, StereoGroup};
use crate::geom::Point;
use crate::molecule::Molecule;
use crate::perceive::Rings;
use crate::stereo::{Configuration, Focus, Kind, Units};

/// Most characters of a line. OpenSMILES asks for 100,000 at least.
pub const MOST_CHARACTERS: usize = 200_000;

/// What a line says.
#[derive(Clone, Debug)]
pub struct Smiles {
    /// Atoms and bonds in the order of the line; bonds are localised.
    pub molecule: Molecule,
    /// Rings of the molecule.
    pub rings: Rings,
    /// Stereogenic units of the molecule.
    pub units: Units,
    /// Configuration of each unit.
    pub configurations: Vec<Configuration>,
    /// Groups of centres that the tail names; centres in none are as written.
    pub groups: Vec<StereoGroup>,
    /// Where the tail puts the atoms (x right, y up).
    pub points: Option<Vec<Point>>,
    /// Text after the molecule and its tail.
    pub title: String,
    /// What was left out or should be known. They have no line.
    pub notices: Vec<Notice>,
}

/// Reads one line: a molecule, then perhaps a blank with a tail `|...|` and a name.
///
/// Time is bounded: some seconds for the longest line.
///
/// # Errors
/// Where the line is no molecule, says what is not handled, or contradicts itself, with column and remedy.
pub fn read(text: &str) -> Result<Smiles, SmilesError> {
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    let text = text.trim_end_matches(['\n', '\r']);
    if text.len() > MOST_CHARACTERS {
        let reason = Fault::TooLong(MOST_CHARACTERS);
        return Err(SmilesError::new(MOST_CHARACTERS, reason));
    }
    let parts = Parts::of(text);
    let parsed = parse::parse(parts.molecule)?;
    let mut notices = Vec::new();
    if let Some(column) = parsed.late_ring {
        let text = format!("the ring number in column {column} stands after a branch");
        notices.push(Notice::new(0, "late-ring-number", text));
    }
    let molecule = atoms::molecule(&parsed)?;
    let rings = Rings::find(&molecule);
    let units = Units::find(&molecule, &rings);
    let configurations = stereo::configurations(&parsed, &molecule, &units, &mut notices)?;
    let mut smiles = Smiles {
        molecule,
        rings,
        units,
        configurations,
        groups: Vec::new(),
        points: None,
        title: String::new(),
        notices,
    };
    smiles.rest(&parts)?;
    Ok(smiles)
}

/// Text after the molecule and its tail, which is the name; also of a line that cannot be read.
pub fn title(line: &str) -> &str {
    Parts::of(line).title
}

/// The three parts of a line.
struct Parts<'a> {
    molecule: &'a str,
    /// What stands between the bars, and the column of its first character.
    tail: Option<(usize, &'a str)>,
    title: &'a str,
}

impl<'a> Parts<'a> {
    fn of(text: &'a str) -> Parts<'a> {
        let end = text.find(char::is_whitespace).unwrap_or(text.len());
        let (molecule, rest) = text.split_at_checked(end).unwrap_or((text, ""));
        let rest = rest.trim_start();
        match rest.strip_prefix('|').and_then(|r| r.split_once('|')) {
            Some((tail, title)) => {
                let before = text.get(..text.len() - rest.len());
                let column = before.map_or(0, |t| t.chars().count()) + 2;
                Parts {
                    molecule,
                    tail: Some((column, tail)),
                    title: title.trim(),
                }
            }
            None => Parts {
                molecule,
                tail: None,
                title: rest.trim_end(),
            },
        }
    }
}

impl Smiles {
    /// Takes what stands after the molecule.
    fn rest(&mut self, parts: &Parts<'_>) -> Result<(), SmilesError> {
        parts.title.clone_into(&mut self.title);
        let Some((column, tail)) = parts.tail else {
            if parts.title.starts_with('|') {
                self.notices.push(Notice::new(
                    0,
                    "tail",
                    "the tail | has no end and was taken for a name".to_owned(),
                ));
            }
            return Ok(());
        };
        let tail = tail::read(tail, column, self.molecule.n_atoms(), &mut self.notices)?;
        self.groups = tail.groups;
        self.points = tail.points;
        self.idle_groups();
        if tail.racemic {
            self.racemate();
        }
        Ok(())
    }

    /// Says which atoms of groups are no centre of defined configuration.
    fn idle_groups(&mut self) {
        let set = self.set_centers();
        let named = self.groups.iter().flat_map(|g| &g.atoms);
        let idle: Vec<String> = named
            .filter(|a| !set.contains(a))
            .map(|a| a.index().to_string())
            .collect();
        if !idle.is_empty() {
            let text = format!(
                "groups of the tail name atoms that are no centre with @ (numbers from 0): {}",
                idle.join(", ")
            );
            self.notices.push(Notice::new(0, "idle-group", text));
        }
    }

    /// All centres and axes of defined configuration that stand in no group become one racemic group.
    fn racemate(&mut self) {
        let grouped = |a: &_| self.groups.iter().any(|g| g.atoms.contains(a));
        let mut atoms = self.set_centers();
        atoms.retain(|a| !grouped(a));
        let numbers = self.groups.iter().map(|g| match g.kind {
            GroupKind::And(n) => n,
            GroupKind::Absolute | GroupKind::Or(_) => 0,
        });
        let number = numbers.max().unwrap_or(0).saturating_add(1);
        if !atoms.is_empty() {
            let kind = GroupKind::And(number);
            self.groups.push(StereoGroup { kind, atoms });
        }
        self.notices.push(Notice::new(
            0,
            "racemate",
            "the tail says r: all centres together are taken as one racemic group".to_owned(),
        ));
    }

    /// Atoms of centres and axes of defined configuration, ascending.
    fn set_centers(&self) -> Vec<crate::molecule::AtomIx> {
        let units = self.units.iter().zip(&self.configurations);
        let mut atoms: Vec<_> = units
            .filter(|(_, c)| matches!(c, Configuration::Defined(_)))
            .flat_map(|((_, unit), _)| match (unit.kind, unit.focus) {
                (Kind::DoubleBond, _) => None,
                (_, Focus::Center(atom)) => Some(atom),
                (_, Focus::Pair(_)) => stereo::middle(unit),
            })
            .collect();
        atoms.sort_unstable();
        atoms
    }
}

#[cfg(test)]
mod tests;
