//! Molfiles, version 3000: words and blocks.
//!
//! The blocks are parted first and understood after, so that their order does not matter. Whatever
//! names no atom or bond of the drawing in a way that is understood is kept as it stands.

mod atoms;
mod blocks;
mod bonds;
mod collections;
mod extra;
mod lines;
mod writer;

use super::super::lines::Lines;
use super::super::{Notice, ReadError, Reason, Version};
use super::Body;
use super::columns::{integer, words};
use super::finish::Tables;
use lines::{Entry, Word};

pub(super) use writer::write;

/// Whether a V3000 table comes next, whatever the counts line says.
pub(super) fn begins(lines: &Lines<'_>) -> bool {
    lines::has_prefix(lines)
}

/// Reads from the line after the counts line to the end.
pub(super) fn read(
    counts_line: &str,
    number: usize,
    lines: Lines<'_>,
    notices: &mut Vec<Notice>,
) -> Result<Body, ReadError> {
    first_counts(counts_line, number, notices);
    let table = blocks::part(lines, number, notices)?;
    let counts = table.counts(notices)?;
    let mut tables = Tables::default();
    let atoms = atoms::read(&table.atoms, &mut tables, notices)?;
    let bonds_in_order = bonds::read(&table.bonds, &atoms, &mut tables, notices)?;
    let same_numbers = atoms.in_order && bonds_in_order;
    if !atoms.in_order {
        notices.push(Notice::new(
            table.atoms.first().map_or(number, |entry| entry.line),
            "indices",
            "the indices of the atoms are not 1, 2, 3 ...; the atoms are numbered from 1 in the order of the file"
                .to_owned(),
        ));
    }
    let collected = collections::read(&table.others, &atoms, notices);
    let kept = extra::read(&table, &counts, &atoms, same_numbers, &mut tables, notices);
    Ok(Body {
        drawing: tables.finish(notices)?,
        extra: kept,
        chiral_flag: counts.chiral,
        stereo_groups: collected,
        version: Version::V3000,
    })
}

/// The counts line of the header must hold zeros, so that a reader of V2000 sees an empty structure.
fn first_counts(line: &str, number: usize, notices: &mut Vec<Notice>) {
    if !line.contains("V3000") {
        let text =
            "the counts line does not say V3000, but the table that follows is in this version";
        notices.push(Notice::new(number, "version", text.to_owned()));
    }
    let counted = |word: &str| integer(word.as_bytes()).is_some_and(|n| n != 0);
    if words(line).take(2).any(|(_, word)| counted(word)) {
        let text = "the first counts line of a V3000 molfile should hold zeros; the numbers there were passed over";
        notices.push(Notice::new(number, "first-counts", text.to_owned()));
    }
}

/// A whole number in a word, quotes around it or not.
fn whole(entry: &Entry<'_>, word: &Word<'_>, field: &'static str) -> Result<i32, ReadError> {
    let text = word.unquoted();
    let value = integer(text.as_bytes()).filter(|_| !text.trim().is_empty());
    value.ok_or_else(|| {
        let text = text.trim().to_owned();
        entry.error_at(word, Reason::Number { field, text })
    })
}

/// That a field is missing at the end of an entry.
fn missing(entry: &Entry<'_>, field: &'static str) -> ReadError {
    let text = String::new();
    entry.error(entry.len(), entry.len(), Reason::Number { field, text })
}

/// That the value of a word is out of range.
fn out_of_range(
    entry: &Entry<'_>,
    word: &Word<'_>,
    field: &'static str,
    value: i32,
    allowed: &'static str,
) -> ReadError {
    let value = i64::from(value);
    let reason = Reason::OutOfRange {
        field,
        value,
        allowed,
    };
    entry.error_at(word, reason)
}

/// Refuses a word that is neither a field nor a keyword: leaving it out could lose a charge or a mark.
fn keyword<'e>(entry: &Entry<'_>, word: &Word<'e>) -> Result<(String, Word<'e>), ReadError> {
    word.keyword().ok_or_else(|| {
        let reason = Reason::Misplaced {
            found: word.text.to_owned(),
            expected: "a keyword with its value (CHG=1)",
        };
        entry.error_at(word, reason)
    })
}

/// Keywords that mean nothing to a drawing, with the first line of each and how often it occurs.
#[derive(Debug, Default)]
struct LeftOut(std::collections::BTreeMap<String, (usize, usize)>);

impl LeftOut {
    fn add(&mut self, key: String, line: usize) {
        self.0.entry(key).or_insert((line, 0)).1 += 1;
    }

    fn tell(self, what: &str, notices: &mut Vec<Notice>) {
        for (key, (line, count)) in self.0 {
            notices.push(Notice::new(
                line,
                "keyword-left-out",
                format!("{key} of {count} {what} was left out"),
            ));
        }
    }
}
