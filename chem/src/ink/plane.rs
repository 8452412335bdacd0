//! Plain geometry of the page: convex hulls, how far a line stays near one, distances to a box.

use kurbo::{BezPath, PathEl, Point, Rect, Vec2};

/// Corners of a convex outline, in order; empty for nothing.
pub(super) type Hull = Vec<Point>;

/// Points along a path, curves within `tolerance`.
pub(super) fn corners(path: &BezPath, tolerance: f64) -> Vec<Point> {
    let mut points = Vec::new();
    kurbo::flatten(path, tolerance, |element| match element {
        PathEl::MoveTo(p) | PathEl::LineTo(p) => points.push(p),
        // flattening leaves no curves
        PathEl::QuadTo(..) | PathEl::CurveTo(..) | PathEl::ClosePath => {}
    });
    points
}

/// Straight pieces of a path, curves within `tolerance`.
pub(super) fn segments(path: &BezPath, tolerance: f64) -> Vec<[Point; 2]> {
    let (mut out, mut start, mut at) = (Vec::new(), Point::ORIGIN, Point::ORIGIN);
    kurbo::flatten(path, tolerance, |element| match element {
        PathEl::MoveTo(p) => {
            start = p;
            at = p;
        }
        PathEl::LineTo(p) => {
            out.push([at, p]);
            at = p;
        }
        PathEl::ClosePath => out.push([at, start]),
        PathEl::QuadTo(..) | PathEl::CurveTo(..) => {}
    });
    out
}

/// Convex hull (Andrew's monotone chain).
pub(super) fn hull(mut points: Vec<Point>) -> Hull {
    points.sort_by(|a, b| a.x.total_cmp(&b.x).then(a.y.total_cmp(&b.y)));
    points.dedup();
    if points.len() < 3 {
        return points;
    }
    let mut out = half_hull(points.iter());
    out.pop();
    let mut upper = half_hull(points.iter().rev());
    upper.pop();
    out.append(&mut upper);
    out
}

fn half_hull<'a>(points: impl Iterator<Item = &'a Point>) -> Hull {
    let mut out = Hull::new();
    for p in points {
        while let [.., a, b] = out.as_slice() {
            if (*b - *a).cross(*p - *b) > 0.0 {
                break;
            }
            out.pop();
        }
        out.push(*p);
    }
    out
}

/// Smallest box round some points; `None` if there is none.
pub(super) fn bounds<'a>(points: impl IntoIterator<Item = &'a Point>) -> Option<Rect> {
    let mut points = points.into_iter();
    let first = points.next()?;
    Some(points.fold(Rect::from_points(*first, *first), |r, p| r.union_pt(*p)))
}

/// How far along the line from `from` in direction `u` (length 1) one must go to be farther than
/// `margin` from a hull for good; `None` if the line never comes that near.
pub(super) fn exit(hull: &[Point], from: Point, u: Vec2, margin: f64) -> Option<f64> {
    let mut last: Option<f64> = None;
    let mut note = |t: f64| last = Some(last.map_or(t, |l: f64| l.max(t)));
    for (i, p) in hull.iter().enumerate() {
        let v = *p - from;
        let (along, aside) = (v.dot(u), v.cross(u));
        let square = margin * margin - aside * aside;
        if square >= 0.0 {
            note(along + square.sqrt());
        }
        let q = hull[(i + 1) % hull.len()];
        let Some(edge) = crate::geom::direction(*p, q, 0.0) else {
            continue;
        };
        let slope = u.cross(edge);
        if slope.abs() < 1e-12 {
            continue;
        }
        let length = p.distance(q);
        for shift in [margin, -margin] {
            let corner = v + edge.turn_90() * shift;
            let t = corner.cross(edge) / slope;
            let on_edge = (u * t - corner).dot(edge);
            if (0.0..=length).contains(&on_edge) {
                note(t);
            }
        }
    }
    last
}

/// Distance from a point to a box; 0 inside.
fn point_to_box(p: Point, r: Rect) -> f64 {
    let x = (r.x0 - p.x).max(p.x - r.x1).max(0.0);
    let y = (r.y0 - p.y).max(p.y - r.y1).max(0.0);
    x.hypot(y)
}

/// Distance between two boxes; 0 if they meet.
pub(super) fn box_to_box(a: Rect, b: Rect) -> f64 {
    let x = (a.x0 - b.x1).max(b.x0 - a.x1).max(0.0);
    let y = (a.y0 - b.y1).max(b.y0 - a.y1).max(0.0);
    x.hypot(y)
}

