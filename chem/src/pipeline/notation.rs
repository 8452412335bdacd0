//! What a line of notation carries: as of a drawing, save that there are no marks to look at.

use super::report::{PROVISIONAL, about, explained, spell};
use super::{Carried, Place, Report, Sense, Verdict};
use crate::cip::{Limits, Missing, Ranker, Tie, UnitLabel};
use crate::format::smiles::Smiles;
use crate::molecule::Molecule;
use crate::perceive::Rings;
use crate::stereo::{Configuration, Unit, Units};

/// The labels of a molecule whose units have these configurations, and which of them are provisional.
/// Units that are open are not ranked. `rings` and `units` are those of the molecule.
pub fn labels_of(
    molecule: &Molecule,
    rings: &Rings,
    units: &Units,
    configurations: &[Configuration],
) -> Carried {
    let defined = |c: &Configuration| matches!(c, Configuration::Defined(_));
    if !configurations.iter().any(defined) {
        return Carried::default();
    }
    let ranker = Ranker::new(molecule, rings, units, Limits::default());
    let labels = ranker.label_defined(configurations);
    let outlook = may_be_provisional(configurations, &labels)
        .then(|| ranker.outlook(configurations, &labels, |_| false));
    let notes = outlook
        .map(|outlook| {
            let concerned = units
                .iter()
                .filter(|(ix, _)| outlook.is_provisional[ix.index()]);
            concerned
                .map(|(_, unit)| about(&unit.atoms(), PROVISIONAL))
                .collect()
        })
        .unwrap_or_default();
    let list = units
        .iter()
        .zip(labels)
        .filter_map(|((_, unit), label)| Some((unit, label?.descriptor.ok()?)))
        .flat_map(|(unit, d)| unit.atoms().into_iter().map(move |a| (a, d)))
        .collect();
    Carried {
        labels: spell(list),
        faults: Vec::new(),
        notes,
    }
}

/// Whether a letter rests on other units while some unit is open.
fn may_be_provisional(configurations: &[Configuration], labels: &[Option<UnitLabel>]) -> bool {
    let is_open = |c: &Configuration| !matches!(c, Configuration::Defined(_));
    labels.iter().flatten().any(UnitLabel::rests_on_others) && configurations.iter().any(is_open)
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

/// Why the ligands of each place stand in their order; see [`super::why`].
pub fn explain_of(line: &Smiles, places: &[Place]) -> Vec<Vec<Option<Tie>>> {
    explained(
        &line.molecule,
        &line.rings,
        &line.units,
        &line.configurations,
        places,
    )
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
        Err(Missing::Undefined) => !unit.is_held_nitrogen(molecule) && !unit.kind.needs_mark(),
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
        Ok(_) if label.is_provisional => PROVISIONAL.to_owned(),
        Ok(_) => String::new(),
        Err(Missing::Undefined) if label.ranking.is_none() => {
            "no configuration is written; whether it can carry a descriptor depends on other places"
                .to_owned()
        }
        Err(Missing::Undefined) => "no configuration is written".to_owned(),
        Err(missing) => missing.to_string(),
    };
    let ranking = label.ranking.as_ref();
    Place {
        kind: unit.kind,
        atoms: unit.atoms().to_vec(),
        must: None,
        carries: label.descriptor.ok(),
        is_provisional: label.is_provisional,
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
        assert_eq!(labels.labels, "2R 4S");
        let report = report_of(&line);
        assert_eq!(report.labels_line(), "2R 4S");
        assert!(report.faults().is_empty());
        let open = report_of(&smiles::read("CC(O)C(N)C(=O)O").unwrap());
        assert_eq!(open.places.len(), 2);
        assert!(open.places.iter().all(|p| p.verdict == Verdict::Open));
    }

    fn labels(line: &str) -> String {
        let line = smiles::read(line).unwrap_or_else(|e| panic!("{line}: {e}"));
        labels_of(
            &line.molecule,
            &line.rings,
            &line.units,
            &line.configurations,
        )
        .labels
    }

    // OpenSMILES, "Tetrahedral centers": each column one configuration in several orders of writing
    #[test]
    fn one_centre_in_many_orders() {
        for (lines, label) in [
            (
                &[
                    "N[C@@](F)(C)C(=O)O",
                    "N[C@](C)(F)C(=O)O",
                    "OC(=O)[C@@](N)(C)F",
                    "[C@@](N)(F)(C)C(=O)O",
                ][..],
                None,
            ),
            (
                &[
                    "O[C@H](CC)C#N",
                    "N#C[C@@H](CC)O",
                    "[C@@H](O)(CC)C#N",
                    "CC[C@](O)([H])C#N",
                ][..],
                None,
            ),
            (
                &[
                    "N1[C@H](C)CC1",
                    "[C@H]1(C)NCC1",
                    "C[C@@H]1CCN1",
                    "C[C@H]1NCC1",
                ][..],
                None,
            ),
            (
                &["C[S@](=O)CC", "O=[S@@](C)CC", "[S@@](C)(=O)CC"][..],
                Some("S"),
            ),
        ] {
            let found: Vec<String> = lines
                .iter()
                .map(|line| {
                    labels(line)
                        .trim_start_matches(|c: char| c.is_ascii_digit())
                        .to_owned()
                })
                .collect();
            assert!(
                found.iter().all(|f| *f == found[0] && f.len() == 1),
                "{lines:?}: {found:?}"
            );
            if let Some(label) = label {
                assert_eq!(found[0], label, "{lines:?}");
            }
        }
    }

    // OpenSMILES, "Cis/trans configuration around double bonds"
    #[test]
    fn one_double_bond_in_many_orders() {
        for (lines, letter) in [
            (
                &[
                    "F/C=C/F",
                    "F\\C=C\\F",
                    "C(\\F)=C/F",
                    "Cl/C(F)=C/Cl",
                    "C(/F)=C\\F",
                ][..],
                'E',
            ),
            (
                &[
                    "F\\C=C/F",
                    "F/C=C\\F",
                    "C(/F)=C/F",
                    "C/1=C/CCCCCC1",
                    "C1=C\\CCCCCC/1",
                ][..],
                'Z',
            ),
            (
                &["C1=C/CCCCCC/1", "C\\1=C/CCCCCC1", "C\\1=C/CCCCCC/1"][..],
                'E',
            ),
            (&["C/C=N/O", "C\\C=N\\O", "C/N=N/C"][..], 'E'),
            (&["F/C=C=C=C/F"][..], 'E'),
        ] {
            for line in lines {
                let found = labels(line);
                assert!(
                    found.split(' ').count() == 2
                        && found.chars().filter(|c| *c == letter).count() == 2,
                    "{line}: {found}"
                );
            }
        }
    }

    // the chirality classes of OpenSMILES
    #[test]
    fn classes_say_the_same_as_plain_signs() {
        for (a, b) in [
            ("N[C@TH1H](C)F", "N[C@H](C)F"),
            ("N[C@TH2H](C)F", "N[C@@H](C)F"),
            ("CC=[C@AL1]=CC", "CC=[C@]=CC"),
            ("CC=[C@AL2]=CC", "CC=[C@@]=CC"),
        ] {
            let (x, y) = (labels(a), labels(b));
            assert!(x == y && !x.is_empty(), "{a} {x}, {b} {y}");
        }
    }
}
