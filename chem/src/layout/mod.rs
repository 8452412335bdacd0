//! Places for new atoms. Plain geometry: regular polygons, 120-degree turns, the widest gap.

mod assemble;
mod chains;
mod cycles;
mod field;
mod fit;
mod frame;
mod fuse;
mod graft;
mod graph;
mod grow;
mod invert;
mod judge;
mod lattice;
mod lay;
mod macrocycle;
mod orient;
mod overlap;
mod parts;
mod planar;
mod relax;
mod ring;
mod rings;
mod settle;
mod space;
mod tidy;
mod tree;
mod word;

pub use graft::{Graft, graft};
pub use grow::atom_at;
pub use lay::{Layout, Wish, lay_out};
pub use tidy::tidy;
pub use word::{Word, read};

use crate::molecule::AtomIx;
use std::fmt;

/// Why nothing can be grafted, with what to do.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum GraftError {
    /// Nothing was typed.
    Nothing,
    /// Letters that are no symbol.
    NoElement {
        /// As typed.
        written: String,
        /// The symbol that differs in its capitals only.
        perhaps: Option<&'static str>,
    },
    /// No charge stands behind a symbol.
    NoCharge(String),
    /// A ring that is too small or too large.
    RingSize(usize),
    /// Neither ring size nor charge.
    NoNumber(String),
    /// Something that goes on an atom, and none is selected.
    WantsAtom(&'static str),
    /// A bond, and nothing is selected.
    WantsAtomOrBond,
    /// A bond, and more than two atoms are selected.
    ManyAtoms,
    /// A ring, and not one atom or one bond is selected.
    RingPlace,
    /// A ring at an atom that has no valence to spare.
    NoHydrogen(AtomIx),
}

impl fmt::Display for GraftError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            GraftError::Nothing => {
                f.write_str("an element, a bond (- = #), a charge or a ring size")
            }
            GraftError::NoElement {
                written,
                perhaps: Some(symbol),
            } => write!(f, "{written} is no element; {symbol} is one"),
            GraftError::NoElement { written, .. } => {
                write!(f, "{written} is no element")
            }
            GraftError::NoCharge(written) => write!(
                f,
                "{written} is no charge; write +, -, 2+ or 2- behind the symbol"
            ),
            GraftError::RingSize(size) => write!(
                f,
                "no ring of {size}; rings have {} to {} atoms here",
                word::RINGS.start(),
                word::RINGS.end()
            ),
            GraftError::NoNumber(written) => write!(
                f,
                "{written} is neither a ring size (5, 6=) nor a charge (2+)"
            ),
            GraftError::WantsAtom(what) => write!(f, "{what} goes on an atom; select one"),
            GraftError::WantsAtomOrBond => {
                f.write_str("a bond needs an atom or a bond; select one")
            }
            GraftError::ManyAtoms => {
                f.write_str("a bond grows from one atom or joins two; select one or two")
            }
            GraftError::RingPlace => f.write_str("a ring goes on one atom or one bond; select one"),
            GraftError::NoHydrogen(atom) => write!(
                f,
                "atom {} has no hydrogen to give up for a ring; select another or a bond",
                atom.index() + 1
            ),
        }
    }
}

impl std::error::Error for GraftError {}

#[cfg(test)]
mod tests;
