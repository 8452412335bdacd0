//! Rule 6: of ligands that nothing else tells apart, the one chosen as reference precedes the others
//! (proposed by Hanson et al., J. Chem. Inf. Model. 2018, 58, 1755). Every tied ligand is tried as
//! reference, see [`crate::cip::unit`]; a label stands only if all give the same sense.

use crate::cip::digraph::{Node, NodeKind};
use crate::molecule::AtomIx;
use std::cmp::Ordering;

pub(super) fn compare(a: &Node, b: &Node, reference: Option<AtomIx>) -> Ordering {
    let worth = |n: &Node| n.kind != NodeKind::Hydrogen && Some(n.atom) == reference;
    worth(a).cmp(&worth(b))
}
