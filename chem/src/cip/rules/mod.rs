//! The sequence rules, one file each: what a node is worth under the rule.
//!
//! Every rule but 4b is a walk over both branches, sphere by sphere (see [`super::engine`]); 4b compares
//! lists of like and unlike pairs.

mod rule1a;
mod rule1b;
mod rule2;
mod rule3;
mod rule4a;
pub(super) mod rule4b;
mod rule4c;
mod rule5;
mod rule6;

use super::digraph::Node;
use crate::molecule::AtomIx;
use std::cmp::Ordering;

/// A walk of the engine: the rule whose property it compares. Each step orders inner branches by the
/// steps before it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Step {
    R1a,
    R1b,
    R2,
    R3,
    R4a,
    /// Reference descriptors first: serves the lists of Rule 4b. True: R, M, z are the reference.
    Reference(bool),
    R4c,
    /// True: R before S; false: reversed, as in the mirror image.
    R5(bool),
    R6,
}

impl Step {
    /// All steps, by their codes.
    pub(super) const ALL: [Step; 11] = [
        Step::R1a,
        Step::R1b,
        Step::R2,
        Step::R3,
        Step::R4a,
        Step::Reference(true),
        Step::Reference(false),
        Step::R4c,
        Step::R5(true),
        Step::R5(false),
        Step::R6,
    ];
    /// How many there are.
    pub(super) const COUNT: usize = Step::ALL.len();

    /// Its place in [`Step::ALL`].
    pub(super) fn index(self) -> usize {
        self.code() as usize
    }

    /// The step that orders inner branches before this one refines their ties. Rule 4b never orders
    /// inner branches, and Rule 6 does not use the order by Rule 5 (both after the public CIP
    /// Validation Suite).
    pub(super) fn before(self) -> Option<Step> {
        match self {
            Step::R1a => None,
            Step::R1b => Some(Step::R1a),
            Step::R2 => Some(Step::R1b),
            Step::R3 => Some(Step::R2),
            Step::R4a => Some(Step::R3),
            Step::Reference(_) | Step::R4c => Some(Step::R4a),
            Step::R5(_) | Step::R6 => Some(Step::R4c),
        }
    }

    /// Number for a memo's key.
    pub(super) fn code(self) -> u64 {
        match self {
            Step::R1a => 0,
            Step::R1b => 1,
            Step::R2 => 2,
            Step::R3 => 3,
            Step::R4a => 4,
            Step::Reference(true) => 5,
            Step::Reference(false) => 6,
            Step::R4c => 7,
            Step::R5(true) => 8,
            Step::R5(false) => 9,
            Step::R6 => 10,
        }
    }

    /// Whether its outcome depends on the graph alone, not on auxiliary descriptors.
    pub(super) fn is_constitutional(self) -> bool {
        self.code() <= 2
    }

    /// Compares two nodes by the property of the rule; `Greater` ranks higher.
    pub(super) fn compare(self, a: &Node, b: &Node, reference: Option<AtomIx>) -> Ordering {
        match self {
            Step::R1a => rule1a::compare(a, b),
            Step::R1b => rule1b::compare(a, b),
            Step::R2 => rule2::compare(a, b),
            Step::R3 => rule3::compare(a, b),
            Step::R4a => rule4a::compare(a, b),
            Step::Reference(right) => rule4b::compare(a, b, right),
            Step::R4c => rule4c::compare(a, b),
            Step::R5(forward) => rule5::compare(a, b, forward),
            Step::R6 => rule6::compare(a, b, reference),
        }
    }
}
