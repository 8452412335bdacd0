//! What lies over the drawing and is not printed: frame, selection, ghosts, ranking letters.

use super::gesture::{self, Gesture};
use super::{Composed, Sheet};
use crate::session::{Selection, Session};
use crate::window::places::{self, rank};
use crate::window::theme::{self, LIGHT};
use chem::drawing::Drawing;
use chem::geom::{self, Point};
use chem::molecule::{AtomIx, Order};
use chem::pipeline::Place;
use chem::stereo::Ligand;
use egui::{Align2, Painter, Pos2, Rect, Response, Stroke, StrokeKind, pos2, vec2};

/// Space between the ink and the corner ticks, in screen points.
const AIR: f32 = 12.0;
/// Length of a corner tick.
const TICK: f32 = 12.0;

impl Sheet {
    /// Four corner ticks round the figure and its width in print beneath.
    /// On an empty sheet a word of what to do, unless something is about to come.
    pub(super) fn frame(
        &self,
        painter: &Painter,
        session: &Session,
        composed: &Composed,
        something_comes: bool,
    ) {
        if session.drawing().molecule().n_atoms() == 0 {
            if !something_comes {
                self.empty(painter);
            }
            return;
        }
        let page = self
            .view
            .of_ink(&composed.ink)
            .rect(composed.page)
            .expand(AIR);
        let line = Stroke::new(1.0, LIGHT.muted.gamma_multiply(0.7));
        for (corner, x, y) in [
            (page.left_top(), 1.0, 1.0),
            (page.right_top(), -1.0, 1.0),
            (page.left_bottom(), 1.0, -1.0),
            (page.right_bottom(), -1.0, -1.0),
        ] {
            painter.line_segment([corner, corner + vec2(x * TICK, 0.0)], line);
            painter.line_segment([corner, corner + vec2(0.0, y * TICK)], line);
        }
        if let Some((width, _)) = self.measures() {
            painter.text(
                pos2(page.center().x, page.max.y + 4.0),
                Align2::CENTER_TOP,
                format!("{width:.0} mm wide in print"),
                theme::upright(theme::CAPTION),
                LIGHT.muted,
            );
        }
    }

    fn empty(&self, painter: &Painter) {
        let at = self.view.rect().center();
        painter.text(
            at,
            Align2::CENTER_CENTER,
            "press and drag to draw a bond, or type 6 for a ring",
            theme::upright(theme::TEXT),
            LIGHT.muted,
        );
    }

    /// A thin ring round what is selected.
    pub(super) fn selection(&self, painter: &Painter, session: &Session) {
        let drawing = session.drawing();
        let line = Stroke::new(1.5, LIGHT.accent);
        let fill = LIGHT.accent.gamma_multiply(0.10);
        let radius = self.ring(drawing);
        let Selection { atoms, bonds } = session.selection();
        for bond in bonds {
            let ends = drawing.molecule().bond(*bond).ends;
            // between two rings a bond needs no outline of its own
            let held = ends.iter().all(|a| atoms.contains(a));
            let line = if held { Stroke::NONE } else { line };
            let ends = ends.map(|a| self.view.to_screen(drawing.point(a)));
            capsule(painter, ends, 0.55 * radius, fill, line);
        }
        for atom in atoms {
            let at = self.view.to_screen(drawing.point(*atom));
            painter.circle(at, radius, fill, line);
        }
    }

    fn ring(&self, drawing: &Drawing) -> f32 {
        (0.24 * drawing.bond_length() as f32 * self.view.scale()).clamp(6.0, 11.0)
    }

    /// The letters a, b, c, d beside the ligands of the selected place.
    pub(super) fn ranking(&self, painter: &Painter, session: &Session, composed: &Composed) {
        let Some(place) = places::chosen(session) else {
            return;
        };
        let drawing = session.drawing();
        let n = drawing.molecule().n_atoms();
        let to = self.view.of_ink(&composed.ink);
        let mut taken = composed
            .words
            .iter()
            .map(|r| to.rect(*r))
            .collect::<Vec<_>>();
        for (from, ligand, letter) in letters(place) {
            if from.index() >= n || ligand.index() >= n {
                continue;
            }
            let [p, q] = [from, ligand].map(|a| self.view.to_screen(drawing.point(a)));
            let at = self.letter_place(drawing, [p, q], &taken);
            taken.push(Rect::from_center_size(at, vec2(12.0, 14.0)));
            painter.text(
                at,
                Align2::CENTER_CENTER,
                letter,
                theme::italic(theme::TEXT + 1.0),
                LIGHT.accent,
            );
        }
    }

