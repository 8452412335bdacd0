//! What drawings must carry, as it was given on the command line.

use super::{Failure, column_words, say};
use chem::format::Record;
use chem::pipeline;
use chem::solve::line;
use chem::solve::require::Requirement;

/// Where a record's requirement comes from.
#[derive(Clone, Copy, Debug)]
pub(super) enum Wish<'a> {
    /// Nothing is asked.
    Nothing,
    /// One line for all.
    Line(&'a str),
    /// A data field of each record.
    Field(&'a str),
}

impl<'a> Wish<'a> {
    /// From the arguments. A line for all records that cannot be read at all is refused, and what was
    /// noticed in it is told.
    pub(super) fn new(carry: Option<&'a str>, field: Option<&'a str>) -> Result<Wish<'a>, Failure> {
        match (carry, field) {
            (Some(line), _) => {
                check(line)?;
                Ok(Wish::Line(line))
            }
            (None, Some(field)) => Ok(Wish::Field(field)),
            (None, None) => Ok(Wish::Nothing),
        }
    }

    /// What is asked of a record, and whether it has the data field.
    pub(super) fn of(self, record: &Record) -> (Result<Requirement, String>, bool) {
        let (line, asked) = match self {
            Wish::Nothing => (String::new(), true),
            Wish::Line(line) => (line.to_owned(), true),
            Wish::Field(name) => match record.field(name) {
                Some(value) => (value.trim().to_owned(), true),
                None => (String::new(), false),
            },
        };
        if line.is_empty() {
            return (Ok(Requirement::default()), asked);
        }
        let understood = pipeline::understand(&line, &record.drawing)
            .map_err(|e| format!("'{line}': {}{}", column_words(e.column), e.text));
        (understood, asked)
    }
}

fn check(line: &str) -> Result<(), Failure> {
    let read = line::read(line).map_err(|error| Failure::Carry {
        line: line.to_owned(),
        column: error.column,
        text: error.text,
    })?;
    for note in read.notes.iter().filter(|note| note.is_warning()) {
        say(&format!("--carry '{line}': {}", note.text()));
    }
    Ok(())
}
