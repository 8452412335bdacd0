//! What commands leave to the window: files, dialogs, questions, the view.

use super::Window;
use super::dialogs::{Choice, Dialog, Purpose};
use super::prompts::{self, Keep, Next, PathField, Typed};
use super::search::Search;
use crate::command::Errand;
use crate::figure::{self, Form, Options};
use crate::files;
use crate::session::Session;
use egui::{Context, Theme, Ui, ViewportCommand};
use std::path::{Path, PathBuf};

impl Window {
    pub(super) fn errand(&mut self, errand: Errand, ctx: &Context) {
        match errand {
            Errand::New => self.go(Next::New, ctx),
            Errand::Open => self.go(Next::Choose, ctx),
            Errand::Close => self.go(Next::Close, ctx),
            Errand::Save => self.save(ctx),
            Errand::SaveAs => self.choose(Purpose::Save, ctx),
            Errand::SaveFigure => self.choose(Purpose::Figure, ctx),
            Errand::GoToLine => self.band.focus(),
            Errand::Fit => self.sheet.fit(),
            Errand::Zoom(nearer) => self.sheet.step_zoom(nearer, &self.session),
            Errand::Dim => {
                let dark = ctx.theme() == Theme::Dark;
                ctx.set_theme(if dark { Theme::Light } else { Theme::Dark });
            }
            Errand::Places => self.show_places = !self.show_places,
            Errand::Findings => self.show_findings = !self.show_findings,
        }
    }

    /// Goes on, or asks first if work would be lost.
    fn go(&mut self, next: Next, ctx: &Context) {
        self.session.settle();
        if self.session.is_dirty() {
            self.asking = Some(next);
        } else {
            self.go_on(next, ctx);
        }
    }

    fn go_on(&mut self, next: Next, ctx: &Context) {
        match next {
            Next::New => self.replace(Session::empty()),
            Next::Choose => self.choose(Purpose::Open, ctx),
            Next::Open(path) => match Session::open(&path) {
                Ok(session) => self.replace(session),
                Err(e) => self.complain(e.to_string()),
            },
            Next::Close => {
                self.closing = true;
                ctx.send_viewport_cmd(ViewportCommand::Close);
            }
        }
    }

    fn replace(&mut self, session: Session) {
        self.session = session;
        self.sheet.forget();
        self.band.forget();
        self.graft = None;
        self.mending = None;
        // what is worked out for the last document must not be taken for an answer to this one
        self.search = Search::default();
        self.audit = Search::default();
        self.notice = None;
        self.tell_notice();
    }

    fn save(&mut self, ctx: &Context) {
        match self.session.path().map(Path::to_owned) {
            Some(path) => self.save_to(&path, ctx),
            None => self.choose(Purpose::Save, ctx),
        }
    }

    fn save_to(&mut self, path: &Path, ctx: &Context) {
        match self.session.save(path) {
            Ok(()) => {
                self.notice = None;
                self.tell_notice();
                if let Some(next) = self.after_save.take() {
                    self.go_on(next, ctx);
                }
            }
            Err(e) => {
                self.after_save = None;
                self.complain(e.to_string());
            }
        }
    }

    /// Writes the figure as the menu says and tells what was written.
    fn save_figure(&self, path: &Path) -> Result<String, String> {
        let choice = self.session.figure();
        let options = Options {
            form: Form::of(path).map_err(|e| e.to_string())?,
            style: choice.style,
            width: None,
            dpi: figure::DPI,
        };
        let (session, report) = (&self.session, self.session.report());
        let ink = figure::ink(session.drawing(), report, options.style, choice.descriptors);
        let bytes = figure::write(&ink, &session.name(), report, &options)
            .map_err(|e| format!("{}: {e}", path.display()))?;
        files::write(path, &bytes).map_err(|e| e.to_string())?;
        let width = figure::width_mm(&ink, choice.style);
        let warning =
            figure::too_wide(&ink, choice.style).map_or_else(String::new, |w| format!("; {w}"));
        Ok(format!(
            "{} saved, style {}, {width:.0} mm wide{warning}. Have it checked by a second person before it is filed or released",
            path.display(),
            choice.style.name
        ))
    }

    fn choose(&mut self, purpose: Purpose, ctx: &Context) {
        if self.typed_paths {
            self.type_path(purpose, false);
        } else if self.dialog.is_none() {
            let near = self.suggestion(purpose);
            self.dialog = Some(Dialog::open(purpose, Some(&near), ctx));
        }
    }

