//! Ink on screen: kurbo paths become triangles. The only file that knows both sides.
//!
//! Triangles are made once for an [`Ink`], in its points; each frame moves them to the view and gives
//! them their color. The window samples four times for a pixel, which smooths their edges.

use chem::ink::{Ink, Item, Part, Shape, Tone};
use egui::{Color32, Mesh, Pos2, Rect, epaint};
use kurbo::{BezPath, PathEl};
use lyon::math::point;
use lyon::path::{LineCap, LineJoin, Path};
use lyon::tessellation::{
    BuffersBuilder, FillOptions, FillRule, FillTessellator, FillVertex, StrokeOptions,
    StrokeTessellator, StrokeVertex, VertexBuffers,
};

/// How far a triangle's edge may stand off the true curve, in points of the figure.
const TOLERANCE: f32 = 0.02;

/// Triangles of one piece of ink.
#[derive(Clone, Debug)]
struct Piece {
    part: Part,
    tone: Tone,
    vertices: Vec<[f32; 2]>,
    indices: Vec<u32>,
}

/// An [`Ink`] cut into triangles.
#[derive(Clone, Debug, Default)]
pub(super) struct Triangles {
    pieces: Vec<Piece>,
}

/// From points of the figure to points of the screen.
#[derive(Clone, Copy, Debug)]
pub(super) struct ToScreen {
    /// Where the figure's origin is.
    pub(super) origin: Pos2,
    /// Screen points for a point of the figure.
    pub(super) scale: f32,
}

impl ToScreen {
    /// A box of the figure on the screen.
    pub(super) fn rect(self, b: kurbo::Rect) -> Rect {
        Rect::from_min_max(
            self.origin + self.scale * egui::vec2(b.x0 as f32, b.y0 as f32),
            self.origin + self.scale * egui::vec2(b.x1 as f32, b.y1 as f32),
        )
    }
}

/// Boxes of all labels and captions of a figure, in its points.
pub(super) fn word_boxes(ink: &Ink) -> Vec<kurbo::Rect> {
    let words = ink.items.iter().filter_map(|item| match &item.shape {
        // the outline of a space is empty and would stand at the origin
        Shape::Text(run) if !run.outline.elements().is_empty() => {
            Some(kurbo::Shape::bounding_box(&run.outline))
        }
        Shape::Text(_) | Shape::Fill(_) | Shape::Stroke(..) => None,
    });
    words.collect()
}

impl Triangles {
    pub(super) fn of(ink: &Ink) -> Triangles {
        Triangles {
            pieces: ink.items.iter().map(piece).collect(),
        }
    }

    /// One mesh in the color that `color` gives each piece; `None` leaves it out.
    pub(super) fn mesh(
        &self,
        to: ToScreen,
        mut color: impl FnMut(Part, Tone) -> Option<Color32>,
    ) -> Mesh {
        let mut mesh = Mesh::default();
        for piece in &self.pieces {
            let Some(color) = color(piece.part, piece.tone) else {
                continue;
            };
            let first = u32::try_from(mesh.vertices.len()).unwrap_or(u32::MAX);
            mesh.vertices
                .extend(piece.vertices.iter().map(|[x, y]| epaint::Vertex {
                    pos: to.origin + to.scale * egui::vec2(*x, *y),
                    uv: epaint::WHITE_UV,
                    color,
                }));
            mesh.indices
                .extend(piece.indices.iter().map(|i| first.saturating_add(*i)));
        }
        mesh
    }
}

fn piece(item: &Item) -> Piece {
    let mut buffers: VertexBuffers<[f32; 2], u32> = VertexBuffers::new();
    // a path that cannot be cut (no size, no area) has nothing to show
    let _ = match &item.shape {
        Shape::Fill(path) => fill(path, &mut buffers),
        Shape::Text(run) => fill(&run.outline, &mut buffers),
        Shape::Stroke(path, width) => stroke(path, *width as f32, &mut buffers),
    };
    Piece {
        part: item.part,
        tone: item.tone,
        vertices: buffers.vertices,
        indices: buffers.indices,
    }
}

type Cut = Result<(), lyon::tessellation::TessellationError>;

fn fill(path: &BezPath, buffers: &mut VertexBuffers<[f32; 2], u32>) -> Cut {
    FillTessellator::new().tessellate_path(
        &lyon_path(path),
        &FillOptions::tolerance(TOLERANCE).with_fill_rule(FillRule::NonZero),
        &mut BuffersBuilder::new(buffers, |v: FillVertex<'_>| v.position().to_array()),
    )
}

fn stroke(path: &BezPath, width: f32, buffers: &mut VertexBuffers<[f32; 2], u32>) -> Cut {
    StrokeTessellator::new().tessellate_path(
        &lyon_path(path),
        &StrokeOptions::tolerance(TOLERANCE)
            .with_line_width(width)
            .with_line_cap(LineCap::Round)
            .with_line_join(LineJoin::Round),
        &mut BuffersBuilder::new(buffers, |v: StrokeVertex<'_, '_>| v.position().to_array()),
    )
}

fn lyon_path(path: &BezPath) -> Path {
    let to = |p: kurbo::Point| point(p.x as f32, p.y as f32);
    let mut builder = Path::builder();
    let mut open = false;
    for element in path.elements() {
        if !open && !matches!(element, PathEl::MoveTo(_)) {
            continue;
        }
        match *element {
            PathEl::MoveTo(p) => {
                if open {
                    builder.end(false);
                }
                builder.begin(to(p));
                open = true;
            }
            PathEl::LineTo(p) => {
                builder.line_to(to(p));
            }
            PathEl::QuadTo(c, p) => {
                builder.quadratic_bezier_to(to(c), to(p));
            }
            PathEl::CurveTo(c1, c2, p) => {
                builder.cubic_bezier_to(to(c1), to(c2), to(p));
            }
            PathEl::ClosePath => {
                builder.end(true);
                open = false;
            }
        }
    }
    if open {
        builder.end(false);
    }
    builder.build()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_square_is_cut_into_its_area() {
        let ink = Ink {
            items: vec![Item {
                part: Part::Note,
                tone: Tone::Ink,
                shape: Shape::Fill(kurbo::Shape::to_path(
                    &kurbo::Rect::new(0.0, 0.0, 3.0, 2.0),
                    0.1,
                )),
            }],
            bounds: kurbo::Rect::new(0.0, 0.0, 3.0, 2.0),
            points_per_unit: 1.0,
        };
        let to = ToScreen {
            origin: egui::pos2(10.0, 10.0),
            scale: 2.0,
        };
        let mesh = Triangles::of(&ink).mesh(to, |_, _| Some(Color32::BLACK));
        let area: f32 = mesh
            .indices
            .chunks(3)
            .map(|t| {
                let [a, b, c] = [t[0], t[1], t[2]].map(|i| mesh.vertices[i as usize].pos);
                let (u, v) = (b - a, c - a);
                (u.x * v.y - u.y * v.x).abs() / 2.0
            })
            .sum();
        assert!((area - 24.0).abs() < 1e-3);
        assert!(
            mesh.vertices
                .iter()
                .all(|v| v.pos.x >= 10.0 && v.pos.y >= 10.0)
        );
    }

    #[test]
    fn paths_without_a_start_are_left_out() {
        let mut path = BezPath::new();
        path.move_to((0.0, 0.0));
        path.line_to((1.0, 0.0));
        path.close_path();
        path.line_to((5.0, 5.0));
        assert!(lyon_path(&path).iter().count() > 0);
    }
}
