//! A requirement line understood for one drawing: locants become places that can carry the descriptor.
//!
//! Locants are atom numbers from 1 in the order of the file. A double bond may be named by either of its
//! ends or by both (`1(10)E`).

use super::line::{self, Item, Line, LineError, Place as At, Status, Value};
use crate::cip::{Limits, Ranker};
use crate::drawing::Drawing;
use crate::molecule::AtomIx;
use crate::perceive::Rings;
use crate::stereo::{Descriptor, Kind, Unit, UnitIx, Units};

/// What a drawing must carry.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Requirement {
    /// The line as it was typed.
    pub text: String,
    /// Lowest atom of a unit and the descriptor asked for, one entry for each unit.
    pub wanted: Vec<(AtomIx, Descriptor)>,
}

/// Why a line asks nothing that can be understood here.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct RequirementError {
    /// Stable code (`E-UNKNOWN`, `S-NO-LOCANT` ...).
    pub code: &'static str,
    /// Column from 1 in the typed line; 0 for the whole line.
    pub column: usize,
    /// What is wrong and what to do.
    pub text: String,
}

impl std::fmt::Display for RequirementError {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        if self.column > 0 {
            write!(f, "{}, column {}: {}", self.code, self.column, self.text)
        } else {
            write!(f, "{}: {}", self.code, self.text)
        }
    }
}

impl std::error::Error for RequirementError {}

impl From<LineError> for RequirementError {
    fn from(error: LineError) -> RequirementError {
        RequirementError {
            code: error.code,
            column: error.column,
            text: error.text,
        }
    }
}

fn error(code: &'static str, column: usize, text: String) -> RequirementError {
    RequirementError { code, column, text }
}

/// A typed line, understood for a drawing whose atoms are numbered from 1. An empty line asks nothing.
///
/// # Errors
/// What is wrong with the line or which part does not fit the drawing, with its column.
pub fn understand(text: &str, drawing: &Drawing) -> Result<Requirement, RequirementError> {
    let mut requirement = Requirement {
        text: text.to_owned(),
        wanted: Vec::new(),
    };
    if text.trim().is_empty() {
        return Ok(requirement);
    }
    let line = line::read(text)?;
    check_status(&line)?;
    let rings = Rings::find(drawing.molecule());
    let units = Units::find(drawing.molecule(), &rings);
    let sheet = Sheet {
        drawing,
        ranker: Ranker::new(drawing.molecule(), &rings, &units, Limits::default()),
        units: &units,
    };
    let mut found: Vec<(UnitIx, Descriptor)> = Vec::new();
    let without_locants = line.items.iter().all(|i| i.locant.is_none());
    if without_locants && !line.items.is_empty() {
        found = sheet.unlocated(&line.items)?;
    } else {
        for item in &line.items {
            let descriptor = plain(item)?;
            for unit in sheet.units_of(item, descriptor)? {
                match found.iter().find(|(known, _)| *known == unit) {
                    None => found.push((unit, descriptor)),
                    Some((_, same)) if *same == descriptor => {}
                    Some((_, other)) => {
                        let text = format!(
                            "{} is asked to carry both {other} and {descriptor}: leave one",
                            name(units.get(unit))
                        );
                        return Err(error("S-CONFLICT", item.columns.start, text));
                    }
                }
            }
        }
    }
    requirement.wanted = found
        .into_iter()
        .filter_map(|(unit, d)| Some((*units.get(unit).atoms().iter().min()?, d)))
        .collect();
    Ok(requirement)
}

/// A claim about more than one stereoisomer cannot be carried by marks alone.
fn check_status(line: &Line) -> Result<(), RequirementError> {
    let claim = match line.status {
        Status::Abs => return Ok(()),
        Status::Rac => "a racemate",
        Status::Rel => "a relative configuration",
        Status::Meso => "a meso compound",
    };
    let text = match line.status {
        Status::Meso => {
            "whether a drawing is meso is not checked yet: state each centre, as in (2R,3S)"
                .to_owned()
        }
        Status::Abs | Status::Rac | Status::Rel => format!(
            "{claim} needs stereo groups, which are not written yet: state one stereoisomer, and say the rest beside the figure"
        ),
    };
    Err(error("S-GROUP", 0, text))
}

