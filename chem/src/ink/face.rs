//! Letters: from characters to placed glyphs with outlines. No shaping beyond the character map and
//! the advances, which is all that symbols, figures and locants need.

use super::plane::{self, Hull};
use super::{Face, PlacedGlyph, TextRun};
use kurbo::{Affine, BezPath, Point};
use skrifa::MetadataProvider as _;
use skrifa::instance::{LocationRef, Size};
use skrifa::outline::{DrawSettings, OutlinePen};
use std::collections::BTreeMap;
use std::rc::Rc;

/// Height of a capital as a fraction of the type size, in both faces.
pub(super) const CAP_HEIGHT: f64 = 0.714;

impl Face {
    /// The font file, for whoever embeds it.
    pub fn bytes(self) -> &'static [u8] {
        match self {
            Face::Upright => notosans::REGULAR_TTF,
            Face::Italic => notosans::ITALIC_TTF,
        }
    }
}

/// A glyph at size 1, y down, origin on the baseline.
struct Glyph {
    id: u32,
    advance: f64,
    path: BezPath,
    hull: Hull,
}

/// A run with the convex hull of each of its glyphs, placed.
#[derive(Clone, Debug)]
pub(super) struct Set {
    pub(super) run: TextRun,
    pub(super) hulls: Vec<Hull>,
}

/// Sets type; remembers the glyphs that it has met.
#[derive(Default)]
pub(super) struct Setter {
    glyphs: BTreeMap<(Face, char), Rc<Glyph>>,
}

impl Setter {
    /// Sets one line of text; control characters are left out.
    pub(super) fn set(&mut self, text: &str, face: Face, size: f64, origin: Point) -> Set {
        let mut set = Set {
            run: TextRun {
                text: String::with_capacity(text.len()),
                face,
                size,
                origin,
                glyphs: Vec::new(),
                outline: BezPath::new(),
            },
            hulls: Vec::new(),
        };
        let mut x = 0.0;
        for c in text.chars().filter(|c| !c.is_control()) {
            let glyph = self.glyph(face, c);
            let start = set.run.text.len();
            set.run.text.push(c);
            set.run.glyphs.push(PlacedGlyph {
                id: glyph.id,
                x,
                advance: glyph.advance * size,
                bytes: start..set.run.text.len(),
            });
            let place = Affine::translate((origin.x + x, origin.y)) * Affine::scale(size);
            set.run
                .outline
                .extend(glyph.path.iter().map(|element| place * element));
            if !glyph.hull.is_empty() {
                set.hulls
                    .push(glyph.hull.iter().map(|p| place * *p).collect());
            }
            x += glyph.advance * size;
        }
        set
    }

    /// Advance of a text at this size.
    pub(super) fn advance(&mut self, text: &str, face: Face, size: f64) -> f64 {
        text.chars()
            .filter(|c| !c.is_control())
            .map(|c| self.glyph(face, c).advance * size)
            .sum()
    }

    fn glyph(&mut self, face: Face, c: char) -> Rc<Glyph> {
        Rc::clone(
            self.glyphs
                .entry((face, c))
                .or_insert_with(|| Rc::new(load(face, c))),
        )
    }
}

/// Reads a glyph from its font; a character that the font lacks gives the font's empty box.
fn load(face: Face, c: char) -> Glyph {
    let mut pen = Pen(BezPath::new());
    let mut glyph = Glyph {
        id: 0,
        advance: 0.0,
        path: BezPath::new(),
        hull: Hull::new(),
    };
    let Ok(font) = skrifa::FontRef::new(face.bytes()) else {
        return glyph;
    };
    let (size, location) = (Size::unscaled(), LocationRef::default());
    let metrics = font.metrics(size, location);
    let em = f64::from(metrics.units_per_em.max(1));
    let id = font.charmap().map(c).unwrap_or_default();
    glyph.id = id.to_u32();
    glyph.advance = font
        .glyph_metrics(size, location)
        .advance_width(id)
        .map_or(0.0, |advance| f64::from(advance) / em);
    if let Some(outline) = font.outline_glyphs().get(id) {
        // an outline that the font spoils midway is drawn as far as it goes
        let _ = outline.draw(DrawSettings::unhinted(size, location), &mut pen);
    }
    glyph.path = Affine::scale_non_uniform(1.0 / em, -1.0 / em) * pen.0;
    glyph.hull = plane::hull(plane::corners(&glyph.path, 0.004));
    glyph
}

struct Pen(BezPath);

fn point(x: f32, y: f32) -> Point {
    Point::new(f64::from(x), f64::from(y))
}

impl OutlinePen for Pen {
    fn move_to(&mut self, x: f32, y: f32) {
        self.0.move_to(point(x, y));
    }

    fn line_to(&mut self, x: f32, y: f32) {
        self.0.line_to(point(x, y));
    }

    fn quad_to(&mut self, cx0: f32, cy0: f32, x: f32, y: f32) {
        self.0.quad_to(point(cx0, cy0), point(x, y));
    }

    fn curve_to(&mut self, cx0: f32, cy0: f32, cx1: f32, cy1: f32, x: f32, y: f32) {
        self.0
            .curve_to(point(cx0, cy0), point(cx1, cy1), point(x, y));
    }

    fn close(&mut self) {
        self.0.close_path();
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use kurbo::Shape as _;

    #[test]
    fn a_capital_is_as_high_as_the_constant_says() {
        let mut setter = Setter::default();
        for face in [Face::Upright, Face::Italic] {
            let set = setter.set("H", face, 100.0, Point::new(10.0, 20.0));
            let bounds = set.run.outline.bounding_box();
            assert!((bounds.height() - 100.0 * CAP_HEIGHT).abs() < 0.2);
            assert!((bounds.y1 - 20.0).abs() < 0.2 && bounds.x0 > 10.0);
        }
    }

    #[test]
    fn every_sign_that_labels_use_is_in_the_font() {
        let mut setter = Setter::default();
        for c in "ABCXYZabcxyz0123456789+−•:*()′".chars() {
            assert_ne!(setter.glyph(Face::Upright, c).id, 0, "{c}");
        }
        for c in "RSrsEZezMPmp?".chars() {
            assert_ne!(setter.glyph(Face::Italic, c).id, 0, "{c}");
        }
    }

    #[test]
    fn control_characters_are_left_out_and_bytes_follow_the_text() {
        let set = Setter::default().set("a\u{7}−b", Face::Upright, 10.0, Point::ORIGIN);
        assert_eq!(set.run.text, "a−b");
        let bytes: Vec<_> = set.run.glyphs.iter().map(|g| g.bytes.clone()).collect();
        assert_eq!(bytes, [0..1, 1..4, 4..5]);
    }
}
