//! Rule 1a: higher atomic number precedes lower (IUPAC 2013 recommendations, P-92.1.3.1).

use crate::cip::digraph::Node;
use std::cmp::Ordering;

pub(super) fn compare(a: &Node, b: &Node) -> Ordering {
    a.number.cmp(&b.number)
}
