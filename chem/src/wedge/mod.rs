//! Marks to configurations and back: two inverses that share no geometry beyond vector arithmetic,
//! so that each is the other's check.

mod place;
mod read;
mod read_center;
mod read_double;

pub use place::{PlaceError, PlaceErrorKind, Target, place};
pub use read::{Doubt, Reading, read};
