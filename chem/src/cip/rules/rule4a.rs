//! Rule 4a: units that reflection changes precede those that it does not, and these precede places
//! without descriptor.

use crate::cip::digraph::Node;
use std::cmp::Ordering;

pub(super) fn compare(a: &Node, b: &Node) -> Ordering {
    let worth = |n: &Node| match n.descriptor {
        Some(d) if d.mirrored() != d => 2,
        Some(_) => 1,
        None => 0,
    };
    worth(a).cmp(&worth(b))
}
