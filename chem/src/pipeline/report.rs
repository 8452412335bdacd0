//! What a drawing carries, place by place.

use super::{Place, Report, Sense, Verdict};
use crate::cip::{Limits, Missing, Ranker, UnitLabel};
use crate::drawing::{Drawing, Mark};
use crate::molecule::AtomIx;
use crate::perceive::Rings;
use crate::solve::require::Requirement;
use crate::stereo::{Configuration, Descriptor, Focus, Kind, Ligand, Unit, UnitIx, Units};
use crate::wedge::{self, Reading};

/// What a drawing carries, and how that stands to a requirement (an empty one asks nothing).
pub fn report(drawing: &Drawing, requirement: &Requirement) -> Report {
    let rings = Rings::find(drawing.molecule());
    let units = Units::find(drawing.molecule(), &rings);
    let ranker = Ranker::new(drawing.molecule(), &rings, &units, Limits::default());
    let reading = wedge::read(drawing, &units);
    let labels = ranker.label_all(reading.configurations());
    let mut places: Vec<Place> = units
        .iter()
        .filter_map(|(ix, unit)| {
            let must = wanted(requirement, unit);
            let label = &labels[ix.index()];
            is_shown(drawing, unit, ix, &reading, label, must)
                .then(|| place(unit, ix, &reading, label, must))
        })
        .collect();
    places.sort_by_key(|p| p.atoms.clone());
    Report { places }
}

/// The labels of a drawing alone: `3R 7E 8E`. Units that the drawing leaves open are not ranked.
pub fn labels_line(drawing: &Drawing) -> String {
    let rings = Rings::find(drawing.molecule());
    let units = Units::find(drawing.molecule(), &rings);
    let reading = wedge::read(drawing, &units);
    let defined = |c: &Configuration| matches!(c, Configuration::Defined(_));
    if !reading.configurations().iter().any(defined) {
        return String::new();
    }
    let ranker = Ranker::new(drawing.molecule(), &rings, &units, Limits::default());
    let labels = ranker.label_defined(reading.configurations());
    let list = units
        .iter()
        .zip(labels)
        .filter_map(|((_, unit), label)| Some((unit, label?.descriptor.ok()?)))
        .flat_map(|(unit, d)| unit.atoms().into_iter().map(move |a| (a, d)))
        .collect();
    spell(list)
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
        .find(|(a, _)| atoms.contains(a))
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
            let held_by_cage = unit.ligands.contains(&Ligand::LonePair)
                && drawing.molecule().element(unit.atoms()[0]) == crate::element::Element::N
                && matches!(unit.focus, Focus::Center(_));
            let silent =
                reading.doubt(ix).is_none() && reading.configuration(ix) == Configuration::Open;
            // only a mark says that rotation about a bond is hindered or that rings form a helix
            let needs_mark = matches!(unit.kind, Kind::HinderedAxis | Kind::Helix);
            label.ranking.is_some() && !((held_by_cage || needs_mark) && silent)
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

fn place(
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
        (None, Err(missing)) => missing.to_string(),
        (None, Ok(_)) => String::new(),
    };
    Place {
        kind: unit.kind,
        atoms: unit.atoms().to_vec(),
        must,
        carries,
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
