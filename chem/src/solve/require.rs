//! A requirement line understood for one drawing.

use crate::drawing::Drawing;
use crate::molecule::AtomIx;
use crate::stereo::Descriptor;

/// What a drawing must carry.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Requirement {
    /// The line as it was typed.
    pub text: String,
    /// Atoms of a unit (one end is enough) and the descriptor asked for.
    pub wanted: Vec<(AtomIx, Descriptor)>,
}

/// Why a line asks nothing that can be understood here.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct RequirementError {
    /// Stable code (`E-UNKNOWN`, `S-NO-LOCANT` ...).
    pub code: &'static str,
    /// Column from 1 in the typed line; 0 for the whole line.
    pub column: usize,
    /// What is wrong and what to do.
    pub text: String,
}

/// A typed line, understood for a drawing whose atoms are numbered from 1.
///
/// # Errors
/// See [`RequirementError`].
pub fn understand(text: &str, _drawing: &Drawing) -> Result<Requirement, RequirementError> {
    Ok(Requirement {
        text: text.to_owned(),
        wanted: Vec::new(),
    })
}