    /// The place beside a bond that is farthest from labels, captions and other bonds.
    fn letter_place(&self, drawing: &Drawing, [p, q]: [Pos2; 2], taken: &[Rect]) -> Pos2 {
        let m = drawing.molecule();
        let (along, across) = (q - p, (q - p).normalized().rot90());
        let free = |at: Pos2| {
            let words = taken.iter().map(|r| r.distance_to_pos(at));
            let bonds = m.bonds().map(|b| {
                let [a, c] = m
                    .bond(b)
                    .ends
                    .map(|e| self.view.to_screen(drawing.point(e)));
                segment_distance(at, a, c)
            });
            words.chain(bonds).fold(f32::INFINITY, f32::min)
        };
        let places = [0.5_f32, 0.65, 0.35]
            .into_iter()
            .flat_map(|t| [14.0_f32, -14.0, 18.0, -18.0].map(|d| p + t * along + d * across));
        places
            .max_by(|a, b| free(*a).min(14.0).total_cmp(&free(*b).min(14.0)))
            .unwrap_or(p)
    }

    /// What the pen would draw, what the pointer is on, or the area drawn out.
    pub(super) fn pen_ghost(&self, painter: &Painter, session: &Session, response: &Response) {
        let Some(at) = response.hover_pos().or(response.interact_pointer_pos()) else {
            return;
        };
        let drawing = session.drawing();
        let accent = LIGHT.accent.gamma_multiply(0.6);
        match &self.gesture {
            Gesture::Idle => {
                let under = gesture::hit(drawing, &self.view, at);
                let line = Stroke::new(1.0, accent);
                if let Some(atom) = under.only_atom() {
                    let at = self.view.to_screen(drawing.point(atom));
                    painter.circle_stroke(at, self.ring(drawing), line);
                } else if let Some(bond) = under.only_bond() {
                    let ends = drawing.molecule().bond(bond).ends;
                    let ends = ends.map(|a| self.view.to_screen(drawing.point(a)));
                    let clear = egui::Color32::TRANSPARENT;
                    capsule(painter, ends, 0.55 * self.ring(drawing), clear, line);
                }
            }
            Gesture::Pen(start) => {
                let modifiers = painter.ctx().input(|i| i.modifiers);
                let stroke = self.stroke(*start, at, session, modifiers);
                let ends = stroke.ends.map(|p| self.view.to_screen(p));
                if !stroke.edits.is_empty() {
                    let width = self.line_width(session);
                    bond(painter, ends, stroke.order, Stroke::new(width, accent));
                    painter.circle_stroke(ends[1], 4.0, Stroke::new(1.0, accent));
                }
            }
            Gesture::Area(from) => {
                let area = Rect::from_two_pos(*from, at);
                let fill = LIGHT.accent.gamma_multiply(0.06);
                let line = Stroke::new(1.0, accent);
                painter.rect(area, 0, fill, line, StrokeKind::Inside);
            }
            Gesture::Move(..) | Gesture::Pan => {}
        }
    }

    fn line_width(&self, session: &Session) -> f32 {
        let (style, drawing) = (session.figure().style, session.drawing());
        let bond = drawing.bond_length() as f32 * self.view.scale();
        (style.line_width / style.bond_length) as f32 * bond
    }
}

fn capsule(painter: &Painter, ends: [Pos2; 2], radius: f32, fill: egui::Color32, line: Stroke) {
    let v = (ends[1] - ends[0]).normalized();
    let start = v.angle() + std::f32::consts::FRAC_PI_2;
    let arc = |center: Pos2, from: f32| {
        (0..=8_u8).map(move |i| {
            let angle = from + std::f32::consts::PI * f32::from(i) / 8.0;
            center + radius * vec2(angle.cos(), angle.sin())
        })
    };
    let points = arc(ends[0], start)
        .chain(arc(ends[1], start + std::f32::consts::PI))
        .collect();
    painter.add(egui::Shape::convex_polygon(points, fill, line));
}

fn bond(painter: &Painter, ends: [Pos2; 2], order: Order, line: Stroke) {
    let across = (ends[1] - ends[0]).normalized().rot90() * (3.0 * line.width).max(4.0);
    let shifts: &[f32] = match order {
        Order::Single | Order::Special(_) => &[0.0],
        Order::Double => &[-0.5, 0.5],
        Order::Triple => &[-1.0, 0.0, 1.0],
    };
    for shift in shifts {
        painter.line_segment(ends.map(|p| p + across * *shift), line);
    }
}

/// Distance on the screen.
fn segment_distance(at: Pos2, a: Pos2, b: Pos2) -> f32 {
    let [at, a, b] = [at, a, b].map(|p| Point::new(f64::from(p.x), f64::from(p.y)));
    geom::distance_to_segment(at, a, b) as f32
}

/// The atoms of each ranked ligand that is drawn: the one that holds it, the ligand, its letter.
fn letters(place: &Place) -> Vec<(AtomIx, AtomIx, &'static str)> {
    let ends = place.atoms.as_slice();
    let ranked = place.ranking.iter().enumerate();
    ranked
        .filter_map(|(i, ligand)| {
            let Ligand::Atom(to) = *ligand else {
                return None;
            };
            let (end, letter) = rank(place.kind, i)?;
            Some((*ends.get(end)?, to, letter))
        })
        .collect()
}
