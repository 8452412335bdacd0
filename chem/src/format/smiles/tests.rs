//! What lines say, and that what is written says the same.

use super::*;
use crate::molecule::{AtomIx, Molecule};
use crate::stereo::{Ligand, Parity, odd_permutation};
use proptest::prelude::*;

fn good(text: &str) -> Smiles {
    read(text).unwrap_or_else(|e| panic!("{text}: {e}"))
}

/// Fails unless what is written of a line's molecule says the same molecule and configurations.
fn round_trip(smiles: &Smiles, shown: &str) -> Written {
    let written = write(&smiles.molecule, &smiles.units, &smiles.configurations)
        .unwrap_or_else(|e| panic!("{shown}: {e}"));
    let again = read(&written.text).unwrap_or_else(|e| panic!("{shown} -> {}: {e}", written.text));
    let shown = format!("{shown} -> {}", written.text);
    let mut new = vec![AtomIx::new(0); written.order.len()];
    for (place, atom) in written.order.iter().enumerate() {
        new[atom.index()] = AtomIx::new(place);
    }
    same_graph(&smiles.molecule, &again.molecule, &new, &shown);
    let find = |kind, atoms: &[AtomIx]| {
        let mut atoms: Vec<AtomIx> = atoms.iter().map(|a| new[a.index()]).collect();
        atoms.sort_unstable();
        again
            .units
            .iter()
            .find(|(_, u)| u.kind == kind && u.atoms().as_slice() == atoms)
    };
    assert_eq!(smiles.units.len(), again.units.len(), "{shown}");
    for ((ix, unit), configuration) in smiles.units.iter().zip(&smiles.configurations) {
        let Some((other_ix, other)) = find(unit.kind, &unit.atoms()) else {
            panic!("{shown}: {unit:?} is no unit any more");
        };
        let got = again.configurations[other_ix.index()];
        let want = match configuration {
            Configuration::Defined(parity) if !written.unsaid.contains(&ix) => {
                Configuration::Defined(renumbered(*parity, unit, other, &new))
            }
            _ => Configuration::Open,
        };
        assert_eq!(got, want, "{shown}: {unit:?}");
    }
    written
}

fn same_graph(a: &Molecule, b: &Molecule, new: &[AtomIx], shown: &str) {
    assert_eq!(
        (a.n_atoms(), a.n_bonds()),
        (b.n_atoms(), b.n_bonds()),
        "{shown}"
    );
    for ix in a.atoms() {
        let (x, y) = (a.atom(ix), b.atom(new[ix.index()]));
        let facts = |m: &Molecule, i| m.hydrogens(i);
        assert_eq!(
            (x.element, x.isotope, x.charge, x.map),
            (y.element, y.isotope, y.charge, y.map)
        );
        assert_eq!(
            facts(a, ix),
            facts(b, new[ix.index()]),
            "{shown}: hydrogens of {ix:?}"
        );
    }
    for bond in a.bonds().map(|b| a.bond(b)) {
        let [x, y] = bond.ends.map(|e| new[e.index()]);
        let other = b.bond_between(x, y).map(|i| b.bond(i).order);
        assert_eq!(other, Some(bond.order), "{shown}");
    }
}

/// A parity in terms of the same unit under other atom numbers.
fn renumbered(
    parity: Parity,
    unit: &crate::stereo::Unit,
    other: &crate::stereo::Unit,
    new: &[AtomIx],
) -> Parity {
    let moved = unit.ligands.map(|l| match l {
        Ligand::Atom(a) => Ligand::Atom(new[a.index()]),
        Ligand::Hydrogen | Ligand::LonePair => l,
    });
    let (a, b) = other.ligands.split_at(2);
    let second = |ligand: &Ligand| moved[1] == *ligand || moved[3] == *ligand;
    match unit.kind {
        // the first ligand of an end is always a drawn one; does another come first now at one end only?
        Kind::DoubleBond | Kind::CumulatedAxis => parity.flipped_if(second(&a[0]) != second(&b[0])),
        _ => parity.flipped_if(odd_permutation(&moved, &other.ligands)),
    }
}

#[test]
fn contradicting_slashes_have_a_column() {
    for (line, column) in [("C/C(\\F)=C/F", 5), ("F/C=C(/F)/Cl", 10)] {
        let error = read(line)
            .err()
            .unwrap_or_else(|| panic!("{line} was read"));
        assert_eq!(
            (error.column, error.reason),
            (column, Fault::SameSide),
            "{line}"
        );
    }
}

#[test]
fn marks_that_say_nothing_are_told() {
    for (line, codes) in [
        ("C[C@](C)C", vec!["idle-mark"]),
        ("C[N@H]C", vec!["idle-mark"]),
        ("F/C=CF", vec!["idle-mark"]),
        ("C/CC/C", vec!["idle-mark", "idle-mark"]),
        ("C[C@AL1H](F)N", vec!["idle-mark"]),
        ("F/C=C/C=C", vec![]),
        ("CN=C(/C=C/F)/C=C/F", vec!["same-side"]),
        ("C(C)1CC1", vec!["late-ring-number"]),
        ("[S@](C)(=O)CC", vec!["lone-pair-first"]),
    ] {
        let found: Vec<&str> = good(line).notices.iter().map(|n| n.code).collect();
        assert_eq!(found, codes, "{line}");
    }
}

