//! Every worked example carries what its published name or its derivation says, by the rule it says.

use checks::{by_clause, labels_of, no_misses, records, worked};
use chem::pipeline;
use chem::solve::require::Requirement;
use chem::stereo::Descriptor;

#[test]
fn drawings_carry_the_labels_of_their_names() {
    let all = worked();
    let misses: Vec<String> = all
        .iter()
        .filter_map(|w| {
            let read = labels_of(&w.drawing);
            (read != w.labels).then(|| format!("{}: read `{read}`, named `{}`", w.title, w.labels))
        })
        .collect();
    no_misses(&misses, all.len());
}

#[test]
fn every_letter_occurs() {
    let all = worked();
    let missing: Vec<String> = Descriptor::ALL
        .iter()
        .filter(|d| !all.iter().any(|k| k.labels.0.values().any(|x| x == *d)))
        .map(|d| d.to_string())
        .collect();
    no_misses(&missing, all.len());
}

// the field RULES, `2:1a 5:4b`: for the lowest atom of each unit the latest rule of its derivation
#[test]
fn the_rule_that_decides_is_that_of_the_derivation() {
    let all = records("tests/corpus/clauses.sdf");
    let mut misses = Vec::new();
    let mut seen = Vec::new();
    for record in &all {
        let report = pipeline::report(&record.drawing, &Requirement::default());
        for word in record.field("RULES").unwrap_or_default().split_whitespace() {
            let (number, rule) = word.split_once(':').expect("an atom and a rule");
            let place = report.places.iter().find(|p| {
                p.carries.is_some()
                    && p.atoms
                        .iter()
                        .any(|a| (a.index() + 1).to_string() == number)
            });
            let used = place.and_then(|p| p.rule).map(chem::cip::Rule::name);
            if used != Some(rule) {
                misses.push(format!(
                    "{}, atom {number}: {used:?}, not {rule}",
                    record.title
                ));
            }
            seen.push(rule.to_owned());
        }
    }
    no_misses(&misses, all.len());
    seen.sort_unstable();
    seen.dedup();
    assert_eq!(seen, ["1a", "1b", "2", "3", "4a", "4b", "4c", "5", "6"]);
}

#[test]
fn every_derivation_names_its_clause_and_its_reasons() {
    let all = records("tests/corpus/clauses.sdf");
    let misses: Vec<String> = all
        .iter()
        .filter(|record| {
            let clause = record.field("SOURCE").unwrap_or_default();
            let named = clause.contains(", P-92.") || clause.contains(", P-93.");
            !named || record.field("NOTE").unwrap_or_default().len() < 10
        })
        .map(|record| record.title.clone())
        .collect();
    no_misses(&misses, by_clause().len());
}
