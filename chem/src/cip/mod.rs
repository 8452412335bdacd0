//! The Cahn-Ingold-Prelog rules.

/// A sequence rule.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Rule {
    /// Higher atomic number first.
    R1a,
    /// A duplicate of an atom nearer the root first.
    R1b,
    /// Higher mass first.
    R2,
    /// Z before E before none.
    R3,
    /// Chiral before pseudoasymmetric before none.
    R4a,
    /// Like pairs before unlike.
    R4b,
    /// r before s.
    R4c,
    /// R before S.
    R5,
    /// The chosen reference first.
    R6,
}

impl Rule {
    /// Its name: `1a`.
    pub fn name(self) -> &'static str {
        match self {
            Rule::R1a => "1a",
            Rule::R1b => "1b",
            Rule::R2 => "2",
            Rule::R3 => "3",
            Rule::R4a => "4a",
            Rule::R4b => "4b",
            Rule::R4c => "4c",
            Rule::R5 => "5",
            Rule::R6 => "6",
        }
    }
}
