//! The figure as a file: the drawing alone, on a page with the margin of its style.

use super::sheet::Sheet as OnScreen;
use crate::export::{Facts, Sheet, pdf, png, svg};
use crate::files;
use crate::session::Session;
use chem::ink;
use std::path::Path;

/// Pixels per inch of a PNG: line art in print.
const DPI: f64 = 600.0;

/// Writes the figure in the format that the name's ending says.
///
/// # Errors
/// What went wrong, in a sentence.
pub(super) fn write(path: &Path, session: &Session) -> Result<(), String> {
    let style = OnScreen::style();
    let ink = ink::compose(session.drawing(), style, &[], None);
    let facts = facts(session);
    let sheet = Sheet::fit(&ink, style.page_margin, None, &facts).map_err(|e| e.to_string())?;
    let ending = path
        .extension()
        .map(|e| e.to_string_lossy().to_lowercase())
        .unwrap_or_default();
    let bytes = match ending.as_str() {
        "svg" => svg::write(&sheet, svg::TextAs::default()).into_bytes(),
        "pdf" => pdf::write(&sheet).map_err(|e| e.to_string())?,
        "png" => png::write(&sheet, DPI, png::Depth::default()).map_err(|e| e.to_string())?,
        other => {
            return Err(format!(
                "a figure cannot be written as .{other}; end the name with .svg, .pdf or .png"
            ));
        }
    };
    files::write(path, &bytes).map_err(|e| e.to_string())
}

fn facts(session: &Session) -> Facts {
    let carried = session.report().descriptor_line();
    Facts {
        title: session.name(),
        description: if carried.is_empty() {
            String::new()
        } else {
            format!("Structure that carries {carried}")
        },
        keywords: Vec::new(),
        creator: "Wedgewright".to_owned(),
        date: None,
    }
}
