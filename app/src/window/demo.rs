//! The drawing that a new window opens on: an intermediate of the invented project TERN-3.

use crate::session::Session;
use crate::session::files::Document;
use chem::format::{ReadError, molfile};

/// The molfile, as the plant entered it: one mark, and the wrong one, where the project asks for three.
const MOLFILE: &str = include_str!("demo/tern-3.mol");

/// What the project asks for.
const LINE: &str = "(1R,2R,4R,8E)";

/// The document.
///
/// # Errors
/// Never, as long as the molfile above can be read; a test holds this.
pub(super) fn session() -> Result<Session, ReadError> {
    let record = molfile::read(MOLFILE, 1)?;
    Ok(Session::of(Document::of(record), None, LINE.to_owned()))
}
