//! The digraph, node by node, against a list of its paths that is made here by recursion over a plain
//! table of bonds. A change of the construction changes a list or a number.
//!
//! Construction: IUPAC 2013 recommendations, P-92.1.4.1 to P-92.1.4.3, from memory.

use super::Stop;
use super::context::Context;
use super::digraph::{Digraph, NodeIx, NodeKind, ROOT};
use crate::molecule::tests::build;
use crate::molecule::{AtomIx, Molecule};
use crate::perceive::{Ratio, Rings};

/// Symbols and bonds `(first, second, pairs)` of a molecule.
struct Skeleton {
    symbols: Vec<&'static str>,
    bonds: Vec<(usize, usize, u8)>,
}

impl Skeleton {
    fn new(symbols: &[&'static str], bonds: &[(usize, usize, u8)]) -> Skeleton {
        Skeleton {
            symbols: symbols.to_vec(),
            bonds: bonds.to_vec(),
        }
    }

    /// Carbon atoms joined by single bonds.
    fn saturated(n: usize, bonds: &[(usize, usize)]) -> Skeleton {
        Skeleton {
            symbols: vec!["C"; n],
            bonds: bonds.iter().map(|(a, b)| (*a, *b, 1)).collect(),
        }
    }

    fn molecule(&self) -> Molecule {
        build(&self.symbols, &self.bonds)
    }

    fn near(&self, atom: usize) -> Vec<(usize, u8)> {
        let ends = self.bonds.iter().map(|(a, b, k)| (*a, *b, *k));
        ends.flat_map(|(a, b, k)| [(a, b, k), (b, a, k)])
            .filter(|(from, _, _)| *from == atom)
            .map(|(_, to, k)| (to, k))
            .collect()
    }

    /// Hydrogens that fill up the common valence.
    fn hydrogens(&self, atom: usize) -> u8 {
        let used: u8 = self.near(atom).iter().map(|(_, k)| k).sum();
        let valence: u8 = match self.symbols[atom] {
            "C" => 4,
            "N" => 3,
            "O" => 2,
            other => panic!("no valence for {other}"),
        };
        valence.saturating_sub(used)
    }
}

/// One node: the atoms on the way to it from the root, what it is, and how far its original is from
/// the root (of a ring duplicate).
type Entry = (Vec<usize>, char, usize);

/// All nodes of the digraph by the words of the rule: every path without a repeated atom; an atom that
/// stands on the path already, but for the one just left, once more as a duplicate; for every further
/// electron pair of a bond a duplicate on both of its atoms; and the hydrogens.
fn paths(of: &Skeleton, path: &[usize], list: &mut Vec<Entry>) {
    let at = path[path.len() - 1];
    let before = (path.len() > 1).then(|| path[path.len() - 2]);
    let longer = |to: usize| [path, &[to]].concat();
    for (to, pairs) in of.near(at) {
        for _ in 1..pairs {
            list.push((longer(to), 'b', 0));
        }
        if before == Some(to) {
            continue;
        }
        match path.iter().position(|a| *a == to) {
            Some(original) => list.push((longer(to), 'r', original)),
            None => {
                list.push((longer(to), 'a', 0));
                paths(of, &longer(to), list);
            }
        }
    }
    for _ in 0..of.hydrogens(at) {
        list.push((longer(at), 'h', 0));
    }
}

fn listed(of: &Skeleton, root: usize) -> Vec<Entry> {
    let mut list = vec![(vec![root], 'a', 0)];
    paths(of, &[root], &mut list);
    list.sort();
    list
}

/// The same list from the program's digraph.
fn grown(of: &Skeleton, root: usize) -> Vec<Entry> {
    let molecule = of.molecule();
    let context = Context::new(&molecule, &Rings::find(&molecule));
    let mut tree = Digraph::new(&context, AtomIx::new(root), 100_000);
    tree.grow_all().unwrap();
    let mut list: Vec<Entry> = nodes(&tree).map(|ix| entry(&tree, ix)).collect();
    list.sort();
    list
}

fn nodes(tree: &Digraph<'_>) -> impl Iterator<Item = NodeIx> + use<> {
    0..NodeIx::try_from(tree.len()).unwrap()
}

fn entry(tree: &Digraph<'_>, ix: NodeIx) -> Entry {
    let mut path = Vec::new();
    let mut at = ix;
    loop {
        path.push(tree.node(at).atom.index());
        if at == ROOT {
            break;
        }
        at = tree.node(at).parent;
    }
    path.reverse();
    let node = tree.node(ix);
    assert_eq!(node.sphere as usize, path.len() - 1);
    let kind = match node.kind {
        NodeKind::Atom => 'a',
        NodeKind::RingDuplicate => 'r',
        NodeKind::BondDuplicate => 'b',
        NodeKind::Hydrogen => 'h',
    };
    (path, kind, node.original_sphere as usize)
}

/// Numbers of atoms, ring duplicates, bond duplicates and hydrogens.
fn counts(list: &[Entry]) -> [usize; 4] {
    ['a', 'r', 'b', 'h'].map(|kind| list.iter().filter(|e| e.1 == kind).count())
}

fn ring(symbols: &[&'static str], pairs: &[u8]) -> Skeleton {
    let n = symbols.len();
    let bonds: Vec<_> = (0..n).map(|i| (i, (i + 1) % n, pairs[i])).collect();
    Skeleton::new(symbols, &bonds)
}

/// Four CH (0 to 3) joined by six CH2.
fn adamantane() -> Skeleton {
    Skeleton::saturated(
        10,
        &[
            (0, 4),
            (4, 1),
            (0, 5),
            (5, 2),
            (0, 6),
            (6, 3),
            (1, 7),
            (7, 2),
            (1, 8),
            (8, 3),
            (2, 9),
            (9, 3),
        ],
    )
}

fn cubane() -> Skeleton {
    let edges: Vec<_> = (0..8usize)
        .flat_map(|a| [1, 2, 4].map(|bit| (a, a ^ bit)))
        .filter(|(a, b)| a < b)
        .collect();
    Skeleton::saturated(8, &edges)
}

/// Two five-rings with a belt of ten atoms between them.
fn dodecahedrane() -> Skeleton {
    let mut edges = Vec::new();
    for i in 0..5 {
        edges.push((i, (i + 1) % 5));
        edges.push((i, 5 + 2 * i));
        edges.push((15 + i, 15 + (i + 1) % 5));
        edges.push((15 + i, 6 + 2 * i));
    }
    edges.extend((0..10).map(|i| (5 + i, 5 + (i + 1) % 10)));
    Skeleton::saturated(20, &edges)
}

/// Molecules of all the shapes that matter: chains, rings, bridges, cages, double and triple bonds in and
/// out of rings, cumulated ones.
fn shapes() -> Vec<(&'static str, Skeleton)> {
    let norbornene = [
        (0, 1, 1),
        (1, 2, 2),
        (2, 3, 1),
        (3, 4, 1),
        (4, 5, 1),
        (5, 0, 1),
        (3, 6, 1),
        (6, 0, 1),
    ];
    vec![
        ("methane", Skeleton::saturated(1, &[])),
        (
            "neopentane",
            Skeleton::saturated(5, &[(0, 1), (0, 2), (0, 3), (0, 4)]),
        ),
        ("cyclopropane", ring(&["C"; 3], &[1; 3])),
        (
            "pyridine",
            ring(&["N", "C", "C", "C", "C", "C"], &[2, 1, 2, 1, 2, 1]),
        ),
        (
            "pent-1-yn-4-enenitrile",
            Skeleton::new(
                &["N", "C", "C", "C", "C", "C"],
                &[(0, 1, 3), (1, 2, 1), (2, 3, 2), (3, 4, 1), (4, 5, 3)],
            ),
        ),
        (
            "buta-1,2-dienone",
            Skeleton::new(
                &["C", "C", "C", "C", "O"],
                &[(0, 1, 1), (1, 2, 2), (2, 3, 2), (3, 4, 2)],
            ),
        ),
        (
            "cyclobutylideneketone",
            Skeleton::new(
                &["C", "C", "C", "C", "C", "O"],
                &[
                    (0, 1, 1),
                    (1, 2, 1),
                    (2, 3, 1),
                    (3, 0, 1),
                    (0, 4, 2),
                    (4, 5, 2),
                ],
            ),
        ),
        ("norbornene", Skeleton::new(&["C"; 7], &norbornene)),
        (
            "spiropentane",
            Skeleton::saturated(5, &[(0, 1), (1, 2), (2, 0), (0, 3), (3, 4), (4, 0)]),
        ),
        (
            "tetrahedrane",
            Skeleton::saturated(4, &[(0, 1), (0, 2), (0, 3), (1, 2), (1, 3), (2, 3)]),
        ),
        ("adamantane", adamantane()),
        ("cubane", cubane()),
    ]
}

#[test]
fn every_node_is_a_path_of_the_rule() {
    for (name, skeleton) in shapes() {
        for root in 0..skeleton.symbols.len() {
            let (want, have) = (listed(&skeleton, root), grown(&skeleton, root));
            assert_eq!(have.len(), want.len(), "{name} from atom {root}");
            assert_eq!(have, want, "{name} from atom {root}");
        }
    }
}

// by hand: both ways round a ring of n there are n - 1 atoms and the root once more; every CH of benzene
// bears one duplicate for its double bond and one hydrogen
#[test]
fn counts_by_hand() {
    let benzene = ring(&["C"; 6], &[2, 1, 2, 1, 2, 1]);
    assert_eq!(counts(&grown(&benzene, 0)), [11, 2, 11, 11]);
    let cyclopropane = ring(&["C"; 3], &[1; 3]);
    assert_eq!(counts(&grown(&cyclopropane, 0)), [5, 2, 0, 10]);
    // a triple bond puts two duplicates on each of its atoms
    let ethyne = Skeleton::new(&["C", "C"], &[(0, 1, 3)]);
    assert_eq!(counts(&grown(&ethyne, 0)), [2, 0, 4, 2]);
}

// counted once more by a third program in another language: without hydrogens 83 from a CH2 of adamantane
// and 67 from a CH, 226 from a CH of cubane, 25,078 from one of dodecahedrane, there with hydrogens 37,616
#[test]
fn counts_of_cages() {
    let without_hydrogens = |of: &Skeleton, root| {
        let [atoms, duplicates, bonds, hydrogens] = counts(&grown(of, root));
        assert_eq!(bonds, 0);
        (atoms + duplicates, hydrogens)
    };
    assert_eq!(without_hydrogens(&adamantane(), 4).0, 83);
    assert_eq!(without_hydrogens(&adamantane(), 0).0, 67);
    assert_eq!(without_hydrogens(&cubane(), 0).0, 226);
    let (nodes, hydrogens) = without_hydrogens(&dodecahedrane(), 0);
    assert_eq!((nodes, nodes + hydrogens), (25_078, 37_616));
    assert_eq!(nodes, listed(&dodecahedrane(), 0).len() - hydrogens);
}

/// Atomic numbers of the bond duplicates on an atom's first node.
fn duplicates_at(molecule: &Molecule, root: usize) -> Vec<Ratio> {
    let context = Context::new(molecule, &Rings::find(molecule));
    let mut tree = Digraph::new(&context, AtomIx::new(root), 1000);
    tree.grow_all().unwrap();
    nodes(&tree)
        .filter(|ix| {
            let node = tree.node(*ix);
            node.kind == NodeKind::BondDuplicate && node.sphere == 1
        })
        .map(|ix| tree.number(ix))
        .collect()
}

// P-92.1.4.3: where the double bonds of a ring can stand in several places, a duplicate has the mean
// atomic number over them; elsewhere it is that of the atom at the other end
#[test]
fn numbers_of_duplicates() {
    let half = |over| Ratio { over, under: 2 };
    let pyridine = ring(&["N", "C", "C", "C", "C", "C"], &[2, 1, 2, 1, 2, 1]).molecule();
    let pyrazine = ring(&["N", "C", "C", "N", "C", "C"], &[2, 1, 2, 1, 2, 1]).molecule();
    let imine = build(&["C", "N"], &[(0, 1, 2)]);
    let furan = ring(&["O", "C", "C", "C", "C"], &[1, 2, 1, 2, 1]).molecule();
    assert_eq!(duplicates_at(&pyridine, 0), [Ratio::whole(6)]);
    assert_eq!(duplicates_at(&pyridine, 1), [half(13)]);
    assert_eq!(duplicates_at(&pyridine, 2), [Ratio::whole(6)]);
    assert_eq!(duplicates_at(&pyrazine, 1), [half(13)]);
    assert_eq!(duplicates_at(&imine, 0), [Ratio::whole(7)]);
    assert_eq!(duplicates_at(&imine, 1), [Ratio::whole(6)]);
    // the double bonds of furan stand in one place
    assert_eq!(duplicates_at(&furan, 1), [Ratio::whole(6)]);
}

// P-92.1.4.2: bonds of sulfur and phosphorus with three or more ligands to oxygen count as single
// (from memory)
#[test]
fn no_duplicates_at_centres_of_the_third_row() {
    let sulfoxide = build(&["C", "S", "C", "O"], &[(0, 1, 1), (1, 2, 1), (1, 3, 2)]);
    let oxide = build(
        &["C", "P", "C", "C", "O"],
        &[(0, 1, 1), (1, 2, 1), (1, 3, 1), (1, 4, 2)],
    );
    for (molecule, oxygen) in [(&sulfoxide, 3), (&oxide, 4)] {
        assert_eq!(duplicates_at(molecule, 1), []);
        assert_eq!(duplicates_at(molecule, oxygen), []);
    }
    let thione = build(&["C", "C", "C", "S"], &[(0, 1, 1), (1, 2, 1), (1, 3, 2)]);
    assert_eq!(duplicates_at(&thione, 1), [Ratio::whole(16)]);
    assert_eq!(duplicates_at(&thione, 3), [Ratio::whole(6)]);
}

// a duplicate has no mass and no ligands; every atom its own
#[test]
fn duplicates_end_the_path() {
    let molecule = cubane().molecule();
    let context = Context::new(&molecule, &Rings::find(&molecule));
    let mut tree = Digraph::new(&context, AtomIx::new(0), 1000);
    tree.grow_all().unwrap();
    for ix in nodes(&tree) {
        let node = tree.node(ix);
        let (kind, massless) = (node.kind, tree.mass(ix) < 0.5);
        let children = tree.children(ix).unwrap();
        let ends = matches!(
            kind,
            NodeKind::RingDuplicate | NodeKind::BondDuplicate | NodeKind::Hydrogen
        );
        assert_eq!(children.is_empty(), ends);
        assert_eq!(massless, kind == NodeKind::RingDuplicate);
    }
}

// the bound stops a digraph at the first node past it, not one earlier
#[test]
fn the_bound_is_exact() {
    let skeleton = adamantane();
    let molecule = skeleton.molecule();
    let context = Context::new(&molecule, &Rings::find(&molecule));
    let all = listed(&skeleton, 0).len();
    let grow = |limit| Digraph::new(&context, AtomIx::new(0), limit).grow_all();
    assert_eq!(grow(all), Ok(()));
    assert!(matches!(grow(all - 1), Err(Stop::Nodes(n)) if n == all));
}
