//! What the paper must show, whole figures at a time.

use super::plane;
use super::*;
use crate::drawing::tests::draw;
use crate::drawing::{End, Mark};
use crate::element::Element;
use crate::molecule::{Atom, Bond, Molecule, Order, Radical};
use proptest::prelude::*;

fn journal() -> &'static Style {
    &STYLES[0]
}

fn ink(atoms: &[(&str, f64, f64)], bonds: &[(usize, usize, u8, char)]) -> Ink {
    compose(&draw(atoms, bonds), journal(), &[], None)
}

fn strokes(ink: &Ink, bond: usize) -> Vec<&BezPath> {
    let part = Part::Bond(BondIx::new(bond));
    ink.items
        .iter()
        .filter(|item| item.part == part)
        .filter_map(|item| match &item.shape {
            Shape::Stroke(path, _) => Some(path),
            Shape::Fill(_) | Shape::Text(_) => None,
        })
        .collect()
}

fn fills(ink: &Ink, bond: usize) -> Vec<&BezPath> {
    let part = Part::Bond(BondIx::new(bond));
    ink.items
        .iter()
        .filter(|item| item.part == part)
        .filter_map(|item| match &item.shape {
            Shape::Fill(path) => Some(path),
            Shape::Stroke(..) | Shape::Text(_) => None,
        })
        .collect()
}

fn runs(ink: &Ink) -> Vec<&TextRun> {
    ink.items
        .iter()
        .filter_map(|item| match &item.shape {
            Shape::Text(run) => Some(run),
            Shape::Fill(_) | Shape::Stroke(..) => None,
        })
        .collect()
}

fn line(path: &BezPath) -> [Point; 2] {
    plane::segments(path, 0.1)[0]
}

fn middle(path: &BezPath) -> Point {
    let [a, b] = line(path);
    a.midpoint(b)
}

