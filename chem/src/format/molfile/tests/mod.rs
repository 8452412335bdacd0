//! Molfiles read: hand-made records and what is made of them.

use super::super::{ReadError, Record, WriteOptions, sdf};
use super::*;
use crate::drawing::{End, Mark};
use crate::element::Element;
use crate::geom::Point;
use crate::molecule::{AtomIx, BondIx, Order, Radical};

mod aromatic;
mod chance;
mod damage;
mod v3000;
mod v3000_damage;
mod v3000_round;
mod writing;

/// A molfile of atoms at given places, with bond lines and properties as given.
fn mol(atoms: &[(&str, f64, f64)], bonds: &[&str], properties: &str) -> String {
    let mut text = format!(
        "N-17 batch 4\n  test    01020304052D\ncomment\n{:3}{:3}  0  0  0  0  0  0  0  0999 V2000\n",
        atoms.len(),
        bonds.len()
    );
    for (symbol, x, y) in atoms {
        text += &format!("{x:10.4}{y:10.4}{:10.4} {symbol:3} 0  0  0  0  0\n", 0.0);
    }
    for bond in bonds {
        text += &format!("{bond}\n");
    }
    text + properties + "M  END\n"
}

const ALANINE: [(&str, f64, f64); 6] = [
    ("C", 0.0, 0.0),
    ("C", 1.299, 0.75),
    ("N", 1.299, 2.25),
    ("C", 2.598, 0.0),
    ("O", 2.598, -1.5),
    ("O", 3.897, 0.75),
];
const ALANINE_BONDS: [&str; 5] = [
    "  1  2  1  0",
    "  2  3  1  1",
    "  2  4  1  0",
    "  4  5  2  0",
    "  4  6  1  0",
];

fn alanine() -> String {
    mol(&ALANINE, &ALANINE_BONDS, "")
}

fn good(text: &str) -> Record {
    read(text, 1).unwrap_or_else(|e| panic!("{e}\n{text}"))
}

fn codes(record: &Record) -> Vec<&'static str> {
    record.notices.iter().map(|n| n.code).collect()
}

fn bad(text: &str) -> ReadError {
    read(text, 1).expect_err(text)
}

fn written(record: &Record) -> String {
    write(record, &WriteOptions::default()).unwrap()
}

fn ring(symbols: &[&str], close: &str) -> (Vec<(String, f64, f64)>, Vec<String>) {
    let n = symbols.len();
    let atoms = symbols.iter().enumerate().map(|(i, s)| {
        let a = std::f64::consts::TAU * i as f64 / n as f64;
        ((*s).to_owned(), 2.0 * a.cos(), 2.0 * a.sin())
    });
    let bonds = (0..n).map(|i| format!("{:3}{:3}{close}", i + 1, (i + 1) % n + 1));
    (atoms.collect(), bonds.collect())
}

fn ring_mol(symbols: &[&str], close: &str, properties: &str) -> String {
    let (atoms, bonds) = ring(symbols, close);
    let atoms: Vec<_> = atoms.iter().map(|a| (a.0.as_str(), a.1, a.2)).collect();
    let bonds: Vec<_> = bonds.iter().map(String::as_str).collect();
    mol(&atoms, &bonds, properties)
}

#[test]
fn a_plain_record() {
    let record = good(&alanine());
    assert_eq!(record.title, "N-17 batch 4");
    assert_eq!(record.comment, "comment");
    assert!(record.notices.is_empty() && !record.chiral_flag);
    let m = record.drawing.molecule();
    assert_eq!((m.n_atoms(), m.n_bonds()), (6, 5));
    assert_eq!(record.drawing.mark(BondIx::new(1)), Mark::Solid(End::First));
    assert_eq!(m.bond(BondIx::new(3)).order, Order::Double);
    assert_eq!(
        record.drawing.point(AtomIx::new(5)),
        Point::new(3.897, 0.75)
    );
    let hydrogens: Vec<u8> = m.atoms().map(|a| m.hydrogens(a)).collect();
    assert_eq!(hydrogens, [3, 1, 2, 0, 0, 1]);
}

