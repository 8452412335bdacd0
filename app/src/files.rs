//! All file access: inputs told by their content, outputs that appear whole or not at all.

mod piece;

pub use piece::{Piece, PieceText};

use chem::format::sdf::{Chunk, Reader};
use chem::format::smiles::{self, LineReader};
use chem::format::{ReadError, Reason, WriteError, WriteOptions, text};
use std::fs::{self, File};
use std::io::{self, BufReader, BufWriter, Read, Write};
use std::path::{Path, PathBuf};
use tempfile::NamedTempFile;

/// How much of a file is looked at to tell whether it is a molfile or SD file at all.
const BEGINNING: u64 = 256 * 1024;

/// Why a file cannot be read or written, with what to do. Every text names the file.
#[derive(Debug, thiserror::Error)]
pub enum FileError {
    /// It is not there.
    #[error("{name}: there is no such file; check the path")]
    NotFound {
        /// Its name as given.
        name: String,
    },
    /// It is a directory.
    #[error("{name}: this is a directory; name a file, not a folder")]
    Directory {
        /// Its name as given.
        name: String,
    },
    /// Its content cannot be used.
    #[error("{name}: {error}")]
    Content {
        /// Its name as given.
        name: String,
        /// What is wrong with it.
        error: ReadError,
    },
    /// The drawing does not fit the format.
    #[error("{name}: {error}")]
    Format {
        /// Its name as given.
        name: String,
        /// What does not fit.
        error: WriteError,
    },
    /// The system does not let it be read.
    #[error("{name}: cannot be read: {}", plainly(error))]
    Read {
        /// Its name as given.
        name: String,
        /// What the system says.
        error: io::Error,
    },
    /// The system does not let it be written; what was there is as it was.
    #[error("{name}: cannot be written: {}", plainly(error))]
    Write {
        /// Its name as given.
        name: String,
        /// What the system says.
        error: io::Error,
    },
}

/// What the system said, with what to do where that is plain.
fn plainly(error: &io::Error) -> String {
    let words = match error.kind() {
        io::ErrorKind::NotFound => "there is no such file or folder; check the path",
        io::ErrorKind::PermissionDenied => {
            "the system does not permit it; choose another place or change the rights"
        }
        io::ErrorKind::NotADirectory => "a part of the path is no folder; check the path",
        io::ErrorKind::StorageFull => "the disk is full; make room or choose another",
        _ => {
            let text = error.to_string();
            // the name of the passing file beside it helps nobody
            return text.split(" at path").next().unwrap_or(&text).to_owned();
        }
    };
    words.to_owned()
}

/// How a path is named in messages: `-` by its meaning.
pub fn name_of(path: &Path, standard: &str) -> String {
    if is_standard(path) {
        standard.to_owned()
    } else {
        path.display().to_string()
    }
}

/// Whether a path is `-`, which stands for standard input or output.
pub fn is_standard(path: &Path) -> bool {
    path.as_os_str() == "-"
}

/// Whether a name says that it is an SD file.
pub fn is_sd(path: &Path) -> bool {
    path.extension()
        .is_some_and(|e| e.eq_ignore_ascii_case("sdf") || e.eq_ignore_ascii_case("sd"))
}

/// Molfiles with date and time, in UTC: their header has no room for a time zone.
pub fn dated() -> WriteOptions {
    let date = jiff::Timestamp::now().strftime("%m%d%y%H%M").to_string();
    WriteOptions { date: Some(date) }
}

/// Refuses a path at which no file is.
fn must_be_file(path: &Path) -> Result<(), FileError> {
    let name = path.display().to_string();
    match fs::metadata(path) {
        Ok(meta) if meta.is_dir() => Err(FileError::Directory { name }),
        Ok(_) => Ok(()),
        Err(error) if error.kind() == io::ErrorKind::NotFound => Err(FileError::NotFound { name }),
        Err(error) => Err(FileError::Read { name, error }),
    }
}

/// The records of a file or of standard input.
pub struct Source {
    /// Its name in messages.
    pub name: String,
    cutter: Cutter,
}

/// What cuts a source into records.
enum Cutter {
    /// Molfiles.
    Records(Reader<Box<dyn Read>>),
    /// Lines of notation.
    Lines(LineReader<BufReader<Box<dyn Read>>>),
}

impl std::fmt::Debug for Source {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.debug_struct("Source")
            .field("name", &self.name)
            .finish_non_exhaustive()
    }
}

impl Source {
    /// Opens a molfile or SD file, or standard input for `-`. Its beginning is looked at, so that a
    /// large file of another kind is refused at once.
    ///
    /// # Errors
    /// If it cannot be read or is neither.
    pub fn open(path: &Path) -> Result<Source, FileError> {
        Source::of(path, |_| false)
    }

