//! The table of damage in V3000 molfiles: repaired with a notice, or refused with its place.

use super::v3000::{THREONINE, THREONINE_BONDS, table, threonine};
use super::*;

fn changed(from: &str, to: &str) -> String {
    let text = threonine(&[]);
    assert!(text.contains(from), "{from}");
    text.replacen(from, to, 1)
}

/// Rows of damage that are repaired: what is changed, and the notice it leaves.
#[test]
fn repairs_of_v3000_leave_a_notice() {
    let plain = written(&good(&threonine(&[])));
    let cases: [(&str, String, &[&str]); 14] = [
        ("no end", changed("M  END\n", ""), &["no-end-line"]),
        ("short end", changed("M  END", "M END"), &["end-line"]),
        (
            "no end of table",
            changed("M  V30 END CTAB\n", ""),
            &["block-end"],
        ),
        (
            "ends with the bonds",
            changed("M  V30 END BOND\nM  V30 END CTAB\nM  END\n", ""),
            &["no-end-line"],
        ),
        (
            "no end of atoms",
            changed("M  V30 END ATOM\n", ""),
            &["block-end"],
        ),
        (
            "an end too many",
            changed("END CTAB", "END THING\nM  V30 END CTAB"),
            &["block-end"],
        ),
        (
            "numbers in the first counts",
            changed("  0  0  0     0  0", "  8  7  0     0  0"),
            &["first-counts"],
        ),
        ("the other version", changed("V3000", "V2000"), &["version"]),
        (
            "no version",
            changed("            999 V3000", ""),
            &["version"],
        ),
        ("no name line", changed("N-17 batch 4\n", ""), &["header"]),
        (
            "S-groups that are not there",
            changed("COUNTS 8 7 0", "COUNTS 8 7 2"),
            &["sgroup-count"],
        ),
        (
            "registry number",
            changed("COUNTS 8 7 0 0 0", "COUNTS 8 7 0 0 0 REGNO=5"),
            &["keyword-left-out"],
        ),
        (
            "a line of notes",
            changed("M  V30 END CTAB", "note\nM  V30 END CTAB"),
            &["stray-line"],
        ),
        (
            "a '-' too many",
            changed("M  V30 END CTAB\nM", "M  V30 END CTAB -\nM"),
            &["continuation"],
        ),
    ];
    for (name, text, expected) in cases {
        let record = good(&text);
        assert_eq!(codes(&record), expected, "{name}");
        let body = |t: &str| t.lines().skip(3).collect::<Vec<_>>().join("\n");
        assert_eq!(body(&written(&record)), body(&plain), "{name}");
    }
}

#[test]
fn what_stands_in_a_block_that_nobody_closes_is_kept() {
    let open = ["BEGIN SGROUP", "1 DAT 0 ATOMS=(1 2) FIELDNAME=a"];
    let record = good(&threonine(&open));
    assert_eq!(codes(&record), ["block-end", "sgroup-count"]);
    assert_eq!(record.extra.len(), 3);
    assert_eq!(codes(&good(&written(&record))), [""; 0]);
    let nested = [
        "BEGIN SGROUP",
        "1 GEN 0 -",
        "BEGIN COLLECTION",
        "MDLV30/STEABS ATOMS=(1 1)",
    ];
    assert!(good(&threonine(&nested)).stereo_groups.is_empty());
    let two = [
        "BEGIN SGROUP",
        "1 GEN 0",
        "BEGIN COLLECTION",
        "MDLV30/STEABS ATOMS=(1 1)",
    ];
    assert_eq!(good(&threonine(&two)).stereo_groups.len(), 1);
}

/// Where a text is refused, and why.
fn refused(text: &str, line: usize, columns: Option<(usize, usize)>, reason: &Reason) {
    let error = bad(text);
    assert_eq!(
        (error.line, error.columns, &error.reason),
        (line, columns, reason),
        "{text}"
    );
}