#[test]
fn line_ends_and_marks_of_order_change_nothing() {
    let plain = written(&good(&alanine()));
    let mixed: String = alanine()
        .lines()
        .enumerate()
        .map(|(i, l)| format!("{l}{}", ["\n", "\r\n", "\r"][i % 3]))
        .collect();
    for text in [
        alanine().replace('\n', "\r\n"),
        alanine().replace('\n', "\r"),
        mixed,
        format!("\u{feff}{}", alanine()),
        alanine().replace("M  END", "\n  \nM  END"),
        alanine().replace("M  END", "M  END   "),
        alanine().replace("  1  2  1  0\n", "  1  2  1  0  0  0  0          \n"),
        alanine().replace(" C   0  0  0  0  0\n", " C\n"),
        alanine().replace("0999 V2000", ""),
    ] {
        let record = good(&text);
        assert_eq!(codes(&record), [""; 0], "{text}");
        assert_eq!(written(&record), plain, "{text}");
    }
}

#[test]
fn capitals_and_odd_symbols() {
    let with = |symbol: &str| mol(&[("C", 0.0, 0.0), (symbol, 1.5, 0.0)], &["  1  2  1"], "");
    let second = |record: &Record| record.drawing.molecule().atom(AtomIx::new(1)).clone();
    let chlorine = good(&with("CL"));
    assert_eq!(second(&chlorine).element, Element::CL);
    assert_eq!(codes(&chlorine), ["capitals"]);
    let deuterium = good(&with("D"));
    assert_eq!(
        (second(&deuterium).element, second(&deuterium).isotope),
        (Element::H, Some(2))
    );
    assert!(written(&deuterium).contains("M  ISO  1   2   2\n"));
    assert!(codes(&deuterium).is_empty());
    for symbol in ["R#", "R", "*", "A", "Q", "X", "L", "LP"] {
        let record = good(&with(symbol));
        assert_eq!(second(&record).element, Element::ANY);
        assert_eq!(second(&record).alias.as_deref(), Some(symbol));
        assert_eq!(codes(&record), ["placeholder"]);
        assert_eq!(written(&good(&written(&record))), written(&record));
    }
    for symbol in ["cl", "Me", "Ph", "Xx", "NH"] {
        let error = bad(&with(symbol));
        assert_eq!(
            (error.line, error.columns.map(|c| c.0)),
            (6, Some(32)),
            "{symbol}"
        );
        assert!(matches!(error.reason, Reason::UnknownElement { .. }));
    }
    assert!(bad(&with("cl")).to_string().contains("Write Cl"));
}

#[test]
fn rests_and_aliases() {
    let two = [("C", 0.0, 0.0), ("R#", 1.5, 0.0)];
    let record = good(&mol(&two, &["  1  2  1"], "M  RGP  1   2   7\n"));
    let alias = |r: &Record, i| r.drawing.molecule().atom(AtomIx::new(i)).alias.clone();
    assert_eq!(alias(&record, 1).as_deref(), Some("R7"));
    assert!(record.extra.is_empty() && written(&record).contains("M  RGP  1   2   7\n"));
    let named = good(&mol(&two, &["  1  2  1"], "A    1\nCF3\nA    2\n> Boc\n"));
    assert_eq!(alias(&named, 0).as_deref(), Some("CF3"));
    assert_eq!(alias(&named, 1).as_deref(), Some("> Boc"));
    assert_eq!(codes(&named), ["alias", "placeholder"]);
    let again = sdf::records(&written(&named))
        .next()
        .unwrap()
        .read()
        .unwrap();
    assert_eq!(written(&again), written(&named));
    assert_eq!(alias(&again, 1).as_deref(), Some("> Boc"));
}

