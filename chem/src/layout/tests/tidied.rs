//! A selection laid out anew: the rest stays, the new is joined to it.

use super::*;
use crate::drawing::{Drawing, Mark};
use crate::layout::tidy;

/// A drawing of a sketch, by the layout itself, then turned, enlarged and with some atoms astray.
fn drawing(sketch: &Sketch, astray: &[usize]) -> Drawing {
    let m = sketch.molecule();
    let points = lay(&m, &[]).points;
    let moved = points
        .iter()
        .enumerate()
        .map(|(i, p)| {
            let p = geom::rotate(*p, Point::ORIGIN, 0.4);
            let place = Point::new(3.0 + 25.0 * p.x, 25.0 * p.y);
            if astray.contains(&i) {
                place + geom::unit(i as f64) * 11.0
            } else {
                place
            }
        })
        .collect();
    let marks = vec![Mark::Plain; m.n_bonds()];
    Drawing::new(m, moved, marks).unwrap()
}

fn tidied(drawing: &Drawing, selected: &[usize], wishes: &[Wish]) -> Layout {
    let atoms: Vec<AtomIx> = selected.iter().map(|i| AtomIx::new(*i)).collect();
    let rings = Rings::find(drawing.molecule());
    tidy(drawing, &rings, &atoms, wishes)
}

const STEROID: &str = "0-1-2-3-4-5-6-7-8-9-10-11-12-13-14 1-6 1-10 9-15-13-18-17-16-15 16-19-20-21";

#[test]
fn the_rest_stays_and_bonds_fit() {
    let sketch = Sketch::read(STEROID, "");
    for selected in [
        &[19, 20, 21][..],
        &[20],
        &[0, 14],
        &[16, 17, 18],
        &[2, 3, 4],
        &[15, 16, 17, 18, 19, 20, 21],
        &[1],
        &[10, 11],
        &[],
    ] {
        let drawing = drawing(&sketch, selected);
        let points = tidied(&drawing, selected, &[]).points;
        for (i, (p, old)) in points.iter().zip(drawing.points()).enumerate() {
            if !selected.contains(&i) {
                assert_eq!(p, old, "{selected:?}");
            }
        }
        let (short, long) = bonds(drawing.molecule(), &points);
        assert!(short > 22.0 && long < 28.5, "{selected:?}: {short} {long}");
        assert!(
            nearest(&points) > 14.0,
            "{selected:?}: {}",
            nearest(&points)
        );
        assert_eq!(crossings(drawing.molecule(), &points), 0, "{selected:?}");
    }
}

#[test]
fn all_of_it_is_laid_out_where_it_was() {
    let sketch = Sketch::read(STEROID, "");
    let all: Vec<usize> = (0..sketch.n_atoms).collect();
    let drawing = drawing(&sketch, &[]);
    let points = tidied(&drawing, &all, &[]).points;
    let middle = |list: &[Point]| {
        let sum = list.iter().fold(geom::Vec2::ZERO, |s, p| s + p.to_vec2());
        (sum / list.len() as f64).to_point()
    };
    assert!(middle(&points).distance(middle(drawing.points())) < 1e-6);
    let (short, long) = bonds(drawing.molecule(), &points);
    assert!((short - 25.0).abs() < 1e-6 && (long - 25.0).abs() < 1e-6);
}

#[test]
fn wishes_at_the_border_are_met() {
    let sketch = Sketch::read("0-1-2=3-4-5 2-6", "O6");
    for together in [true, false] {
        let wish = Wish {
            ends: [AtomIx::new(2), AtomIx::new(3)],
            ligands: [AtomIx::new(1), AtomIx::new(4)],
            together,
        };
        for selected in [&[3, 4, 5][..], &[4, 5], &[0, 1], &[1], &[2]] {
            let drawing = drawing(&sketch, selected);
            let layout = tidied(&drawing, selected, &[wish]);
            let met = layout.unmet.is_empty();
            // one atom between two that stay cannot change what they show
            assert!(met || selected.len() == 1, "{selected:?} {together}");
        }
    }
}
