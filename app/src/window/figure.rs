//! The figure as a file.

use crate::session::Session;
use std::path::Path;

/// Writes the figure in the format that the name's ending says.
///
/// # Errors
/// What went wrong, in a sentence.
pub(super) fn write(path: &Path, session: &Session) -> Result<(), String> {
    let _ = session;
    Err(format!("{}: figures cannot be written yet", path.display()))
}