#[test]
fn tails_and_names() {
    let s = good("C[C@H](F)C[C@H](O)N |a:4,&1:1,w:2.1|  a name | of it \r\n");
    assert_eq!(s.title, "a name | of it");
    assert_eq!(s.groups.len(), 2);
    assert_eq!(s.notices.len(), 1);
    let s = good("C[C@H](F)C[C@H](O)N |r|");
    assert_eq!(s.groups[0].kind, GroupKind::And(1));
    assert_eq!(s.groups[0].atoms, [1, 4].map(AtomIx::new));
    let s = good("CO |(0,1;1,0.5)|\tx");
    assert_eq!(s.points.unwrap()[1], Point::new(1.0, 0.5));
    assert_eq!(good("CO |a:1| x").notices[0].code, "idle-group");
    assert_eq!(good("CO |x").title, "|x");
    let error = read("CO  é |a:1|").unwrap();
    assert_eq!(error.title, "é |a:1|");
    assert_eq!(read("CO  |a:9|").err().map(|e| e.column), Some(6));
}

const LINES: [&str; 24] = [
    "C",
    "[H][H].[Na+].[Cl-]",
    "N[C@@H](C)C(=O)O",
    "C[C@H](F)[C@@H](Cl)/C=C/[C@](O)(N)C#N",
    "F/C=C/C=C\\C=C/C",
    "C/C=C(/C)\\C=C(\\F)Cl",
    "C1=C/CCCCCC/1",
    "O=C1/C(=C/c2ccccc2)CCC1",
    "CC=[C@]=CC",
    "CC(F)=C=C=C=C(C)F",
    "C[C@H](O)C(F)=[C@@]=CC",
    "C[S@](=O)c1ccccc1",
    "C[P@@](=O)(O)c1ccc(N)cc1",
    "C[N@@+]1(CC)CCCC1C",
    "C1C[C@H]2CC[C@@H]1C2",
    "[13CH4].[2H]O[2H]",
    "[O-][N+](=O)c1ccccc1",
    "C[n+]1ccc(-c2cc[nH]c2)cc1",
    "*C[C@H]([*:3])F",
    "C[Si@H](F)CC",
    "C[C@]12CC[C@H](C1)C2(C)C",
    "[C@H]%99%10[C@@H](CO)O[C@H](O)[C@H](O%99)[C@@H]%10F",
    "CN(C)(C)(C)C",
    "F/C(Cl)=C(/F)C(=O)\\C=C\\Cl",
];

#[test]
fn what_is_written_says_the_same() {
    for line in LINES {
        let smiles = good(line);
        let written = round_trip(&smiles, line);
        assert!(written.unsaid.is_empty(), "{line}: {written:?}");
        // and again: the order of writing is kept
        let again = round_trip(&good(&written.text), &written.text);
        assert!(again.unsaid.is_empty(), "{line}: {again:?}");
    }
}

/// Every choice of geometries of some conjugated double bonds; an open one between two defined ones, and
/// an odd number of Z in a ring without drawn hydrogens, cannot be said.
#[test]
fn conjugated_double_bonds() {
    for (line, n, unsayable) in [
        ("CC=CC=CC=CC", 3, 4),
        ("CC=CC(C)=C(C)C=CC", 3, 4),
        ("CC=CC(=CC)C=CC", 3, 0),
        ("C1=CC=CC=CC=C1", 4, 48),
        ("FC1=C(F)C(F)=C(F)C(F)=C(F)C(F)=C1F", 4, 0),
    ] {
        let bare = good(line);
        let doubles: Vec<usize> = bare
            .units
            .iter()
            .filter(|(_, u)| u.kind == Kind::DoubleBond)
            .map(|(i, _)| i.index())
            .collect();
        assert_eq!(doubles.len(), n, "{line}");
        let mut lost = 0;
        for code in 0..3usize.pow(u32::try_from(n).unwrap()) {
            let mut smiles = bare.clone();
            for (i, unit) in doubles.iter().enumerate() {
                smiles.configurations[*unit] =
                    match code / 3usize.pow(u32::try_from(i).unwrap()) % 3 {
                        0 => Configuration::Open,
                        1 => Configuration::Defined(Parity::Even),
                        _ => Configuration::Defined(Parity::Odd),
                    };
            }
            let written = round_trip(&smiles, &format!("{line} {code}"));
            lost += usize::from(!written.unsaid.is_empty());
        }
        assert_eq!(lost, unsayable, "{line}");
    }
}

