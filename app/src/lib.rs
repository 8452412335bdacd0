//! The rim of Wedgewright: files, command line, window. It holds no chemistry.

pub mod args;
pub mod batch;
pub mod command;
pub mod export;
pub mod figure;
pub mod files;
pub mod session;
pub mod window;

use args::Args;
use batch::Status;
use clap::Parser;
use std::ffi::OsString;
use std::path::PathBuf;
use std::process::ExitCode;

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
        None => open_window(args.file),
    };
    ExitCode::from(status.code())
}

/// Opens the window, with a file if one is given, and comes back when it is closed.
fn open_window(path: Option<PathBuf>) -> Status {
    match window::run(path) {
        Ok(()) => Status::Good,
        Err(error) => {
            batch::say(&error.to_string());
            Status::Unusable
        }
    }
}