#[test]
fn charges_radicals_and_isotopes() {
    let line = |code: &str, rest: &str| {
        mol(&[("N", 0.0, 0.0), ("C", 1.5, 0.0)], &["  1  2  1"], rest)
            .replace(" N   0  0", &format!(" N  {code}"))
    };
    let first = |text: &str| good(text).drawing.molecule().atom(AtomIx::new(0)).clone();
    for (code, charge) in [("  0  1", 3), ("  0  3", 1), ("  0  5", -1), ("  0  7", -3)] {
        let text = line(code.trim_start_matches(' '), "").replace(" N  0", " N   0");
        assert_eq!(first(&text).charge, charge, "{text}");
    }
    assert_eq!(first(&line(" 0  4", "")).radical, Radical::Doublet);
    assert_eq!(first(&line(" 1  0", "")).isotope, Some(15));
    // any charge or radical line voids both in the atom block; one of isotopes the masses
    assert_eq!(first(&line(" 0  3", "M  RAD  1   2   2\n")).charge, 0);
    assert_eq!(
        first(&line(" 0  4", "M  CHG  1   2  -1\n")).radical,
        Radical::None
    );
    assert_eq!(first(&line(" 1  3", "M  ISO  1   2  13\n")).isotope, None);
    assert_eq!(first(&line(" 1  3", "M  ISO  1   2  13\n")).charge, 1);
    let loose = first(&line(" 0  0", "M  CHG 1 1 1\n"));
    assert_eq!(loose.charge, 1);
    let error = bad(&line(" 0  0", "M  CHG  1   9   1\n"));
    assert_eq!((error.line, error.columns), (8, Some((10, 13))));
    assert!(matches!(
        bad(&line(" 0  9", "")).reason,
        Reason::OutOfRange { value: 9, .. }
    ));
    assert!(matches!(
        bad(&line(" 0  0", "M  CHG  1   1  99\n")).reason,
        Reason::OutOfRange { .. }
    ));
    assert!(matches!(
        bad(&line(" 0  0", "M  CHG  2   1   1\n")).reason,
        Reason::Number { .. }
    ));
}

#[test]
fn numbers_that_touch_are_read_by_column() {
    let near = alanine().replace(
        "    1.2990    0.7500    0.0000",
        " 1001.2990-1000.7500    0.0000",
    );
    let p = good(&near).drawing.point(AtomIx::new(1));
    assert_eq!(p, Point::new(1001.299, -1000.75));
    // 120 atoms: bonds 100-101 touch
    let atoms: Vec<_> = (0..120).map(|i| ("C", f64::from(i), 0.0)).collect();
    let bonds: Vec<String> = (1..120)
        .map(|i| format!("{i:3}{:3}  1  0", i + 1))
        .collect();
    let bonds: Vec<&str> = bonds.iter().map(String::as_str).collect();
    let record = good(&mol(&atoms, &bonds, ""));
    assert!(codes(&record).is_empty());
    assert_eq!(written(&good(&written(&record))), written(&record));
}

#[test]
fn special_bonds_are_kept() {
    for (kind, code) in [
        (8, "query-bond"),
        (9, "dative-bond"),
        (10, "hydrogen-bond"),
        (0, "unstated-bond"),
    ] {
        let bond = format!("  1  2{kind:3}  0");
        let record = good(&mol(&[("C", 0.0, 0.0), ("N", 1.5, 0.0)], &[&bond], ""));
        assert_eq!(codes(&record), [code]);
        assert!(written(&record).contains(&format!("\n{bond}")));
    }
    for (stereo, mark) in [
        (1, Mark::Solid(End::First)),
        (6, Mark::Hashed(End::First)),
        (4, Mark::Wavy(End::First)),
    ] {
        let bond = format!("  2  1  1{stereo:3}");
        let record = good(&mol(&[("C", 0.0, 0.0), ("N", 1.5, 0.0)], &[&bond], ""));
        assert_eq!(record.drawing.mark(BondIx::new(0)), mark);
    }
}

#[test]
fn other_property_lines_survive() {
    let lines = "M  STY  1   1 DAT\nM  SAL   1  1   2\nM  SDT   1 BATCH\nV    2 note\nS  SKP  1\nanything\n";
    let record = good(&mol(&ALANINE, &ALANINE_BONDS, lines));
    assert_eq!(record.extra.join("\n") + "\n", lines);
    assert!(written(&record).ends_with(&format!("{lines}M  END\n")));
    assert!(codes(&record).is_empty());
}

#[test]
fn valence_and_map_columns_stay() {
    let text = alanine().replace(
        "    1.2990    2.2500    0.0000 N   0  0  0  0  0\n",
        "    1.2990    2.2500    0.0000 N   0  0  0  0  0 15  0  0  0  7  0  0\n",
    );
    let record = good(&text);
    let atom = record.drawing.molecule().atom(AtomIx::new(2)).clone();
    assert_eq!((atom.valence, atom.map), (Some(0), 7));
    assert!(written(&record).contains(" N   0  0  0  0  0 15  0  0  0  7  0  0\n"));
}
