//! Helpers that the runners share: the corpus, labels by atom number, and changes of a drawing that
//! keep or mirror its meaning.
#![allow(
    clippy::expect_used,
    clippy::panic,
    reason = "a check that cannot be set up has failed"
)]

pub mod change;
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

/// A worked example: a published name and a drawing of the compound.
#[derive(Clone, Debug)]
pub struct Worked {
    /// Name in messages.
    pub title: String,
    /// What the published name says, by atom number.
    pub labels: Labels,
    /// The drawing.
    pub drawing: Drawing,
}

/// All worked examples.
///
/// # Panics
/// If the corpus cannot be read, lacks a field or has fewer than 60 records: a runner that had
/// nothing to run must fail.
pub fn worked() -> Vec<Worked> {
    let all: Vec<Worked> = records("tests/corpus/worked.sdf")
        .into_iter()
        .map(|record| {
            let line = record.field("LABELS").expect("LABELS");
            assert!(
                record.field("NAME").is_some_and(|name| !name.is_empty())
                    && record.field("SOURCE").is_some_and(|s| !s.is_empty()),
                "{}: NAME or SOURCE is missing",
                record.title
            );
            Worked {
                labels: Labels::parse(line),
                title: record.title,
                drawing: record.drawing,
            }
        })
        .collect();
    assert!(all.len() >= 60, "only {} worked examples", all.len());
    all
}

/// The worked example with this title.
///
/// # Panics
/// If there is none.
pub fn worked_one(title: &str) -> Worked {
    worked()
        .into_iter()
        .find(|w| w.title == title)
        .unwrap_or_else(|| panic!("no worked example is called {title}"))
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
