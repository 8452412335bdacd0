//! From a requirement to a drawing that carries it, read back.

use super::{Solution, Verdict, perceived, report};
use crate::cip::{Limits, Ranker, Stop};
use crate::drawing::{Drawing, Edit};
use crate::molecule::AtomIx;
use crate::perceive::Rings;
use crate::solve::Refusal;
use crate::solve::require::Requirement;
use crate::solve::search::{Goal, SearchError, search};
use crate::solve::turn::{Geometry, turn};
use crate::stereo::{Configuration, Focus, Kind, Unit, UnitIx, Units};
use crate::wedge::{self, Target};

/// The drawing that carries the requirement, with the least change; places of which nothing is asked
/// stay as they are.
///
/// A solution exists only if its own drawing, read and labelled afresh, carries everything asked and
/// says of all other places what it said before.
///
/// # Errors
/// Why no drawing could be made; the given drawing is unchanged.
pub fn carry(drawing: &Drawing, requirement: &Requirement) -> Result<Solution, Refusal> {
    let (rings, units) = perceived(drawing);
    let ranker = Ranker::new(drawing.molecule(), &rings, &units, Limits::default());
    let reading = wedge::read(drawing, &units);
    let goals = goals(&units, requirement)?;
    let configurations = search(&ranker, reading.configurations(), &goals)
        .map_err(|error| refusal_of_search(&units, &goals, &error))?;
    let wanted = Wanted {
        units: &units,
        rings: &rings,
        configurations: &configurations,
    };
    let (turned, mut edits) = wanted.turn_all(drawing)?;
    let (with_axes, marks) = wanted.mark_axes(&turned)?;
    edits.extend(marks);
    let (marked, marks) = wanted.mark_all(&with_axes)?;
    edits.extend(marks);
    read_back(&units, &configurations, marked, edits, requirement)
}

/// Finds the unit that each wanted descriptor belongs to.
fn goals(units: &Units, requirement: &Requirement) -> Result<Vec<Goal>, Refusal> {
    let mut goals: Vec<Goal> = Vec::new();
    for (atom, descriptor) in &requirement.wanted {
        let unit = units
            .iter()
            .find(|(_, u)| u.atoms().contains(atom) && u.kind.can_carry(*descriptor))
            .ok_or_else(|| Refusal {
                code: "not-stereogenic",
                atoms: vec![*atom],
                text: format!(
                    "atom {} is no place that can carry {descriptor}",
                    atom.index() + 1
                ),
            })?;
        let goal = Goal {
            unit: unit.0,
            descriptor: *descriptor,
        };
        if let Some(other) = goals.iter().find(|g| g.unit == goal.unit) {
            if other.descriptor != goal.descriptor {
                return Err(Refusal {
                    code: "conflict",
                    atoms: unit.1.atoms().to_vec(),
                    text: format!(
                        "{} is asked to carry both {} and {descriptor}",
                        name(unit.1),
                        other.descriptor
                    ),
                });
            }
            continue;
        }
        goals.push(goal);
    }
    Ok(goals)
}

/// A unit as a sentence names it.
fn name(unit: &Unit) -> String {
    match unit.focus {
        Focus::Center(a) => format!("atom {}", a.index() + 1),
        Focus::Pair([a, b]) => {
            let (a, b) = (a.index() + 1, b.index() + 1);
            match unit.kind {
                Kind::CumulatedAxis | Kind::HinderedAxis => format!("the axis {a}-{b}"),
                Kind::Helix => format!("the helix {a}-{b}"),
                Kind::DoubleBond | Kind::Tetrahedral => format!("the double bond {a}={b}"),
            }
        }
    }
}

fn refusal_of_search(units: &Units, goals: &[Goal], error: &SearchError) -> Refusal {
    let asked = |ix: UnitIx| {
        goals
            .iter()
            .find(|g| g.unit == ix)
            .map(|g| g.descriptor.to_string())
            .unwrap_or_default()
    };
    let atoms = |list: &[UnitIx]| -> Vec<AtomIx> {
        list.iter().flat_map(|ix| units.get(*ix).atoms()).collect()
    };
    let names = |list: &[UnitIx]| {
        let words: Vec<String> = list.iter().map(|ix| name(units.get(*ix))).collect();
        words.join(", ")
    };
    let (code, concerned, text) = match error {
        SearchError::Alike(ix) => (
            "not-stereogenic",
            atoms(&[*ix]),
            format!(
                "{} cannot carry {}: two of its ligands are alike by every rule",
                name(units.get(*ix)),
                asked(*ix)
            ),
        ),
        SearchError::OtherLetter(ix, d) => (
            "other-letter",
            atoms(&[*ix]),
            format!(
                "{} cannot carry {}: it can carry {} or {}",
                name(units.get(*ix)),
                asked(*ix),
                d,
                d.opposite()
            ),
        ),
        SearchError::Conflict(list) => (
            "conflict",
            atoms(list),
            format!(
                "no stereoisomer carries these letters together: {}. Each can carry its own, but their ranks depend on one another",
                names(list)
            ),
        ),
        SearchError::Stopped(ix, stop) => (
            "not-decided",
            atoms(&[*ix]),
            stopped(&name(units.get(*ix)), *stop),
        ),
        SearchError::TooMany(list) => (
            "not-decided",
            atoms(list),
            format!(
                "not decided: {} places depend on one another, more than are tried together: {}",
                list.len(),
                names(list)
            ),
        ),
    };
    Refusal {
        code,
        atoms: concerned,
        text,
    }
}

/// The configurations to be drawn.
struct Wanted<'a> {
    units: &'a Units,
    rings: &'a Rings,
    configurations: &'a [Configuration],
}

