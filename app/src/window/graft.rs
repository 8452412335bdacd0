//! The graft: with something selected, typing opens a small entry there, with a live ghost.

use super::sheet::{View, beside, selection_rect};
use super::theme::{self, Colors, GRID};
use crate::command::Command;
use crate::session::{Selection, Session};
use chem::drawing::Drawing;
use chem::layout::{self, Graft, GraftError};
use egui::text::{CCursor, CCursorRange};
use egui::{
    Area, CornerRadius, Event, Frame, Id, Key, Margin, Modifiers, Order, Pos2, Rect, RichText,
    Stroke, TextEdit, Ui, Vec2, vec2,
};

/// The open entry.
#[derive(Debug, Default)]
pub(super) struct Entry {
    text: String,
    /// Just opened: the caret is still to be put behind what was typed.
    fresh: bool,
    /// Where it stands on the screen.
    at: Option<Pos2>,
}

/// What the entry leads to in a frame.
#[derive(Debug)]
pub(super) enum Outcome {
    /// Still open.
    Open,
    /// Closed without a change.
    Dropped,
    /// Taken: the step, and the atom to select then.
    Taken(Command, Option<Selection>),
}

/// The letters that were typed on the sheet, taken out of the input; `None` if none may open an entry.
pub(super) fn typed(ui: &Ui) -> Option<String> {
    let opens = |c: char| c.is_ascii_alphanumeric() || "+-=#*".contains(c);
    ui.input_mut(|i| {
        let mut text = String::new();
        for event in &i.events {
            if let Event::Text(t) = event {
                text.push_str(t);
            }
        }
        if !text.starts_with(opens) {
            return None;
        }
        i.events.retain(|e| !matches!(e, Event::Text(_)));
        Some(text)
    })
}

/// Places on the screen that the entry had better not cover: atoms and the middles of bonds.
fn busy(drawing: &Drawing, view: &View) -> Vec<Pos2> {
    let m = drawing.molecule();
    let middles = m.bonds().map(|b| {
        let [p, q] = m.bond(b).ends.map(|a| drawing.point(a));
        p.midpoint(q)
    });
    let places = drawing.points().iter().copied().chain(middles);
    places.map(|p| view.to_screen(p)).collect()
}

impl Entry {
    pub(super) fn open(text: String) -> Entry {
        Entry {
            text,
            fresh: true,
            at: None,
        }
    }

    fn graft(&self, session: &Session) -> Result<Graft, GraftError> {
        let word = layout::read(&self.text)?;
        let Selection { atoms, bonds } = session.selection();
        let atoms: Vec<_> = atoms.iter().copied().collect();
        let bonds: Vec<_> = bonds.iter().copied().collect();
        layout::graft(session.drawing(), &atoms, &bonds, word)
    }

    /// The drawing as it would be.
    pub(super) fn ghost(&self, session: &Session) -> Option<Drawing> {
        let graft = self.graft(session).ok()?;
        Some(session.drawing().apply(&graft.edits).ok()?.0)
    }

    /// Shows the entry; Enter takes it, Escape drops it.
    ///
    /// `after` is the drawing that is shown, with the ghost if there is one; `sheet` the paper's place.
    pub(super) fn show(
        &mut self,
        ui: &Ui,
        session: &Session,
        after: &Drawing,
        view: &View,
        sheet: Rect,
    ) -> Outcome {
        let graft = self.graft(session);
        let colors = Colors::of(ui);
        let size = vec2(248.0, 96.0);
        let around = if session.selection().is_empty() {
            Rect::from_center_size(sheet.center(), Vec2::ZERO)
        } else {
            selection_rect(session, view).expand(12.0)
        };
        let (enter, escape) = ui.input_mut(|i| {
            (
                i.consume_key(Modifiers::NONE, Key::Enter),
                i.consume_key(Modifiers::NONE, Key::Escape),
            )
        });
        let points = busy(after, view);
        let at = beside(sheet, around, size, &points, self.at);
        self.at = Some(at);
        let area = Area::new(Id::unique("graft"))
            .order(Order::Foreground)
            .fixed_pos(at);
        let lost = area
            .show(ui.ctx(), |ui| {
                let edge = match &graft {
                    Ok(_) => Stroke::new(1.5, colors.accent),
                    Err(_) => Stroke::new(1.5, colors.muted),
                };
                let frame = Frame::new()
                    .fill(colors.field)
                    .stroke(edge)
                    .corner_radius(CornerRadius::same(4))
                    .inner_margin(Margin::symmetric(12, 8));
                frame
                    .show(ui, |ui| {
                        ui.set_width(size.x - 24.0);
                        ui.spacing_mut().item_spacing.y = GRID / 2.0;
                        self.field(ui, &graft, &colors)
                    })
                    .inner
            })
            .inner;
        if escape {
            return Outcome::Dropped;
        }
        match graft {
            Ok(graft) if enter => Outcome::Taken(
                Command::Step(graft.name, graft.edits),
                graft.then.map(Selection::atom),
            ),
            _ if lost && !enter => Outcome::Dropped,
            _ => Outcome::Open,
        }
    }

    /// The field and what is said beneath it; whether the field has lost the focus.
    fn field(&mut self, ui: &mut Ui, graft: &Result<Graft, GraftError>, colors: &Colors) -> bool {
        let output = TextEdit::singleline(&mut self.text)
            .id(Id::unique("graft entry"))
            .font(theme::upright(theme::TEXT + 2.0))
            .frame(Frame::NONE)
            .desired_width(f32::INFINITY)
            .show(ui);
        let says = match graft {
            Ok(graft) => RichText::new(&graft.says).color(colors.muted),
            Err(error) => RichText::new(error.to_string())
                .color(colors.verdict(chem::pipeline::Verdict::Opposite)),
        };
        ui.label(says.small());
        let keys = ui.label(
            RichText::new("graft: Enter takes it, Esc drops it")
                .small()
                .color(colors.muted),
        );
        let response = output.response.response.clone().labelled_by(keys.id);
        let was_fresh = std::mem::take(&mut self.fresh);
        if was_fresh {
            response.request_focus();
            let mut state = output.state;
            let end = CCursor::new(self.text.chars().count());
            state.cursor.set_char_range(Some(CCursorRange::one(end)));
            state.store(ui.ctx(), response.id);
        }
        response.lost_focus() && !was_fresh
    }
}
