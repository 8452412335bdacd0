//! The last relief: atoms that still lie on others are pushed off them, bonds and angles held by springs.

use super::assemble::Shapes;
use super::field::Field;
use super::frame::together;
use super::graph::Graph;
use super::relax::{Spring, Springs};
use crate::geom::Point;
use std::collections::VecDeque;

/// Atoms this near to each other are pushed apart, to this distance.
const TOO_NEAR: f64 = 0.55;
const GOAL: f64 = 0.68;
/// Bonds from a conflict within which atoms give way.
const AROUND: usize = 4;
const STEPS: usize = 160;
/// With more there is no room anywhere.
const MOST_CONFLICTS: usize = 500;
/// Springs times steps at most.
const MOST_WORK: usize = 3_000_000;

/// Pushes atoms apart that relief by whole branches has left on each other.
pub(super) fn settle(graph: &Graph, shapes: &Shapes, points: &mut Vec<Point>) {
    for _ in 0..3 {
        let field = Field::new(graph, points);
        let near: Vec<[usize; 2]> = field
            .conflicts(points)
            .into_iter()
            .map(|c| c.1)
            .filter(|[a, b]| {
                points[*a].distance(points[*b]) < TOO_NEAR && graph.bond(*a, *b).is_none()
            })
            .collect();
        if near.is_empty() || near.len() > MOST_CONFLICTS {
            return;
        }
        let mut moved = points.clone();
        let springs = springs(graph, shapes, points, &near);
        let steps = STEPS.min(MOST_WORK / (springs.list.len() + 1));
        springs.relax(&mut moved, steps);
        let keeps = graph.pairs.iter().all(|p| {
            let meets = |at: &[Point]| {
                let side = together(p.ends.map(|a| at[a]), p.ligands.map(|a| at[a]));
                side == Some(p.together)
            };
            !meets(points) || meets(&moved)
        });
        let cost = |at: &[Point]| -> f64 {
            let field = Field::new(graph, at);
            field.conflicts(at).iter().map(|c| c.0).sum()
        };
        if !keeps || cost(&moved) >= cost(points) {
            return;
        }
        *points = moved;
    }
}

/// Springs that hold all distances over one and two bonds and across rings, and part the near.
fn springs(graph: &Graph, shapes: &Shapes, points: &[Point], near: &[[usize; 2]]) -> Springs {
    let free = around(graph, near);
    let mut list = Vec::new();
    let mut hold = |a: usize, b: usize, force: f64| {
        if free[a] || free[b] {
            list.push(Spring {
                ends: [a, b],
                length: points[a].distance(points[b]),
                force,
            });
        }
    };
    for [a, b] in &graph.ends {
        hold(*a, *b, 4.0);
    }
    for a in 0..graph.len() {
        let links = &graph.near[a];
        for (i, p) in links.iter().enumerate() {
            for q in &links[i + 1..] {
                hold(p.to, q.to, 0.7);
            }
        }
    }
    for ring in shapes.rings.iter().flatten().filter(|r| r.len() <= 8) {
        for (i, a) in ring.iter().enumerate() {
            for b in &ring[i + 1..] {
                hold(*a, *b, 0.5);
            }
        }
    }
    for [a, b] in near {
        list.push(Spring {
            ends: [*a, *b],
            length: GOAL,
            force: 1.5,
        });
    }
    Springs {
        list,
        heights: Vec::new(),
        apart: TOO_NEAR,
        push: 1.0,
        fixed: free.iter().map(|f| !f).collect(),
    }
}

/// Atoms within a few bonds of a conflict.
fn around(graph: &Graph, near: &[[usize; 2]]) -> Vec<bool> {
    let mut far = vec![usize::MAX; graph.len()];
    let mut queue = VecDeque::new();
    for a in near.iter().flatten() {
        far[*a] = 0;
        queue.push_back(*a);
    }
    while let Some(a) = queue.pop_front() {
        if far[a] == AROUND {
            continue;
        }
        for l in &graph.near[a] {
            if far[l.to] == usize::MAX {
                far[l.to] = far[a] + 1;
                queue.push_back(l.to);
            }
        }
    }
    far.iter().map(|d| *d != usize::MAX).collect()
}
