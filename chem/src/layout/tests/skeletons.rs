//! Skeletons that every chemist has drawn: bonds, distances, crossings, regular polygons, bounded work.

use super::*;
use crate::layout::relax::across;

/// Name, walks, elements, what is expected.
type Row = (&'static str, &'static str, &'static str, Expected);

#[derive(Clone, Copy, PartialEq)]
enum Expected {
    /// All bonds of length 1, all small rings regular.
    Regular,
    /// No bonds cross.
    Open,
    /// As cages are drawn: bonds may cross.
    Cage,
}
use Expected::{Cage, Open, Regular};

#[rustfmt::skip]
const SKELETONS: &[Row] = &[
    ("steroid", "0-1-2-3-4-5-6-7-8-9-10-11-12-13-14 1-6 1-10 9-15-13-18-17-16-15", "", Regular),
    ("chain", "0-1-2-3-4-5-6-7-8-9-10 3-11 6-12-13", "O11", Regular),
    ("spiro", "0-1-2-3-4-5-0 3-6-7-8-9-3", "", Regular),
    ("two small rings", "0-1-2-3-4-5-6-3 0-2", "", Regular),
    ("pyrene", "0=1-2-3-4=5-0 2=14-13=12-11=10-9=8-7=6-4 3=15-12 8-15", "", Regular),
    ("porphyrin", "0-1=2-3=4-5=6-7-8-4 0=22-21=19-18=17-16-15=13-12=11-10-9=7 2-23-22 10=14-13 16=20-19", "N8 N14 N20 N23", Open),
    ("macrolide", "0-1-2-3=4 1-15-14-13-12-11-9-8-7-6-5-3 9=10", "O2 O4 O10", Open),
    ("paracyclophane", "0-1-2-3=4-5=6-7=2 0-13-12=11-10-9-8-5 10=15-14=13", "", Open),
    ("norbornane", "0-1-2-3-4-5-6-2 0-5", "", Open),
    ("bicyclooctane", "0-1-2-3-4-5-6-7-2 0-5", "", Open),
    ("quinuclidine", "0-1-2-3-4-5-6-7-2 0-5", "N2", Open),
    ("morphinan", "0-1-2-3-4-5-6-7=8-9=10-11-12-13-14-15-4 0-16-12-3 6=11 10-17-16", "N15 O17", Cage),
    ("bornanone", "0-1-2 1-3-4-5-6-7 1-6-8=9 3-10-8", "O9", Cage),
    ("adamantane", "0-1-2-3-4-5-6-7-8-1 0-5 3-9-7", "", Cage),
    ("cubane", "0-1-2-3-4-5-6-7-2 0-3 0-5 1-6 4-7", "", Cage),
    ("tropane", "0-1-2-3-4-5-6-7-8 1-5 2-9-7", "N1 O8", Cage),
    ("three-bridged sugar", "0-1-2-3-4-5-6 1-8-7-4 2-10-9-7", "O0 O3 O6 O8 O10", Cage),
];

#[test]
fn skeletons_are_drawn_well() {
    for (name, walks, elements, expected) in SKELETONS {
        let sketch = Sketch::read(walks, elements);
        let m = sketch.molecule();
        let points = lay(&m, &[]).points;
        let (short, long) = bonds(&m, &points);
        let near = nearest(&points);
        match expected {
            Regular => {
                assert!(
                    (short - 1.0).abs() < 1e-6 && (long - 1.0).abs() < 1e-6,
                    "{name}"
                );
                assert!(near > 0.95, "{name}: {near}");
                regular(name, &m, &points);
            }
            Open | Cage => {
                assert!(short > 0.66 && long < 1.45, "{name}: {short} {long}");
                assert!(near > 0.5, "{name}: {near}");
            }
        }
        if *expected != Cage {
            assert_eq!(crossings(&m, &points), 0, "{name}");
        }
    }
}

/// Every ring of up to eight atoms is a regular polygon.
fn regular(name: &str, m: &Molecule, points: &[Point]) {
    let rings = Rings::find(m);
    for ring in rings.cycles().iter().filter(|r| r.len() <= 8) {
        let n = ring.len();
        for i in 0..n {
            for k in 1..n {
                let [p, q] = [ring[i], ring[(i + k) % n]].map(|a| points[a.index()]);
                assert!((p.distance(q) - across(n, k)).abs() < 1e-6, "{name}");
            }
        }
    }
}

/// Glucose rings joined 1,4 to a ring, each with its hydroxymethyl group.
#[test]
fn cyclodextrins_are_large_rings_of_regular_small_ones() {
    for n in 6..=8 {
        let mut sketch = Sketch::default();
        let mut last: Option<usize> = None;
        let mut first = 0;
        for i in 0..n {
            let begin = sketch.n_atoms;
            sketch.n_atoms += 1;
            let ring = sketch.ring(begin, 6);
            sketch.elements.push((ring[5], Element::O));
            for k in [1, 2] {
                let o = sketch.grow(ring[k]);
                sketch.elements.push((o, Element::O));
            }
            let c = sketch.grow(ring[4]);
            let o = sketch.grow(c);
            sketch.elements.push((o, Element::O));
            if i == 0 {
                first = ring[0];
            }
            if let Some(from) = last {
                sketch.join(from, ring[0], Order::Single);
            }
            let bridge = sketch.grow(ring[3]);
            sketch.elements.push((bridge, Element::O));
            last = Some(bridge);
        }
        sketch.join(last.unwrap(), first, Order::Single);
        let m = sketch.molecule();
        let points = lay(&m, &[]).points;
        let (short, long) = bonds(&m, &points);
        assert!(short > 0.85 && long < 1.25, "{n}: {short} {long}");
        assert!(nearest(&points) > 0.6, "{n}: {}", nearest(&points));
        assert_eq!(crossings(&m, &points), 0, "{n}");
    }
}

/// A chain of amino acids: with side chains of one, four and a ring of six atoms.
fn peptide(n: usize) -> Sketch {
    let mut s = Sketch::atom();
    s.elements.push((0, Element::N));
    let mut last = 0;
    for i in 0..n {
        let alpha = s.grow(last);
        let side = s.grow(alpha);
        match i % 3 {
            0 => {}
            1 => {
                let mut at = side;
                for _ in 0..3 {
                    at = s.grow(at);
                }
            }
            _ => {
                let at = s.grow(side);
                s.ring(at, 6);
            }
        }
        let carbonyl = s.grow(alpha);
        let oxygen = s.n_atoms;
        s.join(carbonyl, oxygen, Order::Double);
        s.elements.push((oxygen, Element::O));
        last = s.grow(carbonyl);
        let end = if i + 1 < n { Element::N } else { Element::O };
        s.elements.push((last, end));
    }
    s
}

#[test]
fn a_peptide_is_a_straight_zigzag() {
    let m = peptide(20).molecule();
    let points = lay(&m, &[]).points;
    assert_eq!(crossings(&m, &points), 0);
    assert!(nearest(&points) > 0.7);
    let xs = points.iter().map(|p| p.x);
    let width = xs.clone().fold(f64::MIN, f64::max) - xs.fold(f64::MAX, f64::min);
    // three bonds a residue, each 0.87 along the chain
    assert!(width > 0.85 * 60.0 * 0.866, "{width}");
}

/// Large molecules end, without deep recursion: a chain, a long peptide, a tree that cannot be drawn
/// without overlaps, a sheet and a tube of hexagons.
#[test]
fn work_is_bounded() {
    let mut chain = Sketch::atom();
    for i in 0..4000 {
        chain.grow(i);
    }
    let mut tree = Sketch::atom();
    let mut level = vec![0];
    while tree.n_atoms < 1500 {
        level = level
            .into_iter()
            .flat_map(|a| [tree.grow(a), tree.grow(a)])
            .collect();
    }
    for (name, sketch) in [
        ("chain", chain),
        ("peptide", peptide(120)),
        ("tree", tree),
        ("sheet", hexagons(12, 12, false)),
        ("tube", hexagons(8, 12, true)),
    ] {
        let m = sketch.molecule();
        let points = lay(&m, &[]).points;
        assert!(points.iter().all(|p| p.is_finite()), "{name}");
        let (short, long) = bonds(&m, &points);
        let flat = matches!(name, "chain" | "peptide" | "sheet");
        assert!(
            !flat || (short > 0.9 && long < 1.1),
            "{name}: {short} {long}"
        );
        assert!(!flat || nearest(&points) > 0.5, "{name}");
    }
}

/// Rows of atoms in zigzag, joined to a sheet of hexagons, its sides joined if it is a tube.
fn hexagons(rows: usize, columns: usize, tube: bool) -> Sketch {
    let mut s = Sketch::default();
    let wide = 2 * columns;
    let at = |r: usize, c: usize| r * wide + c;
    for r in 0..=rows {
        for c in 0..wide {
            if c + 1 < wide {
                s.join(at(r, c), at(r, c + 1), Order::Single);
            } else if tube {
                s.join(at(r, c), at(r, 0), Order::Single);
            }
            if r < rows && (r + c) % 2 == 0 {
                s.join(at(r, c), at(r + 1, c), Order::Single);
            }
        }
    }
    s
}

#[test]
fn parts_stand_side_by_side() {
    let m = Sketch::read("0-1-2 3-4-5-6-7-8-3 9-10", "O2 O9").molecule();
    let points = lay(&m, &[]).points;
    let parts: [&[usize]; 3] = [&[0, 1, 2], &[3, 4, 5, 6, 7, 8], &[9, 10]];
    for (i, a) in parts.iter().enumerate() {
        for b in &parts[i + 1..] {
            for p in *a {
                for q in *b {
                    assert!(points[*p].distance(points[*q]) > 1.5);
                }
            }
        }
    }
    // the largest stands first
    assert!(points[3].x < points[0].x && points[0].x < points[9].x);
    assert!(lay(&Sketch::default().molecule(), &[]).points.is_empty());
}

#[test]
fn triple_bonds_and_cumulenes_are_straight() {
    let m = Sketch::read("0-1#2-3=4=5-6", "").molecule();
    let points = lay(&m, &[]).points;
    for (a, b, c) in [(0, 1, 2), (1, 2, 3), (3, 4, 5)] {
        let angle = geom::between(points[a] - points[b], points[c] - points[b]);
        assert!((angle - std::f64::consts::PI).abs() < 1e-6, "{b}");
    }
    let bent = geom::between(points[2] - points[3], points[4] - points[3]);
    assert!((bent.to_degrees() - 120.0).abs() < 1e-6);
}
