//! Rule 2: higher mass precedes lower: the exact mass of a stated isotope against the standard weight;
//! duplicates have none.

use crate::cip::digraph::Node;
use std::cmp::Ordering;

pub(super) fn compare(a: &Node, b: &Node) -> Ordering {
    a.mass.cmp(&b.mass)
}
