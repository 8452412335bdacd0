//! Molfiles written.

use super::*;
use crate::drawing::{Drawing, Edit};
use crate::format::WriteError;
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

#[test]
fn what_does_not_fit_is_not_written() {
    let atom = |at| Edit::AddAtom(Atom::new(Element::C), at);
    let many: Vec<Edit> = (0..1000)
        .map(|i| atom(Point::new(f64::from(i), 0.0)))
        .collect();
    let (drawing, _) = Drawing::empty().apply(&many).unwrap();
    let error = write(&Record::new("", drawing), &WriteOptions::default()).unwrap_err();
    assert_eq!(
        error,
        WriteError::NeedsV3000 {
            atoms: 1000,
            bonds: 0
        }
    );
    let (far, _) = Drawing::empty()
        .apply(&[atom(Point::new(1e6, 0.0))])
        .unwrap();
    let error = write(&Record::new("", far), &WriteOptions::default()).unwrap_err();
    assert_eq!(error, WriteError::TooFar(1));
}
