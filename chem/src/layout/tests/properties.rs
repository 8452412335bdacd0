//! What holds of molecules made by chance.

use super::*;
use proptest::prelude::*;

/// A molecule grown by chance: atoms, branches and rings on what is there.
fn sketches() -> impl Strategy<Value = Sketch> {
    let step = (0u8..10, 0usize..1000, 3usize..8);
    prop::collection::vec(step, 1..14).prop_map(|steps| {
        let mut s = Sketch::atom();
        for (kind, at, size) in steps {
            let free: Vec<usize> = (0..s.n_atoms).filter(|a| degree(&s, *a) < 3).collect();
            let Some(from) = free.get(at % free.len().max(1)).copied() else {
                continue;
            };
            match kind {
                0..=4 => {
                    s.grow(from);
                }
                5 => {
                    let o = s.grow(from);
                    s.elements.push((o, Element::O));
                }
                6 | 7 => {
                    let first = s.grow(from);
                    s.ring(first, size.max(5));
                }
                _ => fuse(&mut s, from, size.max(4)),
            }
        }
        s
    })
}

/// The same with chains between any two atoms: bridged rings, large rings, cages.
fn bridged() -> impl Strategy<Value = Sketch> {
    let bridge = (0usize..1000, 0usize..1000, 0usize..9);
    (sketches(), prop::collection::vec(bridge, 1..4)).prop_map(|(mut s, bridges)| {
        for (from, to, atoms) in bridges {
            let (from, to) = (from % s.n_atoms, to % s.n_atoms);
            if from == to || degree(&s, from) > 3 || degree(&s, to) > 3 {
                continue;
            }
            // two atoms between at least, so that no bond is doubled and no ring of three arises
            let mut last = from;
            for _ in 0..atoms.max(2) {
                last = s.grow(last);
            }
            s.join(last, to, Order::Single);
        }
        s
    })
}

fn degree(s: &Sketch, a: usize) -> usize {
    s.bonds.iter().filter(|b| b.0 == a || b.1 == a).count()
}

/// A ring on the first bond of an atom whose other end has room, else nothing.
fn fuse(s: &mut Sketch, at: usize, size: usize) {
    let other = s.bonds.iter().find_map(|b| match (b.0 == at, b.1 == at) {
        (true, _) => Some(b.1),
        (_, true) => Some(b.0),
        _ => None,
    });
    let Some(other) = other.filter(|o| degree(s, *o) < 3) else {
        return;
    };
    let mut last = at;
    for _ in 2..size {
        last = s.grow(last);
    }
    s.join(last, other, Order::Single);
}

/// All distances between atoms, in order.
fn distances(points: &[Point]) -> Vec<f64> {
    let mut list: Vec<f64> = Vec::new();
    for (i, p) in points.iter().enumerate() {
        list.extend(points[i + 1..].iter().map(|q| p.distance(*q)));
    }
    list.sort_by(f64::total_cmp);
    list
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 60, ..ProptestConfig::default() })]

    #[test]
    fn bonds_are_even_and_atoms_apart(sketch in sketches()) {
        let m = sketch.molecule();
        let points = lay(&m, &[]).points;
        prop_assert!(points.iter().all(|p| p.is_finite()));
        let (short, long) = bonds(&m, &points);
        prop_assert!(m.n_bonds() == 0 || (short > 0.6 && long < 1.6), "{short} {long}");
        prop_assert!(nearest(&points) > 0.25, "{}", nearest(&points));
    }

    #[test]
    fn bridged_rings_stay_readable(sketch in bridged()) {
        let m = sketch.molecule();
        let points = lay(&m, &[]).points;
        prop_assert!(points.iter().all(|p| p.is_finite()));
        let (short, long) = bonds(&m, &points);
        prop_assert!(m.n_bonds() == 0 || (short > 0.4 && long < 2.2), "{short} {long}");
        prop_assert!(nearest(&points) > 0.15, "{}", nearest(&points));
    }

    #[test]
    fn the_same_again(sketch in bridged()) {
        let m = sketch.molecule();
        prop_assert_eq!(lay(&m, &[]).points, lay(&m, &[]).points);
    }

    #[test]
    fn the_order_of_atoms_does_not_matter(sketch in bridged(), seed in any::<u64>()) {
        let mut order: Vec<usize> = (0..sketch.n_atoms).collect();
        order.sort_by_key(|i| crate::layout::graph::mixed(seed ^ *i as u64));
        let one = lay(&sketch.molecule(), &[]).points;
        let two = lay(&sketch.build(&order), &[]).points;
        for (a, b) in distances(&one).iter().zip(distances(&two)) {
            prop_assert!((a - b).abs() < 1e-6, "{a} {b}");
        }
    }
}
