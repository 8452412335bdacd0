//! Rule 1b: a duplicate that closes a ring nearer the root precedes one that closes it farther out, and
//! both precede every other node (2018 revision: duplicates for further electron pairs do not count).

use crate::cip::digraph::{Node, NodeKind};
use std::cmp::Ordering;

pub(super) fn compare(a: &Node, b: &Node) -> Ordering {
    let nearness = |n: &Node| match n.kind {
        NodeKind::RingDuplicate => u32::MAX - n.original_sphere,
        NodeKind::Atom | NodeKind::BondDuplicate | NodeKind::Hydrogen => 0,
    };
    nearness(a).cmp(&nearness(b))
}
