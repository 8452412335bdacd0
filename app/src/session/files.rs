//! The open document as a file: a molfile, or one record of an SD file.

use crate::files::{self, Source, Target};
use chem::drawing::Drawing;
use chem::format::sdf::RawRecord;
use chem::format::{Record, WriteOptions, molfile, sdf, text};
use std::io::ErrorKind;
use std::path::{Path, PathBuf};

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

/// Why a file could not be read or written, with what to do.
#[derive(Debug, thiserror::Error)]
pub enum FileError {
    /// The file system said no.
    #[error("{} cannot be {verb}: {}", path.display(), plainly(cause))]
    System {
        /// The file.
        path: PathBuf,
        /// `read` or `written`.
        verb: &'static str,
        /// What the system said.
        cause: std::io::Error,
    },
    /// The text is not one that can be read, or the drawing one that can be written.
    #[error("{}: {text}", path.display())]
    Content {
        /// The file.
        path: PathBuf,
        /// Where and why.
        text: String,
    },
}

impl FileError {
    fn of(path: &Path, error: files::FileError) -> FileError {
        let path = path.to_owned();
        let (verb, cause) = match error {
            files::FileError::Content { error, .. } => {
                let text = error.to_string();
                return FileError::Content { path, text };
            }
            files::FileError::NotFound { .. } => ("read", ErrorKind::NotFound.into()),
            files::FileError::Directory { .. } => ("used", ErrorKind::IsADirectory.into()),
            files::FileError::Read { error, .. } => ("read", error),
            files::FileError::Write { error, .. } => ("written", error),
        };
        FileError::System { path, verb, cause }
    }

    fn content(path: &Path, text: impl ToString) -> FileError {
        FileError::Content {
            path: path.to_owned(),
            text: text.to_string(),
        }
    }
}

/// What the system said, with what to do where that is plain.
fn plainly(cause: &std::io::Error) -> String {
    match cause.kind() {
        ErrorKind::NotFound => "there is no such file or folder; check the path".to_owned(),
        ErrorKind::PermissionDenied => {
            "the system does not permit it; choose another place or change the rights".to_owned()
        }
        ErrorKind::NotADirectory => "a part of the path is no folder; check the path".to_owned(),
        ErrorKind::IsADirectory => "it is a folder, not a file".to_owned(),
        ErrorKind::StorageFull => "the disk is full; make room or choose another".to_owned(),
        _ => {
            let text = cause.to_string();
            // the name of the passing file beside it helps nobody
            text.split(" at path").next().unwrap_or(&text).to_owned()
        }
    }
}

/// Reads the first record of a molfile or SD file and counts the others.
///
/// # Errors
/// If the file cannot be read or its first record holds no drawing.
pub fn read(path: &Path) -> Result<Document, FileError> {
    let mut source = Source::open(path).map_err(|e| FileError::of(path, e))?;
    let chunk = source.next_chunk().map_err(|e| FileError::of(path, e))?;
    let Some(chunk) = chunk else {
        return Err(FileError::content(path, "the file holds no record"));
    };
    if chunk.too_long {
        return Err(FileError::content(
            path,
            "the first record is too long to be read",
        ));
    }
    let decoded = text::decode(chunk.bytes, chunk.line);
    let (text, encoding) = decoded.map_err(|e| FileError::content(path, e))?;
    let raw = RawRecord::new(&text, chunk.number, chunk.line);
    let mut record = raw.read().map_err(|e| FileError::content(path, e))?;
    record.notices.extend(encoding);
    let mut n_records = 1;
    while source
        .next_chunk()
        .map_err(|e| FileError::of(path, e))?
        .is_some()
    {
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
    let options = WriteOptions { date: Some(now()) };
    let text = if is_sd(path) {
        sdf::write(record, &options)
    } else {
        molfile::write(record, &options)
    };
    let text = text.map_err(|e| FileError::content(path, e))?;
    write_bytes(path, text.as_bytes())
}

/// Whether a name says that it is an SD file.
pub fn is_sd(path: &Path) -> bool {
    let ending = path.extension().map(|e| e.to_ascii_lowercase());
    ending.is_some_and(|e| e == "sdf" || e == "sd")
}

/// Date and time in UTC as the second line of a molfile has them, `MMDDYYHHmm`.
fn now() -> String {
    jiff::Timestamp::now().strftime("%m%d%y%H%M").to_string()
}

/// Writes a file so that at every moment either the old or the new content stands there whole.
///
/// # Errors
/// If it cannot be written.
pub fn write_bytes(path: &Path, bytes: &[u8]) -> Result<(), FileError> {
    let written = Target::create(path).and_then(|mut target| {
        target.write(bytes)?;
        target.save()
    });
    written.map_err(|e| FileError::of(path, e))
}
