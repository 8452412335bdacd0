//! The window: egui and nothing else.
//!
//! Panels read the [`Session`] and send [`Command`]s; they are run here, after everything has been
//! shown, so that no panel sees a document that another one has just changed.

mod band;
mod bars;
mod demo;
mod dialogs;
mod errands;
mod findings;
mod graft;
mod paint;
mod pen;
mod places;
mod prompts;
mod search;
mod sheet;
mod signs;
mod theme;

use crate::command::{Command, Effect, MENUS, Shortcut, ctrl, plain};
use crate::session::{Look, Offer, Session, Work};
use chem::drawing::Drawing;
use chem::pipeline::Verdict;
use dialogs::Dialog;
use egui::{CentralPanel, Context, Event, Frame, Key, Margin, Modifiers, Panel, Ui};
use graft::{Entry, Outcome};
use prompts::{Next, PathField};
use search::Search;
use sheet::{Ghost, Sheet};
use std::path::PathBuf;
use theme::{Colors, GRID};

/// Why there is no window.
#[derive(Debug, thiserror::Error)]
pub enum WindowError {
    /// The platform gave none.
    #[error(
        "no window could be opened: {0}; the verbs of the command line (labels, place, figure ...) work without one"
    )]
    NoDisplay(String),
    /// The file named at the start cannot be opened.
    #[error(transparent)]
    File(#[from] crate::files::FileError),
}

/// Something to tell the person, in a strip over the status line.
#[derive(Clone, Debug)]
struct Notice {
    verdict: Verdict,
    text: String,
}

/// The window and the document in it.
#[derive(Debug)]
pub struct Window {
    session: Session,
    sheet: Sheet,
    band: band::Band,
    graft: Option<Entry>,
    search: Search<Work>,
    audit: Search<Look>,
    /// The mend that the pointer or the focus is on, with the drawing that it would leave.
    mending: Option<(Offer, Drawing)>,
    dialog: Option<Dialog>,
    path_field: Option<PathField>,
    /// Asks about unsaved work before this.
    asking: Option<Next>,
    /// Goes on with this once saved.
    after_save: Option<Next>,
    notice: Option<Notice>,
    show_places: bool,
    show_findings: bool,
    typed_paths: bool,
    dressed: bool,
    closing: bool,
    title: String,
}

impl Window {
    /// A window on a document.
    pub fn new(session: Session) -> Window {
        let mut window = Window {
            session,
            sheet: Sheet::new(),
            band: band::Band::default(),
            graft: None,
            search: Search::default(),
            audit: Search::default(),
            mending: None,
            dialog: None,
            path_field: None,
            asking: None,
            after_save: None,
            notice: None,
            show_places: true,
            show_findings: true,
            typed_paths: false,
            dressed: false,
            closing: false,
            title: String::new(),
        };
        window.tell_notice();
        window
    }

    /// A window on the drawing that a new window opens on.
    pub fn demo() -> Window {
        Window::new(demo::session().unwrap_or_else(|e| {
            log::error!("the first drawing: {e}");
            Session::empty()
        }))
    }

    /// Never asks the platform for a dialog: paths are typed in the window.
    #[must_use]
    pub fn with_typed_paths(mut self) -> Window {
        self.typed_paths = true;
        self
    }

    /// The document.
    pub fn session(&self) -> &Session {
        &self.session
    }

    /// Where an atom is on the screen, as last shown; `None` if there is no such atom.
    pub fn screen_of(&self, atom: chem::molecule::AtomIx) -> Option<egui::Pos2> {
        let point = self.session.drawing().points().get(atom.index())?;
        Some(self.sheet.view.to_screen(*point))
    }

    /// Whether the drawing that a mend would leave is shown over the present one.
    pub fn shows_mend(&self) -> bool {
        self.mending.is_some() && self.graft.is_none()
    }

    fn tell_notice(&mut self) {
        let text = self.session.notice();
        if !text.is_empty() {
            self.notice = Some(Notice {
                verdict: Verdict::Open,
                text: text.to_owned(),
            });
        }
    }

    fn tell(&mut self, text: String) {
        self.notice = Some(Notice {
            verdict: Verdict::NotAsked,
            text,
        });
    }

    fn complain(&mut self, text: String) {
        self.notice = Some(Notice {
            verdict: Verdict::Opposite,
            text,
        });
    }

