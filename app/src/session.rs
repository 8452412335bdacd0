//! The open document: one drawing, the line it must carry, every step that led here.
//!
//! Nothing here knows of windows. All change goes through [`Edit`]s in [`Session::step`] or through
//! the search for marks ([`Session::ask`], [`Session::make_it_carry`]), so that each change has a
//! name and can be taken back. After every step the locants of the requirement follow the atoms they
//! mean, and the drawing is read afresh.
//!
//! The search itself is not run here: it is handed out as [`Work`], may run anywhere, and comes back
//! through [`Session::answer`]. So it is with the audit: [`Session::take_look`], [`Session::seen`].

pub mod files;
mod findings;
mod history;
mod line;
mod selection;
mod tally;
mod work;

pub(crate) use findings::MEND_ALL;
pub use findings::{Look, Offer, Seen, State as Looking};
pub use selection::Selection;
pub use tally::Tally;
pub use work::{Answer, Work};

use crate::files::FileError;
use chem::drawing::{Drawing, Edit, EditError, Renumbering};
use chem::ink::{STYLES, Style};
use chem::pipeline::{self, Report, Solution};
use chem::solve::Refusal;
use chem::solve::require::{Requirement, RequirementError};
use files::Document;
use history::{History, State};
use std::path::{Path, PathBuf};
use std::sync::Arc;
use work::{Outcome, Task};

/// What waits for an answer.
#[derive(Debug)]
struct Pending {
    id: u64,
    then: Then,
}

/// What an answer does.
#[derive(Debug)]
enum Then {
    /// Completes the step of a typed line, whose marks were sought from this drawing.
    Typed(Arc<Drawing>),
    /// Makes a step of this name.
    Step(String),
    /// Makes the step that mends all.
    Mend,
}

/// The line while it is typed: everything typed in one go is one step.
#[derive(Debug)]
struct Typing {
    /// The drawing before the first key: marks are always sought from it.
    base: Arc<Drawing>,
    base_text: String,
}

/// The open document.
#[derive(Debug)]
pub struct Session {
    history: History,
    document: Document,
    path: Option<PathBuf>,
    saved: u64,
    requirement: Result<Requirement, RequirementError>,
    /// What the report compares with: the requirement, or the last one understood while typing.
    asked: Requirement,
    refusal: Option<Refusal>,
    report: Report,
    selection: Selection,
    typing: Option<Typing>,
    pending: Option<Pending>,
    work: Option<Work>,
    next_work: u64,
    findings: findings::Findings,
    figure: FigureChoice,
}

/// How the figure of the document is made.
#[derive(Clone, Copy, Debug)]
pub struct FigureChoice {
    /// With which measures.
    pub style: &'static Style,
    /// With locants and descriptors beside their places.
    pub descriptors: bool,
}

impl Default for FigureChoice {
    fn default() -> FigureChoice {
        FigureChoice {
            style: &STYLES[0],
            descriptors: false,
        }
    }
}

impl Session {
    /// An empty sheet.
    pub fn empty() -> Session {
        Session::of(Document::empty(), None, String::new())
    }

    /// A document with the line that it must carry; `path` is where it was read from.
    pub fn of(document: Document, path: Option<PathBuf>, line: String) -> Session {
        let drawing = Arc::new(document.record.drawing.clone());
        let as_read = Arc::clone(&drawing);
        let history = History::new(State {
            name: "Open".to_owned(),
            drawing,
            line,
            groups: document.record.stereo_groups.clone().into(),
            log: Arc::default(),
            revision: 0,
        });
        let mut session = Session {
            history,
            document,
            path,
            saved: 0,
            requirement: Ok(Requirement::default()),
            asked: Requirement::default(),
            refusal: None,
            report: Report::default(),
            selection: Selection::default(),
            typing: None,
            pending: None,
            work: None,
            next_work: 0,
            findings: findings::Findings::of(as_read),
            figure: FigureChoice::default(),
        };
        session.read();
        session
    }

    /// Opens a file, told by its content.
    ///
    /// # Errors
    /// If it cannot be read, or holds no drawing.
    pub fn open(path: &Path) -> Result<Session, FileError> {
        let document = files::read(path)?;
        // saving must not lose the records beside this one
        let own = (!document.has_more).then(|| path.to_owned());
        Ok(Session::of(document, own, String::new()))
    }

    /// The drawing as it stands.
    pub fn drawing(&self) -> &Arc<Drawing> {
        &self.history.now().drawing
    }

    /// A number that changes with every change of the drawing or the line.
    pub fn revision(&self) -> u64 {
        self.history.now().revision
    }

    /// The line as typed.
    pub fn line(&self) -> &str {
        &self.history.now().line
    }

    /// The line understood.
    ///
    /// # Errors
    /// What is wrong with the line.
    pub fn requirement(&self) -> Result<&Requirement, &RequirementError> {
        self.requirement.as_ref()
    }

