//! What takes long and is run elsewhere: the search for marks, and mending all.

use chem::audit::{self, Mended};
use chem::drawing::Drawing;
use chem::pipeline::{self, Solution};
use chem::solve::Refusal;
use chem::solve::require::Requirement;
use std::sync::Arc;

/// Work on a drawing, to be run off the thread that paints.
#[derive(Clone, Debug)]
pub struct Work {
    pub(super) id: u64,
    pub(super) drawing: Arc<Drawing>,
    pub(super) task: Task,
}

/// What is to be done.
#[derive(Clone, Debug)]
pub(super) enum Task {
    /// Seek marks that carry this.
    Carry(Requirement),
    /// Mend all that keeps the meaning.
    Mend,
}

impl Work {
    /// Runs it; the result goes to [`super::Session::answer`].
    pub fn run(&self) -> Answer {
        let outcome = match &self.task {
            Task::Carry(requirement) => {
                Outcome::Carried(pipeline::carry(&self.drawing, requirement))
            }
            // where nothing is required, only what keeps the meaning is done
            Task::Mend => Outcome::Mended(audit::mend(&self.drawing, &Requirement::default())),
        };
        Answer {
            id: self.id,
            outcome,
        }
    }
}

/// What came of a [`Work`].
#[derive(Debug)]
pub struct Answer {
    pub(super) id: u64,
    pub(super) outcome: Outcome,
}

/// What came of a [`Task`].
#[derive(Debug)]
pub(super) enum Outcome {
    /// The marks, or why there are none.
    Carried(Result<Solution, Refusal>),
    /// The drawing with what was mended.
    Mended(Mended),
}