    /// Shows everything and does what was asked for.
    pub fn show(&mut self, ui: &mut Ui) {
        let ctx = ui.ctx().clone();
        if !std::mem::replace(&mut self.dressed, true) {
            // the faces are there from the next frame on
            theme::dress(&ctx);
            ctx.request_repaint();
            return;
        }
        let mut out = Vec::new();
        self.arrivals(&ctx);
        let free = self.asking.is_none() && self.path_field.is_none();
        if free && self.graft.is_none() {
            self.keys(ui, &mut out);
        }
        self.panels(ui, &mut out);
        self.prompts(ui);
        for command in out {
            self.run(command, &ctx);
        }
        if let Some(work) = self.session.take_work() {
            self.search.give(work, &ctx);
            self.take_answers(true, &ctx);
            ctx.request_repaint();
        }
        self.look(&ctx);
        self.window_title(&ctx);
    }

    fn panels(&mut self, ui: &mut Ui, out: &mut Vec<Command>) {
        let colors = Colors::of(ui);
        let desk = |margin| Frame::new().fill(colors.desk).inner_margin(margin);
        Panel::top("menus")
            .frame(desk(Margin::symmetric(22, 2)))
            .show(ui, |ui| bars::menus(ui, &self.session, out));
        Panel::top("band")
            .frame(desk(Margin {
                left: 24,
                right: 24,
                top: 10,
                bottom: 4,
            }))
            .show(ui, |ui| self.band.show(ui, &self.session, out));
        Panel::bottom("status")
            .frame(desk(Margin::symmetric(24, 6)))
            .show(ui, |ui| bars::status(ui, &self.session, &self.sheet));
        if let Some(notice) = &self.notice {
            let close = Panel::bottom("notice")
                .frame(desk(Margin::symmetric(24, 8)))
                .show(ui, |ui| bars::notice(ui, notice.verdict, &notice.text))
                .inner;
            if close {
                self.notice = None;
            }
        }
        let with_column = self.show_places || self.show_findings;
        let offer = if with_column {
            self.column(ui, desk, out)
        } else {
            None
        };
        self.offer(offer);
        CentralPanel::default_margins()
            .frame(desk(Margin {
                left: 24,
                right: if with_column { 2 } else { 24 },
                top: 2 * GRID as i8,
                bottom: 2 * GRID as i8,
            }))
            .show(ui, |ui| self.sheet_and_graft(ui, out));
    }

    /// Places and findings; gives the mend that the pointer or the focus is on.
    fn column(
        &self,
        ui: &mut Ui,
        desk: impl Fn(Margin) -> Frame,
        out: &mut Vec<Command>,
    ) -> Option<Offer> {
        let width = (ui.available_width() * 0.33).clamp(264.0, 320.0);
        let side = if width < 320.0 { 14 } else { 24 };
        let show = |ui: &mut Ui| {
            if self.show_findings {
                findings::column(ui, &self.session, self.show_places, out)
            } else {
                places::show(ui, &self.session, true, out);
                None
            }
        };
        let panel = Panel::right("places")
            .frame(desk(Margin::symmetric(side, 20)))
            .resizable(false)
            .show_separator_line(false)
            .exact_size(width);
        panel.show(ui, show).inner
    }

    /// Keeps the drawing that a mend would leave, to be shown over the one before.
    fn offer(&mut self, offer: Option<Offer>) {
        if self.mending.as_ref().map(|(of, _)| *of) == offer {
            return;
        }
        let after = |offer| Some((offer, self.session.after_mend(offer)?));
        self.mending = offer.and_then(after);
    }

    fn sheet_and_graft(&mut self, ui: &mut Ui, out: &mut Vec<Command>) {
        let ghost = self.graft.as_ref().and_then(|g| g.ghost(&self.session));
        let shown = match (&ghost, &self.mending) {
            (Some(after), _) => Some(Ghost::Instead(after)),
            (None, Some((_, after))) => Some(Ghost::Over(after)),
            (None, None) => None,
        };
        let before = out.len();
        let response = self.sheet.show(ui, &self.session, shown, out);
        if out.len() > before {
            self.graft = None;
        }
        let Some(entry) = &mut self.graft else {
            return;
        };
        let after = ghost.as_ref().unwrap_or(self.session.drawing());
        match entry.show(ui, &self.session, after, &self.sheet.view, response.rect) {
            Outcome::Open => {}
            Outcome::Dropped => {
                self.graft = None;
                response.request_focus();
            }
            Outcome::Taken(step, then) => {
                self.graft = None;
                response.request_focus();
                out.push(step);
                out.extend(then.map(Command::Select));
            }
        }
    }