    /// The same; also a file of lines of notation (`C[C@H](N)C#N` and a name).
    ///
    /// # Errors
    /// If it cannot be read or is none of these.
    pub fn open_also_notation(path: &Path) -> Result<Source, FileError> {
        Source::of(path, smiles::recognize)
    }

    fn of(path: &Path, is_notation: impl Fn(&[u8]) -> bool) -> Result<Source, FileError> {
        let name = name_of(path, "standard input");
        let mut input: Box<dyn Read> = if is_standard(path) {
            Box::new(io::stdin())
        } else {
            must_be_file(path)?;
            let file = File::open(path).map_err(|error| FileError::Read {
                name: name.clone(),
                error,
            })?;
            Box::new(file)
        };
        let mut beginning = Vec::new();
        let read = input.by_ref().take(BEGINNING).read_to_end(&mut beginning);
        if let Err(error) = read {
            return Err(FileError::Read { name, error });
        }
        let is_lines = match text::recognize(&beginning) {
            Ok(()) => false,
            Err(error) if error.reason == Reason::NotMolfile && is_notation(&beginning) => true,
            Err(error) => return Err(FileError::Content { name, error }),
        };
        let whole: Box<dyn Read> = Box::new(io::Cursor::new(beginning).chain(input));
        let cutter = if is_lines {
            Cutter::Lines(LineReader::new(BufReader::new(whole)))
        } else {
            Cutter::Records(Reader::new(whole))
        };
        Ok(Source { name, cutter })
    }

    /// The next record, as bytes.
    ///
    /// # Errors
    /// If the file cannot be read on.
    pub fn next_chunk(&mut self) -> Result<Option<Chunk<'_>>, FileError> {
        let name = &self.name;
        let chunk = match &mut self.cutter {
            Cutter::Records(reader) => reader.next_chunk(),
            Cutter::Lines(reader) => reader.next_chunk(),
        };
        chunk.map_err(|error| FileError::Read {
            name: name.clone(),
            error,
        })
    }

    /// The next record with bytes of its own.
    ///
    /// # Errors
    /// If the file cannot be read on.
    pub fn next_piece(&mut self) -> Result<Option<Piece>, FileError> {
        let is_notation = matches!(self.cutter, Cutter::Lines(_));
        let piece = self.next_chunk()?.map(Piece::from);
        Ok(piece.map(|piece| Piece {
            is_notation,
            ..piece
        }))
    }
}

/// Writes a whole file, or standard output for `-`.
///
/// # Errors
/// If it cannot be written; a file of that name is then as it was.
pub fn write(path: &Path, bytes: &[u8]) -> Result<(), FileError> {
    let mut target = Target::create(path)?;
    target.write(bytes)?;
    target.save()
}

/// A file being written. It appears under its name when [`Target::save`] has succeeded, and only then:
/// until that a file of that name stays as it was. Standard output is written as it comes.
#[derive(Debug)]
pub struct Target {
    name: String,
    sink: Sink,
}

#[derive(Debug)]
enum Sink {
    Standard(BufWriter<io::Stdout>),
    /// A device or pipe, which cannot be replaced.
    Device(BufWriter<File>),
    File {
        temporary: BufWriter<NamedTempFile>,
        path: PathBuf,
    },
}

impl Target {
    /// Begins to write a file, or standard output for `-`.
    ///
    /// # Errors
    /// If the path is a directory or its directory cannot be written in.
    pub fn create(path: &Path) -> Result<Target, FileError> {
        let name = name_of(path, "standard output");
        if is_standard(path) {
            let sink = Sink::Standard(BufWriter::new(io::stdout()));
            return Ok(Target { name, sink });
        }
        match sink(path) {
            Ok(Some(sink)) => Ok(Target { name, sink }),
            Ok(None) => Err(FileError::Directory { name }),
            Err(error) => Err(FileError::Write { name, error }),
        }
    }

    /// Writes on.
    ///
    /// # Errors
    /// If the system does not let it.
    pub fn write(&mut self, bytes: &[u8]) -> Result<(), FileError> {
        let written = match &mut self.sink {
            Sink::Standard(out) => out.write_all(bytes),
            Sink::Device(out) => out.write_all(bytes),
            Sink::File { temporary, .. } => temporary.write_all(bytes),
        };
        written.map_err(|error| self.error(error))
    }

    /// Puts the file in its place.
    ///
    /// # Errors
    /// If the system does not let it; a file of that name is then as it was.
    pub fn save(self) -> Result<(), FileError> {
        let Target { name, sink } = self;
        let saved = match sink {
            Sink::Standard(mut out) => out.flush(),
            Sink::Device(mut out) => out.flush(),
            Sink::File { temporary, path } => replace(temporary, &path),
        };
        saved.map_err(|error| FileError::Write { name, error })
    }

