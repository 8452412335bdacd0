//! Marks to configurations and back: two inverses that share no geometry beyond vector arithmetic,
//! so that each is the other's check.

mod place;
mod read;
mod read_axis;
mod read_center;
mod read_double;
mod read_helix;
mod read_pattern;
mod read_projection;

pub use place::{PlaceError, PlaceErrorKind, Target, place, place_axis};
pub use read::{Doubt, Reading, read};
pub use read_pattern::{IN_LINE, Pattern, Shape, Spoke};
pub use read_projection::{Projection, projections};
