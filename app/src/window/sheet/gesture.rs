//! What the pointer does on the sheet.

use super::super::pen::{self, Start};
use super::{Sheet, View};
use crate::command::Command;
use crate::session::{Selection, Session};
use chem::drawing::{Drawing, Edit};
use chem::geom::{self, Point};
use chem::molecule::AtomIx;
use egui::{Modifiers, Pos2, Rect, Response, Ui};

/// A gesture under way.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Gesture {
    /// None.
    Idle,
    /// The pen is down.
    Pen(Start),
    /// The selection is being moved; where it was taken, and where it is now.
    Move(Point, Point),
    /// An area is being drawn out from here.
    Area(Pos2),
    /// The paper is being moved.
    Pan,
}

/// How near the pointer must be to an atom or a bond, in screen points at least.
const REACH: f32 = 9.0;

/// What is under a place on the screen.
pub(super) fn hit(drawing: &Drawing, view: &View, at: Pos2) -> Selection {
    let m = drawing.molecule();
    let bond = drawing.bond_length() as f32 * view.scale();
    let reach = REACH.max(0.22 * bond).min(0.45 * bond);
    let atom = m
        .atoms()
        .map(|a| (a, view.to_screen(drawing.point(a)).distance(at)))
        .filter(|(_, d)| *d <= reach)
        .min_by(|x, y| x.1.total_cmp(&y.1));
    if let Some((atom, _)) = atom {
        return Selection::atom(atom);
    }
    let point = view.to_drawing(at);
    let reach = f64::from(REACH.min(0.3 * bond) / view.scale());
    let near = m
        .bonds()
        .map(|b| {
            let [p, q] = m.bond(b).ends.map(|a| drawing.point(a));
            (b, geom::distance_to_segment(point, p, q))
        })
        .filter(|(_, d)| *d <= reach)
        .min_by(|x, y| x.1.total_cmp(&y.1));
    near.map_or_else(Selection::default, |(b, _)| Selection::bond(b))
}

impl Gesture {
    /// The drawing as it would be if the move ended now.
    pub(super) fn preview(&self, session: &Session) -> Option<Drawing> {
        let Gesture::Move(from, to) = self else {
            return None;
        };
        let edits = move_edits(session, *from, *to);
        Some(session.drawing().apply(&edits).ok()?.0)
    }
}

fn move_edits(session: &Session, from: Point, to: Point) -> Vec<Edit> {
    let drawing = session.drawing();
    let atoms = session.selection().carried(drawing);
    atoms
        .into_iter()
        .map(|a| Edit::Move(a, drawing.point(a) + (to - from)))
        .collect()
}

impl Sheet {
    /// Follows the pointer and the wheel.
    pub(super) fn gestures(
        &mut self,
        ui: &Ui,
        response: &Response,
        session: &Session,
        out: &mut Vec<Command>,
    ) {
        self.wheel(ui, response, session);
        let modifiers = ui.input(|i| i.modifiers);
        if response.clicked()
            && let Some(at) = response.interact_pointer_pos()
        {
            response.request_focus();
            self.click(session, at, modifiers, out);
        }
        if response.drag_started() {
            response.request_focus();
            self.start(ui, response, session, out);
        }
        let now = response.interact_pointer_pos();
        if let (Gesture::Move(from, _), Some(at)) = (&self.gesture, now) {
            self.gesture = Gesture::Move(*from, self.view.to_drawing(at));
        }
        if self.gesture == Gesture::Pan {
            self.view.pan(response.drag_delta());
        }
        if response.drag_stopped() {
            let gesture = std::mem::replace(&mut self.gesture, Gesture::Idle);
            if let Some(at) = now.or(ui.input(|i| i.pointer.latest_pos())) {
                self.finish(gesture, at, session, modifiers, out);
            }
        }
        if self.gesture != Gesture::Idle && ui.input(|i| i.key_pressed(egui::Key::Escape)) {
            self.gesture = Gesture::Idle;
        }
    }

    /// Whether a gesture is under way, which Escape then ends.
    pub(in super::super) fn is_busy(&self) -> bool {
        self.gesture != Gesture::Idle
    }

