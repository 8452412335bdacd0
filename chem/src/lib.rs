//! Wedgewright's chemistry: a drawing in, its stereodescriptors out, and back again.
//!
//! Data flows one way, and so do the modules (each uses only those above it; a test holds this):
//!
//! ```text
//! molfile ──format──> Drawing ──wedge::read──> Configuration ──cip──> Labels ──┐
//! typed line ──solve::require──> Requirement ────────────── compare ──────────┤──> verdict
//!            Requirement ──solve──> Configuration ──wedge::place──> Drawing ──┘ (read back)
//!            Drawing ──audit──> Findings ──audit::mend──> Drawing
//!            Drawing ──ink──> paths and text in points
//! ```
//!
//! Nothing here opens a file, a window or a clock. Coordinates of drawings are x right, y up, in
//! the units of the file; every tolerance is a fraction of [`drawing::Drawing::bond_length`].

pub mod geom;

pub mod element;

pub mod molecule;

pub mod drawing;

pub mod perceive;

pub mod stereo;

pub mod format;

pub mod wedge;

pub mod cip;

pub mod solve;

pub mod layout;

pub mod ink;

pub mod pipeline;

pub mod audit;
