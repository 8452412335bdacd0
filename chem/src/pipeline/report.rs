//! What a drawing carries, place by place.

use super::{Idle, Place, Report, Sense, Verdict, labels_of, perceived};
use crate::cip::{Limits, Missing, Ranker, Tie, UnitLabel};
use crate::drawing::{Drawing, Mark};
use crate::element::Element;
use crate::molecule::{AtomIx, Molecule};
use crate::perceive::Rings;
use crate::solve::require::Requirement;
use crate::stereo::{Configuration, Descriptor, Focus, Kind, Ligand, Unit, UnitIx, Units};
use crate::wedge::{self, Reading};

/// What is said of a letter that rests on open places.
pub(super) const PROVISIONAL: &str = "provisional: the letter rests on places that are open, and may be another or none once they are drawn";

/// What a drawing carries, and how that stands to a requirement (an empty one asks nothing).
pub fn report(drawing: &Drawing, requirement: &Requirement) -> Report {
    let (rings, units) = perceived(drawing);
    let ranker = Ranker::new(drawing.molecule(), &rings, &units, Limits::default());
    let reading = wedge::read(drawing, &units);
    let labels = ranker.label_all(reading.configurations());
    reported(drawing, requirement, &rings, &units, &reading, &labels)
}

fn reported(
    drawing: &Drawing,
    requirement: &Requirement,
    rings: &Rings,
    units: &Units,
    reading: &Reading,
    labels: &[UnitLabel],
) -> Report {
    let mut places: Vec<Place> = units
        .iter()
        .filter_map(|(ix, unit)| {
            let must = wanted(requirement, unit);
            let label = &labels[ix.index()];
            is_shown(drawing, unit, ix, reading, label, must)
                .then(|| place(drawing, unit, ix, reading, label, must))
        })
        .collect();
    places.sort_by_key(|p| p.atoms.clone());
    Report {
        places,
        idle: idle(drawing, rings, units, labels),
    }
}

/// Why the ligands of a place stand in their order: one entry for each two neighbors in it (of a pair,
/// one for each end); empty where nothing is ranked. See [`Ranker::why`].
pub fn why(drawing: &Drawing, place: &Place) -> Vec<Option<Tie>> {
    let mut whys = explain(drawing, std::slice::from_ref(place));
    whys.pop().unwrap_or_default()
}

/// [`why`] for several places of one drawing.
pub fn explain(drawing: &Drawing, places: &[Place]) -> Vec<Vec<Option<Tie>>> {
    let (rings, units) = perceived(drawing);
    let reading = wedge::read(drawing, &units);
    let configurations = reading.configurations();
    explained(drawing.molecule(), &rings, &units, configurations, places)
}

/// Why the ligands of some places stand in their order.
pub(super) fn explained(
    molecule: &Molecule,
    rings: &Rings,
    units: &Units,
    configurations: &[Configuration],
    places: &[Place],
) -> Vec<Vec<Option<Tie>>> {
    let ranker = Ranker::new(molecule, rings, units, Limits::default());
    let dependent = |p: &Place| p.rule.is_some_and(|rule| !rule.is_constitutional());
    // the letters of other units matter to Rules 3 and later alone
    let labels = places
        .iter()
        .any(dependent)
        .then(|| ranker.label_defined(configurations));
    places
        .iter()
        .map(|place| {
            let unit = units.iter().find(|(_, u)| {
                u.kind == place.kind && u.atoms().as_slice() == place.atoms.as_slice()
            });
            let Some((ix, _)) = unit else {
                return Vec::new();
            };
            let known = labels.as_ref().and_then(|l| l[ix.index()].as_ref());
            let ranking = match known.and_then(|label| label.ranking.as_ref()) {
                Some(ranking) => Some(ranking),
                None => ranker.by_constitution(ix).unwrap_or_default(),
            };
            ranking
                .and_then(|r| ranker.why(molecule, configurations, ix, r).ok())
                .unwrap_or_default()
        })
        .collect()
}

