//! Molfiles of version 3000: what is read, what is kept, what is written.

use super::*;
use crate::format::{GroupKind, WriteError};
use crate::molecule::Atom;

/// A V3000 molfile: entries of atoms, of bonds, and lines behind them.
pub(super) fn table(atoms: &[&str], bonds: &[&str], others: &[&str]) -> String {
    let mut text = format!(
        "N-17 batch 4\n  test    01020304052D\ncomment\n  0  0  0     0  0            999 V3000\nM  V30 BEGIN CTAB\nM  V30 COUNTS {} {} 0 0 0\nM  V30 BEGIN ATOM\n",
        atoms.len(),
        bonds.len()
    );
    for atom in atoms {
        text += &format!("M  V30 {atom}\n");
    }
    text += "M  V30 END ATOM\nM  V30 BEGIN BOND\n";
    for bond in bonds {
        text += &format!("M  V30 {bond}\n");
    }
    text += "M  V30 END BOND\n";
    for line in others {
        text += &format!("M  V30 {line}\n");
    }
    text + "M  V30 END CTAB\nM  END\n"
}

pub(super) const THREONINE: [&str; 8] = [
    "1 C 0.0000 0.0000 0 0",
    "2 C 1.2990 0.7500 0 0",
    "3 N 1.2990 2.2500 0 0",
    "4 C 2.5980 0.0000 0 0",
    "5 O 2.5980 -1.5000 0 0",
    "6 O 3.8970 0.7500 0 0",
    "7 O -1.2990 0.7500 0 0",
    "8 C 0.0000 -1.5000 0 0",
];
pub(super) const THREONINE_BONDS: [&str; 7] = [
    "1 1 1 2",
    "2 1 2 3 CFG=1",
    "3 1 2 4",
    "4 2 4 5",
    "5 1 4 6",
    "6 1 1 7 CFG=3",
    "7 1 1 8",
];

pub(super) fn threonine(others: &[&str]) -> String {
    table(&THREONINE, &THREONINE_BONDS, others)
}

/// Lines of the table that is written, without their prefix.
fn lines_of(record: &Record) -> Vec<String> {
    let text = written(record);
    assert!(text.lines().all(|l| l.chars().count() < 80), "{text}");
    text.lines()
        .filter_map(|l| l.strip_prefix("M  V30 "))
        .map(str::to_owned)
        .collect()
}

fn first(atom: &str) -> Atom {
    let text = table(&[atom, "2 C 1.5 0 0 0"], &["1 1 1 2"], &[]);
    good(&text).drawing.molecule().atom(AtomIx::new(0)).clone()
}

#[test]
fn a_plain_record_of_v3000() {
    let record = good(&threonine(&[]));
    assert_eq!(
        (record.title.as_str(), record.comment.as_str()),
        ("N-17 batch 4", "comment")
    );
    assert_eq!(codes(&record), [""; 0]);
    assert_eq!(record.version, Version::V3000);
    let m = record.drawing.molecule();
    assert_eq!((m.n_atoms(), m.n_bonds()), (8, 7));
    assert_eq!(record.drawing.mark(BondIx::new(1)), Mark::Solid(End::First));
    assert_eq!(
        record.drawing.mark(BondIx::new(5)),
        Mark::Hashed(End::First)
    );
    assert_eq!(m.bond(BondIx::new(3)).order, Order::Double);
    assert_eq!(
        record.drawing.point(AtomIx::new(6)),
        Point::new(-1.299, 0.75)
    );
    // writing is reading backwards
    let body = |text: &str| text.lines().skip(3).collect::<Vec<_>>().join("\n");
    assert_eq!(body(&written(&record)), body(&threonine(&[])));
}

