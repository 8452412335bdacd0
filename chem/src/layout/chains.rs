//! Directions of bonds at an atom: zigzags of 120 degrees, crosses of 90, straight lines, the middle of
//! the gap outside a ring.

use super::graph::Graph;
use super::tree::{Reach, Tree};
use crate::element::Element;
use crate::geom::{self, Vec2};
use std::f64::consts::{PI, TAU};

/// Something to be placed at an atom: a neighbour over a bond, or a block that the atom belongs to.
#[derive(Clone, Copy, Debug)]
pub(super) struct Item {
    /// Node of the tree.
    pub(super) node: usize,
    /// Angle that it fills: 0 for a bond, the ring's inner angle for a block.
    pub(super) width: f64,
    pub(super) reach: Reach,
}

/// Equal gaps between items in the gap that opens (anticlockwise) at `from`: middle directions.
pub(super) fn shared_out(from: f64, gap: f64, items: &[Item]) -> Vec<f64> {
    let filled: f64 = items.iter().map(|i| i.width).sum();
    let step = (gap - filled) / (items.len() + 1) as f64;
    let mut at = from;
    items
        .iter()
        .map(|item| {
            at += step + item.width / 2.0;
            let middle = at;
            at += item.width / 2.0;
            middle
        })
        .collect()
}

/// The items in the order they are to follow anticlockwise from the bond that comes in, and their
/// directions, at an atom outside rings. `back` is the direction of that bond as seen from the atom and
/// `side` (1 anticlockwise first, -1 clockwise) the side of the heaviest item; items come heaviest first.
pub(super) fn round_one_bond(
    graph: &Graph,
    tree: &Tree,
    atom: usize,
    back: f64,
    side: f64,
    items: &[Item],
) -> Vec<f64> {
    let third = TAU / 3.0;
    let plain = items.iter().all(|i| i.width <= 0.0);
    match items {
        [_] if plain && graph.is_linear(atom) => vec![back + PI],
        [_] if plain => vec![back + side * third],
        [_, _] if plain => vec![back + side * third, back - side * third],
        [_, _, _] if plain => four(graph, tree, atom, back, side, items),
        _ => {
            let mut angles = shared_out(back, TAU, items);
            if side < 0.0 {
                for a in &mut angles {
                    *a = 2.0 * back - *a;
                }
            }
            angles
        }
    }
}

/// Four bonds: a cross, or a chain of 120 degrees that carries two single atoms on its outside.
fn four(graph: &Graph, tree: &Tree, atom: usize, back: f64, side: f64, items: &[Item]) -> Vec<f64> {
    let is_leaf = |i: &Item| graph.near[i.node].len() == 1;
    let comes_from_leaf =
        tree.parent[atom] < tree.n_atoms && graph.near[tree.parent[atom]].len() == 1;
    let (third, ninth) = (TAU / 3.0, TAU * 2.0 / 9.0);
    let is_chain = matches!(
        graph.element[atom],
        Element::C | Element::N | Element::SI | Element::B
    );
    if is_chain && !is_leaf(&items[0]) {
        if !comes_from_leaf && is_leaf(&items[1]) && is_leaf(&items[2]) {
            let first = back + side * third;
            return vec![first, first + side * ninth, first + 2.0 * side * ninth];
        }
        if comes_from_leaf && !is_leaf(&items[1]) && is_leaf(&items[2]) {
            let first = back + side * ninth;
            return vec![first, first + side * third, back - side * ninth];
        }
    }
    vec![back + PI, back + side * PI / 2.0, back - side * PI / 2.0]
}

/// Directions at an atom where no bond comes in, heaviest first.
pub(super) fn round_nothing(graph: &Graph, atom: usize, items: &[Item]) -> Vec<f64> {
    // chains rise and fall by 30 degrees about the horizontal
    let first = PI / 6.0;
    match items {
        [] => Vec::new(),
        [one] if one.width <= 0.0 => vec![first],
        [a, b] if a.width <= 0.0 && b.width <= 0.0 => {
            let turn = if graph.is_linear(atom) { PI } else { TAU / 3.0 };
            vec![first, first - turn]
        }
        _ => {
            // the heaviest opposite each other
            let mut order: Vec<usize> = (0..items.len()).collect();
            if items.len() > 3 {
                order.swap(1, items.len() / 2);
            }
            let filled: f64 = items.iter().map(|i| i.width).sum();
            let step = (TAU - filled) / items.len() as f64;
            let mut at = first - items[order[0]].width / 2.0;
            let mut angles = vec![0.0; items.len()];
            for i in order {
                at += items[i].width / 2.0;
                angles[i] = at;
                at += items[i].width / 2.0 + step;
            }
            angles
        }
    }
}

/// Gaps between drawn bonds in which `items` find room, each as its start and its width.
pub(super) fn gaps_for(bonds: &[Vec2], items: &[Item]) -> Vec<(f64, f64)> {
    let filled: f64 = items.iter().map(|i| i.width).sum();
    let enough = |gap: f64| (gap - filled) / (items.len() + 1) as f64 > 0.6;
    let all: Vec<(f64, f64)> = geom::gaps(bonds)
        .into_iter()
        .map(|(middle, wide)| (middle - wide / 2.0, wide))
        .collect();
    let roomy: Vec<_> = all.iter().copied().filter(|g| enough(g.1)).collect();
    if !roomy.is_empty() {
        return roomy;
    }
    let widest = all.into_iter().fold(
        (0.0, 0.0),
        |best: (f64, f64), g| if g.1 > best.1 + 1e-9 { g } else { best },
    );
    vec![widest]
}
