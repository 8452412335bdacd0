//! The figure of a drawing, the same from the window and from the command line.

use crate::export::pdf::PdfError;
use crate::export::png::{Depth, PngError};
use crate::export::svg::TextAs;
use crate::export::{Facts, Sheet, SheetError, pdf, png, svg};
use chem::drawing::Drawing;
use chem::ink::{Caption, Ink, POINTS_PER_MM, Style, Tone, compose};
use chem::pipeline::{Place, Report};
use std::path::Path;

/// Pixels per inch of a PNG for which nothing else is asked: line art in print.
pub const DPI: f64 = 600.0;

/// Formats of figures.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Form {
    /// Outlines in an XML text.
    Svg,
    /// One page, with text that can be searched.
    Pdf,
    /// Pixels.
    Png,
}

/// Why there is no figure, with what to do.
#[derive(Debug, thiserror::Error)]
pub enum FigureError {
    /// The name of the file tells no format.
    #[error("{0}: the name must end in .svg, .pdf or .png to tell the format")]
    NoForm(String),
    /// The figure does not go on its page.
    #[error(transparent)]
    Sheet(#[from] SheetError),
    /// The PDF cannot be written.
    #[error(transparent)]
    Pdf(#[from] PdfError),
    /// The PNG cannot be written.
    #[error(transparent)]
    Png(#[from] PngError),
}

impl Form {
    /// The format that the name of a file tells by its ending; there is no content yet.
    ///
    /// # Errors
    /// If the name has another ending.
    pub fn of(path: &Path) -> Result<Form, FigureError> {
        let forms = [("svg", Form::Svg), ("pdf", Form::Pdf), ("png", Form::Png)];
        let ending = path.extension().unwrap_or_default();
        let found = forms
            .iter()
            .find(|(name, _)| ending.eq_ignore_ascii_case(name));
        found.map_or_else(
            || Err(FigureError::NoForm(path.display().to_string())),
            |(_, form)| Ok(*form),
        )
    }
}

/// How a figure is made.
#[derive(Clone, Copy, Debug)]
pub struct Options {
    /// In which format.
    pub form: Form,
    /// With which measures.
    pub style: &'static Style,
    /// Width of the page, points; as wide as the ink with its margin if there is none.
    pub width: Option<f64>,
    /// Pixels per inch of a PNG.
    pub dpi: f64,
}

/// Width of a figure with its margin, millimetres.
pub fn width_mm(ink: &Ink, style: &Style) -> f64 {
    (ink.bounds.width() + 2.0 * style.page_margin) / POINTS_PER_MM
}

/// What to say of a figure that is wider than the place of print takes.
pub fn too_wide(ink: &Ink, style: &Style) -> Option<String> {
    let width = ink.bounds.width();
    let limit = style.width_limit.filter(|limit| width > *limit)?;
    Some(format!(
        "the figure is {:.1} mm wide, more than the {:.1} mm that the style {} has room for",
        width / POINTS_PER_MM,
        limit / POINTS_PER_MM,
        style.name
    ))
}

/// The ink of a figure; with locants and descriptors beside their places if `descriptors` says so.
pub fn ink(drawing: &Drawing, report: &Report, style: &Style, descriptors: bool) -> Ink {
    let carrying = report.places.iter().filter(|p| p.carries.is_some());
    let captions: Vec<Caption> = if descriptors {
        carrying.map(|p| caption(p, Tone::Ink)).collect()
    } else {
        Vec::new()
    };
    compose(drawing, style, &captions, None)
}

/// Locant and descriptor of a place.
pub fn caption(place: &Place, tone: Tone) -> Caption {
    Caption {
        atoms: place.atoms.clone(),
        locant: locant(place),
        descriptor: place.carries.map(|d| d.to_string()),
        tone,
    }
}

/// The number by which a place is named: its lower atom.
pub fn locant(place: &Place) -> String {
    let lowest = place.atoms.iter().min();
    lowest.map_or_else(String::new, |a| (a.index() + 1).to_string())
}

/// The file of a figure, which says what its drawing carries.
///
/// # Errors
/// If the figure does not fit its page or its format.
pub fn write(
    ink: &Ink,
    title: &str,
    report: &Report,
    options: &Options,
) -> Result<Vec<u8>, FigureError> {
    let labels = report.labels_line();
    let facts = Facts {
        title: title.trim().to_owned(),
        description: if labels.is_empty() {
            "a molecule; its drawing carries no stereodescriptors".to_owned()
        } else {
            format!("a molecule; its drawing carries, by atom numbers: {labels}")
        },
        creator: concat!("Wedgewright ", env!("CARGO_PKG_VERSION")).to_owned(),
        ..Facts::default()
    };
    let style = options.style;
    let sheet = Sheet::fit(ink, style.page_margin, options.width, &facts)?;
    Ok(match options.form {
        Form::Svg => svg::write(&sheet, TextAs::Outlines).into_bytes(),
        Form::Pdf => pdf::write(&sheet)?,
        Form::Png => {
            // offices that ask for patent drawings ask for black and white
            let depth = match style.name {
                "patent" => Depth::BlackWhite,
                _ => Depth::Grey,
            };
            png::write(&sheet, options.dpi, depth)?
        }
    })
}