/// A regular ring of unit bonds with alternating double bonds.
fn ring(symbols: &[&'static str], doubles: bool) -> Drawing {
    let n = symbols.len();
    let turn = std::f64::consts::TAU / n as f64;
    let radius = 0.5 / (0.5 * turn).sin();
    let atoms: Vec<_> = symbols
        .iter()
        .enumerate()
        .map(|(i, s)| {
            let p = crate::geom::unit(turn * i as f64) * radius;
            (*s, p.x, p.y)
        })
        .collect();
    let bonds: Vec<_> = (0..n)
        .map(|i| {
            (
                i,
                (i + 1) % n,
                if doubles && i % 2 == 0 { 2 } else { 1 },
                ' ',
            )
        })
        .collect();
    draw(&atoms, &bonds)
}

#[test]
fn the_page_has_y_down_and_the_style_sets_the_bond() {
    let ink = ink(&[("C", 0.0, 2.0), ("C", 0.0, 0.0)], &[(0, 1, 1, ' ')]);
    assert!((ink.points_per_unit - 7.2).abs() < 1e-12);
    let [a, b] = line(strokes(&ink, 0)[0]);
    assert!(a.distance(Point::new(0.0, -14.4)) < 1e-9 && b.distance(Point::ORIGIN) < 1e-9);
    let half = 0.5 * journal().line_width;
    assert!((ink.bounds.y0 + 14.4 + half).abs() < 1e-9 && (ink.bounds.x1 - half).abs() < 1e-9);
}

#[test]
fn a_bond_stops_at_a_label_by_the_margin() {
    for (x, y) in [(1.5, 0.0), (0.0, 1.5), (-1.1, 1.1), (0.75, -1.3)] {
        let ink = ink(&[("C", 0.0, 0.0), ("O", x, y)], &[(0, 1, 1, ' ')]);
        let [start, end] = line(strokes(&ink, 0)[0]);
        assert!(start.distance(Point::ORIGIN) < 1e-9);
        let label = runs(&ink)[0];
        let gap = plane::segments(&label.outline, 0.01)
            .iter()
            .map(|[p, q]| crate::geom::distance_to_segment(end, *p, *q))
            .fold(f64::INFINITY, f64::min);
        let wanted = journal().label_margin + 0.5 * journal().line_width;
        assert!((gap - wanted).abs() < 0.05, "{x} {y}: {gap}");
    }
}

#[test]
fn the_second_line_of_a_ring_is_inside_and_shorter() {
    for symbols in [["C"; 6], ["N", "C", "C", "N", "C", "C"]] {
        let ink = compose(&ring(&symbols, true), journal(), &[], None);
        for bond in [0, 2, 4] {
            let lines = strokes(&ink, bond);
            let length = |p: &BezPath| line(p)[0].distance(line(p)[1]);
            let [outer, inner] = [lines[0], lines[1]].map(|p| middle(p).to_vec2().hypot());
            assert!(inner < outer && length(lines[1]) < length(lines[0]));
        }
    }
}

#[test]
fn a_fused_bond_turns_to_the_ring_with_most_double_bonds() {
    // a benzene ring and a four-ring that share their double bond
    let h = 3f64.sqrt() / 2.0;
    let drawing = draw(
        &[
            ("C", 0.0, 0.5),
            ("C", 0.0, -0.5),
            ("C", -h, -1.0),
            ("C", -2.0 * h, -0.5),
            ("C", -2.0 * h, 0.5),
            ("C", -h, 1.0),
            ("C", 1.0, 0.5),
            ("C", 1.0, -0.5),
        ],
        &[
            (0, 1, 2, ' '),
            (1, 2, 1, ' '),
            (2, 3, 2, ' '),
            (3, 4, 1, ' '),
            (4, 5, 2, ' '),
            (5, 0, 1, ' '),
            (0, 6, 1, ' '),
            (6, 7, 1, ' '),
            (7, 1, 1, ' '),
        ],
    );
    let ink = compose(&drawing, journal(), &[], None);
    assert!(middle(strokes(&ink, 0)[1]).x < -1.0);
}

#[test]
fn terminal_double_bonds_are_centered_and_others_lean_to_their_substituents() {
    let h = 3f64.sqrt() / 2.0;
    let ketone = ink(
        &[
            ("C", -h, -0.5),
            ("C", 0.0, 0.0),
            ("C", h, -0.5),
            ("O", 0.0, 1.0),
        ],
        &[(0, 1, 1, ' '), (1, 2, 1, ' '), (1, 3, 2, ' ')],
    );
    let x: Vec<f64> = strokes(&ketone, 2).iter().map(|p| middle(p).x).collect();
    assert!((x[0] + x[1]).abs() < 1e-6 && x[0].abs() > 0.5);
    // both lines run down to the bonds at their foot
    assert!(strokes(&ketone, 2).iter().all(|p| line(p)[0].y > 0.1));
    let cis = ink(
        &[
            ("C", -0.5, -h),
            ("C", 0.0, 0.0),
            ("C", 1.0, 0.0),
            ("C", 1.5, -h),
        ],
        &[(0, 1, 1, ' '), (1, 2, 2, ' '), (2, 3, 1, ' ')],
    );
    let lines = strokes(&cis, 1);
    assert!(middle(lines[0]).y.abs() < 1e-9 && middle(lines[1]).y > 1.0);
}

#[test]
fn a_hashed_wedge_has_bars_that_grow_and_leave_its_center_clear() {
    for length in [0.6, 1.0, 3.0] {
        let ink = ink(
            &[
                ("C", 0.0, 0.0),
                ("C", length, 0.0),
                ("C", 0.0, 1.0),
                ("C", -1.0, 0.0),
            ],
            &[(0, 1, 1, 'h'), (0, 2, 1, ' '), (0, 3, 1, ' ')],
        );
        let bars = plane::segments(strokes(&ink, 0)[0], 0.1);
        assert!(bars.len() >= 4, "{length}: {}", bars.len());
        assert!(bars.iter().all(|[p, q]| (p.x - q.x).abs() < 1e-9));
        assert!(bars[0][0].x > 2.0 * journal().line_width);
        let sizes: Vec<f64> = bars.iter().map(|[p, q]| p.distance(*q)).collect();
        assert!(sizes.is_sorted() && sizes[sizes.len() - 1] > 2.0 * sizes[0]);
    }
}

#[test]
fn a_solid_wedge_is_narrow_at_its_narrow_end_whichever_that_is() {
    let drawing = draw(&[("C", 0.0, 0.0), ("C", 1.0, 0.0)], &[(0, 1, 1, 'w')]);
    for end in [End::First, End::Second] {
        let drawing = Drawing::new(
            drawing.molecule().clone(),
            drawing.points().to_vec(),
            vec![Mark::Solid(end)],
        )
        .unwrap();
        let ink = compose(&drawing, journal(), &[], None);
        let corners = plane::corners(fills(&ink, 0)[0], 0.1);
        let tip = if end == End::First { 0.0 } else { 14.4 };
        assert!(corners[0].distance(Point::new(tip, 0.0)) < 1e-9);
        let wide = corners[1].distance(corners[2]);
        assert!((wide - journal().wedge_width).abs() < 1e-9);
    }
}

#[test]
fn a_wide_end_runs_into_the_bond_that_follows() {
    let h = 3f64.sqrt() / 2.0;
    let ink = ink(
        &[("C", 0.0, 0.0), ("C", 1.0, 0.0), ("C", 1.5, h)],
        &[(0, 1, 1, 'w'), (1, 2, 1, ' ')],
    );
    let corners = plane::corners(fills(&ink, 0)[0], 0.1);
    let u = kurbo::Vec2::new(0.5, -h);
    // both corners lie on the outer edge of the next bond
    for corner in &corners[1..3] {
        let aside = (*corner - Point::new(14.4, 0.0)).cross(u).abs();
        assert!((aside - 0.5 * journal().line_width).abs() < 1e-6);
    }
}

#[test]
fn special_bonds_look_like_nothing_else() {
    let bond = |order| ink(&[("C", 0.0, 0.0), ("C", 1.0, 0.0)], &[(0, 1, order, ' ')]);
    let dashes = plane::segments(strokes(&bond(8), 0)[0], 0.1).len();
    assert!(dashes >= 3);
    assert_eq!(strokes(&bond(9), 0).len(), 1);
    let head = plane::corners(fills(&bond(9), 0)[0], 0.1);
    assert!(head[0].distance(Point::new(14.4, 0.0)) < 1e-9);
    assert!(strokes(&bond(10), 0).is_empty() && fills(&bond(10), 0).len() == 1);
    assert_eq!(strokes(&bond(3), 0).len(), 3);
}

#[test]
fn a_wave_runs_from_atom_to_atom_and_to_both_sides() {
    let ink = ink(&[("C", 0.0, 0.0), ("C", 1.0, 0.0)], &[(0, 1, 1, '~')]);
    let points = plane::corners(strokes(&ink, 0)[0], 0.01);
    assert!(points[0].distance(Point::ORIGIN) < 1e-9);
    assert!(points[points.len() - 1].distance(Point::new(14.4, 0.0)) < 1e-9);
    let high = 0.5 * journal().wedge_width - 0.05;
    assert!(points.iter().any(|p| p.y > high) && points.iter().any(|p| p.y < -high));
}

#[test]
fn a_crossed_double_bond_crosses_itself() {
    let ink = ink(&[("C", 0.0, 0.0), ("C", 1.0, 0.0)], &[(0, 1, 2, 'x')]);
    let [[a, b], [c, d]] = [0, 1].map(|i| line(strokes(&ink, 0)[i]));
    assert!(crate::geom::cross(a, b, c, d));
}

#[test]
fn labels_that_leave_little_room_still_show_their_bond() {
    for style in &STYLES {
        let drawing = draw(&[("O", 0.0, 0.0), ("N", 1.0, 0.0)], &[(0, 1, 1, ' ')]);
        let ink = compose(&drawing, style, &[], None);
        let [a, b] = line(strokes(&ink, 0)[0]);
        assert!(b.x - a.x > 0.15 * style.bond_length, "{}", style.name);
        assert_eq!(
            runs(&ink)
                .iter()
                .map(|r| r.text.as_str())
                .collect::<String>(),
            "HONH2"
        );
    }
}

#[test]
fn a_carbon_in_a_straight_line_is_written() {
    let text = |x| -> Vec<String> {
        let ink = ink(
            &[("C", 0.0, 0.0), ("C", 1.0, 0.0), ("C", 2.0, x)],
            &[(0, 1, 2, ' '), (1, 2, 2, ' ')],
        );
        runs(&ink).iter().map(|r| r.text.clone()).collect()
    };
    assert_eq!(text(0.0), ["C"]);
    assert!(text(0.5).is_empty());
}

#[test]
fn captions_are_written_locant_first_and_touch_no_ink() {
    let drawing = ring(&["C", "C", "N", "C", "O", "C"], false);
    let captions: Vec<Caption> = (0..6)
        .map(|i| Caption {
            atoms: vec![AtomIx::new(i)],
            locant: (i + 1).to_string(),
            descriptor: Some("R".to_owned()),
            tone: Tone::Agrees,
        })
        .collect();
    for style in &STYLES {
        let ink = compose(&drawing, style, &captions, None);
        let written: Vec<&Item> = ink
            .items
            .iter()
            .filter(|item| matches!(item.part, Part::Caption(_)))
            .collect();
        assert_eq!(written.len(), 12);
        assert_eq!(
            (written[0].tone, written[1].tone),
            (Tone::Muted, Tone::Agrees)
        );
        assert_no_overlap(&ink);
    }
}

/// Fails if a caption's letters touch other ink than their own.
fn assert_no_overlap(ink: &Ink) {
    for caption in &ink.items {
        let Part::Caption(_) = caption.part else {
            continue;
        };
        let own = caption.shape.bounds().unwrap();
        for other in ink.items.iter().filter(|item| item.part != caption.part) {
            let (path, half) = match &other.shape {
                Shape::Fill(path) => (path, 0.0),
                Shape::Stroke(path, width) => (path, 0.5 * width),
                Shape::Text(run) => (&run.outline, 0.0),
            };
            for segment in plane::segments(path, 0.05) {
                let gap = plane::segment_to_box(segment, own) - half;
                assert!(gap > 0.0, "{:?} touches {:?}", caption.part, other.part);
            }
        }
    }
}

#[test]
fn a_pair_has_its_caption_beside_its_middle() {
    let drawing = draw(&[("C", 0.0, 0.0), ("C", 1.0, 0.0)], &[(0, 1, 2, ' ')]);
    let caption = Caption {
        atoms: vec![AtomIx::new(0), AtomIx::new(1)],
        locant: "2".to_owned(),
        descriptor: Some("E".to_owned()),
        tone: Tone::Open,
    };
    let ink = compose(&drawing, journal(), std::slice::from_ref(&caption), None);
    let boxes = ink.items.iter().filter(|i| i.part == Part::Caption(0));
    let whole = boxes
        .filter_map(|i| i.shape.bounds())
        .reduce(|a, b| a.union(b))
        .unwrap();
    assert!((whole.center().x - 7.2).abs() < 1.5, "{whole:?}");
    assert!(whole.center().y.abs() < 10.0);
    let stray = Caption {
        atoms: vec![AtomIx::new(7)],
        ..caption
    };
    let ink = compose(&drawing, journal(), &[stray], None);
    assert!(runs(&ink).is_empty());
}

#[test]
fn nothing_is_drawn_of_nothing_and_notes_stand_beneath() {
    let mut ink = compose(&Drawing::empty(), journal(), &[], None);
    assert!(ink.items.is_empty() && ink.bounds == Rect::ZERO);
    ink.add_note("and enantiomer", journal());
    let note = ink.items[0].shape.bounds().unwrap();
    assert!(note.y0 >= 0.5 * journal().bond_length - 0.5 && note == ink.bounds);
}

#[test]
fn a_scale_that_is_none_is_not_taken() {
    let drawing = draw(&[("C", 0.0, 0.0), ("C", 2.0, 0.0)], &[(0, 1, 1, ' ')]);
    let scale = |k| compose(&drawing, journal(), &[], k).points_per_unit;
    assert!((scale(Some(30.0)) - 30.0).abs() < 1e-12);
    for bad in [f64::NAN, f64::INFINITY, 0.0, -1.0] {
        assert!((scale(Some(bad)) - 7.2).abs() < 1e-12);
    }
}

fn coordinate() -> impl Strategy<Value = f64> {
    prop_oneof![
        6 => -5.0..5.0f64,
        2 => prop::sample::select(vec![0.0, 1.0, -1.0]),
        1 => prop::sample::select(vec![1e300, -1e300, 1e-300, f64::MAX, f64::MIN, 1e9]),
    ]
}

fn atom() -> impl Strategy<Value = Atom> {
    let alias = prop::option::weighted(0.2, "(\\PC|[A-Z][a-z]?[0-9]?){0,6}");
    (
        0..119u8,
        alias,
        any::<i8>(),
        0..4u8,
        prop::option::of(any::<u16>()),
    )
        .prop_map(|(z, alias, charge, radical, isotope)| {
            let mut atom = Atom::new(Element::from_number(z).unwrap_or(Element::C));
            atom.alias = alias.map(String::into_boxed_str);
            atom.charge = if charge % 3 == 0 { charge } else { 0 };
            atom.radical = [
                Radical::None,
                Radical::Singlet,
                Radical::Doublet,
                Radical::Triplet,
            ][usize::from(radical)];
            atom.isotope = isotope;
            atom
        })
}

prop_compose! {
    /// Any drawing at all: atoms on each other, bonds of no length, marks where they mean nothing.
    fn any_drawing()(
        atoms in prop::collection::vec((atom(), coordinate(), coordinate()), 0..9),
        bonds in prop::collection::vec((0..9usize, 0..9usize, 0..12u8, 0..7u8), 0..14),
    ) -> Drawing {
        let n = atoms.len();
        let (mut list, mut marks): (Vec<Bond>, Vec<Mark>) = (Vec::new(), Vec::new());
        for (a, b, order, mark) in bonds {
            let ends = [AtomIx::new(a), AtomIx::new(b)];
            let twice = list.iter().any(|l| l.ends == ends || l.ends == [ends[1], ends[0]]);
            if a == b || a >= n || b >= n || twice {
                continue;
            }
            let order = match order {
                1 | 4 => Order::Single,
                2 => Order::Double,
                3 => Order::Triple,
                n => Order::Special(n),
            };
            list.push(Bond { ends, order });
            marks.push(match mark {
                0 => Mark::Solid(End::First),
                1 => Mark::Hashed(End::Second),
                2 => Mark::Wavy(End::First),
                3 if order == Order::Double => Mark::Crossed,
                _ => Mark::Plain,
            });
        }
        let points = atoms.iter().map(|a| Point::new(a.1, a.2)).collect();
        let atoms = atoms.into_iter().map(|a| a.0).collect();
        Drawing::new(Molecule::new(atoms, list).unwrap(), points, marks).unwrap()
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(400))]

    #[test]
    fn ink_is_finite_and_repeatable(drawing in any_drawing()) {
        let n = drawing.molecule().n_atoms();
        let captions: Vec<Caption> = (0..n)
            .map(|i| Caption {
                atoms: vec![AtomIx::new(i), AtomIx::new((i * 3) % n)],
                locant: i.to_string(),
                descriptor: (i % 2 == 0).then(|| "Z".to_owned()),
                tone: Tone::Open,
            })
            .collect();
        let ink = compose(&drawing, journal(), &captions, None);
        prop_assert!(ink.bounds.is_finite() && ink.points_per_unit.is_finite());
        let mut elements = 0;
        for item in &ink.items {
            let path = match &item.shape {
                Shape::Fill(path) | Shape::Stroke(path, _) => path,
                Shape::Text(run) => &run.outline,
            };
            elements += path.elements().len();
            prop_assert!(path.is_finite());
            if let Some(bounds) = item.shape.bounds() {
                prop_assert!(ink.bounds.union(bounds) == ink.bounds);
            }
        }
        // bounded, however long the bonds
        prop_assert!(elements < 20_000);
        let again = compose(&drawing, journal(), &captions, None);
        prop_assert_eq!(format!("{:?}", ink), format!("{:?}", again));
    }
}
