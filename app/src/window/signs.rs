//! The shapes of verdicts and of grades of findings: told apart by shape first, by color second.

use super::theme::Colors;
use chem::audit::Grade;
use chem::pipeline::Verdict;
use egui::{Painter, Pos2, Rect, Response, Sense, Shape, Stroke, StrokeKind, Ui, Vec2, pos2, vec2};

/// Paints the sign of a verdict: filled disc, half disc, ring, lozenge, small dot.
pub(super) fn paint(painter: &Painter, at: Pos2, radius: f32, verdict: Verdict, colors: &Colors) {
    let color = colors.verdict(verdict);
    let line = Stroke::new((radius * 0.3).max(1.5), color);
    match verdict {
        Verdict::Agrees => {
            painter.circle_filled(at, radius, color);
        }
        Verdict::Opposite => {
            let half = (0..=16_u8)
                .map(|i| {
                    let angle = std::f32::consts::PI * (f32::from(i) / 16.0 - 0.5);
                    at + radius * vec2(angle.cos(), angle.sin())
                })
                .collect();
            painter.add(Shape::convex_polygon(half, color, Stroke::NONE));
            painter.circle_stroke(at, radius - line.width / 2.0, line);
        }
        Verdict::Open => {
            painter.circle_stroke(at, radius - line.width / 2.0, line);
        }
        Verdict::Contradiction => {
            let r = radius * 1.15;
            let corners = vec![
                pos2(at.x, at.y - r),
                pos2(at.x + r, at.y),
                pos2(at.x, at.y + r),
                pos2(at.x - r, at.y),
            ];
            painter.add(Shape::convex_polygon(corners, color, Stroke::NONE));
        }
        Verdict::NotAsked => {
            painter.circle_filled(at, radius * 0.4, color);
        }
    }
}

/// Paints the sign of a grade: triangle, half-filled square, dash, ring.
pub(super) fn grade(painter: &Painter, at: Pos2, radius: f32, grade: Grade, colors: &Colors) {
    let color = colors.grade(grade);
    let line = Stroke::new((radius * 0.3).max(1.5), color);
    match grade {
        Grade::Wrong => {
            let r = radius * 1.1;
            let corners = vec![
                at + vec2(0.0, -r),
                at + vec2(r, 0.8 * r),
                at + vec2(-r, 0.8 * r),
            ];
            painter.add(Shape::convex_polygon(corners, color, Stroke::NONE));
        }
        Grade::Unclear => {
            let square = Rect::from_center_size(at, Vec2::splat(1.7 * radius));
            painter.rect_filled(square.with_max_x(at.x), 0, color);
            painter.rect_stroke(square, 0, line, StrokeKind::Inside);
        }
        Grade::PoorStyle => {
            let dash = Rect::from_center_size(at, vec2(1.8 * radius, 0.6 * radius));
            painter.rect_filled(dash, 1, color);
        }
        Grade::Open => {
            painter.circle_stroke(at, radius - line.width / 2.0, line);
        }
    }
}

/// The sign in the flow of a row.
pub(super) fn show(ui: &mut Ui, verdict: Verdict) -> Response {
    let (rect, response) = ui.allocate_exact_size(vec2(16.0, 16.0), Sense::hover());
    paint(ui.painter(), rect.center(), 6.0, verdict, &Colors::of(ui));
    response
}
