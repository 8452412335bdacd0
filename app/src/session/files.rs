//! Reading and writing files: the only place that touches them for the window.

use chem::drawing::Drawing;
use std::fs;
use std::io::Write;
use std::path::{Path, PathBuf};

/// Largest file that is read, in bytes; a drawing needs a few thousand.
const LARGEST: u64 = 64 << 20;

/// What a file holds, as far as a drawing of one molecule goes.
#[derive(Clone, Debug)]
pub struct Document {
    /// The drawing.
    pub drawing: Drawing,
    /// Title of the record.
    pub title: String,
    /// What there is to know of the file it came from (that it holds more records ...); empty if nothing.
    pub notice: String,
}

impl Document {
    /// An empty sheet.
    pub fn empty() -> Document {
        Document {
            drawing: Drawing::empty(),
            title: String::new(),
            notice: String::new(),
        }
    }
}

/// Why a file could not be read or written, with what to do.
#[derive(Debug, thiserror::Error)]
pub enum FileError {
    /// The file system said no.
    #[error("{} cannot be {verb}: {cause}", path.display())]
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
