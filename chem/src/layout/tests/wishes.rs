//! Wished geometries of double bonds: in chains, at rings, in large rings; and those that cannot be met.

use super::*;

fn wish(ends: [usize; 2], ligands: [usize; 2], together: bool) -> Wish {
    Wish {
        ends: ends.map(AtomIx::new),
        ligands: ligands.map(AtomIx::new),
        together,
    }
}

fn is_met(points: &[Point], w: &Wish) -> bool {
    let at = |a: AtomIx| points[a.index()];
    let axis = at(w.ends[1]) - at(w.ends[0]);
    let side = |k: usize| axis.cross(at(w.ligands[k]) - at(w.ends[k]));
    side(0).abs() > 0.05 && side(1).abs() > 0.05 && (side(0) * side(1) > 0.0) == w.together
}

/// Every choice of geometries for the double bonds of a sketch.
fn all_ways(name: &str, sketch: &Sketch, bonds: &[([usize; 2], [usize; 2])]) {
    let m = sketch.molecule();
    for choice in 0..1usize << bonds.len() {
        let wishes: Vec<Wish> = bonds
            .iter()
            .enumerate()
            .map(|(i, (ends, ligands))| wish(*ends, *ligands, choice >> i & 1 == 1))
            .collect();
        let layout = lay(&m, &wishes);
        assert_eq!(layout.unmet, Vec::<usize>::new(), "{name} {choice:b}");
        assert!(
            wishes.iter().all(|w| is_met(&layout.points, w)),
            "{name} {choice:b}"
        );
        let (short, long) = super::bonds(&m, &layout.points);
        assert!(
            short > 0.7 && long < 1.45,
            "{name} {choice:b}: {short} {long}"
        );
        let near = nearest(&layout.points);
        assert!(near > 0.5, "{name} {choice:b}: {near}");
    }
}

#[test]
fn chains_and_rings_with_wishes() {
    let triene = Sketch::read("0-1=2-3=4-5=6-7 2-8 5-9", "O9");
    all_ways(
        "triene",
        &triene,
        &[([1, 2], [0, 3]), ([3, 4], [2, 5]), ([5, 6], [9, 7])],
    );
    let cumulene = Sketch::read("0-1=2=3=4-5 1-6", "O5");
    all_ways("cumulene", &cumulene, &[([1, 4], [0, 5])]);
    let ylidene = Sketch::read("0-1-2-3-4-5-0 3=6-7-8-9-10-11-6 1-12 8-13", "");
    all_ways("bound rings", &ylidene, &[([3, 6], [2, 7])]);
    let exocyclic = Sketch::read("0-1-2-3-4-5-0 2=6-7 1-8", "O7");
    all_ways("ring with an oxime", &exocyclic, &[([2, 6], [1, 7])]);
    let azo = Sketch::read("0-1=2-3=4-5=0 3-6=7-8-9=10-11=12-13=8", "N6 N7");
    all_ways("azo", &azo, &[([6, 7], [3, 8])]);
}

#[test]
fn large_rings_with_wishes() {
    for n in [8, 9, 10, 11, 12, 14, 15, 18] {
        let mut ring = Sketch::atom();
        ring.ring(0, n);
        ring.bonds[1].2 = Order::Double;
        all_ways(&format!("ring of {n}"), &ring, &[([1, 2], [0, 3])]);
    }
    let mut diene = Sketch::atom();
    diene.ring(0, 14);
    for bond in [1, 3, 8] {
        diene.bonds[bond].2 = Order::Double;
    }
    let methyl = diene.grow(9);
    diene.grow(5);
    let double = [([1, 2], [0, 3]), ([3, 4], [2, 5]), ([8, 9], [7, methyl])];
    all_ways("triene of 14", &diene, &double);
}

/// A large ring that a bridge divides.
#[test]
fn bridged_large_rings_with_wishes() {
    let mut s = Sketch::atom();
    s.ring(0, 18);
    let mut at = 0;
    for _ in 0..5 {
        at = s.grow(at);
    }
    s.join(at, 9, Order::Single);
    s.bonds[3].2 = Order::Double;
    all_ways("bridged", &s, &[([3, 4], [2, 5])]);
}

#[test]
fn what_cannot_be_met_is_said() {
    let m = Sketch::read("0-1=2-3-4-5-0 1-6", "").molecule();
    let trans = wish([1, 2], [0, 3], false);
    let cis = wish([1, 2], [0, 3], true);
    let elsewhere = wish([1, 2], [4, 3], true);
    let outside = wish([1, 2], [0, 77], true);
    let layout = lay(&m, &[trans, cis, elsewhere, outside]);
    assert_eq!(layout.unmet, [0, 2, 3]);
    assert!(
        (bonds(&m, &layout.points).1 - 1.0).abs() < 1e-6,
        "the ring stays regular"
    );
}
