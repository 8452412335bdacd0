//! What the graph alone says: rings, symmetry, delocalised systems.

mod mancude;
mod rings;
mod symmetry;

pub use mancude::{Delocalised, Ratio, delocalised};
pub use rings::Rings;
pub(crate) use rings::ring_bonds;
pub use symmetry::Symmetry;