    /// Whether the line is being typed.
    pub fn is_typing(&self) -> bool {
        self.typing.is_some()
    }

    /// Why the last search made no drawing; gone with the next change.
    pub fn refusal(&self) -> Option<&Refusal> {
        self.refusal.as_ref()
    }

    /// What the drawing carries and how that stands to the line.
    pub fn report(&self) -> &Report {
        &self.report
    }

    /// How many places stand how.
    pub fn tally(&self) -> Tally {
        Tally::of(&self.report)
    }

    /// Whether something is asked that the drawing does not carry yet.
    pub fn can_carry(&self) -> bool {
        let asks = self
            .requirement
            .as_ref()
            .is_ok_and(|r| !r.wanted.is_empty());
        asks && !self.report.all_agree()
    }

    /// How its figure is made.
    pub fn figure(&self) -> FigureChoice {
        self.figure
    }

    /// The next style of figure in the table of styles; after the last the first.
    pub fn next_figure_style(&mut self) {
        let now = STYLES.iter().position(|s| s.name == self.figure.style.name);
        let next = now.map_or(0, |i| (i + 1) % STYLES.len());
        self.figure.style = &STYLES[next];
    }

    /// Puts descriptors into the figure, or leaves them out.
    pub fn toggle_figure_descriptors(&mut self) {
        self.figure.descriptors = !self.figure.descriptors;
    }

    /// What is selected.
    pub fn selection(&self) -> &Selection {
        &self.selection
    }

    /// Selects; what is not there is left out.
    pub fn select(&mut self, mut selection: Selection) {
        selection.keep_within(self.drawing());
        self.selection = selection;
    }

    /// Where the document is kept.
    pub fn path(&self) -> Option<&Path> {
        self.path.as_deref()
    }

    /// The file's name, or the title, or "Untitled".
    pub fn name(&self) -> String {
        let file = self
            .path
            .as_ref()
            .and_then(|p| p.file_name())
            .map(|n| n.to_string_lossy().into_owned());
        match file {
            Some(name) => name,
            None if self.document.record.title.trim().is_empty() => "Untitled".to_owned(),
            None => self.document.record.title.trim().to_owned(),
        }
    }

    /// What there is to know of the file it came from, in a sentence; empty if nothing.
    pub fn notice(&self) -> &str {
        &self.document.notice
    }

    /// Whether something would be lost by closing.
    pub fn is_dirty(&self) -> bool {
        self.history.now().revision != self.saved
    }

    /// Makes one step of several edits.
    ///
    /// # Errors
    /// If the edits do not fit the drawing, which is then unchanged.
    pub fn step(&mut self, name: &str, edits: &[Edit]) -> Result<Renumbering, EditError> {
        self.settle();
        self.stop_work();
        let (drawing, map) = self.drawing().apply(edits)?;
        let line = line::follow(self.line(), &map);
        self.selection = self.selection.renumbered(&map);
        let groups = self.history.now().groups.iter();
        let groups = groups.filter_map(|g| g.renumbered(&map)).collect();
        self.history
            .push_with_groups(name, Arc::new(drawing), line, groups);
        self.read();
        Ok(map)
    }

    /// The line is being typed and now reads `text`. Everything up to [`Session::settle`] is one step.
    /// A line that is understood gives [`Work`]; one that is not leaves the drawing as it is shown.
    pub fn ask(&mut self, text: &str) {
        if text == self.line() {
            return;
        }
        self.stop_work();
        let base = match &self.typing {
            Some(typing) => typing.base.clone(),
            None => {
                let base = self.drawing().clone();
                self.typing = Some(Typing {
                    base: base.clone(),
                    base_text: self.line().to_owned(),
                });
                self.history.push("", base.clone(), text.to_owned());
                base
            }
        };
        let (name, drawing) = if text.trim().is_empty() {
            ("Clear the line".to_owned(), base.clone())
        } else {
            (carry_name(text), self.drawing().clone())
        };
        self.history.amend(&name, drawing, text.to_owned());
        self.read();
        if let Ok(requirement) = &self.requirement
            && !requirement.wanted.is_empty()
        {
            let requirement = requirement.clone();
            self.give_work(base.clone(), Task::Carry(requirement), Then::Typed(base));
        }
    }

    /// Typing has ended. A line that is not understood leaves the drawing as it was before typing; a
    /// step that changed nothing goes.
    pub fn settle(&mut self) {
        let Some(typing) = self.typing.take() else {
            return;
        };
        if self.requirement.is_err() {
            let State { name, line, .. } = self.history.now().clone();
            self.history.amend(&name, typing.base.clone(), line);
            self.read();
        } else if let Ok(requirement) = &self.requirement
            && requirement.text != self.line()
            && !requirement.text.is_empty()
        {
            // the bracket was still open
            let line = requirement.text.clone();
            let drawing = self.drawing().clone();
            self.history.amend(&carry_name(&line), drawing, line);
        }
        let line = self.line().to_owned();
        let idle = self.pending.is_none() && line == typing.base_text;
        if idle && Arc::ptr_eq(self.drawing(), &typing.base) {
            self.history.drop_last();
            self.read();
        }
    }

