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

mod bonds;
mod captions;
mod doubles;
mod face;
mod letters;
mod marks;
mod plane;
mod scene;
mod spelling;
mod style;

pub use style::{POINTS_PER_MM, STYLES, Style};

use captions::Obstacles;
use face::Setter;
use scene::Scene;

use crate::drawing::Drawing;
use crate::molecule::{AtomIx, BondIx};
use kurbo::{BezPath, Point, Rect, Shape as _};
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
    let mut setter = Setter::default();
    let scene = Scene::new(drawing, style, points_per_unit, &mut setter);
    let mut items = Vec::new();
    for bond in drawing.molecule().bonds() {
        bonds::draw(&scene, bond, &mut items);
    }
    let mut obstacles = Obstacles::of(&items);
    for atom in drawing.molecule().atoms() {
        let Some(label) = scene.label(atom) else {
            continue;
        };
        obstacles.add_sets(&label.sets, 0.7 * style.label_margin);
        items.extend(label.sets.iter().map(|set| Item {
            part: Part::Atom(atom),
            tone: Tone::Ink,
            shape: Shape::Text(set.run.clone()),
        }));
    }
    captions::write(&scene, captions, &mut setter, &mut obstacles, &mut items);
    let mut ink = Ink {
        items,
        bounds: Rect::ZERO,
        points_per_unit: scene.points_per_unit,
    };
    ink.measure();
    ink
}

impl Ink {
    /// Adds a note about the whole figure, such as `and enantiomer`: beneath it, in the middle, half a
    /// bond clear (ST-6.3).
    pub fn add_note(&mut self, text: &str, style: &Style) {
        let mut setter = Setter::default();
        let middle = 0.5 * (self.bounds.x0 + self.bounds.x1);
        let width = setter.advance(text, Face::Upright, style.note_size);
        let below = 0.5 * style.bond_length + face::CAP_HEIGHT * style.note_size;
        let origin = Point::new(middle - 0.5 * width, self.bounds.y1 + below);
        self.items.push(Item {
            part: Part::Note,
            tone: Tone::Ink,
            shape: Shape::Text(setter.set(text, Face::Upright, style.note_size, origin).run),
        });
        self.measure();
    }

    fn measure(&mut self) {
        let boxes = self.items.iter().filter_map(|item| item.shape.bounds());
        self.bounds = boxes.reduce(|a, b| a.union(b)).unwrap_or(Rect::ZERO);
    }
}

impl Shape {
    /// Box round its ink, line width included; `None` if it leaves none.
    pub fn bounds(&self) -> Option<Rect> {
        let (path, half) = match self {
            Shape::Fill(path) => (path, 0.0),
            Shape::Stroke(path, width) => (path, 0.5 * width),
            Shape::Text(run) => (&run.outline, 0.0),
        };
        (!path.elements().is_empty()).then(|| path.bounding_box().inflate(half, half))
    }
}

#[cfg(test)]
mod tests;