#[test]
fn order_case_quotes_and_continuation_change_nothing() {
    let plain = written(&good(&threonine(&[])));
    let change = |from: &str, to: &str| {
        assert!(threonine(&[]).contains(from));
        threonine(&[]).replace(from, to)
    };
    let (atoms, bonds) = ("M  V30 BEGIN ATOM", "M  V30 BEGIN BOND");
    let whole = threonine(&[]);
    let (head, rest) = whole.split_once(atoms).unwrap();
    let (atom_block, rest) = rest.split_once(bonds).unwrap();
    let (bond_block, tail) = rest.split_once("M  V30 END CTAB").unwrap();
    let bonds_first = format!("{head}{bonds}{bond_block}{atoms}{atom_block}M  V30 END CTAB{tail}");
    for text in [
        whole.replace('\n', "\r\n"),
        whole.replace('\n', "\r"),
        format!("\u{feff}{whole}"),
        whole.replace("M  V30 END ATOM", "\n  \nM  V30 END ATOM  "),
        whole
            .replace("BEGIN ", "begin ")
            .replace("END CTAB", "end ctab")
            .replace("CFG", "cfg"),
        whole.replace("COUNTS", "Counts"),
        change("2 1 2 3 CFG=1", "2 1 2 3 TOPO=0 CFG=\"1\" STBOX=0"),
        change("2 1 2 3 CFG=1", "2 1 2 -\nM  V30 3 CF-  \nM  V30 G=1"),
        change("5 O 2.5980 -1.5000 0 0", "5   O \t2.598 -15e-1 -\nM  V30 0"),
        change("5 O 2.5980 -1.5000 0 0", "5 \"O\" 2.598 -1.5 0 0 CFG=2"),
        bonds_first,
    ] {
        let record = good(&text);
        assert_eq!(codes(&record), [""; 0], "{text}");
        assert_eq!(written(&record), plain, "{text}");
    }
}

#[test]
fn indices_are_names_not_places() {
    let text = table(
        &["30 C 0 0 0 0", "10 N 1.5 0 0 0", "20 O -1.5 0 0 0"],
        &["7 1 30 10 CFG=1", "5 1 20 30"],
        &[
            "BEGIN COLLECTION",
            "MDLV30/STERAC1 ATOMS=(1 30)",
            "MDLV30/HILITE ATOMS=(1 10)",
            "END COLLECTION",
            "BEGIN SGROUP",
            "1 SUP 0 ATOMS=(1 20) LABEL=OMe",
            "END SGROUP",
        ],
    );
    let record = good(&text.replace("COUNTS 3 2 0", "COUNTS 3 2 1"));
    let seen = codes(&record);
    assert!(
        seen.starts_with(&["indices", "stereo-groups", "properties-dropped"]),
        "{seen:?}"
    );
    assert_eq!(record.stereo_groups[0].atoms, [AtomIx::new(0)]);
    let m = record.drawing.molecule();
    assert_eq!(m.bond(BondIx::new(0)).ends.map(AtomIx::index), [0, 1]);
    assert_eq!(m.atom(AtomIx::new(2)).alias.as_deref(), Some("OMe"));
    // a highlight would name another atom now
    assert!(record.extra.is_empty());
    assert!(lines_of(&record).contains(&"2 1 3 1".to_owned()));
}

