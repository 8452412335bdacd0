//! Wedgewright: arguments in, exit status out.

use std::process::ExitCode;

fn main() -> ExitCode {
    wedgewright::run(std::env::args_os())
}
