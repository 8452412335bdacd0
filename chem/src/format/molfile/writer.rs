//! Molfiles written: the header, and the version that has room for the record.

use super::super::{Record, Version, WriteError, WriteOptions};
use super::{v2000, v3000};
use std::fmt::Write;

/// Name of the program in the second header line: eight columns.
const PROGRAM: &str = "Wedgewrt";

/// The molfile of a record, to `M  END`, with line feeds, in the version that it came in or needs
/// ([`Record::needed_version`]).
///
/// # Errors
/// If what is stated of an atom does not fit the format, or extra lines are in the language of the
/// other version.
pub fn write(record: &Record, options: &WriteOptions) -> Result<String, WriteError> {
    let m = record.drawing.molecule();
    let version = record.needed_version();
    if version != record.version && !record.extra.is_empty() {
        return Err(WriteError::ExtraLines);
    }
    let mut out = String::with_capacity(200 + 70 * m.n_atoms() + 22 * m.n_bonds());
    header(&mut out, record, options);
    match version {
        Version::V2000 => v2000::write(record, &mut out)?,
        Version::V3000 => v3000::write(record, &mut out)?,
    }
    Ok(out)
}

/// Writing to a string cannot fail.
pub(super) fn put(out: &mut String, text: std::fmt::Arguments<'_>) {
    let _ = out.write_fmt(text);
}

/// A text without line ends, so that it stays one line.
pub(super) fn one_line(text: &str) -> String {
    text.replace(['\n', '\r'], " ")
}

fn header(out: &mut String, record: &Record, options: &WriteOptions) {
    let guarded = |text: &str| {
        let text = one_line(text);
        // a record must not end in its own header
        if text.starts_with("$$$$") {
            format!(" {text}")
        } else {
            text
        }
    };
    let date = options.date.as_deref().unwrap_or_default();
    let date: String = date.chars().filter(char::is_ascii_digit).take(10).collect();
    let dimension = if record.drawing.depths().is_some() {
        "3D"
    } else {
        "2D"
    };
    out.push_str(&guarded(&record.title));
    put(out, format_args!("\n  {PROGRAM:8}{date:10}{dimension}\n"));
    out.push_str(&guarded(&record.comment));
    out.push('\n');
}
