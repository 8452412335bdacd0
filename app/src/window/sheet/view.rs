//! Where the drawing is on the screen.

use super::super::paint::ToScreen;
use chem::drawing::Drawing;
use chem::geom::Point;
use chem::ink::Ink;
use egui::{Pos2, Rect, Vec2, pos2, vec2};

/// Screen points for a bond on an empty sheet.
const BOND: f32 = 56.0;
/// Smallest and largest size of a bond on the screen, in screen points.
const BONDS: (f32, f32) = (4.0, 400.0);
/// Screen points in an inch, for the size that is shown in percent.
const PER_INCH: f32 = 96.0;

/// A place in the drawing at the middle of the sheet, and a scale.
#[derive(Clone, Copy, Debug)]
pub(in super::super) struct View {
    center: Point,
    /// Screen points for a unit of the drawing.
    scale: f32,
    /// The sheet on the screen.
    rect: Rect,
    /// Whether it still shows the whole drawing as [`View::fit`] left it.
    fitted: bool,
}

impl View {
    pub(in super::super) fn new() -> View {
        View {
            center: Point::ORIGIN,
            scale: BOND,
            rect: Rect::NOTHING,
            fitted: false,
        }
    }

    /// The sheet is here now.
    pub(super) fn place(&mut self, rect: Rect) {
        self.rect = rect;
    }

    pub(super) fn rect(&self) -> Rect {
        self.rect
    }

    /// Shows the whole figure, at most at the size that suits a single bond.
    pub(super) fn fit(&mut self, drawing: &Drawing) {
        let bounds = drawing.bounds();
        let bond = drawing.bond_length();
        self.center = bounds.center();
        // labels stand out by about a bond; corner ticks and the width beneath need a margin as well
        let wide = (bounds.width() + 1.6 * bond) as f32;
        let high = (bounds.height() + 1.6 * bond) as f32;
        let room = self.rect.size() - vec2(64.0, 96.0);
        let fits = (room.x / wide).min(room.y / high);
        let most = 1.4 * BOND / bond as f32;
        self.scale = fits.min(most).max(BONDS.0 / bond as f32);
        self.fitted = true;
    }

    /// Whether nobody has moved or enlarged the view since it was fitted.
    pub(super) fn is_fitted(&self) -> bool {
        self.fitted
    }

    pub(in super::super) fn to_screen(self, p: Point) -> Pos2 {
        let v = p - self.center;
        self.rect.center() + self.scale * vec2(v.x as f32, -v.y as f32)
    }

    pub(super) fn to_drawing(self, p: Pos2) -> Point {
        let v = (p - self.rect.center()) / self.scale;
        Point::new(
            self.center.x + f64::from(v.x),
            self.center.y - f64::from(v.y),
        )
    }

    /// Screen points for a unit of the drawing.
    pub(super) fn scale(&self) -> f32 {
        self.scale
    }

    pub(super) fn pan(&mut self, by: Vec2) {
        self.fitted = false;
        let v = by / self.scale;
        self.center.x -= f64::from(v.x);
        self.center.y += f64::from(v.y);
    }

    /// Enlarges by `factor`; what is at `fixed` stays there.
    pub(super) fn zoom(&mut self, factor: f32, fixed: Pos2, bond: f64) {
        self.fitted = false;
        let bond = bond as f32;
        let before = self.to_drawing(fixed);
        self.scale = (self.scale * factor).clamp(BONDS.0 / bond, BONDS.1 / bond);
        let after = self.to_drawing(fixed);
        self.center += before - after;
    }

    /// For ink, whose origin is that of the drawing.
    pub(super) fn of_ink(&self, ink: &Ink) -> ToScreen {
        ToScreen {
            origin: self.to_screen(Point::ORIGIN),
            scale: self.scale / ink.points_per_unit as f32,
        }
    }

    /// Size on screen in percent of the printed size.
    pub(in super::super) fn percent(&self, points_per_unit: f64) -> f32 {
        100.0 * self.scale * 72.0 / (PER_INCH * points_per_unit as f32)
    }
}

/// A place near a rectangle, inside the sheet, where another of this size covers the fewest of
/// `points`. `last` is kept as long as nothing is covered there.
pub(in super::super) fn beside(
    sheet: Rect,
    around: Rect,
    size: Vec2,
    points: &[Pos2],
    last: Option<Pos2>,
) -> Pos2 {
    let gap = 20.0;
    let half = size / 2.0;
    let room = sheet.shrink(gap).shrink2(half);
    let inside = |c: Pos2| {
        pos2(
            c.x.clamp(room.min.x, room.max.x.max(room.min.x)),
            c.y.clamp(room.min.y, room.max.y.max(room.min.y)),
        )
    };
    let covered = |c: Pos2| {
        let rect = Rect::from_center_size(c, size).expand(14.0);
        points.iter().filter(|p| rect.contains(**p)).count()
    };
    if let Some(last) = last.filter(|l| covered(*l + half) == 0) {
        return last;
    }
    // nearest first: beneath, above, right, left and the corners, then the same farther out
    let steps = [
        (0.0, 1.0),
        (0.0, -1.0),
        (1.0, 0.0),
        (-1.0, 0.0),
        (1.0, 1.0),
        (-1.0, 1.0),
        (1.0, -1.0),
        (-1.0, -1.0),
    ];
    let centers = [gap, 80.0, 150.0].into_iter().flat_map(|far| {
        let reach = around.size() / 2.0 + half + Vec2::splat(far);
        steps.map(|(x, y)| inside(around.center() + vec2(x * reach.x, y * reach.y)))
    });
    let best = centers.min_by_key(|c| covered(*c));
    best.unwrap_or(around.center()) - half
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn view_goes_there_and_back() {
        let mut view = View::new();
        view.place(Rect::from_min_max(pos2(100.0, 50.0), pos2(900.0, 650.0)));
        view.zoom(1.7, pos2(300.0, 200.0), 1.0);
        view.pan(vec2(13.0, -40.0));
        let p = pos2(321.0, 123.0);
        assert!(view.to_screen(view.to_drawing(p)).distance(p) < 1e-3);
    }
}