    /// Shortcuts, and letters typed on the sheet.
    fn keys(&mut self, ui: &Ui, out: &mut Vec<Command>) {
        let on_sheet = self.sheet.has_keys(ui.ctx()) && !egui::Popup::is_any_open(ui.ctx());
        let busy = self.sheet.is_busy();
        for (_, menu) in MENUS {
            for command in menu.iter().flatten() {
                let Some(shortcut) = command.shortcut() else {
                    continue;
                };
                let plain = !shortcut.ctrl;
                let selects_all = *command == Command::SelectAll;
                if (plain || selects_all) && (!on_sheet || busy) {
                    continue;
                }
                // a key pressed twice within a frame counts twice
                for _ in 0..pressed(ui, command, shortcut) {
                    if command.enabled(&self.session) {
                        out.push(command.clone());
                    }
                }
            }
        }
        let starts = self.session.drawing().molecule().n_atoms() == 0;
        let may = !self.session.selection().is_empty() || starts;
        if on_sheet
            && may
            && !busy
            && out.is_empty()
            && let Some(text) = graft::typed(ui)
        {
            self.graft = Some(Entry::open(text));
        }
    }

    /// Does a command, and what it leaves to the window.
    fn run(&mut self, command: Command, ctx: &Context) {
        let typed = matches!(command, Command::Ask(_) | Command::Settle);
        match command.run(&mut self.session) {
            Effect::Done => {}
            Effect::Errand(errand) => self.errand(errand, ctx),
            Effect::Refused(text) => self.complain(text),
        }
        if !typed {
            self.band.forget();
        }
    }

    fn window_title(&mut self, ctx: &Context) {
        let mark = if self.session.is_dirty() { "• " } else { "" };
        let title = format!("{mark}{} — Wedgewright", self.session.name());
        if title != self.title {
            self.title.clone_from(&title);
            ctx.send_viewport_cmd(egui::ViewportCommand::Title(title));
        }
    }
}

/// How often the keys of a command, or other keys that mean the same, were pressed; they are used up.
fn pressed(ui: &Ui, command: &Command, shortcut: Shortcut) -> usize {
    let mut keys = vec![shortcut];
    match command {
        Command::Redo => keys.push(ctrl("Y")),
        Command::Delete => keys.push(plain("Backspace")),
        Command::Swap => keys.push(plain("Right")),
        Command::Nearer => keys.push(ctrl("Equals")),
        _ => {}
    }
    let count = |s: Shortcut| {
        let Some(key) = Key::from_name(s.key) else {
            return 0;
        };
        // the modifiers of the event count: those of the frame may be released already
        let meant = |m: Modifiers| {
            let any_shift = matches!(s.key, "Plus" | "Equals");
            m.command == s.ctrl && !m.alt && (any_shift || m.shift == s.shift)
        };
        ui.input_mut(|i| {
            let before = i.events.len();
            i.events.retain(|e| {
                !matches!(e, Event::Key { key: k, pressed: true, modifiers, .. }
                    if *k == key && meant(*modifiers))
            });
            before - i.events.len()
        })
    };
    keys.into_iter().map(count).sum()
}

impl eframe::App for Window {
    fn ui(&mut self, ui: &mut Ui, _frame: &mut eframe::Frame) {
        self.show(ui);
    }
}

/// Opens the window, on a file or on the first drawing, and stays until it is closed.
///
/// # Errors
/// If the file cannot be opened or the platform gives no window.
pub fn run(path: Option<PathBuf>) -> Result<(), WindowError> {
    let window = match path {
        Some(path) => Window::new(Session::open(&path)?),
        None => Window::demo(),
    };
    if !dialogs::listen() {
        log::debug!("the log is in other hands; dialogs that end at once count as failed");
    }
    let options = eframe::NativeOptions {
        multisampling: 4,
        viewport: egui::ViewportBuilder::default()
            .with_app_id("wedgewright")
            .with_title("Wedgewright")
            .with_inner_size([1280.0, 800.0])
            .with_min_inner_size([720.0, 480.0]),
        ..eframe::NativeOptions::default()
    };
    let create: eframe::AppCreator<'_> = Box::new(|_| Ok(Box::new(window)));
    eframe::run_native("wedgewright", options, create)
        .map_err(|e| WindowError::NoDisplay(reason(&e)))
}

/// What the platform said, without the places in its source that it says it from.
fn reason(error: &eframe::Error) -> String {
    let text = error.to_string();
    let last = text.rsplit(".rs:").next().unwrap_or(&text);
    let plain = last.trim_start_matches(|c: char| c.is_ascii_digit() || ": ".contains(c));
    plain.trim_end_matches('.').to_owned()
}