    fn error(&self, error: io::Error) -> FileError {
        let name = self.name.clone();
        FileError::Write { name, error }
    }
}

/// Where to write; `None` for a directory.
fn sink(path: &Path) -> io::Result<Option<Sink>> {
    // a link stays a link: the file that it leads to is replaced
    let path = fs::canonicalize(path).unwrap_or_else(|_| path.to_owned());
    let existing = fs::metadata(&path).ok();
    match &existing {
        Some(meta) if meta.is_dir() => return Ok(None),
        Some(meta) if !meta.is_file() => {
            let device = File::options().write(true).open(&path)?;
            return Ok(Some(Sink::Device(BufWriter::new(device))));
        }
        _ => {}
    }
    if existing
        .as_ref()
        .is_some_and(|m| m.permissions().readonly())
    {
        return Err(io::Error::new(
            io::ErrorKind::PermissionDenied,
            "the file is write-protected",
        ));
    }
    let folder = match path.parent() {
        Some(folder) if !folder.as_os_str().is_empty() => folder,
        _ => Path::new("."),
    };
    let mut builder = tempfile::Builder::new();
    builder.prefix(".wedgewright-").suffix(".part");
    #[cfg(unix)]
    {
        use std::os::unix::fs::PermissionsExt;
        // as any new file; the system takes away what the user's mask says
        builder.permissions(fs::Permissions::from_mode(0o666));
    }
    let temporary = builder.tempfile_in(folder)?;
    if let Some(meta) = existing {
        temporary.as_file().set_permissions(meta.permissions())?;
    }
    Ok(Some(Sink::File {
        temporary: BufWriter::new(temporary),
        path,
    }))
}

fn replace(temporary: BufWriter<NamedTempFile>, path: &Path) -> io::Result<()> {
    let file = temporary
        .into_inner()
        .map_err(io::IntoInnerError::into_error)?;
    file.as_file().sync_all()?;
    file.persist(path).map_err(|e| e.error)?;
    // the new name must last, too; not every system lets a directory be opened
    if let Some(folder) = path.parent().and_then(|f| File::open(f).ok()) {
        let _ = folder.sync_all();
    }
    Ok(())
}

/// Whether two paths lead to one file.
pub fn same_file(a: &Path, b: &Path) -> bool {
    if is_standard(a) || is_standard(b) {
        return false;
    }
    matches!((fs::canonicalize(a), fs::canonicalize(b)), (Ok(a), Ok(b)) if a == b)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_file_appears_whole_or_not_at_all() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("out.sdf");
        fs::write(&path, "before").unwrap();
        let mut dropped = Target::create(&path).unwrap();
        dropped.write(b"half").unwrap();
        drop(dropped);
        assert_eq!(fs::read(&path).unwrap(), b"before");
        let mut saved = Target::create(&path).unwrap();
        saved.write(b"after").unwrap();
        assert_eq!(fs::read(&path).unwrap(), b"before");
        saved.save().unwrap();
        assert_eq!(fs::read(&path).unwrap(), b"after");
        // nothing else is left behind
        assert_eq!(fs::read_dir(folder.path()).unwrap().count(), 1);
    }

    #[cfg(unix)]
    #[test]
    fn links_and_permissions_stay() {
        use std::os::unix::fs::PermissionsExt;
        let folder = tempfile::tempdir().unwrap();
        let (path, link) = (folder.path().join("a"), folder.path().join("b"));
        fs::write(&path, "before").unwrap();
        fs::set_permissions(&path, fs::Permissions::from_mode(0o640)).unwrap();
        std::os::unix::fs::symlink(&path, &link).unwrap();
        let mut target = Target::create(&link).unwrap();
        target.write(b"after").unwrap();
        target.save().unwrap();
        assert!(fs::symlink_metadata(&link).unwrap().is_symlink());
        assert_eq!(fs::read(&path).unwrap(), b"after");
        assert_eq!(
            fs::metadata(&path).unwrap().permissions().mode() & 0o777,
            0o640
        );
        assert!(same_file(&path, &link));
    }

    #[test]
    fn what_is_no_file_is_refused() {
        let folder = tempfile::tempdir().unwrap();
        let missing = folder.path().join("missing").join("out.sdf");
        assert!(matches!(
            Target::create(folder.path()),
            Err(FileError::Directory { .. })
        ));
        assert!(matches!(
            Target::create(&missing),
            Err(FileError::Write { .. })
        ));
        assert!(matches!(
            Source::open(folder.path()),
            Err(FileError::Directory { .. })
        ));
        assert!(matches!(
            Source::open(&missing),
            Err(FileError::NotFound { .. })
        ));
        let empty = folder.path().join("empty.sdf");
        fs::write(&empty, "").unwrap();
        assert!(matches!(
            Source::open(&empty),
            Err(FileError::Content { .. })
        ));
    }
}