    fn type_path(&mut self, purpose: Purpose, no_dialog: bool) {
        let text = match purpose {
            Purpose::Open => String::new(),
            Purpose::Save | Purpose::Figure => {
                self.suggestion(purpose).to_string_lossy().into_owned()
            }
        };
        let own = match purpose {
            Purpose::Save => self.session.path().map(Path::to_owned),
            Purpose::Open | Purpose::Figure => None,
        };
        self.path_field = Some(PathField::new(purpose, text, own, no_dialog));
    }

    /// A path to begin with: that of the document, with the ending that fits.
    fn suggestion(&self, purpose: Purpose) -> PathBuf {
        let ending = purpose.ending();
        match self.session.path() {
            Some(path) if purpose != Purpose::Figure => path.to_owned(),
            Some(path) => path.with_extension(ending),
            None => {
                let safe = |c: char| {
                    if c.is_alphanumeric() || "-_.".contains(c) {
                        c
                    } else {
                        '-'
                    }
                };
                let name: String = self
                    .session
                    .name()
                    .to_lowercase()
                    .chars()
                    .map(safe)
                    .collect();
                PathBuf::from(format!("{name}.{ending}"))
            }
        }
    }

    fn chosen(&mut self, purpose: Purpose, path: PathBuf, ctx: &Context) {
        match purpose {
            Purpose::Open => self.go_on(Next::Open(path), ctx),
            Purpose::Save => self.save_to(&purpose.complete(path), ctx),
            Purpose::Figure => match self.save_figure(&purpose.complete(path)) {
                Ok(text) => self.tell(text),
                Err(text) => self.complain(text),
            },
        }
    }

    /// What came in since the last frame: answers, chosen files, dropped files, a wish to close.
    pub(super) fn arrivals(&mut self, ctx: &Context) {
        self.take_answers(false, ctx);
        if let Some(choice) = self.dialog.as_ref().and_then(Dialog::poll)
            && let Some(dialog) = self.dialog.take()
        {
            match choice {
                Choice::File(path) => self.chosen(dialog.purpose, path, ctx),
                Choice::Cancelled => self.after_save = None,
                Choice::NoDialog => {
                    self.typed_paths = true;
                    self.type_path(dialog.purpose, true);
                }
            }
        }
        let dropped = ctx.input(|i| {
            let first = i.raw.dropped_files.first();
            first.map(|f| f.path().to_owned())
        });
        if let Some(path) = dropped {
            self.go(Next::Open(path), ctx);
        }
        if ctx.input(|i| i.viewport().close_requested()) && !self.closing {
            self.session.settle();
            if self.session.is_dirty() {
                ctx.send_viewport_cmd(ViewportCommand::CancelClose);
                self.asking = Some(Next::Close);
            }
        }
    }

    /// Hands answers of searches to the session.
    pub(super) fn take_answers(&mut self, patient: bool, ctx: &Context) {
        while let Some(answer) = self.search.poll(patient, ctx) {
            self.session.answer(answer);
        }
    }

    /// Hands what an audit found to the session, and a changed drawing to the next audit. Nothing waits.
    pub(super) fn look(&mut self, ctx: &Context) {
        while let Some(seen) = self.audit.poll(false, ctx) {
            self.session.seen(seen);
        }
        if self.audit.is_idle() {
            self.session.looked_in_vain();
        }
        if let Some(look) = self.session.take_look() {
            self.audit.give(look, ctx);
        }
    }

    /// Shows the question or the path to type, and does what is answered.
    pub(super) fn prompts(&mut self, ui: &Ui) {
        let ctx = ui.ctx().clone();
        if let Some(next) = self.asking.clone()
            && let Some(keep) = prompts::keep(ui, &self.session.name())
        {
            self.asking = None;
            match keep {
                Keep::Stay => {}
                Keep::Drop => self.go_on(next, &ctx),
                Keep::Save => {
                    self.after_save = Some(next);
                    self.save(&ctx);
                }
            }
            return;
        }
        let Some(field) = &mut self.path_field else {
            return;
        };
        let purpose = field.purpose;
        match field.show(&ctx, ui) {
            Typed::Open => {}
            Typed::Cancelled => {
                self.path_field = None;
                self.after_save = None;
            }
            Typed::Path(path) => {
                self.path_field = None;
                self.chosen(purpose, path, &ctx);
            }
        }
    }
}
