//! Rule 3: Z precedes E, and both precede a double bond without descriptor. The e and z of a double bond
//! that reflection reverses do not count here.

use crate::cip::digraph::Node;
use crate::stereo::Descriptor;
use std::cmp::Ordering;

pub(super) fn compare(a: &Node, b: &Node) -> Ordering {
    let worth = |n: &Node| match n.descriptor {
        Some(Descriptor::Z) => 2,
        Some(Descriptor::E) => 1,
        _ => 0,
    };
    worth(a).cmp(&worth(b))
}