#[test]
fn keywords_of_atoms() {
    assert_eq!(first("1 N 0 0 0 0 CHG=1").charge, 1);
    assert_eq!(first("1 N 0 0 0 0 rad=2 Chg=-1").radical, Radical::Doublet);
    assert_eq!(first("1 C 0 0 0 0 MASS=13").isotope, Some(13));
    assert_eq!(first("1 C 0 0 0 0 MASS=13.00335").isotope, Some(13));
    assert_eq!(first("1 D 0 0 0 0").isotope, Some(2));
    assert_eq!(first("1 C 0 0 0 0 VAL=-1").valence, Some(0));
    assert_eq!(first("1 C 0 0 0 0 VAL=3").valence, Some(3));
    assert_eq!(first("1 C 0 0 0 0 VAL=0").valence, None);
    assert_eq!(first("1 C 0 0 0 1234 CFG=1").map, 1234);
    assert_eq!(first("1 C 0 0 0").map, 0);
    assert_eq!(
        first("1 R# 0 0 0 0 RGROUPS=(1 7)").alias.as_deref(),
        Some("R7")
    );
    for (kind, alias) in [
        ("[N,O]", "[N,O]"),
        ("NOT [N,O]", "NOT[N,O]"),
        ("\"NOT [N, O]\"", "NOT [N, O]"),
        ("QH", "QH"),
        ("A", "A"),
    ] {
        let atom = first(&format!("1 {kind} 0 0 0 0"));
        assert_eq!(
            (atom.element, atom.alias.as_deref()),
            (Element::ANY, Some(alias))
        );
    }
    let noticed = |atom: &str| codes(&good(&table(&[atom], &[], &[])));
    assert_eq!(noticed("1 C 0 0 0 0 HCOUNT=2 SUBST=0"), ["query-field"]);
    assert_eq!(noticed("1 C 0 0 0 0 HCOUNT=0"), [""; 0]);
    assert_eq!(noticed("1 C 0 0 0 0 ATTCHPT=1"), ["keyword-left-out"]);
    assert_eq!(noticed("1 CL 0 0 0 0"), ["capitals"]);
    assert_eq!(noticed("1 C 0 0 0 0 MASS=40"), ["mass-number"]);
}

#[test]
fn kinds_of_bonds_of_v3000() {
    let bond = |text: &str| good(&table(&["1 C 0 0 0 0", "2 N 1.5 0 0 0"], &[text], &[]));
    for (kind, code) in [
        (8, "query-bond"),
        (9, "dative-bond"),
        (10, "hydrogen-bond"),
        (0, "unstated-bond"),
    ] {
        let text = format!("1 {kind} 1 2");
        let record = bond(&text);
        assert_eq!(codes(&record), [code]);
        assert!(lines_of(&record).contains(&text));
    }
    for (text, mark) in [
        ("1 1 2 1 CFG=1", Mark::Solid(End::First)),
        ("1 1 2 1 CFG=2", Mark::Wavy(End::First)),
        ("1 1 2 1 CFG=3", Mark::Hashed(End::First)),
        ("1 2 2 1 CFG=2", Mark::Crossed),
        ("1 1 2 1 CFG=0", Mark::Plain),
    ] {
        let record = bond(text);
        assert_eq!(record.drawing.mark(BondIx::new(0)), mark, "{text}");
        let same = lines_of(&record)
            .iter()
            .any(|l| text.starts_with(l.as_str()));
        assert!(same, "{text}");
    }
    assert_eq!(codes(&bond("1 2 1 2 CFG=3")), ["mark-on-multiple-bond"]);
    assert_eq!(codes(&bond("1 1 1 2 TOPO=1")), ["query-field"]);
    assert_eq!(codes(&bond("1 1 1 2 DISP=X")), ["keyword-left-out"]);
    let several = bond("1 9 1 2 ENDPTS=(2 1 2) ATTACH=ALL");
    assert_eq!(codes(&several), ["multicenter-bond", "dative-bond"]);
}

fn group(kind: GroupKind, atoms: &[usize]) -> StereoGroup {
    StereoGroup {
        kind,
        atoms: atoms.iter().map(|a| AtomIx::new(a - 1)).collect(),
    }
}

