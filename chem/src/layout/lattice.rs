//! A large ring as a closed way over a lattice of equilateral triangles: every turn is 60 degrees to the
//! left (outward corner), to the right (inward corner) or none (a straight atom).
//!
//! The cheapest way is found step by step (dynamic programming over place, heading and last turn). A pull
//! towards a circle keeps the ring round, so that it does not meet itself; where that finds nothing good (long
//! rows of trans double bonds are straight) the circle is stretched to two half circles with straight sides.

use crate::geom::{self, Point, Vec2};
use std::collections::BTreeMap;
use std::f64::consts::{FRAC_PI_3, PI, TAU};

/// What it costs to turn at an atom: right (inward), not at all, left (outward). Infinite: not possible.
pub(super) type Corner = [f64; 3];

/// How the turns at both ends of a bond are to relate.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Relation {
    /// Anything.
    Free,
    /// Both outward or both inward: the neighbours lie on one side.
    Alike,
    /// One outward and one inward.
    Unlike,
}

/// A closed way: its corners' turns and its cost.
#[derive(Clone, Debug)]
pub(super) struct Way {
    pub(super) points: Vec<Point>,
    pub(super) cost: f64,
}

/// Turns as small numbers: -1, 0, 1.
type Turn = i8;

#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
struct State {
    x: i16,
    y: i16,
    heading: u8,
    turn: Turn,
}

struct Step {
    state: State,
    cost: f64,
    from: usize,
}

/// Where the ring lies: a circle of `radius`, drawn out to `half` on both sides of `center` along an axis.
#[derive(Clone, Copy)]
struct Track {
    center: Vec2,
    axis: Vec2,
    half: f64,
    radius: f64,
    /// How far along the track the first corner stands.
    start: f64,
}

impl Track {
    /// A track of a given length that passes the origin at `start`, heading at `tangent` radians,
    /// anticlockwise; `straight` is the part of it that its straight sides take.
    fn new(length: f64, straight: f64, start: f64, tangent: f64) -> Track {
        let half = straight * length / 4.0;
        let radius = (1.0 - straight) * length / TAU;
        let start = start * length;
        // on a track along the x axis about the origin: bottom, right, top, left
        let (bend, right) = (PI * radius, 2.0 * half);
        let (at, heading) = if start < right {
            (Vec2::new(start - half, -radius), 0.0)
        } else {
            let heading = ((start - right) / radius.max(1e-9)).min(PI);
            let at = Vec2::new(half, 0.0) + radius * geom::unit(heading - PI / 2.0);
            let over = (start - right - bend).max(0.0);
            (at - Vec2::new(over, 0.0), heading)
        };
        let axis = geom::unit(tangent - heading);
        let mut track = Track {
            center: Vec2::ZERO,
            axis,
            half,
            radius,
            start,
        };
        track.center = -(at.x * axis + at.y * axis.turn_90());
        track
    }

    fn length(&self) -> f64 {
        4.0 * self.half + TAU * self.radius
    }

    /// How far off the track a place is (outwards), and how far along it.
    fn project(&self, at: Vec2) -> (f64, f64) {
        let v = at - self.center;
        let (x, y) = (v.dot(self.axis), v.dot(self.axis.turn_90()));
        let (half, radius) = (self.half, self.radius);
        let bend = PI * radius;
        if x.abs() <= half {
            return if y < 0.0 {
                (-y - radius, x + half)
            } else {
                (y - radius, 3.0 * half + bend - x)
            };
        }
        let corner = Vec2::new(x - half.copysign(x), y);
        let turn = geom::turn(1.5 * PI, geom::angle(corner));
        let along = if x > 0.0 {
            2.0 * half + radius * turn
        } else {
            4.0 * half + radius * turn
        };
        (corner.hypot() - radius, along)
    }
}

/// How hard the track pulls, per squared bond length.
const PULL: f64 = 0.3;
/// Places on half a track where the first corner is tried.
const STARTS: u32 = 6;
/// Rings of this size and more may be drawn out.
const LONG: usize = 16;
/// Cost per corner from which a way is not good.
const DEAR: f64 = 0.3;
/// States kept in each step at most.
const MOST_STATES: usize = 700;

const WAYS: [(i16, i16); 6] = [(1, 0), (0, 1), (-1, 1), (-1, 0), (0, -1), (1, -1)];

fn place(x: i16, y: i16) -> Vec2 {
    let (x, y) = (f64::from(x), f64::from(y));
    Vec2::new(x + y / 2.0, y * FRAC_PI_3.sin())
}

/// Cheap closed ways for a ring of these corners; `relations[i]` is that of the bond from corner `i` to
/// the next. Anticlockwise, bonds of length 1. Empty if no way closes.
pub(super) fn ways(corners: &[Corner], relations: &[Relation]) -> Vec<Way> {
    // outward corners advance less than inward ones; long rings go in zigzags of 0.87 a bond
    let usual = corners.len() as f64 * 0.866 + 0.6;
    let mut found = Vec::new();
    for length in [usual - 1.6, usual, usual + 1.9] {
        for k in -3..4 {
            let tangent = (15.0 * f64::from(k)).to_radians();
            let track = Track::new(length, 0.0, 0.0, tangent);
            found.extend(on_track(corners, relations, track));
        }
    }
    let cheapest = found.iter().map(|w| w.cost).fold(f64::INFINITY, f64::min);
    if corners.len() >= LONG && cheapest > DEAR * corners.len() as f64 {
        for straight in [0.4, 0.65] {
            // half of the track: the other half is like it
            for start in 0..STARTS {
                for k in -2..3 {
                    let tangent = (20.0 * f64::from(k)).to_radians();
                    let start = f64::from(start) / f64::from(2 * STARTS);
                    let track = Track::new(usual, straight, start, tangent);
                    found.extend(on_track(corners, relations, track));
                }
            }
        }
    }
    found.sort_by(|a: &Way, b| a.cost.total_cmp(&b.cost));
    found.dedup_by(|a, b| {
        let same = |(p, q): (&Point, &Point)| p.distance(*q) < 1e-6;
        a.points.iter().zip(&b.points).all(same)
    });
    found.truncate(12);
    found
}