#[test]
fn wrong_counts_of_v3000_tell_both_numbers() {
    for (from, to, said, found) in [
        ("COUNTS 8 7", "COUNTS 9 7", (9, 7), (8, 7)),
        ("COUNTS 8 7", "COUNTS 7 7", (7, 7), (8, 7)),
        ("COUNTS 8 7", "COUNTS 8 6", (8, 6), (8, 7)),
        ("M  V30 8 C 0.0000 -1.5000 0 0\n", "", (8, 7), (7, 7)),
        ("M  V30 7 1 1 8\n", "", (8, 7), (8, 6)),
    ] {
        let said = Some(said);
        let reason = Reason::CountsEntry { said, found };
        refused(&changed(from, to), 6, Some((8, 17)), &reason);
    }
    let shown = bad(&changed("COUNTS 8 7", "COUNTS 8 6")).to_string();
    assert!(
        shown.contains("8 atoms and 6 bonds") && shown.contains("COUNTS 8 7 0 0 0"),
        "{shown}"
    );
    let none = Reason::CountsEntry {
        said: None,
        found: (8, 7),
    };
    refused(&changed("M  V30 COUNTS 8 7 0 0 0\n", ""), 6, None, &none);
    let number = |text: &str, field| Reason::Number {
        field,
        text: text.to_owned(),
    };
    let reason = number("x", "the number of bonds");
    refused(
        &changed("COUNTS 8 7", "COUNTS 8 x"),
        6,
        Some((17, 17)),
        &reason,
    );
    let reason = number("", "the number of bonds");
    refused(
        &changed("COUNTS 8 7 0 0 0", "COUNTS 8"),
        6,
        Some((16, 16)),
        &reason,
    );
}

#[test]
fn a_table_that_breaks_off_is_refused() {
    let whole = threonine(&[]);
    let to = |part: &str| whole[..whole.find(part).unwrap()].to_owned();
    let early = Reason::EndsEarly;
    refused(&to("M  V30 4 C"), 11, None, &early("its last atom"));
    refused(&to("M  V30 END ATOM"), 16, None, &early("its last bond"));
    refused(&to("M  V30 4 2"), 21, None, &early("its last bond"));
    refused(
        &(to("M  V30 4 2") + "M  END\n"),
        22,
        None,
        &early("its last bond"),
    );
    refused(&to("M  V30 BEGIN CTAB"), 4, None, &Reason::NotV3000);
    // every cut behind the header is refused or keeps all atoms and bonds
    let start = whole.find("M  V30").unwrap();
    for (at, _) in whole.char_indices().skip_while(|(at, _)| *at < start) {
        if let Ok(record) = read(&whole[..at], 1) {
            let m = record.drawing.molecule();
            assert_eq!((m.n_atoms(), m.n_bonds()), (8, 7), "{at}");
        }
    }
}

fn number(field: &'static str, text: &str) -> Reason {
    let text = text.to_owned();
    Reason::Number { field, text }
}

fn range(field: &'static str, value: i64, allowed: &'static str) -> Reason {
    Reason::OutOfRange {
        field,
        value,
        allowed,
    }
}

fn keyword(found: &str) -> Reason {
    Reason::Misplaced {
        found: found.to_owned(),
        expected: "a keyword with its value (CHG=1)",
    }
}

#[test]
fn bad_atoms_of_v3000_are_refused_at_their_columns() {
    let atom = |to: &str, columns, reason: &Reason| {
        let text = changed("5 O 2.5980 -1.5000 0 0", to);
        refused(&text, 12, Some(columns), reason);
    };
    atom(
        "5 O 2.598 -1.5o 0 0",
        (18, 22),
        &number("the y of the atom", "-1.5o"),
    );
    atom("5 O 2.598 -1.5", (22, 22), &number("the z of the atom", ""));
    atom(
        "5 O 2.598 nan 0 0",
        (18, 20),
        &number("the y of the atom", "nan"),
    );
    atom(
        "x O 2.598 1 0 0",
        (8, 8),
        &number("the index of the atom", "x"),
    );
    atom(
        "-5 O 2 1 0 0",
        (8, 9),
        &range("the index of the atom", -5, "1 and up"),
    );
    atom(
        "5 O 2 1 0 0 CHG=99",
        (24, 25),
        &range("a charge", 99, "-15 to 15"),
    );
    atom("5 O 2 1 0 0 CHG=x", (24, 24), &number("a charge", "x"));
    atom(
        "5 O 2 1 0 0 RAD=4",
        (24, 24),
        &range("a radical", 4, "0 to 3"),
    );
    atom(
        "5 O 2 1 0 0 VAL=15",
        (24, 25),
        &range("the valence of the atom", 15, "-1 to 14"),
    );
    atom(
        "5 O 2 1 0 0 MASS=1000",
        (25, 28),
        &range("a mass number", 1000, "0 to 999"),
    );
    atom("5 O 2 1 0 0 CHG", (20, 22), &keyword("CHG"));
    let unknown = |symbol: &str, perhaps| Reason::UnknownElement {
        symbol: symbol.to_owned(),
        perhaps,
    };
    atom("5 cl 2 1 0 0", (10, 11), &unknown("cl", Some("Cl")));
    atom("5 Me 2 1 0 0", (10, 11), &unknown("Me", None));
    let twice = Reason::IndexTwice { index: 7, first: 9 };
    let text = changed("2 C 1.2990 0.7500", "7 C 1.2990 0.7500");
    refused(&text, 14, Some((8, 8)), &twice);
}

