//! The verbs of the command line, one file each.

mod audit;
mod figure;
mod labels;
mod line;
mod mend;
mod place;
mod records;
mod wish;

use crate::args::Verb;
use crate::files::{FileError, Target};
use std::io::{self, Write};
use std::path::{Path, PathBuf};

/// How a run ended.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Status {
    /// All good.
    Good,
    /// Something is wrong, unclear or could not be met.
    Wrong,
    /// Unusable arguments or unreadable input.
    Unusable,
}

impl Status {
    /// The exit status: 0, 1 or 2.
    pub fn code(self) -> u8 {
        match self {
            Status::Good => 0,
            Status::Wrong => 1,
            Status::Unusable => 2,
        }
    }
}

/// What ends a run before its end.
#[derive(Debug, thiserror::Error)]
enum Failure {
    /// A file cannot be read or written.
    #[error(transparent)]
    File(#[from] FileError),
    /// The requirement given for all records cannot be read.
    #[error("--carry '{line}': {}{text}", column_words(*.column))]
    Carry {
        line: String,
        column: usize,
        text: String,
    },
    /// No record has the data field that was named.
    #[error(
        "{name}: no record has a data field '{field}'. Nothing was written; check the name of the field"
    )]
    NoField { name: String, field: String },
    /// A record that can be neither read nor kept.
    #[error("{name}: record {record}: {text} Nothing was written")]
    Lost {
        name: String,
        record: usize,
        text: String,
    },
    /// Arguments that do not fit the input.
    #[error("{0}")]
    Arguments(String),
}

fn column_words(column: usize) -> String {
    match column {
        0 => String::new(),
        n => format!("column {n}: "),
    }
}

/// Runs a verb. Messages go to standard error.
pub fn run(verb: Verb) -> Status {
    let outcome = match verb {
        Verb::Labels(args) => labels::run(&args),
        Verb::Place(args) => place::run(&args),
        Verb::Audit(args) => audit::run(&args),
        Verb::Mend(args) => mend::run(&args),
        Verb::Figure(args) => figure::run(&args),
        Verb::Line(args) => line::run(&args),
    };
    outcome.unwrap_or_else(|failure| {
        // whoever reads our output may stop when it has seen enough
        if let Failure::File(FileError::Write { error, .. }) = &failure
            && error.kind() == io::ErrorKind::BrokenPipe
        {
            return Status::Good;
        }
        say(&failure.to_string());
        Status::Unusable
    })
}

/// Does `one` for each file and sends what it writes to standard output. A file that cannot be used does
/// not keep the others from it.
fn each_file(
    files: &[PathBuf],
    mut one: impl FnMut(&Path, &mut Target) -> Result<Status, Failure>,
) -> Result<Status, Failure> {
    let mut out = Target::create(Path::new("-"))?;
    let mut status = Status::Good;
    for path in files {
        match one(path, &mut out) {
            Ok(ended) => status = status.max(ended),
            Err(failure @ Failure::File(FileError::Write { .. })) => return Err(failure),
            Err(failure) => {
                say(&failure.to_string());
                status = Status::Unusable;
            }
        }
    }
    out.save()?;
    Ok(status)
}

/// A message on standard error, under the program's name.
pub fn say(text: &str) {
    // nothing is left to do if even this fails
    let _ = writeln!(io::stderr().lock(), "wedgewright: {text}");
}
