//! Everything a person can do: one enum with words, shortcut, help and effect.
//!
//! Menus and shortcuts are made from it. Panels send commands and change nothing themselves.

mod effects;

use crate::session::MEND_ALL;
use crate::session::{Offer, Selection, Session};
use chem::audit::Grade;
use chem::drawing::{Edit, Mark};
use std::borrow::Cow;

/// One thing to do.
#[derive(Clone, Debug, PartialEq)]
pub enum Command {
    /// An empty sheet.
    New,
    /// Another file.
    Open,
    /// Write the molfile where it was.
    Save,
    /// Write the molfile elsewhere.
    SaveAs,
    /// Write the picture.
    SaveFigure,
    /// The next style of figure.
    FigureStyle,
    /// Descriptors in the figure, or none.
    FigureDescriptors,
    /// Close the window.
    Close,
    /// Take the last step back.
    Undo,
    /// Make it again.
    Redo,
    /// Select everything.
    SelectAll,
    /// Select nothing.
    Deselect,
    /// Select the next atom by number.
    NextAtom,
    /// Select the one before.
    PreviousAtom,
    /// Select the next bond by number.
    NextBond,
    /// Select the one before.
    PreviousBond,
    /// Remove what is selected.
    Delete,
    /// Raise the wide end of the selected bond.
    Raise,
    /// Lower it.
    Lower,
    /// Swap the narrow end of the selected bond.
    Swap,
    /// Plain lines wherever a mark stands.
    ClearMarks,
    /// To the line.
    GoToLine,
    /// Seek marks for the line.
    MakeItCarry,
    /// Choose the next finding.
    NextFinding,
    /// Choose the one before.
    PreviousFinding,
    /// Mend all that keeps the meaning.
    MendAll,
    /// The whole drawing in view.
    Fit,
    /// Larger.
    Nearer,
    /// Smaller.
    Farther,
    /// Light or dark desk.
    Dim,
    /// Show or fold the places.
    Places,
    /// Show or fold the findings.
    Findings,
    /// A named step.
    Step(String, Vec<Edit>),
    /// The line now reads so.
    Ask(String),
    /// The line is done.
    Settle,
    /// Select this.
    Select(Selection),
    /// Choose this finding.
    ChooseFinding(usize),
    /// Show the findings of a grade, or hide them.
    ToggleGrade(Grade),
    /// Take this mend.
    Mend(Offer),
}

/// What the window must do itself, since it needs a dialog or the view.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Errand {
    /// Ask about unsaved work, then an empty sheet.
    New,
    /// Ask about unsaved work, then choose a file.
    Open,
    /// Save, choosing a path if there is none.
    Save,
    /// Save, choosing a path.
    SaveAs,
    /// Save the figure, choosing a path.
    SaveFigure,
    /// Ask about unsaved work, then close.
    Close,
    /// Put the caret in the line.
    GoToLine,
    /// The whole drawing in view.
    Fit,
    /// Zoom by a step; `true` for nearer.
    Zoom(bool),
    /// Light or dark.
    Dim,
    /// Show or fold the places.
    Places,
    /// Show or fold the findings.
    Findings,
}

/// What came of a command.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Effect {
    /// Done.
    Done,
    /// The window must go on.
    Errand(Errand),
    /// It could not be done, and why.
    Refused(String),
}

/// A key with Ctrl or Shift; `key` is the name that it has on the keyboard.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Shortcut {
    /// With Ctrl (the command key on a Mac).
    pub ctrl: bool,
    /// With Shift.
    pub shift: bool,
    /// `S`, `Delete`, `Up` ...
    pub key: &'static str,
}

/// A key alone.
pub const fn plain(key: &'static str) -> Shortcut {
    Shortcut {
        ctrl: false,
        shift: false,
        key,
    }
}

const fn shift(key: &'static str) -> Shortcut {
    Shortcut {
        shift: true,
        ..plain(key)
    }
}

/// A key with Ctrl.
pub const fn ctrl(key: &'static str) -> Shortcut {
    Shortcut {
        ctrl: true,
        ..plain(key)
    }
}

