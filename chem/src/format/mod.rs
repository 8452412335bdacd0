//! Text in, drawings out, and back.
//!
//! Source of the molfile and SD rules: *CTfile Formats* (2016 and 2020), as far as open readers quote
//! it. Nothing that could alter an atom, a bond or a configuration is repaired silently: a repair
//! leaves a [`Notice`], and what cannot be repaired for certain is a [`ReadError`] with its place.

mod error;
mod kekule;
mod lines;
pub mod molfile;
mod pairing;
mod record;
pub mod sdf;
pub mod smiles;
mod stereo_group;
pub mod text;

pub use error::{Notice, ReadError, Reason, WriteError};
pub use record::{Field, Record, Version, WriteOptions};
pub use stereo_group::{GroupKind, StereoGroup};