/// Wedges from whose narrow end no reader learns anything: no unit there, or one whose ligands are alike.
/// A wedge in a ring may hold others in their geometry though its own atom carries nothing, and stays
/// unmentioned.
fn idle(drawing: &Drawing, rings: &Rings, units: &Units, labels: &[UnitLabel]) -> Vec<Idle> {
    let molecule = drawing.molecule();
    let mut list = Vec::new();
    for bond in molecule.bonds() {
        let mark = drawing.mark(bond);
        let (Mark::Solid(end) | Mark::Hashed(end)) = mark else {
            continue;
        };
        let ends = molecule.bond(bond).ends;
        let (narrow, wide) = (ends[end.index()], ends[end.other().index()]);
        let (n, w) = (narrow.index() + 1, wide.index() + 1);
        let mut here = units.iter().filter(|(_, u)| speaks_at(u, narrow, wide));
        let found = here.next();
        let text = match found {
            None if units.center_at(wide).is_some() => format!(
                "the wedge between atoms {n} and {w} is narrow at atom {n}, which is no centre: at atom {w} its wide end says nothing"
            ),
            None if is_beyond(molecule.element(narrow)) => format!(
                "the wedge from atom {n} to atom {w} is not read: the geometry of atom {n} ({}) is outside this program",
                molecule.element(narrow).symbol()
            ),
            None => format!(
                "the wedge from atom {n} to atom {w} says nothing: atom {n} is not stereogenic"
            ),
            Some((ix, _))
                if labels[ix.index()].descriptor == Err(Missing::Alike)
                    && !rings.has_atom(molecule, narrow) =>
            {
                format!(
                    "the wedge from atom {n} to atom {w} says nothing: two ligands of atom {n} are alike"
                )
            }
            Some(_) if !molecule.bond(bond).order.bears_wedge() => format!(
                "the wedge from atom {n} to atom {w} is on a bond that is not single and says nothing"
            ),
            Some(_) => continue,
        };
        list.push(Idle {
            bond,
            atom: narrow,
            text,
        });
    }
    list
}

/// Whether an element's geometry is not known here: metals and placeholders may be stereogenic or not.
fn is_beyond(element: Element) -> bool {
    element.valences(0).is_empty()
}

/// Whether a unit can be read from a mark that is narrow at one atom and wide at another.
fn speaks_at(unit: &Unit, narrow: AtomIx, wide: AtomIx) -> bool {
    match unit.kind {
        Kind::Tetrahedral => unit.atoms().contains(&narrow),
        Kind::DoubleBond => false,
        Kind::CumulatedAxis | Kind::HinderedAxis => {
            let speaking = unit.atoms().into_iter().zip(unit.mute);
            speaking.filter(|(_, mute)| !mute).any(|(a, _)| a == narrow)
                && unit.ligands.contains(&Ligand::Atom(wide))
        }
        Kind::Helix => unit.toward_each_other().contains(&narrow) && unit.atoms().contains(&wide),
    }
}

/// What a drawing carries, in one line, and what a reader of that line alone would not see.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Carried {
    /// Labels by atom number from 1, as [`Report::labels_line`] gives them: `3R 7E 8E`.
    pub labels: String,
    /// Contradictions and wedges that say nothing, as [`Report::faults`] gives them.
    pub faults: Vec<String>,
    /// Letters that are provisional, as [`Report::notes`] gives them.
    pub notes: Vec<String>,
}

/// The labels of a drawing alone, and its faults: quicker than a [`report`], since units that the drawing
/// leaves open are not ranked unless a mark is odd.
pub fn carried(drawing: &Drawing) -> Carried {
    let (rings, units) = perceived(drawing);
    let reading = wedge::read(drawing, &units);
    if is_odd(drawing, &units, &reading) {
        let ranker = Ranker::new(drawing.molecule(), &rings, &units, Limits::default());
        // open places that no mark speaks of are not told here
        let asked = |ix: UnitIx| reading.doubt(ix).is_some() || has_mark(drawing, units.get(ix));
        let labels = ranker.label_asked(reading.configurations(), asked);
        let nothing = Requirement::default();
        let report = reported(drawing, &nothing, &rings, &units, &reading, &labels);
        return Carried {
            labels: report.labels_line(),
            faults: report.faults(),
            notes: report.notes(),
        };
    }
    labels_of(drawing.molecule(), &rings, &units, reading.configurations())
}

/// A sentence about a unit: `atom 3: ...`.
pub(super) fn about(atoms: &[AtomIx], text: &str) -> String {
    let numbers: Vec<String> = atoms.iter().map(|a| (a.index() + 1).to_string()).collect();
    format!("atom {}: {text}", numbers.join(" and "))
}

/// Whether some mark may have to be spoken of: a unit that cannot be read, or a wedge that does not start
/// at a centre that can.
fn is_odd(drawing: &Drawing, units: &Units, reading: &Reading) -> bool {
    let molecule = drawing.molecule();
    let mut plain = vec![true; molecule.n_atoms()];
    for (ix, unit) in units.iter() {
        if let (Focus::Center(a), Configuration::Defined(_)) =
            (unit.focus, reading.configuration(ix))
        {
            plain[a.index()] = false;
        }
    }
    units.iter().any(|(ix, _)| reading.doubt(ix).is_some())
        || molecule.bonds().any(|b| match drawing.mark(b) {
            Mark::Solid(end) | Mark::Hashed(end) => {
                plain[molecule.bond(b).ends[end.index()].index()]
            }
            Mark::Plain | Mark::Wavy(_) | Mark::Crossed => false,
        })
}