/// The descriptor of an item, if it asks for a single one that a drawing can carry.
fn plain(item: &Item) -> Result<Descriptor, RequirementError> {
    if let Some(d) = item.value.descriptor() {
        return Ok(d);
    }
    let what = item.spelled();
    let text = match item.value {
        Value::Cis | Value::Trans => format!(
            "{what} does not say which ligands it compares: write R and S, or E and Z, for each place"
        ),
        Value::Xi => format!(
            "{what} asks for a place left unknown, which is not drawn yet: leave it out of the line and it stays as it is drawn"
        ),
        _ => format!("{what} is no descriptor of a single stereoisomer: write R or S"),
    };
    Err(error("S-KIND", item.columns.start, text))
}

fn name(unit: &Unit) -> String {
    match unit.atoms().as_slice() {
        [a, b] => format!("the double bond {}={}", a.index() + 1, b.index() + 1),
        atoms => format!("atom {}", atoms.first().map_or(0, |a| a.index() + 1)),
    }
}

struct Sheet<'a> {
    drawing: &'a Drawing,
    units: &'a Units,
    ranker: Ranker<'a>,
}

impl Sheet<'_> {
    /// Units that an item with a locant means; more than one only for "all".
    fn units_of(
        &self,
        item: &Item,
        descriptor: Descriptor,
    ) -> Result<Vec<UnitIx>, RequirementError> {
        let column = item.columns.start;
        let Some(locant) = &item.locant else {
            let text = format!("{} has no locant: give each descriptor one", item.spelled());
            return Err(error("E-MIXED-LOC", column, text));
        };
        if locant.is_all() {
            return Ok(self
                .could_carry()
                .filter(|(_, u)| u.kind.can_carry(descriptor))
                .map(|(ix, _)| ix)
                .collect());
        }
        match locant.first {
            At::Numbered(n) if n.letter.is_none() && n.superscript.is_none() && n.primes == 0 => {
                let first = self.atom(n.number, column)?;
                let second = match n.other {
                    Some(other) => Some(self.atom(other.number, column)?),
                    None => None,
                };
                self.at(first, second, descriptor, column)
                    .map(|ix| vec![ix])
            }
            At::Element { symbol, .. } => self.at_element(symbol, item, descriptor),
            At::Numbered(_) | At::Greek { .. } | At::All => {
                let text = format!(
                    "a drawing numbers its atoms 1, 2, 3 ...: put the atom's number in place of the locant of {}",
                    item.spelled()
                );
                Err(error("S-NO-LOCANT", column, text))
            }
        }
    }

    fn atom(&self, number: u32, column: usize) -> Result<AtomIx, RequirementError> {
        let n_atoms = self.drawing.molecule().n_atoms();
        let index = number as usize;
        if index == 0 || index > n_atoms {
            let text = match n_atoms {
                0 => format!("there is no atom {number}: the drawing is empty"),
                1 => format!("there is no atom {number}: the drawing has one atom only"),
                _ => format!(
                    "there is no atom {number}: the drawing has atoms 1 to {n_atoms}. Use the numbers of the drawing"
                ),
            };
            return Err(error("S-NO-LOCANT", column, text));
        }
        Ok(AtomIx::new(index - 1))
    }

    /// The unit at an atom (and at a second one, if given) that can carry such a letter.
    fn at(
        &self,
        atom: AtomIx,
        other: Option<AtomIx>,
        descriptor: Descriptor,
        column: usize,
    ) -> Result<UnitIx, RequirementError> {
        let holds = |u: &Unit| {
            let atoms = u.atoms();
            atoms.contains(&atom) && other.is_none_or(|o| atoms.contains(&o))
        };
        let here: Vec<(UnitIx, &Unit)> = self.units.iter().filter(|(_, u)| holds(u)).collect();
        if let Some((ix, _)) = here.iter().find(|(_, u)| u.kind.can_carry(descriptor)) {
            return Ok(*ix);
        }
        let n = atom.index() + 1;
        Err(match here.first() {
            Some((_, unit)) => {
                let carried = match unit.kind {
                    Kind::Tetrahedral => "R or S",
                    Kind::DoubleBond => "E or Z",
                    Kind::CumulatedAxis | Kind::HinderedAxis | Kind::Helix => "M or P",
                };
                error(
                    "S-KIND",
                    column,
                    format!("{} carries {carried}, not {descriptor}", name(unit)),
                )
            }
            None => error(
                "S-NOT-STEREO",
                column,
                format!(
                    "atom {n} is not stereogenic: it cannot carry {descriptor}. Check the number"
                ),
            ),
        })
    }

    /// The only stereogenic unit at an element (`NR`, `R_P`).
    fn at_element(
        &self,
        symbol: &str,
        item: &Item,
        descriptor: Descriptor,
    ) -> Result<Vec<UnitIx>, RequirementError> {
        let molecule = self.drawing.molecule();
        let fitting: Vec<UnitIx> = self
            .could_carry()
            .filter(|(_, u)| u.kind.can_carry(descriptor))
            .filter(|(_, u)| {
                u.atoms()
                    .iter()
                    .any(|a| molecule.element(*a).symbol() == symbol)
            })
            .map(|(ix, _)| ix)
            .collect();
        match fitting.as_slice() {
            [_] => Ok(fitting),
            [] => Err(error(
                "S-NOT-STEREO",
                item.columns.start,
                format!("no {symbol} of the drawing can carry {descriptor}"),
            )),
            _ => Err(error(
                "S-COUNT",
                item.columns.start,
                format!(
                    "{} places at {symbol} could carry {descriptor}: give the atom's number",
                    fitting.len()
                ),
            )),
        }
    }

    /// Units that could carry a descriptor by their constitution.
    fn could_carry(&self) -> impl Iterator<Item = (UnitIx, &Unit)> {
        self.units
            .iter()
            .filter(|(ix, _)| matches!(self.ranker.by_constitution(*ix), Ok(Some(_))))
    }

    /// Descriptors without locants: clear if there is one place for one, or as many places as equal
    /// descriptors.
    fn unlocated(&self, items: &[Item]) -> Result<Vec<(UnitIx, Descriptor)>, RequirementError> {
        let asked = items
            .iter()
            .map(|item| Ok((item, plain(item)?)))
            .collect::<Result<Vec<_>, RequirementError>>()?;
        let mut found = Vec::new();
        for kinds in [
            [Kind::Tetrahedral].as_slice(),
            &[Kind::DoubleBond],
            &[Kind::CumulatedAxis, Kind::HinderedAxis, Kind::Helix],
        ] {
            let of_kind: Vec<_> = asked
                .iter()
                .filter(|(_, d)| kinds.iter().any(|k| k.can_carry(*d)))
                .collect();
            let Some((first, descriptor)) = of_kind.first() else {
                continue;
            };
            let places: Vec<UnitIx> = self
                .could_carry()
                .filter(|(_, u)| kinds.contains(&u.kind))
                .map(|(ix, _)| ix)
                .collect();
            let column = first.columns.start;
            if places.len() != of_kind.len() {
                let text = format!(
                    "{} asked without locants, but the drawing has {} such places: give each its locant",
                    count(of_kind.len(), "descriptor is", "descriptors are"),
                    places.len()
                );
                return Err(error("S-COUNT", column, text));
            }
            if of_kind.iter().any(|(_, d)| d != descriptor) {
                let text = "different descriptors need their locants".to_owned();
                return Err(error("S-COUNT", column, text));
            }
            found.extend(places.into_iter().map(|ix| (ix, *descriptor)));
        }
        Ok(found)
    }
}

fn count(n: usize, one: &str, many: &str) -> String {
    format!("{n} {}", if n == 1 { one } else { many })
}
