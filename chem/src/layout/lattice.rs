//! A large ring as a closed way over a lattice of equilateral triangles: every turn is 60 degrees to the
//! left (outward corner), to the right (inward corner) or none (a straight atom).
//!
//! The cheapest way is found step by step (dynamic programming over place, heading and last turn). A pull
//! towards a circle keeps the ring round, so that it does not meet itself.

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

/// Where the ring lies: a circle about `center`.
#[derive(Clone, Copy)]
struct Circle {
    center: Vec2,
    radius: f64,
}

/// How hard the circle pulls, per squared bond length.
const PULL: f64 = 0.3;
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
    let n = corners.len() as f64;
    let mut found = Vec::new();
    // outward corners advance less than inward ones; long rings go in zigzags of 0.87 a bond
    let usual = (n * 0.866 + 0.6) / TAU;
    for radius in [usual - 0.25, usual, usual + 0.3] {
        for k in 0..7 {
            let center = radius * geom::unit((45.0 + 15.0 * f64::from(k)).to_radians());
            let circle = Circle { center, radius };
            for first in [1, -1, 0] {
                found.extend(way(corners, relations, circle, first));
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

/// The cheapest closed way about a circle that starts with a given turn at the second corner.
fn way(corners: &[Corner], relations: &[Relation], circle: Circle, first: Turn) -> Option<Way> {
    let n = corners.len();
    let start = geom::angle(-circle.center);
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
        let ideal = start + TAU * (i + 1) as f64 / n as f64;
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
                let Some(pull) = pull(state, circle, ideal, i + 1 == n) else {
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

/// Cost of a place off the circle; `None` if it is too far off or too far ahead or behind.
fn pull(state: State, circle: Circle, ideal: f64, is_last: bool) -> Option<f64> {
    if is_last {
        return (state.x == 0 && state.y == 0).then_some(0.0);
    }
    let at = place(state.x, state.y) - circle.center;
    let off = at.hypot() - circle.radius;
    let turn = geom::turn(ideal, geom::angle(at));
    let ahead = if turn > PI { turn - TAU } else { turn };
    let slack = 0.5 + 1.4 / circle.radius;
    (off.abs() < 1.9 && ahead.abs() < slack).then_some(PULL * off * off)
}

/// Whether no two corners share a place.
fn simple(points: &[Point]) -> bool {
    (0..points.len()).all(|i| (0..i).all(|j| points[i].distance(points[j]) > 0.5))
}