/// Entries of a collection block, the groups read from them, and notices beside the usual one.
type GroupCase<'a> = (&'a [&'a str], Vec<StereoGroup>, &'a [&'a str]);

fn check_groups(cases: &[GroupCase<'_>]) {
    for (lines, groups, notices) in cases {
        let mut block = vec!["BEGIN COLLECTION"];
        block.extend(*lines);
        block.push("END COLLECTION");
        let record = good(&threonine(&block));
        assert_eq!(record.stereo_groups, *groups, "{lines:?}");
        let mut expected = notices.to_vec();
        if !groups.is_empty() {
            expected.push("stereo-groups");
        }
        assert_eq!(codes(&record), expected, "{lines:?}");
        assert!(record.extra.is_empty(), "{lines:?}");
        let again = good(&written(&record));
        assert_eq!(again.stereo_groups, *groups);
        assert_eq!(written(&again), written(&record));
    }
}

#[test]
fn stereo_groups_are_kept_and_told() {
    check_groups(&[
        (
            &["MDLV30/STEABS ATOMS=(2 1 2)"],
            vec![group(GroupKind::Absolute, &[1, 2])],
            &[],
        ),
        (
            &["MDLV30/STERAC1 ATOMS=(1 2)", "MDLV30/STEREL12 ATOMS=(1 1)"],
            vec![
                group(GroupKind::And(1), &[2]),
                group(GroupKind::Or(12), &[1]),
            ],
            &[],
        ),
        (
            &["mdlv30/sterac atoms=(1 1)"],
            vec![group(GroupKind::And(1), &[1])],
            &[],
        ),
        (
            &["DEFAULT -", "MDLV30/STEABS -", "ATOMS=(1 -", "2)"],
            vec![group(GroupKind::Absolute, &[2])],
            &[],
        ),
        (
            &["DEFAULT MDLV30/STEABS ATOMS=(1 2)"],
            vec![group(GroupKind::Absolute, &[2])],
            &[],
        ),
    ]);
}

#[test]
fn odd_stereo_groups_leave_a_notice() {
    check_groups(&[
        (
            &["MDLV30/STEABS ATOMS=(1 2)", "MDLV30/STEABS ATOMS=(2 1 2)"],
            vec![group(GroupKind::Absolute, &[2, 1])],
            &["stereo-group-joined"],
        ),
        (
            &["MDLV30/STERAC1 BONDS=(1 2) ATOMS=(1 2)"],
            vec![group(GroupKind::And(1), &[2])],
            &["stereo-group-keyword"],
        ),
        (
            &["MDLV30/STERAC1 BONDS=(1 2)"],
            vec![],
            &["stereo-group-keyword"],
        ),
        (&["MDLV30/STERAC1 ATOMS=(0)"], vec![], &[]),
        (&["MDLV30/STERAC1"], vec![], &[]),
        (
            &["MDLV30/STERAC1 ATOMS=(2 1 99)"],
            vec![group(GroupKind::And(1), &[1])],
            &["stereo-group-atom"],
        ),
        (
            &["MDLV30/STERAC1 ATOMS=(5 1 2)"],
            vec![group(GroupKind::And(1), &[1, 2])],
            &["stereo-group-list"],
        ),
        (
            &["MDLV30/STERAC1 ATOMS=(1 1)", "MDLV30/STERAC2 ATOMS=(1 1)"],
            vec![
                group(GroupKind::And(1), &[1]),
                group(GroupKind::And(2), &[1]),
            ],
            &["stereo-group-contradiction"],
        ),
    ]);
}

#[test]
fn other_blocks_are_kept_as_they_stand() {
    let others = [
        "LINKNODE 1 3 2 1 2 1 8",
        "BEGIN SGROUP",
        "DEFAULT CLASS=DEMO",
        "4 DAT 0 ATOMS=(1 2) FIELDNAME=batch -",
        "FIELDDATA=\"7  \"\"b\"\"\"",
        "END SGROUP",
        "BEGIN OBJ3D",
        "1 -3 1 1.5 ATOMS=(1 1)",
        "END OBJ3D",
        "BEGIN COLLECTION",
        "MDLV30/HILITE ATOMS=(1 3)",
        "QUAY/SHELF ATOMS=(1 2)",
        "END COLLECTION",
    ];
    let text = threonine(&others).replace("COUNTS 8 7 0 0", "COUNTS 8 7 1 1");
    let behind = "M  V30 BEGIN RGROUP 1\nM  V30 BEGIN CTAB\nM  V30 END CTAB\nM  V30 END RGROUP\n";
    let text = text.replace("M  END\n", &format!("{behind}M  END\n"));
    let record = good(&text);
    assert_eq!(codes(&record), [""; 0]);
    let body = |text: &str| text.lines().skip(3).collect::<Vec<_>>().join("\n");
    assert_eq!(body(&written(&record)), body(&text));
    // our own entries join the blocks that are there
    let mut more = record.clone();
    more.stereo_groups.push(StereoGroup {
        kind: GroupKind::Or(2),
        atoms: vec![AtomIx::new(1)],
    });
    let named = Atom {
        alias: Some("Boc (2) =\"x\"".into()),
        ..Atom::new(Element::C)
    };
    let edit = crate::drawing::Edit::SetAtom(AtomIx::new(7), named.clone());
    let (drawing, _) = more.drawing.apply(&[edit]).unwrap();
    let groups = more.stereo_groups.clone();
    let more = more.with_drawing_and_groups(drawing, groups);
    let lines = lines_of(&more);
    let at = |line: &str| lines.iter().position(|l| l == line).expect(line);
    assert_eq!(at("COUNTS 8 7 2 1 0"), 1);
    let label = "5 SUP 0 ATOMS=(1 8) LABEL=\"Boc (2) =\"\"x\"\"\"";
    assert_eq!(at(label), at("BEGIN SGROUP") + 1);
    assert_eq!(at("MDLV30/STEREL2 ATOMS=(1 2)"), at("BEGIN COLLECTION") + 1);
    let again = good(&written(&more));
    assert_eq!(again.extra, record.extra);
    assert_eq!(again.drawing.molecule().atom(AtomIx::new(7)), &named);
    assert_eq!(codes(&again), ["stereo-groups", "alias"]);
}

#[test]
fn long_entries_are_broken_before_column_80() {
    let atoms: Vec<String> = (1..=400).map(|i| format!("{i} C {i} 0 0 0")).collect();
    let atoms: Vec<&str> = atoms.iter().map(String::as_str).collect();
    let mut record = good(&table(&atoms, &[], &[]));
    record.stereo_groups.push(StereoGroup {
        kind: GroupKind::And(1),
        atoms: record.drawing.molecule().atoms().collect(),
    });
    let lines = lines_of(&record);
    let broken = lines.iter().filter(|l| l.ends_with(" -")).count();
    assert!(broken > 15, "{broken}");
    assert_eq!(good(&written(&record)).stereo_groups, record.stereo_groups);
    // words without blanks are broken anywhere
    let long = "é-".repeat(150);
    let named = Atom {
        alias: Some(long.as_str().into()),
        ..Atom::new(Element::C)
    };
    let edit = crate::drawing::Edit::SetAtom(AtomIx::new(0), named);
    let record = Record {
        version: Version::V3000,
        ..Record::new("", record.drawing.apply(&[edit]).unwrap().0)
    };
    lines_of(&record);
    let again = good(&written(&record));
    let alias = again.drawing.molecule().atom(AtomIx::new(0)).alias.clone();
    assert_eq!(alias.as_deref(), Some(long.as_str()));
}

#[test]
fn sd_files_hold_both_versions() {
    let group = [
        "BEGIN COLLECTION",
        "MDLV30/STEREL1 ATOMS=(2 1 2)",
        "END COLLECTION",
    ];
    let text = format!(
        "{}> <A>\n1\n\n$$$$\n{}> <A>\n2\n\n$$$$\n",
        threonine(&group),
        alanine()
    );
    let list: Vec<Record> = sdf::records(&text).map(|r| r.read().unwrap()).collect();
    let versions: Vec<Version> = list.iter().map(|r| r.version).collect();
    assert_eq!(versions, [Version::V3000, Version::V2000]);
    assert_eq!(list[0].stereo_groups.len(), 1);
    for (record, value) in list.iter().zip(["1", "2"]) {
        assert_eq!(record.field("A"), Some(value));
        let once = sdf::write(record, &WriteOptions::default()).unwrap();
        let again = sdf::records(&once).next().unwrap().read().unwrap();
        assert_eq!(again.field("A"), Some(value));
        assert_eq!(again.stereo_groups, record.stereo_groups);
        assert_eq!(
            sdf::write(&again, &WriteOptions::default()),
            Ok::<_, WriteError>(once)
        );
    }
}
