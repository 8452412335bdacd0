//! Reading and writing files: the only place that touches them for the window.

use chem::drawing::Drawing;
use chem::format::{Record, WriteOptions, molfile, sdf, text};
use std::fs;
use std::io::{ErrorKind, Read, Write};
use std::path::{Path, PathBuf};

/// Largest file that is read, in bytes; a drawing needs a few thousand.
const LARGEST: u64 = 64 << 20;

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
    /// The file is too large to be a drawing.
    #[error("{} is larger than 64 MB and was not read; cut it into smaller files", path.display())]
    Large {
        /// The file.
        path: PathBuf,
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

/// Reads the first record of a molfile or SD file.
///
/// # Errors
/// If the file cannot be read or holds no drawing.
pub fn read(path: &Path) -> Result<Document, FileError> {
    let system = |cause| FileError::System {
        path: path.to_owned(),
        verb: "read",
        cause,
    };
    let content = |text: String| FileError::Content {
        path: path.to_owned(),
        text,
    };
    let file = fs::File::open(path).map_err(system)?;
    let mut bytes = Vec::new();
    file.take(LARGEST + 1)
        .read_to_end(&mut bytes)
        .map_err(system)?;
    if bytes.len() as u64 > LARGEST {
        return Err(FileError::Large {
            path: path.to_owned(),
        });
    }
    text::recognize(&bytes).map_err(|e| content(e.to_string()))?;
    let (text, encoding) = text::decode(&bytes, 1).map_err(|e| content(e.to_string()))?;
    let mut records = sdf::records(&text);
    let first = records
        .next()
        .ok_or_else(|| content("the file holds no record".to_owned()))?;
    let mut record = first.read().map_err(|e| content(e.to_string()))?;
    record.notices.extend(encoding);
    let n_records = 1 + records.count();
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
    let content = |text: String| FileError::Content {
        path: path.to_owned(),
        text,
    };
    let options = WriteOptions { date: Some(now()) };
    let text = if is_sd(path) {
        sdf::write(record, &options)
    } else {
        molfile::write(record, &options)
    };
    write_bytes(path, text.map_err(|e| content(e.to_string()))?.as_bytes())
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
    put(path, bytes).map_err(|cause| FileError::System {
        path: path.to_owned(),
        verb: "written",
        cause,
    })
}

fn put(path: &Path, bytes: &[u8]) -> std::io::Result<()> {
    // a link is followed, so that the file it leads to is the one replaced
    let path = fs::canonicalize(path).unwrap_or_else(|_| path.to_owned());
    let folder = match path.parent() {
        Some(folder) if !folder.as_os_str().is_empty() => folder,
        _ => Path::new("."),
    };
    let mut builder = tempfile::Builder::new();
    builder.prefix(".wedgewright-");
    #[cfg(unix)]
    {
        use std::os::unix::fs::PermissionsExt;
        builder.permissions(fs::Permissions::from_mode(0o666));
    }
    let mut file = builder.tempfile_in(folder)?;
    file.write_all(bytes)?;
    file.as_file().sync_all()?;
    if let Ok(before) = fs::metadata(&path) {
        file.as_file().set_permissions(before.permissions())?;
    }
    file.persist(&path).map_err(|e| e.error)?;
    Ok(())
}