/// Labels in the order of their atoms.
pub(super) fn spell(mut labels: Vec<(AtomIx, Descriptor)>) -> String {
    labels.sort_unstable();
    let words: Vec<String> = labels
        .iter()
        .map(|(a, d)| format!("{}{d}", a.index() + 1))
        .collect();
    words.join(" ")
}

/// What is asked of a unit: by the number of its centre or of either end.
fn wanted(requirement: &Requirement, unit: &Unit) -> Option<Descriptor> {
    let atoms = unit.atoms();
    requirement
        .wanted
        .iter()
        .find(|(a, d)| atoms.contains(a) && unit.kind.can_carry(*d))
        .map(|(_, d)| *d)
}

/// Whether a unit is a row of the table: it carries or must carry something, could by its constitution,
/// or has marks that say nothing.
fn is_shown(
    drawing: &Drawing,
    unit: &Unit,
    ix: UnitIx,
    reading: &Reading,
    label: &UnitLabel,
    must: Option<Descriptor>,
) -> bool {
    if must.is_some() || label.descriptor.is_ok() {
        return true;
    }
    match label.descriptor {
        // a nitrogen that its cage holds is not open, merely unmarked
        Err(Missing::Undefined) => {
            let silent =
                reading.doubt(ix).is_none() && reading.configuration(ix) == Configuration::Open;
            let unmarked = unit.is_held_nitrogen(drawing.molecule()) || unit.kind.needs_mark();
            !(unmarked && silent)
        }
        Err(Missing::Stopped(_)) => has_mark(drawing, unit),
        _ => false,
    }
}

fn has_mark(drawing: &Drawing, unit: &Unit) -> bool {
    unit.atoms().iter().any(|a| {
        drawing
            .molecule()
            .neighbors(*a)
            .iter()
            .any(|n| drawing.mark_from(*a, n.bond) != Mark::Plain)
    })
}

/// Whether a wedge is wide at the centre.
fn has_wide_end(drawing: &Drawing, unit: &Unit) -> bool {
    let Focus::Center(center) = unit.focus else {
        return false;
    };
    drawing.molecule().neighbors(center).iter().any(|n| {
        let wedge = matches!(drawing.mark(n.bond), Mark::Solid(_) | Mark::Hashed(_));
        wedge && drawing.mark_from(center, n.bond) == Mark::Plain
    })
}

fn place(
    drawing: &Drawing,
    unit: &Unit,
    ix: UnitIx,
    reading: &Reading,
    label: &UnitLabel,
    must: Option<Descriptor>,
) -> Place {
    let sense = match (reading.doubt(ix), reading.configuration(ix)) {
        (Some(_), _) => Sense::Contradiction,
        (None, Configuration::Defined(_)) => Sense::Defined,
        (None, Configuration::Open) => Sense::Open,
        (None, Configuration::Either) => Sense::Either,
    };
    let carries = label.descriptor.ok();
    let verdict = match (must, carries, sense) {
        (_, _, Sense::Contradiction) => Verdict::Contradiction,
        (_, _, Sense::Open | Sense::Either) => Verdict::Open,
        (None, _, _) => Verdict::NotAsked,
        (Some(wanted), Some(d), _) if wanted == d => Verdict::Agrees,
        (Some(_), _, _) => Verdict::Opposite,
    };
    let note = match (reading.doubt(ix), label.descriptor) {
        (Some(doubt), _) => doubt.text().to_owned(),
        (None, Err(Missing::Undefined)) if sense == Sense::Either => {
            "drawn as unknown or mixed".to_owned()
        }
        (None, Err(Missing::Undefined)) if has_wide_end(drawing, unit) => {
            "a wedge has its wide end here, which says nothing".to_owned()
        }
        (None, Err(Missing::Undefined)) if label.ranking.is_none() => {
            "no configuration is drawn; whether it can carry a descriptor depends on other places"
                .to_owned()
        }
        (None, Err(missing)) => missing.to_string(),
        (None, Ok(_)) if label.is_provisional => PROVISIONAL.to_owned(),
        (None, Ok(_)) => String::new(),
    };
    Place {
        kind: unit.kind,
        atoms: unit.atoms().to_vec(),
        must,
        carries,
        is_provisional: label.is_provisional,
        sense,
        verdict,
        rule: label.ranking.as_ref().map(|r| r.rule),
        ranking: label
            .ranking
            .as_ref()
            .map(|r| r.order.to_vec())
            .unwrap_or_default(),
        note,
    }
}
