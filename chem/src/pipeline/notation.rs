//! What a line of notation carries: as of a drawing, save that there are no marks to look at.

use super::report::spell;
use super::{Place, Report, Sense, Verdict};
use crate::cip::{Limits, Missing, Ranker, UnitLabel};
use crate::element::Element;
use crate::format::smiles::Smiles;
use crate::molecule::Molecule;
use crate::perceive::Rings;
use crate::stereo::{Configuration, Focus, Kind, Ligand, Unit, Units};

/// The labels of a molecule whose units have these configurations: `3R 7E 8E`. Units that are open are not
/// ranked. `rings` and `units` are those of the molecule.
pub fn labels_of(
    molecule: &Molecule,
    rings: &Rings,
    units: &Units,
    configurations: &[Configuration],
) -> String {
    let defined = |c: &Configuration| matches!(c, Configuration::Defined(_));
    if !configurations.iter().any(defined) {
        return String::new();
    }
    let ranker = Ranker::new(molecule, rings, units, Limits::default());
    let labels = ranker.label_defined(configurations);
    let list = units
        .iter()
        .zip(labels)
        .filter_map(|((_, unit), label)| Some((unit, label?.descriptor.ok()?)))
        .flat_map(|(unit, d)| unit.atoms().into_iter().map(move |a| (a, d)))
        .collect();
    spell(list)
}

/// What a line carries, place by place; nothing is asked of it.
pub fn report_of(line: &Smiles) -> Report {
    let (molecule, units) = (&line.molecule, &line.units);
    let ranker = Ranker::new(molecule, &line.rings, units, Limits::default());
    let labels = ranker.label_all(&line.configurations);
    let mut places: Vec<Place> = units
        .iter()
        .filter_map(|(ix, unit)| {
            let (label, configuration) = (
                labels.get(ix.index())?,
                line.configurations.get(ix.index())?,
            );
            is_shown(molecule, unit, label, *configuration)
                .then(|| place(unit, label, *configuration))
        })
        .collect();
    places.sort_by_key(|p| p.atoms.clone());
    Report {
        places,
        idle: Vec::new(),
    }
}

/// Whether a unit is a row of the table: it carries a descriptor or could by its constitution.
fn is_shown(
    molecule: &Molecule,
    unit: &Unit,
    label: &UnitLabel,
    configuration: Configuration,
) -> bool {
    match label.descriptor {
        Ok(_) => true,
        Err(Missing::Undefined) => {
            // a nitrogen that its cage holds is not open, merely unmarked; an axis may turn freely
            let held_by_cage = match unit.focus {
                Focus::Center(atom) => {
                    molecule.element(atom) == Element::N && unit.ligands.contains(&Ligand::LonePair)
                }
                Focus::Pair(_) => false,
            };
            let needs_mark = matches!(unit.kind, Kind::HinderedAxis | Kind::Helix);
            label.ranking.is_some() && !held_by_cage && !needs_mark
        }
        Err(Missing::Stopped(_)) => matches!(configuration, Configuration::Defined(_)),
        Err(Missing::Alike) => false,
    }
}

fn place(unit: &Unit, label: &UnitLabel, configuration: Configuration) -> Place {
    let (sense, verdict) = match configuration {
        Configuration::Defined(_) => (Sense::Defined, Verdict::NotAsked),
        Configuration::Open => (Sense::Open, Verdict::Open),
        Configuration::Either => (Sense::Either, Verdict::Open),
    };
    let note = match label.descriptor {
        Ok(_) => String::new(),
        Err(Missing::Undefined) => "no configuration is written".to_owned(),
        Err(missing) => missing.to_string(),
    };
    let ranking = label.ranking.as_ref();
    Place {
        kind: unit.kind,
        atoms: unit.atoms().to_vec(),
        must: None,
        carries: label.descriptor.ok(),
        sense,
        verdict,
        rule: ranking.map(|r| r.rule),
        ranking: ranking.map(|r| r.order.to_vec()).unwrap_or_default(),
        note,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::format::smiles;

    // 3AA of the corpus: L-threonine is (2S,3R)
    #[test]
    fn places_of_a_line() {
        let line = smiles::read("C[C@@H](O)[C@H](N)C(=O)O").unwrap();
        let labels = labels_of(
            &line.molecule,
            &line.rings,
            &line.units,
            &line.configurations,
        );
        assert_eq!(labels, "2R 4S");
        let report = report_of(&line);
        assert_eq!(report.labels_line(), "2R 4S");
        assert!(report.faults().is_empty());
        let open = report_of(&smiles::read("CC(O)C(N)C(=O)O").unwrap());
        assert_eq!(open.places.len(), 2);
        assert!(open.places.iter().all(|p| p.verdict == Verdict::Open));
    }
}
