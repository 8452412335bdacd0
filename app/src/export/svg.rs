//! SVG: lengths in millimetres outside, points inside.

use super::{POINTS_PER_MM, Piece, Sheet, pieces};
use chem::ink::{Face, Shape, TextRun};
use kurbo::{BezPath, PathEl, Point, Vec2};
use std::fmt::Write as _;

/// How text is written.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Default)]
pub enum TextAs {
    /// As outlines: looks the same everywhere. What publishers and offices ask for.
    #[default]
    Outlines,
    /// As text: can be searched and edited, in whatever face the reader has.
    Text,
}

/// Writes a sheet. Black only, no script, nothing from outside the file.
pub fn write(sheet: &Sheet<'_>, text: TextAs) -> String {
    let mut out = String::new();
    head(&mut out, sheet);
    for piece in pieces(&sheet.ink.items) {
        match (piece, text) {
            (Piece::Mark(Shape::Stroke(path, width)), _) => {
                let d = path_data(path, sheet.offset);
                let width = number(*width);
                line(
                    &mut out,
                    &format!(
                        r##"<path d="{d}" fill="none" stroke="#000" stroke-width="{width}" stroke-linecap="round" stroke-linejoin="round"/>"##
                    ),
                );
            }
            (Piece::Mark(Shape::Fill(path)), _) => fill(&mut out, path, sheet.offset),
            (Piece::Mark(Shape::Text(run)), _) => fill(&mut out, &run.outline, sheet.offset),
            (Piece::Words(runs), TextAs::Outlines) => {
                let mut whole = BezPath::new();
                for run in runs {
                    whole.extend(run.outline.elements().iter().copied());
                }
                fill(&mut out, &whole, sheet.offset);
            }
            (Piece::Words(runs), TextAs::Text) => words(&mut out, &runs, sheet.offset),
        }
    }
    line(&mut out, "</svg>");
    out
}

fn head(out: &mut String, sheet: &Sheet<'_>) {
    let facts = sheet.facts;
    let (width, height) = (number(sheet.width), number(sheet.height));
    let mm = |points: f64| number(points / POINTS_PER_MM);
    let (width_mm, height_mm) = (mm(sheet.width), mm(sheet.height));
    let mut labels = Vec::new();
    if !facts.title.is_empty() {
        labels.push("figure-title");
    }
    if !facts.description.is_empty() {
        labels.push("figure-desc");
    }
    let labelled = if labels.is_empty() {
        String::new()
    } else {
        format!(r#" aria-labelledby="{}""#, labels.join(" "))
    };
    line(out, r#"<?xml version="1.0" encoding="UTF-8"?>"#);
    line(
        out,
        &format!(
            r#"<svg xmlns="http://www.w3.org/2000/svg" width="{width_mm}mm" height="{height_mm}mm" viewBox="0 0 {width} {height}" role="img"{labelled}>"#
        ),
    );
    if !facts.title.is_empty() {
        let title = escape(&facts.title);
        line(out, &format!(r#"<title id="figure-title">{title}</title>"#));
    }
    if !facts.description.is_empty() {
        let words = escape(&facts.description);
        line(out, &format!(r#"<desc id="figure-desc">{words}</desc>"#));
    }
}

fn fill(out: &mut String, path: &BezPath, offset: Vec2) {
    if !path.elements().is_empty() {
        line(out, &format!(r#"<path d="{}"/>"#, path_data(path, offset)));
    }
}

/// A label as one text, each run in its place.
fn words(out: &mut String, runs: &[&TextRun], offset: Vec2) {
    out.push_str(r#"<text font-family="'Noto Sans', Arial, Helvetica, sans-serif">"#);
    for run in runs {
        let at = run.origin + offset;
        let style = match run.face {
            Face::Upright => "",
            Face::Italic => r#" font-style="italic""#,
        };
        let (x, y, size) = (number(at.x), number(at.y), number(run.size));
        let text = escape(&run.text);
        let _ = write!(
            out,
            r#"<tspan x="{x}" y="{y}" font-size="{size}"{style}>{text}</tspan>"#
        );
    }
    line(out, "</text>");
}

fn line(out: &mut String, text: &str) {
    out.push_str(text);
    out.push('\n');
}

/// A path in SVG's words, moved; a thousandth of a point is finer than any press.
fn path_data(path: &BezPath, offset: Vec2) -> String {
    let mut d = String::new();
    let point = |d: &mut String, p: Point| {
        let p = p + offset;
        d.push_str(&number(p.x));
        d.push(' ');
        d.push_str(&number(p.y));
    };
    let many = |d: &mut String, letter: char, points: &[Point]| {
        d.push(letter);
        for (i, p) in points.iter().enumerate() {
            if i > 0 {
                d.push(' ');
            }
            point(d, *p);
        }
    };
    for element in path.elements() {
        match *element {
            PathEl::MoveTo(p) => many(&mut d, 'M', &[p]),
            PathEl::LineTo(p) => many(&mut d, 'L', &[p]),
            PathEl::QuadTo(a, p) => many(&mut d, 'Q', &[a, p]),
            PathEl::CurveTo(a, b, p) => many(&mut d, 'C', &[a, b, p]),
            PathEl::ClosePath => d.push('Z'),
        }
    }
    d
}

/// A number with at most three decimals and no idle zeros.
fn number(v: f64) -> String {
    let mut s = format!("{v:.3}");
    if s.contains('.') {
        s.truncate(s.trim_end_matches('0').trim_end_matches('.').len());
    }
    if s == "-0" { "0".to_owned() } else { s }
}

/// Text as XML allows it; characters that XML forbids are left out.
fn escape(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            '\t' | '\n' | '\r' => out.push(' '),
            '\u{fffe}' | '\u{ffff}' => {}
            c if c.is_control() => {}
            c => out.push(c),
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_are_short() {
        assert_eq!(number(-0.0001), "0");
        assert_eq!(number(12.5), "12.5");
        assert_eq!(number(100.0), "100");
        assert_eq!(number(1.0 / 3.0), "0.333");
    }

    #[test]
    fn text_cannot_break_out() {
        assert_eq!(escape("a<b>&\"\u{0}\n"), "a&lt;b&gt;&amp;&quot; ");
    }
}
