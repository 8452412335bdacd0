//! PDF: one page of exactly the sheet's size, vectors in black, the face embedded, labels to be found
//! as words.

use super::{Date, Facts, Piece, Sheet, pieces};
use chem::ink::{Face, Ink, Shape, TextRun};
use krilla::geom::{Path, PathBuilder, Point};
use krilla::metadata::{DateTime, Metadata};
use krilla::num::NormalizedF32;
use krilla::page::PageSettings;
use krilla::paint::{Fill, FillRule, LineCap, LineJoin, Stroke};
use krilla::surface::Surface;
use krilla::tagging::{ContentTag, Identifier, SpanTag, Tag, TagGroup, TagTree};
use krilla::text::{Font, GlyphId, KrillaGlyph};
use krilla::{Document, SerializeSettings, color};
use kurbo::{BezPath, PathEl, Vec2};
use std::fmt;

/// Why there is no document.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum PdfError {
    /// The page is larger than a PDF can have (14400 points, about 5 m).
    PageSize,
    /// A font could not be read or embedded.
    Font,
    /// The writer gave up, with its reason.
    Writer(String),
}

impl fmt::Display for PdfError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            PdfError::PageSize => write!(
                f,
                "the page is larger than a PDF can have (5080 mm): write SVG, or take a smaller style"
            ),
            PdfError::Font => write!(f, "the font could not be embedded: write SVG"),
            PdfError::Writer(why) => write!(f, "the PDF could not be written: {why}"),
        }
    }
}

impl std::error::Error for PdfError {}

/// The faces, ready for a document.
struct Fonts {
    upright: Font,
    italic: Font,
}

impl Fonts {
    fn load() -> Result<Fonts, PdfError> {
        let font = |face: Face| Font::new(face.bytes().into(), 0).ok_or(PdfError::Font);
        Ok(Fonts {
            upright: font(Face::Upright)?,
            italic: font(Face::Italic)?,
        })
    }

    fn of(&self, face: Face) -> Font {
        match face {
            Face::Upright => self.upright.clone(),
            Face::Italic => self.italic.clone(),
        }
    }
}

/// Writes a sheet as a document of one page.
///
/// # Errors
/// If the page is too large or the writer gives up.
pub fn write(sheet: &Sheet<'_>) -> Result<Vec<u8>, PdfError> {
    // the limit of the format, implementation limits of PDF 1.7, annex C
    if sheet.width > 14_400.0 || sheet.height > 14_400.0 {
        return Err(PdfError::PageSize);
    }
    let fonts = Fonts::load()?;
    let settings =
        PageSettings::from_wh(sheet.width as f32, sheet.height as f32).ok_or(PdfError::PageSize)?;
    let mut document = Document::new_with(SerializeSettings::default());
    let mut page = document.start_page_with(settings);
    let mut surface = page.surface();
    let alt = [sheet.facts.title.as_str(), sheet.facts.description.as_str()]
        .into_iter()
        .filter(|s| !s.is_empty())
        .collect::<Vec<_>>()
        .join(". ");
    let mut figure = TagGroup::new(Tag::Figure((!alt.is_empty()).then_some(alt)));
    for id in paint(&mut surface, sheet.ink, sheet.offset, &fonts) {
        figure.push(id);
    }
    surface.finish();
    page.finish();
    let mut tree = TagTree::new();
    tree.push(figure);
    document.set_tag_tree(tree);
    document.set_metadata(metadata(sheet.facts));
    document
        .finish()
        .map_err(|e| PdfError::Writer(format!("{e:?}")))
}

/// Metadata from plain facts; the document's number follows from them alone, so that the same figure
/// gives the same bytes.
fn metadata(facts: &Facts) -> Metadata {
    let meta = Metadata::new()
        .title(facts.title.clone())
        .description(facts.description.clone())
        .keywords(facts.keywords.clone())
        .creator(facts.creator.clone())
        .document_id(format!("{}|{}", facts.title, facts.description));
    match facts.date {
        Some(date) => meta.creation_date(date_time(date)),
        None => meta,
    }
}

fn date_time(date: Date) -> DateTime {
    DateTime::new(date.year)
        .month(date.month)
        .day(date.day)
        .hour(date.hour)
        .minute(date.minute)
        .second(date.second)
        .utc_offset_hour(0)
}

/// Paints ink on a surface, `offset` points from the page's upper left corner; returns what was tagged,
/// in reading order, for the caller's tag tree.
fn paint(surface: &mut Surface<'_>, ink: &Ink, offset: Vec2, fonts: &Fonts) -> Vec<Identifier> {
    let mut ids = Vec::new();
    let all = pieces(&ink.items);
    let mut marks = all.iter().filter_map(|p| match p {
        Piece::Mark(shape) => Some(*shape),
        Piece::Words(_) => None,
    });
    // bonds lie beneath all labels, so that one tag can hold them
    if let Some(first) = marks.next() {
        ids.push(surface.start_tagged(ContentTag::Other));
        for shape in std::iter::once(first).chain(marks) {
            paint_mark(surface, shape, offset);
        }
        surface.end_tagged();
    }
    for piece in &all {
        if let Piece::Words(runs) = piece {
            // no replacement text for the whole label: its runs lie so close that readers join them,
            // and some readers lose the place of a word that has one
            ids.push(surface.start_tagged(ContentTag::Span(SpanTag::empty())));
            for run in runs {
                paint_run(surface, run, offset, fonts);
            }
            surface.end_tagged();
        }
    }
    ids
}

fn paint_mark(surface: &mut Surface<'_>, shape: &Shape, offset: Vec2) {
    let (path, width) = match shape {
        Shape::Fill(path) => (path, None),
        Shape::Stroke(path, width) => (path, Some(*width as f32)),
        Shape::Text(run) => (&run.outline, None),
    };
    let Some(path) = copy(path, offset) else {
        return;
    };
    match width {
        None => {
            surface.set_stroke(None);
            surface.set_fill(Some(black()));
        }
        Some(width) => {
            surface.set_fill(None);
            surface.set_stroke(Some(Stroke {
                paint: color::luma::Color::black().into(),
                width,
                line_cap: LineCap::Round,
                line_join: LineJoin::Round,
                ..Stroke::default()
            }));
        }
    }
    surface.draw_path(&path);
}

fn paint_run(surface: &mut Surface<'_>, run: &TextRun, offset: Vec2, fonts: &Fonts) {
    let per_em = |points: f64| (points / run.size) as f32;
    let glyphs: Vec<KrillaGlyph> = run
        .glyphs
        .iter()
        .map(|g| {
            KrillaGlyph::new(
                GlyphId::new(g.id),
                per_em(g.advance),
                0.0,
                0.0,
                0.0,
                g.bytes.clone(),
                None,
            )
        })
        .collect();
    surface.set_stroke(None);
    surface.set_fill(Some(black()));
    let at = run.origin + offset;
    surface.draw_glyphs(
        Point::from_xy(at.x as f32, at.y as f32),
        &glyphs,
        fonts.of(run.face),
        &run.text,
        run.size as f32,
        false,
    );
}

fn black() -> Fill {
    Fill {
        paint: color::luma::Color::black().into(),
        opacity: NormalizedF32::ONE,
        rule: FillRule::NonZero,
    }
}

fn copy(path: &BezPath, offset: Vec2) -> Option<Path> {
    let mut out = PathBuilder::new();
    let xy = |p: kurbo::Point| ((p.x + offset.x) as f32, (p.y + offset.y) as f32);
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
