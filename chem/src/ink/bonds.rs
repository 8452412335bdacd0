//! Plain, multiple and special bonds.

use super::doubles::{self, Aside};
use super::marks;
use super::scene::{Axis, Scene};
use super::{Item, Part, Shape, Tone};
use crate::drawing::{End, Mark};
use crate::molecule::{BondIx, Order};
use kurbo::{BezPath, Circle, Point, Shape as _};

/// No bond has more dots, dashes, bars or waves than this, however long it is.
const MOST_PIECES: usize = 200;

/// Draws a bond; nothing if its atoms touch or their labels leave no room.
pub(super) fn draw(scene: &Scene<'_>, bond: BondIx, items: &mut Vec<Item>) {
    let Some(axis) = scene.axis(bond) else {
        return;
    };
    let mark = scene.drawing.mark(bond);
    let shapes = match (scene.molecule().bond(bond).order, mark) {
        (Order::Double, Mark::Crossed) => crossed(scene, &axis),
        (Order::Double, Mark::Plain) => double(scene, &axis, bond),
        (Order::Double, _) => {
            // a wedge that has no meaning here is shown all the same, or it could not be mended
            let mut shapes = marked(scene, &axis, mark);
            shapes.extend(second_line(scene, &axis, Aside::Clockwise));
            shapes
        }
        (Order::Triple, _) => triple(scene, &axis),
        (Order::Special(9), Mark::Plain) => dative(scene, &axis),
        (Order::Special(0 | 10), Mark::Plain) => dotted(scene, &axis),
        (Order::Special(_), Mark::Plain) => dashed(scene, &axis),
        (Order::Single | Order::Special(_), _) => marked(scene, &axis, mark),
    };
    items.extend(shapes.into_iter().map(|shape| Item {
        part: Part::Bond(bond),
        tone: Tone::Ink,
        shape,
    }));
}

/// Distance between the lines of a multiple bond.
pub(super) fn gap(scene: &Scene<'_>, axis: &Axis) -> f64 {
    let usual = scene.drawing.bond_length() * scene.points_per_unit;
    scene.style.double_gap * axis.length.min(usual)
}

fn marked(scene: &Scene<'_>, axis: &Axis, mark: Mark) -> Vec<Shape> {
    let narrow_first = |end| match end {
        End::First => *axis,
        End::Second => axis.reversed(),
    };
    match mark {
        Mark::Solid(end) => marks::solid(scene, &narrow_first(end)),
        Mark::Hashed(end) => marks::hashed(scene, &narrow_first(end)),
        Mark::Wavy(end) => marks::wavy(scene, &narrow_first(end)),
        Mark::Plain | Mark::Crossed => plain(scene, axis),
    }
}

pub(super) fn line(scene: &Scene<'_>, a: Point, b: Point) -> Shape {
    let mut path = BezPath::new();
    path.move_to(a);
    path.line_to(b);
    Shape::Stroke(path, scene.style.line_width)
}

fn half_line(scene: &Scene<'_>) -> f64 {
    0.5 * scene.style.line_width
}

fn plain(scene: &Scene<'_>, axis: &Axis) -> Vec<Shape> {
    let Some([a, b]) = scene.trims(axis, &[0.0], half_line(scene)) else {
        return Vec::new();
    };
    vec![line(scene, axis.at(a, 0.0), axis.at(axis.length - b, 0.0))]
}

fn double(scene: &Scene<'_>, axis: &Axis, bond: BondIx) -> Vec<Shape> {
    let aside = doubles::side(scene, axis, bond);
    if aside != Aside::Centered {
        let mut shapes = plain(scene, axis);
        shapes.extend(second_line(scene, axis, aside));
        return shapes;
    }
    let shift = 0.5 * gap(scene, axis);
    let Some(trims) = scene.trims(axis, &[shift, -shift], half_line(scene)) else {
        return plain(scene, axis);
    };
    let back = axis.reversed();
    [shift, -shift]
        .into_iter()
        .map(|s| {
            // both lines stop together at a label, and run to the neighbouring bonds at a vertex
            let end = |axis: &Axis, s: f64, trim: f64| match scene.label(axis.ends[0]) {
                Some(_) => trim,
                None => doubles::meet(scene, axis, s),
            };
            let (a, b) = (end(axis, s, trims[0]), end(&back, -s, trims[1]));
            line(scene, axis.at(a, s), axis.at(axis.length - b, s))
        })
        .collect()
}

