//! Molfiles written.

use super::*;
use crate::drawing::{Drawing, Edit};
use crate::format::{GroupKind, WriteError};
use crate::molecule::Atom;

#[test]
fn the_writer_puts_narrow_ends_first() {
    let record = good(&alanine());
    let turned = Edit::Mark(BondIx::new(2), Mark::Hashed(End::Second));
    let (drawing, _) = record.drawing.apply(&[turned]).unwrap();
    let text = written(&record.with_drawing(drawing));
    assert!(text.contains("\n  4  2  1  6  0  0  0\n"), "{text}");
    let again = good(&text);
    assert_eq!(again.drawing.mark(BondIx::new(2)), Mark::Hashed(End::First));
    assert_eq!(written(&again), text);
}

#[test]
fn the_header_names_program_and_date() {
    let mut record = good(&alanine());
    record.chiral_flag = true;
    let options = WriteOptions {
        date: Some("0203261530".to_owned()),
    };
    let text = write(&record, &options).unwrap();
    let mut lines = text.lines().skip(1);
    assert_eq!(lines.next(), Some("  Wedgewrt02032615302D"));
    assert_eq!(
        lines.nth(1),
        Some("  6  5  0  0  1  0  0  0  0  0999 V2000")
    );
    assert!(good(&text).chiral_flag);
}

fn carbon(at: Point) -> Edit {
    Edit::AddAtom(Atom::new(Element::C), at)
}

#[test]
fn what_does_not_fit_is_not_written() {
    let (far, _) = Drawing::empty()
        .apply(&[carbon(Point::new(1e6, 0.0))])
        .unwrap();
    for version in [Version::V2000, Version::V3000] {
        let mut record = Record::new("", far.clone());
        record.version = version;
        let error = write(&record, &WriteOptions::default()).unwrap_err();
        assert_eq!(error, WriteError::TooFar(1));
    }
}

#[test]
fn the_version_is_the_one_that_has_room() {
    let drawing = |n: u32| {
        let many: Vec<Edit> = (0..n)
            .map(|i| carbon(Point::new(f64::from(i), 0.0)))
            .collect();
        Drawing::empty().apply(&many).unwrap().0
    };
    let is_v3000 = |record: &Record| written(record).contains(" V3000\n");
    let record = |n| Record::new("", drawing(n));
    assert!(!is_v3000(&record(999)));
    let large = record(1000);
    assert!(is_v3000(&large));
    let again = good(&written(&large));
    assert_eq!(again.drawing.points(), large.drawing.points());
    // a record stays in the version it came in
    let mut small = record(2);
    small.version = Version::V3000;
    assert!(is_v3000(&small));
    // no version has room for stereo groups beside lines of V2000
    let mut both = record(2);
    both.extra.push("M  STY  1   1 DAT".to_owned());
    both.stereo_groups.push(StereoGroup {
        kind: GroupKind::And(1),
        atoms: vec![AtomIx::new(1)],
    });
    let error = write(&both, &WriteOptions::default()).unwrap_err();
    assert_eq!(error, WriteError::ExtraLines);
    both.extra.clear();
    assert!(written(&both).contains("\nM  V30 MDLV30/STERAC1 ATOMS=(1 2)\n"));
}
