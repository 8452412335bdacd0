//! What the graph alone says: rings, symmetry, delocalised systems.

mod dative;
mod mancude;
mod rings;
mod symmetry;

pub use dative::drawn_without_charges;
pub use mancude::{Delocalised, Ratio, delocalised};
pub use rings::Rings;
pub(crate) use rings::ring_bonds;
pub use symmetry::Symmetry;
