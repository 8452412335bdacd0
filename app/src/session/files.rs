//! The open document as a file: a molfile, or one record of an SD file.

use crate::files::{self, FileError, Source};
use chem::drawing::Drawing;
use chem::format::{ReadError, Reason, Record, molfile, sdf};
use std::path::Path;

/// What a file holds, as far as a drawing of one molecule goes.
#[derive(Clone, Debug)]
pub struct Document {
    /// The drawing with its title, comment and data fields.
    pub record: Record,
    /// What there is to know of the file it came from, in a sentence; empty if nothing.
    pub notice: String,
    /// Whether the file holds records beside this one, which writing to it would lose.
    pub has_more: bool,
}

impl Document {
    /// An empty sheet.
    pub fn empty() -> Document {
        Document::of(Record::new("", Drawing::empty()))
    }

    /// One record.
    pub fn of(record: Record) -> Document {
        Document {
            notice: notice(&record, 1),
            record,
            has_more: false,
        }
    }
}

fn notice(record: &Record, n_records: usize) -> String {
    let mut parts = Vec::new();
    if n_records > 1 {
        parts.push(format!(
            "This is the first of {n_records} records; saving writes it to a file of its own"
        ));
    }
    parts.extend(record.notices.iter().map(ToString::to_string));
    parts.join(". ")
}

/// Reads the first record of a molfile or SD file and counts the others.
///
/// # Errors
/// If the file cannot be read or its first record holds no drawing.
pub fn read(path: &Path) -> Result<Document, FileError> {
    let mut source = Source::open(path)?;
    let record = match source.next_piece()? {
        Some(piece) => piece.read(),
        None => Err(ReadError::line(1, Reason::Empty)),
    };
    let record = record.map_err(|error| FileError::Content {
        name: source.name.clone(),
        error,
    })?;
    let mut n_records = 1;
    while source.next_chunk()?.is_some() {
        n_records += 1;
    }
    Ok(Document {
        notice: notice(&record, n_records),
        record,
        has_more: n_records > 1,
    })
}

/// Writes a document: as SD file where the name ends so, else as molfile.
///
/// # Errors
/// If the drawing does not fit the format or the file cannot be written; what stood there is untouched.
pub fn write(path: &Path, record: &Record) -> Result<(), FileError> {
    let form = if files::is_sd(path) {
        sdf::write
    } else {
        molfile::write
    };
    let text = form(record, &files::dated()).map_err(|error| FileError::Format {
        name: path.display().to_string(),
        error,
    })?;
    files::write(path, text.as_bytes())
}