    /// Seeks marks for the line on the drawing as it stands; one step when the answer comes.
    pub fn make_it_carry(&mut self) {
        self.settle();
        self.stop_work();
        if let Ok(requirement) = &self.requirement
            && !requirement.wanted.is_empty()
        {
            let requirement = requirement.clone();
            let name = carry_name(self.line());
            let drawing = self.drawing().clone();
            self.give_work(drawing, Task::Carry(requirement), Then::Step(name));
        }
    }

    /// The search to run next, once.
    pub fn take_work(&mut self) -> Option<Work> {
        self.work.take()
    }

    /// Whether an answer is awaited.
    pub fn is_searching(&self) -> bool {
        self.pending.is_some()
    }

    /// Takes the answer of a search; one that is no longer awaited is dropped.
    pub fn answer(&mut self, answer: Answer) {
        let Some(pending) = self.pending.take_if(|p| p.id == answer.id) else {
            return;
        };
        let line = self.line().to_owned();
        let result = match answer.outcome {
            Outcome::Carried(result) => result,
            Outcome::Mended(mended) => return self.mended(mended),
        };
        match (result, pending.then) {
            (Ok(solution), Then::Typed(base)) => {
                let drawing = changed(&solution).unwrap_or(base);
                self.complete_typed(drawing);
            }
            (Ok(solution), Then::Step(name)) => {
                if let Some(drawing) = changed(&solution) {
                    self.history.push(&name, drawing, line);
                    self.read();
                }
            }
            // mending all gives no solution
            (Ok(_), Then::Mend) => {}
            (Err(refusal), then) => {
                if let Then::Typed(base) = then {
                    self.complete_typed(base);
                }
                self.refusal = Some(refusal);
            }
        }
    }

    fn complete_typed(&mut self, drawing: Arc<Drawing>) {
        let State { name, line, .. } = self.history.now().clone();
        self.history.amend(&name, drawing, line);
        self.read();
    }

    /// The name of the step that undo would take back.
    pub fn undo_name(&self) -> Option<&str> {
        self.history.undo_name()
    }

    /// The name of the step that redo would make again.
    pub fn redo_name(&self) -> Option<&str> {
        self.history.redo_name()
    }

    /// Takes the last step back.
    pub fn undo(&mut self) {
        self.settle();
        self.stop_work();
        if self.history.undo() {
            self.moved_in_history();
        }
    }

    /// Makes the step again that was taken back.
    pub fn redo(&mut self) {
        self.settle();
        self.stop_work();
        if self.history.redo() {
            self.moved_in_history();
        }
    }

    /// Writes the document as a molfile, and from then on keeps it there.
    ///
    /// # Errors
    /// If the file cannot be written; what stood there is then untouched.
    pub fn save(&mut self, path: &Path) -> Result<(), FileError> {
        self.settle();
        let drawing = (**self.drawing()).clone();
        let groups = self.history.now().groups.to_vec();
        let record = self.document.record.clone();
        let record = record.with_drawing_and_groups(drawing, groups);
        files::write(path, &record)?;
        self.document = Document::of(record);
        self.findings.forget_file();
        self.path = Some(path.to_owned());
        self.saved = self.history.now().revision;
        Ok(())
    }

    fn moved_in_history(&mut self) {
        let drawing = self.drawing().clone();
        self.selection.keep_within(&drawing);
        self.read();
    }

    fn give_work(&mut self, drawing: Arc<Drawing>, task: Task, then: Then) {
        self.next_work += 1;
        let id = self.next_work;
        self.pending = Some(Pending { id, then });
        self.work = Some(Work { id, drawing, task });
    }

    fn stop_work(&mut self) {
        self.pending = None;
        self.work = None;
    }

    /// Understands the line and reads the drawing afresh.
    fn read(&mut self) {
        self.refusal = None;
        let drawing = self.drawing().clone();
        let typing = self.typing.is_some();
        self.requirement = if self.line().trim().is_empty() {
            Ok(Requirement::default())
        } else {
            line::understand(self.line(), &drawing, typing)
        };
        match &self.requirement {
            Ok(requirement) => self.asked = requirement.clone(),
            // what was asked a key ago stays in view while a line is typed
            Err(_) if typing => {}
            Err(_) => self.asked = Requirement::default(),
        }
        self.report = pipeline::report(&drawing, &self.asked);
        self.selection.keep_within(&drawing);
    }
}

fn carry_name(line: &str) -> String {
    format!("Carry {}", line.trim())
}

/// The drawing of a solution that changes something.
fn changed(solution: &Solution) -> Option<Arc<Drawing>> {
    (!solution.edits().is_empty()).then(|| Arc::new(solution.drawing().clone()))
}

#[cfg(test)]
mod tests;
