//! PNG: black on white at a stated resolution, with the physical size in the file.

use super::Sheet;
use chem::ink::Shape;
use kurbo::{BezPath, PathEl, Point};
use std::fmt;
use tiny_skia::{FillRule, LineCap, LineJoin, Mask, PathBuilder, Stroke, Transform};

/// Largest picture, in pixels: an A4 page at 1200 dpi and some more.
const MOST_PIXELS: u64 = 200_000_000;

/// Bits of a pixel.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Default)]
pub enum Depth {
    /// 8-bit grey, smooth edges.
    #[default]
    Grey,
    /// 1-bit black and white, as some patent offices ask.
    BlackWhite,
}

/// Why there is no picture.
#[derive(Debug)]
pub enum PngError {
    /// The resolution is no positive number that the file can hold.
    Resolution(f64),
    /// The picture would have more pixels than can be worked on.
    TooLarge {
        /// Its width in pixels.
        width: f64,
        /// Its height in pixels.
        height: f64,
    },
    /// The picture could not be written.
    Encoding(png::EncodingError),
}

impl fmt::Display for PngError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            PngError::Resolution(dpi) => {
                write!(
                    f,
                    "{dpi} dpi is no resolution: give a number from 1 to 10000"
                )
            }
            PngError::TooLarge { width, height } => write!(
                f,
                "a picture of {width:.0} x {height:.0} pixels is too large: ask for fewer dpi, or for SVG or PDF"
            ),
            PngError::Encoding(e) => write!(f, "the picture could not be written: {e}"),
        }
    }
}

impl std::error::Error for PngError {}

/// Writes a sheet at `dpi` pixels per inch.
///
/// # Errors
/// If the resolution is none or the picture would be too large.
pub fn write(sheet: &Sheet<'_>, dpi: f64, depth: Depth) -> Result<Vec<u8>, PngError> {
    if !(1.0..=10_000.0).contains(&dpi) {
        return Err(PngError::Resolution(dpi));
    }
    let [width, height] =
        [sheet.width, sheet.height].map(|side| (side * dpi / 72.0).round().max(1.0));
    let too_large = PngError::TooLarge { width, height };
    if width * height > MOST_PIXELS as f64 {
        return Err(too_large);
    }
    // both sides are now between 1 and the limit
    let Some(mut mask) = Mask::new(width as u32, height as u32) else {
        return Err(too_large);
    };
    let scale = (dpi / 72.0) as f32;
    let place = Transform::from_translate(sheet.offset.x as f32, sheet.offset.y as f32)
        .post_scale(scale, scale);
    for item in &sheet.ink.items {
        let (path, stroke) = match &item.shape {
            Shape::Fill(path) => (path, None),
            Shape::Stroke(path, width) => (path, Some(*width as f32)),
            Shape::Text(run) => (&run.outline, None),
        };
        let path = copy(path).and_then(|path| match stroke {
            None => Some(path),
            Some(width) => path.stroke(&round_stroke(width), scale),
        });
        if let Some(path) = path {
            mask.fill_path(&path, FillRule::Winding, true, place);
        }
    }
    encode(&mask, sheet, dpi, depth).map_err(PngError::Encoding)
}

fn round_stroke(width: f32) -> Stroke {
    Stroke {
        width,
        line_cap: LineCap::Round,
        line_join: LineJoin::Round,
        ..Stroke::default()
    }
}

fn copy(path: &BezPath) -> Option<tiny_skia::Path> {
    let mut out = PathBuilder::new();
    let xy = |p: Point| (p.x as f32, p.y as f32);
    for element in path.elements() {
        match *element {
            PathEl::MoveTo(p) => out.move_to(xy(p).0, xy(p).1),
            PathEl::LineTo(p) => out.line_to(xy(p).0, xy(p).1),
            PathEl::QuadTo(a, p) => out.quad_to(xy(a).0, xy(a).1, xy(p).0, xy(p).1),
            PathEl::CurveTo(a, b, p) => {
                out.cubic_to(xy(a).0, xy(a).1, xy(b).0, xy(b).1, xy(p).0, xy(p).1);
            }
            PathEl::ClosePath => out.close(),
        }
    }
    out.finish()
}

fn encode(
    mask: &Mask,
    sheet: &Sheet<'_>,
    dpi: f64,
    depth: Depth,
) -> Result<Vec<u8>, png::EncodingError> {
    let mut bytes = Vec::new();
    let mut encoder = png::Encoder::new(&mut bytes, mask.width(), mask.height());
    encoder.set_color(png::ColorType::Grayscale);
    encoder.set_depth(match depth {
        Depth::Grey => png::BitDepth::Eight,
        Depth::BlackWhite => png::BitDepth::One,
    });
    let per_metre = (dpi / 0.0254).round() as u32;
    encoder.set_pixel_dims(Some(png::PixelDimensions {
        xppu: per_metre,
        yppu: per_metre,
        unit: png::Unit::Meter,
    }));
    let facts = sheet.facts;
    for (keyword, text) in [
        ("Title", &facts.title),
        ("Description", &facts.description),
        ("Software", &facts.creator),
    ] {
        // plain chunks hold Latin-1 only
        if text.is_empty() {
            continue;
        }
        if text.chars().all(|c| u32::from(c) < 256 && c != '\0') {
            encoder.add_text_chunk(keyword.to_owned(), text.clone())?;
        } else {
            encoder.add_itxt_chunk(keyword.to_owned(), text.replace('\0', ""))?;
        }
    }
    let mut writer = encoder.write_header()?;
    let data = match depth {
        Depth::Grey => mask.data().iter().map(|ink| 255 - ink).collect(),
        Depth::BlackWhite => pack(mask),
    };
    writer.write_image_data(&data)?;
    writer.finish()?;
    Ok(bytes)
}

/// Eight pixels a byte, each row anew, 1 for white.
fn pack(mask: &Mask) -> Vec<u8> {
    let mut out = Vec::new();
    for row in mask.data().chunks(mask.width().max(1) as usize) {
        for eight in row.chunks(8) {
            let byte = eight.iter().enumerate().fold(0u8, |byte, (i, ink)| {
                byte | (u8::from(*ink < 128) << (7 - i))
            });
            out.push(byte);
        }
    }
    out
}
