//! Captions beside their units: in the free angle with most room, touching no ink (GR-11).

use super::bonds::count;
use super::face::{CAP_HEIGHT, Set, Setter};
use super::plane;
use super::scene::Scene;
use super::{Caption, Face, Item, Part, Shape, Tone};
use crate::geom;
use crate::molecule::AtomIx;
use kurbo::{Point, Rect, Vec2};
use std::f64::consts::TAU;

/// Directions that are tried all round, beside the middles of the free angles.
const DIRECTIONS: u32 = 24;
/// Distances that are tried in each direction.
const STEPS: u32 = 40;

/// Ink that a caption must not touch: boxes of glyphs, and segments with half their width.
#[derive(Default)]
pub(super) struct Obstacles {
    boxes: Vec<Rect>,
    segments: Vec<([Point; 2], f64)>,
}

impl Obstacles {
    pub(super) fn of(items: &[Item]) -> Obstacles {
        let mut out = Obstacles::default();
        for item in items {
            match &item.shape {
                Shape::Fill(path) => out.add_lines(path, 0.0),
                Shape::Stroke(path, width) => out.add_lines(path, 0.5 * width),
                Shape::Text(_) => {}
            }
        }
        out
    }

    /// Letters, with white round them so that no caption reads as part of a label.
    pub(super) fn add_sets(&mut self, sets: &[Set], white: f64) {
        for hull in sets.iter().flat_map(|s| &s.hulls) {
            self.boxes
                .extend(plane::bounds(hull).map(|r| r.inflate(white, white)));
        }
    }

    fn add_lines(&mut self, path: &kurbo::BezPath, half: f64) {
        let pieces = plane::segments(path, 0.2);
        self.segments.extend(pieces.into_iter().map(|s| (s, half)));
    }

    /// Those within `reach` of a point.
    fn near(&self, center: Point, reach: f64) -> Obstacles {
        let window = Rect::from_center_size(center, (2.0 * reach, 2.0 * reach));
        Obstacles {
            boxes: self
                .boxes
                .iter()
                .copied()
                .filter(|r| plane::box_to_box(*r, window) <= 0.0)
                .collect(),
            segments: self
                .segments
                .iter()
                .copied()
                .filter(|([a, b], half)| {
                    let r = Rect::from_points(*a, *b).inflate(*half, *half);
                    plane::box_to_box(r, window) <= 0.0
                })
                .collect(),
        }
    }

    /// White between a box and the nearest ink, counted up to `enough`; once it is found to be less
    /// than `least`, the rest is not looked at.
    fn clearance(&self, r: Rect, least: f64, enough: f64) -> f64 {
        let mut clear = enough;
        for b in &self.boxes {
            clear = clear.min(plane::box_to_box(*b, r));
            if clear < least {
                return clear;
            }
        }
        for ([a, b], half) in &self.segments {
            let outer = Rect::from_points(*a, *b).inflate(*half, *half);
            if plane::box_to_box(outer, r) < clear {
                clear = clear.min((plane::segment_to_box([*a, *b], r) - half).max(0.0));
                if clear < least {
                    return clear;
                }
            }
        }
        clear
    }
}

/// Writes all captions, each clear of what is there and of those before it.
pub(super) fn write(
    scene: &Scene<'_>,
    captions: &[Caption],
    setter: &mut Setter,
    obstacles: &mut Obstacles,
    items: &mut Vec<Item>,
) {
    for (i, caption) in captions.iter().enumerate() {
        let Some(place) = Place::of(scene, caption) else {
            continue;
        };
        let sets = set(scene, caption, setter, Point::ORIGIN);
        let Some(size) = plane::bounds(sets.iter().flat_map(|s| s.hulls.iter().flatten())) else {
            continue;
        };
        let center = find(scene, &place, size, obstacles);
        let sets = set(
            scene,
            caption,
            setter,
            Point::ORIGIN + (center - size.center()),
        );
        obstacles.add_sets(&sets, 0.5 * scene.style.label_margin);
        items.extend(sets.into_iter().map(|set| Item {
            part: Part::Caption(i),
            tone: match set.run.face {
                Face::Upright => Tone::Muted,
                Face::Italic => caption.tone,
            },
            shape: Shape::Text(set.run),
        }));
    }
}

fn set(scene: &Scene<'_>, caption: &Caption, setter: &mut Setter, origin: Point) -> Vec<Set> {
    let size = scene.style.caption_size;
    let mut sets = Vec::new();
    if !caption.locant.is_empty() {
        sets.push(setter.set(&caption.locant, Face::Upright, size, origin));
    }
    if let Some(descriptor) = caption.descriptor.as_deref().filter(|d| !d.is_empty()) {
        let x = setter.advance(&caption.locant, Face::Upright, size);
        sets.push(setter.set(descriptor, Face::Italic, size, origin + Vec2::new(x, 0.0)));
    }
    sets
}

