//! The sheet: white paper, one pen, no modes.

mod gesture;
mod overlay;
mod view;

pub(super) use view::{View, beside};

use super::paint::{Triangles, word_boxes};
use super::theme::{self, Colors};
use crate::command::Command;
use crate::figure;
use crate::session::{Selection, Session};
use chem::drawing::Drawing;
use chem::ink::{self, Caption, Ink, POINTS_PER_MM, Part, Style, Tone};
use chem::pipeline::{Report, Verdict};
use egui::{
    CornerRadius, EventFilter, Rect, Response, Role, Sense, Stroke, StrokeKind, Ui, WidgetInfo,
};
use gesture::Gesture;

/// The drawing composed, for one revision.
#[derive(Debug)]
struct Composed {
    revision: u64,
    style: &'static str,
    /// Box of the figure as it is printed, without locants and descriptors, in points.
    page: kurbo::Rect,
    /// Boxes of labels and captions, in points.
    words: Vec<kurbo::Rect>,
    ink: Ink,
    triangles: Triangles,
}

/// A drawing that may come, its new parts in the accent.
#[derive(Clone, Copy, Debug)]
pub(super) enum Ghost<'a> {
    /// Shown instead of the one that is there.
    Instead(&'a Drawing),
    /// Shown over the one that is there, whose parts that would go are faint.
    Over(&'a Drawing),
}

/// The view and what the pointer is doing.
#[derive(Debug)]
pub(super) struct Sheet {
    pub(super) view: View,
    fit_next: bool,
    gesture: Gesture,
    composed: Option<Composed>,
    id: Option<egui::Id>,
}

impl Sheet {
    pub(super) fn new() -> Sheet {
        Sheet {
            view: View::new(),
            fit_next: true,
            gesture: Gesture::Idle,
            composed: None,
            id: None,
        }
    }

    /// Shows the whole drawing at the next frame.
    pub(super) fn fit(&mut self) {
        self.fit_next = true;
    }

    /// Another document: nothing of the last one is kept.
    pub(super) fn forget(&mut self) {
        self.composed = None;
        self.gesture = Gesture::Idle;
        self.fit_next = true;
    }

    /// Enlarges or reduces about the middle.
    pub(super) fn step_zoom(&mut self, nearer: bool, session: &Session) {
        let factor = if nearer { 1.25 } else { 0.8 };
        let center = self.view.rect().center();
        self.view
            .zoom(factor, center, session.drawing().bond_length());
    }

    /// Whether keys go to the sheet: it has the focus, or nothing has.
    pub(super) fn has_keys(&self, ctx: &egui::Context) -> bool {
        let focused = ctx.memory(|m| m.focused());
        focused.is_none() || focused == self.id
    }

    /// The measures of the figure, with captions for the screen, where the drawing stands enlarged.
    fn on_sheet(session: &Session) -> Style {
        let style = session.figure().style;
        Style {
            caption_size: 0.55 * style.font_size,
            ..style.clone()
        }
    }

    /// Width of the figure in millimetres and its scale in percent, once it has been shown.
    pub(super) fn measures(&self) -> Option<(f64, f32)> {
        let composed = self.composed.as_ref()?;
        let width = composed.page.width() / POINTS_PER_MM;
        Some((width, self.view.percent(composed.ink.points_per_unit)))
    }

    /// Shows the sheet and collects what is to be done.
    pub(super) fn show(
        &mut self,
        ui: &mut Ui,
        session: &Session,
        ghost: Option<Ghost<'_>>,
        out: &mut Vec<Command>,
    ) -> Response {
        let rect = ui.available_rect_before_wrap();
        let response = ui.allocate_rect(rect, Sense::click_and_drag());
        self.id = Some(response.id);
        let resized = self.view.rect().size() != rect.size();
        self.view.place(rect);
        if std::mem::take(&mut self.fit_next) || (resized && self.view.is_fitted()) {
            self.view.fit(session.drawing());
        }
        response.widget_info(|| {
            let mut info = WidgetInfo::labeled(Role::Canvas, true, "Sheet");
            info.current_text_value = Some(spoken(session));
            info
        });
        let filter = EventFilter {
            horizontal_arrows: true,
            vertical_arrows: true,
            ..EventFilter::default()
        };
        if response.has_focus() {
            ui.memory_mut(|m| m.set_focus_lock_filter(response.id, filter));
        }
        self.gestures(ui, &response, session, out);
        self.compose(session);
        self.paint(ui, &response, session, ghost);
        response
    }

    fn compose(&mut self, session: &Session) {
        let revision = session.revision();
        if self
            .composed
            .as_ref()
            .is_some_and(|c| c.revision == revision && c.style == session.figure().style.name)
        {
            return;
        }
        let captions = captions(session.report());
        let style = Self::on_sheet(session);
        let ink = ink::compose(session.drawing(), &style, &captions, None);
        let bare = ink::compose(session.drawing(), &style, &[], None).bounds;
        self.composed = Some(Composed {
            revision,
            style: session.figure().style.name,
            page: bare.inflate(style.page_margin, style.page_margin),
            words: word_boxes(&ink),
            triangles: Triangles::of(&ink),
            ink,
        });
    }

    fn paint(&mut self, ui: &Ui, response: &Response, session: &Session, ghost: Option<Ghost<'_>>) {
        let rect = self.view.rect();
        let desk = Colors::of(ui);
        let painter = ui.painter_at(rect.expand(3.0));
        let edge = if response.has_focus() {
            Stroke::new(1.5, desk.accent)
        } else {
            Stroke::new(1.0, desk.hairline)
        };
        let corners = CornerRadius::same(2);
        painter.rect(rect, corners, theme::PAPER, edge, StrokeKind::Outside);
        let painter = ui.painter_at(rect);
        let Some(composed) = &self.composed else {
            return;
        };
        self.frame(&painter, session, composed, ghost.is_some());
        self.selection(&painter, session);
        let moved = self.gesture.preview(session);
        let shown = moved.as_ref().map(Ghost::Instead).or(ghost);
        match shown {
            Some(Ghost::Instead(after)) => self.paint_ghost(&painter, session, after),
            Some(Ghost::Over(after)) => {
                self.paint_going(&painter, session, composed, after);
                self.paint_ghost(&painter, session, after);
            }
            None => {
                let mesh = composed
                    .triangles
                    .mesh(self.view.of_ink(&composed.ink), |_, tone| {
                        Some(theme::LIGHT.tone(tone))
                    });
                painter.add(egui::Shape::mesh(mesh));
            }
        }
        self.ranking(&painter, session, composed);
        self.pen_ghost(&painter, session, response);
    }

    /// What of the drawing would go or change, faint.
    fn paint_going(
        &self,
        painter: &egui::Painter,
        session: &Session,
        composed: &Composed,
        after: &Drawing,
    ) {
        let before = session.drawing();
        let faint = theme::LIGHT.muted.gamma_multiply(0.45);
        let to = self.view.of_ink(&composed.ink);
        let mesh = composed.triangles.mesh(to, |part, _| {
            let stays = match part {
                Part::Atom(a) => same_atom(before, after, a),
                Part::Bond(b) => same_bond(before, after, b),
                Part::Caption(_) | Part::Note => true,
            };
            (!stays).then_some(faint)
        });
        painter.add(egui::Shape::mesh(mesh));
    }

    /// A drawing as it would be: what is new or other than before in the accent.
    fn paint_ghost(&self, painter: &egui::Painter, session: &Session, after: &Drawing) {
        let before = session.drawing();
        let ink = ink::compose(
            after,
            &Self::on_sheet(session),
            &captions(session.report()),
            None,
        );
        let accent = theme::LIGHT.accent.gamma_multiply(0.6);
        let triangles = Triangles::of(&ink);
        let mesh = triangles.mesh(self.view.of_ink(&ink), |part, tone| {
            let same = match part {
                Part::Atom(a) => same_atom(before, after, a),
                Part::Bond(b) => same_bond(before, after, b),
                Part::Caption(_) | Part::Note => true,
            };
            Some(if same {
                theme::LIGHT.tone(tone)
            } else {
                accent
            })
        });
        painter.add(egui::Shape::mesh(mesh));
    }
}

fn same_atom(before: &Drawing, after: &Drawing, a: chem::molecule::AtomIx) -> bool {
    let (m, n) = (before.molecule(), after.molecule());
    a.index() < m.n_atoms().min(n.n_atoms())
        && m.atom(a) == n.atom(a)
        && m.hydrogens(a) == n.hydrogens(a)
        && before.point(a).distance(after.point(a)) < 1e-9
}

fn same_bond(before: &Drawing, after: &Drawing, b: chem::molecule::BondIx) -> bool {
    let (m, n) = (before.molecule(), after.molecule());
    b.index() < m.n_bonds().min(n.n_bonds())
        && m.bond(b) == n.bond(b)
        && before.mark(b) == after.mark(b)
        && n.bond(b)
            .ends
            .iter()
            .all(|a| before.point(*a).distance(after.point(*a)) < 1e-9)
}

/// Locant and descriptor of every stereogenic place, in the color of its verdict.
fn captions(report: &Report) -> Vec<Caption> {
    let tone = |verdict| match verdict {
        Verdict::Agrees => Tone::Agrees,
        Verdict::Opposite => Tone::Opposite,
        Verdict::Open => Tone::Open,
        Verdict::Contradiction => Tone::Contradiction,
        Verdict::NotAsked => Tone::Muted,
    };
    let places = report.places.iter();
    places
        .map(|p| figure::caption(p, tone(p.verdict)))
        .collect()
}

/// What a screen reader says of the sheet.
fn spoken(session: &Session) -> String {
    let m = session.drawing().molecule();
    let mut text = format!("{} atoms, {} bonds", m.n_atoms(), m.n_bonds());
    let Selection { atoms, bonds } = session.selection();
    for atom in atoms {
        let symbol = m.element(*atom).symbol();
        text.push_str(&format!("; atom {} {symbol} selected", atom.index() + 1));
    }
    for bond in bonds {
        let [a, b] = m.bond(*bond).ends.map(|e| e.index() + 1);
        text.push_str(&format!("; bond {a} to {b} selected"));
    }
    text
}

/// The box of what is selected on the screen.
pub(super) fn selection_rect(session: &Session, view: &View) -> Rect {
    let atoms = session.selection().carried(session.drawing());
    let points = atoms
        .iter()
        .map(|a| view.to_screen(session.drawing().point(*a)));
    points.fold(Rect::NOTHING, |r, p| r.union(Rect::from_min_max(p, p)))
}
