//! The orientation of a part on the page.

use super::assemble::Shapes;
use super::graph::Graph;
use crate::geom::Point;

pub(super) fn turn(_graph: &Graph, _shapes: &Shapes, _points: &mut [Point]) {}
