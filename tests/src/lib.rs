//! Helpers that the runners share: the corpus, labels by atom number, and changes of a drawing that
//! keep or mirror its meaning.
#![allow(
    clippy::expect_used,
    clippy::panic,
    reason = "a check that cannot be set up has failed"
)]

pub mod change;
pub mod hold;
pub mod kekule;
pub mod labels;
pub mod lines;
pub mod source;

use chem::drawing::Drawing;
use chem::format::{Record, sdf};
use chem::pipeline;
use chem::solve::require::Requirement;
use labels::Labels;
use std::fs;
use std::path::PathBuf;

/// The top folder of the project.
pub fn top() -> PathBuf {
    PathBuf::from(concat!(env!("CARGO_MANIFEST_DIR"), "/.."))
}

/// A drawing whose labels are known from elsewhere: a worked example, or one of an open collection.
#[derive(Clone, Debug)]
pub struct Known {
    /// Name in messages.
    pub title: String,
    /// What the published name or the authors of the collection say, by atom number.
    pub labels: Labels,
    /// The drawing.
    pub drawing: Drawing,
}

/// All worked examples: those by name and those by clause.
///
/// # Panics
/// See [`by_name`] and [`by_clause`].
pub fn worked() -> Vec<Known> {
    by_name().into_iter().chain(by_clause()).collect()
}

/// Published names with a drawing of each compound.
///
/// # Panics
/// If the records cannot be read, lack a field or are fewer than 200: a runner that had nothing to run
/// must fail.
pub fn by_name() -> Vec<Known> {
    read_known("tests/corpus/worked.sdf", 200)
}

/// Drawings for single clauses of the recommendations, derived by hand.
///
/// # Panics
/// If the records cannot be read, lack a field or are fewer than 80.
pub fn by_clause() -> Vec<Known> {
    read_known("tests/corpus/clauses.sdf", 80)
}

fn read_known(path: &str, fewest: usize) -> Vec<Known> {
    let all: Vec<Known> = records(path).into_iter().map(known).collect();
    assert!(all.len() >= fewest, "{path} has only {}", all.len());
    all
}

fn known(record: Record) -> Known {
    let line = record.field("LABELS").expect("LABELS");
    let is_full = |name| record.field(name).is_some_and(|text| !text.is_empty());
    assert!(
        is_full("NAME") && is_full("SOURCE"),
        "{}: NAME or SOURCE is missing",
        record.title
    );
    Known {
        labels: Labels::parse(line),
        title: record.title,
        drawing: record.drawing,
    }
}

/// The worked example with this title.
///
/// # Panics
/// If there is none.
pub fn worked_one(title: &str) -> Known {
    worked()
        .into_iter()
        .find(|w| w.title == title)
        .unwrap_or_else(|| panic!("no worked example is called {title}"))
}

/// The drawings of the public CIP Validation Suite (doi 10.1021/acs.jcim.8b00324) with the labels of their
/// authors, where they lie beside the project; `None` where they do not.
///
/// # Panics
/// If the file is there and cannot be read, or has fewer than 150 records.
pub fn suite() -> Option<Vec<Known>> {
    const PATH: &str = "../shared/data/cip-2d.sdf";
    if !top().join(PATH).is_file() {
        return None;
    }
    let all: Vec<Known> = records(PATH)
        .into_iter()
        .map(|record| Known {
            // a record without the field has marks that must yield nothing
            labels: Labels::parse(record.field("CIP_LABELS").unwrap_or_default()),
            title: record.title,
            drawing: record.drawing,
        })
        .collect();
    assert!(all.len() >= 150, "only {} drawings", all.len());
    Some(all)
}

/// All records of an SD file or molfile, by its path below the top folder.
///
/// # Panics
/// If it cannot be read.
pub fn records(path: &str) -> Vec<Record> {
    let text = fs::read_to_string(top().join(path)).unwrap_or_else(|e| panic!("{path}: {e}"));
    sdf::records(&text)
        .map(|raw| {
            let number = raw.number;
            raw.read()
                .unwrap_or_else(|e| panic!("{path}, record {number}: {e:?}"))
        })
        .collect()
}

/// What the program reads from a drawing.
pub fn labels_of(drawing: &Drawing) -> Labels {
    Labels::parse(&pipeline::report(drawing, &Requirement::default()).labels_line())
}

/// Fails with the first lines of a list, unless it is empty.
///
/// # Panics
/// If it is not.
pub fn no_misses(misses: &[String], tried: usize) {
    assert!(tried > 0, "nothing was tried");
    let shown = &misses[..misses.len().min(40)];
    assert!(
        misses.is_empty(),
        "{} of {tried} went wrong:\n  {}",
        misses.len(),
        shown.join("\n  ")
    );
}
