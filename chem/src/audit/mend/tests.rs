//! Mends do what they promise: what is mended is gone, what must stay stays, and a chain of them ends.

use super::super::{Finding, Grade, audit, findings};
use super::mend;
use crate::drawing::tests::draw;
use crate::drawing::{Drawing, Mark};
use crate::molecule::{AtomIx, BondIx};
use crate::pipeline;
use crate::solve::require::Requirement;
use crate::stereo::Descriptor;

/// Butan-2-ol's centre with a nitrogen in place of the methyl group, ligands as given.
fn centre(directions: [f64; 3], marks: [char; 3]) -> Drawing {
    let mut atoms = vec![("C", 0.0, 0.0)];
    let mut bonds = Vec::new();
    for (i, symbol) in ["N", "O", "C"].into_iter().enumerate() {
        let (y, x) = directions[i].to_radians().sin_cos();
        atoms.push((symbol, x, y));
        bonds.push((0, i + 1, 1, marks[i]));
    }
    draw(&atoms, &bonds)
}

fn asked(atom: usize, d: Descriptor) -> Requirement {
    Requirement {
        text: String::new(),
        wanted: vec![(AtomIx::new(atom), d)],
    }
}

fn loud(drawing: &Drawing, requirement: &Requirement) -> Vec<Finding> {
    findings(drawing, requirement)
        .into_iter()
        .filter(|f| f.grade != Grade::Open)
        .collect()
}

fn labels(drawing: &Drawing) -> String {
    pipeline::carried(drawing).labels
}

#[test]
fn a_squeezed_mark_gets_a_hydrogen_or_room() {
    let drawing = centre([90.0, 35.0, 145.0], ['w', ' ', ' ']);
    let mended = mend(&drawing, &Requirement::default());
    assert_eq!(labels(&mended.drawing), labels(&drawing));
    assert!(loud(&mended.drawing, &Requirement::default()).is_empty());
    assert_eq!(mended.steps.len(), 1);
    assert!(mended.steps[0].keeps_meaning && !mended.steps[0].after.is_empty());
}

#[test]
fn surplus_marks_go_and_atoms_stay() {
    let drawing = centre([90.0, 210.0, 330.0], ['w', 'w', ' ']);
    let mended = mend(&drawing, &Requirement::default());
    assert_eq!(labels(&mended.drawing), labels(&drawing));
    let marks = mended.drawing.marks().iter().filter(|m| **m != Mark::Plain);
    assert_eq!(marks.count(), 1);
    assert_eq!(mended.drawing.points(), drawing.points());
}

#[test]
fn the_requirement_decides_between_possibilities() {
    for marks in [
        [' ', ' ', ' '],
        ['w', 'h', ' '],
        ['w', ' ', ' '],
        ['~', ' ', ' '],
    ] {
        for d in [Descriptor::R, Descriptor::S] {
            let drawing = centre([90.0, 210.0, 330.0], marks);
            let mended = mend(&drawing, &asked(0, d));
            assert_eq!(labels(&mended.drawing), format!("1{d}"), "{marks:?}");
            assert!(mended.left.is_empty(), "{:?}", mended.left);
            // marks alone are enough here
            assert_eq!(mended.drawing.points(), drawing.points());
        }
    }
}

#[test]
fn without_requirement_a_contradiction_is_left_for_a_person() {
    let drawing = centre([90.0, 210.0, 330.0], ['w', 'h', ' ']);
    let mended = mend(&drawing, &Requirement::default());
    assert!(mended.steps.is_empty());
    let found = audit(&drawing, &Requirement::default());
    assert_eq!(found.len(), 1);
    let mends = &found[0].mends;
    assert_eq!(mends.len(), 2, "{mends:?}");
    let carried: Vec<String> = mends
        .iter()
        .map(|m| labels(&drawing.apply(&m.edits).unwrap().0))
        .collect();
    assert!(carried.contains(&"1R".to_owned()) && carried.contains(&"1S".to_owned()));
    assert!(mends.iter().all(|m| !m.keeps_meaning));
}

#[test]
fn a_wedge_with_its_wide_end_at_the_centre_is_turned_round() {
    let drawing = draw(
        &[
            ("C", 0.0, 0.0),
            ("N", 0.0, 1.0),
            ("O", -0.87, -0.5),
            ("C", 0.87, -0.5),
        ],
        &[(0, 1, 1, ' '), (0, 2, 1, ' '), (3, 0, 1, 'w')],
    );
    let mended = mend(&drawing, &asked(0, Descriptor::R));
    assert_eq!(labels(&mended.drawing), "1R");
    let narrow = mended.drawing.mark_from(AtomIx::new(0), BondIx::new(2));
    assert_ne!(narrow, Mark::Plain);
    assert!(mended.left.is_empty());
}

#[test]
fn a_crossed_double_bond_becomes_a_wavy_one_or_takes_its_geometry() {
    let drawing = draw(
        &[
            ("C", -0.5, 0.87),
            ("C", 0.0, 0.0),
            ("C", 1.0, 0.0),
            ("N", 1.5, -0.87),
        ],
        &[(0, 1, 1, ' '), (1, 2, 2, 'x'), (2, 3, 1, ' ')],
    );
    let mended = mend(&drawing, &Requirement::default());
    let wavy = mended
        .drawing
        .marks()
        .iter()
        .filter(|m| matches!(m, Mark::Wavy(_)));
    assert_eq!(wavy.count(), 1);
    assert_eq!(labels(&mended.drawing), "");
    for (d, label) in [(Descriptor::E, "2E 3E"), (Descriptor::Z, "2Z 3Z")] {
        assert_eq!(labels(&mend(&drawing, &asked(1, d)).drawing), label);
    }
}

#[test]
fn several_findings_are_mended_one_after_the_other() {
    // two centres: the mark of one on the bond between them, three marks at the other
    let drawing = draw(
        &[
            ("C", 0.0, 0.0),
            ("N", 0.0, 1.0),
            ("C", -0.87, -0.5),
            ("C", 0.87, -0.5),
            ("O", 0.87, -1.5),
            ("C", 1.73, 0.0),
            ("C", -1.73, 0.0),
        ],
        &[
            (0, 1, 1, ' '),
            (0, 2, 1, ' '),
            (0, 3, 1, 'h'),
            (3, 4, 1, 'w'),
            (3, 5, 1, 'w'),
            (2, 6, 1, 'w'),
        ],
    );
    let none = Requirement::default();
    let before = loud(&drawing, &none);
    assert!(before.len() >= 3, "{before:?}");
    let mended = mend(&drawing, &none);
    assert_eq!(labels(&mended.drawing), labels(&drawing));
    assert!(
        mended.left.iter().all(|f| f.grade == Grade::Open),
        "{:?}",
        mended.left
    );
    assert!(mended.steps.len() >= 3);
    assert_eq!(mended.drawing.points(), drawing.points());
}
