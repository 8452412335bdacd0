//! Disconnected parts side by side, the largest first.

use crate::geom::{Point, Vec2};
use crate::molecule::AtomIx;
use kurbo::Rect;

/// A part with its places.
pub(super) struct Piece {
    pub(super) atoms: Vec<AtomIx>,
    pub(super) points: Vec<Point>,
}

/// Room between parts, for their labels.
const GAP: f64 = 1.8;

impl Piece {
    fn bounds(&self) -> Rect {
        let mut points = self.points.iter();
        let first = points.next().copied().unwrap_or_default();
        points.fold(Rect::from_points(first, first), |r, p| r.union_pt(*p))
    }
}

/// Moves parts into rows, with their middles on one line, so that the whole is wider than high; the
/// middle of all is then at the origin.
pub(super) fn side_by_side(pieces: &mut [Piece]) {
    // equal parts keep the order of the file
    pieces.sort_by_key(|p| {
        (
            std::cmp::Reverse(p.atoms.len()),
            p.atoms.iter().min().copied(),
        )
    });
    let sizes: Vec<Rect> = pieces.iter().map(Piece::bounds).collect();
    let area: f64 = sizes
        .iter()
        .map(|r| (r.width() + GAP) * (r.height() + GAP))
        .sum();
    let widest = sizes.iter().map(Rect::width).fold(0.0, f64::max);
    let most = f64::max(widest + 4.0 * GAP, (area * 2.5).sqrt());
    let mut rows: Vec<(Vec<usize>, f64, f64)> = Vec::new();
    for (i, size) in sizes.iter().enumerate() {
        match rows.last_mut() {
            Some((row, width, height)) if *width + GAP + size.width() <= most => {
                row.push(i);
                *width += GAP + size.width();
                *height = f64::max(*height, size.height());
            }
            _ => rows.push((vec![i], size.width(), size.height())),
        }
    }
    let mut top = 0.0;
    for (row, _, height) in rows {
        let mut left = 0.0;
        for i in row {
            let size = sizes[i];
            let goal = Point::new(left + size.width() / 2.0, top - height / 2.0);
            shift(&mut pieces[i].points, goal - size.center());
            left += size.width() + GAP;
        }
        top -= height + GAP;
    }
    let mut all = pieces
        .iter()
        .filter(|p| !p.points.is_empty())
        .map(Piece::bounds);
    let Some(first) = all.next() else { return };
    let whole = all.fold(first, |r, b| r.union(b));
    for piece in pieces {
        shift(&mut piece.points, -whole.center().to_vec2());
    }
}

fn shift(points: &mut [Point], by: Vec2) {
    for p in points {
        *p += by;
    }
}
