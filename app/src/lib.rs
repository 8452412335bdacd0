//! The rim: files, command line, window.

pub mod args;
pub mod batch;
pub mod files;

use args::Args;
use batch::Status;
use clap::Parser;
use std::ffi::OsString;
use std::path::Path;
use std::process::ExitCode;

/// Why the window cannot be opened.
#[derive(Debug, thiserror::Error)]
pub enum WindowError {
    /// The file to open is not there or no file.
    #[error(transparent)]
    File(#[from] files::FileError),
    /// There is no window in this build.
    #[error(
        "the window is not part of this build. Give a verb, as in 'wedgewright labels FILE'; 'wedgewright --help' lists them"
    )]
    Missing,
}

/// Runs the program with its arguments, the name of the program first.
pub fn run(arguments: impl IntoIterator<Item = OsString>) -> ExitCode {
    let args = match Args::try_parse_from(arguments) {
        Ok(args) => args,
        Err(error) => {
            // the text goes to standard output for --help and --version
            let _ = error.print();
            return ExitCode::from(if error.use_stderr() { 2 } else { 0 });
        }
    };
    let status = match args.verb {
        Some(verb) => batch::run(verb),
        None => match open_window(args.file.as_deref()) {
            Ok(()) => Status::Good,
            Err(error) => {
                batch::say(&error.to_string());
                Status::Unusable
            }
        },
    };
    ExitCode::from(status.code())
}

/// Opens the window, with a file if one is given, and comes back when it is closed.
///
/// # Errors
/// If the file is not there, or no window can be shown.
pub fn open_window(path: Option<&Path>) -> Result<(), WindowError> {
    if let Some(path) = path {
        files::must_be_file(path)?;
    }
    Err(WindowError::Missing)
}
