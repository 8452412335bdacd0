//! Rule 4c: r and m precede s and p.

use crate::cip::digraph::Node;
use crate::stereo::Descriptor;
use std::cmp::Ordering;

pub(super) fn compare(a: &Node, b: &Node) -> Ordering {
    let worth = |n: &Node| match n.descriptor {
        Some(Descriptor::LowerR | Descriptor::LowerM) => 2,
        Some(Descriptor::LowerS | Descriptor::LowerP) => 1,
        _ => 0,
    };
    worth(a).cmp(&worth(b))
}