const fn ctrl_shift(key: &'static str) -> Shortcut {
    Shortcut {
        ctrl: true,
        ..shift(key)
    }
}

/// The menus: name, then the commands; `None` is a gap.
pub const MENUS: [(&str, &[Option<Command>]); 4] = [
    (
        "File",
        &[
            Some(Command::New),
            Some(Command::Open),
            None,
            Some(Command::Save),
            Some(Command::SaveAs),
            None,
            Some(Command::SaveFigure),
            Some(Command::FigureStyle),
            Some(Command::FigureDescriptors),
            None,
            Some(Command::Close),
        ],
    ),
    (
        "Edit",
        &[
            Some(Command::Undo),
            Some(Command::Redo),
            None,
            Some(Command::SelectAll),
            Some(Command::Deselect),
            Some(Command::NextAtom),
            Some(Command::PreviousAtom),
            Some(Command::NextBond),
            Some(Command::PreviousBond),
            None,
            Some(Command::Delete),
        ],
    ),
    (
        "Stereo",
        &[
            Some(Command::GoToLine),
            Some(Command::MakeItCarry),
            None,
            Some(Command::Raise),
            Some(Command::Lower),
            Some(Command::Swap),
            Some(Command::ClearMarks),
            None,
            Some(Command::NextFinding),
            Some(Command::PreviousFinding),
            Some(Command::MendAll),
        ],
    ),
    (
        "View",
        &[
            Some(Command::Fit),
            Some(Command::Nearer),
            Some(Command::Farther),
            None,
            Some(Command::Places),
            Some(Command::Findings),
            Some(Command::Dim),
        ],
    ),
];

