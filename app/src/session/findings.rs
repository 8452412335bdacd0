//! The findings of the open drawing: which there are, which are shown, which is chosen, what was mended.
//!
//! The audit may take long, so that no edit waits for it: it is handed out as [`Look`], runs elsewhere, and
//! comes back through [`Session::seen`]. What was found is kept for the last few revisions, so that undo
//! finds it again at once.

use super::work::Task;
use super::{Selection, Session, Then};
use chem::audit::{self, Finding, Grade, Mend, Mended, Step};
use chem::drawing::{Drawing, EditError};
use chem::format::Record;
use chem::solve::require::Requirement;
use std::sync::Arc;

/// Revisions whose findings are kept.
const KEPT: usize = 8;
/// Name of the step that mends all.
pub(crate) const MEND_ALL: &str = "Mend all that keeps the meaning";

/// An audit to be run off the thread that paints.
#[derive(Clone, Debug)]
pub struct Look {
    revision: u64,
    drawing: Arc<Drawing>,
    requirement: Requirement,
    /// The record as it was read, as long as its drawing stands unchanged.
    record: Option<Box<Record>>,
}

impl Look {
    /// Runs it; the result goes to [`Session::seen`].
    pub fn run(&self) -> Seen {
        let found = match &self.record {
            Some(record) => audit::audit_record(record, &self.requirement),
            None => audit::audit(&self.drawing, &self.requirement),
        };
        Seen {
            revision: self.revision,
            found: found.into(),
        }
    }
}

/// What came of a [`Look`].
#[derive(Clone, Debug)]
pub struct Seen {
    revision: u64,
    found: Arc<[Finding]>,
}

/// How far the audit of the drawing as it stands has come.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum State {
    /// The findings are those of the drawing.
    Known,
    /// They are being looked for; those of the drawing before are shown until then.
    Looking,
    /// The audit broke off.
    Failed,
}

/// One mend of one finding, of a certain revision of the document.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Offer {
    /// [`Session::revision`] when it was offered.
    pub revision: u64,
    /// Place of the finding in [`Session::findings`].
    pub finding: usize,
    /// Place of the mend among those of the finding.
    pub mend: usize,
}

/// What the session keeps of findings.
#[derive(Debug, Default)]
pub(super) struct Findings {
    /// The drawing as it was read, of which the record tells what reading left out.
    as_read: Option<Arc<Drawing>>,
    /// By revision, the latest last.
    kept: Vec<Seen>,
    /// Revision for which a look was handed out.
    given: Option<u64>,
    failed: Option<u64>,
    /// Revision in which mending all changed nothing.
    vain: Option<u64>,
    hidden: Vec<Grade>,
    chosen: Option<Finding>,
}

impl Findings {
    pub(super) fn of(as_read: Arc<Drawing>) -> Findings {
        Findings {
            as_read: Some(as_read),
            ..Findings::default()
        }
    }

    /// The file has been written: what was left out of it when it was read is gone.
    pub(super) fn forget_file(&mut self) {
        self.as_read = None;
    }
}

impl Session {
    /// How far the audit has come.
    pub fn looking(&self) -> State {
        let now = self.revision();
        if self.findings.kept.iter().any(|s| s.revision == now) {
            State::Known
        } else if self.findings.failed == Some(now) {
            State::Failed
        } else {
            State::Looking
        }
    }

    /// The findings, the gravest first; while a changed drawing is looked at, those of the one before.
    pub fn findings(&self) -> &[Finding] {
        let kept = &self.findings.kept;
        let now = kept.iter().find(|s| s.revision == self.revision());
        now.or(kept.last()).map_or(&[], |s| &s.found)
    }

    /// How many findings there are of a grade.
    pub fn n_findings(&self, grade: Grade) -> usize {
        self.findings().iter().filter(|f| f.grade == grade).count()
    }

    /// Whether findings of a grade are shown.
    pub fn shows(&self, grade: Grade) -> bool {
        !self.findings.hidden.contains(&grade)
    }

    /// Shows the findings of a grade, or hides them.
    pub fn toggle_grade(&mut self, grade: Grade) {
        let hidden = &mut self.findings.hidden;
        match hidden.iter().position(|g| *g == grade) {
            Some(i) => {
                hidden.remove(i);
            }
            None => hidden.push(grade),
        }
    }

    /// The audit to run next, once for each revision.
    pub fn take_look(&mut self) -> Option<Look> {
        let revision = self.revision();
        if self.looking() != State::Looking || self.findings.given == Some(revision) {
            return None;
        }
        self.findings.given = Some(revision);
        let drawing = self.drawing().clone();
        let read = self.findings.as_read.as_ref();
        let as_read = read.is_some_and(|read| Arc::ptr_eq(read, &drawing));
        Some(Look {
            revision,
            requirement: self.asked.clone(),
            record: as_read.then(|| Box::new(self.document.record.clone())),
            drawing,
        })
    }

    /// Takes what an audit found.
    pub fn seen(&mut self, seen: Seen) {
        let kept = &mut self.findings.kept;
        kept.retain(|s| s.revision != seen.revision);
        if kept.len() >= KEPT {
            kept.remove(0);
        }
        kept.push(seen);
    }