/// The inner line of a double bond, shorter than the outer one.
fn second_line(scene: &Scene<'_>, axis: &Axis, aside: Aside) -> Option<Shape> {
    let shift = aside.sign() * gap(scene, axis);
    let [a, b] = scene.trims(axis, &[shift], half_line(scene))?;
    let a = a.max(doubles::cut_back(scene, axis, shift));
    let b = b.max(doubles::cut_back(scene, &axis.reversed(), -shift));
    (a + b < axis.length).then(|| line(scene, axis.at(a, shift), axis.at(axis.length - b, shift)))
}

fn crossed(scene: &Scene<'_>, axis: &Axis) -> Vec<Shape> {
    let shift = 0.5 * gap(scene, axis);
    let Some([a, b]) = scene.trims(axis, &[shift, -shift], half_line(scene)) else {
        return plain(scene, axis);
    };
    [shift, -shift]
        .into_iter()
        .map(|s| line(scene, axis.at(a, s), axis.at(axis.length - b, -s)))
        .collect()
}

fn triple(scene: &Scene<'_>, axis: &Axis) -> Vec<Shape> {
    let shift = gap(scene, axis);
    let shifts = [0.0, shift, -shift];
    let Some([a, b]) = scene.trims(axis, &shifts, half_line(scene)) else {
        return plain(scene, axis);
    };
    shifts
        .into_iter()
        .map(|s| line(scene, axis.at(a, s), axis.at(axis.length - b, s)))
        .collect()
}

/// A coordination bond: a line with its head at the second atom, which takes the pair (GR-1.7).
fn dative(scene: &Scene<'_>, axis: &Axis) -> Vec<Shape> {
    let half = 0.5 * scene.style.wedge_width;
    let Some([a, b]) = scene.trims(axis, &[0.0], half_line(scene)) else {
        return Vec::new();
    };
    let end = axis.length - b;
    let head = (3.0 * half).min(0.6 * (end - a));
    let mut path = BezPath::new();
    path.move_to(axis.at(end, 0.0));
    path.line_to(axis.at(end - head, half));
    path.line_to(axis.at(end - head, -half));
    path.close_path();
    vec![
        line(scene, axis.at(a, 0.0), axis.at(end - 0.9 * head, 0.0)),
        Shape::Fill(path),
    ]
}

/// At least three dots, up to four line widths from one to the next (GR-1.8).
fn dotted(scene: &Scene<'_>, axis: &Axis) -> Vec<Shape> {
    let radius = 0.65 * scene.style.line_width;
    let Some([a, b]) = scene.trims(axis, &[0.0], radius) else {
        return Vec::new();
    };
    let rest = axis.length - a - b;
    let n = pieces(rest, 4.0 * scene.style.line_width, 3);
    let mut path = BezPath::new();
    for i in 0..n {
        let along = a + rest * share(i, n);
        path.extend(Circle::new(axis.at(along, 0.0), radius).path_elements(0.01));
    }
    vec![Shape::Fill(path)]
}

fn dashed(scene: &Scene<'_>, axis: &Axis) -> Vec<Shape> {
    let Some([a, b]) = scene.trims(axis, &[0.0], half_line(scene)) else {
        return Vec::new();
    };
    let rest = axis.length - a - b;
    let n = pieces(rest, 5.0 * scene.style.line_width, 3);
    // dashes and gaps in turn, a dash at both ends
    let step = rest / (2.0 * count(n) - 1.0);
    let mut path = BezPath::new();
    for i in 0..n {
        let along = a + 2.0 * step * count(i);
        path.move_to(axis.at(along, 0.0));
        path.line_to(axis.at(along + 0.8 * step, 0.0));
    }
    vec![Shape::Stroke(path, scene.style.line_width)]
}

/// Number of pieces that fill a length at this pitch: at least `least`, at most [`MOST_PIECES`].
pub(super) fn pieces(length: f64, pitch: f64, least: usize) -> usize {
    let n = (length / pitch).floor();
    // small and not negative: fits
    let n = if n.is_finite() {
        n.clamp(0.0, 1e6) as usize
    } else {
        0
    };
    (n + 1).clamp(least, MOST_PIECES)
}

/// A small count as a number.
pub(super) fn count(n: usize) -> f64 {
    f64::from(u32::try_from(n).unwrap_or(u32::MAX))
}

/// Place of the `i`th of `n` pieces that are spread over 0 to 1, ends included.
pub(super) fn share(i: usize, n: usize) -> f64 {
    count(i) / count(n.saturating_sub(1).max(1))
}
