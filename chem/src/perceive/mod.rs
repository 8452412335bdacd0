//! What the graph alone says: rings, symmetry, mancude systems.

mod rings;

pub use rings::Rings;