    /// No audit runs any more: one that was awaited broke off.
    pub fn looked_in_vain(&mut self) {
        let now = self.revision();
        if self.looking() == State::Looking && self.findings.given == Some(now) {
            self.findings.failed = Some(now);
        }
    }

    /// The finding that is chosen: its row was, and its atoms are still what is selected.
    pub fn chosen_finding(&self) -> Option<usize> {
        let chosen = self.findings.chosen.as_ref()?;
        let i = self.findings().iter().position(|f| f.is_same(chosen))?;
        (concerned(chosen) == self.selection && self.shows(chosen.grade)).then_some(i)
    }

    /// Chooses a finding and selects what it is about.
    pub fn choose_finding(&mut self, i: usize) {
        if self.looking() != State::Known {
            return;
        }
        if let Some(finding) = self.findings().get(i).cloned() {
            self.select(concerned(&finding));
            self.findings.chosen = Some(finding);
        }
    }

    /// Chooses the next of the findings shown, or the one before; after the last comes the first.
    pub fn step_finding(&mut self, forward: bool) {
        let shown: Vec<usize> = self.shown_findings().map(|(i, _)| i).collect();
        let Some(last) = shown.len().checked_sub(1) else {
            return;
        };
        let chosen = self.chosen_finding();
        let now = chosen.and_then(|c| shown.iter().position(|i| *i == c));
        let next = match (now, forward) {
            (None, true) => 0,
            (None, false) => last,
            (Some(i), true) => (i + 1) % shown.len(),
            (Some(i), false) => i.checked_sub(1).unwrap_or(last),
        };
        self.choose_finding(shown[next]);
    }

    /// The findings of the grades that are shown, with their places in [`Session::findings`].
    pub fn shown_findings(&self) -> impl Iterator<Item = (usize, &Finding)> {
        let all = self.findings().iter().enumerate();
        all.filter(|(_, f)| self.shows(f.grade))
    }

    /// What is offered, if it still is.
    fn offered(&self, offer: Offer) -> Option<(&Finding, &Mend)> {
        if offer.revision != self.revision() || self.looking() != State::Known {
            return None;
        }
        let finding = self.findings().get(offer.finding)?;
        Some((finding, finding.mends.get(offer.mend)?))
    }

    /// The drawing as a mend would leave it; `None` if it is not offered for the drawing as it stands.
    pub fn after_mend(&self, offer: Offer) -> Option<Drawing> {
        let (_, mend) = self.offered(offer)?;
        let (after, _) = self.drawing().apply(&mend.edits).ok()?;
        Some(after)
    }

    /// Mends a finding: one step, and one entry of the log. What is not offered for the drawing as it
    /// stands is not done.
    ///
    /// # Errors
    /// If the mend does not fit the drawing, which is then unchanged.
    pub fn mend(&mut self, offer: Offer) -> Result<(), EditError> {
        let Some((finding, mend)) = self.offered(offer) else {
            return Ok(());
        };
        let (finding, mend) = (finding.clone(), mend.clone());
        let before = self.drawing().clone();
        self.settle();
        if !Arc::ptr_eq(&before, self.drawing()) {
            return Ok(());
        }
        self.step(&capital(&mend.text), &mend.edits)?;
        let entry = Step::new(&before, self.drawing(), finding, &mend);
        self.history.write_log([entry]);
        Ok(())
    }

    /// Whether some finding can be mended without a change of meaning.
    pub fn can_mend_all(&self) -> bool {
        let keeps = |f: &Finding| f.mends.iter().any(|m| m.keeps_meaning);
        self.looking() == State::Known
            && self.findings.vain != Some(self.revision())
            && self.findings().iter().any(keeps)
    }

    /// Whether mending all was tried on the drawing as it stands and changed nothing.
    pub fn mended_in_vain(&self) -> bool {
        self.findings.vain == Some(self.revision())
    }

    /// Mends all that keeps the meaning; one step when the answer comes.
    pub fn mend_all(&mut self) {
        self.settle();
        self.stop_work();
        let drawing = self.drawing().clone();
        self.give_work(drawing, Task::Mend, Then::Mend);
    }

    /// Whether all is being mended.
    pub fn is_mending(&self) -> bool {
        matches!(&self.pending, Some(p) if matches!(p.then, Then::Mend))
    }

    /// What was mended on the way to the drawing as it stands.
    pub fn log(&self) -> &[Step] {
        &self.history.now().log
    }

    pub(super) fn mended(&mut self, mended: Mended) {
        if mended.steps.is_empty() {
            self.findings.vain = Some(self.revision());
            return;
        }
        let line = self.line().to_owned();
        self.history.push(MEND_ALL, Arc::new(mended.drawing), line);
        self.history.write_log(mended.steps);
        self.read();
    }
}

/// What a finding is about, to be selected: its atoms, or its bonds where it names no atom.
fn concerned(finding: &Finding) -> Selection {
    let atoms = finding.atoms.iter().copied();
    let bonds = finding.bonds.iter().copied();
    let named = !finding.atoms.is_empty();
    Selection {
        atoms: atoms.collect(),
        bonds: bonds.filter(|_| !named).collect(),
    }
}

/// The name of a step: `Make the bond 8-9 plain`.
fn capital(words: &str) -> String {
    let mut letters = words.chars();
    match letters.next() {
        Some(first) => first.to_uppercase().chain(letters).collect(),
        None => "Mend".to_owned(),
    }
}
