//! Springs between points, let go for a bounded number of steps.

use crate::geom::{self, Point, Vec2};

/// A pair of points with a wished distance.
#[derive(Clone, Copy, Debug)]
pub(super) struct Spring {
    pub(super) ends: [usize; 2],
    pub(super) length: f64,
    pub(super) force: f64,
}

/// Three points of which the middle one is to stand off the line from the first to the last.
#[derive(Clone, Copy, Debug)]
pub(super) struct Height {
    pub(super) points: [usize; 3],
    /// Distance from the line, positive to the left.
    pub(super) off: f64,
    pub(super) force: f64,
}

/// What pulls and pushes.
#[derive(Clone, Debug, Default)]
pub(super) struct Springs {
    pub(super) list: Vec<Spring>,
    pub(super) heights: Vec<Height>,
    /// Points nearer than this push each other apart, save the ends of one spring.
    pub(super) apart: f64,
    /// How hard they push.
    pub(super) push: f64,
    /// Points that stay.
    pub(super) fixed: Vec<bool>,
}

/// Steps after which the list of near points is made anew.
const FRESH: usize = 12;

impl Springs {
    /// Lets the points go for `steps` steps (fast inertial relaxation: speed is kept while it leads
    /// downhill and dropped when it does not).
    pub(super) fn relax(&self, points: &mut [Point], steps: usize) {
        let n = points.len();
        let mut joined: Vec<Vec<usize>> = vec![Vec::new(); n];
        for s in &self.list {
            joined[s.ends[0]].push(s.ends[1]);
            joined[s.ends[1]].push(s.ends[0]);
        }
        for list in &mut joined {
            list.sort_unstable();
        }
        let mut speed = vec![Vec2::ZERO; n];
        let (mut step, mut drag, mut downhill) = (0.1, 0.1, 0);
        let mut close = Vec::new();
        for round in 0..steps {
            if round % FRESH == 0 {
                close = self.close(points, &joined);
            }
            let force = self.forces(points, &close);
            let power: f64 = speed.iter().zip(&force).map(|(v, f)| v.dot(*f)).sum();
            if power > 0.0 {
                let (v, f) = (norm(&speed), norm(&force));
                let share = if f > 1e-12 { drag * v / f } else { 0.0 };
                for (v, f) in speed.iter_mut().zip(&force) {
                    *v = *v * (1.0 - drag) + *f * share;
                }
                downhill += 1;
                if downhill > 5 {
                    step = f64::min(step * 1.1, 0.25);
                    drag *= 0.99;
                }
            } else {
                speed.fill(Vec2::ZERO);
                step = f64::max(step * 0.5, 0.01);
                (drag, downhill) = (0.1, 0);
            }
            let mut most = 0.0f64;
            for i in 0..n {
                if self.fixed.get(i) == Some(&true) {
                    continue;
                }
                speed[i] += force[i] * step;
                let mut by = speed[i] * step;
                let far = by.hypot();
                if far > 0.15 {
                    by *= 0.15 / far;
                }
                most = most.max(far);
                points[i] += by;
            }
            if most < 1e-7 && round > 20 {
                return;
            }
        }
    }

    fn forces(&self, points: &[Point], close: &[[usize; 2]]) -> Vec<Vec2> {
        let mut force = vec![Vec2::ZERO; points.len()];
        for h in &self.heights {
            let [p, a, q] = h.points;
            let Some(way) = geom::direction(points[p], points[q], 1e-6) else {
                continue;
            };
            let by = 2.0 * h.force * (h.off - way.cross(points[a] - points[p]));
            let pull = way.turn_90() * by;
            force[a] += pull;
            force[p] -= pull / 2.0;
            force[q] -= pull / 2.0;
        }
        let mut pull = |[i, j]: [usize; 2], by: f64| {
            let v = points[j] - points[i];
            let d = v.hypot();
            // two points on one spot part along a direction that their numbers give
            let way = if d > 1e-9 {
                v / d
            } else {
                geom::unit((i * 7 + j * 3) as f64)
            };
            force[i] += way * by;
            force[j] -= way * by;
        };
        for s in &self.list {
            let d = points[s.ends[0]].distance(points[s.ends[1]]);
            pull(s.ends, 2.0 * s.force * (d - s.length));
        }
        for pair in close {
            let d = points[pair[0]].distance(points[pair[1]]);
            if d < self.apart {
                pull(*pair, -2.0 * self.push * (self.apart - d));
            }
        }
        force
    }

    /// Pairs that may come too near before the list is made again.
    fn close(&self, points: &[Point], joined: &[Vec<usize>]) -> Vec<[usize; 2]> {
        let reach = self.apart + 0.6;
        let mut order: Vec<usize> = (0..points.len()).collect();
        order.sort_by(|a, b| points[*a].x.total_cmp(&points[*b].x).then(a.cmp(b)));
        let mut pairs = Vec::new();
        if self.push <= 0.0 {
            return pairs;
        }
        for (k, i) in order.iter().enumerate() {
            for j in &order[k + 1..] {
                if points[*j].x - points[*i].x > reach {
                    break;
                }
                if (points[*j].y - points[*i].y).abs() <= reach
                    && joined[*i].binary_search(j).is_err()
                {
                    pairs.push([*i.min(j), *i.max(j)]);
                }
            }
        }
        pairs
    }
}

fn norm(list: &[Vec2]) -> f64 {
    list.iter().map(|v| v.hypot2()).sum::<f64>().sqrt()
}

/// Distance between two corners of a regular polygon with sides of 1, `steps` sides apart.
pub(super) fn across(size: usize, steps: usize) -> f64 {
    let half = std::f64::consts::PI / size as f64;
    (half * steps as f64).sin() / half.sin()
}