impl Wanted<'_> {
    /// Turns each double bond that stands otherwise.
    fn turn_all(&self, drawing: &Drawing) -> Result<(Drawing, Vec<Edit>), Refusal> {
        let mut now = drawing.clone();
        let mut all = Vec::new();
        for (ix, unit) in self.units.iter() {
            let (Focus::Pair(ends), Kind::DoubleBond) = (unit.focus, unit.kind) else {
                continue;
            };
            let wanted = self.configurations[ix.index()];
            let Configuration::Defined(parity) = wanted else {
                continue;
            };
            if wedge::read(&now, self.units).configuration(ix) == wanted {
                continue;
            }
            let (Some(a), Some(b)) = (unit.ligands[0].atom(), unit.ligands[2].atom()) else {
                continue;
            };
            let geometry = Geometry {
                ends,
                toward: unit.toward_each_other(),
                first: [a, b],
                parity,
            };
            let edits = turn(&now, self.rings, self.units, geometry).map_err(|error| Refusal {
                code: "cannot-turn",
                atoms: ends.to_vec(),
                text: format!("{} cannot be turned: {error}", name(unit)),
            })?;
            now = applied(&now, &edits)?;
            all.extend(edits);
        }
        Ok((now, all))
    }

    /// Marks each axis and helix that reads otherwise.
    fn mark_axes(&self, drawing: &Drawing) -> Result<(Drawing, Vec<Edit>), Refusal> {
        let mut now = drawing.clone();
        let mut all = Vec::new();
        for (ix, unit) in self.units.iter() {
            let wanted = self.configurations[ix.index()];
            let Configuration::Defined(parity) = wanted else {
                continue;
            };
            let is_axis = matches!(
                unit.kind,
                Kind::CumulatedAxis | Kind::HinderedAxis | Kind::Helix
            );
            if !is_axis || wedge::read(&now, self.units).configuration(ix) == wanted {
                continue;
            }
            let edits = wedge::place_axis(&now, self.units, self.rings, unit, parity).ok_or_else(
                || Refusal {
                    code: "no-place",
                    atoms: unit.atoms().to_vec(),
                    text: format!(
                        "no bond at the ends of {} can bear a wedge, or its other end lies in line",
                        name(unit)
                    ),
                },
            )?;
            now = applied(&now, &edits)?;
            all.extend(edits);
        }
        Ok((now, all))
    }

    /// Marks each centre that reads otherwise.
    fn mark_all(&self, drawing: &Drawing) -> Result<(Drawing, Vec<Edit>), Refusal> {
        let reading = wedge::read(drawing, self.units);
        let targets: Vec<Target> = self
            .units
            .iter()
            .filter(|(_, unit)| matches!(unit.focus, Focus::Center(_)))
            .filter_map(|(ix, _)| match self.configurations[ix.index()] {
                wanted @ Configuration::Defined(parity) if reading.configuration(ix) != wanted => {
                    Some(Target { unit: ix, parity })
                }
                _ => None,
            })
            .collect();
        if targets.is_empty() {
            return Ok((drawing.clone(), Vec::new()));
        }
        let edits =
            wedge::place(drawing, self.units, self.rings, &targets).map_err(|error| Refusal {
                code: "no-place",
                atoms: vec![error.atom],
                text: error.to_string(),
            })?;
        Ok((applied(drawing, &edits)?, edits))
    }
}

fn applied(drawing: &Drawing, edits: &[Edit]) -> Result<Drawing, Refusal> {
    drawing
        .apply(edits)
        .map(|(after, _)| after)
        .map_err(|error| Refusal {
            code: "internal",
            atoms: Vec::new(),
            text: format!("the change could not be made: {error}"),
        })
}

/// Believes the drawing only after reading it afresh: everything asked agrees, every other place says
/// what it said before.
fn read_back(
    units: &Units,
    configurations: &[Configuration],
    after: Drawing,
    edits: Vec<Edit>,
    requirement: &Requirement,
) -> Result<Solution, Refusal> {
    let (_, units_after) = perceived(&after);
    let reading = wedge::read(&after, &units_after);
    for (ix, unit) in units.iter() {
        let same = units_after
            .iter()
            .find(|(_, u)| u.focus == unit.focus)
            .is_some_and(|(i, _)| reading.configuration(i) == configurations[ix.index()]);
        if !same {
            return Err(Refusal {
                code: "read-back",
                atoms: unit.atoms().to_vec(),
                text: format!(
                    "the marks at {} could not be drawn so that they read back as meant; the drawing is left as it was",
                    name(unit)
                ),
            });
        }
    }
    let report = report(&after, requirement);
    for place in &report.places {
        if place.must.is_some() && place.verdict != Verdict::Agrees {
            return Err(Refusal {
                code: "read-back",
                atoms: place.atoms.clone(),
                text: format!(
                    "the new drawing does not carry what is asked at atom {}; the drawing is left as it was",
                    place.atoms.first().map_or(0, |a| a.index() + 1)
                ),
            });
        }
    }
    Ok(Solution {
        drawing: after,
        edits,
        report,
    })
}

/// That the ranking of a place stopped, and what can be done.
fn stopped(name: &str, stop: Stop) -> String {
    match stop {
        Stop::Nodes(n) => {
            format!("{name} is not decided: its ranking needs more than {n} nodes")
        }
        Stop::Placeholder => format!(
            "{name} is not decided: it depends on a placeholder or on a bond whose order is not stated; draw the group itself"
        ),
        Stop::Combinations => format!(
            "{name} is not decided: too many combinations of open places would have to be tried"
        ),
    }
}
