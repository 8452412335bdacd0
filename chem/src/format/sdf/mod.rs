//! SD files: molfiles with data fields, each record ended by a line `$$$$`.

mod fields;
mod stream;

use super::lines::Lines;
use super::{ReadError, Record, WriteError, WriteOptions, molfile};

pub use fields::{field_text, fields, without};
pub use stream::{Chunk, Reader};

/// A record as a piece of the text, not understood yet.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct RawRecord<'a> {
    /// Number of the record, from 1.
    pub number: usize,
    /// Line of the file at which it starts, from 1.
    pub line: usize,
    /// All of it, without the line `$$$$`.
    pub text: &'a str,
    /// The molfile in it, to `M  END`.
    pub molfile: &'a str,
    /// The data fields behind it.
    pub data: &'a str,
    /// Line of the file at which they start.
    pub data_line: usize,
}

impl<'a> RawRecord<'a> {
    /// Parts one record; `text` holds no line `$$$$`.
    pub fn new(text: &'a str, number: usize, line: usize) -> RawRecord<'a> {
        let mut lines = Lines::new(text, line);
        let (mut at, mut data_line) = (text.len(), line);
        let mut skip = 3;
        loop {
            let (start, start_line) = (lines.at(), lines.number());
            data_line = data_line.max(start_line);
            let Some(line) = lines.next() else { break };
            if skip > 0 {
                skip -= 1;
                continue;
            }
            if line.starts_with("M  END") || line.trim_end() == "M END" {
                (at, data_line) = (lines.at(), lines.number());
                break;
            }
            if line.starts_with('>') {
                (at, data_line) = (start, start_line);
                break;
            }
            // the text of an alias may be anything
            if line.starts_with("A  ") || line.starts_with("G  ") {
                skip = 1;
            }
        }
        let (molfile, data) = text.split_at_checked(at).unwrap_or((text, ""));
        RawRecord {
            number,
            line,
            text,
            molfile,
            data,
            data_line,
        }
    }

    /// Understands the record.
    ///
    /// # Errors
    /// Those of [`molfile::read`].
    pub fn read(&self) -> Result<Record, ReadError> {
        let mut record = molfile::read(self.molfile, self.line)?;
        record.fields = fields(self.data, self.data_line, &mut record.notices);
        Ok(record)
    }
}

/// The records of a text that is in memory; a molfile alone is one record.
pub fn records(text: &str) -> impl Iterator<Item = RawRecord<'_>> {
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    let mut lines = Lines::new(text, 1);
    let mut number = 0;
    std::iter::from_fn(move || {
        let (start, first_line) = (lines.at(), lines.number());
        let mut end = start;
        let mut ended = false;
        while let Some(line) = lines.next() {
            if line.starts_with("$$$$") {
                ended = true;
                break;
            }
            end = lines.at();
        }
        let piece = text.get(start..end).unwrap_or_default();
        if !ended && piece.trim().is_empty() {
            return None;
        }
        number += 1;
        Some(RawRecord::new(piece, number, first_line))
    })
}

/// The record of an SD file: molfile, data fields as they are, `$$$$`.
///
/// # Errors
/// Those of [`molfile::write`].
pub fn write(record: &Record, options: &WriteOptions) -> Result<String, WriteError> {
    let mut out = molfile::write(record, options)?;
    for field in &record.fields {
        fields::write(field, &mut out);
    }
    out.push_str("$$$$\n");
    Ok(out)
}

#[cfg(test)]
mod tests;