fn cost_of(corner: &Corner, turn: Turn) -> f64 {
    match turn {
        -1 => corner[0],
        0 => corner[1],
        _ => corner[2],
    }
}

fn fits(relation: Relation, a: Turn, b: Turn) -> bool {
    match relation {
        Relation::Free => true,
        Relation::Alike => a * b == 1,
        Relation::Unlike => a * b == -1,
    }
}

/// The cheapest closed ways along a track, one for each turn at the second corner.
fn on_track<'a>(
    corners: &'a [Corner],
    relations: &'a [Relation],
    track: Track,
) -> impl Iterator<Item = Way> + 'a {
    let turns = [1, -1, 0].into_iter();
    turns.filter_map(move |first| way(corners, relations, track, first))
}

/// The cheapest closed way along a track that starts with a given turn at the second corner.
fn way(corners: &[Corner], relations: &[Relation], track: Track, first: Turn) -> Option<Way> {
    let n = corners.len();
    let mut layers: Vec<Vec<Step>> = vec![vec![Step {
        state: State {
            x: 1,
            y: 0,
            heading: 0,
            turn: 0,
        },
        cost: 0.0,
        from: 0,
    }]];
    // layer `i` stands on corner `i + 1`
    for i in 1..n {
        let ideal = track.start + track.length() * (i + 1) as f64 / n as f64;
        let mut next: BTreeMap<State, (f64, usize)> = BTreeMap::new();
        for (from, step) in layers[i - 1].iter().enumerate() {
            for turn in [1, -1, 0] {
                if i == 1 && turn != first {
                    continue;
                }
                let corner = cost_of(&corners[i], turn);
                let related = i == 1 || fits(relations[i - 1], step.state.turn, turn);
                if !corner.is_finite() || !related {
                    continue;
                }
                let state = forward(step.state, turn);
                let Some(pull) = pull(state, track, ideal, i + 1 == n) else {
                    continue;
                };
                let cost = step.cost + corner + pull;
                let slot = next.entry(state).or_insert((f64::INFINITY, 0));
                if cost < slot.0 {
                    *slot = (cost, from);
                }
            }
        }
        let mut layer: Vec<Step> = next
            .into_iter()
            .map(|(state, (cost, from))| Step { state, cost, from })
            .collect();
        layer.sort_by(|a, b| a.cost.total_cmp(&b.cost).then(a.state.cmp(&b.state)));
        layer.truncate(MOST_STATES);
        layers.push(layer);
    }
    let closing = |step: &Step| -> Option<f64> {
        let turn = match (6 - step.state.heading) % 6 {
            0 => 0,
            1 => 1,
            5 => -1,
            _ => return None,
        };
        let last = fits(relations[n - 1], step.state.turn, turn);
        let both = last && fits(relations[0], turn, first);
        let cost = step.cost + cost_of(&corners[0], turn);
        (both && cost.is_finite()).then_some(cost)
    };
    let (mut at, cost) = layers[n - 1]
        .iter()
        .enumerate()
        .filter(|(_, s)| s.state.x == 0 && s.state.y == 0)
        .filter_map(|(i, s)| Some((i, closing(s)?)))
        .min_by(|a, b| a.1.total_cmp(&b.1))?;
    let mut points = vec![Point::ORIGIN; n];
    for i in (1..n).rev() {
        at = layers[i][at].from;
        let state = layers[i - 1][at].state;
        points[i] = place(state.x, state.y).to_point();
    }
    simple(&points).then_some(Way { points, cost })
}

fn forward(state: State, turn: Turn) -> State {
    let heading = match turn {
        1 => (state.heading + 1) % 6,
        -1 => (state.heading + 5) % 6,
        _ => state.heading,
    };
    let (x, y) = WAYS[usize::from(heading)];
    State {
        x: state.x + x,
        y: state.y + y,
        heading,
        turn,
    }
}

/// Cost of a place off the track; `None` if it is too far off or too far ahead or behind.
fn pull(state: State, track: Track, ideal: f64, is_last: bool) -> Option<f64> {
    if is_last {
        return (state.x == 0 && state.y == 0).then_some(0.0);
    }
    let (off, along) = track.project(place(state.x, state.y));
    let length = track.length();
    let ahead = (along - ideal).rem_euclid(length);
    let ahead = f64::min(ahead, length - ahead);
    let slack = 0.5 * track.radius + 1.4;
    (off.abs() < 1.9 && ahead < slack).then_some(PULL * off * off)
}

/// Whether no two corners share a place.
fn simple(points: &[Point]) -> bool {
    (0..points.len()).all(|i| (0..i).all(|j| points[i].distance(points[j]) > 0.5))
}
