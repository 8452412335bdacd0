//! Steps that can be taken back: a list of whole drawings, which is simple and small enough.

use chem::audit::Step;
use chem::drawing::Drawing;
use chem::format::StereoGroup;
use std::sync::Arc;

/// Steps kept; the oldest go first.
const MOST: usize = 400;

/// The document after one step.
#[derive(Clone, Debug)]
pub(super) struct State {
    /// Name of the step that led here.
    pub(super) name: String,
    pub(super) drawing: Arc<Drawing>,
    /// The line that must be carried.
    pub(super) line: String,
    /// Stereo groups, in the atoms of this drawing.
    pub(super) groups: Arc<[StereoGroup]>,
    /// The mends that led here, in order; a mend taken back stands here no more.
    pub(super) log: Arc<[Step]>,
    /// Unlike that of every other state.
    pub(super) revision: u64,
}

/// Where the document has been; never empty.
#[derive(Debug)]
pub(super) struct History {
    before: Vec<State>,
    now: State,
    /// Steps taken back, the next one to make again last.
    after: Vec<State>,
    next_revision: u64,
}

impl History {
    pub(super) fn new(first: State) -> History {
        History {
            before: Vec::new(),
            next_revision: first.revision + 1,
            now: first,
            after: Vec::new(),
        }
    }

    pub(super) fn now(&self) -> &State {
        &self.now
    }

    /// A new step; what was taken back is gone. The atoms keep their numbers, and so the stereo groups
    /// stay.
    pub(super) fn push(&mut self, name: &str, drawing: Arc<Drawing>, line: String) {
        let groups = self.now.groups.clone();
        self.push_with_groups(name, drawing, line, groups);
    }

    /// A new step with the stereo groups of its drawing.
    pub(super) fn push_with_groups(
        &mut self,
        name: &str,
        drawing: Arc<Drawing>,
        line: String,
        groups: Arc<[StereoGroup]>,
    ) {
        self.after.clear();
        let next = self.state(name, drawing, line, groups);
        self.before.push(std::mem::replace(&mut self.now, next));
        if self.before.len() > MOST {
            self.before.remove(0);
        }
    }

    /// Changes the step that was made last.
    pub(super) fn amend(&mut self, name: &str, drawing: Arc<Drawing>, line: String) {
        let groups = self.now.groups.clone();
        self.now = self.state(name, drawing, line, groups);
    }

    /// Writes mends into the log of the step that was made last.
    pub(super) fn write_log(&mut self, steps: impl IntoIterator<Item = Step>) {
        self.now.log = self.now.log.iter().cloned().chain(steps).collect();
    }

    /// Forgets the last step, as if it had not been made.
    pub(super) fn drop_last(&mut self) {
        if let Some(state) = self.before.pop() {
            self.now = state;
        }
    }

    pub(super) fn undo(&mut self) -> bool {
        let Some(state) = self.before.pop() else {
            return false;
        };
        self.after.push(std::mem::replace(&mut self.now, state));
        true
    }

    pub(super) fn redo(&mut self) -> bool {
        let Some(state) = self.after.pop() else {
            return false;
        };
        self.before.push(std::mem::replace(&mut self.now, state));
        true
    }

    pub(super) fn undo_name(&self) -> Option<&str> {
        (!self.before.is_empty()).then_some(self.now.name.as_str())
    }

    pub(super) fn redo_name(&self) -> Option<&str> {
        self.after.last().map(|s| s.name.as_str())
    }

    fn state(
        &mut self,
        name: &str,
        drawing: Arc<Drawing>,
        line: String,
        groups: Arc<[StereoGroup]>,
    ) -> State {
        self.next_revision += 1;
        State {
            name: name.to_owned(),
            drawing,
            line,
            groups,
            log: self.now.log.clone(),
            revision: self.next_revision,
        }
    }
}