/// Distance from a segment to a box; 0 if they meet.
pub(super) fn segment_to_box(s: [Point; 2], r: Rect) -> f64 {
    if meets(s, r) {
        return 0.0;
    }
    let corners = [
        Point::new(r.x0, r.y0),
        Point::new(r.x1, r.y0),
        Point::new(r.x1, r.y1),
        Point::new(r.x0, r.y1),
    ];
    let near = corners
        .iter()
        .map(|c| crate::geom::distance_to_segment(*c, s[0], s[1]))
        .fold(f64::INFINITY, f64::min);
    near.min(point_to_box(s[0], r)).min(point_to_box(s[1], r))
}

/// Whether a segment meets a box: by clipping it to the box's two bands.
fn meets(s: [Point; 2], r: Rect) -> bool {
    let v = s[1] - s[0];
    let (mut enter, mut leave) = (0.0f64, 1.0f64);
    for (start, step, low, high) in [(s[0].x, v.x, r.x0, r.x1), (s[0].y, v.y, r.y0, r.y1)] {
        if step.abs() < 1e-12 {
            if start < low || start > high {
                return false;
            }
            continue;
        }
        let (a, b) = ((low - start) / step, (high - start) / step);
        enter = enter.max(a.min(b));
        leave = leave.min(a.max(b));
    }
    enter <= leave
}

/// Whether a polygon holds a point (even-odd).
pub(super) fn holds(polygon: &[Point], p: Point) -> bool {
    let mut inside = false;
    for (i, a) in polygon.iter().enumerate() {
        let b = polygon[(i + 1) % polygon.len()];
        if (a.y > p.y) != (b.y > p.y) {
            let x = a.x + (p.y - a.y) / (b.y - a.y) * (b.x - a.x);
            inside ^= p.x < x;
        }
    }
    inside
}

/// Where two lines cross, each given by a point and a direction; `None` if they are all but parallel.
pub(super) fn crossing(a: Point, u: Vec2, b: Point, v: Vec2) -> Option<Point> {
    let slope = u.cross(v);
    (slope.abs() > 0.05 * u.hypot() * v.hypot()).then(|| a + u * ((b - a).cross(v) / slope))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn square() -> Hull {
        hull(vec![
            Point::new(1.0, 1.0),
            Point::new(-1.0, -1.0),
            Point::new(0.0, 0.2),
            Point::new(1.0, -1.0),
            Point::new(-1.0, 1.0),
        ])
    }

    #[test]
    fn a_line_leaves_a_square_at_its_side_and_at_its_corner() {
        let hull = square();
        assert_eq!(hull.len(), 4);
        let right = exit(&hull, Point::ORIGIN, Vec2::new(1.0, 0.0), 0.5);
        assert!((right.unwrap() - 1.5).abs() < 1e-12);
        let diagonal = exit(&hull, Point::ORIGIN, Vec2::new(1.0, 1.0).normalize(), 0.5);
        assert!((diagonal.unwrap() - (2f64.sqrt() + 0.5)).abs() < 1e-12);
        let past = exit(&hull, Point::new(0.0, 3.0), Vec2::new(1.0, 0.0), 0.5);
        assert_eq!(past, None);
    }

    #[test]
    fn distances_to_a_box() {
        let r = Rect::new(0.0, 0.0, 2.0, 1.0);
        let s = |a: (f64, f64), b: (f64, f64)| segment_to_box([a.into(), b.into()], r);
        assert!(s((-1.0, -1.0), (3.0, 2.0)) < 1e-12);
        assert!((s((-1.0, 3.0), (3.0, 3.0)) - 2.0).abs() < 1e-12);
        assert!((s((5.0, 5.0), (5.0, 5.0)) - 5.0).abs() < 1e-12);
        assert!((s((3.0, -1.0), (4.0, 0.0)) - 2f64.sqrt()).abs() < 1e-12);
    }

    #[test]
    fn a_polygon_that_is_not_convex_knows_its_inside() {
        let l = [
            (0.0, 0.0),
            (4.0, 0.0),
            (4.0, 1.0),
            (1.0, 1.0),
            (1.0, 4.0),
            (0.0, 4.0),
        ]
        .map(Point::from);
        assert!(holds(&l, Point::new(0.5, 3.0)));
        assert!(!holds(&l, Point::new(3.0, 3.0)));
    }
}
