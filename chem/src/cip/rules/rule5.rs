//! Rule 5: R, M and z precede S, P and e.
//!
//! The only rule whose outcome reflection reverses: ranking once more with the rule reversed tells
//! whether a label changes in the mirror image.

use super::rule4b::class;
use crate::cip::digraph::Node;
use std::cmp::Ordering;

pub(super) fn compare(a: &Node, b: &Node, forward: bool) -> Ordering {
    let worth = |n: &Node| match class(n.descriptor) {
        Some(right) => 1 + u8::from(right == forward),
        None => 0,
    };
    worth(a).cmp(&worth(b))
}