impl Command {
    /// What a menu calls it; for undo and redo with the name of the step.
    pub fn words(&self, session: &Session) -> Cow<'static, str> {
        let named = |verb: &str, step: Option<&str>| match step {
            Some(step) => Cow::Owned(format!("{verb}: {}", lower_first(step))),
            None => Cow::Owned(verb.to_owned()),
        };
        let words = match self {
            Command::New => "New",
            Command::Open => "Open…",
            Command::Save => "Save",
            Command::SaveAs => "Save as…",
            Command::SaveFigure => "Save figure…",
            Command::FigureStyle => {
                return Cow::Owned(format!("Figure style: {}", session.figure().style.name));
            }
            Command::FigureDescriptors if session.figure().descriptors => {
                "Figure: with descriptors"
            }
            Command::FigureDescriptors => "Figure: without descriptors",
            Command::Close => "Close",
            Command::Undo => return named("Undo", session.undo_name()),
            Command::Redo => return named("Redo", session.redo_name()),
            Command::SelectAll => "Select all",
            Command::Deselect => "Select nothing",
            Command::NextAtom => "Next atom",
            Command::PreviousAtom => "Previous atom",
            Command::NextBond => "Next bond",
            Command::PreviousBond => "Previous bond",
            Command::Delete => "Delete",
            Command::Raise => "Raise the wide end",
            Command::Lower => "Lower the wide end",
            Command::Swap => "Swap the narrow end",
            Command::ClearMarks => "Clear marks",
            Command::GoToLine => "Type what it must carry",
            Command::MakeItCarry => "Make it carry",
            Command::Fit => "Whole drawing",
            Command::Nearer => "Nearer",
            Command::Farther => "Farther",
            Command::Dim => "Light or dark desk",
            Command::Places => "Places",
            Command::Findings => "Findings",
            Command::NextFinding => "Next finding",
            Command::PreviousFinding => "Previous finding",
            Command::MendAll => MEND_ALL,
            Command::ChooseFinding(_) => "Choose a finding",
            Command::ToggleGrade(_) => "Show or hide a grade",
            Command::Mend(_) => "Mend",
            Command::Step(name, _) => return Cow::Owned(name.clone()),
            Command::Ask(_) => "Ask",
            Command::Settle => "Settle",
            Command::Select(_) => "Select",
        };
        Cow::Borrowed(words)
    }

    /// Its keys, if it has some.
    pub fn shortcut(&self) -> Option<Shortcut> {
        Some(match self {
            Command::New => ctrl("N"),
            Command::Open => ctrl("O"),
            Command::Save => ctrl("S"),
            Command::SaveAs => ctrl_shift("S"),
            Command::SaveFigure => ctrl_shift("F"),
            Command::Close => ctrl("W"),
            Command::Undo => ctrl("Z"),
            Command::Redo => ctrl_shift("Z"),
            Command::SelectAll => ctrl("A"),
            Command::Deselect => plain("Escape"),
            Command::NextAtom => plain("PageDown"),
            Command::PreviousAtom => plain("PageUp"),
            Command::NextBond => shift("PageDown"),
            Command::PreviousBond => shift("PageUp"),
            Command::Delete => plain("Delete"),
            Command::Raise => plain("Up"),
            Command::Lower => plain("Down"),
            Command::Swap => plain("Left"),
            Command::GoToLine => ctrl("L"),
            Command::MakeItCarry => ctrl("Enter"),
            Command::Fit => ctrl("0"),
            Command::Nearer => ctrl("Plus"),
            Command::Farther => ctrl("Minus"),
            Command::Dim => ctrl("D"),
            Command::Places => ctrl("P"),
            Command::Findings => ctrl("F"),
            Command::NextFinding => ctrl("PageDown"),
            Command::PreviousFinding => ctrl("PageUp"),
            Command::MendAll => ctrl_shift("M"),
            Command::ClearMarks
            | Command::FigureStyle
            | Command::FigureDescriptors
            | Command::Step(..)
            | Command::Ask(_)
            | Command::Settle
            | Command::ChooseFinding(_)
            | Command::ToggleGrade(_)
            | Command::Mend(_)
            | Command::Select(_) => return None,
        })
    }

    /// What it does, in a sentence.
    pub fn help(&self) -> &'static str {
        match self {
            Command::New => "An empty sheet",
            Command::Open => "A molfile or SDF; dropping a file on the window does the same",
            Command::Save => "Writes the molfile",
            Command::SaveAs => "Writes the molfile to another place",
            Command::SaveFigure => "Writes the picture as SVG, PDF or PNG, by the name's ending",
            Command::FigureStyle => {
                "Changes the measures: journal, patent, record, screen; the width in print follows"
            }
            Command::FigureDescriptors => "Writes locants and descriptors into the figure, or not",
            Command::Close => "Asks first if something is not saved",
            Command::Undo => "Takes the last step back",
            Command::Redo => "Makes the step again",
            Command::SelectAll => "Selects every atom and bond",
            Command::Deselect => "Selects nothing",
            Command::NextAtom | Command::PreviousAtom => "Steps through the atoms by number",
            Command::NextBond | Command::PreviousBond => "Steps through the bonds by number",
            Command::Delete => "Removes what is selected",
            Command::Raise => "Solid wedge on the selected bond; again: plain",
            Command::Lower => "Hashed wedge on the selected bond; again: plain",
            Command::Swap => "The wedge of the selected bond starts at its other end",
            Command::ClearMarks => "Plain bonds, within the selection if there is one",
            Command::GoToLine => "To the line of stereodescriptors, such as (1R,2S)",
            Command::MakeItCarry => "Sets the marks so that the drawing carries the line",
            Command::Fit => "Shows the whole drawing",
            Command::Nearer => "Enlarges the view",
            Command::Farther => "Reduces the view",
            Command::Dim => "Changes between a light and a dark desk; the paper stays white",
            Command::Places => "Shows or folds the list of stereogenic places",
            Command::Findings => "Shows or folds the list of what a reader could take wrongly",
            Command::NextFinding | Command::PreviousFinding => {
                "Steps through the findings that are shown"
            }
            Command::MendAll => "Draws better what can be, without a change of meaning",
            Command::Step(..)
            | Command::Ask(_)
            | Command::Settle
            | Command::ChooseFinding(_)
            | Command::ToggleGrade(_)
            | Command::Mend(_)
            | Command::Select(_) => "",
        }
    }

    /// Whether it can do something now.
    pub fn enabled(&self, session: &Session) -> bool {
        let bond = || effects::wedgeable(session);
        match self {
            Command::Undo => session.undo_name().is_some(),
            Command::Redo => session.redo_name().is_some(),
            Command::SelectAll | Command::Fit | Command::SaveFigure => {
                session.drawing().molecule().n_atoms() > 0
            }
            Command::NextAtom | Command::PreviousAtom => session.drawing().molecule().n_atoms() > 0,
            Command::NextBond | Command::PreviousBond => session.drawing().molecule().n_bonds() > 0,
            Command::Deselect | Command::Delete => !session.selection().is_empty(),
            Command::Raise | Command::Lower => bond().is_some(),
            Command::Swap => bond().is_some_and(|b| session.drawing().mark(b).narrow().is_some()),
            Command::ClearMarks => session.drawing().marks().iter().any(|m| *m != Mark::Plain),
            Command::MakeItCarry => session.can_carry(),
            Command::NextFinding | Command::PreviousFinding => {
                session.shown_findings().next().is_some()
            }
            Command::MendAll => session.can_mend_all() && !session.is_mending(),
            _ => true,
        }
    }

    /// What the window must do for it, if it is not the document that changes.
    fn errand(&self) -> Option<Errand> {
        Some(match self {
            Command::New => Errand::New,
            Command::Open => Errand::Open,
            Command::Save => Errand::Save,
            Command::SaveAs => Errand::SaveAs,
            Command::SaveFigure => Errand::SaveFigure,
            Command::Close => Errand::Close,
            Command::GoToLine => Errand::GoToLine,
            Command::Fit => Errand::Fit,
            Command::Nearer => Errand::Zoom(true),
            Command::Farther => Errand::Zoom(false),
            Command::Dim => Errand::Dim,
            Command::Places => Errand::Places,
            Command::Findings => Errand::Findings,
            _ => return None,
        })
    }

    /// Does it, or says what the window must do.
    pub fn run(self, session: &mut Session) -> Effect {
        if let Some(errand) = self.errand() {
            return Effect::Errand(errand);
        }
        match self {
            Command::Undo => session.undo(),
            Command::Redo => session.redo(),
            Command::SelectAll => {
                let all = Selection::all(session.drawing());
                session.select(all);
            }
            Command::Deselect => session.select(Selection::default()),
            Command::Select(selection) => session.select(selection),
            Command::NextAtom => effects::walk_atoms(session, true),
            Command::PreviousAtom => effects::walk_atoms(session, false),
            Command::NextBond => effects::walk_bonds(session, true),
            Command::PreviousBond => effects::walk_bonds(session, false),
            Command::Ask(text) => session.ask(&text),
            Command::Settle => session.settle(),
            Command::MakeItCarry => session.make_it_carry(),
            Command::NextFinding => session.step_finding(true),
            Command::PreviousFinding => session.step_finding(false),
            Command::ChooseFinding(i) => session.choose_finding(i),
            Command::ToggleGrade(grade) => session.toggle_grade(grade),
            Command::MendAll => session.mend_all(),
            Command::Mend(offer) => return effects::mend(session, offer),
            Command::FigureStyle => session.next_figure_style(),
            Command::FigureDescriptors => session.toggle_figure_descriptors(),
            Command::Delete => return effects::delete(session),
            Command::Raise => return effects::wedge(session, "Raise the wide end", Mark::Solid),
            Command::Lower => return effects::wedge(session, "Lower the wide end", Mark::Hashed),
            Command::Swap => return effects::swap(session),
            Command::ClearMarks => return effects::clear_marks(session),
            Command::Step(name, edits) => return effects::step(session, &name, &edits),
            // errands, done above
            _ => {}
        }
        Effect::Done
    }
}

fn lower_first(words: &str) -> String {
    let mut letters = words.chars();
    match letters.next() {
        Some(first) => first.to_lowercase().chain(letters).collect(),
        None => String::new(),
    }
}
