//! `line`: a requirement line in its canonical form.

use super::{Failure, Status};
use crate::args::Line;

pub(super) fn run(args: &Line) -> Result<Status, Failure> {
    let _ = (&args.text, args.json);
    Err(Failure::Arguments(
        "requirement lines are not read in this build".to_owned(),
    ))
}
