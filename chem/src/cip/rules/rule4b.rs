//! Rule 4b: like pairs of descriptors precede unlike pairs.
//!
//! Each branch has its own reference: the descriptor class that prevails at the nearest, highest-ranked
//! place that has any; where both are equally frequent there, both are tried. The branch is then the
//! list of its descriptors in order, each like (1) or unlike (0) the reference.

use super::Step;
use crate::cip::Stop;
use crate::cip::digraph::{Node, NodeIx};
use crate::cip::engine::{Branch, Engine};
use crate::stereo::Descriptor;
use std::cmp::Ordering;

/// Whether a descriptor is of the class of R (true) or of S (false); `None` for those that reflection
/// does not change.
pub(super) fn class(descriptor: Option<Descriptor>) -> Option<bool> {
    match descriptor {
        Some(Descriptor::R | Descriptor::M | Descriptor::LowerZ) => Some(true),
        Some(Descriptor::S | Descriptor::P | Descriptor::LowerE) => Some(false),
        _ => None,
    }
}

pub(super) fn compare(a: &Node, b: &Node, right: bool) -> Ordering {
    let worth = |n: &Node| class(n.descriptor) == Some(right);
    worth(a).cmp(&worth(b))
}

/// Compares two branches that are tied through Rule 4a.
pub(in crate::cip) fn compare_branches(
    engine: &mut Engine<'_>,
    a: Branch,
    b: Branch,
) -> Result<Ordering, Stop> {
    let (a, b) = (lists(engine, a)?, lists(engine, b)?);
    if a.is_empty() || b.is_empty() {
        return Ok(Ordering::Equal);
    }
    for (x, y) in a.iter().zip(&b) {
        let order = x.cmp(y);
        if order.is_ne() {
            return Ok(order);
        }
    }
    Ok(Ordering::Equal)
}

/// One list for each reference, best first.
fn lists(engine: &mut Engine<'_>, branch: Branch) -> Result<Vec<Vec<bool>>, Stop> {
    let references = references(engine, branch)?;
    let mut lists = references
        .into_iter()
        .map(|right| likeness(engine, branch, right))
        .collect::<Result<Vec<_>, _>>()?;
    lists.sort_by(|x, y| y.cmp(x));
    Ok(lists)
}

fn references(engine: &mut Engine<'_>, branch: Branch) -> Result<Vec<bool>, Stop> {
    let mut level: Vec<Vec<Branch>> = vec![vec![branch]];
    while !level.is_empty() {
        for group in &level {
            let (mut right, mut left) = (0usize, 0usize);
            for b in group {
                match class(engine.tree.node(b.node).descriptor) {
                    Some(true) => right += 1,
                    Some(false) => left += 1,
                    None => {}
                }
            }
            match right.cmp(&left) {
                Ordering::Greater => return Ok(vec![true]),
                Ordering::Less => return Ok(vec![false]),
                Ordering::Equal if right > 0 => return Ok(vec![true, false]),
                Ordering::Equal => {}
            }
        }
        level = next_level(engine, &level)?;
    }
    Ok(Vec::new())
}

/// Groups of equally ranked branches one sphere farther: the n-th group below each member of a group
/// belong together.
fn next_level(engine: &mut Engine<'_>, level: &[Vec<Branch>]) -> Result<Vec<Vec<Branch>>, Stop> {
    let mut next = Vec::new();
    for group in level {
        let mut merged: Vec<Vec<Branch>> = Vec::new();
        for branch in group {
            let ranked = engine.ranked(*branch, Step::R4a)?;
            for (i, nodes) in ranked.groups().enumerate() {
                if merged.len() <= i {
                    merged.push(Vec::new());
                }
                merged[i].extend(nodes.iter().map(|n| branch_of(*n, *branch)));
            }
        }
        next.append(&mut merged);
    }
    Ok(next)
}

fn branch_of(node: NodeIx, seen_from: Branch) -> Branch {
    Branch {
        node,
        from: seen_from.node,
    }
}

/// The descriptors of a branch in order: true where of the reference's class.
fn likeness(engine: &mut Engine<'_>, branch: Branch, right: bool) -> Result<Vec<bool>, Stop> {
    let mut queue = vec![branch];
    let mut bits = Vec::new();
    let mut next = 0;
    while let Some(at) = queue.get(next).copied() {
        next += 1;
        if let Some(of) = class(engine.tree.node(at.node).descriptor) {
            bits.push(of == right);
        }
        let ranked = engine.ranked(at, Step::Reference(right))?;
        queue.extend(ranked.nodes().iter().map(|n| branch_of(*n, at)));
    }
    Ok(bits)
}

/// The descriptors of a branch that count under this rule, in order, with its first reference in front.
pub(in crate::cip) fn sequence(
    engine: &mut Engine<'_>,
    branch: Branch,
) -> Result<Vec<NodeIx>, Stop> {
    let right = references(engine, branch)?.first().copied().unwrap_or(true);
    let mut queue = vec![branch];
    let mut next = 0;
    while let Some(at) = queue.get(next).copied() {
        next += 1;
        let ranked = engine.ranked(at, Step::Reference(right))?;
        queue.extend(ranked.nodes().iter().map(|n| branch_of(*n, at)));
    }
    Ok(queue
        .into_iter()
        .map(|b| b.node)
        .filter(|n| class(engine.tree.node(*n).descriptor).is_some())
        .collect())
}
