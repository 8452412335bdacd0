//! From what is asked to a drawing that carries it.

pub mod line;
pub mod require;
pub mod search;
pub mod turn;

use crate::molecule::AtomIx;
use std::fmt;

/// Why no drawing carries what was asked.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Refusal {
    /// Stable name of the reason.
    pub code: &'static str,
    /// Atoms concerned.
    pub atoms: Vec<AtomIx>,
    /// The reason and what to do, in a sentence.
    pub text: String,
}

impl fmt::Display for Refusal {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.text)
    }
}

impl std::error::Error for Refusal {}