#[test]
fn what_cannot_be_written_is_said() {
    let m = crate::molecule::tests::build(&["C", "O"], &[(0, 1, 8)]);
    let units = Units::find(&m, &Rings::find(&m));
    assert!(matches!(write(&m, &units, &[]), Err(Unwritable::Bond(_))));
    let biaryl = good("Cc1cccc(C)c1-c1c(F)cccc1F");
    let mut configurations = biaryl.configurations.clone();
    let axis = biaryl
        .units
        .iter()
        .find(|(_, u)| u.kind == Kind::HinderedAxis);
    let (ix, _) = axis.unwrap();
    configurations[ix.index()] = Configuration::Defined(Parity::Even);
    let written = write(&biaryl.molecule, &biaryl.units, &configurations).unwrap();
    assert_eq!(written.unsaid, [ix]);
}

#[test]
fn long_and_deep_lines() {
    let chain = "C".repeat(100_000);
    let s = good(&chain);
    assert_eq!(s.molecule.n_atoms(), 100_000);
    assert_eq!(
        write(&s.molecule, &s.units, &s.configurations)
            .unwrap()
            .text,
        chain
    );
    let deep = format!("{}C{}", "C(".repeat(30_000), ")".repeat(30_000));
    assert_eq!(good(&deep).molecule.n_atoms(), 30_001);
    let star = format!("C{}", "(F)".repeat(30_000));
    assert_eq!(good(&star).molecule.n_atoms(), 30_001);
    let rings: String = (0..1000).map(|i| format!("C%({i})")).collect();
    let rings = format!("{rings}{rings}");
    let s = good(&rings);
    assert_eq!(s.molecule.n_bonds(), 2_999);
    round_trip(&s, "a thousand rings");
    assert!(matches!(
        read(&"C".repeat(MOST_CHARACTERS + 1))
            .err()
            .map(|e| e.reason),
        Some(Fault::TooLong(_))
    ));
}

/// Systems that are hard to pair: strips of four- and five-membered rings, odd ones among them.
#[test]
fn large_systems_end() {
    let there =
        |n: usize, next: &str| -> String { (0..n).map(|i| format!("c%({i}){next}")).collect() };
    let back = |n: usize| -> String { (0..n).rev().map(|i| format!("c%({i})")).collect() };
    for (line, pairs) in [
        (format!("{}cc{}", there(1000, ""), back(1000)), Some(1001)),
        (format!("{}ccc{}", there(1000, ""), back(1000)), None),
        (format!("{}c{}", there(999, "c"), back(999)), Some(1499)),
        (format!("{}c{}", there(1000, "c"), back(1000)), None),
        (format!("{}cc{}", there(4000, ""), back(4000)), None),
    ] {
        match (read(&line), pairs) {
            (Ok(s), Some(pairs)) => {
                let doubles = s
                    .molecule
                    .bonds()
                    .filter(|b| s.molecule.bond(*b).order.pairs() == 2);
                assert_eq!(doubles.count(), pairs);
            }
            (Err(error), None) => assert!(matches!(
                error.reason,
                Fault::NoPattern(_) | Fault::TooLarge
            )),
            (Ok(_), None) => panic!("an odd number of atoms was paired"),
            (Err(error), Some(_)) => panic!("{error}"),
        }
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 2_000, failure_persistence: None, ..ProptestConfig::default() })]

    /// No text makes the reader fail in another way than by an error; what it reads can be written.
    #[test]
    fn any_text_is_read_or_refused(text in "[-BCNOPSFIbcnops*\\[\\]()=#:/\\\\.@H+0-9%lr |a&,;$é]{0,40}") {
        if let Ok(smiles) = read(&text) {
            round_trip(&smiles, &text);
        }
    }

    /// Text made of signs that fit each other more often.
    #[test]
    fn likely_text_is_read_or_refused(words in proptest::collection::vec(
        proptest::sample::select(vec![
            "C", "N", "O", "C(", ")", "c1", "c", "1", "2", "=C", "/C", "\\C", "=", "/", "\\", "[C@H]", "[C@@]",
            "[C@]", "[S@](=O)", "N1", "C1", "C2", "F", "[nH]", "n", ".", "#C", "[2H]", "[P@@]", "=[C@]=", "[N@+]",
            "(F)", "(/F)", "(\\F)", "=N/O", "/C=C/", "/C=C\\", "%10", "*",
        ]), 1..24)) {
        let text = words.concat();
        if let Ok(smiles) = read(&text) {
            round_trip(&smiles, &text);
        }
    }

    /// Lines with one letter changed.
    #[test]
    fn damaged_lines(line in 0..LINES.len(), at in 0usize..60, with in "[ -~]") {
        let mut text: Vec<char> = LINES[line].chars().collect();
        if let (true, Some(c)) = (at < text.len(), with.chars().next()) {
            text[at] = c;
        }
        let text: String = text.into_iter().collect();
        if let Ok(smiles) = read(&text) {
            round_trip(&smiles, &text);
        }
    }
}