#[test]
fn bad_bonds_of_v3000_are_refused_at_their_columns() {
    let bond = |to: &str, columns, reason: &Reason| {
        refused(&changed("5 1 4 6", to), 22, columns, reason);
    };
    let atoms = 8;
    bond(
        "5 1 4 16",
        Some((14, 15)),
        &Reason::NoSuchAtom { number: 16, atoms },
    );
    bond(
        "5 1 0 6",
        Some((12, 12)),
        &Reason::NoSuchAtom { number: 0, atoms },
    );
    bond("5 1 4 4", Some((12, 14)), &Reason::Loop(4));
    bond(
        "5 11 4 6",
        Some((10, 11)),
        &range("the type of the bond", 11, "0 to 10"),
    );
    bond(
        "5 1 4",
        Some((13, 13)),
        &number("the second atom of the bond", ""),
    );
    // codes of V2000
    let cfg = "0 (plain), 1 (up), 2 (either) or 3 (down)";
    for code in [4, 6] {
        let text = format!("5 1 4 6 CFG={code}");
        bond(
            &text,
            Some((20, 20)),
            &range("the CFG of the bond", code, cfg),
        );
    }
    bond("5 1 4 6 1", Some((16, 16)), &keyword("1"));
    let twice = Reason::Twice {
        atoms: (2, 4),
        first: 20,
    };
    bond("5 1 4 2", None, &twice);
    let far = table(&["7 C 0 0 0 0", "9 C 1 0 0 0"], &["1 1 7 8"], &[]);
    refused(&far, 12, Some((14, 14)), &Reason::NoSuchIndex(8));
}

#[test]
fn lines_out_of_place_are_refused() {
    refused(&changed("M  V30 4 C", "4 C"), 11, None, &Reason::NoPrefix);
    let misplaced = |found: &str, expected| Reason::Misplaced {
        found: found.to_owned(),
        expected,
    };
    let text = changed("M  V30 BEGIN ATOM\n", "");
    refused(
        &text,
        7,
        Some((8, 28)),
        &misplaced("1 C", "the beginning of a block"),
    );
    let text = changed(
        "0  0            999 V3000",
        "\nM  V30 0  0            999 V3000",
    );
    assert!(matches!(bad(&text).reason, Reason::Misplaced { .. }));
    let hidden = alanine().replace("M  END", "M  V30 BEGIN CTAB\nM  END");
    let reason = misplaced("M  V30", "a property line of V2000 or M  END");
    refused(&hidden, 16, Some((1, 6)), &reason);
    let text = changed("M  V30 BEGIN CTAB\n", "");
    refused(
        &text,
        5,
        Some((8, 23)),
        &misplaced("COUNTS 8", "BEGIN CTAB"),
    );
}

/// The slip that a real file shows: the index before, where the next one should stand.
#[test]
fn an_index_twice_is_a_slip_where_nothing_else_can_be_meant() {
    let last = &["1 C 0 0 0 0", "2 C 1.5 0 0 0", "2 O 9 0 0 0"];
    let bonds = &["1 1 1 2"];
    let record = good(&table(last, bonds, &[]));
    assert_eq!(codes(&record), ["index-twice"]);
    let ends = record.drawing.molecule().bond(BondIx::new(0)).ends;
    assert_eq!(ends.map(AtomIx::index), [0, 1]);
    // elsewhere it is open which of the two is meant
    for atoms in [
        ["10 C 0 0 0 0", "20 C 1.5 0 0 0", "20 O 9 0 0 0"],
        ["1 C 0 0 0 0", "1 C 1.5 0 0 0", "2 O 9 0 0 0"],
    ] {
        let error = bad(&table(&atoms, bonds, &[]));
        assert!(matches!(error.reason, Reason::IndexTwice { .. }));
    }
}

#[test]
fn notices_of_atoms_name_their_own_lines() {
    let mut atoms = THREONINE;
    atoms[6] = "7 O -1.2990 -\nM  V30 0.7500 0 0";
    atoms[7] = "8 F 0.0000 -1.5000 0 0 VAL=3";
    let text = table(&atoms, &THREONINE_BONDS, &[]);
    let record = good(&text);
    assert_eq!(record.notices.len(), 1);
    assert_eq!(
        (record.notices[0].line, record.notices[0].code),
        (16, "valence")
    );
}
