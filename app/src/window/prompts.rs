//! Questions that must be answered before anything else: unsaved work, and a path to type.

use super::dialogs::Purpose;
use super::signs;
use super::theme::{self, Colors, GRID, TEXT};
use chem::pipeline::Verdict;
use egui::{Button, Context, Frame, Id, Key, Margin, Modal, RichText, Stroke, TextEdit, Ui, vec2};
use std::path::PathBuf;

/// What is to be done once nothing can be lost.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) enum Next {
    /// An empty sheet.
    New,
    /// Choose a file to open.
    Choose,
    /// Open this file.
    Open(PathBuf),
    /// Close the window.
    Close,
}

/// Answer to the question about unsaved work.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Keep {
    /// Save first.
    Save,
    /// Go on without saving.
    Drop,
    /// Do not go on.
    Stay,
}

fn frame(ui: &Ui) -> Frame {
    let colors = Colors::of(ui);
    Frame::new()
        .fill(colors.field)
        .stroke(Stroke::new(1.0, colors.hairline))
        .corner_radius(4)
        .inner_margin(Margin::same(24))
}

fn quiet(ui: &mut Ui, words: &str) -> egui::Response {
    ui.add(Button::new(words).min_size(vec2(88.0, 32.0)))
}

/// Asks whether unsaved work is to be kept.
pub(super) fn keep(ui: &Ui, name: &str) -> Option<Keep> {
    let mut answer = None;
    let modal = Modal::new(Id::unique("unsaved"))
        .frame(frame(ui))
        .show(ui.ctx(), |ui| {
            ui.set_width(380.0);
            ui.label(
                RichText::new(format!("{name} has changes that are not saved"))
                    .font(theme::bold(TEXT + 1.0)),
            );
            ui.add_space(2.0 * GRID);
            ui.horizontal(|ui| {
                let save = theme::filled(ui, "Save", 88.0);
                if ui.memory(|m| m.focused().is_none()) {
                    save.request_focus();
                }
                if save.clicked() {
                    answer = Some(Keep::Save);
                }
                if quiet(ui, "Leave without saving").clicked() {
                    answer = Some(Keep::Drop);
                }
                if quiet(ui, "Cancel").clicked() {
                    answer = Some(Keep::Stay);
                }
            });
        });
    if answer.is_none() && modal.should_close() {
        return Some(Keep::Stay);
    }
    answer
}

/// A path that is typed, where the platform shows no dialog.
#[derive(Debug)]
pub(super) struct PathField {
    pub(super) purpose: Purpose,
    text: String,
    fresh: bool,
    /// Whether the reason is to be told.
    no_dialog: bool,
    /// The document's own path, which may be replaced without asking.
    own: Option<PathBuf>,
    /// A file that is there already: the next Enter replaces it.
    replaces: Option<PathBuf>,
}

/// How the typed path ended.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) enum Typed {
    Open,
    Path(PathBuf),
    Cancelled,
}

impl PathField {
    pub(super) fn new(
        purpose: Purpose,
        text: String,
        own: Option<PathBuf>,
        no_dialog: bool,
    ) -> PathField {
        PathField {
            purpose,
            text,
            fresh: true,
            no_dialog,
            own,
            replaces: None,
        }
    }

    /// The path to go on with; a file that would be lost must be asked for twice.
    fn take(&mut self) -> Option<PathBuf> {
        let typed = self.text.trim();
        if typed.is_empty() {
            return None;
        }
        let path = self.purpose.complete(PathBuf::from(typed));
        let writes = self.purpose != Purpose::Open;
        let asked = self.replaces.as_ref() == Some(&path);
        if writes && !asked && self.own.as_ref() != Some(&path) && path.exists() {
            self.replaces = Some(path);
            self.fresh = true;
            return None;
        }
        Some(path)
    }

    fn verb(&self) -> &'static str {
        if self.replaces.is_some() {
            "Replace"
        } else {
            self.purpose.verb()
        }
    }

    pub(super) fn show(&mut self, ctx: &Context, ui: &Ui) -> Typed {
        let colors = Colors::of(ui);
        let mut result = Typed::Open;
        let modal = Modal::new(Id::unique("path"))
            .frame(frame(ui))
            .show(ctx, |ui| {
                ui.set_width(520.0);
                ui.label(RichText::new(self.purpose.title()).font(theme::bold(TEXT + 1.0)));
                if self.no_dialog {
                    let text = "This desktop offers no file dialog, so the path is typed here";
                    ui.label(RichText::new(text).small().color(colors.muted));
                }
                ui.add_space(GRID);
                let label = ui.label(RichText::new("file path").small().color(colors.muted));
                let field = ui
                    .add(
                        TextEdit::singleline(&mut self.text)
                            .desired_width(f32::INFINITY)
                            .margin(Margin::symmetric(8, 6)),
                    )
                    .labelled_by(label.id);
                if std::mem::take(&mut self.fresh) {
                    field.request_focus();
                }
                let entered = field.lost_focus() && ui.input(|i| i.key_pressed(Key::Enter));
                if field.changed() {
                    self.replaces = None;
                }
                if let Some(path) = &self.replaces {
                    ui.horizontal(|ui| {
                        signs::show(ui, Verdict::Open);
                        let text = format!("{} is there already", path.display());
                        ui.label(RichText::new(text).color(colors.verdict(Verdict::Open)));
                    });
                }
                ui.add_space(2.0 * GRID);
                ui.horizontal(|ui| {
                    let go = theme::filled(ui, self.verb(), 88.0).clicked() || entered;
                    if go && let Some(path) = self.take() {
                        result = Typed::Path(path);
                    }
                    if quiet(ui, "Cancel").clicked() {
                        result = Typed::Cancelled;
                    }
                });
            });
        if result == Typed::Open && modal.should_close() {
            result = Typed::Cancelled;
        }
        result
    }
}
