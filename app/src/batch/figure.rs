//! `figure`: a drawing for print.

use super::{Failure, Status};
use crate::args::Figure;

pub(super) fn run(args: &Figure) -> Result<Status, Failure> {
    let _ = args;
    Err(Failure::Arguments(
        "figures are not made in this build".to_owned(),
    ))
}