    fn wheel(&mut self, ui: &Ui, response: &Response, session: &Session) {
        if !response.hovered() {
            return;
        }
        let (zoom, scroll, at) = ui.input(|i| {
            (
                i.zoom_delta(),
                i.smooth_scroll_delta(),
                i.pointer.hover_pos(),
            )
        });
        if (zoom - 1.0).abs() > f32::EPSILON {
            let at = at.unwrap_or(response.rect.center());
            self.view.zoom(zoom, at, session.drawing().bond_length());
        } else if scroll != egui::Vec2::ZERO {
            self.view.pan(scroll);
        }
    }

    fn click(&self, session: &Session, at: Pos2, modifiers: Modifiers, out: &mut Vec<Command>) {
        let under = hit(session.drawing(), &self.view, at);
        if modifiers.shift {
            let mut selection = session.selection().clone();
            selection.toggle(&under);
            out.push(Command::Select(selection));
        } else {
            out.push(Command::Select(under));
        }
    }

    fn start(&mut self, ui: &Ui, response: &Response, session: &Session, out: &mut Vec<Command>) {
        let pointer = ui.input(|i| i.pointer.press_origin());
        let Some(from) = pointer.or(response.interact_pointer_pos()) else {
            return;
        };
        let modifiers = ui.input(|i| i.modifiers);
        if !response.dragged_by(egui::PointerButton::Primary) {
            self.gesture = Gesture::Pan;
            return;
        }
        let under = hit(session.drawing(), &self.view, from);
        let at = self.view.to_drawing(from);
        let atom = under.only_atom();
        self.gesture = if session.selection().holds(&under) {
            Gesture::Move(at, at)
        } else if let Some(atom) = atom {
            Gesture::Pen(Start::Atom(atom))
        } else if !under.is_empty() {
            out.push(Command::Select(under));
            Gesture::Move(at, at)
        } else if modifiers.shift {
            Gesture::Area(from)
        } else {
            Gesture::Pen(Start::Paper(at))
        };
    }

    /// The stroke that the pen would make if it were lifted at `at`.
    pub(super) fn stroke(
        &self,
        start: Start,
        at: Pos2,
        session: &Session,
        modifiers: Modifiers,
    ) -> pen::Stroke {
        let drawing = session.drawing();
        let onto = hit(drawing, &self.view, at).only_atom();
        let start = match start {
            // the press was on paper, but the drawing may have changed under it
            Start::Atom(a) if a.index() >= drawing.molecule().n_atoms() => {
                Start::Paper(self.view.to_drawing(at))
            }
            start => start,
        };
        pen::stroke(
            drawing,
            start,
            self.view.to_drawing(at),
            onto,
            modifiers.alt,
        )
    }

    fn finish(
        &self,
        gesture: Gesture,
        at: Pos2,
        session: &Session,
        modifiers: Modifiers,
        out: &mut Vec<Command>,
    ) {
        match gesture {
            Gesture::Idle | Gesture::Pan => {}
            Gesture::Pen(start) => {
                let stroke = self.stroke(start, at, session, modifiers);
                out.push(Command::Step(stroke.name.to_owned(), stroke.edits));
            }
            Gesture::Move(from, _) => {
                let edits = move_edits(session, from, self.view.to_drawing(at));
                out.push(Command::Step("Move".to_owned(), edits));
            }
            Gesture::Area(from) => {
                let area = Rect::from_two_pos(from, at);
                let mut selection = session.selection().clone();
                let inside = within(session.drawing(), &self.view, area);
                selection.atoms.extend(inside.atoms);
                selection.bonds.extend(inside.bonds);
                out.push(Command::Select(selection));
            }
        }
    }
}

/// Atoms in an area, and bonds with both ends in it.
fn within(drawing: &Drawing, view: &View, area: Rect) -> Selection {
    let m = drawing.molecule();
    let inside = |a: AtomIx| area.contains(view.to_screen(drawing.point(a)));
    Selection {
        atoms: m.atoms().filter(|a| inside(*a)).collect(),
        bonds: m
            .bonds()
            .filter(|b| m.bond(*b).ends.into_iter().all(inside))
            .collect(),
    }
}