/// What a caption stands beside.
struct Place {
    middle: Point,
    /// Directions that lines take from there.
    lines: Vec<Vec2>,
    own: Vec<AtomIx>,
}

impl Place {
    fn of(scene: &Scene<'_>, caption: &Caption) -> Option<Place> {
        let n = scene.molecule().n_atoms();
        if caption.atoms.iter().any(|a| a.index() >= n) {
            return None;
        }
        let own = caption.atoms.clone();
        match own.as_slice() {
            [] => None,
            [atom] => Some(Place {
                middle: scene.point(*atom),
                lines: scene.directions(*atom, None),
                own,
            }),
            [first, .., last] => {
                let along = scene.direction(*first, *last);
                let sum = own
                    .iter()
                    .fold(Vec2::ZERO, |sum, a| sum + scene.point(*a).to_vec2());
                Some(Place {
                    middle: (sum / count(own.len())).to_point(),
                    lines: along.map_or_else(Vec::new, |u| vec![u, -u]),
                    own,
                })
            }
        }
    }

    /// Directions to try: the middles of the free angles, then all round.
    fn directions(&self) -> Vec<Vec2> {
        let middles = geom::gaps(&self.lines).into_iter().map(|(a, _)| a);
        let round = (0..DIRECTIONS).map(|i| TAU * f64::from(i) / f64::from(DIRECTIONS));
        middles.chain(round).map(geom::unit).collect()
    }

    /// Angle to the nearest line.
    fn room(&self, direction: Vec2) -> f64 {
        self.lines
            .iter()
            .map(|l| geom::between(*l, direction))
            .fold(std::f64::consts::PI, f64::min)
    }
}

/// The best middle for a box of this size: near, in a wide angle, clear of ink, and nearer to its own
/// unit than to another atom.
fn find(scene: &Scene<'_>, place: &Place, size: Rect, obstacles: &Obstacles) -> Point {
    let style = scene.style;
    let (half_width, half_height) = (0.5 * size.width(), 0.5 * size.height());
    let usual = scene.drawing.bond_length() * scene.points_per_unit;
    let usual = usual.clamp(0.2 * style.bond_length, 5.0 * style.bond_length);
    let step = 0.06 * usual.max(style.caption_size);
    let reach = f64::from(STEPS) * step + half_width + half_height;
    let near = obstacles.near(place.middle, reach + 2.0 * style.label_margin);
    let others: Vec<Point> = scene
        .molecule()
        .atoms()
        .filter(|a| !place.own.contains(a))
        .map(|a| scene.point(a))
        .filter(|p| p.distance(place.middle) < reach + usual)
        .collect();
    let wanted = (0.12 * CAP_HEIGHT * style.caption_size).max(1.2 * style.line_width);
    let comfort = 2.0 * wanted;
    let mut best: Option<(f64, Point)> = None;
    let candidates = |direction: Vec2| {
        let support = half_width * direction.x.abs() + half_height * direction.y.abs();
        (0..STEPS).map(move |i| {
            let along = 0.5 * support + step * f64::from(i);
            (along - support, place.middle + direction * along)
        })
    };
    let at = |middle| Rect::from_center_size(middle, (2.0 * half_width, 2.0 * half_height));
    for direction in place.directions() {
        for (away, middle) in candidates(direction) {
            let clear = near.clearance(at(middle), wanted, comfort);
            if clear < wanted {
                continue;
            }
            let own = middle.distance(place.middle);
            let stray = others
                .iter()
                .map(|p| own - 0.65 * p.distance(middle))
                .fold(0.0, f64::max);
            let cost = away
                + 1.5 * stray
                + 0.35 * usual * (1.0 - place.room(direction) / std::f64::consts::PI)
                + 0.6 * (comfort - clear);
            if best.is_none_or(|(least, _)| cost < least - 1e-9) {
                best = Some((cost, middle));
            }
            if clear >= comfort {
                break;
            }
        }
    }
    if let Some((_, middle)) = best {
        return middle;
    }
    // no room anywhere: where it is least in the way
    let mut clearest = (-1.0, place.middle);
    for (_, middle) in place.directions().into_iter().flat_map(candidates) {
        let clear = near.clearance(at(middle), 0.0, comfort);
        if clear > clearest.0 + 1e-9 {
            clearest = (clear, middle);
        }
    }
    clearest.1
}
