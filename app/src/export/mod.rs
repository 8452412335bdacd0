//! Figures as files: SVG, PNG and PDF. The writers see [`chem::ink::Ink`] and plain facts, no chemistry.
//!
//! A [`Sheet`] puts the ink on a page of its own; what a writer makes of it has exactly the sheet's
//! size. All writers are pure: no clock, no file, no font of the machine, so that the same drawing
//! gives the same bytes.

pub mod pdf;
pub mod png;
pub mod svg;

use chem::ink::{Ink, Item, Part, Shape, TextRun};
use kurbo::Vec2;
use std::fmt;

pub use chem::ink::POINTS_PER_MM;

/// The least side of a page, in points: an empty drawing still gives a file that opens.
const LEAST_SIDE: f64 = 1.0;

/// What a file says about its figure beside showing it.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Facts {
    /// Title of the figure; empty for none.
    pub title: String,
    /// What the figure shows, in words, for those who cannot see it; empty for none.
    pub description: String,
    /// Words to find it by.
    pub keywords: Vec<String>,
    /// The program that made it.
    pub creator: String,
    /// When it was made, if that is to be told.
    pub date: Option<Date>,
}

/// A point in time for a file's metadata, UTC.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Date {
    /// Year, 0 to 9999.
    pub year: u16,
    /// Month, 1 to 12.
    pub month: u8,
    /// Day, 1 to 31.
    pub day: u8,
    /// Hour, 0 to 23.
    pub hour: u8,
    /// Minute, 0 to 59.
    pub minute: u8,
    /// Second, 0 to 59.
    pub second: u8,
}

/// Ink on a page of its own.
#[derive(Clone, Copy, Debug)]
pub struct Sheet<'a> {
    /// What is drawn.
    pub ink: &'a Ink,
    /// Width of the page, points.
    pub width: f64,
    /// Height of the page, points.
    pub height: f64,
    /// From the ink's coordinates to those of the page (origin at the upper left, y down), points.
    pub offset: Vec2,
    /// What the file says about the figure.
    pub facts: &'a Facts,
}

/// Why ink does not go on a page.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum SheetError {
    /// The figure is wider than the width asked for; both in points.
    TooWide {
        /// Width of the figure.
        needed: f64,
        /// Width asked for.
        asked: f64,
    },
    /// The width or margin asked for is no size for a page; points.
    NoSize(f64),
}

impl fmt::Display for SheetError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            SheetError::TooWide { needed, asked } => write!(
                f,
                "the figure is {:.1} mm wide, more than the {:.1} mm asked for: ask for more, turn the drawing, or take a style with shorter bonds",
                // rounded up, so that the width named is enough
                (needed / POINTS_PER_MM * 10.0).ceil() / 10.0,
                asked / POINTS_PER_MM
            ),
            SheetError::NoSize(points) => write!(
                f,
                "{} mm is no width or margin for a page: give a positive number",
                points / POINTS_PER_MM
            ),
        }
    }
}

impl std::error::Error for SheetError {}

impl<'a> Sheet<'a> {
    /// A page round the ink: with this margin on all sides, or exactly as wide as asked, the ink in
    /// the middle. The ink is never made smaller. All in points.
    ///
    /// # Errors
    /// If the ink is wider than the width asked for, or a size is no positive number.
    pub fn fit(
        ink: &'a Ink,
        margin: f64,
        width: Option<f64>,
        facts: &'a Facts,
    ) -> Result<Sheet<'a>, SheetError> {
        if !margin.is_finite() || margin < 0.0 {
            return Err(SheetError::NoSize(margin));
        }
        let bounds = ink.bounds;
        let width = match width {
            Some(asked) if !asked.is_finite() || asked < LEAST_SIDE => {
                return Err(SheetError::NoSize(asked));
            }
            // a hair of slack for widths that were turned from millimetres
            Some(asked) if bounds.width() > asked + 1e-6 => {
                return Err(SheetError::TooWide {
                    needed: bounds.width(),
                    asked,
                });
            }
            Some(asked) => asked,
            None => (bounds.width() + 2.0 * margin).max(LEAST_SIDE),
        };
        let height = (bounds.height() + 2.0 * margin).max(LEAST_SIDE);
        let middle = Vec2::new(0.5 * width, 0.5 * height);
        Ok(Sheet {
            ink,
            width,
            height,
            offset: middle - bounds.center().to_vec2(),
            facts,
        })
    }
}

/// The items of a figure, with the runs of one label or caption gathered.
enum Piece<'a> {
    Mark(&'a Shape),
    Words(Vec<&'a TextRun>),
}

/// Gathers runs that follow each other and belong to one part.
fn pieces(items: &[Item]) -> Vec<Piece<'_>> {
    let mut out: Vec<Piece<'_>> = Vec::new();
    let mut last: Option<Part> = None;
    for item in items {
        match (&item.shape, out.last_mut()) {
            (Shape::Text(run), Some(Piece::Words(runs))) if last == Some(item.part) => {
                runs.push(run);
            }
            (Shape::Text(run), _) => out.push(Piece::Words(vec![run])),
            (mark @ (Shape::Fill(_) | Shape::Stroke(..)), _) => out.push(Piece::Mark(mark)),
        }
        last = Some(item.part);
    }
    out
}

#[cfg(test)]
mod tests;
